"""The view: what is looked at."""

from collections.abc import Callable
from dataclasses import replace
from typing import cast

import numpy as np
import pytest

from app.document import edits
from app.document.view import Power, View, ViewChange, ViewState
from tests.app.document.jobs import harbour


def test_a_view_tells_each_change_once() -> None:
    """Listeners hear the state before and after and who changed it; what changes nothing is not told."""
    view = View()
    changes: list[ViewChange] = []
    leave = view.subscribe(changes.append)
    me = object()
    view.set(me, quantity="return_loss_dB", power="decibels")
    view.set(quantity="return_loss_dB")
    leave()
    view.set(log_frequency=True)
    assert changes == [ViewChange(ViewState(), ViewState(quantity="return_loss_dB", power="decibels"), me)]
    assert view.state.log_frequency


@pytest.mark.parametrize(
    ("make", "field"),
    [
        (lambda: ViewState(quantity="transmission"), "quantity"),
        (lambda: ViewState(power=cast(Power, "bel")), "power"),
        (lambda: ViewState(polarizations=()), "polarizations"),
        (lambda: ViewState(polarizations=("TE", "TEM")), "'TEM' is no polarization"),
        (lambda: ViewState(active_polarization="H"), "'H' is no polarization"),
        (lambda: ViewState(polarizations=("tilt 100 deg",)), "out of range"),
        (lambda: ViewState(markers=(1e9, 0.0)), "markers"),
        (lambda: ViewState(markers=(float("nan"),)), "markers"),
        (lambda: ViewState(markers=(float("inf"),)), "markers"),
    ],
)
def test_what_no_view_can_be(make: Callable[[], ViewState], field: str) -> None:
    """A quantity, a way to show power or a polarization there is not, and a marker of no frequency, are refused."""
    with pytest.raises(ValueError, match=field):
        make()


def test_indices_stay_inside() -> None:
    """The active marker is one there is, or 0; the active angle is not negative."""
    state = ViewState(markers=(1e9, 2e9), active_marker=7, active_angle=-3)
    assert (state.active_marker, state.active_angle) == (1, 0)
    assert replace(state, markers=()).active_marker == 0


def test_where_the_wall_drawing_looks() -> None:
    """The middle of the sweep without a marker, else the active marker; the active angle or the last."""
    sweep = harbour().record.sweep
    assert ViewState().marker_frequency(sweep) == pytest.approx(10e9)
    assert ViewState(markers=(9e9, 11e9), active_marker=1).marker_frequency(sweep) == 11e9
    assert ViewState(active_angle=1).marker_angle(sweep) == np.radians(30)
    assert ViewState(active_angle=9).marker_angle(sweep) == np.radians(45)


def test_a_new_sweep_takes_the_markers_along() -> None:
    """Markers outside go to the nearer end, those that meet become one, and the active one stays active."""
    session = harbour()
    session.apply(edits.set_frequency_grid("9 GHz", "10 GHz", 11))
    session.apply(edits.set_angles(["0"]))
    state = ViewState(markers=(8e9, 9.5e9, 12e9, 11e9), active_marker=3, active_angle=2)
    inside = state.within(session.record.sweep)
    assert (inside.markers, inside.active_marker, inside.active_angle) == ((9e9, 9.5e9, 10e9), 2, 0)
    assert inside.within(session.record.sweep) == inside
    assert ViewState().within(session.record.sweep) == ViewState()
