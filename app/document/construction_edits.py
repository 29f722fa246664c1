"""Edits that put a construction into the job: its materials from the library, its elements into a stack."""

from collections.abc import Mapping
from dataclasses import replace

from app.document.document import Document, Selection
from app.document.edit import Edit, refuse, stack_at, with_record, with_stack
from app.document.element_edits import with_inserted
from app.document.library import free_name, with_material
from stackcore.constructions import Built
from stackcore.job.records import ElementRecord, JobRecord, LayerRecord, StackRecord


def insert_construction(stack: int, row: int, label: str, built: Built) -> Edit:
    """Return the edit that puts the elements of a construction before `row` of a stack and selects them.

    A construction that needs something behind it, such as metal, gets it when it goes to the end of the stack; it
    is refused elsewhere, where it would not be what its rule says.
    """

    def change(document: Document) -> Document:
        record, elements = with_elements(document.record, built.elements)
        old = stack_at(record, stack)
        if built.back and row < len(old.elements):
            allowed = "put it at the end of the stack, or make a new stack of it"
            raise refuse(f"stacks[{stack}]", f"{label} needs {built.back} behind it", allowed)
        if built.back:
            record, back = with_material(record, built.back)
            record = with_stack(record, stack, replace(old, back=back))
        return with_inserted(document, record, stack, row, elements)

    rows = tuple(range(row, row + len(built.elements)))
    return Edit(f"insert {_lower(label)}", change, Selection(stack, rows))


def stack_of_construction(label: str, built: Built) -> Edit:
    """Return the edit that adds a stack in air made of a construction, called by its label, and selects it."""

    def change(document: Document) -> Document:
        record, elements = with_elements(document.record, built.elements)
        back = "air"
        if built.back:
            record, back = with_material(record, built.back)
        name = _free_stack_name(record, label)
        stacks = (*record.stacks, StackRecord(name, elements, back=back))
        return with_record(document, replace(record, stacks=stacks))

    return Edit(f"add stack {_lower(label)}", change, lambda after: Selection(len(after.record.stacks) - 1))


def preview_record(record: JobRecord, built: Built) -> JobRecord:
    """Return a job with one stack, that of a construction, and the materials that it is made of."""
    record, elements = with_elements(record, built.elements)
    stack = StackRecord("Preview", elements, back=built.back or "air")
    return replace(record, stacks=(stack,))


def with_elements(
    record: JobRecord, elements: tuple[ElementRecord, ...]
) -> tuple[JobRecord, tuple[ElementRecord, ...]]:
    """Return the job with every material that `elements` name by library key, and them by the names in the job."""
    names: dict[str, str] = {}
    for element in elements:
        if isinstance(element, LayerRecord) and element.material not in names:
            record, names[element.material] = with_material(record, element.material)
    return record, tuple(_named(element, names) for element in elements)


def _named(element: ElementRecord, names: Mapping[str, str]) -> ElementRecord:
    return replace(element, material=names[element.material]) if isinstance(element, LayerRecord) else element


def _free_stack_name(record: JobRecord, label: str) -> str:
    taken = [stack.name for stack in record.stacks]
    return label if label not in taken else free_name(label, taken)


def _lower(label: str) -> str:
    """Return a label inside a sentence: its first letter small, unless it is a letter by itself."""
    return label if len(label) > 1 and not label[1].islower() else label[:1].lower() + label[1:]
