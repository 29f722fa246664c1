"""Words in the middle of the plot: what will be there while it is empty."""

from typing import Any

from PySide6.QtCore import QRectF, Qt
from PySide6.QtGui import QColor, QFont, QPainter

from app.look.theme import Theme
from app.panels.curves.frame import Frame
from app.panels.curves.layer import Layer


class NoteLayer(Layer):
    """Shows one short text, wrapped, in the middle of the plot area."""

    def __init__(self, area: Any, height: float, theme: Theme) -> None:
        super().__init__(area, height)
        self.theme = theme
        self.font = QFont()
        self.text = ""

    def set_text(self, text: str) -> None:
        """Show this text; empty for none."""
        if text != self.text:
            self.text = text
            self.update()

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Write the text."""
        if not self.text:
            return
        painter.setFont(self.font)
        painter.setPen(QColor(self.theme.muted))
        margin = min(48.0, frame.width * 0.08)
        room = QRectF(margin, 8.0, frame.width - 2 * margin, frame.height - 16.0)
        flags = int(Qt.AlignmentFlag.AlignCenter | Qt.TextFlag.TextWordWrap)
        # On a ground of its own, so that neither the grid nor a marker runs through the words.
        painter.fillRect(
            painter.boundingRect(room, flags, self.text).adjusted(-6, -2, 6, 2), QColor(self.theme.base)
        )
        painter.drawText(room, flags, self.text)
