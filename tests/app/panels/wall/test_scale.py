"""The thickness scale: in order, invertible, readable."""

import math

import pytest
from hypothesis import assume, given
from hypothesis import strategies as st

from app.panels.wall.scale import (
    SMALLEST_WIDTH,
    SPREAD,
    ThicknessScale,
    fit_scale,
    nudge,
    readable_step,
    snapped,
    still_fits,
)
from tests.app.panels.wall.walls import thicknesses

present = st.floats(1e-9, 0.5)
stacks = st.lists(thicknesses, min_size=1, max_size=70)


@given(stacks, present, present)
def test_a_thicker_layer_is_drawn_wider(stack: list[float], one: float, other: float) -> None:
    """The scale keeps the order of thicknesses, whatever it was fitted to."""
    scale = fit_scale(stack, 800.0, 300.0)
    thin, thick = sorted((one, other))
    assume(thick > thin * (1 + 1e-9))
    assert scale.width(thick) > scale.width(thin) >= scale.minimum


@given(stacks)
def test_width_to_thickness_undoes_thickness_to_width(stack: list[float]) -> None:
    """Every layer's thickness is found again from its width, to rounding; the exponent scales rounding errors."""
    scale = fit_scale(stack, 800.0, 300.0)
    for thickness in stack:
        back = scale.thickness(scale.width(thickness))
        # A thin layer's share of the width is at least 1/SPREAD of the gain: no digits cancel.
        assert back == pytest.approx(thickness, rel=1e-10, abs=0)


@given(stacks, st.floats(100, 2000), st.floats(60, 600))
def test_all_layers_fit_and_can_be_caught(stack: list[float], room: float, widest: float) -> None:
    """The layers share the room, none wider than allowed and none too narrow to be seen."""
    scale = fit_scale(stack, room, widest)
    widths = [scale.width(thickness) for thickness in stack]
    assert sum(widths) <= room * (1 + 1e-9) or max(widths) <= 2 * scale.minimum + 1e-9
    assert max(widths) <= max(widest, 2 * scale.minimum)
    assert min(widths) >= min(SMALLEST_WIDTH, room / (3 * len(stack)))


def test_thicknesses_alike_are_drawn_true_to_scale() -> None:
    """Up to a ratio of SPREAD the widths beyond the minimum are in the ratio of the thicknesses."""
    scale = fit_scale([1e-3, 2e-3, 5e-3], 800.0, 300.0)
    first, second, third = (scale.width(thickness) - scale.minimum for thickness in (1e-3, 2e-3, 5e-3))
    assert (second / first, third / first) == pytest.approx((2.0, 5.0))


@pytest.mark.parametrize("thin", [1e-7, 3.5e-5, 1e-4])
def test_a_film_beside_concrete_is_drawn_a_spread_apart(thin: float) -> None:
    """Any larger ratio is drawn as SPREAD, so that nanometres show beside a hand's breadth."""
    scale = fit_scale([thin, 0.2], 800.0, 300.0)
    ratio = (scale.width(0.2) - scale.minimum) / (scale.width(thin) - scale.minimum)
    assert ratio == pytest.approx(SPREAD)


def test_a_layer_of_no_thickness_can_be_pulled_open() -> None:
    """Thickness 0 has a width, and a wider one gives a thickness, also where there is nothing to compare with."""
    scale = fit_scale([0.0], 800.0, 300.0)
    assert scale.width(0.0) == scale.minimum > 0
    assert scale.thickness(scale.minimum + 40) == pytest.approx(1e-3)
    assert scale.thickness(scale.minimum - 5) == 0


@given(st.floats(-50, 900), stacks)
def test_a_dragged_width_gives_a_readable_thickness_within_a_pixel(width: float, stack: list[float]) -> None:
    """The rounded thickness is drawn within one px of the hand and has few digits."""
    scale = fit_scale(stack, 800.0, 300.0)
    thickness = scale.rounded(width)
    assert thickness >= 0
    if width > scale.minimum + 1 and thickness > 1e-11:
        assert scale.width(thickness) == pytest.approx(width, abs=1.0)
        digits = f"{thickness:.17g}".replace(".", "").lstrip("0").split("e")[0]
        assert float(f"{thickness:.5g}") == pytest.approx(thickness, rel=1e-12), digits


def test_a_scale_is_kept_while_it_serves() -> None:
    """A change of thickness shows as a change of width, until there is no room or far too much."""
    scale = fit_scale([2e-3], 800.0, 300.0)
    assert still_fits(scale, [2.1e-3], 800.0, 300.0)
    assert still_fits(scale, [1.2e-3], 800.0, 300.0)
    assert not still_fits(scale, [4e-3], 800.0, 300.0)
    assert not still_fits(scale, [0.5e-3], 800.0, 300.0)
    assert not still_fits(scale, [1e-3] * 60, 800.0, 300.0)
    assert not still_fits(scale, [], 800.0, 300.0)


@pytest.mark.parametrize(
    ("size", "step"), [(0.034e-3, 2e-5), (0.0046, 2e-3), (1e-9, 1e-9), (0.99, 0.5), (5.0, 5.0), (1e-6, 1e-6)]
)
def test_readable_steps(size: float, step: float) -> None:
    """Steps are 1, 2 or 5 of a decade and never larger than asked for."""
    assert readable_step(size) == step


@given(st.floats(1e-12, 1e3))
def test_a_readable_step_is_the_largest_that_fits(size: float) -> None:
    """No other 1, 2 or 5 of a decade lies between the step and the size."""
    step = readable_step(size)
    assert step <= size < 2.5 * step * (1 + 1e-12)


def test_snapping_gives_the_decimal_that_is_read() -> None:
    """A snapped thickness is the double nearest to a short decimal, not a multiple with rounding dust."""
    assert snapped(0.0098617, 2e-5) == 0.00986
    assert snapped(3.2e-7, 1e-9) == 3.2e-07


@pytest.mark.parametrize(
    ("thickness", "steps", "expected"),
    [
        (9.86e-3, 1, 9.96e-3),
        (9.86e-3, -1, 9.76e-3),
        (9.86e-3, 0.1, 9.87e-3),
        (200e-3, 1, 210e-3),
        (1e-3, -1, 0.99e-3),
        (0.99e-3, 1, 1e-3),
        (1e-3, 1, 1.1e-3),
        (35e-6, 0.1, 35.1e-6),
        (100e-9, 1, 110e-9),
        (0.0, 1, 1e-4),
        (0.0, -1, 0.0),
    ],
)
def test_nudges_are_steps_of_the_second_digit(thickness: float, steps: float, expected: float) -> None:
    """A step is a unit of the second digit, a fine one a tenth of it, and nothing goes below 0."""
    assert nudge(thickness, steps) == expected


@given(st.floats(1e-9, 1.0))
def test_nudging_down_and_up_comes_back_near(thickness: float) -> None:
    """Down and up again differs by no more than the difference of the two steps at a decade's border."""
    down = nudge(thickness, -1)
    assert 0 < down < thickness
    assert math.isclose(nudge(down, 1), thickness, rel_tol=0.1)


def test_scale_of_the_example() -> None:
    """A power scale is what its definition says, both ways."""
    scale = ThicknessScale(reference=4e-3, minimum=10.0, gain=100.0, exponent=0.5)
    assert scale.width(1e-3) == pytest.approx(60.0)
    assert scale.thickness(60.0) == pytest.approx(1e-3)
