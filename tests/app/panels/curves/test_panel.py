"""The curves on the screen carry the numbers, and everything around them says the same."""

import gc
import time

import numpy as np
import pytest
from PySide6.QtCore import QEvent, Qt
from PySide6.QtGui import QFocusEvent, QFontMetricsF
from pytestqt.qtbot import QtBot

from app.document import edits
from app.look.theme import DARK, LIGHT, curve_colour
from app.panels.curves import words
from app.panels.curves.header import COMPUTING, LAST_GOOD
from app.series.curves import curves_of
from stackcore.arrays import FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.quantities import QUANTITIES
from tests.app.panels.curves.conftest import Bench
from tests.app.panels.results import answer_to


def slab_transmittance(frequency: FloatArray, permittivity: float = 4.0, thickness: float = 5e-3) -> FloatArray:
    """Return the textbook transmittance of a lossless slab at normal incidence."""
    index = np.sqrt(permittivity)
    phase = 2 * np.pi * frequency * index * thickness / SPEED_OF_LIGHT
    transmittance: FloatArray = 1 / (1 + ((index**2 - 1) / (2 * index) * np.sin(phase)) ** 2)
    return transmittance


def test_curves_carry_the_numbers(bench: Bench) -> None:
    """The curve at normal incidence is the textbook's, over frequencies in the unit of the axis."""
    curves = bench.plot.curve_layer.curves
    assert len(curves) == 6
    assert curves[0].positions == pytest.approx(np.linspace(8, 12, 41))
    assert curves[0].values == pytest.approx(slab_transmittance(np.linspace(8e9, 12e9, 41)), rel=1e-12)


def test_axis_titles_are_words_with_unit(bench: Bench) -> None:
    """The axes say what they are, and follow the quantity."""
    assert bench.plot.bottom_axis.labelText == "Frequency, GHz"
    assert bench.plot.left_axis.labelText == "Transmittance"
    bench.view.set(quantity="insertion_loss_dB")
    assert bench.plot.left_axis.labelText == "Insertion loss, dB"
    assert bench.plot.left_axis.label.toPlainText() == "Insertion loss, dB"


@pytest.mark.parametrize("quantity", list(QUANTITIES))
def test_every_quantity_is_drawn(bench: Bench, quantity: str) -> None:
    """Each quantity of the table gives finite curves inside the range shown."""
    both = QUANTITIES[quantity].needs_both
    bench.view.set(quantity=quantity, polarizations=("circular",) if both else ("TE", "TM"))
    frame = bench.plot.frame()
    for curve in bench.plot.curve_layer.curves[1 if both else 0 :]:  # at the normal all stays circular
        known = curve.values[np.isfinite(curve.values)]
        assert len(known) > 0
        assert frame.bottom <= known.min()
        assert known.max() <= frame.top
    assert not bench.panel.grab().isNull()


def test_curves_are_named_at_their_ends_in_their_colours(bench: Bench) -> None:
    """One name a curve, but one for TE and TM together at normal incidence, where they are the same."""
    labels = bench.plot.end_labels
    assert labels.texts == ("TE, TM 0°", "TE 30°", "TM 30°", "TE 60°", "TM 60°")
    assert labels.labels[3].curve.colour == curve_colour(LIGHT, "transmittance", 2, 3)
    assert not bench.panel.header.legend.isVisible()


def test_a_name_at_the_edge_is_drawn_whole(bench: Bench) -> None:
    """A curve that leaves at the top is named there, over the edge of the plot, and the name is not cut."""
    bench.plot.set_ranges(values=(0.0, 0.2))
    labels = bench.plot.end_labels
    assert labels.places is not None
    assert min(labels.places) < QFontMetricsF(bench.plot.font()).height() / 2
    assert labels.boundingRect().top() <= min(labels.places) - QFontMetricsF(bench.plot.font()).height() / 2


def test_te_is_solid_and_tm_dashed(bench: Bench) -> None:
    """The line style tells the polarization."""
    solid, dashed = bench.plot.curve_layer.curves[:2]
    assert solid.dashes == ()
    assert len(dashed.dashes) == 2


def test_many_curves_have_a_legend_instead(bench: Bench) -> None:
    """Without room for names a legend says line styles and the ramp of angles."""
    assert bench.session.apply(edits.set_angle_grid("0 deg", "80 deg", 33)) == ()
    bench.answer()
    assert bench.plot.end_labels.crowded
    legend = bench.panel.header.legend
    assert legend.isVisible()
    assert legend.sentence() == "TE solid, TM dashed; 33 angles from 0° to 80° by lightness"


def test_the_worst_of_all_is_named_above_the_plot(bench: Bench) -> None:
    """The line names value, frequency, angle and polarization of the smallest transmittance."""
    response = answer_to(bench.session, bench.view).response
    place = np.unravel_index(np.argmin(response.transmittance), response.transmittance.shape)
    assert [int(axis) for axis in place[1:]] == [2, 0]
    wanted = f"Worst: {response.transmittance[place]:.4f} at {response.frequency[place[0]] / 1e9:g} GHz, 60°, TE"
    assert bench.panel.header.worst.text() == wanted


def test_worst_points_are_marked_on_their_curves(bench: Bench) -> None:
    """Each curve has its mark where it is smallest; the worst of all is told apart."""
    layer = bench.plot.worst_layer
    for spot, curve in zip(layer.spots, bench.plot.curve_layer.curves, strict=True):
        lowest = int(np.nanargmin(curve.values))
        assert (spot.position, spot.value) == (curve.positions[lowest], curve.values[lowest])
    assert layer.worst == 4
    bench.view.set(worst_shown=False)
    assert layer.spots == ()


def test_a_quantity_without_a_worse_end_names_both(bench: Bench) -> None:
    """Of a phase delay the line names the lowest and the highest value."""
    bench.view.set(quantity="insertion_phase_delay_deg")
    text = bench.panel.header.worst.text()
    assert text.startswith("Lowest ")
    assert "; highest " in text
    assert bench.plot.worst_layer.spots == ()


def test_a_phase_that_turns_over_is_not_joined_across_the_plot(bench: Bench) -> None:
    """Between 180 and −180 degrees the curve has a gap."""
    assert bench.session.apply(edits.set_frequency_grid("1 GHz", "40 GHz", 401)) == ()
    bench.view.set(quantity="transmission_phase_deg")
    bench.answer()
    for curve in bench.plot.curve_layer.curves:
        assert len(curve.runs) > 1
        for first, last in curve.runs:
            assert np.abs(np.diff(curve.values[first:last])).max() < 180


def test_infinite_values_are_counted_and_said(bench: Bench) -> None:
    """Beyond the critical angle nothing passes, which is counted; behind a metal back the plot says it in words."""
    bench.view.set(quantity="transmittance", power="decibels")
    assert bench.session.apply(edits.set_front(0, "resin")) == ()
    assert bench.session.apply(edits.set_angle_grid("0 deg", "60 deg", 2)) == ()
    bench.answer()
    assert bench.panel.header.hidden.text() == "82 points not shown (beyond the scale)"
    assert bench.panel.header.hidden.isVisible()
    bench.view.set(quantity="insertion_loss_dB")
    bench.answer(stack=1)
    assert not bench.panel.header.hidden.isVisible()
    assert bench.plot.note_layer.text == "Insertion loss is infinite at every frequency: nothing passes."
    assert "∞" in bench.panel.header.worst.text()
    assert not bench.panel.grab().isNull()


def test_one_point_not_shown_is_one_point(bench: Bench) -> None:
    """The sentence counts properly, and says nothing when all points are shown."""
    curves = curves_of(answer_to(bench.session, bench.view).response, bench.view.state)
    assert words.hidden_sentence(curves) == ""
    bench.view.set(quantity="return_loss_dB")
    bench.answer(stack=2)
    assert bench.plot.note_layer.text == "Return loss is infinite at every frequency: nothing is reflected."


def test_before_the_first_answer_the_plot_says_what_will_be_there(qtbot: QtBot) -> None:
    """An empty place is explained, also to those who listen."""
    bench = Bench(qtbot)
    assert bench.plot.note_layer.text.startswith("Transmittance over frequency will be drawn here")
    assert bench.plot.note_layer.text in bench.plot.accessibleDescription()
    assert bench.plot.curve_layer.curves == ()
    bench.answer()
    assert bench.plot.note_layer.text == ""
    bench.panel.hide()


def test_stale_curves_are_dimmed_and_said(bench: Bench) -> None:
    """The last good result stays, nearly grey, with words; and comes back in full colour."""
    before = [curve.colour for curve in bench.plot.curve_layer.curves]
    bench.panel.set_stale(True)
    dimmed = [curve.colour for curve in bench.plot.curve_layer.curves]
    assert all(one != other for one, other in zip(before, dimmed, strict=True))
    assert bench.panel.header.state.text() == LAST_GOOD
    assert bench.panel.header.state.isVisible()
    assert bench.plot.accessibleDescription().startswith("Last good result.")
    bench.panel.set_stale(False)
    assert [curve.colour for curve in bench.plot.curve_layer.curves] == before
    assert not bench.panel.header.state.isVisible()


def test_computing_is_said_only_when_it_takes_long(bench: Bench) -> None:
    """A quick calculation leaves no trace; a long one is named and the name goes when it ends."""
    state = bench.panel.header.state
    bench.panel.set_busy(True)
    bench.panel.set_busy(False)
    assert not state.isVisible()
    bench.panel.set_busy(True)
    assert not state.isVisible()
    bench.qtbot.waitUntil(state.isVisible, timeout=2000)
    assert state.text() == COMPUTING
    bench.panel.set_busy(False)
    assert not state.isVisible()


def test_the_theme_reaches_everything(bench: Bench) -> None:
    """Ground, curves, names and numbers change together."""
    bench.panel.set_theme(DARK)
    assert bench.plot.backgroundBrush().color().name() == DARK.base
    assert bench.plot.curve_layer.curves[0].colour == curve_colour(DARK, "transmittance", 0, 3)
    assert bench.plot.end_labels.labels[0].curve.colour == curve_colour(DARK, "transmittance", 0, 3)
    assert bench.plot.left_axis.textPen().color().name() == DARK.muted
    assert bench.plot.left_axis.label.defaultTextColor().name() == DARK.text
    picture = bench.panel.grab().toImage()
    assert picture.pixelColor(3, 3).name() == DARK.base


def test_curves_rest_in_fine_lines_and_move_in_thin_ones(bench: Bench) -> None:
    """A while after the last change lines are drawn at full width; a change makes them thin at once."""
    layer = bench.plot.curve_layer
    assert not layer.fine
    bench.qtbot.waitUntil(lambda: layer.fine, timeout=3000)
    bench.answer()
    assert not layer.fine


def test_fine_lines_have_their_ink(bench: Bench) -> None:
    """The finer drawing shows more of the colour of a curve than the thin one, and in the same places."""
    bench.view.set(polarizations=("TE",))
    colour = bench.plot.curve_layer.curves[2].colour

    def inked() -> int:
        image = bench.plot.grab().toImage()
        wide, high = image.width() - 80, image.height()
        return sum(image.pixelColor(x, y).name() == colour for x in range(80, wide, 3) for y in range(high))

    thin = inked()
    bench.plot.curve_layer.set_fine(True)
    fine = inked()
    assert fine > thin
    assert fine > 80


def test_a_sweep_of_one_frequency_is_drawn_as_points(bench: Bench) -> None:
    """A single frequency has an axis around it and a dot a curve."""
    assert bench.session.apply(edits.set_frequency_grid("10 GHz", "10 GHz", 1)) == ()
    bench.answer()
    frame = bench.plot.frame()
    assert frame.left < 10.0 < frame.right
    colour = bench.plot.curve_layer.curves[4].colour
    bench.view.set(worst_shown=False)
    place = bench.pixel(10e9, float(bench.plot.curve_layer.curves[4].values[0]))
    assert bench.plot.grab().toImage().pixelColor(place).name() == colour


def test_listed_frequencies_in_any_order_are_drawn_in_order(bench: Bench) -> None:
    """A list that jumps back and forth gives curves that rise in frequency."""
    assert bench.session.apply(edits.set_frequency_list(["9 GHz", "8 GHz", "10 GHz"])) == ()
    bench.answer()
    assert bench.plot.curve_layer.curves[0].positions.tolist() == [8.0, 9.0, 10.0]
    expected = slab_transmittance(np.array([8e9, 9e9, 10e9]))
    assert bench.plot.curve_layer.curves[0].values == pytest.approx(expected, rel=1e-12)


def test_the_plot_is_described_for_those_who_listen(bench: Bench) -> None:
    """Name and description hold the quantity, the band, the worst value and that of each curve."""
    assert bench.plot.accessibleName() == "Curves of transmittance"
    said = bench.plot.accessibleDescription()
    assert "Transmittance from 8 GHz to 12 GHz, 6 curves." in said
    assert bench.panel.header.worst.text() in said
    assert "Worst of TM 30°:" in said


def test_the_plot_shows_when_the_keyboard_is_in_it(bench: Bench) -> None:
    """Coming by Tab outlines the plot; coming by mouse does not."""
    tab, mouse = Qt.FocusReason.TabFocusReason, Qt.FocusReason.MouseFocusReason
    corner = bench.plot.area_rect().topLeft().toPoint()
    outlined = []
    for reason in (tab, mouse):
        bench.plot.focusInEvent(QFocusEvent(QEvent.Type.FocusIn, reason))
        outlined.append(bench.plot.grab().toImage().pixelColor(corner).name() == LIGHT.accent)
        bench.plot.focusOutEvent(QFocusEvent(QEvent.Type.FocusOut, reason))
        assert not bench.plot.focus_shown
    assert outlined == [True, False]


def test_twelve_curves_are_painted_within_a_frame(bench: Bench) -> None:
    """From an answer to the painted plot 12 curves of 2001 points take less than 16 ms, at the best of many."""
    assert bench.session.apply(edits.set_frequency_grid("1 GHz", "40 GHz", 2001)) == ()
    assert bench.session.apply(edits.set_angle_grid("0 deg", "75 deg", 6)) == ()
    answers = [answer_to(bench.session, bench.view)]
    assert bench.session.apply(edits.set_thickness(0, 0, 0.0052)) == ()
    answers.append(answer_to(bench.session, bench.view))
    took = []
    for turn in range(16):
        begun = time.perf_counter()
        bench.panel.show_answer(answers[turn % 2])
        bench.plot.viewport().repaint()
        took.append(time.perf_counter() - begun)
    assert min(took) < 0.016


def test_answers_leave_nothing_behind(bench: Bench) -> None:
    """A hundred answers make no new items in the scene."""
    count = len(bench.plot.scene().items())
    for _ in range(100):
        bench.answer()
    gc.collect()
    assert len(bench.plot.scene().items()) == count
