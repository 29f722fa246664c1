"""Edits of how a stack is built up: groups, mirror, reverse, fill down, what is computed and what is held."""

from collections.abc import Callable, Iterable, Sequence
from dataclasses import replace

from app.document.document import Cell, Document, Selection
from app.document.edit import (
    Edit,
    element_at,
    follow_rows,
    refuse,
    stack_at,
    with_record,
    with_stack,
    without_draft,
)
from app.document.element_edits import with_rows
from app.document.typed import type_into
from stackcore.job.groups import group_of
from stackcore.job.limits import MOST_REPEATS
from stackcore.job.records import ElementRecord, Group, LayerRecord, StackRecord


def set_enabled(stack: int, rows: Iterable[int], on: bool) -> Edit:
    """Return the edit that computes elements, or leaves them out while they stay in the list."""
    chosen = _ascending(rows)

    def changed(element: ElementRecord) -> ElementRecord:
        return replace(element, enabled=on)

    return Edit(f"{'use' if on else 'leave out'} {_words(chosen)}", _each(stack, chosen, changed))


def set_locked(stack: int, rows: Iterable[int], on: bool) -> Edit:
    """Return the edit that holds the thickness of elements, or lets it go."""
    chosen = _ascending(rows)

    def changed(element: ElementRecord) -> ElementRecord:
        return replace(element, locked=on)

    return Edit(f"{'lock' if on else 'unlock'} {_words(chosen)}", _each(stack, chosen, changed))


def group_rows(stack: int, rows: Iterable[int], repeat: int = 2) -> Edit:
    """Return the edit that repeats neighbouring elements as a whole.

    Every row between the first and the last belongs to the group. Refused where a row is in a group already: there
    are no groups within groups, and a count that stands must not be lost.
    """
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        if not chosen:
            raise refuse(f"stacks[{stack}]", "no element is chosen", "select neighbouring elements first")
        if not 1 <= repeat <= MOST_REPEATS:
            raise refuse(f"stacks[{stack}]", f"{repeat} repetitions", f"a whole number from 1 to {MOST_REPEATS}")
        for row in chosen:
            element_at(document.record, stack, row)
        old = stack_at(document.record, stack)
        new = Group(chosen[0], chosen[-1], repeat)
        there = next((one for one in old.groups if one.last >= new.first and one.first <= new.last), None)
        if there is not None:
            where = f"rows {there.first + 1} to {there.last + 1} are repeated {there.repeat} times already"
            raise refuse(f"stacks[{stack}]", where, "type the count under Times, or end that group")
        groups = tuple(sorted((*old.groups, new), key=lambda group: group.first))
        return with_record(document, with_stack(document.record, stack, replace(old, groups=groups)))

    what = f"elements {chosen[0] + 1} to {chosen[-1] + 1}" if chosen else "nothing"
    return Edit(f"repeat {what} {repeat} times", change, Selection(stack, chosen))


def set_repeat(stack: int, row: int, repeat: int) -> Edit:
    """Return the edit that repeats the group at a row so many times."""

    def change(document: Document) -> Document:
        if group_of(stack_at(document.record, stack), row) is None:
            raise refuse(f"stacks[{stack}].elements[{row}]", "this element is in no group", "group it first")
        return type_into(Cell(stack, row, "repeat"), str(repeat)).change(document)

    return Edit(f"repeat the group {repeat} times", change, merge_key=("repeat", stack, row))


def ungroup(stack: int, rows: Iterable[int], *, written_out: bool = False) -> Edit:
    """Return the edit that ends the groups of elements: once each, or written out as often as repeated."""
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        old = stack_at(document.record, stack)
        ended = {group for row in chosen if (group := group_of(old, row)) is not None}
        if not ended:
            raise refuse(f"stacks[{stack}]", "there is no group here", "select elements of a group")
        kept = tuple(group for group in old.groups if group not in ended)
        if not written_out:
            return with_record(document, with_stack(document.record, stack, replace(old, groups=kept)))
        origins = list(range(len(old.elements)))
        for group in sorted(ended, key=lambda one: -one.first):
            inside = list(range(group.first, group.last + 1))
            place = origins.index(group.first)
            origins[place : place + len(inside)] = inside * group.repeat
        plain = with_stack(document.record, stack, replace(old, groups=kept))
        return with_rows(Document(with_record(document, plain).job, document.drafts), stack, origins)

    return Edit("write out the group" if written_out else "end the group", change)


def reverse(stack: int, rows: Iterable[int] = ()) -> Edit:
    """Return the edit that turns elements round: those between the first and last chosen, or the whole stack.

    Of the whole stack the half-spaces change places as well, unless the back is metal, which nothing comes from.
    """
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        old = stack_at(document.record, stack)
        count = len(old.elements)
        part = range(chosen[0], chosen[-1] + 1) if chosen else range(count)
        for row in chosen:
            element_at(document.record, stack, row)
        _whole_groups(old, part, stack)
        origins = [*range(part.start), *reversed(part), *range(part.stop, count)]
        document = with_rows(document, stack, origins)
        if chosen or old.back == "metal":
            return document
        turned = replace(stack_at(document.record, stack), front=old.back, back=old.front)
        return with_record(document, with_stack(document.record, stack, turned))

    what = f"elements {chosen[0] + 1} to {chosen[-1] + 1}" if chosen else "stack"
    return Edit(f"reverse {what}", change, Selection(stack, tuple(chosen)))


def mirror(stack: int, rows: Iterable[int] = ()) -> Edit:
    """Return the edit that makes elements symmetric about the last of them, which stays single.

    Those between the first and last chosen, or the whole stack: 1 2 3 becomes 1 2 3 2 1.
    """
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        old = stack_at(document.record, stack)
        count = len(old.elements)
        part = range(chosen[0], chosen[-1] + 1) if chosen else range(count)
        for row in chosen:
            element_at(document.record, stack, row)
        if len(part) < 2:
            raise refuse(f"stacks[{stack}]", "one element has nothing to mirror", "two elements or more")
        _whole_groups(old, part, stack)
        origins = [*range(part.stop), *reversed(range(part.start, part.stop - 1)), *range(part.stop, count)]
        group = group_of(old, part.stop - 1)
        if group is not None:  # the group in the middle stays single as a whole
            origins = [*range(part.stop), *reversed(range(part.start, group.first)), *range(part.stop, count)]
        return with_rows(document, stack, origins)

    what = f"elements {chosen[0] + 1} to {chosen[-1] + 1}" if chosen else "stack"
    return Edit(f"mirror {what}", change, Selection(stack, tuple(chosen)))


def fill_down(stack: int, rows: Iterable[int], column: str) -> Edit:
    """Return the edit that gives the other chosen elements what the first of them has in a column."""
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        if len(chosen) < 2:
            raise refuse(f"stacks[{stack}]", "there is nothing below to fill", "select two elements or more")
        first = element_at(document.record, stack, chosen[0])
        draft = document.draft(Cell(stack, chosen[0], column))
        text = draft.text if draft is not None else _text(first, column)
        for row in chosen[1:]:
            element = element_at(document.record, stack, row)
            if isinstance(element, LayerRecord) == isinstance(first, LayerRecord):
                document = type_into(Cell(stack, row, column), text).change(document)
        return document

    return Edit(f"fill {column} down {len(chosen)} rows", change)


def fill_elements(stack: int, rows: Iterable[int]) -> Edit:
    """Return the edit that gives the other chosen elements what the first of them is made of, in one step.

    Layers get its material and thickness, with texts that have no value yet; sheets get all its parts, so that a
    film stays one. Elements of the other kind, and what is left out or locked, stay as they are.
    """
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        if len(chosen) < 2:
            raise refuse(f"stacks[{stack}]", "there is nothing below to fill", "select two elements or more")
        first = element_at(document.record, stack, chosen[0])
        if isinstance(first, LayerRecord):
            return fill_columns(stack, chosen, ("material", "thickness")).change(document)

        def changed(element: ElementRecord) -> ElementRecord:
            if isinstance(element, LayerRecord):
                return element
            return replace(first, enabled=element.enabled, locked=element.locked)

        cells = [draft.cell for draft in document.drafts if draft.cell.stack == stack]
        gone = [cell for cell in cells if cell.row in chosen[1:]]
        filled = _each(stack, chosen[1:], changed)(document)
        return Document(filled.job, without_draft(filled.drafts, *gone))

    return Edit(f"fill down {len(chosen)} rows", change)


def fill_columns(stack: int, rows: Iterable[int], columns: Sequence[str]) -> Edit:
    """Return the edit that fills several columns down in one step."""
    chosen = _ascending(rows)

    def change(document: Document) -> Document:
        for column in columns:
            document = fill_down(stack, chosen, column).change(document)
        return document

    return Edit(f"fill down {len(chosen)} rows", change)


def _text(element: ElementRecord, column: str) -> str:
    value = getattr(element, column, "")
    return str(getattr(value, "text", value if value is not None else ""))


def _each(
    stack: int, rows: Sequence[int], changed: Callable[[ElementRecord], ElementRecord]
) -> Callable[[Document], Document]:
    def change(document: Document) -> Document:
        old = stack_at(document.record, stack)
        for row in rows:
            element_at(document.record, stack, row)
        elements = tuple(changed(one) if row in rows else one for row, one in enumerate(old.elements))
        record = with_stack(document.record, stack, replace(old, elements=elements))
        return with_record(document, record, follow_rows(document.drafts, stack, range(len(elements))))

    return change


def _holds(outer: Group, inner: Group) -> bool:
    return outer.first <= inner.first and inner.last <= outer.last


def _whole_groups(stack: StackRecord, part: range, place: int) -> None:
    """Refuse a part that cuts a group."""
    for group in stack.groups:
        inside = [row for row in range(group.first, group.last + 1) if row in part]
        if (
            inside
            and len(inside) <= group.last - group.first
            and not _holds(group, Group(part.start, part.stop - 1, 1))
        ):
            where = f"rows {group.first + 1} to {group.last + 1}"
            raise refuse(f"stacks[{place}]", f"this would cut the group of {where}", "all of it, or none")


def _ascending(rows: Iterable[int]) -> tuple[int, ...]:
    return tuple(sorted(set(rows)))


def _words(rows: Sequence[int]) -> str:
    return f"element {rows[0] + 1}" if len(rows) == 1 else f"{len(rows)} elements"
