"""The panel of cuts: it follows the job, its flag is the stack, and what is typed or taken is told or done."""

from collections.abc import Iterator

import numpy as np
import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QGuiApplication, QMouseEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import Cell, Selection
from app.document.session import Session
from app.document.view import View
from app.look.pictures import svg_bytes
from app.look.theme import DARK, LIGHT
from app.panels.cuts.panel import CutsPanel
from app.window.samples import samples
from stackcore.errors import Severity
from stackcore.job import read_job
from stackcore.job.records import LayerRecord

THICKNESS = "stacks[0].elements[0].thickness"


class Bench:
    """The panel on a radar cover."""

    def __init__(self, qtbot: QtBot) -> None:
        self.qtbot = qtbot
        cover = next(one for one in samples() if "radar" in one.path.name)
        self.session, self.view = Session(read_job(cover.path)), View()
        self.told: list[str] = []
        self.pointed: list[str] = []

        def tell(text: str, severity: Severity) -> None:
            self.told.append(text)

        self.panel = CutsPanel(self.session, self.view, LIGHT, tell)
        self.panel.pointed.connect(self.pointed.append)
        qtbot.addWidget(self.panel)
        self.panel.resize(420, 520)

    def show(self, over: str = "") -> None:
        """Show the panel and wait for its curves."""
        self.panel.show()
        self.qtbot.waitExposed(self.panel)
        if over:
            self.panel.choose_over(over)
        self.settle()

    def settle(self) -> None:
        """Wait until the cut of now is whole."""

        def whole() -> bool:
            shown = self.panel.shown
            return shown is not None and shown.share == 1 and shown.question == self.panel.asked

        self.qtbot.waitUntil(whole, timeout=20_000)

    def thickness(self) -> float:
        """Return the thickness of the first layer, m."""
        element = self.session.record.stacks[0].elements[0]
        assert isinstance(element, LayerRecord)
        return element.thickness.value

    def flag(self) -> QPoint:
        """Return where the flag of the present value is on the plot's viewport."""
        plot = self.panel.plot
        (marker,) = plot.marker_layer.markers
        flag = plot.marker_layer.flag(marker, plot.frame())
        return (flag.center() + plot.area_rect().topLeft()).toPoint()

    def pixel(self, value: float) -> QPoint:
        """Return where a value (SI) is on the axis, in the middle of the plot."""
        plot = self.panel.plot
        frame = plot.frame()
        inside = QPointF(frame.across(self.panel.cut_view.scale.position(value)), frame.height / 2)
        return (inside + plot.area_rect().topLeft()).toPoint()

    def type(self, high: bool, text: str) -> None:
        """Type an end of the cut."""
        field = self.panel.ends.fields[int(high)]
        field.setFocus()
        field.selectAll()
        QTest.keyClicks(field, text)
        QTest.keyClick(field, Qt.Key.Key_Return)

    def key(self, key: Qt.Key, modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
        """Press a key in the plot."""
        QTest.keyClick(self.panel.plot, key, modifier)


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """A bench whose lane is closed at the end."""
    made = Bench(qtbot)
    yield made
    made.panel.close_lane()


def test_the_angle_comes_first_and_the_flag_chooses_one(bench: Bench) -> None:
    """Over the sweep's angles; the arrow keys step the angle that the wall shows."""
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    assert np.degrees([shown.question.low, shown.question.high]) == pytest.approx([0, 55])
    assert bench.panel.plot.bottom_axis.labelText == "Angle of incidence, deg"
    # Of 55 degrees in radians nothing is left over when it is written in degrees again.
    assert bench.panel.ends.high.placeholderText() == "55 deg"
    bench.key(Qt.Key.Key_Right)
    assert bench.view.state.active_angle == 1
    (marker,) = bench.panel.plot.marker_layer.markers
    assert marker.text == "20°"
    bench.key(Qt.Key.Key_Right, Qt.KeyboardModifier.ControlModifier)
    assert bench.view.state.active_angle == 3
    assert not bench.panel.take_best.isVisible()


def test_it_begins_with_the_element_in_hand(bench: Bench) -> None:
    """With an element selected its thickness runs along the axis at first; afterwards what was chosen stays."""
    bench.session.select(Selection(0, (0,)))
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.question.over == THICKNESS
    bench.panel.choose_over("")
    bench.settle()
    bench.panel.hide()
    bench.panel.show()
    bench.settle()
    shown = bench.panel.shown
    assert shown is not None
    assert not shown.question.over


def test_dragging_the_flag_changes_the_stack_in_one_step(bench: Bench) -> None:
    """The curves stand still while the value goes along them, and one undo brings it back."""
    bench.show(THICKNESS)
    before, plot = bench.thickness(), bench.panel.plot
    ends = plot.frame().left, plot.frame().right
    start, stop = bench.flag(), bench.pixel(0.012)
    viewport = plot.viewport()
    QTest.mousePress(viewport, Qt.MouseButton.LeftButton, pos=start)
    for share in (0.4, 0.7, 1.0):
        step = QPointF(start) + (QPointF(stop) - QPointF(start)) * share
        _drag(bench, QPointF(step.x(), start.y()))
    QTest.mouseRelease(viewport, Qt.MouseButton.LeftButton, pos=QPoint(stop.x(), start.y()))
    assert bench.thickness() == pytest.approx(0.012, abs=1e-4)
    assert (plot.frame().left, plot.frame().right) == ends
    bench.session.undo()
    assert bench.thickness() == before
    assert not bench.session.undo_sentence


def _drag(bench: Bench, at: QPointF) -> None:
    """Move the mouse with its button down: the test library's own movement has none."""
    viewport = bench.panel.plot.viewport()
    left, none = Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier
    event = QMouseEvent(QEvent.Type.MouseMove, at, QPointF(viewport.mapToGlobal(at)), left, left, none)
    QApplication.sendEvent(viewport, event)


def test_the_best_value_is_taken_with_one_press(bench: Bench) -> None:
    """Afterwards no value of the axis has a better worst curve, and the flag stands there."""
    bench.show(THICKNESS)
    shown = bench.panel.shown
    assert shown is not None
    best = shown.best()
    assert best is not None
    assert "Best 9.43" in bench.panel.best.text()
    bench.panel.take_best.click()
    assert bench.thickness() == pytest.approx(best[0], rel=1e-3)
    bench.settle()
    after = bench.panel.shown
    assert after is not None
    assert after.best() == pytest.approx(best)
    assert bench.session.undo_sentence.startswith("set thickness of element 1")


def test_a_locked_thickness_is_not_taken(bench: Bench) -> None:
    """The reason is told and nothing changes."""
    bench.session.apply(edits.set_locked(0, (0,), on=True))
    bench.show(THICKNESS)
    before = bench.session.record
    bench.panel.to_best()
    assert bench.session.record is before
    assert "the thickness is locked" in bench.told[0]


def test_keys_step_the_value_in_one_undo(bench: Bench) -> None:
    """Right goes up by a point of the axis, Ctrl by ten; the steps are undone together."""
    bench.show(THICKNESS)
    shown = bench.panel.shown
    assert shown is not None
    step = float(np.diff(shown.question.values())[0])
    before = bench.thickness()
    bench.key(Qt.Key.Key_Right)
    bench.key(Qt.Key.Key_Right, Qt.KeyboardModifier.ControlModifier)
    assert bench.thickness() == pytest.approx(before + 11 * step, rel=1e-3)
    bench.session.undo()
    assert bench.thickness() == before


def test_ends_are_typed_with_units_and_refused_with_a_reason(bench: Bench) -> None:
    """An end holds for what is varied; what is refused stays in its field; empty is the usual end again."""
    bench.show(THICKNESS)
    bench.type(False, "8 mm")
    bench.type(True, "400 mil")
    bench.settle()
    shown = bench.panel.shown
    assert shown is not None
    assert (shown.question.low, shown.question.high) == pytest.approx((0.008, 0.01016))
    for text, reason in (
        ("7 mm", "leaves nothing between the ends"),
        ("3 GHz", "is a frequency"),
        ("-1 mm", "leaves nothing"),
    ):
        bench.type(True, text)
        fault = bench.panel.ends.high.fault
        assert bench.panel.ends.high.text() == text
        assert fault is not None
        assert reason in fault.message or "negative" in fault.message
        assert bench.panel.shown is shown
    bench.panel.choose_over("")
    bench.settle()
    assert bench.panel.ends.low.text() == ""
    bench.type(True, "95")
    assert bench.panel.ends.high.fault is not None
    bench.type(True, "70")
    bench.settle()
    angles = bench.panel.shown
    assert angles is not None
    assert np.degrees(angles.question.high) == pytest.approx(70)
    bench.panel.choose_over(THICKNESS)
    bench.settle()
    assert bench.panel.ends.low.text() == "8 mm"


def test_the_worst_of_the_band_and_quantities_without_one(bench: Bench) -> None:
    """The choice is offered where a worst end is, and comes back with the quantity."""
    bench.show(THICKNESS)
    bench.panel.choose_where("band")
    bench.settle()
    assert "worst from 8 GHz to 11 GHz" in bench.panel.plot.accessibleDescription()
    bench.view.set(quantity="transmission_phase_deg")
    bench.settle()
    assert [bench.panel.where.itemData(at) for at in range(bench.panel.where.count())] == ["marker"]
    bench.view.set(quantity="reflectance")
    bench.settle()
    assert bench.panel.where.currentData() == "band"


def test_what_is_varied_can_go_away(bench: Bench) -> None:
    """Without its element the cut is over the angle again."""
    bench.show(THICKNESS)
    bench.session.apply(edits.delete(0, (0,)))
    bench.settle()
    assert bench.panel.over.currentData() == ""
    shown = bench.panel.shown
    assert shown is not None
    assert not shown.question.over


def test_it_follows_a_typed_value_outside_its_ends(bench: Bench) -> None:
    """A thickness beyond the axis moves the axis; one within leaves it."""
    bench.show(THICKNESS)
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "12 mm"))
    bench.settle()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.question.low == pytest.approx(0.00493, rel=0.01)
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "50 mm"))
    bench.settle()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.question.low <= 0.05 <= shown.question.high


def test_data_and_picture_leave_it_whole(bench: Bench) -> None:
    """The table says whose it is and has full precision; the drawing has its words as text."""
    bench.show(THICKNESS)
    bench.panel.copy_data()
    about, head, *rows = QGuiApplication.clipboard().text().splitlines()
    assert "9.5 GHz" in about
    assert head.startswith("Thickness of element 1 (laminate), mm\tTransmittance TE 0°")
    shown = bench.panel.shown
    assert shown is not None
    assert len(rows) == shown.curves[0].x.size
    assert [float(cell) for cell in rows[5].split("\t")[1:]] == [float(curve.raw[5]) for curve in shown.curves]
    drawing = svg_bytes(bench.panel.picture()).decode()
    assert "Thickness of element 1" in drawing
    bench.panel.copy_picture()
    assert QGuiApplication.clipboard().mimeData().hasImage()


def test_pointing_says_value_and_place(bench: Bench) -> None:
    """The nearest curve is named, with its value and where it is; T takes that value."""
    bench.show(THICKNESS)
    at = bench.pixel(0.009)
    QTest.mouseMove(bench.panel.plot.viewport(), at)
    bench.qtbot.waitUntil(lambda: any("mm" in text for text in bench.pointed))
    told = next(text for text in reversed(bench.pointed) if "mm" in text)
    assert " at 8.9" in told or " at 9" in told
    bench.key(Qt.Key.Key_T)
    assert bench.thickness() == pytest.approx(0.009, abs=1e-4)


def test_a_hidden_panel_computes_nothing_and_the_theme_reaches_it(bench: Bench) -> None:
    """Edits made while it is hidden are shown when it comes back, in the colours of now."""
    bench.show(THICKNESS)
    first = bench.panel.shown
    bench.panel.hide()
    bench.panel.set_theme(DARK)
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "11 mm"))
    assert bench.panel.shown is first
    bench.panel.show()
    bench.settle()
    assert bench.panel.plot.backgroundBrush().color().name() == DARK.base
    (marker,) = bench.panel.plot.marker_layer.markers
    assert marker.text == "11 mm"
