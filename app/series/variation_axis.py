"""The axis of what a study varies: its title, its unit, and how its values read. None stands for the angle."""

from dataclasses import dataclass

import numpy as np

from app.document.variation_edits import taken
from stackcore.arrays import FloatArray
from stackcore.job import Job
from stackcore.studies import Variation, variations_of
from stackcore.units import Dimension, degrees_of, format_value, parse_measure

STEEPEST: float = float(np.radians(89.5))
"""Largest angle of a study in rad; grazing incidence itself is no angle of a plane wave."""
USUAL_STEEPEST: float = float(np.radians(85.0))
"""End of a study over the angle for a job of one angle."""


@dataclass(frozen=True, slots=True)
class VariationAxis:
    """What stands beside the axis.

    Parameters
    ----------
    title
        Words with unit.
    unit
        The unit alone, empty for a plain number.
    factor, offset
        An SI value times the factor, plus the offset, is the number at the axis.
    """

    title: str
    unit: str
    factor: float
    offset: float = 0.0

    def numbers(self, values: FloatArray) -> FloatArray:
        """Return what stands at the axis for SI values."""
        return values * self.factor + self.offset


def variation_axis(variation: Variation | None, low: float, high: float) -> VariationAxis:
    """Return the axis for what is varied from `low` to `high`, SI.

    Examples
    --------
    >>> variation_axis(None, 0.0, 1.0).title
    'Angle of incidence, deg'
    """
    if variation is None:
        return VariationAxis("Angle of incidence, deg", "deg", 180.0 / np.pi)
    if variation.dimension is Dimension.NUMBER:
        return VariationAxis(variation.label, "", 1.0)
    if variation.dimension is Dimension.TEMPERATURE:
        return VariationAxis(f"{variation.label}, °C", "°C", 1.0, -273.15)
    unit = unit_of(variation.dimension, max(abs(low), abs(high)))
    factor = 1 / parse_measure(f"1 {unit}", variation.dimension).value
    return VariationAxis(f"{variation.label}, {unit}", unit, factor)


def unit_of(dimension: Dimension, size: float) -> str:
    """Return the unit in which values up to `size` (SI) read well.

    Examples
    --------
    >>> unit_of(Dimension.LENGTH, 0.0098)
    'mm'
    """
    return format_value(float(f"{size:.3g}"), dimension).partition(" ")[2]


def varied_words(variation: Variation | None, value: float) -> str:
    """Return a value (SI) of what is varied in words: ``9.86 mm``, ``30°``."""
    if variation is None:
        return f"{degrees_of(value):.4g}°"
    return format_value(taken(variation, value), variation.dimension)


def variation_at(job: Job, stack: int, path: str) -> Variation | None:
    """Return the variation of a path, None for an empty one and for what is no longer there."""
    return next((one for one in variations_of(job, stack) if one.path == path), None) if path else None


def usual_range(job: Job, stack: int, path: str) -> tuple[float, float]:
    """Return the ends a study begins with, SI: those of the variation, or the sweep's angles."""
    variation = variation_at(job, stack, path)
    if variation is not None:
        return variation.low, variation.high
    angles = job.sweep.angles()
    low, high = float(angles.min()), float(angles.max())
    return (0.0, USUAL_STEEPEST) if low == high else (low, high)
