"""The worst value of a map or a curve, and where it is."""

from dataclasses import dataclass
from typing import Literal

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.polarizations import Polarization
from stackcore.quantities import Quantity
from stackcore.studies.curves import VariedResponse
from stackcore.studies.maps import MapLevel

Wanted = Literal["high", "low"]
"""Which values are good: high shielding, low insertion loss."""


@dataclass(frozen=True, slots=True)
class MapPlace:
    """A value of a map and its place: `row` along y and `column` along x, with the y and the x that stand there."""

    value: float
    x: float
    y: float
    row: int
    column: int


@dataclass(frozen=True, slots=True)
class CurvePlace:
    """A value of a varied response and its place: the value of the variation (SI), frequency (Hz), angle (rad)."""

    value: float
    varied_value: float
    frequency: float
    angle: float


def worst(level: MapLevel, wanted: Wanted) -> MapPlace | None:
    """Return the worst cell of a map, the first of equal ones; None where all are NaN.

    Parameters
    ----------
    level
        As far as it is computed; of the last one the answer is exact.
    wanted
        ``high``: the lowest value is the worst. ``low``: the highest is.

    Examples
    --------
    >>> level = MapLevel(np.array([1e9, 2e9]), np.array([0.0]), np.array([[0.3, 0.1]]), 1.0)
    >>> worst(level, "high")
    MapPlace(value=0.1, x=2000000000.0, y=0.0, row=0, column=1)
    """
    place = _place(level.values, wanted)
    if place is None:
        return None
    row, column = place
    return MapPlace(float(level.values[place]), float(level.x[column]), float(level.y[row]), row, column)


def worst_of_curve(
    varied: VariedResponse, quantity: Quantity, polarization: Polarization, wanted: Wanted
) -> CurvePlace | None:
    """Return the worst of a quantity over values, frequencies and angles, as `worst` does."""
    values = varied.of(quantity, polarization)
    place = _place(values, wanted)
    if place is None:
        return None
    number, frequency, angle = place
    first = varied.responses[0]
    return CurvePlace(
        float(values[place]),
        float(varied.values[number]),
        float(first.frequency[frequency]),
        float(first.angle[angle]),
    )


def _place(values: FloatArray, wanted: Wanted) -> tuple[int, ...] | None:
    known = ~np.isnan(values)
    if not known.any():
        return None
    if wanted == "high":
        place = np.argmin(np.where(known, values, np.inf))
    else:
        place = np.argmax(np.where(known, values, -np.inf))
    return tuple(int(index) for index in np.unravel_index(place, values.shape))
