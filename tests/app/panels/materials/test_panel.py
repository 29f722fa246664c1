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
from app.panels.materials.panel import MaterialsPanel
from stackcore.job.records import LayerRecord
from stackcore.media.library import read_library
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
    assert shown.said == [("Silver is in this job already.", "note")]
    assert shown.panel.table.current_name() == "silver"


def test_nothing_found_says_what_to_do(shown: Shown) -> None:
    """Words that no entry holds leave an empty list and a next step; Enter then does nothing."""
    shown.panel.library.search.setText("unobtainium")

    assert shown.panel.library.list.model().rowCount() == 0
    assert "Search for less, or add a constant above." in shown.sentences()
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
