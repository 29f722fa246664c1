"""The document being worked on: where edits, undo, files and listeners meet."""

import time
from collections.abc import Callable
from dataclasses import dataclass
from pathlib import Path
from typing import Literal

from app.document.document import Document, Selection
from app.document.edit import Edit
from app.document.history import History, State
from app.document.listeners import Listeners, Report
from app.document.typed import settle
from app.document.untitled import untitled_job
from stackcore.errors import Fault, InputError
from stackcore.job import Job, read_job, write_job
from stackcore.job.records import JobRecord

ChangeKind = Literal["edit", "undo", "redo", "open", "select", "save"]


@dataclass(frozen=True, slots=True)
class Change:
    """What a listener hears.

    Parameters
    ----------
    before, after
        The documents; the same object when only the selection or the file changed.
    selection
        What is selected now.
    sentence
        Words for what happened, empty for a mere selection.
    initiator
        Whoever asked for it, so that a panel can tell its own changes from those of others.
    kind
        ``open`` also stands for a new job.
    """

    before: Document
    after: Document
    selection: Selection
    sentence: str
    initiator: object | None
    kind: ChangeKind


class Session:
    """One document with its history, its file and those who listen.

    Parameters
    ----------
    job
        Where to begin; without it the untitled job of `new`.
    report
        Takes errors that listeners raise. Without it they are raised together, as an ``ExceptionGroup``,
        after every listener was told and the change was made.
    clock
        Seconds that only grow, for merging steps.

    Examples
    --------
    >>> from app.document import edits
    >>> session = Session()
    >>> session.apply(edits.set_title("Cover"))
    ()
    >>> session.undo_sentence
    'set title to Cover'
    """

    def __init__(
        self,
        job: Job | None = None,
        *,
        report: Report | None = None,
        clock: Callable[[], float] = time.monotonic,
    ) -> None:
        self._clock = clock
        self._listeners: Listeners[Change] = Listeners(report)
        self._path: Path | None = None
        self._history = self._begin(job if job is not None else untitled_job())

    @property
    def document(self) -> Document:
        """The document of now."""
        return self._history.state.document

    @property
    def job(self) -> Job:
        """The last job that resolves."""
        return self.document.job

    @property
    def record(self) -> JobRecord:
        """The job as it is written."""
        return self.document.record

    @property
    def selection(self) -> Selection:
        """What is selected; always inside the document."""
        return self._history.state.selection

    @property
    def path(self) -> Path | None:
        """The file, or None while there is none."""
        return self._path

    @property
    def modified(self) -> bool:
        """Whether the job differs from the one in the file (for a new job: from the one it began as)."""
        return self._history.modified

    @property
    def undo_sentence(self) -> str:
        """Words for what `undo` would take back, empty when there is nothing."""
        return self._history.undo_sentence

    @property
    def redo_sentence(self) -> str:
        """Words for what `redo` would make again, empty when there is nothing."""
        return self._history.redo_sentence

    @property
    def title(self) -> str:
        """Words for the window: the job's title and its file, as far as there are any."""
        names = (self.record.title.strip(), self._path.name if self._path else "")
        return " – ".join(name for name in names if name) or "Untitled job"

    def subscribe(self, listener: Callable[[Change], None]) -> Callable[[], None]:
        """Call `listener` after every change; returns the function that ends it."""
        return self._listeners.subscribe(listener)

    def apply(self, edit: Edit, initiator: object | None = None) -> tuple[Fault, ...]:
        """Make `edit`; returns no faults when done, and the faults when it is refused and nothing changed.

        An edit that changes nothing leaves no step and tells nobody.
        """
        before = self.document
        try:
            after = settle(edit.change(before))
        except InputError as error:
            return error.faults
        if after == before:
            return ()
        selection = edit.selection(after, self.selection)
        sentence = edit.sentence_of(after)
        self._history.push(State(after, selection), sentence, edit.merge_key)
        self._tell(before, sentence, initiator, "edit")
        return ()

    def reread(self, edit: Edit, initiator: object | None = None) -> tuple[Fault, ...]:
        """Make `edit`, which brings what the file holds now: afterwards the job is that of the file."""
        faults = self.apply(edit, initiator)
        if not faults:
            self._history.mark_saved()
            self._tell(self.document, "", initiator, "save")
        return faults

    def select(self, selection: Selection, initiator: object | None = None) -> None:
        """Select what exists of `selection`; no step to undo."""
        wanted = selection.within(self.record)
        if wanted == self.selection:
            return
        self._history.select(wanted)
        self._tell(self.document, "", initiator, "select")

    def undo(self, initiator: object | None = None) -> None:
        """Take back one step, with the selection as it was just before it; without a step do nothing."""
        if self.undo_sentence:
            before = self.document
            self._tell(before, self._history.undo().sentence, initiator, "undo")

    def redo(self, initiator: object | None = None) -> None:
        """Make one step again, with the selection it led to; without a step do nothing."""
        if self.redo_sentence:
            before = self.document
            self._tell(before, self._history.redo().sentence, initiator, "redo")

    def end_merge(self) -> None:
        """Say that a drag is over: the next step stands for itself."""
        self._history.end_merge()

    def new(self, initiator: object | None = None) -> None:
        """Begin the untitled job; the present one and its history are given up."""
        self._replace(untitled_job(), None, "new job", initiator)

    def start_from(self, job: Job, sentence: str, initiator: object | None = None) -> None:
        """Begin with `job` as one without a file, for example a sample; the present job is given up."""
        self._replace(job, None, sentence, initiator)

    def open(self, path: str | Path, initiator: object | None = None) -> None:
        """Read a job file; raises JobError or OSError, and then everything is as it was."""
        path = Path(path)
        self._replace(read_job(path), path, f"open {path.name}", initiator)

    def save(self, path: str | Path | None = None, initiator: object | None = None) -> None:
        """Write the job to `path`, which becomes the file of the session, or to the file it has.

        Drafts are not part of a job and are not written.

        Raises
        ------
        ValueError
            When there is no file and no `path`.
        OSError
            When writing fails; the old file is then untouched and the session still modified.
        """
        target = Path(path) if path is not None else self._path
        if target is None:
            raise ValueError("an untitled job needs a path to be saved")
        write_job(self.job, target)
        self._path = target
        self._history.mark_saved()
        self._tell(self.document, f"save {target.name}", initiator, "save")

    def _begin(self, job: Job) -> History:
        return History(State(Document(job), Selection()), self._clock)

    def _replace(self, job: Job, path: Path | None, sentence: str, initiator: object | None) -> None:
        before = self.document
        self._history = self._begin(job)
        self._path = path
        self._tell(before, sentence, initiator, "open")

    def _tell(self, before: Document, sentence: str, initiator: object | None, kind: ChangeKind) -> None:
        change = Change(before, self.document, self.selection, sentence, initiator, kind)
        self._listeners.tell(change)
