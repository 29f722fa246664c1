"""``slabwright``: help, version, and who gets which command line."""

import importlib.metadata
import os
import subprocess
import sys
from collections.abc import Callable, Sequence
from pathlib import Path
from typing import NoReturn

import pytest

from stackcore.cli import main, window
from stackcore.errors import StackError
from tests.stackcore.cli.conftest import Run


class Entry:
    """An entry point as the metadata of a distribution would have it."""

    def __init__(self, load: Callable[[], Callable[[Sequence[str]], int | None]], name: str = "main") -> None:
        self.load, self.name = load, name


@pytest.fixture
def install(monkeypatch: pytest.MonkeyPatch) -> Callable[..., None]:
    """Pretend that these entry points, and no others, are installed for the window."""

    def install(*entries: Entry) -> None:
        def entry_points(*, group: str) -> list[Entry]:
            assert group == "slabwright.window"
            return list(entries)

        monkeypatch.setattr(window, "entry_points", entry_points)

    return install


def test_help_names_every_command(run: Run) -> None:
    """Help tells all commands and the meaning of the exit status."""
    outcome = run("--help")
    assert (outcome.status, outcome.lines) == (0, [])
    for word in (
        "sweep JOB --csv OUT [--stack NAME]",
        "materials [WORD ...] [--at F,F] [--csv OUT] [--check FILE]",
        "picture JOB --png OUT [--size WxH]",
        "[JOB]",
        "exit status",
    ):
        assert word in outcome.out
    assert run("-h") == outcome


def test_version_is_that_of_the_distribution(run: Run, monkeypatch: pytest.MonkeyPatch) -> None:
    """The version is the one installed; a checkout that is not installed says so."""
    monkeypatch.setattr(importlib.metadata, "version", lambda name: f"7.8.9 of {name}")
    assert run("--version") == (0, "slabwright 7.8.9 of slabwright\n", [])

    def missing(name: str) -> NoReturn:
        raise importlib.metadata.PackageNotFoundError(name)

    monkeypatch.setattr(importlib.metadata, "version", missing)
    assert run("--version") == (0, "slabwright (from a checkout that is not installed)\n", [])


@pytest.mark.parametrize(
    "arguments", [(), ("cover.slabjob",), ("some/folder/cover",), ("picture", "a.slabjob", "--png", "a.png")]
)
def test_what_is_not_ours_goes_to_the_window(
    run: Run, install: Callable[..., None], arguments: tuple[str, ...]
) -> None:
    """No command, a job file, or a command of the window: the window gets all arguments and gives the status."""
    given: list[list[str]] = []

    def open_window(words: Sequence[str]) -> int:
        given.append(list(words))
        return 1

    install(Entry(lambda: open_window), Entry(lambda: pytest.fail("another entry was loaded"), "other"))
    assert run(*arguments) == (1, "", [])
    assert given == [list(arguments)]


def test_a_window_that_returns_nothing_is_done(run: Run, install: Callable[..., None]) -> None:
    """A window that ends without a status has ended well."""
    install(Entry(lambda: lambda words: None))
    assert run().status == 0


def test_our_commands_do_not_wake_the_window(run: Run, install: Callable[..., None], job_file: Path) -> None:
    """A sweep runs where the window could not even be loaded."""
    install(Entry(lambda: pytest.fail("the window was loaded")))
    assert run("sweep", job_file, "--csv", "-").status == 0


def test_a_mistyped_command_is_told(run: Run, install: Callable[..., None]) -> None:
    """A word that is neither a command nor a file is told with the nearest command."""
    install()
    outcome = run("swep", "cover.slabjob")
    assert outcome.status == 2
    told = "there is no command and no file 'swep', did you mean 'sweep'?"
    allowed = "allowed: sweep, vary, materials, picture, or a job file"
    assert outcome.lines == [f"slabwright: {told}; {allowed}"]


def test_a_window_that_is_not_installed_is_one_line(run: Run, install: Callable[..., None]) -> None:
    """Without the package of the window one line says what to install."""
    install()
    outcome = run("cover.slabjob")
    assert (outcome.status, len(outcome.lines)) == (2, 1)
    assert "pip install 'slabwright[gui]'" in outcome.lines[0]


@pytest.mark.parametrize(
    ("error", "words"),
    [
        (ModuleNotFoundError("No module named 'PySide6'", name="PySide6"), "pip install 'slabwright[gui]'"),
        (ModuleNotFoundError("No module named 'pyqtgraph'", name="pyqtgraph"), "pip install 'slabwright[gui]'"),
        (ImportError("libEGL.so.1: cannot open shared object file"), "libEGL.so.1"),
        (ImportError("DLL load failed", name="PySide6.QtGui"), "DLL load failed"),
    ],
)
def test_a_missing_toolkit_is_one_line(
    run: Run, install: Callable[..., None], error: ImportError, words: str
) -> None:
    """Where the toolkit or a library under it is missing, one line names it, before or while the window starts."""

    def fail(*_: object) -> NoReturn:
        raise error

    for entry in (Entry(fail), Entry(lambda: fail)):
        install(entry)
        outcome = run()
        assert (outcome.status, len(outcome.lines)) == (2, 1)
        assert words in outcome.lines[0]


def test_a_fault_of_the_window_itself_is_not_hidden(install: Callable[..., None]) -> None:
    """A module that our own code fails to import is a defect and is shown as one."""

    def fail() -> NoReturn:
        raise ModuleNotFoundError("No module named 'app.panels.gone'", name="app.panels.gone")

    install(Entry(fail))
    with pytest.raises(ModuleNotFoundError):
        main([])


def test_errors_of_the_core_and_of_the_user_have_no_traceback(run: Run, install: Callable[..., None]) -> None:
    """An error that the core raises on purpose is a line; Ctrl+C ends quietly with the status shells expect."""

    def refuse(_: object) -> NoReturn:
        raise StackError("the front half-space must be lossless")

    def interrupt(_: object) -> NoReturn:
        raise KeyboardInterrupt

    install(Entry(lambda: refuse))
    assert run() == (2, "", ["slabwright: the front half-space must be lossless"])
    install(Entry(lambda: interrupt))
    assert run() == (130, "", [])


def test_module_runs_as_the_command(job_file: Path) -> None:
    """python -m stackcore is the command; it needs neither the toolkit nor the slow parts of SciPy."""
    code = (
        "import sys, runpy; sys.argv = ['slabwright', 'sweep', sys.argv[1], '--csv', '-']\n"
        "try: runpy.run_module('stackcore', run_name='__main__')\n"
        "except SystemExit as end: status = end.code\n"
        "heavy = {'PySide6', 'pyqtgraph', 'scipy.optimize', 'scipy.interpolate', 'app'} & set(sys.modules)\n"
        "sys.stderr.write(f'{status} {sorted(heavy)}')\n"
    )
    process = subprocess.run(
        [sys.executable, "-c", code, str(job_file)], capture_output=True, text=True, check=False
    )
    assert process.stderr == "0 []"
    assert process.stdout.startswith("stack,frequency_Hz,")


def test_help_into_a_closed_pipe_is_one_line() -> None:
    """Help that nobody reads any more ends in one line as well, also while the process ends."""
    reader, writer = os.pipe()
    os.close(reader)
    command = [sys.executable, "-m", "stackcore", "--help"]
    process = subprocess.run(command, stdout=writer, stderr=subprocess.PIPE, text=True, check=False)
    os.close(writer)
    assert process.returncode == 2
    assert process.stderr == "slabwright: standard output was closed before everything was written\n"


def test_help_does_not_read_jobs() -> None:
    """Help is there without the reading of jobs and the writing of tables being loaded by the command itself."""
    code = (
        "import sys; from stackcore import cli; cli.main(['--help']); sys.exit('stackcore.export' in sys.modules)"
    )
    process = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=False)
    assert (process.returncode, process.stderr) == (0, "")
