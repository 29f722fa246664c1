"""How large and how small the values of a job may be, in SI units.

Each range lies far outside anything that is built or measured. Within them every product the solver forms stays a
finite double; a value outside is a slip of the keyboard.
"""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

from stackcore.units import Dimension


@dataclass(frozen=True, slots=True)
class Limits:
    """A closed range of one dimension; the lower end may be left out."""

    dimension: Dimension
    lowest: float
    highest: float
    open_below: bool = False
    example: str = ""

    def contains(self, value: float) -> bool:
        """Return whether `value` is allowed; NaN is not."""
        above = self.lowest < value if self.open_below else self.lowest <= value
        return above and value <= self.highest

    @property
    def allowed(self) -> str:
        """The range in words: ``0 m to 1e6 m, for example '2 mm'``."""
        low, high = (f"{_short(end)} {self.dimension.si_unit}".strip() for end in (self.lowest, self.highest))
        span = f"more than {low}, up to {high}" if self.open_below else f"{low} to {high}"
        return f"{span}, for example {self.example or repr(self.dimension.example)}"


def _short(value: float) -> str:
    return f"{value:g}".replace("e+0", "e").replace("e+", "e")


LENGTH: Final = Limits(Dimension.LENGTH, 0.0, 1e6)
FREQUENCY: Final = Limits(Dimension.FREQUENCY, 1e-3, 1e18)
RESISTANCE: Final = Limits(Dimension.RESISTANCE, 0.0, 1e15)
INDUCTANCE: Final = Limits(Dimension.INDUCTANCE, 0.0, 1e6)
CAPACITANCE: Final = Limits(Dimension.CAPACITANCE, 1e-30, 1e6)
CONDUCTIVITY: Final = Limits(Dimension.CONDUCTIVITY, 0.0, 1e15, open_below=True)
LOSS_TANGENT: Final = Limits(Dimension.NUMBER, 0.0, 1e9, example="0.015")

LARGEST_RELATIVE: Final = 1e12
"""Of |ε| and |μ|."""

SHEET_PARTS: Final[Mapping[str, Limits]] = {
    "resistance": RESISTANCE,
    "inductance": INDUCTANCE,
    "capacitance": CAPACITANCE,
}
"""Part of a sheet -> what it may be, in the order of the file."""

MOST_STACKS: Final = 1000
MOST_MATERIALS: Final = 1000
MOST_ELEMENTS: Final = 10_000
"""Of one stack."""

MOST_POINTS: Final = 1_000_000
"""Of a grid of frequencies or angles."""

MOST_LISTED: Final = 100_000
"""Of frequencies or angles written out one by one."""

MOST_PAIRS: Final = 20_000_000
"""Frequencies times angles of a sweep."""
