"""The rows of a list of constants, or of a table of measured data, as Qt shows and edits them."""

from collections.abc import Sequence
from typing import Final

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt
from PySide6.QtGui import QKeyEvent, QKeySequence
from PySide6.QtWidgets import QCompleter, QLineEdit, QStyleOptionViewItem, QWidget

from app.document import edits
from app.document.document import Document, material_cell
from app.document.library import pinned
from app.document.session import Session
from app.look.theme import Theme
from app.panels.material_data.facts import material_names, part_texts
from app.panels.tables.delegate import Ask, QuietDelegate
from app.panels.tables.table import QuietTable
from app.panels.tables.words import fault_words
from stackcore.media.models import Constant, Constants, Reference, Terms, value_text

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole

_NOWHERE: Final = QModelIndex()
_RIGHT: Final = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
_LEFT: Final = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter
LINES: Final = 5
"""Rows that are seen at once."""


class TermsModel(QAbstractTableModel):
    """One row a term, one column a constant of it; what is typed becomes an edit of the session."""

    def __init__(self, session: Session, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._session = session
        self._document: Document = session.document
        self._name = ""
        self._constant: Constant | None = None
        self._titles: tuple[tuple[str, str], ...] = ()
        self._rows: tuple[Constants, ...] = ()

    @property
    def material(self) -> str:
        """The name of the material."""
        return self._name

    @property
    def constant(self) -> str:
        """The name of the list, or an empty text."""
        return self._constant.name if self._constant else ""

    @property
    def parts(self) -> Sequence[Constant]:
        """The constants of a row, in the order of the columns."""
        return self._constant.kind.of if self._constant and isinstance(self._constant.kind, Terms) else ()

    def show_list(self, name: str, constant: Constant | None) -> None:
        """Show a list of the material called `name` as the session has it now, or nothing."""
        document = self._session.document
        material = document.record.material(name)
        value = pinned(material).constants.get(constant.name) if material and constant else ()
        rows = value if isinstance(value, tuple) else ()
        if (name, constant, len(rows)) != (self._name, self._constant, len(self._rows)):
            self.beginResetModel()
            self._name, self._constant, self._rows, self._document = name, constant, rows, document
            self._titles = part_texts(constant) if constant else ()
            self.endResetModel()
        elif rows != self._rows or document.drafts != self._document.drafts:
            self._rows, self._document = rows, document
            self.dataChanged.emit(self.index(0, 0), self.index(len(rows) - 1, len(self._titles) - 1))
        else:
            self._document = document

    def place(self, index: Index) -> str:
        """Return the place of a cell in the material: ``rows[3].permittivity``."""
        return f"{self.constant}[{index.row()}].{self.parts[index.column()].name}"

    def offers(self, index: Index) -> tuple[str, ...]:
        """Return the materials that can be named in a cell, none where it holds something else."""
        is_name = isinstance(self.parts[index.column()].kind, Reference)
        return material_names(self._document, self._name) if is_name else ()

    def rowCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._rows)

    def columnCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._titles)

    def data(self, index: Index, role: int = Role.DisplayRole) -> object:
        if not self.checkIndex(index, self.CheckIndexOption.IndexIsValid):
            return None
        title, meaning = self._titles[index.column()]
        draft = (
            self._document.draft(material_cell(self._name, self.place(index))) if self._document.drafts else None
        )
        match role:
            case Role.DisplayRole | Role.EditRole:
                return draft.text if draft else self._text(index)
            case Role.ToolTipRole | Role.AccessibleDescriptionRole:
                return fault_words(draft.fault) if draft else meaning
            case Role.AccessibleTextRole:
                return (
                    f"{title} in row {index.row() + 1}: {(draft.text if draft else self._text(index)) or 'empty'}"
                )
            case Role.TextAlignmentRole:
                return _LEFT if isinstance(self.parts[index.column()].kind, Reference) else _RIGHT
            case Ask.FAULT:
                return draft.fault if draft else None
        return None

    def headerData(self, section: int, orientation: Qt.Orientation, role: int = Role.DisplayRole) -> object:
        if orientation != Qt.Orientation.Horizontal or not 0 <= section < len(self._titles):
            return None
        match role:
            case Role.DisplayRole | Role.AccessibleTextRole:
                return self._titles[section][0]
            case Role.ToolTipRole | Role.AccessibleDescriptionRole:
                return self._titles[section][1]
            case Role.TextAlignmentRole:
                return _LEFT if isinstance(self.parts[section].kind, Reference) else _RIGHT
        return None

    def flags(self, index: Index) -> Qt.ItemFlag:
        if not index.isValid():
            return Qt.ItemFlag.NoItemFlags
        can = Qt.ItemFlag
        return can.ItemIsEnabled | can.ItemIsSelectable | can.ItemIsEditable | can.ItemNeverHasChildren

    def setData(self, index: Index, value: object, role: int = Role.EditRole) -> bool:
        """Type `value` into a cell; True when it is a value, False when it stays as a marked text."""
        if role != Role.EditRole or not index.isValid():
            return False
        text = str(value)
        if text == index.data(Role.EditRole):
            return index.data(Ask.FAULT) is None
        cell = material_cell(self._name, self.place(index))
        faults = self._session.apply(edits.type_into(cell, text), self)
        return not faults and self._session.document.draft(cell) is None

    def _text(self, index: Index) -> str:
        value = self._rows[index.row()].get(self.parts[index.column()].name)
        return "" if value is None else value_text(value)


class TermDelegate(QuietDelegate):
    """Opens a plain line for typing, which offers materials where one is named."""

    def createEditor(self, parent: QWidget, option: QStyleOptionViewItem, index: Index) -> QWidget:
        line = QLineEdit(parent)
        line.setFrame(False)
        line.setAccessibleName(str(index.data(Role.AccessibleTextRole)))
        model = index.model()
        offers = model.offers(index) if isinstance(model, TermsModel) else ()
        line.setAlignment(Qt.AlignmentFlag.AlignLeft if offers else Qt.AlignmentFlag.AlignRight)
        if offers:
            completer = QCompleter(list(offers), line)
            completer.setCaseSensitivity(Qt.CaseSensitivity.CaseInsensitive)
            completer.setFilterMode(Qt.MatchFlag.MatchContains)
            line.setCompleter(completer)
        return line


class TermsTable(QuietTable):
    """The rows; `wanted` says ``add``, ``remove`` or ``paste`` when a key asks for it."""

    def __init__(self, model: TermsModel, theme: Theme, parent: QWidget | None = None) -> None:
        delegate = TermDelegate(theme)
        super().__init__(delegate, theme, parent)
        delegate.setParent(self)
        self.setModel(model)
        self.setSelectionMode(self.SelectionMode.SingleSelection)
        self.horizontalHeader().setSectionResizeMode(self.horizontalHeader().ResizeMode.Stretch)
        for signal in (model.modelReset, model.dataChanged):
            signal.connect(self._fit)
        self._fit()
        self.setAccessibleName("Rows")
        self.setAccessibleDescription("Insert adds a row, Delete removes the current one. F6 leaves the table.")

    def _fit(self) -> None:
        """Be as high as the rows, up to `LINES` of them; more are scrolled to."""
        lines = min(max(self.model().rowCount(), 1), LINES) + 1
        self.setFixedHeight(lines * (self.fontMetrics().height() + 12) + 4)

    def command_of(self, event: QKeyEvent) -> str:
        plain = event.modifiers() & ~Qt.KeyboardModifier.KeypadModifier == Qt.KeyboardModifier.NoModifier
        if event.matches(QKeySequence.StandardKey.Paste):
            return "paste"
        keys = {Qt.Key.Key_Insert: "add", Qt.Key.Key_Delete: "remove"}
        return keys.get(Qt.Key(event.key()), "") if plain else ""
