"""The program's icon: three slabs and a ray that bends through them, drawn rather than stored."""

from typing import Final

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QIcon, QPainter, QPen, QPixmap

SIZES: Final = (16, 24, 32, 48, 64, 128, 256)


def program_icon() -> QIcon:
    """Return the icon in all usual sizes."""
    icon = QIcon()
    for size in SIZES:
        icon.addPixmap(_draw(size))
    return icon


def _draw(size: int) -> QPixmap:
    picture = QPixmap(size, size)
    picture.fill(Qt.GlobalColor.transparent)
    painter = QPainter(picture)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.scale(size / 64, size / 64)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor("#fcfbf9"))
    painter.drawRoundedRect(QRectF(2, 2, 60, 60), 8, 8)
    for left, width, colour in ((20, 6, "#b08d57"), (26, 14, "#e6e3dd"), (40, 6, "#b08d57")):
        painter.fillRect(QRectF(left, 6, width, 52), QColor(colour))
    pen = QPen(QColor("#d55e00"), 5)
    pen.setCapStyle(Qt.PenCapStyle.RoundCap)
    pen.setJoinStyle(Qt.PenJoinStyle.RoundJoin)
    painter.setPen(pen)
    painter.drawPolyline([QPointF(7, 48), QPointF(20, 38), QPointF(46, 30), QPointF(57, 22)])
    painter.end()
    return picture
