"""The status line: what the result does not say on the left, what it took on the right."""

from collections.abc import Iterable
from typing import Final

from PySide6.QtCore import QSize, Qt
from PySide6.QtGui import QColor, QPalette, QResizeEvent
from PySide6.QtWidgets import QLabel, QSizePolicy, QStatusBar, QToolButton, QWidget

from app.look.theme import Theme
from app.window.cautions import STANDING, Caution

NOTE_TIME: Final = 6000
"""Milliseconds a passing note stays."""


class CautionLine(QToolButton):
    """The notes for what is shown, cut where there is no room; a click opens them in full."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._words = STANDING
        self.setAutoRaise(True)
        self.setAccessibleName("Cautions")
        self.setFocusPolicy(Qt.FocusPolicy.TabFocus)
        self.setToolButtonStyle(Qt.ToolButtonStyle.ToolButtonTextOnly)
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Preferred)

    def say(self, notes: Iterable[Caution]) -> None:
        """Show the notes, the weightiest first, and what always holds at the end."""
        self._words = " ".join([*(note.brief for note in notes), STANDING])
        self.setToolTip(f"{self._words}\nClick for all cautions and limits.")
        self.setAccessibleDescription(self._words)
        self._cut()

    @property
    def words(self) -> str:
        """Everything that is said, uncut."""
        return self._words

    def sizeHint(self) -> QSize:
        """Ask for as much room as the words need."""
        hint = super().sizeHint()
        return QSize(self.fontMetrics().horizontalAdvance(self._words) + 16, hint.height())

    def resizeEvent(self, event: QResizeEvent) -> None:
        """Cut anew for the new width."""
        super().resizeEvent(event)
        self._cut()

    def _cut(self) -> None:
        room = max(self.width() - 16, 0)
        text = self.fontMetrics().elidedText(self._words, Qt.TextElideMode.ElideRight, room)
        self.setText(text.replace("&", "&&"))


class StatusLine(QStatusBar):
    """Cautions, progress, and points and time; passing notes cover the cautions for a while."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.cautions = CautionLine(self)
        self._told = QLabel(self)
        self._told.setAccessibleName("State of the calculation")
        self._told.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        self._told.setContentsMargins(8, 0, 16, 0)
        self.setSizeGripEnabled(False)
        self.setContentsMargins(8, 0, 0, 4)
        self.addWidget(self.cautions, 1)
        self.addPermanentWidget(self._told)
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""
        palette = QPalette(self.palette())
        for role in (QPalette.ColorRole.WindowText, QPalette.ColorRole.ButtonText):
            palette.setColor(role, QColor(theme.muted))
        for widget in (self, self.cautions, self._told):
            widget.setPalette(palette)

    @property
    def told(self) -> str:
        """What the right side says."""
        return self._told.text()

    def tell(self, text: str) -> None:
        """Say on the right what is computed, or why it is old."""
        self._told.setText(text)

    def note(self, text: str) -> None:
        """Show a passing note."""
        self.showMessage(text, NOTE_TIME)
