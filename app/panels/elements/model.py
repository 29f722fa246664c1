"""The element table as Qt sees it: a view of one stack of the session's document."""

from collections.abc import Iterator, Sequence
from enum import IntEnum
from itertools import groupby
from typing import Final

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt

from app.document import edits
from app.document.document import Document
from app.document.session import Change, Session
from app.panels.elements.columns import CONDUCTIVITY, MATERIAL, Column, columns_of, shown_place
from app.panels.elements.difference import Inserted, Moved, Removed, Step, step_between
from app.panels.elements.gestures import typed_edit
from app.panels.elements.lines import CellView, Line, cell_of, lines_of
from app.panels.elements.names import MaterialNames
from app.panels.tables.delegate import Ask
from app.panels.tables.words import fault_words
from stackcore.job.records import StackRecord

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole

_NOWHERE: Final = QModelIndex()
_RIGHT: Final = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
_LEFT: Final = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter


class Asked(IntEnum):
    """What the delegate asks of a cell of this table, beyond `Ask`."""

    LINE_KIND = Ask.OWN
    """``front``, ``layer``, ``sheet`` or ``back``."""
    MATERIAL_KIND = Ask.OWN + 1
    """Kind of the row's material, or an empty text."""
    COLUMN = Ask.OWN + 2
    """The `Column`."""
    LEFT_OUT = Ask.OWN + 3
    """Whether the row is left out of the computation."""


class ElementsModel(QAbstractTableModel):
    """Rows: front half-space, elements, back half-space. Columns: see `app.panels.elements.columns`.

    It follows the session: every change is told to Qt as the smallest step that is true, so that selections and
    open editors stay where they belong. It changes nothing itself: typing and moving become edits of the session,
    and what those did comes back as a change.

    Parameters
    ----------
    session
        Whose document is shown; the stack is the one its selection names.
    """

    def __init__(self, session: Session, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._session = session
        self._document = session.document
        self._stack_index = session.selection.stack
        self._rare_columns = False
        self._columns = self._wanted_columns()
        self._lines = self._read_lines()
        self._following = False
        self.destroyed.connect(session.subscribe(self._follow))

    @property
    def following(self) -> bool:
        """Whether it is telling Qt of a change: what views select meanwhile is their own doing, not a person's."""
        return self._following

    @property
    def stack_index(self) -> int:
        """Index of the stack shown."""
        return self._stack_index

    @property
    def stack(self) -> StackRecord:
        """The stack shown."""
        return self._document.record.stacks[self._stack_index]

    @property
    def document(self) -> Document:
        """The document shown."""
        return self._document

    @property
    def columns(self) -> tuple[Column, ...]:
        """The columns shown, in order."""
        return self._columns

    @property
    def rare_columns(self) -> bool:
        """Whether the columns for inductance and capacitance were asked for."""
        return self._rare_columns

    def show_rare_columns(self, shown: bool) -> None:
        """Show those columns wherever there is a sheet, or only where a sheet uses them."""
        self._rare_columns = shown
        self._following = True
        try:
            self._set_columns(self._wanted_columns())
            self._take_lines(self._read_lines())
        finally:
            self._following = False

    def _read_lines(self) -> tuple[Line, ...]:
        return lines_of(self._document, self._stack_index, films=CONDUCTIVITY in self._wanted_columns())

    @property
    def lines(self) -> tuple[Line, ...]:
        """What the rows show, in order."""
        return self._lines

    def line(self, row: int) -> Line:
        """Return what the table's row `row` shows."""
        return self._lines[row]

    def view(self, index: Index) -> CellView:
        """Return what the cell at `index` shows."""
        return self._lines[index.row()].cell(self._columns[index.column()])

    def element_rows(self, rows: Sequence[int]) -> tuple[int, ...]:
        """Return the indices of the elements among table rows, ascending; half-spaces are left out."""
        return tuple(sorted({row - 1 for row in rows if self._lines[row].is_element}))

    # What Qt asks

    def rowCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._lines)

    def columnCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._columns)

    def data(self, index: Index, role: int = Role.DisplayRole) -> object:
        if not self.checkIndex(index, self.CheckIndexOption.IndexIsValid):
            return None
        line, view, column = self._lines[index.row()], self.view(index), self._columns[index.column()]
        match role:
            case Role.DisplayRole:
                return view.text
            case Role.EditRole:
                return view.typed
            case Role.ToolTipRole:
                return _tool_tip(view, line, column)
            case Role.TextAlignmentRole:
                return _RIGHT if column.dimension else _LEFT
            case Role.AccessibleTextRole:
                return f"{column.title} of {line.place}: {view.text or 'empty'}"
            case Role.AccessibleDescriptionRole:
                return fault_words(view.fault) if view.fault else column.definition
            case Ask.FAULT:
                return view.fault
            case Ask.ASIDE:
                return not line.is_element
            case Asked.LINE_KIND:
                return line.kind
            case Asked.MATERIAL_KIND:
                return line.material_kind
            case Asked.COLUMN:
                return column
            case Asked.LEFT_OUT:
                return line.left_out
        return None

    def headerData(self, section: int, orientation: Qt.Orientation, role: int = Role.DisplayRole) -> object:
        if orientation != Qt.Orientation.Horizontal or not 0 <= section < len(self._columns):
            return None
        column = self._columns[section]
        match role:
            case Role.DisplayRole | Role.AccessibleTextRole:
                return column.title
            case Role.ToolTipRole | Role.AccessibleDescriptionRole:
                return column.definition
            case Role.TextAlignmentRole:
                return _RIGHT if column.dimension else _LEFT
        return None

    def flags(self, index: Index) -> Qt.ItemFlag:
        # Only the space between rows takes a drop: a cell that does would be overwritten by it.
        if not index.isValid():
            return Qt.ItemFlag.ItemIsDropEnabled
        flags = Qt.ItemFlag.ItemIsEnabled | Qt.ItemFlag.ItemIsSelectable | Qt.ItemFlag.ItemNeverHasChildren
        if self.view(index).editable:
            flags |= Qt.ItemFlag.ItemIsEditable
        if self._lines[index.row()].is_element:
            flags |= Qt.ItemFlag.ItemIsDragEnabled
        return flags

    def setData(self, index: Index, value: object, role: int = Role.EditRole) -> bool:
        """Type `value` into a cell; True when it is a value, False when it stays as a marked text."""
        if role != Role.EditRole or not index.isValid() or not self.view(index).editable:
            return False
        cell = cell_of(self.stack, self._stack_index, index.row(), self._columns[index.column()])
        text = str(value)
        if text == self.view(index).typed:
            return self.view(index).fault is None
        edit = typed_edit(MaterialNames(self._document.record), cell, text)
        faults = self._session.apply(edit, self)
        return not faults and self._session.document.draft(cell) is None

    def supportedDropActions(self) -> Qt.DropAction:
        return Qt.DropAction.MoveAction

    def supportedDragActions(self) -> Qt.DropAction:
        return Qt.DropAction.MoveAction

    def moveRows(self, parent: Index, row: int, count: int, destination: Index, before: int, /) -> bool:
        """Move table rows; True when they moved. Half-spaces stay, and nothing goes outside them."""
        if parent.isValid() or destination.isValid() or count < 1 or row < 1:
            return False
        if row + count > len(self._lines) - 1:
            return False
        return self.move_elements(range(row - 1, row - 1 + count), before - 1)

    def move_elements(self, rows: Sequence[int], before: int) -> bool:
        """Move elements (by index) as one block to before another; True when something moved. One undo step."""
        count = len(self.stack.elements)
        if not rows or not 0 <= before <= count:
            return False
        old = self._session.document
        faults = self._session.apply(edits.move(self._stack_index, rows, before), self)
        return not faults and self._session.document is not old

    # Following the session

    def _follow(self, change: Change) -> None:
        self._following = True
        try:
            self._show(change)
        finally:
            self._following = False

    def _show(self, change: Change) -> None:
        stack = change.selection.stack
        if change.kind == "open" or stack != self._stack_index:
            self.beginResetModel()
            self._document, self._stack_index = change.after, stack
            self._columns = self._wanted_columns()
            self._lines = self._read_lines()
            self.endResetModel()
        elif change.after is not self._document:
            self._show_step(change.after)

    def _show_step(self, after: Document) -> None:
        old, new = self.stack, after.record.stacks[self._stack_index]
        self._document = after
        lines = self._read_lines()
        self._set_columns(self._wanted_columns())
        self._take_step(step_between(old.elements, new.elements), lines)
        self._take_lines(lines)

    def _take_lines(self, lines: tuple[Line, ...]) -> None:
        """Show lines of the same rows, and tell Qt which of them differ."""
        changed = [row for row, (was, now) in enumerate(zip(self._lines, lines, strict=True)) if was != now]
        self._lines = lines
        for first, last in _runs(changed):
            self.dataChanged.emit(self.index(first, 0), self.index(last, len(self._columns) - 1))

    def _set_columns(self, columns: tuple[Column, ...]) -> None:
        """Tell Qt of columns that went or came, one by one; what stays keeps its order."""
        for column in self._columns:
            if column not in columns:
                place = self._columns.index(column)
                self.beginRemoveColumns(_NOWHERE, place, place)
                self._columns = (*self._columns[:place], *self._columns[place + 1 :])
                self.endRemoveColumns()
        for column in columns:
            if column not in self._columns:
                place = sum(shown_place(other) < shown_place(column) for other in self._columns)
                self.beginInsertColumns(_NOWHERE, place, place)
                self._columns = (*self._columns[:place], column, *self._columns[place:])
                self.endInsertColumns()

    def _wanted_columns(self) -> tuple[Column, ...]:
        return columns_of(self._document, self._stack_index, rare=self._rare_columns)

    def _take_step(self, step: Step, lines: tuple[Line, ...]) -> None:
        """Tell Qt of rows that came, went or moved; element `n` is table row `n` + 1."""
        match step:
            case Inserted(first, count):
                start, end = first + 1, first + 1 + count
                self.beginInsertRows(_NOWHERE, start, end - 1)
                self._lines = self._lines[:start] + lines[start:end] + self._lines[start:]
                self.endInsertRows()
            case Removed(first, count):
                start, end = first + 1, first + 1 + count
                self.beginRemoveRows(_NOWHERE, start, end - 1)
                self._lines = self._lines[:start] + self._lines[end:]
                self.endRemoveRows()
            case Moved(first, count, before):
                start, end, target = first + 1, first + 1 + count, before + 1
                self.beginMoveRows(_NOWHERE, start, end - 1, _NOWHERE, target)
                self._lines = _with_block_moved(self._lines, start, end, target)
                self.endMoveRows()


def _with_block_moved(lines: tuple[Line, ...], start: int, end: int, target: int) -> tuple[Line, ...]:
    block = lines[start:end]
    if target > end:
        return lines[:start] + lines[end:target] + block + lines[target:]
    return lines[:target] + block + lines[target:start] + lines[end:]


def _runs(rows: Sequence[int]) -> Iterator[tuple[int, int]]:
    """Yield first and last of each run of consecutive rows."""
    for _, group in groupby(enumerate(rows), key=lambda pair: pair[1] - pair[0]):
        run = [row for _, row in group]
        yield run[0], run[-1]


def _tool_tip(view: CellView, line: Line, column: Column) -> str:
    if view.fault is not None:
        return fault_words(view.fault)
    if column is MATERIAL and view.text:
        return f"{view.text}: material of the {line.place}"
    return column.definition if view.editable else ""
