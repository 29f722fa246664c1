"""The panel of constructions."""

import pytest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.look.theme import DARK, LIGHT
from app.panels.constructions.choice import ANGLE, FREQUENCY, POLARIZATION, Choosing, outcome
from app.panels.constructions.panel import ConstructionsPanel
from stackcore.constructions import CONSTRUCTIONS
from stackcore.errors import Severity
from stackcore.job.records import LayerRecord
from stackcore.units import Dimension, parse_measure


@pytest.fixture
def told() -> list[str]:
    """Return what the panel had to say."""
    return []


@pytest.fixture
def panel(qtbot: QtBot, told: list[str]) -> ConstructionsPanel:
    """Return a panel on an untitled job."""

    def tell(text: str, severity: Severity) -> None:
        told.append(text)

    made = ConstructionsPanel(Session(), LIGHT, tell)
    qtbot.addWidget(made)
    made.show()
    return made


@pytest.mark.parametrize("key", CONSTRUCTIONS)
def test_every_construction_shows_its_rule_and_its_wall(panel: ConstructionsPanel, key: str) -> None:
    """Choosing one shows its words, its options, its drawing and its rule; nothing of the job has changed."""
    panel.choose(key)
    wanted = {option.name for option in CONSTRUCTIONS[key].options}
    assert wanted <= set(panel.form.rows)
    assert panel.preview.wall is not None
    assert panel.rule.text()
    assert panel.cautions.text()
    assert not panel._session.modified


def test_the_sweep_sizes_it_until_something_is_typed(panel: ConstructionsPanel) -> None:
    """The field shows the middle of the sweep as a hint; a typed frequency counts from then on."""
    session = panel._session
    first = panel.rule.text()
    session.apply(edits.set_title("same sweep"))
    assert panel.rule.text() == first
    panel.type_into(FREQUENCY, "5")
    assert "at 5 GHz" in panel.rule.text()
    panel.type_into(ANGLE, "45")
    assert "45 deg" in panel.rule.text()
    panel.type_into(FREQUENCY, "")
    assert "at 5 GHz" not in panel.rule.text()


def test_a_wrong_text_stays_at_its_field_with_the_reason(panel: ConstructionsPanel) -> None:
    """Every fault stands below its field, the deeds are off, and the text is as it was typed."""
    panel.choose("a-sandwich")
    panel.type_into("skin_thickness", "3 GHz")
    panel.type_into(ANGLE, "95")
    assert "length" in panel.form.rows["skin_thickness"].fault.text()
    assert "90 deg" in panel.form.rows[ANGLE].fault.text()
    assert not panel.insert.isEnabled()
    assert not panel.add.isEnabled()
    panel.type_into("skin_thickness", "3 mm")
    panel.type_into(ANGLE, "")
    assert panel.insert.isEnabled()


def test_insert_and_new_stack_change_the_job(panel: ConstructionsPanel, told: list[str]) -> None:
    """Both deeds are one step each, with the words of the construction."""
    session = panel._session
    panel.choose("solid-wall")
    panel.insert.click()
    assert session.undo_sentence == "insert solid half-wave wall, painted"
    panel.choose("sheet-absorber")
    panel.add.click()
    assert session.record.stacks[-1].back == "metal"
    assert told == []


def test_a_refusal_is_told(panel: ConstructionsPanel, told: list[str]) -> None:
    """What needs metal behind it cannot go before another element; the reason is told and nothing changes."""
    session = panel._session
    session.apply(edits.add_layer(0, 0, "air", parse_measure("1 mm", Dimension.LENGTH)))
    before = session.document
    panel.choose("sheet-absorber")
    panel.insert_here()
    assert "metal behind" in told[0]
    assert session.document is before


def test_a_material_of_the_job_can_be_chosen(panel: ConstructionsPanel) -> None:
    """The choice of a material offers those of the job beside the library."""
    panel.choose("solid-wall")
    own = panel._session.record.materials[0].name
    panel.type_into("skin", own)
    built = panel._outcome.built if panel._outcome is not None else None
    assert built is not None
    assert own in [element.material for element in built.elements if isinstance(element, LayerRecord)]


def test_another_construction_keeps_what_it_is_sized_for() -> None:
    """Frequency, angle and polarization stay; so does a paint that both have, and no option of another kind."""
    choosing = Choosing("solid-wall").with_text(FREQUENCY, "3 GHz").with_text(POLARIZATION, "TM")
    choosing = choosing.with_text("paint_thickness", "0.3 mm").with_text("order", "2")
    moved = choosing.with_key("a-sandwich")
    assert dict(moved.texts) == {FREQUENCY: "3 GHz", POLARIZATION: "TM", "paint_thickness": "0.3 mm"}
    assert outcome(moved, Session().job).faults == ()


def test_both_looks_can_be_drawn(panel: ConstructionsPanel) -> None:
    """Light and dark differ in the picture."""
    pictures = []
    for theme in (LIGHT, DARK):
        panel.set_theme(theme)
        pictures.append(panel.preview.grab().toImage())
    assert pictures[0] != pictures[1]
