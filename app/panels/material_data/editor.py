"""The editor of one material: its model, its constants, its rows, and what is said of them."""

import re
import unicodedata
from collections.abc import Callable
from pathlib import PurePath
from typing import Final

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QGuiApplication, QWheelEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QScrollArea, QToolButton, QVBoxLayout, QWidget

from app.document import edits
from app.document.document import material_cell
from app.document.edit import Edit
from app.document.library import ALWAYS_DEFINED, PERFECT_METAL, free_name
from app.document.material_cells import model_of, model_table
from app.document.session import Change, Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.curves.drawing import fill_palette
from app.panels.material_data.facts import bounds_note, fields_of, heading_of, lists_of
from app.panels.material_data.form import Form
from app.panels.material_data.preview import ColumnsPreview
from app.panels.material_data.terms import TermsModel, TermsTable
from app.panels.materials.library import entry_words
from app.panels.materials.picks import Pick
from app.panels.materials.pieces import buttons, heading, ink, words
from app.panels.sweep.field import QuietChoice
from stackcore.errors import LibraryError, Severity
from stackcore.job.own_library import keep_material
from stackcore.job.records import MaterialRecord
from stackcore.media.models import Constants

Tell = Callable[[str, Severity], None]

NOTHING: Final = "Choose a material of this job in the panel Materials: its constants can be edited here."
LOOKED_AT: Final = "An entry of the library: use it in this job to change its constants."
IMPORTED: Final = "The columns of this file become a new material of the job."
KEEP_TIP: Final = "Write this material into your own library, to be used in other jobs."
TABLE: Final = "tabulated"
ROWS: Final = "rows"


class EditorPage(QWidget):
    """What is scrolled: the constants of the material that is chosen."""

    kept = Signal()
    """The material was written into the user's own library."""
    imported = Signal(str)
    """A material was made of measured columns: its name."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._pick = Pick()
        self._import = ""
        self.title, self.about, self.formula = heading("", self), words("", self), words("", self)
        self.model = QuietChoice(theme, "Model", "How ε and μ follow from the constants.", self)
        for name, model in model_table().items():
            self.model.addItem(model.label, name)
            self.model.setItemData(self.model.count() - 1, model.about, Qt.ItemDataRole.ToolTipRole)
        self.model.activated.connect(lambda _index: self._choose_model())
        self.form = Form(theme, self._typed, self)
        self.terms = TermsModel(session, self)
        self.table = TermsTable(self.terms, theme, self)
        self.table.wanted.connect(self._command)
        self.preview = ColumnsPreview(theme, self._take_rows, self._close_preview, self)
        self.notes = words("", self)
        self._arrange()
        self.set_theme(theme)
        self._show()
        ends = (session.subscribe(self._heard), view.subscribe(lambda _change: self._show_notes()))
        self.destroyed.connect(lambda: [end() for end in ends])

    @property
    def name(self) -> str:
        """The name of the material that is edited, or an empty text."""
        return self._pick.name if self._session.record.material(self._pick.name) else ""

    def show_pick(self, pick: Pick) -> None:
        """Show this material."""
        if pick != self._pick:
            self._pick = pick
            self._import = ""
            self.preview.hide()
            self._show()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        fill_palette(self, theme)
        self.model.set_theme(theme)
        self.form.set_theme(theme)
        self.table.set_theme(theme)
        self.preview.set_theme(theme)
        for label in (self.about, self.formula, self.notes):
            ink(label, theme.muted)

    def _arrange(self) -> None:
        can = Qt.TextInteractionFlag
        for label in (self.about, self.formula, self.notes):
            label.setTextInteractionFlags(can.TextSelectableByMouse | can.TextSelectableByKeyboard)
        self.formula.setAccessibleName("Formula")
        self.title.setWordWrap(True)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 8)
        column.setSpacing(4)
        head = QHBoxLayout()
        head.setContentsMargins(0, 0, 8, 0)
        head.addWidget(self.title, 1, Qt.AlignmentFlag.AlignBottom)
        head.addWidget(self.model, 0, Qt.AlignmentFlag.AlignBottom)
        column.addLayout(head)
        column.addWidget(self.about)
        column.addWidget(self.formula)
        self._rows = QWidget(self)
        rows = QVBoxLayout(self._rows)
        rows.setContentsMargins(0, 0, 0, 0)
        rows.setSpacing(2)
        self._deeds = QWidget(self._rows)
        line = buttons(
            self._deeds,
            ("Add row", "Add a row behind the current one (Insert).", lambda: self._command("add")),
            ("Remove row", "Remove the current row (Delete).", lambda: self._command("remove")),
            ("Paste columns…", "Read columns of measured data, with a preview (Ctrl+V).", self.open_preview),
        )
        self._paste = self._deeds.findChildren(QToolButton)[-1]
        line.addStretch(1)
        self._deeds.setLayout(line)
        rows.addWidget(self._deeds)
        rows.addWidget(self.table)
        rows.addWidget(self.preview)
        self.preview.hide()
        column.addWidget(self._rows)
        column.addWidget(self.form)
        self._keeping = QWidget(self)
        line = buttons(self._keeping, ("Keep in own library", KEEP_TIP, self.keep))
        line.addStretch(1)
        self._keeping.setLayout(line)
        column.addWidget(self._keeping)
        column.addWidget(self.notes)
        column.addStretch(1)

    # Showing

    def _heard(self, change: Change) -> None:
        before, after = change.before, change.after
        same = before.record.materials is after.record.materials and before.drafts == after.drafts
        if not same or change.kind == "open":  # a dragged face changes nothing here
            self._show()

    def _show(self) -> None:
        document, name = self._session.document, self.name
        own = bool(name) and not self._import
        self.model.setVisible(own)
        # While columns are pasted they have the room: what they will replace, and the rest, comes back after.
        pasting = not self.preview.isHidden()
        for part in (self.form, self.table, self._keeping):
            part.setVisible(own and not pasting)
        if not own:
            self._show_other()
            return
        label, tie = heading_of(document, name)
        self.title.setText(label)
        material = document.record.material(name)
        assert material is not None
        model = model_of(material)
        self.model.show_choice(model.name)
        self.model.setToolTip(model.about)
        self.model.setAccessibleDescription(model.about)
        _say(self.about, tie)
        _say(self.formula, model.formula)
        self.form.show_fields(fields_of(document, name))
        lists = lists_of(document, name)
        self.terms.show_list(name, lists[0] if lists else None)
        self._rows.setVisible(bool(lists))
        self._deeds.show()
        self._paste.setVisible(model.name == TABLE)
        self._show_notes()

    def _show_other(self) -> None:
        if self._import:
            self._show_import()
            return
        entry = self._pick.entry
        self.title.setText(entry.label if entry else "")
        self.title.setVisible(True)
        _say(self.about, f"{LOOKED_AT}\n{entry_words(entry)}" if entry else NOTHING)
        self.formula.hide()
        self._rows.hide()
        self.notes.hide()
        self.terms.show_list("", None)

    def _show_import(self) -> None:
        self.title.setText(self._import)
        _say(self.about, IMPORTED)
        self.formula.hide()
        self.notes.hide()
        self._rows.show()
        self._deeds.hide()
        self.terms.show_list("", None)

    def _show_notes(self) -> None:
        name = self.name
        if name:
            frequency = self._view.state.marker_frequency(self._session.record.sweep)
            _say(self.notes, bounds_note(self._session.job.media[name], frequency))

    # Editing

    def _typed(self, column: str, text: str) -> None:
        self._apply(edits.type_into(material_cell(self.name, column), text))

    def _choose_model(self) -> None:
        if self.name:
            self._apply(edits.set_model(self.name, self.model.currentData()))
            self._show()

    def _command(self, command: str) -> None:
        row = self.table.currentIndex().row()
        if command == "paste":
            if self.terms.constant == ROWS:
                self.open_preview(QGuiApplication.clipboard().text())
        elif command == "add":
            at = row + 1 if row >= 0 else None
            if self._apply(edits.add_row(self.name, self.terms.constant, at)):
                last = self.terms.rowCount() - 1
                self.table.go(self.terms.index(last if at is None else min(at, last), 0))
        elif row >= 0 and self._apply(edits.remove_row(self.name, self.terms.constant, row)):
            self.table.go(self.terms.index(min(row, self.terms.rowCount() - 1), 0))

    def open_preview(self, text: str = "") -> None:
        """Open the place to paste columns into, with a text already in it if wanted."""
        self.preview.show()
        self._show()
        self.preview.paste(text)
        self.preview.setFocus(Qt.FocusReason.OtherFocusReason)

    def open_import(self, file: str, text: str) -> None:
        """Show the columns of a file, to become a new material of the job."""
        self._import = file
        self.open_preview(text)

    def _take_rows(self, rows: tuple[Constants, ...]) -> None:
        if self._import:
            self._take_material(rows)
        elif self._apply(edits.set_constant(self.name, ROWS, rows)):
            self._tell(f"{self.name} now holds {len(rows)} rows.", "note")
            self._close_preview()

    def _take_material(self, rows: tuple[Constants, ...]) -> None:
        file = self._import
        taken = [*ALWAYS_DEFINED, PERFECT_METAL, *(one.name for one in self._session.record.materials)]
        name = free_name(PurePath(file).stem, taken)
        source = f"Measured data, file {file}"
        material = MaterialRecord(name, model=TABLE, constants=Constants(rows=rows), source=source)
        if self._apply(edits.add_material(material)):
            self._tell(f"{name} holds {len(rows)} rows of {file}.", "note")
            self._close_preview()
            self.imported.emit(name)

    def _close_preview(self) -> None:
        self._import = ""
        self.preview.hide()
        self._show()
        self.table.setFocus(Qt.FocusReason.OtherFocusReason)

    def keep(self) -> None:
        """Write the material into the user's own library, or say why it cannot be."""
        material = self._session.record.material(self.name)
        if material is None:
            return
        key = own_key(material)
        try:
            path = keep_material(material, key)
        except LibraryError as error:
            for fault in error.faults:
                self._tell(str(fault), "error")
        except OSError as error:
            self._tell(f"The library cannot be written: {error}", "error")
        else:
            self._tell(f"{material.label or material.name} is kept as {key} in {path}.", "note")
            self.kept.emit()

    def _apply(self, edit: Edit) -> bool:
        faults = self._session.apply(edit, self)
        for fault in faults:
            self._tell(str(fault), fault.severity)
        return not faults


class Editor(QScrollArea):
    """The editor of the chosen material, scrolled where there is little room."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self.page = EditorPage(session, view, theme, tell, self)
        self.setWidget(self.page)
        self.setWidgetResizable(True)
        self.setFrameShape(self.Shape.NoFrame)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAsNeeded)
        self.setAccessibleName("Constants of the material")
        self.setFocusPolicy(Qt.FocusPolicy.NoFocus)
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        fill_palette(self, theme)
        self.page.set_theme(theme)

    def wheelEvent(self, event: QWheelEvent) -> None:
        """Scroll, and keep the wheel here at the ends rather than let it move what lies behind."""
        super().wheelEvent(event)
        event.accept()


def own_key(material: MaterialRecord) -> str:
    """Return the key under which a material is kept in the user's own library.

    Examples
    --------
    >>> own_key(MaterialRecord("Resin, batch 7"))
    'own/resin-batch-7'
    """
    plain = unicodedata.normalize("NFKD", material.name).encode("ascii", "ignore").decode().lower()
    return f"own/{'-'.join(re.findall('[a-z0-9]+', plain)) or 'material'}"


def _say(label: QLabel, text: str) -> None:
    label.setText(text)
    label.setVisible(bool(text))
