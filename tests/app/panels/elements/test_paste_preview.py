"""What a pasted block leaves open is asked below the table, with the rows as they will be."""

import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest

from app.document import edits
from app.panels.elements.doubts import Doubts, doubts_of, preview, settled
from stackcore.job.records import LayerRecord
from tests.app.panels.elements.conftest import Shown


def paste(shown: Shown, text: str) -> None:
    """Paste a text behind everything."""
    QGuiApplication.clipboard().setText(text)
    shown.panel.table.select_elements((2,))
    shown.panel.paste()


def thicknesses(shown: Shown) -> list[float]:
    """Return the thicknesses of the stack's layers in m."""
    elements = shown.session.record.stacks[0].elements
    return [one.thickness.value for one in elements if isinstance(one, LayerRecord)]


@pytest.mark.parametrize(
    ("texts", "doubts"),
    [
        (["0.5"], Doubts(unit=True)),
        (["0.5 mm"], Doubts()),
        (["1,234"], Doubts(unit=True, comma=True)),
        (["1,234 um"], Doubts(comma=True)),
        (["1,234 um", "0,5 um"], Doubts()),
        (["1,23 um"], Doubts()),
        (["1,234,567 nm"], Doubts(comma=True)),
        (["0,234 um"], Doubts()),
        (["1234,5 um"], Doubts()),
        (["two"], Doubts()),
        ([""], Doubts()),
    ],
)
def test_what_is_in_doubt(texts: list[str], doubts: Doubts) -> None:
    """A unit that is missing, and commas of which none shows what they are."""
    assert doubts_of([{"material": "air", "thickness": text} for text in texts], 0) == doubts


def test_a_number_typed_over_has_the_unit_of_before() -> None:
    """That is no doubt: it is how typing works."""
    assert doubts_of([{"thickness": "0.5"}], 1) == Doubts()


def test_commas_and_units_are_settled_as_decided() -> None:
    """Of both meanings each row becomes a text that has just that one."""
    rows = [{"thickness": "1,234"}, {"thickness": "2"}]
    assert settled(rows, 0, "um", "thousands") == ({"thickness": "1234 um"}, {"thickness": "2 um"})
    assert settled(rows, 0, "mm", "decimal") == ({"thickness": "1.234 mm"}, {"thickness": "2 mm"})
    assert preview(settled(rows, 0, "mm", "decimal")).splitlines() == ["1.234 mm", "2 mm"]
    assert "has no value" in preview([{"thickness": "two"}])


def test_a_clear_block_is_pasted_at_once(shown: Shown) -> None:
    """Nothing is asked where nothing is open."""
    paste(shown, "Material\tThickness (mm)\nair\t0,5\nair\t12\n")
    assert not shown.panel.paste_preview.isVisible()
    assert thicknesses(shown)[-2:] == pytest.approx([0.5e-3, 12e-3])


def test_a_missing_unit_is_asked_for_and_taken(shown: Shown) -> None:
    """Nothing changes before it is decided; then it is one step of undo."""
    before = shown.session.record
    paste(shown, "Material\tThickness\nair\t5\nair\t20\n")
    asked = shown.panel.paste_preview
    assert asked.isVisible()
    assert shown.session.record is before
    assert asked.text.toPlainText().splitlines() == ["air   5 mm", "air   20 mm"]
    asked.unit.setCurrentIndex(asked.unit.findData("mil"))
    asked.unit.activated.emit(asked.unit.currentIndex())
    assert "0.127 mm" in asked.text.toPlainText()
    QTest.keyClick(asked.paste, Qt.Key.Key_Return)
    assert not asked.isVisible()
    assert thicknesses(shown)[-2:] == pytest.approx([5 * 25.4e-6, 20 * 25.4e-6])
    shown.session.undo()
    assert shown.session.record == before


def test_escape_leaves_the_stack(shown: Shown) -> None:
    """The focus is back in the table, and the clipboard still holds the block."""
    before = shown.session.record
    paste(shown, "Material\tThickness\nair\t1,234\n")
    asked = shown.panel.paste_preview
    assert asked.comma.isVisible()
    QTest.keyClick(asked.paste, Qt.Key.Key_Escape)
    assert not asked.isVisible()
    assert shown.session.record is before
    assert shown.panel.table.hasFocus()
    assert "1,234" in QGuiApplication.clipboard().text()


def test_an_edit_meanwhile_withdraws_the_question(shown: Shown) -> None:
    """The rows it would have gone to may be others by now."""
    paste(shown, "Material\tThickness\nair\t5\n")
    shown.session.apply(edits.delete(0, (0,)))
    assert not shown.panel.paste_preview.isVisible()
