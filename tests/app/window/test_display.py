"""Whether there is a screen: told before the toolkit finds out by ending the process."""

import socket
import subprocess
import sys
import tempfile
from collections.abc import Iterator
from pathlib import Path

import pytest

from app.window.display import display_fault

ROOT = Path(__file__).parents[3]
NAMES = ("DISPLAY", "WAYLAND_DISPLAY", "QT_QPA_PLATFORM", "XDG_RUNTIME_DIR")

pytestmark = pytest.mark.skipif(not sys.platform.startswith("linux"), reason="elsewhere there is always a screen")


@pytest.fixture(autouse=True)
def _nothing_set(monkeypatch: pytest.MonkeyPatch) -> None:
    """Begin on a machine without a display."""
    for name in NAMES:
        monkeypatch.delenv(name, raising=False)


@pytest.fixture
def listening() -> Iterator[str]:
    """The path of a socket that something listens at; paths of sockets must be short."""
    with tempfile.TemporaryDirectory() as folder, socket.socket(socket.AF_UNIX) as end:
        path = str(Path(folder, "screen"))
        end.bind(path)
        end.listen()
        yield path


def test_nothing_set() -> None:
    """Without a name of a display there is none."""
    assert display_fault() == "neither DISPLAY nor WAYLAND_DISPLAY is set"


@pytest.mark.parametrize("name", [":4711", "localhost:4711.0", "unix:4711", "unix/this-machine:4711"])
def test_a_display_that_does_not_answer(monkeypatch: pytest.MonkeyPatch, name: str) -> None:
    """A name left over from a session that has ended is as good as none, and is told."""
    monkeypatch.setenv("DISPLAY", name)
    assert display_fault() == f"nothing answers at DISPLAY={name}"


def test_a_compositor_answers(monkeypatch: pytest.MonkeyPatch, listening: str) -> None:
    """One of two that answers is enough, by its path or by its name in the folder of the session."""
    monkeypatch.setenv("DISPLAY", ":4711")
    monkeypatch.setenv("WAYLAND_DISPLAY", listening)
    assert display_fault() == ""
    monkeypatch.setenv("XDG_RUNTIME_DIR", str(Path(listening).parent))
    monkeypatch.setenv("WAYLAND_DISPLAY", "screen")
    assert display_fault() == ""
    monkeypatch.setenv("WAYLAND_DISPLAY", "another")
    assert display_fault() == "nothing answers at WAYLAND_DISPLAY=another or DISPLAY=:4711"


def test_a_server_on_another_machine_answers(monkeypatch: pytest.MonkeyPatch) -> None:
    """A display with a host is looked for at its port."""
    with socket.socket() as end:
        end.bind(("127.0.0.1", 0))
        end.listen()
        number = end.getsockname()[1] - 6000
        monkeypatch.setenv("DISPLAY", f"127.0.0.1:{number}.0")
        assert display_fault() == ""
    assert display_fault() == f"nothing answers at DISPLAY=127.0.0.1:{number}.0"


def test_what_cannot_be_judged_is_left_to_the_toolkit(monkeypatch: pytest.MonkeyPatch) -> None:
    """Another platform of the toolkit, or a name nobody can read, is not called missing."""
    monkeypatch.setenv("DISPLAY", "strange")
    assert display_fault() == ""
    monkeypatch.setenv("DISPLAY", ":4711")
    monkeypatch.setenv("QT_QPA_PLATFORM", "offscreen")
    assert display_fault() == ""


def test_as_a_command_it_needs_no_toolkit() -> None:
    """The start script asks by a command, which prints the reason, ends with 1 and loads nothing heavy."""
    code = (
        "import runpy, sys\n"
        "try:\n    runpy.run_module('app.window.display', run_name='__main__')\n"
        "except SystemExit as end:\n    print(end.code, 'PySide6' in sys.modules, 'numpy' in sys.modules)\n"
    )
    done = subprocess.run(
        [sys.executable, "-c", code], cwd=ROOT, capture_output=True, text=True, check=True, timeout=60
    )
    assert done.stdout == "neither DISPLAY nor WAYLAND_DISPLAY is set\nTrue False False\n"
