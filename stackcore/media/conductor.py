"""A good conductor: a real conductivity beside the vacuum's permittivity."""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.constants import VACUUM_PERMEABILITY, VACUUM_PERMITTIVITY
from stackcore.media.base import UNSOURCED, AbstractMedium, Constitutive, FrequencyRange, Provenance


@dataclass(frozen=True, slots=True)
class ConductorMedium(AbstractMedium):
    """ε = 1 − jσ/(ωε₀), μ constant.

    Parameters
    ----------
    conductivity
        σ in S/m, > 0.
    permeability
        Relative, complex, loss negative imaginary. That of iron and steel falls with frequency and with
        field strength; one number holds over a narrow band only.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a conductivity that is not positive and finite, or a permeability with gain.

    Notes
    -----
    Assumes f far below the collision rate (about 10 THz in good metals) and smooth surfaces.
    Source: J. A. Stratton, Electromagnetic Theory (1941), section 5.2.

    Examples
    --------
    >>> ConductorMedium(5.8e7).skin_depth(np.array(1e10)).round(9)
    np.float64(6.61e-07)
    """

    conductivity: float
    permeability: complex = 1.0 + 0.0j
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        if not (np.isfinite(self.conductivity) and self.conductivity > 0):
            raise ValueError(f"conductivity {self.conductivity} S/m must be a positive number")
        mu = complex(self.permeability)
        if not np.isfinite(mu) or mu.imag > 0 or mu == 0:
            raise ValueError(f"permeability {self.permeability} must be finite, not 0 and without gain")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        loss = self.conductivity / (2 * np.pi * VACUUM_PERMITTIVITY * frequency)
        permittivity = np.ones(frequency.shape, dtype=np.complex128)
        permittivity.imag = -loss
        slope = np.zeros(frequency.shape, dtype=np.complex128)
        slope.imag = loss / frequency
        permeability = np.full(frequency.shape, self.permeability, dtype=np.complex128)
        return Constitutive(permittivity, permeability, slope, np.zeros_like(permeability))

    def skin_depth(self, frequency: FloatArray) -> FloatArray:
        """Return δ = 1/√(πfμ₀μ′σ) in m, the depth at which the field has fallen to 1/e, at `frequency` in Hz."""
        mu = VACUUM_PERMEABILITY * complex(self.permeability).real
        depth: FloatArray = 1 / np.sqrt(np.pi * np.asarray(frequency) * mu * self.conductivity)
        return depth
