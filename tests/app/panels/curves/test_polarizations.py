"""Circular and tilted waves in the plot: their lines, names, legend and words, and the drawing that follows."""

import numpy as np
import pytest
from PySide6.QtCore import Qt

from app.document import edits
from app.document.view import ViewState
from app.look.theme import dashes, line_style
from app.panels.curves.curve_layer import DOTTED_DASHES, DrawnCurve
from app.panels.curves.words import empty_sentence
from app.panels.wall.wave import powers_of
from app.series.curves import curves_of
from stackcore import CIRCULAR, METAL, QUANTITIES, ConductorMedium, Layer, Stack, solve
from tests.app.panels.curves.conftest import Bench
from tests.app.series.responses import slab

WAVES = ("TE", "TM", "circular", "tilt 30 deg")


def dots(pattern: tuple[float, ...]) -> int:
    """Return how many dots a dash pattern has in a row at its end."""
    return sum(length <= 2 for length in pattern[::2])


def test_line_styles_can_be_told_apart_without_colour() -> None:
    """Solid, dashes, dash and dot, dash and two dots; each beyond a material's data has its own group of dots."""
    assert [line_style(wave) for wave in WAVES] == ["solid", "dashed", "dash and dot", "dash and two dots"]
    assert [dots(dashes(wave)) for wave in WAVES] == [0, 0, 1, 2]
    point = np.zeros(1)
    beyond = [DrawnCurve(point, point, "#000000", dashes(wave)).pattern(False) for wave in WAVES]
    assert [dots(pattern) for pattern in beyond] == [1, 2, 3, 4]
    assert beyond[1] == DOTTED_DASHES
    assert all(max(pattern[::2]) < 2 for pattern in beyond)


def test_curves_are_named_and_drawn_in_their_style(bench: Bench) -> None:
    """Each angle has a curve for each wave; at the normal all are one and have one name."""
    bench.view.set(polarizations=WAVES)
    assert bench.plot.end_labels.texts[:3] == ("all 0°", "TE 30°", "TM 30°")
    assert set(bench.plot.end_labels.texts[3:5]) == {"Circular 30°", "30° tilt 30°"}
    assert [curve.dashes for curve in bench.plot.curve_layer.curves[4:8]] == [dashes(wave) for wave in WAVES]


def test_what_is_the_same_for_both_has_one_name(bench: Bench) -> None:
    """The phase difference of TE and TM is one curve at every angle."""
    bench.view.set(quantity="transmission_phase_difference_deg")
    assert bench.plot.end_labels.texts == ("TE, TM 0°", "TE, TM 30°", "TE, TM 60°")


def test_the_legend_names_all_styles(bench: Bench) -> None:
    """Without room for names the legend says which line is which wave."""
    assert bench.session.apply(edits.set_angle_grid("0 deg", "80 deg", 33)) == ()
    bench.view.set(polarizations=WAVES)
    bench.answer()
    legend = bench.panel.header.legend
    assert legend.sentence().startswith(
        "TE solid, TM dashed, Circular dash and dot, 30° tilt dash and two dots; 33 angles"
    )
    assert not legend.grab().isNull()


def test_the_worst_names_its_wave(bench: Bench) -> None:
    """The line above the plot says which wave is the worst."""
    bench.view.set(polarizations=("circular",), quantity="cross_polar_discrimination_dB")
    assert bench.panel.header.worst.text().endswith("60°, Circular")


def test_a_quantity_that_needs_both_parts_says_so(bench: Bench) -> None:
    """With TE and TM alone the plot says what to choose; with a circular wave it has curves."""
    curves = curves_of(slab(), ViewState(quantity="transmitted_axial_ratio_dB"))
    assert "choose one above" in empty_sentence("transmitted_axial_ratio_dB", curves)
    bench.view.set(quantity="transmitted_axial_ratio_dB", polarizations=("circular",))
    assert empty_sentence("transmitted_axial_ratio_dB", bench.panel.curves) == ""
    behind_metal = curves_of(
        slab(metal_back=True), ViewState(quantity="transmitted_axial_ratio_dB", polarizations=("circular",))
    )
    assert "no value here" in empty_sentence("transmitted_axial_ratio_dB", behind_metal)


def test_the_drawing_follows_a_circular_curve(bench: Bench) -> None:
    """Choosing curves by key reaches the circular one, and the wall drawing then shows that wave."""
    bench.view.set(polarizations=WAVES)
    bench.panel.choose_curve(6)
    assert (bench.view.state.active_angle, bench.view.state.active_polarization) == (1, "circular")
    assert bench.plot.curve_layer.curves[6].chosen
    assert bench.pointed[-1].startswith("Worst of Circular 30°")
    assert bench.plot.focusPolicy() != Qt.FocusPolicy.NoFocus


def test_powers_of_the_drawing_are_the_means() -> None:
    """The rays of a circular wave carry the mean powers, which together are all of it."""
    response = slab()
    point = solve(response.stack, response.frequency[:1], response.angle[1:2])
    powers = powers_of(point, "circular")
    assert powers.reflectance == pytest.approx(QUANTITIES["reflectance"].of(point, CIRCULAR)[0, 0], rel=1e-14)
    assert powers.reflectance + powers.transmittance + sum(powers.absorbed) == pytest.approx(1, rel=1e-12)
    te = powers_of(point, "TE")
    assert te.transmittance == point.transmittance[0, 0, 0]


def test_a_deep_wall_lets_something_through_in_the_drawing() -> None:
    """A transmittance below the smallest double is still more than none; behind a perfect conductor it is none."""
    copper = solve(Stack((Layer(ConductorMedium(5.8e7), 1e-2),)), 10e9, 0.7)
    assert 0 < powers_of(copper, "circular").transmittance < 1e-300
    assert powers_of(solve(Stack((), back=METAL), 10e9, 0.7), "circular").transmittance == 0
