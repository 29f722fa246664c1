"""How large and how small a constant may be, in SI units.

Each range lies far outside anything that is built or measured. Within them every product a model or the solver
forms stays a finite double; a value outside is a slip of the keyboard.
"""

import math
from collections.abc import Iterator
from dataclasses import dataclass
from typing import Final

from stackcore.errors import Fault
from stackcore.media.models.wording import shown
from stackcore.units import Dimension


@dataclass(frozen=True, slots=True)
class Limits:
    """A closed range of one dimension; the lower end may be left out.

    Parameters
    ----------
    dimension
        What it is a range of.
    lowest, highest
        In SI units.
    open_below
        Whether `lowest` itself is left out.
    example
        A text that is right; that of the dimension when empty.
    or_zero
        Whether 0 is allowed although it lies below.
    gain
        Whether a negative value would be gain, which the fault then says.
    """

    dimension: Dimension
    lowest: float
    highest: float
    open_below: bool = False
    example: str = ""
    or_zero: bool = False
    gain: bool = False

    def contains(self, value: float) -> bool:
        """Return whether `value` is allowed; NaN is not."""
        if self.or_zero and value == 0:
            return True
        above = self.lowest < value if self.open_below else self.lowest <= value
        return above and value <= self.highest

    @property
    def allowed(self) -> str:
        """The range in words: ``0 m to 1e6 m, for example '2 mm'``."""
        low, high = (f"{_short(end)} {self.dimension.si_unit}".strip() for end in (self.lowest, self.highest))
        span = f"more than {low}, up to {high}" if self.open_below else f"{low} to {high}"
        if self.or_zero:
            span = f"0 or {span}"
        return f"{span}, for example {self.example or repr(self.dimension.example)}"


def limit_faults(value: float, text: str, limits: Limits, path: str) -> Iterator[Fault]:
    """Yield a fault for a value, shown as `text`, that its limits do not hold."""
    if limits.contains(value):
        return
    if not math.isfinite(value):
        what = "is not a finite number"
    elif value < 0 <= limits.lowest:
        what = "is negative, which would be gain" if limits.gain else "is negative"
    elif value == 0:
        what = "is 0"
    else:
        what = "is too small" if value < limits.lowest else "is too large"
    yield Fault(path, f"{shown(text)} {what}", limits.allowed)


def _short(value: float) -> str:
    return f"{value:g}".replace("e+0", "e").replace("e+", "e")


LARGEST_RELATIVE: Final = 1e12
"""Of |ε| and |μ|."""

CONDUCTIVITY: Final = Limits(Dimension.CONDUCTIVITY, 0.0, 1e15, open_below=True)
"""Of a conductor."""

LOSS_CONDUCTIVITY: Final = Limits(
    Dimension.CONDUCTIVITY, 1e-30, 1e15, or_zero=True, gain=True, example="'0.02 S/m'"
)
"""Beside the loss of a dielectric."""

LOSS_TANGENT: Final = Limits(Dimension.NUMBER, 1e-30, 1e9, or_zero=True, gain=True, example="0.015")
FREQUENCY: Final = Limits(Dimension.FREQUENCY, 1e-3, 1e21)
TIME: Final = Limits(Dimension.TIME, 1e-22, 1e9)
TIME_OR_NONE: Final = Limits(Dimension.TIME, 1e-22, 1e9, or_zero=True, example="'25 fs'")
RATE: Final = Limits(Dimension.RATE, 1e-3, 1e22, or_zero=True, gain=True)
LENGTH_OR_NONE: Final = Limits(Dimension.LENGTH, 1e-15, 1e-2, or_zero=True, example="'0.4 um'")
WAVELENGTH: Final = Limits(Dimension.LENGTH, 1e-15, 1e6, example="'0.1 um'")
TEMPERATURE: Final = Limits(Dimension.TEMPERATURE, 0.0, 1e4, open_below=True)
DENSITY: Final = Limits(Dimension.DENSITY, 1.0, 1e36)
POSITIVE: Final = Limits(Dimension.NUMBER, 1e-12, 1e12, example="2.5")
STEP: Final = Limits(Dimension.NUMBER, 1e-30, 1e12, or_zero=True, gain=True, example="1.8")
EXPONENT: Final = Limits(Dimension.NUMBER, 1e-3, 1.0, example="0.8")
WIDE_EXPONENT: Final = Limits(Dimension.NUMBER, 1e-3, 1e3, example="0.6")
POWER: Final = Limits(Dimension.NUMBER, -10.0, 10.0, example="0.78")
WHOLE_POWER: Final = Limits(Dimension.NUMBER, -10.0, 10.0, example="-2")
COEFFICIENT: Final = Limits(Dimension.NUMBER, -1e6, 1e6, example="0.0035")
EXTINCTION: Final = Limits(Dimension.NUMBER, 1e-30, 1e6, or_zero=True, gain=True, example="0.001")
SCALE: Final = Limits(Dimension.NUMBER, 1e-6, 1e6, example="1.05")
SALINITY: Final = Limits(Dimension.NUMBER, 0.0, 1000.0, example="35")
FRACTION: Final = Limits(Dimension.NUMBER, 0.0, 1.0, example="0.3 for 30 %")
