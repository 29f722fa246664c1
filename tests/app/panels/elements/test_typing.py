"""Typing into the table with the keyboard alone."""

import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QWheelEvent
from PySide6.QtWidgets import QApplication

from app.document.document import Cell
from app.panels.elements.editors import MaterialBox
from stackcore.job.records import LayerRecord
from tests.app.panels.elements.conftest import Shown, press

# The list of matches is a popup, and the platform without a screen can neither raise it nor give it the keyboard.
pytestmark = pytest.mark.qt_log_ignore("This plugin does not support")

Key = Qt.Key
THICKNESS = 3
MATERIAL = 2


def thickness(shown: Shown, row: int) -> str:
    """Return the text of the thickness of an element in the document."""
    element = shown.session.record.stacks[0].elements[row]
    assert isinstance(element, LayerRecord)
    return element.thickness.text


def test_typing_begins_at_once_and_enter_goes_down(shown: Shown) -> None:
    """A digit opens the cell with that digit; Enter makes it the value and goes to the cell below."""
    shown.go(1, THICKNESS)
    shown.keys("2.5 mm")
    press(Key.Key_Return)

    assert thickness(shown, 0) == "2.5 mm"
    assert shown.at() == (2, THICKNESS)
    assert shown.editor() is None
    assert shown.session.undo_sentence == "set thickness of layer 1 to 2.5 mm"


def test_bare_number_has_the_unit_of_the_cell(shown: Shown) -> None:
    """A number without a unit is in the unit that stands in the cell, and is shown with it."""
    shown.go(2, THICKNESS)
    shown.keys("18")
    press(Key.Key_Return)

    assert thickness(shown, 1) == "18 um"


def test_f2_opens_the_text_as_typed(shown: Shown) -> None:
    """F2 opens what was typed, not the value made of it; Escape leaves it."""
    shown.go(3, THICKNESS)
    press(Key.Key_F2)

    assert shown.line().text() == "1/8 in"
    assert shown.line().selectedText() == "1/8 in"
    shown.keys("9")
    press(Key.Key_Escape)
    assert thickness(shown, 2) == "1/8 in"
    assert shown.session.undo_sentence == ""


def test_tab_goes_on_to_the_next_cell_that_takes_text(shown: Shown) -> None:
    """Tab makes the text the value and opens the next cell; number and kind of the next row are passed over."""
    shown.go(1, THICKNESS)
    shown.keys("4 mm")
    press(Key.Key_Tab)

    assert thickness(shown, 0) == "4 mm"
    assert shown.at() == (2, MATERIAL)
    assert isinstance(shown.editor(), MaterialBox)
    press(Key.Key_Escape)
    press(Key.Key_Backtab)
    assert shown.at() == (1, THICKNESS)


def test_text_without_a_value_stays_and_says_why(shown: Shown) -> None:
    """A text that is no thickness stays as typed, marked, with its reason in words; the value stays as it was."""
    shown.go(1, THICKNESS)
    shown.keys("3 mmm")
    assert "unknown unit 'mmm'" in shown.line().toolTip()
    press(Key.Key_Return)

    index = shown.panel.table.elements_model().index(1, THICKNESS)
    assert index.data() == "3 mmm"
    assert "Unknown unit 'mmm', did you mean 'mm'?" in index.data(Qt.ItemDataRole.ToolTipRole)
    assert "did you mean 'mm'?" in index.data(Qt.ItemDataRole.AccessibleDescriptionRole)
    assert thickness(shown, 0) == "3 mm"
    assert shown.session.document.draft(Cell(0, 0, "thickness")) is not None
    shown.go(1, THICKNESS)
    press(Key.Key_F2)
    assert shown.line().text() == "3 mmm"


def test_mended_text_becomes_the_value(shown: Shown) -> None:
    """Typing a right text over a wrong one takes the mark away."""
    shown.go(1, THICKNESS)
    shown.keys("3 mmm")
    press(Key.Key_Return)
    shown.go(1, THICKNESS)
    shown.keys("5 mm")
    press(Key.Key_Return)

    assert shown.session.document.drafts == ()
    assert thickness(shown, 0) == "5 mm"


def test_material_by_its_name(shown: Shown) -> None:
    """A material of the job is typed by its label, in any case."""
    shown.go(1, MATERIAL)
    shown.keys("copper")
    press(Key.Key_Return)

    assert shown.texts()[1][MATERIAL] == "Copper"
    assert shown.at() == (2, MATERIAL)


def test_material_from_the_library_by_keys(shown: Shown) -> None:
    """A part of a name, then Down and Enter, takes an entry of the library into the job in one step."""
    before = len(shown.session.record.materials)
    shown.go(3, MATERIAL)
    shown.keys("library: alum")
    press(Key.Key_Down)
    press(Key.Key_Return)

    assert shown.editor() is None
    assert len(shown.session.record.materials) == before + 1
    assert shown.texts()[3][MATERIAL] == shown.session.record.materials[-1].label
    shown.session.undo()
    assert len(shown.session.record.materials) == before
    assert shown.texts()[3][MATERIAL] == "air"


def test_unknown_material_stays_with_the_nearest_name(shown: Shown) -> None:
    """A name that the job and the library lack stays as typed, and the reason names the nearest."""
    shown.go(1, MATERIAL)
    shown.keys("cooper")
    press(Key.Key_Return)

    index = shown.panel.table.elements_model().index(1, MATERIAL)
    assert index.data() == "cooper"
    assert "did you mean 'copper'" in index.data(Qt.ItemDataRole.ToolTipRole)


def test_perfect_conductor_only_behind(shown: Shown) -> None:
    """The back may be a perfect conductor; the front is refused it in place."""
    shown.go(4, MATERIAL)
    shown.keys("metal")
    press(Key.Key_Return)
    assert shown.session.record.stacks[0].back == "metal"

    shown.go(0, MATERIAL)
    shown.keys("metal")
    press(Key.Key_Return)
    assert shown.session.record.stacks[0].front == "air"
    assert shown.session.document.draft(Cell(0, -1, "front")) is not None


@pytest.mark.parametrize("key", [Key.Key_Up, Key.Key_Down, Key.Key_PageUp, Key.Key_PageDown])
def test_arrows_do_not_step_through_materials_unseen(shown: Shown, key: Qt.Key) -> None:
    """In the open box an arrow shows the list; the text stays until one is taken."""
    shown.go(1, MATERIAL)
    press(Key.Key_F2)
    box = shown.editor()
    assert isinstance(box, MaterialBox)
    press(key)

    assert box.currentText() == "PTFE"
    assert box.view().isVisible()
    box.hidePopup()


def test_wheel_changes_nothing(shown: Shown) -> None:
    """Rolling the wheel over an open box of materials changes nothing."""
    shown.go(1, MATERIAL)
    press(Key.Key_F2)
    box = shown.editor()
    assert isinstance(box, MaterialBox)
    place = QPointF(box.rect().center())
    wheel = QWheelEvent(
        place,
        QPointF(box.mapToGlobal(box.rect().center())),
        QPoint(),
        QPoint(0, -120),
        Qt.MouseButton.NoButton,
        Qt.KeyboardModifier.NoModifier,
        Qt.ScrollPhase.NoScrollPhase,
        False,
    )
    QApplication.sendEvent(box, wheel)

    assert box.currentText() == "PTFE"


def test_change_elsewhere_leaves_the_open_cell_alone(shown: Shown) -> None:
    """While one cell is being typed into, an edit of another row changes that row only."""
    shown.go(1, THICKNESS)
    shown.keys("7")
    shown.panel.table.elements_model().move_elements((1,), 3)

    assert shown.line().text() == "7"
    press(Key.Key_Return)
    assert thickness(shown, 0) == "7 mm"


def test_cells_of_the_other_kind_take_no_text(shown: Shown) -> None:
    """A layer has no resistance and a half-space no thickness: nothing opens there."""
    shown.panel.add_sheet()
    for row, column in ((1, 4), (0, THICKNESS), (shown.panel.table.elements_model().rowCount() - 1, THICKNESS)):
        shown.go(row, column)
        press(Key.Key_F2)
        assert shown.editor() is None


def test_parts_of_a_sheet_come_and_go(shown: Shown) -> None:
    """An inductance typed is there, and an emptied resistance is gone; the last part cannot be emptied."""
    shown.go(3, THICKNESS)
    shown.panel.add_sheet()
    assert shown.at() == (4, 4)
    shown.panel.show_rare_columns(True)
    shown.go(4, 5)
    shown.keys("20 pH")
    press(Key.Key_Return)
    shown.go(4, 4)
    press(Key.Key_Backspace)
    press(Key.Key_Return)
    assert shown.texts()[4][4:] == ["", "20 pH", "", ""]

    shown.go(4, 5)
    press(Key.Key_Backspace)
    press(Key.Key_Return)
    assert shown.session.document.draft(Cell(0, 3, "inductance")) is not None
