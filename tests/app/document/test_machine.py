"""Random work on a document: whatever was done, undo leads to the start and redo to the end."""

from pathlib import Path
from tempfile import TemporaryDirectory

from hypothesis import settings
from hypothesis import strategies as st
from hypothesis.stateful import RuleBasedStateMachine, initialize, invariant, precondition, rule

from app.document import edits
from app.document.cells import check_cell, value_text
from app.document.document import Cell, Document, Draft, Selection, job_cell, material_cell
from app.document.session import Session
from app.document.typed import shown_text
from stackcore.job import Job, job_from_json, job_to_json
from stackcore.job.records import LayerRecord, MaterialRecord, SheetRecord
from stackcore.units import Dimension, parse_measure
from tests.app.document.jobs import Clock, harbour

ROWS = st.integers(0, 6)
SOME_ROWS = st.sets(ROWS, min_size=1, max_size=3)
STACKS = st.integers(0, 2)
NAMES = st.sampled_from(
    ["skin", "core", "steel", "air", "glue", "laminate", "metals/copper", "plastics/ptfe", "sikn"],
)
TEXTS = st.sampled_from(
    [
        "1 mm",
        "0.5",
        "2,5",
        "1/8 in",
        "0",
        "-1 mm",
        "bad",
        "",
        "10 GHz",
        "9",
        "30 deg",
        "50 ohm",
        "skin",
        "glue",
        "log",
        "0, 20, 40 deg",
        "metal",
        "air",
        "B",
        "3 - 0.1j",
        "[2, 0.1]",
        "11",
        "1e400 m",
    ]
)
COLUMNS = st.sampled_from(["material", "thickness", "resistance", "inductance", "capacitance"])
PLACES = st.sampled_from(
    [
        Cell(0, -1, "front"),
        Cell(0, -1, "back"),
        Cell(1, -1, "name"),
        *(job_cell(column) for column in ("title", "notes", "sweep.angle", "sweep.angle.stop", "sweep.frequency")),
        *(job_cell(f"sweep.frequency.{part}") for part in ("start", "stop", "points", "spacing")),
        *(
            material_cell(name, part)
            for name in ("skin", "glue")
            for part in ("name", "permittivity", "loss_tangent")
        ),
    ]
)


class Work(RuleBasedStateMachine):
    """Edits, drags, selections, undo and redo in any order."""

    @initialize()
    def begin(self) -> None:
        """Begin with the harbour job, and keep what the documents were after each step."""
        self.clock = Clock()
        self.session = harbour(self.clock)
        self.first = self.session.job
        self.done: list[Document] = [self.session.document]
        self.undone: list[Document] = []
        self.open_key: str | None = None

    def make(self, edit: edits.Edit) -> None:
        """Apply `edit`, with a rest before it so that only a drag merges, and keep the model in step."""
        self.clock.now += 10.0
        merges = edit.merge_key is not None and edit.merge_key == self.open_key
        before = self.session.document
        faults = self.session.apply(edit)
        after = self.session.document
        if faults:
            assert after is before
        if after is before or after == before:
            return
        self.undone.clear()
        if merges:
            self.done.pop()
        self.done.append(after)
        self.open_key = edit.merge_key if isinstance(edit.merge_key, str) else None
        if len(self.done) > 1 and self.done[-1] == self.done[-2]:
            self.done.pop()

    @rule(stack=STACKS, row=ROWS, column=COLUMNS, text=TEXTS)
    def type_into_element(self, stack: int, row: int, column: str, text: str) -> None:
        """Type something good or bad into a cell that may not exist."""
        self.make(edits.type_into(Cell(stack, row, column), text))

    @rule(cell=PLACES, text=TEXTS)
    def type_elsewhere(self, cell: Cell, text: str) -> None:
        """Type something good or bad into a cell of a stack, a material or the job."""
        self.make(edits.type_into(cell, text))

    @rule(stack=STACKS, row=ROWS, millimetres=st.floats(-1, 30))
    def drag(self, stack: int, row: int, millimetres: float) -> None:
        """Drag a face a bit further."""
        self.make(edits.set_thickness(stack, row, millimetres * 1e-3, merge_key=f"drag {stack} {row}"))

    @rule()
    def let_go(self) -> None:
        """End a drag."""
        self.session.end_merge()
        self.open_key = None

    @rule(stack=STACKS, rows=SOME_ROWS, before=ROWS)
    def move(self, stack: int, rows: set[int], before: int) -> None:
        """Move a block."""
        self.make(edits.move(stack, rows, before))

    @rule(stack=STACKS, rows=SOME_ROWS)
    def delete(self, stack: int, rows: set[int]) -> None:
        """Delete some elements."""
        self.make(edits.delete(stack, rows))

    @rule(stack=STACKS, rows=SOME_ROWS)
    def duplicate(self, stack: int, rows: set[int]) -> None:
        """Double some elements, while there are not too many."""
        if sum(len(one.elements) for one in self.session.record.stacks) < 20:
            self.make(edits.duplicate(stack, rows))

    @rule(stack=STACKS, row=ROWS, name=NAMES)
    def add(self, stack: int, row: int, name: str) -> None:
        """Add a layer."""
        self.make(edits.add_layer(stack, row, name, parse_measure("1 mm", Dimension.LENGTH)))

    @rule(stack=STACKS, row=ROWS)
    def add_sheet(self, stack: int, row: int) -> None:
        """Add a sheet."""
        self.make(edits.add_sheet(stack, row))

    @rule(stack=STACKS, row=ROWS, name=NAMES)
    def change_material(self, stack: int, row: int, name: str) -> None:
        """Make a layer of something else."""
        self.make(edits.change_material(stack, row, name))

    @rule(name=NAMES, permittivity=st.sampled_from([2 + 0j, 3 - 0.1j, 0j, 2 + 1j]))
    def add_material(self, name: str, permittivity: complex) -> None:
        """Add a material, possible or not."""
        self.make(edits.add_material(MaterialRecord(name, model="constant", permittivity=permittivity)))

    @rule(name=NAMES, new=NAMES)
    def rename_material(self, name: str, new: str) -> None:
        """Rename a material."""
        self.make(edits.rename_material(name, new))

    @rule(name=NAMES)
    def remove_material(self, name: str) -> None:
        """Remove a material, used or not."""
        self.make(edits.remove_material(name))

    @rule(start=st.integers(1, 20), stop=st.integers(1, 20), points=st.integers(0, 20))
    def sweep(self, start: int, stop: int, points: int) -> None:
        """Set a grid, possible or not."""
        self.make(edits.set_frequency_grid(f"{start} GHz", f"{stop} GHz", points))

    @rule(stack=STACKS, what=st.sampled_from(["add", "duplicate", "delete", "rename"]))
    def stacks(self, stack: int, what: str) -> None:
        """Work on whole stacks, while there are not too many."""
        if what == "delete":
            self.make(edits.delete_stack(stack))
        elif what == "rename":
            self.make(edits.rename_stack(stack, "C"))
        elif len(self.session.record.stacks) < 4:
            self.make(edits.add_stack() if what == "add" else edits.duplicate_stack(stack))

    @rule(stack=STACKS, rows=SOME_ROWS)
    def select(self, stack: int, rows: set[int]) -> None:
        """Select something, which is no step."""
        self.session.select(Selection(stack, tuple(rows)))

    @precondition(lambda self: len(self.done) > 1)
    @rule()
    def undo(self) -> None:
        """Go back one step."""
        self.session.undo()
        self.undone.append(self.done.pop())
        self.open_key = None

    @precondition(lambda self: self.undone)
    @rule()
    def redo(self) -> None:
        """Go forward one step."""
        self.session.redo()
        self.done.append(self.undone.pop())
        self.open_key = None

    @rule()
    def there_and_back(self) -> None:
        """Undo to the start gives the very job of the start; redo to the end the very document of now."""
        now = self.session.document
        count = len(self.done)
        for _ in range(count - 1):
            self.session.undo()
        assert self.session.job is self.first
        assert not self.session.modified
        assert self.session.undo_sentence == ""
        for document in self.done[1:]:
            self.session.redo()
            assert self.session.document is document
        assert self.session.document is now
        if count > 1:
            self.open_key = None

    @invariant()
    def in_step_with_the_model(self) -> None:
        """The document is the one the model kept, and it is modified exactly when its job is another."""
        session = self.session
        assert session.document == self.done[-1]
        assert bool(session.undo_sentence) == (len(self.done) > 1)
        assert bool(session.redo_sentence) == bool(self.undone)
        assert session.modified == (session.record != self.first.record)

    @invariant()
    def whole(self) -> None:
        """The job resolves, drafts stand at cells there are and once each, and the selection exists."""
        session = self.session
        assert Job(session.record) == session.job
        cells = [draft.cell for draft in session.document.drafts]
        assert len(set(cells)) == len(cells)
        for draft in session.document.drafts:
            self.check_draft(draft)
        assert session.selection == session.selection.within(session.record)

    def check_draft(self, draft: Draft) -> None:
        """The draft is shown in its place, with a fault that names the place, and is not the value."""
        check_cell(self.session.record, draft.cell)
        assert shown_text(self.session.document, draft.cell) == draft.text
        assert draft.fault.path == draft.cell.path
        assert draft.text != value_text(self.session.record, draft.cell)

    @rule()
    def save_and_read(self) -> None:
        """What a file would hold reads back to the same record."""
        assert job_from_json(job_to_json(self.session.record)) == self.session.record

    def teardown(self) -> None:
        """Save at the end: the file is the job, and nothing is modified."""
        with TemporaryDirectory() as folder:
            self.session.save(Path(folder) / "end.slabjob")
        assert not self.session.modified


Work.TestCase.settings = settings(max_examples=100, stateful_step_count=50)
TestWork = Work.TestCase


def test_a_sheet_and_a_layer_have_their_own_cells() -> None:
    """Each element shows the texts of its own columns, and an absent part shows nothing."""
    session: Session = harbour()
    for row, element in enumerate(session.record.stacks[0].elements):
        assert isinstance(element, LayerRecord | SheetRecord)
        columns = ("thickness",) if isinstance(element, LayerRecord) else ("resistance", "inductance")
        texts = [value_text(session.record, Cell(0, row, column)) for column in columns]
        assert texts == {0: ["0.9 mm"], 1: ["1/4 in"], 2: ["377 ohm/sq", ""], 3: ["0.001"]}[row]
