"""Guards for tests of the window: nothing modal, nothing left behind.

A dialog that waits would hang the run, and an assertion inside a slot is swallowed by Qt: both are recorded
and reported when the test ends. Names of the guards begin with an underscore because no test asks for them.
"""

import gc
import threading
from collections.abc import Callable, Iterator
from typing import NoReturn
from weakref import WeakSet

import pytest
import shiboken6
from PySide6.QtCore import QCoreApplication, QEvent, QStandardPaths, QTimer
from PySide6.QtWidgets import (
    QApplication,
    QColorDialog,
    QDialog,
    QFileDialog,
    QInputDialog,
    QMenu,
    QMessageBox,
    QWidget,
)

QStandardPaths.setTestModeEnabled(True)

GUARD = "guard of the tests"
BLOCKING: tuple[tuple[type[QWidget], tuple[str, ...]], ...] = (
    (QDialog, ("exec",)),
    (QMessageBox, ("exec", "question", "information", "warning", "critical", "about")),
    (QMenu, ("exec",)),
    (QFileDialog, ("exec", "getOpenFileName", "getOpenFileNames", "getSaveFileName", "getExistingDirectory")),
    (QInputDialog, ("exec", "getText", "getInt", "getDouble", "getItem")),
    (QColorDialog, ("exec", "getColor")),
)


def _refusal(name: str, seen: list[str]) -> Callable[..., NoReturn]:
    def refuse(*_: object, **__: object) -> NoReturn:
        seen.append(name)
        raise AssertionError(f"{name} would wait for a person")

    return refuse


@pytest.fixture(scope="session", autouse=True)
def _clipboard_emptied() -> Iterator[None]:
    """Empty the clipboard when the run ends.

    WORKAROUND: the offscreen platform keeps it in a static of Qt's own, which outlives Python; data made in Python
    then brings the process down after the last test has passed.
    """
    yield
    if isinstance(QApplication.instance(), QApplication):
        QApplication.clipboard().clear()


@pytest.fixture
def dialogs_may_open() -> list[str]:
    """Let a test show the real, non-blocking dialogs of the program."""
    return []


@pytest.fixture(autouse=True)
def _nothing_modal(request: pytest.FixtureRequest, monkeypatch: pytest.MonkeyPatch) -> Iterator[None]:
    """Fail a test that opens anything a person would have to answer."""
    seen: list[str] = []
    for owner, names in BLOCKING:
        for name in names:
            monkeypatch.setattr(owner, name, _refusal(f"{owner.__name__}.{name}", seen))
    watch: QTimer | None = None
    if "qapp" in request.fixturenames and "dialogs_may_open" not in request.fixturenames:
        request.getfixturevalue("qapp")
        watch = QTimer()
        watch.setObjectName(GUARD)
        watch.timeout.connect(lambda: _close_modal(seen))
        watch.start(50)
    yield
    if watch is not None:
        watch.stop()
        watch.deleteLater()
    assert not seen, f"opened and waited: {', '.join(seen)}"


def _close_modal(seen: list[str]) -> None:
    widget = QApplication.activeModalWidget()
    if widget is not None:
        seen.append(f"modal {type(widget).__name__} {widget.windowTitle()!r}")
        widget.close()


@pytest.fixture(autouse=True)
def _nothing_left(request: pytest.FixtureRequest, _nothing_modal: None) -> Iterator[None]:
    """Fail a test that leaves a thread, a running timer or a top-level widget."""
    uses_qt = "qapp" in request.fixturenames
    threads = set(threading.enumerate())
    widgets = _widgets()
    yield
    if uses_qt:
        QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)
    left = [f"thread {thread.name}" for thread in set(threading.enumerate()) - threads if _stays(thread)]
    if uses_qt:
        if _widgets().keys() - widgets.keys():
            flush_deferred_deletes()
        new = [widget for key, widget in _widgets().items() if key not in widgets]
        left += [f"widget {type(widget).__name__} {widget.objectName()!r}" for widget in new]
        left += _new_timers()
    assert not left, f"left behind: {', '.join(left)}"


def flush_deferred_deletes() -> None:
    """Run what `deleteLater` has put off, which `processEvents` alone does not."""
    for _ in range(3):
        QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)
        gc.collect()


def _stays(thread: threading.Thread) -> bool:
    thread.join(2.0)
    return thread.is_alive()


def _widgets() -> dict[int, QWidget]:
    if QApplication.instance() is None:
        return {}
    return {id(widget): widget for widget in QApplication.topLevelWidgets() if _kept(widget)}


def _kept(widget: QWidget) -> bool:
    # Qt makes one label for tool tips and keeps it for the whole run.
    return widget.metaObject().className() not in {"QTipLabel", "QDesktopScreenWidget"}


_known_timers: "WeakSet[QTimer]" = WeakSet()


def _new_timers() -> list[str]:
    """Return the timers that run now and did not run after an earlier test.

    Asking for every object takes a while, so it is done once a test and again only on suspicion.
    """
    if not _running_timers():
        return []
    gc.collect()
    found = _running_timers()
    for timer in found:
        _known_timers.add(timer)
    return [f"timer {timer.objectName() or 'without a name'}, every {timer.interval()} ms" for timer in found]


def _running_timers() -> list[QTimer]:
    return [
        thing
        for thing in gc.get_objects()
        if issubclass(type(thing), QTimer)
        and thing not in _known_timers
        and shiboken6.isValid(thing)
        and thing.isActive()
        and thing.objectName() != GUARD
    ]
