"""The lines of the element table as values, made from the document: texts, faults, kinds. No toolkit.

Line 0 is the front half-space, the last line the back; element `row` is line `row` + 1.
"""

import re
from dataclasses import dataclass
from typing import Final, Literal

from app.document.document import WHOLE_ROW, Cell, Document
from app.panels.elements.columns import (
    ALL_COLUMNS,
    MATERIAL,
    NUMBER,
    SHEET_COLUMNS,
    THICKNESS,
    WHAT,
    Column,
    place_of,
)
from app.panels.elements.names import MaterialNames
from app.series.kinds import kind_of
from stackcore.errors import Fault
from stackcore.job.records import ElementRecord, LayerRecord, StackRecord
from stackcore.units import Dimension, Measure

LineKind = Literal["front", "layer", "sheet", "back"]

WORDS: Final[dict[LineKind, str]] = {"front": "Front", "layer": "Layer", "sheet": "Sheet", "back": "Back"}
HALF_SPACE: Final = "half-space"

_WITHOUT_UNIT: Final = re.compile(r"[\d\s.,()+*/−-]*(?:[eE][-+]?\d+)?")


@dataclass(frozen=True, slots=True)
class CellView:
    """What one cell shows.

    Parameters
    ----------
    text
        As shown, with its unit.
    typed
        As typed, which is what opens for editing.
    editable
        Whether it can be typed into.
    fault
        Why the text has no value, or None.
    """

    text: str = ""
    typed: str = ""
    editable: bool = False
    fault: Fault | None = None


@dataclass(frozen=True, slots=True)
class Line:
    """One row of the table.

    Parameters
    ----------
    kind
        What the row is.
    cells
        By column, one for each of `ALL_COLUMNS`.
    place
        ``layer 2``, ``front half-space``: for a person who cannot see where the cell stands.
    material_kind
        Kind of its material (see `app.series.kinds`), empty for a sheet and a perfect conductor.
    """

    kind: LineKind
    cells: tuple[CellView, ...]
    place: str
    material_kind: str = ""

    @property
    def is_element(self) -> bool:
        """Whether it is a layer or a sheet, which can be moved, and not a half-space."""
        return self.kind in ("layer", "sheet")

    def cell(self, column: Column) -> CellView:
        """Return what the row shows in `column`."""
        return self.cells[place_of(column)]


def lines_of(document: Document, stack: int) -> tuple[Line, ...]:
    """Return the lines of one stack: front, elements, back."""
    record = document.record.stacks[stack]
    reading = _Reading(document, stack, MaterialNames(document.record))
    elements = (reading.element(row, element) for row, element in enumerate(record.elements))
    return (reading.half_space("front", record), *elements, reading.half_space("back", record))


def cell_of(stack: StackRecord, index: int, line: int, column: Column) -> Cell:
    """Return the document's cell for a place in the table of `stack`, whose index in the job is `index`."""
    if line == 0:
        return Cell(index, WHOLE_ROW, "front")
    if line == len(stack.elements) + 1:
        return Cell(index, WHOLE_ROW, "back")
    return Cell(index, line - 1, column.name)


def with_unit(measure: Measure, dimension: Dimension) -> str:
    """Return the text as typed, with the SI unit behind a bare number, which is what it means.

    Examples
    --------
    >>> with_unit(Measure(0.001, "0.001"), Dimension.LENGTH), with_unit(Measure(0.001, "1 mm"), Dimension.LENGTH)
    ('0.001 m', '1 mm')
    """
    bare = _WITHOUT_UNIT.fullmatch(measure.text) is not None
    return f"{measure.text} {dimension.si_unit}" if bare and dimension.si_unit else measure.text


@dataclass(frozen=True, slots=True)
class _Reading:
    """One document and stack, read line by line."""

    document: Document
    stack: int
    names: MaterialNames

    def half_space(self, side: Literal["front", "back"], record: StackRecord) -> Line:
        material = record.front if side == "front" else record.back
        shown = self._view(Cell(self.stack, WHOLE_ROW, side), self.names.shown(material))
        cells = {WHAT.name: CellView(WORDS[side]), MATERIAL.name: shown, THICKNESS.name: CellView(HALF_SPACE)}
        return Line(side, _in_order(cells), f"{side} half-space", self._kind(material))

    def element(self, row: int, element: ElementRecord) -> Line:
        if isinstance(element, LayerRecord):
            return self._layer(row, element)
        cells = {NUMBER.name: CellView(str(row + 1)), WHAT.name: CellView(WORDS["sheet"])}
        for column in SHEET_COLUMNS:
            part: Measure | None = getattr(element, column.name)
            cells[column.name] = self._quantity(row, column, part)
        return Line("sheet", _in_order(cells), f"sheet {row + 1}")

    def _layer(self, row: int, layer: LayerRecord) -> Line:
        cells = {
            NUMBER.name: CellView(str(row + 1)),
            WHAT.name: CellView(WORDS["layer"]),
            MATERIAL.name: self._view(Cell(self.stack, row, MATERIAL.name), self.names.shown(layer.material)),
            THICKNESS.name: self._quantity(row, THICKNESS, layer.thickness),
        }
        return Line("layer", _in_order(cells), f"layer {row + 1}", self._kind(layer.material))

    def _quantity(self, row: int, column: Column, measure: Measure | None) -> CellView:
        assert column.dimension is not None
        text = with_unit(measure, column.dimension) if measure is not None else ""
        return self._view(Cell(self.stack, row, column.name), text)

    def _view(self, cell: Cell, text: str) -> CellView:
        draft = self.document.draft(cell)
        if draft is None:
            return CellView(text, text, editable=True)
        return CellView(draft.text, draft.text, editable=True, fault=draft.fault)

    def _kind(self, material: str) -> str:
        return kind_of(self.document.job, material)


def _in_order(cells: dict[str, CellView]) -> tuple[CellView, ...]:
    return tuple(cells.get(column.name, CellView()) for column in ALL_COLUMNS)
