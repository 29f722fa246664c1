"""Small widgets that both halves of the panel are made of."""

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtGui import QColor, QPalette
from PySide6.QtWidgets import QHBoxLayout, QLabel, QToolButton, QVBoxLayout, QWidget

from app.look.palette import heading_font


def words(text: str, parent: QWidget) -> QLabel:
    """Return sentences that wrap."""
    label = QLabel(text, parent)
    label.setWordWrap(True)
    label.setTextFormat(Qt.TextFormat.PlainText)
    label.setContentsMargins(8, 0, 8, 4)
    return label


def heading(text: str, parent: QWidget) -> QLabel:
    """Return a heading."""
    label = QLabel(text, parent)
    label.setFont(heading_font(parent.font()))
    label.setContentsMargins(8, 8, 8, 0)
    return label


def ink(label: QLabel, colour: str) -> None:
    """Write `label` in `colour` from now on."""
    palette = QPalette()
    palette.setColor(QPalette.ColorRole.WindowText, QColor(colour))
    label.setPalette(palette)


def column(owner: QWidget) -> QVBoxLayout:
    """Return the layout of `owner` as a column without a margin."""
    layout = QVBoxLayout(owner)
    layout.setContentsMargins(0, 0, 0, 0)
    layout.setSpacing(4)
    return layout


def buttons(owner: QWidget, *wanted: tuple[str, str, Callable[[], None]]) -> QHBoxLayout:
    """Return a row of plain buttons, each of its words, its tip and what it does."""
    row = QHBoxLayout()
    row.setContentsMargins(4, 0, 4, 0)
    row.setSpacing(0)
    for text, tip, run in wanted:
        row.addWidget(button(owner, text, tip, run))
    return row


def button(owner: QWidget, text: str, tip: str, run: Callable[[], None]) -> QToolButton:
    """Return a plain button of its words, its tip and what it does."""
    plain = QToolButton(owner)
    plain.setText(text)
    plain.setToolTip(tip)
    plain.setAutoRaise(True)
    plain.clicked.connect(lambda _checked=False: run())
    return plain
