"""Pint as a second opinion on the size of every unit that both know."""

from typing import Any, Final

import hypothesis.strategies as st
import pint
import pytest
from hypothesis import given

from stackcore.units import Dimension, parse_measure

REGISTRY: Final[Any] = pint.UnitRegistry()

UNITS: Final = [
    *((Dimension.LENGTH, unit, unit, "m") for unit in ("nm", "um", "mm", "cm", "m", "km", "in", "micron")),
    (Dimension.LENGTH, "mil", "thou", "m"),
    (Dimension.LENGTH, "Å", "angstrom", "m"),
    *((Dimension.FREQUENCY, unit, unit, "Hz") for unit in ("mHz", "Hz", "kHz", "MHz", "GHz", "THz", "PHz")),
    *((Dimension.ANGLE, unit, unit, "rad") for unit in ("deg", "rad", "mrad")),
    *((Dimension.RESISTANCE, unit, unit, "ohm") for unit in ("uohm", "mohm", "ohm", "kohm", "Mohm", "Gohm")),
    *((Dimension.INDUCTANCE, unit, unit, "H") for unit in ("fH", "pH", "nH", "uH", "mH", "H")),
    *((Dimension.CAPACITANCE, unit, unit, "F") for unit in ("aF", "fF", "pF", "nF", "uF", "mF", "F")),
    *((Dimension.TIME, unit, unit, "s") for unit in ("fs", "ps", "ns", "us", "ms", "s")),
    (Dimension.DENSITY, "1/cm3", "1/cm**3", "1/m**3"),
    *((Dimension.CONDUCTIVITY, unit, unit, "S/m") for unit in ("S/m", "kS/m", "MS/m", "GS/m", "S/cm", "mS/cm")),
]
"""Dimension, name here, name in pint, SI unit in pint."""


@pytest.mark.parametrize(("dimension", "unit", "name", "base"), UNITS)
@given(number=st.floats(1e-6, 1e6))
def test_pint_has_the_same_size(number: float, dimension: Dimension, unit: str, name: str, base: str) -> None:
    """A number of each unit is the same in SI here and in pint, whose own scaling rounds more than once."""
    ours = parse_measure(f"{number!r} {unit}", dimension).value
    theirs = REGISTRY.Quantity(number, name).to(base).magnitude
    assert ours == pytest.approx(theirs, rel=4e-16)
