"""Small bridges from values to Qt: boxes, colours, measuring text."""

from PySide6.QtCore import QRectF
from PySide6.QtGui import QColor, QFontMetricsF

from app.panels.wall.geometry import Box


class FontMeasure:
    """The text measure of a font on the device that is painted on."""

    def __init__(self, metrics: QFontMetricsF) -> None:
        self._metrics = metrics
        self._widths: dict[str, float] = {}

    @property
    def line(self) -> float:
        """Height of a line in px."""
        return self._metrics.height()

    def width(self, text: str) -> float:
        """Return the width of `text` in px."""
        if text not in self._widths:
            self._widths[text] = self._metrics.horizontalAdvance(text)
        return self._widths[text]


def colour(code: str, alpha: float = 1.0) -> QColor:
    """Return a theme's colour, made transparent."""
    made = QColor(code)
    made.setAlphaF(alpha)
    return made


def rectangle(box: Box) -> QRectF:
    """Return a box as Qt has it."""
    return QRectF(box.left, box.top, box.width, box.height)
