"""How a cell of the element table is drawn, and what opens in it for typing."""

from typing import Final

from PySide6.QtCore import (
    QAbstractItemModel,
    QEvent,
    QModelIndex,
    QObject,
    QPersistentModelIndex,
    QRect,
    Qt,
    Signal,
)
from PySide6.QtGui import QColor, QPainter, QPen
from PySide6.QtWidgets import QAbstractItemDelegate, QStyle, QStyledItemDelegate, QStyleOptionViewItem, QWidget

from app.document.reading import unit_of
from app.look.palette import tabular_font
from app.look.theme import Theme, kind_style
from app.panels.elements.columns import MATERIAL, SHEET_COLUMNS, Column
from app.panels.elements.editors import MaterialBox, QuantityEdit, fault_ground, is_enter
from app.panels.elements.model import Ask, ElementsModel
from app.panels.elements.names import MaterialNames
from app.panels.elements.widths import MARK, MARK_GAP, PADDING, SWATCH, Widths, split_quantity

Index = QModelIndex | QPersistentModelIndex

_FINISHED: Final = "slabwright-finished"


class CellDelegate(QStyledItemDelegate):
    """Draws every cell; numbers stand with their decimal points below each other and their units behind them.

    `entered` is emitted when Enter has finished a cell, after its text was handed over.
    """

    entered = Signal()

    def __init__(self, theme: Theme, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self.widths: tuple[Widths, ...] = ()
        """Widths of the columns, by which numbers are stood below each other."""

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme

    # Drawing

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        painter.save()
        self._paint_ground(painter, option, index)
        room = option.rect.adjusted(PADDING, 0, -PADDING, 0)
        column: Column = index.data(Ask.COLUMN)
        faulty = index.data(Ask.FAULT) is not None
        if faulty:
            room = self._paint_mark(painter, room)
        painter.setFont(tabular_font(option.font) if column.dimension is not None else option.font)
        if column is MATERIAL:
            self._paint_material(painter, room, index)
        elif column.dimension is not None and not faulty and index.flags() & Qt.ItemFlag.ItemIsEditable:
            self._paint_quantity(painter, room, index)
        else:
            quiet = not index.flags() & Qt.ItemFlag.ItemIsEditable
            self._paint_words(painter, room, index, self._theme.muted if quiet else self._theme.text)
        if option.state & QStyle.StateFlag.State_HasFocus:
            painter.setPen(QPen(QColor(self._theme.accent), 2))
            painter.drawRect(option.rect.adjusted(1, 1, -1, -1))
        painter.restore()

    def _paint_ground(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        theme = self._theme
        half_space = index.data(Ask.LINE_KIND) in ("front", "back")
        ground = QColor(theme.window if half_space else theme.base)
        if option.state & QStyle.StateFlag.State_Selected:
            ground = QColor(theme.selection)
        if index.data(Ask.FAULT) is not None:
            ground = fault_ground(theme)
        painter.fillRect(option.rect, ground)
        painter.setPen(QColor(theme.line))
        painter.drawLine(option.rect.bottomLeft(), option.rect.bottomRight())

    def _paint_mark(self, painter: QPainter, room: QRect) -> QRect:
        """Draw the sign of a text without value at the left and return the room that is left."""
        disc = QRect(room.left(), room.center().y() - MARK // 2, MARK, MARK)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(QColor(self._theme.fault))
        painter.drawEllipse(disc)
        painter.setPen(QColor(self._theme.base))
        painter.drawText(disc, Qt.AlignmentFlag.AlignCenter, "!")
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.setRenderHint(QPainter.RenderHint.Antialiasing, False)
        return room.adjusted(MARK + MARK_GAP, 0, 0, 0)

    def _paint_material(self, painter: QPainter, room: QRect, index: Index) -> None:
        kind = index.data(Ask.MATERIAL_KIND)
        if not index.data():
            return
        if kind and index.data(Ask.FAULT) is None:
            style = kind_style(self._theme, kind)
            patch = QRect(room.left(), room.center().y() - SWATCH // 2, SWATCH, SWATCH)
            painter.setPen(QColor(style.ink))
            painter.setBrush(QColor(style.tint))
            painter.drawRect(patch)
            painter.setBrush(Qt.BrushStyle.NoBrush)
            room = room.adjusted(SWATCH + PADDING, 0, 0, 0)
        self._paint_words(painter, room, index, self._theme.text)

    def _paint_words(self, painter: QPainter, room: QRect, index: Index, ink: str) -> None:
        painter.setPen(QColor(ink))
        alignment: Qt.AlignmentFlag = index.data(Qt.ItemDataRole.TextAlignmentRole)
        text = painter.fontMetrics().elidedText(index.data() or "", Qt.TextElideMode.ElideRight, room.width())
        painter.drawText(room, alignment, text)

    def _paint_quantity(self, painter: QPainter, room: QRect, index: Index) -> None:
        metrics = painter.fontMetrics()
        number, fraction, unit = split_quantity(index.data())
        widths = self.widths[index.column()]
        left = room.right() - widths.unit - widths.fraction - metrics.horizontalAdvance(number)
        if not number or left < room.left():
            self._paint_words(painter, room, index, self._theme.text)
            return
        painter.setPen(QColor(self._theme.text))
        vertical = Qt.AlignmentFlag.AlignVCenter
        painter.drawText(QRect(left, room.top(), room.width(), room.height()), vertical, number + fraction)
        painter.setPen(QColor(self._theme.muted))
        unit_left = room.right() - widths.unit + metrics.horizontalAdvance(" ")
        painter.drawText(QRect(unit_left, room.top(), room.width(), room.height()), vertical, unit)

    # Typing

    def createEditor(self, parent: QWidget, option: QStyleOptionViewItem, index: Index) -> QWidget:
        model = index.model()
        assert isinstance(model, ElementsModel)
        column: Column = index.data(Ask.COLUMN)
        if column.dimension is None:
            names = MaterialNames(model.document.record)
            offers = names.offers(with_metal=index.data(Ask.LINE_KIND) == "back")
            box = MaterialBox(offers, parent)
            box.chosen.connect(lambda: self._finish(box, advance=False))
            box.entered.connect(lambda: self._finish(box, advance=True))
            editor: QWidget = box
        else:
            unit = unit_of(index.data() or "", column.dimension)
            line = QuantityEdit(self._theme, column.dimension, unit, column in SHEET_COLUMNS, parent)
            line.setFont(tabular_font(option.font))
            editor = line
        editor.setAccessibleName(str(index.data(Qt.ItemDataRole.AccessibleTextRole)))
        editor.setAccessibleDescription(column.definition)
        return editor

    def setEditorData(self, editor: QWidget, index: Index) -> None:
        # A change from elsewhere does not take away what is being typed.
        text = str(index.data(Qt.ItemDataRole.EditRole))
        if isinstance(editor, MaterialBox):
            if not editor.typed:
                editor.open_with(text)
        elif isinstance(editor, QuantityEdit) and not editor.isModified():
            editor.setText(text)

    def setModelData(self, editor: QWidget, model: QAbstractItemModel, index: Index) -> None:
        text = editor.currentText() if isinstance(editor, MaterialBox) else ""
        if isinstance(editor, QuantityEdit):
            text = editor.text()
        model.setData(index, text, Qt.ItemDataRole.EditRole)

    def updateEditorGeometry(self, editor: QWidget, option: QStyleOptionViewItem, index: Index) -> None:
        editor.setGeometry(option.rect)

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if isinstance(watched, QWidget) and is_enter(event):
            self._finish(watched, advance=True)
            return True
        return super().eventFilter(watched, event)

    def _finish(self, editor: QWidget, *, advance: bool) -> None:
        # A box that loses the focus says once more that its text was chosen.
        if editor.property(_FINISHED):
            return
        editor.setProperty(_FINISHED, True)
        self.commitData.emit(editor)
        self.closeEditor.emit(editor, QAbstractItemDelegate.EndEditHint.NoHint)
        if advance:
            self.entered.emit()
