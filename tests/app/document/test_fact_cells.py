"""Density, price, plies, spread and states of a material, typed and read back."""

import pytest

from app.document import edits
from app.document.document import Cell, material_cell
from app.document.session import Session
from stackcore.job.records import LayerRecord, MaterialRecord


@pytest.fixture
def session() -> Session:
    """A job with a laminate of its own and one of the library."""
    session = Session()
    skin = MaterialRecord("skin", model="constant", constants={"permittivity": 4.2 + 0j, "loss_tangent": 0.015})
    assert session.apply(edits.add_material(skin)) == ()
    assert session.apply(edits.use_library_entry("laminates/e-glass-epoxy")) == ()
    return session


def type_into(session: Session, name: str, column: str, text: str) -> str:
    """Type a text; return why it is no value, or nothing."""
    cell = material_cell(name, column)
    assert session.apply(edits.type_into(cell, text)) == ()
    draft = session.document.draft(cell)
    return "" if draft is None else str(draft.fault)


def material(session: Session, name: str) -> MaterialRecord:
    """Return a material of the job."""
    record = session.record.material(name)
    assert record is not None
    return record


def test_facts_are_typed_with_units_and_can_be_taken_away(session: Session) -> None:
    """A density in g/cm³, a ply in mil and a price are values; an empty text takes each away."""
    for column, text in (("density", "1.9 g/cm3"), ("ply_thickness", "10 mil"), ("price", "12.5")):
        assert type_into(session, "skin", column, text) == ""
    skin = material(session, "skin")
    assert skin.density is not None
    assert skin.density.value == pytest.approx(1900)
    assert skin.ply_thickness is not None
    assert skin.ply_thickness.value == 254e-6
    assert skin.price == 12.5
    for column in ("density", "ply_thickness", "price"):
        assert type_into(session, "skin", column, "") == ""
    skin = material(session, "skin")
    assert (skin.density, skin.ply_thickness, skin.price) == (None, None, None)


def test_a_spread_is_typed_in_per_cent(session: Session) -> None:
    """Constants and their shares; the text reads back the same."""
    assert type_into(session, "skin", "spread", "permittivity 3 %; loss_tangent 0.2") == ""
    assert material(session, "skin").spread == (("permittivity", 0.03), ("loss_tangent", 0.2))
    assert "permitivity" in type_into(session, "skin", "spread", "permitivity 3 %")
    assert "did you mean 'permittivity'" in type_into(session, "skin", "spread", "permitivity 3 %")


def test_states_are_typed_and_used(session: Session) -> None:
    """A state of two constants is a material of its own; complex constants keep their loss."""
    assert (
        type_into(
            session, "skin", "states", "wet: permittivity 4.6, loss_tangent 0.03; hot: permittivity 4.4 - 0.1j"
        )
        == ""
    )
    states = material(session, "skin").states
    assert [state.name for state in states] == ["wet", "hot"]
    assert states[0].constants["loss_tangent"] == 0.03
    assert states[1].constants["permittivity"] == 4.4 - 0.1j
    assert session.job.medium_in("skin", "wet") != session.job.media["skin"]


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("wet", "not a state"),
        ("wet: permitivity 4.6", "did you mean 'permittivity'"),
        ("wet: permittivity many", "many"),
        ("wet: permittivity 4.6 + 0.1j", "gain"),
        ("wet:", "nothing differs"),
        ("wet: loss_tangent 0.1; wet: loss_tangent 0.2", "another state"),
    ],
)
def test_what_is_no_state_stays_as_typed_with_the_reason(session: Session, text: str, words: str) -> None:
    """Nothing typed is lost and the states of before stay."""
    assert type_into(session, "skin", "states", "hot: loss_tangent 0.02") == ""
    assert words in type_into(session, "skin", "states", text)
    assert session.document.draft(material_cell("skin", "states")) is not None
    assert [state.name for state in material(session, "skin").states] == ["hot"]


def test_a_fact_does_not_cut_the_tie_to_the_library(session: Session) -> None:
    """A price beside an entry of the library leaves its values, its source and its own facts."""
    assert type_into(session, "e-glass-epoxy", "price", "20") == ""
    entry = material(session, "e-glass-epoxy")
    assert entry.library == "laminates/e-glass-epoxy"
    assert entry.price == 20
    assert entry.density is not None
    assert [state.name for state in entry.states] == ["wet"]


def test_plies_follow_the_ply(session: Session) -> None:
    """A layer of 6 ply is six plies of now; a layer of a material without plies keeps its length."""
    assert session.apply(edits.change_material(0, 0, "e-glass-epoxy")) == ()
    assert session.apply(edits.type_into(Cell(0, 0, "thickness"), "6 ply")) == ()
    assert thickness(session) == (1.5e-3, "6 ply")
    assert type_into(session, "e-glass-epoxy", "ply_thickness", "0.2 mm") == ""
    assert thickness(session) == (1.2e-3, "6 ply")
    session.end_merge()
    assert type_into(session, "e-glass-epoxy", "ply_thickness", "") == ""
    assert thickness(session) == (1.2e-3, "1.2 mm")
    session.undo()
    assert thickness(session) == (1.2e-3, "6 ply")


def thickness(session: Session) -> tuple[float, str]:
    """Return value and text of the first layer's thickness."""
    layer = session.record.stacks[0].elements[0]
    assert isinstance(layer, LayerRecord)
    return float(f"{layer.thickness.value:.9g}"), layer.thickness.text
