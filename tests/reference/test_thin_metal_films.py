"""Thin films of silver and gold in light: reflectance and absorption, and surface plasmons."""

import numpy as np
import pytest

from stackcore.media.constant import ConstantMedium
from stackcore.stack import Layer
from tests.reference.published import (
    READ,
    SECOND_METHOD,
    TE,
    TM,
    assert_printed,
    index,
    light,
    solved,
    wall,
)

JOHNSON = f"P. B. Johnson, R. W. Christy, Phys. Rev. B 6, 4370 (1972), index ({READ}); film ({SECOND_METHOD})"
RAETHER = f"H. Raether, Surface Plasmons (1988); index of Johnson and Christy ({READ}); film ({SECOND_METHOD})"
SILVER = index(0.06 - 3.586j)

FILMS = [  # degrees, polarization, R, T of 20 nm of silver on glass of 1.52 at 548.6 nm
    (0.0, TE, "0.68207071", "0.29312508"),
    (45.0, TE, "0.77583254", "0.20458873"),
    (45.0, TM, "0.60219826", "0.36905550"),
]

PLASMONS = [  # permittivity of the metal at 632.8 nm, angle of least R of 50 nm in degrees, least R
    ("gold", 0.18377 - 3.43125j, "43.786", "0.00581"),
    ("silver", 0.056253 - 4.276028j, "42.803", "0.02629"),
]
HALF_SPACE_ANGLES = [("gold", 0.18377 - 3.43125j, "43.6048"), ("silver", 0.056253 - 4.276028j, "42.7531")]


@pytest.mark.parametrize(("degrees", "polarization", "reflected", "transmitted"), FILMS)
def test_silver_film(degrees: float, polarization: int, reflected: str, transmitted: str) -> None:
    """R and T of 20 nm of silver agree to eight digits."""
    r = solved(wall(Layer(SILVER, 20e-9), back=index(1.52)), light(0.5486), degrees)
    assert_printed(float(r.reflectance[0, 0, polarization]), reflected, JOHNSON)
    assert_printed(float(r.transmittance[0, 0, polarization]), transmitted, JOHNSON)


def test_absorption_of_the_silver_film() -> None:
    """It absorbs 0.02480422, and from the glass side reflects 0.66994419 and passes the same as from the front."""
    front = solved(wall(Layer(SILVER, 20e-9), back=index(1.52)), light(0.5486))
    back = solved(wall(Layer(SILVER, 20e-9), front=index(1.52)), light(0.5486))
    assert_printed(float(front.absorptance[0, 0, TE]), "0.02480422", JOHNSON)
    assert_printed(float(back.reflectance[0, 0, TE]), "0.66994419", JOHNSON)
    assert_printed(float(back.transmittance[0, 0, TE]), "0.29312508", JOHNSON)


@pytest.mark.parametrize(("metal", "n", "degrees", "least"), PLASMONS)
def test_surface_plasmon(metal: str, n: complex, degrees: str, least: str) -> None:
    """Under a prism of 1.51509 the reflectance of 50 nm of metal dips at the printed angle to the printed depth."""
    angles = np.arange(42.0, 46.0, 1e-4)
    stack = wall(Layer(ConstantMedium(n**2), 50e-9), front=index(1.51509))
    r = solved(stack, light(0.6328), list(angles)).reflectance[0, :, TM]
    assert_printed(float(np.round(angles[np.argmin(r)], 4)), degrees, f"{metal}, {RAETHER}")
    assert_printed(float(r.min()), least, f"{metal}, {RAETHER}")


@pytest.mark.parametrize(("metal", "n", "degrees"), HALF_SPACE_ANGLES)
def test_surface_plasmon_of_a_thick_film(metal: str, n: complex, degrees: str) -> None:
    """The pole of a half-space, n_p sin θ = Re √(ε/(ε + 1)), is at the printed angle, the dip within 0.2°."""
    eps = np.conj(n) ** 2
    angle = float(np.degrees(np.arcsin(np.sqrt(eps / (eps + 1)).real / 1.51509)))
    assert_printed(angle, degrees, f"{metal}, {RAETHER}")
    angles = np.arange(42.0, 46.0, 1e-3)
    stack = wall(Layer(ConstantMedium(n**2), 70e-9), front=index(1.51509))
    r = solved(stack, light(0.6328), list(angles)).reflectance[0, :, TM]
    assert abs(float(angles[np.argmin(r)]) - angle) < 0.2, f"{metal}, {RAETHER}"
