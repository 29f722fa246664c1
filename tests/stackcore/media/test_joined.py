"""Joined media: which part answers, what happens at a join, where nothing holds."""

import math
from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np
import pytest

from stackcore.arrays import FloatArray
from stackcore.errors import InputError
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.joined import JoinedMedium
from stackcore.media.tabulated import TabulatedMedium

FILM = ConductorMedium(5e5, valid_range=FrequencyRange(0.0, 1e12))
VISIBLE = TabulatedMedium((3.8e14, 7.9e14), (3.5 - 0.05j, 4.1 - 0.02j))
COATING = JoinedMedium((FILM, VISIBLE), (1e13,))


def test_the_part_of_each_frequency_answers() -> None:
    """Below the join the film of the radio range answers, at the join and above it the table."""
    frequency = np.array([[1e9, 1e12, 9.99e12], [1e13, 5e14, 9e14]])
    values = COATING.evaluate(frequency)
    assert COATING.part_at(frequency).tolist() == [[0, 0, 0], [1, 1, 1]]
    for row, part in enumerate((FILM, VISIBLE)):
        alone = part.evaluate(frequency[row])
        assert np.array_equal(values.permittivity[row], alone.permittivity)
        assert np.array_equal(values.permittivity_slope[row], alone.permittivity_slope)
        assert np.array_equal(values.permeability[row], alone.permeability)


@dataclass(frozen=True)
class Above(AbstractMedium):
    """A medium that refuses to be asked below a frequency."""

    lowest: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    @property
    def dispersive(self) -> bool:
        return False

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        assert frequency.size
        assert (frequency >= self.lowest).all()
        return ConstantMedium(2.0).evaluate(frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return {}


def test_no_part_is_asked_outside_its_span() -> None:
    """A part that has no answer elsewhere is never asked there, nor where no frequency is its own."""
    joined = JoinedMedium((ConstantMedium(3.0), Above(1e9)), (1e9,))
    assert joined.evaluate(np.array([1e8, 1e9, 1e10])).permittivity.tolist() == [3, 2, 2]
    assert joined.evaluate(np.array([1e7, 1e8])).permittivity.tolist() == [3, 3]


def test_steps_are_told() -> None:
    """The jump at each join is told for ε and μ, with the values on both sides."""
    joined = JoinedMedium(
        (ConstantMedium(4.0), ConstantMedium(5.0, 2.0), DebyeMedium(5.0, 1.0, 1e-12)), (1e9, 1e10)
    )
    first, second = joined.steps()
    assert (first.frequency, first.permittivity_below, first.permittivity_above) == (1e9, 4, 5)
    assert first.permittivity_step == pytest.approx(0.2)
    assert first.permeability_step == pytest.approx(0.5)
    expected = DebyeMedium(5.0, 1.0, 1e-12).evaluate(np.array(1e10)).permittivity
    assert second.permittivity_above == pytest.approx(complex(expected))


def test_a_smooth_join_has_no_step() -> None:
    """Two parts that agree at their join make no jump."""
    (step,) = JoinedMedium((ConstantMedium(4.0), ConstantMedium(4.0)), (1e9,)).steps()
    assert (step.permittivity_step, step.permeability_step) == (0.0, 0.0)


def test_ranges_and_gaps() -> None:
    """The overall range spans from the first to the last part; what lies between and holds nowhere is a gap."""
    assert COATING.valid_range == FrequencyRange(0.0, 7.9e14)
    assert COATING.gaps == (FrequencyRange(1e12, 3.8e14),)
    assert COATING.holds(np.array([1e9, 5e12, 2e13, 5e14, 9e14])).tolist() == [True, False, False, True, False]


def test_ranges_end_at_the_joins() -> None:
    """A part that holds beyond its join answers only up to it, and says no more."""
    wide = ConstantMedium(4.0, valid_range=FrequencyRange(1e8, 1e11))
    joined = JoinedMedium((wide, ConstantMedium(4.1)), (1e10,))
    assert joined.valid_ranges == (FrequencyRange(1e8, 1e10), FrequencyRange(1e10, math.inf))
    assert joined.gaps == ()


def test_parts_without_limits_have_none() -> None:
    """Where no part knows a limit there is none; where no part holds in its own span nothing holds."""
    assert JoinedMedium((ConstantMedium(4.0), ConstantMedium(5.0)), (1e9,)).valid_range is None
    late = ConstantMedium(4.0, valid_range=FrequencyRange(2e9, 3e9))
    early = ConstantMedium(4.0, valid_range=FrequencyRange(1e8, 2e8))
    nowhere = JoinedMedium((late, early), (1e9,)).valid_range
    assert nowhere is not None
    assert not nowhere.contains(np.geomspace(1e6, 1e12, 50)).any()


def test_slopes_come_from_the_part_that_answers() -> None:
    """The slope with respect to a constant of one part is 0 where the other answers."""
    slopes = COATING.constant_slopes(np.array([1e9, 5e14]))
    assert set(slopes) == {f"parts[0].{name}" for name in FILM.constant_slopes(np.array(1e9))} | {
        "parts[1].permittivity_scale",
        "parts[1].loss_scale",
    }
    assert slopes["parts[0].conductivity"].permittivity[0] != 0
    assert slopes["parts[0].conductivity"].permittivity[1] == 0
    assert slopes["parts[1].loss_scale"].permittivity[0] == 0
    assert slopes["parts[1].loss_scale"].permittivity[1] != 0


@pytest.mark.parametrize(
    ("parts", "joins", "told"),
    [
        ((FILM,), (), "nothing to join"),
        ((FILM, VISIBLE), (), "0 joins for 2 parts"),
        ((FILM, VISIBLE, FILM), (2e12, 1e12), r"joins\[1\]: 1e\+12 Hz follows 2e\+12 Hz"),
        ((FILM, VISIBLE, FILM), (1e12, 1e12), r"joins\[1\]"),
        ((FILM, VISIBLE), (0.0,), r"joins\[0\]: 0 Hz is no frequency"),
        ((FILM, VISIBLE), (float("nan"),), "nan Hz is no frequency"),
    ],
)
def test_what_does_not_join_is_refused(
    parts: tuple[AbstractMedium, ...], joins: tuple[float, ...], told: str
) -> None:
    """A wrong number of joins, joins out of order and joins that are no frequency are told with their place."""
    with pytest.raises(InputError, match=told):
        JoinedMedium(parts, joins)
