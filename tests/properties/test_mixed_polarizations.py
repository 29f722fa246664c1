"""Waves with a TE and a TM part: powers add up, ends of the tilt are TE and TM, and 50 digits agree."""

import math

import mpmath
import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore import CIRCULAR, QUANTITIES, TE, TM, ConductorMedium, Layer, Response, Stack, solve, tilted
from stackcore.polarizations import Polarization
from stackcore.stack import PerfectConductor
from tests.exact import Exact, exact
from tests.strategies import Case, any_back, cases, dense_fronts

WIDE = cases(fronts=dense_fronts(), backs=any_back(), highest_deg=89.0)
WAVES = st.one_of(st.just(CIRCULAR), st.floats(-math.pi / 2, math.pi / 2).map(tilted))
FEW_DB = 1e-9


def value(name: str, response: Response, wave: Polarization) -> float:
    """Return one number, with every floating-point fault but a silent underflow an error."""
    with np.errstate(all="raise", under="ignore"):
        return float(QUANTITIES[name].of(response, wave)[0, 0])


def power(decibels: float) -> float:
    """Return the part of the power that is `decibels` (0 or less) of it."""
    return 10 ** (decibels / 10)


@given(WIDE, WAVES)
def test_energy_is_shared_by_reflection_transmission_and_absorption(case: Case, wave: Polarization) -> None:
    """R + T + A = 1 for every incident wave."""
    response = case.solve()
    total = sum(value(name, response, wave) for name in ("reflectance", "transmittance", "absorptance"))
    assert total == pytest.approx(1, abs=1e-12)


@given(WIDE, WAVES)
def test_co_and_cross_polar_power_are_all_the_power(case: Case, wave: Polarization) -> None:
    """Co-polar and cross-polar powers add up to R and to T."""
    response = case.solve()
    for name, whole in (("transmittance", "transmittance"), ("reflectance", "reflectance")):
        parts = [power(value(f"{part}polar_{name}_dB", response, wave)) for part in ("co", "cross")]
        assert sum(parts) == pytest.approx(value(whole, response, wave), rel=1e-11, abs=1e-290)


@given(WIDE)
def test_the_ends_of_the_tilt_are_te_and_tm(case: Case) -> None:
    """A tilt of 0 is TE and one of 90° is TM, to the last bit, for every quantity."""
    response = case.solve()
    for name in QUANTITIES:
        for wave, same in ((tilted(0.0), TE), (tilted(math.pi / 2), TM), (tilted(-math.pi / 2), TM)):
            assert value(name, response, wave) == pytest.approx(value(name, response, same), rel=0, nan_ok=True)


@given(WIDE, st.floats(0, math.pi / 2))
def test_the_side_of_the_tilt_does_not_matter(case: Case, tilt: float) -> None:
    """A wall of isotropic layers treats both sides alike: only the handedness behind it differs."""
    response = case.solve()
    for name in QUANTITIES:
        one, other = (value(name, response, tilted(side * tilt)) for side in (1, -1))
        assert one == pytest.approx(other, rel=1e-12, abs=1e-12, nan_ok=True), name


@given(WIDE, WAVES)
def test_ratios_are_what_the_amplitudes_say(case: Case, wave: Polarization) -> None:
    """Losses, discrimination and axial ratio agree with sums of the 50-digit amplitudes."""
    response = case.solve()
    te, tm = exact(case.stack, case.frequency, case.angle)
    share = wave.power_shares
    if not isinstance(case.stack.back, PerfectConductor) and min(te.transmittance, tm.transmittance) > 1e-250:
        _check_transmission(response, wave, _amplitude(te), _amplitude(tm))
        bare = [_bare(one) for one in (te, tm)]
        passed = share[0] * te.transmittance + share[1] * tm.transmittance
        loss = 10 * mpmath.log10((share[0] * bare[0] + share[1] * bare[1]) / passed)
        assert value("insertion_loss_dB", response, wave) == pytest.approx(float(loss), rel=1e-10, abs=1e-10)


def _check_transmission(response: Response, wave: Polarization, te: mpmath.mpc, tm: mpmath.mpc) -> None:
    co, cross = (a * te + b * tm for a, b in (wave.copolar(), wave.crosspolar()))
    if wave.single is not None:
        return
    size = abs(te) + abs(tm)
    if abs(co) > 1e-5 * size and abs(cross) > 1e-5 * size:
        wanted = float(20 * mpmath.log10(abs(co / cross)))
        assert value("cross_polar_discrimination_dB", response, wave) == pytest.approx(wanted, rel=1e-8, abs=1e-7)
        step = math.radians(value("transmission_phase_deg", response, wave)) - float(mpmath.arg(co))
        assert step - 2 * math.pi * round(step / 2 / math.pi) == pytest.approx(0, abs=1e-8)
    # The ellipse from its right- and left-handed parts, another way than the formula of the product.
    a, b = mpmath.mpc(wave.ratio) * tm, te
    right, left = abs(a - mpmath.mpc(0, 1) * b), abs(a + mpmath.mpc(0, 1) * b)
    if abs(right - left) > 1e-6 * (right + left):
        wanted = float(20 * mpmath.log10((right + left) / abs(right - left)))
        assert value("transmitted_axial_ratio_dB", response, wave) == pytest.approx(wanted, rel=1e-7, abs=1e-7)


def _amplitude(one: Exact) -> mpmath.mpc:
    """Return the transmitted amplitude normalised to power."""
    return mpmath.sqrt(one.transmittance) * one.transmission / abs(one.transmission)


def _bare(one: Exact) -> mpmath.mpf:
    return one.transmittance * abs(one.bare_transmission / one.transmission) ** 2


@pytest.mark.parametrize("thickness", [1e-4, 1e-2, 1.0])
def test_a_metal_wall_of_any_depth_has_finite_numbers(thickness: float) -> None:
    """Copper from 1e3 to beyond 1e7 dB: loss, co-polar power and axial ratio are numbers, and make sense."""
    response = solve(Stack((Layer(ConductorMedium(5.8e7), thickness),)), 10e9, math.radians(60))
    te, tm = response.insertion_loss_dB[0, 0]
    for name in ("shielding_effectiveness_dB", "insertion_loss_dB"):
        # TM passes 12 dB better at 60°: half of its power is nearly all that comes through.
        assert value(name, response, CIRCULAR) == pytest.approx(
            min(te, tm) - 10 * math.log10(0.5 * (1 + 10 ** (-abs(te - tm) / 10))), rel=1e-13
        )
    assert -value("copolar_transmittance_dB", response, CIRCULAR) == pytest.approx(
        value("insertion_loss_dB", response, CIRCULAR), rel=0.01
    )
    ratio = value("transmitted_axial_ratio_dB", response, CIRCULAR)
    assert ratio == pytest.approx(abs(te - tm), rel=1e-6)
    assert te - tm == pytest.approx(40 * math.log10(2), rel=1e-2)


def test_delays_of_the_co_polar_part() -> None:
    """The group delay is minus the slope of the co-polar phase, found by a difference, between unlike media."""
    stack = Stack(
        (Layer(ConductorMedium(3.0), 2e-3), Layer(ConductorMedium(0.2, 2.0), 9e-3)), back=ConductorMedium(0.05)
    )
    step = 2e4
    for wave in (CIRCULAR, tilted(0.4)):
        phases = [
            math.radians(value("transmission_phase_deg", solve(stack, 6e9 + side * step, 1.1), wave))
            for side in (1, -1)
        ]
        slope = -(phases[0] - phases[1]) / (2 * math.pi * 2 * step)
        assert value("group_delay_s", solve(stack, 6e9, 1.1), wave) == pytest.approx(slope, rel=1e-6)


@given(WIDE, WAVES)
def test_the_insertion_phase_delay_is_the_phase_with_its_turns(case: Case, wave: Polarization) -> None:
    """Modulo whole turns the delay of the co-polar part is its phase less that of the air displaced."""
    response = case.solve()
    phase = value("transmission_phase_deg", response, wave)
    if math.isnan(phase) or isinstance(case.stack.back, PerfectConductor):
        return
    air = 360 * case.stack.thickness / case.wavelength * math.cos(case.angle)
    if air < 1e4:
        turns = (value("insertion_phase_delay_deg", response, wave) + phase + air) / 360
        assert turns == pytest.approx(round(turns), abs=1e-8)
