"""The lines of the element table as values, made from the document: texts, faults, kinds. No toolkit.

Line 0 is the front half-space, the last line the back; element `row` is line `row` + 1.
"""

import re
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final, Literal

from app.document.document import WHOLE_ROW, Cell, Document
from app.document.sheet_cells import part_of, sheet_columns
from app.panels.elements.columns import (
    ALL_COLUMNS,
    MATERIAL,
    NUMBER,
    REPEAT,
    SHEET_COLUMNS,
    THICKNESS,
    WHAT,
    Column,
    place_of,
)
from app.panels.elements.names import MaterialNames
from app.series.kinds import kind_of
from stackcore.errors import Fault
from stackcore.job.groups import group_of
from stackcore.job.plies import counts_plies
from stackcore.job.records import ElementRecord, LayerRecord, SheetRecord, StackRecord
from stackcore.units import Dimension, Measure

LineKind = Literal["front", "layer", "sheet", "back"]

WORDS: Final[dict[LineKind, str]] = {"front": "Front", "layer": "Layer", "sheet": "Sheet", "back": "Back"}
HALF_SPACE: Final = "half-space"
FILM: Final = "Film"
LEFT_OUT: Final = "left out"
LOCKED: Final = "locked"
FIRST, MIDDLE, LAST = "┐│┘"
"""Brackets of a group behind the numbers of its rows."""
_COUNT: Final = re.compile(r"×(\d+)")

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
    left_out
        Whether it is left out of the computation.
    """

    kind: LineKind
    cells: tuple[CellView, ...]
    place: str
    material_kind: str = ""
    left_out: bool = False

    @property
    def is_element(self) -> bool:
        """Whether it is a layer or a sheet, which can be moved, and not a half-space."""
        return self.kind in ("layer", "sheet")

    def cell(self, column: Column) -> CellView:
        """Return what the row shows in `column`."""
        return self.cells[place_of(column)]


@dataclass(frozen=True, slots=True)
class Marks:
    """What the table's own words say of a row beside its values.

    Parameters
    ----------
    left_out, locked
        As of the element; None where the row does not say what it is.
    repeat
        Count of the group that begins here, None where none begins.
    inside, ends
        Whether the row belongs to the group that began before, and whether it is its last.
    """

    left_out: bool | None = None
    locked: bool | None = None
    repeat: int | None = None
    inside: bool = False
    ends: bool = False


def marks_of(texts: Mapping[str, str]) -> Marks:
    """Return what a copied row says by its words and brackets; the inverse of what the table writes."""
    word, *marks = (part.strip().casefold() for part in texts.get(WHAT.name, "").split(","))
    number = texts.get(NUMBER.name, "")
    count = _COUNT.search(number)
    begins = count is not None
    return Marks(
        LEFT_OUT in marks if word else None,
        LOCKED in marks if word else None,
        int(count[1]) if count is not None else None,
        MIDDLE in number or LAST in number,
        LAST in number or (begins and FIRST not in number),
    )


def lines_of(document: Document, stack: int, *, films: bool = False) -> tuple[Line, ...]:
    """Return the lines of one stack: front, elements, back.

    With `films` a sheet that is nothing but a resistance has a thickness to type into, which makes it a film.
    """
    record = document.record.stacks[stack]
    reading = _Reading(document, stack, MaterialNames(document.record), films)
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
    if counts_plies(measure.text):
        return measure.text
    bare = _WITHOUT_UNIT.fullmatch(measure.text) is not None
    return f"{measure.text} {dimension.si_unit}" if bare and dimension.si_unit else measure.text


@dataclass(frozen=True, slots=True)
class _Reading:
    """One document and stack, read line by line."""

    document: Document
    stack: int
    names: MaterialNames
    films: bool = False

    def half_space(self, side: Literal["front", "back"], record: StackRecord) -> Line:
        material = record.front if side == "front" else record.back
        shown = self._view(Cell(self.stack, WHOLE_ROW, side), self.names.shown(material))
        cells = {WHAT.name: CellView(WORDS[side]), MATERIAL.name: shown, THICKNESS.name: CellView(HALF_SPACE)}
        return Line(side, _in_order(cells), f"{side} half-space", self._kind(material))

    def element(self, row: int, element: ElementRecord) -> Line:
        if isinstance(element, LayerRecord):
            return self._layer(row, element)
        cells = self._head(row, element, "sheet")
        offered = sheet_columns(element)
        for column in (*SHEET_COLUMNS, THICKNESS):
            if column.name in offered and (column is not THICKNESS or element.kind == "film" or self.films):
                cells[column.name] = self._quantity(row, column, part_of(element, column.name))
        place = f"{element.kind if element.kind == 'film' else 'sheet'} {row + 1}{self._said(row, element)}"
        return Line("sheet", _in_order(cells), place, left_out=not element.enabled)

    def _head(self, row: int, element: ElementRecord, kind: LineKind) -> dict[str, CellView]:
        """Return the cells that say what the row is: its number with the bracket of its group, and its kind."""
        group = group_of(self.document.record.stacks[self.stack], row)
        bracket = ""
        if group is not None and group.first != group.last:
            bracket = f" {FIRST if row == group.first else LAST if row == group.last else MIDDLE}"
        if group is not None and row == group.first:
            bracket += f" ×{group.repeat}"
        word = FILM if isinstance(element, SheetRecord) and element.kind == "film" else WORDS[kind]
        marks = [LEFT_OUT] if not element.enabled else []
        marks += [LOCKED] if element.locked else []
        cells = {
            NUMBER.name: CellView(f"{row + 1}{bracket}"),
            WHAT.name: CellView(", ".join((word, *marks))),
        }
        if group is not None and row == group.first:
            cells[REPEAT.name] = self._view(Cell(self.stack, row, REPEAT.name), str(group.repeat))
        return cells

    def _said(self, row: int, element: ElementRecord) -> str:
        """Return what a person who cannot see the marks is told of a row."""
        group = group_of(self.document.record.stacks[self.stack], row)
        told = [LEFT_OUT] if not element.enabled else []
        told += [LOCKED] if element.locked else []
        told += [f"in a group repeated {group.repeat} times"] if group is not None else []
        return f", {', '.join(told)}" if told else ""

    def _layer(self, row: int, layer: LayerRecord) -> Line:
        cells = {
            **self._head(row, layer, "layer"),
            MATERIAL.name: self._view(Cell(self.stack, row, MATERIAL.name), self.names.shown(layer.material)),
            THICKNESS.name: self._quantity(row, THICKNESS, layer.thickness),
        }
        place = f"layer {row + 1}{self._said(row, layer)}"
        return Line("layer", _in_order(cells), place, self._kind(layer.material), not layer.enabled)

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
