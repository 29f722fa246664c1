"""Small widgets that both halves of the panel are made of."""

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtGui import QColor, QPainter, QPaintEvent, QPalette
from PySide6.QtWidgets import QHBoxLayout, QLabel, QSizePolicy, QToolButton, QVBoxLayout, QWidget

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


class Line(QLabel):
    """A line of words that never makes its panel wider: what has no room is cut, and whole in the tooltip."""

    def __init__(self, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setTextFormat(Qt.TextFormat.PlainText)
        self.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)

    def setText(self, text: str) -> None:
        """Show a text."""
        super().setText(text)
        self.setToolTip(text)
        self.setVisible(bool(text))

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw as much of it as there is room for."""
        painter = QPainter(self)
        painter.setPen(self.palette().color(self.foregroundRole()))
        words = painter.fontMetrics().elidedText(self.text(), Qt.TextElideMode.ElideRight, self.width())
        painter.drawText(self.rect(), Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, words)
