"""``slabwright picture``: the main window with a job, drawn to a PNG without a display."""

import argparse
import contextlib
import os
import re
import tempfile
from collections.abc import Iterator, Sequence
from pathlib import Path
from typing import Final, NoReturn

from PySide6.QtCore import QBuffer, QCoreApplication, QEvent, QEventLoop, QIODevice, QSettings, QTimer

from app.document.session import Session
from app.document.view import View
from app.window.beside import BESIDE, Beside
from app.window.crash_net import CrashNet
from app.window.main_window import THEME_KEY, MainWindow
from app.window.open import make_application
from stackcore.cli.telling import DONE, one_line, tell
from stackcore.errors import Fault, InputError, SlabwrightError, nearest
from stackcore.job.replacing import replacing

LONGEST_WAIT: Final = 60_000
"""Milliseconds for the calculation."""
SETTLE: Final = 500
"""Milliseconds in which the panels draw in their fine style and movements come to rest."""
SMALLEST, LARGEST = 320, 8192
SIZE: Final = "1280x840"
LISTED: Final = tuple(one for one in BESIDE if one.in_menu)
"""Panels that can be opened."""


class _Parser(argparse.ArgumentParser):
    def error(self, message: str) -> NoReturn:
        raise InputError([Fault("", message, f"see {self.prog} --help")])


def parser() -> argparse.ArgumentParser:
    """Return the parser of the command's arguments."""
    parser = _Parser(
        prog="slabwright picture",
        description="Draw the main window with a job to a PNG, without a display.",
        allow_abbrev=False,
    )
    parser.add_argument("job", metavar="JOB", help="job file (.slabjob)")
    parser.add_argument("--png", metavar="OUT", required=True, help="picture to write")
    parser.add_argument("--size", metavar="WxH", default=SIZE, help=f"size of the window (default {SIZE})")
    parser.add_argument("--scale", metavar="N", default="1", help="pixels a point, 1 to 4 (default 1)")
    parser.add_argument(
        "--open",
        metavar="PANEL",
        action="append",
        default=[],
        help=f"a panel to open beside, more than once if wanted: {', '.join(one.name for one in LISTED)}",
    )
    parser.add_argument("--dark", action="store_true", help="the dark theme instead of the light one")
    return parser


def main(argv: Sequence[str]) -> int:
    """Run ``slabwright picture`` with the arguments behind it; return the exit status."""
    try:
        arguments = parser().parse_args(argv)
        width, height = read_size(arguments.size)
        scale = read_scale(arguments.scale)
        panels = read_panels(arguments.open)
    except SystemExit as end:  # after --help
        return int(end.code or 0)
    except InputError as error:
        return tell(error)
    if not os.environ.get("QT_QPA_PLATFORM"):
        os.environ["QT_QPA_PLATFORM"] = "offscreen"
    if scale != 1:
        os.environ["QT_SCALE_FACTOR"] = f"{scale:g}"
    try:
        content = draw(Path(arguments.job), width, height, dark=arguments.dark, panels=panels)
        _write(Path(arguments.png), content)
    except SlabwrightError as error:
        return tell(error)
    except OSError as error:
        return one_line(f"{error.filename or arguments.png}: {error.strerror or error}")
    return DONE


def read_size(text: str) -> tuple[int, int]:
    """Return width and height from ``1280x840``; raises InputError for anything else."""
    match = re.fullmatch(r"\s*(\d{1,5})\s*[x×X]\s*(\d{1,5})\s*", text)
    width, height = (int(match[1]), int(match[2])) if match else (0, 0)
    if not (SMALLEST <= width <= LARGEST and SMALLEST <= height <= LARGEST):
        allowed = f"width x height, each from {SMALLEST} to {LARGEST}, for example {SIZE}"
        raise InputError([Fault("--size", f"{text!r} is not a size", allowed)])
    return width, height


def read_scale(text: str) -> float:
    """Return the pixels a point; raises InputError for what is no number from 1 to 4."""
    try:
        scale = float(text)
    except ValueError:
        scale = 0.0
    if not 1 <= scale <= 4:
        raise InputError([Fault("--scale", f"{text!r} is not a scale", "a number from 1 to 4")])
    return scale


def read_panels(names: Sequence[str]) -> tuple[Beside, ...]:
    """Return the panels of some names; raises InputError with every name that is none."""
    known = {one.name: one for one in LISTED}
    faults = [
        Fault("--open", f"{name!r} is no panel{nearest(name, known)}", f"one of {', '.join(known)}")
        for name in names
        if name not in known
    ]
    if faults:
        raise InputError(faults)
    return tuple(known[name] for name in names)


def draw(job: Path, width: int, height: int, *, dark: bool = False, panels: Sequence[Beside] = ()) -> bytes:
    """Return the PNG of the main window with the job file `job`.

    Parameters
    ----------
    width, height
        Of the window, in points.
    dark
        Whether to use the dark theme.
    panels
        Opened beside the work; what they compute is waited for.

    Raises
    ------
    JobError
        When the file has faults.
    InputError
        When its first stack cannot be computed.
    OSError
        When the file cannot be read.
    """
    session = Session()
    session.open(job)
    make_application()
    with tempfile.TemporaryDirectory(prefix="slabwright-") as folder, _strict(Path(folder)):
        settings = QSettings(str(Path(folder) / "settings.ini"), QSettings.Format.IniFormat)
        settings.setValue(THEME_KEY, "dark" if dark else "light")
        window = MainWindow(session, View(), settings, Path(folder))
        try:
            window.resize(width, height)
            window.show()
            window.actions_table["view.reset"].trigger()
            for panel in panels:
                window.actions_table[f"view.{panel.name}"].trigger()
            _wait(window)
            return _png(window)
        finally:
            window.close()
            window.deleteLater()
            QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)


@contextlib.contextmanager
def _strict(folder: Path) -> Iterator[None]:
    """Refuse a picture in whose making anything went wrong: part of it may be missing."""
    told: list[str] = []
    net = CrashNet(folder)
    net.caught.connect(told.append)
    net.install()
    try:
        yield
    finally:
        net.remove()
    if told:
        raise InputError([Fault("", told[0])])


def _wait(window: MainWindow) -> None:
    """Let Qt work until the panels show the answer and have come to rest."""
    loop = QEventLoop()
    faults: list[Fault] = []

    def settle(_: object = None) -> None:
        QTimer.singleShot(SETTLE, loop.quit)

    def fail(found: tuple[Fault, ...]) -> None:
        faults.extend(found)
        loop.quit()

    window.recompute.answered.connect(settle)
    window.recompute.failed.connect(fail)
    limit = QTimer()
    limit.setSingleShot(True)
    limit.timeout.connect(loop.quit)
    limit.start(LONGEST_WAIT)
    loop.exec()
    if faults:
        raise InputError(faults)
    while limit.isActive() and any(panel.computing for panel in window.panels.slow):
        QTimer.singleShot(SETTLE, loop.quit)
        loop.exec()
    if not limit.isActive():
        seconds = LONGEST_WAIT // 1000
        raise InputError([Fault("sweep", f"no result after {seconds} s", "fewer frequencies or angles")])
    limit.stop()


def _png(window: MainWindow) -> bytes:
    buffer = QBuffer()
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    try:
        window.grab().save(buffer, "PNG")
    except Exception as error:
        # What a panel raises while it is painted comes out here.
        raise InputError([Fault("", f"the window could not be drawn: {error}")]) from error
    return bytes(buffer.data().data())


def _write(path: Path, content: bytes) -> None:
    with replacing(path) as file:
        file.write(content)
