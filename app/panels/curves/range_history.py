"""What the axes of a plot showed before: a step back and forward, as for edits. No toolkit."""

import math
import time
from collections.abc import Callable
from dataclasses import dataclass
from typing import Final

GESTURE: Final = 0.6
"""Seconds; changes that follow each other faster are one gesture: a drag, some notches of the wheel."""
DEEPEST: Final = 50


@dataclass(frozen=True, slots=True)
class Shown:
    """Ranges of positions and of values, and which of them follow the data."""

    positions: tuple[float, float]
    values: tuple[float, float]
    follows: tuple[bool, bool]


class RangeHistory:
    """Keeps what was shown before each gesture.

    Parameters
    ----------
    now
        Seconds that only grow.
    """

    def __init__(self, now: Callable[[], float] = time.monotonic) -> None:
        self._now = now
        self._back: list[Shown] = []
        self._forward: list[Shown] = []
        self._last = -math.inf

    @property
    def can_go(self) -> tuple[bool, bool]:
        """Whether there is a step back, and one forward."""
        return bool(self._back), bool(self._forward)

    def note(self, shown: Shown) -> None:
        """Remember what is shown before it changes; within a gesture only the first."""
        moment = self._now()
        if moment - self._last > GESTURE and (not self._back or self._back[-1] != shown):
            self._back = [*self._back[1 - DEEPEST :], shown]
        self._last = moment
        self._forward.clear()

    def back(self, shown: Shown) -> Shown | None:
        """Return what was shown before `shown`, None at the beginning."""
        return self._go(self._back, self._forward, shown)

    def forward(self, shown: Shown) -> Shown | None:
        """Return what was shown before the last step back, None at the end."""
        return self._go(self._forward, self._back, shown)

    def _go(self, taken: list[Shown], given: list[Shown], shown: Shown) -> Shown | None:
        self._last = -math.inf
        while taken:
            found = taken.pop()
            if found != shown:
                given.append(shown)
                return found
        return None
