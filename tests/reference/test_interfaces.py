"""Where two media meet: Fresnel's formulas, Brewster and critical angles, phases of total reflection."""

from itertools import pairwise

import numpy as np
import pytest

from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.stack import Stack
from tests.reference.published import (
    REDERIVED,
    TE,
    TM,
    TRANSCRIBED,
    assert_printed,
    assert_within,
    half_unit,
    index,
    solved,
    wall,
)

GLASS = wall(back=index(1.5))
FROM_GLASS = wall(front=index(1.5))
HECHT = f"E. Hecht, Optics, sections 4.6 and 8.6 ({REDERIVED})"
POZAR = f"D. M. Pozar, Microwave Engineering, chapter 1 ({REDERIVED})"
FRESNEL = f"Fresnel's formulas, M. Born and E. Wolf, Principles of Optics, section 1.5 ({REDERIVED})"

ANGLES = [  # relative permittivity, Brewster angle from vacuum, critical angle towards vacuum, source
    (2.1, "55.392", "43.635", FRESNEL),
    (2.25, "56.310", "41.810", FRESNEL),
    (2.25, "56.309932", "41.810315", HECHT),
    (2.55, "57.944", "38.772", FRESNEL),
    (2.55, "57.9", "38.8", POZAR),
    (3.0, "60.000", "35.264", FRESNEL),
    (3.78, "62.781", "30.954", FRESNEL),
    (4.0, "63.435", "30.000", FRESNEL),
    (6.31, "68.293", "23.459", FRESNEL),
    (9.0, "71.565", "19.471", FRESNEL),
    (81.0, "83.660", "6.379", FRESNEL),
]

REFLECTANCES = [  # degrees, R of TE, R of TM, air to glass of index 1.5
    (30, "0.057796105403213", "0.02524914654843"),
    (45, "0.092013363045524", "0.0084664589789475"),
    (60, "0.17657148808284", "0.001801937521585"),
    (75, "0.39935602700039", "0.10676509898024"),
    (85, "0.7323454787108", "0.49325381181885"),
]

JUDD = f"D. B. Judd, J. Res. NBS 29, 329 (1942), values for 1.5; formula ({REDERIVED})"
DIFFUSE = [  # index, reflectance of diffuse light from outside, from inside, source
    (1.5, "0.0917780", "0.5963458", JUDD),
    (1.33, "0.0659308", "0.4719491", JUDD),
]

RHOMB = [  # angle in glass of index 1.51, phase between TM and TE after one total reflection
    (51.33910, "45.94167"),
    (48.62436, "45.0000"),
    (54.62311, "45.0000"),
]
RHOMB_SOURCE = f"M. Born and E. Wolf, Principles of Optics, section 1.5.4 ({REDERIVED})"

SEA = [  # frequency in Hz, permittivity at 20 °C and 35 permil, reflected power, source
    (13.575e9, 47.0823 - 39.0651j, "0.6173", f"sea water, value quoted in public code ({TRANSCRIBED})"),
    (1.43e9, 72.026 - 65.672j, "0.6850", f"L. A. Klein, C. T. Swift, IEEE Trans. AP 25, 104 (1977) ({REDERIVED})"),
]


@pytest.mark.parametrize(("eps", "brewster", "critical", "source"), ANGLES)
def test_brewster_angle(eps: float, brewster: str, critical: str, source: str) -> None:
    """The TM reflection changes sign within half a unit of the printed Brewster angle."""
    half = half_unit(brewster)
    r = solved(wall(back=ConstantMedium(eps)), 1e10, [float(brewster) - half, float(brewster) + half])
    before, after = r.reflection[0, :, TM].real
    assert before * after < 0, source


@pytest.mark.parametrize(("eps", "brewster", "critical", "source"), ANGLES)
def test_critical_angle(eps: float, brewster: str, critical: str, source: str) -> None:
    """Transmission into vacuum ends within half a unit of the printed critical angle."""
    half = half_unit(critical)
    r = solved(wall(front=ConstantMedium(eps)), 1e10, [float(critical) - half, float(critical) + half])
    assert np.all(r.transmittance[0, 0] > 0), source
    assert np.all(r.transmittance[0, 1] == 0), source
    np.testing.assert_allclose(r.reflectance[0, 1], 1.0, rtol=1e-14)


def test_brewster_angle_from_inside() -> None:
    """Seen from the glass the Brewster angle is the complement, 33.690068 degrees."""
    half = half_unit("33.690068")
    before, after = solved(FROM_GLASS, 1e10, [33.690068 - half, 33.690068 + half]).reflection[0, :, TM].real
    assert before * after < 0, HECHT


@pytest.mark.parametrize(("degrees", "te", "tm"), REFLECTANCES)
def test_reflectance_of_glass(degrees: float, te: str, tm: str) -> None:
    """R of TE and TM for index 1.5 agree with the table to every printed digit."""
    r = solved(GLASS, 5e14, degrees)
    # The angle as a double is off by 1e-16, which is felt where 14 digits are printed.
    for polarization, printed in ((TE, te), (TM, tm)):
        value = float(r.reflectance[0, 0, polarization])
        assert_within(value, float(printed), half_unit(printed) + 1e-15, FRESNEL)


def test_reflectance_of_glass_at_normal_incidence() -> None:
    """((n - 1)/(n + 1))² = 0.04 for index 1.5, from either side."""
    for stack in (GLASS, FROM_GLASS):
        np.testing.assert_allclose(solved(stack, 5e14).reflectance, 0.04, rtol=1e-14, err_msg=HECHT)


def test_te_reflectance_at_the_brewster_angle() -> None:
    """((n² - 1)/(n² + 1))² = 0.147928994 for index 1.5."""
    r = solved(GLASS, 5e14, float(np.degrees(np.arctan(1.5))))
    assert_printed(float(r.reflectance[0, 0, TE]), "0.147928994", HECHT)


@pytest.mark.parametrize(("n", "outside", "inside", "source"), DIFFUSE)
def test_reflectance_of_diffuse_light(n: float, outside: str, inside: str, source: str) -> None:
    """The cosine-weighted mean over the hemisphere agrees from outside and, past total reflection, from inside."""
    critical = float(np.degrees(np.arcsin(1 / n)))
    assert_printed(_hemisphere(wall(back=index(n)), (0.0, 90.0)), outside, source)
    assert_printed(_hemisphere(wall(front=index(n)), (0.0, critical, 90.0)), inside, source)


@pytest.mark.parametrize(("degrees", "difference"), RHOMB)
def test_phase_of_total_reflection(degrees: float, difference: str) -> None:
    """The phase between TM and TE after a total reflection is that of Fresnel's rhomb."""
    r = solved(wall(front=index(1.51)), 5e14, degrees)
    phase = r.reflection_phase_deg[0, 0]
    # The coefficients are of the tangential electric field, which turns TM by half a turn against TE.
    delta = (float(phase[TM] - phase[TE]) + 180) % 360
    assert_printed(min(delta, 360 - delta), difference, RHOMB_SOURCE)


@pytest.mark.parametrize(("frequency", "eps", "reflected", "source"), SEA)
def test_power_reflected_by_the_sea(frequency: float, eps: complex, reflected: str, source: str) -> None:
    """The power reflected at normal incidence by sea water of a printed permittivity is the printed one."""
    assert_printed(
        float(solved(wall(back=ConstantMedium(eps)), frequency).reflectance[0, 0, TE]), reflected, source
    )


def test_wave_impedance_of_sea_water() -> None:
    """At 1 kHz sea water (4 S/m, 80) has an impedance of 0.044 ohm at 45 degrees."""
    source = f"F. T. Ulaby, Fundamentals of Applied Electromagnetics, chapter 7 ({REDERIVED})"
    loss = 4.0 / (2 * np.pi * 1e3 * VACUUM_PERMITTIVITY)
    r = complex(solved(wall(back=ConstantMedium(80 - 1j * loss)), 1e3).reflection[0, 0, TE])
    impedance = 376.730313 * (1 + r) / (1 - r)
    assert_printed(abs(impedance), "0.044", source)
    assert_printed(float(np.degrees(np.angle(impedance))), "45.0", source)


def test_nothing_at_all() -> None:
    """Vacuum against vacuum reflects and absorbs exactly nothing and lets everything through."""
    r = solved(wall(back=VACUUM), [1.0, 1e9, 1e15], [0.0, 45.0, 89.9])
    assert np.all(r.reflectance == 0)
    np.testing.assert_allclose(r.transmittance, 1.0, rtol=1e-15)
    assert np.all(r.absorptance == 0)
    assert np.all(r.return_loss_dB == np.inf)


def _hemisphere(stack: Stack, edges: tuple[float, ...]) -> float:
    """Return 2∫R sin θ cos θ dθ over the pieces between `edges` in degrees, mean of TE and TM."""
    total = 0.0
    nodes, weights = np.polynomial.legendre.leggauss(200)
    for low, high in pairwise(edges):
        # x = u² (3 − 2u) puts the square-root corner of R at the critical angle to rest.
        u = (nodes + 1) / 2
        degrees = low + (high - low) * u * u * (3 - 2 * u)
        slope = np.radians(high - low) * 6 * u * (1 - u) / 2
        mean = solved(stack, 5e14, list(degrees)).reflectance[0].mean(axis=-1)
        theta = np.radians(degrees)
        total += float(np.sum(weights * slope * 2 * mean * np.sin(theta) * np.cos(theta)))
    return total
