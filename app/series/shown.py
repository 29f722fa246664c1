"""How each quantity is shown: which end is the worst one, its unit on screen, and what a fraction becomes."""

from dataclasses import dataclass
from typing import Final, Literal

import numpy as np

from app.document.view import Power
from stackcore.media.base import FloatArray
from stackcore.quantities import element_absorptance, quantity_named


@dataclass(frozen=True, slots=True)
class Shown:
    """One row of `SHOWN`.

    Parameters
    ----------
    worst
        Which end of a curve is the worst point, or None when neither is.
    fraction
        Whether it is a fraction of the incident power, which per cent and decibels can show.
    practical
        Whether a large value stands for more than a real wall keeps (see `app.series.texts`).
    decimals
        Digits after the point on screen, or None for significant digits.
    wraps
        Whether it is an angle that runs from −180° to 180° and begins again.
    """

    worst: Literal["low", "high"] | None = None
    fraction: bool = False
    practical: bool = False
    decimals: int | None = None
    wraps: bool = False


SHOWN: Final[dict[str, Shown]] = {
    "reflectance": Shown("high", fraction=True),
    "transmittance": Shown("low", fraction=True),
    "absorptance": Shown("high", fraction=True),
    "return_loss_dB": Shown("low", decimals=3),
    "insertion_loss_dB": Shown("high", practical=True, decimals=3),
    "shielding_effectiveness_dB": Shown("low", practical=True, decimals=3),
    "reflection_phase_deg": Shown(decimals=2, wraps=True),
    "transmission_phase_deg": Shown(decimals=2, wraps=True),
    "insertion_phase_delay_deg": Shown(decimals=2),
    "group_delay_s": Shown(),
    "standing_wave_ratio": Shown("high"),
    "reflection_real": Shown(),
    "reflection_imaginary": Shown(),
    "transmission_real": Shown(),
    "transmission_imaginary": Shown(),
    "transmission_magnitude_dB": Shown("low", decimals=3),
    "input_resistance_ohm": Shown(),
    "input_reactance_ohm": Shown(),
    "input_impedance_ohm": Shown(),
    "copolar_transmittance_dB": Shown("low", decimals=3),
    "crosspolar_transmittance_dB": Shown("high", decimals=3),
    "copolar_reflectance_dB": Shown("high", decimals=3),
    "crosspolar_reflectance_dB": Shown("high", decimals=3),
    "cross_polar_discrimination_dB": Shown("low", decimals=3),
    "transmitted_axial_ratio_dB": Shown("high", decimals=3),
    "reflected_axial_ratio_dB": Shown("high", decimals=3),
    "transmission_phase_difference_deg": Shown(decimals=2, wraps=True),
    "reflection_phase_difference_deg": Shown(decimals=2, wraps=True),
}
"""Name of the quantity -> how it is shown."""

_ELEMENT: Final = Shown("high", fraction=True)


def shown(quantity: str) -> Shown:
    """Return how a quantity is shown, also one that needs an element.

    Examples
    --------
    >>> shown("element_absorptance:2").fraction
    True
    """
    return SHOWN[quantity] if element_absorptance(quantity) is None else _ELEMENT


_POWER_UNITS: Final[dict[Power, tuple[str, float]]] = {
    "fraction": ("", 1.0),
    "percent": ("%", 100.0),
    "decibels": ("dB", 1.0),
}
_SIGNS: Final = {"ohm": "Ω"}
_DELAY_UNITS: Final = ((1e12, "fs", 1e15), (1e9, "ps", 1e12), (1e6, "ns", 1e9), (0.0, "µs", 1e6))


def shown_unit(quantity: str, *, power: Power, frequency: FloatArray) -> tuple[str, float]:
    """Return the unit on screen and the factor from SI to it.

    The unit of a delay follows the frequencies of the sweep and not the delays, so that it stays while a face
    is dragged.

    Examples
    --------
    >>> shown_unit("group_delay_s", power="fraction", frequency=np.array([8e9, 12e9]))
    ('ps', 1000000000000.0)
    """
    if shown(quantity).fraction:
        return _POWER_UNITS[power]
    unit = quantity_named(quantity).unit
    if unit == "s":
        top = float(np.max(frequency))
        return next((unit, factor) for least, unit, factor in _DELAY_UNITS if top >= least)
    return _SIGNS.get(unit, unit), 1.0


def shown_values(quantity: str, values: FloatArray, *, power: Power, factor: float) -> FloatArray:
    """Return `values` in the unit on screen; a fraction of 0 in decibels is minus infinity."""
    if power == "decibels" and shown(quantity).fraction:
        with np.errstate(divide="ignore"):
            # A fraction is below 0 only by rounding.
            return np.asarray(10 * np.log10(np.maximum(values, 0.0)))
    return values * factor
