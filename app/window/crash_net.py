"""What happens when something goes wrong that nobody foresaw: it is written down, and the window says so.

An exception inside a slot does not stop a Qt program; without this net nobody would see it. Log lines hold
no contents of jobs.
"""

import logging
import sys
import threading
import traceback
from logging.handlers import RotatingFileHandler
from pathlib import Path
from types import TracebackType
from typing import Any, Final

from PySide6.QtCore import (
    QMessageLogContext,
    QObject,
    QtMsgType,
    Signal,
    qInstallMessageHandler,
)

from stackcore.cli.telling import one_line

LOGGER: Final = logging.getLogger("slabwright")
LOG_NAME: Final = "slabwright.log"
LOG_BYTES: Final = 500_000
LOG_FILES: Final = 3

_LEVELS: Final = {
    QtMsgType.QtDebugMsg: logging.DEBUG,
    QtMsgType.QtInfoMsg: logging.INFO,
    QtMsgType.QtWarningMsg: logging.WARNING,
    QtMsgType.QtCriticalMsg: logging.ERROR,
    QtMsgType.QtFatalMsg: logging.CRITICAL,
}


class CrashNet(QObject):
    """Catches what nobody caught, in every thread, from `install` to `remove`.

    Signals
    -------
    caught(str)
        One sentence for the person, delivered in the thread of this object.

    Parameters
    ----------
    folder
        Where the log is kept, in at most `LOG_FILES` files of `LOG_BYTES`.
    """

    caught = Signal(str)

    def __init__(self, folder: Path, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.log_file = folder / LOG_NAME
        self._handler: RotatingFileHandler | None = None
        self._before: tuple[Any, Any, Any] = (sys.excepthook, threading.excepthook, None)

    def install(self) -> None:
        """Open the log and take the hooks of Python, of its threads and of Qt."""
        handler = RotatingFileHandler(
            self.log_file, maxBytes=LOG_BYTES, backupCount=LOG_FILES - 1, encoding="utf-8", delay=True
        )
        handler.setFormatter(logging.Formatter("%(asctime)s %(levelname)s %(message)s"))
        LOGGER.addHandler(handler)
        LOGGER.setLevel(logging.INFO)
        self._handler = handler
        self._before = (sys.excepthook, threading.excepthook, qInstallMessageHandler(self._qt_message))
        sys.excepthook = self._exception
        threading.excepthook = self._thread_exception

    def remove(self) -> None:
        """Give the hooks back to whoever had them and close the log."""
        if self._handler is None:
            return
        sys.excepthook, threading.excepthook, qt_handler = self._before
        qInstallMessageHandler(qt_handler)
        LOGGER.removeHandler(self._handler)
        self._handler.close()
        self._handler = None

    def report(self, error: BaseException) -> None:
        """Write an exception down and say so; the local variables of where it came from are let go."""
        self._exception(type(error), error, error.__traceback__)

    def tail(self, lines: int = 40) -> str:
        """Return the last lines of the log."""
        if not self.log_file.exists():
            return ""
        return "\n".join(self.log_file.read_text(encoding="utf-8", errors="replace").splitlines()[-lines:])

    def _exception(self, kind: type[BaseException], error: BaseException, trace: TracebackType | None) -> None:
        if issubclass(kind, KeyboardInterrupt):
            sys.__excepthook__(kind, error, trace)
            return
        LOGGER.error("".join(traceback.format_exception(kind, error, trace)).rstrip())
        # Frames that end in an error are kept with it. A painter in one of them would outlive the surface it
        # paints on, and that ends the process.
        traceback.clear_frames(trace)
        what = f"Something went wrong inside Slabwright ({kind.__name__}: {error})."
        # Before the window is there, and when the process ends by it, nobody hears the signal.
        one_line(f"{what} The log tells where: {self.log_file}")
        self.caught.emit(f"{what} Your job is kept.")

    def _thread_exception(self, args: threading.ExceptHookArgs) -> None:
        if args.exc_type is not SystemExit and args.exc_value is not None:
            self._exception(args.exc_type, args.exc_value, args.exc_traceback)

    def _qt_message(self, kind: QtMsgType, context: QMessageLogContext, text: str) -> None:
        if "propagateSizeHints" in text:
            return  # said by the platform without a display for every window
        LOGGER.log(_LEVELS.get(kind, logging.WARNING), "Qt: %s", text)
        if kind == QtMsgType.QtCriticalMsg:
            self.caught.emit(f"The window toolkit reports a fault: {text}")
