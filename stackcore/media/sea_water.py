"""Sea water with its temperature and salinity."""

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import ClassVar, Final

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive, FrequencyRange, Provenance
from stackcore.media.checks import check_loss
from stackcore.media.parts import electric_slopes
from stackcore.media.temperature import (
    ZERO_CELSIUS,
    ConditionRange,
    LiquidState,
    celsius,
    check_temperature,
    liquid_slope,
    liquid_values,
)

SALTIEST: Final = 45.0
"""g/kg. Beyond, the polynomials of the model were never compared with water."""

COLDEST_SEA: Final = celsius(-5.0)
"""K, beneath where even salty water freezes."""

HOTTEST_SEA: Final = celsius(45.0)
"""K. The model's cubic of the static permittivity has its minimum near 38 °C and is wrong well above."""

KLEIN_SWIFT_RANGE: Final = FrequencyRange(1e6, 10e9)

KLEIN_SWIFT_SOURCE: Final = Provenance(
    "L. A. Klein, C. T. Swift, IEEE Trans. Antennas Propag. 25(1), 104-111 (1977)",
    "read",
    note="fitted to measurements at 1.43 GHz and 2.65 GHz; coefficients read in a transcription of the source, "
    "ranges recalled",
)


@dataclass(frozen=True, slots=True)
class SeaWaterMedium(AbstractMedium):
    """ε = 4.9 + (εₛ − 4.9)/(1 + jωτ) − jσ/(ωε₀), μ = 1, with εₛ, τ and σ polynomials in temperature and salinity.

    Parameters
    ----------
    temperature
        T in K (`celsius` gives it from °C).
    salinity
        S in grams of salt per kilogram of water (parts per thousand); the open sea has about 35.
    valid_range, provenance
        See `stackcore.media.base`; the defaults are those of the source.

    Raises
    ------
    ValueError
        For a temperature outside −5 °C to 45 °C, or a salinity below 0 or above 45 g/kg.

    Notes
    -----
    Klein and Swift fitted 0 °C to 40 °C and 4 g/kg to 35 g/kg, and found it good up to about 10 GHz.

    Examples
    --------
    >>> import numpy as np
    >>> complex(np.round(SeaWaterMedium(celsius(20), 35.0).evaluate(np.array(10e9)).permittivity, 3))
    (55.848-37.711j)
    """

    temperature: float
    salinity: float = 35.0
    valid_range: FrequencyRange | None = KLEIN_SWIFT_RANGE
    provenance: Provenance = KLEIN_SWIFT_SOURCE

    temperature_range: ClassVar[tuple[float, float]] = (ZERO_CELSIUS, celsius(40.0))
    salinity_range: ClassVar[tuple[float, float]] = (4.0, 35.0)

    def __post_init__(self) -> None:
        check_temperature(self.temperature, COLDEST_SEA, HOTTEST_SEA, "where the model knows sea water")
        check_loss("salinity", self.salinity, "g/kg")
        if self.salinity > SALTIEST:
            raise ValueError(f"salinity {self.salinity:g} g/kg is above {SALTIEST:g} g/kg, saltier than the model")

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def condition_ranges(self) -> tuple[ConditionRange, ...]:
        """Where the source's fit holds."""
        return (
            ConditionRange("temperature", *self.temperature_range, "K", self.temperature),
            ConditionRange("salinity", *self.salinity_range, "g/kg", self.salinity),
        )

    @property
    def static_permittivity(self) -> float:
        """εₛ."""
        return self._static()[0]

    @property
    def relaxation_time(self) -> float:
        """τ in s."""
        return self._time()[0]

    @property
    def conductivity(self) -> float:
        """σ in S/m."""
        return self._conductivity()[0]

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        return liquid_values(frequency, self._state(0))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        state = self._state(0)
        return electric_slopes(
            frequency,
            {
                "temperature": liquid_slope(frequency, state, self._state(1)),
                "salinity": liquid_slope(frequency, state, self._state(2)),
            },
        )

    def _state(self, which: int) -> LiquidState:
        """Return the constants (0), or their derivatives with respect to temperature (1) or salinity (2)."""
        high = 4.9 if which == 0 else 0.0
        step = self._static()[which] - high
        return LiquidState(high, ((step, self._time()[which]),), self._conductivity()[which])

    def _static(self) -> tuple[float, float, float]:
        t, s = self.temperature - ZERO_CELSIUS, self.salinity
        fresh, fresh_change = _cubic(t, 87.134, -0.1949, -1.276e-2, 2.491e-4)
        salt, salt_change = _cubic(s, 1.0, 1.613e-5 * t - 3.656e-3, 3.210e-5, -4.232e-7)
        return fresh * salt, fresh_change * salt + fresh * 1.613e-5 * s, fresh * salt_change

    def _time(self) -> tuple[float, float, float]:
        t, s = self.temperature - ZERO_CELSIUS, self.salinity
        fresh, fresh_change = _cubic(t, 1.768e-11, -6.086e-13, 1.104e-14, -8.111e-17)
        salt, salt_change = _cubic(s, 1.0, 2.282e-5 * t - 7.638e-4, -7.760e-6, 1.105e-8)
        return fresh * salt, fresh_change * salt + fresh * 2.282e-5 * s, fresh * salt_change

    def _conductivity(self) -> tuple[float, float, float]:
        s, below = self.salinity, 25 - (self.temperature - ZERO_CELSIUS)
        at_25, at_25_change = _cubic(s, 0.0, 0.182521, -1.46192e-3, 2.09324e-5)
        at_25 -= 1.28205e-7 * s**4
        at_25_change -= 4 * 1.28205e-7 * s**3
        fresh, fresh_change = _cubic(below, 2.033e-2, 1.266e-4, 2.464e-6, 0.0)
        salt, salt_change = _cubic(below, 1.849e-5, -2.551e-7, 2.551e-8, 0.0)
        exponent = fresh - s * salt
        warmth = math.exp(-below * exponent)
        by_kelvin = exponent + below * (fresh_change - s * salt_change)
        return at_25 * warmth, at_25 * warmth * by_kelvin, warmth * (at_25_change + at_25 * below * salt)


def _cubic(x: float, constant: float, linear: float, square: float, cube: float) -> tuple[float, float]:
    """Return a cubic in x and its derivative."""
    value = constant + x * (linear + x * (square + x * cube))
    return value, linear + x * (2 * square + 3 * x * cube)
