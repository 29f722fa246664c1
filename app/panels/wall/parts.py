"""What the drawing shows, read from a job: the half-spaces and the elements between, with their words."""

from dataclasses import dataclass

from app.document.document import Document
from app.document.library import ALWAYS_DEFINED, PERFECT_METAL
from app.document.sheet_cells import part_of
from app.series.kinds import kind_of
from stackcore.job.records import Group, LayerRecord, SheetRecord, StackRecord
from stackcore.job.resolve import Job
from stackcore.units import Dimension, Measure, format_value


@dataclass(frozen=True, slots=True)
class LayerPart:
    """A layer: name for people, thickness in m and as written, kind of material, and whether a text waits at it.

    One that is `left_out` is not computed and drawn as a gap; one that is `locked` cannot be dragged.
    """

    name: str
    thickness: float
    text: str
    kind: str
    faulty: bool = False
    left_out: bool = False
    locked: bool = False


@dataclass(frozen=True, slots=True)
class SheetPart:
    """A sheet: which of R, L and C are in it, in this order, and their values as written."""

    parts: tuple[str, ...]
    text: str
    name: str = "sheet"
    faulty: bool = False
    left_out: bool = False


@dataclass(frozen=True, slots=True)
class HalfSpacePart:
    """What the wave comes from or goes to; `kind` is empty for air and vacuum, which are drawn as nothing."""

    name: str
    kind: str


Part = LayerPart | SheetPart


@dataclass(frozen=True, slots=True)
class Wall:
    """A stack as the drawing needs it, from front to back."""

    front: HalfSpacePart
    elements: tuple[Part, ...]
    back: HalfSpacePart
    groups: tuple[Group, ...] = ()


def wall_of(document: Document, stack: int) -> Wall:
    """Return what the drawing shows of one stack; a text that is no value yet leaves the last good one standing."""
    record = document.record.stacks[stack]
    elements = tuple(_part(document, stack, record, row) for row in range(len(record.elements)))
    front, back = half_space(document.job, record.front), half_space(document.job, record.back)
    return Wall(front, elements, back, record.groups)


def half_space(job: Job, name: str) -> HalfSpacePart:
    """Return the half-space made of the material called `name`."""
    kind = "" if name in ALWAYS_DEFINED else kind_of(job, name)
    return HalfSpacePart(name if name == PERFECT_METAL else shown_name(job, name), kind)


def shown_name(job: Job, name: str) -> str:
    """Return the label of a material, or its name when it has none."""
    record = job.record.material(name)
    return (record.label if record is not None else "") or name


def written(measure: Measure, dimension: Dimension) -> str:
    """Return a quantity as it was typed, with a unit where a bare number was typed."""
    has_unit = any(letter.isalpha() for letter in measure.text.replace("e", "").replace("E", ""))
    return measure.text if has_unit else format_value(measure.value, dimension)


def sheet_part(record: SheetRecord, faulty: bool = False) -> SheetPart:
    """Return the words of a sheet."""
    name = "film" if record.kind == "film" else "sheet"
    if not record.enabled:
        name = f"{name} (left out)"
    values = (
        ("R", part_of(record, "resistance"), Dimension.RESISTANCE),
        ("L", record.inductance, Dimension.INDUCTANCE),
        ("C", record.capacitance, Dimension.CAPACITANCE),
    )
    present = [(letter, written(value, dimension)) for letter, value, dimension in values if value is not None]
    text = ", ".join(text for _, text in present)
    return SheetPart(tuple(letter for letter, _ in present), text, name, faulty, not record.enabled)


def _part(document: Document, stack: int, record: StackRecord, row: int) -> Part:
    element = record.elements[row]
    faulty = any((draft.cell.stack, draft.cell.row) == (stack, row) for draft in document.drafts)
    if isinstance(element, LayerRecord):
        name = shown_name(document.job, element.material)
        return LayerPart(
            name if element.enabled else f"{name} (left out)",
            element.thickness.value,
            written(element.thickness, Dimension.LENGTH),
            kind_of(document.job, element.material),
            faulty,
            not element.enabled,
            element.locked,
        )
    return sheet_part(element, faulty)
