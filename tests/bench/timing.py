"""Timing in turns: what is measured and its floor share every disturbance."""

import time
from collections.abc import Callable
from dataclasses import dataclass
from statistics import median

import numpy as np

_FLOOR_SIZE = 4096


def seconds(work: Callable[[], object]) -> float:
    """Return the wall time of one call of `work`."""
    begin = time.perf_counter()
    work()
    return time.perf_counter() - begin


@dataclass(frozen=True)
class Turns:
    """Times of several pieces of work, measured one after the other, round after round."""

    times: dict[str, tuple[float, ...]]

    def middle(self, name: str) -> float:
        """Return the median time of `name` in s."""
        return median(self.times[name])

    def ratio(self, name: str, floor: str) -> float:
        """Return the median over the rounds of the time of `name` over that of `floor` in the same round."""
        return median(a / b for a, b in zip(self.times[name], self.times[floor], strict=True))


def in_turns(rounds: int, **work: Callable[[], float]) -> Turns:
    """Call each of `work`, which return seconds, `rounds` times in turns."""
    times: dict[str, list[float]] = {name: [] for name in work}
    for _ in range(rounds):
        for name, measure in work.items():
            times[name].append(measure())
    return Turns({name: tuple(values) for name, values in times.items()})


def floor_seconds(points: int) -> float:
    """Return the time of one complex exponential and one complex square root for each of `points` values.

    This is the least that a solver which keeps nothing from point to point could take: numpy, arrays of 4096.
    """
    values = np.exp(1j * np.linspace(0.1, 6.0, _FLOOR_SIZE)) * np.linspace(0.5, 2.0, _FLOOR_SIZE)
    out = np.empty_like(values)

    def once() -> None:
        np.exp(values, out=out)
        np.sqrt(values, out=out)

    once()
    return median(seconds(once) for _ in range(25)) * points / _FLOOR_SIZE
