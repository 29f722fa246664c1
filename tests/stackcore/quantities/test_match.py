"""Standing wave ratio and input impedance against line theory, and against a network toolkit."""

import math

import mpmath
import numpy as np
import pytest
import skrf

from stackcore import CIRCULAR, METAL, QUANTITIES, ConstantMedium, Layer, SeriesSheet, SheetPlacement, Stack, solve
from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from tests.exact import exact
from tests.stackcore.quantities.made import response_of

# D. M. Pozar, Microwave Engineering, section 2.3: SWR = (1 + |Γ|)/(1 − |Γ|); e.g. return loss 20 dB is 1.222.
RATIOS = [(0.0, 1.0), (0.1, 11 / 9), (1 / 3, 2.0), (0.5, 3.0), (0.9, 19.0)]


def impedance(stack: Stack, frequency: float, angle: float = 0.0, *, tm: bool = False) -> complex:
    """Return the input impedance in ohm from its two quantities."""
    response = solve(stack, frequency, angle)
    parts = (
        QUANTITIES[f"input_{part}_ohm"].values(response)[0, 0, int(tm)] for part in ("resistance", "reactance")
    )
    return complex(*parts)


@pytest.mark.parametrize(("size", "ratio"), RATIOS)
def test_the_standing_wave_ratio(size: float, ratio: float) -> None:
    """|r| gives the ratio of the book, whatever the phase."""
    response = response_of((size, -1j * size), (complex(0.5 * math.log(1 - size**2)),) * 2)
    assert QUANTITIES["standing_wave_ratio"].values(response)[0, 0] == pytest.approx([ratio, ratio], rel=1e-14)


def test_total_reflection_has_no_finite_ratio() -> None:
    """Before metal it is infinite; before nothing it is 1."""
    assert np.isposinf(QUANTITIES["standing_wave_ratio"].values(solve(Stack((), back=METAL), 1e9, 0.3))).all()
    assert (QUANTITIES["standing_wave_ratio"].values(solve(Stack(()), 1e9, 0.3)) == 1).all()


@pytest.mark.parametrize("tangent", [1e-3, 1e-9, 1e-14])
def test_near_total_reflection_the_ratio_keeps_its_digits(tangent: float) -> None:
    """A metal-backed layer that loses next to nothing has a ratio right to ten digits, though R rounds to 1."""
    stack = Stack((Layer(ConstantMedium(4 * (1 - 1j * tangent)), 3e-3),), back=METAL)
    found = QUANTITIES["standing_wave_ratio"].values(solve(stack, 10e9, 0.4))[0, 0]
    for got, truth in zip(found, exact(stack, 10e9, 0.4), strict=True):
        with mpmath.workdps(60):
            size = mpmath.sqrt(truth.reflectance)
            ratio = float((1 + size) / (1 - size))
        assert got == pytest.approx(ratio, rel=1e-10)


def test_a_quarter_wave_inverts_and_a_half_wave_repeats() -> None:
    """Z = Zc²/ZL behind a quarter wave and ZL behind a half wave; a shorted quarter wave is open."""
    frequency, eps = 10e9, 4.0
    quarter = SPEED_OF_LIGHT / frequency / 4 / math.sqrt(eps)
    zc = FREE_SPACE_IMPEDANCE / math.sqrt(eps)
    behind = ConstantMedium(9.0)
    zl = FREE_SPACE_IMPEDANCE / 3
    layer = Layer(ConstantMedium(eps), quarter)
    assert impedance(Stack((layer,), back=behind), frequency) == pytest.approx(zc**2 / zl, rel=1e-12)
    assert impedance(Stack((layer, layer), back=behind), frequency) == pytest.approx(zl, rel=1e-12)
    shorted = impedance(Stack((layer,), back=METAL), frequency)
    assert shorted.real == 0
    assert abs(shorted.imag) > 1e15


def test_a_shorted_line_is_inductive_then_capacitive() -> None:
    """Z = jZc tan(kd) for exp(+jωt): positive reactance below a quarter wave and negative above."""
    zc, k = FREE_SPACE_IMPEDANCE / 2, 2 * 2 * math.pi * 10e9 / SPEED_OF_LIGHT
    for thickness in (1e-3, 3e-3, 5e-3):
        stack = Stack((Layer(ConstantMedium(4.0), thickness),), back=METAL)
        found = impedance(stack, 10e9)
        assert found.real == 0
        assert found.imag == pytest.approx(zc * math.tan(k * thickness), rel=1e-12)


def test_a_metal_plate_is_a_short_and_a_wall_of_infinite_impedance_is_open() -> None:
    """Z = 0 before metal, with its reactance; H exactly 0 makes all three infinite."""
    response = solve(Stack((), back=METAL), 10e9, [0.0, 0.7])
    assert (response.input_impedance == 0).all()
    sheet = SheetPlacement(SeriesSheet(resistance=377.0))
    assert impedance(Stack((sheet,), back=METAL), 10e9) == 0


@pytest.mark.parametrize("degrees", [0.0, 40.0, 75.0])
def test_input_impedance_agrees_with_a_network_toolkit(degrees: float) -> None:
    """Three lossy layers as lines of their wave impedances: scikit-rf's cascade sees the same impedance."""
    layers = [(2.3 - 0.01j, 1.0, 4e-3), (5.0 - 0.4j, 1.5 - 0.2j, 2e-3), (3.0 - 0.001j, 1.0, 7e-3)]
    frequency = skrf.Frequency(9.3, 9.3, 1, unit="GHz")
    k0 = 2 * math.pi * 9.3e9 / SPEED_OF_LIGHT
    stack = Stack(tuple(Layer(ConstantMedium(e, m), d) for e, m, d in layers), back=ConstantMedium(1.7))
    angle = math.radians(degrees)

    def wave(eps: complex, mu: complex, tm: bool) -> tuple[complex, complex]:
        q = np.sqrt(eps * mu - math.sin(angle) ** 2 + 0j)
        return q, complex(FREE_SPACE_IMPEDANCE * (q / eps if tm else mu / q))

    for tm in (False, True):
        load = wave(1.7, 1.0, tm)[1]
        network = skrf.Network(frequency=frequency, z=np.array([[[load]]]), z0=50)
        for eps, mu, thickness in reversed(layers):
            q, z = wave(eps, mu, tm)
            medium = skrf.media.DefinedGammaZ0(frequency, gamma=1j * k0 * q, z0=z)
            line = medium.line(thickness, unit="m")
            line.renormalize(50)
            network = line**network
        assert impedance(stack, 9.3e9, angle, tm=tm) == pytest.approx(complex(network.z[0, 0, 0]), rel=1e-9)


@pytest.mark.parametrize("tangent", [0.0, 1e-12, 1e-6, 0.1])
def test_a_small_resistance_keeps_its_digits(tangent: float) -> None:
    """The resistance of a wall is right though its reactance is 10⁹ times as large; 50 digits judge it."""
    stack = Stack((Layer(ConstantMedium(4 * (1 - 1j * tangent)), 3e-3),), back=METAL)
    found = solve(stack, 10e9, 0.4)
    for p, truth in enumerate(exact(stack, 10e9, 0.4)):
        front = FREE_SPACE_IMPEDANCE * (math.cos(0.4) if p else 1 / math.cos(0.4))
        with mpmath.workdps(60):
            wanted = complex(front * (1 + truth.reflection) / (1 - truth.reflection))
        got = found.input_impedance[0, 0, p]
        assert got.imag == pytest.approx(wanted.imag, rel=1e-11)
        assert got.real == pytest.approx(wanted.real if tangent else 0.0, rel=1e-10)


def test_a_mixture_has_an_input_impedance_at_the_normal_only() -> None:
    """TE and TM see different impedances at an angle, and one number for both would be made up."""
    response = solve(Stack((Layer(ConstantMedium(4.0), 3e-3),)), 10e9, [0.0, 0.5])
    found = QUANTITIES["input_impedance_ohm"].of(response, CIRCULAR)[0]
    assert found[0] == pytest.approx(abs(response.input_impedance[0, 0, 1]), rel=1e-13)
    assert np.isnan(found[1])
