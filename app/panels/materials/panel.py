"""The panel of materials: those of the job above, the library to take more from below."""

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QSplitter, QWidget

from app.document import edits
from app.document.document import Document
from app.document.edit import Edit
from app.document.library import free_name
from app.document.session import Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.materials.library_view import LibraryView
from app.panels.materials.lines import NAME
from app.panels.materials.model import MaterialsModel
from app.panels.materials.pieces import buttons, column, heading, ink, words
from app.panels.materials.table import MaterialsTable
from app.panels.materials.words import LOSS_ONCE, uses_text
from app.panels.tables.words import fault_words
from stackcore.errors import Severity
from stackcore.job.records import MaterialRecord
from stackcore.media.library import Library, LibraryEntry, read_library
from stackcore.units import Dimension, parse_measure

Tell = Callable[[str, Severity], None]


class MaterialsPanel(QWidget):
    """The materials of the job, edited in place, and the library.

    Parameters
    ----------
    session
        Whose materials are shown and edited.
    view
        Its active marker is the frequency at which values are read.
    theme
        The look.
    tell
        How it says why something was refused.
    library
        Where entries come from; the one of the program when it is not given.
    """

    def __init__(
        self,
        session: Session,
        view: View,
        theme: Theme,
        tell: Tell,
        *,
        library: Library | None = None,
        parent: QWidget | None = None,
    ) -> None:
        super().__init__(parent)
        self._session = session
        self._theme = theme
        self._tell = tell
        self._model = MaterialsModel(session, view, self)
        self._table = MaterialsTable(self._model, theme, self)
        self._library = LibraryView(library if library is not None else read_library(), theme, self.use, self)
        self._note = words("", self)
        self._cautions = words("", self)
        self._caption = words(LOSS_ONCE, self)
        self._arrange()
        self.setFocusProxy(self._table)
        self._table.wanted.connect(lambda _command: self.remove())
        self._table.selectionModel().currentChanged.connect(lambda *_indexes: self._show_note())
        self.destroyed.connect(session.subscribe(lambda _change: self._show_note()))
        self.set_theme(theme)

    @property
    def table(self) -> MaterialsTable:
        """The table of the job's materials."""
        return self._table

    @property
    def library(self) -> LibraryView:
        """The lower half."""
        return self._library

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme
        self._table.set_theme(theme)
        self._library.set_theme(theme)
        ink(self._caption, theme.muted)
        self._show_note()

    def add_constant(self) -> None:
        """Add a material of constant ε and μ, as yet those of vacuum, and make its name the current cell."""
        self._add(MaterialRecord(self._free_name(), model="constant", permittivity=1 + 0j))

    def add_conductor(self) -> None:
        """Add a conductor of 1 MS/m and make its name the current cell."""
        conductivity = parse_measure("1 MS/m", Dimension.CONDUCTIVITY)
        self._add(MaterialRecord(self._free_name(), model="conductor", conductivity=conductivity))

    def remove(self) -> None:
        """Remove the current material; while it is used, say where."""
        name = self._table.current_name()
        uses = uses_text(self._session.record, name)
        if uses:
            reason = "cannot be removed; choose another material there first."
            self._tell(f"{name!r} is used in {uses} and {reason}", "error")
        elif name:
            self._apply(edits.remove_material(name))

    def use(self, entry: LibraryEntry) -> None:
        """Add an entry of the library to the job, or show where the job has it."""
        before = self._session.document
        if not self._apply(edits.use_library_entry(entry.key)):
            return
        if self._session.document is before:
            self._tell(f"{entry.label} is in this job already.", "note")
        name = next(one.name for one in self._session.record.materials if one.library == entry.key)
        self._table.go_to(name, NAME.name)

    def _add(self, material: MaterialRecord) -> None:
        if self._apply(edits.add_material(material)):
            self._table.go_to(material.name, NAME.name)
            self._table.setFocus()

    def _free_name(self) -> str:
        return free_name("material", (material.name for material in self._session.record.materials))

    def _apply(self, edit: Edit) -> bool:
        faults = self._session.apply(edit, self)
        for fault in faults:
            self._tell(str(fault), fault.severity)
        return not faults

    def _arrange(self) -> None:
        remove_tip = "Remove the current material, unless something is made of it (Delete)."
        row = buttons(
            self,
            ("Add constant", "Add a material of constant ε and μ.", self.add_constant),
            ("Add conductor", "Add a conductor, known by its conductivity.", self.add_conductor),
            ("Remove", remove_tip, self.remove),
        )
        row.addStretch(1)
        own = QWidget(self)
        upper = column(own)
        upper.addWidget(heading("Materials of this job", self))
        upper.addLayout(row)
        upper.addWidget(self._table, 1)
        upper.addWidget(self._note)
        upper.addWidget(self._cautions)
        upper.addWidget(self._caption)
        split = QSplitter(Qt.Orientation.Vertical, self)
        split.setChildrenCollapsible(False)
        split.addWidget(own)
        split.addWidget(self._library)
        column(self).addWidget(split)

    def _show_note(self) -> None:
        """Say what is wrong in the current cell, and which materials are not known over all of the sweep."""
        index = self._table.currentIndex()
        fault = self._model.view(index).fault if index.isValid() else None
        note = fault_words(fault) if fault is not None else _drafts_words(self._session.document)
        cautions = "\n".join(line.caution for line in self._model.lines if line.caution)
        for label, text in ((self._note, note), (self._cautions, cautions)):
            label.setText(text)
            label.setVisible(bool(text))
        ink(self._note, self._theme.fault)
        ink(self._cautions, self._theme.warning)


def _drafts_words(document: Document) -> str:
    count = sum(draft.cell.column.startswith("material:") for draft in document.drafts)
    if not count:
        return ""
    subject = "One text in this table is" if count == 1 else f"{count} texts in this table are"
    return f"{subject} not a value yet; the curves show the values of before."
