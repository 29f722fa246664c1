"""A whole window for tests: real panels, scripted dialogs, settings of its own."""

from collections.abc import Callable, Iterator
from pathlib import Path

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.document.session import Session
from app.document.view import View
from app.look.settings import open_settings, state_folder
from app.window.main_window import MainWindow
from stackcore.job import Job
from tests.app.window.scripted import ScriptedDialogs, small_job


class Bench:
    """A window with everything a test needs to look at."""

    def __init__(self, qtbot: QtBot, job: Job) -> None:
        self.session, self.view, self.dialogs = Session(job), View(), ScriptedDialogs()
        self.window = MainWindow(self.session, self.view, open_settings(), state_folder(), dialogs=self.dialogs)
        self.qtbot = qtbot

    def show(self, width: int = 1200, height: int = 800) -> None:
        """Show the window, active and with its first answer."""
        self.window.resize(width, height)
        self.window.show()
        self.qtbot.waitExposed(self.window)
        self.window.activateWindow()
        self.settle()

    def settle(self) -> None:
        """Wait until the panels show the job of now."""
        self.qtbot.waitUntil(lambda: self.window.recompute.up_to_date)

    def press(self, key: Qt.Key, modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
        """Press a key where the focus is."""
        focus = QApplication.focusWidget()
        assert focus is not None, "nothing has the focus"
        QTest.keyClick(focus, key, modifier)

    def type(self, text: str) -> None:
        """Type a text where the focus is, letter by letter."""
        for letter in text:
            focus = QApplication.focusWidget()
            assert focus is not None, "nothing has the focus"
            QTest.keyClicks(focus, letter)

    def trigger(self, key: str) -> None:
        """Do what a menu entry does."""
        self.window.actions_table[key].trigger()


@pytest.fixture
def bench(qtbot: QtBot, tmp_path: Path) -> Iterator[Bench]:
    """A window on the small job, closed at the end without saving."""
    bench = Bench(qtbot, small_job())
    qtbot.addWidget(bench.window)
    bench.show()
    yield bench
    bench.dialogs.save = ["discard"]
    bench.window.close()


MakeWindow = Callable[[Job], Bench]


@pytest.fixture
def make_bench(qtbot: QtBot) -> Iterator[MakeWindow]:
    """Make further windows, closed at the end without saving."""
    made: list[Bench] = []

    def make(job: Job) -> Bench:
        bench = Bench(qtbot, job)
        qtbot.addWidget(bench.window)
        made.append(bench)
        return bench

    yield make
    for bench in made:
        bench.dialogs.save = ["discard"]
        bench.window.close()
