"""A single Debye relaxation."""

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
from stackcore.media.parts import conduction, electric, electric_slopes
from stackcore.media.relaxation import relaxation, relaxed


@dataclass(frozen=True, slots=True)
class DebyeMedium(AbstractMedium):
    """ε = ε∞ + Δε/(1 + jωτ) − jσ/(ωε₀), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, far above the relaxation, > 0.
    permittivity_step
        Δε = ε(static) − ε∞, ≥ 0.
    relaxation_time
        τ in s, > 0; the loss peaks at 1/(2πτ).
    conductivity
        σ in S/m, ≥ 0, of mobile charges beside the dipoles.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain.

    Notes
    -----
    One relaxation time for all dipoles, no inertia: right for simple polar liquids up to some tens of GHz. Far
    above the relaxation it absorbs too much. Source: P. Debye, Polar Molecules (1929).

    Examples
    --------
    >>> import numpy as np
    >>> medium = DebyeMedium(2.0, 8.0, 1 / (2 * np.pi * 1e9))
    >>> complex(medium.evaluate(np.array(1e9)).permittivity)
    (6-4j)
    """

    high_frequency_permittivity: float
    permittivity_step: float
    relaxation_time: float
    conductivity: float = 0.0
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_loss("permittivity_step", self.permittivity_step)
        check_positive("relaxation_time", self.relaxation_time, "s")
        check_loss("conductivity", self.conductivity, "S/m")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        part = relaxation(frequency, self.relaxation_time)
        term = (self.permittivity_step, part)
        return electric(*relaxed(frequency, self.high_frequency_permittivity, self.conductivity, term))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        part = relaxation(frequency, self.relaxation_time)
        return electric_slopes(
            frequency,
            {
                "high_frequency_permittivity": 1.0,
                "permittivity_step": part.value,
                "relaxation_time": self.permittivity_step / self.relaxation_time * part.by_log_frequency,
                "conductivity": conduction(frequency),
            },
        )
