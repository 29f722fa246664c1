"""What can be done with markers."""

import numpy as np
import pytest

from app.document.view import ViewState
from app.series.curves import curves_of
from app.series.markers import (
    add_marker,
    move_marker,
    nearest_frequency,
    remove_marker,
    snap_to_worst,
    step_marker,
)
from tests.app.series.responses import FREQUENCY, slab

TWO = ViewState(markers=(9e9, 10.5e9), active_marker=0)


def test_add() -> None:
    """A new marker comes last and is active, inside the sweep; the same frequency again makes no second one."""
    state = add_marker(TWO, 20e9, FREQUENCY)
    assert (state.markers, state.active_marker) == ((9e9, 10.5e9, 12e9), 2)
    state = add_marker(state, 9e9, FREQUENCY)
    assert (state.markers, state.active_marker) == ((9e9, 10.5e9, 12e9), 0)


def test_move() -> None:
    """A moved marker is active and stays inside; one that does not exist moves nothing."""
    state = move_marker(TWO, 1, 1e9, FREQUENCY)
    assert (state.markers, state.active_marker) == ((9e9, 8e9), 1)
    assert move_marker(TWO, 2, 1e9, FREQUENCY) == TWO
    assert move_marker(TWO, -1, 1e9, FREQUENCY) == TWO


@pytest.mark.parametrize(
    ("index", "steps", "frequency"),
    [
        (0, 1, 10e9),
        (0, -1, 8e9),
        (0, -5, 8e9),
        (0, 9, 12e9),
        (1, 1, 11e9),
        (1, -1, 10e9),
        (1, 2, 12e9),
        (1, 0, 10.5e9),
    ],
)
@pytest.mark.parametrize("sweep", [FREQUENCY, FREQUENCY[::-1], np.concatenate([FREQUENCY, FREQUENCY])])
def test_step(index: int, steps: int, frequency: float, sweep: np.ndarray) -> None:
    """Steps go along the sweep's frequencies in their order, from between two to the next one first."""
    assert step_marker(TWO, index, steps, sweep).markers[index] == frequency


def test_snap() -> None:
    """A marker jumps to the worst point of a curve, also when that is infinitely bad, and else stays."""
    curve = curves_of(slab(), ViewState())[2]
    assert curve.worst is not None
    assert snap_to_worst(TWO, 1, curve).markers == (9e9, curve.worst.x)
    infinite = curves_of(slab(metal_back=True), ViewState(quantity="insertion_loss_dB"))[0]
    assert snap_to_worst(TWO, 1, infinite).markers == (9e9, 8e9)
    phase = curves_of(slab(), ViewState(quantity="reflection_phase_deg"))[0]
    assert snap_to_worst(TWO, 1, phase) == TWO


@pytest.mark.parametrize(
    ("active", "removed", "left"), [(0, 0, 0), (1, 0, 0), (2, 0, 1), (1, 1, 1), (2, 2, 1), (0, 2, 0), (1, 7, 1)]
)
def test_remove(active: int, removed: int, left: int) -> None:
    """The active marker stays the same one, or becomes the next, or the last."""
    state = ViewState(markers=(1e9, 2e9, 3e9), active_marker=active)
    after = remove_marker(state, removed)
    assert after.active_marker == left
    assert after.markers == tuple(marker for index, marker in enumerate(state.markers) if index != removed)


def test_nearest() -> None:
    """The nearest frequency of the sweep is found."""
    assert nearest_frequency(9.6e9, FREQUENCY) == 10e9
