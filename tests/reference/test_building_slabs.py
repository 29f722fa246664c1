"""Single slabs of building materials after ITU-R P.2040-3."""

import numpy as np
import pytest

from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.media.constant import ConstantMedium
from stackcore.stack import Layer
from tests.reference.published import REDERIVED, TE, TM, TRANSCRIBED, assert_printed, assert_within, solved, wall

SOURCE = f"ITU-R P.2040-3 (2023), equations (43), (44), constants ({TRANSCRIBED}), slab formula ({REDERIVED})"
CONCRETE = (5.24, 0.0462, 0.7822)
GLASS = (6.31, 0.0036, 1.3394)
INCIDENCES = ((0.0, TE), (45.0, TE), (45.0, TM), (60.0, TE), (60.0, TM))

SLABS = [  # (ε′, c, d), mm, GHz, ε″ as printed, (return loss, transmission loss) in dB at INCIDENCES
    (CONCRETE, 200.0, 1.0, "0.830450", "9.694,7.787 6.950,9.113 13.047,7.406 4.537,10.932 19.754,7.177"),
    (CONCRETE, 200.0, 2.4, "0.686283", "7.866,14.571 6.079,16.267 11.952,14.319 4.196,18.262 19.241,14.200"),
    (GLASS, 6.0, 10.0, "0.141375", "28.040,0.444 15.528,0.674 22.767,0.395 9.153,1.277 25.863,0.348"),
    (GLASS, 4.0, 28.0, "0.200512", "9.348,1.609 4.135,3.444 9.657,1.449 2.083,5.877 14.866,1.026"),
]

THICKNESSES = [(190.0, "18.13"), (200.0, "19.02"), (210.0, "19.90")]  # mm of concrete, loss at 3.5 GHz


@pytest.mark.parametrize("slab", SLABS)
@pytest.mark.parametrize("place", range(len(INCIDENCES)))
def test_slab(slab: tuple[tuple[float, float, float], float, float, str, str], place: int) -> None:
    """Return and transmission loss of concrete and glass agree with the recommendation's slab formula."""
    constants, millimetres, gigahertz, loss, row = slab
    degrees, polarization = INCIDENCES[place]
    reflected, transmitted = row.split()[place].split(",")
    eps = _permittivity(constants, gigahertz)
    assert_printed(-eps.imag, loss, SOURCE)
    r = solved(wall(Layer(ConstantMedium(eps), millimetres * 1e-3)), gigahertz * 1e9, degrees)
    assert_printed(float(r.return_loss_dB[0, 0, polarization]), reflected, SOURCE)
    assert_printed(float(r.insertion_loss_dB[0, 0, polarization]), transmitted, SOURCE)


@pytest.mark.parametrize("slab", SLABS)
@pytest.mark.parametrize(("degrees", "polarization"), INCIDENCES)
def test_slab_formula(
    slab: tuple[tuple[float, float, float], float, float, str, str], degrees: float, polarization: int
) -> None:
    """r and t equal the recommendation's own formulas (its R for TM turns the sign of ours)."""
    constants, millimetres, gigahertz, _, _ = slab
    eta = _permittivity(constants, gigahertz)
    sine, cosine = np.sin(np.radians(degrees)), np.cos(np.radians(degrees))
    a = np.sqrt(eta - sine**2)
    face = (cosine - a) / (cosine + a) if polarization == TE else (eta * cosine - a) / (eta * cosine + a)
    phase = 2 * np.pi * millimetres * 1e-3 * gigahertz * 1e9 / 299792458.0 * a
    round_trip = np.exp(-2j * phase)
    reflection = face * (1 - round_trip) / (1 - face**2 * round_trip)
    transmission = (1 - face**2) * np.exp(-1j * phase) / (1 - face**2 * round_trip)
    r = solved(wall(Layer(ConstantMedium(eta), millimetres * 1e-3)), gigahertz * 1e9, degrees)
    sign = 1 if polarization == TE else -1
    assert_within(abs(complex(r.reflection[0, 0, polarization]) - sign * complex(reflection)), 0, 1e-12, SOURCE)
    assert_within(abs(complex(r.transmission[0, 0, polarization]) - complex(transmission)), 0, 1e-12, SOURCE)


@pytest.mark.parametrize(("millimetres", "expected"), THICKNESSES)
def test_concrete_of_different_thickness(millimetres: float, expected: str) -> None:
    """A wall of 190 to 210 mm at 3.5 GHz loses 18.13 to 19.90 dB."""
    stack = wall(Layer(ConstantMedium(_permittivity(CONCRETE, 3.5)), millimetres * 1e-3))
    assert_printed(float(solved(stack, 3.5e9).insertion_loss_dB[0, 0, TE]), expected, SOURCE)


def _permittivity(constants: tuple[float, float, float], gigahertz: float) -> complex:
    """Return ε′ − jσ/(ωε₀), σ = c f^d with f in GHz."""
    real, c, d = constants
    return complex(real, -c * gigahertz**d / (2 * np.pi * gigahertz * 1e9 * VACUUM_PERMITTIVITY))
