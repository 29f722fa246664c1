"""Draws a map into any painter: the widget, a picture or a page."""

import math
from dataclasses import dataclass
from typing import Final

import numpy as np
import pyqtgraph as pg
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QImage, QPainter, QPen

from app.look.theme import Theme
from app.panels.curves.scale import linear_ticks, logarithmic_ticks
from app.panels.maps.question import DrawnMap
from stackcore.arrays import FloatArray

COLOURS: Final = "viridis"
"""Even in lightness, so that it reads in grey, and safe for the colour-blind."""
LEFT, RIGHT, TOP, BOTTOM = 62, 92, 10, 44
BAR: Final = 14


@dataclass(frozen=True, slots=True)
class Frame:
    """Where the map stands, and how numbers at its axes become pixels."""

    area: QRectF
    x: tuple[float, float]
    y: tuple[float, float]
    log: bool

    def across(self, value: float) -> float:
        """Return the pixel of a number at the horizontal axis."""
        low, high = self.x
        if self.log:
            low, high, value = math.log(low), math.log(high), math.log(value)
        return self.area.left() + self.area.width() * (value - low) / (high - low)

    def down(self, value: float) -> float:
        """Return the pixel of a number at the vertical axis."""
        low, high = self.y
        return self.area.bottom() - self.area.height() * (value - low) / (high - low)


def frame_of(drawn: DrawnMap, width: float, height: float) -> Frame:
    """Return where the map stands in a picture of this size."""
    area = QRectF(LEFT, TOP, max(width - LEFT - RIGHT, 10), max(height - TOP - BOTTOM, 10))
    y = (float(drawn.y[0]), float(drawn.y[-1]))
    if y[0] == y[1]:
        y = (y[0] - 0.5, y[1] + 0.5)
    return Frame(area, (float(drawn.x[0]), float(drawn.x[-1])), y, drawn.question.log_frequency)


def image_of(values: FloatArray, low: float, high: float) -> QImage:
    """Return the cells as an image, the last row on top; what is not finite is the nearer end, or clear for NaN."""
    table = np.asarray(pg.colormap.get(COLOURS).getLookupTable(nPts=256, alpha=True), dtype=np.uint8)
    span = high - low if high > low else 1.0
    share = np.clip((np.nan_to_num(values, nan=low, posinf=high, neginf=low) - low) / span, 0.0, 1.0)
    pixels = table[np.asarray(share * 255, dtype=np.uint8)]
    pixels[np.isnan(values)] = 0
    turned = np.ascontiguousarray(pixels[::-1])
    rows, columns = values.shape
    image = QImage(turned.data, columns, rows, 4 * columns, QImage.Format.Format_RGBA8888)
    return image.copy()  # the buffer belongs to numpy


def paint_map(
    painter: QPainter,
    drawn: DrawnMap,
    width: float,
    height: float,
    theme: Theme,
    limits: tuple[float, float],
    cursor: tuple[int, int] | None = None,
) -> None:
    """Draw a map with its axes, its bar, the worst cell and the cell that is pointed at."""
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.fillRect(QRectF(0, 0, width, height), QColor(theme.base))
    frame = frame_of(drawn, width, height)
    painter.drawImage(frame.area, image_of(drawn.values, *limits))
    _axes(painter, drawn, frame, theme)
    _bar(painter, drawn, frame, theme, limits)
    if drawn.worst is not None:
        at = QPointF(frame.across(drawn.worst[1]), frame.down(drawn.worst[2]))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        for ink, wide in (("#000000", 3.5), ("#ffffff", 1.5)):
            painter.setPen(QPen(QColor(ink), wide))
            painter.drawEllipse(at, 7.0, 7.0)
    if cursor is not None:
        x, y = frame.across(float(drawn.x[cursor[1]])), frame.down(float(drawn.y[cursor[0]]))
        for ink, wide in (("#000000", 2.0), ("#ffffff", 1.0)):
            painter.setPen(QPen(QColor(ink), wide))
            painter.drawLine(QPointF(x, frame.area.top()), QPointF(x, frame.area.bottom()))
            painter.drawLine(QPointF(frame.area.left(), y), QPointF(frame.area.right(), y))


def _axes(painter: QPainter, drawn: DrawnMap, frame: Frame, theme: Theme) -> None:
    metrics = QFontMetricsF(painter.font())
    line = metrics.height()
    most = max(frame.area.width() / 70, 2)
    painter.setPen(QColor(theme.muted))
    for value, text in _ticks(frame, most):
        x = frame.across(value)
        painter.drawLine(QPointF(x, frame.area.bottom()), QPointF(x, frame.area.bottom() + 4))
        box = QRectF(x - 40, frame.area.bottom() + 4, 80, line)
        painter.drawText(box, Qt.AlignmentFlag.AlignCenter, text)
    for value, text in _even(*frame.y, frame.area.height() / 40):
        y = frame.down(value)
        painter.drawLine(QPointF(frame.area.left() - 4, y), QPointF(frame.area.left(), y))
        side = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
        painter.drawText(QRectF(0, y - line / 2, frame.area.left() - 7, line), side, text)
    painter.setPen(QColor(theme.text))
    below = QRectF(frame.area.left(), frame.area.bottom() + 6 + line, frame.area.width(), line)
    painter.drawText(below, Qt.AlignmentFlag.AlignCenter, drawn.titles[0])
    _upright(painter, 2, frame.area, line, drawn.titles[1])


def _bar(painter: QPainter, drawn: DrawnMap, frame: Frame, theme: Theme, limits: tuple[float, float]) -> None:
    low, high = limits
    bar = QRectF(frame.area.right() + 14, frame.area.top(), BAR, frame.area.height())
    painter.drawImage(bar, image_of(np.linspace(low, high, 256)[:, np.newaxis], low, high))
    line = QFontMetricsF(painter.font()).height()
    painter.setPen(QColor(theme.muted))
    for value, text in _even(low, high, bar.height() / 40):
        y = bar.bottom() - bar.height() * (value - low) / (high - low)
        painter.drawText(QRectF(bar.right() + 4, y - line / 2, 46, line), Qt.AlignmentFlag.AlignVCenter, text)
    painter.setPen(QColor(theme.text))
    _upright(painter, bar.right() + 46, frame.area, line, drawn.titles[2])


def _ticks(frame: Frame, most: float) -> list[tuple[float, str]]:
    """Return numbers at the horizontal axis and their texts."""
    if not frame.log:
        return _even(*frame.x, most)
    ends = [float(np.log10(end)) for end in frame.x]
    ticks = logarithmic_ticks(ends[0], ends[1], most)
    return [(10.0**at, text) for at, text in zip(ticks.major, ticks.texts, strict=True)]


def _even(low: float, high: float, most: float) -> list[tuple[float, str]]:
    ticks = linear_ticks(low, high, max(most, 2))
    return list(zip(ticks.major, ticks.texts, strict=True))


def _upright(painter: QPainter, left: float, area: QRectF, line: float, text: str) -> None:
    painter.save()
    painter.translate(left, area.bottom())
    painter.rotate(-90)
    painter.drawText(QRectF(0, 0, area.height(), line), Qt.AlignmentFlag.AlignCenter, text)
    painter.restore()
