"""Every model answers at 10 001 frequencies in less than 3 ms."""

from time import perf_counter

import numpy as np
import pytest

from tests.stackcore.media.samples import MEDIA
from tests.stackcore.media.test_drude_lorentz import METALS

ALLOWED = 3e-3
TRIES = 60
FREQUENCY = np.geomspace(1e6, 1e15, 10_001)
TIMED = {**MEDIA, **METALS}


@pytest.mark.parametrize("name", TIMED)
def test_speed(name: str) -> None:
    """The best of some tries counts: other programs on the machine can only add to it."""
    medium, best = TIMED[name], np.inf
    for _ in range(TRIES):
        start = perf_counter()
        medium.evaluate(FREQUENCY)
        best = min(best, perf_counter() - start)
        if best < ALLOWED:
            return
    assert best < ALLOWED, f"{1e3 * best:.2f} ms"
