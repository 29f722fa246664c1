"""CSV export beside the work: in a thread of its own, with progress, and given up when asked."""

import contextlib
import threading
from collections.abc import Callable, Generator
from io import TextIOWrapper
from pathlib import Path
from typing import Final, NamedTuple

from PySide6.QtCore import QObject, Qt, QTimer, Signal, Slot
from PySide6.QtWidgets import QHBoxLayout, QLabel, QProgressBar, QPushButton, QWidget

from app.document.session import Session
from app.document.view import View
from app.window.crash_net import LOGGER
from app.window.dialogs import TABLES, Dialogs
from stackcore.errors import Severity, SlabwrightError
from stackcore.export import write_csv, write_wide_csv
from stackcore.job.replacing import replacing
from stackcore.job.resolve import Job
from stackcore.quantities import element_absorptance

Tell = Callable[[str, Severity], None]
Steps = Callable[[Job, Path], Generator[float, None, None]]
"""Writes a job's table to a file bit by bit and yields the share done, 0 to 1; closing it gives up."""


def csv_steps(job: Job, path: Path) -> Generator[float, None, None]:
    """Write every stack of `job` over its sweep to `path` as CSV; the file changes only when all is written."""
    with replacing(path) as file:
        stream = TextIOWrapper(file, encoding="utf-8", newline="")
        yield from write_csv(job, stream)
        stream.flush()
        stream.detach()


def wide_steps(quantity: str) -> Steps:
    """Return what writes one quantity of every stack, a column for each stack, angle and polarization."""

    def steps(job: Job, path: Path) -> Generator[float, None, None]:
        with replacing(path) as file:
            stream = TextIOWrapper(file, encoding="utf-8", newline="")
            yield from write_wide_csv(job, stream, quantity)
            stream.flush()
            stream.detach()

    return steps


PATIENCE: Final = 1000
"""Milliseconds before progress is shown."""


class Outcome(NamedTuple):
    """How an export ended: with words for what went wrong, given up, or well."""

    path: Path
    fault: str
    cancelled: bool


class Exporter(QObject):
    """Writes the table of the present job to a file, one at a time.

    The file appears only when it is complete; an older one of its name is untouched until then.

    Signals
    -------
    progressed(float)
        Share done, 0 to 1.
    running(bool)
        An export has begun, or has ended.
    """

    progressed = Signal(float)
    running = Signal(bool)
    _ended = Signal(object)

    def __init__(
        self,
        job: Callable[[], Job],
        suggestion: Callable[[str], Path],
        dialogs: Dialogs,
        tell: Tell,
        steps: Steps,
        parent: QObject | None = None,
        quantity: Callable[[], str] = lambda: "transmittance",
    ) -> None:
        super().__init__(parent)
        self._job, self._suggestion, self._steps, self._quantity = job, suggestion, steps, quantity
        self._dialogs, self._tell = dialogs, tell
        self._thread: threading.Thread | None = None
        self._stop = threading.Event()
        self._ended.connect(self._finish, Qt.ConnectionType.QueuedConnection)

    def idle(self) -> bool:
        """Whether a new export can begin."""
        return self._thread is None

    def export(self) -> None:
        """Ask for a file and begin."""
        self._dialogs.pick_target("Export CSV", self._suggestion(".csv"), (TABLES,), self.start)

    def export_wide(self) -> None:
        """Ask for a file and begin with the table for a spreadsheet: the quantity shown, a column a curve."""
        steps = wide_steps(self._quantity())
        suggestion = self._suggestion(".wide.csv")
        self._dialogs.pick_target("Export wide CSV", suggestion, (TABLES,), lambda path: self.start(path, steps))

    def start(self, path: Path, steps: Steps | None = None) -> None:
        """Begin to write the job as it is now; later edits do not touch it."""
        if self._thread is not None:
            self._tell("An export is still running; cancel it first.", "warning")
            return
        self._stop.clear()
        work = (self._job(), path, self._steps if steps is None else steps)
        self._thread = threading.Thread(target=self._work, args=work, name="CSV export", daemon=True)
        self._thread.start()
        self.running.emit(True)

    def cancel(self) -> None:
        """Give up soon; no file is left."""
        self._stop.set()

    def close(self) -> None:
        """Give up and wait for the thread."""
        self._stop.set()
        if self._thread is not None:
            self._thread.join()
            self._thread = None

    def _work(self, job: Job, path: Path, make: Steps) -> None:
        fault, cancelled = "", False
        try:
            with contextlib.closing(make(job, path)) as steps:
                for share in steps:
                    if self._stop.is_set():
                        cancelled = True
                        break
                    self.progressed.emit(share)
        except OSError as error:
            fault = error.strerror or str(error)
        except SlabwrightError as error:
            fault = str(error)
        except Exception as error:
            LOGGER.exception("CSV export")
            fault = f"{type(error).__name__}: {error}"
        self._ended.emit(Outcome(path, fault, cancelled))

    @Slot(object)
    def _finish(self, outcome: Outcome) -> None:
        if self._thread is None:
            return  # closed meanwhile
        self._thread.join()
        self._thread = None
        self.running.emit(False)
        name = outcome.path.name
        if outcome.fault:
            self._tell(f"{name} could not be written: {outcome.fault}. No file was left.", "error")
        elif outcome.cancelled:
            self._tell(f"Export of {name} given up; no file was left.", "note")
        else:
            self._tell(f"Exported {name}.", "note")


def make_exporter(
    session: Session,
    view: View,
    suggestion: Callable[[str], Path],
    dialogs: Dialogs,
    tell: Tell,
    parent: QObject,
) -> Exporter:
    """Return the exporter of a window: of the job of its session, wide tables of the quantity it shows."""

    def quantity() -> str:
        # An element of one stack is none of another: of all of them there is what they absorb as a whole.
        name = view.state.quantity
        return "absorptance" if element_absorptance(name) is not None else name

    return Exporter(lambda: session.job, suggestion, dialogs, tell, csv_steps, parent, quantity)


class ProgressLine(QWidget):
    """A bar with Cancel in the status line, while an export takes longer than `patience` ms."""

    def __init__(self, exporter: Exporter, parent: QWidget | None = None, *, patience: int = PATIENCE) -> None:
        super().__init__(parent)
        self._bar = QProgressBar(self)
        self._bar.setRange(0, 1000)
        self._bar.setFixedWidth(160)
        self._bar.setTextVisible(True)
        self._bar.setAccessibleName("Progress of the CSV export")
        self.cancel = QPushButton("Cancel", self)
        self.cancel.setToolTip("Give up the export; no file is left.")
        self.cancel.clicked.connect(exporter.cancel)
        row = QHBoxLayout(self)
        row.setContentsMargins(0, 0, 8, 0)
        row.setSpacing(8)
        row.addWidget(QLabel("Exporting CSV", self))
        row.addWidget(self._bar)
        row.addWidget(self.cancel)
        self._wait = QTimer(self)
        self._wait.setObjectName("progress")
        self._wait.setSingleShot(True)
        self._wait.setInterval(patience)
        self._wait.timeout.connect(self.show)
        exporter.progressed.connect(self._show_share, Qt.ConnectionType.QueuedConnection)
        exporter.running.connect(self._run)
        self.hide()

    def share(self) -> float:
        """Return the share done that is shown, 0 to 1."""
        return self._bar.value() / self._bar.maximum()

    @Slot(float)
    def _show_share(self, share: float) -> None:
        self._bar.setValue(round(share * 1000))

    def _run(self, running: bool) -> None:
        self._bar.setValue(0)
        if running:
            self._wait.start()
        else:
            self._wait.stop()
            self.hide()
