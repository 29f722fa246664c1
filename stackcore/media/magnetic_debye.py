"""A permeability that relaxes; the permittivity is 1."""

from collections.abc import Mapping
from dataclasses import dataclass

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
from stackcore.media.parts import magnetic, magnetic_slopes
from stackcore.media.relaxation import relaxation, relaxed


@dataclass(frozen=True, slots=True)
class MagneticDebyeMedium(AbstractMedium):
    """μ = μ∞ + Δμ/(1 + jωτ), ε = 1.

    Parameters
    ----------
    high_frequency_permeability
        μ∞, > 0; 1 unless a faster process lies above the range.
    permeability_step
        Δμ = μ(static) − μ∞, ≥ 0.
    relaxation_time
        τ in s, > 0; the loss peaks at 1/(2πτ).
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain.

    Notes
    -----
    Damped motion of domain walls, and filled absorbers below their resonance. `stackcore.media.magnetic` joins it
    with a permittivity. Source of the shape: P. Debye, Polar Molecules (1929).

    Examples
    --------
    >>> import numpy as np
    >>> medium = MagneticDebyeMedium(1.0, 4.0, 1 / (2 * np.pi * 1e9))
    >>> complex(medium.evaluate(np.array(1e9)).permeability)
    (3-2j)
    """

    high_frequency_permeability: float
    permeability_step: float
    relaxation_time: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permeability", self.high_frequency_permeability)
        check_loss("permeability_step", self.permeability_step)
        check_positive("relaxation_time", self.relaxation_time, "s")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        term = (self.permeability_step, relaxation(frequency, self.relaxation_time))
        return magnetic(*relaxed(frequency, self.high_frequency_permeability, 0.0, term))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        part = relaxation(frequency, self.relaxation_time)
        return magnetic_slopes(
            frequency,
            {
                "high_frequency_permeability": 1.0,
                "permeability_step": part.value,
                "relaxation_time": self.permeability_step / self.relaxation_time * part.by_log_frequency,
            },
        )
