"""Nothing here loses a job: opening, saving and leaving, with scripted answers."""

import os
from pathlib import Path

import pytest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.look.settings import open_settings
from app.window.files import Files
from app.window.messages import Messages
from app.window.recent import RecentFiles
from app.window.samples import samples
from stackcore.job import read_job
from tests.app.window.scripted import JOB, ScriptedDialogs, job_file, small_job


class Desk:
    """A session with files, scripted dialogs and messages."""

    def __init__(self) -> None:
        self.session = Session(small_job())
        self.dialogs = ScriptedDialogs()
        self.messages = Messages()
        self.recent = RecentFiles(open_settings())
        self.files = Files(self.session, self.dialogs, self.messages, self.recent)

    def modified(self) -> bool:
        return self.session.modified

    def edit(self, title: str = "Changed") -> None:
        assert self.session.apply(edits.set_title(title)) == ()


@pytest.fixture
def desk(qtbot: QtBot) -> Desk:
    """A desk with a small job that has no file."""
    return Desk()


def test_open_reads_the_file_and_remembers_it(desk: Desk, tmp_path: Path) -> None:
    """The picked file becomes the job, unmodified, and the newest recent file."""
    path = job_file(tmp_path)
    desk.dialogs.open_paths = [path]
    desk.files.open()
    assert desk.session.path == path
    assert not desk.modified()
    assert desk.recent.paths() == (path,)


def test_a_file_with_faults_leaves_the_job_and_lists_every_fault(desk: Desk, tmp_path: Path) -> None:
    """Each fault is shown with its place; the job before stays, also when nothing of the file is readable."""
    path = tmp_path / "bad.slabjob"
    path.write_text(JOB.replace('"1.0 mm"', '"1.0 GHz"').replace('"points": 41', '"points": 0'))
    before = desk.session.record
    desk.files.open_path(path)
    message = desk.messages.shown
    assert message is not None
    assert message.severity == "error"
    assert "3 faults" in message.text
    assert any(line.startswith("stacks[0].elements[0].thickness") for line in message.details)
    assert any(line.startswith("sweep.frequency.points") for line in message.details)
    assert desk.session.record == before
    path.write_bytes(b"\xff\xfe\x00garbage")
    desk.files.open_path(path)
    assert desk.session.record == before
    desk.files.open_path(tmp_path / "not-there.slabjob")
    assert desk.messages.shown is not None
    assert "not-there.slabjob cannot be opened" in desk.messages.shown.text


def test_the_message_about_a_bad_file_offers_to_open_it_again(desk: Desk, tmp_path: Path) -> None:
    """Once the file is mended, the button of the message opens it."""
    path = tmp_path / "bad.slabjob"
    path.write_text("{}")
    desk.files.open_path(path)
    path.write_text(JOB, encoding="utf-8")
    assert desk.messages.shown is not None
    desk.messages.shown.choices[0].act()
    assert desk.session.path == path


def test_save_asks_for_a_file_only_when_there_is_none(desk: Desk, tmp_path: Path) -> None:
    """The first save picks a file, gets the suffix if it has none; the second writes to the same."""
    desk.dialogs.save_paths = [tmp_path / "first"]
    desk.edit("One")
    desk.files.save()
    desk.edit("Two")
    desk.files.save()
    assert desk.dialogs.asked == ["save as One.slabjob"]
    assert read_job(tmp_path / "first.slabjob").title == "Two"
    assert not desk.modified()


def test_a_save_that_fails_says_so_and_keeps_the_changes(desk: Desk, tmp_path: Path) -> None:
    """When the folder is not there, the job stays modified, the message offers another place."""
    desk.dialogs.save_paths = [tmp_path / "no" / "such" / "folder.slabjob", tmp_path / "good.slabjob"]
    desk.edit()
    desk.files.save()
    assert desk.modified()
    message = desk.messages.shown
    assert message is not None
    assert message.severity == "error"
    message.choices[0].act()
    assert not desk.modified()
    assert (tmp_path / "good.slabjob").exists()


def test_nothing_is_asked_when_nothing_is_unsaved(desk: Desk) -> None:
    """New on an unmodified job begins at once."""
    desk.files.new()
    assert desk.dialogs.asked == []
    assert desk.session.record.title == ""


def test_cancel_keeps_everything(desk: Desk) -> None:
    """Cancel at the question about unsaved changes leaves the job as it is."""
    desk.edit()
    desk.dialogs.save = ["cancel"]
    desk.files.new()
    assert desk.session.record.title == "Changed"
    assert desk.modified()


def test_discard_goes_on_without_saving(desk: Desk) -> None:
    """Discard gives the changes up."""
    desk.edit()
    desk.dialogs.save = ["discard"]
    desk.files.new()
    assert desk.session.record.title == ""


def test_save_and_go_on_saves_first(desk: Desk, tmp_path: Path) -> None:
    """Save at the question writes the file, then goes on."""
    desk.edit()
    desk.dialogs.save = ["save"]
    desk.dialogs.save_paths = [tmp_path / "kept.slabjob"]
    desk.files.new()
    assert read_job(tmp_path / "kept.slabjob").title == "Changed"
    assert desk.session.record.title == ""


def test_save_and_go_on_stops_when_no_file_is_picked(desk: Desk) -> None:
    """Cancelling the file dialog behind Save loses nothing."""
    desk.edit()
    desk.dialogs.save = ["save"]
    desk.files.new()
    assert desk.session.record.title == "Changed"


def test_a_file_changed_by_others_is_not_overwritten_unasked(desk: Desk, tmp_path: Path) -> None:
    """When the file on disk is another one than was read, saving asks; cancel leaves it, overwrite writes."""
    path = job_file(tmp_path)
    desk.files.open_path(path)
    desk.edit("Mine")
    path.write_text(JOB.replace("Harbour cover", "Theirs, longer"), encoding="utf-8")
    os.utime(path, ns=(1, 1))
    desk.files.save()
    assert desk.dialogs.asked == ["overwrite cover.slabjob"]
    assert read_job(path).title == "Theirs, longer"
    desk.dialogs.overwrite = ["save as"]
    desk.dialogs.save_paths = [tmp_path / "other.slabjob"]
    desk.files.save()
    assert read_job(tmp_path / "other.slabjob").title == "Mine"
    assert read_job(path).title == "Theirs, longer"


def test_a_sample_opens_as_a_job_without_a_file(desk: Desk) -> None:
    """A sample is a copy: it has no file, and saving asks where."""
    sample = samples()[0]
    before = sample.path.read_bytes()
    desk.files.open_sample(sample)
    assert desk.session.path is None
    assert desk.session.record.title == sample.title
    assert not desk.modified()
    desk.files.save()
    assert desk.dialogs.asked[-1].startswith("save as")
    assert sample.path.read_bytes() == before


def test_saving_tells_of_texts_that_are_no_values(desk: Desk, tmp_path: Path) -> None:
    """A text typed that is no value is not in the file, and the message names its place."""
    from app.document.document import Cell

    desk.session.apply(edits.type_into(Cell(0, 0, "thickness"), "two millimetres"))
    desk.dialogs.save_paths = [tmp_path / "x.slabjob"]
    desk.files.save()
    assert desk.messages.shown is not None
    assert desk.messages.shown.details == ("thickness of layer 1 in stack A: 'two millimetres'",)


def test_every_sample_opens(desk: Desk) -> None:
    """Each sample job is a job without faults and has a title."""
    found = samples()
    assert len(found) >= 5
    for sample in found:
        desk.files.open_sample(sample)
        assert desk.session.record.title == sample.title != ""
