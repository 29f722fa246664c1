"""A relaxation broadened on its upper side (Cole-Davidson)."""

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
from stackcore.media.checks import check_exponents, check_loss, check_positive
from stackcore.media.parts import conduction, electric, electric_slopes
from stackcore.media.relaxation import relaxation, relaxed


@dataclass(frozen=True, slots=True)
class ColeDavidsonMedium(AbstractMedium):
    """ε = ε∞ + Δε/(1 + jωτ)^b − jσ/(ωε₀), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, far above the relaxation, > 0.
    permittivity_step
        Δε = ε(static) − ε∞, ≥ 0.
    relaxation_time
        τ in s, > 0.
    asymmetric_exponent
        b, 0 < b ≤ 1; less than 1 broadens the loss peak on its upper side only.
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
    A spread of relaxation times with none above τ; glass-forming liquids. With b = 1 it is Debye's.
    Source: D. W. Davidson, R. H. Cole, J. Chem. Phys. 19, 1484 (1951).

    Examples
    --------
    >>> import numpy as np
    >>> medium = ColeDavidsonMedium(2.0, 8.0, 1 / (2 * np.pi * 1e9), 0.5)
    >>> complex(np.round(medium.evaluate(np.array(1e9)).permittivity, 5))
    (8.2151-2.57438j)
    """

    high_frequency_permittivity: float
    permittivity_step: float
    relaxation_time: float
    asymmetric_exponent: float
    conductivity: float = 0.0
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_loss("permittivity_step", self.permittivity_step)
        check_positive("relaxation_time", self.relaxation_time, "s")
        check_exponents(asymmetric=self.asymmetric_exponent)
        check_loss("conductivity", self.conductivity, "S/m")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        part = relaxation(frequency, self.relaxation_time, asymmetric=self.asymmetric_exponent)
        term = (self.permittivity_step, part)
        return electric(*relaxed(frequency, self.high_frequency_permittivity, self.conductivity, term))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        part = relaxation(frequency, self.relaxation_time, asymmetric=self.asymmetric_exponent)
        return electric_slopes(
            frequency,
            {
                "high_frequency_permittivity": 1.0,
                "permittivity_step": part.value,
                "relaxation_time": self.permittivity_step / self.relaxation_time * part.by_log_frequency,
                "asymmetric_exponent": self.permittivity_step * part.by_asymmetric(),
                "conductivity": conduction(frequency),
            },
        )
