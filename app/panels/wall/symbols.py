"""Symbols drawn on a sheet's line: resistance, inductance, capacitance in series, after IEC 60617."""

from collections.abc import Sequence
from typing import Final

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QPainter, QPainterPath, QPen

SYMBOL_HEIGHT: Final = 20.0
SYMBOL_GAP: Final = 6.0
HALF_WIDTH: Final = 6.0


def paint_sheet(
    painter: QPainter, x: float, top: float, bottom: float, parts: Sequence[str], ink: QColor, ground: QColor
) -> None:
    """Draw a sheet as a bold line from `top` to `bottom` with the symbols of its parts in its lower half.

    Without room for the symbols the line stands alone.
    """
    painter.setPen(QPen(ink, 3.0, Qt.PenStyle.SolidLine, Qt.PenCapStyle.FlatCap))
    painter.drawLine(QPointF(x, top), QPointF(x, bottom))
    tall = len(parts) * (SYMBOL_HEIGHT + SYMBOL_GAP) + SYMBOL_GAP
    middle = top + 0.7 * (bottom - top)
    y = min(middle - tall / 2, bottom - tall - SYMBOL_GAP)
    if y < top + SYMBOL_GAP:
        return
    back = QRectF(x - HALF_WIDTH - 3, y, 2 * HALF_WIDTH + 6, tall)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(ground)
    painter.drawRoundedRect(back, 4, 4)
    painter.setBrush(Qt.BrushStyle.NoBrush)
    painter.setPen(QPen(ink, 1.6, Qt.PenStyle.SolidLine, Qt.PenCapStyle.RoundCap, Qt.PenJoinStyle.RoundJoin))
    wire = QPainterPath(QPointF(x, y))
    for part in parts:
        wire.lineTo(x, y + SYMBOL_GAP)
        y += SYMBOL_GAP
        _add_symbol(wire, part, x, y)
        y += SYMBOL_HEIGHT
    wire.lineTo(x, y + SYMBOL_GAP)
    painter.drawPath(wire)


def _add_symbol(path: QPainterPath, part: str, x: float, y: float) -> None:
    """Add a symbol between (x, y) and (x, y + SYMBOL_HEIGHT); the path ends at its lower end."""
    end = y + SYMBOL_HEIGHT
    if part == "R":
        path.lineTo(x, y + 2)
        path.addRect(QRectF(x - HALF_WIDTH / 1.5, y + 2, HALF_WIDTH * 4 / 3, SYMBOL_HEIGHT - 4))
        path.moveTo(x, end - 2)
    elif part == "L":
        path.lineTo(x, y + 1)
        loop = (SYMBOL_HEIGHT - 2) / 3
        for number in range(3):
            path.arcTo(QRectF(x - loop / 2, y + 1 + number * loop, loop, loop), 90, -180)
    else:
        plate = y + SYMBOL_HEIGHT / 2 - 2.5
        path.lineTo(x, plate)
        for level in (plate, plate + 5):
            path.moveTo(x - HALF_WIDTH, level)
            path.lineTo(x + HALF_WIDTH, level)
        path.moveTo(x, plate + 5)
    path.lineTo(x, end)
