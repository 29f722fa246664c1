"""The closed formulas that size walls, against published values and against the solver."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

import stackcore as sc
from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.constructions import DesignPoint, design_point
from stackcore.constructions.sizing import (
    half_wave,
    matched_core,
    outward_reflection,
    quarter_wave,
    sheet_for_shielding,
    sheet_shielding,
    wave_impedance,
)
from stackcore.job.records import FrequencyGrid, SweepRecord
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.stack import METAL, Layer, SheetPlacement, Stack
from stackcore.units import Dimension, measure

# Half-wave thickness over wavelength, recomputed from Radar Scanners and Radomes, MIT Radiation Laboratory Series
# 26 (1948): d/λ₀ = 1/(2·√(ε − sin²θ)).
HALF_WAVES = [
    (4.0, 0.0, 0.25000),
    (4.0, 45.0, 0.26726),
    (4.0, 60.0, 0.27735),
    (3.2, 30.0, 0.29111),
    (9.0, 45.0, 0.17150),
    (4.2, 45.0, 0.25994),
]


@pytest.mark.parametrize(("permittivity", "degrees", "expected"), HALF_WAVES)
def test_a_half_wave_wall_has_the_published_thickness(permittivity: float, degrees: float, expected: float) -> None:
    """The thickness over the wavelength has the five digits of the table."""
    point = DesignPoint(10e9, math.radians(degrees))
    assert half_wave(permittivity, point) / point.wavelength == pytest.approx(expected, abs=5e-6)


def test_a_radome_of_a_textbook_is_a_quarter_inch_less_a_bit() -> None:
    """ε 4 at 10 GHz wants 7.495 mm (S. J. Orfanidis, Electromagnetic Waves and Antennas, chapter 5)."""
    assert half_wave(4.0, DesignPoint(10e9)) == pytest.approx(7.495e-3, abs=5e-7)


# S. A. Schelkunoff, Electromagnetic Waves (1943): 20·log₁₀(1 + Z₀/(2R)), recomputed.
SHEETS = [(1.0, 45.5460), (5.0, 31.7482), (10.0, 25.9493), (50.0, 13.5655), (100.0, 9.1989), (188.365, 6.0206)]


@pytest.mark.parametrize(("resistance", "decibels"), SHEETS)
def test_a_sheet_shields_by_the_published_decibels(resistance: float, decibels: float) -> None:
    """Both directions of the formula agree with the table."""
    assert sheet_shielding(resistance) == pytest.approx(decibels, abs=5e-5)
    assert sheet_for_shielding(sheet_shielding(resistance)) == pytest.approx(resistance, rel=1e-12)


@given(
    skin=st.floats(2.0, 9.0),
    core=st.floats(1.02, 3.0),
    thickness=st.floats(1e-4, 2e-3),
    degrees=st.floats(0.0, 70.0),
    polarization=st.sampled_from(["TE", "TM"]),
)
def test_a_matched_core_lets_everything_through(
    skin: float, core: float, thickness: float, degrees: float, polarization: str
) -> None:
    """A symmetric sandwich without loss does not reflect when its core has the thickness of the rule."""
    point = DesignPoint(10e9, math.radians(degrees), "TE" if polarization == "TE" else "TM")
    face = ConstantMedium(complex(skin))
    seen = outward_reflection(complex(core), [(face, thickness)], point)
    inner = matched_core(complex(core), [seen, seen], point)
    stack = Stack((Layer(face, thickness), Layer(ConstantMedium(complex(core)), inner), Layer(face, thickness)))
    response = sc.solve(stack, point.frequency, point.angle)
    assert inner >= 0
    assert response.reflectance[0, 0, ["TE", "TM"].index(polarization)] < 1e-20


@given(degrees=st.floats(0.0, 80.0), spacer=st.floats(1.0, 3.0), polarization=st.sampled_from(["TE", "TM"]))
def test_a_sheet_absorber_does_not_reflect(degrees: float, spacer: float, polarization: str) -> None:
    """The sheet of the wave's impedance, a quarter wave before metal, absorbs all of it."""
    point = DesignPoint(10e9, math.radians(degrees), "TE" if polarization == "TE" else "TM")
    sheet = SheetPlacement(sc.SeriesSheet(resistance=wave_impedance(point)))
    layer = Layer(ConstantMedium(complex(spacer)), quarter_wave(spacer, point))
    response = sc.solve(Stack((sheet, layer), back=METAL), point.frequency, point.angle)
    assert response.reflectance[0, 0, ["TE", "TM"].index(polarization)] < 1e-20


def test_the_wave_impedance_at_normal_incidence_is_that_of_space() -> None:
    """TE and TM meet at 0 degrees."""
    values = [wave_impedance(DesignPoint(1e9, 0.0, side)) for side in ("TE", "TM")]
    assert values == [FREE_SPACE_IMPEDANCE, FREE_SPACE_IMPEDANCE]


def test_a_core_that_is_air_sees_the_bare_skin() -> None:
    """Seen from air, the skin reflects as it does in free space."""
    point = DesignPoint(10e9, math.radians(30))
    face = ConstantMedium(4.0)
    seen = outward_reflection(1.0 + 0j, [(face, 1e-3)], point)
    free = sc.solve(Stack((Layer(face, 1e-3),), front=VACUUM), point.frequency, point.angle)
    assert seen == pytest.approx(complex(free.reflection[0, 0, 0]), abs=1e-14)


def _sweep(spacing: str) -> SweepRecord:
    low, high = (measure(value, Dimension.FREQUENCY) for value in (1e9, 9e9))
    angles = tuple(measure(math.radians(value), Dimension.ANGLE) for value in (0.0, 20.0, 50.0))
    return SweepRecord(FrequencyGrid(low, high, 11, "log" if spacing == "log" else "linear"), angles)


@pytest.mark.parametrize(("spacing", "middle"), [("linear", 5e9), ("log", 3e9)])
def test_the_design_point_is_the_middle_of_the_sweep(spacing: str, middle: float) -> None:
    """The middle is arithmetic on a linear band and geometric on one swept by ratio; angles meet half-way."""
    point = design_point(_sweep(spacing))
    assert point.frequency == pytest.approx(middle)
    assert np.degrees(point.angle) == pytest.approx(25.0)
    assert point.wavelength == SPEED_OF_LIGHT / point.frequency


@pytest.mark.parametrize(("frequency", "angle"), [(0.0, 0.0), (math.inf, 0.0), (1e9, math.pi / 2), (1e9, -0.1)])
def test_a_design_point_outside_physics_is_refused(frequency: float, angle: float) -> None:
    """Frequencies are positive and angles below 90 degrees."""
    with pytest.raises(ValueError, match="must be"):
        DesignPoint(frequency, angle)
