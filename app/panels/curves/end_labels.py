"""The names of the curves, each at the right end of its curve in its colour."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Final

import numpy as np
import pyqtgraph as pg
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPen
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.panels.curves.curve_layer import DrawnCurve
from app.panels.curves.frame import Frame
from app.panels.curves.spacing import spread

_LEADER: Final = 16.0
_GAP: Final = 4.0
_EDGE: Final = 6.0
_OVER: Final = 24.0


@dataclass(frozen=True, slots=True, eq=False)
class EndLabel:
    """The name of a curve."""

    text: str
    curve: DrawnCurve

    def value(self, right: float) -> float:
        """Return the value at which the curve leaves a plot that ends at the position `right`; nan for none."""
        curve = self.curve
        last = int(np.searchsorted(curve.positions, right, side="right"))
        for begin, end in reversed(curve.runs):
            if begin < last:
                stretch = slice(begin, end)
                return float(np.interp(right, curve.positions[stretch], curve.values[stretch]))
        return float("nan")


class EndLabels(pg.GraphicsWidget):
    """A column beside the plot area; texts are pushed apart and tied to their curves by a thin line.

    Curves that leave through the top or the bottom are named at that edge with an arrow. When the column is
    too short for all names it stays empty and `crowded` is true: the legend takes over.
    """

    def __init__(self, area: Any) -> None:
        super().__init__()
        self._area = area
        self._labels: tuple[EndLabel, ...] = ()
        self._font = QFont()
        self._width = -1.0
        self._ends: tuple[float, ...] = ()
        self._places: tuple[float, ...] | None = ()
        self._texts: tuple[str, ...] = ()
        area.sigRangeChanged.connect(self._fit)
        area.sigResized.connect(self._fit)

    @property
    def labels(self) -> tuple[EndLabel, ...]:
        """The names, whether there is room for them or not."""
        return self._labels

    @property
    def crowded(self) -> bool:
        """Whether there is no room for the names."""
        return self._places is None

    @property
    def places(self) -> tuple[float, ...] | None:
        """Where each name stands, in pixels from the top of the plot area; None when crowded."""
        return self._places

    @property
    def texts(self) -> tuple[str, ...]:
        """The names as written, with an arrow where the curve is above or below the visible part."""
        return self._texts

    def set_font(self, font: QFont) -> None:
        """Write the names in this font."""
        self._font = font
        self._fit()

    def set_labels(self, labels: Sequence[EndLabel]) -> None:
        """Name these curves from now on."""
        self._labels = tuple(labels)
        self._fit()

    def boundingRect(self) -> QRectF:
        """Return the column, with room for a name that stands at the upper or lower edge of the plot area."""
        column: QRectF = super().boundingRect()
        return column.adjusted(0.0, -_OVER, 0.0, _OVER)

    def paint(self, painter: QPainter, option: QStyleOptionGraphicsItem, widget: QWidget | None = None) -> None:
        """Write the names."""
        if self._places is None:
            return
        height = self._frame().height
        metrics = QFontMetricsF(self._font)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        rows = zip(self._labels, self._texts, self._ends, self._places, strict=True)
        for label, text, end, place in rows:
            colour = QColor(label.curve.colour)
            font = QFont(self._font)
            font.setWeight(QFont.Weight.DemiBold if label.curve.chosen else QFont.Weight.Normal)
            painter.setFont(font)
            painter.setPen(QPen(colour, 1.0))
            painter.drawLine(QPointF(2.0, min(max(end, 0.0), height)), QPointF(_LEADER - _GAP, place))
            room = QRectF(_LEADER, place - metrics.height() / 2, self._width, metrics.height())
            painter.drawText(room, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, text)

    def _frame(self) -> Frame:
        (left, right), (bottom, top) = self._area.viewRange()
        return Frame(left, right, bottom, top, 1.0, max(float(self._area.rect().height()), 1.0))

    def _fit(self, *_: object) -> None:
        """Find the places, and be as wide as the longest name, or a mere gap when the names do not fit."""
        frame = self._frame()
        bold = QFont(self._font)
        bold.setWeight(QFont.Weight.DemiBold)
        metrics = QFontMetricsF(bold)
        values = [label.value(frame.right) for label in self._labels]
        marks = ("↓ " if value < frame.bottom else "↑ " if value > frame.top else "" for value in values)
        self._texts = tuple(f"{mark}{lab.text}" for mark, lab in zip(marks, self._labels, strict=True))
        self._ends = tuple(frame.down(value) if value == value else frame.height for value in values)
        self._places = spread(self._ends, metrics.height() + 1, -_EDGE, frame.height + _EDGE)
        longest = max((metrics.horizontalAdvance(f"↑ {label.text}") for label in self._labels), default=0.0)
        width = 12.0 if self.crowded or not self._labels else _LEADER + longest + _GAP
        if width != self._width:
            self._width = width
            self.setMinimumWidth(width)
            self.setMaximumWidth(width)
        self.update()
