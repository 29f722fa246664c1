"""Resonances of ε and μ: height, width, static value, and what is refused."""

import numpy as np
import pytest

from stackcore.media.lorentz import LorentzMedium
from stackcore.media.magnetic_lorentz import MagneticLorentzMedium
from stackcore.media.multi_lorentz import MultiLorentzMedium
from stackcore.media.resonance import LorentzTerm

FREQUENCY = np.geomspace(1.0, 1e15, 31)


def test_peak() -> None:
    """At resonance ε is ε∞ − jΔε f₀/Γ; half of the loss is left half a linewidth away on each side."""
    medium = LorentzMedium(2.5, 3.0, 1e13, 1e9)
    values = medium.evaluate(np.array([1e13 - 5e8, 1e13, 1e13 + 5e8])).permittivity
    assert values[1] == pytest.approx(2.5 - 3e4j, rel=1e-12)
    assert -values.imag[[0, 2]] == pytest.approx(1.5e4, rel=1e-3)


def test_ends() -> None:
    """Far below the resonance ε is ε∞ + Δε, far above it is ε∞."""
    ends = LorentzMedium(2.5, 3.0, 1e8, 1e7).evaluate(np.array([1.0, 1e15])).permittivity
    assert ends.real == pytest.approx([5.5, 2.5], rel=1e-12)


def test_longitudinal_frequency() -> None:
    """Without much damping ε′ passes 0 at f₀ √(ε(static)/ε∞), after Lyddane, Sachs and Teller (1941)."""
    medium = LorentzMedium(2.0, 6.0, 1e13, 1.0)
    zero = medium.evaluate(1e13 * 2 * np.array([1 - 1e-9, 1 + 1e-9])).permittivity.real
    assert zero[0] < 0 < zero[1]


def test_terms_add() -> None:
    """Two oscillators add up, and one alone is the single model."""
    first, second = LorentzTerm(3.0, 1e10, 1e9), LorentzTerm(0.5, 1e13, 3e12)
    both = MultiLorentzMedium(1.5, (first, second)).evaluate(FREQUENCY).permittivity
    one = LorentzMedium(1.5, 3.0, 1e10, 1e9).evaluate(FREQUENCY).permittivity
    other = LorentzMedium(1.0, 0.5, 1e13, 3e12).evaluate(FREQUENCY).permittivity
    assert both == pytest.approx(one + other - 1, rel=1e-12, abs=0)
    assert np.array_equal(MultiLorentzMedium(1.5, (first,)).evaluate(FREQUENCY).permittivity, one)


def test_magnetic_resonance_is_the_same_shape() -> None:
    """μ of the magnetic resonance is what ε of the dielectric one is, and its ε is 1."""
    magnetic = MagneticLorentzMedium(1.5, 3.0, 1e10, 1e9).evaluate(FREQUENCY)
    dielectric = LorentzMedium(1.5, 3.0, 1e10, 1e9).evaluate(FREQUENCY)
    assert np.array_equal(magnetic.permeability, dielectric.permittivity)
    assert np.array_equal(magnetic.permeability_slope, dielectric.permittivity_slope)
    assert (magnetic.permittivity == 1).all()
    assert (dielectric.permeability == 1).all()


@pytest.mark.parametrize(
    ("constants", "told"),
    [
        ((0.0, 3.0, 1e10, 1e9), "high_frequency_{} 0 must be above 0"),
        ((1.0, -3.0, 1e10, 1e9), "{}_step -3 is negative, which would be gain"),
        ((1.0, 3.0, -1e10, 1e9), r"resonance_frequency -1e\+10 Hz must be above 0"),
        ((1.0, 3.0, 1e10, 0.0), "linewidth 0 Hz must be above 0"),
        ((1.0, 3.0, 1e10, float("nan")), "linewidth nan is not finite"),
    ],
)
def test_what_is_no_resonance_is_refused(constants: tuple[float, float, float, float], told: str) -> None:
    """Gain, no width and values that are not finite are refused by name, for ε and μ alike."""
    with pytest.raises(ValueError, match=told.format("permittivity")):
        LorentzMedium(*constants)
    with pytest.raises(ValueError, match=told.format("permeability")):
        MagneticLorentzMedium(*constants)


def test_the_place_of_a_wrong_term_is_told() -> None:
    """A wrong constant in a sum is named with its place."""
    right, wrong = LorentzTerm(3.0, 1e10, 1e9), LorentzTerm(3.0, 1e10, -1e9)
    with pytest.raises(ValueError, match=r"terms\[1\].linewidth -1e\+09 Hz must be above 0"):
        MultiLorentzMedium(1.0, (right, wrong))
    with pytest.raises(ValueError, match="terms must hold at least one term"):
        MultiLorentzMedium(1.0, ())
