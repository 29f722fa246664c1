"""The status line: what the result does not say on the left, what it took on the right."""

from collections.abc import Iterable
from typing import Final

from PySide6.QtCore import QRect, QSize, Qt
from PySide6.QtGui import QColor, QPainter, QPaintEvent, QPalette, QPen
from PySide6.QtWidgets import QAbstractButton, QLabel, QSizePolicy, QStatusBar, QWidget

from app.look.theme import Theme
from app.window.cautions import STANDING, Caution

NOTE_TIME: Final = 6000
"""Milliseconds a passing note stays."""
PAD: Final = 8


class CautionLine(QAbstractButton):
    """The notes for what is shown, cut where there is no room; a click opens them in full."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._words = STANDING
        self.setAccessibleName("Cautions")
        self.setFocusPolicy(Qt.FocusPolicy.TabFocus)
        self.setCursor(Qt.CursorShape.PointingHandCursor)
        self.setAttribute(Qt.WidgetAttribute.WA_Hover)
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Preferred)

    def say(self, notes: Iterable[Caution]) -> None:
        """Show the notes, the weightiest first, and what always holds at the end."""
        self._words = " ".join([*(note.brief for note in notes), STANDING])
        self.setToolTip(f"{self._words}\nClick for all cautions and limits.")
        self.setAccessibleDescription(self._words)
        self.update()

    @property
    def words(self) -> str:
        """Everything that is said, uncut."""
        return self._words

    def sizeHint(self) -> QSize:
        """Ask for as much room as the words need."""
        metrics = self.fontMetrics()
        return QSize(metrics.horizontalAdvance(self._words) + 2 * PAD, metrics.height() + PAD)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw the words from the left, underlined under the mouse, with a frame when focused."""
        painter = QPainter(self)
        room = self.rect().adjusted(PAD, 0, -PAD, 0)
        font = self.font()
        font.setUnderline(self.underMouse())
        painter.setFont(font)
        painter.setPen(self.palette().color(QPalette.ColorRole.WindowText))
        draw_words(painter, room, self._words)
        if self.hasFocus():
            painter.setPen(QPen(self.palette().color(QPalette.ColorRole.Highlight), 2))
            painter.drawRoundedRect(self.rect().adjusted(1, 1, -1, -1), 4, 4)
        painter.end()


def draw_words(painter: QPainter, room: QRect, words: str) -> None:
    """Write `words` into `room` from the left, cut short where there is no room."""
    text = painter.fontMetrics().elidedText(words, Qt.TextElideMode.ElideRight, room.width())
    painter.drawText(room, Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter, text)


class StatusLine(QStatusBar):
    """Cautions, progress, and points and time; passing notes cover the cautions for a while."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.cautions = CautionLine(self)
        self._told = QLabel(self)
        self._told.setAccessibleName("State of the calculation")
        self._told.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        self._told.setContentsMargins(8, 0, 8, 0)
        self.setSizeGripEnabled(False)
        self.setContentsMargins(0, 0, 0, 4)
        self.addWidget(self.cautions, 1)
        self.addPermanentWidget(self._told)
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""
        palette = QPalette(self.palette())
        palette.setColor(QPalette.ColorRole.WindowText, QColor(theme.muted))
        for widget in (self, self.cautions, self._told):
            widget.setPalette(palette)

    def add_progress(self, widget: QWidget) -> None:
        """Put `widget` between the cautions and the state of the calculation."""
        self.insertPermanentWidget(1, widget)

    @property
    def told(self) -> str:
        """What the right side says."""
        return self._told.text()

    def tell(self, text: str) -> None:
        """Say on the right what is computed, or why it is old."""
        self._told.setText(text)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Write the passing note exactly where the cautions stand; Qt would put it a little beside."""
        painter = QPainter(self)
        if self.currentMessage():
            painter.setPen(self.palette().color(QPalette.ColorRole.WindowText))
            draw_words(painter, self.cautions.geometry().adjusted(PAD, 0, -PAD, 0), self.currentMessage())
        painter.end()

    def point(self, text: str) -> None:
        """Show what the mouse or the keys point at in the plot, for as long as they do."""
        if text:
            self.showMessage(text)
        else:
            self.clearMessage()

    def note(self, text: str) -> None:
        """Show a passing note."""
        self.showMessage(text, NOTE_TIME)
