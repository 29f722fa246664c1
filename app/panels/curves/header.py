"""The line above the plot: the worst value, what is not shown, how fresh the curves are, the legend."""

from typing import Final

from PySide6.QtCore import Qt, QTimer, Signal
from PySide6.QtGui import QColor, QPalette
from PySide6.QtWidgets import QLabel, QToolButton, QWidget

from app.look.theme import Theme
from app.panels.curves.legend import Legend
from app.panels.sweep.flow import FlowLayout

PATIENCE: Final = 200
"""Milliseconds of computing after which it is worth saying so."""

LAST_GOOD: Final = "last good result"
COMPUTING: Final = "computing…"


class Header(QWidget):
    """One line of words that wraps when the panel is narrow."""

    marker_wanted = Signal()

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.worst = QLabel()
        self.worst.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        self.worst.setAccessibleName("Worst point")
        self.hidden = QLabel()
        self.doubt = QLabel()
        self.doubt.setAccessibleName("Beyond material data")
        self.state = QLabel()
        self.state.setAccessibleName("State of the curves")
        self.legend = Legend(theme)
        self.add = QToolButton()
        self.add.setText("Add marker")
        self.add.setToolTip("Add a marker; in the plot M or Ctrl and click does the same.")
        self.add.setAutoRaise(True)
        self.add.setFocusPolicy(Qt.FocusPolicy.TabFocus)
        self.add.clicked.connect(self.marker_wanted.emit)
        flow = FlowLayout(self, across=16, down=2)
        for part in (self.worst, self.hidden, self.doubt, self.state, self.legend, self.add):
            flow.addWidget(part)
        self.hidden.hide()
        self.doubt.hide()
        self.state.hide()
        self.legend.hide()
        self._stale = self._busy = False
        self._wait = QTimer(self)
        self._wait.setSingleShot(True)
        self._wait.setInterval(PATIENCE)
        self._wait.timeout.connect(self._show_state)
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        for label in (self.worst, self.hidden, self.doubt, self.state):
            ink = theme.text if label is self.worst else theme.warning
            palette = label.palette()
            palette.setColor(QPalette.ColorRole.WindowText, QColor(ink))
            label.setPalette(palette)
        self.legend.set_theme(theme)

    def set_worst(self, sentence: str) -> None:
        """Say the worst value."""
        self.worst.setText(sentence)
        self.worst.setVisible(bool(sentence))

    def set_hidden(self, sentence: str) -> None:
        """Say what the plot cannot show; empty for nothing."""
        self.hidden.setText(sentence)
        self.hidden.setVisible(bool(sentence))

    def set_doubt(self, sentence: str) -> None:
        """Say why parts of the curves are dotted; empty for nothing."""
        self.doubt.setText("Dotted parts: beyond material data" if sentence else "")
        self.doubt.setToolTip(f"{sentence}.")
        self.doubt.setAccessibleDescription(f"{sentence}.")
        self.doubt.setVisible(bool(sentence))

    def set_stale(self, stale: bool) -> None:
        """Say that the curves are those of an earlier job."""
        self._stale = stale
        self._show_state()

    def set_busy(self, busy: bool) -> None:
        """Say that something is being computed, once it takes longer than `PATIENCE`."""
        if busy == self._busy:
            return
        self._busy = busy
        if busy and self.isVisible():
            self._wait.start()
        else:
            self._wait.stop()
            self._show_state()

    def hideEvent(self, event: object) -> None:
        """Stop waiting: nobody looks."""
        self._wait.stop()

    def _show_state(self) -> None:
        waited = self._busy and not self._wait.isActive()
        words = [text for text, said in ((LAST_GOOD, self._stale), (COMPUTING, waited)) if said]
        self.state.setText(" · ".join(words))
        self.state.setVisible(bool(words))
