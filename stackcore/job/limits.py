"""How large and how small the values of a job may be, in SI units.

Each range lies far outside anything that is built or measured. Within them every product the solver forms stays a
finite double; a value outside is a slip of the keyboard.
"""

from collections.abc import Mapping
from typing import Final

from stackcore.media.models.limits import Limits as Limits
from stackcore.media.models.limits import limit_faults as limit_faults
from stackcore.units import Dimension

LENGTH: Final = Limits(Dimension.LENGTH, 0.0, 1e6)
FREQUENCY: Final = Limits(Dimension.FREQUENCY, 1e-3, 1e18)
RESISTANCE: Final = Limits(Dimension.RESISTANCE, 0.0, 1e15)
INDUCTANCE: Final = Limits(Dimension.INDUCTANCE, 0.0, 1e6)
CAPACITANCE: Final = Limits(Dimension.CAPACITANCE, 1e-30, 1e6)
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
