"""The kinds of quantity a job holds, and every unit each may be written in.

Scales are exact fractions of the SI base unit, so that a decimal text becomes the nearest double in one rounding:
``30 µm`` is the double nearest to 3e-05, not 30 times the double nearest to 1e-06.

Sources: BIPM, The International System of Units, 9th edition (2019), for prefixes and for the degree; the inch of
25.4 mm exactly and the mil of a thousandth of it (ISO 80000-3); IEC 60028 (1925) for the conductivity of annealed
copper, 58 MS/m at 20 °C, which is 100 %IACS. An electronvolt of photon energy is the frequency e/h, both exact.
"""

import math
from dataclasses import dataclass
from enum import Enum
from fractions import Fraction
from typing import Final

from stackcore.constants import ELEMENTARY_CHARGE, PLANCK_CONSTANT

PREFIXES: Final[dict[str, Fraction]] = {
    "a": Fraction(1, 10**18),
    "f": Fraction(1, 10**15),
    "p": Fraction(1, 10**12),
    "n": Fraction(1, 10**9),
    "u": Fraction(1, 10**6),
    "m": Fraction(1, 10**3),
    "c": Fraction(1, 10**2),
    "": Fraction(1),
    "k": Fraction(10**3),
    "M": Fraction(10**6),
    "G": Fraction(10**9),
    "T": Fraction(10**12),
    "P": Fraction(10**15),
}
"""SI prefix as typed (``u`` for micro) -> factor."""

_DEGREE: Final = Fraction(math.pi / 180)
"""The double nearest to π/180 and not π/180 itself, so that ``30 deg`` is bit for bit ``numpy.radians(30)``."""


class Dimension(Enum):
    """A kind of quantity; the value is its name in words.

    Examples
    --------
    >>> Dimension.LENGTH.word, Dimension.LENGTH.si_unit
    ('length', 'm')
    >>> "mil" in Dimension.LENGTH.units
    True
    """

    LENGTH = "length"
    FREQUENCY = "frequency"
    ANGLE = "angle"
    RESISTANCE = "sheet resistance"
    INDUCTANCE = "inductance"
    CAPACITANCE = "capacitance"
    CONDUCTIVITY = "conductivity"
    TIME = "time"
    RATE = "rate"
    TEMPERATURE = "temperature"
    DENSITY = "number density"
    MASS_DENSITY = "density"
    NUMBER = "number"

    @property
    def word(self) -> str:
        """The name in words: ``sheet resistance``."""
        return self.value

    @property
    def phrase(self) -> str:
        """The name with its article: ``an angle``."""
        return f"{'an' if self.value[0] in 'aeiou' else 'a'} {self.value}"

    @property
    def si_unit(self) -> str:
        """The unit a bare number is in; empty for a pure number."""
        return _FACTS[self].si_unit

    @property
    def units(self) -> tuple[str, ...]:
        """The units to offer, smallest first, spelled as shown."""
        return _FACTS[self].offered

    @property
    def example(self) -> str:
        """A text that is right."""
        return _FACTS[self].example

    @property
    def allowed(self) -> str:
        """What may be written, as an error says it."""
        units = " ".join(self.units)
        if self is Dimension.NUMBER:
            return f"a plain number, for example {self.example}"
        return f"{self.phrase} in {units}, for example '{self.example}'"

    @property
    def usual_unit(self) -> str:
        """The unit a zero is shown in, and a good default for a table column."""
        return _FACTS[self].usual

    @property
    def ladder(self) -> tuple[tuple[str, Fraction], ...]:
        """Units to show a value in, largest first, each with the smallest magnitude (SI) it is used for."""
        return _FACTS[self].ladder


@dataclass(frozen=True, slots=True)
class Unit:
    """One way to write a unit.

    Parameters
    ----------
    symbol
        As shown: ``µm``, ``Ω/sq``.
    scale
        In SI base units, exact.
    dimension
        What it measures.
    prefix
        The SI prefix in `symbol` as typed (``u`` for micro), empty when there is none.
    zero
        What 0 of it is in the SI base unit; not 0 for a scale of temperature only.
    """

    symbol: str
    scale: Fraction
    dimension: Dimension
    prefix: str = ""
    zero: Fraction = Fraction(0)


@dataclass(frozen=True, slots=True)
class _Facts:
    si_unit: str
    offered: tuple[str, ...]
    example: str
    usual: str
    ladder: tuple[tuple[str, Fraction], ...]


def _ladder(base: str, prefixes: str) -> tuple[tuple[str, Fraction], ...]:
    """Return the rungs of `base` with one-letter `prefixes` (``-`` for none), each used from 1 upward."""
    rungs = []
    for letter in prefixes:
        prefix = "" if letter == "-" else letter
        rungs.append((prefix.replace("u", "µ") + base, PREFIXES[prefix]))
    return tuple(rungs)


_FACTS: Final[dict[Dimension, _Facts]] = {
    Dimension.LENGTH: _Facts(
        "m",
        ("nm", "um", "mm", "cm", "m", "mil", "in"),
        "2 mm",
        "mm",
        # Shop drawings say 0.9 mm, plating says 35 µm: millimetres start at a tenth.
        (("m", Fraction(1)), ("mm", Fraction(1, 10**4)), ("µm", Fraction(1, 10**6)), ("nm", Fraction(1, 10**9))),
    ),
    Dimension.FREQUENCY: _Facts(
        "Hz", ("Hz", "kHz", "MHz", "GHz", "THz", "PHz"), "10 GHz", "GHz", _ladder("Hz", "PTGMk-")
    ),
    Dimension.ANGLE: _Facts("rad", ("deg", "rad"), "30 deg", "deg", (("deg", Fraction(0)),)),
    Dimension.RESISTANCE: _Facts(
        "ohm/sq", ("ohm/sq", "ohm", "mohm/sq", "kohm/sq"), "377 ohm/sq", "Ω/sq", _ladder("Ω/sq", "GMk-mu")
    ),
    Dimension.INDUCTANCE: _Facts("H", ("pH", "nH", "uH", "mH", "H"), "20 pH", "nH", _ladder("H", "-munpf")),
    Dimension.CAPACITANCE: _Facts("F", ("fF", "pF", "nF", "uF", "F"), "1 pF", "pF", _ladder("F", "-munpfa")),
    Dimension.CONDUCTIVITY: _Facts(
        "S/m", ("S/m", "kS/m", "MS/m", "S/cm", "%IACS"), "58 MS/m", "S/m", _ladder("S/m", "GMk-mun")
    ),
    Dimension.TIME: _Facts("s", ("fs", "ps", "ns", "us", "ms", "s"), "8 ps", "ps", _ladder("s", "-munpf")),
    Dimension.RATE: _Facts("1/s", ("1/s",), "5e13 1/s", "1/s", (("1/s", Fraction(0)),)),
    # `stackcore.units.measure` shows in K what lies far from room temperature.
    Dimension.TEMPERATURE: _Facts("K", ("°C", "K"), "20 °C", "°C", (("°C", Fraction(0)),)),
    Dimension.DENSITY: _Facts("1/m3", ("1/m3", "1/cm3"), "1e18 1/m3", "1/m3", (("1/m3", Fraction(0)),)),
    Dimension.MASS_DENSITY: _Facts("kg/m3", ("kg/m3", "g/cm3"), "1900 kg/m3", "kg/m3", (("kg/m3", Fraction(0)),)),
    Dimension.NUMBER: _Facts("", (), "4.2", "", (("", Fraction(0)),)),
}


def _with_prefixes(dimension: Dimension, base: str, spellings: tuple[str, ...], prefixes: str) -> dict[str, Unit]:
    """Return typed name -> unit for `spellings` of `base` behind each of `prefixes` (``-`` for none)."""
    names = {}
    for letter in prefixes:
        prefix = "" if letter == "-" else letter
        unit = Unit(prefix.replace("u", "µ") + base, PREFIXES[prefix], dimension, prefix)
        names.update({prefix + spelling: unit for spelling in spellings})
    return names


def _named(dimension: Dimension, symbol: str, scale: Fraction, *spellings: str) -> dict[str, Unit]:
    unit = Unit(symbol, scale, dimension)
    return dict.fromkeys((symbol, *spellings), unit)


def _scaled(names: dict[str, Unit], factor: Fraction) -> dict[str, Unit]:
    """Return units that are `factor` times as large."""
    return {
        name: Unit(unit.symbol, unit.scale * factor, unit.dimension, unit.prefix) for name, unit in names.items()
    }


def _degrees(symbol: str, scale: Fraction, zero: Fraction, *spellings: str) -> dict[str, Unit]:
    unit = Unit(symbol, scale, Dimension.TEMPERATURE, zero=zero)
    return dict.fromkeys((symbol, *spellings), unit)


_HERTZ_PER_ELECTRONVOLT: Final = Fraction(repr(ELEMENTARY_CHARGE)) / Fraction(repr(PLANCK_CONSTANT))
_INCH: Final = Fraction(254, 10**4)
_SQUARES: Final = ("ohm/sq", "ohm", "ohms", "ohms/sq", "ohm/square", "ohms/square")

UNITS: Final[dict[str, Unit]] = {
    **_with_prefixes(Dimension.LENGTH, "m", ("m",), "pnumc-k"),
    **_named(Dimension.LENGTH, "in", _INCH, "inch", "inches", '"'),
    **_named(Dimension.LENGTH, "mil", _INCH / 1000, "mils", "thou"),
    **_named(Dimension.LENGTH, "µm", PREFIXES["u"], "micron", "microns"),
    **_named(Dimension.LENGTH, "Å", Fraction(1, 10**10), "angstrom", "angstroms"),
    **_with_prefixes(Dimension.FREQUENCY, "Hz", ("Hz",), "m-kMGTP"),
    **_scaled(_with_prefixes(Dimension.FREQUENCY, "eV", ("eV",), "m-k"), _HERTZ_PER_ELECTRONVOLT),
    **_named(Dimension.ANGLE, "deg", _DEGREE, "°", "degree", "degrees"),
    **_with_prefixes(Dimension.ANGLE, "rad", ("rad",), "m-"),
    **_with_prefixes(Dimension.RESISTANCE, "Ω/sq", _SQUARES, "um-kMG"),
    **_with_prefixes(Dimension.INDUCTANCE, "H", ("H",), "afpnum-"),
    **_with_prefixes(Dimension.CAPACITANCE, "F", ("F",), "afpnum-"),
    **_with_prefixes(Dimension.CONDUCTIVITY, "S/m", ("S/m",), "pnum-kMG"),
    **_scaled(_with_prefixes(Dimension.CONDUCTIVITY, "S/cm", ("S/cm",), "um-kM"), Fraction(100)),
    **_named(Dimension.CONDUCTIVITY, "%IACS", Fraction(580_000)),
    **_with_prefixes(Dimension.TIME, "s", ("s",), "afpnum-"),
    **_named(Dimension.RATE, "1/s", Fraction(1), "/s", "s^-1"),
    **_degrees("K", Fraction(1), Fraction(0), "kelvin"),
    **_degrees("°C", Fraction(1), Fraction(27315, 100), "C", "degC", "celsius"),
    **_degrees("°F", Fraction(5, 9), Fraction(45967, 180), "degF", "fahrenheit"),
    **_named(Dimension.DENSITY, "1/m3", Fraction(1), "/m3", "1/m^3", "/m^3", "1/m³", "/m³", "m^-3"),
    **_named(Dimension.DENSITY, "1/cm3", Fraction(10**6), "/cm3", "1/cm^3", "/cm^3", "1/cm³", "/cm³", "cm^-3"),
    **_named(Dimension.MASS_DENSITY, "kg/m3", Fraction(1), "kg/m^3", "kg/m³"),
    **_named(Dimension.MASS_DENSITY, "g/cm3", Fraction(1000), "g/cm^3", "g/cm³", "g/cc", "kg/l", "g/ml"),
    **_named(Dimension.MASS_DENSITY, "pcf", Fraction(45359237, 10**8) / (_INCH * 12) ** 3),
    **_named(Dimension.NUMBER, "%", Fraction(1, 100)),
}
"""Name as typed, after `stackcore.units.spelling.plain` -> unit."""
