"""The windows of the program: several jobs open at a time, each in a window of its own."""

from collections.abc import Callable
from pathlib import Path
from typing import Final, Protocol

from PySide6.QtCore import QObject, QPoint, Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import QMainWindow

STEP: Final = 32
"""Pixels by which a new window stands away from the one it was opened from."""


class JobWindow(QMainWindow):
    """A window that holds a job."""

    @property
    def path(self) -> Path | None:
        """The file of its job, or None."""
        raise NotImplementedError

    def open_path(self, path: Path) -> None:
        """Open a job file in it."""
        raise NotImplementedError


class Others(Protocol):
    """What one window can ask of all."""

    def open_beside(self, path: Path | None = None) -> None:
        """Open a window, with a job file if one is named."""

    def bring_forward(self, path: Path) -> bool:
        """Show the window that holds a file; tells whether there is one."""

    def quit(self) -> None:
        """Close every window; each asks about its own changes."""


class Alone:
    """The others of a window that is the only one there can be."""

    def open_beside(self, path: Path | None = None) -> None:
        """Do nothing."""

    def bring_forward(self, path: Path) -> bool:
        """Tell that no other window holds a file."""
        return False

    def quit(self) -> None:
        """Do nothing."""


class Windows(QObject):
    """Every window that is open, oldest first.

    Parameters
    ----------
    make
        Makes a window that holds an untitled job, given who to ask for the others.
    """

    def __init__(self, make: Callable[["Windows"], JobWindow]) -> None:
        super().__init__()
        self._make = make
        self._open: list[JobWindow] = []

    @property
    def windows(self) -> tuple[JobWindow, ...]:
        """Those that are open."""
        return tuple(self._open)

    def add(self) -> JobWindow:
        """Make and show a window, a step away from the newest."""
        window = self._make(self)
        window.setAttribute(Qt.WidgetAttribute.WA_DeleteOnClose)
        window.destroyed.connect(lambda: self._forget(window))
        newest = self._open[-1] if self._open else None
        self._open.append(window)
        if newest is not None:
            window.resize(newest.size())
            window.move(_inside(newest, newest.pos() + QPoint(STEP, STEP)))
        window.show()
        return window

    def open_beside(self, path: Path | None = None) -> None:
        """Open a window, with a job file if one is named and not open yet."""
        if path is not None and self.bring_forward(path):
            return
        window = self.add()
        window.raise_()
        window.activateWindow()
        if path is not None:
            window.open_path(path)

    def bring_forward(self, path: Path) -> bool:
        """Show the window that holds a file; tells whether there is one."""
        wanted = path.resolve()
        for window in self._open:
            held = window.path
            if held is not None and held.resolve() == wanted:
                window.show()
                window.raise_()
                window.activateWindow()
                return True
        return False

    def quit(self) -> None:
        """Close every window, newest first; each asks about its own changes, and one that stays stops it."""
        for window in reversed(self.windows):
            if not window.close():
                return

    def _forget(self, window: JobWindow) -> None:
        self._open = [other for other in self._open if other is not window]


def _inside(window: QMainWindow, place: QPoint) -> QPoint:
    """Return `place`, or the corner of the screen when a window there would leave it."""
    screen = window.screen() or QGuiApplication.primaryScreen()
    room = screen.availableGeometry()
    fits = room.contains(place) and room.contains(place + QPoint(window.width() // 2, window.height() // 2))
    return place if fits else room.topLeft()
