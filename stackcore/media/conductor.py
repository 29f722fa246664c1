"""A good conductor: a conductivity beside the vacuum's permittivity; slow carriers, a rough surface if wanted."""

from collections.abc import Mapping
from dataclasses import dataclass, field

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import VACUUM_PERMEABILITY
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_positive, check_relative
from stackcore.media.parts import both_slopes, complex_of, conduction, everywhere
from stackcore.media.roughness import HAMMERSTAD_JENSEN, ROUGHNESS_RULES, roughness_factor


@dataclass(frozen=True, slots=True)
class ConductorMedium(AbstractMedium):
    """ε = 1 − jσ/(ωε₀ (1 + jωτ) K²), μ constant.

    Parameters
    ----------
    conductivity
        σ in S/m, > 0.
    permeability
        Relative, complex, loss negative imaginary. That of iron and steel falls with frequency and with
        field strength; one number holds over a narrow band only.
    relaxation_time
        τ in s, ≥ 0, the mean time between collisions: some 1e-14 s in good metals at room temperature. 0 is a
        conductivity that does not depend on frequency.
    roughness
        Δ in m, ≥ 0, the rms height of the surface. The surface resistance is K(Δ/δ) times the smooth one.
    roughness_rule
        ``hammerstad-jensen`` or ``groiss``; see `stackcore.media.roughness`.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a conductivity that is not positive and finite, a negative time or roughness, an unknown rule, or a
        permeability with gain.

    Notes
    -----
    Without a relaxation time it assumes f far below the collision rate (about 10 THz in good metals).

    Roughness is an effective conductivity σ/K², which multiplies the surface impedance √(jωμ/σ) by K: the surface
    resistance is right, hence reflection and heating, and the reactance grows with it, the usual assumption. The
    field then also decays over Kδ instead of δ: the shielding of a foil many skin depths thick is understated. K is
    a fit, so that a rough conductor is not strictly causal. δ in K is that of `skin_depth` without relaxation.

    Sources: J. A. Stratton, Electromagnetic Theory (1941), section 5.2; P. Drude, Ann. Phys. 306, 566 (1900).

    Examples
    --------
    >>> ConductorMedium(5.8e7).skin_depth(np.array(1e10)).round(9)
    np.float64(6.61e-07)
    """

    conductivity: float
    permeability: complex = 1.0 + 0.0j
    relaxation_time: float = field(default=0.0, kw_only=True)
    roughness: float = field(default=0.0, kw_only=True)
    roughness_rule: str = field(default=HAMMERSTAD_JENSEN, kw_only=True)
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("conductivity", self.conductivity, "S/m")
        check_relative("permeability", self.permeability)
        check_loss("relaxation_time", self.relaxation_time, "s")
        check_loss("roughness", self.roughness, "m")
        if self.roughness_rule not in ROUGHNESS_RULES:
            raise ValueError(
                f"roughness_rule {self.roughness_rule!r} is unknown; there are {', '.join(ROUGHNESS_RULES)}"
            )
        if self.roughness:  # it is compared with the skin depth, which needs a real part
            check_positive("permeability", complex(self.permeability).real)

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        loss, drag, excess = self._parts(frequency)
        slope = -loss * (1 + drag + 2 * excess) / frequency
        permeability = everywhere(self.permeability, frequency)
        return Constitutive(np.asarray(1 + loss), permeability, np.asarray(slope), np.zeros_like(permeability))

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        frequency = np.asarray(frequency, dtype=np.float64)
        loss, _, excess = self._parts(frequency)
        slowed = 1 / complex_of(1.0, 2 * np.pi * frequency * self.relaxation_time)
        by_time = complex_of(0.0, -2 * np.pi * frequency) * slowed * loss
        electric: dict[str, ComplexArray | complex] = {
            "conductivity": loss * (1 - 2 * excess) / self.conductivity,
            "relaxation_time": by_time,
            "roughness": 0.0,
        }
        if self.roughness:
            electric["roughness"] = -4 / self.roughness * excess * loss
            electric["permeability"] = -2 / complex(self.permeability).real * excess * loss
        return both_slopes(frequency, electric, {"permeability": 1.0, "permeability_loss": -1j})

    def skin_depth(self, frequency: FloatArray) -> FloatArray:
        """Return the depth in m at which the field of a smooth conductor has fallen to 1/e, at `frequency` in Hz.

        δ = 1/√(πfμ₀μ′σ), times √((1 + x²)/(x + √(1 + x²))) for x = ωτ. The displacement current, μ″ and roughness
        are left out.
        """
        frequency = np.asarray(frequency, dtype=np.float64)
        mu = VACUUM_PERMEABILITY * complex(self.permeability).real
        depth: FloatArray = 1 / np.sqrt(np.pi * frequency * mu * self.conductivity)
        if not self.relaxation_time:
            return depth
        x = 2 * np.pi * frequency * self.relaxation_time
        size = np.hypot(1.0, x)
        slow: FloatArray = depth * size / np.sqrt(x + size)
        return slow

    def _parts(self, frequency: FloatArray) -> tuple[ComplexArray, ComplexArray, FloatArray]:
        """Return ε − 1, jωτ/(1 + jωτ) and ∂ln K/∂ln s with s = (Δ/δ)², the share of K in all slopes."""
        loss, nothing = self.conductivity * conduction(frequency), np.zeros(frequency.shape)
        drag: ComplexArray = nothing.astype(np.complex128)
        if self.relaxation_time:
            x = 2 * np.pi * frequency * self.relaxation_time
            slowed = 1 / complex_of(1.0, x)
            loss, drag = loss * slowed, complex_of(0.0, x) * slowed
        if not self.roughness:
            return loss, drag, nothing
        mu = VACUUM_PERMEABILITY * complex(self.permeability).real
        ratio2 = np.pi * mu * self.conductivity * self.roughness**2 * frequency
        factor, by_logarithm = roughness_factor(self.roughness_rule, ratio2)
        return loss / (factor * factor), drag, by_logarithm / factor
