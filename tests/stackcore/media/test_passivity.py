"""Every model, over all constants that it allows and all frequencies from 1 Hz to 1 PHz: passive and finite."""

import numpy as np
import pytest
from hypothesis import given, settings

from stackcore.media.base import AbstractMedium
from stackcore.media.cauchy import CauchyMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.plasma import PlasmaMedium
from stackcore.media.sellmeier import SellmeierMedium, SellmeierTerm
from stackcore.propagation.solve import solve
from stackcore.stack import Layer, Stack
from tests.strategies import frequencies, model_media

DECADES = 10.0 ** np.arange(16)


@settings(max_examples=1500)
@given(model_media(), frequencies())
def test_no_medium_has_gain(medium: AbstractMedium, frequency: float) -> None:
    """ε″ ≥ 0 and μ″ ≥ 0, and values and slopes are finite; every floating-point fault but underflow is an error."""
    where = np.append(DECADES, frequency)
    with np.errstate(all="raise", under="ignore"):
        values = medium.evaluate(where)
        slopes = medium.constant_slopes(where)
    for relative in (values.permittivity, values.permeability):
        assert (relative.imag <= 0).all()
        assert np.isfinite(relative).all()
        assert (relative != 0).all()
    for slope in (values.permittivity_slope, values.permeability_slope):
        assert np.isfinite(slope).all()
    for name, slope_with_constant in slopes.items():
        assert np.isfinite(slope_with_constant.permittivity).all(), name
        assert np.isfinite(slope_with_constant.permeability).all(), name


@settings(max_examples=300)
@given(model_media(), frequencies())
def test_equal_constants_are_the_same_medium(medium: AbstractMedium, frequency: float) -> None:
    """A medium is a value: hashable, and the same values come out one by one as together."""
    assert len({medium, medium}) == 1
    together = medium.evaluate(np.array([frequency, 2 * frequency]))
    alone = medium.evaluate(np.array(frequency))
    assert complex(alone.permittivity) == pytest.approx(complex(together.permittivity[0]), rel=1e-14, abs=0)
    if not medium.dispersive:
        assert (together.permittivity == together.permittivity[0]).all()
        assert (together.permeability == together.permeability[0]).all()
        assert not together.permittivity_slope.any()
        assert not together.permeability_slope.any()


@pytest.mark.parametrize(
    ("medium", "frequency"),
    [
        (SellmeierMedium((SellmeierTerm(1.0, 299792458 / 1e14),)), 1e14),  # at its pole
        (SellmeierMedium((SellmeierTerm(1.0, 299792458 / 1e14),)), np.sqrt(2) * 1e14),  # where n² is 0
        (DrudeMedium(1.0, 2.0**30, 0.0), 2.0**30),  # at its plasma frequency
        (DrudeMedium(4.0, 2.0**30, 0.0), 2.0**29),
        (CauchyMedium(1e-300), 1e14),
    ],
)
def test_where_the_formula_fails_there_is_still_an_answer(medium: AbstractMedium, frequency: float) -> None:
    """At a pole, at ε = 0 and at n = 0 of a lossless formula, values are finite, not 0, and can be solved with."""
    values = medium.evaluate(np.array([frequency, 2 * frequency]))
    assert np.isfinite(values.permittivity).all()
    assert np.isfinite(values.permittivity_slope).all()
    assert (values.permittivity != 0).all()
    wall = Stack((Layer(medium, 1e-6),))
    response = solve(wall, frequency=np.array([frequency]), angle=np.array([0.3]))
    total = response.reflectance + response.transmittance
    assert total == pytest.approx(np.ones((1, 1, 2)), abs=1e-12)


def test_plasma_stops_what_is_below_its_plasma_frequency() -> None:
    """A metre of plasma without collisions lets 1 % of the plasma frequency hardly through and reflects it."""
    plasma = PlasmaMedium(1e18)
    below = solve(Stack((Layer(plasma, 1.0),)), frequency=np.array([0.01 * plasma.plasma_frequency]), angle=0.0)
    assert float(below.reflectance[0, 0, 0]) == pytest.approx(1.0, abs=1e-15)
    assert float(below.shielding_effectiveness_dB[0, 0, 0]) > 1500
