"""A table without grid and frames, worked by the keyboard."""

from PySide6.QtCore import QEvent, QItemSelectionModel, QModelIndex, Qt, Signal
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QAbstractItemView, QHeaderView, QTableView, QWidget

from app.look.theme import Theme
from app.panels.tables.delegate import QuietDelegate, is_enter
from app.panels.tables.header import QuietHeader

_Key = Qt.Key
_Mod = Qt.KeyboardModifier
_Flags = QItemSelectionModel.SelectionFlag


class QuietTable(QTableView):
    """Rows are selected whole; any key, F2 or a double click opens a cell.

    Enter goes down, Tab on to the next cell that can be typed into, Backspace opens a cell emptied, and F6 leaves
    the table, which Tab does not. `wanted` is emitted with the name of a command that a subclass finds for a key.
    """

    wanted = Signal(str)

    def __init__(self, delegate: QuietDelegate, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._quiet_delegate = delegate
        self._quiet_header = QuietHeader(theme, self)
        self.setHorizontalHeader(self._quiet_header)
        self.setItemDelegate(delegate)
        delegate.entered.connect(lambda: self.step_down())
        self.verticalHeader().hide()
        self.verticalHeader().setSectionResizeMode(QHeaderView.ResizeMode.Fixed)
        self.set_row_height()
        self.setShowGrid(False)
        self.setFrameShape(self.Shape.NoFrame)
        self.setSelectionBehavior(QAbstractItemView.SelectionBehavior.SelectRows)
        self.setSelectionMode(QAbstractItemView.SelectionMode.ExtendedSelection)
        triggers = QAbstractItemView.EditTrigger
        self.setEditTriggers(triggers.AnyKeyPressed | triggers.EditKeyPressed | triggers.DoubleClicked)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        self.setWordWrap(False)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._quiet_delegate.theme = theme
        self._quiet_header.set_theme(theme)
        self.viewport().update()

    def set_row_height(self) -> None:
        """Give the rows the height of the font and a little air."""
        self.verticalHeader().setDefaultSectionSize(self.fontMetrics().height() + 12)

    def command_of(self, event: QKeyEvent) -> str:
        """Return the name of the command a key stands for, or an empty text."""
        return ""

    @property
    def typing(self) -> bool:
        """Whether a cell is open."""
        return self.state() == QAbstractItemView.State.EditingState

    def go(self, index: QModelIndex) -> None:
        """Make a cell the current one and select its row alone."""
        # Not setCurrentIndex: that would extend the selection while Shift is still held, as after Shift+Insert.
        self.selectionModel().setCurrentIndex(index, _Flags.ClearAndSelect | _Flags.Rows)
        self.scrollTo(index)

    def step_down(self) -> None:
        """Go to the cell below, as Enter does; at the last row stay."""
        index = self.currentIndex()
        below = self.model().index(index.row() + 1, index.column())
        if below.isValid():
            self.go(below)

    def event(self, event: QEvent) -> bool:
        # What the table does itself must not be taken by a shortcut of the window while the table has the focus.
        is_shortcut = event.type() == QEvent.Type.ShortcutOverride
        if is_shortcut and isinstance(event, QKeyEvent) and self.command_of(event):
            event.accept()
            return True
        return super().event(event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        command = self.command_of(event)
        if command:
            self.wanted.emit(command)
        elif is_enter(event) and event.modifiers() in (_Mod.NoModifier, _Mod.KeypadModifier):
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

    def moveCursor(
        self, cursorAction: QAbstractItemView.CursorAction, modifiers: Qt.KeyboardModifier
    ) -> QModelIndex:
        """Return where a key goes; Tab and Shift+Tab go to cells that can be typed into, round at the ends."""
        steps = {QAbstractItemView.CursorAction.MoveNext: 1, QAbstractItemView.CursorAction.MovePrevious: -1}
        if cursorAction not in steps or not self.currentIndex().isValid():
            return super().moveCursor(cursorAction, modifiers)
        model, step = self.model(), steps[cursorAction]
        rows, columns = model.rowCount(), model.columnCount()
        place = self.currentIndex().row() * columns + self.currentIndex().column()
        for _ in range(rows * columns):
            place = (place + step) % (rows * columns)
            index = model.index(*divmod(place, columns))
            if index.flags() & Qt.ItemFlag.ItemIsEditable:
                return index
        return self.currentIndex()
