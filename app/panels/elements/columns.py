"""The columns of the element table: what each is called, measured in, and says of itself. No toolkit."""

from dataclasses import dataclass
from typing import Final

from app.document.document import Document
from stackcore.job.records import SheetRecord
from stackcore.units import Dimension


@dataclass(frozen=True, slots=True)
class Column:
    """One column.

    Parameters
    ----------
    name
        As in `app.document.document.Cell`.
    title
        As in the table's header and in what is copied.
    definition
        What it means, with unit and sign; shown when the pointer rests on the header.
    dimension
        What kind of quantity is typed, or None for words.
    """

    name: str
    title: str
    definition: str
    dimension: Dimension | None = None


NUMBER: Final = Column("number", "No.", "Number of the element, counted from the front, where the wave comes from.")
WHAT: Final = Column(
    "what",
    "What",
    "A layer has a material and a thickness. A sheet has no thickness, only an impedance per square.",
)
MATERIAL: Final = Column(
    "material",
    "Material",
    "One of the job's materials, air, or an entry of the library, which is then added to the job.",
)
THICKNESS: Final = Column(
    "thickness",
    "Thickness",
    "Thickness of a layer, 0 or more. Type it with a unit: 0.9 mm, 35 um, 10 mil, 1/8 in.",
    Dimension.LENGTH,
)
RESISTANCE: Final = Column(
    "resistance",
    "Resistance",
    "Resistance of a sheet per square, 0 or more, in series with the rest: 377 ohm/sq. Empty when there is none. "
    "The menus of the table and View show the columns for an inductance and a capacitance.",
    Dimension.RESISTANCE,
)
CONDUCTIVITY: Final = Column(
    "conductivity",
    "Conductivity",
    "Conductivity of a film, more than 0; with its thickness it gives the resistance, 1/(σd). Type a thickness for "
    "a sheet that is nothing but a resistance, and it becomes a film.",
    Dimension.CONDUCTIVITY,
)
REPEAT: Final = Column(
    "repeat",
    "Times",
    "How often the group of elements is repeated, a whole number from 1; it stands at the first of them.",
    Dimension.NUMBER,
)
INDUCTANCE: Final = Column(
    "inductance",
    "Inductance",
    "Inductance of a sheet per square, 0 or more, in series with the rest: 20 pH. Empty when there is none.",
    Dimension.INDUCTANCE,
)
CAPACITANCE: Final = Column(
    "capacitance",
    "Capacitance",
    "Capacitance of a sheet per square, more than 0, in series with the rest: 1 pF. Empty when there is none.",
    Dimension.CAPACITANCE,
)

LAYER_COLUMNS: Final = (NUMBER, WHAT, MATERIAL, THICKNESS)
SHEET_COLUMNS: Final = (RESISTANCE, INDUCTANCE, CAPACITANCE, CONDUCTIVITY)
RARE_COLUMNS: Final = (INDUCTANCE, CAPACITANCE, CONDUCTIVITY)
"""Shown only where a sheet of the stack uses them, or when they are asked for."""
LAYER_CELLS: Final = (MATERIAL, THICKNESS)
ALL_COLUMNS: Final = (*LAYER_COLUMNS, *SHEET_COLUMNS, REPEAT)
SHOWN_ORDER: Final = (NUMBER, WHAT, REPEAT, MATERIAL, THICKNESS, *SHEET_COLUMNS)
"""From left to right: the count of a group beside its bracket, where no wide table hides it."""
_PLACES: Final = {column.name: place for place, column in enumerate(ALL_COLUMNS)}


def place_of(column: Column) -> int:
    """Return the place of a column among `ALL_COLUMNS`."""
    return _PLACES[column.name]


def shown_place(column: Column) -> int:
    """Return the place of a column from left to right among all."""
    return SHOWN_ORDER.index(column)


def columns_of(document: Document, stack: int, *, rare: bool = False) -> tuple[Column, ...]:
    """Return the columns a stack needs, in the order of `SHOWN_ORDER`.

    Those of sheets are there only when it has a sheet, and those of `RARE_COLUMNS` only when a sheet uses them,
    or holds a text for them that is no value yet, or when `rare` asks for them. That of groups is there when there
    is one.
    """
    record = document.record.stacks[stack]
    sheets = [one for one in record.elements if isinstance(one, SheetRecord)]
    repeat = (REPEAT,) if record.groups else ()
    if not sheets:
        return tuple(column for column in SHOWN_ORDER if column in (*LAYER_COLUMNS, *repeat))
    drafted = {draft.cell.column for draft in document.drafts if draft.cell.stack == stack}
    used = {
        column.name for column in RARE_COLUMNS if any(getattr(sheet, column.name) is not None for sheet in sheets)
    }
    wanted = {column.name for column in RARE_COLUMNS} if rare else used | drafted
    shown = [column for column in SHOWN_ORDER if column not in RARE_COLUMNS or column.name in wanted]
    return tuple(column for column in shown if column is not REPEAT or repeat)
