"""The conditions of a job on their panel: made, typed into, switched on, and what stays when it was refused."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QToolButton
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.theme import DARK, LIGHT
from app.panels.conditions.card import Card
from app.panels.conditions.panel import ConditionsPanel
from stackcore.errors import Severity
from stackcore.job import Job, job_from_json
from stackcore.job.records import ConditionRecord, LayerRecord
from tests.app.document.test_conditions import JOB, finish

pytestmark = pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
"""Lists of offers make the offscreen platform say what it cannot do."""


class Bench:
    """The panel on a painted wall."""

    def __init__(self, qtbot: QtBot) -> None:
        job = Job(job_from_json(JOB.replace("finishes/polyurethane-paint", finish())))
        self.session, self.view = Session(job), View()
        self.told: list[str] = []

        def tell(text: str, severity: Severity) -> None:
            self.told.append(text)

        self.panel = ConditionsPanel(self.session, self.view, LIGHT, tell)
        qtbot.addWidget(self.panel)
        self.panel.resize(340, 600)
        self.panel.show()
        qtbot.waitExposed(self.panel)

    def card(self, name: str) -> Card:
        """Return the card of a condition."""
        return next(card for card in self.panel.cards if card.name.text() == name)

    def press(self, words: str, card: Card | None = None) -> None:
        """Press a button of the panel, or of a card."""
        buttons = (card or self.panel).findChildren(QToolButton)
        next(one for one in buttons if one.text() == words).click()

    def condition(self, name: str) -> ConditionRecord:
        """Return a condition of the job."""
        found = self.session.record.condition(name)
        assert found is not None
        return found

    def type(self, card: Card, place: int, part: str, text: str) -> None:
        """Type over a field of a card."""
        field = card.name if place < 0 and part == "name" else card.fields[place, part]
        field.setFocus()
        field.selectAll()
        QTest.keyClicks(field, text)
        QTest.keyClick(field, Qt.Key.Key_Return)


@pytest.fixture
def bench(qtbot: QtBot) -> Bench:
    """A bench with one condition, Storm, that has a sheet in front."""
    return Bench(qtbot)


def test_a_usual_condition_is_made_shown_and_undone(bench: Bench) -> None:
    """Wet brings its water, goes into the envelope at once, and leaves with one undo."""
    bench.press("Wet")
    assert [card.name.text() for card in bench.panel.cards] == ["Storm", "Wet"]
    assert bench.view.state.conditions == ("Wet",)
    card = bench.card("Wet")
    assert card.switch.isChecked()
    assert not bench.card("Storm").switch.isChecked()
    assert card.fields[0, "value"].text() == "0.1 mm"
    assert "water" in card.fields[0, "subject"].text().lower()
    bench.session.undo()
    assert [card.name.text() for card in bench.panel.cards] == ["Storm"]


def test_what_would_change_nothing_is_told(bench: Bench) -> None:
    """No material of this job has a state for heat."""
    bench.press("Hot")
    assert "Hot would change nothing" in bench.told[0]
    assert len(bench.panel.cards) == 1


def test_a_switch_puts_a_condition_on_the_curves(bench: Bench) -> None:
    """The switch follows the view, whoever changes it."""
    switch = bench.card("Storm").switch
    switch.click()
    assert bench.view.state.conditions == ("Storm",)
    bench.view.set(None, conditions=())
    assert not switch.isChecked()


def test_lines_are_added_typed_and_taken_away(bench: Bench) -> None:
    """Each line is one step of undo; a material is found by its label."""
    bench.press("Empty")
    bench.press("+ In front", bench.card("Condition"))
    bench.press("+ Thickness", bench.card("Condition"))
    bench.type(bench.card("Condition"), 0, "value", "0.3 mm")
    bench.type(bench.card("Condition"), 0, "subject", "skin")
    bench.type(bench.card("Condition"), 1, "value", "1.25")
    made = bench.condition("Condition")
    layer = made.front[0]
    assert isinstance(layer, LayerRecord)
    assert (layer.material, layer.thickness.text) == ("skin", "0.3 mm")
    assert made.thickness_factors == (("skin", 1.25),)
    assert bench.card("Condition").fields[0, "subject"].text() == "Skin"
    bench.press("×", bench.card("Condition"))
    assert bench.condition("Condition").front == ()
    bench.session.undo()
    assert bench.condition("Condition").front == (layer,)


def test_a_refused_text_stays_with_its_reason_until_it_is_mended(bench: Bench) -> None:
    """Nothing typed is lost, and the card says what is wrong where it was typed."""
    bench.press("Empty")
    bench.press("+ In front", bench.card("Condition"))
    before = bench.session.record
    bench.type(bench.card("Condition"), 0, "value", "0.3 GHz")
    card = bench.card("Condition")
    assert bench.session.record is before
    assert card.fields[0, "value"].text() == "0.3 GHz"
    assert "is a frequency, not a length" in card.fault.text()
    assert card.fault.isVisible()
    bench.session.apply(edits.set_title("Another"))
    assert card.fields[0, "value"].text() == "0.3 GHz"
    bench.type(card, 0, "value", "0.3 mm")
    assert not card.fault.isVisible()


def test_a_name_that_is_taken_is_refused_in_place(bench: Bench) -> None:
    """The name typed stays, the condition keeps its own."""
    bench.press("Empty")
    bench.type(bench.card("Condition"), -1, "name", "Storm")
    assert [one.name for one in bench.session.record.conditions] == ["Storm", "Condition"]
    assert "is taken" in bench.panel.cards[1].fault.text()
    bench.type(bench.panel.cards[1], -1, "name", "Hail")
    assert [one.name for one in bench.session.record.conditions] == ["Storm", "Hail"]


def test_a_condition_that_is_renamed_or_deleted_takes_its_switch_along(bench: Bench) -> None:
    """The switch of another one is never thrown by it."""
    bench.press("Wet")
    bench.press("Delete", bench.card("Storm"))
    assert [card.name.text() for card in bench.panel.cards] == ["Wet"]
    assert bench.card("Wet").switch.isChecked()


def test_a_sheet_is_shown_and_not_typed_into(bench: Bench) -> None:
    """What only a job file can say is kept as it is."""
    field = bench.card("Storm").fields[0, "subject"]
    assert field.isReadOnly()
    assert field.text() == "sheet, 100 ohm"
    assert (0, "value") not in bench.card("Storm").fields


def test_every_control_has_a_name_and_takes_the_theme(bench: Bench) -> None:
    """A screen reader can tell the controls of a card apart, in either theme."""
    bench.press("Empty")
    bench.press("+ In front", bench.card("Condition"))
    bench.panel.set_theme(DARK)
    for card in bench.panel.cards:
        assert card.switch.accessibleName()
        names = [field.accessibleName() for field in card.fields.values()]
        assert all(names)
        assert len(set(names)) == len(names)
    drops = [one for one in bench.panel.findChildren(QToolButton) if one.text() == "×"]
    assert all(one.accessibleName().startswith("Take away") for one in drops)
