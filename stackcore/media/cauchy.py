"""Power series in the wavelength for the refractive index of glasses (Cauchy and the glass makers)."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_number
from stackcore.media.parts import complex_of, electric, electric_slopes

GREATEST_EXPONENT: Final = 10
"""Published series end at λ⁻⁸ to λ⁻¹⁰; far outside its range a higher power would leave the range of a double."""

_LEAST_SUM = 1e-16
_LARGEST_COEFFICIENT = 1e6
_MICROMETRES_TIMES_HERTZ = SPEED_OF_LIGHT * 1e6


@dataclass(frozen=True, slots=True)
class CauchyTerm:
    """One term c (λ/1 µm)^p: its coefficient c, and its exponent p, a whole number from −10 to 10 but 0."""

    coefficient: float
    exponent: int


@dataclass(frozen=True, slots=True)
class CauchyMedium(AbstractMedium):
    """n = A + Σ cᵢ(λ/1 µm)^pᵢ, ε = (n − jk)², μ = 1; λ is the vacuum wavelength.

    Parameters
    ----------
    constant
        A.
    terms
        The powers of λ; none makes a constant index.
    extinction
        k ≥ 0, the same at every wavelength.
    squared
        The series gives n² instead of n, as glass makers long published it.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite, a series of 0, an exponent that is not allowed, or gain.

    Notes
    -----
    A fit over its range and nothing more; not causal. Far outside, where the sum passes through 0, its magnitude is
    taken (at least 1e-16), so that the medium stays passive. Source: A.-L. Cauchy, Mémoire sur la dispersion de la
    lumière (1836).

    Examples
    --------
    >>> glass = CauchyMedium(1.5130, (CauchyTerm(-0.003169, 2), CauchyTerm(0.003962, -2)))
    >>> light = np.array(299792458 / 0.55e-6)
    >>> round(float(np.sqrt(glass.evaluate(light).permittivity.real)), 6)
    1.525139
    """

    constant: float
    terms: tuple[CauchyTerm, ...] = ()
    extinction: float = 0.0
    squared: bool = False
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        _check_coefficient("constant", self.constant)
        if not isinstance(self.terms, tuple):
            raise ValueError(f"terms must be a tuple, not a {type(self.terms).__name__}")
        for place, term in enumerate(self.terms):
            _check_coefficient(f"terms[{place}].coefficient", term.coefficient)
            if term.exponent != int(term.exponent) or not 1 <= abs(term.exponent) <= GREATEST_EXPONENT:
                raise ValueError(
                    f"terms[{place}].exponent {term.exponent} must be a whole number from −{GREATEST_EXPONENT} to "
                    f"{GREATEST_EXPONENT}, and not 0"
                )
        if self.constant == 0 and not any(term.coefficient for term in self.terms):
            raise ValueError("constant and every coefficient are 0: there is no index left")
        check_loss("extinction", self.extinction)

    @property
    def dispersive(self) -> bool:
        return any(term.coefficient for term in self.terms)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        wavelength = _micrometres(frequency)
        total, by_log_frequency = np.full(frequency.shape, self.constant), np.zeros(frequency.shape)
        for term in self.terms:
            part = term.coefficient * wavelength**term.exponent
            total += part
            by_log_frequency -= term.exponent * part
        index, by_sum = self._index(total)
        k = self.extinction
        value = complex_of((index - k) * (index + k), -2 * k * index)
        return electric(value, self._by_sum(index, by_sum) * by_log_frequency / frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        wavelength = _micrometres(frequency)
        powers = [wavelength**term.exponent for term in self.terms]
        total = np.full(np.shape(frequency), self.constant)
        for term, power in zip(self.terms, powers, strict=True):
            total += term.coefficient * power
        index, by_sum = self._index(total)
        by_total = self._by_sum(index, by_sum)
        slopes: dict[str, ComplexArray | complex] = {"constant": by_total}
        for place, power in enumerate(powers):
            slopes[f"terms[{place}].coefficient"] = by_total * power
        slopes["extinction"] = complex_of(-2 * self.extinction, -2 * index)
        return electric_slopes(frequency, slopes)

    def _index(self, total: FloatArray) -> tuple[FloatArray, FloatArray]:
        """Return n and its slope with respect to the sum."""
        sign = np.where(total < 0, -1.0, 1.0)
        size = np.maximum(np.abs(total), _LEAST_SUM)
        if not self.squared:
            return size, sign
        index = np.sqrt(size)
        return index, sign / (2 * index)

    def _by_sum(self, index: FloatArray, by_sum: FloatArray) -> ComplexArray:
        """Return the slope of ε = (n − jk)² with respect to the sum."""
        slope: ComplexArray = 2 * complex_of(index, -self.extinction) * by_sum
        return slope


def _check_coefficient(name: str, value: float) -> None:
    check_number(name, value)
    if abs(value) > _LARGEST_COEFFICIENT:
        raise ValueError(f"{name} {value:g} is beyond {_LARGEST_COEFFICIENT:g}; the wavelength is in µm")


def _micrometres(frequency: FloatArray) -> FloatArray:
    wavelength: FloatArray = _MICROMETRES_TIMES_HERTZ / np.asarray(frequency, dtype=np.float64)
    return wavelength
