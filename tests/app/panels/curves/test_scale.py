"""Positions on the axes, round numbers, and frames: arithmetic without a toolkit."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.panels.curves.frame import Frame, finite_runs
from app.panels.curves.scale import (
    FrequencyScale,
    linear_ticks,
    logarithmic_ticks,
    number_texts,
    round_range,
    round_step,
)

FINITE = st.floats(-1e9, 1e9, allow_nan=False)


@given(st.floats(1.0, 1e16), st.booleans(), st.sampled_from([1.0, 1e-6, 1e-9, 1e-12]))
def test_position_and_hertz_are_inverse(hertz: float, logarithmic: bool, factor: float) -> None:
    """A frequency comes back from its position on either kind of axis."""
    scale = FrequencyScale(factor, logarithmic)
    assert scale.hertz(scale.position(hertz)) == pytest.approx(hertz, rel=1e-12)


def test_positions_of_an_array_agree_with_single_ones() -> None:
    """The array form is the single form, point by point, on a logarithmic axis."""
    scale = FrequencyScale(1e-9, True)
    hertz = np.array([1e8, 1e9, 2e10])
    assert scale.positions(hertz).tolist() == [scale.position(value) for value in hertz]
    assert scale.positions(hertz)[:2].tolist() == [-1.0, 0.0]


def test_a_frequency_of_zero_has_no_place_on_a_logarithmic_axis() -> None:
    """It becomes not a number instead of minus infinity, and raises nothing."""
    assert math.isnan(FrequencyScale(1.0, True).positions(np.array([0.0, 1.0]))[0])


@given(st.floats(1e-12, 1e12), st.floats(1.0, 50.0))
def test_round_step_is_round_and_keeps_the_number_of_parts(span: float, most: float) -> None:
    """A step is 1, 2 or 5 times a power of ten, gives no more parts than asked, and is not wastefully large."""
    step = round_step(span, most)
    digit = step / 10 ** math.floor(math.log10(step) + 1e-9)
    assert min(abs(digit - wanted) for wanted in (1, 2, 5, 10)) < 1e-6
    assert span / step <= most * (1 + 1e-6)
    assert span / step > most / 2.6


def test_linear_ticks_of_a_band() -> None:
    """Eight to twelve with room for five numbers is written in steps of one."""
    ticks = linear_ticks(8.0, 12.0, 5)
    assert ticks.major == (8.0, 9.0, 10.0, 11.0, 12.0)
    assert ticks.texts == ("8", "9", "10", "11", "12")


def test_logarithmic_ticks_are_plain_numbers() -> None:
    """Decades read 0.1, 1, 10, 100; between them are unlabelled ticks."""
    ticks = logarithmic_ticks(-1.0, 2.0, 5)
    assert ticks.texts == ("0.1", "1", "10", "100")
    assert math.log10(2) == pytest.approx(min(ticks.minor, key=lambda at: abs(at - 0.30103)))


def test_logarithmic_ticks_within_half_a_decade_are_evenly_spaced_numbers() -> None:
    """From 8 to 12 the numbers are 8, 9, 10, 11, 12 at their logarithmic places."""
    ticks = logarithmic_ticks(math.log10(8), math.log10(12), 5)
    assert ticks.texts == ("8", "9", "10", "11", "12")
    assert ticks.major[2] == pytest.approx(1.0)


@given(st.floats(-12.0, 14.0), st.floats(0.01, 20.0), st.floats(2.0, 14.0))
def test_logarithmic_ticks_are_never_crowded(low: float, span: float, most: float) -> None:
    """No more numbers than about what there is room for, each inside, each with its own text."""
    ticks = logarithmic_ticks(low, low + span, most)
    assert len(ticks.major) <= most + 2
    assert all(low - 1e-6 <= at <= low + span + 1e-6 for at in ticks.major)
    assert len(set(ticks.texts)) == len(ticks.texts)
    assert not any("·" in text or "⁰" in text for text in ticks.texts)


@given(FINITE, st.floats(1e-3, 1e6), st.floats(2.0, 12.0))
def test_tick_texts_say_their_values(low: float, span: float, most: float) -> None:
    """The text of a tick reads back as its position to within a thousandth of the step."""
    ticks = linear_ticks(low, low + span, most)
    step = round_step(span, most)
    for at, text in zip(ticks.major, ticks.texts, strict=True):
        assert float(text.replace("−", "-")) == pytest.approx(at, abs=step * 1e-3)


def test_numbers_of_a_narrow_span_keep_their_digits() -> None:
    """Frequencies a tenth of a kilohertz apart at 10 GHz are told apart."""
    assert number_texts([9.3750001, 9.3750002], 1e-7) == ("9.3750001", "9.3750002")


def test_a_minus_sign_is_a_minus_sign() -> None:
    """Negative numbers carry U+2212, and zero carries none."""
    assert number_texts([-2.0, -0.0, 2.0], 2.0) == ("−2", "0", "2")


@given(FINITE, st.floats(0.0, 1e6))
def test_round_range_holds_the_data(low: float, span: float) -> None:
    """The range is never empty and never cuts the data."""
    below, above = round_range(low, low + span)
    assert below < above
    assert below <= low + 1e-6
    assert above >= low + span - 1e-6


def test_round_range_of_a_fraction_stops_at_its_ends() -> None:
    """A transmittance from 0.31 to 0.999 is drawn a hair above 1, and not to 1.2."""
    low, high = round_range(0.31, 0.999, top=1.0)
    assert low == 0.2
    assert 1.0 < high < 1.02


def test_round_range_does_not_pass_zero_without_need() -> None:
    """A loss from 0.001 to 2.8 begins at about zero; one from −0.5 begins below it."""
    assert -0.05 < round_range(0.001, 2.8)[0] <= 0.0
    assert round_range(-0.5, 2.8)[0] <= -0.5
    assert 0.0 <= round_range(-30.0, -0.2)[1] < 0.5


def test_round_range_of_rounding_errors_is_a_plain_one() -> None:
    """A loss of 1e-15 dB is nothing, and is not enlarged until it looks like something."""
    assert round_range(0.0, 1e-15, grain=1e-9) == (-1.0, 1.0)
    assert round_range(1e-8, 2e-8)[1] < 1e-7


def test_degrees_are_divided_like_a_turn() -> None:
    """Steps of angles from 10 upward quarter a turn; smaller ones are 1, 2 and 5."""
    assert round_step(360.0, 10, degrees=True) == 45.0
    assert round_step(360.0, 3, degrees=True) == 180.0
    assert round_step(20.0, 10, degrees=True) == 2.0
    assert linear_ticks(-180.0, 180.0, 5, degrees=True).texts == ("−180", "−90", "0", "90", "180")


def test_a_wide_axis_writes_numbers_with_their_unit() -> None:
    """Over many decades the caller spells the numbers; they are thinned as usual."""
    ticks = logarithmic_ticks(-6.0, 6.0, 7, spell=lambda value: f"<{value:g}>")
    assert ticks.texts[0] == "<1e-06>"
    assert len(ticks.texts) <= 8


def test_round_range_stays_while_the_data_tremble() -> None:
    """Small changes of the data leave the range as it is, so that the axis rests during a drag."""
    assert round_range(0.312, 0.957) == round_range(0.3125, 0.9573)


def test_frame_places_and_finds_points() -> None:
    """Pixels from positions and back, from the upper left corner."""
    frame = Frame(8.0, 12.0, -30.0, 0.0, 800.0, 300.0)
    assert frame.across(9.0) == 200.0
    assert frame.down(-10.0) == 100.0
    assert frame.position(200.0) == 9.0
    assert frame.value(100.0) == -10.0
    assert frame.holds(200.0, 100.0)
    assert not frame.holds(200.0, 301.0)


def test_frame_keeps_absurd_points_within_reach_of_the_painter() -> None:
    """A value of 1e300 is placed far away, but at a finite pixel."""
    frame = Frame(0.0, 1.0, 0.0, 1.0, 100.0, 100.0)
    assert frame.down(1e300) == -1e6
    assert np.abs(frame.down(np.array([1e300, -1e300]))).max() == 1e6


def test_finite_runs_split_at_gaps() -> None:
    """Stretches between points without a value, single points included."""
    values = np.array([np.nan, 1.0, 2.0, np.nan, 3.0])
    assert finite_runs(values) == ((1, 3), (4, 5))
    assert finite_runs(np.array([np.nan])) == ()
    assert finite_runs(np.array([])) == ()


def test_finite_runs_split_where_a_phase_turns_over() -> None:
    """A jump from 179 to −179 degrees is a turn of the phase and not a line across the plot."""
    assert finite_runs(np.array([170.0, 179.0, -179.0, -170.0]), leap=180.0) == ((0, 2), (2, 4))
