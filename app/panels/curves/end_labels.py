"""The names of the curves, each at the right end of its curve in its colour."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Final

import pyqtgraph as pg
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPen
from PySide6.QtWidgets import QStyleOptionGraphicsItem, QWidget

from app.panels.curves.frame import Frame
from app.panels.curves.spacing import spread

_LEADER: Final = 16.0
_GAP: Final = 4.0
_EDGE: Final = 6.0


@dataclass(frozen=True, slots=True)
class EndLabel:
    """A name and the value at which its curve leaves the plot on the right."""

    text: str
    value: float
    colour: str
    chosen: bool = False


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
        area.sigRangeChanged.connect(self._moved)
        area.sigResized.connect(self._moved)

    @property
    def labels(self) -> tuple[EndLabel, ...]:
        """The names, whether there is room for them or not."""
        return self._labels

    @property
    def crowded(self) -> bool:
        """Whether there is no room for the names."""
        return self.places() is None

    def set_font(self, font: QFont) -> None:
        """Write the names in this font."""
        self._font = font
        self._fit()

    def set_labels(self, labels: Sequence[EndLabel]) -> None:
        """Name these curves from now on."""
        self._labels = tuple(labels)
        self._fit()

    def places(self) -> tuple[float, ...] | None:
        """Return where each name stands, in pixels from the top of the plot area; None when crowded."""
        frame = self._frame()
        wanted = [frame.down(label.value) for label in self._labels]
        height = QFontMetricsF(self._font).height() + 1
        return spread(wanted, height, -_EDGE, frame.height + _EDGE)

    def texts(self) -> tuple[str, ...]:
        """Return the names as written, with an arrow where the curve is above or below the visible part."""
        frame = self._frame()
        marks = ("↓ " if lab.value < frame.bottom else "↑ " if lab.value > frame.top else "" for lab in self._labels)
        return tuple(f"{mark}{label.text}" for mark, label in zip(marks, self._labels, strict=True))

    def paint(
        self, painter: QPainter, option: QStyleOptionGraphicsItem, widget: QWidget | None = None
    ) -> None:
        """Write the names."""
        places = self.places()
        if places is None:
            return
        frame = self._frame()
        metrics = QFontMetricsF(self._font)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        for label, text, place in zip(self._labels, self.texts(), places, strict=True):
            colour = QColor(label.colour)
            font = QFont(self._font)
            font.setWeight(QFont.Weight.DemiBold if label.chosen else QFont.Weight.Normal)
            painter.setFont(font)
            end = min(max(frame.down(label.value), 0.0), frame.height)
            painter.setPen(QPen(colour, 1.0))
            painter.drawLine(QPointF(2.0, end), QPointF(_LEADER - _GAP, place))
            room = QRectF(_LEADER, place - metrics.height() / 2, self._width, metrics.height())
            painter.drawText(room, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, text)

    def _frame(self) -> Frame:
        (left, right), (bottom, top) = self._area.viewRange()
        return Frame(left, right, bottom, top, 1.0, max(float(self._area.rect().height()), 1.0))

    def _fit(self) -> None:
        """Be as wide as the longest name, and no wider than a gap when the names do not fit."""
        bold = QFont(self._font)
        bold.setWeight(QFont.Weight.DemiBold)
        metrics = QFontMetricsF(bold)
        longest = max((metrics.horizontalAdvance(f"↑ {label.text}") for label in self._labels), default=0.0)
        width = 12.0 if self.crowded or not self._labels else _LEADER + longest + _GAP
        if width != self._width:
            self._width = width
            self.setMinimumWidth(width)
            self.setMaximumWidth(width)
        self.update()

    def _moved(self, *_: object) -> None:
        self._fit()
