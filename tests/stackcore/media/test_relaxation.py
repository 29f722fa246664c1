"""Debye, Cole-Cole, Cole-Davidson and Havriliak-Negami against a table, and against each other."""

import numpy as np
import pytest

from stackcore.media.base import AbstractMedium
from stackcore.media.cole_cole import ColeColeMedium
from stackcore.media.cole_davidson import ColeDavidsonMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.havriliak_negami import HavriliakNegamiMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.multi_debye import MultiDebyeMedium, RelaxationTerm
from tests.reference.published import REDERIVED, assert_printed

TAU = 1e-9
MODELS: dict[str, AbstractMedium] = {
    f"Debye 1929 ({REDERIVED})": DebyeMedium(2.0, 8.0, TAU),
    f"Cole and Cole 1941, a = 0.8 ({REDERIVED})": ColeColeMedium(2.0, 8.0, TAU, 0.8),
    f"Davidson and Cole 1951, b = 0.5 ({REDERIVED})": ColeDavidsonMedium(2.0, 8.0, TAU, 0.5),
    f"Havriliak and Negami 1967, a = 0.8, b = 0.6 ({REDERIVED})": HavriliakNegamiMedium(2.0, 8.0, TAU, 0.8, 0.6),
}

# ωτ, then ε′ and ε″ of the four models in turn, for ε∞ = 2 and Δε = 8.
ROWS = [
    (0.1, "9.92079 0.79208", "9.47220 1.07372", "9.97022 0.39752", "9.69792 0.66079"),
    (1.0, "6.00000 4.00000", "6.00000 2.90617", "8.21510 2.57438", "7.57283 2.20644"),
    (10.0, "2.07921 0.79208", "2.52780 1.07372", "3.87108 1.69331", "4.00794 1.58542"),
]


@pytest.mark.parametrize(
    ("source", "phase", "printed"),
    [(source, row[0], row[1 + place]) for place, source in enumerate(MODELS) for row in ROWS],
)
def test_table(source: str, phase: float, printed: str) -> None:
    """Each model has the tabulated ε at ωτ = 0.1, 1 and 10."""
    value = complex(MODELS[source].evaluate(np.array(phase / (2 * np.pi * TAU))).permittivity)
    real, loss = printed.split()
    assert_printed(value.real, real, source)
    assert_printed(-value.imag, loss, source)


FREQUENCY = np.geomspace(1.0, 1e15, 31)


@pytest.mark.parametrize(
    ("general", "special"),
    [
        (HavriliakNegamiMedium(2.0, 8.0, TAU, 1.0, 1.0, 0.1), DebyeMedium(2.0, 8.0, TAU, 0.1)),
        (HavriliakNegamiMedium(2.0, 8.0, TAU, 0.7, 1.0, 0.1), ColeColeMedium(2.0, 8.0, TAU, 0.7, 0.1)),
        (HavriliakNegamiMedium(2.0, 8.0, TAU, 1.0, 0.4, 0.1), ColeDavidsonMedium(2.0, 8.0, TAU, 0.4, 0.1)),
        (MultiDebyeMedium(2.0, (RelaxationTerm(8.0, TAU),), 0.1), DebyeMedium(2.0, 8.0, TAU, 0.1)),
    ],
)
def test_special_cases(general: AbstractMedium, special: AbstractMedium) -> None:
    """With exponents of 1, and with a single term, the general models are the special ones."""
    assert general.evaluate(FREQUENCY).permittivity == pytest.approx(
        special.evaluate(FREQUENCY).permittivity, rel=1e-14
    )


def test_exponents_close_to_one_go_over_into_debye() -> None:
    """The general formula has no jump where it changes to Debye's."""
    near = HavriliakNegamiMedium(2.0, 8.0, TAU, 1 - 1e-12, 1 - 1e-12).evaluate(FREQUENCY)
    debye = DebyeMedium(2.0, 8.0, TAU).evaluate(FREQUENCY)
    assert near.permittivity == pytest.approx(debye.permittivity, rel=1e-10, abs=0)
    assert near.permittivity_slope == pytest.approx(debye.permittivity_slope, rel=1e-8, abs=1e-30)


def test_wings_of_the_broadened_loss() -> None:
    """The loss rises with the power a below and falls with ab above the peak (Havriliak and Negami 1967)."""
    medium = HavriliakNegamiMedium(2.0, 8.0, TAU, 0.8, 0.6)
    low, high = np.array([1e-1, 1e0]), np.array([1e18, 1e19])
    for where, power in ((low, 0.8), (high, -0.48)):
        loss = -medium.evaluate(where).permittivity.imag
        assert np.log10(loss[1] / loss[0]) == pytest.approx(power, rel=1e-5)


def test_slope_with_the_second_exponent_far_below_the_peak() -> None:
    """∂ε/∂b = −Δε h ln w keeps its digits where w is hardly more than 1: there ln w is (jωτ)^a."""
    x, a = 1e-11, 0.9
    medium = HavriliakNegamiMedium(2.0, 8.0, TAU, a, 0.6)
    slope = medium.constant_slopes(np.array(x / (2 * np.pi * TAU)))["asymmetric_exponent"].permittivity
    expected = -8.0 * x**a * np.exp(0.5j * np.pi * a)
    assert float(slope.real) == pytest.approx(expected.real, rel=1e-8, abs=0)
    assert float(slope.imag) == pytest.approx(expected.imag, rel=1e-8, abs=0)


def test_terms_add() -> None:
    """Two relaxations and a conductivity add up."""
    both = MultiDebyeMedium(2.0, (RelaxationTerm(8.0, TAU), RelaxationTerm(1.5, 1e-12)), 0.3)
    one, other = DebyeMedium(2.0, 8.0, TAU), DebyeMedium(1.0, 1.5, 1e-12, 0.3)
    total = one.evaluate(FREQUENCY).permittivity + other.evaluate(FREQUENCY).permittivity - 1
    assert both.evaluate(FREQUENCY).permittivity == pytest.approx(total, rel=1e-14, abs=0)


def test_magnetic_relaxation_is_the_same_shape() -> None:
    """μ of the magnetic relaxation is what ε of the dielectric one is, and its ε is 1."""
    magnetic = MagneticDebyeMedium(2.0, 8.0, TAU).evaluate(FREQUENCY)
    dielectric = DebyeMedium(2.0, 8.0, TAU).evaluate(FREQUENCY)
    assert np.array_equal(magnetic.permeability, dielectric.permittivity)
    assert np.array_equal(magnetic.permeability_slope, dielectric.permittivity_slope)
    assert (magnetic.permittivity == 1).all()
    assert (dielectric.permeability == 1).all()
