"""The two axes: plain numbers, a light grid, a title in words."""

from typing import Literal

import pyqtgraph as pg
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPen

from app.look.theme import Theme
from app.panels.curves.scale import Ticks, linear_ticks, logarithmic_ticks


class QuietAxis(pg.AxisItem):
    """An axis without a line of its own: ticks are the grid, numbers are plain also on a logarithmic axis.

    Its positions are log₁₀ of the value when `logarithmic` is set, as `FrequencyScale` makes them; the log
    mode of the plotting library is not used, because it moves curves but not marks.
    """

    def __init__(self, orientation: Literal["left", "bottom"]) -> None:
        super().__init__(orientation)
        self.logarithmic = False
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
        self.label.setDefaultTextColor(QColor(theme.text))

    def set_title(self, title: str) -> None:
        """Write the title; the numbers beside it carry no unit of their own."""
        if title == self.labelText and self.label.isVisible():
            return
        self.setLabel(title)
        self.label.setPlainText(title)

    def ticks(self, low: float, high: float, length: float) -> Ticks:
        """Return what is written between two positions on `length` pixels."""
        metrics = QFontMetricsF(self.style["tickFont"] or self.font())
        if self.orientation == "left":
            room = metrics.height() * 2.6
        else:
            room = metrics.horizontalAdvance("0000.0") * 1.7
        make = logarithmic_ticks if self.logarithmic else linear_ticks
        return make(low, high, max(2.0, length / room))

    def tickValues(self, minVal: float, maxVal: float, size: float) -> list[tuple[float | None, list[float]]]:
        """Give the plotting library the ticks of this axis: labelled ones, then those between them."""
        low, high = sorted((minVal, maxVal))
        found = self.ticks(low, high, size)
        self._texts = dict(zip(found.major, found.texts, strict=True))
        return [(None, list(found.major)), (None, list(found.minor))]

    def tickStrings(self, values: list[float], scale: float, spacing: float | None) -> list[str]:
        """Give the plotting library the texts that belong to the ticks it has just asked for."""
        return [self._texts.get(value, "") for value in values]
