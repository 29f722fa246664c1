"""Free carriers with collisions (Drude)."""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.constants import ELECTRON_MASS, ELEMENTARY_CHARGE, VACUUM_PERMITTIVITY
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_positive
from stackcore.media.parts import electric, electric_slopes, never_zero
from stackcore.media.resonance import free_carriers


@dataclass(frozen=True, slots=True)
class DrudeMedium(AbstractMedium):
    """ε = ε∞ − ω_p²/(ω(ω − jν)), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, > 0, of all that is bound.
    plasma_frequency
        ω_p/2π in Hz, > 0, not screened by ε∞.
    collision_rate
        ν in 1/s, ≥ 0; the inverse of the relaxation time, not a frequency in Hz.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain.

    Notes
    -----
    One kind of carrier, a collision rate that does not depend on frequency, no transitions between bands. A fit
    in the visible must not be carried down to radio frequency: its `conductivity` there is often far below the
    metal's. ε passes through 0 at the screened plasma frequency; without collisions an exact 0 is moved by the last
    digit.
    Source: P. Drude, Ann. Phys. 306, 566 (1900).

    Examples
    --------
    >>> film = DrudeMedium.from_carriers(1e27, 0.35, 30e-4, high_frequency_permittivity=4.0)
    >>> round(film.conductivity)
    480653
    """

    high_frequency_permittivity: float
    plasma_frequency: float
    collision_rate: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_positive("plasma_frequency", self.plasma_frequency, "Hz")
        check_loss("collision_rate", self.collision_rate, "1/s")

    @classmethod
    def from_carriers(
        cls,
        density: float,
        effective_mass: float,
        mobility: float,
        *,
        high_frequency_permittivity: float = 1.0,
        valid_range: FrequencyRange | None = None,
        provenance: Provenance = UNSOURCED,
    ) -> "DrudeMedium":
        """Return the medium of carriers as semiconductors and transparent conductors state them.

        Parameters
        ----------
        density
            n in 1/m³, > 0.
        effective_mass
            m* in units of the electron's mass, > 0.
        mobility
            In m²/(V·s), > 0; ν = e/(m* mobility). 30 cm²/(V·s) are 30e-4.
        high_frequency_permittivity, valid_range, provenance
            As of the class.
        """
        check_positive("density", density, "1/m³")
        check_positive("effective_mass", effective_mass)
        check_positive("mobility", mobility, "m²/(V·s)")
        mass = effective_mass * ELECTRON_MASS
        rate = ELEMENTARY_CHARGE / (mass * mobility)
        frequency = carrier_plasma_frequency(density, effective_mass)
        return cls(high_frequency_permittivity, frequency, rate, valid_range, provenance)

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def conductivity(self) -> float:
        """σ = ε₀ω_p²/ν in S/m far below the collision rate; infinite without collisions."""
        return carrier_conductivity(self.plasma_frequency, self.collision_rate)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        carriers = free_carriers(frequency, self.plasma_frequency, self.collision_rate)
        return electric(never_zero(self.high_frequency_permittivity + carriers.value), carriers.by_frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        carriers = free_carriers(frequency, self.plasma_frequency, self.collision_rate)
        return electric_slopes(
            frequency,
            {
                "high_frequency_permittivity": 1.0,
                "plasma_frequency": 2 / self.plasma_frequency * carriers.value,
                "collision_rate": carriers.by_collision_frequency / (2 * np.pi),
            },
        )


def carrier_plasma_frequency(density: float, effective_mass: float = 1.0) -> float:
    """Return ω_p/2π in Hz of `density` n in 1/m³: ω_p² = n e²/(ε₀ m*), m* in units of the electron's mass."""
    mass = effective_mass * ELECTRON_MASS
    return ELEMENTARY_CHARGE * float(np.sqrt(density / (VACUUM_PERMITTIVITY * mass))) / (2 * np.pi)


def carrier_conductivity(plasma_frequency: float, collision_rate: float) -> float:
    """Return ε₀ω_p²/ν in S/m of ω_p/2π in Hz and ν in 1/s; infinite without collisions."""
    if collision_rate == 0:
        return float("inf")
    return VACUUM_PERMITTIVITY * (2 * float(np.pi) * plasma_frequency) ** 2 / collision_rate
