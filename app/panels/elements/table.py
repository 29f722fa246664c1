"""The table itself: keys, the way the current cell goes, and dragging rows."""

from typing import Final, Literal

from PySide6.QtCore import (
    QEvent,
    QItemSelection,
    QItemSelectionModel,
    QPoint,
    QRect,
    Qt,
)
from PySide6.QtGui import (
    QColor,
    QDragEnterEvent,
    QDragLeaveEvent,
    QDragMoveEvent,
    QDropEvent,
    QKeyEvent,
    QKeySequence,
    QPainter,
    QPaintEvent,
    QPen,
    QResizeEvent,
)
from PySide6.QtWidgets import QAbstractItemView, QWidget

from app.look.theme import Theme
from app.panels.elements.columns import LAYER_COLUMNS, MATERIAL
from app.panels.elements.delegate import CellDelegate
from app.panels.elements.model import ElementsModel
from app.panels.elements.widths import Measuring
from app.panels.tables.table import QuietTable

Command = Literal["delete", "add_layer", "add_sheet", "move_up", "move_down", "copy", "cut", "paste"]

LEAST_MATERIAL_WIDTH: Final = 132
DROP_LINE: Final = 2
EMPTY_HINT: Final = "Nothing between the half-spaces yet.\nPress Insert for a layer, Shift+Insert for a sheet."

_STANDARD: Final[tuple[tuple[QKeySequence.StandardKey, Command], ...]] = (
    (QKeySequence.StandardKey.Copy, "copy"),
    (QKeySequence.StandardKey.Cut, "cut"),
    (QKeySequence.StandardKey.Paste, "paste"),
)
_Key = Qt.Key
_Mod = Qt.KeyboardModifier
_KEYS: Final[dict[tuple[Qt.Key, Qt.KeyboardModifier], Command]] = {
    (_Key.Key_Delete, _Mod.NoModifier): "delete",
    (_Key.Key_Insert, _Mod.NoModifier): "add_layer",
    (_Key.Key_Insert, _Mod.ShiftModifier): "add_sheet",
    (_Key.Key_Up, _Mod.AltModifier): "move_up",
    (_Key.Key_Down, _Mod.AltModifier): "move_down",
}


class ElementsTable(QuietTable):
    """A lay-up sheet for `ElementsModel`.

    Rows are dragged and moved as one block. `wanted` is emitted with a `Command` when its keys are pressed.
    """

    def __init__(self, model: ElementsModel, theme: Theme, parent: QWidget | None = None) -> None:
        self._delegate = CellDelegate(theme)
        super().__init__(self._delegate, theme, parent)
        self._delegate.setParent(self)
        self._theme = theme
        self._drop_before: int | None = None
        self._measuring = Measuring(self.font())
        self.setModel(model)
        self._set_up_dragging()
        for signal in (model.dataChanged, model.rowsInserted, model.rowsRemoved, model.modelReset):
            signal.connect(self._fit_columns)
        for signal in (model.columnsInserted, model.columnsRemoved):
            signal.connect(self._fit_columns)
        model.modelReset.connect(self._begin_somewhere)
        self.setAccessibleName("Elements of the stack")
        self.setAccessibleDescription("From the front to the back, one row an element. F6 leaves the table.")
        self._fit_columns()
        self._begin_somewhere()

    def _begin_somewhere(self) -> None:
        """Have a current cell from the start, so that keys have a place: the material in front."""
        index = self.elements_model().index(0, LAYER_COLUMNS.index(MATERIAL))
        self.selectionModel().setCurrentIndex(index, QItemSelectionModel.SelectionFlag.NoUpdate)

    def _set_up_dragging(self) -> None:
        self.setDragEnabled(True)
        self.setAcceptDrops(True)
        self.setDragDropMode(QAbstractItemView.DragDropMode.InternalMove)
        self.setDragDropOverwriteMode(False)
        self.setDefaultDropAction(Qt.DropAction.MoveAction)
        # The line across the whole row that paintEvent draws says more than one in a single cell.
        self.setDropIndicatorShown(False)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme
        super().set_theme(theme)

    def elements_model(self) -> ElementsModel:
        """Return the model."""
        model = self.model()
        assert isinstance(model, ElementsModel)
        return model

    def selected_elements(self) -> tuple[int, ...]:
        """Return the indices of the selected elements, ascending; half-spaces are left out."""
        rows = [index.row() for index in self.selectionModel().selectedRows()]
        return self.elements_model().element_rows(rows)

    def select_elements(self, elements: tuple[int, ...]) -> None:
        """Select elements by index, and make one of them current when the current row is none of them."""
        model, rows = self.elements_model(), [element + 1 for element in elements]
        selection = QItemSelection()
        for row in rows:
            selection.select(model.index(row, 0), model.index(row, model.columnCount() - 1))
        flags = QItemSelectionModel.SelectionFlag
        self.selectionModel().select(selection, flags.ClearAndSelect | flags.Rows)
        # Another current cell would shut the one that is open and take what was typed so far for the whole.
        if rows and self.currentIndex().row() not in rows and not self.typing:
            index = model.index(rows[0], self.currentIndex().column())
            self.selectionModel().setCurrentIndex(index, flags.NoUpdate)
            self.scrollTo(index)

    def go_to(self, element: int, column: str) -> None:
        """Make the cell of `column` of an element the current one and select its row."""
        names = [shown.name for shown in self.elements_model().columns]
        self.go(self.elements_model().index(element + 1, names.index(column)))

    def command_of(self, event: QKeyEvent) -> Command | Literal[""]:
        modifiers = event.modifiers() & ~_Mod.KeypadModifier
        for (key, wanted), command in _KEYS.items():
            if event.key() == key and modifiers == wanted:
                return command
        # Behind the table's own keys: Shift+Insert also pastes on some systems, and here it adds a sheet.
        return next((command for standard, command in _STANDARD if event.matches(standard)), "")

    # Dragging

    def drop_place(self, position: QPoint) -> int | None:
        """Return before which element (by index) rows dropped at `position` go, or None outside the table."""
        model = self.elements_model()
        count = len(model.stack.elements)
        row = self.rowAt(position.y())
        if row < 0:
            return count if position.y() >= 0 else None
        middle = self.rowViewportPosition(row) + self.rowHeight(row) / 2
        before = row - 1 if position.y() < middle else row
        return min(max(before, 0), count)

    def dragEnterEvent(self, event: QDragEnterEvent) -> None:
        super().dragEnterEvent(event)
        self._show_drop(event)

    def dragMoveEvent(self, event: QDragMoveEvent) -> None:
        # The base class scrolls near the edges; whether the drop is taken is decided here.
        super().dragMoveEvent(event)
        self._show_drop(event)

    def dragLeaveEvent(self, event: QDragLeaveEvent) -> None:
        self._end_drop()
        super().dragLeaveEvent(event)

    def dropEvent(self, event: QDropEvent) -> None:
        """Move the selected rows as one block.

        Qt's own handling would move row by row, one undo step each.
        """
        before = self.drop_place(event.position().toPoint())
        self._end_drop()
        if event.source() is not self or before is None:
            event.ignore()
            return
        self.elements_model().move_elements(self.selected_elements(), before)
        event.setDropAction(Qt.DropAction.MoveAction)
        event.accept()
        self.setState(QAbstractItemView.State.NoState)

    def _show_drop(self, event: QDragMoveEvent) -> None:
        place = self.drop_place(event.position().toPoint())
        if event.source() is not self or place is None or not self.selected_elements():
            self._end_drop()
            event.ignore()
            return
        self._drop_before = place
        event.setDropAction(Qt.DropAction.MoveAction)
        event.accept()
        self.viewport().update()

    def _end_drop(self) -> None:
        self._drop_before = None
        self.viewport().update()

    # Drawing and widths

    def paintEvent(self, event: QPaintEvent) -> None:
        super().paintEvent(event)
        painter = QPainter(self.viewport())
        if self._drop_before is not None:
            painter.setPen(QPen(QColor(self._theme.accent), DROP_LINE))
            y = self.rowViewportPosition(self._drop_before + 1) - 1
            painter.drawLine(0, y, self.viewport().width(), y)
        if self.elements_model().rowCount() == 2:
            top = self.rowViewportPosition(1) + self.rowHeight(1) + 12
            room = QRect(8, top, self.viewport().width() - 16, self.viewport().height() - top)
            painter.setPen(QColor(self._theme.muted))
            painter.drawText(room, Qt.AlignmentFlag.AlignLeft | Qt.TextFlag.TextWordWrap, EMPTY_HINT)

    def changeEvent(self, event: QEvent) -> None:
        super().changeEvent(event)
        if event.type() == QEvent.Type.FontChange:
            self._measuring = Measuring(self.font())
            self.set_row_height()
            self._fit_columns()

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self._fit_columns()

    def _fit_columns(self) -> None:
        """Give every column the room its texts need, and the materials what is left."""
        model = self.elements_model()
        widths = self._measuring.widths(model.columns, model.lines)
        if widths != self._delegate.widths:
            self._delegate.widths = widths
            self.viewport().update()
        taken = sum(
            width.cell for column, width in zip(model.columns, widths, strict=True) if column is not MATERIAL
        )
        left = max(LEAST_MATERIAL_WIDTH, self.viewport().width() - taken)
        for place, column in enumerate(model.columns):
            width = left if column is MATERIAL else widths[place].cell
            if self.columnWidth(place) != width:
                self.setColumnWidth(place, width)
