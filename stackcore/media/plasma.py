"""A cold plasma of electrons, by its density."""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_positive
from stackcore.media.drude import carrier_plasma_frequency
from stackcore.media.parts import electric, electric_slopes, never_zero
from stackcore.media.resonance import free_carriers


@dataclass(frozen=True, slots=True)
class PlasmaMedium(AbstractMedium):
    """ε = 1 − ω_p²/(ω(ω − jν)) with ω_p² = n e²/(ε₀ mₑ), μ = 1.

    Parameters
    ----------
    electron_density
        n in 1/m³, > 0. Sources often give 1/cm³: 1e12 of those are 1e18 here.
    collision_rate
        ν in 1/s, ≥ 0, of electrons with the gas.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain.

    Notes
    -----
    Cold, uniform, without a static magnetic field, ions at rest, collision rate independent of the speed.
    Source: V. L. Ginzburg, The Propagation of Electromagnetic Waves in Plasmas (1964).

    Examples
    --------
    >>> round(PlasmaMedium(1e18, 1e9).plasma_frequency / 1e9, 3)
    8.979
    """

    electron_density: float
    collision_rate: float = 0.0
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("electron_density", self.electron_density, "1/m³")
        check_loss("collision_rate", self.collision_rate, "1/s")

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def plasma_frequency(self) -> float:
        """ω_p/2π in Hz; a thick plasma without collisions lets nothing through below it."""
        return carrier_plasma_frequency(self.electron_density)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        carriers = free_carriers(frequency, self.plasma_frequency, self.collision_rate)
        return electric(never_zero(1 + carriers.value), carriers.by_frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        carriers = free_carriers(frequency, self.plasma_frequency, self.collision_rate)
        return electric_slopes(
            frequency,
            {
                "electron_density": carriers.value / self.electron_density,
                "collision_rate": carriers.by_collision_frequency / (2 * np.pi),
            },
        )
