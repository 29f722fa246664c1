"""A medium whose relative permittivity and permeability do not depend on frequency."""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.base import UNSOURCED, AbstractMedium, Constitutive, FrequencyRange, Provenance


@dataclass(frozen=True, slots=True)
class ConstantMedium(AbstractMedium):
    """ε and μ, both relative and complex, the same at every frequency.

    Parameters
    ----------
    permittivity, permeability
        ε′ − jε″ and μ′ − jμ″ with ε″, μ″ ≥ 0 (`stackcore.conventions`).
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a gain medium (negative loss), a value that is not finite, or a permittivity or permeability of zero.

    Notes
    -----
    A constant ε′ with constant ε″ ≠ 0 is not causal over all frequencies; it stands for a narrow band.

    Examples
    --------
    >>> complex(ConstantMedium(4.2 - 0.063j).evaluate(np.array(1e10)).permittivity)
    (4.2-0.063j)
    """

    permittivity: complex
    permeability: complex = 1.0 + 0.0j
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        for name, value in (("permittivity", self.permittivity), ("permeability", self.permeability)):
            if not np.isfinite(value):
                raise ValueError(f"{name} {value} is not finite")
            if complex(value).imag > 0:
                raise ValueError(f"{name} {value} has gain: its imaginary part must be 0 or negative")
            if value == 0:
                raise ValueError(f"{name} must not be 0")

    @property
    def dispersive(self) -> bool:
        return False

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        shape = np.shape(frequency)
        zero = np.zeros(shape, dtype=np.complex128)
        return Constitutive(
            np.full(shape, self.permittivity, dtype=np.complex128),
            np.full(shape, self.permeability, dtype=np.complex128),
            zero,
            zero,
        )


VACUUM = ConstantMedium(1.0 + 0.0j)
"""ε = μ = 1 exactly; ``air`` and ``vacuum`` of a job."""
