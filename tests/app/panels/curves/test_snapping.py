"""Markers that snap, the level that is typed, and steps back in what the axes showed."""

import math

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest

from app.panels.curves.range_history import GESTURE, RangeHistory, Shown
from stackcore.constants import SPEED_OF_LIGHT
from tests.app.panels.curves.conftest import SHIFT, Bench

GHZ = 1e9


def only_normal(bench: Bench) -> None:
    """Choose the curve of TE at normal incidence."""
    bench.view.set(polarizations=("TE",), active_angle=0, active_polarization="TE")
    bench.answer()


def type_level(bench: Bench, text: str) -> None:
    """Type a level and press Enter."""
    field = bench.panel.strips.level.field
    field.selectAll()
    QTest.keyClicks(field, text)
    QTest.keyClick(field, Qt.Key.Key_Return)


def test_a_key_takes_the_marker_to_the_next_extremum(bench: Bench) -> None:
    """At 60° TE the 5 mm slab of permittivity 4 lets least through where c/f = 4 d √(ε − sin²θ).

    Source: the quarter-wave condition, any textbook of optics; recalled.
    """
    bench.view.set(polarizations=("TE",), active_angle=2, active_polarization="TE")
    bench.answer()
    wanted = SPEED_OF_LIGHT / (4 * 5e-3 * math.sqrt(4 - 0.75))
    for modifier in (Qt.KeyboardModifier.NoModifier, SHIFT):
        bench.press(Qt.Key.Key_E, modifier)
        assert bench.view.state.markers[0] == pytest.approx(wanted, rel=1e-6)


def test_a_curve_without_an_extremum_says_so(bench: Bench) -> None:
    """At normal incidence the slab only passes more and more: the marker stays at the end of the sweep."""
    only_normal(bench)
    bench.press(Qt.Key.Key_E)
    assert bench.pointed[-1] == "TE 0° has no extremum between its ends."
    assert bench.view.state.markers == (8 * GHZ,)


def test_a_level_is_typed_and_the_marker_goes_from_crossing_to_crossing(bench: Bench) -> None:
    """The line is drawn while the strip is open; the reading at the marker is the level."""
    only_normal(bench)
    bench.press(Qt.Key.Key_V)
    strip = bench.panel.strips.level
    assert strip.isVisible()
    type_level(bench, "0.7")
    assert bench.plot.level_layer.level == 0.7
    first = bench.view.state.markers[0]
    bench.answer()
    (spot, *_) = bench.plot.marker_layer.markers[0].spots
    assert spot.value == pytest.approx(0.7, abs=2e-3)
    bench.view.set(active_angle=1)
    strip.after.click()
    assert bench.view.state.markers[0] != pytest.approx(first, rel=1e-4)
    bench.view.set(active_angle=0)
    strip.before.click()
    assert bench.view.state.markers[0] == pytest.approx(first, rel=1e-9)
    QTest.keyClick(strip.field, Qt.Key.Key_Escape)
    assert not strip.isVisible()
    assert bench.plot.level_layer.level is None


def test_a_level_that_is_none_stays_with_its_reason(bench: Bench) -> None:
    """What was typed is kept; a level beyond the curves is said, and the marker stays."""
    only_normal(bench)
    bench.press(Qt.Key.Key_V)
    type_level(bench, "high")
    fault = bench.panel.strips.level.field.fault
    assert fault is not None
    assert bench.panel.strips.level.field.text() == "high"
    type_level(bench, "1.5")
    assert bench.pointed[-1] == "TE 0° does not cross 1.500."


def test_a_level_has_the_unit_of_the_curves(bench: Bench) -> None:
    """Its own unit may be typed with it; another quantity begins with an empty one."""
    only_normal(bench)
    bench.view.set(quantity="insertion_loss_dB")
    bench.answer()
    bench.press(Qt.Key.Key_V)
    type_level(bench, "1 dB")
    assert bench.plot.level_layer.level == 1.0
    bench.view.set(quantity="transmittance")
    bench.answer()
    assert bench.panel.strips.level.field.text() == ""


def test_ranges_go_back_and_forward(bench: Bench) -> None:
    """Each zoom is a step; after a new one there is no way forward."""
    plot, frames = bench.plot, [bench.plot.frame()]
    clock = [0.0]
    plot.history = RangeHistory(lambda: clock[0])
    for low in (8.5, 9.0):
        clock[0] += 2 * GESTURE
        plot.set_ranges((low, 11.0), (0.2, 0.9))
        frames.append(plot.frame())
    bench.press(Qt.Key.Key_Z)
    assert plot.frame() == frames[1]
    bench.press(Qt.Key.Key_Z)
    assert plot.frame() == frames[0]
    assert plot.follows == [True, True]
    bench.press(Qt.Key.Key_Z)
    assert plot.frame() == frames[0]
    bench.press(Qt.Key.Key_Z, SHIFT)
    bench.press(Qt.Key.Key_Z, SHIFT)
    assert plot.frame() == frames[2]
    bench.press(Qt.Key.Key_Z)
    clock[0] += 2 * GESTURE
    plot.set_ranges((10.0, 11.0))
    assert plot.history.can_go == (True, False)


def test_one_axis_is_shown_whole_and_the_other_stays(bench: Bench) -> None:
    """X shows the whole band again; the values are as they were."""
    before = bench.plot.frame()
    bench.plot.set_ranges((9.0, 9.5), (0.6, 0.9))
    bench.press(Qt.Key.Key_X)
    frame = bench.plot.frame()
    assert (frame.left, frame.right) == (before.left, before.right)
    assert (frame.bottom, frame.top) == (0.6, 0.9)


def test_a_gesture_is_one_step() -> None:
    """Changes in quick succession are undone together; a pause begins another."""
    clock = [0.0]
    history = RangeHistory(lambda: clock[0])
    shown = [Shown((float(at), 10.0), (0.0, 1.0), (False, False)) for at in range(5)]
    for at in range(3):
        history.note(shown[at])
        clock[0] += GESTURE / 3
    clock[0] += 2 * GESTURE
    history.note(shown[3])
    assert history.back(shown[4]) == shown[3]
    assert history.back(shown[3]) == shown[0]
    assert history.back(shown[0]) is None
    assert history.forward(shown[0]) == shown[3]
