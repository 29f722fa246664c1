"""The batch lane: long studies beside the live lane, which has the right of way.

One slot and no queue, as in the live lane; but here a new question closes the generator that runs, since an old map
is worth nothing. What a generator yields is all that is known by then, so that of steps the window has had no time
to take only the newest is kept: neither memory nor drawing falls behind.

While the live lane works, and for a moment after, nothing is computed here: a drag asks anew every few
milliseconds, and a chunk begun in every gap would take the processor from the curve under the hand.
"""

import threading
import time
from collections.abc import Callable, Generator
from typing import Final, NamedTuple, final

from PySide6.QtCore import QObject, Qt, Signal, Slot

from app.workers.collecting import WindowCollector
from stackcore.errors import Fault, InputError, SlabwrightError

Study = Generator[object, None, None]
"""Yields what there is so far, each time all of it; the last yield is the result."""

REST_SECONDS: Final = 0.06
"""After the live lane was last busy: longer than the gaps of a drag, too short to be noticed after it."""

_LOOK_SECONDS: Final = 0.004
"""Between two looks at the live lane while it is busy."""


class BatchStep(NamedTuple):
    """What a study has found so far."""

    number: int
    """Of the question."""
    value: object
    """As the generator yielded it."""


class BatchEnd(NamedTuple):
    """A study that has come to its end, or was cancelled."""

    number: int
    value: object
    """The last that was yielded, or None when nothing was."""
    cancelled: bool
    """Whether it stopped before its end."""


class BatchFailure(NamedTuple):
    """A study that cannot go on, and why; `value` is the last that was yielded, or None."""

    number: int
    faults: tuple[Fault, ...]
    value: object


_Result = BatchStep | BatchEnd | BatchFailure


class _Relay(QObject):
    """Wakes the lane in its own thread; without a parent, so that it outlives the lane."""

    arrived = Signal()


def _nothing_busy() -> bool:
    return False


class _Desk:
    """What the two threads share: the question that waits, what the worker has found, and the wish to stop."""

    def __init__(self, busy: Callable[[], bool]) -> None:
        self._condition = threading.Condition()
        self._busy = busy
        self._rests_until = 0.0
        self._waiting: tuple[int, Study] | None = None
        self._found: list[_Result] = []
        self._current = 0
        self._cancelled = 0
        self._stopped = False

    def put(self, number: int, study: Study) -> None:
        """Wait with a question; whatever was asked before is given up."""
        with self._condition:
            self._waiting, self._current = (number, study), number
            self._found.clear()
            self._condition.notify()

    def take(self) -> tuple[int, Study] | None:
        """Return the next question when there is one, or None when it is time to stop."""
        with self._condition:
            self._condition.wait_for(lambda: self._stopped or self._waiting is not None)
            question, self._waiting = self._waiting, None
            return None if self._stopped else question

    def cancel(self, number: int) -> None:
        """Ask that `number` ends with what it has."""
        with self._condition:
            self._cancelled = number
            self._condition.notify()

    def stop(self) -> None:
        """Make everything end from now on."""
        with self._condition:
            self._stopped = True
            self._found.clear()
            self._condition.notify()

    def rest(self) -> None:
        """Compute nothing for a moment."""
        with self._condition:
            self._rests_until = time.monotonic() + REST_SECONDS

    def goes_on(self, number: int) -> bool:
        """Wait while the live lane works; return whether `number` is still wanted."""
        with self._condition:
            while self._wanted(number):
                if self._busy():
                    self._rests_until = time.monotonic() + REST_SECONDS
                wait = self._rests_until - time.monotonic()
                if wait <= 0:
                    return True
                self._condition.wait(min(wait, _LOOK_SECONDS))
            return False

    def _wanted(self, number: int) -> bool:
        return not self._stopped and number == self._current and number > self._cancelled

    def bring(self, result: _Result) -> bool:
        """Lay down what was found, a step in place of an older one; return whether the window must be woken."""
        with self._condition:
            if self._stopped or result.number != self._current:
                return False
            asleep = not self._found
            if self._found and isinstance(self._found[-1], BatchStep) and isinstance(result, BatchStep):
                self._found.pop()
            self._found.append(result)
            return asleep

    def fetch(self) -> list[_Result]:
        """Return what was found since the last time."""
        with self._condition:
            found, self._found = self._found, []
            return found


@final
class BatchLane(QObject):
    """Runs one study at a time in a thread of its own; the newest question wins.

    Signals arrive in the thread of the lane: `stepped` with a `BatchStep` for what is yielded, then one of `ended`
    with a `BatchEnd` or `failed` with a `BatchFailure`. A step the window had no time for is left out when a newer
    one is there; the last one always comes. After `ask` nothing comes of an older question, and after
    `close` nothing at all.

    Parameters
    ----------
    busy
        Asked from the thread of the study between two chunks: whether the live lane works, such as
        ``lambda: live.busy``. It must be quick and may only read.
    parent
        Owner in Qt's sense.
    """

    stepped = Signal(object)
    ended = Signal(object)
    failed = Signal(object)

    def __init__(self, busy: Callable[[], bool] = _nothing_busy, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._desk = _Desk(busy)
        self._relay = _Relay()
        self._relay.arrived.connect(self._deliver, Qt.ConnectionType.QueuedConnection)
        self._thread: threading.Thread | None = None
        self._asked = 0
        self._over = 0
        self._closed = False
        # Not a child of the lane: it must still be there to give the search back when the lane is gone.
        self._collector = WindowCollector()
        self.destroyed.connect(self._desk.stop)
        self.destroyed.connect(self._collector.release)

    @property
    def busy(self) -> bool:
        """Whether the newest question has neither ended nor failed yet."""
        return not self._closed and self._over < self._asked

    def ask(self, study: Study) -> int:
        """Run a study in place of the present one, whose generator is closed.

        Parameters
        ----------
        study
            Not begun; it is advanced and closed in the thread of the lane.

        Returns
        -------
        int
            Number of the question, or 0 after `close`, when nothing is run.
        """
        if self._closed:
            study.close()
            return 0
        self._asked += 1
        self._desk.put(self._asked, study)
        if self._thread is None:
            self._collector.hold()
            # No reference to the lane goes into the thread: the lane can be destroyed while it runs.
            arguments = (self._desk, self._relay)
            self._thread = threading.Thread(target=_work, args=arguments, name="batch lane", daemon=True)
            self._thread.start()
        return self._asked

    def cancel(self) -> None:
        """End the present study with what it has: `ended` comes with the last that was yielded."""
        self._desk.cancel(self._asked)

    def give_way(self) -> None:
        """Compute nothing for a moment; to be called when a live question is asked."""
        self._desk.rest()

    def close(self) -> None:
        """End the thread and wait for it, as long as one chunk; nothing comes afterwards. May be called again."""
        self._closed = True
        self._desk.stop()
        if self._thread is not None:
            self._thread.join()
            self._thread = None
        self._collector.release()

    @Slot()
    def _deliver(self) -> None:
        for result in self._desk.fetch():
            # A slot of the one before may have asked anew, or closed the lane.
            if self._closed or result.number != self._asked:
                return
            if isinstance(result, BatchStep):
                self.stepped.emit(result)
                continue
            self._over = result.number
            if isinstance(result, BatchEnd):
                self.ended.emit(result)
            else:
                self.failed.emit(result)


def _work(desk: _Desk, relay: _Relay) -> None:
    while (question := desk.take()) is not None:
        number, study = question
        end = _run(number, study, desk, relay)
        if desk.bring(end):
            relay.arrived.emit()


def _run(number: int, study: Study, desk: _Desk, relay: _Relay) -> BatchEnd | BatchFailure:
    """Advance a study to its end, or as far as it is wanted; whatever goes wrong becomes a failure."""
    value: object = None
    try:
        while desk.goes_on(number):
            value = next(study)
            if desk.bring(BatchStep(number, value)):
                relay.arrived.emit()
        study.close()
        return BatchEnd(number, value, cancelled=True)
    except StopIteration:
        return BatchEnd(number, value, cancelled=False)
    except InputError as error:
        return BatchFailure(number, error.faults, value)
    except SlabwrightError as error:
        return BatchFailure(number, (Fault("", str(error)),), value)
    except MemoryError:
        return BatchFailure(number, (Fault("", "the study needs too much memory", "fewer points"),), value)
    except Exception as error:
        message = f"the calculation failed: {type(error).__name__}: {error}"
        return BatchFailure(number, (Fault("", message, "please report this with the job file"),), value)
