"""A resistance, an inductance and a capacitance in series, per square."""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.sheets.base import AbstractSheet


@dataclass(frozen=True, slots=True)
class SeriesSheet(AbstractSheet):
    """Z = R + jωL + 1/(jωC).

    Parameters
    ----------
    resistance
        R in ohm (per square), ≥ 0.
    inductance
        L in H (per square), ≥ 0.
    capacitance
        C in F (per square), > 0, or None when there is no capacitor in the series.

    Raises
    ------
    ValueError
        For a negative or non-finite part, a capacitance of 0, or a sheet with nothing in it (a short circuit).

    Notes
    -----
    A conducting film much thinner than its skin depth is R = 1/(σd). Without loss the sheet shorts the field at
    its resonance ω = 1/√(LC).

    Examples
    --------
    >>> complex(SeriesSheet(resistance=377.0).impedance(np.array(1e9)))
    (377+0j)
    """

    resistance: float = 0.0
    inductance: float = 0.0
    capacitance: float | None = None

    def __post_init__(self) -> None:
        for name, value in (("resistance", self.resistance), ("inductance", self.inductance)):
            if not (np.isfinite(value) and value >= 0):
                raise ValueError(f"{name} {value} must be 0 or more")
        if self.capacitance is not None and not (np.isfinite(self.capacitance) and self.capacitance > 0):
            raise ValueError(f"capacitance {self.capacitance} must be more than 0")
        if self.resistance == 0 and self.inductance == 0 and self.capacitance is None:
            raise ValueError("a sheet needs a resistance, an inductance or a capacitance")

    def impedance(self, frequency: FloatArray) -> ComplexArray:
        omega = 2 * np.pi * np.asarray(frequency, dtype=np.float64)
        impedance = np.full(omega.shape, self.resistance, dtype=np.complex128)
        impedance.imag = omega * self.inductance
        if self.capacitance is not None:
            impedance.imag -= 1 / (omega * self.capacitance)
        return impedance

    def impedance_slope(self, frequency: FloatArray) -> ComplexArray:
        frequency = np.asarray(frequency, dtype=np.float64)
        slope = np.zeros(frequency.shape, dtype=np.complex128)
        slope.imag = 2 * np.pi * self.inductance
        if self.capacitance is not None:
            slope.imag += 1 / (2 * np.pi * frequency**2 * self.capacitance)
        return slope
