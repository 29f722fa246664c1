"""The places of a job that hold a text: which there are, what stands in them, and what a text makes of them."""

from dataclasses import replace
from typing import Final, Literal, cast

from app.document.document import STACK_COLUMNS, WHOLE_ROW, Cell
from app.document.document import material_and_constant as split_column
from app.document.edit import element_at, refuse, stack_at, with_element, with_stack
from app.document.library import with_material
from app.document.material_cells import material_columns, material_text, with_material_text
from app.document.material_edits import material_of
from app.document.reading import list_text, read_like, read_list, read_points, read_range
from app.document.sheet_cells import part_of, sheet_columns, with_part
from stackcore.errors import UnitError, nearest
from stackcore.job.groups import group_of
from stackcore.job.plies import counts_plies, ply_of, read_plies
from stackcore.job.records import AngleGrid, FrequencyGrid, JobRecord, LayerRecord, SheetRecord, Spacing
from stackcore.units import Dimension, Measure, measure

SPACINGS: Final[tuple[Spacing, ...]] = ("linear", "log")

_JOB_WORDS: Final = {
    "sweep.frequency": "frequencies",
    "sweep.frequency.start": "first frequency",
    "sweep.frequency.stop": "last frequency",
    "sweep.frequency.points": "number of frequencies",
    "sweep.frequency.spacing": "spacing of frequencies",
    "sweep.angle": "angles",
    "sweep.angle.start": "first angle",
    "sweep.angle.stop": "last angle",
    "sweep.angle.points": "number of angles",
}


def columns_of(record: JobRecord, cell: Cell) -> tuple[str, ...]:
    """Return the columns there are where `cell` is; refuses a stack or an element that does not exist."""
    if cell.row != WHOLE_ROW:
        element = element_at(record, cell.stack, cell.row)
        repeat = ("repeat",) if group_of(record.stacks[cell.stack], cell.row) is not None else ()
        own = ("material", "thickness") if isinstance(element, LayerRecord) else sheet_columns(element)
        return (*own, *repeat)
    if not cell.of_job:
        stack_at(record, cell.stack)
        return STACK_COLUMNS
    if cell.column.startswith("material:"):
        name = material_and_constant(cell)[0]
        places = material_columns(material_of(record, name))
        return tuple(f"material:{name}.{constant}" for constant in places)
    columns = ["title", "notes", "sweep.frequency", "sweep.angle"]
    if isinstance(record.sweep.frequency, FrequencyGrid):
        columns += [f"sweep.frequency.{part}" for part in ("start", "stop", "points", "spacing")]
    if isinstance(record.sweep.angle, AngleGrid):
        columns += [f"sweep.angle.{part}" for part in ("start", "stop", "points")]
    return tuple(columns)


def check_cell(record: JobRecord, cell: Cell) -> None:
    """Refuse a cell that `record` does not have."""
    columns = columns_of(record, cell)
    if cell.column not in columns:
        hint = nearest(cell.column, columns)
        raise refuse(cell.path, f"there is no place {cell.column!r}{hint}", f"one of {', '.join(columns)}")


def material_and_constant(cell: Cell) -> tuple[str, str]:
    """Return the material's name and the constant in a cell such as ``material:skin.permittivity``."""
    return split_column(cell.column)


def place_words(cell: Cell) -> str:
    """Return what a cell holds and where, in words for a person.

    Examples
    --------
    >>> place_words(Cell(0, 1, "thickness")), place_words(Cell(0, -1, "sweep.frequency.stop"))
    ('thickness of layer 2', 'last frequency')
    """
    if cell.row != WHOLE_ROW:
        if cell.column == "repeat":
            return f"repetitions of the group at {cell.row + 1}"
        kind = "layer" if cell.column in ("material", "thickness") else "sheet"
        return f"{cell.column} of {kind} {cell.row + 1}"
    if cell.column.startswith("material:"):
        name, constant = material_and_constant(cell)
        return f"{constant.replace('_', ' ')} of {name}"
    return "name of stack" if cell.column == "name" else _JOB_WORDS.get(cell.column, cell.column)


def value_text(record: JobRecord, cell: Cell) -> str:
    """Return the text of the value at `cell`, as it was typed; refuses a cell that does not exist.

    Examples
    --------
    >>> from app.document.untitled import untitled_job
    >>> value_text(untitled_job().record, Cell(0, 0, "thickness"))
    '3 mm'
    """
    check_cell(record, cell)
    if cell.row != WHOLE_ROW:
        if cell.column == "repeat":
            group = group_of(record.stacks[cell.stack], cell.row)
            return str(group.repeat) if group is not None else ""
        element = element_at(record, cell.stack, cell.row)
        if isinstance(element, LayerRecord):
            return element.material if cell.column == "material" else element.thickness.text
        part = part_of(element, cell.column)
        return part.text if part is not None else ""
    if not cell.of_job:
        return cast(str, getattr(stack_at(record, cell.stack), cell.column))
    if cell.column.startswith("material:"):
        name, constant = material_and_constant(cell)
        return material_text(material_of(record, name), constant)
    if cell.column in ("title", "notes"):
        return record.title if cell.column == "title" else record.notes
    return _sweep_text(record, cell.column)


def with_text(record: JobRecord, cell: Cell, text: str) -> JobRecord:
    """Return `record` with the value of `text` at `cell`.

    Raises
    ------
    UnitError
        When the text is no value of the kind.
    JobError
        When there is no such cell. Whether the job resolves with the value is not looked at.
    """
    check_cell(record, cell)
    if cell.row != WHOLE_ROW:
        return _with_element_text(record, cell, text)
    if not cell.of_job:
        return _with_stack_text(record, cell, text)
    if cell.column.startswith("material:"):
        return with_material_text(record, *material_and_constant(cell), text)
    if cell.column == "title":
        return replace(record, title=text)
    if cell.column == "notes":
        return replace(record, notes=text)
    if cell.column.startswith("sweep.frequency"):
        frequency = _frequency(record.sweep.frequency, cell.column, text)
        return replace(record, sweep=replace(record.sweep, frequency=frequency))
    angle = _angle(record.sweep.angle, cell.column, text)
    return replace(record, sweep=replace(record.sweep, angle=angle))


def _with_element_text(record: JobRecord, cell: Cell, text: str) -> JobRecord:
    stack = stack_at(record, cell.stack)
    if cell.column == "repeat":
        wanted = group_of(stack, cell.row)
        repeat = read_points(text)
        groups = tuple(replace(group, repeat=repeat) if group is wanted else group for group in stack.groups)
        return with_stack(record, cell.stack, replace(stack, groups=groups))
    element = element_at(record, cell.stack, cell.row)
    if isinstance(element, SheetRecord):
        return with_element(record, cell.stack, cell.row, with_part(element, cell.column, text))
    if cell.column == "material":
        record, name = with_material(record, text)
        return with_element(record, cell.stack, cell.row, replace(element, material=name))
    if counts_plies(text):
        thickness = read_plies(text, ply_of(record.material(element.material)))
    else:
        counted = counts_plies(element.thickness.text)
        old = measure(element.thickness.value, Dimension.LENGTH) if counted else element.thickness
        thickness = read_like(old, text, Dimension.LENGTH)
    return with_element(record, cell.stack, cell.row, replace(element, thickness=thickness))


def _with_stack_text(record: JobRecord, cell: Cell, text: str) -> JobRecord:
    stack = stack_at(record, cell.stack)
    if cell.column == "name":
        return with_stack(record, cell.stack, replace(stack, name=text.strip()))
    record, name = with_material(record, text)
    changed = replace(stack, front=name) if cell.column == "front" else replace(stack, back=name)
    return with_stack(record, cell.stack, changed)


def _sweep_text(record: JobRecord, column: str) -> str:
    half, _, part = column.removeprefix("sweep.").partition(".")
    values = record.sweep.frequency if half == "frequency" else record.sweep.angle
    if isinstance(values, tuple):
        return list_text(values)
    if not part:
        return f"{values.start.text} to {values.stop.text}, {values.points} points"
    given = getattr(values, part)
    return given.text if isinstance(given, Measure) else str(given)


def _frequency(
    old: FrequencyGrid | tuple[Measure, ...], column: str, text: str
) -> FrequencyGrid | tuple[Measure, ...]:
    if not isinstance(old, FrequencyGrid) or column == "sweep.frequency":
        wanted = read_range(text, Dimension.FREQUENCY)
        spacing = old.spacing if isinstance(old, FrequencyGrid) else "linear"
        return FrequencyGrid(*wanted, spacing) if wanted else read_list(text, Dimension.FREQUENCY)
    part = column.rpartition(".")[2]
    if part == "points":
        return replace(old, points=read_points(text))
    if part == "spacing":
        return replace(old, spacing=_spacing(text))
    end = read_like(old.start if part == "start" else old.stop, text, Dimension.FREQUENCY)
    return replace(old, start=end) if part == "start" else replace(old, stop=end)


def _angle(old: AngleGrid | tuple[Measure, ...], column: str, text: str) -> AngleGrid | tuple[Measure, ...]:
    if not isinstance(old, AngleGrid) or column == "sweep.angle":
        wanted = read_range(text, Dimension.ANGLE)
        return AngleGrid(*wanted) if wanted else read_list(text, Dimension.ANGLE)
    part = column.rpartition(".")[2]
    if part == "points":
        return replace(old, points=read_points(text))
    end = read_like(old.start if part == "start" else old.stop, text, Dimension.ANGLE)
    return replace(old, start=end) if part == "start" else replace(old, stop=end)


def _spacing(text: str) -> Literal["linear", "log"]:
    wanted = text.strip().casefold()
    for spacing in SPACINGS:
        if wanted == spacing:
            return spacing
    raise UnitError(f"{text!r} is no spacing{nearest(wanted, SPACINGS)}", f"one of {', '.join(SPACINGS)}")
