"""Notices when the job's file is changed by another program or person, and offers to read it again."""

from pathlib import Path
from typing import Final

from PySide6.QtCore import QFileSystemWatcher, QObject, QTimer

from app.document.document import Document
from app.document.edit import Edit
from app.document.session import Change, Session
from app.window.files import stamp_of
from app.window.messages import Choice, Message, Messages
from stackcore.errors import JobError
from stackcore.job import job_to_json, read_job

REST: Final = 250
"""Milliseconds without a further change after which a file counts as written."""


class DiskWatch(QObject):
    """Watches the file of a session.

    Reading it again is a step that can be undone, so that nothing is lost either way.
    """

    def __init__(self, session: Session, messages: Messages, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._session, self._messages = session, messages
        self._stamp = stamp_of(session.path)
        self._text = ""
        self._watcher = QFileSystemWatcher(self)
        self._rest = QTimer(self, singleShot=True, interval=REST)
        self._rest.setObjectName("disk watch")
        self._rest.timeout.connect(self.look)
        # A program that replaces a file by a new one of its name is seen in the folder only.
        self._watcher.fileChanged.connect(self._rest.start)
        self._watcher.directoryChanged.connect(self._rest.start)
        self._unsubscribe = session.subscribe(self._heard)
        self._watch()

    def close(self) -> None:
        """Watch no more."""
        self._unsubscribe()
        self._rest.stop()
        self._forget()

    def look(self) -> None:
        """Compare the file with what it was, and tell when its job has become another."""
        path = self._session.path
        stamp = stamp_of(path)
        if path is None or stamp == self._stamp:
            return
        self._stamp = stamp
        self._watch()
        self._withdraw()
        if stamp is None:
            self._tell(f"{path.name} is no longer on the disk. Save the job to write it again.")
        elif not self._same(path):
            mine = " Your own changes can be brought back with Undo." if self._session.modified else ""
            self._tell(
                f"{path.name} was changed by another program or person.{mine}",
                Choice("Read it again", self.read_again),
                Choice("Keep this one", lambda: None),
            )

    def read_again(self) -> None:
        """Put what the file holds now in the place of the job, as a step that can be undone."""
        path = self._session.path
        if path is None:
            return
        try:
            job = read_job(path)
        except JobError as error:
            details = tuple(str(fault) for fault in error.faults)
            text = f"{path.name} has faults now and was not read; the present job stays."
            self._messages.show(Message("error", text, details=details))
            return
        except OSError as error:
            self._messages.tell(f"{path.name} cannot be read: {error.strerror or error}.", "error")
            return
        self._session.reread(Edit(f"read {path.name} again", lambda _: Document(job)))

    def _same(self, path: Path) -> bool:
        """Whether the file still holds the job as it is here; a file that cannot be read counts as another."""
        try:
            return job_to_json(read_job(path).record) == job_to_json(self._session.record)
        except (JobError, OSError):
            return False

    def _tell(self, text: str, *choices: Choice) -> None:
        self._text = text
        self._messages.show(Message("warning", text, choices))

    def _withdraw(self) -> None:
        if self._text:
            self._messages.withdraw(self._text)
            self._text = ""

    def _heard(self, change: Change) -> None:
        if change.kind in ("open", "save"):
            self._stamp = stamp_of(self._session.path)
            self._withdraw()
            self._watch()

    def _watch(self) -> None:
        self._forget()
        path = self._session.path
        if path is not None:
            existing = [str(one) for one in (path, path.parent) if one.exists()]
            if existing:
                self._watcher.addPaths(existing)

    def _forget(self) -> None:
        watched = [*self._watcher.files(), *self._watcher.directories()]
        if watched:
            self._watcher.removePaths(watched)
