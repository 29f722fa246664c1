"""What keys and clicks mean in the drawing."""

from PySide6.QtCore import Qt

from app.document import edits
from app.document.document import Selection
from app.document.edit import Edit
from app.document.history import Brief
from app.panels.wall.scale import nudge
from stackcore.job.records import LayerRecord, StackRecord

_PLAIN = Qt.KeyboardModifier.NoModifier
_KEYPAD = Qt.KeyboardModifier.KeypadModifier
_SHIFT = Qt.KeyboardModifier.ShiftModifier
_ALT = Qt.KeyboardModifier.AltModifier

FINE = 0.1
"""Part of a step that a key with Shift makes."""


def row_wanted(key: int, modifiers: Qt.KeyboardModifier, rows: tuple[int, ...], count: int) -> int | None:
    """Return the row that Left, Right, Home or End leads to from the selected `rows`; None for other keys."""
    if not count or modifiers & ~_KEYPAD != _PLAIN:
        return None
    if key == Qt.Key.Key_Home:
        return 0
    if key == Qt.Key.Key_End:
        return count - 1
    if key == Qt.Key.Key_Right:
        return min(rows[-1] + 1, count - 1) if rows else 0
    if key == Qt.Key.Key_Left:
        return max(rows[0] - 1, 0) if rows else count - 1
    return None


def steps_wanted(key: int, modifiers: Qt.KeyboardModifier) -> float:
    """Return by how many steps a key changes the thickness, 0 for other keys.

    + and − alone, or the right and left arrow with Alt, each with Shift for a tenth of a step. Where + is typed
    with Shift (and = without) both are a whole step: there, Alt with the arrows has the fine one.
    """
    held = modifiers & ~(_KEYPAD | _SHIFT)
    size = FINE if modifiers & _SHIFT else 1.0
    if held == _PLAIN and key in (Qt.Key.Key_Plus, Qt.Key.Key_Equal):
        return size if modifiers & _KEYPAD else 1.0
    if held == _PLAIN and key == Qt.Key.Key_Minus:
        return -size
    if held == _ALT and key in (Qt.Key.Key_Right, Qt.Key.Key_Left):
        return size if key == Qt.Key.Key_Right else -size
    return 0.0


def nudges(stack: StackRecord, selection: Selection, steps: float) -> tuple[Edit, ...]:
    """Return the edits that make the selected layers thicker or thinner; together they are one step to undo."""
    key = Brief(("nudge", selection))
    found = []
    for row in selection.rows:
        element = stack.elements[row]
        if isinstance(element, LayerRecord):
            thickness = nudge(element.thickness.value, steps)
            found.append(edits.set_thickness(selection.stack, row, thickness, merge_key=key))
    return tuple(found)


def clicked(rows: tuple[int, ...], row: int | None, *, extend: bool, toggle: bool) -> tuple[int, ...]:
    """Return what is selected after a click on `row` (None: beside the wall) with Shift or Ctrl held."""
    if row is None:
        return rows if extend or toggle else ()
    if toggle:
        return tuple(sorted({*rows} ^ {row}))
    if extend and rows:
        first, last = min(rows[0], row), max(rows[-1] if row >= rows[0] else rows[0], row)
        return tuple(range(first, last + 1))
    return (row,)
