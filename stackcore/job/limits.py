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

CONDUCTIVITY: Final = Limits(Dimension.CONDUCTIVITY, 1e-12, 1e12)
FILM_PARTS: Final[Mapping[str, Limits]] = {
    "conductivity": CONDUCTIVITY,
    "thickness": Limits(Dimension.LENGTH, 1e-15, 1.0),
}
"""Part of a film -> what it may be."""

PARTS_OF_KIND: Final[Mapping[str, Mapping[str, Limits]]] = {"series": SHEET_PARTS, "film": FILM_PARTS}
"""Kind of sheet -> its parts."""

MASS_DENSITY: Final = Limits(Dimension.MASS_DENSITY, 1e-3, 1e5)
PLY: Final = Limits(Dimension.LENGTH, 1e-9, 1.0)

MOST_REPEATS: Final = 1000
"""Of one group."""
MOST_STACKS: Final = 1000
MOST_MATERIALS: Final = 1000
MOST_ELEMENTS: Final = 10_000
"""Of one stack, each repetition of a group counted."""

MOST_CONDITIONS: Final = 100
MOST_STATES: Final = 100
"""Of one material."""

THICKEST_FACTOR: Final = 1000.0
"""By which a condition may multiply a thickness."""

MOST_POINTS: Final = 1_000_000
"""Of a grid of frequencies or angles."""

MOST_LISTED: Final = 100_000
"""Of frequencies or angles written out one by one."""

MOST_PAIRS: Final = 20_000_000
"""Frequencies times angles of a sweep."""
