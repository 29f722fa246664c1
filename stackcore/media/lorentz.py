"""A single Lorentz resonance."""

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
from stackcore.media.checks import check_positive
from stackcore.media.parts import electric, electric_slopes
from stackcore.media.resonance import LorentzTerm


@dataclass(frozen=True, slots=True)
class LorentzMedium(AbstractMedium):
    """ε = ε∞ + Δε f₀²/(f₀² − f² + jfΓ), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, > 0.
    permittivity_step, resonance_frequency, linewidth
        Δε ≥ 0, f₀ and Γ in Hz, > 0; see `stackcore.media.resonance.LorentzTerm`.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite or would make gain.

    Notes
    -----
    A bound charge with a restoring force and viscous damping: lattice vibrations, electronic absorption. Its wings
    fall more slowly than those of real bands. Source: H. A. Lorentz, The Theory of Electrons (1909).

    Examples
    --------
    >>> import numpy as np
    >>> medium = LorentzMedium(1.0, 2.0, 1e12, 1e11)
    >>> complex(np.round(medium.evaluate(np.array(1e12)).permittivity, 9))
    (1-20j)
    """

    high_frequency_permittivity: float
    permittivity_step: float
    resonance_frequency: float
    linewidth: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        self._term.check()

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def _term(self) -> LorentzTerm:
        return LorentzTerm(self.permittivity_step, self.resonance_frequency, self.linewidth)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        shape, step = self._term.at(frequency), self.permittivity_step
        return electric(self.high_frequency_permittivity + step * shape.value, step * shape.by_frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return electric_slopes(frequency, {"high_frequency_permittivity": 1.0, **self._term.slopes(frequency)})
