"""What can be done with markers: each function takes a view state and returns the next one.

A marker is a frequency. `View.replace` takes what comes out.
"""

from dataclasses import replace

import numpy as np

from app.document.view import ViewState
from app.series.curves import Curve
from stackcore.media.base import FloatArray


def add_marker(view_state: ViewState, frequency: float, sweep: FloatArray) -> ViewState:
    """Return the view with a new active marker at `frequency`, brought inside `sweep` (Hz).

    Where there is a marker already, that one becomes active.
    """
    frequency = _inside(frequency, sweep)
    if frequency in view_state.markers:
        return replace(view_state, active_marker=view_state.markers.index(frequency))
    markers = (*view_state.markers, frequency)
    return replace(view_state, markers=markers, active_marker=len(markers) - 1)


def move_marker(view_state: ViewState, index: int, frequency: float, sweep: FloatArray) -> ViewState:
    """Return the view with one marker moved to `frequency`, brought inside `sweep`, and made active.

    Markers may pass over each other; an index without a marker changes nothing.
    """
    if not 0 <= index < len(view_state.markers):
        return view_state
    markers = list(view_state.markers)
    markers[index] = _inside(frequency, sweep)
    return replace(view_state, markers=tuple(markers), active_marker=index)


def step_marker(view_state: ViewState, index: int, steps: int, sweep: FloatArray) -> ViewState:
    """Return the view with one marker moved by `steps` frequencies of the sweep, upward when positive.

    A marker between two frequencies goes to the next one in that direction first.
    """
    if not 0 <= index < len(view_state.markers) or steps == 0:
        return view_state
    grid = np.unique(sweep)
    frequency = view_state.markers[index]
    if steps > 0:
        place = int(np.searchsorted(grid, frequency, side="right")) - 1 + steps
    else:
        place = int(np.searchsorted(grid, frequency, side="left")) + steps
    place = min(max(place, 0), len(grid) - 1)
    return move_marker(view_state, index, float(grid[place]), sweep)


def snap_to_worst(view_state: ViewState, index: int, curve: Curve) -> ViewState:
    """Return the view with one marker at the worst point of `curve`; without one nothing changes."""
    frequency = curve.worst.x if curve.worst is not None else curve.worst_infinite
    if frequency is None:
        return view_state
    return move_marker(view_state, index, frequency, curve.x)


def remove_marker(view_state: ViewState, index: int) -> ViewState:
    """Return the view without one marker; the marker after it, or else the one before, becomes active if it was."""
    if not 0 <= index < len(view_state.markers):
        return view_state
    markers = (*view_state.markers[:index], *view_state.markers[index + 1 :])
    active = view_state.active_marker - (view_state.active_marker > index)
    return replace(view_state, markers=markers, active_marker=active)


def nearest_frequency(frequency: float, sweep: FloatArray) -> float:
    """Return the frequency of `sweep` nearest to `frequency`, both in Hz."""
    return float(sweep[int(np.argmin(np.abs(sweep - frequency)))])


def _inside(frequency: float, sweep: FloatArray) -> float:
    return float(min(max(frequency, float(np.min(sweep))), float(np.max(sweep))))
