"""Unsaved work survives a session that ends without saying goodbye."""

from pathlib import Path

import pytest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.window.recovery import SUFFIX, Recovery
from tests.app.window.scripted import job_file, small_job


@pytest.fixture
def folder(tmp_path: Path) -> Path:
    """Where recovery files go."""
    return tmp_path / "recovery"


def files(folder: Path) -> list[Path]:
    """Return the recovery files there are."""
    return sorted(folder.glob(f"*{SUFFIX}"))


def test_changes_are_written_soon_and_taken_away_after_saving(qtbot: QtBot, folder: Path, tmp_path: Path) -> None:
    """An edit is on disk after the interval; saving removes it."""
    session = Session(small_job())
    recovery = Recovery(session, folder, every=20)
    session.apply(edits.set_title("Half done"))
    qtbot.waitUntil(lambda: len(files(folder)) == 1)
    session.save(tmp_path / "done.slabjob")
    assert files(folder) == []
    recovery.close()


def test_nothing_is_written_for_an_unmodified_job(qtbot: QtBot, folder: Path) -> None:
    """Undoing back to the saved job takes the file away."""
    session = Session(small_job())
    recovery = Recovery(session, folder, every=20)
    recovery.write()
    assert files(folder) == []
    session.apply(edits.set_title("Half done"))
    recovery.write()
    assert len(files(folder)) == 1
    session.undo()
    recovery.write()
    assert files(folder) == []
    recovery.close()


def test_a_living_session_is_not_offered_and_a_dead_one_is(qtbot: QtBot, folder: Path, tmp_path: Path) -> None:
    """Work is offered only when the lock of its session is gone; recovering it can be undone."""
    path = job_file(tmp_path)
    session = Session()
    session.open(path)
    recovery = Recovery(session, folder)
    session.apply(edits.set_title("Half done"))
    recovery.write()
    other = Session()
    finder = Recovery(other, folder)
    assert finder.leftovers() == ()
    recovery._lock.unlock()  # what the end of a process does
    (left,) = finder.leftovers()
    assert left.source == path
    assert "Half done" in left.sentence
    assert other.apply(left.edit()) == ()
    assert other.record == session.record
    assert other.undo_sentence == left.edit().sentence
    other.undo()
    assert not other.modified
    left.discard()
    assert finder.leftovers() == ()
    recovery.close()
    finder.close()


def test_a_damaged_file_is_passed_over(qtbot: QtBot, folder: Path) -> None:
    """Files that are no recovery files are not offered and do no harm."""
    folder.mkdir()
    (folder / f"a{SUFFIX}").write_text("{ half")
    (folder / f"b{SUFFIX}").write_text('{"job": {}, "title": "x", "source": null, "time": 0}')
    (folder / f"c{SUFFIX}").write_bytes(b"\xff\xfe")
    recovery = Recovery(Session(small_job()), folder)
    assert recovery.leftovers() == ()
    recovery.close()


def test_a_folder_that_cannot_be_written_costs_nothing_else(qtbot: QtBot, folder: Path) -> None:
    """When the file cannot be written, editing goes on."""
    session = Session(small_job())
    recovery = Recovery(session, folder)
    folder.rmdir()
    session.apply(edits.set_title("Half done"))
    recovery.write()
    assert session.record.title == "Half done"
    recovery.close()
