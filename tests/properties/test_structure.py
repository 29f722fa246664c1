"""What a stack's structure obeys: splitting, scaling, duality, matched and half-wave layers, symmetric stacks."""

import numpy as np
import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, PerfectConductor, SheetPlacement, Stack
from tests.strategies import (
    TE,
    TM,
    Case,
    angles,
    any_back,
    cases,
    decades,
    dense_fronts,
    elements,
    frequencies,
    lossless_media,
    lossy_media,
    media,
)

WIDE = cases(fronts=dense_fronts(), backs=any_back())


def same(one: Case, other: Case, *, tolerance: float = 1e-10) -> None:
    """Assert that two waves meet the same wall: r and t agree, t to its own size."""
    a, b = one.solve(), other.solve()
    np.testing.assert_allclose(a.reflection, b.reflection, atol=tolerance)
    if not isinstance(one.stack.back, PerfectConductor):
        difference = a.log_transmission - b.log_transmission
        np.testing.assert_allclose(difference.real, 0.0, atol=tolerance * 10)
        np.testing.assert_allclose(np.exp(1j * difference.imag), 1.0, atol=tolerance * 10)


@given(WIDE, media(), st.integers(0, 6))
def test_layer_of_no_thickness_anywhere(case: Case, medium: AbstractMedium, place: int) -> None:
    """Item 11: a layer of no thickness changes nothing, wherever it is put."""
    chosen = case.stack.elements
    with_nothing = case.with_elements((*chosen[:place], Layer(medium, 0.0), *chosen[place:]))
    same(with_nothing, case, tolerance=1e-14)


@given(WIDE, st.floats(0.01, 0.99))
def test_splitting_layers(case: Case, share: float) -> None:
    """Item 12: every layer cut in two is the same stack, and its halves absorb what it did."""
    split: list[Element] = []
    owner: list[int] = []
    for place, element in enumerate(case.stack.elements):
        parts: tuple[Element, ...] = (element,)
        if isinstance(element, Layer):
            first = element.thickness * share
            parts = (Layer(element.medium, first), Layer(element.medium, element.thickness - first))
        split += parts
        owner += [place] * len(parts)
    cut = case.with_elements(tuple(split))
    same(cut, case)
    whole, halves = case.solve().element_absorptance[0, 0], cut.solve().element_absorptance[0, 0]
    summed = np.stack([halves[:, np.array(owner) == place].sum(axis=1) for place in range(whole.shape[1])], axis=1)
    np.testing.assert_allclose(summed, whole, rtol=1e-8, atol=1e-13)


@given(
    st.lists(st.tuples(lossless_media() | lossy_media(), decades(1e-3, 1.0)), min_size=1, max_size=5),
    frequencies(1e3, 1e14),
    decades(1e-3, 1e3),
    angles(85.0),
)
def test_scaling(layers: list[tuple[ConstantMedium, float]], frequency: float, factor: float, angle: float) -> None:
    """Item 13: wavelength and thickness times a number, constants as they are: the same r, t."""
    length = SPEED_OF_LIGHT / frequency
    small = tuple(Layer(medium, share * length) for medium, share in layers)
    large = tuple(Layer(layer.medium, layer.thickness * factor) for layer in small)
    same(Case(Stack(small), frequency, angle), Case(Stack(large), frequency / factor, angle))


@given(
    st.lists(st.tuples(lossless_media() | lossy_media(), decades(1e-3, 1.0)), min_size=1, max_size=5),
    frequencies(),
    angles(85.0),
    dense_fronts(),
    lossless_media() | lossy_media(),
)
def test_duality(
    layers: list[tuple[ConstantMedium, float]],
    frequency: float,
    angle: float,
    front: ConstantMedium,
    back: ConstantMedium,
) -> None:
    """Item 14: ε and μ exchanged everywhere exchange TE and TM; R, T and A stay, r changes its sign."""
    length = SPEED_OF_LIGHT / frequency
    chosen = tuple(Layer(medium, share * length) for medium, share in layers)
    dual = tuple(Layer(_dual(medium), share * length) for medium, share in layers)
    one = Case(Stack(chosen, front=front, back=back), frequency, angle).solve()
    two = Case(Stack(dual, front=_dual(front), back=_dual(back)), frequency, angle).solve()
    np.testing.assert_allclose(one.reflection, -two.reflection[..., ::-1], atol=1e-10)
    np.testing.assert_allclose(one.absorptance, two.absorptance[..., ::-1], rtol=1e-9, atol=1e-15)
    np.testing.assert_allclose(one.insertion_loss_dB, two.insertion_loss_dB[..., ::-1], rtol=1e-9, atol=1e-9)


@given(cases(fronts=dense_fronts(), backs=any_back(), highest_deg=0.0))
def test_polarizations_agree_at_normal_incidence(case: Case) -> None:
    """Item 15: at normal incidence TE and TM are one wave, in sign as well."""
    response = case.solve()
    np.testing.assert_allclose(response.reflection[..., TE], response.reflection[..., TM], atol=1e-11)
    np.testing.assert_allclose(
        response.element_absorptance[..., TE, :], response.element_absorptance[..., TM, :], rtol=1e-9, atol=1e-14
    )


@given(
    cases(lossless=True, fronts=dense_fronts(), backs=lossless_media(), most=4),
    lossless_media(),
    st.integers(1, 5),
    st.integers(0, 4),
)
def test_half_wave_layer_is_absent(case: Case, medium: ConstantMedium, order: int, place: int) -> None:
    """Item 16: a lossless layer of m half waves at its angle leaves R and T as they were."""
    q = _normal(case, medium)
    assume(q.real > 0.05)
    layer = Layer(medium, order * case.wavelength / (2 * q.real))
    chosen = case.stack.elements
    padded = case.with_elements((*chosen[:place], layer, *chosen[place:])).solve()
    plain = case.solve()
    np.testing.assert_allclose(padded.reflectance, plain.reflectance, atol=1e-9)
    np.testing.assert_allclose(padded.transmittance, plain.transmittance, atol=1e-9)


@given(lossless_media(), media(), dense_fronts(), frequencies(), angles(85.0))
def test_quarter_wave_transformer(
    medium: ConstantMedium, back: AbstractMedium, front: ConstantMedium, frequency: float, angle: float
) -> None:
    """Item 17: a quarter wave at its angle turns the admittance Y of the back into Y₁²/Y."""
    bare = Case(Stack(front=front, back=back), frequency, angle)
    q = _normal(bare, medium)
    assume(q.real > 0.05)
    coated = bare.with_elements((Layer(medium, bare.wavelength / (4 * q.real)),)).solve().reflection[0, 0]
    plain = bare.solve().reflection[0, 0]
    eps, mu = complex(medium.permittivity).real, complex(medium.permeability).real
    first = np.array([q.real / mu, eps / q.real])
    start = _front_admittance(bare)
    # From r to the ratio Y/Y₀ = (1 − r)/(1 + r) and back, kept as a fraction so that no short is divided by.
    ratio = (first / start) ** 2
    expected = ((1 - plain) - ratio * (1 + plain)) / ((1 - plain) + ratio * (1 + plain))
    np.testing.assert_allclose(coated, expected, atol=1e-9)


@given(
    st.lists(st.tuples(lossless_media() | lossy_media(20.0), decades(1e-3, 0.5)), min_size=1, max_size=4),
    frequencies(),
    angles(85.0),
)
def test_bisection(layers: list[tuple[ConstantMedium, float]], frequency: float, angle: float) -> None:
    """Item 18: of a stack and its mirror image r − t is its half on metal, r + t its half on the dual of metal.

    The perfect magnetic conductor is had through duality: r on it is −r on metal with ε and μ exchanged.
    """
    length = SPEED_OF_LIGHT / frequency
    half = tuple(Layer(medium, share * length) for medium, share in layers)
    dual = tuple(Layer(_dual(medium), share * length) for medium, share in layers)
    whole = Case(Stack((*half, *half[::-1])), frequency, angle).solve()
    electric = Case(Stack(half, back=METAL), frequency, angle).solve().reflection
    magnetic = -Case(Stack(dual, back=METAL), frequency, angle).solve().reflection[..., ::-1]
    np.testing.assert_allclose(whole.reflection - whole.transmission, electric, atol=1e-9)
    np.testing.assert_allclose(whole.reflection + whole.transmission, magnetic, atol=1e-9)


@given(cases(lossless=True, most=3, highest_deg=75.0), st.integers(2, 12))
def test_periodic_stack(case: Case, count: int) -> None:
    """Item 19: 1/T_N = 1 + (sin Nβ/sin β)² (1/T₁ − 1), cos β = Re(1/t₁) (J. M. Bendickson et al., PRE 53, 4107)."""
    cell = case.solve()
    repeated = case.with_elements(case.stack.elements * count).solve()
    for p in (TE, TM):
        t = complex(cell.transmission[0, 0, p])
        assume(abs(t) > 1e-3)
        cosine = (1 / t).real
        before, chebyshev = 0.0, 1.0
        for _ in range(count - 1):
            before, chebyshev = chebyshev, 2 * cosine * chebyshev - before
        reflected = float(cell.reflectance[0, 0, p] / cell.transmittance[0, 0, p])
        expected = 1 / (1 + chebyshev**2 * reflected)
        np.testing.assert_allclose(repeated.transmittance[0, 0, p], expected, rtol=1e-6, atol=1e-9)


@given(cases(most=3), cases(most=3))
def test_stacks_one_behind_the_other(first: Case, second: Case) -> None:
    """Item 20: two stacks in air put together obey the sum over all echoes between them."""
    second = Case(second.stack, first.frequency, first.angle)
    both = first.with_elements(first.stack.elements + second.stack.elements).solve()
    one, other = first.solve(), second.solve()
    behind = first.with_elements(first.stack.elements[::-1]).solve()
    echo = 1 - behind.reflection * other.reflection
    assume(float(np.abs(echo).min()) > 1e-3)
    reflection = one.reflection + one.transmission**2 * other.reflection / echo
    np.testing.assert_allclose(both.reflection, reflection, atol=1e-9)
    np.testing.assert_allclose(
        both.log_transmission.real,
        (one.log_transmission + other.log_transmission - np.log(echo)).real,
        rtol=1e-9,
        atol=1e-9,
    )


def test_herpin_layer() -> None:
    """Item 21: 1.45/2.3/1.45 of phases 0.6, 1.1, 0.6 is one layer of index 2.673994082 and phase 2.428361359."""
    f = 3e14
    k = 2 * np.pi * f / SPEED_OF_LIGHT
    outer, inner = Layer(ConstantMedium(1.45**2), 0.6 / (k * 1.45)), Layer(ConstantMedium(2.3**2), 1.1 / (k * 2.3))
    single = Layer(ConstantMedium(2.673994082**2), 2.428361359 / (k * 2.673994082))
    for back in (VACUUM, ConstantMedium(2.25), ConstantMedium(-10 - 1j)):
        three = Case(Stack((outer, inner, outer), back=back), f, 0.0)
        same(three, Case(Stack((single,), back=back), f, 0.0), tolerance=2e-9)


@given(decades(1.2, 4.0), decades(1.2, 4.0), st.floats(0.05, 1.5), st.floats(0.05, 1.5), any_back())
def test_symmetric_trio_is_one_layer(
    outer: float, inner: float, first: float, second: float, back: AbstractMedium | PerfectConductor
) -> None:
    """Item 21: outside its stop bands a lossless ABA is one layer of its own index and phase (Herpin, Epstein)."""
    f = 3e14
    k = 2 * np.pi * f / SPEED_OF_LIGHT
    c1, s1, c2, s2 = np.cos(first), np.sin(first), np.cos(second), np.sin(second)
    # The characteristic matrix of A B A, [[m, jx], [jb, m]].
    a = np.array([[c1, 1j * s1 / outer], [1j * outer * s1, c1]])
    b = np.array([[c2, 1j * s2 / inner], [1j * inner * s2, c2]])
    trio = a @ b @ a
    m, x, y = trio[0, 0].real, trio[0, 1].imag, trio[1, 0].imag
    assume(abs(m) < 0.99 and x * y > 0)
    n = float(np.sqrt(y / x))
    phase = float(np.arctan2(x * n, m))
    phase += 2 * np.pi if phase < 0 else 0
    layers = (
        Layer(ConstantMedium(outer**2), first / (k * outer)),
        Layer(ConstantMedium(inner**2), second / (k * inner)),
        Layer(ConstantMedium(outer**2), first / (k * outer)),
    )
    single = (Layer(ConstantMedium(n**2), phase / (k * n)),)
    same(Case(Stack(layers, back=back), f, 0.0), Case(Stack(single, back=back), f, 0.0), tolerance=1e-8)


@given(cases(most=4), st.booleans())
def test_symmetric_stack(case: Case, odd: bool) -> None:
    """Item 22: a stack that reads the same backwards reflects the same from both sides, loss or not."""
    chosen = case.stack.elements
    mirrored = (*chosen, *(chosen[::-1][1:] if odd else chosen[::-1]))
    forward, back = case.with_elements(mirrored), case.with_elements(mirrored[::-1])
    np.testing.assert_array_equal(forward.solve().reflection, back.solve().reflection)
    whole = case.with_elements((*mirrored, Layer(ConstantMedium(2.0), 0.0)))
    turned = case.with_elements((Layer(ConstantMedium(2.0), 0.0), *mirrored))
    same(whole, turned, tolerance=1e-13)


@given(decades(0.5, 50.0), decades(1e-3, 3.0), frequencies(), decades(1e-4, 1.0))
def test_matched_layer(size: float, tangent: float, frequency: float, share: float) -> None:
    """Item 23: ε = μ reflects nothing at normal incidence, on anything matched, and T = exp(−4πd ε″/λ)."""
    z = size * (1 - 1j * tangent)
    thickness = share * SPEED_OF_LIGHT / frequency / abs(z)
    response = Case(Stack((Layer(ConstantMedium(z, z), thickness),)), frequency, 0.0).solve()
    assert np.all(response.reflectance < 1e-28)
    expected = np.exp(4 * np.pi * thickness * frequency / SPEED_OF_LIGHT * z.imag)
    np.testing.assert_allclose(response.transmittance, expected, rtol=1e-12)


@given(lossless_media(1000.0) | lossy_media())
def test_reflection_at_45_degrees(medium: ConstantMedium) -> None:
    """Item 24: for a half-space without magnetism r_TM = −r_TE² at 45 degrees (F. Abelès)."""
    plain = ConstantMedium(medium.permittivity)
    r = Case(Stack(back=plain), 1e14, float(np.pi / 4)).solve().reflection[0, 0]
    np.testing.assert_allclose(r[TM], -(r[TE] ** 2), rtol=1e-12, atol=1e-15)


@given(st.data(), frequencies(), angles(80.0))
def test_stack_in_another_order_of_equal_parts(data: st.DataObject, frequency: float, angle: float) -> None:
    """Layers of one medium and sheets of one plane may change places among themselves."""
    chosen = data.draw(elements(frequency, sheets=False, most=2))
    sheets = (SheetPlacement(SeriesSheet(100.0)), SheetPlacement(SeriesSheet(300.0, 1.0 / frequency)))
    first = Case(Stack((*chosen, *sheets, *chosen)), frequency, angle)
    second = Case(Stack((*chosen, *sheets[::-1], *chosen)), frequency, angle)
    same(first, second, tolerance=1e-12)


@pytest.mark.parametrize("polarization", [TE, TM])
def test_laminate_becomes_uniaxial(polarization: int) -> None:
    """Layers of 9 (40 %) and 2 (60 %), 10 mm, 10 GHz, 50 degrees: Rytov's medium in the limit, the error as 1/N."""
    expected = ((0.797191405, 0.603726582), (0.360068436, 0.932925893))[polarization]
    errors = []
    for pairs in (100, 200, 400):
        pair = (Layer(ConstantMedium(9.0), 4e-3 / pairs), Layer(ConstantMedium(2.0), 6e-3 / pairs))
        r = Case(Stack(pair * pairs), 10e9, float(np.radians(50))).solve()
        errors.append(abs(float(np.abs(r.transmission[0, 0, polarization])) - expected[1]))
    assert errors[2] < 1e-5
    assert errors[0] / errors[1] == pytest.approx(4, rel=0.1), "the error of |t| falls as 1/N²"
    assert errors[1] / errors[2] == pytest.approx(4, rel=0.1)


def _dual(medium: ConstantMedium) -> ConstantMedium:
    """Return the medium with ε and μ exchanged."""
    return ConstantMedium(medium.permeability, medium.permittivity)


def _normal(case: Case, medium: ConstantMedium) -> complex:
    """Return q of the wave in `medium`."""
    front = case.stack.front.evaluate(np.array(case.frequency))
    sine_squared = complex(front.permittivity * front.permeability).real * np.sin(case.angle) ** 2
    return complex(np.sqrt(complex(medium.permittivity) * complex(medium.permeability) - sine_squared))


def _front_admittance(case: Case) -> np.ndarray[tuple[int], np.dtype[np.float64]]:
    """Return (TE, TM) of the front half-space."""
    values = case.stack.front.evaluate(np.array(case.frequency))
    normal = np.sqrt(complex(values.permittivity).real / complex(values.permeability).real)
    return np.array([normal * np.cos(case.angle), normal / np.cos(case.angle)])
