"""Opening the window: the application around it, from the first line to the last."""

import faulthandler
import signal
import sys
from pathlib import Path
from typing import Final

from PySide6.QtCore import QCoreApplication, QEvent
from PySide6.QtGui import QGuiApplication
from PySide6.QtWidgets import QApplication

from app.document.session import Session
from app.document.view import View
from app.look.icon import program_icon
from app.look.settings import open_settings, state_folder
from app.window.crash_net import CrashNet
from app.window.first_run import greet
from app.window.main_window import MainWindow
from app.window.windows import Windows

DESKTOP_NAME: Final = "slabwright"
SWITCH_INTERVAL: Final = 0.0005
"""Seconds after which the interpreter lets another thread run: a loop in a thread must not hold up the drawing."""


def make_application() -> QApplication:
    """Return the application with its names set; there is at most one in a process."""
    sys.setswitchinterval(SWITCH_INTERVAL)
    QCoreApplication.setApplicationName("Slabwright")
    QGuiApplication.setDesktopFileName(DESKTOP_NAME)
    existing = QApplication.instance()
    application = existing if isinstance(existing, QApplication) else QApplication(sys.argv[:1])
    application.setWindowIcon(program_icon())
    return application


def open_window(job: Path | None) -> int:
    """Open the window, with `job` if one is named, and return when it is closed."""
    application = make_application()
    if sys.stderr is not None:
        faulthandler.enable()
    # Ctrl+C in the terminal ends the program although Python runs no code while Qt waits; the recovery file
    # keeps the work.
    signal.signal(signal.SIGINT, signal.SIG_DFL)
    state = state_folder()
    net = CrashNet(state)
    net.install()

    def make(windows: Windows) -> MainWindow:
        session, view = Session(report=net.report), View(report=net.report)
        return MainWindow(session, view, open_settings(), state, crash_net=net, others=windows)

    windows = Windows(make)
    first = windows.add()
    assert isinstance(first, MainWindow)
    greet(first, open_settings())
    first.offer_leftovers()
    if job is not None:
        first.open_path(job)
    status = application.exec()
    net.remove()
    QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)
    return status
