"""CSV export beside the work: complete or not at all, and given up when asked."""

import threading
from collections.abc import Generator
from pathlib import Path

import pytest
from pytestqt.qtbot import QtBot

from app.window.exporting import Exporter, ProgressLine, Steps, csv_steps
from stackcore.errors import Severity
from stackcore.export import CSV_HEADER
from stackcore.job import Job
from stackcore.job.replacing import replacing
from tests.app.window.scripted import ScriptedDialogs, small_job


class Bench:
    """An exporter, what it told, and the file it is to write."""

    def __init__(self, folder: Path, steps: Steps = csv_steps) -> None:
        self.told: list[tuple[str, Severity]] = []
        self.target = folder / "table.csv"
        self.dialogs = ScriptedDialogs(csv_paths=[self.target])
        self.exporter = Exporter(
            small_job,
            lambda suffix: folder / f"cover{suffix}",
            self.dialogs,
            lambda text, severity: self.told.append((text, severity)),
            steps,
        )


class Slow:
    """Steps that wait to be told to go on."""

    def __init__(self) -> None:
        self.go_on = threading.Event()
        self.begun = threading.Event()

    def __call__(self, job: Job, path: Path) -> Generator[float, None, None]:
        with replacing(path) as file:
            for number in range(1000):
                file.write(b"row\n")
                self.begun.set()
                self.go_on.wait(5)
                yield number / 1000


def test_the_table_is_written_and_told(qtbot: QtBot, tmp_path: Path) -> None:
    """Every stack, frequency, angle and polarization is a row of the file that was picked."""
    bench = Bench(tmp_path)
    bench.exporter.export()
    qtbot.waitUntil(bench.exporter.idle)
    assert bench.dialogs.asked == ["Export CSV cover.csv"]
    assert bench.told == [("Exported table.csv.", "note")]
    lines = bench.target.read_bytes().decode("utf-8").split("\r\n")
    assert lines[0] == ",".join(CSV_HEADER)
    assert len(lines) == 1 + 3 * 41 * 2 * 2 + 1
    bench.exporter.close()


def test_cancel_leaves_the_old_file(qtbot: QtBot, tmp_path: Path) -> None:
    """Giving up leaves the file of before as it was and nothing beside it."""
    slow = Slow()
    bench = Bench(tmp_path, slow)
    bench.target.write_text("old")
    bench.exporter.export()
    slow.begun.wait(5)
    bench.exporter.cancel()
    slow.go_on.set()
    qtbot.waitUntil(bench.exporter.idle)
    assert bench.target.read_text() == "old"
    assert [path.name for path in tmp_path.glob("*table*")] == ["table.csv"]
    assert bench.told == [("Export of table.csv given up; no file was left.", "note")]
    bench.exporter.close()


def test_only_one_export_runs_at_a_time(qtbot: QtBot, tmp_path: Path) -> None:
    """A second export while one runs is refused in words."""
    slow = Slow()
    bench = Bench(tmp_path, slow)
    bench.exporter.start(bench.target)
    bench.exporter.start(tmp_path / "other.csv")
    assert bench.told[-1][1] == "warning"
    bench.exporter.cancel()
    slow.go_on.set()
    qtbot.waitUntil(bench.exporter.idle)
    bench.exporter.close()


def test_a_folder_that_cannot_be_written_is_told(qtbot: QtBot, tmp_path: Path) -> None:
    """The reason of the system is in the message, and a new export can begin."""
    bench = Bench(tmp_path)
    bench.exporter.start(tmp_path / "no" / "folder.csv")
    qtbot.waitUntil(bench.exporter.idle)
    ((text, severity),) = bench.told
    assert severity == "error"
    assert "folder.csv could not be written: No such file or directory" in text
    bench.exporter.close()


@pytest.mark.parametrize("error", [RuntimeError("odd"), MemoryError()])
def test_whatever_goes_wrong_gives_control_back(qtbot: QtBot, tmp_path: Path, error: Exception) -> None:
    """An error nobody foresaw is told, and the exporter is idle again."""

    def steps(job: Job, path: Path) -> Generator[float, None, None]:
        yield 0.5
        raise error

    bench = Bench(tmp_path, steps)
    bench.exporter.start(bench.target)
    qtbot.waitUntil(bench.exporter.idle)
    assert bench.told[0][1] == "error"
    assert type(error).__name__ in bench.told[0][0]
    bench.exporter.close()


def test_closing_ends_the_thread_and_leaves_no_file(qtbot: QtBot, tmp_path: Path) -> None:
    """Close waits for the thread; nothing is told afterwards."""
    slow = Slow()
    slow.go_on.set()
    bench = Bench(tmp_path, slow)
    bench.exporter.start(bench.target)
    bench.exporter.close()
    assert not any(thread.name == "CSV export" for thread in threading.enumerate())
    assert list(tmp_path.glob("*.part")) == []


def test_progress_appears_only_when_it_takes_long(qtbot: QtBot, tmp_path: Path) -> None:
    """The bar comes after its patience has ended, follows the share, cancels, and goes."""
    slow = Slow()
    bench = Bench(tmp_path, slow)
    line = ProgressLine(bench.exporter, patience=30)
    qtbot.addWidget(line)
    bench.exporter.start(bench.target)
    assert line.isHidden()
    qtbot.waitUntil(lambda: not line.isHidden())
    slow.go_on.set()
    qtbot.waitUntil(lambda: line.share() > 0 or bench.exporter.idle())
    line.cancel.click()
    qtbot.waitUntil(bench.exporter.idle)
    assert line.isHidden()
    bench.exporter.close()
