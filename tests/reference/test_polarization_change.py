"""Circular and tilted waves: textbook cases of axial ratio, discrimination and handedness."""

import math

import numpy as np
import pytest

from stackcore import CIRCULAR, METAL, QUANTITIES, ConstantMedium, Response, Stack, solve, tilted
from stackcore.polarizations import Polarization
from tests.stackcore.quantities.made import response_of

SLANT = tilted(math.radians(45))


def value(name: str, response: Response, wave: Polarization = CIRCULAR) -> float:
    """Return one number of a response at one frequency and angle."""
    return float(QUANTITIES[name].of(response, wave)[0, 0])


def delays(te_deg: float, tm_deg: float, loss_tm_dB: float = 0.0) -> Response:
    """Return a plate that delays TE and TM by these degrees and weakens TM."""
    return response_of(
        log_transmission=(
            -1j * math.radians(te_deg),
            -loss_tm_dB * math.log(10) / 20 - 1j * math.radians(tm_deg),
        )
    )


def test_a_quarter_wave_plate_makes_circular_linear_and_slant_circular() -> None:
    """90° between equal amplitudes: M. Born, E. Wolf, Principles of Optics, section 1.4.2."""
    plate = delays(200.0, 110.0)
    assert value("transmitted_axial_ratio_dB", plate) > 300
    assert value("transmitted_axial_ratio_dB", plate, SLANT) == pytest.approx(0, abs=1e-13)
    assert value("cross_polar_discrimination_dB", plate) == pytest.approx(0, abs=1e-13)
    assert value("copolar_transmittance_dB", plate) == pytest.approx(10 * math.log10(0.5), rel=1e-13)
    assert value("transmission_phase_difference_deg", plate) == pytest.approx(-90, rel=1e-13)


def test_a_half_wave_plate_turns_the_handedness() -> None:
    """180° between equal amplitudes: all of a circular wave is cross-polar, and it stays circular."""
    plate = delays(0.0, 180.0)
    assert value("cross_polar_discrimination_dB", plate) < -300
    assert value("crosspolar_transmittance_dB", plate) == pytest.approx(0, abs=1e-13)
    assert value("transmitted_axial_ratio_dB", plate) == pytest.approx(0, abs=1e-13)


def test_equal_parts_change_nothing() -> None:
    """Equal amplitudes and phases keep a circular wave: 0 dB axial ratio and no cross-polar part at all."""
    plate = delays(73.0, 73.0)
    assert value("transmitted_axial_ratio_dB", plate) == 0
    assert value("cross_polar_discrimination_dB", plate) == math.inf
    assert value("crosspolar_transmittance_dB", plate) == -math.inf
    assert value("transmission_phase_deg", plate) == pytest.approx(-73, rel=1e-14)
    assert value("transmitted_axial_ratio_dB", plate, SLANT) == math.inf


@pytest.mark.parametrize("ratio", [0.01, 0.5, 1.0, 2.0, 3.0, 6.0, 40.0])
def test_the_axial_ratio_of_a_difference_in_loss(ratio: float) -> None:
    """A wall that weakens one part by x dB gives a circular wave an axial ratio A of x dB.

    Its discrimination is 20 log10((A + 1)/(A − 1)), as handbooks of satellite links have it (from memory).
    """
    plate = delays(20.0, 20.0, ratio)
    axes = 10 ** (ratio / 20)
    assert value("transmitted_axial_ratio_dB", plate) == pytest.approx(ratio, rel=1e-12)
    assert value("cross_polar_discrimination_dB", plate) == pytest.approx(
        20 * math.log10((axes + 1) / (axes - 1)), rel=1e-11
    )


@pytest.mark.parametrize("degrees", [1.0, 10.0, 45.0, 80.0])
def test_the_discrimination_of_a_phase_difference(degrees: float) -> None:
    """A phase difference δ of equal amplitudes gives XPD = 20 log10 cot(δ/2) and AR = cot(45° − δ/2)."""
    half = math.radians(degrees) / 2
    plate = delays(0.0, degrees)
    assert value("cross_polar_discrimination_dB", plate) == pytest.approx(
        -20 * math.log10(math.tan(half)), rel=1e-11
    )
    assert value("transmitted_axial_ratio_dB", plate) == pytest.approx(
        -20 * math.log10(math.tan(math.pi / 4 - half)), rel=1e-11
    )


def test_a_metal_plate_turns_the_handedness_of_a_circular_wave() -> None:
    """Reflected by metal a circular wave is all cross-polar at any angle, and a slanted one all co-polar."""
    response = solve(Stack((), back=METAL), 10e9, np.radians([0.0, 40.0, 80.0]))
    assert QUANTITIES["crosspolar_reflectance_dB"].of(response, CIRCULAR)[0] == pytest.approx([0, 0, 0], abs=1e-12)
    assert (QUANTITIES["copolar_reflectance_dB"].of(response, CIRCULAR)[0] < -290).all()
    assert QUANTITIES["reflected_axial_ratio_dB"].of(response, CIRCULAR)[0] == pytest.approx([0, 0, 0], abs=1e-12)
    assert QUANTITIES["copolar_reflectance_dB"].of(response, SLANT)[0] == pytest.approx([0, 0, 0], abs=1e-12)


def test_a_circular_wave_is_linear_when_reflected_at_the_brewster_angle() -> None:
    """At Brewster's angle only TE is reflected: linear, half of it co-polar and half cross-polar."""
    glass = Stack((), back=ConstantMedium(2.25))
    response = solve(glass, 10e9, np.arctan(1.5))
    assert value("reflected_axial_ratio_dB", response) > 250
    te = float(response.reflectance[0, 0, 0])
    for name in ("copolar_reflectance_dB", "crosspolar_reflectance_dB"):
        assert 10 ** (value(name, response) / 10) == pytest.approx(te / 4, rel=1e-9)


def test_a_fresnel_rhomb_makes_a_slanted_wave_circular() -> None:
    """Two total reflections in glass of n = 1.51 at 54°37′ or 48°37′ (Born and Wolf, section 1.5.4): 45° each."""
    for angle in (54 + 37 / 60, 48 + 37 / 60):
        response = solve(Stack((), front=ConstantMedium(1.51**2)), 5e14, math.radians(angle))
        difference = value("reflection_phase_difference_deg", response)
        # Tangential fields: r of TM has the other sign than the full field has in that book.
        assert 180 - abs(difference) == pytest.approx(45, abs=0.03)
        # After one reflection the ellipse of a slanted wave has tan χ = tan 22.5°.
        assert value("reflected_axial_ratio_dB", response, SLANT) == pytest.approx(
            -20 * math.log10(math.tan(math.radians(22.5))), abs=0.01
        )


def test_between_half_spaces_full_fields_are_added() -> None:
    """Into glass at 60° the powers of co and cross add up to T, which tangential fields would not give."""
    response = solve(Stack((), back=ConstantMedium(4.0)), 10e9, math.radians(60))
    te, tm = response.transmission[0, 0]
    tm_full = tm * math.cos(math.radians(60)) / math.sqrt(1 - 0.75 / 4)
    assert value("cross_polar_discrimination_dB", response) == pytest.approx(
        20 * math.log10(abs((te + tm_full) / (te - tm_full))), rel=1e-12
    )
    co, cross = (10 ** (value(f"{part}polar_transmittance_dB", response) / 10) for part in ("co", "cross"))
    assert co + cross == pytest.approx(response.transmittance[0, 0].mean(), rel=1e-13)
