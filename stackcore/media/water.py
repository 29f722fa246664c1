"""Pure liquid water by two published fits.

The two disagree by up to 4 % below 30 GHz and by up to 16 % at 100 GHz, which is how well water is known there.
"""

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import ClassVar, Final

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive, FrequencyRange, Provenance
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

COLDEST_LIQUID: Final = celsius(-40.0)
"""K. Below, water freezes by itself however clean it is."""

HOTTEST_LIQUID: Final = celsius(100.0)
"""K, boiling at sea level."""

LIEBE_RANGE: Final = FrequencyRange(1e6, 1e12)

LIEBE_SOURCE: Final = Provenance(
    "H. J. Liebe, G. A. Hufford, T. Manabe, Int. J. Infrared Millim. Waves 12(12), 659-675 (1991); the model of "
    "ITU-R P.840",
    "read",
    note="pure liquid water; coefficients read in transcriptions of the source",
)

ELLISON_RANGE: Final = FrequencyRange(1e6, 500e9)

ELLISON_SOURCE: Final = Provenance(
    "W. J. Ellison, J. Phys. Chem. Ref. Data 36(1), 1-18 (2007), Table 2, relaxation part alone",
    "read",
    note="pure liquid water; without the two resonances of the far infrared, which add less than 1 % below "
    "500 GHz; coefficients read in a transcription of the source",
)


@dataclass(frozen=True, slots=True)
class LiebeWaterMedium(AbstractMedium):
    """Double-Debye water: ε = ε₂ + (ε₁ − ε₂)/(1 + jf/f₂) + (ε₀ − ε₁)/(1 + jf/f₁), μ = 1.

    With Θ = 1 − 300 K/T: ε₀ = 77.66 − 103.3 Θ, ε₁ = 0.0671 ε₀, ε₂ = 3.52 + 7.52 Θ,
    f₁ = (20.20 + 146.4 Θ + 316 Θ²) GHz, f₂ = 39.8 f₁.

    Parameters
    ----------
    temperature
        T in K (`celsius` gives it from °C).
    valid_range, provenance
        See `stackcore.media.base`; the defaults are those of the source.

    Raises
    ------
    ValueError
        For a temperature at which water is no liquid.

    Notes
    -----
    Fitted to measurements from 270 K to 310 K up to 1 THz; a later edition keeps ε₂ = 3.52 at every temperature.
    Salts and other impurities, which conduct below some gigahertz, are left out.

    Examples
    --------
    >>> import numpy as np
    >>> complex(np.round(LiebeWaterMedium(celsius(20)).evaluate(np.array(10e9)).permittivity, 3))
    (60.789-32.721j)
    """

    temperature: float
    valid_range: FrequencyRange | None = LIEBE_RANGE
    provenance: Provenance = LIEBE_SOURCE

    temperature_range: ClassVar[tuple[float, float]] = (270.0, 310.0)

    def __post_init__(self) -> None:
        check_temperature(self.temperature, COLDEST_LIQUID, HOTTEST_LIQUID, "where water is liquid")

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def condition_ranges(self) -> tuple[ConditionRange, ...]:
        """Where the source's fit holds."""
        return (ConditionRange("temperature", *self.temperature_range, "K", self.temperature),)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        return liquid_values(frequency, self._states()[0])

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return electric_slopes(frequency, {"temperature": liquid_slope(frequency, *self._states())})

    def _states(self) -> tuple[LiquidState, LiquidState]:
        """Return the constants and their derivatives with respect to T."""
        theta, by_kelvin = 1 - 300 / self.temperature, 300 / self.temperature**2
        static, static_change = 77.66 - 103.3 * theta, -103.3 * by_kelvin
        high, high_change = 3.52 + 7.52 * theta, 7.52 * by_kelvin
        corner = (20.20 + 146.4 * theta + 316 * theta * theta) * 1e9
        time = 1 / (2 * math.pi * corner)
        time_change = -time / corner * (146.4 + 632 * theta) * 1e9 * by_kelvin
        fast = 1 / 39.8
        state = LiquidState(high, ((0.9329 * static, time), (0.0671 * static - high, fast * time)))
        slow_change = (0.9329 * static_change, time_change)
        fast_change = (0.0671 * static_change - high_change, fast * time_change)
        return state, LiquidState(high_change, (slow_change, fast_change))


@dataclass(frozen=True, slots=True)
class EllisonWaterMedium(AbstractMedium):
    """Triple-Debye water: ε = εₛ − Σ Δᵢ jωτᵢ/(1 + jωτᵢ), μ = 1, the relaxation part of Ellison's formula.

    With t in °C: Δᵢ = aᵢ exp(−bᵢt), τᵢ = cᵢ exp(dᵢ/(t + 133.1383)), and a cubic for the static εₛ.

    Parameters
    ----------
    temperature
        T in K (`celsius` gives it from °C).
    valid_range, provenance
        See `stackcore.media.base`; the defaults are those of the source.

    Raises
    ------
    ValueError
        For a temperature at which water is no liquid.

    Notes
    -----
    Fitted from 0 °C to 100 °C. The source adds two resonances for the far infrared; what they add is below 0.01 %
    up to 30 GHz, 0.1 % at 100 GHz and 1 % at 500 GHz, where the valid range therefore ends.

    Examples
    --------
    >>> import numpy as np
    >>> complex(np.round(EllisonWaterMedium(celsius(20)).evaluate(np.array(10e9)).permittivity, 3))
    (60.154-32.724j)
    """

    temperature: float
    valid_range: FrequencyRange | None = ELLISON_RANGE
    provenance: Provenance = ELLISON_SOURCE

    temperature_range: ClassVar[tuple[float, float]] = (ZERO_CELSIUS, HOTTEST_LIQUID)

    def __post_init__(self) -> None:
        check_temperature(self.temperature, COLDEST_LIQUID, HOTTEST_LIQUID, "where water is liquid")

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def condition_ranges(self) -> tuple[ConditionRange, ...]:
        """Where the source's fit holds."""
        return (ConditionRange("temperature", *self.temperature_range, "K", self.temperature),)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        return liquid_values(frequency, self._states()[0])

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return electric_slopes(frequency, {"temperature": liquid_slope(frequency, *self._states())})

    def _states(self) -> tuple[LiquidState, LiquidState]:
        """Return the constants and their derivatives with respect to T."""
        t = self.temperature - ZERO_CELSIUS
        high = 87.9144 - 0.404399 * t + 9.58726e-4 * t**2 - 1.32802e-6 * t**3
        high_change = -0.404399 + 2 * 9.58726e-4 * t - 3 * 1.32802e-6 * t**2
        terms, changes = [], []
        for size, decay, shortest, degrees in _ELLISON_TERMS:
            step, above = size * math.exp(-decay * t), t + 133.1383
            time = shortest * math.exp(degrees / above)
            terms.append((step, time))
            changes.append((-decay * step, -time * degrees / above**2))
            high -= step
            high_change += decay * step
        return LiquidState(high, tuple(terms)), LiquidState(high_change, tuple(changes))


_ELLISON_TERMS: Final = (
    (79.23882, 0.004300598, 1.382264e-13, 652.7648),
    (3.815866, 0.01117295, 3.510354e-16, 1249.533),
    (1.634967, 0.006841548, 6.30035e-15, 405.5169),
)
"""Each relaxation: aᵢ, bᵢ in 1/°C, cᵢ in s, dᵢ in °C (Table 2)."""
