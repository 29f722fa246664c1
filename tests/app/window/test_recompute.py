"""What is shown follows the job: newest answer, stale when it is not, faults in words."""

import threading
from collections.abc import Iterator

import numpy as np
import pytest
from PySide6.QtCore import QObject
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import Cell, Selection
from app.document.session import Session
from app.document.view import View
from app.window.recompute import LONGEST, Recompute
from app.workers.live import Answer, LiveLane
from stackcore.errors import StackError
from stackcore.media.base import FloatArray
from stackcore.propagation.response import Response
from stackcore.propagation.solve import solve
from stackcore.stack import Stack
from tests.app.window.scripted import small_job


class Recorder:
    """A panel that remembers what it was given."""

    def __init__(self) -> None:
        self.answers: list[Answer] = []
        self.stale = False

    def show_answer(self, answer: Answer) -> None:
        """Remember an answer."""
        self.answers.append(answer)

    def set_stale(self, stale: bool) -> None:
        """Remember whether it is stale."""
        self.stale = stale

    @property
    def thickness(self) -> float:
        """Total thickness of the stack shown."""
        return self.answers[-1].question.stack.thickness


class Held:
    """The solver behind a gate that tests open; it can be told to fail."""

    def __init__(self) -> None:
        self.gate = threading.Event()
        self.gate.set()
        self.fault = ""

    def __call__(self, stack: Stack, frequency: FloatArray, angle: FloatArray) -> Response:
        self.gate.wait(5)
        if self.fault:
            raise StackError(self.fault)
        return solve(stack, frequency, angle)


class Bench:
    """A session, a view, a recorder, and what keeps it up to date."""

    def __init__(self) -> None:
        self.session, self.view, self.panel, self.held = Session(small_job()), View(), Recorder(), Held()
        self.told: list[str] = []
        self.owner = QObject()
        self.recompute = Recompute(self.session, self.view, LiveLane(self.held), [self.panel], self.owner)
        self.recompute.told.connect(self.told.append)
        self.recompute.ask(fresh=True)

    def settled(self) -> bool:
        return self.recompute.up_to_date


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """A bench whose first answer has come; closed at the end."""
    bench = Bench()
    qtbot.waitUntil(bench.settled)
    yield bench
    bench.held.gate.set()
    bench.recompute.close()


def test_an_edit_brings_a_new_answer(qtbot: QtBot, bench: Bench) -> None:
    """After an edit the panel has the answer for the job of now, and the status line counts its points."""
    bench.session.apply(edits.set_thickness(0, 1, 0.004))
    qtbot.waitUntil(bench.settled)
    assert bench.panel.thickness == pytest.approx(0.006)
    assert bench.told[-1].startswith("41 frequencies × 2 angles, ")
    assert not bench.panel.stale


def test_selecting_or_renaming_asks_nothing(qtbot: QtBot, bench: Bench) -> None:
    """A selection within the stack changes no stack, so nothing is computed."""
    count = len(bench.panel.answers)
    bench.session.select(Selection(0, (1,)))
    assert bench.settled()
    assert len(bench.panel.answers) == count


def test_another_stack_is_computed_when_it_is_looked_at(qtbot: QtBot, bench: Bench) -> None:
    """Choosing stack B shows stack B."""
    bench.session.select(Selection(1))
    qtbot.waitUntil(bench.settled)
    assert bench.panel.answers[-1].question.stack.name == "B"


def test_moving_the_marker_asks_for_its_point(qtbot: QtBot, bench: Bench) -> None:
    """The point of the wall drawing follows the marker and the angle; decibels ask nothing."""
    bench.view.set(markers=(9e9,))
    qtbot.waitUntil(bench.settled)
    assert bench.panel.answers[-1].question.marker_frequency == 9e9
    bench.view.set(active_angle=1)
    qtbot.waitUntil(bench.settled)
    assert bench.panel.answers[-1].question.marker_angle == pytest.approx(np.pi / 4)
    count = len(bench.panel.answers)
    bench.view.set(power="decibels")
    assert bench.settled()
    assert len(bench.panel.answers) == count


def test_another_quantity_is_worked_out_beside_the_window(qtbot: QtBot, bench: Bench) -> None:
    """A quantity that was not shown yet comes as an answer that knows it already."""
    assert not bench.panel.answers[-1].response.knows("group_delay_s")
    bench.view.set(quantity="group_delay_s")
    qtbot.waitUntil(bench.settled)
    assert bench.panel.answers[-1].response.knows("group_delay_s")


def test_a_text_that_is_no_value_makes_the_result_stale(qtbot: QtBot, bench: Bench) -> None:
    """While a draft stands, panels are stale and the status line says which text; undo makes it good."""
    bench.session.apply(edits.type_into(Cell(0, 1, "thickness"), "two"))
    assert bench.panel.stale
    assert bench.told[-1] == "Not up to date: thickness of layer 2, a number is missing before 'two'"
    bench.session.apply(edits.type_into(Cell(1, 0, "material"), 90 * "x"))
    assert bench.told[-1].endswith(", and 1 more")
    bench.session.apply(edits.type_into(Cell(0, 1, "thickness"), "1 mm"))
    assert bench.told[-1].startswith("Not up to date: material of layer 1 in stack B, ")
    assert len(bench.told[-1]) <= len("Not up to date: ") + LONGEST
    assert bench.told[-1].endswith("…")
    bench.session.undo()
    bench.session.undo()
    bench.session.undo()
    qtbot.waitUntil(lambda: not bench.panel.stale)
    assert bench.told[-1].startswith("41 frequencies")


def test_a_long_calculation_is_said_to_be_under_way(qtbot: QtBot, bench: Bench) -> None:
    """The old curves stay; only after a while it is said that newer ones are coming, until they are there."""
    states: list[bool] = []
    bench.recompute.busy.connect(states.append)
    bench.held.gate.clear()
    bench.session.apply(edits.set_thickness(0, 1, 0.005))
    assert states[-1] is False
    qtbot.waitUntil(lambda: states[-1])
    assert bench.told[-1] == "Computing …"
    bench.held.gate.set()
    qtbot.waitUntil(bench.settled)
    assert not states[-1]
    assert bench.told[-1].startswith("41 frequencies")


def test_of_many_edits_the_last_is_shown(qtbot: QtBot, bench: Bench) -> None:
    """A hundred edits in a row end with the answer to the last, and not all of them are computed."""
    count = len(bench.panel.answers)
    for number in range(1, 101):
        bench.session.apply(edits.set_thickness(0, 1, number * 1e-4, merge_key="drag"))
    qtbot.waitUntil(bench.settled)
    assert bench.panel.thickness == pytest.approx(0.012)
    assert len(bench.panel.answers) - count < 100


def test_a_stack_that_cannot_be_computed_is_told_and_stale(qtbot: QtBot, bench: Bench) -> None:
    """A failure says why, marks the panels, and the next good stack makes them good."""
    bench.held.fault = "the front half-space absorbs"
    with qtbot.waitSignal(bench.recompute.failed) as failed:
        bench.session.apply(edits.set_thickness(0, 1, 0.002))
    assert failed.args is not None
    assert "front half-space absorbs" in str(failed.args[0][0])
    assert bench.panel.stale
    assert "front half-space absorbs" in bench.told[-1]
    bench.held.fault = ""
    bench.session.undo()
    qtbot.waitUntil(bench.settled)
    assert not bench.panel.stale


def test_an_answer_to_the_job_of_before_is_not_shown(qtbot: QtBot, bench: Bench) -> None:
    """After opening another job only answers to it arrive at the panels."""
    bench.held.gate.clear()
    bench.session.apply(edits.set_thickness(0, 1, 0.003))
    bench.session.new()
    count = len(bench.panel.answers)
    bench.held.gate.set()
    qtbot.waitUntil(bench.settled)
    shown = [answer.question.stack.thickness for answer in bench.panel.answers[count:]]
    assert shown == [bench.session.job.stacks[0].thickness]


def test_nothing_comes_after_close(qtbot: QtBot, bench: Bench) -> None:
    """Close waits for the thread; edits afterwards compute nothing."""
    count = len(bench.panel.answers)
    bench.recompute.close()
    bench.session.apply(edits.set_thickness(0, 1, 0.003))
    qtbot.wait(20)
    assert len(bench.panel.answers) == count
    assert not any(thread.name == "live lane" for thread in threading.enumerate())
