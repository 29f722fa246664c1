"""ε of one medium with μ of another."""

import numpy as np
import pytest

from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.magnetic import MagneticMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.propagation.solve import solve
from stackcore.stack import METAL, Layer, Stack

FREQUENCY = np.geomspace(1e6, 1e12, 13)
FERRITE = MagneticDebyeMedium(1.0, 99.0, 1e-8)


def test_takes_each_part_from_its_medium() -> None:
    """ε and its slope come from the first, μ and its slope from the second, whatever else they have."""
    dielectric = DebyeMedium(8.0, 5.0, 1e-9, 0.01)
    joined = MagneticMedium(dielectric, FERRITE).evaluate(FREQUENCY)
    first, second = dielectric.evaluate(FREQUENCY), FERRITE.evaluate(FREQUENCY)
    assert np.array_equal(joined.permittivity, first.permittivity)
    assert np.array_equal(joined.permittivity_slope, first.permittivity_slope)
    assert np.array_equal(joined.permeability, second.permeability)
    assert np.array_equal(joined.permeability_slope, second.permeability_slope)
    plain = MagneticMedium(ConstantMedium(4.0, 7.0), ConstantMedium(9.0, 2.0)).evaluate(FREQUENCY)
    assert (plain.permittivity == 4).all()
    assert (plain.permeability == 2).all()


def test_only_constants_that_act_have_slopes() -> None:
    """Constants of the parts that are not used are left out; the others are named with their part."""
    medium = MagneticMedium(ConductorMedium(5.8e7, 3.0), FERRITE)
    electric = {
        "permittivity_from.conductivity",
        "permittivity_from.relaxation_time",
        "permittivity_from.roughness",
    }
    magnetic = {
        "permeability_from.high_frequency_permeability",
        "permeability_from.permeability_step",
        "permeability_from.relaxation_time",
    }
    slopes = medium.constant_slopes(FREQUENCY)
    assert set(slopes) == electric | magnetic
    for name, slope in slopes.items():
        used, unused = slope.permittivity, slope.permeability
        if name in magnetic:
            used, unused = unused, used
        assert not unused.any()
        assert used.any() or name == "permittivity_from.roughness"


def test_a_rough_surface_keeps_its_permeability() -> None:
    """μ′ of a rough conductor is in its ε through the skin depth, and so stays among the constants."""
    rough = MagneticMedium(ConductorMedium(5.8e7, 3.0, roughness=1e-6), FERRITE)
    assert rough.constant_slopes(FREQUENCY)["permittivity_from.permeability"].permittivity.any()


@pytest.mark.parametrize(
    ("first", "second", "dispersive"),
    [
        (VACUUM, VACUUM, False),
        (VACUUM, FERRITE, True),
        (DebyeMedium(2.0, 1.0, 1e-9), VACUUM, True),
    ],
)
def test_dispersive(first: AbstractMedium, second: AbstractMedium, dispersive: bool) -> None:
    """It depends on frequency as soon as one of the two does."""
    assert MagneticMedium(first, second).dispersive is dispersive


def test_holds_where_both_hold() -> None:
    """The range is what the two have in common unless one is given."""

    def with_range(lowest: float, highest: float) -> ConstantMedium:
        return ConstantMedium(2.0, valid_range=FrequencyRange(lowest, highest))

    wide, high = with_range(1e8, 1e10), with_range(5e9, 4e10)
    assert MagneticMedium(wide, high).valid_range == FrequencyRange(5e9, 1e10)
    assert MagneticMedium(wide, VACUUM).valid_range == FrequencyRange(1e8, 1e10)
    assert MagneticMedium(VACUUM, high).valid_range == FrequencyRange(5e9, 4e10)
    assert MagneticMedium(VACUUM, VACUUM).valid_range is None
    assert MagneticMedium(wide, high, FrequencyRange(1.0, 2.0)).valid_range == FrequencyRange(1.0, 2.0)
    nowhere = MagneticMedium(with_range(1e3, 1e4), high).valid_range
    assert nowhere is not None
    assert not nowhere.contains(np.array([1e3, 5e3, 1e10])).any()


def test_a_ferrite_tile_absorbs() -> None:
    """A tile of 6 mm on metal, ε = μ at low frequency, reflects little from 30 to 300 MHz: what it is used for."""
    tile = MagneticMedium(ConstantMedium(12.0), MagneticDebyeMedium(1.0, 1499.0, 2.5e-8))
    response = solve(Stack((Layer(tile, 6e-3),), back=METAL), frequency=np.geomspace(3e7, 3e8, 9), angle=0.0)
    assert (response.return_loss_dB > 10).all()
    bare = solve(Stack((Layer(ConstantMedium(12.0), 6e-3),), back=METAL), frequency=1e8, angle=0.0)
    assert float(bare.return_loss_dB[0, 0, 0]) < 1e-10
