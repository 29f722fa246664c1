"""The panel of maps: right at every cell, live while it is shown, and gone without a trace."""

import xml.etree.ElementTree as ElementTree
from collections.abc import Iterator
from dataclasses import replace

import numpy as np
import pytest
from PySide6.QtCore import QPointF, Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.condition_edits import PRESETS
from app.document.document import Cell
from app.document.session import Session
from app.document.view import View
from app.look.pictures import svg_bytes
from app.look.theme import DARK, LIGHT
from app.panels.maps.panel import MapPanel
from app.panels.maps.picture import cell_at, cells_of, frame_of, image_of
from app.panels.sweep.field import QuietField
from app.window.samples import samples
from stackcore.errors import Severity
from stackcore.job import Job, job_from_json, read_job
from stackcore.propagation import solve

SVG = "{http://www.w3.org/2000/svg}"


class Bench:
    """The panel on a radar cover, with what it said."""

    def __init__(self, qtbot: QtBot) -> None:
        self.qtbot = qtbot
        cover = next(one for one in samples() if "radar" in one.path.name)
        self.session, self.view = Session(read_job(cover.path)), View()
        self.told: list[str] = []

        def tell(text: str, severity: Severity) -> None:
            self.told.append(text)

        self.panel = MapPanel(self.session, self.view, LIGHT, tell)
        qtbot.addWidget(self.panel)
        self.panel.resize(520, 460)

    def show(self) -> None:
        """Show the panel and wait until the map is whole."""
        self.panel.show()
        self.qtbot.waitExposed(self.panel)
        self.settle()

    def settle(self) -> None:
        """Wait until the map of now is whole."""
        self.qtbot.waitUntil(lambda: self.panel.shown is not None and self.whole(), timeout=20_000)

    def whole(self) -> bool:
        """Whether what is shown is the whole map of the job of now."""
        shown = self.panel.shown
        return shown is not None and shown.share == 1 and shown.question == self.panel.asked


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """A bench whose lane is closed at the end."""
    made = Bench(qtbot)
    yield made
    made.panel.close_lane()


def test_every_cell_is_what_the_solver_says(bench: Bench) -> None:
    """Ten cells of the map agree with plain solving, and the axes cover the sweep."""
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    rng = np.random.default_rng(3)
    stack = bench.session.job.stacks[0]
    for _ in range(10):
        row, column = int(rng.integers(shown.values.shape[0])), int(rng.integers(shown.values.shape[1]))
        answer = solve(stack, float(shown.level.x[column]), float(shown.level.y[row]))
        assert shown.values[row, column] == pytest.approx(float(answer.transmittance[0, 0, 0]), abs=1e-12)
    assert (shown.x[0], shown.x[-1]) == pytest.approx((8.0, 11.0))
    assert (shown.y[0], shown.y[-1]) == pytest.approx((0.0, 55.0))
    assert shown.worst is not None
    assert bench.panel.worst.text().startswith("Worst: ")


def test_it_follows_edits_and_what_is_looked_at(bench: Bench) -> None:
    """A thickness typed, another quantity and another polarization each bring another map."""
    bench.show()
    before = bench.panel.shown
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "9 mm"))
    bench.settle()
    after = bench.panel.shown
    assert before is not None
    assert after is not None
    assert not np.array_equal(before.values, after.values)
    bench.view.set(quantity="insertion_loss_dB", active_polarization="TM")
    bench.settle()
    assert bench.panel.shown is not None
    assert bench.panel.shown.titles[2] == "Insertion loss, dB"


def test_a_thickness_can_run_upward(bench: Bench) -> None:
    """The offer holds what can be varied; the axis has its unit, and the values are those of the varied stack."""
    bench.show()
    paths = [bench.panel.over.itemData(place) for place in range(bench.panel.over.count())]
    assert paths[0] == ""
    assert "stacks[0].elements[0].thickness" in paths
    bench.panel.choose_over("stacks[0].elements[0].thickness")
    bench.settle()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.titles[1].endswith(", mm")
    session = Session(bench.session.job)
    session.apply(edits.set_thickness(0, 0, float(f"{shown.level.y[40]:.3g}")))
    assert shown.y[40] == pytest.approx(shown.level.y[40] * 1e3, rel=1e-9)


def test_what_runs_upward_and_is_gone_becomes_the_angle(bench: Bench) -> None:
    """Deleting the element leaves a map over the angle."""
    bench.show()
    bench.panel.choose_over("stacks[0].elements[0].thickness")
    bench.settle()
    bench.session.apply(edits.delete(0, (0,)))
    bench.settle()
    assert bench.panel.shown is not None
    assert "Angle" in bench.panel.shown.titles[1]


def test_nothing_is_computed_while_it_is_hidden(bench: Bench) -> None:
    """Neither before it is shown nor after it is closed."""
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "9.1 mm"))
    assert bench.panel._asked is None
    bench.show()
    bench.panel.hide()
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "9.2 mm"))
    assert bench.panel._asked is None
    bench.qtbot.waitUntil(lambda: not bench.panel._lane.busy)


def test_cells_are_told_by_mouse_and_keys(bench: Bench) -> None:
    """Value, frequency and angle of the cell; arrows move by one, with Ctrl by ten, and stop at the edge."""
    bench.show()
    shown, view = bench.panel.shown, bench.panel.map
    assert shown is not None
    told: list[str] = []
    bench.panel.pointed.connect(told.append)
    frame = frame_of(shown, view.width(), view.height())
    QTest.mouseMove(view, frame.area.center().toPoint())
    assert "GHz" in told[-1]
    assert "°" in told[-1]
    view.setFocus()
    view.point((0, 0))
    QTest.keyClick(view, Qt.Key.Key_Left)
    assert view.cursor_cell == (0, 0)
    QTest.keyClick(view, Qt.Key.Key_Up, Qt.KeyboardModifier.ControlModifier)
    assert view.cursor_cell == (10, 0)
    assert view.cell_at(QPointF(0, 0)) is None


def _type(bench: Bench, field: QuietField, text: str) -> None:
    field.setFocus()
    field.selectAll()
    QTest.keyClicks(field, text)
    QTest.keyClick(field, Qt.Key.Key_Return)


def test_colours_can_be_typed(bench: Bench) -> None:
    """Both ends or one; an end that is none, or a range that falls, stays with its reason and changes nothing."""
    bench.show()
    panel = bench.panel
    _type(bench, panel.low, "0.5")
    _type(bench, panel.high, "1")
    assert panel.map.range_shown() == (0.5, 1.0)
    _type(bench, panel.low, "2")
    assert panel.map.range_shown() == (0.5, 1.0)
    assert panel.high.fault is not None
    assert "is not above" in panel.high.fault.message
    _type(bench, panel.low, "much")
    assert panel.low.text() == "much"
    assert panel.low.fault is not None


def _limits(bench: Bench) -> list[float | None]:
    return list(bench.panel.map.limits)


def test_limits_take_their_unit_and_belong_to_their_quantity(bench: Bench) -> None:
    """Those of decibels mean nothing to a phase; they come back with the quantity."""
    bench.view.set(quantity="insertion_loss_dB")
    bench.show()
    _type(bench, bench.panel.high, "2.5 dB")
    assert _limits(bench) == [None, 2.5]
    bench.view.set(quantity="transmission_phase_deg")
    bench.settle()
    assert _limits(bench) == [None, None]
    assert bench.panel.high.text() == ""
    _type(bench, bench.panel.low, "-90°")
    assert _limits(bench) == [-90.0, None]
    bench.view.set(quantity="insertion_loss_dB")
    bench.settle()
    assert _limits(bench) == [None, 2.5]
    assert bench.panel.high.text() == "2.5"


def test_what_runs_upward_has_typed_ends(bench: Bench) -> None:
    """With their unit; the map then covers just these."""
    bench.show()
    bench.panel.choose_over("stacks[0].elements[0].thickness")
    bench.settle()
    low, high = bench.panel.ends.fields
    _type(bench, low, "8 mm")
    _type(bench, high, "0.5 in")
    bench.settle()
    shown = bench.panel.shown
    assert shown is not None
    assert (shown.y[0], shown.y[-1]) == pytest.approx((8.0, 12.7))
    _type(bench, high, "7 mm")
    assert high.fault is not None
    assert bench.panel.shown is shown


def test_a_temperature_runs_in_degrees(bench: Bench) -> None:
    """The axis and the words of a cell are in °C: from 20 K below the present 20 °C to 20 K above.

    Source: the definition of the Celsius scale, t = T − 273.15 K (BIPM, The International System of Units).
    """
    text = """{"format": "slabwright-job", "version": 1,
"materials": {"sea": {"model": "sea-water", "temperature": "20 degC", "salinity": 35}},
"stacks": [{"name": "Film", "elements": [{"layer": "sea", "thickness": "0.2 mm"}]}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 5}, "angle": ["0 deg"]}}"""
    bench.session.start_from(Job(job_from_json(text)), "open")
    bench.panel.choose_over("materials.sea.temperature")
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.titles[1].endswith(", °C")
    assert (shown.y[0], shown.y[-1]) == pytest.approx((0.0, 40.0), abs=1e-9)
    assert shown.words_at(0, 0).endswith(" 0 °C")
    assert shown.words_at(60, 0).endswith(" 20 °C")


@pytest.mark.parametrize("size", [(300, 250), (520, 460)])
def test_cells_marks_and_axes_agree(bench: Bench, size: tuple[int, int]) -> None:
    """The pixel of each value at the axes lies in the middle of the cell that is told there, also at the edges."""
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    frame = frame_of(shown, *size)
    image = cells_of(shown, frame.area)
    rows, columns = shown.values.shape
    for row in (0, 1, rows // 2, rows - 1):
        for column in (0, 1, columns // 3, columns - 1):
            at = QPointF(frame.across(float(shown.x[column])), frame.down(float(shown.y[row])))
            inside = QPointF(min(at.x(), frame.area.right() - 1e-6), min(at.y(), frame.area.bottom() - 1e-6))
            assert cell_at(shown, frame.area, inside) == (row, column)
            # The image has its first row at the bottom, each cell as large as the next.
            middle_x = image.left() + (column + 0.5) * image.width() / columns
            middle_y = image.bottom() - (row + 0.5) * image.height() / rows
            assert (middle_x, middle_y) == pytest.approx((at.x(), at.y()), abs=1e-6)


def test_data_and_picture_can_be_taken_away(bench: Bench) -> None:
    """A table with both axes in full precision, and a drawing whose texts are texts."""
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    bench.panel.copy_data()
    whose, what, *rows = QGuiApplication.clipboard().text().splitlines()
    assert bench.session.record.stacks[0].name in whose
    assert whose.endswith("TE")
    assert what == "Transmittance; across: Frequency, GHz; down: Angle of incidence, deg"
    assert len(rows) == shown.values.shape[0] + 1
    assert float(rows[1].split("\t")[5]) == shown.values[0, 4]
    root = ElementTree.fromstring(svg_bytes(bench.panel.picture()))
    words = "".join(root.itertext())
    assert "Frequency, GHz" in words
    assert "Transmittance" in words
    bench.panel.copy_picture()
    assert QGuiApplication.clipboard().mimeData().hasImage()


def test_light_and_dark_differ(bench: Bench) -> None:
    """The ground follows the look; the colours of the map stay."""
    bench.show()
    pictures = []
    for theme in (LIGHT, DARK):
        bench.panel.set_theme(theme)
        pictures.append(bench.panel.map.grab().toImage())
    assert pictures[0].pixelColor(2, 2).name() == LIGHT.base
    assert pictures[1].pixelColor(2, 2).name() == DARK.base
    middle = QPointF(pictures[0].width() / 2, pictures[0].height() / 2).toPoint()
    assert pictures[0].pixelColor(middle) == pictures[1].pixelColor(middle)


def test_infinite_and_missing_values_are_drawn(bench: Bench) -> None:
    """Infinite decibels have the end of the colours, and what has no meaning is clear."""
    values = np.array([[0.0, 10.0], [np.inf, np.nan]])
    image = image_of(values, 0.0, 10.0)
    assert image.pixelColor(0, 0) == image.pixelColor(1, 1)
    assert image.pixelColor(1, 0).alpha() == 0


def test_a_logarithmic_axis_spaces_by_ratio(bench: Bench) -> None:
    """The middle of the map is the geometric middle of the band."""
    bench.view.replace(replace(bench.view.state, log_frequency=True))
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.x[300] == pytest.approx(np.sqrt(8 * 11), rel=1e-9)
    frame = frame_of(shown, 500, 400)
    assert frame.across(float(np.sqrt(8 * 11))) == pytest.approx(frame.area.center().x())


def test_rounding_errors_are_no_pattern(bench: Bench) -> None:
    """A wall of nothing passes everything everywhere: its map has one colour."""
    bench.session.apply(edits.delete(0, (0,)))
    bench.show()
    shown = bench.panel.shown
    assert shown is not None
    assert shown.high - shown.low > 1e-6
    image = image_of(shown.values, shown.low, shown.high)
    colours = {image.pixel(x, y) for x in range(0, image.width(), 7) for y in range(0, image.height(), 7)}
    assert len(colours) <= 2


def test_long_names_leave_the_panel_its_width(bench: Bench) -> None:
    """The name of a material makes neither the choice nor the panel too wide; tip and list have it whole."""
    text = """{"format": "slabwright-job", "version": 1,
"materials": {"a": {"model": "constant", "permittivity": 4.0, "loss_tangent": 0.01,
                    "label": "A laminate of very many words, each of them needed to tell it from the others"}},
"stacks": [{"name": "Wall", "elements": [{"layer": "a", "thickness": "2 mm"}]}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 5}, "angle": ["0 deg"]}}"""
    bench.session.start_from(Job(job_from_json(text)), "open")
    bench.panel.choose_over("materials.a.loss_tangent")
    bench.show()
    assert "each of them needed" in bench.panel.over.currentText()
    assert bench.panel.minimumSizeHint().width() <= 360
    assert "each of them needed" in bench.panel.worst.toolTip()


def test_a_map_says_what_it_leaves_out(bench: Bench) -> None:
    """Conditions of the curves, a band around a single frequency, and values that are all infinite."""
    bench.session.apply(edits.add_condition(PRESETS[0]))
    bench.view.set(conditions=("Wet",))
    bench.session.apply(edits.set_frequency_list(["9.4 GHz"]))
    bench.show()
    assert "as built, without the conditions" in bench.panel.worst.text()
    assert "the job has 9.4 GHz only" in bench.panel.worst.text()
    bench.session.apply(edits.set_back(0, "metal"))
    bench.view.set(quantity="insertion_loss_dB")
    bench.settle()
    assert "infinite everywhere" in bench.panel.worst.text()
    assert "Worst" not in bench.panel.worst.text()
