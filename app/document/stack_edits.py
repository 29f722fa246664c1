"""Edits of whole stacks: the half-spaces, the name, and the list of stacks."""

import string
from dataclasses import replace
from itertools import count
from typing import Literal

from app.document.document import Cell, Document, Selection
from app.document.edit import Edit, follow_stacks, refuse, stack_at, with_record, with_stack, without_draft
from app.document.library import free_name, with_material
from stackcore.job.records import JobRecord, StackRecord


def set_front(stack: int, name: str) -> Edit:
    """Return the edit that fills the front half-space with a material of the job or a library key."""
    return _set_half_space(stack, "front", name)


def set_back(stack: int, name: str) -> Edit:
    """Return the edit that fills the back half-space likewise; ``metal`` is a perfect conductor."""
    return _set_half_space(stack, "back", name)


def rename_stack(stack: int, name: str) -> Edit:
    """Return the edit that renames a stack; two stacks cannot have one name."""

    def change(document: Document) -> Document:
        renamed = replace(stack_at(document.record, stack), name=name.strip())
        cell = Cell(stack, -1, "name")
        others = [other.name for place, other in enumerate(document.record.stacks) if place != stack]
        if not renamed.name or renamed.name in others:
            what = "is taken" if renamed.name else "is no name"
            raise refuse(
                cell.path, f"{renamed.name!r} {what}", f"a name other than {', '.join(others) or 'nothing'}"
            )
        record = with_stack(document.record, stack, renamed)
        return with_record(document, record, without_draft(document.drafts, cell))

    return Edit(f"rename stack to {name.strip()}", change)


def add_stack(name: str | None = None) -> Edit:
    """Return the edit that adds an empty stack in air at the end and selects it; without `name` the next letter."""

    def change(document: Document) -> Document:
        stacks = document.record.stacks
        added = StackRecord(name if name is not None else _next_letter(document.record))
        return with_record(document, replace(document.record, stacks=(*stacks, added)))

    return Edit("add stack", change, lambda after: Selection(len(after.record.stacks) - 1))


def duplicate_stack(stack: int) -> Edit:
    """Return the edit that puts a copy of a stack behind it, and selects it.

    The copy of a stack called by a letter has the next free letter, that of another the same name with a number.
    """

    def change(document: Document) -> Document:
        origin = stack_at(document.record, stack)
        copy = replace(origin, name=_name_of_copy(document.record, origin.name))
        stacks = document.record.stacks
        record = replace(document.record, stacks=(*stacks[: stack + 1], copy, *stacks[stack + 1 :]))
        origins = [*range(stack + 1), *range(stack, len(stacks))]
        return with_record(document, record, follow_stacks(document.drafts, origins))

    return Edit("duplicate stack", change, Selection(stack + 1))


def delete_stack(stack: int) -> Edit:
    """Return the edit that deletes a stack; the last one stays."""

    def change(document: Document) -> Document:
        stack_at(document.record, stack)
        stacks = document.record.stacks
        if len(stacks) == 1:
            raise refuse("stacks", "the only stack cannot be deleted", "delete its elements, or add a stack first")
        origins = [place for place in range(len(stacks)) if place != stack]
        record = replace(document.record, stacks=tuple(stacks[place] for place in origins))
        return with_record(document, record, follow_stacks(document.drafts, origins))

    return Edit("delete stack", change, Selection(stack))


def _set_half_space(stack: int, side: Literal["front", "back"], name: str) -> Edit:
    def change(document: Document) -> Document:
        record, found = with_material(document.record, name)
        old = stack_at(record, stack)
        changed = replace(old, front=found) if side == "front" else replace(old, back=found)
        drafts = without_draft(document.drafts, Cell(stack, -1, side))
        return with_record(document, with_stack(record, stack, changed), drafts)

    return Edit(f"set {side} to {name}", change)


def _name_of_copy(record: JobRecord, name: str) -> str:
    if len(name) == 1 and name in string.ascii_uppercase:
        return _next_letter(record)
    taken = [stack.name for stack in record.stacks]
    words, _, number = name.rpartition(" ")
    stem = words if words and number.isdecimal() else name
    return next(copy for number in count(2) if (copy := f"{stem} {number}") not in taken)


def _next_letter(record: JobRecord) -> str:
    taken = [stack.name for stack in record.stacks]
    free = (letter for letter in string.ascii_uppercase if letter not in taken)
    return next(free, None) or free_name("A", taken)
