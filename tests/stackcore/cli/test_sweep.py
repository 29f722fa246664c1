"""``slabwright sweep``: tables, exit status, and one line a fault."""

import csv
import io
import os
import subprocess
import sys
from pathlib import Path

import pytest

from stackcore.export import sweep_csv
from tests.stackcore.cli.conftest import Run
from tests.stackcore.formats.files import FORMATS, SAVED


def test_the_table_is_written(run: Run, job_file: Path, tmp_path: Path) -> None:
    """A good job leaves its table, says nothing and ends with 0."""
    out = tmp_path / "cover.csv"
    assert run("sweep", job_file, "--csv", out) == (0, "", [])
    rows = list(csv.DictReader(io.StringIO(out.read_bytes().decode(), newline="")))
    assert len(rows) == 401 * 3 * 2
    assert float(rows[0]["reflectance"]) + float(rows[0]["transmittance"]) <= 1


def test_standard_output_is_the_same_table(run: Run, job_file: Path, tmp_path: Path) -> None:
    """A dash for the file writes the same bytes to standard output."""
    run("sweep", job_file, "--csv", tmp_path / "cover.csv")
    assert run("sweep", job_file, "--csv", "-") == (0, (tmp_path / "cover.csv").read_bytes().decode(), [])


def test_one_stack_can_be_chosen(run: Run) -> None:
    """Only the stack that is named is written."""
    names = [row[0] for row in csv.reader(io.StringIO(run("sweep", SAVED, "--csv", "-", "--stack", "coated").out))]
    assert set(names[1:]) == {"coated"}


def test_an_unknown_stack_is_told(run: Run) -> None:
    """A stack that the job does not have is told with the nearest name and all names."""
    outcome = run("sweep", SAVED, "--csv", "-", "--stack", "coatd")
    assert (outcome.status, outcome.out) == (2, "")
    told = "the job has no stack 'coatd', did you mean 'coated'?; allowed: one of 'bare', 'coated'"
    assert outcome.lines == [f"slabwright: --stack: {told}"]


def test_every_fault_of_the_file_is_a_line(run: Run, job_file: Path, tmp_path: Path) -> None:
    """Each fault is one line that begins with the program and the path in the file, and nothing is written."""
    text = job_file.read_text(encoding="utf-8").replace('"1.0 mm"', '"-1 mm"').replace('"45 deg"', '"95 deg"')
    job_file.write_text(text, encoding="utf-8")
    outcome = run("sweep", job_file, "--csv", tmp_path / "out.csv")
    assert outcome.status == 2
    thickness = "'-1 mm' is negative; allowed: 0 m to 1e6 m, for example '2 mm'"
    angle = "the angle '95 deg' is out of range; allowed: 0 deg or more and below 90 deg"
    assert outcome.lines == [
        f"slabwright: stacks[0].elements[0].thickness: {thickness}",
        f"slabwright: sweep.angle[2]: {angle}",
    ]
    assert not (tmp_path / "out.csv").exists()


def test_a_missing_file_is_told_with_the_nearest(run: Run, job_file: Path) -> None:
    """A file that is not there is one line, with the nearest job file of its folder."""
    outcome = run("sweep", job_file.with_name("covr.slabjob"), "--csv", "-")
    assert outcome.status == 2
    assert len(outcome.lines) == 1
    assert "covr.slabjob: there is no such file, did you mean 'cover.slabjob'?" in outcome.lines[0]


def test_a_folder_is_no_job(run: Run, tmp_path: Path) -> None:
    """A folder in place of the job is one line."""
    outcome = run("sweep", tmp_path, "--csv", "-")
    assert (outcome.status, len(outcome.lines)) == (2, 1)
    assert "cannot be read: Is a directory" in outcome.lines[0]


@pytest.mark.parametrize("place", ["no/out.csv", "."])
def test_an_output_that_cannot_be_written_is_told(run: Run, job_file: Path, tmp_path: Path, place: str) -> None:
    """A folder that does not exist, or an output that is a folder, is one line."""
    outcome = run("sweep", job_file, "--csv", tmp_path / place)
    assert (outcome.status, len(outcome.lines)) == (2, 1)
    assert "cannot be written" in outcome.lines[0]


def test_a_run_that_fails_leaves_the_old_table(
    run: Run, job_file: Path, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    """When the disk fills up half way the table of the last run stays, and one line says why."""
    out = tmp_path / "cover.csv"
    out.write_text("old")
    parts = iter(["stack\r\n"])

    def full(*_: object) -> str:
        try:
            return next(parts)
        except StopIteration:
            raise OSError(28, os.strerror(28)) from None

    monkeypatch.setattr(sweep_csv, "csv_rows", full)
    monkeypatch.setattr(sweep_csv, "_BLOCK", 30)
    outcome = run("sweep", job_file, "--csv", out)
    assert (outcome.status, len(outcome.lines)) == (2, 1)
    assert "No space left on device" in outcome.lines[0]
    assert out.read_text() == "old"
    assert sorted(path.name for path in tmp_path.iterdir()) == ["cover.csv", "cover.slabjob"]


def test_the_job_is_not_replaced_by_its_table(run: Run, job_file: Path) -> None:
    """The job named as the output is refused, also through a link, and stays."""
    before = job_file.read_bytes()
    link = job_file.with_name("link.csv")
    link.symlink_to(job_file)
    for out in (job_file, link):
        outcome = run("sweep", job_file, "--csv", out)
        assert (outcome.status, len(outcome.lines)) == (2, 1)
        assert "would take the place of the job" in outcome.lines[0]
    assert job_file.read_bytes() == before


@pytest.mark.parametrize(
    ("arguments", "words"),
    [
        ((), "required: JOB, --csv"),
        (("a.slabjob",), "required: --csv"),
        (("a.slabjob", "--csv"), "expected one argument"),
        (("a.slabjob", "--csv", "-", "--stak", "A"), "unrecognized arguments: --stak A"),
        (("a.slabjob", "--csv", "-", "more"), "unrecognized arguments: more"),
    ],
)
def test_wrong_arguments_are_one_line(run: Run, arguments: tuple[str, ...], words: str) -> None:
    """Arguments that are missing or unknown are one line, not a page of usage."""
    outcome = run("sweep", *arguments)
    assert (outcome.status, outcome.out, len(outcome.lines)) == (2, "", 1)
    assert words in outcome.lines[0]


def test_help_is_no_fault(run: Run) -> None:
    """Help goes to standard output and ends with 0."""
    outcome = run("sweep", "--help")
    assert (outcome.status, outcome.lines) == (0, [])
    assert "--stack NAME" in outcome.out


def test_a_line_stays_a_line(run: Run, tmp_path: Path) -> None:
    """A file name with line breaks and terminal codes cannot break the line or colour the terminal."""
    outcome = run("sweep", tmp_path / "a\nb\x1b[31m.slabjob", "--csv", "-")
    assert len(outcome.lines) == 1
    assert "a\\nb\\x1b[31m.slabjob" in outcome.lines[0]


def command(*arguments: object) -> list[str]:
    """Return the command line of a process of its own."""
    return [sys.executable, "-m", "stackcore", *map(str, arguments)]


def test_a_closed_pipe_is_one_line(job_file: Path) -> None:
    """When nobody reads standard output any more, one line says so; there is no traceback."""
    reader, writer = os.pipe()
    os.close(reader)
    process = subprocess.run(
        command("sweep", job_file, "--csv", "-"), stdout=writer, stderr=subprocess.PIPE, text=True, check=False
    )
    os.close(writer)
    assert process.returncode == 2
    assert process.stderr == "slabwright: standard output was closed before all rows were written\n"


@pytest.mark.skipif(not Path("/dev/full").exists(), reason="the device that is always full is of Linux")
def test_a_full_disk_behind_standard_output_is_one_line(job_file: Path) -> None:
    """When standard output cannot take the rows, one line says so."""
    with Path("/dev/full").open("wb") as full:
        process = subprocess.run(
            command("sweep", job_file, "--csv", "-"), stdout=full, stderr=subprocess.PIPE, text=True, check=False
        )
    assert process.returncode == 2
    assert process.stderr == "slabwright: standard output cannot be written: No space left on device\n"


def test_a_device_as_output_is_written_to(run: Run, job_file: Path) -> None:
    """The null device can be named as the output and is not replaced."""
    assert run("sweep", job_file, "--csv", os.devnull) == (0, "", [])
    assert Path(os.devnull).is_char_device()


BUILT_UP = FORMATS / "built-up-v1.slabjob"


def test_conditions_come_as_rows_of_their_own(run: Run) -> None:
    """Behind the stack itself stands the stack under each condition, with its name behind a comma."""
    outcome = run("sweep", BUILT_UP, "--csv", "-", "--condition", "Wet", "--condition", "Repaint")
    rows = list(csv.DictReader(io.StringIO(outcome.out, newline="")))
    assert list(dict.fromkeys(row["stack"] for row in rows)) == ["A", "A, Wet", "A, Repaint"]
    first = {row["stack"]: float(row["transmittance"]) for row in reversed(rows)}
    assert first["A, Wet"] < first["A"]


def test_without_a_condition_the_table_is_that_of_the_stacks(run: Run) -> None:
    """The table is the same for a job with and without conditions that nobody asks for."""
    names = [row[0] for row in csv.reader(io.StringIO(run("sweep", BUILT_UP, "--csv", "-").out))]
    assert set(names[1:]) == {"A"}


def test_unknown_conditions_and_quantities_are_told(run: Run) -> None:
    """Each with the nearest name and all there are."""
    outcome = run("sweep", BUILT_UP, "--csv", "-", "--condition", "wet", "--condition", "Repant")
    assert (outcome.status, outcome.out) == (2, "")
    assert "did you mean 'Wet'" in outcome.lines[0]
    assert "did you mean 'Repaint'" in outcome.lines[1]
    outcome = run("sweep", SAVED, "--csv", "-", "--condition", "Wet")
    assert "the job has no conditions" in outcome.lines[0]
    outcome = run("sweep", BUILT_UP, "--csv", "-", "--wide", "transmitance")
    assert (outcome.status, outcome.out) == (2, "")
    assert "did you mean 'transmittance'" in outcome.lines[0]


def test_a_wide_table_has_a_row_a_frequency(run: Run, tmp_path: Path) -> None:
    """One quantity; a column a stack, condition, angle and polarization; to a file as to standard output."""
    out = tmp_path / "wide.csv"
    arguments = ("sweep", BUILT_UP, "--wide", "transmittance", "--condition", "Wet", "--csv")
    assert run(*arguments, out) == (0, "", [])
    header, *rows = list(csv.reader(io.StringIO(out.read_bytes().decode(), newline="")))
    assert len(rows) == 2
    assert header[:2] == ["frequency_Hz", "A TE 0 deg transmittance"]
    assert "A, Wet TM 40 deg transmittance" in header
    assert run(*arguments, "-").out == out.read_bytes().decode()
