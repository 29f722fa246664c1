"""Unsaved work kept beside, so that a crash or a power cut loses at most two seconds of it.

One file a session in the state folder, never the user's own file, with a lock that shows whether the session
still lives. A start offers what sessions without a living lock have left.
"""

import json
import time
import uuid
from contextlib import suppress
from dataclasses import dataclass
from pathlib import Path
from typing import Final

from PySide6.QtCore import QLockFile, QObject, QTimer

from app.document.document import Document
from app.document.edit import Edit
from app.document.session import Change, Session
from app.window.crash_net import LOGGER
from stackcore.errors import JobError
from stackcore.job.codec import job_from_json, job_to_json
from stackcore.job.resolve import Job

EVERY: Final = 1500
"""Milliseconds between two writings at least: with the time a busy machine takes to come round, two seconds."""
SUFFIX: Final = ".recovery"
PART: Final = ".part"


@dataclass(frozen=True, slots=True)
class Leftover:
    """Unsaved work of a session that ended without saying goodbye."""

    file: Path
    title: str
    source: Path | None
    time: float
    job: Job

    @property
    def sentence(self) -> str:
        """Say what was left, and when."""
        when = time.strftime("%d %B, %H:%M", time.localtime(self.time))
        return f"Unsaved changes to {self.title} from {when} were kept when Slabwright ended unexpectedly."

    def edit(self) -> Edit:
        """Return the edit that brings the work back: it can be undone, and the job counts as unsaved."""
        return Edit(f"recover unsaved changes to {self.title}", lambda _: Document(self.job))

    def discard(self) -> None:
        """Delete what was left."""
        with suppress(OSError):
            self.file.unlink()
            # A kill between writing and renaming leaves the half of the next one.
            self.file.with_suffix(PART).unlink(missing_ok=True)
            _lock_file(self.file).unlink(missing_ok=True)


class Recovery(QObject):
    """Writes the unsaved job of a session into `folder`, and takes it away once it is saved or given up.

    Parameters
    ----------
    folder
        Made when it is missing.
    every
        Milliseconds between two writings.
    """

    def __init__(
        self, session: Session, folder: Path, *, every: int = EVERY, parent: QObject | None = None
    ) -> None:
        super().__init__(parent)
        folder.mkdir(parents=True, exist_ok=True)
        self._session = session
        self._folder = folder
        self.file = folder / f"{uuid.uuid4().hex}{SUFFIX}"
        self._lock = QLockFile(str(_lock_file(self.file)))
        self._lock.setStaleLockTime(0)
        self._timer = QTimer(self)
        self._timer.setObjectName("recovery")
        self._timer.setSingleShot(True)
        self._timer.setInterval(every)
        self._timer.timeout.connect(self.write)
        self._unsubscribe = session.subscribe(self._heard)

    def write(self) -> None:
        """Write the job now when it has unsaved changes, and take the file away when it has none."""
        if not self._session.modified:
            self._forget()
            return
        source = self._session.path
        content = {
            "title": self._session.title,
            "source": str(source) if source else None,
            "time": time.time(),
            "job": json.loads(job_to_json(self._session.record)),
        }
        try:
            self._lock.tryLock(0)
            draft = self.file.with_suffix(PART)
            draft.write_text(json.dumps(content, ensure_ascii=False), encoding="utf-8")
            draft.replace(self.file)
        except OSError as error:
            LOGGER.warning("unsaved work could not be kept in %s: %s", self.file, error)

    def close(self) -> None:
        """End for good: the person has saved or given up the changes."""
        self._unsubscribe()
        self._timer.stop()
        self._forget()

    def leftovers(self) -> tuple[Leftover, ...]:
        """Return the work of sessions that no longer live, newest first; unreadable files are passed over."""
        found = [_read(file) for file in self._folder.glob(f"*{SUFFIX}") if not _lives(file)]
        return tuple(sorted((left for left in found if left), key=lambda left: -left.time))

    def _heard(self, change: Change) -> None:
        if change.kind == "save":
            self._timer.stop()
            self._forget()
        elif change.kind != "select" and not self._timer.isActive():
            self._timer.start()

    def _forget(self) -> None:
        with suppress(OSError):
            self.file.unlink(missing_ok=True)
        self._lock.unlock()


def _lock_file(file: Path) -> Path:
    return file.with_suffix(".lock")


def _lives(file: Path) -> bool:
    """Whether the session that writes `file` still runs."""
    lock = QLockFile(str(_lock_file(file)))
    lock.setStaleLockTime(0)
    free = lock.tryLock(0)
    lock.unlock()
    return not free


def _read(file: Path) -> Leftover | None:
    try:
        content = json.loads(file.read_text(encoding="utf-8"))
        job = Job(job_from_json(json.dumps(content["job"])))
        source = Path(content["source"]) if content["source"] else None
        return Leftover(file, str(content["title"]), source, float(content["time"]), job)
    except (OSError, ValueError, KeyError, TypeError, JobError) as error:
        LOGGER.warning("unsaved work in %s could not be read: %s", file, error)
        return None
