"""The batch lane: newest wins, cancelling keeps what there is, the live lane comes first, nothing is left."""

import threading
import time
from collections.abc import Callable, Generator, Iterator
from functools import partial

import numpy as np
import pytest
from PySide6.QtCore import QCoreApplication, QObject, QThread
from pytestqt.qtbot import QtBot

from app.workers.batch import BatchEnd, BatchFailure, BatchLane, BatchStep
from stackcore.errors import Fault, JobError, StackError
from stackcore.polarizations import TE
from stackcore.quantities import quantity_named
from stackcore.studies import MapLevel, map_over
from tests.app.document.jobs import harbour_job


class Study:
    """A generator of counted steps that waits at each until it is let on, and tells when and where it is closed."""

    def __init__(self, steps: int = 1000, *, free: bool = False) -> None:
        self.steps, self.free = steps, free
        self.open = threading.Semaphore(0)
        self.begun = threading.Event()
        self.closed = threading.Event()
        self.done = 0
        self.threads: set[str] = set()

    def run(self) -> Generator[object, None, None]:
        """Yield 1, 2, 3 and so on."""
        try:
            for step in range(1, self.steps + 1):
                self.begun.set()
                self.threads.add(threading.current_thread().name)
                if not self.free:
                    assert self.open.acquire(timeout=10)
                self.done = step
                yield step
        finally:
            self.threads.add(threading.current_thread().name)
            self.closed.set()


class Heard:
    """What a lane tells, in order, and in which threads."""

    def __init__(self, lane: BatchLane) -> None:
        self.all: list[BatchStep | BatchEnd | BatchFailure] = []
        self.threads: set[QThread] = set()
        for signal in (lane.stepped, lane.ended, lane.failed):
            signal.connect(self.take)

    def take(self, result: BatchStep | BatchEnd | BatchFailure) -> None:
        """Keep what came."""
        self.all.append(result)
        self.threads.add(QThread.currentThread())

    def ends_with(self, result: BatchStep | BatchEnd | BatchFailure) -> bool:
        """Return whether this came last."""
        return self.last == result

    @property
    def last(self) -> BatchStep | BatchEnd | BatchFailure | None:
        """What came last."""
        return self.all[-1] if self.all else None


MakeLane = Callable[..., tuple[BatchLane, Heard]]


@pytest.fixture
def make_lane(qtbot: QtBot) -> Iterator[MakeLane]:
    """Make lanes that are closed at the end, and see that no thread stays."""
    lanes: list[BatchLane] = []

    def make(busy: Callable[[], bool] | None = None) -> tuple[BatchLane, Heard]:
        lane = BatchLane(busy) if busy is not None else BatchLane()
        lanes.append(lane)
        return lane, Heard(lane)

    yield make
    for lane in lanes:
        lane.close()
    assert not [thread for thread in threading.enumerate() if thread.name == "batch lane"]


def test_a_study_is_run_to_its_end(qtbot: QtBot, make_lane: MakeLane) -> None:
    """Steps come in order in the window's thread, the last of them always, then the end."""
    lane, heard = make_lane()
    study = Study(50, free=True)
    assert lane.ask(study.run()) == 1
    qtbot.waitUntil(lambda: not lane.busy)
    steps = [
        result.value for result in heard.all if isinstance(result, BatchStep) and isinstance(result.value, int)
    ]
    assert steps == sorted(set(steps))
    assert steps[-1] == 50
    assert heard.last == BatchEnd(1, 50, cancelled=False)
    application = QCoreApplication.instance()
    assert application is not None
    assert heard.threads == {application.thread()}
    assert study.threads == {"batch lane"}


def test_each_step_comes_when_the_window_has_time(qtbot: QtBot, make_lane: MakeLane) -> None:
    """A window that keeps up misses no step; one that does not gets the newest."""
    lane, heard = make_lane()
    study = Study()
    lane.ask(study.run())
    for step in (1, 2, 3):
        study.open.release()
        qtbot.waitUntil(partial(heard.ends_with, BatchStep(1, step)))
    for _ in range(4):
        study.open.release()
    while study.done < 7:
        time.sleep(0.001)  # the window does nothing else
    qtbot.waitUntil(lambda: heard.last == BatchStep(1, 7))
    assert len(heard.all) < 7
    lane.cancel()
    study.open.release()
    qtbot.waitUntil(lambda: not lane.busy)


def test_the_newest_question_wins(qtbot: QtBot, make_lane: MakeLane) -> None:
    """A new question closes the old generator in its thread, skips one that waited, and nothing old is heard."""
    lane, heard = make_lane()
    first, second, third = Study(), Study(), Study(3, free=True)
    lane.ask(first.run())
    assert first.begun.wait(5)
    lane.ask(second.run())
    assert lane.ask(third.run()) == 3
    first.open.release()
    qtbot.waitUntil(lambda: heard.last == BatchEnd(3, 3, cancelled=False))
    assert first.closed.is_set()
    assert first.threads == {"batch lane"}
    assert not second.begun.is_set()
    assert {result.number for result in heard.all} == {3}


def test_cancelling_keeps_what_there_is(qtbot: QtBot, make_lane: MakeLane) -> None:
    """Cancelled, a study ends with its last step, and the next one runs as ever."""
    lane, heard = make_lane()
    study = Study()
    lane.ask(study.run())
    study.open.release(2)
    qtbot.waitUntil(lambda: heard.last == BatchStep(1, 2))
    lane.cancel()
    study.open.release()
    qtbot.waitUntil(lambda: not lane.busy)
    end = heard.last
    assert isinstance(end, BatchEnd)
    assert end.cancelled
    assert end.value in (2, 3)
    assert study.closed.is_set()
    lane.ask(Study(1, free=True).run())
    qtbot.waitUntil(lambda: heard.last == BatchEnd(2, 1, cancelled=False))


@pytest.mark.parametrize(
    ("error", "faults"),
    [
        (JobError([Fault("sweep", "is wrong")]), (Fault("sweep", "is wrong"),)),
        (StackError("the front absorbs"), (Fault("", "the front absorbs"),)),
        (MemoryError(), (Fault("", "the study needs too much memory", "fewer points"),)),
        (
            KeyError("x"),
            (Fault("", "the calculation failed: KeyError: 'x'", "please report this with the job file"),),
        ),
    ],
)
def test_what_goes_wrong_is_told(
    qtbot: QtBot, make_lane: MakeLane, error: Exception, faults: tuple[Fault, ...]
) -> None:
    """Whatever a study raises becomes a failure with the last step, and the lane lives on."""

    def failing() -> Generator[object, None, None]:
        yield "so far"
        raise error

    lane, heard = make_lane()
    lane.ask(failing())
    qtbot.waitUntil(lambda: not lane.busy)
    assert heard.last == BatchFailure(1, faults, "so far")
    lane.ask(Study(1, free=True).run())
    qtbot.waitUntil(lambda: heard.last == BatchEnd(2, 1, cancelled=False))


def test_the_live_lane_has_the_right_of_way(qtbot: QtBot, make_lane: MakeLane) -> None:
    """Nothing is computed while the other lane is busy and just after; then it goes on, or is ended."""
    busy = threading.Event()
    lane, heard = make_lane(busy.is_set)
    study = Study(100_000, free=True)
    lane.ask(study.run())
    qtbot.waitUntil(lambda: study.done > 0)
    busy.set()
    qtbot.wait(20)
    stood = study.done
    qtbot.wait(60)
    assert study.done == stood
    busy.clear()
    qtbot.waitUntil(lambda: study.done > stood)
    busy.set()
    lane.cancel()
    qtbot.waitUntil(lambda: not lane.busy)
    assert study.closed.is_set()
    assert isinstance(heard.last, BatchEnd)


def test_it_gives_way_when_asked(qtbot: QtBot, make_lane: MakeLane) -> None:
    """Asked over and over to give way, it computes at most the step that runs."""
    lane, _ = make_lane()
    study = Study(100_000, free=True)
    lane.give_way()
    lane.ask(study.run())
    for _ in range(10):
        lane.give_way()
        qtbot.wait(5)
    assert study.done == 0
    qtbot.waitUntil(lambda: study.done > 0)
    lane.cancel()
    qtbot.waitUntil(lambda: not lane.busy)


@pytest.mark.parametrize("moment", [0, 1, 7, 30])
def test_closing_at_any_moment(qtbot: QtBot, make_lane: MakeLane, moment: int) -> None:
    """Closed while a real map refines, the thread is gone within a few chunks and nothing comes afterwards."""
    lane, heard = make_lane()
    frequency, angle = np.linspace(8e9, 12e9, 2001), np.radians(np.linspace(0, 80, 91))
    lane.ask(map_over(harbour_job(), 0, quantity_named("transmittance"), TE, frequency, angle))
    qtbot.wait(moment)
    lane.close()
    count = len(heard.all)
    assert not [thread for thread in threading.enumerate() if thread.name == "batch lane"]
    qtbot.wait(5)
    assert len(heard.all) == count
    assert not lane.busy
    assert lane.ask(Study().run()) == 0


def test_a_map_through_the_lane_is_the_map(qtbot: QtBot, make_lane: MakeLane) -> None:
    """What the end holds is the last level."""
    lane, heard = make_lane()
    frequency, angle = np.linspace(8e9, 12e9, 101), np.radians(np.linspace(0, 80, 21))
    quantity = quantity_named("transmittance")
    lane.ask(map_over(harbour_job(), 0, quantity, TE, frequency, angle))
    qtbot.waitUntil(lambda: not lane.busy)
    end = heard.last
    assert isinstance(end, BatchEnd)
    assert isinstance(end.value, MapLevel)
    *_, last = map_over(harbour_job(), 0, quantity, TE, frequency, angle)
    assert (end.value.values == last.values).all()


def test_a_lane_that_dies_with_its_parent_stops(qtbot: QtBot) -> None:
    """A lane that is never closed and destroyed with its owner ends its thread."""
    owner = QObject()
    lane = BatchLane(parent=owner)
    study = Study(100_000, free=True)
    lane.ask(study.run())
    assert study.begun.wait(5)
    thread = lane._thread
    assert thread is not None
    owner.deleteLater()
    qtbot.waitUntil(lambda: not thread.is_alive())
    assert study.closed.is_set()
