"""Mouse and keys in the plot: markers, ranges, choosing, pointing, copying."""

import math

import numpy as np
import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QContextMenuEvent, QGuiApplication, QKeySequence, QShortcut
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QToolTip

from app.document import edits
from app.look.theme import DARK, LIGHT
from tests.app.panels.curves.conftest import CTRL, SHIFT, Bench

GHZ = 1e9

offscreen_says = pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
"""Windows of their own (menus, tooltips) make the offscreen platform say what it cannot do."""


def test_ctrl_and_click_sets_a_marker_on_the_sweep(bench: Bench) -> None:
    """The marker stands at the frequency of the sweep nearest to the mouse and reads the curves there."""
    bench.click(bench.pixel(9.43 * GHZ, 0.8), CTRL)
    assert bench.view.state.markers == pytest.approx((9.4 * GHZ,))
    marker = bench.plot.marker_layer.markers[0]
    assert marker.position == pytest.approx(9.4)
    assert marker.text == "1   9.4 GHz"
    curves = bench.plot.curve_layer.curves
    assert [spot.value for spot in marker.spots] == pytest.approx([curve.values[14] for curve in curves])


def test_a_plain_click_in_an_empty_place_sets_nothing(bench: Bench) -> None:
    """Markers are not strewn by accident."""
    bench.click(bench.pixel(9.4 * GHZ, 0.65))
    assert bench.view.state.markers == ()


def test_a_marker_is_dragged(bench: Bench) -> None:
    """Taken at its line it follows the mouse along the sweep, and the ranges stay."""
    bench.view.set(markers=(9 * GHZ, 11 * GHZ), active_marker=1)
    frame = bench.plot.frame()
    bench.drag(bench.pixel(9 * GHZ, 0.8), bench.pixel(10.02 * GHZ, 0.7))
    assert bench.view.state.markers == pytest.approx((10 * GHZ, 11 * GHZ))
    assert bench.view.state.active_marker == 0
    assert bench.plot.frame() == frame


def test_a_marker_stays_inside_the_sweep(bench: Bench) -> None:
    """Dragged beyond the end it stops there."""
    bench.view.set(markers=(9 * GHZ,))
    bench.drag(bench.pixel(9 * GHZ, 0.8), bench.pixel(9 * GHZ, 0.8) + QPoint(3000, 0))
    assert bench.view.state.markers == pytest.approx((12 * GHZ,))


def test_keys_make_step_choose_and_remove_markers(bench: Bench) -> None:
    """Everything a mouse does with markers, keys do."""
    bench.press(Qt.Key.Key_M)
    assert bench.view.state.markers == pytest.approx((10 * GHZ,))
    bench.press(Qt.Key.Key_Right)
    assert bench.view.state.markers == pytest.approx((10.1 * GHZ,))
    bench.press(Qt.Key.Key_Left, CTRL)
    assert bench.view.state.markers == pytest.approx((9.1 * GHZ,))
    assert bench.pointed[-1].startswith("Marker 1: 9.1 GHz   TE 0°   Transmittance 0.")
    bench.press(Qt.Key.Key_M)
    bench.press(Qt.Key.Key_End)
    assert bench.view.state.markers == pytest.approx((9.1 * GHZ, 12 * GHZ))
    bench.press(Qt.Key.Key_N)
    assert bench.view.state.active_marker == 0
    bench.press(Qt.Key.Key_Delete)
    assert bench.view.state.markers == pytest.approx((12 * GHZ,))
    bench.press(Qt.Key.Key_Delete)
    bench.press(Qt.Key.Key_Delete)
    assert bench.view.state.markers == ()


def test_a_step_without_a_marker_says_how_to_make_one(bench: Bench) -> None:
    """The arrow key does nothing silently."""
    bench.press(Qt.Key.Key_Right)
    assert bench.view.state.markers == ()
    assert bench.pointed[-1].startswith("No marker yet")


def test_a_key_brings_the_marker_to_the_worst_value(bench: Bench) -> None:
    """W makes a marker if there is none, and the wall drawing shows the worst angle and polarization."""
    bench.press(Qt.Key.Key_W)
    curve = bench.panel.curves[4]
    assert curve.worst is not None
    assert bench.view.state.markers == (curve.worst.x,)
    assert (bench.view.state.active_angle, bench.view.state.active_polarization) == (2, "TE")


def test_the_button_above_the_plot_sets_a_marker(bench: Bench) -> None:
    """Without knowing a key a marker can be had."""
    bench.panel.header.add.click()
    assert len(bench.view.state.markers) == 1


def test_keys_of_the_plot_are_not_taken_by_the_window(bench: Bench) -> None:
    """A shortcut of the window on Delete stays quiet while the plot has the focus and a marker."""
    fired: list[bool] = []
    shortcut = QShortcut(QKeySequence("Del"), bench.panel)
    shortcut.activated.connect(lambda: fired.append(True))
    bench.view.set(markers=(9 * GHZ,))
    bench.panel.activateWindow()
    bench.plot.setFocus()
    bench.press(Qt.Key.Key_Delete)
    assert not fired
    assert bench.view.state.markers == ()


def test_a_logarithmic_axis_moves_curves_and_marks_alike(bench: Bench) -> None:
    """Curves, markers and worst points all lie at the logarithm, and the numbers stay plain."""
    bench.view.set(markers=(10 * GHZ,))
    bench.press(Qt.Key.Key_L)
    assert bench.view.state.log_frequency
    curve = bench.plot.curve_layer.curves[0]
    assert curve.positions == pytest.approx(np.log10(np.linspace(8, 12, 41)))
    assert bench.plot.marker_layer.markers[0].position == pytest.approx(1.0)
    assert bench.plot.worst_layer.spots[0].position == pytest.approx(curve.positions[int(np.argmin(curve.values))])
    frame = bench.plot.frame()
    assert (frame.left, frame.right) == pytest.approx((math.log10(8), math.log10(12)))
    ticks = bench.plot.bottom_axis.ticks(frame.left, frame.right, frame.width)
    assert {"8", "9", "10", "11", "12"} <= {text.removesuffix(".0") for text in ticks.texts}
    bench.drag(bench.pixel(10 * GHZ, 0.8), bench.pixel(9 * GHZ, 0.8))
    assert bench.view.state.markers == pytest.approx((9 * GHZ,))
    assert not bench.panel.grab().isNull()


def test_a_very_wide_logarithmic_axis_spells_its_units(bench: Bench) -> None:
    """From 1 kHz to 1 THz each number carries its unit and the title does not."""
    assert bench.session.apply(edits.set_frequency_grid("1 kHz", "1 THz", 91, "log")) == ()
    bench.view.set(log_frequency=True)
    bench.answer()
    frame = bench.plot.frame()
    ticks = bench.plot.bottom_axis.ticks(frame.left, frame.right, frame.width)
    assert ticks.texts[0] == "1 kHz"
    assert ticks.texts[-1] == "1 THz"
    assert bench.plot.bottom_axis.labelText == "Frequency"


def test_the_wheel_zooms_at_the_mouse(bench: Bench) -> None:
    """The point under the mouse stays; over an axis only that axis is zoomed."""
    place = bench.pixel(9 * GHZ, 0.8)
    before = bench.plot.frame()
    inside = bench.plot.in_area(QPointF(place))
    held = before.position(inside.x()), before.value(inside.y())
    bench.wheel(place, 2)
    after = bench.plot.frame()
    assert after.right - after.left < (before.right - before.left) * 0.8
    assert (after.position(inside.x()), after.value(inside.y())) == pytest.approx(held)
    below = bench.plot.area_rect()
    bench.wheel(QPoint(int(below.center().x()), int(below.bottom()) + 20), -2)
    last = bench.plot.frame()
    assert (last.bottom, last.top) == (after.bottom, after.top)
    assert last.right - last.left == pytest.approx(before.right - before.left)


def test_ranges_stay_while_values_change(bench: Bench) -> None:
    """After a zoom the ranges are the person's; with A they follow the data again."""
    bench.wheel(bench.pixel(9 * GHZ, 0.8), 3)
    zoomed = bench.plot.frame()
    assert bench.session.apply(edits.set_thickness(0, 0, 0.009)) == ()
    bench.answer()
    assert bench.plot.frame() == zoomed
    bench.press(Qt.Key.Key_A)
    frame = bench.plot.frame()
    assert (frame.left, frame.right) == pytest.approx((8.0, 12.0))
    assert frame.bottom <= min(np.nanmin(curve.values) for curve in bench.plot.curve_layer.curves)
    assert bench.plot.follows == [True, True]


def test_ranges_follow_the_data_until_touched(bench: Bench) -> None:
    """Without a zoom a new band is shown whole at once."""
    assert bench.session.apply(edits.set_frequency_grid("2 GHz", "4 GHz", 41)) == ()
    bench.answer()
    assert (bench.plot.frame().left, bench.plot.frame().right) == pytest.approx((2.0, 4.0))


def test_double_click_shows_all(bench: Bench) -> None:
    """A double click in the plot takes every zoom back."""
    bench.wheel(bench.pixel(9 * GHZ, 0.8), 3)
    QTest.mouseDClick(bench.plot.viewport(), Qt.MouseButton.LeftButton, pos=bench.pixel(9 * GHZ, 0.8))
    assert (bench.plot.frame().left, bench.plot.frame().right) == pytest.approx((8.0, 12.0))


def test_dragging_pans(bench: Bench) -> None:
    """The point taken stays under the mouse; on an axis only that axis moves."""
    before = bench.plot.frame()
    start = bench.pixel(10 * GHZ, 0.65)
    bench.drag(start, start + QPoint(100, 40))
    after = bench.plot.frame()
    step = 100 * (before.right - before.left) / before.width
    assert after.left == pytest.approx(before.left - step)
    assert after.top == pytest.approx(before.top + 40 * (before.top - before.bottom) / before.height)
    area = bench.plot.area_rect()
    axis = QPoint(int(area.left()) - 20, int(area.center().y()))
    bench.drag(axis, axis + QPoint(50, -30))
    assert bench.plot.frame().left == after.left
    assert bench.plot.frame().top < after.top


def test_a_box_drawn_with_shift_is_zoomed_into(bench: Bench) -> None:
    """The corners of the box become the ranges."""
    start, stop = bench.pixel(9 * GHZ, 0.9), bench.pixel(10 * GHZ, 0.7)
    bench.drag(start, stop, SHIFT)
    frame = bench.plot.frame()
    assert (frame.left, frame.right) == pytest.approx((9.0, 10.0), abs=0.01)
    assert (frame.bottom, frame.top) == pytest.approx((0.7, 0.9), abs=0.005)
    assert bench.plot.pointer_layer.box is None


def test_values_are_fitted_to_the_visible_band(bench: Bench) -> None:
    """Y shows the values between the visible frequencies and leaves those alone."""
    bench.plot.set_ranges(positions=(9.0, 10.0))
    bench.press(Qt.Key.Key_Y)
    frame = bench.plot.frame()
    found = [c.values[(c.positions >= 9) & (c.positions <= 10)] for c in bench.plot.curve_layer.curves]
    low, high = min(v.min() for v in found), max(v.max() for v in found)
    assert (frame.left, frame.right) == (9.0, 10.0)
    assert frame.bottom <= low
    assert high <= frame.top
    assert frame.top - frame.bottom < 2 * (high - low)


def test_zoom_ends_before_numbers_run_out(bench: Bench) -> None:
    """A thousand notches in either direction leave a range that can be drawn."""
    place = bench.pixel(9 * GHZ, 0.8)
    for turn in (1, -1):
        for _ in range(1000):
            bench.wheel(place, turn)
        frame = bench.plot.frame()
        assert np.isfinite([frame.left, frame.right, frame.bottom, frame.top]).all()
        assert frame.right > frame.left
        assert not bench.panel.grab().isNull()


def test_ranges_are_typed(bench: Bench) -> None:
    """R opens the line of ranges; texts with units set them, Escape closes and gives the focus back."""
    bench.press(Qt.Key.Key_R)
    strip = bench.panel.strips.ranges
    assert strip.isVisible()
    assert strip.fields[0].text() == "8 GHz"
    for field, text in zip(strip.fields, ("8500 MHz", "11", "0.5", "0.9"), strict=True):
        field.selectAll()
        QTest.keyClicks(field, text)
        QTest.keyClick(field, Qt.Key.Key_Return)
    frame = bench.plot.frame()
    assert (frame.left, frame.right, frame.bottom, frame.top) == pytest.approx((8.5, 11.0, 0.5, 0.9))
    QTest.keyClick(strip.fields[0], Qt.Key.Key_Escape)
    assert not strip.isVisible()


def test_a_range_that_is_none_is_marked_and_kept(bench: Bench) -> None:
    """A lower end above the upper one, or a wrong unit, stays as typed with its fault and changes nothing."""
    bench.press(Qt.Key.Key_R)
    strip, before = bench.panel.strips.ranges, bench.plot.frame()
    field = strip.fields[1]
    for text, words in (("5 GHz", "not above the lower end"), ("9 mm", "length")):
        field.selectAll()
        QTest.keyClicks(field, text)
        QTest.keyClick(field, Qt.Key.Key_Return)
        assert field.text() == text
        assert words in field.toolTip()
        assert field.fault is not None
    assert bench.plot.frame().left == before.left


def test_a_double_click_on_an_axis_opens_its_range(bench: Bench) -> None:
    """The keys go to the field of that axis."""
    area = bench.plot.area_rect()
    at = QPoint(int(area.left()) - 20, int(area.center().y()))
    QTest.mouseDClick(bench.plot.viewport(), Qt.MouseButton.LeftButton, pos=at)
    assert bench.panel.strips.ranges.isVisible()
    assert bench.panel.strips.ranges.fields[2].selectedText() == bench.panel.strips.ranges.fields[2].text()


def test_another_quantity_is_shown_whole(bench: Bench) -> None:
    """A zoom into a transmittance means nothing for a loss in decibels."""
    bench.wheel(bench.pixel(9 * GHZ, 0.8), 3)
    band = (bench.plot.frame().left, bench.plot.frame().right)
    bench.view.set(quantity="insertion_loss_dB")
    frame = bench.plot.frame()
    assert (frame.left, frame.right) == band
    values = np.concatenate([curve.values for curve in bench.plot.curve_layer.curves])
    assert frame.bottom <= values.min()
    assert values.max() <= frame.top


def test_a_click_on_a_curve_chooses_it(bench: Bench) -> None:
    """The wall drawing then shows its angle and polarization, and the curve stands out."""
    curve = bench.plot.curve_layer.curves[5]
    bench.click(bench.pixel(9 * GHZ, float(curve.values[10])))
    assert (bench.view.state.active_angle, bench.view.state.active_polarization) == (2, "TM")
    assert [one.chosen for one in bench.plot.curve_layer.curves] == [False] * 5 + [True]
    bench.press(Qt.Key.Key_Up)
    assert (bench.view.state.active_angle, bench.view.state.active_polarization) == (2, "TE")


def test_pointing_says_the_value_of_the_nearest_curve(bench: Bench) -> None:
    """Frequency, curve and value go to the status line, and a ring marks the point; leaving clears both."""
    curve = bench.panel.curves[4]
    bench.move(bench.pixel(9.51 * GHZ, float(curve.y[15])))
    assert bench.pointed[-1] == f"9.5 GHz   TE 60°   Transmittance {curve.y[15]:.4f}"
    spot = bench.plot.pointer_layer.spot
    assert spot is not None
    assert spot.position == pytest.approx(9.5)
    assert spot.value == curve.y[15]
    bench.plot.hand.leave()
    assert bench.pointed[-1] == ""
    assert bench.plot.pointer_layer.spot is None


@offscreen_says
def test_the_worst_point_says_itself_under_the_mouse(bench: Bench) -> None:
    """A tooltip names the value of the mark."""
    worst = bench.panel.curves[4].worst
    assert worst is not None
    bench.move(bench.pixel(worst.x, worst.y))
    assert QToolTip.text() == f"Worst of TE 60°: {worst.y:.4f} at {worst.x / GHZ:g} GHz"
    QToolTip.hideText()


@offscreen_says
def test_the_menu_holds_what_keys_do(bench: Bench) -> None:
    """A right click opens the short menu without waiting; its entries act where it was opened."""
    QTest.mouseClick(bench.plot.viewport(), Qt.MouseButton.RightButton, pos=bench.pixel(11 * GHZ, 0.7))
    menu = bench.panel.menu
    texts = [action.text().split("\t")[0] for action in menu.actions() if action.text()]
    assert texts[:2] == ["Show all", "Fit values to the visible band"]
    assert {"Values follow the curves", "Set ranges…", "Ranges before", "Marker to a level…"} <= set(texts)
    assert {"Add marker", "Remove marker", "Copy picture", "Copy data", "Reset plot"} <= set(texts)
    by_text = {action.text().split("\t")[0]: action for action in menu.actions()}
    assert not by_text["Remove marker"].isEnabled()
    assert by_text["Values follow the curves"].isChecked()
    by_text["Add marker"].trigger()
    assert bench.view.state.markers == pytest.approx((11 * GHZ,))
    menu.close()


@offscreen_says
def test_the_menu_opens_by_the_keyboard(bench: Bench) -> None:
    """The menu key opens it in the middle of the plot."""
    event = QContextMenuEvent(QContextMenuEvent.Reason.Keyboard, QPoint(10, 10), QPoint(10, 10))
    QApplication.sendEvent(bench.plot.viewport(), event)
    assert bench.panel.menu.isVisible()
    bench.panel.menu.close()


def test_reset_takes_markers_and_zoom_away(bench: Bench) -> None:
    """The plot is as in the beginning."""
    bench.view.set(markers=(9 * GHZ,), worst_shown=False)
    bench.wheel(bench.pixel(9 * GHZ, 0.8), 3)
    bench.panel.commands.reset()
    assert bench.view.state.markers == ()
    assert bench.view.state.worst_shown
    assert (bench.plot.frame().left, bench.plot.frame().right) == pytest.approx((8.0, 12.0))


def test_copied_data_are_exact_with_units(bench: Bench) -> None:
    """The table has a header with units and every digit, and reads back as the very numbers."""
    bench.view.set(quantity="insertion_loss_dB", polarizations=("TM",))
    bench.press(Qt.Key.Key_C, CTRL | SHIFT)
    lines = QGuiApplication.clipboard().text().splitlines()
    assert lines[0].split("\t") == [
        "Frequency, Hz",
        "Insertion loss TM 0°, dB",
        "Insertion loss TM 30°, dB",
        "Insertion loss TM 60°, dB",
    ]
    table = np.array([[float(cell) for cell in line.split("\t")] for line in lines[1:]])
    assert table.shape == (41, 4)
    assert table[:, 0].tolist() == np.linspace(8e9, 12e9, 41).tolist()
    assert table[:, 3].tolist() == bench.panel.curves[2].y.tolist()


def test_copied_data_hold_what_is_not_drawn(bench: Bench) -> None:
    """Infinite values are copied as inf."""
    bench.view.set(quantity="shielding_effectiveness_dB")
    bench.answer(stack=1)
    bench.panel.copy_data()
    second = QGuiApplication.clipboard().text().splitlines()[1].split("\t")
    assert second == ["8000000000.0"] + ["inf"] * 6


def test_the_copied_picture_is_light_sharp_and_a_drawing(bench: Bench) -> None:
    """Pixels twice as fine as the screen in the light look, and an SVG with lines and readable texts."""
    bench.panel.set_theme(DARK)
    bench.press(Qt.Key.Key_C, CTRL)
    data = QGuiApplication.clipboard().mimeData()
    image = data.imageData()
    assert image.width() == bench.plot.width() * 2
    assert image.pixelColor(3, 3).name() == LIGHT.base
    assert bytes(data.data("image/png").data()).startswith(b"\x89PNG")
    drawing = bytes(data.data("image/svg+xml").data()).decode()
    assert "<image" not in drawing
    assert "Transmittance" in drawing
    assert "TE 60°" in drawing
    assert bench.plot.backgroundBrush().color().name() == DARK.base
    assert bench.panel.header.add.isVisible()


def test_a_marker_is_taken_by_its_flag(bench: Bench) -> None:
    """The flag stands above the curves, hides none, and can be dragged."""
    bench.view.set(markers=(9 * GHZ,))
    frame = bench.plot.frame()
    flag = bench.plot.marker_layer.flag(bench.plot.marker_layer.markers[0], frame)
    assert flag.bottom() < 0
    start = (flag.center() + QPointF(12, 0) + bench.plot.area_rect().topLeft()).toPoint()
    assert start.y() > 0
    bench.drag(start, bench.pixel(11 * GHZ, 0.8))
    assert bench.view.state.markers == pytest.approx((11 * GHZ,))
    assert bench.plot.frame() == frame
