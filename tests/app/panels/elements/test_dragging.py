"""Rows dragged with the mouse, as far as a program can drag."""

import pytest
from PySide6.QtCore import QEvent, QMimeData, QPoint, QPointF, Qt
from PySide6.QtGui import QDragEnterEvent, QDragLeaveEvent, QDragMoveEvent, QDropEvent
from PySide6.QtWidgets import QApplication

from app.document.document import Selection
from app.panels.elements.table import ElementsTable
from tests.app.panels.elements.conftest import Shown


class DropFromTable(QDropEvent):
    """A drop whose source is a table: Qt only knows the source of a real drag."""

    def __init__(self, place: QPointF, data: QMimeData, source: ElementsTable) -> None:
        super().__init__(
            place,
            Qt.DropAction.MoveAction,
            data,
            Qt.MouseButton.LeftButton,
            Qt.KeyboardModifier.NoModifier,
        )
        self._source = source

    def source(self) -> ElementsTable:
        return self._source


def between(shown: Shown, row: int) -> QPoint:
    """Return the place in the table just above a row."""
    table = shown.panel.table
    return QPoint(40, table.rowViewportPosition(row) + 2)


def drop(shown: Shown, place: QPoint) -> QDropEvent:
    """Drop what is selected at `place`."""
    table = shown.panel.table
    data = table.elements_model().mimeData(table.selectedIndexes())
    event = DropFromTable(QPointF(place), data, table)
    table.dropEvent(event)
    return event


def materials(shown: Shown) -> list[str]:
    """Return what stands under Material for each element."""
    return [row[2] for row in shown.texts()[1:-1]]


def test_block_dropped_is_one_step(shown: Shown) -> None:
    """Two rows dropped at the end move together, stay selected, and come back with one undo."""
    table = shown.panel.table
    shown.session.select(Selection(0, (0, 1)))
    event = drop(shown, between(shown, 4))

    assert event.isAccepted()
    assert materials(shown) == ["air", "PTFE", "Copper"]
    assert table.selected_elements() == (1, 2)
    shown.session.undo()
    assert materials(shown) == ["PTFE", "Copper", "air"]
    assert shown.session.undo_sentence == ""


@pytest.mark.parametrize("row", [0, 1, 2])
def test_drop_where_it_was_changes_nothing(shown: Shown, row: int) -> None:
    """A row dropped at its own place, or before the front, which cannot be passed, leaves no step."""
    shown.panel.table.selectRow(1)
    drop(shown, between(shown, row))

    assert materials(shown) == ["PTFE", "Copper", "air"]
    assert shown.session.undo_sentence == ""


def test_places_to_drop(shown: Shown) -> None:
    """The upper half of a row is before it, the lower behind it; half-spaces cannot be passed; below is the end."""
    table = shown.panel.table
    half = table.rowHeight(0) // 2

    assert table.drop_place(between(shown, 0)) == 0
    assert table.drop_place(between(shown, 2)) == 1
    assert table.drop_place(between(shown, 2) + QPoint(0, half)) == 2
    assert table.drop_place(between(shown, 4) + QPoint(0, half)) == 3
    assert table.drop_place(QPoint(40, table.viewport().height() - 1)) == 3


def test_half_space_does_not_move(shown: Shown) -> None:
    """A selected half-space is not taken along."""
    shown.panel.table.selectRow(0)
    drop(shown, between(shown, 3))

    assert [row[1] for row in shown.texts()] == ["Front", "Layer", "Layer", "Layer", "Back"]
    assert shown.session.undo_sentence == ""


def test_drag_from_elsewhere_is_not_taken(shown: Shown) -> None:
    """Rows of another program's table cannot be dropped, and nothing changes."""
    table = shown.panel.table
    data = QMimeData()
    data.setText("air\t1 mm")
    place = QPointF(between(shown, 2))
    event = QDropEvent(
        place, Qt.DropAction.MoveAction, data, Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier
    )
    table.dropEvent(event)

    assert not event.isAccepted()
    assert materials(shown) == ["PTFE", "Copper", "air"]


def test_line_shows_where_rows_will_go(shown: Shown) -> None:
    """While rows are dragged, a line across the table stands where they would go, and goes when they leave."""
    table = shown.panel.table
    table.selectRow(1)
    data = table.elements_model().mimeData(table.selectedIndexes())

    class Move(QDragMoveEvent):
        def source(self) -> ElementsTable:
            return table

    place = between(shown, 3)
    buttons, keys = Qt.MouseButton.LeftButton, Qt.KeyboardModifier.NoModifier
    enter = QDragEnterEvent(place, Qt.DropAction.MoveAction, data, buttons, keys)
    QApplication.sendEvent(table.viewport(), enter)
    move = Move(place, Qt.DropAction.MoveAction, data, buttons, keys, QEvent.Type.DragMove)
    table.dragMoveEvent(move)
    y = table.rowViewportPosition(3) - 1
    during = table.viewport().grab().toImage()
    table.dragLeaveEvent(QDragLeaveEvent())
    after = table.viewport().grab().toImage()

    assert move.isAccepted()
    places = range(20, table.viewport().width() - 20, 40)
    assert {during.pixelColor(x, y).name() for x in places} == {"#5348c7"}
    assert "#5348c7" not in {after.pixelColor(x, y).name() for x in places}
