"""The edits by name."""

from dataclasses import replace

import pytest

from app.document import edits
from app.document.cells import value_text
from app.document.document import Cell, Selection, job_cell, material_cell
from app.document.session import Session
from stackcore.job.records import AngleGrid, FrequencyGrid, LayerRecord, MaterialRecord, SheetRecord
from stackcore.units import Dimension, parse_measure
from tests.app.document.jobs import harbour

TWO_MM = parse_measure("2 mm", Dimension.LENGTH)


def rows(session: Session, stack: int = 0) -> list[str]:
    """Return the elements of a stack as short words."""
    return [
        f"{element.material} {element.thickness.text}" if isinstance(element, LayerRecord) else "sheet"
        for element in session.record.stacks[stack].elements
    ]


FOUR = ["skin 0.9 mm", "core 1/4 in", "sheet", "skin 0.001"]


@pytest.mark.parametrize(
    ("moved", "before_row", "order", "selected"),
    [
        ((0,), 2, [1, 0, 2, 3], (1,)),
        ((0, 1), 4, [2, 3, 0, 1], (2, 3)),
        ((1, 3), 0, [1, 3, 0, 2], (0, 1)),
        ((0, 2), 2, [1, 0, 2, 3], (1, 2)),
        ((3, 0), 1, [0, 3, 1, 2], (0, 1)),
    ],
)
def test_move(moved: tuple[int, ...], before_row: int, order: list[int], selected: tuple[int, ...]) -> None:
    """Elements move as one block in their order, and the block is selected."""
    session = harbour()
    assert session.apply(edits.move(0, moved, before_row)) == ()
    assert rows(session) == [FOUR[row] for row in order]
    assert session.selection == Selection(0, selected)


@pytest.mark.parametrize(("moved", "before_row"), [((0,), 0), ((0,), 1), ((1, 2), 2), ((0, 1, 2, 3), 2), ((), 2)])
def test_a_move_to_its_own_place_is_no_step(moved: tuple[int, ...], before_row: int) -> None:
    """What moves nothing leaves no step to undo."""
    session = harbour()
    assert session.apply(edits.move(0, moved, before_row)) == ()
    assert session.undo_sentence == ""


def test_drafts_follow_their_elements() -> None:
    """Drafts go where their element goes, twice when it is doubled, away when it is deleted."""
    session = harbour()
    session.apply(edits.type_into(Cell(0, 1, "thickness"), "x"))
    session.apply(edits.type_into(Cell(1, 0, "thickness"), "other stack"))
    session.apply(edits.move(0, (1,), 4))
    session.apply(edits.duplicate(0, (3,)))
    session.apply(edits.add_layer(0, 0, "core", TWO_MM))
    session.apply(edits.delete(0, (1,)))
    at = {(draft.cell.stack, draft.cell.row): draft for draft in session.document.drafts}
    assert {place: draft.text for place, draft in at.items()} == {(0, 3): "x", (0, 4): "x", (1, 0): "other stack"}
    assert at[0, 4].fault.path == "stacks[0].elements[4].thickness"
    session.apply(edits.delete(0, (3, 4)))
    assert [draft.text for draft in session.document.drafts] == ["other stack"]


def test_duplicate_selects_the_copies() -> None:
    """Copies stand as one block behind the last original."""
    session = harbour()
    session.apply(edits.duplicate(0, (0, 2)))
    assert rows(session) == [*FOUR[:3], FOUR[0], FOUR[2], FOUR[3]]
    assert session.selection == Selection(0, (3, 4))


def test_delete_selects_what_takes_the_place() -> None:
    """After the last element went, the one before it is selected, and after all went, none."""
    session = harbour()
    session.apply(edits.delete(0, (0, 3)))
    assert rows(session) == FOUR[1:3]
    assert session.selection == Selection(0, (0,))
    session.apply(edits.delete(0, (1,)))
    assert session.selection == Selection(0, (0,))
    session.apply(edits.delete(0, (0,)))
    assert session.selection == Selection(0, ())


def test_add_layer_and_sheet() -> None:
    """New elements come before the row and are selected; a library key brings its material along."""
    session = harbour()
    session.apply(edits.add_layer(0, 4, "metals/copper", TWO_MM))
    session.apply(edits.add_sheet(0, 0))
    assert rows(session) == ["sheet", *FOUR, "copper 2 mm"]
    assert session.selection == Selection(0, (0,))
    sheet = session.record.stacks[0].elements[0]
    assert isinstance(sheet, SheetRecord)
    assert sheet.resistance is not None
    assert sheet.resistance.value == 377.0


@pytest.mark.parametrize(
    "edit",
    [
        edits.move(0, (0,), 9),
        edits.move(0, (7,), 0),
        edits.delete(0, (4,)),
        edits.delete(2, (0,)),
        edits.duplicate(0, (-1,)),
        edits.add_layer(0, 9, "skin", TWO_MM),
        edits.add_layer(0, 0, "skni", TWO_MM),
        edits.add_sheet(4, 0),
        edits.set_thickness(0, 2, 1e-3),
        edits.set_thickness(0, 0, float("nan")),
        edits.set_thickness(0, 0, float("inf")),
        edits.change_material(0, 2, "skin"),
        edits.change_material(0, 0, "metals/unobtainium"),
        edits.set_front(0, "steel"),
        edits.set_front(0, "metal"),
        edits.set_back(0, "nothing"),
        edits.rename_stack(0, "B"),
        edits.rename_stack(0, "  "),
        edits.delete_stack(7),
        edits.set_frequency_grid("12 GHz", "8 GHz", 41),
        edits.set_frequency_grid("1 mm", "8 GHz", 41),
        edits.set_frequency_list([]),
        edits.set_angles(["0 deg", "90 deg"]),
        edits.set_angle_grid("0 deg", "abc", 3),
        edits.add_material(MaterialRecord("skin", model="constant", constants={"permittivity": 2 + 0j})),
        edits.add_material(MaterialRecord("air", model="constant", constants={"permittivity": 2 + 0j})),
        edits.add_material(MaterialRecord("new", model="constant")),
        edits.replace_material(
            "skin", MaterialRecord("skin", model="constant", constants={"permittivity": 2 + 1j})
        ),
        edits.replace_material(
            "gone", MaterialRecord("gone", model="constant", constants={"permittivity": 2 + 0j})
        ),
        edits.rename_material("skin", "core"),
        edits.rename_material("skin", ""),
        edits.remove_material("gone"),
        edits.use_library_entry("metals/unobtainium"),
    ],
)
def test_what_cannot_be_is_refused(edit: edits.Edit) -> None:
    """A refused edit returns its faults with a place or a reason and changes nothing."""
    session = harbour()
    before = session.document
    faults = session.apply(edit)
    assert faults
    assert all(fault.message for fault in faults)
    assert session.document is before
    assert not session.modified


def test_all_faults_of_a_refused_edit_come_at_once() -> None:
    """Two bad ends of a sweep are told together, each with its place."""
    faults = harbour().apply(edits.set_frequency_grid("abc", "1 kg", 41))
    assert [fault.path for fault in faults] == ["sweep.frequency.start", "sweep.frequency.stop"]


@pytest.mark.parametrize(
    ("metres", "text"),
    [(1.23456e-3, "1.23 mm"), (-1.0, "0 mm"), (35.04e-6, "35 µm"), (99.96e-3, "100 mm"), (5.2149e-7, "521 nm")],
)
def test_a_dragged_thickness_reads_well(metres: float, text: str) -> None:
    """A dragged face gives three digits in a readable unit, whose text is exactly the value."""
    session = harbour()
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "bad"))
    session.apply(edits.set_thickness(0, 0, metres))
    layer = session.record.stacks[0].elements[0]
    assert isinstance(layer, LayerRecord)
    assert layer.thickness.text == text
    assert parse_measure(text, Dimension.LENGTH).value == layer.thickness.value
    assert session.document.drafts == ()
    assert session.undo_sentence == f"set thickness of layer 1 to {text}"


def test_a_bare_number_is_undone_with_its_unit() -> None:
    """The sentence of a typed number has the unit it was read in; a text without a value stays as it was typed."""
    session = harbour()
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "2"))
    assert session.undo_sentence == "set thickness of layer 1 to 2 mm"
    session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "13"))
    assert session.undo_sentence == "set last frequency to 13 GHz"
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "two"))
    assert session.undo_sentence == "set thickness of layer 1 to two"


def test_materials() -> None:
    """Materials are added, changed, renamed everywhere and removed when nothing is made of them."""
    session = harbour()
    glue = MaterialRecord("glue", model="constant", constants={"permittivity": 3 + 0j})
    assert session.apply(edits.add_material(glue)) == ()
    assert session.apply(edits.replace_material("glue", replace(glue, constants={"permittivity": 2.9 + 0j}))) == ()
    assert session.apply(edits.rename_material("skin", "laminate")) == ()
    assert rows(session)[0] == "laminate 0.9 mm"
    assert session.apply(edits.set_back(1, "laminate")) == ()
    faults = session.apply(edits.remove_material("laminate"))
    assert [fault.path for fault in faults] == [
        "stacks[0].elements[0].layer",
        "stacks[0].elements[3].layer",
        "stacks[1].back",
    ]
    session.apply(edits.type_into(material_cell("glue", "permittivity"), "?"))
    assert session.apply(edits.remove_material("glue")) == ()
    assert session.record.material("glue") is None
    assert session.document.drafts == ()


def test_the_library_entry_brings_its_values() -> None:
    """An entry comes once, with its values beside the reference, under a name that is free."""
    session = harbour()
    session.apply(edits.add_material(MaterialRecord("ptfe", model="constant", constants={"permittivity": 2 + 0j})))
    session.apply(edits.use_library_entry("plastics/ptfe"))
    session.apply(edits.use_library_entry("plastics/ptfe"))
    names = [material.name for material in session.record.materials]
    assert names == ["skin", "core", "steel", "ptfe", "ptfe-2"]
    material = session.record.materials[-1]
    assert (material.library, material.model) == ("plastics/ptfe", "constant")
    assert material.permittivity is not None
    assert material.source


def test_a_copy_of_a_named_stack_is_known_by_its_name() -> None:
    """The copy of a stack with words for a name has these words and the next free number."""
    session = harbour()
    session.apply(edits.rename_stack(0, "As built"))
    for _ in range(2):
        session.apply(edits.duplicate_stack(0))
    session.apply(edits.duplicate_stack(1))
    names = [stack.name for stack in session.record.stacks]
    assert names == ["As built", "As built 3", "As built 4", "As built 2", "B"]


def test_stacks() -> None:
    """Stacks are added, doubled with their drafts, renamed and deleted but for the last."""
    session = harbour()
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "x"))
    session.apply(edits.type_into(Cell(1, 0, "thickness"), "y"))
    session.apply(edits.duplicate_stack(0))
    assert [stack.name for stack in session.record.stacks] == ["A", "C", "B"]
    assert session.selection == Selection(1)
    at = {(draft.cell.stack, draft.text) for draft in session.document.drafts}
    assert at == {(0, "x"), (1, "x"), (2, "y")}
    session.apply(edits.add_stack())
    assert session.record.stacks[3].name == "D"
    assert session.selection == Selection(3)
    for _ in range(3):
        assert session.apply(edits.delete_stack(0)) == ()
    assert [stack.name for stack in session.record.stacks] == ["D"]
    assert session.document.drafts == ()
    assert session.apply(edits.delete_stack(0))


def test_sweeps() -> None:
    """Frequencies and angles are set as grids and as lists, bare numbers in GHz and degrees."""
    session = harbour()
    session.apply(edits.set_frequency_grid("2", "18 GHz", 33, "log"))
    grid = session.record.sweep.frequency
    assert grid == FrequencyGrid(
        parse_measure("2 GHz", Dimension.FREQUENCY), parse_measure("18 GHz", Dimension.FREQUENCY), 33, "log"
    )
    session.apply(edits.set_angles(["0", "30"]))
    assert session.undo_sentence == "set angles to 0, 30"
    assert value_text(session.record, job_cell("sweep.angle")) == "0 deg; 30 deg"
    session.apply(edits.set_angle_grid("0 deg", "60 deg", 7))
    assert isinstance(session.record.sweep.angle, AngleGrid)
    session.apply(edits.set_frequency_list([9.41e9, "9.5"]))
    assert session.record.sweep.frequencies() == pytest.approx([9.41e9, 9.5e9])
