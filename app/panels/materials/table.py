"""The table of the job's materials."""

from typing import Final

from PySide6.QtCore import QAbstractItemModel, QRect, Qt
from PySide6.QtGui import QColor, QFontMetrics, QKeyEvent, QPainter
from PySide6.QtWidgets import QLineEdit, QStyleOptionViewItem, QWidget

from app.look.palette import tabular_font
from app.look.theme import Theme, kind_style
from app.panels.materials.lines import COLUMNS, NAME, MaterialColumn
from app.panels.materials.model import AskedOfMaterial, MaterialsModel
from app.panels.tables.delegate import MARK, MARK_GAP, PADDING, Index, QuietDelegate
from app.panels.tables.table import QuietTable

SWATCH: Final = 12
WIDEST: Final = 180
"""Of a column of words, in pixels; longer texts are cut short and stand whole in their tips."""


class MaterialDelegate(QuietDelegate):
    """Draws the materials with the mark of their kind, and opens a plain line for typing."""

    def paint_content(self, painter: QPainter, room: QRect, index: Index) -> None:
        column: MaterialColumn = index.data(AskedOfMaterial.COLUMN)
        if column.is_number:
            painter.setFont(tabular_font(painter.font()))
        if column is NAME:
            style = kind_style(self.theme, index.data(AskedOfMaterial.KIND))
            patch = QRect(room.left(), room.center().y() - SWATCH // 2, SWATCH, SWATCH)
            painter.setPen(QColor(style.ink))
            painter.setBrush(QColor(style.tint))
            painter.drawRect(patch)
            painter.setBrush(Qt.BrushStyle.NoBrush)
            room = room.adjusted(SWATCH + PADDING, 0, 0, 0)
        super().paint_content(painter, room, index)

    def createEditor(self, parent: QWidget, option: QStyleOptionViewItem, index: Index) -> QWidget:
        column: MaterialColumn = index.data(AskedOfMaterial.COLUMN)
        line = QLineEdit(parent)
        line.setFrame(False)
        line.setAlignment(Qt.AlignmentFlag.AlignRight if column.is_number else Qt.AlignmentFlag.AlignLeft)
        line.setAccessibleName(str(index.data(Qt.ItemDataRole.AccessibleTextRole)))
        line.setAccessibleDescription(column.definition)
        return line

    def setEditorData(self, editor: QWidget, index: Index) -> None:
        # A change from elsewhere does not take away what is being typed.
        if isinstance(editor, QLineEdit) and not editor.isModified():
            editor.setText(str(index.data(Qt.ItemDataRole.EditRole)))

    def setModelData(self, editor: QWidget, model: QAbstractItemModel, index: Index) -> None:
        if isinstance(editor, QLineEdit):
            model.setData(index, editor.text(), Qt.ItemDataRole.EditRole)


class MaterialsTable(QuietTable):
    """The job's materials; several can be chosen to compare, Delete asks to remove the current one (`wanted`)."""

    def __init__(self, model: MaterialsModel, theme: Theme, parent: QWidget | None = None) -> None:
        delegate = MaterialDelegate(theme)
        super().__init__(delegate, theme, parent)
        delegate.setParent(self)
        self.setModel(model)
        for signal in (model.dataChanged, model.rowsInserted, model.rowsRemoved, model.modelReset):
            signal.connect(self._fit_columns)
        self.setAccessibleName("Materials of this job")
        self.setAccessibleDescription(
            "One row a material; Shift and Ctrl choose several to compare. F6 leaves the table."
        )
        self._fit_columns()

    def command_of(self, event: QKeyEvent) -> str:
        plain = event.modifiers() & ~Qt.KeyboardModifier.KeypadModifier == Qt.KeyboardModifier.NoModifier
        return "remove" if event.key() == Qt.Key.Key_Delete and plain else ""

    def materials_model(self) -> MaterialsModel:
        """Return the model."""
        model = self.model()
        assert isinstance(model, MaterialsModel)
        return model

    def current_name(self) -> str:
        """Return the name of the current material, or an empty text."""
        row = self.currentIndex().row()
        lines = self.materials_model().lines
        return lines[row].name if 0 <= row < len(lines) else ""

    def chosen_names(self) -> tuple[str, ...]:
        """Return the names of the materials chosen, in their order."""
        rows = sorted({index.row() for index in self.selectionModel().selectedRows()})
        lines = self.materials_model().lines
        return tuple(lines[row].name for row in rows if row < len(lines))

    def go_to(self, name: str, column: str) -> None:
        """Make a cell of the material called `name` the current one."""
        place = [shown.name for shown in COLUMNS].index(column)
        self.go(self.materials_model().index(self.materials_model().row_of(name), place))

    def _fit_columns(self) -> None:
        model, metrics = self.materials_model(), QFontMetrics(tabular_font(self.font()))
        for place, column in enumerate(COLUMNS):
            texts = [line.cells[place] for line in model.lines]
            marks = [MARK + MARK_GAP if cell.fault else 0 for cell in texts]
            title = str(model.headerData(place, Qt.Orientation.Horizontal))
            extra = SWATCH + PADDING + MARK + MARK_GAP if column is NAME else 0
            widths = [metrics.horizontalAdvance(c.text) + m for c, m in zip(texts, marks, strict=True)]
            width = max([metrics.horizontalAdvance(title), *widths]) + extra + 2 * PADDING + 2
            self.setColumnWidth(place, width if column.is_number else min(width, WIDEST))
        self.viewport().update()
