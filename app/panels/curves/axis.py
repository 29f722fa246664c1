"""The two axes: plain numbers, a light grid, a title in words."""

from collections.abc import Callable
from typing import Literal

import pyqtgraph as pg
from PySide6.QtCore import QRectF
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPen

from app.look.theme import Theme
from app.panels.curves.scale import Ticks, linear_ticks, logarithmic_ticks


class QuietAxis(pg.AxisItem):
    """An axis without a line of its own: ticks are the grid, numbers are plain also on a logarithmic axis.

    `degrees` makes its steps parts of a turn; `spell` writes the numbers of a logarithmic axis instead.
    Its positions are log₁₀ of the value when `logarithmic` is set, as `FrequencyScale` makes them; the log mode
    of the plotting library is not used, because it moves curves but not marks.
    """

    def __init__(self, orientation: Literal["left", "bottom"]) -> None:
        super().__init__(orientation)
        self.logarithmic = False
        self.degrees = False
        self.spell: Callable[[float], str] | None = None
        self._ink = QColor()
        self._texts: dict[float, str] = {}
        self.setZValue(-200)
        self.enableAutoSIPrefix(False)
        self.setGrid(255)
        self.setCacheMode(self.CacheMode.DeviceCoordinateCache)

    def set_fonts(self, font: QFont) -> None:
        """Write numbers and title in this font."""
        metrics = QFontMetricsF(font)
        self.setStyle(
            tickFont=font,
            tickAlpha=255,
            maxTextLevel=0,
            tickTextOffset=6,
            hideOverlappingLabels=False,
            tickTextHeight=round(metrics.height()),
            autoReduceTextSpace=False,
            tickTextWidth=round(metrics.horizontalAdvance("−00.00")),
        )
        self.label.setFont(font)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.setPen(QPen(QColor(0, 0, 0, 0)))
        self.setTickPen(QPen(QColor(theme.line)))
        self.setTextPen(QPen(QColor(theme.muted)))
        self._ink = QColor(theme.text)
        self._write_title()

    def set_title(self, title: str) -> None:
        """Write the title; the numbers beside it carry no unit of their own."""
        if title != self.labelText:
            self.setLabel(title)
            self._write_title()

    def _write_title(self) -> None:
        # The library writes titles as markup in the colour of the numbers; these are plain and stronger.
        self.label.setPlainText(self.labelText)
        self.label.setDefaultTextColor(self._ink)
        self.resizeEvent(None)

    def ticks(self, low: float, high: float, length: float) -> Ticks:
        """Return what is written between two positions on `length` pixels."""
        metrics = QFontMetricsF(self.style["tickFont"] or self.font())
        if self.orientation == "left":
            room = metrics.height() * 2.6
        else:
            room = metrics.horizontalAdvance("0000.0") * 1.5
        most = max(2.0, length / room)
        if self.logarithmic:
            return logarithmic_ticks(low, high, most, self.spell)
        return linear_ticks(low, high, most, degrees=self.degrees)

    def boundingRect(self) -> QRectF:
        """Return the axis and its grid, with room for numbers that stand at the very ends."""
        rect: QRectF = super().boundingRect()
        return rect.adjusted(0, -10, 0, 10) if self.orientation == "left" else rect.adjusted(-30, 0, 30, 0)

    def tickValues(self, minVal: float, maxVal: float, size: float) -> list[tuple[float | None, list[float]]]:
        """Give the plotting library the ticks of this axis: labelled ones, then those between them."""
        low, high = sorted((minVal, maxVal))
        found = self.ticks(low, high, size)
        self._texts = dict(zip(found.major, found.texts, strict=True))
        return [(None, list(found.major)), (None, list(found.minor))]

    def tickStrings(self, values: list[float], scale: float, spacing: float | None) -> list[str]:
        """Give the plotting library the texts that belong to the ticks it has just asked for."""
        return [self._texts.get(value, "") for value in values]
