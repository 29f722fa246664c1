"""A line below the plot in which the ends of both axes are typed."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QColor, QKeyEvent, QPalette
from PySide6.QtWidgets import QLabel, QToolButton, QWidget

from app.look.theme import Theme
from app.panels.sweep.field import QuietField
from app.panels.sweep.flow import FlowLayout
from stackcore.errors import Fault, UnitError
from stackcore.units import Dimension, parse_measure

Read = Callable[[str], float]

_NAMES: Final = ("lowest frequency shown", "highest frequency shown", "lowest value shown", "highest value shown")


class RangeStrip(QWidget):
    """Four fields and two buttons; `wanted` is sent with both ranges (Hz, and values in the unit shown)."""

    wanted = Signal(tuple, tuple)
    all_wanted = Signal()
    closed = Signal()

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._unit, self._value_unit = "GHz", ""
        tip = "An end of an axis of the plot; the sweep stays as it is."
        self.fields = tuple(QuietField(theme, name.capitalize(), tip, "0000.0 GHz") for name in _NAMES)
        self._labels = [QLabel(text) for text in ("Frequency from", "to", "Values from", "to")]
        self._show_all = _quiet_button("Show all")
        self._show_all.setToolTip("Show everything and follow the data again.")
        self._close = _quiet_button("Done")
        self._close.setToolTip("Close this line and go back to the plot.")
        flow = FlowLayout(self, across=6, down=2)
        for label, field in zip(self._labels, self.fields, strict=True):
            flow.addWidget(label)
            flow.addWidget(field)
            field.committed.connect(lambda _: self._read())
        flow.addWidget(self._show_all)
        flow.addWidget(self._close)
        self._show_all.clicked.connect(self.all_wanted.emit)
        self._close.clicked.connect(self.closed.emit)
        self.setAccessibleName("Ranges of the axes")
        self.set_theme(theme)
        self.hide()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        for field in self.fields:
            field.set_theme(theme)
        for label in self._labels:
            palette = label.palette()
            palette.setColor(QPalette.ColorRole.WindowText, QColor(theme.muted))
            label.setPalette(palette)

    def show_ranges(
        self, hertz: tuple[float, float], values: tuple[float, float], factor: float, units: tuple[str, str]
    ) -> None:
        """Show these ranges.

        Parameters
        ----------
        hertz, values
            The ends of the axes, Hz and the unit of the values shown.
        factor
            Axis units of frequency per hertz.
        units
            Units of frequency and of the values, the latter perhaps empty.
        """
        self._unit, self._value_unit = units
        texts = [f"{end * factor:.6g} {units[0]}" for end in hertz]
        texts += [f"{end:.6g} {units[1]}".strip() for end in values]
        for field, text in zip(self.fields, texts, strict=True):
            if field.fault is None:
                field.show_text(text)

    def start(self, axis: str) -> None:
        """Open, with the keys in the first field of ``left`` (values) or ``bottom`` (frequencies)."""
        self.show()
        field = self.fields[2 if axis == "left" else 0]
        field.setFocus(Qt.FocusReason.ShortcutFocusReason)
        field.selectAll()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Close on Escape."""
        if event.key() == Qt.Key.Key_Escape:
            self.closed.emit()
        else:
            super().keyPressEvent(event)

    def _read(self) -> None:
        """Read all fields; show each fault, or send the ranges when there is none."""
        ends = [self._end(field, index) for index, field in enumerate(self.fields)]
        for low, high in ((0, 1), (2, 3)):
            first, last = ends[low], ends[high]
            if first is not None and last is not None and not first < last:
                fault = Fault("", f"{self.fields[high].text()} is not above the lower end", "a larger value")
                self.fields[high].show_text(self.fields[high].text(), fault)
                ends[high] = None
        found = [end for end in ends if end is not None]
        if len(found) == len(ends):
            self.wanted.emit((found[0], found[1]), (found[2], found[3]))

    def _end(self, field: QuietField, index: int) -> float | None:
        text = field.text()
        try:
            if index < 2:
                value = parse_measure(text, Dimension.FREQUENCY, default_unit=self._unit).value
            else:
                bare = text.strip().removesuffix(self._value_unit) if self._value_unit else text
                value = parse_measure(bare, Dimension.NUMBER).value
        except UnitError as error:
            field.show_text(text, Fault("", error.message, error.allowed))
            return None
        field.show_text(text)
        return value


def _quiet_button(text: str) -> QToolButton:
    """Return a button that is only a word until it is pointed at or focused."""
    button = QToolButton()
    button.setText(text)
    button.setAutoRaise(True)
    button.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
    return button
