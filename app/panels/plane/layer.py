"""What is drawn in the complex plane: circles or the impedance grid, curves with their direction, markers."""

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Any, Final

import numpy as np
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QPainter, QPainterPath, QPen, QPolygonF

from app.look.theme import Theme
from app.panels.curves.curve_layer import DOTTED
from app.panels.curves.frame import Frame, finite_runs
from app.panels.curves.layer import Layer
from stackcore.arrays import ComplexArray

RESISTANCES: Final = (0.2, 0.5, 1.0, 2.0, 5.0)
REACTANCES: Final = (0.2, 0.5, 1.0, 2.0, 5.0)
"""Of the impedance grid, normalised to the impedance of the incident wave."""
MAGNITUDES: Final = (0.25, 0.5, 0.75)
_ARROW: Final = 7.0
_DOT: Final = 3.5


@dataclass(frozen=True, slots=True, eq=False)
class DrawnPath:
    """One curve of the plane.

    Parameters
    ----------
    values
        Complex, in the order of frequency.
    colour, dashes
        As the curves over frequency have them.
    chosen
        Drawn a little wider.
    held
        Whether the whole curve stands on known data; it is dotted otherwise.
    """

    values: ComplexArray
    colour: str
    dashes: tuple[float, ...] = ()
    chosen: bool = False
    held: bool = True


@dataclass(frozen=True, slots=True)
class PlaneMark:
    """A marker on a curve: its number, its place, and whether it is the active one."""

    text: str
    value: complex
    active: bool


class PlaneLayer(Layer):
    """Draws the plane; knows no job."""

    def __init__(self, area: Any, height: float, theme: Theme) -> None:
        super().__init__(area, height)
        self.theme = theme
        self.font = QFont()
        self.paths: tuple[DrawnPath, ...] = ()
        self.marks: tuple[PlaneMark, ...] = ()
        self.bounded, self.impedances = True, False
        self.pointed: complex | None = None

    def show_paths(
        self, paths: Sequence[DrawnPath], marks: Sequence[PlaneMark], *, bounded: bool, impedances: bool
    ) -> None:
        """Draw these; `bounded` with circles of magnitude, or the grid of impedances instead."""
        self.paths, self.marks = tuple(paths), tuple(marks)
        self.bounded, self.impedances = bounded, impedances
        self.update()

    def point(self, value: complex | None) -> None:
        """Ring a point of the plane, or none."""
        self.pointed = value
        self.update()

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw everything that is visible."""
        painter.setClipRect(QRectF(-1.5, -1.5, frame.width + 3.0, frame.height + 3.0))
        self._draw_cross(painter, frame)
        if self.impedances:
            self._draw_impedances(painter, frame)
        elif self.bounded:
            self._draw_circles(painter, frame)
        for path in sorted(self.paths, key=lambda one: one.chosen):
            self._draw_path(painter, frame, path)
        for mark in self.marks:
            self._draw_mark(painter, frame, mark)
        if self.pointed is not None:
            painter.setBrush(Qt.BrushStyle.NoBrush)
            painter.setPen(QPen(QColor(self.theme.text), 1.6))
            painter.drawEllipse(_pixel(frame, self.pointed), 5.0, 5.0)

    def _draw_cross(self, painter: QPainter, frame: Frame) -> None:
        painter.setPen(QPen(QColor(self.theme.muted), 1.0))
        middle = _pixel(frame, 0j)
        painter.drawLine(QPointF(0, middle.y()), QPointF(frame.width, middle.y()))
        painter.drawLine(QPointF(middle.x(), 0), QPointF(middle.x(), frame.height))

    def _draw_circles(self, painter: QPainter, frame: Frame) -> None:
        painter.setBrush(Qt.BrushStyle.NoBrush)
        for radius in (*MAGNITUDES, 1.0):
            ink = self.theme.muted if radius == 1.0 else self.theme.line
            painter.setPen(QPen(QColor(ink), 1.0))
            _circle(painter, frame, 0j, radius)

    def _draw_impedances(self, painter: QPainter, frame: Frame) -> None:
        """Draw circles of constant resistance, and the arcs of constant reactance within the unit circle."""
        painter.setBrush(Qt.BrushStyle.NoBrush)
        inside = QPainterPath()
        middle = _pixel(frame, 0j)
        inside.addEllipse(middle, *_radii(frame, 1.0))
        painter.save()
        painter.setClipPath(inside, Qt.ClipOperation.IntersectClip)
        painter.setPen(QPen(QColor(self.theme.line), 1.0))
        for resistance in RESISTANCES:
            _circle(painter, frame, complex(resistance / (1 + resistance), 0), 1 / (1 + resistance))
        for reactance in REACTANCES:
            for sign in (1, -1):
                _circle(painter, frame, complex(1, sign / reactance), 1 / reactance)
        painter.restore()
        painter.setPen(QPen(QColor(self.theme.muted), 1.0))
        _circle(painter, frame, 0j, 1.0)
        painter.setFont(self.font)
        metrics = QFontMetricsF(self.font)
        for resistance in RESISTANCES:
            at = _pixel(frame, complex((resistance - 1) / (resistance + 1), 0))
            painter.drawText(at + QPointF(3, -3), f"{resistance:g}")
        for reactance in REACTANCES:
            for sign in (1, -1):
                z = 1j * sign * reactance
                at = _pixel(frame, (z - 1) / (z + 1))
                text = f"{'+' if sign > 0 else '−'}j{reactance:g}"
                away = at - middle
                length = max(math.hypot(away.x(), away.y()), 1.0)
                centre = at + away * (metrics.height() * 0.9 / length)
                box = QRectF(0, 0, metrics.horizontalAdvance(text) + 2, metrics.height())
                box.moveCenter(centre)
                painter.drawText(box, Qt.AlignmentFlag.AlignCenter, text)

    def _draw_path(self, painter: QPainter, frame: Frame, path: DrawnPath) -> None:
        width = 2.4 if path.chosen else 1.6
        pen = QPen(QColor(path.colour), width)
        dashes = path.dashes if path.held else DOTTED
        if dashes:
            pen.setDashPattern([length / width for length in dashes])
        pen.setCapStyle(Qt.PenCapStyle.FlatCap)
        painter.setPen(pen)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        x, y = frame.across(path.values.real), frame.down(path.values.imag)
        for begin, end in finite_runs(x + y):
            points = QPolygonF([QPointF(a, b) for a, b in zip(x[begin:end], y[begin:end], strict=True)])
            painter.drawPolyline(points)
        known = np.flatnonzero(np.isfinite(x + y))
        if known.size:
            painter.setPen(QPen(QColor(path.colour), 1.4))
            painter.setBrush(QColor(self.theme.base))
            painter.drawEllipse(QPointF(x[known[0]], y[known[0]]), _DOT, _DOT)
            self._draw_arrow(painter, path.colour, x[known], y[known])

    @staticmethod
    def _draw_arrow(painter: QPainter, colour: str, x: np.ndarray[Any, Any], y: np.ndarray[Any, Any]) -> None:
        """Draw an arrow at the end of a curve, along it; nothing where it does not move."""
        tip = QPointF(x[-1], y[-1])
        gaps = np.hypot(x - tip.x(), y - tip.y())
        before = np.flatnonzero(gaps > _ARROW / 2)
        if not before.size:
            return
        start = QPointF(x[before[-1]], y[before[-1]])
        way = tip - start
        length = math.hypot(way.x(), way.y())
        along = way / length
        across = QPointF(-along.y(), along.x())
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(QColor(colour))
        foot = tip - along * _ARROW
        painter.drawPolygon(QPolygonF([tip, foot + across * (_ARROW / 2), foot - across * (_ARROW / 2)]))

    def _draw_mark(self, painter: QPainter, frame: Frame, mark: PlaneMark) -> None:
        if not np.isfinite(mark.value):
            return
        at = _pixel(frame, mark.value)
        ink = QColor(self.theme.accent if mark.active else self.theme.muted)
        painter.setPen(QPen(QColor(self.theme.base), 1.0))
        painter.setBrush(ink)
        painter.drawEllipse(at, _DOT + 0.5, _DOT + 0.5)
        painter.setFont(self.font)
        painter.setPen(ink)
        painter.drawText(at + QPointF(6, -4), mark.text)


def _pixel(frame: Frame, value: complex) -> QPointF:
    return QPointF(frame.across(value.real), frame.down(value.imag))


def _radii(frame: Frame, radius: float) -> tuple[float, float]:
    return (
        radius * frame.width / (frame.right - frame.left),
        radius * frame.height / (frame.top - frame.bottom),
    )


def _circle(painter: QPainter, frame: Frame, centre: complex, radius: float) -> None:
    painter.drawEllipse(_pixel(frame, centre), *_radii(frame, radius))
