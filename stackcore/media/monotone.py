"""Piecewise cubic interpolation that never overshoots its points, with its exact slope.

Between two neighbours the curve is monotone and so stays between their values; a column without a negative value
has no negative value anywhere. Slopes at the points are weighted harmonic means of the slopes on both sides, 0
where these differ in sign.

Source: F. N. Fritsch, R. E. Carlson, SIAM J. Numer. Anal. 17, 238 (1980); the slopes after F. N. Fritsch,
J. Butland, SIAM J. Sci. Stat. Comput. 5, 300 (1984).
"""

from dataclasses import dataclass
from typing import Literal

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import FloatArray

Ordinate = Literal["plain", "logarithm", "negative logarithm"]
"""How a column is interpolated: itself, or by the logarithm of its size where it has one sign throughout."""


@dataclass(frozen=True, slots=True, eq=False)
class MonotoneCurve:
    """Cubic pieces between points x₀ < x₁ < …; made by `monotone_curve`."""

    x: FloatArray
    coefficients: FloatArray
    ordinate: Ordinate

    def at(self, x: FloatArray, piece: NDArray[np.intp]) -> tuple[FloatArray, FloatArray]:
        """Return the values and the slopes at `x`, which lie in the pieces numbered `piece`."""
        start, first, second, third = np.take(self.coefficients, piece, axis=1)
        along = x - self.x[piece]
        value = start + along * (first + along * (second + along * third))
        slope = first + along * (2 * second + along * (3 * third))
        if self.ordinate == "plain":
            return value, slope
        value = np.exp(value)
        if self.ordinate == "negative logarithm":
            value = -value
        return value, value * slope


def monotone_curve(x: FloatArray, y: FloatArray) -> MonotoneCurve:
    """Return the curve through two or more points, `x` rising.

    A column of one sign is interpolated by its logarithm, so that a power of frequency, such as the loss of a
    conductor, is met exactly when `x` is a logarithm too.

    Examples
    --------
    >>> curve = monotone_curve(np.array([0.0, 1.0, 2.0]), np.array([1.0, 10.0, 100.0]))
    >>> value, slope = curve.at(np.array([0.5]), np.array([0]))
    >>> float(value[0].round(6))
    3.162278
    """
    ordinate: Ordinate = "plain"
    if y.min() > 0:
        ordinate, y = "logarithm", np.log(y)
    elif y.max() < 0:
        ordinate, y = "negative logarithm", np.log(-y)
    width, rise = np.diff(x), np.diff(y) / np.diff(x)
    at_points = _slopes(width, rise)
    left, right = at_points[:-1], at_points[1:]
    second = (3 * rise - 2 * left - right) / width
    third = (left + right - 2 * rise) / width**2
    return MonotoneCurve(x, np.stack((y[:-1], left, second, third)), ordinate)


def _slopes(width: FloatArray, rise: FloatArray) -> FloatArray:
    """Return the slopes at the points from the widths and the mean slopes of the pieces."""
    if rise.size == 1:
        return np.repeat(rise, 2)
    slopes = np.zeros(rise.size + 1)
    before, after = rise[:-1], rise[1:]
    together = np.sign(before) * np.sign(after) > 0
    weight_before, weight_after = 2 * width[1:] + width[:-1], width[1:] + 2 * width[:-1]
    before, after = np.where(together, before, 1.0), np.where(together, after, 1.0)
    mean = (weight_before + weight_after) / (weight_before / before + weight_after / after)
    slopes[1:-1] = np.where(together, mean, 0.0)
    slopes[0] = _end_slope(width[0], width[1], rise[0], rise[1])
    slopes[-1] = _end_slope(width[-1], width[-2], rise[-1], rise[-2])
    return slopes


def _end_slope(width: float, next_width: float, rise: float, next_rise: float) -> float:
    """Return the slope of the parabola through the last three points, held back where it would overshoot."""
    slope = ((2 * width + next_width) * rise - width * next_rise) / (width + next_width)
    if slope * rise <= 0:
        return 0.0
    if rise * next_rise <= 0 and abs(slope) > 3 * abs(rise):
        return 3 * rise
    return slope
