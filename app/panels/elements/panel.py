"""The panel of the element table: the table, the stack it shows, and what can be done with its rows."""

from collections.abc import Callable, Sequence

from PySide6.QtCore import QMimeData, QModelIndex, Qt, Signal
from PySide6.QtGui import QAction, QColor, QGuiApplication, QPalette
from PySide6.QtWidgets import QHBoxLayout, QLabel, QToolButton, QVBoxLayout, QWidget

from app.document import edits
from app.document.cells import place_words
from app.document.document import Draft, Selection
from app.document.edit import Edit
from app.document.session import Change, Session
from app.look.theme import Theme
from app.panels.elements.clipboard import place, read_block, write_block, write_html
from app.panels.elements.columns import MATERIAL, SHEET_COLUMNS, WHAT
from app.panels.elements.doubts import Rows, doubts_of
from app.panels.elements.gestures import add_layer_edit, move_edit, paste_edit
from app.panels.elements.model import ElementsModel
from app.panels.elements.paste_preview import PastePreview
from app.panels.elements.stacks import StackBar
from app.panels.elements.table import ElementsTable
from app.panels.tables.words import fault_words
from stackcore.errors import Severity

Tell = Callable[[str, Severity], None]


class ElementsPanel(QWidget):
    """The lay-up of the stack that is looked at.

    Parameters
    ----------
    session
        Whose document is shown and edited.
    theme
        The look.
    tell
        How it says why something was refused.

    Signals
    -------
    columns_asked()
        `rare_columns` is another one now.
    """

    columns_asked = Signal()

    def __init__(self, session: Session, theme: Theme, tell: Tell, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session = session
        self._theme = theme
        self._tell = tell
        self._selecting = False
        # The model listens before the panel does: it has followed when the panel selects.
        self._model = ElementsModel(session, self)
        self._table = ElementsTable(self._model, theme, self)
        self._stacks = StackBar(session, self._apply, self)
        self._note = QLabel(self)
        self._note.setWordWrap(True)
        self._note.setTextFormat(Qt.TextFormat.PlainText)
        self._note.setContentsMargins(8, 4, 8, 4)
        self.paste_preview = PastePreview(theme, self)
        self._actions = self._make_actions()
        self._arrange()
        self.setFocusProxy(self._table)
        self._table.wanted.connect(self._run)
        selection = self._table.selectionModel()
        selection.selectionChanged.connect(self._tell_selection)
        selection.currentChanged.connect(self._show_note)
        self.destroyed.connect(session.subscribe(self._follow))
        self._show_selection(session.selection)
        self._refresh()

    @property
    def table(self) -> ElementsTable:
        """The table, for its header's state and for the focus."""
        return self._table

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme
        self._table.set_theme(theme)
        self.paste_preview.set_theme(theme)
        self._show_note()

    def show_answer(self, answer: object) -> None:
        """Take a new result: nothing in the table is computed from it."""

    def set_stale(self, stale: bool) -> None:
        """Take that results are stale: the table shows what was typed, which never is."""

    @property
    def rare_columns(self) -> bool:
        """Whether the columns for inductance and capacitance were asked for; they also show where they are used."""
        return self._model.rare_columns

    def show_rare_columns(self, shown: bool) -> None:
        """Show the columns for inductance and capacitance for every sheet, or only where they are used."""
        if shown != self._model.rare_columns:
            self._model.show_rare_columns(shown)
            # A row is selected when all its cells are, also those that have just come.
            self._show_selection(self._session.selection)
            self._rare.setChecked(shown)
            self.columns_asked.emit()

    def offer(self, actions: Sequence[QAction]) -> None:
        """Let the menu of the table offer these instead of its own, before the switch for rare columns."""
        for action in self._actions.values():
            self._table.removeAction(action)
        self._table.insertActions(self._table.actions()[0], list(actions))

    # What can be done with rows

    def add_layer(self) -> None:
        """Add a layer behind the selected element and make its material the current cell."""
        row = self._place_behind()
        if self._apply(add_layer_edit(self._session.record, self._stack, row)):
            self._table.go_to(row, MATERIAL.name)
            self._table.setFocus()

    def add_sheet(self) -> None:
        """Add a sheet behind the selected element and make its resistance the current cell."""
        row = self._place_behind()
        if self._apply(edits.add_sheet(self._stack, row)):
            self._table.go_to(row, SHEET_COLUMNS[0].name)
            self._table.setFocus()

    def duplicate(self) -> None:
        """Put copies of the selected elements behind them."""
        if rows := self._table.selected_elements():
            self._apply(edits.duplicate(self._stack, rows))

    def delete(self) -> None:
        """Delete the selected elements."""
        if rows := self._table.selected_elements():
            self._apply(edits.delete(self._stack, rows))

    def move_up(self) -> None:
        """Move the selected elements one place towards the front, as one block."""
        self._move(-1)

    def move_down(self) -> None:
        """Move the selected elements one place towards the back, as one block."""
        self._move(1)

    def copy(self) -> None:
        """Copy the selected rows with their header: as text for spreadsheets and as a table for documents."""
        rows = sorted({index.row() for index in self._table.selectionModel().selectedRows()})
        if not rows:
            return
        columns = self._model.columns
        texts = [[self._model.line(row).cell(column).text for column in columns] for row in rows]
        data = QMimeData()
        data.setText(write_block(columns, texts))
        data.setHtml(write_html(columns, texts))
        QGuiApplication.clipboard().setMimeData(data)

    def cut(self) -> None:
        """Copy the selected rows and delete those that are elements."""
        self.copy()
        self.delete()

    def paste(self) -> None:
        """Paste rows, or a block of cells from a spreadsheet, in one step.

        Rows with a header that names the material come in as new elements behind the selected ones. Any other
        block is typed over the cells from the current one on, down and to the right, with new layers where rows
        are missing. What it leaves open is asked below the table first.
        """
        block = read_block(QGuiApplication.clipboard().text())
        if not block.rows:
            self._tell("There is no text on the clipboard to paste.", "note")
            return
        index = self._table.currentIndex()
        on_element = index.isValid() and self._model.line(index.row()).is_element
        if not on_element and index.isValid() and len(block.rows) == 1 and block.width == 1:
            self._model.setData(index, block.rows[0][0])
            return
        anchor = self._model.columns[index.column()].name if index.isValid() else MATERIAL.name
        pasted = place(block, anchor)
        insert = MATERIAL.name in block.columns or any(texts.get(WHAT.name) for texts in pasted)
        row = index.row() - 1 if on_element and not insert else self._place_behind()
        count = len(self._model.stack.elements)
        typed_over = 0 if insert else max(count - row, 0)
        stack = self._stack

        def run(rows: Rows) -> None:
            self._apply(paste_edit(stack, row, rows, insert=insert))

        doubts = doubts_of(pasted, typed_over)
        if doubts:
            self.paste_preview.ask(pasted, typed_over, doubts, run, self._table)
        else:
            self.paste_preview.close_up()
            run(pasted)

    # Inside

    @property
    def _stack(self) -> int:
        return self._session.selection.stack

    def _make_actions(self) -> dict[str, QAction]:
        texts = (
            ("add_layer", "Add layer", "Add a layer behind the selected element (Insert)."),
            (
                "add_sheet",
                "Add sheet",
                "Add a sheet, which has no thickness, behind the selected element (Shift+Insert).",
            ),
            ("duplicate", "Duplicate", "Copy the selected elements and put the copies behind them (Ctrl+D)."),
            ("delete", "Delete", "Delete the selected elements (Delete)."),
            ("move_up", "Up", "Move the selected elements towards the front (Alt+Up)."),
            ("move_down", "Down", "Move the selected elements towards the back (Alt+Down)."),
        )
        actions = {}
        for name, text, tip in texts:
            action = QAction(text, self)
            action.setToolTip(tip)
            action.triggered.connect(lambda _checked=False, name=name: self._run(name))
            actions[name] = action
        return actions

    def _arrange(self) -> None:
        bar = QHBoxLayout()
        bar.setContentsMargins(4, 0, 4, 0)
        bar.setSpacing(0)
        for action in self._actions.values():
            button = QToolButton(self)
            button.setDefaultAction(action)
            button.setAutoRaise(True)
            button.setFocusPolicy(Qt.FocusPolicy.TabFocus)
            bar.addWidget(button)
            self._table.addAction(action)
        bar.addStretch(1)
        self._offer_rare_columns()
        bar.addWidget(self._stacks.menu_button(self))
        self._table.setContextMenuPolicy(Qt.ContextMenuPolicy.ActionsContextMenu)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(4)
        column.addWidget(self._stacks)
        column.addLayout(bar)
        column.addWidget(self._table, 1)
        column.addWidget(self.paste_preview)
        column.addWidget(self._note)

    def _offer_rare_columns(self) -> None:
        """Put the switch for the columns of `RARE_COLUMNS` into the menus of the table and its header."""
        line = QAction(self)
        line.setSeparator(True)
        self._rare = QAction("Inductance and capacitance", self)
        self._rare.setToolTip("Show the columns in which a sheet gets an inductance or a capacitance.")
        self._rare.setCheckable(True)
        self._rare.toggled.connect(self.show_rare_columns)
        header = self._table.horizontalHeader()
        header.setContextMenuPolicy(Qt.ContextMenuPolicy.ActionsContextMenu)
        header.addAction(self._rare)
        self._table.addActions([line, self._rare])

    def _run(self, name: str) -> None:
        """Do what a key or a button asks for: the public method of that name."""
        commands: dict[str, Callable[[], None]] = {
            "add_layer": self.add_layer,
            "add_sheet": self.add_sheet,
            "duplicate": self.duplicate,
            "delete": self.delete,
            "move_up": self.move_up,
            "move_down": self.move_down,
            "copy": self.copy,
            "cut": self.cut,
            "paste": self.paste,
        }
        commands[name]()

    def _apply(self, edit: Edit) -> bool:
        before = self._session.document
        faults = self._session.apply(edit, self)
        for fault in faults:
            self._tell(str(fault), fault.severity)
        if not faults and self._session.document is before:
            # A row that moves past one just like it changes nothing, and yet it is further on.
            self._session.select(edit.selection(before, self._session.selection), self._table)
        return not faults

    def _move(self, step: int) -> None:
        edit = move_edit(self._stack, self._table.selected_elements(), step, len(self._model.stack.elements))
        if edit is not None:
            self._apply(edit)

    def _place_behind(self) -> int:
        """Return before which element something new goes: behind the selection, at the front row first."""
        count = len(self._model.stack.elements)
        if rows := self._table.selected_elements():
            return rows[-1] + 1
        return 0 if self._table.currentIndex().row() == 0 and self._table.selectionModel().hasSelection() else count

    def _follow(self, change: Change) -> None:
        if change.kind != "select":
            self.paste_preview.forget()  # the rows it would go to may be others now
        own = change.kind == "select" and change.initiator is self
        if not own:
            self._show_selection(change.selection)
        self._refresh()

    def _show_selection(self, selection: Selection) -> None:
        if selection.rows == self._table.selected_elements():
            return
        self._selecting = True
        try:
            self._table.select_elements(selection.rows)
        finally:
            self._selecting = False

    def _tell_selection(self) -> None:
        if not self._selecting and not self._model.following:
            self._session.select(Selection(self._stack, self._table.selected_elements()), self)
            self._refresh()

    def _refresh(self) -> None:
        self._stacks.refresh()
        any_selected = bool(self._table.selected_elements())
        for name in ("duplicate", "delete", "move_up", "move_down"):
            self._actions[name].setEnabled(any_selected)
        self._show_note()

    def _show_note(self, current: QModelIndex | None = None) -> None:
        """Say in words what is wrong in the current cell, or how many texts have no value."""
        index = self._table.currentIndex() if current is None else current
        fault = self._model.view(index).fault if index.isValid() else None
        if fault is not None:
            text = fault_words(fault)
        else:
            text = _drafts_words(
                [d for d in self._model.document.drafts if d.cell.stack == self._model.stack_index]
            )
        palette = QPalette()
        palette.setColor(QPalette.ColorRole.WindowText, QColor(self._theme.fault))
        self._note.setPalette(palette)
        self._note.setText(text)
        self._note.setVisible(bool(text))


def _drafts_words(drafts: Sequence[Draft]) -> str:
    """Say where the first of `drafts` is and what is wrong with it, how many more there are, and what is shown."""
    if not drafts:
        return ""
    place = place_words(drafts[0].cell)
    fault = fault_words(drafts[0].fault)
    more = f" {len(drafts) - 1} more in this table." if len(drafts) > 1 else ""
    return f"{place[:1].upper()}{place[1:]}: {fault}{more} The curves show the values of before."
