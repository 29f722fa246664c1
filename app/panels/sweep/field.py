"""The controls of a quiet line: they look like words of a sentence until they are pointed at or used."""

from typing import Final

from PySide6.QtCore import QEvent, QPointF, QRect, QRectF, QSize, Qt, Signal
from PySide6.QtGui import (
    QColor,
    QEnterEvent,
    QFocusEvent,
    QFontMetrics,
    QKeyEvent,
    QPainter,
    QPaintEvent,
    QPalette,
    QPen,
    QPolygonF,
    QWheelEvent,
)
from PySide6.QtWidgets import QAbstractButton, QComboBox, QLineEdit, QSizePolicy, QWidget

from app.look.theme import Theme
from stackcore.errors import Fault

_MARK: Final = 16
_SIDE: Final = 4
_LONGEST: Final = 40


def fault_sentence(fault: Fault) -> str:
    """Return what is wrong and what is allowed, as a person reads it at the field."""
    return f"{fault.message}; allowed: {fault.allowed}" if fault.allowed else fault.message


class QuietField(QLineEdit):
    """A text that can be changed: underlined, as wide as its text, with its fault shown where it is.

    `committed` is sent with the text when a person leaves the field or presses Enter after changing it; Escape
    brings back the text of before. A fault keeps the text, colours it, draws a mark at its end, and says itself
    in the tooltip and to screen readers.
    """

    committed = Signal(str)

    def __init__(
        self, theme: Theme, name: str, tip: str, sample: str = "0000", parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._theme = theme
        self._tip = tip
        self._sample = sample
        self._shown = ""
        self._fault: Fault | None = None
        self.setAccessibleName(name)
        self.setFrame(False)
        self.setSizePolicy(QSizePolicy.Policy.Fixed, QSizePolicy.Policy.Fixed)
        self.textChanged.connect(lambda _: self.updateGeometry())
        self.textEdited.connect(lambda _: self._set_fault(None))
        self.editingFinished.connect(self._commit)
        self.set_theme(theme)
        self._set_fault(None)

    @property
    def fault(self) -> Fault | None:
        """What is wrong with the text, or None."""
        return self._fault

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self._colour()

    def show_text(self, text: str, fault: Fault | None = None) -> None:
        """Show a text and its fault; a text that is being typed right now is left alone."""
        if self.isModified() and self.hasFocus():
            return
        self._shown = text
        if text != self.text():
            self.setText(text)
            self.setCursorPosition(0)
        self.setModified(False)
        self._set_fault(fault)

    def sizeHint(self) -> QSize:
        """Return the room of the text; what is longer than a line of words scrolls and widens no window."""
        metrics = QFontMetrics(self.font())
        longest = metrics.horizontalAdvance("0" * _LONGEST)
        width = max(min(metrics.horizontalAdvance(self.text()), longest), metrics.horizontalAdvance(self._sample))
        mark = _MARK if self._fault else 0
        return QSize(width + 2 * _SIDE + 6 + mark, metrics.height() + 8)

    def minimumSizeHint(self) -> QSize:
        """Return the room of a few letters."""
        metrics = QFontMetrics(self.font())
        return QSize(metrics.horizontalAdvance(self._sample) + 2 * _SIDE, metrics.height() + 8)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Bring back the text of before on Escape."""
        if event.key() == Qt.Key.Key_Escape and self.isModified():
            self.setModified(False)
            self.setText(self._shown)
            self.selectAll()
            event.accept()
            return
        super().keyPressEvent(event)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw the text, its underline and the mark of a fault."""
        super().paintEvent(event)
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        draw_underline(painter, self.rect(), self._theme, lit(self), self._fault is not None)
        if self._fault is not None:
            self._draw_mark(painter)

    def _draw_mark(self, painter: QPainter) -> None:
        middle = QPointF(self.width() - _MARK / 2 - 1, self.height() / 2)
        colour = QColor(self._theme.fault)
        painter.setPen(QPen(colour, 1.4))
        top, bottom = middle + QPointF(0, -5.5), middle + QPointF(0, 4.5)
        painter.drawPolygon(QPolygonF([top, bottom + QPointF(6, 0), bottom + QPointF(-6, 0)]))
        painter.drawLine(middle + QPointF(0, -1.8), middle + QPointF(0, 1.2))
        painter.drawPoint(middle + QPointF(0, 2.9))

    def _commit(self) -> None:
        if self.isModified():
            self.setModified(False)
            self._shown = self.text()
            self.committed.emit(self.text())

    def _set_fault(self, fault: Fault | None) -> None:
        self._fault = fault
        sentence = fault_sentence(fault) if fault else ""
        self.setToolTip(f"{sentence}\n{self._tip}" if sentence else self._tip)
        self.setStatusTip(sentence or self._tip)
        self.setAccessibleDescription(f"Not valid: {sentence}" if sentence else self._tip)
        self.setTextMargins(_SIDE - 2, 0, _SIDE - 2 + (_MARK if fault else 0), 0)
        self._colour()
        self.updateGeometry()

    def _colour(self) -> None:
        palette = self.palette()
        palette.setColor(QPalette.ColorRole.Base, QColor(0, 0, 0, 0))
        ink = self._theme.fault if self._fault else self._theme.text
        palette.setColor(QPalette.ColorRole.Text, QColor(ink))
        palette.setColor(QPalette.ColorRole.Highlight, QColor(self._theme.accent))
        palette.setColor(QPalette.ColorRole.HighlightedText, QColor(self._theme.on_accent))
        self.setPalette(palette)
        self.update()


LONGEST_CHOICE: Final = 216
"""Pixels of the words of a choice; longer ones are cut, and whole in the list and the tooltip."""


class QuietChoice(QComboBox):
    """A choice that reads as a word with a small arrow; the mouse wheel never changes it."""

    def __init__(self, theme: Theme, name: str, tip: str = "", parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self.setAccessibleName(name)
        self.setToolTip(tip)
        self.setStatusTip(tip)
        self.setAccessibleDescription(tip)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setSizePolicy(QSizePolicy.Policy.Fixed, QSizePolicy.Policy.Fixed)
        self.setMaxVisibleItems(16)
        self.currentTextChanged.connect(lambda _: self.updateGeometry())

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.update()

    def show_choice(self, data: object) -> None:
        """Show the item with this data without telling it as a choice made."""
        index = self.findData(data)
        if index >= 0 and index != self.currentIndex():
            self.setCurrentIndex(index)

    def sizeHint(self) -> QSize:
        """Return the room of the present choice."""
        metrics = QFontMetrics(self.font())
        words = min(metrics.horizontalAdvance(self.currentText()), LONGEST_CHOICE)
        return QSize(words + 2 * _SIDE + 15, metrics.height() + 8)

    def minimumSizeHint(self) -> QSize:
        """Return the same: a choice is not cut, but for one that would push everything else aside."""
        return self.sizeHint()

    def wheelEvent(self, event: QWheelEvent) -> None:
        """Leave the wheel to whatever scrolls."""
        event.ignore()

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw the word, the arrow and the underline."""
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        ink = self._theme.text if self.isEnabled() else self._theme.edge
        painter.setPen(QColor(ink))
        room = QRectF(self.rect()).adjusted(_SIDE, 0, -15, 0)
        wide = round(room.width()) + 1
        words = painter.fontMetrics().elidedText(self.currentText(), Qt.TextElideMode.ElideRight, wide)
        painter.drawText(room, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, words)
        draw_arrow(painter, self.rect(), self._theme)
        draw_underline(painter, self.rect(), self._theme, lit(self), False)

    def enterEvent(self, event: QEnterEvent) -> None:
        """Light up."""
        super().enterEvent(event)
        self.update()

    def leaveEvent(self, event: QEvent) -> None:
        """Calm down."""
        super().leaveEvent(event)
        self.update()

    def focusInEvent(self, event: QFocusEvent) -> None:
        """Light up."""
        super().focusInEvent(event)
        self.update()


class QuietSwitch(QAbstractButton):
    """A word that is on or off; when off it is muted and struck by no box, when on it is underlined in colour."""

    def __init__(self, theme: Theme, text: str, tip: str, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self.setText(text)
        self.setCheckable(True)
        self.setToolTip(tip)
        self.setStatusTip(tip)
        self.setAccessibleName(text)
        self.setAccessibleDescription(tip)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setSizePolicy(QSizePolicy.Policy.Fixed, QSizePolicy.Policy.Fixed)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.update()

    def sizeHint(self) -> QSize:
        """Return the room of the word and its box."""
        metrics = QFontMetrics(self.font())
        return QSize(metrics.horizontalAdvance(self.text()) + 2 * _SIDE + 18, metrics.height() + 8)

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw a small box, ticked when on, and the word."""
        painter = QPainter(self)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        box = QRectF(_SIDE + 0.5, self.height() / 2 - 5.5, 11, 11)
        on = self.isChecked()
        painter.setPen(QPen(QColor(self._theme.accent if on else self._theme.edge), 1.2))
        painter.setBrush(QColor(self._theme.accent) if on else Qt.BrushStyle.NoBrush)
        painter.drawRoundedRect(box, 2.5, 2.5)
        painter.setBrush(Qt.BrushStyle.NoBrush)
        if on:
            painter.setPen(QPen(QColor(self._theme.on_accent), 1.6))
            tick = [(2.6, 5.6), (4.8, 7.8), (8.6, 3.4)]
            painter.drawPolyline([box.topLeft() + QPointF(x, y) for x, y in tick])
        painter.setPen(QColor(self._theme.text if self.isEnabled() else self._theme.edge))
        room = QRectF(self.rect()).adjusted(_SIDE + 17, 0, 0, 0)
        painter.drawText(room, Qt.AlignmentFlag.AlignVCenter | Qt.AlignmentFlag.AlignLeft, self.text())
        if self.hasFocus():
            draw_underline(painter, self.rect(), self._theme, "focus", False)


def lit(widget: QWidget) -> str:
    """Return how much a control draws attention to itself: ``focus``, ``hover`` or ``rest``."""
    return "focus" if widget.hasFocus() else "hover" if widget.underMouse() else "rest"


def draw_arrow(painter: QPainter, rect: QRect, theme: Theme) -> None:
    """Draw the small arrow at the right of a word that opens a list."""
    x, y = rect.width() - 9.0, rect.height() / 2 - 1
    painter.setPen(QPen(QColor(theme.muted), 1.4))
    painter.drawPolyline([QPointF(x - 3, y), QPointF(x, y + 3), QPointF(x + 3, y)])


def draw_underline(painter: QPainter, rect: QRect, theme: Theme, state: str, faulty: bool) -> None:
    """Draw the line below a control: thin at rest, in the accent and with an outline when focused."""
    ink = theme.fault if faulty else theme.accent if state == "focus" else theme.edge
    if state == "focus":
        painter.setPen(QPen(QColor(ink), 1.6))
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.drawRoundedRect(QRectF(rect).adjusted(0.8, 0.8, -0.8, -0.8), 4, 4)
        return
    colour = QColor(ink)
    if state == "rest" and not faulty:
        colour.setAlphaF(0.55)
    painter.setPen(QPen(colour, 1.6 if faulty else 1.0))
    y = rect.bottom() - 1.5
    painter.drawLine(QPointF(rect.left() + _SIDE - 1, y), QPointF(rect.right() - _SIDE + 1, y))
