"""The job's materials as Qt sees them: a view of the session's document."""

from enum import IntEnum
from typing import Final

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt

from app.document import edits
from app.document.document import Document, material_cell
from app.document.session import Change, Session
from app.document.view import View, ViewChange
from app.panels.elements.difference import Inserted, Removed, step_between
from app.panels.materials.lines import COLUMNS, READING, MaterialCell, MaterialColumn, MaterialLine, lines_of
from app.panels.tables.delegate import Ask
from app.panels.tables.words import fault_words
from app.series.texts import frequency_text

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole

_NOWHERE: Final = QModelIndex()
_RIGHT: Final = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
_LEFT: Final = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter


class AskedOfMaterial(IntEnum):
    """What the delegate asks of a cell of this table, beyond `Ask`."""

    KIND = Ask.OWN
    """Kind of the material (see `app.series.kinds`)."""
    COLUMN = Ask.OWN + 1
    """The `MaterialColumn`."""


class MaterialsModel(QAbstractTableModel):
    """One row a material of the job.

    It changes nothing itself: what is typed becomes an edit of the session, and what that did comes back.

    Parameters
    ----------
    session
        Whose materials are shown.
    view
        Its active marker is the frequency of the readings.
    """

    def __init__(self, session: Session, view: View, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._session = session
        self._view = view
        self._document = session.document
        self._lines = self._read()
        ends = (session.subscribe(self._follow), view.subscribe(self._follow_view))
        self.destroyed.connect(lambda: [end() for end in ends])

    @property
    def frequency(self) -> float:
        """Frequency of the readings in Hz."""
        return self._view.state.marker_frequency(self._document.record.sweep)

    @property
    def lines(self) -> tuple[MaterialLine, ...]:
        """What the rows show, in order."""
        return self._lines

    def row_of(self, name: str) -> int:
        """Return the row of the material called `name`; ValueError when there is none."""
        return [line.name for line in self._lines].index(name)

    def view(self, index: Index) -> MaterialCell:
        """Return what the cell at `index` shows."""
        return self._lines[index.row()].cells[index.column()]

    def rowCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._lines)

    def columnCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(COLUMNS)

    def data(self, index: Index, role: int = Role.DisplayRole) -> object:
        if not self.checkIndex(index, self.CheckIndexOption.IndexIsValid):
            return None
        line, view, column = self._lines[index.row()], self.view(index), COLUMNS[index.column()]
        match role:
            case Role.DisplayRole | Role.EditRole:
                return view.text
            case Role.ToolTipRole:
                return _tool_tip(line, view, column)
            case Role.TextAlignmentRole:
                return _RIGHT if column.is_number else _LEFT
            case Role.AccessibleTextRole:
                return f"{column.title} of {line.name}: {view.text or 'empty'}"
            case Role.AccessibleDescriptionRole:
                return fault_words(view.fault) if view.fault else line.caution or column.definition
            case Ask.FAULT:
                return view.fault
            case Ask.CAUTION:
                return line.caution if index.column() == 0 else ""
            case AskedOfMaterial.KIND:
                return line.kind
            case AskedOfMaterial.COLUMN:
                return column
        return None

    def headerData(self, section: int, orientation: Qt.Orientation, role: int = Role.DisplayRole) -> object:
        if orientation != Qt.Orientation.Horizontal or not 0 <= section < len(COLUMNS):
            return None
        column = COLUMNS[section]
        match role:
            case Role.DisplayRole | Role.AccessibleTextRole:
                return f"At {frequency_text(self.frequency)}" if column is READING else column.title
            case Role.ToolTipRole | Role.AccessibleDescriptionRole:
                return column.definition
            case Role.TextAlignmentRole:
                return _RIGHT if column.is_number else _LEFT
        return None

    def flags(self, index: Index) -> Qt.ItemFlag:
        if not index.isValid():
            return Qt.ItemFlag.NoItemFlags
        flags = Qt.ItemFlag.ItemIsEnabled | Qt.ItemFlag.ItemIsSelectable | Qt.ItemFlag.ItemNeverHasChildren
        return flags | Qt.ItemFlag.ItemIsEditable if self.view(index).editable else flags

    def setData(self, index: Index, value: object, role: int = Role.EditRole) -> bool:
        """Type `value` into a cell; True when it is a value, False when it stays as a marked text."""
        if role != Role.EditRole or not index.isValid() or not self.view(index).editable:
            return False
        text = str(value)
        if text == self.view(index).text:
            return self.view(index).fault is None
        cell = material_cell(self._lines[index.row()].name, COLUMNS[index.column()].name)
        faults = self._session.apply(edits.type_into(cell, text), self)
        return not faults and self._session.document.draft(cell) is None

    def _read(self) -> tuple[MaterialLine, ...]:
        return lines_of(self._document, self.frequency)

    def _follow(self, change: Change) -> None:
        before, after = self._document, change.after
        self._document = after
        if change.kind == "open":
            self.beginResetModel()
            self._lines = self._read()
            self.endResetModel()
        elif not _same_here(before, after):
            self._take(self._read())

    def _follow_view(self, change: ViewChange) -> None:
        sweep = self._document.record.sweep
        if change.before.marker_frequency(sweep) != change.after.marker_frequency(sweep):
            self._take(self._read())

    def _take(self, lines: tuple[MaterialLine, ...]) -> None:
        old, new = [line.name for line in self._lines], [line.name for line in lines]
        match step_between(old, new):
            case Inserted(first, count):
                self.beginInsertRows(_NOWHERE, first, first + count - 1)
                self._lines = self._lines[:first] + lines[first : first + count] + self._lines[first:]
                self.endInsertRows()
            case Removed(first, count):
                self.beginRemoveRows(_NOWHERE, first, first + count - 1)
                self._lines = self._lines[:first] + self._lines[first + count :]
                self.endRemoveRows()
        changed = [row for row, (was, now) in enumerate(zip(self._lines, lines, strict=True)) if was != now]
        self._lines = lines
        for row in changed:
            self.dataChanged.emit(self.index(row, 0), self.index(row, len(COLUMNS) - 1))
        self.headerDataChanged.emit(Qt.Orientation.Horizontal, 0, len(COLUMNS) - 1)


def _same_here(before: Document, after: Document) -> bool:
    """Whether nothing that this table shows can differ; a dragged face changes none of it."""
    same_record = before.record.materials is after.record.materials and before.record.sweep is after.record.sweep
    return same_record and before.drafts == after.drafts


def _tool_tip(line: MaterialLine, view: MaterialCell, column: MaterialColumn) -> str:
    if view.fault is not None:
        return fault_words(view.fault)
    tie = f"From the library, {line.library}; a constant typed here cuts the tie." if line.library else ""
    text = view.text if len(view.text) > 24 else ""
    return "\n".join(part for part in (text, line.caution, column.definition, tie) if part)
