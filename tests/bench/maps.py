"""Maps from coarse to fine: the first level, all of it, and a live edit while one refines."""

import json
import sys
import time
from collections.abc import Callable, Iterator
from statistics import median

import numpy as np
from PySide6.QtCore import QCoreApplication, QEventLoop

from app.window.open import SWITCH_INTERVAL
from app.workers.batch import BatchLane
from app.workers.live import Answer, LiveLane
from stackcore.arrays import FloatArray
from stackcore.job import Job, job_from_json
from stackcore.polarizations import TE
from stackcore.quantities import quantity_named
from stackcore.studies import MapLevel, map_over, variations_of
from tests.bench.solver import LAYERS, layers
from tests.bench.timing import floor_seconds, in_turns, seconds

FREQUENCY = np.linspace(8e9, 12e9, 2001)
ANGLE = np.radians(np.linspace(0, 89, 181))


def wall_job() -> Job:
    """Return the lossy layers of the solver's bench as a job."""
    known = layers()
    materials = {
        f"m{row}": {"model": "constant", "permittivity": [epsilon.real, -epsilon.imag]}
        for row, (epsilon, _) in enumerate(known)
    }
    elements = [{"layer": f"m{row}", "thickness": f"{thickness} m"} for row, (_, thickness) in enumerate(known)]
    tree = {
        "format": "slabwright-job",
        "version": 1,
        "title": "Bench",
        "materials": materials,
        "stacks": [{"name": "A", "elements": elements}],
        "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]},
    }
    return Job(job_from_json(json.dumps(tree)))


def levels(job: Job, name: str, kind: str) -> Iterator[MapLevel]:
    """Return the levels of a map over angles or over the thickness of the first layer."""
    quantity = quantity_named(name)
    if kind == "angle":
        return map_over(job, 0, quantity, TE, FREQUENCY, ANGLE)
    thickness = variations_of(job, 0)[0]
    return map_over(job, 0, quantity, TE, FREQUENCY, 0.5, thickness, thickness.values(ANGLE.size))


def report() -> Iterator[str]:
    """Yield one line a figure."""
    job = wall_job()
    points = LAYERS * FREQUENCY.size * ANGLE.size
    for kind, name in (
        ("angle", "transmittance"),
        ("angle", "insertion_loss_dB"),
        ("angle", "absorptance"),
        ("thickness", "transmittance"),
    ):
        turns = in_turns(
            3,
            floor=lambda: floor_seconds(points),
            first=lambda kind=kind, name=name: seconds(lambda: next(levels(job, name, kind))),  # type: ignore[misc]
            all=lambda kind=kind, name=name: seconds(lambda: list(levels(job, name, kind))),  # type: ignore[misc]
            gap=lambda kind=kind, name=name: longest_gap(levels(job, name, kind)),  # type: ignore[misc]
        )
        yield (
            f"2001 frequencies × 181 of {kind}, {LAYERS} lossy layers, {name}: {turns.ratio('all', 'floor'):.2f} "
            f"floors ({turns.middle('all') * 1e3:.0f} ms); first level {turns.middle('first') * 1e3:.1f} ms; "
            f"longest chunk {turns.middle('gap') * 1e3:.1f} ms"
        )
    yield from live_report(job)


def longest_gap(study: Iterator[MapLevel]) -> float:
    """Return the longest time in s between two levels, which is what closing may have to wait for."""
    longest, begun = 0.0, time.perf_counter()
    for _ in study:
        now = time.perf_counter()
        longest, begun = max(longest, now - begun), now
    return longest


def live_report(job: Job) -> Iterator[str]:
    """Yield how long a live question takes alone and while a map refines, as a drag asks them."""
    _application = QCoreApplication.instance() or QCoreApplication([])
    sys.setswitchinterval(SWITCH_INTERVAL)  # as the window does
    live = LiveLane()
    batch = BatchLane(lambda: live.busy)
    angle = np.radians([0.0, 30.0, 60.0])
    try:
        for pause, kind in ((0.016, "while dragging"), (0.25, "now and then")):
            alone = [_answer_seconds(live, job, angle, pause) for _ in range(12)]
            beside = []
            for _ in range(12):
                if not batch.busy:
                    batch.ask(map_over(job, 0, quantity_named("absorptance"), TE, FREQUENCY, ANGLE))
                beside.append(_answer_seconds(live, job, angle, pause))
            batch.cancel()
            yield (
                f"live edit {kind}, 2001 × 3 of {LAYERS} layers: {median(alone) * 1e3:.1f} ms alone, "
                f"{median(beside) * 1e3:.1f} ms (worst {max(beside) * 1e3:.1f}) while a map refines"
            )
    finally:
        batch.close()
        live.close()


def _answer_seconds(live: LiveLane, job: Job, angle: FloatArray, pause: float) -> float:
    """Return the time in s from a live question to its answer in this thread, after some rest."""
    rested = time.perf_counter() + pause
    _wait(lambda: time.perf_counter() > rested)
    heard: list[Answer] = []
    live.answered.connect(heard.append)
    begun = time.perf_counter()
    live.ask(job.stacks[0], FREQUENCY, angle, quantity="transmittance")
    _wait(lambda: bool(heard))
    live.answered.disconnect(heard.append)
    return time.perf_counter() - begun


def _wait(until: Callable[[], bool]) -> None:
    while not until():
        QCoreApplication.processEvents(QEventLoop.ProcessEventsFlag.AllEvents, 2)
