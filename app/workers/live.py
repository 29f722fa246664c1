"""The live lane: the newest question answered, without the window ever waiting.

One slot and no queue. A calculation that runs is finished and shown even when it is old by then (stopping it
at every movement of a drag would show nothing at all); of the questions that came meanwhile only the newest
is taken.
"""

import threading
import time
from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from typing import NamedTuple, final

import numpy as np
from PySide6.QtCore import QObject, Qt, Signal, Slot

from app.document.view import ViewState
from app.series.cases import Case, cases_of
from app.workers.collecting import WindowCollector
from stackcore.errors import Fault, InputError, SlabwrightError
from stackcore.job import Job
from stackcore.media.base import FloatArray
from stackcore.propagation import Response, solve
from stackcore.quantities import quantity_named
from stackcore.stack import Stack

Solve = Callable[[Stack, FloatArray, FloatArray], Response]


@dataclass(frozen=True, slots=True, eq=False)
class Question:
    """What is to be computed; frozen, so that nothing can change under the calculation.

    Parameters
    ----------
    number
        Counts up; a higher number was asked later.
    stack
        What the wave meets.
    frequency, angle
        Of the sweep, Hz and rad, one-dimensional.
    marker_frequency, marker_angle
        The one point of the wall drawing, Hz and rad.
    markers
        Frequencies in Hz of all markers, for the readings.
    quantity
        What will be shown, by name, worked out beforehand; empty for none.
    job, place
        Where `stack` comes from: the job and the index of the stack, for what is compared with it.
    cases
        Other stacks, and this one under conditions, to be solved over the same sweep.
    """

    number: int
    stack: Stack
    frequency: FloatArray
    angle: FloatArray
    marker_frequency: float
    marker_angle: float
    markers: tuple[float, ...] = ()
    quantity: str = ""
    job: Job | None = None
    place: int = 0
    cases: tuple[Case, ...] = ()


@dataclass(frozen=True, slots=True)
class Compared:
    """A case over the sweep, and at the frequencies of all markers (None without markers)."""

    response: Response
    at_markers: Response | None


@dataclass(frozen=True, slots=True, eq=False)
class Answer:
    """A question and what came out.

    Parameters
    ----------
    question
        As it was asked.
    response
        Over the sweep, (F, A, 2).
    at_marker
        At the point of the wall drawing, (1, 1, 2): for the rays and the share each element absorbs.
    at_markers
        Solved at the very frequencies of all markers and all angles, (M, A, 2), or None without markers.
    seconds
        What the calculation took.
    compared
        The same of every case of the question.
    """

    question: Question
    response: Response
    at_marker: Response
    at_markers: Response | None
    seconds: float
    compared: Mapping[Case, Compared] = field(default_factory=dict)

    @property
    def others(self) -> dict[Case, Response]:
        """The cases over the sweep."""
        return {case: one.response for case, one in self.compared.items()}

    @property
    def others_at_markers(self) -> dict[Case, Response]:
        """The cases at the markers, those that have markers."""
        return {case: one.at_markers for case, one in self.compared.items() if one.at_markers is not None}


class Failure(NamedTuple):
    """A question that has no answer, and why."""

    question: Question
    faults: tuple[Fault, ...]


class _Relay(QObject):
    """Carries a result from the thread to the lane; without a parent, so that it outlives the lane."""

    arrived = Signal(object)


class _Slot:
    """The one place a question waits in, guarded for two threads."""

    def __init__(self) -> None:
        self._condition = threading.Condition()
        self._waiting: Question | None = None
        self._stopped = False

    def put(self, question: Question) -> None:
        """Wait with `question`; one that waited already is forgotten."""
        with self._condition:
            self._waiting = question
            self._condition.notify()

    def take(self) -> Question | None:
        """Return the next question when there is one, or None when it is time to stop."""
        with self._condition:
            self._condition.wait_for(lambda: self._stopped or self._waiting is not None)
            question, self._waiting = self._waiting, None
            return None if self._stopped else question

    def stop(self) -> None:
        """Make `take` return None from now on."""
        with self._condition:
            self._stopped = True
            self._condition.notify()


@final
class LiveLane(QObject):
    """Answers questions one after the other, newest first, in one thread of its own.

    Signals arrive in the thread of the lane: `answered` with an `Answer`, `failed` with a `Failure`. Neither
    comes after `close`.

    Parameters
    ----------
    solve
        Stack, frequencies and angles -> response; tests give their own.
    parent
        Owner in Qt's sense.
    """

    answered = Signal(object)
    failed = Signal(object)

    def __init__(self, solve: Solve = solve, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._solve = solve
        self._slot = _Slot()
        self._relay = _Relay()
        self._relay.arrived.connect(self._deliver, Qt.ConnectionType.QueuedConnection)
        self._thread: threading.Thread | None = None
        self._asked = 0
        self._heard = 0
        self._closed = False
        # Not a child of the lane: it must still be there to give the search back when the lane is gone.
        self._collector = WindowCollector()
        # A lane that dies with its parent, never closed, must not leave its thread waiting for ever.
        self.destroyed.connect(self._slot.stop)
        self.destroyed.connect(self._collector.release)

    @property
    def busy(self) -> bool:
        """Whether the newest question has neither an answer nor a failure yet."""
        return not self._closed and self._heard < self._asked

    def ask(
        self,
        stack: Stack,
        frequency: FloatArray,
        angle: FloatArray,
        *,
        marker_frequency: float | None = None,
        marker_angle: float | None = None,
        markers: tuple[float, ...] = (),
        quantity: str = "",
        job: Job | None = None,
        place: int = 0,
        cases: tuple[Case, ...] = (),
    ) -> int:
        """Ask a new question and return its number; the present calculation is finished first.

        Parameters
        ----------
        stack, frequency, angle
            As `stackcore.solve` takes them, one-dimensional.
        marker_frequency, marker_angle
            The point of the wall drawing; by default the middle frequency and the first angle.
        markers
            Frequencies to be solved exactly for the readings.
        quantity
            What will be shown of the response: worked out here, not in the window's thread.
        job, place, cases
            The job `stack` is of, its place there, and what is solved for comparison.

        Returns
        -------
        int
            Number of the question, or 0 after `close`, when nothing is asked.
        """
        if self._closed:
            return 0
        frequency, angle = np.atleast_1d(frequency), np.atleast_1d(angle)
        middle = float(frequency[len(frequency) // 2])
        self._asked += 1
        question = Question(
            self._asked,
            stack,
            frequency,
            angle,
            middle if marker_frequency is None else marker_frequency,
            float(angle[0]) if marker_angle is None else marker_angle,
            markers,
            quantity,
            job,
            place,
            cases,
        )
        self._slot.put(question)
        self._start()
        return self._asked

    def ask_job(self, job: Job, stack: int, view: ViewState) -> int:
        """Ask for one stack of `job` over its sweep, with the markers and the angle of `view`."""
        return self.ask(
            job.stacks[stack],
            job.sweep.frequencies(),
            job.sweep.angles(),
            marker_frequency=view.marker_frequency(job.sweep),
            marker_angle=view.marker_angle(job.sweep),
            markers=view.markers,
            quantity=view.quantity,
            job=job,
            place=stack,
            cases=cases_of(job.record, stack, view),
        )

    def close(self) -> None:
        """End the thread and wait for it; what arrives afterwards vanishes. May be called again."""
        self._closed = True
        self._slot.stop()
        if self._thread is not None:
            self._thread.join()
            self._thread = None
        self._collector.release()

    def _start(self) -> None:
        if self._thread is None:
            self._collector.hold()
            # No reference to the lane goes into the thread: the lane can be destroyed while it runs.
            arguments = (self._slot, self._solve, self._relay)
            self._thread = threading.Thread(target=_work, args=arguments, name="live lane", daemon=True)
            self._thread.start()

    @Slot(object)
    def _deliver(self, result: Answer | Failure) -> None:
        if self._closed:
            return
        self._heard = result.question.number
        if isinstance(result, Answer):
            self.answered.emit(result)
        else:
            self.failed.emit(result)


def _work(slot: _Slot, solve: Solve, relay: _Relay) -> None:
    while (question := slot.take()) is not None:
        relay.arrived.emit(_result(question, solve))


def _result(question: Question, solve: Solve) -> Answer | Failure:
    """Return what became of `question`; whatever goes wrong becomes a failure, and the lane lives on."""
    begun = time.perf_counter()
    try:
        response = solve(question.stack, question.frequency, question.angle)
        point = np.array([question.marker_frequency]), np.array([question.marker_angle])
        at_marker = solve(question.stack, *point)
        at_markers = None
        if question.markers:
            at_markers = solve(question.stack, np.array(question.markers), question.angle)
        _prepare(question, response, at_marker, at_markers)
        compared = solve_cases(question, solve)
    except InputError as error:
        return Failure(question, error.faults)
    except SlabwrightError as error:
        return Failure(question, (Fault("", str(error)),))
    except MemoryError:
        points = len(question.frequency) * len(question.angle)
        return Failure(question, (Fault("sweep", f"{points} points need too much memory", "fewer points"),))
    except Exception as error:
        message = f"the calculation failed: {type(error).__name__}: {error}"
        return Failure(question, (Fault("", message, "please report this with the job file"),))
    return Answer(question, response, at_marker, at_markers, time.perf_counter() - begun, compared)


def solve_cases(question: Question, solve: Solve) -> dict[Case, Compared]:
    """Return what became of every case of `question`, solved over the same sweep and at the same markers."""
    found: dict[Case, Compared] = {}
    if question.job is None:
        return found
    for case in question.cases:
        stack = case.resolved(question.job)
        response = solve(stack, question.frequency, question.angle)
        markers = np.array(question.markers)
        at_markers = solve(stack, markers, question.angle) if question.markers else None
        for part in (response, at_markers):
            if question.quantity and part is not None:
                quantity_named(question.quantity).values(part)
        found[case] = Compared(response, at_markers)
    return found


def _prepare(question: Question, response: Response, at_marker: Response, at_markers: Response | None) -> None:
    """Work out what the panels will ask of the responses, which compute a quantity when it is first asked for."""
    for part in (response, at_markers):
        if question.quantity and part is not None:
            quantity_named(question.quantity).values(part)
    for name in ("element_absorptance", "absorptance", "reflectance", "transmittance"):
        getattr(at_marker, name)
