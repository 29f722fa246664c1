"""Markers that snap: extrema and crossings of curves, against closed forms and by their definition."""

import math
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.document.view import ViewState
from app.series.curves import Curve, curves_of
from app.series.snapping import evaluator, next_crossing, next_extremum
from stackcore import ConstantMedium, Layer, Stack, solve
from stackcore.constants import SPEED_OF_LIGHT

GHZ = 1e9
SLAB = Stack((Layer(ConstantMedium(4.0), 20e-3),))


def curve(quantity: str = "transmittance", points: int = 41) -> Curve:
    """Return a curve of a lossless slab of permittivity 4, 20 mm thick, from 2 to 12 GHz at normal incidence."""
    response = solve(SLAB, np.linspace(2 * GHZ, 12 * GHZ, points), 0.0)
    return curves_of(response, ViewState(quantity, polarizations=("TE",)))[0]


def half_wave(order: int) -> float:
    """Return the frequency in Hz at which the slab is `order` half waves thick: m c / (2 n d).

    Source: the half-wave condition, any textbook of optics; recalled.
    """
    return order * SPEED_OF_LIGHT / (2 * 2.0 * 20e-3)


def test_extrema_are_half_and_quarter_waves_to_a_millionth() -> None:
    """Upward through maxima and minima in turn, far finer than the points of the sweep, and round at the end."""
    one = curve()
    value = evaluator(SLAB, one, "fraction")
    at, seen = 2 * GHZ, []
    for _ in range(6):
        found = next_extremum(one, at, 1, value)
        assert found is not None
        seen.append(found)
        at = found
    # 1.5, 2.5 … orders are minima; whole ones maxima, between 2 and 12 GHz.
    wanted = [half_wave(1) * order for order in (1.0, 1.5, 2.0, 2.5, 3.0)]
    assert seen[:5] == pytest.approx(wanted, rel=1e-6)
    assert seen[5] == pytest.approx(wanted[0], rel=1e-6)
    assert next_extremum(one, seen[2], -1, value) == pytest.approx(seen[1], rel=1e-9)


def test_crossings_are_where_the_closed_form_has_the_level() -> None:
    """T = 0.8 where sin²(kd) = (1/0.8 − 1)/0.75².

    Source: Airy's sum for a lossless sheet, any textbook of optics; recalled.
    """
    one = curve()
    value = evaluator(SLAB, one, "fraction")
    turn = math.asin(math.sqrt((1 / 0.8 - 1) / 0.75**2))
    scale = SPEED_OF_LIGHT / (2 * math.pi * 2.0 * 20e-3)
    wanted = sorted(scale * (k * math.pi + side * turn) for k in range(5) for side in (-1, 1))
    wanted = [one for one in wanted if 2 * GHZ < one < 12 * GHZ]
    at, seen = 2 * GHZ, []
    for _ in wanted:
        found = next_crossing(one, 0.8, at, 1, value)
        assert found is not None
        seen.append(found)
        at = found
    assert seen == pytest.approx(wanted, rel=1e-8)


def test_without_solving_a_crossing_is_on_the_chord() -> None:
    """A difference has no stack of its own: between its points it is a straight line."""
    one = replace(curve(), less="Another")
    assert evaluator(SLAB, one, "fraction") is None
    found = next_crossing(one, 0.8, 2 * GHZ, 1)
    assert found is not None
    assert np.interp(found, one.x, one.y) == pytest.approx(0.8, abs=1e-12)


def test_a_phase_that_turns_over_crosses_nothing_there() -> None:
    """From 180° to −180° it does not pass 0."""
    one = curve("transmission_phase_deg", 401)
    crossings = []
    at = 2 * GHZ
    for _ in range(8):
        found = next_crossing(one, 0.0, at, 1)
        assert found is not None
        crossings.append(found)
        at = found
    for found in crossings:
        assert abs(np.interp(found, one.x, one.y)) < 5


def test_what_does_not_turn_or_cross_has_no_place() -> None:
    """A level beyond all values, and a curve that only rises."""
    one = curve()
    assert next_crossing(one, 2.0, 5 * GHZ, 1) is None
    rising = replace(one, y=np.linspace(0, 1, one.x.size))
    assert next_extremum(rising, 5 * GHZ, 1) is None
    assert next_extremum(replace(one, y=np.full(one.x.size, np.nan)), 5 * GHZ, 1) is None


@given(
    st.lists(st.floats(-10, 10), min_size=3, max_size=30),
    st.floats(-10, 10),
    st.sampled_from([1, -1]),
    st.floats(0, 1),
)
def test_any_curve(values: list[float], level: float, step: int, share: float) -> None:
    """Every crossing has the level on the chord; no neighbour of an extremum lies beyond it on both sides."""
    one = curve(points=len(values))
    y = np.array(values)
    one = replace(one, y=y, raw=y, quantity="input_reactance_ohm")
    start = float(one.x[0] + share * (one.x[-1] - one.x[0]))
    crossing = next_crossing(one, level, start, step)
    if crossing is not None:
        assert np.interp(crossing, one.x, y) == pytest.approx(level, abs=1e-6)
    turn = next_extremum(one, start, step)
    if turn is not None:
        place = int(np.argmin(np.abs(one.x - turn)))
        near = y[max(place - 1, 0) : place + 2]
        assert y[place] in (near.min(), near.max())
