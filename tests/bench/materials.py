"""Materials: every entry of the library at 10,001 frequencies, and reading the whole library."""

import math
import subprocess
import sys
from collections.abc import Iterator
from functools import partial

import numpy as np

from stackcore.media.library import read_library
from tests.bench.timing import in_turns, seconds

POINTS = 10_001
LIMIT = 3e-3
"""Seconds an entry may take on the machine this was written on; as a ratio, see the report."""

READ = (
    "import time; from stackcore.media.library import read_library; begun = time.perf_counter(); "
    "count = len(read_library().entries); print(time.perf_counter() - begun, count)"
)


def report() -> Iterator[str]:
    """Yield the slowest entries as ratios to one complex exponential of the same length, and the reading."""
    phase = 1j * np.linspace(0.0, 20.0, POINTS)
    timed = []
    for entry in read_library().entries:
        known = entry.valid_range
        lowest, highest = max(known.lowest, 1.0), min(known.highest, 1e16)
        frequency = np.geomspace(lowest, highest, POINTS)
        evaluate = partial(entry.medium.evaluate, frequency)
        turns = in_turns(5, floor=lambda: seconds(lambda: np.exp(phase)), entry=partial(seconds, evaluate))
        timed.append((turns.ratio("entry", "floor"), turns.middle("entry"), entry.key, entry.model))
    timed.sort(reverse=True)
    for ratio, took, key, model in timed[:5]:
        yield f"{key} ({model}) at {POINTS} frequencies: {ratio:.1f} floors, {took * 1e3:.2f} ms"
    yield f"median of {len(timed)} entries: {timed[len(timed) // 2][0]:.2f} floors"
    yield f"over {LIMIT * 1e3:g} ms: {sum(took > LIMIT for _, took, _, _ in timed)} entries"
    took, count = _reading()
    yield f"reading all {count} entries in a new process: {took * 1e3:.0f} ms"


def _reading() -> tuple[float, int]:
    """Return the seconds that reading the whole library takes in a process that has read nothing, best of three."""
    least, count = math.inf, 0
    for _ in range(3):
        run = subprocess.run([sys.executable, "-c", READ], capture_output=True, text=True, check=True)
        took, number = run.stdout.split()
        least, count = min(least, float(took)), int(number)
    return least, count
