"""What of the quiet line opens a menu: the quantity by groups, and polarizations besides TE and TM."""

from collections.abc import Iterator
from dataclasses import dataclass, field

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QAction
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QMenu
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.theme import DARK, LIGHT
from app.panels.sweep import SweepPanel
from app.panels.sweep.polarization_choice import TILT
from app.panels.sweep.quantity_choice import ELEMENTS, quantity_tip
from stackcore.job.records import LayerRecord
from stackcore.quantities import QUANTITIES
from tests.app.panels.results import Told, slab_job

pytestmark = pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
"""Menus make the offscreen platform say what it cannot do."""


@dataclass
class Bench:
    """The line and what it changes."""

    qtbot: QtBot
    session: Session = field(default_factory=lambda: Session(slab_job()))
    view: View = field(default_factory=View)
    told: Told = field(default_factory=Told)

    def __post_init__(self) -> None:
        self.panel = SweepPanel(self.session, self.view, LIGHT, self.told)
        self.qtbot.addWidget(self.panel)
        self.panel.resize(1100, 60)
        self.panel.show()
        self.qtbot.waitExposed(self.panel)

    def shows(self, *keys: str) -> bool:
        """Whether the view shows exactly these polarizations."""
        return self.view.state.polarizations == keys

    def more(self, words: str) -> None:
        """Choose from the menu of further polarizations."""
        choice = self.panel.polarizations
        choice.more.click()
        assert choice.menu is not None
        action = next(action for action in choice.menu.actions() if action.text() == words)
        choice.menu.close()
        action.trigger()

    def type_tilt(self, text: str) -> None:
        """Type over the tilt and press Enter."""
        tilt = self.panel.polarizations.tilt
        tilt.setFocus()
        tilt.selectAll()
        QTest.keyClicks(tilt, text)
        QTest.keyClick(tilt, Qt.Key.Key_Return)

    def quantities(self) -> dict[str, list[QAction]]:
        """Open the menu of quantities and return its entries, by the words of their menu (empty for the first)."""
        self.panel.quantity.showPopup()
        menu = self.panel.quantity.menu
        assert menu is not None
        entries: dict[str, list[QAction]] = {"": []}
        for action in menu.actions():
            inside = action.menu()
            if isinstance(inside, QMenu):
                entries[action.text()] = list(inside.actions())
            elif not action.isSeparator():
                entries[""].append(action)
        menu.close()
        return entries


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """The line of a slab at three angles."""
    found = Bench(qtbot)
    yield found
    found.panel.hide()


def test_the_first_menu_has_the_usual_quantities(bench: Bench) -> None:
    """The ten of the CSV are at hand; each other one is in the menu of its group, with its definition."""
    entries = bench.quantities()
    assert [action.text() for action in entries.pop("")] == [q.label for q in QUANTITIES.values() if q.exported]
    assert len(entries.pop(ELEMENTS)) == len(bench.session.record.stacks[0].elements)
    rarer = {q.label: q for q in QUANTITIES.values() if not q.exported}
    assert {action.text() for actions in entries.values() for action in actions} == rarer.keys()
    for group, actions in entries.items():
        for action in actions:
            assert rarer[action.text()].group == group
            assert action.toolTip() == quantity_tip(rarer[action.text()])


def test_a_quantity_is_chosen_and_ticked(bench: Bench) -> None:
    """Choosing from a menu shows the quantity, and the menu then ticks it."""
    actions = bench.quantities()["Coefficients and match"]
    next(action for action in actions if action.text() == "Standing wave ratio (VSWR)").trigger()
    assert bench.view.state.quantity == "standing_wave_ratio"
    assert bench.panel.quantity.currentText() == "Standing wave ratio (VSWR)"
    ticked = [action.text() for actions in bench.quantities().values() for action in actions if action.isChecked()]
    assert ticked == ["Standing wave ratio (VSWR)"]


def test_an_element_is_chosen_by_its_name(bench: Bench) -> None:
    """Elements are offered by number, material and thickness; the item goes when another is chosen."""
    action = bench.quantities()[ELEMENTS][0]
    layer = bench.session.record.stacks[0].elements[0]
    assert isinstance(layer, LayerRecord)
    assert action.text().startswith("1  ")
    assert layer.thickness.text in action.text()
    action.trigger()
    assert bench.view.state.quantity == "element_absorptance:0"
    assert bench.panel.quantity.currentText() == "Absorptance of element 1"
    assert bench.panel.scale.isVisible()
    bench.view.set(quantity="reflectance")
    assert bench.panel.quantity.count() == len(QUANTITIES)


def test_the_line_is_calm_at_first(bench: Bench) -> None:
    """Only TE and TM and the word for more stand in the line until something else is asked for."""
    visible = [part for part in bench.panel.polarizations.parts if part.isVisible()]
    switches = bench.panel.switches
    assert visible == [switches["TE"], switches["TM"], bench.panel.polarizations.more]
    assert bench.view.state == View().state


def test_a_circular_wave_comes_and_goes(bench: Bench) -> None:
    """The menu shows it, its switch in the line takes it away again."""
    bench.more("Circular")
    assert bench.shows("TE", "TM", "circular")
    switch = bench.panel.switches["circular"]
    assert (switch.isVisible(), switch.isChecked()) == (True, True)
    switch.click()
    assert bench.shows("TE", "TM")
    assert (switch.isVisible(), switch.isChecked()) == (False, False)
    bench.more("Circular")
    bench.more("Circular")
    assert bench.shows("TE", "TM")


def test_a_tilt_is_typed(bench: Bench) -> None:
    """It begins at 45°, takes any angle or several, and is there again when it is switched on again."""
    bench.more("Linear, tilted from TE")
    tilt = bench.panel.polarizations.tilt
    assert bench.shows("TE", "TM", "tilt 45 deg")
    assert (tilt.isVisible(), tilt.text()) == (True, "45 deg")
    bench.type_tilt("30")
    assert bench.shows("TE", "TM", "tilt 30 deg")
    assert tilt.text() == "30 deg"
    bench.panel.switches[TILT].click()
    assert bench.shows("TE", "TM")
    bench.more("Linear, tilted from TE")
    assert bench.shows("TE", "TM", "tilt 30 deg")
    bench.type_tilt("15 deg, 60 deg")
    assert bench.shows("TE", "TM", "tilt 15 deg", "tilt 60 deg")
    bench.more("Circular")
    assert bench.shows("TE", "TM", "circular", "tilt 15 deg", "tilt 60 deg")


@pytest.mark.parametrize(("text", "words"), [("100 deg", "out of range"), ("4 mm", "length"), ("", "no tilt")])
def test_a_tilt_that_is_none_is_marked(bench: Bench, text: str, words: str) -> None:
    """The text stays with its fault, the view keeps what it had, and a good text takes the fault away."""
    bench.more("Linear, tilted from TE")
    tilt = bench.panel.polarizations.tilt
    if text:
        bench.type_tilt(text)
    else:
        tilt.selectAll()
        QTest.keyClick(tilt, Qt.Key.Key_Delete)
        QTest.keyClick(tilt, Qt.Key.Key_Return)
    assert tilt.text() == text
    assert f"{tilt.fault}" != "None"
    assert words in tilt.toolTip()
    assert bench.shows("TE", "TM", "tilt 45 deg")
    bench.type_tilt("20 deg")
    assert tilt.fault is None
    assert bench.shows("TE", "TM", "tilt 20 deg")


def test_one_polarization_always_stays(bench: Bench) -> None:
    """Also when it is a circular one, the last cannot be taken away, and it is said why."""
    bench.view.set(polarizations=("circular",))
    bench.panel.switches["circular"].click()
    assert bench.shows("circular")
    assert bench.panel.switches["circular"].isChecked()
    assert bench.told.words == [("At least one polarization is shown.", "note")]


def test_the_view_is_followed(bench: Bench) -> None:
    """What is changed elsewhere shows in the line, in its look too."""
    bench.view.set(polarizations=("tilt -30 deg",))
    shown = [key for key, switch in bench.panel.switches.items() if switch.isChecked()]
    assert shown == [TILT]
    assert bench.panel.polarizations.tilt.text() == "-30 deg"
    bench.panel.set_theme(DARK)
    assert bench.panel.polarizations.tilt.palette().text().color().name() == DARK.text
    assert bench.session.apply(edits.set_title("Another")) == ()
    QApplication.processEvents()
    assert not bench.panel.grab().isNull()
