"""Replacing a file: the old content or the new, never a part, whatever goes wrong."""

import os
import random
import stat
import subprocess
import sys
import time
from pathlib import Path

import pytest

from stackcore.errors import JobError
from stackcore.job import Job, read_job, store, write_job
from stackcore.job.replacing import replacing
from tests.stackcore.formats.files import HAND_WRITTEN


@pytest.fixture
def job() -> Job:
    """The stored example."""
    return read_job(HAND_WRITTEN)


@pytest.fixture
def target(tmp_path: Path) -> Path:
    """A file with old content in a folder of its own."""
    folder = tmp_path / "jobs"
    folder.mkdir()
    path = folder / "cover.slabjob"
    path.write_text("old")
    return path


def only(path: Path) -> bool:
    """Return whether `path` is alone in its folder: nothing half written lies about."""
    return [other.name for other in path.parent.iterdir()] == [path.name]


def test_new_content_takes_the_place_of_the_old(target: Path, job: Job) -> None:
    """After a save the file holds the new job and nothing else is left in the folder."""
    write_job(job, target)
    assert read_job(target).stacks == job.stacks
    assert only(target)


def test_a_new_file_gets_the_mode_of_any_new_file(target: Path, job: Job) -> None:
    """A file that was not there has the mode that the user's mask gives, not that of a secret temporary file."""
    write_job(job, target.with_name("new.slabjob"))
    plain = target.with_name("plain")
    plain.touch()
    assert target.with_name("new.slabjob").stat().st_mode == plain.stat().st_mode


def test_the_mode_is_kept(target: Path, job: Job) -> None:
    """A file that a group may write stays so."""
    target.chmod(0o664)
    write_job(job, target)
    assert stat.S_IMODE(target.stat().st_mode) == 0o664


def test_a_link_stays_a_link(target: Path, job: Job) -> None:
    """Saving through a symbolic link replaces the file it points to."""
    link = target.parent.parent / "link.slabjob"
    link.symlink_to(target)
    write_job(job, link)
    assert link.is_symlink()
    assert read_job(target).title == job.title


def test_a_link_to_nothing_makes_the_file(target: Path, job: Job) -> None:
    """Saving through a link whose file is gone makes that file."""
    link = target.parent.parent / "link.slabjob"
    link.symlink_to(target.with_name("gone.slabjob"))
    write_job(job, link)
    assert link.is_symlink()
    assert target.with_name("gone.slabjob").exists()


def test_an_error_half_way_leaves_the_old_file(target: Path) -> None:
    """When writing fails after half the content, the old file is whole and no part is left."""

    def write_half() -> None:
        with replacing(target) as file:
            file.write(b"half of the new")
            file.flush()
            raise OSError("the disk is full")

    with pytest.raises(OSError, match="full"):
        write_half()
    assert target.read_text() == "old"
    assert only(target)


@pytest.mark.parametrize("call", ["fsync", "replace"])
def test_a_failing_disk_leaves_the_old_file(
    target: Path, job: Job, call: str, monkeypatch: pytest.MonkeyPatch
) -> None:
    """When the disk refuses to store or to rename, the old file is whole and no part is left."""

    def refuse(*_: object) -> None:
        raise OSError("input/output error")

    monkeypatch.setattr(os, call, refuse)
    with pytest.raises(OSError, match="input/output"):
        write_job(job, target)
    assert target.read_text() == "old"
    assert only(target)


def test_content_is_on_the_disk_before_the_name(target: Path, job: Job, monkeypatch: pytest.MonkeyPatch) -> None:
    """The file is synced before it is renamed and the folder after, so that a power cut finds old or new."""
    calls: list[str] = []
    sync, replace = os.fsync, os.replace

    def noted_sync(handle: int) -> None:
        calls.append("folder" if stat.S_ISDIR(os.fstat(handle).st_mode) else "file")
        sync(handle)

    def noted_replace(source: str, destination: str) -> None:
        calls.append("rename")
        replace(source, destination)

    monkeypatch.setattr(os, "fsync", noted_sync)
    monkeypatch.setattr(os, "replace", noted_replace)
    write_job(job, target)
    assert calls == ["file", "rename", "folder"]


def test_a_file_that_is_protected_is_not_replaced(target: Path, job: Job, monkeypatch: pytest.MonkeyPatch) -> None:
    """A file that may not be written is not replaced behind its owner's back."""
    monkeypatch.setattr(os, "access", lambda path, mode: mode != os.W_OK)
    with pytest.raises(PermissionError):
        write_job(job, target)
    assert target.read_text() == "old"


def test_a_folder_is_not_replaced(target: Path, job: Job) -> None:
    """A folder in the place of the file is refused."""
    with pytest.raises(IsADirectoryError):
        write_job(job, target.parent)
    assert only(target)


def test_a_missing_folder_is_told(target: Path, job: Job) -> None:
    """A file in a folder that does not exist cannot be written."""
    with pytest.raises(FileNotFoundError):
        write_job(job, target.parent / "no" / "cover.slabjob")


def test_a_device_is_written_to_and_stays() -> None:
    """What is no plain file is written to; the null device is still one afterwards."""
    with replacing(os.devnull) as file:
        file.write(b"nothing")
    assert stat.S_ISCHR(os.stat(os.devnull).st_mode)


def test_a_long_name_has_room_for_the_part(target: Path, job: Job) -> None:
    """A name as long as the file system allows can be saved to."""
    path = target.with_name("x" * 247 + ".slabjob")
    write_job(job, path)
    assert read_job(path).title == job.title


def test_a_job_that_cannot_be_written_as_text_leaves_the_old_file(
    target: Path, job: Job, monkeypatch: pytest.MonkeyPatch
) -> None:
    """The text is made before the file is touched."""

    def fail(_: object) -> str:
        raise JobError([])

    monkeypatch.setattr(store, "job_to_json", fail)
    with pytest.raises(JobError):
        write_job(job, target)
    assert target.read_text() == "old"


SAVER = """
import sys
from pathlib import Path
from stackcore.job.replacing import replacing
target = Path(sys.argv[1])
print("ready", flush=True)
for turn in range(200):
    with replacing(target) as file:
        for _ in range(64):
            file.write(b"%03d" % turn * 1000)
"""


@pytest.mark.slow
def test_a_killed_program_leaves_a_whole_file(target: Path) -> None:
    """Killed at any moment of 200 saves, a program leaves one of the contents, whole."""
    chance = random.Random(20260101)
    target.write_bytes(b"000" * 64_000)
    found = set()
    for _ in range(12):
        command = [sys.executable, "-c", SAVER, str(target)]
        with subprocess.Popen(command, stdout=subprocess.PIPE) as saver:
            assert saver.stdout is not None
            saver.stdout.readline()
            time.sleep(chance.uniform(0.0, 0.25))
            saver.kill()
        content = target.read_bytes()
        assert len(content) == 3 * 64_000
        assert content == content[:3] * 64_000
        found.add(content[:3])
    assert len(found) > 1  # it was killed in the midst of different saves
