"""The scripts that set up and start, in a checkout of nothing else, with an interpreter that only takes notes."""

import os
import subprocess
from pathlib import Path

import pytest

ROOT = Path(__file__).parents[2]

INTERPRETER = """#!/bin/sh
printf '%s\\n' "$*" >>"{notes}"
case "$*" in
    -V) echo "Python 3.11.0" ;;
    *app.window.display*) echo "no screen in this test"; exit {display} ;;
esac
"""
LIBRARIES = """#!/bin/sh
grep -o 'lib[A-Za-z0-9.-]*[.]so[.][0-9]*' "{scripts}/setup.sh" | sed 's/$/ (for the test)/'
"""


class Checkout:
    """A folder with the scripts, a stand-in for its interpreter, and what that was asked to do."""

    def __init__(self, folder: Path, *, display: bool) -> None:
        self.folder = folder / "a check out"
        self.here = folder / "some where"
        self.notes = folder / "notes.txt"
        for made in (self.folder / "app", self.folder / ".venv" / "bin", self.here, folder / "bin"):
            made.mkdir(parents=True)
        for name in ("run.sh", "setup.sh"):
            (self.folder / "app" / name).write_bytes((ROOT / "app" / name).read_bytes())
        (self.folder / "pyproject.toml").write_text("one", encoding="utf-8")
        (self.folder / ".constraints.txt").write_text("two", encoding="utf-8")
        python = self.folder / ".venv" / "bin" / "python"
        _program(python, INTERPRETER.format(notes=self.notes, display=0 if display else 1))
        _program(folder / "bin" / "ldconfig", LIBRARIES.format(scripts=self.folder / "app"))
        self._path = f"{folder / 'bin'}{os.pathsep}{os.environ['PATH']}"

    def run(self, *arguments: str) -> subprocess.CompletedProcess[str]:
        """Run ``app/run.sh`` from another folder."""
        return self._sh([str(self.folder / "app" / "run.sh"), *arguments])

    def set_up(self, *arguments: str) -> None:
        """Set up as the scripts do."""
        code = 'root=$1; shift; . "$root/app/setup.sh"; set_up "$@"'
        done = self._sh(["-euc", code, "sh", str(self.folder), *arguments])
        assert done.returncode == 0, done.stderr

    def asked(self) -> list[str]:
        """Return the command lines of the interpreter so far, and forget them."""
        lines = self.notes.read_text(encoding="utf-8").splitlines() if self.notes.exists() else []
        self.notes.unlink(missing_ok=True)
        return lines

    def installed(self) -> int:
        """Return how often the packages of the checkout were installed, and forget the command lines."""
        return sum("-m pip install" in line and " -e " in line for line in self.asked())

    def _sh(self, arguments: list[str]) -> subprocess.CompletedProcess[str]:
        return subprocess.run(
            ["sh", *arguments],
            cwd=self.here,
            env={**os.environ, "PATH": self._path},
            capture_output=True,
            text=True,
            timeout=60,
            check=False,
        )


def _program(path: Path, text: str) -> None:
    path.write_text(text, encoding="utf-8")
    path.chmod(0o755)


@pytest.fixture
def checkout(tmp_path: Path) -> Checkout:
    """A checkout on a machine without a display."""
    return Checkout(tmp_path, display=False)


def test_what_is_set_up_is_not_set_up_again(checkout: Checkout) -> None:
    """The first run installs, the second does not, a changed list of packages does once more."""
    checkout.set_up("gui")
    assert checkout.installed() == 1
    checkout.set_up("gui")
    assert checkout.installed() == 0
    (checkout.folder / "pyproject.toml").write_text("another", encoding="utf-8")
    checkout.set_up("gui")
    assert checkout.installed() == 1


def test_tests_and_window_do_not_set_up_in_turns(checkout: Checkout) -> None:
    """The packages of the tests come on top of those of the window, and hold them from then on."""
    checkout.set_up("gui")
    checkout.set_up("gui", "test")
    assert checkout.installed() == 2
    for arguments in (["gui"], ["gui", "test"], ["gui"]):
        checkout.set_up(*arguments)
    assert checkout.installed() == 0


def test_python_runs_isolated(checkout: Checkout) -> None:
    """Neither PYTHONPATH nor the current folder can give another project's modules to any of it."""
    assert checkout.run().returncode == 0
    assert [line for line in checkout.asked() if not line.startswith(("-I ", "-V"))] == []


def test_without_a_display_table_and_picture_are_written_here(checkout: Checkout) -> None:
    """The sample's table and picture go to the current folder, and both are named, with the reason."""
    done = checkout.run()
    assert done.returncode == 0, done.stderr
    sweep, picture = (line for line in checkout.asked() if " sweep " in line or " picture " in line)
    assert sweep.endswith(f"weather-radar-cover.slabjob --csv {checkout.here}/weather-radar-cover.csv")
    assert picture.endswith(f"weather-radar-cover.slabjob --png {checkout.here}/weather-radar-cover.png")
    assert "no screen in this test" in done.stderr
    assert f"{checkout.here}/weather-radar-cover.csv" in done.stderr
    assert f"{checkout.here}/weather-radar-cover.png" in done.stderr


def test_a_job_of_ones_own_is_opened(tmp_path: Path) -> None:
    """Where there is a display, the window opens on the job named."""
    checkout = Checkout(tmp_path, display=True)
    assert checkout.run("my cover.slabjob").returncode == 0
    assert checkout.asked()[-1] == "-I -m app my cover.slabjob"


def test_options_go_to_the_program(checkout: Checkout) -> None:
    """An option is no job: the program says what there is."""
    assert checkout.run("--help").returncode == 0
    assert checkout.asked()[-1] == "-I -m app --help"
