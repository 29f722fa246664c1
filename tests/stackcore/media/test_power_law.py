"""The power law of building materials against the tables of ITU-R P.2040 in two editions."""

import numpy as np
import pytest

from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.media.power_law import PowerLawMedium
from tests.reference.published import READ, TRANSCRIBED, assert_printed

FIRST = f"ITU-R P.2040-1 (07/2015) ({TRANSCRIBED})"
LATER = f"ITU-R P.2040-2 (2021) and -3 (2023) ({TRANSCRIBED})"
EXAMPLE = f"ITU-R P.2040-1, table of examples at 9 GHz ({READ})"

# Edition, material, a, b, c, d, lowest and highest GHz.
CONSTANTS = [
    (FIRST, "concrete", 5.31, 0, 0.0326, 0.8095, 1, 100),
    (FIRST, "brick", 3.75, 0, 0.038, 0, 1, 10),
    (FIRST, "plasterboard", 2.94, 0, 0.0116, 0.7076, 1, 100),
    (FIRST, "wood", 1.99, 0, 0.0047, 1.0718, 0.001, 100),
    (FIRST, "glass", 6.27, 0, 0.0043, 1.1925, 0.1, 100),
    (FIRST, "ceiling board", 1.50, 0, 0.0005, 1.1634, 1, 100),
    (FIRST, "chipboard", 2.58, 0, 0.0217, 0.78, 1, 100),
    (FIRST, "floorboard", 3.66, 0, 0.0044, 1.3515, 50, 100),
    (FIRST, "metal", 1, 0, 1e7, 0, 1, 100),
    (FIRST, "very dry ground", 3, 0, 0.00015, 2.52, 1, 10),
    (FIRST, "medium dry ground", 15, -0.1, 0.035, 1.63, 1, 10),
    (FIRST, "wet ground", 30, -0.4, 0.15, 1.30, 1, 10),
    (LATER, "concrete", 5.24, 0, 0.0462, 0.7822, 1, 100),
    (LATER, "brick", 3.91, 0, 0.0238, 0.16, 1, 40),
    (LATER, "plasterboard", 2.73, 0, 0.0085, 0.9395, 1, 100),
    (LATER, "wood", 1.99, 0, 0.0047, 1.0718, 0.001, 100),
    (LATER, "glass", 6.31, 0, 0.0036, 1.3394, 0.1, 100),
    (LATER, "glass (high)", 5.79, 0, 0.0004, 1.658, 220, 450),
    (LATER, "ceiling board", 1.48, 0, 0.0011, 1.0750, 1, 100),
    (LATER, "ceiling board (high)", 1.52, 0, 0.0029, 1.029, 220, 450),
    (LATER, "chipboard", 2.58, 0, 0.0217, 0.78, 1, 100),
    (LATER, "plywood", 2.71, 0, 0.33, 0, 1, 40),
    (LATER, "marble", 7.074, 0, 0.0055, 0.9262, 1, 60),
    (LATER, "floorboard", 3.66, 0, 0.0044, 1.3515, 50, 100),
    (LATER, "metal", 1, 0, 1e7, 0, 1, 100),
    (LATER, "very dry ground", 3, 0, 0.00015, 2.52, 1, 10),
    (LATER, "medium dry ground", 15, -0.1, 0.035, 1.63, 1, 10),
    (LATER, "wet ground", 30, -0.4, 0.15, 1.30, 1, 10),
]


def medium_of(edition: str, material: str) -> PowerLawMedium:
    """Return the medium of a row of `CONSTANTS`."""
    row = next(row for row in CONSTANTS if row[:2] == (edition, material))
    return PowerLawMedium(*row[2:6])


def conductivity(medium: PowerLawMedium, frequency: float) -> float:
    """Return ωε₀ε″ in S/m."""
    loss = -float(medium.evaluate(np.array(frequency)).permittivity.imag)
    return 2 * np.pi * frequency * VACUUM_PERMITTIVITY * loss


@pytest.mark.parametrize(("edition", "material", "a", "b", "c", "d", "lowest", "highest"), CONSTANTS)
def test_constants(
    edition: str, material: str, a: float, b: float, c: float, d: float, lowest: float, highest: float
) -> None:
    """At both ends of its band each material has ε′ = a f^b and σ = c f^d, f in GHz, worked out by logarithms."""
    medium = medium_of(edition, material)
    for gigahertz in (lowest, highest):
        real = float(medium.evaluate(np.array(gigahertz * 1e9)).permittivity.real)
        assert np.log10(real) == pytest.approx(np.log10(a) + b * np.log10(gigahertz), abs=1e-12)
        expected = np.log10(c) + d * np.log10(gigahertz)
        assert np.log10(conductivity(medium, gigahertz * 1e9)) == pytest.approx(expected, abs=1e-12)
        assert float(medium.conductivity_at(np.array(gigahertz * 1e9))) == pytest.approx(
            10**expected, rel=1e-12, abs=0
        )


# Material, ε′, σ in S/m as printed, and with the digits of a recomputation.
AT_NINE_GIGAHERTZ = [
    ("concrete", "5.31", "0.19305", "0.193053"),
    ("brick", "3.75", "0.038", "0.038"),
    ("plasterboard", "2.94", "0.054914", "0.0549136"),
    ("wood", "1.99", "0.049528", "0.0495285"),
    ("glass", "6.27", "0.059075", "0.0590749"),
    ("ceiling board", "1.50", "0.00644371", "0.00644371"),
    ("chipboard", "2.58", "0.120439", "0.120439"),
]


@pytest.mark.parametrize(("material", "permittivity", "printed", "digits"), AT_NINE_GIGAHERTZ)
def test_nine_gigahertz(material: str, permittivity: str, printed: str, digits: str) -> None:
    """At 9 GHz the materials of the 2015 edition have the printed constants (the last two were not printed)."""
    medium = medium_of(FIRST, material)
    assert_printed(float(medium.evaluate(np.array(9e9)).permittivity.real), permittivity, EXAMPLE)
    # wood: the source cuts 0.0495285 to 0.049528
    assert conductivity(medium, 9e9) == pytest.approx(float(printed), abs=0.6 * 10.0 ** -len(printed.split(".")[1]))
    assert_printed(conductivity(medium, 9e9), digits, "second method")


# Material of the later editions, GHz, ε as printed beside the losses of slabs.
SLABS = [
    ("concrete", 1.0, "5.24", "0.830450"),
    ("concrete", 2.4, "5.24", "0.686283"),
    ("glass", 10.0, "6.31", "0.141375"),
    ("glass", 28.0, "6.31", "0.200512"),
]


@pytest.mark.parametrize(("material", "gigahertz", "real", "loss"), SLABS)
def test_permittivity_of_slabs(material: str, gigahertz: float, real: str, loss: str) -> None:
    """Concrete and glass of the later editions have the complex ε of the slab table (second method)."""
    value = complex(medium_of(LATER, material).evaluate(np.array(gigahertz * 1e9)).permittivity)
    assert_printed(value.real, real, LATER)
    assert_printed(-value.imag, loss, LATER)


@pytest.mark.parametrize(("frequency", "excess"), [(1e9, 42), (10e9, 33)])
def test_editions_of_concrete_differ(frequency: float, excess: float) -> None:
    """Concrete conducts 42 % more at 1 GHz and 33 % more at 10 GHz in the later editions: the edition counts."""
    first, later = medium_of(FIRST, "concrete"), medium_of(LATER, "concrete")
    ratio = conductivity(later, frequency) / conductivity(first, frequency)
    assert 100 * (ratio - 1) == pytest.approx(excess, abs=0.5)


@pytest.mark.parametrize(
    ("arguments", "told"),
    [
        ((0.0, 0.0, 0.1, 0.0), "permittivity 0 must be above 0"),
        ((5.0, 0.0, -0.1, 0.0), "conductivity -0.1 S/m is negative, which would be gain"),
        ((5.0, 11.0, 0.1, 0.0), "permittivity_exponent 11 lies beyond ±10"),
        ((5.0, 0.0, 0.1, float("nan")), "conductivity_exponent nan is not finite"),
    ],
)
def test_what_is_no_such_medium_is_refused(arguments: tuple[float, float, float, float], told: str) -> None:
    """Gain, powers beyond all publications and values that are not finite are refused by name."""
    with pytest.raises(ValueError, match=told):
        PowerLawMedium(*arguments)
