"""A word of the quiet line that opens a menu."""

from typing import Final

from PySide6.QtCore import QRectF, QSize, Qt
from PySide6.QtGui import QColor, QFontMetrics, QPainter, QPaintEvent
from PySide6.QtWidgets import QAbstractButton, QSizePolicy, QWidget

from app.look.theme import Theme
from app.panels.sweep.field import draw_arrow, draw_underline, lit

_SIDE: Final = 4
_ARROW: Final = 15


class QuietOpener(QAbstractButton):
    """A word with a small arrow; whoever listens to `clicked` opens the menu."""

    def __init__(self, theme: Theme, text: str, name: str, tip: str, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self.setText(text)
        self.setToolTip(tip)
        self.setStatusTip(tip)
        self.setAccessibleName(name)
        self.setAccessibleDescription(tip)
        self.setAttribute(Qt.WidgetAttribute.WA_Hover)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setSizePolicy(QSizePolicy.Policy.Fixed, QSizePolicy.Policy.Fixed)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.update()

    def sizeHint(self) -> QSize:
        """Return the room of the word and its arrow."""
        metrics = QFontMetrics(self.font())
        return QSize(metrics.horizontalAdvance(self.text()) + 2 * _SIDE + _ARROW, metrics.height() + 8)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw the word, the arrow and the underline."""
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QColor(self._theme.muted))
        room = QRectF(self.rect()).adjusted(_SIDE, 0, -_ARROW, 0)
        painter.drawText(room, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, self.text())
        draw_arrow(painter, self.rect(), self._theme)
        draw_underline(painter, self.rect(), self._theme, lit(self), False)
