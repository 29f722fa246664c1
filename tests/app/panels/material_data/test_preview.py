"""Columns pasted into a table of measured data: understood aloud, asked about, taken as one step."""

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication

from stackcore.units import Measure
from tests.app.panels.material_data.conftest import Bench, choose

CLEAR = "f (GHz); eps_r; tan d\n8,2; 4,31; 0,014\n10; 4,3; 0,015\n12,4; 4,28; 0,016\n"
BARE = "8.2 4.31 0.014\n10 4.3 0.015\n12.4 4.28 0.016\n"


@pytest.fixture
def table(bench: Bench) -> Bench:
    """A table of measured data, looked at."""
    bench.add("tabulated")
    return bench


def test_pasted_columns_become_the_rows_as_one_step(table: Bench) -> None:
    """Ctrl+V in the table opens the preview with the clipboard; Take replaces all rows, undo brings them back."""
    before = table.record()
    QApplication.clipboard().setText(CLEAR)
    table.page.table.setFocus()
    QTest.keyClick(table.page.table, Qt.Key.Key_V, Qt.KeyboardModifier.ControlModifier)
    preview = table.page.preview
    assert preview.isVisible()
    assert "3 rows of 3 columns" in preview.understood.text()
    assert "decimal comma" in preview.understood.text().lower()
    assert "8.2 GHz: ε′ 4.31, tan δ 0.014" in preview.understood.text()
    QTest.mouseClick(preview.accept, Qt.MouseButton.LeftButton)

    medium = table.session.job.media["trial"]
    value = complex(medium.evaluate(np.array([1e10])).permittivity[0])
    assert value == pytest.approx(4.3 - 0.0645j)
    assert table.page.terms.rowCount() == 3
    assert table.page.terms.index(0, 0).data() == "8.2 GHz"
    assert not preview.isVisible()
    table.session.undo()
    assert table.record() == before


def test_what_is_not_said_is_asked_with_what_is_assumed(table: Bench) -> None:
    """Columns without headings are asked for; another answer changes what is understood, Take accepts the rest."""
    table.page.open_preview(BARE)
    preview = table.page.preview
    assert set(preview.choices) >= {"column 1", "column 2", "column 3", "unit of column 1"}
    assert preview.choices["unit of column 1"].currentData() == "GHz"
    assert preview.accept.isEnabled()
    choose(preview.choices["column 3"], "loss")
    assert preview.choices["column 3"].currentData() == "loss"
    choose(preview.choices["unit of column 1"], "MHz")
    assert "8.2 MHz: ε′ 4.31, tan δ 0.003248" in preview.understood.text()
    preview.accept.click()

    first = table.rows("rows")[0]
    assert first["permittivity"] == 4.31 - 0.014j
    assert first["frequency"] == Measure(8.2e6, "8.2 MHz")


def test_faults_are_told_by_line_and_nothing_can_be_taken(table: Bench) -> None:
    """A gain and a word are told with their lines; the text stays to be mended."""
    table.page.open_preview("f (GHz) eps_r tan_d\n8 4.3 0.01\n9 much 0.01\n10 4.3 -0.02\n")
    preview = table.page.preview

    assert not preview.accept.isEnabled()
    assert "line 3" in preview.faults.text()
    assert "'much'" in preview.faults.text()
    assert "much" in preview.text.toPlainText()
    preview.paste(CLEAR)
    assert preview.accept.isEnabled()
    assert not preview.faults.isVisible()


def test_cancel_leaves_everything(table: Bench) -> None:
    """Cancel closes the preview and brings the rows back."""
    before = table.record()
    table.page.open_preview(CLEAR)
    assert not table.page.table.isVisible()
    table.page.preview.cancel.click()

    assert table.page.table.isVisible()
    assert table.record() == before


def test_typing_is_read_after_a_pause(table: Bench) -> None:
    """What is typed rather than pasted is read as well, once the keys rest."""
    table.page.open_preview()
    assert not table.page.preview.accept.isEnabled()
    table.page.preview.text.setPlainText(CLEAR)
    table.qtbot.waitUntil(table.page.preview.accept.isEnabled)


def test_only_tables_take_columns(bench: Bench) -> None:
    """A list of relaxations has no place for measured columns; a table has."""
    bench.add("multi-debye")
    QApplication.clipboard().setText(CLEAR)
    bench.page.table.setFocus()
    QTest.keyClick(bench.page.table, Qt.Key.Key_V, Qt.KeyboardModifier.ControlModifier)
    assert not bench.page.preview.isVisible()
    assert bench.page.terms.rowCount() == 1
