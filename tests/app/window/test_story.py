"""The main path of a person who uses no mouse: open, edit, see, take back, export, save."""

import csv
from functools import partial
from pathlib import Path

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QKeySequence
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QWidget

from app.window.beside import BESIDE
from app.window.panels import has_focus
from stackcore import read_job, solve
from stackcore.job.records import LayerRecord
from tests.app.window.conftest import Bench
from tests.app.window.scripted import job_file

Key = Qt.Key
CTRL = Qt.KeyboardModifier.ControlModifier


def shown_curve(bench: Bench) -> np.ndarray:
    """Return the first curve that the plot shows."""
    bench.settle()
    return np.array(bench.window.panels.curves.curves[0].y)


def test_the_main_path_by_keys_alone(bench: Bench, tmp_path: Path) -> None:
    """A thickness typed into the table changes curve, table, file and export, and can be taken back."""
    path, table, saved = job_file(tmp_path), tmp_path / "cover.csv", tmp_path / "mine.slabjob"
    bench.dialogs.open_paths = [path]
    bench.press(Key.Key_O, CTRL)
    assert bench.session.path == path
    before = shown_curve(bench)

    go_to_the_table(bench)
    bench.press(Key.Key_Home, CTRL)
    bench.press(Key.Key_Down)
    bench.press(Key.Key_Down)
    bench.press(Key.Key_End)
    bench.type("2.5 mm")
    bench.press(Key.Key_Return)
    assert bench.session.undo_sentence == "set thickness of layer 2 to 2.5 mm"
    after = shown_curve(bench)
    assert not np.allclose(after, before)
    job = bench.session.job
    expected = solve(job.stacks[0], job.sweep.frequencies(), job.sweep.angles()).transmittance[:, 0, 0]
    assert after == pytest.approx(expected)

    bench.press(Key.Key_Z, CTRL)
    assert shown_curve(bench) == pytest.approx(before)
    bench.press(Key.Key_Y, CTRL)
    assert shown_curve(bench) == pytest.approx(after)

    bench.dialogs.csv_paths = [table]
    bench.press(Key.Key_E, CTRL)
    bench.qtbot.waitUntil(table.exists)
    with table.open(encoding="utf-8", newline="") as file:
        rows = [row for row in csv.DictReader(file) if (row["stack"], row["angle_deg"]) == ("A", "0.0")]
    te = [float(row["transmittance"]) for row in rows if row["polarization"] == "TE"]
    assert te == pytest.approx(expected)

    bench.dialogs.save_paths = [saved]
    bench.press(Key.Key_S, CTRL | Qt.KeyboardModifier.ShiftModifier)
    assert read_job(saved).record.stacks[0].elements == job.record.stacks[0].elements
    assert '"thickness": "2.5 mm"' in saved.read_text(encoding="utf-8")
    assert not bench.session.modified


def test_a_text_that_is_no_thickness_stays_and_can_be_mended_by_keys(bench: Bench) -> None:
    """The cell keeps what was typed, the curves are marked as old, and typing again mends it."""
    go_to_the_table(bench)
    bench.press(Key.Key_Home, CTRL)
    bench.press(Key.Key_Down)
    bench.press(Key.Key_End)
    bench.type("2 GHz")
    bench.press(Key.Key_Return)
    assert [draft.text for draft in bench.session.document.drafts] == ["2 GHz"]
    assert "2 GHz" in bench.window.status.told
    bench.press(Key.Key_Up)
    bench.type("2 mm")
    bench.press(Key.Key_Return)
    assert bench.session.document.drafts == ()
    bench.settle()
    bench.qtbot.waitUntil(lambda: "GHz" not in bench.window.status.told)


def test_delete_in_a_text_field_deletes_a_letter_and_no_element(bench: Bench) -> None:
    """Keys of the elements work in the table and the drawing, not while a value is typed elsewhere."""
    elements = bench.session.record.stacks[0].elements
    go_to_the_table(bench)
    bench.press(Key.Key_Down)
    for _ in range(8):
        bench.press(Key.Key_F6)
        focus = QApplication.focusWidget()
        if focus is not None and bench.window.panels.sweep.isAncestorOf(focus):
            break
    bench.press(Key.Key_Delete)
    assert bench.session.record.stacks[0].elements == elements


def go_to_the_table(bench: Bench) -> None:
    """Press F6 until the focus is in the table."""
    table = bench.window.panels.elements
    for _ in range(8):
        focus = QApplication.focusWidget()
        if focus is not None and (focus is table or table.isAncestorOf(focus)):
            return
        bench.press(Key.Key_F6)
    raise AssertionError("F6 does not reach the table")


@pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
def test_a_wall_is_built_looked_at_and_kept_by_keys_alone(bench: Bench, tmp_path: Path) -> None:
    """A layer added, its material and its thickness typed, a marker, every panel beside, and the file saved."""
    go_to_the_table(bench)
    count = len(bench.session.record.stacks[0].elements)
    bench.press(Key.Key_End, CTRL)
    bench.press(Key.Key_L, CTRL)
    bench.type("core")
    bench.press(Key.Key_Return)
    go_to_the_table(bench)
    bench.press(Key.Key_Home, CTRL)
    for _ in range(count + 1):
        bench.press(Key.Key_Down)
    column = [shown.name for shown in bench.window.panels.elements.table.elements_model().columns]
    bench.press(Key.Key_Home)
    for _ in range(column.index("thickness")):
        bench.press(Key.Key_Right)
    bench.type("2*0.25 mm + 5 mil")
    bench.press(Key.Key_Return)
    elements = bench.session.record.stacks[0].elements
    assert len(elements) == count + 1
    made = elements[count]
    assert isinstance(made, LayerRecord)
    assert made.material == "core"
    assert made.thickness.text == "2*0.25 mm + 5 mil"
    # 0.5 mm and five thousandths of an inch of 25.4 mm.
    assert made.thickness.value == pytest.approx(0.5e-3 + 5 * 25.4e-6)

    bench.press(Key.Key_K, CTRL)
    frequency = active_marker(bench)
    focus_on(bench, bench.window.panels.curves)
    bench.press(Key.Key_Right)
    assert active_marker(bench) > frequency

    for beside in (one for one in BESIDE if one.in_menu):
        panel = getattr(bench.window.panels, beside.name)
        press_keys(beside.shortcut)
        bench.qtbot.waitUntil(panel.isVisible)
        focus_on(bench, panel)
        press_keys(beside.shortcut)
        bench.qtbot.waitUntil(partial(_is_gone, panel))

    saved = tmp_path / "built.slabjob"
    bench.dialogs.save_paths = [saved]
    bench.press(Key.Key_S, CTRL)
    assert read_job(saved).record == bench.session.record
    assert not bench.session.modified


def _is_gone(panel: QWidget) -> bool:
    return not panel.isVisible()


def active_marker(bench: Bench) -> float:
    """Return the frequency of the marker that keys move, in Hz."""
    return bench.view.state.markers[bench.view.state.active_marker]


def press_keys(keys: str) -> None:
    """Press a shortcut where the focus is."""
    focus = QApplication.focusWidget()
    assert focus is not None
    QTest.keySequence(focus, QKeySequence(keys))


def focus_on(bench: Bench, panel: QWidget) -> None:
    """Press F6 until the focus is in a panel."""
    for _ in range(16):
        if has_focus(panel):
            return
        bench.press(Key.Key_F6)
    raise AssertionError(f"F6 does not reach {type(panel).__name__}")
