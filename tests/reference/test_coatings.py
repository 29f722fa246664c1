"""Coatings against reflection: one, two and three layers on glass."""

import numpy as np
import pytest

from stackcore.stack import Layer, Stack
from tests.reference.published import (
    REDERIVED,
    SECOND_METHOD,
    TE,
    assert_printed,
    index,
    light,
    quarter,
    solved,
    wall,
)

BORN_WOLF = f"M. Born, E. Wolf, Principles of Optics, section 1.6.4 ({REDERIVED})"
HEAVENS = f"O. S. Heavens, Optical Properties of Thin Solid Films (1955) ({REDERIVED})"
ORFANIDIS = f"S. J. Orfanidis, Electromagnetic Waves and Antennas, multilayers; numbers by a {SECOND_METHOD}"
DESIGN = 550e-9

SINGLE = [  # index of the coat, of the glass, reflectance at the design wavelength, source
    (1.38, 1.50, "0.01411046", BORN_WOLF),
    (1.38, 1.52, "0.01260079", BORN_WOLF),
    (1.38, 1.52, "0.012601", BORN_WOLF),
    (1.35, 1.52, "0.00819045", f"textbook exercise; answer by a {SECOND_METHOD}"),
]

SPECTRUM = [  # wavelength in nm, reflectance of a magnesium fluoride coat (1.38, 550 nm) on glass of 1.52
    (400, "0.02205252"),
    (450, "0.01620430"),
    (500, "0.01335683"),
    (600, "0.01312726"),
    (650, "0.01436835"),
    (700, "0.01596197"),
]

QUARTER_HALF_QUARTER = [  # wavelength in nm, reflectance of 1.38 / 2.20 / 1.63 on 1.50
    (550, "0.00131190"),
    (500, "2.75693e-4"),
    (600, "5.08162e-4"),
    (450, "0.00456692"),
    (700, "0.00363193"),
]

QUARTER_QUARTER = [  # wavelength in nm, reflectance of 1.38 / 1.63 on 1.50, the same coat without its half wave
    (550, "0.00131190"),
    (450, "0.01708133"),
    (700, "0.01612446"),
]


def reflectance(stack: Stack, nanometres: float) -> float:
    """Return R at normal incidence."""
    return float(solved(stack, light(nanometres / 1000)).reflectance[0, 0, TE])


@pytest.mark.parametrize(("coat", "glass", "expected", "source"), SINGLE)
def test_quarter_wave_coat(coat: float, glass: float, expected: str, source: str) -> None:
    """A quarter-wave coat reflects ((n₀n_s - n₁²)/(n₀n_s + n₁²))²."""
    assert_printed(reflectance(wall(quarter(coat, DESIGN), back=index(glass)), 550), expected, source)


def test_bare_glass() -> None:
    """Glass of index 1.52 without a coat reflects 4.257999 per cent."""
    assert_printed(reflectance(wall(back=index(1.52)), 550), "0.04257999", BORN_WOLF)


@pytest.mark.parametrize("glass", [1.45, 1.52, 2.25, 4.0])
def test_perfect_quarter_wave_coat(glass: float) -> None:
    """A coat of the geometric mean of the indices leaves no reflection."""
    assert reflectance(wall(quarter(np.sqrt(glass), DESIGN), back=index(glass)), 550) < 1e-30, BORN_WOLF


@pytest.mark.parametrize(("nanometres", "expected"), SPECTRUM)
def test_magnesium_fluoride_over_the_spectrum(nanometres: float, expected: str) -> None:
    """The coat's reflectance away from its design wavelength agrees with a second method."""
    stack = wall(quarter(1.38, DESIGN), back=index(1.52))
    assert_printed(reflectance(stack, nanometres), expected, f"magnesium fluoride on glass ({SECOND_METHOD})")


def test_two_quarter_waves() -> None:
    """1.38 on 1.70 on glass of 1.52 leaves 6.5677305e-7."""
    stack = wall(quarter(1.38, DESIGN), quarter(1.70, DESIGN), back=index(1.52))
    assert_printed(reflectance(stack, 550), "6.5677305e-7", HEAVENS)


@pytest.mark.parametrize(("outer", "inner", "glass"), [(1.38, 2.20, 1.52), (1.46, 2.20, 1.60), (1.38, 2.10, 1.80)])
def test_two_layers_of_free_thickness(outer: float, inner: float, glass: float) -> None:
    """Two layers with the textbook's pair of phases, outside the quarter waves, leave no reflection at all."""
    first = (glass - 1) * (inner**2 - glass) * outer**2 / ((outer**2 * glass - inner**2) * (glass - outer**2))
    second = (glass - 1) * (glass - outer**2) * inner**2 / ((outer**2 * glass - inner**2) * (inner**2 - glass))
    phases = np.arctan(np.sqrt([first, second]))
    best = min(
        reflectance(
            wall(
                Layer(index(outer), float(a) * DESIGN / (2 * np.pi * outer)),
                Layer(index(inner), float(b) * DESIGN / (2 * np.pi * inner)),
                back=index(glass),
            ),
            550,
        )
        for a, b in ((phases[0], np.pi - phases[1]), (np.pi - phases[0], phases[1]), (phases[0], phases[1]))
    )
    assert best < 1e-28, HEAVENS


@pytest.mark.parametrize(("nanometres", "expected"), QUARTER_HALF_QUARTER)
def test_quarter_half_quarter(nanometres: float, expected: str) -> None:
    """The broad coat of three layers agrees over the spectrum."""
    half = Layer(index(2.20), DESIGN / (2 * 2.20))
    stack = wall(quarter(1.38, DESIGN), half, quarter(1.63, DESIGN), back=index(1.50))
    assert_printed(reflectance(stack, nanometres), expected, ORFANIDIS)


@pytest.mark.parametrize(("nanometres", "expected"), QUARTER_QUARTER)
def test_quarter_quarter(nanometres: float, expected: str) -> None:
    """Without its half wave the same coat is narrower, and the same at the design wavelength."""
    stack = wall(quarter(1.38, DESIGN), quarter(1.63, DESIGN), back=index(1.50))
    assert_printed(reflectance(stack, nanometres), expected, ORFANIDIS)
