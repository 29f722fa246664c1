"""Sheets without thickness, long waves, and Rozanov's bound on what any absorber on metal can do."""

import itertools

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.propagation import solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, SheetPlacement, Stack
from tests.strategies import TE, TM, Case, angles, decades, frequencies


def sheet(resistance: float) -> SheetPlacement:
    """Return a sheet of `resistance` in ohm per square."""
    return SheetPlacement(SeriesSheet(resistance))


@given(decades(1e-3, 1e7), frequencies(), angles(89.0))
def test_one_sheet_absorbs_half_at_most(resistance: float, frequency: float, angle: float) -> None:
    """Item 30: A ≤ 1/2 at every angle; R, T and A are y²/(2+y)², 4/(2+y)² and 4y/(2+y)² of the seen y."""
    response = Case(Stack((sheet(resistance),)), frequency, angle).solve()
    assert np.all(response.absorptance <= 0.5 + 1e-15)
    seen = FREE_SPACE_IMPEDANCE / resistance * np.array([1 / np.cos(angle), np.cos(angle)])
    np.testing.assert_allclose(response.reflectance[0, 0], (seen / (2 + seen)) ** 2, rtol=1e-12)
    np.testing.assert_allclose(response.transmittance[0, 0], 4 / (2 + seen) ** 2, rtol=1e-12)
    np.testing.assert_allclose(response.absorptance[0, 0], 4 * seen / (2 + seen) ** 2, rtol=1e-12)


@given(angles(89.0), frequencies())
def test_sheet_that_absorbs_half(angle: float, frequency: float) -> None:
    """Items 30 and 32: with a seen y of 2, A = 1/2, and r + t = 0: lit alike from both sides it absorbs all."""
    for p, resistance in ((TE, 0.5 / np.cos(angle)), (TM, 0.5 * np.cos(angle))):
        response = Case(Stack((sheet(float(resistance * FREE_SPACE_IMPEDANCE)),)), frequency, angle).solve()
        assert float(response.absorptance[0, 0, p]) == pytest.approx(0.5, rel=1e-14)
        assert abs(response.reflection[0, 0, p] + response.transmission[0, 0, p]) < 1e-14


@given(decades(1.0, 1e5), frequencies(), angles(85.0))
def test_complementary_sheets(reactance: float, frequency: float, angle: float) -> None:
    """Item 31: an inductance and the capacitance with Z Z_c = Z₀²/4 have t + t_c = 1 (Babinet), TE with TM."""
    omega = 2 * np.pi * frequency
    wires = SeriesSheet(0.0, inductance=reactance / omega)
    patches = SeriesSheet(0.0, capacitance=4 * reactance / (FREE_SPACE_IMPEDANCE**2 * omega))
    one = Case(Stack((SheetPlacement(wires),)), frequency, angle).solve()
    other = Case(Stack((SheetPlacement(patches),)), frequency, angle).solve()
    np.testing.assert_allclose(one.transmission + other.transmission[..., ::-1], 1.0, atol=1e-13)
    np.testing.assert_allclose(one.transmittance + other.transmittance[..., ::-1], 1.0, rtol=1e-12)
    assert np.all(one.transmission.imag * other.transmission[..., ::-1].imag <= 0)


@given(frequencies(), angles(85.0))
def test_oblique_salisbury_screen(frequency: float, angle: float) -> None:
    """Item 33: Z₀/cos θ (TE) or Z₀ cos θ (TM) at λ/(4 cos θ) before metal reflects nothing."""
    cosine = float(np.cos(angle))
    gap = Layer(VACUUM, SPEED_OF_LIGHT / frequency / (4 * cosine))
    for p, resistance in ((TE, FREE_SPACE_IMPEDANCE / cosine), (TM, FREE_SPACE_IMPEDANCE * cosine)):
        response = Case(Stack((sheet(resistance), gap), back=METAL), frequency, angle).solve()
        assert float(response.reflectance[0, 0, p]) < 1e-27
        np.testing.assert_allclose(response.absorptance[0, 0, p], 1.0, rtol=1e-14)


@given(st.lists(decades(10.0, 1e4), min_size=1, max_size=4), angles(80.0))
def test_long_waves_see_only_the_conductance(ohms: list[float], angle: float) -> None:
    """Item 27: at 1 Hz T = (2/(2 + Σy))² whatever lies between the sheets, in whatever order."""
    spacer = Layer(ConstantMedium(4.0), 1e-3)
    seen = FREE_SPACE_IMPEDANCE * sum(1 / r for r in ohms) * np.array([1 / np.cos(angle), np.cos(angle)])
    for order in itertools.islice(itertools.permutations(ohms), 3):
        chosen: list[Element] = []
        for resistance in order:
            chosen += [sheet(resistance), spacer]
        response = Case(Stack(tuple(chosen)), 1.0, angle).solve()
        np.testing.assert_allclose(response.transmittance[0, 0], (2 / (2 + seen)) ** 2, rtol=1e-8)


def test_thin_film_is_its_sheet() -> None:
    """A metal film far thinner than its skin depth is a sheet of 1/(σd)."""
    film = Layer(ConductorMedium(5.8e7), 1e-9)
    thin = Case(Stack((film,)), 1e9, 0.6).solve()
    ideal = Case(Stack((sheet(1 / (5.8e7 * 1e-9)),)), 1e9, 0.6).solve()
    np.testing.assert_allclose(thin.transmittance, ideal.transmittance, rtol=1e-6)
    np.testing.assert_allclose(thin.absorptance, ideal.absorptance, rtol=1e-6)


@st.composite
def _causal_media(draw: st.DrawFn) -> AbstractMedium:
    """Return media that hold from static fields to light: constants without loss, and conductivities."""
    if draw(st.booleans()):
        return ConstantMedium(draw(decades(1.0, 20.0)), draw(decades(1.0, 4.0)))
    return ConductorMedium(draw(decades(0.01, 30.0)), draw(decades(1.0, 4.0)))


@st.composite
def _absorbers(draw: st.DrawFn) -> Stack:
    """Return layers and resistive sheets, some with an inductance or a capacitance, on metal."""
    chosen: list[Element] = []
    for _ in range(draw(st.integers(1, 4))):
        chosen.append(Layer(draw(_causal_media()), draw(decades(1e-3, 2e-2))))
        if draw(st.booleans()):
            inductance = draw(st.just(0.0) | decades(1e-11, 1e-8))
            capacitance = draw(st.none() | decades(1e-15, 1e-12))
            chosen.append(SheetPlacement(SeriesSheet(draw(decades(30.0, 3000.0)), inductance, capacitance)))
    return Stack(tuple(reversed(chosen)), back=METAL)


@settings(max_examples=40)
@given(_absorbers())
def test_rozanov_bound(stack: Stack) -> None:
    """Item 34: ∫|ln|r|| dλ ≤ 2π² Σμd for every linear, passive, causal absorber on metal.

    Wavelengths are cut to 1 cm to 1 km; as |ln|r|| is never negative the rest could only add, and the bound holds
    for the part as well.
    """
    wavelength = np.geomspace(1e-2, 1e3, 8001)
    loss = solve(stack, SPEED_OF_LIGHT / wavelength, 0.0).return_loss_dB[:, 0, TE] * np.log(10) / 20
    integral = float(np.trapezoid(loss, wavelength))
    total = sum(
        complex(layer.medium.evaluate(np.array(1.0)).permeability).real * layer.thickness
        for layer in stack.elements
        if isinstance(layer, Layer)
    )
    assert 0 <= integral <= 2 * np.pi**2 * total * (1 + 1e-3)


def test_rozanov_bound_is_reached() -> None:
    """Item 34: the test above can fail: a matched sheet on 5 mm of permittivity 3 uses over 97 per cent of it."""
    stack = Stack((sheet(300.0), Layer(ConstantMedium(3.0), 5e-3)), back=METAL)
    wavelength = np.geomspace(1e-4, 10.0, 400_001)
    loss = solve(stack, SPEED_OF_LIGHT / wavelength, 0.0).return_loss_dB[:, 0, TE] * np.log(10) / 20
    share = float(np.trapezoid(loss, wavelength)) / (2 * np.pi**2 * 5e-3)
    assert 0.97 < share <= 1
