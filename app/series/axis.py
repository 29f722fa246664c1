"""Titles and units of the axes: words, a comma, the unit."""

from dataclasses import dataclass
from typing import Final

import numpy as np

from app.document.view import Power
from app.series.shown import shown, shown_unit
from stackcore.media.base import FloatArray
from stackcore.quantities import quantity_named

_FREQUENCY_UNITS: Final = (
    (1e15, "PHz"),
    (1e12, "THz"),
    (1e9, "GHz"),
    (1e6, "MHz"),
    (1e3, "kHz"),
    (0.0, "Hz"),
)
_HERTZ: Final = {"Hz": 1.0, "kHz": 1e-3, "MHz": 1e-6, "GHz": 1e-9, "THz": 1e-12, "PHz": 1e-15}


@dataclass(frozen=True, slots=True)
class Axis:
    """What stands beside an axis.

    Parameters
    ----------
    title
        Words with unit: ``Frequency, GHz``.
    unit
        The unit alone, empty for a plain number.
    factor
        Multiplies an SI value to give the number at the axis.
    """

    title: str
    unit: str
    factor: float


def frequency_axis(frequency: FloatArray, *, log: bool = False) -> Axis:
    """Return the axis for frequencies in Hz.

    The unit fits the highest frequency of a linear axis, and the middle of a logarithmic one.

    Examples
    --------
    >>> frequency_axis(np.array([8e9, 12e9])).title
    'Frequency, GHz'
    """
    low, high = float(np.min(frequency)), float(np.max(frequency))
    measure = float(np.sqrt(low * high)) if log and low > 0 else high
    unit = next(unit for least, unit in _FREQUENCY_UNITS if measure >= least)
    return Axis(f"Frequency, {unit}", unit, _HERTZ[unit])


def quantity_axis(quantity: str, frequency: FloatArray, *, power: Power = "fraction") -> Axis:
    """Return the axis for a quantity over frequencies in Hz; the numbers of `curves_of` are already in its unit.

    Examples
    --------
    >>> quantity_axis("insertion_loss_dB", np.array([1e10])).title
    'Insertion loss, dB'
    """
    unit, factor = shown_unit(quantity, power=power, frequency=frequency)
    label = quantity_named(quantity).label
    return Axis(f"{label}, {unit}" if unit else label, unit, factor)


def is_power(quantity: str) -> bool:
    """Return whether `quantity` is a fraction of power, which can also be shown in per cent and in decibels."""
    return shown(quantity).fraction
