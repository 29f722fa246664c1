"""Group delay and phase against differences, and the turns of the insertion phase delay."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore import ConductorMedium, ConstantMedium, Layer, SeriesSheet, SheetPlacement, Stack, solve
from stackcore.constants import SPEED_OF_LIGHT

STACKS = {
    "slab": Stack((Layer(ConstantMedium(9.0 - 0.2j), 3e-3),)),
    "magnetic": Stack((Layer(ConstantMedium(4.0 - 0.1j, 3.0 - 0.5j), 2e-3),)),
    "sheets": Stack(
        (
            SheetPlacement(SeriesSheet(50.0, 1e-9, 1e-13)),
            Layer(ConstantMedium(2.5 + 0j), 5e-3),
            SheetPlacement(SeriesSheet(0.0, 2e-9)),
        )
    ),
    "film on glass": Stack(
        (Layer(ConductorMedium(1e5), 2e-6), Layer(ConstantMedium(6.3 - 0.1j), 4e-3)), back=ConstantMedium(2.0)
    ),
    "metal": Stack((Layer(ConductorMedium(5.8e7), 5e-6),), back=ConductorMedium(1e3)),
    "evanescent": Stack(
        (Layer(ConstantMedium(1.0 + 0j), 2e-3),), front=ConstantMedium(4.0), back=ConstantMedium(4.0)
    ),
}


@pytest.mark.parametrize("name", STACKS)
def test_group_delay_is_the_slope_of_the_phase(name: str) -> None:
    """−d(arg t)/dω equals a central difference of arg t, for every kind of element and half-space."""
    frequency, angle = np.array([1e9, 7.7e9, 30e9]), np.radians([0.0, 30.0, 70.0])
    step = 1e-6 * frequency
    above, below = (solve(STACKS[name], frequency + sign * step, angle) for sign in (1, -1))
    turned = np.angle(np.exp(1j * (above.log_transmission - below.log_transmission).imag))
    difference = -turned / (2 * np.pi * 2 * step[:, np.newaxis, np.newaxis])

    delay = solve(STACKS[name], frequency, angle).group_delay_s

    assert delay == pytest.approx(difference, rel=2e-6, abs=1e-17)


@given(st.floats(1e-4, 0.3), st.floats(1.05, 12.0), st.floats(0.0, 1.4))
def test_matched_wall_has_the_delay_of_its_path(thickness: float, index: float, angle: float) -> None:
    """In a front and back of its own medium a layer only delays: k n D cos θ, with every turn counted."""
    medium = ConstantMedium(index**2 + 0j)
    response = solve(Stack((Layer(medium, thickness),), medium, medium), 10e9, angle)
    k = 2 * np.pi * 10e9 / SPEED_OF_LIGHT

    expected = np.degrees(k * thickness * np.cos(angle) * (index - 1))

    assert response.insertion_phase_delay_deg == pytest.approx(np.full((1, 1, 2), expected), rel=1e-9, abs=1e-9)


def test_turns_are_continuous_in_thickness() -> None:
    """The insertion phase delay of a growing wall never jumps, through ten turns and every resonance."""
    thickness = np.linspace(0, 60e-3, 4001)
    delay = np.array(
        [
            solve(Stack((Layer(ConstantMedium(9.0 - 0.05j), d),)), 10e9, np.radians(40.0)).insertion_phase_delay_deg
            for d in thickness
        ]
    )[:, 0, 0]

    assert np.abs(np.diff(delay, axis=0)).max() < 10
    assert delay[-1].min() > 1500
