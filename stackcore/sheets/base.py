"""The contract of a sheet: frequency -> impedance of a plane without thickness.

1. `impedance` is vectorised over frequencies in Hz and returns ohm (per square), R + jX with R ≥ 0.
2. `impedance_slope` is its analytic derivative with respect to frequency in Hz, ohm/Hz.
3. The tangential electric field is the same on both sides; the tangential magnetic field jumps by E/Z.
4. A sheet is a frozen value.
"""

from abc import ABC, abstractmethod

from stackcore.arrays import ComplexArray, FloatArray


class AbstractSheet(ABC):
    """An impedance sheet between two elements. See the module's numbered contract."""

    __slots__ = ()

    @abstractmethod
    def impedance(self, frequency: FloatArray) -> ComplexArray:
        """Return the sheet impedance in ohm at `frequency` in Hz (any shape, all > 0)."""

    @abstractmethod
    def impedance_slope(self, frequency: FloatArray) -> ComplexArray:
        """Return d(impedance)/d(frequency) in ohm/Hz."""
