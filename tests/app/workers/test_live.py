"""The live lane: newest wins, nothing is left, nothing comes after the end."""

import threading
from collections.abc import Callable, Iterator

import numpy as np
import pytest
from PySide6.QtCore import QCoreApplication, QObject, QThread
from pytestqt.qtbot import QtBot

from app.document.view import ViewState
from app.workers.live import Answer, Failure, LiveLane, Solve
from stackcore.errors import Fault, JobError, StackError
from stackcore.media.base import FloatArray
from stackcore.media.constant import ConstantMedium
from stackcore.propagation import Response, solve
from stackcore.stack import Layer, Stack
from tests.app.document.jobs import harbour_job

FREQUENCY = np.linspace(8e9, 12e9, 51)
ANGLE = np.radians([0.0, 30.0])


def slab(millimetres: float = 1.0) -> Stack:
    """Return a dielectric slab."""
    return Stack((Layer(ConstantMedium(4.0), millimetres * 1e-3),))


class Gate:
    """A solver that stops at every call over the sweep until it is let on."""

    def __init__(self) -> None:
        self.entered = threading.Semaphore(0)
        self.open = threading.Semaphore(0)
        self.solved: list[float] = []

    def __call__(self, stack: Stack, frequency: FloatArray, angle: FloatArray) -> Response:
        """Solve when let on."""
        if len(frequency) > 1:
            self.entered.release()
            assert self.open.acquire(timeout=10)
            self.solved.append(stack.thickness)
        return solve(stack, frequency, angle)


class Heard:
    """What a lane tells, and in which thread."""

    def __init__(self, lane: LiveLane) -> None:
        self.answers: list[Answer] = []
        self.failures: list[Failure] = []
        self.threads: set[QThread] = set()
        lane.answered.connect(self.take_answer)
        lane.failed.connect(self.take_failure)

    def take_answer(self, answer: Answer) -> None:
        """Keep an answer."""
        self.answers.append(answer)
        self.threads.add(QThread.currentThread())

    def take_failure(self, failure: Failure) -> None:
        """Keep a failure."""
        self.failures.append(failure)


@pytest.fixture
def make_lane(qtbot: QtBot) -> Iterator[Callable[[Solve], tuple[LiveLane, Heard]]]:
    """Make lanes that are closed at the end, and see that no thread stays."""
    lanes: list[LiveLane] = []

    def make(solver: Solve) -> tuple[LiveLane, Heard]:
        lane = LiveLane(solver)
        lanes.append(lane)
        return lane, Heard(lane)

    yield make
    for lane in lanes:
        lane.close()
    assert not [thread for thread in threading.enumerate() if thread.name == "live lane"]


MakeLane = Callable[[Solve], tuple[LiveLane, Heard]]


def test_an_answer(qtbot: QtBot, make_lane: MakeLane) -> None:
    """An answer holds the sweep, the point of the wall drawing and the markers, and comes in the lane's thread."""
    lane, heard = make_lane(solve)
    markers = (9.1e9, 8e9)
    number = lane.ask(
        slab(), FREQUENCY, ANGLE, marker_frequency=9.1e9, marker_angle=float(ANGLE[1]), markers=markers
    )
    busy = [lane.busy]
    qtbot.waitUntil(lambda: len(heard.answers) == 1)
    assert [*busy, lane.busy] == [True, False]
    (answer,) = heard.answers
    assert answer.question.number == number
    assert np.array_equal(answer.response.transmittance, solve(slab(), FREQUENCY, ANGLE).transmittance)
    assert answer.at_marker.transmittance.shape == (1, 1, 2)
    assert answer.at_markers is not None
    assert np.array_equal(answer.at_markers.frequency, markers)
    assert answer.at_marker.transmittance[0, 0] == pytest.approx(answer.at_markers.transmittance[0, 1])
    assert answer.seconds > 0
    assert heard.threads == {lane.thread()}


def test_the_point_without_a_marker(qtbot: QtBot, make_lane: MakeLane) -> None:
    """Without markers the wall drawing is solved at mid sweep and the first angle."""
    lane, heard = make_lane(solve)
    lane.ask(slab(), FREQUENCY, ANGLE[::-1])
    qtbot.waitUntil(lambda: len(heard.answers) == 1)
    at_marker = heard.answers[0].at_marker
    assert (at_marker.frequency[0], at_marker.angle[0]) == (10e9, ANGLE[1])
    assert heard.answers[0].at_markers is None


def test_a_job_is_asked_as_the_view_looks_at_it(qtbot: QtBot, make_lane: MakeLane) -> None:
    """A job's stack is solved over its sweep, with the view's markers and angle."""
    lane, heard = make_lane(solve)
    job = harbour_job()
    lane.ask_job(job, 1, ViewState(markers=(9e9, 11e9), active_marker=1, active_angle=2))
    qtbot.waitUntil(lambda: len(heard.answers) == 1)
    (answer,) = heard.answers
    assert answer.question.stack is job.stacks[1]
    assert answer.response.transmittance.shape == (41, 3, 2)
    assert (answer.at_marker.frequency[0], answer.at_marker.angle[0]) == (11e9, np.radians(45))
    assert answer.question.markers == (9e9, 11e9)


def test_newest_wins(qtbot: QtBot, make_lane: MakeLane) -> None:
    """What runs is finished and shown; of what came meanwhile only the newest is solved."""
    gate = Gate()
    lane, heard = make_lane(gate)
    lane.ask(slab(1), FREQUENCY, ANGLE)
    assert gate.entered.acquire(timeout=10)
    for millimetres in range(2, 10):
        lane.ask(slab(millimetres), FREQUENCY, ANGLE)
    gate.open.release()
    gate.open.release()
    qtbot.waitUntil(lambda: not lane.busy)
    assert gate.solved == pytest.approx([0.001, 0.009])
    assert [answer.question.number for answer in heard.answers] == [1, 9]


def test_two_hundred_rapid_questions(qtbot: QtBot, make_lane: MakeLane) -> None:
    """The last answer shown is that of the last question, numbers only grow, and few of the rest were solved."""
    lane, heard = make_lane(solve)
    for step in range(200):
        last = lane.ask(slab(1 + step * 0.01), FREQUENCY, ANGLE)
        if step % 50 == 0:
            QCoreApplication.processEvents()
    qtbot.waitUntil(lambda: not lane.busy)
    numbers = [answer.question.number for answer in heard.answers]
    assert numbers == sorted(set(numbers))
    assert numbers[-1] == last == 200
    assert heard.answers[-1].response.stack == slab(1 + 199 * 0.01)
    assert heard.failures == []


ERRORS = [
    (StackError("front absorbs"), "front absorbs"),
    (JobError([Fault("stacks[0]", "one"), Fault("stacks[1]", "two")]), "one"),
    (MemoryError(), "too much memory"),
    (ZeroDivisionError("by accident"), "ZeroDivisionError: by accident"),
]


@pytest.mark.parametrize(("error", "message"), ERRORS)
def test_a_failure_keeps_the_lane_alive(error: Exception, message: str, qtbot: QtBot, make_lane: MakeLane) -> None:
    """Whatever the solver raises comes as a failure with its question, and the next question is answered."""

    def fail_when_thick(stack: Stack, frequency: FloatArray, angle: FloatArray) -> Response:
        if stack.thickness > 0.005:
            raise error
        return solve(stack, frequency, angle)

    lane, heard = make_lane(fail_when_thick)
    number = lane.ask(slab(9), FREQUENCY, ANGLE)
    qtbot.waitUntil(lambda: len(heard.failures) == 1)
    assert not lane.busy
    question, faults = heard.failures[0]
    assert question.number == number
    assert message in faults[0].message
    assert len(faults) == (2 if isinstance(error, JobError) else 1)
    lane.ask(slab(1), FREQUENCY, ANGLE)
    qtbot.waitUntil(lambda: len(heard.answers) == 1)


def test_a_real_fault_of_the_solver(qtbot: QtBot, make_lane: MakeLane) -> None:
    """An angle the solver cannot take comes back in its own words."""
    lane, heard = make_lane(solve)
    lane.ask(slab(), FREQUENCY, np.array([2.0]))
    qtbot.waitUntil(lambda: len(heard.failures) == 1)
    assert "angle" in heard.failures[0].faults[0].message


def test_nothing_comes_after_close(qtbot: QtBot, make_lane: MakeLane) -> None:
    """An answer that was under way when the lane was closed vanishes, and so does every later question."""
    lane, heard = make_lane(solve)
    lane.ask(slab(), FREQUENCY, ANGLE)
    # The thread may be done by now, but its answer waits for the event loop, which has not run.
    lane.close()
    QCoreApplication.processEvents()
    assert lane.ask(slab(), FREQUENCY, ANGLE) == 0
    QCoreApplication.processEvents()
    assert (heard.answers, heard.failures, lane.busy) == ([], [], False)
    lane.close()


def test_close_waits_for_what_runs(qtbot: QtBot, make_lane: MakeLane) -> None:
    """Close returns only when the running calculation is done, and takes up none that waits."""
    gate = Gate()
    lane, heard = make_lane(gate)
    lane.ask(slab(1), FREQUENCY, ANGLE)
    assert gate.entered.acquire(timeout=10)
    lane.ask(slab(2), FREQUENCY, ANGLE)
    timer = threading.Timer(0.05, gate.open.release)
    timer.start()
    lane.close()
    timer.join()
    assert gate.solved == [0.001]
    QCoreApplication.processEvents()
    assert heard.answers == []


def test_a_lane_that_dies_with_its_parent_ends_its_thread(qtbot: QtBot) -> None:
    """A parent destroyed without closing the lane takes it along, and the thread ends though an answer was due."""
    gate = Gate()
    parent = QObject()
    lane = LiveLane(gate, parent)
    heard = Heard(lane)
    lane.ask(slab(), FREQUENCY, ANGLE)
    assert gate.entered.acquire(timeout=10)
    (thread,) = (thread for thread in threading.enumerate() if thread.name == "live lane")
    with qtbot.waitSignal(parent.destroyed):
        parent.deleteLater()
    gate.open.release()
    thread.join(10)
    assert not thread.is_alive()
    QCoreApplication.processEvents()
    assert heard.answers == []


def test_a_lane_never_asked_has_no_thread(qtbot: QtBot) -> None:
    """A lane starts its thread with the first question, and closing one that has none is harmless."""
    before = threading.active_count()
    lane = LiveLane()
    assert not lane.busy
    lane.close()
    assert threading.active_count() == before
