"""Energy and reciprocity: what every passive stack obeys (M. Born, E. Wolf; Z. Knittl; J. Lekner; H. A. Haus)."""

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st
from numpy.typing import NDArray

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Layer, PerfectConductor, SheetPlacement, Stack
from tests.strategies import (
    TE,
    TM,
    Case,
    angles,
    any_back,
    cases,
    decades,
    dense_fronts,
    frequencies,
    lossless_media,
    lossy_media,
    media,
)

WIDE = cases(fronts=dense_fronts(), backs=any_back(), highest_deg=89.9)
LOSSLESS = cases(lossless=True, fronts=dense_fronts(), backs=lossless_media(), highest_deg=89.0)


def turned(case: Case) -> Case:
    """Return the wave on the way back: the stack reversed, at the angle that the wave leaves it forward."""
    front, back = case.stack.front, case.stack.back
    assert not isinstance(back, PerfectConductor)
    sine = np.sin(case.angle) * _index(front) / _index(back)
    assume(sine < 0.999)
    stack = Stack(case.stack.elements[::-1], front=back, back=front)
    return Case(stack, case.frequency, float(np.arcsin(sine)))


def admittances(medium: AbstractMedium | PerfectConductor, angle: float) -> NDArray[np.float64]:
    """Return the wave admittances (TE, TM) of a lossless half-space, relative to that of free space."""
    assert isinstance(medium, ConstantMedium)
    eps, mu = complex(medium.permittivity).real, complex(medium.permeability).real
    normal = np.sqrt(eps / mu)
    return np.array([normal * np.cos(angle), normal / np.cos(angle)])


@given(WIDE)
def test_absorptance_is_not_negative(case: Case) -> None:
    """Item 1: a passive stack behind a lossless front absorbs nothing or something, never less."""
    response = case.solve()
    for values in (response.reflectance, response.transmittance, response.absorptance):
        assert np.all(values >= 0)
        assert np.all(values <= 1 + 1e-13)


@given(WIDE)
def test_every_element_absorbs_its_share(case: Case) -> None:
    """Item 9: the elements' absorptances, none negative, sum to A, and R + T + A = 1."""
    response = case.solve()
    assert np.all(response.element_absorptance >= 0)
    np.testing.assert_allclose(response.element_absorptance.sum(axis=-1), response.absorptance, rtol=1e-12)
    total = response.reflectance + response.transmittance + response.absorptance
    np.testing.assert_allclose(total, 1.0, rtol=1e-12)


@given(LOSSLESS)
def test_lossless_stack_keeps_the_power(case: Case) -> None:
    """Item 2: without loss R + T = 1 and A is exactly 0."""
    response = case.solve()
    np.testing.assert_allclose(response.reflectance + response.transmittance, 1.0, rtol=1e-12)
    assert np.all(response.absorptance == 0)
    assert np.all(response.element_absorptance == 0)


@given(cases(fronts=dense_fronts(), backs=lossless_media()))
def test_transmission_is_the_same_from_both_sides(case: Case) -> None:
    """Items 3 and 4: T is the same either way, and t₁₂/Y₁ = t₂₁/Y₂, with loss and between unlike half-spaces."""
    forward, back = case.solve(), turned(case).solve()
    np.testing.assert_allclose(forward.insertion_loss_dB, back.insertion_loss_dB, rtol=1e-8, atol=1e-9)
    one = admittances(case.stack.front, case.angle)
    two = admittances(case.stack.back, turned(case).angle)
    difference = forward.log_transmission - np.log(one) - (back.log_transmission - np.log(two))
    np.testing.assert_allclose(difference.real, 0.0, atol=1e-9)
    np.testing.assert_allclose(np.exp(1j * difference.imag), 1.0, atol=1e-9)


@given(cases(lossless=True, fronts=dense_fronts(), backs=lossless_media()))
def test_lossless_reflection_is_as_strong_from_behind(case: Case) -> None:
    """Items 5 to 7: |r₁₂| = |r₂₁|, r₂₁ = −r₁₂* t/t*, and the scattering matrix of powers is unitary, symmetric."""
    forward, back = case.solve(), turned(case).solve()
    np.testing.assert_allclose(np.abs(back.reflection), np.abs(forward.reflection), rtol=1e-8, atol=1e-12)
    turn = np.exp(2j * forward.log_transmission.imag)
    np.testing.assert_allclose(back.reflection, -np.conj(forward.reflection) * turn, atol=1e-8)
    ratio = np.sqrt(admittances(case.stack.back, turned(case).angle) / admittances(case.stack.front, case.angle))
    for p in (TE, TM):
        s21 = forward.transmission[0, 0, p] * ratio[p]
        s12 = back.transmission[0, 0, p] / ratio[p]
        matrix = np.array([[forward.reflection[0, 0, p], s12], [s21, back.reflection[0, 0, p]]])
        np.testing.assert_allclose(matrix.conj().T @ matrix, np.eye(2), atol=1e-8)
        np.testing.assert_allclose(s12, s21, rtol=1e-8, atol=1e-12)


def test_lossy_reflection_differs_between_the_sides() -> None:
    """Item 5: with loss |r₁₂| and |r₂₁| differ; nothing forces them to agree."""
    elements = (
        Layer(ConstantMedium(9.0), 2e-3),
        SheetPlacement(SeriesSheet(50.0)),
        Layer(ConstantMedium(2 - 1j), 3e-3),
    )
    forward = Case(Stack(elements), 10e9, 0.4).solve()
    back = Case(Stack(elements[::-1]), 10e9, 0.4).solve()
    assert np.all(np.abs(np.abs(forward.reflection) - np.abs(back.reflection)) > 0.05)
    np.testing.assert_allclose(forward.transmission, back.transmission, rtol=1e-12)


@given(lossy_media(20.0), media(), frequencies(), decades(1e-3, 1.0), angles(85.0))
def test_absorptance_is_the_loss_of_the_field_inside(
    medium: ConstantMedium, back: AbstractMedium, frequency: float, wavelengths: float, angle: float
) -> None:
    """Item 9: A of one layer is k₀∫(ε″|E|² + μ″|H|²)dz over Y₀, all components counted."""
    thickness = wavelengths * SPEED_OF_LIGHT / frequency
    response = Case(Stack((Layer(medium, thickness),), back=back), frequency, angle).solve()
    eps, mu = complex(medium.permittivity), complex(medium.permeability)
    sine, cosine = np.sin(angle), np.cos(angle)
    values = back.evaluate(np.array(frequency))
    eps_back, mu_back = complex(values.permittivity), complex(values.permeability)
    q, q_back = np.sqrt(eps * mu - sine**2), np.sqrt(eps_back * mu_back - sine**2)
    q_back = -q_back if q_back.imag > 0 else q_back
    assume(abs(q) > 1e-3 and abs(q_back) > 1e-3 and abs((q * thickness / SPEED_OF_LIGHT * frequency).imag) < 3)
    nodes, weights = np.polynomial.legendre.leggauss(120)
    phase = 2 * np.pi * wavelengths * q * (nodes + 1) / 2
    scale = np.pi * wavelengths
    for p, (y, y_back, y_front) in enumerate(
        ((q / mu, q_back / mu_back, cosine), (eps / q, eps_back / q_back, 1 / cosine))
    ):
        t = response.transmission[0, 0, p]
        electric = t * (np.cos(phase) + 1j * y_back / y * np.sin(phase))
        magnetic = t * (y_back * np.cos(phase) + 1j * y * np.sin(phase))
        if p == TE:
            density = -eps.imag * np.abs(electric) ** 2
            density += -mu.imag * (np.abs(magnetic) ** 2 + np.abs(sine * electric / mu) ** 2)
        else:
            density = -eps.imag * (np.abs(electric) ** 2 + np.abs(sine * magnetic / eps) ** 2)
            density += -mu.imag * np.abs(magnetic) ** 2
        absorbed = float(scale * np.sum(weights * density)) / y_front
        np.testing.assert_allclose(response.absorptance[0, 0, p], absorbed, rtol=1e-8)


@given(
    st.lists(lossless_media().map(lambda medium: Layer(medium, 1.0)), min_size=0, max_size=4),
    decades(1.5, 20.0),
    frequencies(1e3, 1e15),
    decades(1e-2, 2.0),
    st.floats(1.001, 1.5),
)
def test_total_reflection(
    layers: list[Layer], eps: float, frequency: float, wavelengths: float, past: float
) -> None:
    """Item 25: past the critical angle of the back R = 1 through whatever lossless layers."""
    sine = past / np.sqrt(eps)
    assume(sine < 0.999)
    chosen = tuple(Layer(layer.medium, wavelengths * SPEED_OF_LIGHT / frequency) for layer in layers)
    response = Case(Stack(chosen, front=ConstantMedium(eps)), frequency, float(np.arcsin(sine))).solve()
    np.testing.assert_allclose(response.reflectance, 1.0, rtol=1e-12)
    assert np.all(response.transmittance == 0)
    assert np.all(response.absorptance == 0)


@given(cases(backs=st.just(METAL), fronts=dense_fronts(), lossless=True, highest_deg=89.0))
def test_lossless_stack_on_metal_reflects_all(case: Case) -> None:
    """Item 28: |r| = 1 for whatever lossless stack on a perfect conductor."""
    response = case.solve()
    np.testing.assert_allclose(response.reflectance, 1.0, rtol=1e-12)
    assert np.all(response.transmittance == 0)
    assert np.all(response.insertion_loss_dB == np.inf)


@pytest.mark.parametrize("sigma", [1e12, 1e18, 1e24])
def test_conductivity_without_end(sigma: float) -> None:
    """Item 28: as conductivity grows r tends to −1 and T to 0, like 1/√σ, up to the perfect conductor."""
    elements = (Layer(ConstantMedium(4.2 - 0.063j), 2e-3),)
    perfect = Case(Stack(elements, back=METAL), 10e9, 0.5).solve()
    real = Case(Stack(elements, back=ConductorMedium(sigma)), 10e9, 0.5).solve()
    surface = np.sqrt(np.pi * 10e9 * 4e-7 * np.pi / sigma) / 376.73
    np.testing.assert_allclose(real.reflection, perfect.reflection, atol=20 * surface)
    assert np.all(real.transmittance < 20 * surface)
    bare = Case(Stack(back=ConductorMedium(sigma)), 10e9, 0.0).solve()
    np.testing.assert_allclose(bare.reflection, -1.0, atol=4 * surface)


@given(lossless_media() | lossy_media(), any_back(), frequencies(1e3, 1e14), decades(1e-2, 1.0))
def test_grazing_incidence_reflects_all(
    medium: ConstantMedium, back: AbstractMedium | PerfectConductor, frequency: float, wavelengths: float
) -> None:
    """Item 26: R of a wall tends to 1 in both polarizations, and 1 − R falls with cos θ or faster."""
    assume(abs(complex(medium.permittivity * medium.permeability) - 1) > 0.1)
    layer = Layer(medium, wavelengths * SPEED_OF_LIGHT / frequency)
    stack = Stack((layer,), back=back)
    near, nearer = (
        Case(stack, frequency, float(np.pi / 2 - gap)).solve().reflectance[0, 0] for gap in (1e-7, 1e-9)
    )
    assert np.all(near > 0.99)
    assert np.all(1 - nearer <= 0.02 * (1 - near) + 1e-14)


def test_lone_sheet_at_grazing_incidence() -> None:
    """A sheet alone is the exception: TE sees it ever better, TM ever less, as y/cos θ and y cos θ."""
    response = Case(Stack((SheetPlacement(SeriesSheet(100.0)),)), 10e9, float(np.pi / 2 - 1e-9)).solve()
    assert response.reflectance[0, 0, TE] > 1 - 1e-7
    assert response.reflectance[0, 0, TM] < 1e-15


def test_grazing_walls() -> None:
    """Item 26: at a millionth of a degree from grazing ordinary walls reflect more than 0.999 99."""
    for back in (VACUUM, ConstantMedium(2.25), ConductorMedium(5.8e7)):
        stack = Stack((Layer(ConstantMedium(4.2 - 0.063j), 3e-3), SheetPlacement(SeriesSheet(100.0))), back=back)
        assert np.all(Case(stack, 10e9, float(np.radians(89.999999))).solve().reflectance > 0.99999)


def _index(medium: AbstractMedium) -> float:
    assert isinstance(medium, ConstantMedium)
    return float(np.sqrt(complex(medium.permittivity).real * complex(medium.permeability).real))
