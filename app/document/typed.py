"""Typing into a cell: a good text becomes the value, a bad one stays as it was typed and says what is wrong."""

from dataclasses import replace
from typing import Final

from app.document.cells import check_cell, material_and_constant, place_words, value_text, with_text
from app.document.document import WHOLE_ROW, Cell, Document, Draft
from app.document.edit import Edit, with_record, without_draft
from app.document.history import Brief
from app.document.material_edits import rename_material
from app.document.stack_edits import rename_stack
from stackcore.errors import Fault, InputError, UnitError
from stackcore.job.limits import SHEET_PARTS

_LONGEST_QUOTE: Final = 40
_MEASURED: Final = (*SHEET_PARTS, "thickness", "sweep.frequency.start", "sweep.frequency.stop")


def type_into(cell: Cell, text: str) -> Edit:
    """Return the edit for a text typed into `cell`.

    A text that is a value, and with which the job resolves, becomes the value, and the cell's draft is gone.
    Any other text becomes the cell's draft, and the value stays the last good one. A bare number has the unit
    that the cell's value was written in.

    The edit is refused only when there is no such cell.

    Examples
    --------
    >>> type_into(Cell(0, 1, "thickness"), "0.9 mm").sentence
    'set thickness of layer 2 to 0.9 mm'
    """

    def change(document: Document) -> Document:
        check_cell(document.record, cell)
        taken = _taken(document, cell, text)
        if isinstance(taken, Document):
            return taken
        draft = Draft(cell, text, taken)
        return Document(document.job, (*without_draft(document.drafts, cell), draft))

    def words(after: Document) -> str:
        # A bare number gets the unit it was read in.
        measured = cell.column in _MEASURED and after.draft(cell) is None
        return _sentence(cell, value_text(after.record, cell) if measured else text)

    return Edit(_sentence(cell, text), change, merge_key=Brief(("type into", cell)), words=words)


def settle(document: Document) -> Document:
    """Return `document` with every draft tried again.

    A draft that the rest of the job had stood against (a material not defined, a start beyond the stop) becomes
    the value as soon as it can; one that still cannot says what is wrong now. One whose cell no longer exists is
    dropped.
    """
    waiting = list(document.drafts)
    while waiting:
        draft = waiting.pop(0)
        try:
            check_cell(document.record, draft.cell)
        except InputError:
            document = Document(document.job, without_draft(document.drafts, draft.cell))
            continue
        taken = _taken(document, draft.cell, draft.text)
        if isinstance(taken, Document):
            document = taken
            waiting = list(document.drafts)  # one that fits may make room for another
        elif taken != draft.fault:
            told = replace(draft, fault=taken)
            drafts = tuple(told if one is draft else one for one in document.drafts)
            document = Document(document.job, drafts)
    return document


def _taken(document: Document, cell: Cell, text: str) -> Document | Fault:
    """Return the document with the value of `text`, or why it cannot be the value."""
    try:
        return _accepted(document, cell, text)
    except UnitError as error:
        return Fault(cell.path, error.message, error.allowed)
    except InputError as error:
        own = [fault for fault in error.faults if fault.path.startswith(cell.path)]
        return replace((own or error.faults)[0], path=cell.path)


def _accepted(document: Document, cell: Cell, text: str) -> Document:
    cleared = Document(document.job, without_draft(document.drafts, cell))
    if cell.row == WHOLE_ROW and cell.column == "name":
        return rename_stack(cell.stack, text).change(cleared)
    if cell.column.startswith("material:") and cell.column.endswith(".name"):
        name, _ = material_and_constant(cell)
        return cleared if text.strip() == name else rename_material(name, text).change(cleared)
    return with_record(cleared, with_text(document.record, cell, text))


def _sentence(cell: Cell, text: str) -> str:
    text = " ".join(text.split())
    quoted = text if len(text) <= _LONGEST_QUOTE else f"{text[: _LONGEST_QUOTE - 1]}…"
    if cell.column == "notes":
        return "change notes"
    place = place_words(cell)
    return f"set {place} to {quoted}" if quoted else f"clear {place}"
