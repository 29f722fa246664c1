"""Twenty things that users of desktop engineering tools ask for, each shown on a whole window.

The list is common practice, gathered from public complaints about other kinds of tools; what a single panel does in
detail is tested with that panel.
"""

import csv
import io
from pathlib import Path

import numpy as np
import pytest
from PySide6.QtCore import QPoint, QPointF, QSettings, Qt, QTimer
from PySide6.QtGui import QGuiApplication, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import (
    QAbstractSlider,
    QApplication,
    QComboBox,
    QLineEdit,
    QPushButton,
    QScrollBar,
    QSpinBox,
    QToolButton,
)
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import Cell, Selection
from app.document.session import Session
from app.document.view import View
from app.look.pictures import svg_bytes
from app.look.theme import DARK, LIGHT, curve_colour
from app.panels.elements.columns import columns_of
from app.window.beside import BESIDE, CUTS, MAP
from app.window.main_window import MainWindow
from app.window.recovery import Recovery
from stackcore.cli import main
from stackcore.job import read_job
from stackcore.job.records import LayerRecord
from tests.app.window.conftest import Bench
from tests.app.window.scripted import ScriptedDialogs, job_file


def layer(bench: Bench, row: int) -> LayerRecord:
    """Return a layer of the first stack."""
    element = bench.session.record.stacks[0].elements[row]
    assert isinstance(element, LayerRecord)
    return element


def type_over(field: QLineEdit, text: str) -> None:
    """Type over a field and press Enter."""
    field.setFocus()
    field.selectAll()
    QTest.keyClicks(field, text)
    QTest.keyClick(field, Qt.Key.Key_Return)


def test_01_any_unit_and_arithmetic_in_any_field(bench: Bench) -> None:
    """In the table and in the sweep; the text stays as it was typed."""
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "1/8 in - 2*0.25 mm"))
    assert layer(bench, 0).thickness.value == pytest.approx(25.4e-3 / 8 - 0.5e-3)
    assert layer(bench, 0).thickness.text == "1/8 in - 2*0.25 mm"
    type_over(bench.window.panels.sweep.field("sweep.frequency.start"), "8200 MHz")
    assert bench.session.job.sweep.frequencies()[0] == pytest.approx(8.2e9)


def test_02_a_block_from_a_spreadsheet_with_decimal_commas(bench: Bench) -> None:
    """Header with a unit, commas for points; one step of undo."""
    before = bench.session.record
    QGuiApplication.clipboard().setText("Material\tThickness (mm)\r\ncore\t2,5\r\nskin\t0,75\r\n")
    bench.window.panels.elements.paste()
    new = [
        one.thickness.value for one in bench.session.record.stacks[0].elements[-2:] if isinstance(one, LayerRecord)
    ]
    assert new == pytest.approx([2.5e-3, 0.75e-3])
    bench.session.undo()
    assert bench.session.record == before


def test_03_copied_out_as_a_spreadsheet_reads_it(bench: Bench) -> None:
    """Tabs and a header; what is pasted back is the same."""
    panel, elements = bench.window.panels.elements, bench.session.record.stacks[0].elements
    panel.table.select_elements(tuple(range(len(elements))))
    panel.copy()
    rows = list(csv.reader(io.StringIO(QGuiApplication.clipboard().text()), dialect="excel-tab"))
    assert rows[0] == [column.title for column in columns_of(bench.session.document, 0)]
    assert len(rows) == len(elements) + 1
    panel.paste()
    assert bench.session.record.stacks[0].elements == (*elements, *elements)


def test_04_undo_for_everything_from_any_focus_with_names(bench: Bench) -> None:
    """Wherever the focus is, the key takes back the last step, and the menu names it."""
    start = bench.session.record
    bench.session.apply(edits.set_back(0, "metal"))
    bench.session.apply(edits.new_condition())
    bench.session.apply(edits.set_title("Renamed"))
    for panel, words in (("curves", "title"), ("wall", "condition"), ("elements", "back")):
        assert words in bench.window.actions_table["edit.undo"].text()
        getattr(bench.window.panels, panel).setFocus()
        bench.press(Qt.Key.Key_Z, Qt.KeyboardModifier.ControlModifier)
    assert bench.session.record == start


def test_05_the_window_never_freezes(bench: Bench) -> None:
    """While a map of a hundred thousand cells is computed and a sweep of as many points, the window lives on."""
    bench.trigger(f"view.{MAP.name}")
    bench.session.apply(edits.set_frequency_grid("8 GHz", "12 GHz", 20_001, "linear"))
    ticks: list[int] = []
    timer = QTimer(bench.window)
    timer.timeout.connect(lambda: ticks.append(len(ticks)))
    timer.start(5)
    bench.qtbot.waitUntil(lambda: bench.window.recompute.up_to_date and len(ticks) > 20, timeout=30_000)
    timer.stop()


def test_06_progress_cancel_and_controls_back(bench: Bench, tmp_path: Path) -> None:
    """A long export is given up, leaves no file, and can begin again."""
    bench.session.apply(edits.set_frequency_grid("8 GHz", "12 GHz", 20_001, "linear"))
    target = tmp_path / "long.csv"
    bench.dialogs.csv_paths = [target]
    bench.trigger("file.export_csv")
    assert not bench.window.actions_table["file.export_csv"].isEnabled()
    (cancel,) = [one for one in bench.window.status.findChildren(QPushButton) if one.text() == "Cancel"]
    cancel.click()
    bench.qtbot.waitUntil(bench.window.actions_table["file.export_csv"].isEnabled, timeout=20_000)
    assert bench.window.actions_table["file.export_csv"].isEnabled()
    assert list(tmp_path.glob("long*")) == []


def test_07_a_crash_loses_nothing(bench: Bench, tmp_path: Path) -> None:
    """What was written beside is found by the next session; `test_killed` does it with a real kill."""
    bench.session.apply(edits.set_title("Not saved"))
    lost = Recovery(bench.session, tmp_path / "lost")
    lost.write()
    lost._lock.unlock()
    found = Recovery(Session(), tmp_path / "lost")
    (left,) = found.leftovers()
    assert left.job.record == bench.session.record
    left.discard()
    for one in (lost, found):
        one.close()


def test_08_the_plot_is_copied_in_one_action(bench: Bench) -> None:
    """Ctrl+C in the plot: pixels for mail, a drawing for reports."""
    bench.window.panels.curves.plot.setFocus()
    bench.press(Qt.Key.Key_C, Qt.KeyboardModifier.ControlModifier)
    data = QGuiApplication.clipboard().mimeData()
    assert data.hasImage()
    assert any("svg" in kind for kind in data.formats())


def test_09_vectors_that_open_elsewhere(bench: Bench) -> None:
    """Every plot and the wall: text is text, and nothing is pixels but the cells of a map."""
    for panel in (bench.window.panels.curves, bench.window.panels.cuts, bench.window.panels.plane):
        drawing = svg_bytes(panel.picture()).decode()
        assert "<text" in drawing
        assert "<image" not in drawing


def test_10_data_with_units_full_precision_and_all_curves(bench: Bench) -> None:
    """Each number reads back to the very double that is drawn."""
    panel = bench.window.panels.curves
    panel.copy_data()
    rows = list(csv.reader(io.StringIO(QGuiApplication.clipboard().text()), dialect="excel-tab"))
    assert rows[0][0] == "Frequency, Hz"
    assert len(rows[0]) == 1 + len(panel.curves)
    for column, curve in enumerate(panel.curves, 1):
        assert [float(row[column]) for row in rows[1:]] == curve.raw.tolist()


def test_10_a_wide_table_for_a_spreadsheet(bench: Bench, tmp_path: Path) -> None:
    """A row a frequency, a column a curve, of the quantity that is shown; the numbers are those of the curves."""
    bench.view.set(quantity="insertion_loss_dB")
    bench.settle()
    target = tmp_path / "wide.csv"
    bench.dialogs.csv_paths = [target]
    bench.trigger("file.export_wide")
    bench.qtbot.waitUntil(target.exists, timeout=20_000)
    with target.open(encoding="utf-8", newline="") as file:
        head, *rows = csv.reader(file)
    curve = bench.window.panels.curves.curves[0]
    assert head[0] == "frequency_Hz"
    assert head[1].startswith("A TE ")
    assert head[1].endswith("insertion_loss_dB")
    assert [float(row[1]) for row in rows] == curve.raw.tolist()


def test_11_earlier_runs_are_kept_overlaid_named_and_deleted(bench: Bench) -> None:
    """A variant lies beside the stack in hand under its own name, and goes with it."""
    bench.trigger("stack.duplicate")
    assert bench.session.apply(edits.rename_stack(1, "Thinner")) == ()
    bench.session.apply(edits.type_into(Cell(1, 0, "thickness"), "0.5 mm"))
    bench.session.select(Selection(0))
    bench.view.set(beside=("Thinner",))
    drawn = bench.window.panels.curves.plot.curve_layer
    bench.qtbot.waitUntil(lambda: any(curve.sign == 0 for curve in drawn.curves))
    bench.session.select(Selection(1))
    bench.trigger("stack.delete")
    bench.settle()
    assert all(curve.sign < 0 for curve in drawn.curves)


def test_12_markers_differences_and_one_cursor_for_all(bench: Bench) -> None:
    """Two markers give their difference, and stand in every plot over frequency."""
    bench.view.set(markers=(9e9, 11e9), active_marker=1)
    bench.settle()
    assert "2 less 1" in bench.window.panels.readings.table_text()
    assert len(bench.window.panels.curves.plot.marker_layer.markers) == 2
    bench.trigger("view.plane")
    bench.qtbot.waitUntil(lambda: bool(bench.window.panels.plane.layer.marks))
    assert {mark.text for mark in bench.window.panels.plane.layer.marks} >= {"1", "2"}


def test_13_limits_are_typed_fit_and_survive_edits(bench: Bench) -> None:
    """Typed ends stay while the stack changes; each axis goes back by itself."""
    plot = bench.window.panels.curves.plot
    plot.set_ranges((9.0, 10.0), (0.2, 0.6))
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "2 mm"))
    bench.settle()
    frame = plot.frame()
    assert (frame.left, frame.right, frame.bottom, frame.top) == pytest.approx((9.0, 10.0, 0.2, 0.6))
    plot.follow_positions()
    assert (plot.frame().bottom, plot.frame().top) == pytest.approx((0.2, 0.6))
    assert plot.frame().left == pytest.approx(8.0)


def test_14_the_wheel_never_changes_a_value(bench: Bench) -> None:
    """Over every choice, field and number of every panel, nothing becomes another one."""
    for beside in BESIDE:
        if beside.in_menu:
            bench.trigger(f"view.{beside.name}")
    bench.settle()
    record, view = bench.session.record, bench.view.state
    controls = [
        *bench.window.findChildren(QComboBox),
        *bench.window.findChildren(QSpinBox),
        *bench.window.findChildren(QLineEdit),
    ]
    before = [_shown(control) for control in controls]
    for control in controls:
        at = QPointF(control.rect().center())
        event = QWheelEvent(
            at,
            QPointF(control.mapToGlobal(at)),
            QPoint(0, 0),
            QPoint(0, 120),
            Qt.MouseButton.NoButton,
            Qt.KeyboardModifier.NoModifier,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(control, event)
    assert [_shown(control) for control in controls] == before
    assert bench.session.record is record
    assert bench.view.state == view
    assert len(controls) > 10


def _shown(control: object) -> str:
    if isinstance(control, QComboBox):
        return control.currentText()
    if isinstance(control, QSpinBox):
        return str(control.value())
    assert isinstance(control, QLineEdit)
    return control.text()


def test_15_errors_at_their_place_with_a_reason(bench: Bench) -> None:
    """The text stays in its cell, marked, and says why; the last good value goes on counting."""
    before = layer(bench, 0).thickness
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "2 GHz"))
    table = bench.window.panels.elements.table.elements_model()
    column = [one.name for one in table.columns].index("thickness")
    view = table.view(table.index(1, column))
    assert view.text == "2 GHz"
    assert view.fault is not None
    assert "is a frequency, not a length" in view.fault.message
    assert layer(bench, 0).thickness == before


def test_16_the_layout_and_recent_files_are_remembered(qtbot: QtBot, tmp_path: Path) -> None:
    """What was open beside is open again, and the file that was opened is offered."""
    job = job_file(tmp_path)
    for opened in (False, True):
        settings = QSettings(str(tmp_path / "kept.ini"), QSettings.Format.IniFormat)
        window = MainWindow(Session(), View(), settings, tmp_path, dialogs=ScriptedDialogs())
        qtbot.addWidget(window)
        window.show()
        qtbot.waitExposed(window)
        assert window.panels.cuts.isVisible() == opened
        if not opened:
            window.actions_table[f"view.{CUTS.name}"].trigger()
            window.open_path(job)
        assert str(job) in str(settings.allKeys()) + str([settings.value(key) for key in settings.allKeys()])
        window.close()


def test_17_colours_for_the_colour_blind_and_line_styles(bench: Bench) -> None:
    """Angles differ in lightness, polarizations in dashes, other stacks in signs: no hue is needed."""
    for theme in (LIGHT, DARK):
        light = [_luminance(curve_colour(theme, "transmittance", rank, 4)) for rank in range(4)]
        steps = np.diff(light)
        assert np.all(steps < 0) or np.all(steps > 0)
    bench.view.set(polarizations=("TE", "TM"))
    curves = bench.window.panels.curves.plot.curve_layer.curves
    assert curves[0].dashes != curves[1].dashes


def _luminance(colour: str) -> float:
    """Return the relative luminance of ``#rrggbb``.

    Source: WCAG 2.2, definition of relative luminance; recalled.
    """
    parts = np.array([int(colour[place : place + 2], 16) / 255 for place in (1, 3, 5)])
    linear = np.where(parts <= 0.04045, parts / 12.92, ((parts + 0.055) / 1.055) ** 2.4)
    return float(linear @ np.array([0.2126, 0.7152, 0.0722]))


def test_18_dark_with_the_plots_and_light_in_print(bench: Bench) -> None:
    """The plot's ground is dark; what is exported is on the ground of paper."""
    bench.window.set_theme_choice("dark")
    assert bench.window.panels.curves.plot.backgroundBrush().color().name() == DARK.base
    for panel in (bench.window.panels.curves, bench.window.panels.cuts, bench.window.panels.map):
        assert panel.picture().background == LIGHT.base


def test_19_the_same_file_without_a_window_has_the_same_numbers(bench: Bench, tmp_path: Path) -> None:
    """The table that the command writes has the very numbers of the curves."""
    saved, table = tmp_path / "same.slabjob", tmp_path / "same.csv"
    bench.session.save(saved)
    assert main(["sweep", str(saved), "--csv", str(table)]) == 0
    bench.view.set(quantity="transmittance", power="fraction", polarizations=("TE",))
    bench.settle()
    curve = bench.window.panels.curves.curves[0]
    with table.open(encoding="utf-8", newline="") as file:
        rows = [row for row in csv.DictReader(file) if row["stack"] == "A" and row["polarization"] == "TE"]
    first = rows[0]["angle_deg"]
    told = [float(row["transmittance"]) for row in rows if row["angle_deg"] == first]
    assert told == curve.raw.tolist()
    assert read_job(saved).record == bench.session.record


def test_20_sharp_by_keyboard_and_no_slider(bench: Bench) -> None:
    """No number is set by a slider alone, and every button is reached by Tab or stands in a menu with a key."""
    for beside in BESIDE:
        if beside.in_menu:
            bench.trigger(f"view.{beside.name}")
    sliders = [one for one in bench.window.findChildren(QAbstractSlider) if not isinstance(one, QScrollBar)]
    assert sliders == []
    unreached = [
        button.text()
        for button in bench.window.findChildren(QToolButton)
        if button.isVisible() and button.text() and not button.focusPolicy() & Qt.FocusPolicy.TabFocus
    ]
    assert unreached == []
