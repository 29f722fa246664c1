"""Random work on a document: whatever was done, undo leads to the start and redo to the end."""

from collections.abc import Callable
from pathlib import Path
from tempfile import TemporaryDirectory

from hypothesis import settings
from hypothesis import strategies as st
from hypothesis.stateful import RuleBasedStateMachine, initialize, invariant, precondition, rule

from app.document import edits
from app.document.cells import check_cell, value_text
from app.document.document import Cell, Document, Draft, Selection, job_cell, material_cell
from app.document.session import Session
from stackcore.job import Job, job_from_json, job_to_json
from stackcore.job.records import LayerRecord, MaterialRecord, SheetRecord
from stackcore.units import Dimension, parse_measure
from tests.app.document.jobs import Clock, harbour

ANY = st.integers(0, 11)
SOME = st.sets(ANY, min_size=1, max_size=3)
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

Texts = dict[str, str]
"""Column -> text of the draft there."""


def drafts_by_row(document: Document) -> list[list[Texts]]:
    """Return the drafts of each element of each stack."""
    return [
        [
            {
                draft.cell.column: draft.text
                for draft in document.drafts
                if (draft.cell.stack, draft.cell.row) == place
            }
            for place in ((number, row) for row in range(len(stack.elements)))
        ]
        for number, stack in enumerate(document.record.stacks)
    ]


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

    def make(self, edit: edits.Edit) -> bool:
        """Apply `edit`, with a rest before it so that only a drag merges; return whether it did something."""
        self.clock.now += 10.0
        merges = edit.merge_key is not None and edit.merge_key == self.open_key
        before = self.session.document
        faults = self.session.apply(edit)
        after = self.session.document
        if faults:
            assert after is before
        if after is before or after == before:
            return False
        self.undone.clear()
        if merges:
            self.done.pop()
        self.done.append(after)
        self.open_key = edit.merge_key if isinstance(edit.merge_key, str) else None
        if len(self.done) > 1 and self.done[-1] == self.done[-2]:
            self.done.pop()
        return True

    # Numbers are drawn freely and brought among those there are, with one beyond the end now and then.

    def stack(self, any_number: int) -> int:
        """Return the index of a stack, mostly one there is."""
        return any_number % len(self.session.record.stacks) if any_number < 11 else any_number

    def row(self, stack: int, any_number: int) -> int:
        """Return the index of a row, mostly one there is."""
        rows = self.rows(stack)
        return any_number % rows if rows and any_number < 11 else any_number

    def rows(self, stack: int) -> int:
        """Return how many elements a stack has."""
        stacks = self.session.record.stacks
        return len(stacks[stack].elements) if stack < len(stacks) else 0

    def rearrange(self, edit: edits.Edit, stack: int, order: Callable[[list[Texts]], list[Texts]]) -> None:
        """Apply an edit that moves rows about, and see that drafts went along as a plain list would take them."""
        before = drafts_by_row(self.session.document)
        if self.make(edit):
            before[stack] = order(before[stack])
            assert drafts_by_row(self.session.document) == before

    @rule(any_stack=ANY, any_row=ANY, column=COLUMNS, text=TEXTS)
    def type_into_element(self, any_stack: int, any_row: int, column: str, text: str) -> None:
        """Type something good or bad into a cell, which a sheet or a layer may not have."""
        stack = self.stack(any_stack)
        self.make(edits.type_into(Cell(stack, self.row(stack, any_row), column), text))

    @rule(any_stack=ANY, any_row=ANY, text=st.sampled_from(["bad", "-1 mm", "2 mm", "50 ohm"]))
    def type_into_the_right_column(self, any_stack: int, any_row: int, text: str) -> None:
        """Type into the cell that the element has for certain."""
        stack = self.stack(any_stack)
        row = self.row(stack, any_row)
        if row < self.rows(stack):
            element = self.session.record.stacks[stack].elements[row]
            column = "thickness" if isinstance(element, LayerRecord) else "resistance"
            self.make(edits.type_into(Cell(stack, row, column), text))

    @rule(cell=PLACES, text=TEXTS)
    def type_elsewhere(self, cell: Cell, text: str) -> None:
        """Type something good or bad into a cell of a stack, a material or the job."""
        self.make(edits.type_into(cell, text))

    @rule(any_stack=ANY, any_row=ANY, millimetres=st.sampled_from([-1.0, 0.9, 1.0, 2.34567, 30.0]))
    def drag(self, any_stack: int, any_row: int, millimetres: float) -> None:
        """Drag a face a bit further."""
        stack = self.stack(any_stack)
        self.make(edits.set_thickness(stack, self.row(stack, any_row), millimetres * 1e-3, merge_key="drag"))

    @rule()
    def let_go(self) -> None:
        """End a drag."""
        self.session.end_merge()
        self.open_key = None

    @rule(any_stack=ANY, some=SOME, before=ANY)
    def move(self, any_stack: int, some: set[int], before: int) -> None:
        """Move a block."""
        stack = self.stack(any_stack)
        rows = {self.row(stack, number) for number in some}
        before = before % (self.rows(stack) + 1)

        def order(old: list[Texts]) -> list[Texts]:
            front = [texts for row, texts in enumerate(old) if row < before and row not in rows]
            back = [texts for row, texts in enumerate(old) if row >= before and row not in rows]
            return front + [old[row] for row in sorted(rows)] + back

        self.rearrange(edits.move(stack, rows, before), stack, order)

    @rule(any_stack=ANY, some=SOME)
    def delete(self, any_stack: int, some: set[int]) -> None:
        """Delete some elements."""
        stack = self.stack(any_stack)
        rows = {self.row(stack, number) for number in some}
        self.rearrange(
            edits.delete(stack, rows),
            stack,
            lambda old: [texts for row, texts in enumerate(old) if row not in rows],
        )

    @rule(any_stack=ANY, some=SOME)
    def duplicate(self, any_stack: int, some: set[int]) -> None:
        """Double some elements, while there are not too many."""
        stack = self.stack(any_stack)
        rows = sorted({self.row(stack, number) for number in some})
        if self.rows(stack) < 8:
            self.rearrange(
                edits.duplicate(stack, rows),
                stack,
                lambda old: old[: rows[-1] + 1] + [old[row] for row in rows] + old[rows[-1] + 1 :],
            )

    @rule(any_stack=ANY, any_row=ANY, name=NAMES)
    def add(self, any_stack: int, any_row: int, name: str) -> None:
        """Add a layer."""
        stack = self.stack(any_stack)
        row = any_row % (self.rows(stack) + 2)
        self.make(edits.add_layer(stack, row, name, parse_measure("1 mm", Dimension.LENGTH)))

    @rule(any_stack=ANY, any_row=ANY)
    def add_sheet(self, any_stack: int, any_row: int) -> None:
        """Add a sheet."""
        stack = self.stack(any_stack)
        row = any_row % (self.rows(stack) + 1)
        self.rearrange(edits.add_sheet(stack, row), stack, lambda old: [*old[:row], {}, *old[row:]])

    @rule(any_stack=ANY, any_row=ANY, name=NAMES)
    def change_material(self, any_stack: int, any_row: int, name: str) -> None:
        """Make a layer of something else."""
        stack = self.stack(any_stack)
        self.make(edits.change_material(stack, self.row(stack, any_row), name))

    @rule(name=NAMES, permittivity=st.sampled_from([2 + 0j, 3 - 0.1j, 0j, 2 + 1j]))
    def add_material(self, name: str, permittivity: complex) -> None:
        """Add a material, possible or not."""
        self.make(
            edits.add_material(MaterialRecord(name, model="constant", constants={"permittivity": permittivity}))
        )

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

    @rule(any_stack=ANY, what=st.sampled_from(["add", "duplicate", "delete", "rename"]))
    def stacks(self, any_stack: int, what: str) -> None:
        """Work on whole stacks, while there are not too many; drafts go with their stack."""
        stack = self.stack(any_stack)
        before = drafts_by_row(self.session.document)
        if what == "delete":
            if self.make(edits.delete_stack(stack)):
                assert drafts_by_row(self.session.document) == before[:stack] + before[stack + 1 :]
        elif what == "rename":
            self.make(edits.rename_stack(stack, "C"))
        elif what == "add" and len(before) < 4:
            self.make(edits.add_stack())
            assert drafts_by_row(self.session.document) == [*before, []]
        elif len(before) < 4 and self.make(edits.duplicate_stack(stack)):
            assert drafts_by_row(self.session.document) == before[: stack + 1] + before[stack:]

    @rule(stack=ANY, rows=SOME)
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
        """The draft's cell exists, its fault names the place, and its text is not the value's."""
        check_cell(self.session.record, draft.cell)
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


Work.TestCase.settings = settings(max_examples=60, stateful_step_count=50)
TestWork = Work.TestCase


def test_a_sheet_and_a_layer_have_their_own_cells() -> None:
    """Each element shows the texts of its own columns, and an absent part shows nothing."""
    session: Session = harbour()
    for row, element in enumerate(session.record.stacks[0].elements):
        assert isinstance(element, LayerRecord | SheetRecord)
        columns = ("thickness",) if isinstance(element, LayerRecord) else ("resistance", "inductance")
        texts = [value_text(session.record, Cell(0, row, column)) for column in columns]
        assert texts == {0: ["0.9 mm"], 1: ["1/4 in"], 2: ["377 ohm/sq", ""], 3: ["0.001"]}[row]
