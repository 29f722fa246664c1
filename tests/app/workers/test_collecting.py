"""Where Python's search for cycles runs while a thread works."""

import gc
import threading
import weakref
from collections.abc import Iterator

import numpy as np
import pytest
from PySide6.QtCore import QObject
from pytestqt.qtbot import QtBot

from app.workers.collecting import WindowCollector, collect_due
from app.workers.live import LiveLane
from stackcore.media.base import FloatArray
from stackcore.propagation import Response, solve
from stackcore.stack import Stack


@pytest.fixture(autouse=True)
def _search_as_before() -> Iterator[None]:
    """The interpreter's own search is on before and after."""
    assert gc.isenabled()
    yield
    assert gc.isenabled()


class Knot(QObject):
    """An object of the toolkit that only the search for cycles can free."""

    def __init__(self, freed_in: list[str]) -> None:
        super().__init__()
        self.itself = self
        weakref.finalize(self, lambda: freed_in.append(threading.current_thread().name))


def litter(stack: Stack, frequency: FloatArray, angle: FloatArray) -> Response:
    """Solve, and allocate so much that a search would be due many times over."""
    kept = [[number] for number in range(20_000)]
    assert len(kept) == 20_000
    return solve(stack, frequency, angle)


def test_a_working_thread_frees_nothing_of_the_window(qtbot: QtBot) -> None:
    """However much the worker allocates, objects of the toolkit are freed in the window's thread."""
    freed_in: list[str] = []
    lane = LiveLane(litter)
    for _ in range(5):
        Knot(freed_in)
        with qtbot.waitSignal(lane.answered):
            lane.ask(Stack(), np.array([1e9]), np.array([0.0]))
    lane.close()
    gc.collect()
    assert set(freed_in) == {threading.main_thread().name}
    assert len(freed_in) == 5


def test_the_window_searches_meanwhile(qtbot: QtBot) -> None:
    """While the search is held, cycles still go, by the timer."""
    freed_in: list[str] = []
    collector = WindowCollector()
    collector.hold()
    assert not gc.isenabled()
    Knot(freed_in)
    kept = [[number] for number in range(5_000)]
    qtbot.waitUntil(lambda: len(freed_in) == 1)
    collector.release()
    assert len(kept) == 5_000


def test_the_last_holder_gives_it_back(qtbot: QtBot) -> None:
    """Two holders in any order: the search is the interpreter's again only after both, and twice counts once."""
    one, two = WindowCollector(), WindowCollector()
    seen = []
    for step in (one.hold, two.hold, two.hold, one.release, one.release, two.release):
        step()
        seen.append(gc.isenabled())
    assert seen == [False, False, False, False, False, True]


def test_nothing_due_nothing_done() -> None:
    """Right after a full search none is due, and none is made."""
    searches: list[int] = []

    def note(phase: str, info: dict[str, int]) -> None:
        if phase == "start":
            searches.append(info["generation"])

    gc.disable()
    try:
        gc.collect()
        gc.callbacks.append(note)
        collect_due()
        assert searches == []
        kept = [[number] for number in range(5_000)]
        collect_due()
        assert searches == [0]
        assert len(kept) == 5_000
    finally:
        gc.callbacks.remove(note)
        gc.enable()
