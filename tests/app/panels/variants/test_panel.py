"""The stacks of a job beside each other."""

from collections.abc import Iterator

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QAbstractItemModelTester
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.condition_edits import PRESETS
from app.document.document import Cell, Selection
from app.document.session import Session
from app.document.view import View, ViewState
from app.look.theme import DARK, LIGHT
from app.panels.variants.model import DIFFERENCE, MASS, NAME, PLACE, THICKNESS, WORST
from app.panels.variants.panel import VariantsPanel
from app.series.variants import comparing
from app.window.samples import samples
from stackcore.errors import Severity
from stackcore.job import Job, job_from_json, read_job
from stackcore.propagation import solve


class Bench:
    """The panel on a radar cover of three stacks."""

    def __init__(self, qtbot: QtBot) -> None:
        self.qtbot = qtbot
        cover = next(one for one in samples() if "radar" in one.path.name)
        self.session, self.view = Session(read_job(cover.path)), View()
        self.told: list[str] = []

        def tell(text: str, severity: Severity) -> None:
            self.told.append(text)

        self.panel = VariantsPanel(self.session, self.view, LIGHT, tell)
        self.tester = QAbstractItemModelTester(
            self.panel.model, QAbstractItemModelTester.FailureReportingMode.Fatal
        )
        qtbot.addWidget(self.panel)
        self.panel.resize(700, 300)

    def show(self) -> None:
        """Show the panel and wait for its figures."""
        self.panel.show()
        self.qtbot.waitExposed(self.panel)
        self.settle()

    def settle(self) -> None:
        """Wait until every stack of now has its worst value."""

        def whole() -> bool:
            found = self.panel.model.comparison.variants
            names = [stack.name for stack in self.session.record.stacks]
            return [one.name for one in found] == names and all(one.worst is not None for one in found)

        self.qtbot.waitUntil(whole, timeout=20_000)

    def text(self, row: int, column: int) -> str:
        """Return what stands in a cell."""
        return str(self.panel.model.index(row, column).data())


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """A bench whose lane is closed at the end."""
    made = Bench(qtbot)
    yield made
    made.panel.close_lane()


def test_each_stack_has_its_figures(bench: Bench) -> None:
    """Name, thickness, the worst transmittance over the sweep with its place, and the gap to the one in hand."""
    bench.show()
    job = bench.session.job
    assert [bench.text(row, NAME) for row in range(3)] == [stack.name for stack in job.stacks]
    assert bench.text(1, THICKNESS) == "9.56 mm"
    worst = [
        float(solve(stack, job.sweep.frequencies(), job.sweep.angles()).transmittance.min()) for stack in job.stacks
    ]
    found = bench.panel.model.comparison
    assert [one.worst.value for one in found.variants if one.worst is not None] == pytest.approx(worst, rel=1e-12)
    assert "GHz" in bench.text(0, PLACE)
    assert bench.text(0, DIFFERENCE) == "in hand"
    assert found.difference(1, 0) == pytest.approx(worst[1] - worst[0])
    assert bench.text(0, WORST).startswith("0.")


def test_mass_says_when_it_is_not_whole(bench: Bench) -> None:
    """The laminate of the sample has no density: nothing, or at least what the paint weighs, with the reason."""
    bench.show()
    assert bench.text(0, MASS) == ""
    assert bench.text(2, MASS).startswith("> ")
    tip = bench.panel.model.index(2, MASS).data(Qt.ItemDataRole.ToolTipRole)
    assert "laminate" in tip


def test_it_follows_edits_and_the_view(bench: Bench) -> None:
    """A thickness typed and another quantity each bring other figures."""
    bench.show()
    before = bench.text(0, WORST)
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "7 mm"))
    bench.qtbot.waitUntil(lambda: bench.text(0, WORST) not in ("", before))
    bench.view.set(quantity="insertion_loss_dB")
    bench.qtbot.waitUntil(lambda: bench.text(0, WORST).endswith("dB"))
    whole = Qt.ItemDataRole.AccessibleTextRole
    title = bench.panel.model.headerData(WORST, Qt.Orientation.Horizontal, whole)
    assert title == "Worst insertion loss"


def test_a_row_looks_at_its_stack_and_the_other_way_round(bench: Bench) -> None:
    """Choosing a row changes the stack in hand; the stack in hand is the row that is chosen."""
    bench.show()
    bench.panel.table.selectRow(2)
    assert bench.session.selection.stack == 2
    bench.session.undo()

    bench.session.select(Selection(1))
    assert bench.panel.table.currentIndex().row() == 1
    assert bench.text(1, DIFFERENCE) == "in hand"


def test_variants_are_made_and_taken_away(bench: Bench) -> None:
    """Duplicate and delete are steps of the document; the last stack stays, and that is told."""
    bench.show()
    bench.panel.duplicate()
    bench.settle()
    assert bench.panel.model.rowCount() == 4
    for _ in range(3):
        bench.panel.delete()
    bench.settle()
    bench.panel.delete()
    assert "only stack" in bench.told[-1]
    assert bench.panel.model.rowCount() == 1


def test_the_table_can_be_copied(bench: Bench) -> None:
    """A header and a line a stack, with tabs between."""
    bench.show()
    bench.panel.copy_table()
    lines = QGuiApplication.clipboard().text().splitlines()
    assert len(lines) == 4
    assert lines[0].split("\t")[0] == "Stack"
    assert lines[2].split("\t")[THICKNESS] == "9.56 mm"


def test_hidden_it_computes_nothing(bench: Bench) -> None:
    """Before it is shown and after."""
    assert bench.panel._asked is None
    bench.show()
    bench.panel.hide()
    bench.session.apply(edits.type_into(Cell(0, 0, "thickness"), "7 mm"))
    assert bench.panel._asked is None


def test_a_comparison_grows_stack_by_stack(bench: Bench) -> None:
    """The first yield has names and masses, each further one another worst value."""
    counts = [
        sum(one.worst is not None for one in found.variants)
        for found in comparing(bench.session.job, bench.view.state)
    ]
    assert counts == [0, 1, 2, 3]


def test_both_looks_can_be_drawn(bench: Bench) -> None:
    """Light and dark differ."""
    bench.show()
    pictures = []
    for theme in (LIGHT, DARK):
        bench.panel.set_theme(theme)
        pictures.append(bench.panel.grab().toImage())
    assert pictures[0] != pictures[1]


def test_the_worst_is_over_the_conditions_shown(bench: Bench) -> None:
    """A film of water makes each stack worse, and its place says so; without the condition it is as before."""
    bench.show()
    dry = [one.worst.value for one in bench.panel.model.comparison.variants if one.worst is not None]
    assert bench.session.apply(edits.add_condition(PRESETS[0])) == ()
    bench.view.set(conditions=("Wet",))

    def wet() -> bool:
        found = [one.worst for one in bench.panel.model.comparison.variants]
        return all(one is not None and one.place.endswith(", Wet") for one in found)

    bench.qtbot.waitUntil(wet, timeout=20_000)
    for row, before in enumerate(dry):
        worst = bench.panel.model.comparison.variants[row].worst
        assert worst is not None
        job = bench.session.job
        stack = job.stack_under(row, "Wet")
        answer = solve(stack, job.sweep.frequencies(), job.sweep.angles()).transmittance.min()
        assert worst.value == pytest.approx(float(answer), abs=1e-12)
        assert worst.value < before


def test_headers_are_short_and_said_whole(bench: Bench) -> None:
    """In a narrow panel every column is in sight; a screen reader and a spreadsheet get whole titles."""
    bench.show()
    across = Qt.Orientation.Horizontal
    assert all(len(str(bench.panel.model.headerData(at, across))) <= 9 for at in range(7))
    bench.panel.copy_table()
    assert QGuiApplication.clipboard().text().startswith("Stack\tWorst transmittance\tDifference")


def test_a_condition_that_cannot_be_computed_is_named(bench: Bench) -> None:
    """Where a front half-space would absorb, the other figures stand and the condition is told."""
    text = """{"format": "slabwright-job", "version": 1,
"materials": {"ice": {"model": "constant", "permittivity": 3.2, "states": {"thawing": {"loss_tangent": 0.3}}}},
"stacks": [{"name": "Under ice", "front": "ice", "elements": [{"layer": "ice", "thickness": "2 mm"}]}],
"conditions": [{"name": "Thaw", "states": ["thawing"]}],
"sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}"""
    job = Job(job_from_json(text))
    *_, last = comparing(job, ViewState(conditions=("Thaw",)))
    worst = last.variants[0].worst
    assert worst is not None
    assert worst.place.endswith("not computed: Thaw")
