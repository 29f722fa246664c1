"""How wide the texts of the table are: for the columns, and to stand numbers with their points below each other."""

import re
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Final

from PySide6.QtGui import QFont, QFontMetrics

from app.look.palette import tabular_font
from app.panels.elements.columns import Column
from app.panels.elements.lines import CellView, Line
from app.panels.tables.delegate import MARK, MARK_GAP, PADDING

_PARTS: Final = re.compile(r"(?P<whole>.*?)(?P<fraction>[.,]\d*(?:[eE][-+]?\d+)?)?\s*(?P<unit>[^\d.,()]*)")
_MOST_TEXTS: Final = 4096
_WIDEST: Final = 26
"""Digits a column has room for; a longer text is cut in the table and whole when it is typed into."""

Ruler = Callable[[str], int]


@dataclass(frozen=True, slots=True)
class Widths:
    """Widths in one column, in pixels: of the whole cell, and of the widest decimal fraction and unit."""

    cell: int
    fraction: int
    unit: int


class Measuring:
    """Measures the columns of a table in one font; texts it has met before are not measured again."""

    def __init__(self, font: QFont) -> None:
        self._metrics = QFontMetrics(tabular_font(font))
        self._known: dict[str, int] = {}

    def widths(self, columns: Sequence[Column], lines: Sequence[Line]) -> tuple[Widths, ...]:
        """Return the widths of each of `columns`, for all `lines`."""
        return tuple(_widths(self._text, column, [line.cell(column) for line in lines]) for column in columns)

    def _text(self, text: str) -> int:
        if text not in self._known:
            if len(self._known) >= _MOST_TEXTS:
                self._known.clear()
            self._known[text] = self._metrics.horizontalAdvance(text)
        return self._known[text]


def split_quantity(text: str) -> tuple[str, str, str]:
    """Return a quantity's text up to the decimal sign, from there to its unit, and the unit.

    Examples
    --------
    >>> split_quantity("12.25 mm"), split_quantity("1/8 in"), split_quantity("377 ohm/sq")
    (('12', '.25', 'mm'), ('1/8', '', 'in'), ('377', '', 'ohm/sq'))
    """
    match = _PARTS.fullmatch(text)
    if match is None:
        return text, "", ""
    return match["whole"], match["fraction"] or "", match["unit"].strip()


def _widths(ruler: Ruler, column: Column, cells: Sequence[CellView]) -> Widths:
    quantities = [cell.text for cell in cells if column.dimension and is_quantity(cell)]
    words = [cell for cell in cells if not (column.dimension and is_quantity(cell))]
    parts = [split_quantity(text) for text in quantities]
    fraction = max((ruler(part[1]) for part in parts), default=0)
    unit = max((ruler(f" {part[2]}") for part in parts), default=0)
    numbers = max((ruler(part[0]) for part in parts), default=0)
    marks = [ruler(cell.text) + (MARK + MARK_GAP if cell.fault else 0) for cell in words]
    widest = max(numbers + fraction + unit, *marks) if marks else numbers + fraction + unit
    room = max(ruler(column.title), min(widest, _WIDEST * ruler("0")))
    return Widths(room + 2 * PADDING + 2, fraction, unit)


def is_quantity(cell: CellView) -> bool:
    """Whether a cell of a column of quantities shows one, and not a word, a wrong text or nothing."""
    return bool(cell.text) and cell.fault is None and cell.editable
