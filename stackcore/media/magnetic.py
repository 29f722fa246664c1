"""The permittivity of one medium with the permeability of another."""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)


@dataclass(frozen=True, slots=True)
class MagneticMedium(AbstractMedium):
    """ε of `permittivity_from` and μ of `permeability_from`.

    Parameters
    ----------
    permittivity_from, permeability_from
        Any two media; the μ of the first and the ε of the second do not count.
    valid_range
        Where both hold when None is given: the part that their ranges have in common, which is empty (lowest above
        highest) where they have none.
    provenance
        See `stackcore.media.base`.

    Notes
    -----
    Isotropic, and ε and μ independent of each other. Constants are named with the part that they belong to:
    ``permeability_from.relaxation_time``.

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> from stackcore.media.magnetic_debye import MagneticDebyeMedium
    >>> ferrite = MagneticMedium(ConstantMedium(12 - 0.1j), MagneticDebyeMedium(1.0, 99.0, 1e-8))
    >>> values = ferrite.evaluate(np.array(1.0))
    >>> complex(values.permittivity), round(complex(values.permeability).real, 6)
    ((12-0.1j), 100.0)
    """

    permittivity_from: AbstractMedium
    permeability_from: AbstractMedium
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        if self.valid_range is None:
            common = _common(self.permittivity_from.valid_range, self.permeability_from.valid_range)
            object.__setattr__(self, "valid_range", common)

    @property
    def dispersive(self) -> bool:
        return self.permittivity_from.dispersive or self.permeability_from.dispersive

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        electric = self.permittivity_from.evaluate(frequency)
        magnetic = self.permeability_from.evaluate(frequency)
        return Constitutive(
            electric.permittivity,
            magnetic.permeability,
            electric.permittivity_slope,
            magnetic.permeability_slope,
        )

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        slopes: dict[str, ConstantSlope] = {}
        for name, slope in self.permittivity_from.constant_slopes(frequency).items():
            if _acts(slope.permittivity, slope.permeability):
                zero = np.zeros_like(slope.permittivity)
                slopes[f"permittivity_from.{name}"] = ConstantSlope(slope.permittivity, zero)
        for name, slope in self.permeability_from.constant_slopes(frequency).items():
            if _acts(slope.permeability, slope.permittivity):
                zero = np.zeros_like(slope.permeability)
                slopes[f"permeability_from.{name}"] = ConstantSlope(zero, slope.permeability)
        return slopes


def _acts(used: ComplexArray, unused: ComplexArray) -> bool:
    """Return whether a constant belongs to the part that is used; one without any effect at all is kept."""
    return bool(used.any()) or not unused.any()


def _common(one: FrequencyRange | None, other: FrequencyRange | None) -> FrequencyRange | None:
    if one is None or other is None:
        return one or other
    return FrequencyRange(max(one.lowest, other.lowest), min(one.highest, other.highest))
