"""The readings: one row a marker, one column a curve, exact when copied."""

from collections.abc import Iterator
from dataclasses import dataclass, field

import numpy as np
import pytest
from PySide6.QtCore import QModelIndex, Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QAbstractItemModelTester, QTest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.theme import DARK, LIGHT, curve_colour
from app.panels.readings import ReadingsPanel
from app.panels.readings.panel import HINT
from stackcore.propagation import solve
from tests.app.panels.results import Told, answer_to, slab_job

GHZ = 1e9
CTRL = Qt.KeyboardModifier.ControlModifier
offscreen_says = pytest.mark.qt_log_ignore("This plugin does not support", extend=True)


@dataclass
class Bench:
    """The panel with everything it stands on."""

    qtbot: QtBot
    session: Session = field(default_factory=lambda: Session(slab_job()))
    view: View = field(default_factory=View)
    told: Told = field(default_factory=Told)

    def __post_init__(self) -> None:
        self.panel = ReadingsPanel(self.session, self.view, LIGHT, self.told)
        self.qtbot.addWidget(self.panel)
        self.panel.resize(800, 200)
        self.panel.show()
        self.qtbot.waitExposed(self.panel)

    def answer(self, stack: int = 0) -> None:
        """Show the answer for one stack of the job."""
        self.panel.show_answer(answer_to(self.session, self.view, stack))

    def index(self, row: int, column: int) -> QModelIndex:
        """Return a cell."""
        return self.panel.model.index(row, column)

    def text(self, row: int, column: int) -> str:
        """Return the text of a cell."""
        return str(self.panel.model.data(self.index(row, column)))


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """Readings of a slab at two markers, the first between two frequencies of the sweep."""
    found = Bench(qtbot)
    found.view.set(markers=(9.4321 * GHZ, 11 * GHZ))
    found.answer()
    yield found
    found.panel.hide()


def test_the_model_keeps_the_rules_of_models(qtbot: QtBot) -> None:
    """Qt's own tester finds nothing wrong while markers come and go and quantities change."""
    bench = Bench(qtbot)
    tester = QAbstractItemModelTester(bench.panel.model, QAbstractItemModelTester.FailureReportingMode.Fatal)
    bench.answer()
    for markers in ((9 * GHZ,), (9 * GHZ, 10 * GHZ), (9.5 * GHZ, 10 * GHZ), ()):
        bench.view.set(markers=markers)
        bench.answer()
    for quantity in ("insertion_loss_dB", "group_delay_s"):
        bench.view.set(quantity=quantity, polarizations=("TM",))
    assert bench.panel.model.columnCount() == 3
    assert tester.model() is bench.panel.model
    bench.panel.hide()


def test_a_marker_reads_the_exact_value(bench: Bench) -> None:
    """Between two frequencies of the sweep the value is the one solved there, not a neighbour's."""
    stack = bench.session.job.stacks[0]
    exact = solve(stack, np.array([9.4321 * GHZ]), np.radians([60.0])).transmittance[0, 0, 0]
    reading = bench.panel.model.reading(bench.index(0, 4))
    assert reading is not None
    assert reading.value == pytest.approx(exact, rel=1e-12)
    assert bench.text(0, 4) == f"{exact:.4f}"
    assert reading.exact in str(bench.panel.model.data(bench.index(0, 4), Qt.ItemDataRole.ToolTipRole))


def test_headers_name_curves_and_markers(bench: Bench) -> None:
    """Columns are curves, rows are markers with their numbers, the last rows are their difference and the worst."""
    model = bench.panel.model
    across = [model.headerData(column, Qt.Orientation.Horizontal) for column in range(model.columnCount())]
    assert across == ["TE 0°", "TM 0°", "TE 30°", "TM 30°", "TE 60°", "TM 60°"]
    down = [model.headerData(row, Qt.Orientation.Vertical) for row in range(model.rowCount())]
    assert down == ["1   9.4321 GHz", "2   11 GHz", "2 less 1: 1.5679 GHz", "Worst"]


def test_a_worst_value_says_where(bench: Bench) -> None:
    """The worst value of a column carries its own frequency."""
    response = answer_to(bench.session, bench.view).response
    column = response.transmittance[:, 2, 0]
    place = int(np.argmin(column))
    assert bench.text(3, 4) == f"{column[place]:.4f} at {response.frequency[place] / GHZ:g} GHz"


def test_numbers_are_cut_at_their_point(bench: Bench) -> None:
    """Whole part, rest and unit come apart, so that a column can be aligned."""
    bench.view.set(quantity="insertion_loss_dB")
    cell = bench.panel.model.cell_text(bench.index(0, 4))
    assert cell.whole.isdigit()
    assert cell.rest.startswith(".")
    assert cell.unit == " dB"


def test_the_names_have_the_colours_of_their_curves(bench: Bench) -> None:
    """The colour of a curve is found in its header, in either theme."""
    for theme in (LIGHT, DARK):
        bench.panel.set_theme(theme)
        colour = curve_colour(theme, "transmittance", 2, 3)
        image = bench.panel.table.curve_header.grab().toImage()
        found = sum(
            image.pixelColor(x, y).name() == colour for x in range(image.width()) for y in range(image.height())
        )
        assert found > 20
        assert image.pixelColor(1, 1).name() == theme.base


def test_one_value_is_copied_with_its_unit(bench: Bench) -> None:
    """Ctrl+C on one cell gives every digit and the unit."""
    bench.view.set(quantity="insertion_loss_dB")
    bench.panel.table.setCurrentIndex(bench.index(0, 4))
    QTest.keyClick(bench.panel.table, Qt.Key.Key_C, CTRL)
    text = QGuiApplication.clipboard().text()
    reading = bench.panel.model.reading(bench.index(0, 4))
    assert reading is not None
    assert text == f"{reading.value!r} dB"
    assert bench.told.words == [(f"Copied {text}.", "note")]


def test_several_values_are_copied_as_a_table(bench: Bench) -> None:
    """A block is copied with the names of its rows and columns, tabs between them."""
    bench.panel.table.setCurrentIndex(bench.index(0, 0))
    selection = bench.panel.table.selectionModel()
    for row in (0, 1):
        for column in (0, 1):
            selection.select(bench.index(row, column), selection.SelectionFlag.Select)
    QTest.keyClick(bench.panel.table, Qt.Key.Key_C, CTRL)
    cells = [line.split("\t") for line in QGuiApplication.clipboard().text().splitlines()]
    assert cells[0] == ["Transmittance", "TE 0°", "TM 0°"]
    assert [line[0] for line in cells[1:]] == ["9.4321 GHz", "11 GHz"]
    assert float(cells[1][1]) == pytest.approx(float(cells[1][2]), rel=1e-12)


def test_everything_is_copied_when_nothing_is_chosen(bench: Bench) -> None:
    """Without a selection the whole table goes to the clipboard."""
    bench.panel.table.clearSelection()
    bench.panel.copy()
    lines = QGuiApplication.clipboard().text().splitlines()
    assert len(lines) == 5
    assert all(len(line.split("\t")) == 7 for line in lines)


def test_a_click_chooses_marker_and_curve(bench: Bench) -> None:
    """The wall drawing shows what was clicked."""
    at = bench.panel.table.visualRect(bench.index(1, 3)).center()
    QTest.mouseClick(bench.panel.table.viewport(), Qt.MouseButton.LeftButton, pos=at)
    state = bench.view.state
    assert (state.active_marker, state.active_angle, state.active_polarization) == (1, 1, "TM")


def test_delete_removes_the_marker_of_the_row(bench: Bench) -> None:
    """The row goes, the one after it is chosen; the worst values cannot be removed."""
    bench.panel.table.setCurrentIndex(bench.index(0, 2))
    QTest.keyClick(bench.panel.table, Qt.Key.Key_Delete)
    assert bench.view.state.markers == (11 * GHZ,)
    assert bench.panel.table.currentIndex().row() == 0
    bench.panel.table.setCurrentIndex(bench.index(1, 2))
    QTest.keyClick(bench.panel.table, Qt.Key.Key_Delete)
    assert bench.view.state.markers == (11 * GHZ,)


def test_without_markers_it_says_how_to_make_one(bench: Bench) -> None:
    """The hint is there when there is no marker, and only then."""
    assert not bench.panel.hint.isVisible()
    bench.view.set(markers=())
    assert bench.panel.hint.isVisible()
    assert bench.panel.hint.text() == HINT


def test_a_moved_marker_keeps_the_selection(bench: Bench) -> None:
    """Values that change alone are told as such, and the chosen cell stays."""
    bench.panel.table.setCurrentIndex(bench.index(1, 3))
    before = bench.text(1, 3)
    bench.view.set(markers=(9.4321 * GHZ, 11.5 * GHZ))
    bench.answer()
    assert bench.panel.table.currentIndex() == bench.index(1, 3)
    assert bench.text(1, 3) != before


def test_infinite_readings_are_written_and_copied(bench: Bench) -> None:
    """Behind a metal back the loss reads ∞ and is copied as inf."""
    bench.view.set(quantity="insertion_loss_dB")
    bench.answer(stack=1)
    assert bench.text(0, 0) == "∞ dB"
    reading = bench.panel.model.reading(bench.index(0, 0))
    assert reading is not None
    assert reading.exact == "inf dB"
    assert not bench.panel.grab().isNull()


def test_stale_readings_are_muted_and_said(bench: Bench) -> None:
    """Numbers of an earlier job lose their strength, and screen readers are told."""
    fresh = bench.panel.table.grab().toImage()
    bench.panel.set_stale(True)
    assert bench.panel.table.accessibleDescription() == "Last good result."
    assert bench.panel.table.grab().toImage() != fresh
    bench.panel.set_stale(False)
    assert bench.panel.table.accessibleDescription() == ""


@offscreen_says
def test_the_menu_copies_and_removes(bench: Bench) -> None:
    """A right click offers what keys do, for the row under the mouse."""
    at = bench.panel.table.visualRect(bench.index(0, 1)).center()
    bench.panel.table.customContextMenuRequested.emit(at)
    menu = bench.panel.menu
    by_text = {action.text().split("\t")[0]: action for action in menu.actions()}
    by_text["Copy all readings"].trigger()
    assert QGuiApplication.clipboard().text() == bench.panel.table_text()
    by_text["Remove marker"].trigger()
    assert bench.view.state.markers == (11 * GHZ,)
    menu.close()


def test_many_angles_scroll(bench: Bench) -> None:
    """A sweep of many angles has a column for each curve and still paints."""
    assert bench.session.apply(edits.set_angle_grid("0 deg", "80 deg", 41)) == ()
    bench.answer()
    assert bench.panel.model.columnCount() == 82
    assert not bench.panel.grab().isNull()
