"""A line below the table that asks what a pasted block leaves open, with the rows as they will be."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import Qt
from PySide6.QtGui import QColor, QKeyEvent, QPalette
from PySide6.QtWidgets import QLabel, QPlainTextEdit, QToolButton, QVBoxLayout, QWidget

from app.look.theme import Theme
from app.panels.elements.doubts import COMMAS, UNITS, Doubts, Rows, preview, settled
from app.panels.sweep.field import QuietChoice
from app.panels.sweep.flow import FlowLayout

LINES: Final = 5
"""Rows that are seen at once."""

Paste = Callable[[Rows], None]


class PastePreview(QWidget):
    """Asks and shows; what was decided is given back as rows. Hidden while there is nothing to ask."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._rows: Rows = ()
        self._typed_over = 0
        self._run: Paste | None = None
        self._back: QWidget | None = None
        self.unit = QuietChoice(theme, "Unit of thicknesses without one", "What a bare thickness is in.", self)
        for name in UNITS:
            self.unit.addItem(name, name)
        self.comma = QuietChoice(theme, "What a comma is", "1,234 may be 1.234 or 1234.", self)
        for key, words in COMMAS.items():
            self.comma.addItem(words, key)
        self._unit_word = QLabel("Thicknesses without a unit are in", self)
        self._comma_word = QLabel("A comma is", self)
        self.text = QPlainTextEdit(self)
        self.paste = self._button("Paste", "Put these rows into the stack, as one step.", self._do)
        self.cancel = self._button("Do not paste", "Leave the stack as it is.", self.close_up)
        self._arrange()
        self.unit.activated.connect(lambda _index: self._show())
        self.comma.activated.connect(lambda _index: self._show())
        self.setAccessibleName("What is pasted")
        self.set_theme(theme)
        self.hide()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        for control in (self.unit, self.comma):
            control.set_theme(theme)
        for widget in (self._unit_word, self._comma_word, self.text):
            palette = widget.palette()
            palette.setColor(QPalette.ColorRole.WindowText, QColor(theme.text))
            palette.setColor(QPalette.ColorRole.Text, QColor(theme.text))
            palette.setColor(QPalette.ColorRole.Base, QColor(theme.base))
            widget.setPalette(palette)

    def ask(self, rows: Rows, typed_over: int, doubts: Doubts, run: Paste, back: QWidget) -> None:
        """Ask what is in doubt; `run` gets the rows that were decided on, and the focus goes `back`."""
        self._rows, self._typed_over, self._run, self._back = rows, typed_over, run, back
        for part in (self._unit_word, self.unit):
            part.setVisible(doubts.unit)
        for part in (self._comma_word, self.comma):
            part.setVisible(doubts.comma)
        self._show()
        self.show()
        self.paste.setFocus(Qt.FocusReason.OtherFocusReason)

    def forget(self) -> None:
        """Ask no longer; the block is still on the clipboard."""
        self._rows, self._run = (), None
        self.hide()

    def close_up(self) -> None:
        """Forget the block and go back to where it was pasted."""
        asked = self.isVisible()
        self.forget()
        if asked and self._back is not None:
            self._back.setFocus(Qt.FocusReason.OtherFocusReason)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Paste with Enter, and leave it with Escape."""
        if event.key() == Qt.Key.Key_Escape:
            self.close_up()
        elif event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self._do()
        else:
            super().keyPressEvent(event)

    def _arrange(self) -> None:
        line = QWidget(self)
        flow = FlowLayout(line, across=8, down=2)
        for part in (self._unit_word, self.unit, self._comma_word, self.comma, self.paste, self.cancel):
            flow.addWidget(part)
        self.text.setReadOnly(True)
        self.text.setTabChangesFocus(True)
        self.text.setFrameShape(QPlainTextEdit.Shape.NoFrame)
        self.text.setAccessibleName("Rows as they will be")
        self.text.setFixedHeight(LINES * self.fontMetrics().height() + 10)
        column = QVBoxLayout(self)
        column.setContentsMargins(8, 4, 8, 4)
        column.setSpacing(4)
        column.addWidget(line)
        column.addWidget(self.text)

    def _settled(self) -> Rows:
        comma = next(key for key in COMMAS if key == self.comma.currentData())
        return settled(self._rows, self._typed_over, str(self.unit.currentData()), comma)

    def _show(self) -> None:
        self.text.setPlainText(preview(self._settled()))

    def _do(self) -> None:
        if self._run is None:
            return
        run, rows = self._run, self._settled()
        self.close_up()
        run(rows)

    def _button(self, text: str, tip: str, run: Callable[[], None]) -> QToolButton:
        made = QToolButton(self)
        made.setText(text)
        made.setToolTip(tip)
        made.setAutoRaise(True)
        made.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        made.clicked.connect(lambda _checked=False: run())
        return made
