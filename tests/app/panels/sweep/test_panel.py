"""The quiet line: what is computed and shown, changed in place, faults at their field."""

from collections.abc import Iterator
from dataclasses import dataclass, field

import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QComboBox, QWidget
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import job_cell
from app.document.session import Session
from app.document.view import POWERS, View
from app.look.theme import DARK, LIGHT
from app.panels.sweep import SweepPanel
from app.panels.sweep.panel import ANGLES, LIST, POINTS, START, STOP
from app.panels.sweep.phrases import angles_text
from app.panels.sweep.quantity_choice import quantity_tip
from stackcore.job.records import AngleGrid, FrequencyGrid
from stackcore.quantities import QUANTITIES
from tests.app.panels.results import Told, slab_job


@dataclass
class Bench:
    """The panel with everything it stands on, and a typist."""

    qtbot: QtBot
    session: Session = field(default_factory=lambda: Session(slab_job()))
    view: View = field(default_factory=View)
    told: Told = field(default_factory=Told)

    def __post_init__(self) -> None:
        self.panel = SweepPanel(self.session, self.view, LIGHT, self.told)
        self.qtbot.addWidget(self.panel)
        self.panel.resize(1100, 60)
        self.panel.show()
        self.qtbot.waitExposed(self.panel)

    @property
    def grid(self) -> FrequencyGrid:
        """The frequencies of the job."""
        frequency = self.session.record.sweep.frequency
        assert isinstance(frequency, FrequencyGrid)
        return frequency

    def type(self, column: str, text: str) -> None:
        """Type a text over a field and press Enter."""
        field = self.panel.field(column)
        field.setFocus()
        field.selectAll()
        QTest.keyClicks(field, text)
        QTest.keyClick(field, Qt.Key.Key_Return)

    def wheel(self, widget: QWidget) -> None:
        """Turn the wheel over a control."""
        place = QPointF(4, 4)
        event = QWheelEvent(
            place,
            widget.mapToGlobal(place),
            QPoint(),
            QPoint(0, -120),
            Qt.MouseButton.NoButton,
            Qt.KeyboardModifier.NoModifier,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(widget, event)


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """The line of a slab from 8 to 12 GHz at three angles."""
    found = Bench(qtbot)
    yield found
    found.panel.hide()


def test_the_line_reads_the_sweep(bench: Bench) -> None:
    """Every field shows what the job has."""
    texts = {column: bench.panel.field(column).text() for column in (START, STOP, POINTS, ANGLES)}
    assert texts == {START: "8 GHz", STOP: "12 GHz", POINTS: "41", ANGLES: "0, 30, 60 deg"}
    assert bench.panel.spacing.currentText() == "linear"
    assert not bench.panel.field(LIST).isVisible()


def test_a_band_is_typed_in_any_unit(bench: Bench) -> None:
    """The text is kept as typed, the job has its value, and undo brings the old text back."""
    bench.type(START, "7500 MHz")
    assert bench.grid.start.value == 7.5e9
    assert bench.panel.field(START).text() == "7500 MHz"
    assert "7500 MHz" in bench.session.undo_sentence
    bench.session.undo()
    assert bench.panel.field(START).text() == "8 GHz"


@pytest.mark.parametrize(
    ("column", "text", "words"),
    [
        (START, "8 mm", "length"),
        (START, "20 GHz", "12 GHz"),
        (STOP, "", ""),
        (POINTS, "many", ""),
        (POINTS, "0", "0"),
        (ANGLES, "0, 95 deg", "95"),
        (ANGLES, "0 to 60 deg", "how many points"),
        (ANGLES, "0 to 95 deg, 7 points", "95"),
    ],
)
def test_a_fault_keeps_the_text_and_marks_it(bench: Bench, column: str, text: str, words: str) -> None:
    """What is no value stays as typed, in the colour of faults, and says itself by tooltip and description."""
    sweep = bench.session.record.sweep
    field = bench.panel.field(column)
    field.setFocus()
    field.selectAll()
    QTest.keyClick(field, Qt.Key.Key_Delete)
    QTest.keyClicks(field, text)
    QTest.keyClick(field, Qt.Key.Key_Return)
    assert bench.session.record.sweep == sweep
    assert field.text() == text
    assert field.fault is not None
    assert words in field.toolTip()
    assert field.accessibleDescription().startswith("Not valid: ")
    assert field.palette().text().color().name() == LIGHT.fault
    draft = bench.session.document.draft(job_cell(column))
    assert draft is not None
    assert draft.text == text


def test_a_fault_goes_when_the_text_becomes_a_value(bench: Bench) -> None:
    """Typing again takes the mark away at once, and a good text becomes the value."""
    bench.type(STOP, "6 GHz")
    field = bench.panel.field(STOP)
    wide = field.sizeHint().width()
    field.selectAll()
    QTest.keyClicks(field, "9 GHz")
    assert field.fault is None
    QTest.keyClick(field, Qt.Key.Key_Return)
    assert bench.grid.stop.value == 9e9
    assert field.palette().text().color().name() == LIGHT.text
    assert field.sizeHint().width() < wide


def test_escape_brings_the_text_back(bench: Bench) -> None:
    """A text given up leaves no trace in the job."""
    field = bench.panel.field(START)
    field.selectAll()
    QTest.keyClicks(field, "99")
    QTest.keyClick(field, Qt.Key.Key_Escape)
    assert field.text() == "8 GHz"
    assert bench.session.undo_sentence == ""


def test_a_text_being_typed_is_left_alone(bench: Bench) -> None:
    """A change elsewhere does not overwrite what a person is typing."""
    bench.panel.activateWindow()
    field = bench.panel.field(START)
    field.setFocus()
    bench.qtbot.waitUntil(field.hasFocus)
    field.selectAll()
    QTest.keyClicks(field, "9.")
    assert bench.session.apply(edits.set_title("Another title")) == ()
    assert field.text() == "9."


def test_angles_are_a_list_or_a_range(bench: Bench) -> None:
    """Both are read, and each is written in its shortest words."""
    bench.type(ANGLES, "0 to 60 deg, 7 points")
    angle = bench.session.record.sweep.angle
    assert isinstance(angle, AngleGrid)
    assert angle.points == 7
    assert bench.panel.field(ANGLES).text() == "0 deg to 60 deg, 7 points"
    bench.type(ANGLES, "0, 45, 70 deg")
    assert bench.session.record.sweep.angles() == pytest.approx([0, 0.7853981634, 1.2217304764])
    assert bench.panel.field(ANGLES).text() == "0, 45, 70 deg"


def test_what_is_written_of_angles_is_read_back(bench: Bench) -> None:
    """The words of the field, typed again, give the very same angles."""
    for text in ("0, 30, 45 deg", "0 deg; 0.5 rad", "0 to 1 rad, 5 points", "12.5 deg"):
        bench.type(ANGLES, text)
        assert bench.panel.field(ANGLES).fault is None
        before = bench.session.record.sweep.angles().tolist()
        bench.type(ANGLES, angles_text(bench.session.record.sweep.angle))
        assert bench.session.record.sweep.angles().tolist() == before


def test_the_spacing_is_chosen(bench: Bench) -> None:
    """Linear, log and a list; the fields follow."""
    _choose(bench.panel.spacing, "log")
    assert bench.grid.spacing == "log"
    _choose(bench.panel.spacing, "list")
    assert bench.session.record.sweep.frequencies().tolist() == [8e9, pytest.approx(9.8e9, rel=0.01), 12e9]
    assert bench.panel.field(LIST).isVisible()
    assert not bench.panel.field(START).isVisible()
    assert not bench.panel.field(POINTS).isVisible()
    bench.type(LIST, "2.4 GHz; 5.2 GHz")
    assert bench.session.record.sweep.frequencies().tolist() == [2.4e9, 5.2e9]
    _choose(bench.panel.spacing, "linear")
    assert (bench.grid.start.text, bench.grid.stop.text) == ("2.4 GHz", "5.2 GHz")
    assert bench.panel.field(START).isVisible()


def test_every_quantity_can_be_chosen_and_explains_itself(bench: Bench) -> None:
    """The chooser has all quantities by their words, each with definition, unit and sign."""
    choice = bench.panel.quantity
    assert [choice.itemText(place) for place in range(choice.count())] == [q.label for q in QUANTITIES.values()]
    for name, quantity in QUANTITIES.items():
        _choose(choice, name)
        assert bench.view.state.quantity == name
        tip = choice.toolTip()
        assert quantity.definition in tip
        assert quantity.sign in tip
        assert tip == quantity_tip(quantity)
        if quantity.unit:
            assert f"In {quantity.unit}." in tip


def test_power_is_offered_as_fraction_per_cent_and_decibels(bench: Bench) -> None:
    """A fraction of power can be shown in per cent or in dB; a loss is in dB already."""
    chosen = []
    for power in POWERS:
        _choose(bench.panel.scale, power)
        chosen.append((bench.view.state.power, bench.panel.scale.currentText()))
    assert chosen == [("fraction", "as a fraction"), ("percent", "in %"), ("decibels", "in dB")]
    bench.view.set(quantity="insertion_loss_dB")
    assert not bench.panel.scale.isVisible()
    bench.view.set(quantity="reflectance")
    assert bench.panel.scale.isVisible()
    assert bench.panel.scale.currentText() == "in dB"


def test_the_frequency_axis_is_chosen(bench: Bench) -> None:
    """The axis of the plot is a matter of the view and not of the job."""
    _choose(bench.panel.axis, True)
    assert bench.view.state.log_frequency
    assert bench.session.undo_sentence == ""


def test_polarizations_are_switched_and_one_always_stays(bench: Bench) -> None:
    """Either can be taken away; the last one stays, and it is said why."""
    te, tm = bench.panel.switches["TE"], bench.panel.switches["TM"]
    te.click()
    assert ",".join(bench.view.state.polarizations) == "TM"
    tm.click()
    assert ",".join(bench.view.state.polarizations) == "TM"
    assert tm.isChecked()
    assert bench.told.words == [("At least one polarization is shown.", "note")]
    te.click()
    assert ",".join(bench.view.state.polarizations) == "TE,TM"


def test_the_wheel_changes_nothing(bench: Bench) -> None:
    """Neither choices nor fields follow the wheel, focused or not."""
    for widget in (bench.panel.quantity, bench.panel.spacing, bench.panel.axis, bench.panel.field(POINTS)):
        widget.setFocus()
        bench.wheel(widget)
        assert widget.focusPolicy() == Qt.FocusPolicy.StrongFocus
    assert bench.view.state == View().state
    assert bench.session.record == slab_job().record


def test_every_control_has_a_name_and_a_tip(bench: Bench) -> None:
    """Nothing is left to guess, for those who see and those who listen."""
    controls = [
        *(bench.panel.field(column) for column in (START, STOP, POINTS, LIST, ANGLES)),
        bench.panel.quantity,
        bench.panel.scale,
        bench.panel.spacing,
        bench.panel.axis,
        *bench.panel.switches.values(),
    ]
    for control in controls:
        assert control.accessibleName()
        assert len(control.toolTip()) > 20


def test_the_line_wraps(bench: Bench) -> None:
    """In a narrow panel it goes on below, whole and in order, and nothing overlaps."""
    bench.panel.resize(360, 400)
    QApplication.processEvents()
    fields = [bench.panel.field(column) for column in (START, STOP, POINTS, ANGLES)]
    tops = [widget.mapTo(bench.panel, QPoint(0, 0)).y() for widget in fields]
    assert tops[0] == tops[1]
    assert tops == sorted(tops)
    assert tops[-1] > tops[0]
    rights = [widget.mapTo(bench.panel, QPoint(widget.width(), 0)).x() for widget in fields]
    assert max(rights) <= 360
    assert bench.panel.heightForWidth(360) > bench.panel.heightForWidth(1100)


def test_the_theme_reaches_the_fields(bench: Bench) -> None:
    """Ink of fields and captions follows the look, also for a fault."""
    bench.type(STOP, "6 GHz")
    bench.panel.set_theme(DARK)
    assert bench.panel.field(START).palette().text().color().name() == DARK.text
    assert bench.panel.field(STOP).palette().text().color().name() == DARK.fault
    assert not bench.panel.grab().isNull()


def _choose(choice: QComboBox, data: object) -> None:
    """Choose an item as a person does."""
    place = choice.findData(data)
    assert place >= 0
    choice.setCurrentIndex(place)
    choice.activated.emit(place)


def test_a_long_text_does_not_widen_the_window(bench: Bench) -> None:
    """A list of many angles scrolls inside its field; the line needs no more room for it."""
    before = bench.panel.minimumSizeHint().width()
    bench.type(ANGLES, "; ".join(["0"] * 60))
    assert len(bench.session.record.sweep.angles()) == 60
    assert bench.panel.minimumSizeHint().width() < max(before, 400)
    assert bench.panel.field(ANGLES).text().count("0") == 60
