"""The contract of a medium: frequency -> relative permittivity and permeability.

1. `evaluate` is vectorised: it takes frequencies in Hz of any shape and returns arrays of that shape.
2. Values follow `stackcore.conventions`: ε = ε′ − jε″ with ε″ ≥ 0 for loss, and the same for μ.
3. The slopes are the analytic derivatives with respect to frequency in Hz, complex, per Hz.
4. A medium is a frozen value; two media with equal fields are the same medium.
5. `dispersive` is False only when the values do not depend on frequency at all; the solver then works out the
   refraction once per angle.
6. Outside `valid_range` the model is still evaluated; who shows the result must say so.
7. `constant_slopes` are the analytic derivatives with respect to each real constant, per SI unit of it, all others
   held. Names are those of the job file, with the place in a list as in a path: ``terms[1].relaxation_time``.
   A complex constant counts as two, its real part under its own name and its loss as ``…_loss``. They may depend on
   frequency even where the values do not (the slope with respect to a conductivity of 0).
"""

from abc import ABC, abstractmethod
from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import ComplexArray as ComplexArray
from stackcore.arrays import FloatArray as FloatArray


@dataclass(frozen=True, slots=True)
class FrequencyRange:
    """A closed range of frequencies in Hz, within which a model or a value holds."""

    lowest: float
    highest: float

    def contains(self, frequency: FloatArray) -> NDArray[np.bool_]:
        """Return, for each frequency in Hz, whether the range holds it."""
        return np.asarray((frequency >= self.lowest) & (frequency <= self.highest))


@dataclass(frozen=True, slots=True)
class Provenance:
    """Where the numbers of a medium come from, how well they are known and how much they vary.

    Parameters
    ----------
    source
        Publication with edition, test report or data sheet; empty when the user gave none.
    certainty
        ``read``, ``recalled`` (from memory of the source), ``common practice`` or empty.
    spread
        Typical relative spread in production, one standard deviation, by name of the constant:
        ``{"permittivity": 0.02, "loss_tangent": 0.2}``.
    note
        Temperature, form, direction, or anything else a user must know.
    """

    source: str = ""
    certainty: str = ""
    spread: tuple[tuple[str, float], ...] = ()
    note: str = ""


UNSOURCED: Final = Provenance()
"""Nothing is known about where the numbers come from."""


@dataclass(frozen=True, slots=True)
class Constitutive:
    """Relative permittivity and permeability at some frequencies, with their slopes per Hz."""

    permittivity: ComplexArray
    permeability: ComplexArray
    permittivity_slope: ComplexArray
    permeability_slope: ComplexArray


@dataclass(frozen=True, slots=True)
class ConstantSlope:
    """Derivatives of relative ε and μ with respect to one real constant, per SI unit of it, at some frequencies."""

    permittivity: ComplexArray
    permeability: ComplexArray


class AbstractMedium(ABC):
    """What a layer or a half-space is made of. See the module's numbered contract."""

    __slots__ = ()

    @property
    @abstractmethod
    def dispersive(self) -> bool:
        """Whether the values depend on frequency."""

    @property
    @abstractmethod
    def valid_range(self) -> FrequencyRange | None:
        """Where the model holds, or None when no limit is known."""

    @property
    @abstractmethod
    def provenance(self) -> Provenance:
        """Where the numbers come from."""

    @abstractmethod
    def evaluate(self, frequency: FloatArray) -> Constitutive:
        """Return ε and μ, relative, and their slopes, at `frequency` in Hz (any shape, all > 0)."""

    @abstractmethod
    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        """Return, by name of the constant, the slopes of ε and μ at `frequency` in Hz, arrays of its shape."""
