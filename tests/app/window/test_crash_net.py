"""What nobody caught is written down and told, from every thread and from Qt."""

import subprocess
import sys
import threading
from collections.abc import Iterator
from pathlib import Path

import pytest
from PySide6.QtCore import QTimer, qCritical, qWarning
from pytestqt.qtbot import QtBot

from app.window.crash_net import LOG_NAME, CrashNet


@pytest.fixture
def net(qtbot: QtBot, tmp_path: Path) -> Iterator[CrashNet]:
    """An installed net; everything is as before at the end, also the handler of pytest-qt."""
    net = CrashNet(tmp_path)
    net.install()
    yield net
    net.remove()


def log(folder: Path) -> str:
    """Return what was written."""
    return (folder / LOG_NAME).read_text(encoding="utf-8")


def test_an_exception_in_a_slot_is_told_and_logged(qtbot: QtBot, net: CrashNet, tmp_path: Path) -> None:
    """The sentence names the exception; the log has where it came from; the program goes on."""

    def slot() -> None:
        raise ZeroDivisionError("by nothing")

    with qtbot.captureExceptions(), qtbot.waitSignal(net.caught) as caught:
        QTimer.singleShot(0, lambda: net.report(_raised(slot)))
    assert caught.args is not None
    assert "ZeroDivisionError: by nothing" in caught.args[0]
    assert "Your job is kept" in caught.args[0]
    assert "in slot" in log(tmp_path)
    assert "in slot" in net.tail()


def test_the_hook_of_python_is_the_net(
    qtbot: QtBot, net: CrashNet, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    """What reaches the interpreter's hook reaches the net, and the terminal, where it may be all that is left."""
    error = _raised(lambda: int("x"))
    with qtbot.waitSignal(net.caught) as caught:
        sys.excepthook(type(error), error, error.__traceback__)
    assert caught.args is not None
    assert "ValueError" in caught.args[0]
    (line,) = capsys.readouterr().err.splitlines()
    assert line.startswith("slabwright: Something went wrong inside Slabwright (ValueError: ")
    assert line.endswith(str(tmp_path / LOG_NAME))


def test_an_exception_in_a_thread_is_told_in_the_thread_of_the_window(
    qtbot: QtBot, net: CrashNet, tmp_path: Path
) -> None:
    """A thread that dies of an exception is told of."""
    with qtbot.waitSignal(net.caught) as caught:
        thread = threading.Thread(target=lambda: int("x"))
        thread.start()
        thread.join()
    assert caught.args is not None
    assert "ValueError" in caught.args[0]
    assert "ValueError" in log(tmp_path)


def test_messages_of_qt_are_logged_and_the_bad_ones_told(qtbot: QtBot, net: CrashNet, tmp_path: Path) -> None:
    """A warning of Qt is only written down, a critical one also told; noise of the platform is neither."""
    told: list[str] = []
    net.caught.connect(told.append)
    qWarning("a warning")
    qWarning("This plugin does not support propagateSizeHints()")
    assert told == []
    qCritical("a critical fault")
    assert told == ["The window toolkit reports a fault: a critical fault"]
    assert "WARNING Qt: a warning" in log(tmp_path)
    assert "propagateSizeHints" not in log(tmp_path)


def test_removing_gives_the_hooks_back(qtbot: QtBot, tmp_path: Path) -> None:
    """After remove the hooks are those of before, and removing twice does no harm."""
    hooks = sys.excepthook, threading.excepthook
    net = CrashNet(tmp_path)
    net.install()
    assert (sys.excepthook, threading.excepthook) != hooks
    net.remove()
    net.remove()
    assert (sys.excepthook, threading.excepthook) == hooks
    assert net.tail() == ""


PAINTING = """
import sys, tempfile
from pathlib import Path
from PySide6.QtCore import QTimer
from PySide6.QtGui import QPainter
from PySide6.QtWidgets import QApplication, QWidget
from app.window.crash_net import CrashNet

class Broken(QWidget):
    def paintEvent(self, event):
        painter = QPainter(self)
        painter.drawPoint(1, 1)
        raise ValueError("in the middle of painting")

application = QApplication([])
told = []
net = CrashNet(Path(tempfile.mkdtemp()))
net.caught.connect(told.append)
net.install()
widget = Broken()
widget.show()
again = QTimer()
again.timeout.connect(widget.update)
again.start(5)
QTimer.singleShot(400, application.quit)
application.exec()
print(len(told) > 1 and "in the middle of painting" in told[0])
"""


def test_an_exception_while_painting_does_not_end_the_process() -> None:
    """A panel that fails to draw itself is told of, frame after frame, and the program lives on."""
    done = subprocess.run([sys.executable, "-c", PAINTING], capture_output=True, text=True, check=False, timeout=60)
    assert (done.returncode, done.stdout.strip()) == (0, "True"), done.stderr


def _raised(call: object) -> Exception:
    assert callable(call)
    try:
        call()
    except Exception as error:
        return error
    raise AssertionError("nothing was raised")
