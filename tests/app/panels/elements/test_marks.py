"""What copied rows say beside their values comes back with them: left out, locked, groups with their counts."""

import pytest
from PySide6.QtGui import QGuiApplication

from app.document import edits
from app.panels.elements.lines import Marks, marks_of
from stackcore.job.records import Group
from tests.app.panels.elements.conftest import Shown


def select(shown: Shown, *rows: int) -> None:
    """Select elements."""
    shown.panel.table.select_elements(rows)


def test_left_out_and_locked_rows_paste_as_they_were(shown: Shown) -> None:
    """A row left out must not come back computed; one step of undo takes the paste away."""
    shown.session.apply(edits.set_enabled(0, (0,), on=False))
    shown.session.apply(edits.set_locked(0, (0, 1), on=True))
    before = shown.session.record
    select(shown, 0, 1)
    shown.panel.copy()
    shown.panel.paste()
    old, new = shown.session.record.stacks[0].elements[:2], shown.session.record.stacks[0].elements[2:4]
    assert old == new
    shown.session.undo()
    assert shown.session.record == before


def test_rows_typed_over_take_the_marks_of_what_is_pasted(shown: Shown) -> None:
    """Whole rows pasted from a sheet with the column What say whether they are computed."""
    QGuiApplication.clipboard().setText("What\tMaterial\tThickness\nLayer, left out\tair\t2 mm\n")
    select(shown, 0)
    shown.panel.paste()
    element = shown.session.record.stacks[0].elements[1]
    assert not element.enabled


def test_a_group_copied_whole_is_a_group_again(shown: Shown) -> None:
    """With its count; a part of it comes as single rows."""
    shown.session.apply(edits.group_rows(0, (0, 1), 5))
    select(shown, 0, 1)
    shown.panel.copy()
    select(shown, 2)
    shown.panel.paste()
    assert shown.session.record.stacks[0].groups == (Group(0, 1, 5), Group(3, 4, 5))
    select(shown, 0)
    shown.panel.copy()
    select(shown, 4)
    shown.panel.paste()
    assert shown.session.record.stacks[0].groups == (Group(0, 1, 5), Group(3, 4, 5))
    assert len(shown.session.record.stacks[0].elements) == 6


def test_a_row_in_a_group_of_its_own(shown: Shown) -> None:
    """A single element repeated has no bracket, and comes back repeated."""
    shown.session.apply(edits.group_rows(0, (2,), 3))
    select(shown, 2)
    shown.panel.copy()
    shown.panel.paste()
    assert shown.session.record.stacks[0].groups == (Group(2, 2, 3), Group(3, 3, 3))


def test_the_count_stands_beside_the_bracket(shown: Shown) -> None:
    """However many columns there are, Times is the third: it is never scrolled out of sight."""
    shown.session.apply(edits.group_rows(0, (0, 1), 2))
    titles = [column.title for column in shown.panel.table.elements_model().columns]
    assert titles[:4] == ["No.", "What", "Times", "Material"]


@pytest.mark.parametrize(
    ("what", "number", "marks"),
    [
        ("Layer", "1", Marks(False, False)),
        ("Film, left out, locked", "2", Marks(True, True)),
        ("Layer", "3 ┐ ×4", Marks(False, False, 4)),
        ("Layer", "4 │", Marks(False, False, None, True)),
        ("Layer", "5 ┘", Marks(False, False, None, True, True)),
        ("Layer", "6 ×2", Marks(False, False, 2, False, True)),
        ("", "", Marks()),
    ],
)
def test_words_and_brackets_are_read(what: str, number: str, marks: Marks) -> None:
    """What the table writes of a row is what is read of it."""
    assert marks_of({"what": what, "number": number}) == marks
