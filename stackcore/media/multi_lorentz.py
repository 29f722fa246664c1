"""Several Lorentz resonances beside each other."""

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
from stackcore.media.checks import check_positive, check_terms
from stackcore.media.parts import electric, electric_slopes, everywhere
from stackcore.media.resonance import LorentzTerm


@dataclass(frozen=True, slots=True)
class MultiLorentzMedium(AbstractMedium):
    """ε = ε∞ + Σ Δεᵢ fᵢ²/(fᵢ² − f² + jfΓᵢ), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, > 0.
    terms
        The oscillators, at least one.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain, named with its place; without terms.

    Notes
    -----
    Lattice bands of crystals and glasses in the infrared, electronic bands in the ultraviolet.
    Source: H. A. Lorentz, The Theory of Electrons (1909).

    Examples
    --------
    >>> import numpy as np
    >>> terms = (LorentzTerm(2.0, 1e12, 1e11), LorentzTerm(1.5, 1e15, 1e14))
    >>> medium = MultiLorentzMedium(1.0, terms)
    >>> round(complex(medium.evaluate(np.array(1.0)).permittivity).real, 6)
    4.5
    """

    high_frequency_permittivity: float
    terms: tuple[LorentzTerm, ...]
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_terms("terms", self.terms)
        for place, term in enumerate(self.terms):
            term.check(f"terms[{place}].")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        value = everywhere(self.high_frequency_permittivity, frequency)
        slope = everywhere(0.0, frequency)
        for term in self.terms:
            shape = term.at(frequency)
            value += term.permittivity_step * shape.value
            slope += term.permittivity_step * shape.by_frequency
        return electric(value, slope)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        slopes: dict[str, ComplexArray | complex] = {"high_frequency_permittivity": 1.0}
        for place, term in enumerate(self.terms):
            slopes |= term.slopes(frequency, f"terms[{place}].")
        return electric_slopes(frequency, slopes)
