"""The panel of materials: those of the job, the library to take more from, and what speaks against any."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import Qt, Signal
from PySide6.QtWidgets import QMenu, QTabWidget, QToolButton, QWidget

from app.document import edits
from app.document.document import Document
from app.document.edit import Edit
from app.document.library import free_name
from app.document.material_cells import model_table
from app.document.session import Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.materials.checks import Checks
from app.panels.materials.library_view import LibraryView
from app.panels.materials.lines import COLUMNS, NAME
from app.panels.materials.model import MaterialsModel
from app.panels.materials.picks import Pick
from app.panels.materials.pieces import button, column, ink, words
from app.panels.materials.table import MaterialsTable
from app.panels.materials.words import LOSS_ONCE, cautions_text, uses_text
from app.panels.sweep.flow import FlowLayout
from app.panels.tables.words import fault_words
from stackcore.errors import Severity
from stackcore.job.records import MaterialRecord
from stackcore.media.library import Library, LibraryEntry, read_library
from stackcore.units import Dimension, parse_measure

Tell = Callable[[str, Severity], None]

LEAST_ROWS: Final = 2
"""Materials that are seen in however little room."""

OWN, LIBRARY, CHECKS = range(3)
"""Places of the pages."""


class MaterialsPanel(QWidget):
    """The materials of the job, edited in place; the library; the findings of the health check.

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

    picked = Signal(object, object)
    """What is chosen to be looked at, a tuple of `Pick`, and the current one of it."""
    detail_wanted = Signal()
    """Constants and curves of what is chosen are wanted."""

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
        found = library if library is not None else read_library()
        self._library = LibraryView(found, theme, self._model.frequency, self.use, self)
        self._checks = Checks(session, theme, self)
        self.pages = QTabWidget(self)
        self._note = words("", self)
        self._cautions = words("", self)
        self._caption = words(LOSS_ONCE, self)
        self._picks: tuple[Pick, ...] = ()
        self._current = Pick()
        self._arrange()
        self._connect(view)
        self.set_theme(theme)
        self._follow()

    def _connect(self, view: View) -> None:
        self._table.wanted.connect(lambda _command: self.remove())
        choice = self._table.selectionModel()
        choice.currentChanged.connect(lambda *_indexes: self._show_note())
        choice.selectionChanged.connect(lambda *_ranges: self._pick_own())
        self._library.picked.connect(self._pick)
        self._checks.wanted.connect(self.show_material)
        self._checks.counted.connect(self._count)
        ends = (
            self._session.subscribe(lambda _change: self._follow()),
            view.subscribe(lambda _change: self._library.set_frequency(self._model.frequency)),
        )
        self.destroyed.connect(lambda: [end() for end in ends])

    @property
    def table(self) -> MaterialsTable:
        """The table of the job's materials."""
        return self._table

    @property
    def library(self) -> LibraryView:
        """The page of the library."""
        return self._library

    @property
    def checks(self) -> Checks:
        """The page of findings."""
        return self._checks

    @property
    def picks(self) -> tuple[Pick, ...]:
        """What is chosen to be looked at."""
        return self._picks

    @property
    def current_pick(self) -> Pick:
        """The one of it that is current."""
        return self._current

    def show_material(self, name: str) -> None:
        """Show a material of the job in the table."""
        self.pages.setCurrentIndex(OWN)
        self._table.go_to(name, NAME.name)
        self._table.setFocus(Qt.FocusReason.OtherFocusReason)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme
        self._table.set_theme(theme)
        self._library.set_theme(theme)
        self._checks.set_theme(theme)
        ink(self._caption, theme.muted)
        self._show_note()

    def add_constant(self) -> None:
        """Add a material of constant ε and μ, as yet those of vacuum, and make its name the current cell."""
        self._add(MaterialRecord(self._free_name(), model="constant", constants={"permittivity": 1 + 0j}))

    def add_conductor(self) -> None:
        """Add a conductor of 1 MS/m and make its name the current cell."""
        conductivity = parse_measure("1 MS/m", Dimension.CONDUCTIVITY)
        self._add(MaterialRecord(self._free_name(), model="conductor", constants={"conductivity": conductivity}))

    def add_model(self, model: str) -> None:
        """Add a material of any model, with constants to begin from, and make its name the current cell."""
        self._add(MaterialRecord(self._free_name(), model=model, constants=model_table()[model].start()))

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
        name = next(one.name for one in self._session.record.materials if one.library == entry.key)
        there = "already" if self._session.document is before else "now"
        self._tell(f"{entry.label} is in this job {there}, as {name!r}.", "note")
        self._table.go_to(name, NAME.name)

    def _add(self, material: MaterialRecord) -> None:
        if self._apply(edits.add_material(material)):
            self.show_material(material.name)

    def _free_name(self) -> str:
        return free_name("material", (material.name for material in self._session.record.materials))

    def _apply(self, edit: Edit) -> bool:
        faults = self._session.apply(edit, self)
        for fault in faults:
            self._tell(str(fault), fault.severity)
        return not faults

    def _arrange(self) -> None:
        remove_tip = "Remove the current material, unless something is made of it (Delete)."
        detail_tip = "Show constants and curves of what is chosen, beside."
        own = QWidget(self)
        line = QWidget(own)
        flow = FlowLayout(line, across=0, down=0)
        flow.addWidget(button(line, "Add constant", "Add a material of constant ε and μ.", self.add_constant))
        conductor_tip = "Add a conductor, known by its conductivity."
        flow.addWidget(button(line, "Add conductor", conductor_tip, self.add_conductor))
        flow.addWidget(self._other_models())
        flow.addWidget(button(line, "Remove", remove_tip, self.remove))
        flow.addWidget(button(line, "Constants and curves", detail_tip, self.detail_wanted.emit))
        upper = column(own)
        upper.setContentsMargins(0, 4, 0, 0)
        upper.addWidget(line)
        rows = self._table.verticalHeader().defaultSectionSize()
        self._table.setMinimumHeight(LEAST_ROWS * rows + self._table.horizontalHeader().height())
        upper.addWidget(self._table, 1)
        for label in (self._note, self._cautions, self._caption):
            upper.addWidget(label)
        self.pages.setDocumentMode(True)
        self.pages.setAccessibleName("Pages of materials")
        self.pages.tabBar().setAccessibleName("Pages of materials")
        for page, title in ((own, "In this job"), (self._library, "Library"), (self._checks, "Checks")):
            self.pages.addTab(page, title)
        column(self).addWidget(self.pages)
        self.setFocusProxy(self.pages)

    def _other_models(self) -> QToolButton:
        """Return the button with the menu of every other model."""
        button = QToolButton(self)
        button.setText("Add other")
        button.setToolTip("Add a material by another model: a relaxation, a table of data, a mixture, …")
        button.setAutoRaise(True)
        button.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        menu = QMenu(button)
        menu.setToolTipsVisible(True)
        for name, model in model_table().items():
            if name not in ("constant", "conductor"):
                action = menu.addAction(model.label)
                action.setToolTip(model.about)
                action.triggered.connect(lambda _on=False, name=name: self.add_model(name))
        button.setMenu(menu)
        return button

    def _follow(self) -> None:
        """Say of the job as it is now what concerns this panel."""
        self._library.set_used(frozenset(one.library for one in self._session.record.materials if one.library))
        self._show_note()
        if any(pick.name for pick in self._picks) or not self._picks:
            self._pick_own()

    def _pick_own(self) -> None:
        names = self._table.chosen_names() or tuple(line.name for line in self._model.lines[:1])
        current = self._table.current_name()
        self._pick(tuple(Pick(name) for name in names), Pick(current) if current in names else None)

    def _pick(self, picks: tuple[Pick, ...], current: Pick | None = None) -> None:
        current = current or (picks[0] if picks else Pick())
        if (picks, current) != (self._picks, self._current):
            self._picks, self._current = picks, current
            self.picked.emit(picks, current)

    def _count(self, findings: int) -> None:
        self.pages.setTabText(CHECKS, f"Checks ({findings})" if findings else "Checks")

    def _show_note(self) -> None:
        """Say what is wrong in the current cell, and which materials are not known over all of the sweep."""
        index = self._table.currentIndex()
        fault = self._model.view(index).fault if index.isValid() else None
        note = fault_words(fault) if fault is not None else _drafts_words(self._session.document)
        cautions = cautions_text([line.caution for line in self._model.lines if line.caution])
        # Said where loss is typed, and nowhere else: the room belongs to the table.
        at_loss = index.isValid() and COLUMNS[index.column()].name in ("permittivity", "loss_tangent")
        caption = LOSS_ONCE if at_loss else ""
        for label, text in ((self._note, note), (self._cautions, cautions), (self._caption, caption)):
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
