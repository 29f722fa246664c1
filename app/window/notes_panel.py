"""Title and notes of the job, opened beside: what a person writes about it."""

from PySide6.QtCore import QSignalBlocker
from PySide6.QtWidgets import QFormLayout, QFrame, QLineEdit, QPlainTextEdit, QVBoxLayout, QWidget

from app.document import edits
from app.document.edit import Edit
from app.document.session import Change, Session
from app.look.theme import Theme
from app.window.exporting import Tell


class NotesPanel(QWidget):
    """A line for the title and a field for notes; what is typed in one go is one step to undo."""

    def __init__(self, session: Session, tell: Tell, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session, self._tell = session, tell
        self.title = QLineEdit(self)
        self.title.setPlaceholderText("What this job is about")
        self.title.setToolTip("Title of the job: in the window, in the file, and in the name suggested for it.")
        self.title.setAccessibleName("Title of the job")
        self.title.textEdited.connect(self._keep_title)
        self.notes = QPlainTextEdit(self)
        self.notes.setPlaceholderText("Requirements, sources, decisions: kept in the job file")
        self.notes.setToolTip("Notes of the job, kept in the file.")
        self.notes.setAccessibleName("Notes of the job")
        self.notes.setTabChangesFocus(True)
        self.notes.setFrameShape(QFrame.Shape.NoFrame)
        self.notes.document().setDocumentMargin(8)
        self.notes.textChanged.connect(self._keep_notes)
        form = QFormLayout()
        form.setContentsMargins(8, 4, 8, 8)
        form.setSpacing(8)
        form.addRow("&Title", self.title)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addLayout(form)
        column.addWidget(self.notes, 1)
        self.setFocusProxy(self.title)
        self.setMinimumWidth(240)
        self.destroyed.connect(session.subscribe(self._follow))
        self._refresh()

    def set_theme(self, theme: Theme) -> None:
        """Take that the look has changed: the palette says everything here."""

    def _keep_title(self) -> None:
        if self.title.text() != self._session.record.title:
            self._apply(edits.set_title(self.title.text()))

    def _keep_notes(self) -> None:
        if self.notes.toPlainText() != self._session.record.notes:
            self._apply(edits.set_notes(self.notes.toPlainText()))

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit, self):
            self._tell(str(fault), fault.severity)

    def _follow(self, change: Change) -> None:
        if change.kind != "select":
            self._refresh()

    def _refresh(self) -> None:
        record = self._session.record
        if self.title.text() != record.title:
            self.title.setText(record.title)
        if self.notes.toPlainText() != record.notes:
            with QSignalBlocker(self.notes):
                self.notes.setPlainText(record.notes)
