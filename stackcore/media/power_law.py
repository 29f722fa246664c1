"""Permittivity and conductivity as powers of frequency: building materials of ITU-R P.2040."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

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
from stackcore.media.checks import check_loss, check_number, check_positive
from stackcore.media.parts import complex_of, conduction, electric, electric_slopes

GREATEST_EXPONENT: Final = 10.0
"""Published exponents stay below 3; far beyond it a power would leave the range of a double."""


@dataclass(frozen=True, slots=True)
class PowerLawMedium(AbstractMedium):
    """ε = a f^b − jσ/(ωε₀) with σ = c f^d, f in GHz; μ = 1.

    Parameters
    ----------
    permittivity, permittivity_exponent
        a > 0, the permittivity at 1 GHz, and b.
    conductivity, conductivity_exponent
        c ≥ 0, the conductivity at 1 GHz in S/m, and d. σ holds all of the loss.
    valid_range, provenance
        See `stackcore.media.base`. Editions of the recommendation differ by up to 42 per cent in σ and belong into
        the source: ``ITU-R P.2040-3 (2023), concrete``.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain, or an exponent beyond ±10.

    Notes
    -----
    A fit over the stated band; not causal, since ε′ does not follow from σ. Source: Recommendation ITU-R P.2040-1
    (07/2015), equations (57) and (58).

    Examples
    --------
    >>> concrete = PowerLawMedium(5.24, 0.0, 0.0462, 0.7822)
    >>> complex(np.round(concrete.evaluate(np.array(2.4e9)).permittivity, 4))
    (5.24-0.6863j)
    """

    permittivity: float
    permittivity_exponent: float
    conductivity: float
    conductivity_exponent: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("permittivity", self.permittivity)
        check_loss("conductivity", self.conductivity, "S/m")
        for name in ("permittivity_exponent", "conductivity_exponent"):
            exponent = getattr(self, name)
            check_number(name, exponent)
            if abs(exponent) > GREATEST_EXPONENT:
                raise ValueError(f"{name} {exponent:g} lies beyond ±{GREATEST_EXPONENT:g}")

    @property
    def dispersive(self) -> bool:
        return True

    def conductivity_at(self, frequency: FloatArray) -> FloatArray:
        """Return σ in S/m at `frequency` in Hz."""
        sigma: FloatArray = self.conductivity * _gigahertz(frequency) ** self.conductivity_exponent
        return sigma

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        real = self.permittivity * _gigahertz(frequency) ** self.permittivity_exponent
        loss = -(conduction(frequency).imag * self.conductivity_at(frequency))
        slope = complex_of(self.permittivity_exponent * real, -(self.conductivity_exponent - 1) * loss)
        return electric(complex_of(real, -loss), slope / frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        gigahertz = _gigahertz(frequency)
        real = gigahertz**self.permittivity_exponent
        loss = conduction(frequency) * gigahertz**self.conductivity_exponent
        logarithm = np.log(gigahertz)
        return electric_slopes(
            frequency,
            {
                "permittivity": complex_of(real, 0.0),
                "permittivity_exponent": complex_of(self.permittivity * logarithm * real, 0.0),
                "conductivity": loss,
                "conductivity_exponent": self.conductivity * logarithm * loss,
            },
        )


def _gigahertz(frequency: FloatArray) -> FloatArray:
    return np.asarray(frequency, dtype=np.float64) / 1e9
