"""A medium whose relative permittivity and permeability do not depend on frequency."""

from collections.abc import Mapping
from dataclasses import dataclass, field
from typing import Literal

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
from stackcore.media.checks import check_loss, check_positive, check_relative
from stackcore.media.parts import both_slopes


@dataclass(frozen=True, slots=True)
class ConstantMedium(AbstractMedium):
    """ε and μ, both relative and complex, the same at every frequency.

    Parameters
    ----------
    permittivity, permeability
        ε′ − jε″ and μ′ − jμ″ with ε″, μ″ ≥ 0 (`stackcore.conventions`).
    loss_as
        Which constant the dielectric loss was given by: ``part`` for ε″, ``tangent`` for tan δ. The values do not
        depend on it, `constant_slopes` do: with ``tangent`` the loss grows with ε′ (`with_loss_tangent`).
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a gain medium (negative loss), a value that is not finite, or a permittivity or permeability of zero.

    Notes
    -----
    A constant ε′ with constant ε″ ≠ 0 is not causal over all frequencies; it stands for a narrow band.
    `stackcore.media.wideband` is causal and nearly as constant. A conductivity beside it is in
    `stackcore.media.lossy_dielectric`.

    Examples
    --------
    >>> complex(ConstantMedium(4.2 - 0.063j).evaluate(np.array(1e10)).permittivity)
    (4.2-0.063j)
    """

    permittivity: complex
    permeability: complex = 1.0 + 0.0j
    loss_as: Literal["part", "tangent"] = field(default="part", kw_only=True)
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_relative("permittivity", self.permittivity)
        check_relative("permeability", self.permeability)
        if self.loss_as not in ("part", "tangent"):
            raise ValueError(f"loss_as {self.loss_as!r} is unknown; there are part, tangent")
        if self.loss_as == "tangent":
            check_positive("permittivity", complex(self.permittivity).real)

    @classmethod
    def with_loss_tangent(
        cls,
        permittivity: float,
        loss_tangent: float,
        permeability: complex = 1.0 + 0.0j,
        valid_range: FrequencyRange | None = None,
        provenance: Provenance = UNSOURCED,
    ) -> "ConstantMedium":
        """Return the medium of ε′ (1 − j tan δ), ε′ > 0 and tan δ ≥ 0."""
        check_loss("loss_tangent", loss_tangent)
        loss = permittivity * loss_tangent
        value = complex(permittivity, -loss) if loss else complex(permittivity)
        return cls(value, permeability, valid_range, provenance, loss_as="tangent")

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

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        epsilon = complex(self.permittivity)
        electric: dict[str, complex] = {"permittivity": 1.0, "permittivity_loss": -1j}
        if self.loss_as == "tangent":
            tangent = -epsilon.imag / epsilon.real
            electric = {"permittivity": 1 - 1j * tangent, "loss_tangent": -1j * epsilon.real}
        return both_slopes(frequency, electric, {"permeability": 1.0, "permeability_loss": -1j})


VACUUM = ConstantMedium(1.0 + 0.0j)
"""ε = μ = 1 exactly; ``air`` and ``vacuum`` of a job."""
