"""The main path of a person who uses no mouse: open, edit, see, take back, export, save."""

import csv
from pathlib import Path

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtWidgets import QApplication

from stackcore import read_job, solve
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
