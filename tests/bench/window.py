"""From an edit to painted curves, in the whole window, offscreen."""

import tempfile
from collections.abc import Callable, Iterator
from pathlib import Path
from time import perf_counter

from pyqtgraph import GraphicsView
from PySide6.QtCore import QCoreApplication, QEvent, QEventLoop, QObject, QSettings, QTimer

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.window.main_window import MainWindow
from app.window.open import make_application
from stackcore.job import Job
from stackcore.job.records import (
    FrequencyGrid,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    StackRecord,
    SweepRecord,
)
from stackcore.units import Dimension, measure
from tests.bench.solver import LAYERS, layers
from tests.bench.timing import floor_seconds, in_turns

POINTS = 2001
DRAG_POINTS = 401
LIMIT_MS = 5000


def job(points: int = POINTS) -> Job:
    """Return the bench's wall as a job: 20 layers, 3 angles, 2001 frequencies or as many as wanted."""
    parts = [(f"m{index}", epsilon, thickness) for index, (epsilon, thickness) in enumerate(layers())]
    materials = tuple(
        MaterialRecord(name, model="constant", constants={"permittivity": epsilon}) for name, epsilon, _ in parts
    )
    elements = tuple(LayerRecord(name, measure(thickness, Dimension.LENGTH)) for name, _, thickness in parts)
    grid = FrequencyGrid(measure(8e9, Dimension.FREQUENCY), measure(12e9, Dimension.FREQUENCY), points)
    angles = tuple(measure(value, Dimension.ANGLE) for value in (0.0, 0.5, 1.0))
    return Job(JobRecord("Bench", (StackRecord("A", elements),), SweepRecord(grid, angles), materials))


def painted_window(points: int = POINTS) -> tuple[MainWindow, Session, Callable[[], None]]:
    """Return the window with the bench's job, its curves painted, its session, and what closes it."""
    folder = tempfile.TemporaryDirectory(prefix="slabwright-bench-")
    make_application()
    session = Session()
    session.start_from(job(points), "bench")
    settings = QSettings(str(Path(folder.name) / "settings.ini"), QSettings.Format.IniFormat)
    window = MainWindow(session, View(), settings, Path(folder.name))
    window.resize(1280, 840)
    window.show()
    wait_for_curves(window)

    def close() -> None:
        session.save(Path(folder.name) / "bench.slabjob")
        window.close()
        window.deleteLater()
        QCoreApplication.sendPostedEvents(None, QEvent.Type.DeferredDelete.value)
        folder.cleanup()

    return window, session, close


class _Painted(QObject):
    """Ends a loop at the first paint of a widget after it was armed."""

    def __init__(self, loop: QEventLoop) -> None:
        super().__init__()
        self.armed = False
        self._loop = loop

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if self.armed and event.type() == QEvent.Type.Paint:
            QTimer.singleShot(0, self._loop.quit)
        return False


def wait_for_curves(window: MainWindow) -> None:
    """Run the event loop until the newest answer has been painted."""
    loop = QEventLoop()
    painted = _Painted(loop)
    view = window.panels.curves.findChild(GraphicsView)
    assert view is not None
    plot = view.viewport()
    plot.installEventFilter(painted)

    def arm(_: object) -> None:
        painted.armed = True
        plot.update()

    window.recompute.answered.connect(arm)
    QTimer.singleShot(LIMIT_MS, loop.quit)
    loop.exec()
    window.recompute.answered.disconnect(arm)
    plot.removeEventFilter(painted)
    if not painted.armed:
        raise TimeoutError("no answer came")


def report() -> Iterator[str]:
    """Yield one line a figure."""
    window, session, close = painted_window()
    state = {"thickness": 1e-3}

    def edit() -> float:
        state["thickness"] += 2e-5
        begin = perf_counter()
        session.apply(edits.set_thickness(0, 3, state["thickness"]))
        wait_for_curves(window)
        return perf_counter() - begin

    edit()
    turns = in_turns(15, floor=lambda: floor_seconds(LAYERS * POINTS * 3), edit=edit)
    yield (
        f"edit to painted curves, {LAYERS} layers, {POINTS} points, 3 angles: "
        f"{turns.middle('edit') * 1e3:.1f} ms ({turns.ratio('edit', 'floor'):.1f} floors)"
    )
    close()
    yield from _drag()


def _drag() -> Iterator[str]:
    """Yield how often a second the curves follow a face that is dragged, and that as a ratio to the floor."""
    window, session, close = painted_window(DRAG_POINTS)
    state = {"thickness": 1e-3}

    def move() -> float:
        state["thickness"] += 1e-5
        begin = perf_counter()
        session.apply(edits.set_thickness(0, 3, state["thickness"], merge_key="drag"))
        wait_for_curves(window)
        return perf_counter() - begin

    move()
    turns = in_turns(25, floor=lambda: floor_seconds(LAYERS * DRAG_POINTS * 3), move=move)
    yield (
        f"dragging a face, {LAYERS} layers, {DRAG_POINTS} points, 3 angles: "
        f"{1 / turns.middle('move'):.0f} updates a second ({turns.ratio('move', 'floor'):.1f} floors each)"
    )
    close()
