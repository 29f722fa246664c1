"""The page of findings: what the health check says of the job's materials."""

from PySide6.QtCore import Qt
from PySide6.QtTest import QAbstractItemModelTester
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import job_cell
from app.panels.materials.checks import ALL_WELL
from app.panels.materials.findings import FindingsModel, Told
from app.panels.materials.panel import CHECKS, OWN
from stackcore.media.health import Finding
from tests.app.panels.materials.conftest import Shown, press

Key = Qt.Key


def open_checks(shown: Shown, qtbot: QtBot) -> None:
    """Open the page and wait until everything is checked."""
    shown.panel.pages.setCurrentIndex(CHECKS)
    qtbot.waitUntil(lambda: not shown.panel.checks.busy, timeout=10_000)


def test_a_range_that_is_left_is_listed_with_place_reason_and_hint(shown: Shown, qtbot: QtBot) -> None:
    """Copper, known to 300 GHz, swept to 400 GHz: the finding names the range, and the page counts it."""
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "400 GHz"))
    open_checks(shown, qtbot)
    told = [one for one in shown.panel.checks.told if one.name == "copper" and one.finding.topic == "range"]

    assert len(told) == 1
    assert told[0].heading == "Doubtful: Copper, valid range"
    assert "1 Hz to 300 GHz" in told[0].body
    assert told[0].finding.hint.split(",")[0].lower() in told[0].body.lower()
    warnings = [one for one in shown.panel.checks.told if one.finding.severity != "note"]
    assert shown.panel.pages.tabText(CHECKS) == f"Checks ({len(warnings)})"


def test_a_conductivity_that_looks_like_a_resistivity_is_found(shown: Shown, qtbot: QtBot) -> None:
    """1.7e-8 S/m for a conductor is listed, and Enter goes to the material."""
    shown.panel.add_conductor()
    shown.session.apply(edits.rename_material("material", "foil"))
    shown.type("foil", "conductivity", "1.7e-8 S/m")
    open_checks(shown, qtbot)
    told = shown.panel.checks.told
    place = next(row for row, one in enumerate(told) if one.name == "foil" and one.finding.topic == "units")
    found = shown.panel.checks.list
    found.setCurrentIndex(found.model().index(place, 0))
    found.setFocus()
    press(Key.Key_C, Qt.KeyboardModifier.ControlModifier)

    assert "resistivity" in QApplication.clipboard().text()
    press(Key.Key_Return)
    assert shown.panel.pages.currentIndex() == OWN
    assert shown.panel.table.current_name() == "foil"


def test_findings_follow_the_edits_while_they_are_looked_at(shown: Shown, qtbot: QtBot) -> None:
    """A sweep back inside the ranges takes the finding away, and nothing left says that all is well."""
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "400 GHz"))
    open_checks(shown, qtbot)
    assert any(one.finding.topic == "range" for one in shown.panel.checks.told)
    shown.session.undo()
    qtbot.waitUntil(lambda: not shown.panel.checks.busy, timeout=10_000)

    assert not any(one.finding.topic == "range" for one in shown.panel.checks.told)
    shown.session.apply(edits.remove_material("copper"))
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.start"), "9 GHz"))
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "9.5 GHz"))
    qtbot.waitUntil(lambda: not shown.panel.checks.busy, timeout=10_000)
    assert shown.panel.checks.told == ()
    assert ALL_WELL in shown.sentences()


def test_worst_findings_come_first_and_the_model_is_true(qtbot: QtBot) -> None:
    """Errors before warnings before notes, under Qt's own checker."""
    model = FindingsModel()
    tester = QAbstractItemModelTester(model, QAbstractItemModelTester.FailureReportingMode.Fatal)
    note = Finding("note", "causality", "", "agrees", "")
    gain = Finding("error", "passivity", "permittivity", "the permittivity has gain", "see the signs")
    model.show_told([Told("a", "A", note), Told("b", "B", gain)])

    assert [one.name for one in model.told] == ["b", "a"]
    assert model.index(0).data() == "Wrong: B, permittivity"
    assert model.index(0).data(Qt.ItemDataRole.AccessibleTextRole) == (
        "Wrong: B, permittivity.\nThe permittivity has gain. See the signs."
    )
    model.show_told([])
    assert tester is not None
