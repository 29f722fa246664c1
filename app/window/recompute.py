"""Keeps what is shown up to date: asks the lane when the question has changed, hands the answers round."""

from collections.abc import Sequence
from typing import Final, Protocol

from PySide6.QtCore import QObject, QTimer, Signal

from app.document.cells import place_words
from app.document.document import WHOLE_JOB, Draft
from app.document.following import following
from app.document.session import Change, Session
from app.document.view import View, ViewChange, ViewState
from app.series.cases import cases_of
from app.workers.live import Answer, Failure, LiveLane

PATIENCE: Final = 200
"""Milliseconds a calculation may take before what is shown is said to be old."""


LONGEST: Final = 96
"""Letters of a reason in the status line; where it belongs it stands in full."""


class Viewer(Protocol):
    """A panel that shows results."""

    def show_answer(self, answer: Answer) -> None:
        """Show a new result."""

    def set_stale(self, stale: bool) -> None:
        """Show whether the result belongs to the present job."""


class Recompute(QObject):
    """Between the session, the lane and the panels that show results.

    Signals
    -------
    asked()
        A question goes to the lane: what takes long must give way.
    told(str)
        Words for the status line: points and time, or why the result is old.
    failed(object)
        The faults of a stack that cannot be computed, a tuple.
    answered(object)
        Every answer, after the panels have it.
    busy(bool)
        A calculation takes longer than `PATIENCE`, or no longer does.
    """

    asked = Signal()
    told = Signal(str)
    failed = Signal(object)
    answered = Signal(object)
    busy = Signal(bool)

    def __init__(
        self, session: Session, view: View, lane: LiveLane, viewers: Sequence[Viewer], parent: QObject
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._lane, self._viewers = session, view, lane, tuple(viewers)
        self._oldest = 0
        self._newest: Answer | None = None
        self._stack = session.selection.stack
        self._fault = ""
        self._stale = False
        self._patience = QTimer(self)
        self._patience.setObjectName("patience")
        self._patience.setSingleShot(True)
        self._patience.setInterval(PATIENCE)
        self._patience.timeout.connect(self._tell)
        lane.answered.connect(self._take)
        lane.failed.connect(self._fail)
        self._unsubscribe = (session.subscribe(self._edited), view.subscribe(self._looked))

    @property
    def answer(self) -> Answer | None:
        """The newest answer, or None before the first."""
        return self._newest

    @property
    def up_to_date(self) -> bool:
        """Whether the panels show the present job, as far as it has values."""
        return self._newest is not None and not self._lane.busy and not self._fault

    def lane_busy(self) -> bool:
        """Return whether the lane has a question without an answer yet."""
        return self._lane.busy

    def ask(self, *, fresh: bool = False) -> None:
        """Ask for the stack that is looked at; `fresh` forgets the answers to all earlier questions."""
        self.asked.emit()
        number = self._lane.ask_job(self._session.job, self._session.selection.stack, self._view.state)
        if fresh:
            self._oldest = number
        if not self._patience.isActive():
            self._patience.start()

    def close(self) -> None:
        """Ask and show nothing any more, and end the lane."""
        for unsubscribe in self._unsubscribe:
            unsubscribe()
        self._patience.stop()
        self._lane.close()

    def _edited(self, change: Change) -> None:
        self._view.replace(following(self._view.state, change.before.record, change.after.record), self)
        stack = change.selection.stack
        other_stack = change.kind == "open" or stack != self._stack
        self._stack = stack
        if other_stack or change.after.job is not change.before.job:
            if other_stack:
                self._newest = None
            self.ask(fresh=other_stack)
        self._tell()

    def _looked(self, change: ViewChange) -> None:
        if self._asked_for(change.before) != self._asked_for(change.after):
            self.ask()

    def _asked_for(self, state: ViewState) -> tuple[object, ...]:
        """Return what of the view decides which points are computed."""
        job = self._session.job
        points = (state.marker_frequency(job.sweep), state.marker_angle(job.sweep), state.markers)
        return (*points, state.quantity, cases_of(job.record, self._session.selection.stack, state))

    def _take(self, answer: Answer) -> None:
        if answer.question.number < self._oldest:
            return
        self._newest = answer
        self._fault = ""
        if not self._lane.busy:
            self._patience.stop()
        for viewer in self._viewers:
            viewer.show_answer(answer)
        self._tell()
        self.answered.emit(answer)

    def _fail(self, failure: Failure) -> None:
        if failure.question.number < self._oldest:
            return
        if not self._lane.busy:
            self._patience.stop()
        self._fault = str(failure.faults[0]) if failure.faults else "the calculation failed"
        self._tell()
        self.failed.emit(failure.faults)

    def _tell(self) -> None:
        """Say in words what is shown, and mark it when it is old."""
        drafts = self._session.document.drafts
        late = self._lane.busy and not self._patience.isActive()
        self._mark(bool(drafts or self._fault))
        self.busy.emit(late)
        if drafts:
            more = f", and {len(drafts) - 1} more" if len(drafts) > 1 else ""
            self.told.emit(f"Not up to date: {self._words(drafts[0])}{more}")
        elif self._fault:
            self.told.emit(f"Not up to date: {cut(self._fault)}")
        elif late:
            self.told.emit("Computing …")
        elif self._newest is not None:
            self.told.emit(summary(self._newest))

    def _words(self, draft: Draft) -> str:
        """Return where a text is that has no value, and why it has none."""
        stack = draft.cell.stack
        where = place_words(draft.cell)
        if stack not in (WHOLE_JOB, self._session.selection.stack):
            where += f" in stack {self._session.record.stacks[stack].name}"
        return cut(f"{where}, {draft.fault.message}")

    def _mark(self, stale: bool) -> None:
        if stale != self._stale:
            self._stale = stale
            for viewer in self._viewers:
                viewer.set_stale(stale)


def cut(text: str) -> str:
    """Return a text of at most `LONGEST` letters: the status line must not make the window wider."""
    return text if len(text) <= LONGEST else f"{text[: LONGEST - 1].rstrip()}…"


def summary(answer: Answer) -> str:
    """Return how many points an answer has and what they took.

    Examples
    --------
    ``401 frequencies × 3 angles, 12 ms``
    """
    frequencies, angles = len(answer.question.frequency), len(answer.question.angle)
    others = f" × {len(answer.compared) + 1} cases" if answer.compared else ""
    seconds = answer.seconds
    took = f"{seconds * 1000:.0f} ms" if seconds < 1 else f"{seconds:.1f} s"
    return (
        f"{_count(frequencies, 'frequency', 'frequencies')} × {_count(angles, 'angle', 'angles')}{others}, {took}"
    )


def _count(number: int, one: str, many: str) -> str:
    return f"{number} {one if number == 1 else many}"
