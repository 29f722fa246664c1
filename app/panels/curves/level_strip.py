"""A line below the plot in which a level is typed, and the marker goes from crossing to crossing."""

from typing import Final

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QColor, QKeyEvent, QPalette
from PySide6.QtWidgets import QLabel, QToolButton, QWidget

from app.look.theme import Theme
from app.panels.sweep.field import QuietField
from app.panels.sweep.flow import FlowLayout
from stackcore.errors import Fault, UnitError
from stackcore.units import Dimension, parse_measure

TIP: Final = "A value of the curves; Enter takes the marker to the next place where the chosen curve crosses it."


class LevelStrip(QWidget):
    """A field and three buttons; `wanted` is sent with the level in the unit shown and the direction."""

    wanted = Signal(float, int)
    closed = Signal()

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._unit = ""
        self._label = QLabel("Level", self)
        self.field = QuietField(theme, "Level", TIP, "−000.00 dB", self)
        self.before = self._button("Before", "The crossing before the marker.")
        self.after = self._button("Next", "The crossing after the marker.")
        self._done = self._button("Done", "Close this line and go back to the plot.")
        flow = FlowLayout(self, across=6, down=2)
        for part in (self._label, self.field, self.before, self.after, self._done):
            flow.addWidget(part)
        self.field.committed.connect(lambda _text: self._go(1))
        self.before.clicked.connect(lambda: self._go(-1))
        self.after.clicked.connect(lambda: self._go(1))
        self._done.clicked.connect(self.closed.emit)
        self.setAccessibleName("Level that the marker goes to")
        self.set_theme(theme)
        self.hide()

    @property
    def level(self) -> float | None:
        """The level in the unit shown, None while the text has no value."""
        text = self.field.text().strip()
        if not text:
            return None
        bare = text.removesuffix(self._unit) if self._unit else text
        try:
            return parse_measure(bare.strip(), Dimension.NUMBER).value
        except UnitError:
            return None

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.field.set_theme(theme)
        palette = self._label.palette()
        palette.setColor(QPalette.ColorRole.WindowText, QColor(theme.muted))
        self._label.setPalette(palette)

    def set_unit(self, unit: str) -> None:
        """Take another unit of the values; a level of the old one means nothing."""
        if unit != self._unit:
            self._unit = unit
            self.field.show_text("")

    def start(self, value: float) -> None:
        """Open with the keys in the field; an empty one offers `value`."""
        self.show()
        if not self.field.text():
            self.field.show_text(f"{value:.4g} {self._unit}".strip())
        self.field.setFocus(Qt.FocusReason.ShortcutFocusReason)
        self.field.selectAll()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Close on Escape."""
        if event.key() == Qt.Key.Key_Escape:
            self.closed.emit()
        else:
            super().keyPressEvent(event)

    def _go(self, step: int) -> None:
        text = self.field.text()
        level = self.level
        if level is None:
            allowed = f"a number in {self._unit}" if self._unit else "a number"
            self.field.show_text(text, Fault("", f"{text!r} is no level", allowed))
            return
        self.field.show_text(text)
        self.wanted.emit(level, step)

    def _button(self, text: str, tip: str) -> QToolButton:
        made = QToolButton(self)
        made.setText(text)
        made.setToolTip(tip)
        made.setAutoRaise(True)
        made.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        return made
