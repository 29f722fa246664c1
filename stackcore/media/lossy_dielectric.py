"""A dielectric with its own loss and a conductivity beside it."""

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
from stackcore.media.checks import check_loss, check_positive, check_relative
from stackcore.media.parts import both_slopes, conduction, everywhere


@dataclass(frozen=True, slots=True)
class LossyDielectricMedium(AbstractMedium):
    """ε = ε′ − jε″ − jσ/(ωε₀), ε″ = ε′ tan δ or given itself; μ constant.

    Parameters
    ----------
    permittivity
        ε′ > 0.
    loss_tangent, loss_part
        Of the dielectric alone, without σ: tan δ or ε″, ≥ 0; one of the two or none.
    conductivity
        σ in S/m, ≥ 0.
    permeability
        Relative, complex, loss negative imaginary.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite, gain, or the dielectric loss given twice.

    Notes
    -----
    A measured loss tangent mostly holds the conductivity already: give the loss once. The conductive part is
    causal; a constant ε″ is not and stands for a narrow band. Source: J. A. Stratton, Electromagnetic Theory
    (1941), section 5.2.

    Examples
    --------
    >>> earth = LossyDielectricMedium(15.0, conductivity=0.005)
    >>> complex(np.round(earth.evaluate(np.array(1e8)).permittivity, 3))
    (15-0.899j)
    """

    permittivity: float
    loss_tangent: float | None = None
    loss_part: float | None = None
    conductivity: float = 0.0
    permeability: complex = 1.0 + 0.0j
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("permittivity", self.permittivity)
        if self.loss_tangent is not None and self.loss_part is not None:
            raise ValueError("the dielectric loss is given twice, by loss_tangent and by loss_part")
        check_loss("loss_tangent", self.loss_tangent or 0.0)
        check_loss("loss_part", self.loss_part or 0.0)
        check_loss("conductivity", self.conductivity, "S/m")
        check_relative("permeability", self.permeability)

    @property
    def dispersive(self) -> bool:
        return self.conductivity != 0

    @property
    def dielectric(self) -> complex:
        """ε′ − jε″, without the conductivity."""
        loss = self.permittivity * (self.loss_tangent or 0.0) if self.loss_part is None else self.loss_part
        return complex(self.permittivity, -loss) if loss else complex(self.permittivity)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        permittivity = everywhere(self.dielectric, frequency)
        permeability = everywhere(self.permeability, frequency)
        slope = np.zeros_like(permittivity)
        if self.conductivity:
            loss = self.conductivity * conduction(frequency)
            permittivity += loss
            slope -= loss / frequency
        return Constitutive(permittivity, permeability, slope, np.zeros_like(permeability))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        electric: dict[str, ComplexArray | complex] = {"permittivity": 1.0, "loss_part": -1j}
        if self.loss_part is None:
            tangent = self.loss_tangent or 0.0
            electric = {"permittivity": 1 - 1j * tangent, "loss_tangent": -1j * self.permittivity}
        electric["conductivity"] = conduction(frequency)
        return both_slopes(frequency, electric, {"permeability": 1.0, "permeability_loss": -1j})
