"""Lists of constants and tables of measured data, edited as rows."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from PySide6.QtCore import Qt
from PySide6.QtTest import QAbstractItemModelTester, QTest
from PySide6.QtWidgets import QApplication, QLineEdit

from app.document import edits
from app.document.session import Session
from app.panels.material_data.facts import lists_of
from app.panels.material_data.terms import TermsModel
from app.panels.tables.delegate import Ask
from stackcore.job.records import MaterialRecord
from stackcore.media.models import MODELS
from tests.app.panels.material_data.conftest import Bench

Key = Qt.Key


def press(key: Qt.Key) -> None:
    """Press a key wherever the focus is."""
    focus = QApplication.focusWidget()
    assert focus is not None
    QTest.keyClick(focus, key)


def session_with(model: str) -> Session:
    """Return a session whose job has a material of a model."""
    session = Session()
    session.apply(edits.add_material(MaterialRecord("trial", model=model, constants=MODELS[model].start())))
    return session


@given(steps=st.lists(st.tuples(st.integers(0, 5), st.integers(0, 3)), max_size=12))
@settings(max_examples=30, deadline=None)
@pytest.mark.usefixtures("qapp")
def test_model_tells_the_truth_through_everything(steps: list[tuple[int, int]]) -> None:
    """Through rows added, removed and typed, other materials and undo, Qt's checker agrees with the document."""
    session = session_with("multi-debye")
    model = TermsModel(session)
    tester = QAbstractItemModelTester(model, QAbstractItemModelTester.FailureReportingMode.Fatal)
    for kind, a in steps:
        match kind:
            case 0:
                session.apply(edits.add_row("trial", "terms", a))
            case 1:
                session.apply(edits.remove_row("trial", "terms", a))
            case 2 if a < model.rowCount():
                model.setData(model.index(a, 0), f"{a + 0.5}")
            case 3 if a < model.rowCount():
                model.setData(model.index(a, 1), "no time")
            case 4:
                session.undo()
            case _:
                session.redo()
        material = session.record.material("trial")
        rows = material.constants["terms"] if material is not None else ()
        model.show_list("trial", lists_of(session.document, "trial")[0] if material is not None else None)
        assert isinstance(rows, tuple)
        assert model.rowCount() == len(rows)
    del tester


def test_rows_by_the_keyboard(bench: Bench) -> None:
    """Insert adds a row behind the current one, F2 types into it, Delete removes it; each is one step back."""
    bench.add("multi-debye")
    table, model = bench.page.table, bench.page.terms
    table.setFocus()
    table.go(model.index(0, 0))
    press(Key.Key_Insert)
    assert model.rowCount() == 2
    assert table.currentIndex().row() == 1
    press(Key.Key_F2)
    line = QApplication.focusWidget()
    assert isinstance(line, QLineEdit)
    line.selectAll()
    QTest.keyClicks(line, "12.5")
    press(Key.Key_Return)

    assert model.index(1, 0).data() == "12.5"
    table.setFocus()
    table.go(model.index(1, 0))
    press(Key.Key_Delete)
    assert model.rowCount() == 1
    bench.session.undo()
    assert model.index(1, 0).data() == "12.5"


def test_bad_cell_keeps_its_text_and_reason(bench: Bench) -> None:
    """A time that is none stays in its cell, marked, and the medium keeps the good value."""
    bench.add("multi-debye")
    model = bench.page.terms
    before = bench.session.job.media["trial"]

    assert not model.setData(model.index(0, 1), "soon")
    assert model.index(0, 1).data() == "soon"
    assert model.index(0, 1).data(Ask.FAULT) is not None
    assert "soon" in str(model.index(0, 1).data(Qt.ItemDataRole.ToolTipRole))
    assert bench.session.job.media["trial"] == before
    assert model.setData(model.index(0, 1), "8 ps")
    assert model.index(0, 1).data(Ask.FAULT) is None


def test_last_row_is_kept(bench: Bench) -> None:
    """A sum needs a term: removing the last one is refused and told."""
    bench.add("multi-debye")
    bench.page.table.go(bench.page.terms.index(0, 0))
    bench.page.table.setFocus()
    press(Key.Key_Delete)

    assert bench.page.terms.rowCount() == 1
    assert bench.told[-1][1] == "error"


def test_titles_and_materials_offered(bench: Bench) -> None:
    """Columns have words and symbol; where a material is named the others of the job are offered."""
    bench.add("mixture")
    model = bench.page.terms
    titles = [model.headerData(column, Qt.Orientation.Horizontal) for column in range(model.columnCount())]

    assert titles == ["Material", "Share"]
    assert model.offers(model.index(0, 0)) == ("ptfe", "air", "vacuum")
    assert model.offers(model.index(0, 1)) == ()
    bench.add("multi-debye", "oil")
    assert model.headerData(1, Qt.Orientation.Horizontal) == "Relaxation time τ"
