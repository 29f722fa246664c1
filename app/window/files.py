"""New, open, save: the job and its file, and the question about unsaved changes."""

from collections.abc import Callable
from pathlib import Path
from typing import Final

from app.document.cells import place_words
from app.document.document import Cell
from app.document.session import Change, Session
from app.window.dialogs import Dialogs, OverwriteAnswer, SaveAnswer
from app.window.messages import Choice, Message, Messages
from app.window.recent import RecentFiles
from app.window.samples import Sample
from stackcore.errors import JobError
from stackcore.job.store import read_job

SUFFIX: Final = ".slabjob"
Then = Callable[[], None]
Elsewhere = Callable[[Path], bool]


def nothing() -> None:
    """Do nothing: what follows when nothing is to follow."""


class Files:
    """Carries jobs between the session and the disk.

    Nothing here loses a job: what would replace it first asks about unsaved changes, and a file that cannot be
    read leaves everything as it was.

    Parameters
    ----------
    elsewhere
        Shows the window that holds a file already and tells whether there is one: two windows on one file would
        overwrite each other's work.
    """

    def __init__(
        self,
        session: Session,
        dialogs: Dialogs,
        messages: Messages,
        recent: RecentFiles,
        elsewhere: Elsewhere = lambda path: False,
    ) -> None:
        self._session = session
        self._elsewhere = elsewhere
        self._dialogs = dialogs
        self._messages = messages
        self._recent = recent
        self._stamp = stamp_of(session.path)
        self._unsubscribe = session.subscribe(self._heard)

    def close(self) -> None:
        """Listen no more."""
        self._unsubscribe()

    def new(self) -> None:
        """Begin an untitled job."""
        self.leave(self._session.new)

    def open(self) -> None:
        """Ask for a job file and open it."""
        self.leave(lambda: self._dialogs.pick_open(self._recent.folder, self._read_here))

    def open_path(self, path: Path) -> None:
        """Open a file that was named or dropped."""
        if not self._open_elsewhere(path):
            self.leave(lambda: self.read(path))

    def open_sample(self, sample: Sample) -> None:
        """Open a copy of a sample: a job without a file, so that the sample stays as it is."""

        def start() -> None:
            self._session.start_from(read_job(sample.path), f"open the sample {sample.title}")

        self.leave(start)

    def save(self, then: Then = nothing) -> None:
        """Save to the job's file, or ask for one when there is none; then go on when it is done."""
        path = self._session.path
        if path is None:
            self.save_as(then)
        elif path.exists() and stamp_of(path) != self._stamp:
            self._dialogs.ask_overwrite(path.name, lambda answer: self._overwrite(answer, path, then))
        else:
            self._write(path, then)

    def save_as(self, then: Then = nothing) -> None:
        """Ask where to save; then go on when it is done."""
        self._dialogs.pick_save(self.suggestion(SUFFIX), lambda path: self._write(_with_suffix(path), then))

    def leave(self, then: Then) -> None:
        """Go on once nothing unsaved would be lost: at once, or after the question about it."""
        if not self._session.modified:
            then()
            return

        def answered(answer: SaveAnswer) -> None:
            if answer == "save":
                self.save(then)
            elif answer == "discard":
                then()

        self._dialogs.ask_save(self._session.title, answered)

    def suggestion(self, suffix: str) -> Path:
        """Return a file name to suggest, made of the job's file or title."""
        path = self._session.path
        if path is not None:
            return path.with_suffix(suffix)
        title = self._session.record.title.strip() or "untitled"
        name = "".join(letter if letter.isalnum() or letter in " -_" else "-" for letter in title)
        return self._recent.folder / f"{name.strip()}{suffix}"

    def read(self, path: Path) -> None:
        """Open a file in place of the present job, unasked."""
        try:
            self._session.open(path)
        except JobError as error:
            self._refuse(path, error)
        except OSError as error:
            reason = error.strerror or str(error)
            self._messages.tell(f"{path.name} cannot be opened: {reason}. The present job stays.", "error")
        else:
            self._recent.add(path)
            self._messages.tell(f"Opened {path.name}.")

    def _read_here(self, path: Path) -> None:
        if not self._open_elsewhere(path):
            self.read(path)

    def _open_elsewhere(self, path: Path) -> bool:
        """Show the window that holds a file, when it is another one."""
        own = self._session.path
        return (own is None or own.resolve() != path.resolve()) and self._elsewhere(path)

    def _refuse(self, path: Path, error: JobError) -> None:
        count = len(error.faults)
        faults = "one fault" if count == 1 else f"{count} faults"
        text = f"{path.name} cannot be opened: {faults}. The present job stays. Mend the file and open it again."
        details = tuple(str(fault) for fault in error.faults)
        retry = Choice("Open again", lambda: self.open_path(path))
        self._messages.show(Message("error", text, (retry,), details))

    def _overwrite(self, answer: OverwriteAnswer, path: Path, then: Then) -> None:
        if answer == "overwrite":
            self._write(path, then)
        elif answer == "save as":
            self.save_as(then)

    def _write(self, path: Path, then: Then) -> None:
        try:
            self._session.save(path)
        except OSError as error:
            reason = error.strerror or str(error)
            again = Choice("Save as…", lambda: self.save_as(then))
            text = f"{path.name} could not be saved: {reason}. The file on disk is as it was."
            self._messages.show(Message("error", text, (again,)))
            return
        self._recent.add(path)
        drafts = self._session.document.drafts
        if drafts:
            lines = tuple(f"{self._place(draft.cell)}: {draft.text!r}" for draft in drafts)
            text = f"Saved {path.name}, but for what is typed and not a value yet."
            self._messages.show(Message("warning", text, details=lines))
        else:
            self._messages.tell(f"Saved {path.name}.")
        then()

    def _place(self, cell: Cell) -> str:
        """Return where a text is, with its stack where there are several."""
        stacks = self._session.record.stacks
        stack = f" in stack {stacks[cell.stack].name}" if len(stacks) > 1 and not cell.of_job else ""
        return place_words(cell) + stack

    def _heard(self, change: Change) -> None:
        if change.kind in ("open", "save"):
            self._stamp = stamp_of(self._session.path)


def _with_suffix(path: Path) -> Path:
    return path if path.suffix else path.with_suffix(SUFFIX)


def stamp_of(path: Path | None) -> tuple[int, int] | None:
    """Return what tells one state of a file from another, None while it is not there."""
    try:
        found = path.stat() if path is not None else None
    except OSError:
        return None
    return (found.st_mtime_ns, found.st_size) if found is not None else None
