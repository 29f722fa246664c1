"""The one place that shows messages: a strip below the menu bar that waits for nobody.

Everything that has something to say is given `Messages.tell`. A note goes to the status line for a while; a
warning, an error, or anything with a button stays in the strip until it is dismissed. Newer messages cover
older ones, which come back when the newer are dismissed; the same words twice are one message.
"""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Final

from PySide6.QtCore import QObject, Qt, Signal
from PySide6.QtGui import QFont
from PySide6.QtWidgets import (
    QFrame,
    QHBoxLayout,
    QLabel,
    QPlainTextEdit,
    QPushButton,
    QSizePolicy,
    QToolButton,
    QVBoxLayout,
    QWidget,
)

from app.look.colour import mix
from app.look.theme import Theme
from stackcore.errors import Severity

WORDS: Final[dict[Severity, str]] = {"error": "Fault", "warning": "Caution", "note": "Note"}
KEPT: Final = 20
"""Messages kept behind the newest one."""
LINES: Final = 6
"""Lines of the list of faults that are visible at once."""


@dataclass(frozen=True, slots=True)
class Choice:
    """A button of a message: its words (a verb), and what it does. It also dismisses the message."""

    words: str
    act: Callable[[], None]


@dataclass(frozen=True, slots=True)
class Message:
    """What is shown.

    Parameters
    ----------
    severity
        ``error``, ``warning`` or ``note``.
    text
        One or two sentences: what happened, what holds now, what to do next.
    choices
        Buttons, the usual one first.
    details
        Further lines, such as every fault of a file with its place.
    """

    severity: Severity
    text: str
    choices: tuple[Choice, ...] = ()
    details: tuple[str, ...] = ()


class Messages(QObject):
    """Keeps messages and says which is to be shown. Widgets listen; anyone may tell.

    Signals
    -------
    changed()
        The message to show is another one.
    noted(str)
        A passing note for the status line.
    """

    changed = Signal()
    noted = Signal(str)

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._kept: list[Message] = []

    @property
    def shown(self) -> Message | None:
        """The message to show now, or None."""
        return self._kept[-1] if self._kept else None

    @property
    def hidden(self) -> int:
        """How many messages wait behind the one shown."""
        return max(len(self._kept) - 1, 0)

    def tell(self, text: str, severity: Severity = "note") -> None:
        """Say something: a note passes by in the status line, anything else stays until dismissed."""
        if severity == "note":
            self.noted.emit(text)
        else:
            self.show(Message(severity, text))

    def show(self, message: Message) -> None:
        """Show `message` until it is dismissed; one with the same words replaces the earlier."""
        self._kept = [kept for kept in self._kept if kept.text != message.text][-KEPT + 1 :]
        self._kept.append(message)
        self.changed.emit()

    def dismiss(self) -> None:
        """Take away the message shown."""
        if self._kept:
            self._kept.pop()
            self.changed.emit()

    def withdraw(self, text: str) -> None:
        """Take away the message with these words, when it no longer holds."""
        kept = [message for message in self._kept if message.text != text]
        if len(kept) != len(self._kept):
            self._kept = kept
            self.changed.emit()


class MessageStrip(QFrame):
    """Shows the newest message with its buttons; invisible when there is none."""

    def __init__(self, messages: Messages, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setObjectName("message-strip")
        self.setAutoFillBackground(True)
        self._messages = messages
        self._theme = theme
        self._word = QLabel(self)
        self._text = QLabel(self, wordWrap=True, textFormat=Qt.TextFormat.PlainText)
        self._details = QPlainTextEdit(self, readOnly=True)
        self._dismiss = QToolButton(self)
        self._choices = QHBoxLayout()
        self._buttons: list[QPushButton] = []
        self._build()
        messages.changed.connect(self.refresh)
        self.refresh()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""
        self._theme = theme
        self.refresh()

    def refresh(self) -> None:
        """Show what there is to show now."""
        message = self._messages.shown
        self.setVisible(message is not None)
        if message is None:
            return
        self._word.setText(WORDS[message.severity])
        hidden = self._messages.hidden
        self._text.setText(message.text + (f"  ({hidden} more behind this one)" if hidden else ""))
        self._show_details(message.details)
        self._show_choices(message.choices)
        self._colour(message.severity)
        self.setAccessibleName(f"{WORDS[message.severity]}: {message.text}")

    def _build(self) -> None:
        font = self.font()
        font.setWeight(QFont.Weight.DemiBold)
        self._word.setFont(font)
        selectable = Qt.TextInteractionFlag.TextSelectableByMouse | Qt.TextInteractionFlag.TextSelectableByKeyboard
        self._text.setTextInteractionFlags(selectable)
        self._text.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        self._text.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Preferred)
        self._details.setAccessibleName("Every fault with its place")
        self._details.setFrameShape(QFrame.Shape.NoFrame)
        self._details.setTabChangesFocus(True)
        self._details.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self._dismiss.setText("Dismiss")
        self._dismiss.setAutoRaise(True)
        self._dismiss.setToolTip("Take this message away (Esc)")
        self._dismiss.clicked.connect(self._messages.dismiss)
        line = QHBoxLayout()
        line.setSpacing(8)
        line.addWidget(self._word)
        line.addWidget(self._text, 1)
        line.addLayout(self._choices)
        line.addWidget(self._dismiss)
        column = QVBoxLayout(self)
        column.setContentsMargins(16, 8, 8, 8)
        column.setSpacing(4)
        column.addLayout(line)
        column.addWidget(self._details)

    def _show_details(self, details: tuple[str, ...]) -> None:
        self._details.setVisible(bool(details))
        self._details.setPlainText("\n".join(details))
        lines = min(len(details), LINES)
        margin = round(2 * self._details.document().documentMargin())
        self._details.setFixedHeight(lines * self._details.fontMetrics().lineSpacing() + margin + 4)

    def _show_choices(self, choices: tuple[Choice, ...]) -> None:
        for old in self._buttons:
            self._choices.removeWidget(old)
            old.deleteLater()
        self._buttons = []
        for choice in choices:
            button = QPushButton(choice.words, self)
            button.clicked.connect(lambda _=False, chosen=choice: self._choose(chosen))
            self._choices.addWidget(button)
            self._buttons.append(button)

    def _choose(self, choice: Choice) -> None:
        self._messages.dismiss()
        choice.act()

    def _colour(self, severity: Severity) -> None:
        theme = self._theme
        ink = {"error": theme.fault, "warning": theme.warning, "note": theme.accent}[severity]
        ground = mix(theme.base, ink, 0.06)
        self.setStyleSheet(
            f"#message-strip {{ background: {ground}; border-left: 4px solid {ink}; }}"
            f"#message-strip QPlainTextEdit {{ background: transparent; color: {theme.text}; }}"
            f"#message-strip QLabel {{ color: {theme.text}; }}"
        )
        self._word.setStyleSheet(f"color: {ink};")
