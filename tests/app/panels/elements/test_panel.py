"""The panel: rows added, moved and deleted, copied and pasted; stacks; selection; what it says."""

import pytest
from PySide6.QtCore import QItemSelectionModel, Qt
from PySide6.QtGui import QGuiApplication, QImage
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QComboBox, QLabel, QLineEdit, QToolButton

from app.document import edits
from app.document.document import Cell, Selection
from app.document.session import Session
from app.look.theme import LIGHT, THEMES
from app.panels.elements.panel import ElementsPanel
from app.panels.elements.stacks import StackBar
from stackcore.job.records import LayerRecord
from tests.app.conftest import flush_deferred_deletes
from tests.app.panels.elements.conftest import Shown, press

Key = Qt.Key
Alt = Qt.KeyboardModifier.AltModifier
Shift = Qt.KeyboardModifier.ShiftModifier
Control = Qt.KeyboardModifier.ControlModifier


def materials(shown: Shown) -> list[str]:
    """Return what stands under Material for each element."""
    return [row[2] for row in shown.texts()[1:-1]]


def select(shown: Shown, *rows: int) -> None:
    """Select table rows as a person does with Ctrl and the mouse."""
    flags = QItemSelectionModel.SelectionFlag
    shown.go(rows[0], 2)
    model = shown.panel.table.elements_model()
    for row in rows[1:]:
        shown.panel.table.selectionModel().select(model.index(row, 2), flags.Select | flags.Rows)


def note(shown: Shown) -> str:
    """Return the sentence under the table, empty when there is none."""
    labels = [label for label in shown.panel.findChildren(QLabel) if label.wordWrap() and label.isVisible()]
    return labels[0].text() if labels else ""


def put_on_clipboard(text: str) -> None:
    """Copy `text` as another program would."""
    QGuiApplication.clipboard().setText(text)


# Rows


def test_insert_adds_a_layer_like_the_one_before(shown: Shown) -> None:
    """Insert puts a layer behind the current one, of its material, selects it, and has its material current."""
    shown.go(2, 3)
    press(Key.Key_Insert)

    assert materials(shown) == ["PTFE", "Copper", "Copper", "air"]
    assert shown.texts()[3][3] == "1 mm"
    assert shown.session.selection == Selection(0, (2,))
    assert shown.at() == (3, 2)


def test_insert_at_the_front_row_adds_first(shown: Shown) -> None:
    """With the front half-space selected the new layer is the first one."""
    shown.go(0, 2)
    press(Key.Key_Insert)

    assert materials(shown) == ["air", "PTFE", "Copper", "air"]


def test_shift_insert_adds_a_sheet(shown: Shown) -> None:
    """Shift+Insert puts in a sheet, shows its column and has its resistance current."""
    shown.go(1, 3)
    press(Key.Key_Insert, Shift)

    assert shown.texts()[2] == ["2", "Sheet", "", "", "377 ohm/sq"]
    assert shown.at() == (2, 4)


def test_rare_columns_are_shown_from_the_menus_and_leave_the_selection(shown: Shown) -> None:
    """The switch stands in the menu of the table and of its header; what is selected stays selected, whole rows."""
    shown.session.apply(edits.add_sheet(0, 0))
    shown.go(2, 3)
    (action,) = shown.panel.table.horizontalHeader().actions()
    assert action in shown.panel.table.actions()
    for columns in (8, 5):
        action.trigger()
        assert shown.panel.table.elements_model().columnCount() == columns
        assert shown.panel.rare_columns == action.isChecked() == (columns == 8)
        assert shown.panel.table.selected_elements() == shown.session.selection.rows == (1,)
    shown.panel.delete()
    assert [line[1] for line in shown.texts()[1:-1]] == ["Sheet", "Layer", "Layer"]


def test_delete_takes_all_selected_rows_at_once(shown: Shown) -> None:
    """Delete removes the selected elements in one step; half-spaces stay though selected."""
    shown.panel.table.selectAll()
    press(Key.Key_Delete)

    assert materials(shown) == []
    assert [row[1] for row in shown.texts()] == ["Front", "Back"]
    shown.session.undo()
    assert materials(shown) == ["PTFE", "Copper", "air"]
    assert shown.session.undo_sentence == ""


def test_block_moves_with_alt_and_arrows(shown: Shown) -> None:
    """Alt+Down and Alt+Up move the selected rows as one block, which stays selected, and stop at the ends."""
    select(shown, 1, 2)
    press(Key.Key_Down, Alt)
    assert materials(shown) == ["air", "PTFE", "Copper"]
    assert shown.session.selection.rows == (1, 2)
    press(Key.Key_Down, Alt)
    assert materials(shown) == ["air", "PTFE", "Copper"]
    press(Key.Key_Up, Alt)
    press(Key.Key_Up, Alt)

    assert materials(shown) == ["PTFE", "Copper", "air"]
    shown.session.undo()
    shown.session.undo()
    assert shown.session.undo_sentence == ""


def test_buttons_do_what_their_words_say(shown: Shown) -> None:
    """Every button has words, a tip and a place in the order of Tab, and does its work."""
    buttons = {button.text(): button for button in shown.panel.findChildren(QToolButton)}
    del buttons["Paste"], buttons["Do not paste"]  # of a question that is not asked
    assert list(buttons)[:6] == ["Add layer", "Add sheet", "Duplicate", "Delete", "Up", "Down"]
    for button in buttons.values():
        assert button.toolTip()
        assert button.focusPolicy() & Qt.FocusPolicy.TabFocus

    shown.go(2, 2)
    for name, wanted in (
        ("Duplicate", ["PTFE", "Copper", "Copper", "air"]),
        ("Up", ["PTFE", "Copper", "Copper", "air"]),
        ("Up", ["Copper", "PTFE", "Copper", "air"]),
        ("Down", ["PTFE", "Copper", "Copper", "air"]),
        ("Delete", ["PTFE", "Copper", "air"]),
    ):
        QTest.keyClick(buttons[name], Key.Key_Space)
        assert materials(shown) == wanted


def test_buttons_that_need_rows_are_off_without(shown: Shown) -> None:
    """With nothing or only a half-space selected there is nothing to delete, copy or move."""
    buttons = {button.text(): button for button in shown.panel.findChildren(QToolButton)}
    shown.go(0, 2)
    assert not buttons["Delete"].isEnabled()
    shown.go(1, 2)
    assert buttons["Delete"].isEnabled()


# Clipboard


def test_copied_rows_paste_as_new_rows(shown: Shown) -> None:
    """Rows copied and pasted come in behind the selection, in one step, with their texts as typed."""
    select(shown, 1, 3)
    press(Key.Key_C, Control)
    assert QGuiApplication.clipboard().text().splitlines() == [
        "No.\tWhat\tMaterial\tThickness",
        "1\tLayer\tPTFE\t3 mm",
        "3\tLayer\tair\t1/8 in",
    ]
    assert "<table>" in QGuiApplication.clipboard().mimeData().html()
    press(Key.Key_V, Control)

    assert materials(shown) == ["PTFE", "Copper", "air", "PTFE", "air"]
    assert shown.texts()[5][3] == "1/8 in"
    assert shown.session.selection.rows == (3, 4)
    shown.session.undo()
    assert shown.session.undo_sentence == ""


def test_cut_and_paste_a_sheet(shown: Shown) -> None:
    """A sheet that is cut comes back with the same parts and no others."""
    shown.go(3, 2)
    shown.panel.add_sheet()
    shown.session.apply(edits.type_into(Cell(0, 3, "capacitance"), "0,5 pF"))
    shown.session.apply(edits.type_into(Cell(0, 3, "resistance"), ""))
    sheet = shown.session.record.stacks[0].elements[3]
    shown.go(4, 5)
    press(Key.Key_X, Control)
    shown.go(0, 2)
    press(Key.Key_V, Control)

    assert shown.session.record.stacks[0].elements[0] == sheet
    assert shown.session.document.drafts == ()


def test_one_column_fills_down(shown: Shown) -> None:
    """A column from a spreadsheet is typed over the cells below the current one; rows beyond are new layers."""
    shown.go(2, 3)
    put_on_clipboard("0,5 mm\r\n1,5 mm\r\n2 mm\r\n3 mm\r\n")
    press(Key.Key_V, Control)

    assert [row[3] for row in shown.texts()[1:-1]] == ["3 mm", "0,5 mm", "1,5 mm", "2 mm", "3 mm"]
    assert materials(shown) == ["PTFE", "Copper", "air", "air", "air"]
    layer = shown.session.record.stacks[0].elements[1]
    assert isinstance(layer, LayerRecord)
    assert layer.thickness.value == 0.0005
    shown.session.undo()
    assert materials(shown) == ["PTFE", "Copper", "air"]


def test_bad_cells_arrive_marked(shown: Shown) -> None:
    """Of a pasted block the good cells count at once and the others stand marked as they were; all is one step."""
    shown.go(1, 2)
    put_on_clipboard("air\t2 mm\nunobtainium\t1.5.0 mm\nCopper\tthin\n")
    press(Key.Key_V, Control)

    assert [row[2:4] for row in shown.texts()[1:-1]] == [
        ["air", "2 mm"],
        ["unobtainium", "1.5.0 mm"],
        ["Copper", "thin"],
    ]
    assert [draft.text for draft in shown.session.document.drafts] == ["unobtainium", "1.5.0 mm", "thin"]
    shown.session.undo()
    assert shown.session.document.drafts == ()


def test_whole_stack_with_header_in_any_order(shown: Shown) -> None:
    """Titles in another order name the columns of new rows; a unit in a title counts; library names are found."""
    shown.go(4, 2)
    put_on_clipboard("Thickness (mm)\tResistance\tMaterial\n0,035\t\tlibrary: copper\n\t377\t\n")
    press(Key.Key_V, Control)

    assert [row[1:5] for row in shown.texts()[4:6]] == [
        ["Layer", "Copper", "0,035 mm", ""],
        ["Sheet", "", "", "377 ohm/sq"],
    ]


def test_paste_that_would_lose_text_is_refused(shown: Shown) -> None:
    """A thickness over a sheet is refused as a whole, with a reason."""
    shown.go(1, 2)
    shown.panel.add_sheet()
    shown.go(1, 3)
    put_on_clipboard("1 mm\n2 mm\n")
    before = shown.session.record
    press(Key.Key_V, Control)

    assert shown.session.record == before
    assert "belongs to a layer, and element 2 is a sheet" in shown.said[0][0]


def test_material_of_a_half_space_pastes(shown: Shown) -> None:
    """One cell on the clipboard goes into a half-space's material."""
    shown.go(4, 2)
    put_on_clipboard("metal")
    press(Key.Key_V, Control)

    assert shown.session.record.stacks[0].back == "metal"


def test_nothing_to_paste_is_said(shown: Shown) -> None:
    """An empty clipboard changes nothing and says so."""
    put_on_clipboard("")
    press(Key.Key_V, Control)

    assert shown.said == [("There is no text on the clipboard to paste.", "note")]
    assert shown.session.undo_sentence == ""


# Selection


def test_selection_goes_both_ways(shown: Shown) -> None:
    """Rows selected here are the session's, and rows selected elsewhere are selected here."""
    select(shown, 1, 3)
    assert shown.session.selection == Selection(0, (0, 2))
    shown.session.select(Selection(0, (1,)))
    assert shown.panel.table.selected_elements() == (1,)
    assert shown.at()[0] == 2
    shown.session.select(Selection(0, ()))
    assert shown.panel.table.selected_elements() == ()


def test_selection_comes_back_with_undo(shown: Shown) -> None:
    """Undoing a deletion selects the rows that came back."""
    select(shown, 1, 2)
    press(Key.Key_Delete)
    assert shown.session.selection.rows == (0,)
    shown.session.undo()

    assert shown.panel.table.selected_elements() == (0, 1)


def test_selection_elsewhere_does_not_shut_the_open_cell(shown: Shown) -> None:
    """While a cell is open, a row selected in another panel leaves it open."""
    shown.go(1, 3)
    shown.keys("7")
    shown.session.select(Selection(0, (2,)))

    assert shown.line().text() == "7"
    press(Key.Key_Escape)


# Stacks


def test_chooser_only_with_several_stacks(shown: Shown) -> None:
    """With one stack there is nothing to choose; with two the chooser shows the other one's elements."""
    bar = shown.panel.findChild(StackBar)
    assert bar is not None
    assert not bar.isVisible()
    shown.session.apply(edits.add_stack())
    assert bar.isVisible()
    assert len(shown.texts()) == 2
    box = bar.findChild(QComboBox)
    assert box is not None
    QTest.keyClick(box, Key.Key_Up)

    assert shown.session.selection.stack == 0
    assert materials(shown) == ["PTFE", "Copper", "air"]


def test_rename_in_place(shown: Shown) -> None:
    """The line takes a name with Enter, keeps the old one with Escape, and stays open when the name is taken."""
    shown.session.apply(edits.add_stack())
    bar = shown.panel.findChild(StackBar)
    assert bar is not None
    line = bar.findChild(QLineEdit, options=Qt.FindChildOption.FindDirectChildrenOnly)
    assert line is not None
    bar.rename()
    line.setText("A")
    press(Key.Key_Return)
    assert "'A' is taken" in shown.said[0][0]
    assert line.isVisible()
    line.setText("Wet")
    press(Key.Key_Return)
    assert [stack.name for stack in shown.session.record.stacks] == ["A", "Wet"]
    assert not line.isVisible()

    bar.rename()
    line.setText("Dry")
    press(Key.Key_Escape)
    assert [stack.name for stack in shown.session.record.stacks] == ["A", "Wet"]


@pytest.mark.parametrize(
    ("text", "names"),
    [("Add stack", ["A", "B"]), ("Duplicate stack", ["A", "B"]), ("Delete stack", ["A"])],
)
def test_menu_of_stacks(shown: Shown, text: str, names: list[str]) -> None:
    """The menu adds and copies stacks; deleting the only one is refused with a reason."""
    button = next(b for b in shown.panel.findChildren(QToolButton) if b.text() == "Stacks")
    menu = button.menu()
    assert menu is not None
    next(action for action in menu.actions() if action.text() == text).trigger()

    assert [stack.name for stack in shown.session.record.stacks] == names
    assert bool(shown.said) == (text == "Delete stack")


# What it says


def test_fault_of_the_current_cell_is_written_out(shown: Shown) -> None:
    """The reason stands under the table, with its place while another cell is current."""
    assert note(shown) == ""
    shown.go(1, 3)
    shown.keys("3 mmm")
    press(Key.Key_Return)
    assert note(shown).startswith("Thickness of layer 1: Unknown unit 'mmm', did you mean 'mm'? Allowed: a length")
    assert note(shown).endswith("for example '2 mm'. The curves show the values of before.")
    shown.session.apply(edits.type_into(Cell(0, 1, "material"), "unobtainium"))
    assert note(shown).endswith(" 1 more in this table. The curves show the values of before.")
    shown.session.undo()
    press(Key.Key_Up)
    assert note(shown).startswith("Unknown unit 'mmm', did you mean 'mm'? Allowed: a length")
    shown.session.undo()
    assert note(shown) == ""


@pytest.mark.parametrize("name", list(THEMES))
def test_colours_follow_the_theme(shown: Shown, name: str) -> None:
    """Ground, fault and selection are those of the theme, and a fault can be told without its colour."""
    theme = THEMES[name]
    shown.panel.set_theme(theme)
    shown.session.apply(edits.type_into(Cell(0, 0, "thickness"), "thin"))
    table = shown.panel.table
    cell = table.visualRect(table.elements_model().index(1, 3))
    plain = table.visualRect(table.elements_model().index(2, 3))
    image = table.viewport().grab().toImage()

    assert image.pixelColor(plain.left() + 2, plain.top() + 3).name() == theme.base
    assert image.pixelColor(cell.left() + 2, cell.top() + 3).name() not in (theme.base, theme.selection)
    mark = [image.pixelColor(x, cell.center().y()).name() for x in range(cell.left(), cell.left() + 24)]
    assert theme.fault in mark


def test_f6_leaves_the_table(shown: Shown) -> None:
    """F6 gives the focus to what stands behind the table, which Tab does not."""
    shown.go(1, 2)
    press(Key.Key_Tab)
    assert shown.panel.table.hasFocus()
    press(Key.Key_F6)

    assert not shown.panel.table.hasFocus()


def test_window_shortcuts_do_not_take_the_table_keys(shown: Shown) -> None:
    """Keys the table handles itself are claimed by it, so that they do one thing once."""
    action = shown.panel.addAction("Insert elsewhere")
    action.setShortcut("Ins")
    done: list[int] = []
    action.triggered.connect(lambda: done.append(1))
    shown.go(1, 2)
    press(Key.Key_Insert)

    assert not done
    assert len(materials(shown)) == 4


def test_empty_stack_says_how_to_begin(shown: Shown) -> None:
    """Under two half-spaces with nothing between stands what to press."""
    shown.panel.table.selectAll()
    press(Key.Key_Delete)
    after = shown.panel.table.viewport().grab().toImage()

    def inks(image: QImage) -> int:
        below = shown.panel.table.rowViewportPosition(1) + shown.panel.table.rowHeight(1) + 12
        return len({image.pixelColor(x, below + y).name() for x in range(8, 300) for y in range(16)})

    assert inks(after) > 3


def test_panel_stops_listening_when_it_is_gone(qapp: QApplication, session: Session) -> None:
    """A panel that is deleted is not told of later changes."""
    panel = ElementsPanel(session, LIGHT, lambda text, severity: None)
    panel.deleteLater()
    flush_deferred_deletes()

    assert session.apply(edits.delete(0, (0,))) == ()
    assert qapp.activeModalWidget() is None
