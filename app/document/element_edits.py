"""Edits of the elements of a stack: add, remove, rearrange, and set one value."""

from collections.abc import Hashable, Iterable, Sequence
from dataclasses import replace
from math import isfinite
from typing import Final

from app.document.document import Cell, Document, Selection
from app.document.edit import (
    Edit,
    element_at,
    follow_rows,
    refuse,
    stack_at,
    with_element,
    with_record,
    with_stack,
    without_draft,
)
from app.document.library import with_material
from stackcore.job.groups import rearranged
from stackcore.job.records import ElementRecord, JobRecord, LayerRecord, SheetRecord
from stackcore.units import Dimension, Measure, format_value, measure, parse_measure

DRAG_DIGITS: Final = 3
"""Significant digits of a dragged thickness: steps of a thousandth to a hundredth, and a text that reads well."""

NEW_SHEET: Final = SheetRecord("series", resistance=parse_measure("377 ohm/sq", Dimension.RESISTANCE))
"""A new sheet: the resistance of free space, rounded as the trade does."""


def set_thickness(stack: int, row: int, metres: float, *, merge_key: Hashable | None = None) -> Edit:
    """Return the edit for a dragged face: `metres` rounded to `DRAG_DIGITS`, 0 when dragged beyond the other face.

    Examples
    --------
    >>> set_thickness(0, 1, 0.00090049).sentence
    'set thickness of layer 2 to 0.9 mm'
    """
    value = float(f"{max(metres, 0.0):.{DRAG_DIGITS}g}") if isfinite(metres) else metres
    text = format_value(value, Dimension.LENGTH)

    def change(document: Document) -> Document:
        cell = Cell(stack, row, "thickness")
        element = element_at(document.record, stack, row)
        if not isinstance(element, LayerRecord):
            raise refuse(cell.path, "a sheet has no thickness", "a layer")
        if element.locked:
            raise refuse(cell.path, "the thickness is locked", "unlock it first, or type the thickness")
        if not isfinite(value):
            raise refuse(cell.path, f"{text} is not a thickness", "0 or more, for example 2 mm")
        layer = replace(element, thickness=measure(value, Dimension.LENGTH))
        record = with_element(document.record, stack, row, layer)
        return with_record(document, record, without_draft(document.drafts, cell))

    return Edit(f"set thickness of layer {row + 1} to {text}", change, merge_key=merge_key)


def change_material(stack: int, row: int, name: str) -> Edit:
    """Return the edit that makes a layer of `name`: a material of the job, or a key of the library."""

    def change(document: Document) -> Document:
        cell = Cell(stack, row, "material")
        element = element_at(document.record, stack, row)
        if not isinstance(element, LayerRecord):
            raise refuse(cell.path, "a sheet has no material", "a layer")
        record, found = with_material(document.record, name)
        record = with_element(record, stack, row, replace(element, material=found))
        return with_record(document, record, without_draft(document.drafts, cell))

    return Edit(f"set material of layer {row + 1} to {name}", change)


def add_layer(stack: int, row: int, material: str, thickness: Measure) -> Edit:
    """Return the edit that puts a new layer before `row` (the number of elements: at the end).

    `material` is a material of the job or a key of the library.
    """

    def change(document: Document) -> Document:
        record, found = with_material(document.record, material)
        return with_inserted(document, record, stack, row, (LayerRecord(found, thickness),))

    return Edit(f"add layer of {material}", change, Selection(stack, (row,)))


def add_sheet(stack: int, row: int, sheet: SheetRecord = NEW_SHEET) -> Edit:
    """Return the edit that puts a new sheet before `row` (the number of elements: at the end)."""

    def change(document: Document) -> Document:
        return with_inserted(document, document.record, stack, row, (sheet,))

    return Edit("add sheet", change, Selection(stack, (row,)))


def delete(stack: int, rows: Iterable[int]) -> Edit:
    """Return the edit that deletes elements; the row that takes their place is selected."""
    gone = _ascending(rows)

    def change(document: Document) -> Document:
        origins = _origins(document.record, stack, gone)
        return with_rows(document, stack, [row for row in origins if row not in gone])

    return Edit(f"delete {_words(gone)}", change, Selection(stack, gone[:1]))


def duplicate(stack: int, rows: Iterable[int]) -> Edit:
    """Return the edit that puts copies of elements, as one block, behind the last of them and selects them."""
    copied = _ascending(rows)
    behind = copied[-1] + 1 if copied else 0

    def change(document: Document) -> Document:
        origins = _origins(document.record, stack, copied)
        return with_rows(document, stack, [*origins[:behind], *copied, *origins[behind:]])

    selected = tuple(range(behind, behind + len(copied)))
    return Edit(f"duplicate {_words(copied)}", change, Selection(stack, selected))


def move(stack: int, rows: Iterable[int], before_row: int) -> Edit:
    """Return the edit that moves elements, as one block in their order, to before the element at `before_row`.

    `before_row` counts before the move; the number of elements means the end. The block is selected.
    """
    moved = _ascending(rows)
    start = before_row - sum(row < before_row for row in moved)

    def change(document: Document) -> Document:
        origins = _origins(document.record, stack, moved)
        if not 0 <= before_row <= len(origins):
            raise refuse(f"stacks[{stack}]", f"no place before element {before_row}", f"0 to {len(origins)}")
        rest = [row for row in origins if row not in moved]
        return with_rows(document, stack, [*rest[:start], *moved, *rest[start:]])

    selected = tuple(range(start, start + len(moved)))
    return Edit(f"move {_words(moved)}", change, Selection(stack, selected))


def with_inserted(
    document: Document, record: JobRecord, stack: int, row: int, new: tuple[ElementRecord, ...]
) -> Document:
    """Return the document of `record` with new elements before `row` of a stack; drafts follow their rows."""
    old = stack_at(record, stack)
    count = len(old.elements)
    if not 0 <= row <= count:
        raise refuse(f"stacks[{stack}]", f"no place before element {row}", f"0 to {count}")
    elements = (*old.elements[:row], *new, *old.elements[row:])
    origins = [*range(row), *(None for _ in new), *range(row, count)]
    groups = rearranged(old.groups, origins)
    record = with_stack(record, stack, replace(old, elements=elements, groups=groups))
    return with_record(document, record, follow_rows(document.drafts, stack, origins))


def with_rows(document: Document, stack: int, origins: Sequence[int]) -> Document:
    """Return the document in which each row of a stack is the one `origins` names; groups follow their rows."""
    old = stack_at(document.record, stack)
    elements = tuple(old.elements[row] for row in origins)
    groups = rearranged(old.groups, origins)
    record = with_stack(document.record, stack, replace(old, elements=elements, groups=groups))
    return with_record(document, record, follow_rows(document.drafts, stack, origins))


def _origins(record: JobRecord, stack: int, rows: tuple[int, ...]) -> list[int]:
    """Return the rows of a stack as they are, after a look that `rows` are among them."""
    for row in rows:
        element_at(record, stack, row)
    return list(range(len(stack_at(record, stack).elements)))


def _ascending(rows: Iterable[int]) -> tuple[int, ...]:
    return tuple(sorted(set(rows)))


def _words(rows: tuple[int, ...]) -> str:
    return f"element {rows[0] + 1}" if len(rows) == 1 else f"{len(rows)} elements"
