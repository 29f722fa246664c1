"""A permeability that resonates; the permittivity is 1."""

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
from stackcore.media.resonance import resonance


@dataclass(frozen=True, slots=True)
class MagneticLorentzMedium(AbstractMedium):
    """μ = μ∞ + Δμ f₀²/(f₀² − f² + jfΓ), ε = 1.

    Parameters
    ----------
    high_frequency_permeability
        μ∞, > 0.
    permeability_step
        Δμ ≥ 0, what the resonance adds to the static permeability.
    resonance_frequency, linewidth
        f₀ and Γ in Hz, > 0; Γ is the width at half the loss peak where it is narrow.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain.

    Notes
    -----
    Natural ferromagnetic resonance of ferrites and filled absorbers without a static field, isotropic. Above the
    resonance μ′ may fall below 0. `stackcore.media.magnetic` joins it with a permittivity. Source of the shape:
    H. A. Lorentz, The Theory of Electrons (1909).

    Examples
    --------
    >>> import numpy as np
    >>> medium = MagneticLorentzMedium(1.0, 2.0, 1e9, 1e9)
    >>> complex(medium.evaluate(np.array(1e9)).permeability)
    (1-2j)
    """

    high_frequency_permeability: float
    permeability_step: float
    resonance_frequency: float
    linewidth: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permeability", self.high_frequency_permeability)
        check_loss("permeability_step", self.permeability_step)
        check_positive("resonance_frequency", self.resonance_frequency, "Hz")
        check_positive("linewidth", self.linewidth, "Hz")

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        shape = resonance(frequency, self.resonance_frequency, self.linewidth)
        step = self.permeability_step
        return magnetic(self.high_frequency_permeability + step * shape.value, step * shape.by_frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        shape, step = resonance(frequency, self.resonance_frequency, self.linewidth), self.permeability_step
        return magnetic_slopes(
            frequency,
            {
                "high_frequency_permeability": 1.0,
                "permeability_step": shape.value,
                "resonance_frequency": step * shape.by_resonance,
                "linewidth": step * shape.by_linewidth,
            },
        )
