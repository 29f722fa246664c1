"""Maps against the plain solver, from any point of giving up."""

import numpy as np
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from stackcore.errors import InputError, JobError
from stackcore.polarizations import CIRCULAR, TE, TM, Polarization
from stackcore.propagation import solve
from stackcore.quantities import quantity_named
from stackcore.studies import MapLevel, curve_over, map_over, varied, worst, worst_of_curve
from tests.stackcore.studies.jobs import dome_job, variation

JOB = dome_job()
POLARIZATIONS = st.sampled_from((TE, TM, CIRCULAR))
NAMES = st.sampled_from(("transmittance", "insertion_loss_dB", "absorptance", "insertion_phase_delay_deg"))


@settings(max_examples=25, deadline=None)
@given(
    width=st.integers(1, 90),
    height=st.integers(1, 60),
    name=NAMES,
    polarization=POLARIZATIONS,
    data=st.data(),
)
def test_a_map_is_the_plain_answer(
    width: int, height: int, name: str, polarization: Polarization, data: st.DataObject
) -> None:
    """At random points the last level is what `solve` gives there alone, and it comes last."""
    frequency, angle = np.linspace(2e9, 18e9, width), np.radians(np.linspace(0, 85, height))
    quantity = quantity_named(name)
    levels = list(map_over(JOB, 0, quantity, polarization, frequency, angle))
    shares = [level.share for level in levels]
    assert shares == sorted(set(shares))
    assert shares[-1] == 1
    assert all(np.isfinite(level.values).all() for level in levels)
    assert levels[-1].values.shape == (height, width)
    for _ in range(5):
        row, column = data.draw(st.integers(0, height - 1)), data.draw(st.integers(0, width - 1))
        alone = quantity.of(solve(JOB.stacks[0], frequency[column], angle[row]), polarization)
        assert levels[-1].values[row, column] == pytest.approx(alone[0, 0], rel=1e-9, abs=1e-12)


@pytest.mark.parametrize("along", ["frequency", "angle"])
@pytest.mark.parametrize("path", ["stacks[0].elements[1].thickness", "materials.water.terms[0].relaxation_time"])
def test_a_map_over_a_variation(along: str, path: str) -> None:
    """Each row of a map over a variation is the answer of the job with that value."""
    chosen = variation(JOB, path)
    values = chosen.values(21)
    frequency = np.linspace(2e9, 18e9, 35) if along == "frequency" else np.array([9e9])
    angle = np.radians(np.linspace(0, 80, 37)) if along == "angle" else np.array([0.6])
    quantity = quantity_named("insertion_loss_dB")
    *_, last = map_over(JOB, 0, quantity, TM, frequency, angle, chosen, values)
    assert (last.x_axis, last.y_axis, last.share) == (along, "variation", 1)
    assert last.y.tolist() == values.tolist()
    for row in (0, 7, 20):
        stack = varied(JOB, chosen, float(values[row])).stacks[0]
        alone = quantity.of(solve(stack, frequency, angle), TM).ravel()
        np.testing.assert_allclose(last.values[row], alone, rtol=1e-9)


@settings(max_examples=20, deadline=None)
@given(steps=st.integers(0, 12))
def test_a_map_can_be_given_up(steps: int) -> None:
    """Closed after any number of steps a map has filled cells that are its own, and does not go on."""
    study = map_over(JOB, 0, quantity_named("absorptance"), TE, np.linspace(2e9, 18e9, 300), np.linspace(0, 1, 90))
    taken = [level for level, _ in zip(study, range(steps), strict=False)]
    study.close()
    assert next(study, None) is None
    for level in taken:
        assert np.isfinite(level.values).all()
        assert 0 < level.share < 1
        assert not level.values.flags.writeable
    if taken:  # a later level has not written into an earlier one
        first = next(map_over(JOB, 0, quantity_named("absorptance"), TE, level.x, level.y))
        assert (first.values == taken[0].values).all()


def test_what_makes_no_map_is_told_before_anything_is_solved() -> None:
    """Too many axes, no values, and values out of their limits are told."""
    thickness = variation(JOB, "stacks[0].elements[0].thickness")
    quantity = quantity_named("transmittance")
    with pytest.raises(InputError, match="one frequency or one angle"):
        next(map_over(JOB, 0, quantity, TE, [1e9, 2e9], [0.0, 0.1], thickness, [1e-3]))
    with pytest.raises(InputError, match="a map of 1 by 0 points"):
        next(map_over(JOB, 0, quantity, TE, [1e9], [0.0], thickness))
    with pytest.raises(JobError, match="negative"):
        next(map_over(JOB, 0, quantity, TE, [1e9], [0.0], thickness, [1e-3, -1e-3]))


def test_a_curve_is_the_plain_answer_and_grows() -> None:
    """A curve keeps what it had, and its last answers are those of the job with each value."""
    chosen = variation(JOB, "materials.core.permittivity[1]")
    values, frequency, angle = np.linspace(0, 0.3, 40), np.linspace(2e9, 18e9, 11), np.radians([0.0, 50.0])
    quantity = quantity_named("absorptance")
    steps = list(curve_over(JOB, chosen, values, frequency, angle))
    assert [step.values.size for step in steps] == [len(step.responses) for step in steps]
    assert steps[-1].share == 1
    found = steps[-1].of(quantity, CIRCULAR)
    assert found.shape == (40, 11, 2)
    for number in (0, 17, 39):
        stack = varied(JOB, chosen, float(values[number])).stacks[0]
        assert (found[number] == quantity.of(solve(stack, frequency, angle), CIRCULAR)).all()
    place = worst_of_curve(steps[-1], quantity, CIRCULAR, "low")
    assert place is not None
    assert place.value == found.max()
    at = np.flatnonzero(values == place.varied_value), np.flatnonzero(frequency == place.frequency)
    assert found[at[0][0], at[1][0], int(place.angle != 0)] == place.value


def test_the_worst_place() -> None:
    """NaN is never the worst, equal values give the first, infinite ones count, and nothing known gives None."""
    x, y = np.array([1e9, 2e9, 3e9]), np.array([0.0, 0.5])
    level = MapLevel(x, y, np.array([[np.nan, 3.0, 1.0], [1.0, np.inf, 3.0]]), 1.0)
    lowest, highest = worst(level, "high"), worst(level, "low")
    assert lowest is not None
    assert highest is not None
    assert (lowest.value, lowest.x, lowest.y, lowest.row, lowest.column) == (1.0, 3e9, 0.0, 0, 2)
    assert (highest.value, highest.x, highest.y) == (np.inf, 2e9, 0.5)
    assert worst(MapLevel(x, y, np.full((2, 3), np.nan), 1.0), "low") is None
