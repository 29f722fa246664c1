"""Changes of the job's file by others."""

from collections.abc import Iterator
from pathlib import Path

import pytest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.window.messages import Messages
from app.window.watching import DiskWatch
from tests.app.window.scripted import JOB, job_file


class Desk:
    """A session on a file, watched."""

    def __init__(self, path: Path) -> None:
        self.path = path
        self.session = Session()
        self.session.open(path)
        self.messages = Messages()
        self.watch = DiskWatch(self.session, self.messages)

    def write(self, text: str) -> None:
        """Write the file as an editor does that replaces it."""
        other = self.path.with_suffix(".new")
        other.write_text(text)
        other.replace(self.path)

    def told(self) -> str:
        """Return what is told now."""
        return self.messages.shown.text if self.messages.shown is not None else ""

    def choose(self, words: str) -> None:
        """Choose one of the answers offered."""
        shown = self.messages.shown
        assert shown is not None
        next(choice for choice in shown.choices if choice.words == words).act()


@pytest.fixture
def desk(qtbot: QtBot, tmp_path: Path) -> Iterator[Desk]:
    """A desk with a small job."""
    made = Desk(job_file(tmp_path))
    yield made
    made.watch.close()
    made.watch.deleteLater()


def test_a_file_replaced_on_disk_is_noticed_and_can_be_read(desk: Desk, qtbot: QtBot) -> None:
    """The words name the file; reading it again brings the new job, counts as saved, and can be undone."""
    before = desk.session.document
    desk.write(JOB.replace("Harbour cover", "Harbour cover, rev. B"))
    qtbot.waitUntil(lambda: "was changed by another program" in desk.told())
    desk.choose("Read it again")
    assert desk.session.record.title == "Harbour cover, rev. B"
    assert not desk.session.modified
    assert desk.told() == ""
    desk.session.undo()
    assert desk.session.document == before
    assert desk.session.modified


def test_own_changes_are_not_lost_by_reading(desk: Desk, qtbot: QtBot) -> None:
    """The message says that Undo brings them back, and it does."""
    desk.session.apply(edits.set_title("Mine"))
    desk.write(JOB.replace("Harbour cover", "Theirs"))
    qtbot.waitUntil(lambda: "Undo" in desk.told())
    desk.choose("Read it again")
    assert desk.session.record.title == "Theirs"
    desk.session.undo()
    assert desk.session.record.title == "Mine"


def test_the_same_job_written_anew_is_no_news(desk: Desk) -> None:
    """A file that was touched or reformatted holds the same job."""
    desk.write(JOB + "\n")
    desk.watch.look()
    assert desk.told() == ""


def test_own_saving_is_no_news(desk: Desk) -> None:
    """What the window writes itself is not told."""
    desk.session.apply(edits.set_title("Mine"))
    desk.session.save()
    desk.watch.look()
    assert desk.told() == ""


def test_a_file_with_faults_is_told_with_them_and_not_taken(desk: Desk) -> None:
    """The job stays; the faults are the details."""
    before = desk.session.document
    desk.write(JOB.replace('"1.0 mm"', '"1.0 GHz"'))
    desk.watch.look()
    desk.choose("Read it again")
    assert "faults" in desk.told()
    assert desk.messages.shown is not None
    assert any("thickness" in line for line in desk.messages.shown.details)
    assert desk.session.document is before


def test_a_file_that_vanished_is_told(desk: Desk) -> None:
    """The way out is to save; when the file comes back the words go away."""
    text = desk.path.read_text()
    desk.path.unlink()
    desk.watch.look()
    assert "no longer on the disk" in desk.told()
    desk.write(text)
    desk.watch.look()
    assert desk.told() == ""


def test_keeping_is_an_answer(desk: Desk) -> None:
    """Nothing changes, and the same state of the file is not told again."""
    before = desk.session.document
    desk.write(JOB.replace("Harbour cover", "Theirs"))
    desk.watch.look()
    desk.choose("Keep this one")
    desk.messages.dismiss()
    desk.watch.look()
    assert desk.told() == ""
    assert desk.session.document is before
