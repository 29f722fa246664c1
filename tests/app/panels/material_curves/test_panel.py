"""The plot of the chosen materials, by keys and mouse."""

from dataclasses import dataclass, field

import numpy as np
import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QToolTip
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import job_cell
from app.document.session import Session
from app.document.view import View
from app.look.theme import DARK, LIGHT
from app.panels.curves.frame import Frame
from app.panels.material_curves.drawing import colour_of, line_style
from app.panels.material_curves.panel import MaterialCurves
from app.panels.material_curves.words import NOTHING_CHOSEN
from app.series.material_curves import Specimen
from app.series.material_quantities import CURRENT_RATIO, MATERIAL_QUANTITIES
from stackcore.media.base import FrequencyRange
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from tests.app.panels.results import slab_job

RESIN = Specimen("Resin", ConstantMedium(4.0 - 0.08j, valid_range=FrequencyRange(8e9, 10e9)))
EARTH = Specimen("Earth", LossyDielectricMedium(4.0, conductivity=2.2253))
COPPER = Specimen("Copper", ConductorMedium(5.8e7))


@dataclass
class Bench:
    """The plot on a screen."""

    qtbot: QtBot
    session: Session = field(default_factory=lambda: Session(slab_job()))
    view: View = field(default_factory=View)
    pointed: list[str] = field(default_factory=list)

    def __post_init__(self) -> None:
        self.panel = MaterialCurves(self.session, self.view, LIGHT)
        self.panel.pointed.connect(self.pointed.append)
        self.qtbot.addWidget(self.panel)
        self.panel.resize(700, 500)
        self.panel.show()
        self.qtbot.waitExposed(self.panel)

    def press(self, key: Qt.Key, modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
        """Press a key in the plot."""
        QTest.keyClick(self.panel.plot, key, modifier)

    def frame(self) -> Frame:
        """Return what is visible."""
        return self.panel.plot.frame()


@pytest.fixture
def bench(qtbot: QtBot) -> Bench:
    """A bench."""
    return Bench(qtbot)


def test_nothing_chosen_says_what_will_be_here(bench: Bench) -> None:
    """An empty plot says how to fill it, also to those who listen."""
    assert bench.panel.plot.note_layer.text == NOTHING_CHOSEN
    assert bench.panel.plot.accessibleDescription() == NOTHING_CHOSEN
    bench.panel.show_specimens((RESIN,))
    assert bench.panel.plot.note_layer.text == ""


def test_curve_has_the_numbers_and_is_dotted_beyond_its_range(bench: Bench) -> None:
    """ε′ of resin is 4 from 8 GHz to 12 GHz, dotted from 10 GHz, and the note says so."""
    bench.panel.show_specimens((RESIN,))
    (drawn,) = bench.panel.plot.curve_layer.curves

    assert drawn.positions == pytest.approx(np.linspace(8.0, 12.0, 41))
    assert drawn.values == pytest.approx(np.full(41, 4.0))
    assert [known for _, _, known in drawn.pieces] == [True, False]
    assert bench.panel.notes.text() == "Resin is known from 8 GHz to 10 GHz; elsewhere its curve is dotted."


@pytest.mark.parametrize("quantity", list(MATERIAL_QUANTITIES))
def test_every_quantity_is_drawn_with_its_words(bench: Bench, quantity: str) -> None:
    """Each quantity gives a title with unit, and curves inside the range shown wherever they have values."""
    bench.panel.show_specimens((RESIN, EARTH, COPPER))
    bench.panel.show_quantity(quantity)
    title = bench.panel.plot.left_axis.labelText
    frame = bench.frame()

    assert title.startswith(MATERIAL_QUANTITIES[quantity].label)
    assert bench.panel.quantity.toolTip() == MATERIAL_QUANTITIES[quantity].figure.definition
    for curve in bench.panel.plot.curve_layer.curves:
        known = curve.values[np.isfinite(curve.values)]
        assert (known >= frame.bottom).all()
        assert (known <= frame.top).all()
    assert not bench.panel.grab().isNull()


def test_materials_are_told_apart_by_hue_then_by_style(bench: Bench) -> None:
    """Eight materials have eight colours; the ninth begins again, dashed."""
    hues = [colour_of(LIGHT, place) for place in range(8)]
    assert len(set(hues)) == 8
    assert colour_of(LIGHT, 8) == hues[0]
    assert (line_style(0), bool(line_style(8))) == ((), True)
    bench.panel.show_specimens((RESIN, EARTH))
    assert [label.text for label in bench.panel.plot.end_labels.labels] == ["Resin", "Earth"]


def test_crossover_is_marked_and_told(bench: Bench) -> None:
    """Earth of ε′ 4 and 2.2253 S/m crosses at 10 GHz: a mark stands there at a ratio of 1."""
    bench.panel.show_specimens((EARTH,))
    bench.panel.show_quantity(CURRENT_RATIO)
    (spot,) = bench.panel.plot.worst_layer.spots

    assert spot.position == pytest.approx(10.0, rel=1e-4)
    assert spot.value == 0.0
    assert "conduction and displacement current are equal at 10 GHz" in bench.panel.readings.toPlainText()
    bench.press(Qt.Key.Key_V)
    assert bench.panel.plot.worst_layer.spots[0].value == 1.0


def test_values_at_the_marker_follow_it(bench: Bench) -> None:
    """The words below are those at the marker, which moves by keys here as in the curves of the wall."""
    bench.panel.show_specimens((COPPER,))
    bench.press(Qt.Key.Key_M)
    assert bench.view.state.markers == (10e9,)
    assert "δ 660.9 nm" in bench.panel.readings.toPlainText()
    bench.press(Qt.Key.Key_Right)

    assert bench.view.state.markers == (10.1e9,)
    assert bench.panel.readings.toPlainText().startswith("At 10.1 GHz:")
    assert len(bench.panel.plot.marker_layer.markers) == 1


def test_axes_by_keys(bench: Bench) -> None:
    """L and V turn both axes; PgDown and PgUp go through the quantities."""
    bench.panel.show_specimens((EARTH,))
    bench.press(Qt.Key.Key_L)
    assert bench.panel.plot.bottom_axis.logarithmic
    bench.press(Qt.Key.Key_V)
    assert bench.panel.plot.left_axis.logarithmic
    assert bench.panel.plot.curve_layer.curves[0].values == pytest.approx(np.log10(np.full(41, 4.0)))
    bench.press(Qt.Key.Key_PageDown)
    assert bench.panel.quantity.currentData() == "dielectric_loss"
    bench.press(Qt.Key.Key_PageUp)
    assert bench.panel.quantity.currentData() == "permittivity"


def test_wheel_over_the_choice_changes_nothing(bench: Bench) -> None:
    """The quantity is not changed by a wheel that passes over it."""
    before = bench.panel.quantity.currentData()
    place = QPointF(bench.panel.quantity.rect().center())
    none = Qt.MouseButton.NoButton, Qt.KeyboardModifier.NoModifier, Qt.ScrollPhase.NoScrollPhase
    event = QWheelEvent(
        place, bench.panel.quantity.mapToGlobal(place), QPoint(), QPoint(0, -120), none[0], none[1], none[2], False
    )
    QApplication.sendEvent(bench.panel.quantity, event)
    assert bench.panel.quantity.currentData() == before


def test_data_is_copied(bench: Bench) -> None:
    """The table on the clipboard has SI units and as many rows as the sweep."""
    bench.panel.show_specimens((COPPER,))
    bench.panel.show_quantity("skin_depth_m")
    bench.press(Qt.Key.Key_C, Qt.KeyboardModifier.ControlModifier | Qt.KeyboardModifier.ShiftModifier)
    lines = QApplication.clipboard().text().splitlines()

    assert lines[0] == "Frequency, Hz\tSkin depth of Copper, m"
    assert len(lines) == 42
    assert bench.pointed[-1] == "Copied 1 curve of 41 points."


def test_pointing_says_the_value_and_why_it_is_a_guess(bench: Bench, monkeypatch: pytest.MonkeyPatch) -> None:
    """At 11.9 GHz the status line says ε′ 4 and that resin is known to 10 GHz, and so does the tip."""
    tips: list[str] = []
    monkeypatch.setattr(QToolTip, "showText", lambda _place, text, _owner: tips.append(text))
    bench.panel.show_specimens((RESIN,))
    frame = bench.frame()
    inside = QPoint(round(frame.across(11.9)), round(frame.down(4.0)))
    QTest.mouseMove(bench.panel.plot.viewport(), inside + bench.panel.plot.area_rect().topLeft().toPoint())
    bench.qtbot.waitUntil(lambda: any("Resin" in text for text in bench.pointed))

    assert "ε′ 4   a guess: known from 8 GHz to 10 GHz" in bench.pointed[-1]
    assert "a guess: known from 8 GHz to 10 GHz" in tips[-1]


def test_sweep_and_theme_are_followed(bench: Bench) -> None:
    """Another sweep is drawn at once, another theme in its colours."""
    bench.panel.show_specimens((RESIN,))
    bench.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "20 GHz"))
    assert bench.panel.curves[0].x[-1] == 20e9
    bench.panel.set_theme(DARK)
    assert bench.panel.plot.curve_layer.curves[0].colour == DARK.transmission


def test_hidden_plot_waits(bench: Bench) -> None:
    """What changes while nobody looks is drawn when the plot is shown again."""
    bench.panel.hide()
    bench.panel.show_specimens((COPPER,))
    assert [curve.specimen for curve in bench.panel.curves] == []
    bench.panel.show()
    assert [curve.specimen for curve in bench.panel.curves] == [COPPER]
