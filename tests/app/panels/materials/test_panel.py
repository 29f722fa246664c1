"""The panel of materials, worked by keys."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QToolButton

from app.document import edits
from app.document.document import job_cell, material_cell
from app.document.session import Session
from app.document.view import View
from app.look.theme import LIGHT, THEMES
from app.panels.materials.library import entry_words
from app.panels.materials.panel import LIBRARY, MaterialsPanel
from app.panels.materials.picks import Pick, specimens_of
from stackcore.job.records import LayerRecord
from stackcore.media.library import read_library
from stackcore.media.models import MODELS
from tests.app.conftest import flush_deferred_deletes
from tests.app.panels.materials.conftest import Shown, press

Key = Qt.Key


def press_button(shown: Shown, text: str) -> None:
    """Press a button by the keyboard."""
    button = next(b for b in shown.panel.findChildren(QToolButton) if b.text() == text)
    assert button.focusPolicy() & Qt.FocusPolicy.TabFocus
    QTest.keyClick(button, Key.Key_Space)


def test_constant_typed_over_the_library_cuts_the_tie(shown: Shown) -> None:
    """A permittivity typed over a library value is the job's own, and its source says where it came from."""
    shown.type("ptfe", "permittivity", "2.2")

    record = shown.session.record.material("ptfe")
    assert record is not None
    assert record.permittivity == 2.2
    assert record.library == ""
    assert "ptfe" in shown.text("ptfe", "source")
    assert shown.text("ptfe", "label") == "PTFE"


def test_loss_given_twice_is_refused_in_place(shown: Shown) -> None:
    """A loss tangent beside an ε with loss stays as a marked text with its reason, and nothing counts twice."""
    press_button(shown, "Add constant")
    shown.type("material", "permittivity", "3 - 0.1j")
    shown.type("material", "loss_tangent", "0.02")
    shown.panel.table.go_to("material", "loss_tangent")

    assert shown.text("material", "loss_tangent") == "0.02"
    assert shown.session.document.draft(material_cell("material", "loss_tangent")) is not None
    assert "given twice" in shown.sentences()
    assert "Loss is given once" in shown.sentences()
    assert shown.text("material", "reading") == "ε′ 3, tan δ 0.03333"


def test_new_name_is_followed_by_the_layers(shown: Shown) -> None:
    """Renaming a material renames it where it is used; the row stays the current one."""
    shown.type("ptfe", "name", "window")

    layer = shown.session.record.stacks[0].elements[0]
    assert isinstance(layer, LayerRecord)
    assert layer.material == "window"
    assert shown.names() == ["window", "copper"]


def test_added_materials_are_ready_to_be_named(shown: Shown) -> None:
    """A constant and a conductor come with a free name, their name current and the focus in the table."""
    press_button(shown, "Add constant")
    press_button(shown, "Add conductor")

    assert shown.names() == ["ptfe", "copper", "material", "material-2"]
    assert shown.panel.table.current_name() == "material-2"
    assert shown.panel.table.hasFocus()
    assert shown.text("material", "reading") == "ε′ 1"
    assert shown.text("material-2", "conductivity") == "1 MS/m"


def test_conductivity_with_its_unit(shown: Shown) -> None:
    """A conductivity keeps its unit; zero is refused with a reason in place."""
    shown.type("copper", "conductivity", "100 %IACS")
    assert shown.text("copper", "conductivity") == "100 %IACS"
    shown.type("copper", "conductivity", "0 MS/m")
    shown.panel.table.go_to("copper", "conductivity")

    assert shown.session.document.draft(material_cell("copper", "conductivity")) is not None
    assert "Allowed:" in shown.sentences()


def test_removal_is_refused_while_it_is_used(shown: Shown) -> None:
    """Delete removes an unused material and tells where a used one stands."""
    shown.panel.table.go_to("ptfe", "name")
    press(Key.Key_Delete)
    assert shown.names() == ["ptfe", "copper"]
    assert "'ptfe' is used in stack A element 1 and cannot be removed" in shown.said[0][0]

    shown.panel.table.go_to("copper", "name")
    press_button(shown, "Remove")
    assert shown.names() == ["ptfe"]
    shown.session.undo()
    assert shown.names() == ["ptfe", "copper"]


def test_library_by_the_keyboard(shown: Shown) -> None:
    """Words narrow the list; Down and Enter in it take an entry; taking it again shows where it is."""
    shown.panel.pages.setCurrentIndex(LIBRARY)
    search, found = shown.panel.library.search, shown.panel.library.list
    everything = found.model().rowCount()
    assert everything == len(read_library().entries)
    search.setFocus()
    QTest.keyClicks(search, "metals silver")
    assert 0 < found.model().rowCount() < everything
    assert found.currentIndex().row() == 0
    press(Key.Key_Down)
    assert found.hasFocus()
    press(Key.Key_Return)

    assert "silver" in shown.names()
    assert shown.panel.table.current_name() == "silver"
    shown.panel.table.go_to("ptfe", "name")
    shown.panel.library.use_current()
    assert [text for text, _ in shown.said] == [
        "Silver is in this job now, as 'silver'.",
        "Silver is in this job already, as 'silver'.",
    ]
    assert shown.panel.table.current_name() == "silver"


def test_nothing_found_says_what_to_do(shown: Shown) -> None:
    """Words that no entry holds leave an empty list and a next step; Enter then does nothing."""
    shown.panel.pages.setCurrentIndex(LIBRARY)
    shown.panel.library.search.setText("unobtainium")

    assert shown.panel.library.list.model().rowCount() == 0
    assert "Search for fewer words" in shown.sentences()
    shown.panel.library.use_current()
    assert shown.names() == ["ptfe", "copper"]


def test_entry_tells_everything_known() -> None:
    """Range, spread, certainty, source and note of every entry are in its words."""
    for entry in read_library().entries:
        words = entry_words(entry)
        assert entry.provenance.source in words
        assert entry.provenance.certainty in words
        assert entry.provenance.note in words
        assert "Holds from" in words


def test_material_beyond_its_range_is_marked(shown: Shown) -> None:
    """When the sweep leaves the range of a material, a sentence says so and its row is marked."""
    assert "is known from" not in shown.sentences()
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "400 GHz"))

    assert "Copper is known from 1 Hz to 300 GHz" in shown.sentences()
    index = shown.panel.table.materials_model().index(1, 0)
    assert "300 GHz" in index.data(Qt.ItemDataRole.AccessibleDescriptionRole)
    shown.session.undo()
    assert "is known from" not in shown.sentences()


@pytest.mark.parametrize("name", list(THEMES))
def test_colours_follow_the_theme(shown: Shown, name: str) -> None:
    """The mark of a caution has the theme's warning colour, the list and the table its ground."""
    theme = THEMES[name]
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "400 GHz"))
    shown.panel.set_theme(theme)
    table, found = shown.panel.table, shown.panel.library.list
    cell = table.visualRect(table.materials_model().index(1, 0))
    image = table.viewport().grab().toImage()

    assert theme.warning in {image.pixelColor(x, cell.center().y()).name() for x in range(cell.left(), 30)}
    assert image.pixelColor(cell.left() + 2, cell.top() + 3).name() == theme.base
    shown.panel.pages.setCurrentIndex(LIBRARY)
    entry = found.visualRect(found.model().index(1, 0))
    assert found.viewport().grab().toImage().pixelColor(entry.left() + 2, entry.top() + 2).name() == theme.base


def test_panel_stops_listening_when_it_is_gone(qapp: QApplication, session: Session) -> None:
    """A panel that is deleted is not told of later changes."""
    view = View()
    panel = MaterialsPanel(session, view, LIGHT, lambda text, severity: None)
    panel.deleteLater()
    flush_deferred_deletes()

    assert session.apply(edits.remove_material("copper")) == ()
    view.set(markers=(2e9,))
    assert qapp.activeModalWidget() is None


def test_any_model_can_be_added_by_the_menu(shown: Shown) -> None:
    """Every model but the two that have buttons is in the menu, and gives a material that computes."""
    button = next(b for b in shown.panel.findChildren(QToolButton) if b.text() == "Add other")
    menu = button.menu()
    assert menu is not None
    actions = menu.actions()
    assert len(actions) == len(MODELS) - 2
    for action in actions:
        action.trigger()

    materials = shown.session.record.materials[2:]
    assert [MODELS[material.model].label for material in materials] == [action.text() for action in actions]
    assert shown.panel.table.current_name() == materials[-1].name
    assert not [text for text, severity in shown.said if severity == "error"]


def test_rows_chosen_are_picked_and_renamed_with_the_material(shown: Shown) -> None:
    """What is selected in the table is told with the current one, and a new name is followed."""
    told: list[tuple[tuple[Pick, ...], Pick]] = []
    shown.panel.picked.connect(lambda picks, current: told.append((picks, current)))
    shown.panel.table.go_to("copper", "name")
    shown.panel.table.selectAll()
    shown.type("copper", "name", "foil")

    assert ((Pick("ptfe"), Pick("copper")), Pick("copper")) in told
    assert told[-1] == ((Pick("foil"),), Pick("foil"))
    assert specimens_of(shown.session.job, told[-1][0])[0].medium is shown.session.job.media["foil"]


def test_entry_of_the_library_is_picked_by_hand_only(shown: Shown) -> None:
    """An entry gone to in the list is told; one that becomes the current one by opening the page is not."""
    told: list[Pick] = []
    shown.panel.picked.connect(lambda _picks, current: told.append(current))
    shown.panel.pages.setCurrentIndex(LIBRARY)
    assert told == []
    shown.panel.library.list.setFocus()
    press(Key.Key_Down)

    assert told[-1].entry is not None
    assert specimens_of(shown.session.job, (told[-1],))[0].medium is told[-1].entry.medium


def test_many_cautions_are_counted(shown: Shown) -> None:
    """Three materials beyond their range share one sentence that says where each is told."""
    shown.panel.use(read_library().entry("metals/silver"))
    shown.session.apply(edits.type_into(job_cell("sweep.frequency.stop"), "400 GHz"))

    assert "3 materials are not known over all of the sweep" in shown.sentences()
