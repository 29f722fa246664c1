"""Several windows: each holds a job of its own, and a file is open once."""

from collections.abc import Iterator
from pathlib import Path

import pytest
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.settings import open_settings, state_folder
from app.window.main_window import MainWindow
from app.window.windows import STEP, Windows
from tests.app.conftest import flush_deferred_deletes
from tests.app.window.scripted import ScriptedDialogs, job_file


class Row:
    """The windows of a program, with one dialogs script a window."""

    def __init__(self) -> None:
        self.dialogs: list[ScriptedDialogs] = []
        self.windows = Windows(self._make)

    def _make(self, windows: Windows) -> MainWindow:
        self.dialogs.append(ScriptedDialogs())
        return MainWindow(
            Session(), View(), open_settings(), state_folder(), dialogs=self.dialogs[-1], others=windows
        )

    def window(self, place: int) -> MainWindow:
        """Return a window by its place, oldest first."""
        found = self.windows.windows[place]
        assert isinstance(found, MainWindow)
        return found

    def session(self, place: int) -> Session:
        """Return the session of a window."""
        return self.window(place)._session


@pytest.fixture
def row(qtbot: QtBot) -> Iterator[Row]:
    """One window; all are closed at the end without saving."""
    made = Row()
    made.windows.add()
    yield made
    for place, window in enumerate(made.windows.windows):
        made.dialogs[place].save = ["discard"]
        made.window(place)._may_close = True
        window.close()
    flush_deferred_deletes()


def test_a_new_window_stands_a_step_away_and_holds_its_own_job(row: Row) -> None:
    """Ctrl+Shift+N opens it; an edit in one is none in the other."""
    row.window(0).resize(700, 500)
    row.window(0).actions_table["file.window"].trigger()
    assert len(row.windows.windows) == 2
    offset = row.window(1).pos() - row.window(0).pos()
    assert (offset.x(), offset.y()) == (STEP, STEP)
    assert row.window(1).size() == row.window(0).size()
    row.session(1).apply(edits.set_title("Second"))
    assert row.session(0).record.title != "Second"


def test_a_file_is_open_once(row: Row, tmp_path: Path) -> None:
    """Opening it again shows the window that has it, from wherever it was asked."""
    path = job_file(tmp_path)
    row.window(0).open_path(path)
    row.windows.open_beside(path)
    assert len(row.windows.windows) == 1
    row.windows.open_beside()
    row.window(1).open_path(path)
    assert row.session(1).path is None
    row.dialogs[1].open_paths = [path]
    row.window(1).actions_table["file.open"].trigger()
    assert row.session(1).path is None


def test_a_window_may_open_its_own_file_again(row: Row, tmp_path: Path) -> None:
    """That reads it anew, after the question about changes."""
    path = job_file(tmp_path)
    row.window(0).open_path(path)
    title = row.session(0).record.title
    row.session(0).apply(edits.set_title("Changed"))
    row.dialogs[0].save = ["discard"]
    row.window(0).open_path(path)
    assert row.session(0).record.title == title


def test_a_second_file_opens_beside(row: Row, tmp_path: Path) -> None:
    """A window is made for it, and it has the file."""
    path = job_file(tmp_path)
    row.windows.open_beside(path)
    assert row.window(1).path == path


def test_closing_one_leaves_the_others(row: Row, qtbot: QtBot) -> None:
    """Ctrl+W closes a window; it is forgotten and the other lives on."""
    row.windows.open_beside()
    row.window(1).actions_table["file.close"].trigger()
    flush_deferred_deletes()
    qtbot.waitUntil(lambda: len(row.windows.windows) == 1)
    assert row.window(0).isVisible()


def test_quit_asks_each_window_and_stops_at_one_that_stays(row: Row) -> None:
    """Newest first; Cancel keeps that window and those before it."""
    row.windows.open_beside()
    row.session(0).apply(edits.set_title("Unsaved"))
    row.dialogs[0].save = ["cancel"]
    row.window(1).actions_table["file.quit"].trigger()
    flush_deferred_deletes()
    assert [window.isVisible() for window in row.windows.windows] == [True]
    assert row.dialogs[0].asked
    assert QApplication.activeModalWidget() is None
