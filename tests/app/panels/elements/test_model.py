"""The model under Qt's own checker, through every kind of change."""

from collections.abc import Callable

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from PySide6.QtCore import QModelIndex, QPersistentModelIndex, Qt
from PySide6.QtTest import QAbstractItemModelTester
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import Cell, Selection
from app.document.edit import Edit
from app.document.session import Session
from app.panels.elements.columns import columns_of
from app.panels.elements.lines import lines_of
from app.panels.elements.model import ElementsModel
from app.panels.tables.delegate import Ask
from tests.app.panels.elements.conftest import length, make_session


def checked(session: Session) -> tuple[ElementsModel, QAbstractItemModelTester]:
    """Return a model under Qt's checker, which stops the program at the first untruth."""
    model = ElementsModel(session)
    return model, QAbstractItemModelTester(model, QAbstractItemModelTester.FailureReportingMode.Fatal)


def shown(model: ElementsModel) -> list[list[object]]:
    """Return all texts."""
    return [[model.index(r, c).data() for c in range(model.columnCount())] for r in range(model.rowCount())]


def expected(session: Session) -> list[list[object]]:
    """Return all texts as the document has them now."""
    stack = session.selection.stack
    columns = columns_of(session.document, stack)
    return [[line.cell(column).text for column in columns] for line in lines_of(session.document, stack)]


def edit_of(kind: int, a: int, b: int, session: Session) -> Edit:
    """Return one of many edits, with rows that exist."""
    stack = session.selection.stack
    count = len(session.record.stacks[stack].elements)
    row, other = a % max(count, 1), b % (count + 1)
    rows = sorted({row, min(other, count - 1)}) if count else []
    made: list[Callable[[], Edit]] = [
        lambda: edits.add_layer(stack, other, "air", length(f"{a % 7} mm")),
        lambda: edits.add_sheet(stack, other),
        lambda: edits.delete(stack, rows),
        lambda: edits.duplicate(stack, rows),
        lambda: edits.move(stack, rows, other),
        lambda: edits.type_into(Cell(stack, row, "thickness"), f"{b % 5} mm"),
        lambda: edits.type_into(Cell(stack, row, "thickness"), "thin"),
        lambda: edits.type_into(Cell(stack, row, "material"), "copper"),
        lambda: edits.type_into(Cell(stack, row, "capacitance"), f"{b % 3} pF"),
        lambda: edits.type_into(Cell(stack, row, "inductance"), "" if b % 2 else "20 pH"),
        lambda: edits.type_into(Cell(stack, -1, "back"), "metal" if a % 2 else "air"),
        lambda: edits.add_stack(),
        lambda: edits.duplicate_stack(stack),
        lambda: edits.delete_stack(stack),
        lambda: edits.rename_material(session.record.materials[0].name, f"name-{a}"),
    ]
    return made[kind % len(made)]()


steps = st.lists(st.tuples(st.integers(0, 18), st.integers(0, 20), st.integers(0, 20)), max_size=16)


@given(steps=steps)
@settings(max_examples=60)
@pytest.mark.usefixtures("qapp")
def test_model_tells_the_truth_through_everything(steps: list[tuple[int, int, int]]) -> None:
    """Through edits, moves, undo, redo and other stacks the model shows the document, and Qt's checker agrees."""
    session = make_session()
    model, tester = checked(session)
    for kind, a, b in steps:
        if kind == 16:
            session.undo()
        elif kind == 17:
            session.redo()
        elif kind == 18:
            session.select(Selection(a % 3))
        else:
            session.apply(edit_of(kind, a, b, session))
        assert shown(model) == expected(session)
    while session.undo_sentence:
        session.undo()
        assert shown(model) == expected(session)
    while session.redo_sentence:
        session.redo()
    assert shown(model) == expected(session)
    del tester, model


@pytest.mark.usefixtures("qapp")
def test_rare_columns_come_when_asked_for_and_stay_where_used(session: Session) -> None:
    """Asked for, both columns show with a sheet; no longer asked for, only the one in use stays."""
    model, tester = checked(session)
    model.show_rare_columns(True)
    assert [column.title for column in model.columns][4:] == []
    session.apply(edits.add_sheet(0, 0))
    assert [column.title for column in model.columns][4:] == [
        *("Resistance", "Inductance", "Capacitance", "Conductivity")
    ]
    assert model.setData(model.index(1, 6), "1 pF")
    model.show_rare_columns(False)
    assert [column.title for column in model.columns][4:] == ["Resistance", "Capacitance"]
    assert model.index(1, 5).data() == "1 pF"
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_rows_keep_their_places_through_a_move(session: Session) -> None:
    """What points at a row of the table still points at that element after a block moved past it."""
    model, tester = checked(session)
    copper = QPersistentModelIndex(model.index(2, 2))
    session.apply(edits.move(0, (0,), 3))

    assert copper.row() == 1
    assert copper.data() == "Copper"
    assert tester is not None


def test_only_what_changed_is_told(qtbot: QtBot, session: Session) -> None:
    """A new thickness is told as one row changed, and nothing is reset."""
    model, tester = checked(session)
    told: list[tuple[int, int]] = []
    model.dataChanged.connect(lambda first, last: told.append((first.row(), last.row())))
    with qtbot.assertNotEmitted(model.modelReset), qtbot.assertNotEmitted(model.layoutChanged):
        session.apply(edits.set_thickness(0, 1, 5e-5))

    assert told == [(2, 2)]
    assert tester is not None


def test_numbers_behind_a_new_row_are_told(qtbot: QtBot, session: Session) -> None:
    """A row put in is told as one insertion, and the numbers behind it as changed."""
    model, tester = checked(session)
    told: list[tuple[int, int]] = []
    model.dataChanged.connect(lambda first, last: told.append((first.row(), last.row())))
    with qtbot.waitSignal(model.rowsInserted) as inserted:
        session.apply(edits.add_layer(0, 1, "air", length("1 mm")))

    assert inserted.args is not None
    assert inserted.args[1:] == [2, 2]
    assert told == [(3, 4)]
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_move_rows_as_qt_asks(session: Session) -> None:
    """Qt's moveRows moves elements in one undo step; half-spaces stay where they are, and nothing passes them."""
    model, tester = checked(session)
    root = QModelIndex()

    assert model.moveRows(root, 1, 2, root, 4)
    assert [row[2] for row in shown(model)] == ["air", "air", "PTFE", "Copper", "air"]
    assert session.undo_sentence == "move 2 elements"
    for row, count, before in ((0, 1, 3), (4, 1, 1), (3, 2, 1), (1, 1, 0), (1, 1, 5), (1, 0, 3)):
        assert not model.moveRows(root, row, count, root, before)
    session.undo()
    assert session.undo_sentence == ""
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_move_onto_itself_is_nothing(session: Session) -> None:
    """A block dropped where it is leaves no step to undo."""
    model, tester = checked(session)

    assert not model.move_elements((0, 1), 1)
    assert session.undo_sentence == ""
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_qt_cannot_lose_rows(session: Session) -> None:
    """The ways by which a drag would take rows out or write over cells are shut."""
    model, tester = checked(session)

    assert not model.removeRows(1, 1)
    assert not model.insertRows(1, 1)
    drop = Qt.ItemFlag.ItemIsDropEnabled
    flags = [model.flags(model.index(row, 2)) for row in range(model.rowCount())]
    assert not any(flag & drop for flag in flags)
    assert [bool(flag & Qt.ItemFlag.ItemIsDragEnabled) for flag in flags] == [False, True, True, True, False]
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_set_data_tells_whether_it_became_a_value(session: Session) -> None:
    """A good text gives True, a wrong one False and stays; the same text again is no step."""
    model, tester = checked(session)
    cell = model.index(1, 3)

    assert model.setData(cell, "2 mm")
    assert not model.setData(cell, "2 furlongs")
    assert model.index(1, 3).data(Ask.FAULT) is not None
    assert model.setData(model.index(2, 3), "35 um")
    assert not model.setData(model.index(1, 0), "7")
    assert not model.setData(model.index(0, 3), "1 mm")
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_rows_are_named_for_those_who_do_not_see_them(session: Session) -> None:
    """Each cell says what it is of what; headers say their definitions."""
    model, tester = checked(session)

    assert model.index(2, 3).data(Qt.ItemDataRole.AccessibleTextRole) == "Thickness of layer 2: 35 um"
    assert model.index(0, 2).data(Qt.ItemDataRole.AccessibleTextRole) == "Material of front half-space: air"
    tip = model.headerData(3, Qt.Orientation.Horizontal, Qt.ItemDataRole.ToolTipRole)
    assert "0.9 mm" in str(tip)
    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_opening_another_job_shows_it(session: Session, tmp_path_factory: pytest.TempPathFactory) -> None:
    """A job opened or begun anew replaces what is shown."""
    model, tester = checked(session)
    path = tmp_path_factory.mktemp("job") / "a.slabjob"
    session.save(path)
    session.new()
    assert model.rowCount() == 3
    session.open(path)
    assert model.rowCount() == 5
    assert tester is not None
