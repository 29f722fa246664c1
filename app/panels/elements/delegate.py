"""How a cell of the element table is drawn, and what opens in it for typing."""

from typing import Final

from PySide6.QtCore import QAbstractItemModel, QObject, QRect, Qt
from PySide6.QtGui import QColor, QPainter
from PySide6.QtWidgets import QStyleOptionViewItem, QWidget

from app.document.reading import unit_of
from app.look.palette import tabular_font
from app.look.theme import Theme, kind_style
from app.panels.elements.columns import MATERIAL, SHEET_COLUMNS, Column
from app.panels.elements.editors import MaterialBox, QuantityEdit
from app.panels.elements.model import Asked, ElementsModel
from app.panels.elements.names import MaterialNames
from app.panels.elements.widths import Widths, split_quantity
from app.panels.tables.delegate import PADDING, Ask, Index, QuietDelegate

SWATCH: Final = 12


class CellDelegate(QuietDelegate):
    """Draws every cell; numbers stand with their decimal points below each other and their units behind them."""

    def __init__(self, theme: Theme, parent: QObject | None = None) -> None:
        super().__init__(theme, parent)
        self.widths: tuple[Widths, ...] = ()
        """Widths of the columns, by which numbers are stood below each other."""

    def paint_content(self, painter: QPainter, room: QRect, index: Index) -> None:
        column: Column = index.data(Asked.COLUMN)
        editable = bool(index.flags() & Qt.ItemFlag.ItemIsEditable)
        if column.dimension is not None:
            painter.setFont(tabular_font(painter.font()))
        if column is MATERIAL and index.data():
            self._paint_material(painter, room, index)
        elif column.dimension is not None and editable and index.data(Ask.FAULT) is None:
            self._paint_quantity(painter, room, index)
        else:
            super().paint_content(painter, room, index)

    def _paint_material(self, painter: QPainter, room: QRect, index: Index) -> None:
        kind = index.data(Asked.MATERIAL_KIND)
        if kind and index.data(Ask.FAULT) is None:
            style = kind_style(self.theme, kind)
            patch = QRect(room.left(), room.center().y() - SWATCH // 2, SWATCH, SWATCH)
            painter.setPen(QColor(style.ink))
            painter.setBrush(QColor(style.tint))
            painter.drawRect(patch)
            painter.setBrush(Qt.BrushStyle.NoBrush)
            room = room.adjusted(SWATCH + PADDING, 0, 0, 0)
        self.paint_words(painter, room, index, self._ink(index))

    def _ink(self, index: Index) -> str:
        """Return the colour of a row's words: muted where it is left out, which its kind says as well."""
        return self.theme.muted if index.data(Asked.LEFT_OUT) else self.theme.text

    def _paint_quantity(self, painter: QPainter, room: QRect, index: Index) -> None:
        metrics = painter.fontMetrics()
        number, fraction, unit = split_quantity(index.data())
        widths = self.widths[index.column()]
        left = room.right() - widths.unit - widths.fraction - metrics.horizontalAdvance(number)
        if not number or left < room.left():
            self.paint_words(painter, room, index, self._ink(index))
            return
        vertical = Qt.AlignmentFlag.AlignVCenter
        painter.setPen(QColor(self._ink(index)))
        painter.drawText(QRect(left, room.top(), room.width(), room.height()), vertical, number + fraction)
        painter.setPen(QColor(self.theme.muted))
        unit_left = room.right() - widths.unit + metrics.horizontalAdvance(" ")
        painter.drawText(QRect(unit_left, room.top(), room.width(), room.height()), vertical, unit)

    def createEditor(self, parent: QWidget, option: QStyleOptionViewItem, index: Index) -> QWidget:
        model = index.model()
        assert isinstance(model, ElementsModel)
        column: Column = index.data(Asked.COLUMN)
        if column.dimension is None:
            names = MaterialNames(model.document.record)
            offers = names.offers(with_metal=index.data(Asked.LINE_KIND) == "back")
            box = MaterialBox(offers, parent)
            box.chosen.connect(lambda: self.finish(box, advance=False))
            box.entered.connect(lambda: self.finish(box, advance=True))
            editor: QWidget = box
        else:
            unit = unit_of(index.data() or "", column.dimension)
            line = QuantityEdit(self.theme, column.dimension, unit, column in SHEET_COLUMNS, parent)
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
