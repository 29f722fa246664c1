"""The visible part of the plane of the plot, and where its points lie in pixels. No toolkit."""

from dataclasses import dataclass
from typing import Final, overload

import numpy as np

from stackcore.arrays import FloatArray

FARTHEST: Final = 1e6
"""Pixels beyond which a point is not placed: the line to it looks the same and drawing stays exact."""


@dataclass(frozen=True, slots=True)
class Frame:
    """Ranges of the two axes (positions and values) and the size in pixels of the area that shows them.

    Examples
    --------
    >>> Frame(8.0, 12.0, 0.0, 100.0, 400.0, 200.0).across(9.0)
    100.0
    >>> Frame(8.0, 12.0, 0.0, 100.0, 400.0, 200.0).down(75.0)
    50.0
    """

    left: float
    right: float
    bottom: float
    top: float
    width: float
    height: float

    @overload
    def across(self, position: float) -> float: ...
    @overload
    def across(self, position: FloatArray) -> FloatArray: ...
    def across(self, position: float | FloatArray) -> float | FloatArray:
        """Return pixels from the left edge."""
        return _near((position - self.left) * (self.width / (self.right - self.left)))

    @overload
    def down(self, value: float) -> float: ...
    @overload
    def down(self, value: FloatArray) -> FloatArray: ...
    def down(self, value: float | FloatArray) -> float | FloatArray:
        """Return pixels from the upper edge."""
        return _near((self.top - value) * (self.height / (self.top - self.bottom)))

    def position(self, across: float) -> float:
        """Return the position on the frequency axis at `across` pixels; the inverse of `across`."""
        return self.left + across * (self.right - self.left) / max(self.width, 1.0)

    def value(self, down: float) -> float:
        """Return the value at `down` pixels; the inverse of `down`."""
        return self.top - down * (self.top - self.bottom) / max(self.height, 1.0)

    def holds(self, across: float, down: float, slack: float = 0.5) -> bool:
        """Whether a pixel lies in the area, give or take `slack`."""
        return -slack <= across <= self.width + slack and -slack <= down <= self.height + slack


def _near(pixels: float | FloatArray) -> float | FloatArray:
    if isinstance(pixels, np.ndarray):
        return np.clip(pixels, -FARTHEST, FARTHEST)
    return min(max(float(pixels), -FARTHEST), FARTHEST)


def finite_runs(values: FloatArray, leap: float = np.inf) -> tuple[tuple[int, int], ...]:
    """Return the stretches ``(first, past last)`` of a curve that can be drawn without a gap.

    Parameters
    ----------
    values
        Of the curve; not a number where there is nothing to draw.
    leap
        Neighbours that differ by more are not joined: a phase that turns over from 180 to −180 degrees.

    Examples
    --------
    >>> finite_runs(np.array([1.0, 2.0, np.nan, 3.0]))
    ((0, 2), (3, 4))
    """
    if not len(values):
        return ()
    known = np.isfinite(values)
    if known.all() and leap == np.inf:
        return ((0, len(values)),)
    steps = np.abs(np.diff(np.where(known, values, 0.0)))
    joined = known[:-1] & known[1:] & (steps <= leap)
    starts = np.flatnonzero(known & np.concatenate(([True], ~joined)))
    stops = np.flatnonzero(known & np.concatenate((~joined, [True]))) + 1
    return tuple((int(a), int(b)) for a, b in zip(starts, stops, strict=True))
