"""Free carriers and bound resonances together: metals in the visible and infrared."""

from collections.abc import Iterable, Mapping
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import ELEMENTARY_CHARGE, PLANCK_CONSTANT
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_positive, check_terms
from stackcore.media.drude import carrier_conductivity
from stackcore.media.parts import electric, electric_slopes, never_zero
from stackcore.media.resonance import LorentzTerm, free_carriers

_HERTZ_PER_ELECTRONVOLT = ELEMENTARY_CHARGE / PLANCK_CONSTANT


@dataclass(frozen=True, slots=True)
class DrudeLorentzMedium(AbstractMedium):
    """ε = ε∞ − ω_p²/(ω(ω − jν)) + Σ Δεᵢ fᵢ²/(fᵢ² − f² + jfΓᵢ), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, > 0.
    plasma_frequency
        ω_p/2π in Hz of the free carriers alone, > 0.
    collision_rate
        ν in 1/s, ≥ 0.
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
    Holds inside the range of the fit only. Carried down to radio frequency the free part gives the wrong
    conductivity (`conductivity`): published fits give silver 19 MS/m instead of 63.
    Source of the form: A. D. Rakić, A. B. Djurišić, J. M. Elazar, M. L. Majewski, Appl. Opt. 37, 5271 (1998).

    Examples
    --------
    >>> metal = DrudeLorentzMedium.from_electronvolts(9.0, 0.8, 0.05, [(0.1, 0.5, 4.5)])
    >>> complex(np.round(metal.evaluate(np.array(5e14)).permittivity, 3))
    (-13.641-0.399j)
    """

    high_frequency_permittivity: float
    plasma_frequency: float
    collision_rate: float
    terms: tuple[LorentzTerm, ...]
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_positive("plasma_frequency", self.plasma_frequency, "Hz")
        check_loss("collision_rate", self.collision_rate, "1/s")
        check_terms("terms", self.terms)
        for place, term in enumerate(self.terms):
            term.check(f"terms[{place}].")

    @classmethod
    def from_electronvolts(
        cls,
        plasma_energy: float,
        free_share: float,
        free_damping: float,
        oscillators: Iterable[tuple[float, float, float]],
        *,
        high_frequency_permittivity: float = 1.0,
        valid_range: FrequencyRange | None = None,
        provenance: Provenance = UNSOURCED,
    ) -> "DrudeLorentzMedium":
        """Return the medium of constants in the form of Rakić and others, energies in eV.

        ε = ε∞ − f₀ω_p²/(ω(ω − jΓ₀)) + Σ fᵢω_p²/(ωᵢ² − ω² + jωΓᵢ)

        Parameters
        ----------
        plasma_energy
            ħω_p in eV.
        free_share, free_damping
            f₀, and ħΓ₀ in eV.
        oscillators
            For each its strength fᵢ, its damping ħΓᵢ and its energy ħωᵢ in eV, in this order.
        high_frequency_permittivity, valid_range, provenance
            As of the class.
        """
        check_positive("plasma_energy", plasma_energy, "eV")
        check_positive("free_share", free_share)
        terms = []
        for place, (strength, damping, energy) in enumerate(oscillators):
            check_positive(f"oscillators[{place}] energy", energy, "eV")
            step = strength * (plasma_energy / energy) ** 2
            terms.append(LorentzTerm(step, energy * _HERTZ_PER_ELECTRONVOLT, damping * _HERTZ_PER_ELECTRONVOLT))
        return cls(
            high_frequency_permittivity,
            float(np.sqrt(free_share)) * plasma_energy * _HERTZ_PER_ELECTRONVOLT,
            2 * np.pi * free_damping * _HERTZ_PER_ELECTRONVOLT,
            tuple(terms),
            valid_range,
            provenance,
        )

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def conductivity(self) -> float:
        """σ = ε₀ω_p²/ν in S/m of the free carriers far below the collision rate."""
        return carrier_conductivity(self.plasma_frequency, self.collision_rate)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        carriers = free_carriers(frequency, self.plasma_frequency, self.collision_rate)
        value, slope = self.high_frequency_permittivity + carriers.value, carriers.by_frequency
        for term in self.terms:
            shape = term.at(frequency)
            value = value + term.permittivity_step * shape.value
            slope = slope + term.permittivity_step * shape.by_frequency
        return electric(never_zero(value), slope)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        carriers = free_carriers(frequency, self.plasma_frequency, self.collision_rate)
        slopes: dict[str, ComplexArray | complex] = {
            "high_frequency_permittivity": 1.0,
            "plasma_frequency": 2 / self.plasma_frequency * carriers.value,
            "collision_rate": carriers.by_collision_frequency / (2 * np.pi),
        }
        for place, term in enumerate(self.terms):
            slopes |= term.slopes(frequency, f"terms[{place}].")
        return electric_slopes(frequency, slopes)
