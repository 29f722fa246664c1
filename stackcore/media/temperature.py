"""Temperature as a condition of a material, and relaxing liquids whose constants depend on conditions."""

import math
import re
from dataclasses import dataclass
from fractions import Fraction
from typing import Final

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.errors import UnitError
from stackcore.media.base import Constitutive
from stackcore.media.checks import check_number
from stackcore.media.parts import conduction, electric, everywhere
from stackcore.media.relaxation import relaxation, relaxed
from stackcore.units import Measure

ZERO_CELSIUS: Final = 273.15
"""0 °C in K, exact."""

_ALLOWED: Final = "a temperature in °C or K, for example '20 °C' or '293.15 K'"

_SCALES: Final[dict[str, tuple[Fraction, Fraction]]] = {
    "k": (Fraction(1), Fraction(0)),
    "kelvin": (Fraction(1), Fraction(0)),
    "°c": (Fraction(1), Fraction(27315, 100)),
    "c": (Fraction(1), Fraction(27315, 100)),
    "degc": (Fraction(1), Fraction(27315, 100)),
    "celsius": (Fraction(1), Fraction(27315, 100)),
    "°f": (Fraction(5, 9), Fraction(45967, 180)),
    "f": (Fraction(5, 9), Fraction(45967, 180)),
    "degf": (Fraction(5, 9), Fraction(45967, 180)),
}
"""Unit as typed, small letters -> size of a degree in K, and its zero in K."""

_TEMPERATURE: Final = re.compile(r"([+-]?\d{1,9}(?:[.,]\d{0,30})?(?:[eE][+-]?\d{1,2})?)\s*(\D*)")


@dataclass(frozen=True, slots=True)
class ConditionRange:
    """Where a model holds in one condition other than frequency, and what was given.

    Parameters
    ----------
    name
        Name of the constant, as in a job file: ``temperature``, ``salinity``.
    lowest, highest
        The closed range of the model's source, in `unit`.
    unit
        ``K`` for a temperature, ``g/kg`` for a salinity.
    given
        The constant itself.
    """

    name: str
    lowest: float
    highest: float
    unit: str
    given: float

    @property
    def held(self) -> bool:
        """Whether the range holds what was given; the rounding of °C to K is not held against it."""
        slack = 1e-9 * max(abs(self.lowest), abs(self.highest))
        return self.lowest - slack <= self.given <= self.highest + slack


def celsius(degrees: float) -> float:
    """Return K from °C.

    Examples
    --------
    >>> celsius(20.0)
    293.15
    """
    return float(Fraction(repr(float(degrees))) + Fraction(27315, 100))


def check_temperature(temperature: float, lowest: float, highest: float, where: str) -> None:
    """Refuse a temperature in K outside a range; `where` says what the range is.

    Raises
    ------
    ValueError
        With the same number taken as °C where that was likely meant.
    """
    check_number("temperature", temperature)
    if not lowest <= temperature <= highest:
        near = ""
        if lowest <= temperature + ZERO_CELSIUS <= highest:
            near = f"; {temperature:g} °C would be {celsius(temperature):g} K"
        raise ValueError(
            f"temperature {temperature:g} K ({temperature - ZERO_CELSIUS:g} °C) must lie between {lowest:g} K and "
            f"{highest:g} K, {where}{near}"
        )


def read_temperature(given: object) -> Measure:
    """Read a temperature: a number is in K, a text has its unit.

    Raises
    ------
    UnitError
        When it is no temperature, or below absolute zero.

    Examples
    --------
    >>> read_temperature("20 °C")
    Measure(value=293.15, text='20 °C')
    """
    if isinstance(given, str):
        value = _parsed(given)
        text = given.strip()
    elif isinstance(given, int | float) and not isinstance(given, bool):
        value, text = float(given), repr(given)
    else:
        raise UnitError(f"{given!r} is not a temperature", _ALLOWED)
    if not math.isfinite(value):
        raise UnitError(f"the temperature {text} is not finite", _ALLOWED)
    if value < 0:
        raise UnitError(f"the temperature {text!r} lies below absolute zero", _ALLOWED)
    return Measure(value, text)


def _parsed(text: str) -> float:
    cleaned = text.strip().replace("−", "-").replace("º", "°").replace("˚", "°").replace("℃", "°C")
    found = _TEMPERATURE.fullmatch(cleaned)
    if found is None:
        raise UnitError(f"{text!r} is not a temperature", _ALLOWED)
    number, unit = found[1].replace(",", "."), found[2].casefold().replace(" ", "")
    if not unit:
        raise UnitError(f"the temperature {text!r} has no unit", _ALLOWED)
    if unit not in _SCALES:
        raise UnitError(f"unknown unit {found[2]!r} of temperature in {text!r}", _ALLOWED)
    size, zero = _SCALES[unit]
    return float(Fraction(number) * size + zero)


@dataclass(frozen=True, slots=True)
class LiquidState:
    """The constants of a relaxing liquid at its conditions, or their derivatives with respect to one condition.

    Parameters
    ----------
    high
        ε∞.
    terms
        Step Δε and time τ in s of each Debye relaxation.
    conductivity
        σ in S/m.
    """

    high: float
    terms: tuple[tuple[float, float], ...]
    conductivity: float = 0.0


def liquid_values(frequency: FloatArray, state: LiquidState) -> Constitutive:
    """Return ε∞ + Σ Δε/(1 + jωτ) − jσ/(ωε₀) with μ = 1, and the slopes per Hz."""
    terms = [(step, relaxation(frequency, time)) for step, time in state.terms]
    return electric(*relaxed(frequency, state.high, state.conductivity, *terms))


def liquid_slope(frequency: FloatArray, state: LiquidState, change: LiquidState) -> ComplexArray:
    """Return the derivative of ε with respect to a condition that changes the constants of `state` by `change`."""
    slope = everywhere(change.high, frequency)
    for (step, time), (step_change, time_change) in zip(state.terms, change.terms, strict=True):
        part = relaxation(frequency, time)
        slope += step_change * part.value + step * (time_change / time) * part.by_log_frequency
    if change.conductivity:
        slope += change.conductivity * conduction(frequency)
    return slope
