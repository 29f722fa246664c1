"""The table itself: keys, the way the current cell goes, and dragging rows."""

from typing import Final, Literal

from PySide6.QtCore import (
    QEvent,
    QItemSelection,
    QItemSelectionModel,
    QModelIndex,
    QPoint,
    QRect,
    Qt,
    Signal,
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
from PySide6.QtWidgets import QAbstractItemView, QHeaderView, QTableView, QWidget

from app.look.theme import Theme
from app.panels.elements.columns import LAYER_COLUMNS, MATERIAL
from app.panels.elements.delegate import CellDelegate
from app.panels.elements.header import QuietHeader
from app.panels.elements.model import ElementsModel
from app.panels.elements.widths import Measuring

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
_ENTER_KEYS: Final = (_Key.Key_Return, _Key.Key_Enter)


class ElementsTable(QTableView):
    """A lay-up sheet for `ElementsModel`.

    `wanted` is emitted with a command when its keys are pressed. Enter goes down, Tab goes on to the next cell that
    can be typed into, and F6 leaves the table, which Tab does not.
    """

    wanted = Signal(str)

    def __init__(self, model: ElementsModel, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._drop_before: int | None = None
        self._delegate = CellDelegate(theme, self)
        self._header = QuietHeader(theme, self)
        self._measuring = Measuring(self.font())
        self.setHorizontalHeader(self._header)
        self.setModel(model)
        self.setItemDelegate(self._delegate)
        self._delegate.entered.connect(lambda: self.step_down())
        self._set_up_rows()
        self._set_up_dragging()
        for signal in (model.dataChanged, model.rowsInserted, model.rowsRemoved, model.modelReset):
            signal.connect(self._fit_columns)
        for signal in (model.columnsInserted, model.columnsRemoved):
            signal.connect(self._fit_columns)
        self.setAccessibleName("Elements of the stack")
        self.setAccessibleDescription("From the front to the back, one row an element. F6 leaves the table.")
        model.modelReset.connect(self._begin_somewhere)
        self._fit_columns()
        self._begin_somewhere()

    def _begin_somewhere(self) -> None:
        """Have a current cell from the start, so that keys have a place: the material in front."""
        index = self.elements_model().index(0, LAYER_COLUMNS.index(MATERIAL))
        self.selectionModel().setCurrentIndex(index, QItemSelectionModel.SelectionFlag.NoUpdate)

    def _set_up_rows(self) -> None:
        self.verticalHeader().hide()
        self.verticalHeader().setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        self.verticalHeader().setDefaultSectionSize(self.fontMetrics().height() + 12)
        self.setShowGrid(False)
        self.setFrameShape(self.Shape.NoFrame)
        self.setSelectionBehavior(QAbstractItemView.SelectionBehavior.SelectRows)
        self.setSelectionMode(QAbstractItemView.SelectionMode.ExtendedSelection)
        triggers = QAbstractItemView.EditTrigger
        self.setEditTriggers(triggers.AnyKeyPressed | triggers.EditKeyPressed | triggers.DoubleClicked)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        self.setWordWrap(False)

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
        self._delegate.set_theme(theme)
        self._header.set_theme(theme)
        self.viewport().update()

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
        typing = self.state() == QAbstractItemView.State.EditingState
        if rows and self.currentIndex().row() not in rows and not typing:
            index = model.index(rows[0], self.currentIndex().column())
            self.selectionModel().setCurrentIndex(index, flags.NoUpdate)
            self.scrollTo(index)

    def go_to(self, element: int, column: str) -> None:
        """Make the cell of `column` of an element the current one and select its row."""
        names = [shown.name for shown in self.elements_model().columns]
        self.setCurrentIndex(self.elements_model().index(element + 1, names.index(column)))

    def step_down(self) -> None:
        """Go to the cell below, as Enter does; at the last row stay."""
        index = self.currentIndex()
        below = self.model().index(index.row() + 1, index.column())
        if below.isValid():
            self.setCurrentIndex(below)

    # Keys

    def event(self, event: QEvent) -> bool:
        # What the table does itself must not be taken by a shortcut of the window while the table has the focus.
        if event.type() == QEvent.Type.ShortcutOverride and isinstance(event, QKeyEvent) and _command(event):
            event.accept()
            return True
        return super().event(event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        command = _command(event)
        if command is not None:
            self.wanted.emit(command)
        elif event.key() in _ENTER_KEYS and event.modifiers() in (_Mod.NoModifier, _Mod.KeypadModifier):
            self.step_down()
        elif event.key() == _Key.Key_Backspace:
            # Opens the cell with its text selected, and takes that away.
            self.edit(self.currentIndex(), QAbstractItemView.EditTrigger.AnyKeyPressed, event)
        elif event.key() == _Key.Key_F6:
            QWidget.focusNextPrevChild(self, not event.modifiers() & _Mod.ShiftModifier)
        else:
            super().keyPressEvent(event)
            return
        event.accept()

    def moveCursor(self, action: QAbstractItemView.CursorAction, modifiers: Qt.KeyboardModifier) -> QModelIndex:
        """Return where a key goes; Tab and Shift+Tab go to cells that can be typed into, round at the ends."""
        steps = {QAbstractItemView.CursorAction.MoveNext: 1, QAbstractItemView.CursorAction.MovePrevious: -1}
        if action not in steps or not self.currentIndex().isValid():
            return super().moveCursor(action, modifiers)
        model, step = self.model(), steps[action]
        rows, columns = model.rowCount(), model.columnCount()
        place = self.currentIndex().row() * columns + self.currentIndex().column()
        for _ in range(rows * columns):
            place = (place + step) % (rows * columns)
            index = model.index(*divmod(place, columns))
            if index.flags() & Qt.ItemFlag.ItemIsEditable:
                return index
        return self.currentIndex()

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
            self._set_up_rows()
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


def _command(event: QKeyEvent) -> Command | None:
    """Return the command a key stands for, or None."""
    modifiers = event.modifiers() & ~_Mod.KeypadModifier
    for (key, wanted), command in _KEYS.items():
        if event.key() == key and modifiers == wanted:
            return command
    # Behind the table's own keys: Shift+Insert also pastes on some systems, and here it adds a sheet.
    return next((command for standard, command in _STANDARD if event.matches(standard)), None)
