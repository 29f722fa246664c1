"""Constructions put into a job."""

import math

import pytest

from app.document import edits
from app.document.construction_edits import insert_construction, stack_of_construction
from app.document.document import Selection
from app.document.session import Session
from stackcore.constructions import CONSTRUCTIONS, Built, DesignPoint, build
from stackcore.job.records import LayerRecord

POINT = DesignPoint(9.4e9, math.radians(40))


def built(key: str, **texts: str) -> Built:
    """Return a construction with its defaults but for `texts`."""
    return build(CONSTRUCTIONS[key], POINT, texts)


def test_a_construction_goes_in_at_its_row_with_its_materials() -> None:
    """The elements stand together before the row, their materials are of the job, and one undo takes all back."""
    session = Session()
    before, count = session.document, len(session.record.stacks[0].elements)
    wall = built("a-sandwich", skin_thickness="1 mm")
    assert session.apply(insert_construction(0, 0, "A-sandwich", wall)) == ()
    elements = session.record.stacks[0].elements
    assert len(elements) == count + len(wall.elements)
    names = {element.material for element in elements if isinstance(element, LayerRecord)}
    assert all(name == "air" or session.record.material(name) for name in names)
    assert session.selection == Selection(0, tuple(range(len(wall.elements))))
    assert session.undo_sentence == "insert A-sandwich"
    session.undo()
    assert session.document == before


def test_a_construction_twice_uses_the_materials_once() -> None:
    """The second insertion finds the materials of the first."""
    session = Session()
    session.apply(insert_construction(0, 0, "Solid wall", built("solid-wall")))
    materials = session.record.materials
    session.apply(insert_construction(0, 0, "Solid wall", built("solid-wall")))
    assert session.record.materials == materials


def test_a_construction_becomes_a_stack_of_its_own() -> None:
    """The new stack has the label, a free one the second time, is selected, and has what stands behind."""
    session = Session()
    for _ in range(2):
        assert session.apply(stack_of_construction("Sheet absorber", built("sheet-absorber"))) == ()
    names = [stack.name for stack in session.record.stacks]
    assert names[-2:] == ["Sheet absorber", "Sheet absorber-2"]
    assert session.selection == Selection(len(names) - 1)
    assert session.record.stacks[-1].back == "metal"


def test_what_needs_metal_behind_goes_to_the_end_only() -> None:
    """In the middle of a stack it is refused with the way out; at the end it brings the metal."""
    session = Session()
    session.apply(edits.set_back(0, "air"))
    absorber = built("sheet-absorber")
    refused = session.apply(insert_construction(0, 0, "Sheet absorber", absorber))
    assert "at the end" in str(refused[0])
    count = len(session.record.stacks[0].elements)
    assert session.apply(insert_construction(0, count, "Sheet absorber", absorber)) == ()
    assert session.record.stacks[0].back == "metal"


@pytest.mark.parametrize(
    ("label", "sentence"), [("Foil on board", "add stack foil on board"), ("A-sandwich", "add stack A-sandwich")]
)
def test_the_sentence_reads_after_undo(label: str, sentence: str) -> None:
    """A label is small inside a sentence unless it begins with a letter that stands for itself."""
    assert stack_of_construction(label, built("foil-on-board", board="plastics/abs")).sentence == sentence
