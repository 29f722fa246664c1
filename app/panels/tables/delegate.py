"""How a cell is drawn that may hold a text without a value, and how typing in it ends."""

from enum import IntEnum
from typing import Final

from PySide6.QtCore import QEvent, QModelIndex, QObject, QPersistentModelIndex, QRect, Qt, Signal
from PySide6.QtGui import QColor, QKeyEvent, QPainter, QPen
from PySide6.QtWidgets import QAbstractItemDelegate, QStyle, QStyledItemDelegate, QStyleOptionViewItem, QWidget

from app.look.colour import mix
from app.look.theme import Theme

Index = QModelIndex | QPersistentModelIndex

PADDING: Final = 8
MARK: Final = 14
MARK_GAP: Final = 6

_ENTER_KEYS: Final = (Qt.Key.Key_Return, Qt.Key.Key_Enter)
_FINISHED: Final = "slabwright-finished"


class Ask(IntEnum):
    """What a delegate asks of a cell beyond Qt's own roles; a panel's own questions begin at `OWN`."""

    FAULT = Qt.ItemDataRole.UserRole + 1
    """The `Fault` of a text that has no value, or None."""
    CAUTION = Qt.ItemDataRole.UserRole + 2
    """A sentence of caution about a value, or an empty text."""
    ASIDE = Qt.ItemDataRole.UserRole + 3
    """Whether the row stands aside from the others, as a half-space does."""
    OWN = Qt.ItemDataRole.UserRole + 16


def is_enter(event: QEvent) -> bool:
    """Whether `event` is a press of Enter or Return."""
    if not isinstance(event, QKeyEvent) or event.type() != QEvent.Type.KeyPress:
        return False
    return event.key() in _ENTER_KEYS


def fault_ground(theme: Theme) -> QColor:
    """Return the ground of a cell whose text has no value."""
    return QColor(mix(theme.base, theme.fault, 0.16))


class QuietDelegate(QStyledItemDelegate):
    """Draws cells as words on a quiet ground; what cannot be typed into is muted.

    `entered` is emitted when Enter has finished a cell, after its text was handed over. Subclasses draw other
    contents by `paint_content`.
    """

    entered = Signal()

    def __init__(self, theme: Theme, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.theme = theme

    def paint_content(self, painter: QPainter, room: QRect, index: Index) -> None:
        """Draw what a cell holds into `room`, which is free of marks."""
        editable = index.flags() & Qt.ItemFlag.ItemIsEditable
        self.paint_words(painter, room, index, self.theme.text if editable else self.theme.muted)

    def paint_words(self, painter: QPainter, room: QRect, index: Index, ink: str) -> None:
        """Draw the cell's text as its model aligns it, cut short where there is no room."""
        painter.setPen(QColor(ink))
        alignment = index.data(Qt.ItemDataRole.TextAlignmentRole) or Qt.AlignmentFlag.AlignVCenter
        text = painter.fontMetrics().elidedText(index.data() or "", Qt.TextElideMode.ElideRight, room.width())
        painter.drawText(room, alignment, text)

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        painter.save()
        painter.setFont(option.font)
        self._paint_ground(painter, option, index)
        room = option.rect.adjusted(PADDING, 0, -PADDING, 0)
        if index.data(Ask.FAULT) is not None:
            room = self._paint_mark(painter, room, self.theme.fault)
        elif index.data(Ask.CAUTION):
            room = self._paint_mark(painter, room, self.theme.warning)
        self.paint_content(painter, room, index)
        if option.state & QStyle.StateFlag.State_HasFocus:
            painter.setPen(QPen(QColor(self.theme.accent), 2))
            painter.drawRect(option.rect.adjusted(1, 1, -1, -1))
        painter.restore()

    def _paint_ground(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        ground = QColor(self.theme.window if index.data(Ask.ASIDE) else self.theme.base)
        if option.state & QStyle.StateFlag.State_Selected:
            ground = QColor(self.theme.selection)
        if index.data(Ask.FAULT) is not None:
            ground = fault_ground(self.theme)
        painter.fillRect(option.rect, ground)
        painter.setPen(QColor(self.theme.line))
        painter.drawLine(option.rect.bottomLeft(), option.rect.bottomRight())

    def _paint_mark(self, painter: QPainter, room: QRect, colour: str) -> QRect:
        """Draw a sign at the left, so that colour is not all that tells, and return the room that is left."""
        disc = QRect(room.left(), room.center().y() - MARK // 2, MARK, MARK)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(QColor(colour))
        painter.drawEllipse(disc)
        painter.setPen(QColor(self.theme.base))
        painter.drawText(disc, Qt.AlignmentFlag.AlignCenter, "!")
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        return room.adjusted(MARK + MARK_GAP, 0, 0, 0)

    def updateEditorGeometry(self, editor: QWidget, option: QStyleOptionViewItem, index: Index) -> None:
        editor.setGeometry(option.rect)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if isinstance(watched, QWidget) and is_enter(event):
            self.finish(watched, advance=True)
            return True
        return super().eventFilter(watched, event)

    def finish(self, editor: QWidget, *, advance: bool) -> None:
        """Hand over what was typed and shut the cell; with `advance` the table then goes on."""
        # A box that loses the focus says once more that its text was chosen.
        if editor.property(_FINISHED):
            return
        editor.setProperty(_FINISHED, True)
        self.commitData.emit(editor)
        self.closeEditor.emit(editor, QAbstractItemDelegate.EndEditHint.NoHint)
        if advance:
            self.entered.emit()
