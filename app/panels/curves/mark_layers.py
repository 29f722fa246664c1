"""Marks over the curves: worst points, markers with their readings, and what the mouse points at."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Final

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPen

from app.look.theme import Theme
from app.panels.curves.frame import Frame
from app.panels.curves.layer import Layer

_DOT: Final = 3.5
_FLAG: Final = 4.0
_REACH: Final = 6.0


@dataclass(frozen=True, slots=True)
class Spot:
    """A point of the plane of the plot with the colour of its curve."""

    position: float
    value: float
    colour: str


@dataclass(frozen=True, slots=True)
class DrawnMarker:
    """A marker: its number as written, where it stands, and its readings on the curves."""

    text: str
    position: float
    active: bool
    spots: tuple[Spot, ...] = ()


class WorstLayer(Layer):
    """A small open diamond at the worst point of each curve; the worst of all has a ring around it."""

    def __init__(self, area: Any, height: float, theme: Theme) -> None:
        super().__init__(area, height)
        self.theme = theme
        self.spots: tuple[Spot, ...] = ()
        self.worst: int | None = None

    def set_spots(self, spots: Sequence[Spot], worst: int | None) -> None:
        """Mark these points; `worst` is the index of the one that is worst of all."""
        self.spots = tuple(spots)
        self.worst = worst
        self.update()

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw the diamonds, the worst of all on top."""
        for index, spot in sorted(enumerate(self.spots), key=lambda pair: pair[0] == self.worst):
            x, y = frame.across(spot.position), frame.down(spot.value)
            if not frame.holds(x, y):
                continue
            painter.setPen(QPen(QColor(spot.colour), 1.4))
            painter.setBrush(QColor(self.theme.base))
            painter.drawPolygon(
                [QPointF(x, y - _DOT), QPointF(x + _DOT, y), QPointF(x, y + _DOT), QPointF(x - _DOT, y)]
            )
            if index == self.worst:
                painter.setBrush(Qt.BrushStyle.NoBrush)
                painter.drawEllipse(QPointF(x, y), 7.5, 7.5)


class MarkerLayer(Layer):
    """A vertical line a marker, with its number at the top and a dot on each curve."""

    def __init__(self, area: Any, height: float, theme: Theme) -> None:
        super().__init__(area, height)
        self.theme = theme
        self.font = QFont()
        self.markers: tuple[DrawnMarker, ...] = ()

    def set_markers(self, markers: Sequence[DrawnMarker]) -> None:
        """Show these markers."""
        self.markers = tuple(markers)
        self.update()

    def at(self, point: QPointF, frame: Frame) -> int | None:
        """Return the index of the marker whose line or flag is at a pixel of the plot area, or None."""
        if point.y() < 0:
            flags = [self.flag(marker, frame) for marker in self.markers]
            return next((index for index, flag in enumerate(flags) if flag.contains(point)), None)
        gaps = [abs(frame.across(marker.position) - point.x()) for marker in self.markers]
        best = min(range(len(gaps)), key=gaps.__getitem__, default=None)
        return best if best is not None and gaps[best] <= _REACH else None

    def flag(self, marker: DrawnMarker, frame: Frame) -> QRectF:
        """Return where the flag of a marker is: above the plot area, so that it hides no curve."""
        metrics = QFontMetricsF(self.font)
        width, height = max(metrics.horizontalAdvance(marker.text) + 8.0, 18.0), metrics.height() + 2.0
        left = frame.across(marker.position) - width / 2
        return QRectF(min(max(left, 0.5), max(frame.width - width - 0.5, 0.5)), -height - 2.5, width, height)

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw the markers, the active one on top."""
        for marker in sorted(self.markers, key=lambda one: one.active):
            x = frame.across(marker.position)
            if not -0.5 <= x <= frame.width + 0.5:
                continue
            colour = QColor(self.theme.accent if marker.active else self.theme.muted)
            painter.setPen(QPen(colour, 1.0))
            painter.drawLine(QPointF(x, -2.5), QPointF(x, frame.height))
            for spot in marker.spots:
                y = frame.down(spot.value)
                if frame.holds(x, y):
                    painter.setPen(QPen(QColor(self.theme.base), 1.0))
                    painter.setBrush(QColor(spot.colour))
                    painter.drawEllipse(QPointF(x, y), _DOT, _DOT)
            self._draw_flag(painter, marker, self.flag(marker, frame), colour)

    def _draw_flag(self, painter: QPainter, marker: DrawnMarker, flag: QRectF, colour: QColor) -> None:
        painter.setFont(self.font)
        painter.setPen(QPen(colour, 1.0))
        painter.setBrush(colour if marker.active else QColor(self.theme.base))
        painter.drawRoundedRect(flag, _FLAG, _FLAG)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.setPen(QColor(self.theme.on_accent if marker.active else self.theme.text))
        painter.drawText(flag, Qt.AlignmentFlag.AlignCenter, marker.text)


class LevelLayer(Layer):
    """A dashed line across the plot at a level that the marker is taken to."""

    def __init__(self, area: Any, height: float, theme: Theme) -> None:
        super().__init__(area, height)
        self.theme = theme
        self.level: float | None = None

    def set_level(self, level: float | None) -> None:
        """Draw the line at a value, or none."""
        if level != self.level:
            self.level = level
            self.update()

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw the line."""
        if self.level is None or not frame.bottom <= self.level <= frame.top:
            return
        pen = QPen(QColor(self.theme.accent), 1.0)
        pen.setDashPattern([6.0, 4.0])
        painter.setPen(pen)
        y = frame.down(self.level)
        painter.drawLine(QPointF(0.0, y), QPointF(frame.width, y))


class PointerLayer(Layer):
    """A hair line under the mouse and a ring on the curve it is nearest to."""

    def __init__(self, area: Any, height: float, theme: Theme) -> None:
        super().__init__(area, height)
        self.theme = theme
        self.spot: Spot | None = None
        self.box: QRectF | None = None

    def point(self, spot: Spot | None) -> None:
        """Point at this spot, or at nothing."""
        if spot != self.spot:
            self.spot = spot
            self.update()

    def set_box(self, box: QRectF | None) -> None:
        """Outline the part of the plot that is being chosen, in pixels, or nothing."""
        self.box = box
        self.update()

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw the hair line and the ring."""
        if self.box is not None:
            ground = QColor(self.theme.accent)
            painter.setPen(QPen(ground, 1.0))
            ground.setAlphaF(0.12)
            painter.setBrush(ground)
            painter.drawRect(self.box)
            painter.setBrush(Qt.BrushStyle.NoBrush)
        if self.spot is None:
            return
        x, y = frame.across(self.spot.position), frame.down(self.spot.value)
        hair = QPen(QColor(self.theme.muted), 1.0)
        hair.setDashPattern([1.0, 3.0])
        painter.setPen(hair)
        painter.drawLine(QPointF(x, 0.0), QPointF(x, frame.height))
        if frame.holds(x, y):
            painter.setPen(QPen(QColor(self.spot.colour), 1.6))
            painter.drawEllipse(QPointF(x, y), 4.5, 4.5)
