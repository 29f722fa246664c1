"""A conducting film as a sheet: its conductivity and its thickness give its resistance."""

import math
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.sheets.base import AbstractSheet


@dataclass(frozen=True, slots=True)
class FilmSheet(AbstractSheet):
    """Z = 1/(σd).

    Parameters
    ----------
    conductivity
        σ in S/m, > 0.
    thickness
        d in m, > 0. It counts for the resistance only: the sheet has no thickness in the stack.

    Raises
    ------
    ValueError
        For a part that is not positive and finite.

    Notes
    -----
    Holds while d is much smaller than the skin depth, and the film conducts as the bulk does. A film that is not
    so thin is a layer. Source: the definition of sheet resistance; S. A. Schelkunoff, Electromagnetic Waves (1943).

    Examples
    --------
    >>> round(FilmSheet(0.55e6, 180e-9).resistance, 3)
    10.101
    """

    conductivity: float
    thickness: float

    def __post_init__(self) -> None:
        for name, value in (("conductivity", self.conductivity), ("thickness", self.thickness)):
            if not (math.isfinite(value) and value > 0):
                raise ValueError(f"{name} {value} must be more than 0")

    @property
    def resistance(self) -> float:
        """Resistance per square, ohm."""
        return 1.0 / (self.conductivity * self.thickness)

    def impedance(self, frequency: FloatArray) -> ComplexArray:
        return np.full(np.shape(frequency), self.resistance, dtype=np.complex128)

    def impedance_slope(self, frequency: FloatArray) -> ComplexArray:
        return np.zeros(np.shape(frequency), dtype=np.complex128)
