"""Group delay against the exact one, and answers that do not depend on the grid they are asked on."""

import numpy as np
import pytest
from hypothesis import given, settings

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.propagation import solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Layer, SheetPlacement, Stack
from tests.exact import exact_group_delay
from tests.properties.batch import random_case
from tests.strategies import Case, cases, dense_fronts, lossless_media, lossy_media

NAMES = (
    "reflectance",
    "transmittance",
    "absorptance",
    "return_loss_dB",
    "insertion_loss_dB",
    "shielding_effectiveness_dB",
    "reflection_phase_deg",
    "transmission_phase_deg",
    "insertion_phase_delay_deg",
    "group_delay_s",
)
WALL = Stack(
    (
        Layer(ConstantMedium(4.2 * (1 - 0.015j)), 1e-3),
        SheetPlacement(SeriesSheet(300.0, 2e-9, 0.3e-12)),
        Layer(ConstantMedium(1.05), 8e-3),
        Layer(ConductorMedium(10.0), 1e-4),
    ),
    back=ConstantMedium(2.0),
)


def hold_delay(case: Case) -> None:
    """Assert that the group delay is right to 1e-9 of itself, or 1e-11 of the vacuum delay and period."""
    got = case.solve().group_delay_s[0, 0]
    scale = case.stack.thickness / SPEED_OF_LIGHT + 1e-3 / case.frequency
    for value, right in zip(got, exact_group_delay(case.stack, case.frequency, case.angle), strict=True):
        error = abs(float(value - right))
        assert error <= 1e-9 * abs(float(right)) + 1e-11 * scale, f"{case!r}: got {value!r}, right {float(right)!r}"


@settings(max_examples=60)
@given(cases(fronts=dense_fronts(), backs=lossless_media() | lossy_media(), most=6, highest_deg=89.0))
def test_group_delay_of_drawn_stacks(case: Case) -> None:
    """−d(arg t)/dω agrees with the derivative taken at 100 digits."""
    hold_delay(case)


@pytest.mark.parametrize("seed", range(4))
def test_group_delay_of_random_stacks(seed: int) -> None:
    """The same over the far wider batch of random stacks."""
    rng = np.random.default_rng(7000 + seed)
    done = 0
    while done < 15:
        case = random_case(rng, most=8)
        if case.stack.back is not METAL:
            hold_delay(case)
            done += 1


def test_group_delay_of_vacuum() -> None:
    """A gap of vacuum d thick delays by d cos θ / c."""
    for degrees in (0.0, 30.0, 80.0):
        case = Case(Stack((Layer(VACUUM, 0.3),)), 1e9, float(np.radians(degrees)))
        expected = 0.3 * np.cos(case.angle) / SPEED_OF_LIGHT
        np.testing.assert_allclose(case.solve().group_delay_s, expected, rtol=1e-12)


def test_group_delay_of_a_reactive_sheet() -> None:
    """A capacitance alone delays as t = 1/(1 + Z₀/2Z) tells: here the slope of an arctangent."""
    case = Case(Stack((SheetPlacement(SeriesSheet(0.0, capacitance=1e-12)),)), 3e9, 0.2)
    hold_delay(case)


def test_answers_do_not_depend_on_the_grid() -> None:
    """A point asked alone, in a short list or in a fine grid has the same values, group delay included."""
    fine = np.linspace(8e9, 12e9, 401)
    angles = np.radians([0.0, 20.0, 40.0, 60.0, 85.0])
    whole = solve(WALL, fine, angles)
    coarse = solve(WALL, fine[::80], angles[::2])
    for name in NAMES:
        values = getattr(whole, name)
        assert values.shape == (401, 5, 2)
        np.testing.assert_allclose(getattr(coarse, name), values[::80, ::2], rtol=1e-11, err_msg=name)
        alone = solve(WALL, float(fine[160]), float(angles[3]))
        np.testing.assert_allclose(getattr(alone, name)[0, 0], values[160, 3], rtol=1e-11, err_msg=name)
    np.testing.assert_allclose(coarse.element_absorptance, whole.element_absorptance[::80, ::2], rtol=1e-11)


def test_unordered_and_repeated_points() -> None:
    """Frequencies and angles may come in any order and more than once."""
    frequency = np.array([12e9, 8e9, 12e9, 9e9])
    angle = np.array([0.5, 0.0, 0.5])
    mixed = solve(WALL, frequency, angle)
    np.testing.assert_array_equal(mixed.reflection[0], mixed.reflection[2])
    np.testing.assert_array_equal(mixed.reflection[:, 0], mixed.reflection[:, 2])
    straight = solve(WALL, np.sort(frequency), np.sort(angle))
    np.testing.assert_allclose(mixed.reflection[1, 1], straight.reflection[0, 0], rtol=1e-14)


def test_large_grid_equals_its_points() -> None:
    """Where a large grid is worked through in blocks the seams do not show."""
    frequency = np.geomspace(1e6, 1e12, 20_011)
    whole = solve(WALL, frequency, [0.1, 1.2]).log_transmission
    rng = np.random.default_rng(5)
    picked = np.unique(np.concatenate([rng.integers(0, frequency.size, 100), [0, frequency.size - 1]]))
    some = solve(WALL, frequency[picked], [0.1, 1.2]).log_transmission
    np.testing.assert_allclose(some, whole[picked], rtol=1e-12, atol=1e-12)


def test_phase_is_continuous_in_thickness() -> None:
    """The phase of a growing wall runs on through many turns instead of jumping."""
    phases = np.array(
        [
            float(
                Case(Stack((Layer(ConstantMedium(4.0 - 0.01j), d),)), 10e9, 0.3)
                .solve()
                .insertion_phase_delay_deg[0, 0, 0]
            )
            for d in np.linspace(1e-4, 0.2, 400)
        ]
    )
    assert np.all(np.abs(np.diff(phases)) < 30)
    assert phases[-1] > 2000
