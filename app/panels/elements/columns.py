"""The columns of the element table: what each is called, measured in, and says of itself. No toolkit."""

from dataclasses import dataclass
from typing import Final

from stackcore.job.records import SheetRecord, StackRecord
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
    "Resistance of a sheet per square, 0 or more, in series with the rest: 377 ohm/sq. Empty when there is none.",
    Dimension.RESISTANCE,
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
SHEET_COLUMNS: Final = (RESISTANCE, INDUCTANCE, CAPACITANCE)
LAYER_CELLS: Final = (MATERIAL, THICKNESS)
ALL_COLUMNS: Final = LAYER_COLUMNS + SHEET_COLUMNS


def columns_of(stack: StackRecord) -> tuple[Column, ...]:
    """Return the columns a stack needs: those of sheets only when it has a sheet."""
    has_sheet = any(isinstance(element, SheetRecord) for element in stack.elements)
    return ALL_COLUMNS if has_sheet else LAYER_COLUMNS
