"""Constants of every model as cells, and the edits of models and lists."""

from collections.abc import Callable

import pytest

from app.document import edits
from app.document.document import material_cell
from app.document.edit import Edit
from app.document.material_cells import (
    WORDS,
    constant_text,
    material_columns,
    model_table,
    with_constant_text,
    with_model,
)
from app.document.session import Session
from stackcore.errors import UnitError
from stackcore.job.records import MaterialRecord
from stackcore.media.models import MODELS, Terms
from tests.app.document.jobs import harbour


def started(model: str, name: str = "it") -> MaterialRecord:
    """Return a new material of a model."""
    return MaterialRecord(name, model=model, constants=MODELS[model].start())


def session_with(*materials: MaterialRecord) -> Session:
    """Return a session whose job has these materials too."""
    session = harbour()
    for material in materials:
        assert session.apply(edits.add_material(material)) == ()
    return session


@pytest.mark.parametrize("model", list(MODELS))
def test_every_cell_takes_its_own_text(model: str) -> None:
    """Typing into every cell of a material the text that it shows changes nothing, whatever the model."""
    session = session_with(started(model))
    before = session.record
    material = before.material("it")
    assert material is not None
    for column in material_columns(material)[len(WORDS) :]:
        text = constant_text(material, column)
        if text:
            assert session.apply(edits.type_into(material_cell("it", column), text)) == ()
            assert session.document.drafts == ()
    changed = session.record.material("it")
    assert changed is not None
    for column in material_columns(material)[len(WORDS) :]:
        assert constant_text(changed, column) == constant_text(material, column)
    assert session.job.media["it"] is not None


def test_a_value_in_a_list_is_typed() -> None:
    """A relaxation time in a list is typed like any other, and a bad text stays as a draft at its place."""
    session = session_with(started("multi-debye"))
    cell = material_cell("it", "terms[0].relaxation_time")
    assert cell.path == "materials.it.terms[0].relaxation_time"
    assert session.apply(edits.type_into(cell, "20")) == ()
    material = session.record.material("it")
    assert material is not None
    assert constant_text(material, "terms[0].relaxation_time") == "20 ps"
    session.apply(edits.type_into(cell, "20 GHz"))
    (draft,) = session.document.drafts
    assert draft.fault.path == cell.path
    assert "is a frequency, not a time" in draft.fault.message
    assert session.apply(edits.rename_material("it", "oil 2.1")) == ()
    assert session.document.drafts[0].cell == material_cell("oil 2.1", "terms[0].relaxation_time")


def test_rows_are_added_and_removed() -> None:
    """A row is added as a copy of the last, put in front, and removed; the last row cannot go."""
    session = session_with(started("multi-debye"))
    assert session.apply(edits.add_row("it", "terms")) == ()
    assert session.apply(edits.type_into(material_cell("it", "terms[1].relaxation_time"), "3 ns")) == ()
    assert session.apply(edits.add_row("it", "terms", 0)) == ()
    material = session.record.material("it")
    assert material is not None
    times = [constant_text(material, f"terms[{row}].relaxation_time") for row in range(3)]
    assert times == ["8 ps", "8 ps", "3 ns"]
    assert session.apply(edits.remove_row("it", "terms", 1)) == ()
    assert session.apply(edits.remove_row("it", "terms", 0)) == ()
    (fault,) = session.apply(edits.remove_row("it", "terms", 0))
    assert fault.path == "materials.it.terms"
    session.undo()
    material = session.record.material("it")
    assert material is not None
    assert len(material_columns(material)) > len(WORDS)


@pytest.mark.parametrize(
    "edit",
    [
        edits.add_row("it", "conductivity"),
        edits.remove_row("it", "terms", 9),
        edits.set_model("it", "debey"),
        edits.set_model("gone", "debye"),
        edits.set_constant("it", "terms[0].permittivity_step", -1.0),
        edits.set_constant("it", "high_frequency_permittivity", None),
    ],
)
def test_what_is_wrong_is_refused(edit: Edit) -> None:
    """An edit that leads to no material is refused with its fault, and nothing changes."""
    session = session_with(started("multi-debye"))
    before = session.record
    faults = session.apply(edit)
    assert faults
    assert all(fault.path.startswith(("materials.it.", "materials.gone")) for fault in faults)
    assert session.record is before


@pytest.mark.parametrize("old", ["constant", "debye", "tabulated", "mixture"])
@pytest.mark.parametrize("new", list(MODELS))
def test_any_model_can_become_any_other(old: str, new: str) -> None:
    """After a change of model the job resolves, with the constants that both models have."""
    session = session_with(started(old))
    assert session.apply(edits.set_model("it", new)) == ()
    material = session.record.material("it")
    assert material is not None
    assert material.model == new


def test_constants_that_both_models_have_stay() -> None:
    """Step and time of a relaxation are kept by a broader one."""
    material = with_constant_text(started("debye"), "permittivity_step", "7.5")
    assert constant_text(with_model(material, "cole-cole"), "permittivity_step") == "7.5"


def test_a_change_cuts_the_tie_to_the_library() -> None:
    """A constant typed over one of the library takes reference, range and spread away; the same text does not."""
    copper = MaterialRecord("cu", library="metals/copper")
    assert with_constant_text(copper, "conductivity", "59.6 MS/m") is copper
    changed = with_constant_text(copper, "conductivity", "50")
    assert (changed.library, changed.source, changed.valid_range) == ("", "changed from metals/copper", None)
    assert constant_text(changed, "conductivity") == "50 MS/m"


@pytest.mark.parametrize(
    ("model", "column", "text", "told"),
    [
        ("debye", "permittivity", "4", "has no permittivity"),
        ("cauchy", "squared", "perhaps", "neither yes nor no"),
        ("multi-debye", "terms", "1 ps", "typed by itself"),
        ("debye", "high_frequency_permittivity", "much", "much"),
        ("multi-debye", "terms[0].permitivity_step", "1", "has no terms[0].permitivity_step"),
    ],
)
def test_texts_that_are_no_values(model: str, column: str, text: str, told: str) -> None:
    """A text that is no value of its kind says what is wrong."""
    with pytest.raises(UnitError, match=told.replace("[", r"\[").replace("]", r"\]")):
        with_constant_text(started(model), column, text)


def test_the_range_is_typed() -> None:
    """A range is typed with one unit for both ends, shown as typed, and taken away by nothing."""
    session = session_with(started("debye"))
    cell = material_cell("it", "range")
    shown: Callable[[], MaterialRecord | None] = lambda: session.record.material("it")  # noqa: E731  read anew each time
    for text, ends in (("8 to 12 GHz", (8e9, 12e9)), ("1 MHz; 2 GHz", (1e6, 2e9))):
        assert session.apply(edits.type_into(cell, text)) == ()
        material = shown()
        assert material is not None
        assert material.valid_range is not None
        assert tuple(end.value for end in material.valid_range) == ends
    session.apply(edits.type_into(cell, "12 GHz to 8 GHz"))
    assert "is reversed" in session.document.drafts[0].fault.message
    assert session.apply(edits.type_into(cell, "")) == ()
    material = shown()
    assert material is not None
    assert material.valid_range is None


def test_a_part_of_a_mixture_follows_its_name_and_stays() -> None:
    """Renaming a material renames it where others are made of it; while they are, it cannot be removed."""
    part = started("debye", "part")
    mixture = started("mixture")
    session = session_with(part, mixture)
    assert session.apply(edits.set_constant("it", "host", "part")) == ()
    assert session.apply(edits.set_constant("it", "inclusions[0].material", "part")) == ()
    assert session.apply(edits.rename_material("part", "resin")) == ()
    material = session.record.material("it")
    assert material is not None
    assert constant_text(material, "host") == constant_text(material, "inclusions[0].material") == "resin"
    faults = session.apply(edits.remove_material("resin"))
    assert [fault.path for fault in faults] == ["materials.it.host", "materials.it.inclusions[0].material"]


def test_the_table_of_models_is_the_one_of_the_core() -> None:
    """The window knows the models that files know, and which of their constants are lists."""
    assert model_table() is MODELS
    lists = {
        name
        for name, model in model_table().items()
        if any(isinstance(constant.kind, Terms) for constant in model.constants)
    }
    sums = {"multi-debye", "multi-lorentz", "drude-lorentz", "sellmeier", "cauchy"}
    assert lists == sums | {"tabulated", "mixture", "joined"}
