"""The dispersion formula of transparent crystals and glasses (Sellmeier)."""

from collections.abc import Iterable, Mapping
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
from stackcore.media.checks import check_loss, check_number, check_positive, check_terms
from stackcore.media.parts import complex_of, electric, electric_slopes, never_zero

_MICROMETRE = 1e-6
NEAREST_TO_POLE: Final = 1e-12
"""Nearer to a pole than this, relative, the formula is held: it is infinite there and means nothing."""


@dataclass(frozen=True, slots=True)
class SellmeierTerm:
    """One term B λ²/(λ² − λᵢ²): its strength B ≥ 0, and the vacuum wavelength λᵢ of its pole in m, > 0."""

    strength: float
    pole_wavelength: float


@dataclass(frozen=True, slots=True)
class SellmeierMedium(AbstractMedium):
    """n² = A + Σ Bᵢλ²/(λ² − λᵢ²) + D(λ/1 µm)², ε = n², μ = 1; λ is the vacuum wavelength.

    Parameters
    ----------
    terms
        The Bᵢ and λᵢ, at least one; SI units. The named constructors take published forms in µm.
    constant
        A; 1 in the original form.
    quadratic
        D, the coefficient of λ² with λ in µm; 0 in the original form.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite, a pole at no wavelength, or a strength below 0, which would be gain at
        its pole; named with its place.

    Notes
    -----
    Lossless, between its poles only; a sum of Lorentz resonances of no width. Where n² falls below 0 beyond a pole,
    the medium reflects without loss. Source: W. Sellmeier, Ann. Phys. Chem. 219, 272 (1871).

    Examples
    --------
    >>> silica = SellmeierMedium.from_micrometres(
    ...     [(0.6961663, 0.0684043), (0.4079426, 0.1162414), (0.8974794, 9.896161)]
    ... )
    >>> light = np.array(299792458 / 0.5875618e-6)
    >>> round(float(np.sqrt(silica.evaluate(light).permittivity.real)), 5)
    1.45846
    """

    terms: tuple[SellmeierTerm, ...]
    constant: float = 1.0
    quadratic: float = 0.0
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_terms("terms", self.terms)
        for place, term in enumerate(self.terms):
            check_loss(f"terms[{place}].strength", term.strength)
            check_positive(f"terms[{place}].pole_wavelength", term.pole_wavelength, "m")
        check_number("constant", self.constant)
        check_number("quadratic", self.quadratic)

    @classmethod
    def from_micrometres(
        cls,
        terms: Iterable[tuple[float, float]],
        *,
        constant: float = 1.0,
        quadratic: float = 0.0,
        squared: bool = False,
        valid_range: FrequencyRange | None = None,
        provenance: Provenance = UNSOURCED,
    ) -> "SellmeierMedium":
        """Return the medium of n² = A + Σ Bλ²/(λ² − C²) + Dλ², λ in µm.

        `terms` are pairs of B and C. With `squared`, the published form is Bλ²/(λ² − C) and C is in µm², as in
        glass catalogues. n² − 1 = … has the constant 1.
        """
        made = tuple(SellmeierTerm(b, _pole(place, c, squared)) for place, (b, c) in enumerate(terms))
        return cls(made, constant, quadratic, valid_range, provenance)

    @classmethod
    def from_fractions(
        cls,
        constant: float,
        fractions: Iterable[tuple[float, float]],
        *,
        quadratic: float = 0.0,
        valid_range: FrequencyRange | None = None,
        provenance: Provenance = UNSOURCED,
    ) -> "SellmeierMedium":
        """Return the medium of n² = A + Σ B/(λ² − C) + Dλ², λ in µm, B and C in µm².

        It is the same formula: B/(λ² − C) = (B/C)(λ²/(λ² − C) − 1), so that `constant` of the medium is A − Σ B/C.
        """
        terms = tuple(SellmeierTerm(b / c, _pole(place, c, True)) for place, (b, c) in enumerate(fractions))
        left = constant - sum(term.strength for term in terms)
        return cls(terms, left, quadratic, valid_range, provenance)

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        bend = self.quadratic * _micrometres(frequency) ** 2
        value, by_log_frequency = self.constant + bend, -2 * bend
        for term in self.terms:
            shape, slope = _shape(frequency, term.pole_wavelength)
            value = value + term.strength * shape
            by_log_frequency = by_log_frequency + term.strength * slope
        return electric(never_zero(complex_of(value, 0.0)), complex_of(by_log_frequency / frequency, 0.0))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        slopes: dict[str, ComplexArray | complex] = {}
        for place, term in enumerate(self.terms):
            shape, slope = _shape(frequency, term.pole_wavelength)
            slopes[f"terms[{place}].strength"] = complex_of(shape, 0.0)
            by_pole = term.strength / term.pole_wavelength * slope
            slopes[f"terms[{place}].pole_wavelength"] = complex_of(by_pole, 0.0)
        slopes["constant"] = 1.0
        slopes["quadratic"] = complex_of(_micrometres(frequency) ** 2, 0.0)
        return electric_slopes(frequency, slopes)


def _shape(frequency: FloatArray, pole_wavelength: float) -> tuple[FloatArray, FloatArray]:
    """Return S = λ²/(λ² − λᵢ²) = 1/(1 − u²) with u = λᵢ/λ, and ∂S/∂ln u, held beside the pole."""
    u = np.asarray(frequency, dtype=np.float64) * (pole_wavelength / SPEED_OF_LIGHT)
    distance = (1 - u) * (1 + u)
    shape: FloatArray = 1 / np.where(np.abs(distance) < NEAREST_TO_POLE, NEAREST_TO_POLE, distance)
    return shape, 2 * (u * shape) * (u * shape)


def _micrometres(frequency: FloatArray) -> FloatArray:
    wavelength: FloatArray = SPEED_OF_LIGHT / _MICROMETRE / np.asarray(frequency, dtype=np.float64)
    return wavelength


def _pole(place: int, published: float, squared: bool) -> float:
    """Return the wavelength in m of a pole given in µm, or in µm² when `squared`."""
    check_positive(f"terms[{place}] pole", published, "µm²" if squared else "µm")
    return (float(np.sqrt(published)) if squared else published) * _MICROMETRE
