"""Draws a map into any painter: the widget, a picture or a page."""

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Final

import numpy as np
import pyqtgraph as pg
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QImage, QPainter, QPen, QPolygonF

from app.look.theme import Theme
from app.panels.curves.scale import WIDE, linear_ticks, logarithmic_ticks
from app.panels.maps.question import DrawnMap
from app.series.texts import frequency_text
from stackcore.arrays import FloatArray

COLOURS: Final = "viridis"
"""Even in lightness, so that it reads in grey, and safe for the colour-blind."""
LEFT, RIGHT, TOP, BOTTOM = 62, 92, 10, 44
PROFILE: Final = 52
"""Height and width of the cuts above the map and beside it."""
ROOMY: Final = (400, 320)
"""Least size with cuts."""
BAR: Final = 14


@dataclass(frozen=True, slots=True)
class Frame:
    """Where the map stands, and how numbers at its axes become pixels."""

    area: QRectF
    x: tuple[float, float]
    y: tuple[float, float]
    log: bool
    cuts: bool = False

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
    """Return where the map stands in a picture of this size, with room for the cuts when it is roomy."""
    room = PROFILE if width >= ROOMY[0] and height >= ROOMY[1] else 0
    wide, high = width - LEFT - RIGHT - room, height - TOP - BOTTOM - room
    area = QRectF(LEFT, TOP + room, max(wide, 10), max(high, 10))
    y = (float(drawn.y[0]), float(drawn.y[-1]))
    if y[0] == y[1]:
        y = (y[0] - 0.5, y[1] + 0.5)
    x = (float(drawn.x[0]), float(drawn.x[-1]))
    return Frame(area, x, y, drawn.question.log_frequency, cuts=bool(room))


def cells_of(drawn: DrawnMap, area: QRectF) -> QRectF:
    """Return where the image lies: each value in the middle of its cell, the first and last at the edges."""
    rows, columns = drawn.values.shape
    across = area.width() / max(columns - 1, 1) / 2 if columns > 1 else 0.0
    down = area.height() / max(rows - 1, 1) / 2 if rows > 1 else 0.0
    return area.adjusted(-across, -down, across, down)


def cell_at(drawn: DrawnMap, area: QRectF, at: QPointF) -> tuple[int, int] | None:
    """Return row and column of the cell at a pixel, None outside the map."""
    if not area.contains(at):
        return None
    rows, columns = drawn.values.shape
    across = (at.x() - area.left()) / area.width() * (columns - 1)
    up = (area.bottom() - at.y()) / area.height() * (rows - 1)
    return round(up), round(across)


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
    painter.save()
    painter.setClipRect(frame.area)
    painter.drawImage(cells_of(drawn, frame.area), image_of(drawn.values, *limits))
    painter.restore()
    _axes(painter, drawn, frame, theme)
    _bar(painter, drawn, frame, theme, limits)
    cell = cursor or worst_cell(drawn)
    if frame.cuts and cell is not None:
        _cuts(painter, drawn, frame, theme, limits, cell)
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


def worst_cell(drawn: DrawnMap) -> tuple[int, int] | None:
    """Return row and column of the worst cell, None where no value is worse than another."""
    if drawn.worst is None:
        return None
    _, x, y = drawn.worst
    return int(np.argmin(np.abs(drawn.y - y))), int(np.argmin(np.abs(drawn.x - x)))


def _cuts(
    painter: QPainter,
    drawn: DrawnMap,
    frame: Frame,
    theme: Theme,
    limits: tuple[float, float],
    cell: tuple[int, int],
) -> None:
    """Draw the values along the row and the column of a cell, above the map and beside it, between the limits."""
    row, column = cell
    area, (low, high) = frame.area, limits
    above = QRectF(area.left(), area.top() - PROFILE, area.width(), PROFILE - 6)
    beside = QRectF(area.right() + 6, area.top(), PROFILE - 6, area.height())
    painter.setPen(QPen(QColor(theme.line), 1.0))
    painter.drawLine(above.bottomLeft(), above.bottomRight())
    painter.drawLine(beside.topLeft(), beside.bottomLeft())
    painter.setPen(QPen(QColor(theme.text), 1.2))
    share = np.clip((drawn.values - low) / (high - low if high > low else 1.0), 0.0, 1.0)
    across = [frame.across(float(x)) for x in drawn.x]
    _line(painter, across, [above.bottom() - one * above.height() for one in share[row].tolist()])
    down = [frame.down(float(y)) for y in drawn.y]
    _line(painter, [beside.left() + one * beside.width() for one in share[:, column].tolist()], down)
    painter.setPen(QPen(QColor(theme.accent), 1.0, Qt.PenStyle.DotLine))
    x, y = across[column], down[row]
    painter.drawLine(QPointF(x, above.top()), QPointF(x, above.bottom()))
    painter.drawLine(QPointF(beside.left(), y), QPointF(beside.right(), y))


def _line(painter: QPainter, xs: Sequence[float], ys: Sequence[float]) -> None:
    """Draw a line through the points that are numbers."""
    run: list[QPointF] = []
    for x, y in zip(xs, ys, strict=True):
        if math.isfinite(x) and math.isfinite(y):
            run.append(QPointF(x, y))
            continue
        painter.drawPolyline(QPolygonF(run))
        run = []
    painter.drawPolyline(QPolygonF(run))


def _axes(painter: QPainter, drawn: DrawnMap, frame: Frame, theme: Theme) -> None:
    metrics = QFontMetricsF(painter.font())
    line = metrics.height()
    most = max(frame.area.width() / 70, 2)
    painter.setPen(QColor(theme.muted))
    for value, text in _ticks(drawn, frame, most):
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
    spelled = frame.log and frame.x[1] > frame.x[0] * WIDE
    title = drawn.titles[0].partition(",")[0] if spelled else drawn.titles[0]
    painter.drawText(below, Qt.AlignmentFlag.AlignCenter, title)
    _upright(painter, 2, frame.area, line, drawn.titles[1])


def _bar(painter: QPainter, drawn: DrawnMap, frame: Frame, theme: Theme, limits: tuple[float, float]) -> None:
    low, high = limits
    room = PROFILE if frame.cuts else 0
    bar = QRectF(frame.area.right() + 14 + room, frame.area.top(), BAR, frame.area.height())
    painter.drawImage(bar, image_of(np.linspace(low, high, 256)[:, np.newaxis], low, high))
    line = QFontMetricsF(painter.font()).height()
    painter.setPen(QColor(theme.muted))
    for value, text in _even(low, high, bar.height() / 40):
        y = bar.bottom() - bar.height() * (value - low) / (high - low)
        painter.drawText(QRectF(bar.right() + 4, y - line / 2, 46, line), Qt.AlignmentFlag.AlignVCenter, text)
    painter.setPen(QColor(theme.text))
    _upright(painter, bar.right() + 46, frame.area, line, drawn.titles[2])


def _ticks(drawn: DrawnMap, frame: Frame, most: float) -> list[tuple[float, str]]:
    """Return numbers at the horizontal axis and their texts; over a very wide band each with its own unit."""
    if not frame.log:
        return _even(*frame.x, most)
    ends = [float(np.log10(end)) for end in frame.x]
    spell = None
    if frame.x[1] > frame.x[0] * WIDE:
        factor = float(drawn.x[-1] / drawn.level.x[-1])
        spell = _speller(factor)
    ticks = logarithmic_ticks(ends[0], ends[1], most, spell)
    return [(10.0**at, text) for at, text in zip(ticks.major, ticks.texts, strict=True)]


def _speller(factor: float) -> Callable[[float], str]:
    return lambda value: frequency_text(value / factor)


def _even(low: float, high: float, most: float) -> list[tuple[float, str]]:
    ticks = linear_ticks(low, high, max(most, 2))
    return list(zip(ticks.major, ticks.texts, strict=True))


def _upright(painter: QPainter, left: float, area: QRectF, line: float, text: str) -> None:
    painter.save()
    painter.translate(left, area.bottom())
    painter.rotate(-90)
    painter.drawText(QRectF(0, 0, area.height(), line), Qt.AlignmentFlag.AlignCenter, text)
    painter.restore()
