"""Several Debye relaxations beside each other."""

from collections.abc import Mapping
from dataclasses import dataclass

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_positive, check_terms
from stackcore.media.parts import conduction, electric, electric_slopes
from stackcore.media.relaxation import relaxation, relaxed


@dataclass(frozen=True, slots=True)
class RelaxationTerm:
    """One Debye relaxation: its step Δε ≥ 0, and its time τ in s, > 0."""

    permittivity_step: float
    relaxation_time: float


@dataclass(frozen=True, slots=True)
class MultiDebyeMedium(AbstractMedium):
    """ε = ε∞ + Σ Δεᵢ/(1 + jωτᵢ) − jσ/(ωε₀), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, > 0.
    terms
        The relaxations, at least one.
    conductivity
        σ in S/m, ≥ 0.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain, named with its place; without terms.

    Notes
    -----
    Any passive relaxation over a finite band can be fitted by such a sum, about one term a decade, and the fit
    stays causal. Sources: P. Debye, Polar Molecules (1929); for sums, H. Fröhlich, Theory of Dielectrics (1949).

    Examples
    --------
    >>> import numpy as np
    >>> terms = (RelaxationTerm(8.0, 1e-9), RelaxationTerm(2.0, 1e-12))
    >>> medium = MultiDebyeMedium(3.0, terms)
    >>> round(complex(medium.evaluate(np.array(1.0)).permittivity).real, 6)
    13.0
    """

    high_frequency_permittivity: float
    terms: tuple[RelaxationTerm, ...]
    conductivity: float = 0.0
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_terms("terms", self.terms)
        for place, term in enumerate(self.terms):
            check_loss(f"terms[{place}].permittivity_step", term.permittivity_step)
            check_positive(f"terms[{place}].relaxation_time", term.relaxation_time, "s")
        check_loss("conductivity", self.conductivity, "S/m")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        terms = [(term.permittivity_step, relaxation(frequency, term.relaxation_time)) for term in self.terms]
        return electric(*relaxed(frequency, self.high_frequency_permittivity, self.conductivity, *terms))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        slopes: dict[str, ComplexArray | complex] = {"high_frequency_permittivity": 1.0}
        for place, term in enumerate(self.terms):
            part = relaxation(frequency, term.relaxation_time)
            by_time = term.permittivity_step / term.relaxation_time * part.by_log_frequency
            slopes[f"terms[{place}].permittivity_step"] = part.value
            slopes[f"terms[{place}].relaxation_time"] = by_time
        slopes["conductivity"] = conduction(frequency)
        return electric_slopes(frequency, slopes)
