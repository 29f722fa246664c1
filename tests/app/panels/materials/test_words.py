"""What is said of materials."""

from dataclasses import replace

import pytest

from app.document import edits
from app.document.document import job_cell
from app.document.session import Session
from app.panels.materials.words import range_caution, reading_at, spread_text, uses_text, values_text
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.library import library_entry


@pytest.mark.parametrize(
    ("medium", "text"),
    [
        (ConstantMedium(2.08 + 0j), "ε′ 2.08"),
        (ConstantMedium(4.2 - 0.063j), "ε′ 4.2, tan δ 0.015"),
        (ConstantMedium(12 - 0.6j, 2 - 0.8j), "ε′ 12, tan δ 0.05, μ′ 2, tan δ of μ 0.4"),
        (ConstantMedium(-3 - 0.5j), "ε′ −3, ε″ 0.5"),
    ],
)
def test_reading_of_a_constant(medium: AbstractMedium, text: str) -> None:
    """Real part and loss tangent; where the real part is not positive, the loss itself."""
    assert reading_at(medium, 1e10) == text


def test_skin_depth_of_copper() -> None:
    """Copper of 58 MS/m has the handbook's 0.66 µm at 10 GHz and a hundred times that at 1 MHz."""
    copper = ConductorMedium(5.8e7)

    assert reading_at(copper, 1e10) == "skin depth 660.9 nm"
    assert reading_at(copper, 1e6) == "skin depth 66.09 µm"


def test_range_left_at_either_end(session: Session) -> None:
    """The sentence names the range and the end of the sweep outside it, and there is none inside."""
    assert range_caution(session.job, "ptfe") == ""
    for cell, text in (("sweep.frequency.stop", "400 GHz"), ("sweep.frequency.start", "0.5 Hz")):
        assert session.apply(edits.type_into(job_cell(cell), text)) == ()

    assert range_caution(session.job, "copper") == (
        "Copper is known from 1 Hz to 300 GHz; the sweep goes down to 0.5 Hz and up to 400 GHz, "
        "where its constants are a guess."
    )


def test_no_caution_without_a_known_range(session: Session) -> None:
    """A material of one's own, of which no range is known, has no caution."""
    material = replace(session.record.materials[0], name="own", library="", valid_range=None)
    session.apply(edits.add_material(material))
    session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "400 GHz"))

    assert range_caution(session.job, "own") == ""


def test_entry_in_short() -> None:
    """Values and spreads of an entry have their symbols; the spread is in percent."""
    copper = library_entry("metals/copper")

    assert values_text(copper) == "σ 59.6 MS/m"
    assert spread_text(copper) == "σ ±2 %"


def test_uses_are_named_as_the_table_has_them(session: Session) -> None:
    """Stacks by name, elements by number, half-spaces by side; stacks that do not use it are left out."""
    session.apply(edits.duplicate(0, (0,)))
    session.apply(edits.duplicate_stack(0))
    session.apply(edits.add_stack())
    session.apply(edits.set_back(2, "ptfe"))

    assert uses_text(session.record, "ptfe") == (
        "stack A element 1, element 2; stack B element 1, element 2; stack C back"
    )
    assert uses_text(session.record, "copper") == ""
