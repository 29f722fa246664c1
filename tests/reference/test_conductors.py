"""Good conductors: skin depth, surface resistance, the power a half-space of metal takes in."""

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.media.conductor import ConductorMedium
from stackcore.stack import Layer
from tests.reference.published import (
    READ,
    REDERIVED,
    TE,
    assert_printed,
    assert_within,
    solved,
    wall,
)

CHEN = f"J. Chen, University of Houston, table of skin depths (2019) ({READ})"
MATULA = f"public table (2018), copper resistivities after Matula 1979 ({READ})"
SIMMONS = f"public table (2018), aluminium resistivities after Simmons 1960 ({READ})"
OTT = f"H. W. Ott, EMC Engineering (2009), chapter 6 ({REDERIVED})"
POZAR = f"D. M. Pozar, Microwave Engineering, chapter 1 and appendix F ({REDERIVED})"
HAGEN = f"E. Hagen, H. Rubens (1903); Born and Wolf ({REDERIVED})"

DECADES = [
    (1.0, "6.6e-2"),
    (10.0, "2.1e-2"),
    (100.0, "6.6e-3"),
    (1e3, "2.1e-3"),
    (10e3, "0.66e-3"),
    (100e3, "0.21e-3"),
    (1e6, "66e-6"),
    (10e6, "21e-6"),
    (100e6, "6.6e-6"),
    (1e9, "2.1e-6"),
    (10e9, "0.66e-6"),
    (100e9, "0.21e-6"),
]
LOW = (1.0, 60.0, 400.0, 1e3, 5e3, 20e3, 200e3)
LOW_TABLE = [  # resistivity in ohm m, depths in mm at LOW, source
    (1.7e-8, "66 8.5 3.3 2.1 0.93 0.46 0.15", f"copper at 300 K, {MATULA}"),
    (2.8e-8, "84 11 4.2 2.7 1.2 0.60 0.19", f"aluminium at 300 K, {SIMMONS}"),
    (3.8e-8, "98 13 4.9 3.1 1.4 0.69 0.22", f"copper at 600 K, {MATULA}"),
    (5.9e-8, "122 16 6.1 3.9 1.7 0.86 0.27", f"aluminium at 600 K, {SIMMONS}"),
]
SKIN_DEPTHS = [  # conductivity in S/m, frequency in Hz, depth in m, source
    *((5.8e7, f, printed, CHEN) for f, printed in DECADES),
    *(
        (1 / rho, f, f"{printed}e-3", source)
        for rho, row, source in LOW_TABLE
        for f, printed in zip(LOW, row.split(), strict=True)
    ),
]
AT_TEN_GIGAHERTZ = [  # conductivity, depth in m; two tenths of a per cent, the source rounds its constants
    (3.816e7, 8.14e-7),
    (5.813e7, 6.60e-7),
    (4.098e7, 7.86e-7),
    (6.173e7, 6.40e-7),
]

SURFACES = [  # frequency in Hz, surface resistance in ohm, 1 − R of copper of 5.8e7 S/m, whether 1 − R is exact
    (1e9, "8.25023e-3", "8.75944e-5", True),
    (1e9, "8.25023e-3", "8.75982e-5", False),
    (10e9, "26.08951e-3", "2.77010e-4", False),
    (SPEED_OF_LIGHT / 10e-6, None, "1.517e-2", False),
]


def skin_depth(conductivity: float, frequency: float) -> float:
    """Return the depth in m found from the shielding that ten more skin depths of metal add."""
    metal = ConductorMedium(conductivity)
    nominal = float(metal.skin_depth(np.array(frequency)))
    thin, thick = (
        float(solved(wall(Layer(metal, n * nominal)), frequency).shielding_effectiveness_dB[0, 0, TE])
        for n in (20, 30)
    )
    return float(10 * nominal * 20 / np.log(10) / (thick - thin))


@pytest.mark.parametrize(("conductivity", "frequency", "printed", "source"), SKIN_DEPTHS)
def test_skin_depth(conductivity: float, frequency: float, printed: str, source: str) -> None:
    """The depth in which the field falls to 1/e agrees, from the medium's formula and from the solver."""
    nominal = float(ConductorMedium(conductivity).skin_depth(np.array(frequency)))
    assert_printed(nominal, printed, source)
    assert_within(skin_depth(conductivity, frequency), nominal, 1e-6 * nominal, source)


@pytest.mark.parametrize(("conductivity", "expected"), AT_TEN_GIGAHERTZ)
def test_skin_depth_at_ten_gigahertz(conductivity: float, expected: float) -> None:
    """Aluminium, copper, gold and silver at 10 GHz."""
    assert_within(skin_depth(conductivity, 10e9), expected, 2e-3 * expected, POZAR)


def test_skin_depth_of_copper_in_inches() -> None:
    """0.335 inch at 60 Hz and 0.003 inch at 1 MHz, with the 5.82e7 S/m that the source takes."""
    assert_printed(skin_depth(5.82e7, 60.0) / 25.4e-3, "0.335", OTT)
    assert_printed(skin_depth(5.82e7, 1e6) / 25.4e-3, "0.003", OTT)


def test_copper_half_space() -> None:
    """Copper of 5.813e7 S/m at 1 GHz: impedance 8.239 mΩ (1 + j), t of 6.181e-5 at 45 degrees, r nearly −1."""
    r = solved(wall(back=ConductorMedium(5.813e7)), 1e9)
    reflection, transmission = complex(r.reflection[0, 0, TE]), complex(r.transmission[0, 0, TE])
    # Through t = 2ζ/(1 + ζ), as 1 + r has no digits to spare.
    impedance = FREE_SPACE_IMPEDANCE * transmission / (2 - transmission)
    assert_within(impedance.real, 8.239e-3, 1.5e-3 * 8.239e-3, POZAR)
    assert_within(impedance.imag, 8.239e-3, 1.5e-3 * 8.239e-3, POZAR)
    assert_within(abs(transmission), 6.181e-5, 1.5e-3 * 6.181e-5, POZAR)
    assert_within(float(np.degrees(np.angle(transmission))), 45.0, 0.01, POZAR)
    assert_printed(abs(reflection), "0.999956", POZAR)
    assert_printed(float(np.degrees(np.angle(reflection))), "179.9975", POZAR)


@pytest.mark.parametrize(("frequency", "resistance", "absorbed", "exact"), SURFACES)
def test_hagen_rubens(frequency: float, resistance: str | None, absorbed: str, exact: bool) -> None:
    """A half-space of copper takes in 4 R_s/Z₀, less a part of that order squared."""
    r = solved(wall(back=ConductorMedium(5.8e7)), frequency)
    taken = float(r.transmittance[0, 0, TE])
    impedance = FREE_SPACE_IMPEDANCE * complex(r.transmission[0, 0, TE]) / (2 - complex(r.transmission[0, 0, TE]))
    if resistance is not None:
        assert_printed(impedance.real, resistance, HAGEN)
    if exact:
        assert_printed(taken, absorbed, HAGEN)
    else:
        assert_within(taken, float(absorbed), float(absorbed) ** 2, HAGEN)


def test_decay_in_sea_water() -> None:
    """At 1 kHz sea water attenuates and turns the wave by 0.126 per metre."""
    source = f"F. T. Ulaby, Fundamentals of Applied Electromagnetics, chapter 7 ({REDERIVED})"
    sea = ConductorMedium(4.0)
    near, far = (complex(solved(wall(Layer(sea, d)), 1e3).log_transmission[0, 0, TE]) for d in (100.0, 110.0))
    assert_printed(-(far - near).real / 10, "0.126", source)
    assert_printed(-(far - near).imag / 10, "0.126", source)
