"""Typing into cells."""

import pytest

from app.document import edits
from app.document.cells import value_text
from app.document.document import Cell, job_cell, material_cell
from app.document.session import Session
from stackcore.job.records import FrequencyGrid, LayerRecord, SheetRecord
from tests.app.document.jobs import harbour

THICKNESS = Cell(0, 0, "thickness")


def type_into(session: Session, cell: Cell, text: str) -> None:
    """Type and see that the edit is not refused."""
    assert session.apply(edits.type_into(cell, text)) == ()


def thickness(session: Session, row: int, stack: int = 0) -> float:
    """Return the thickness of a layer in m."""
    element = session.record.stacks[stack].elements[row]
    assert isinstance(element, LayerRecord)
    return element.thickness.value


def fault_at(session: Session, cell: Cell) -> str:
    """Return what is wrong with the draft at `cell`."""
    draft = session.document.draft(cell)
    assert draft is not None
    return str(draft.fault)


@pytest.mark.parametrize(
    ("row", "typed", "metres", "text"),
    [
        (0, "1.2 mm", 1.2e-3, "1.2 mm"),
        (0, "1,2", 1.2e-3, "1,2 mm"),
        (1, "1/8", 0.003175, "1/8 in"),
        (3, "0.002", 0.002, "0.002 m"),
        (0, " 35 µm ", 35e-6, "35 µm"),
    ],
)
def test_a_good_text_becomes_the_value(row: int, typed: str, metres: float, text: str) -> None:
    """The value is the text's, and a bare number has the unit in which the old value was written."""
    session = harbour()
    cell = Cell(0, row, "thickness")
    type_into(session, cell, typed)
    assert thickness(session, row) == pytest.approx(metres, rel=1e-15)
    assert value_text(session.record, cell) == text
    assert session.document.drafts == ()


def test_a_bad_text_stays_as_typed() -> None:
    """A text without a value becomes a draft with its fault, and the job stays the last good one."""
    session = harbour()
    job = session.job
    type_into(session, THICKNESS, "abc mm")
    assert session.job is job
    assert not session.modified
    assert [(draft.cell, draft.text) for draft in session.document.drafts] == [(THICKNESS, "abc mm")]
    assert value_text(session.record, THICKNESS) == "0.9 mm"
    assert "stacks[0].elements[0].thickness" in fault_at(session, THICKNESS)


def test_a_good_text_ends_the_draft() -> None:
    """A later good text in the same cell removes the draft."""
    session = harbour()
    type_into(session, THICKNESS, "abc")
    type_into(session, THICKNESS, "0.9 mm")
    assert session.document.drafts == ()
    assert thickness(session, 0) == pytest.approx(0.9e-3)


def test_what_the_job_refuses_is_a_draft_too() -> None:
    """A text that reads well but with which the job cannot be resolved is a draft with the job's own words."""
    session = harbour()
    type_into(session, THICKNESS, "-2 mm")
    assert "-2 mm" in fault_at(session, THICKNESS)
    type_into(session, Cell(0, 0, "material"), "skn")
    assert "did you mean 'skin'" in fault_at(session, Cell(0, 0, "material"))
    type_into(session, Cell(0, -1, "front"), "steel")
    assert "absorbs" in fault_at(session, Cell(0, -1, "front"))


def test_drafts_at_different_cells_stand_side_by_side() -> None:
    """One draft a cell, and a good text elsewhere leaves it alone."""
    session = harbour()
    type_into(session, THICKNESS, "a")
    type_into(session, Cell(0, 1, "thickness"), "b")
    type_into(session, THICKNESS, "c")
    type_into(session, Cell(0, 3, "thickness"), "3 mm")
    drafts = {draft.cell.row: draft.text for draft in session.document.drafts}
    assert drafts == {0: "c", 1: "b"}


def test_a_draft_becomes_the_value_when_it_can() -> None:
    """A start beyond the stop waits, and counts as soon as the stop lies beyond it."""
    session = harbour()
    start, stop = job_cell("sweep.frequency.start"), job_cell("sweep.frequency.stop")
    type_into(session, start, "20")
    assert session.document.draft(start) is not None
    type_into(session, stop, "30 GHz")
    grid = session.record.sweep.frequency
    assert isinstance(grid, FrequencyGrid)
    assert (grid.start.text, grid.stop.text) == ("20 GHz", "30 GHz")
    assert session.document.drafts == ()
    session.undo()
    assert session.document.draft(start) is not None


def test_a_waiting_material_is_taken_when_it_comes() -> None:
    """A layer whose material is not defined takes it when it is added."""
    session = harbour()
    cell = Cell(0, 1, "material")
    type_into(session, cell, "ptfe")
    assert session.document.draft(cell) is not None
    assert session.apply(edits.use_library_entry("plastics/ptfe")) == ()
    assert value_text(session.record, cell) == "ptfe"
    assert session.document.drafts == ()


def test_the_fault_of_a_draft_stays_true() -> None:
    """What a draft says is wrong follows the rest of the job."""
    session = harbour()
    start = job_cell("sweep.frequency.start")
    type_into(session, start, "20 GHz")
    type_into(session, job_cell("sweep.frequency.stop"), "15 GHz")
    assert "'15 GHz' is below the start, '20 GHz'" in fault_at(session, start)


def test_material_by_label_and_by_library_key() -> None:
    """A label means its material, in any case of letters, and a library key adds the entry."""
    session = harbour()
    cell = Cell(0, 1, "material")
    type_into(session, cell, "glass-fibre SKIN")
    assert value_text(session.record, cell) == "skin"
    type_into(session, cell, "metals/copper")
    assert value_text(session.record, cell) == "copper"
    assert session.record.materials[-1].conductivity is not None
    count = len(session.record.materials)
    type_into(session, Cell(0, 0, "material"), "metals/copper")
    assert len(session.record.materials) == count


def test_the_parts_of_a_sheet() -> None:
    """An empty text takes a part away, except the last one."""
    session = harbour()
    for column, text in (("capacitance", ""), ("inductance", "20"), ("resistance", " ")):
        type_into(session, Cell(0, 2, column), text)
    sheet = session.record.stacks[0].elements[2]
    assert isinstance(sheet, SheetRecord)
    assert sheet.resistance is None
    assert sheet.capacitance is None
    assert sheet.inductance is not None
    assert sheet.inductance.text == "20 nH"
    type_into(session, Cell(0, 2, "inductance"), "")
    assert session.document.draft(Cell(0, 2, "inductance")) is not None


@pytest.mark.parametrize(
    ("column", "text", "shown"),
    [
        ("sweep.angle", "0, 10, 20 deg", "0 deg; 10 deg; 20 deg"),
        ("sweep.frequency", "9 GHz; 10 GHz", "9 GHz; 10 GHz"),
        ("sweep.frequency.points", "101", "101"),
        ("sweep.frequency.spacing", " LOG ", "log"),
        ("title", "Bridge cover", "Bridge cover"),
        ("notes", "two\nlines", "two\nlines"),
    ],
)
def test_cells_of_the_job(column: str, text: str, shown: str) -> None:
    """Sweep, title and notes are typed into like any cell."""
    session = harbour()
    type_into(session, job_cell(column), text)
    assert value_text(session.record, job_cell(column)) == shown
    assert session.document.drafts == ()


@pytest.mark.parametrize("text", ["0", "1.5", "many", "2000000"])
def test_points_that_cannot_be(text: str) -> None:
    """A number of points the sweep cannot take stays a draft."""
    session = harbour()
    type_into(session, job_cell("sweep.frequency.points"), text)
    assert session.document.draft(job_cell("sweep.frequency.points")) is not None


def test_a_list_replaces_the_grid_and_its_drafts() -> None:
    """Frequencies typed as a list leave no cell for a start, and so no draft there."""
    session = harbour()
    type_into(session, job_cell("sweep.frequency.start"), "x")
    type_into(session, job_cell("sweep.frequency"), "9, 10 GHz")
    assert session.document.drafts == ()
    faults = session.apply(edits.type_into(job_cell("sweep.frequency.start"), "1 GHz"))
    assert faults[0].path == "sweep.frequency.start"


@pytest.mark.parametrize(
    "cell",
    [
        Cell(0, 9, "thickness"),
        Cell(5, 0, "thickness"),
        Cell(0, 0, "resistance"),
        Cell(0, 2, "thickness"),
        Cell(7, -1, "front"),
        material_cell("gold", "label"),
        material_cell("skin", "colour"),
        job_cell("sweep.angle.start"),
        job_cell("nonsense"),
    ],
)
def test_a_cell_that_does_not_exist_is_refused(cell: Cell) -> None:
    """Typing where there is no cell changes nothing and says so."""
    session = harbour()
    before = session.document
    faults = session.apply(edits.type_into(cell, "1 mm"))
    assert len(faults) == 1
    assert session.document is before
    assert session.undo_sentence == ""


def test_a_constant_typed_over_the_library_cuts_the_tie() -> None:
    """A changed constant no longer claims the library's source, and the others stay."""
    session = harbour()
    session.apply(edits.use_library_entry("plastics/ptfe"))
    tangent = value_text(session.record, material_cell("ptfe", "loss_tangent"))
    type_into(session, material_cell("ptfe", "permittivity"), "2.5")
    material = session.record.material("ptfe")
    assert material is not None
    assert (material.library, material.source) == ("", "changed from plastics/ptfe")
    assert (material.permittivity, repr(material.loss_tangent)) == (2.5, tangent)


def test_the_loss_is_not_counted_twice() -> None:
    """ε″ typed beside a loss tangent waits until the tangent is taken away."""
    session = harbour()
    cell = material_cell("skin", "permittivity")
    type_into(session, cell, "4.2 - 0.1j")
    assert "twice" in fault_at(session, cell)
    type_into(session, material_cell("skin", "loss_tangent"), "")
    assert value_text(session.record, cell) == "4.2 - 0.1j"


def test_a_material_renamed_by_typing() -> None:
    """Layers and drafts follow the new name; a taken name is a draft."""
    session = harbour()
    type_into(session, material_cell("skin", "permittivity"), "x")
    type_into(session, material_cell("skin", "name"), "laminate")
    assert value_text(session.record, Cell(0, 3, "material")) == "laminate"
    assert fault_at(session, material_cell("laminate", "permittivity")).startswith(
        "materials.laminate.permittivity"
    )
    type_into(session, material_cell("laminate", "name"), "core")
    assert "is taken" in fault_at(session, material_cell("laminate", "name"))
    type_into(session, material_cell("laminate", "name"), "laminate")
    assert session.document.draft(material_cell("laminate", "name")) is None


def test_stack_cells() -> None:
    """Name, front and back of a stack are typed into; a name used twice is a draft."""
    session = harbour()
    type_into(session, Cell(0, -1, "back"), "metal")
    type_into(session, Cell(1, -1, "back"), "steel")
    type_into(session, Cell(0, -1, "name"), "Nose")
    type_into(session, Cell(1, -1, "name"), "Nose")
    assert [stack.back for stack in session.record.stacks] == ["metal", "steel"]
    assert session.record.stacks[0].name == "Nose"
    assert session.document.draft(Cell(1, -1, "name")) is not None


def test_sentences() -> None:
    """Every kind of cell reads well behind the word Undo."""
    sentences = {
        edits.type_into(cell, text).sentence
        for cell, text in (
            (Cell(0, 1, "material"), "skin"),
            (Cell(0, 2, "resistance"), "50 ohm"),
            (Cell(0, 2, "inductance"), ""),
            (job_cell("sweep.frequency.stop"), "12 GHz"),
            (material_cell("skin", "loss_tangent"), "0.01"),
            (Cell(1, -1, "front"), "air"),
            (job_cell("title"), "word " * 20),
        )
    }
    assert sentences == {
        "set material of layer 2 to skin",
        "set resistance of sheet 3 to 50 ohm",
        "clear inductance of sheet 3",
        "set last frequency to 12 GHz",
        "set loss tangent of skin to 0.01",
        "set front to air",
        "set title to word word word word word word word word…",
    }


def test_a_cell_of_the_job_is_one_cell() -> None:
    """Whatever stack is given, a cell of the whole job is the same."""
    assert Cell(0, -1, "title") == Cell(3, -1, "title") == job_cell("title")
    assert Cell(0, -1, "front") != Cell(1, -1, "front")
    assert material_cell("E glass", "label").path == 'materials["E glass"].label'
