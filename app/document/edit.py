"""What an edit is, and the small tools that all edits share."""

from collections.abc import Callable, Hashable, Iterable, Sequence
from dataclasses import dataclass, replace

from app.document.document import Cell, Document, Draft, Selection
from stackcore.errors import Fault, JobError
from stackcore.job import Job
from stackcore.job.plies import with_plies
from stackcore.job.records import ElementRecord, JobRecord, StackRecord

Select = Selection | Callable[[Document], Selection]


@dataclass(frozen=True, slots=True)
class Edit:
    """One change a person can make, undo and read about.

    Parameters
    ----------
    sentence
        Reads after "Undo" in a menu: ``set thickness of layer 2 to 0.9 mm``.
    change
        Takes the document of now and returns the one to be; pure. Raises an `InputError` with every fault to
        refuse, and returns the document itself when there is nothing to do.
    select
        What is selected afterwards, or how to find it in the new document; None keeps the selection.
    merge_key
        Steps with equal keys become one (see `app.document.history`); None never merges.
    words
        Gives the sentence from the new document, where that says more than what was asked for.
    """

    sentence: str
    change: Callable[[Document], Document]
    select: Select | None = None
    merge_key: Hashable | None = None
    words: Callable[[Document], str] | None = None

    def sentence_of(self, after: Document) -> str:
        """Return the sentence of the edit that led to `after`."""
        return self.sentence if self.words is None else self.words(after)

    def selection(self, after: Document, now: Selection) -> Selection:
        """Return what is selected after the edit led to `after`, inside its stacks and rows."""
        wanted = now if self.select is None else self.select
        return (wanted(after) if callable(wanted) else wanted).within(after.record)


def with_record(document: Document, record: JobRecord, drafts: Iterable[Draft] | None = None) -> Document:
    """Return the document of `record`, resolved anew; raises JobError with every fault when it does not resolve."""
    kept = document.drafts if drafts is None else tuple(drafts)
    record = with_plies(record)
    job = document.job if record == document.record else Job(record)
    return Document(job, kept)


def refuse(path: str, message: str, allowed: str = "") -> JobError:
    """Return the error that refuses an edit with one fault."""
    return JobError([Fault(path, message, allowed)])


def stack_at(record: JobRecord, stack: int) -> StackRecord:
    """Return a stack of `record`; refuses an index that does not exist."""
    if not 0 <= stack < len(record.stacks):
        raise refuse(f"stacks[{stack}]", "there is no such stack", f"0 to {len(record.stacks) - 1}")
    return record.stacks[stack]


def element_at(record: JobRecord, stack: int, row: int) -> ElementRecord:
    """Return an element of `record`; refuses an index that does not exist."""
    elements = stack_at(record, stack).elements
    if not 0 <= row < len(elements):
        allowed = f"0 to {len(elements) - 1}" if elements else "the stack has no elements"
        raise refuse(f"stacks[{stack}].elements[{row}]", "there is no such element", allowed)
    return elements[row]


def with_stack(record: JobRecord, stack: int, changed: StackRecord) -> JobRecord:
    """Return `record` with `changed` in place of one stack."""
    stack_at(record, stack)
    return replace(record, stacks=(*record.stacks[:stack], changed, *record.stacks[stack + 1 :]))


def with_element(record: JobRecord, stack: int, row: int, element: ElementRecord) -> JobRecord:
    """Return `record` with `element` in place of one element."""
    element_at(record, stack, row)
    old = record.stacks[stack]
    elements = (*old.elements[:row], element, *old.elements[row + 1 :])
    return with_stack(record, stack, replace(old, elements=elements))


def without_draft(drafts: Iterable[Draft], *cells: Cell) -> tuple[Draft, ...]:
    """Return `drafts` but for those at `cells`."""
    return tuple(draft for draft in drafts if draft.cell not in cells)


def follow_rows(drafts: Iterable[Draft], stack: int, origins: Sequence[int | None]) -> tuple[Draft, ...]:
    """Return `drafts` after the rows of one stack were rearranged.

    Parameters
    ----------
    drafts
        Those of before.
    stack
        Index of the stack.
    origins
        For each row of now the row it came from, or None for a new one. A row that came twice brings its
        drafts twice; a row that is gone takes its drafts with it.
    """
    others, moving = _split(drafts, lambda cell: cell.stack == stack and cell.row >= 0)
    moved = (
        draft if draft.cell.row == row else draft.at(replace(draft.cell, row=row))
        for row, origin in enumerate(origins)
        for draft in moving
        if draft.cell.row == origin
    )
    return (*others, *moved)


def follow_stacks(drafts: Iterable[Draft], origins: Sequence[int | None]) -> tuple[Draft, ...]:
    """Return `drafts` after the stacks were rearranged; `origins` as in `follow_rows`."""
    others, moving = _split(drafts, lambda cell: not cell.of_job)
    moved = (
        draft if draft.cell.stack == stack else draft.at(replace(draft.cell, stack=stack))
        for stack, origin in enumerate(origins)
        for draft in moving
        if draft.cell.stack == origin
    )
    return (*others, *moved)


def _split(drafts: Iterable[Draft], moves: Callable[[Cell], bool]) -> tuple[list[Draft], list[Draft]]:
    others: list[Draft] = []
    moving: list[Draft] = []
    for draft in drafts:
        (moving if moves(draft.cell) else others).append(draft)
    return others, moving
