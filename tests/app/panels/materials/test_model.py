"""The model of materials under Qt's own checker."""

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from PySide6.QtCore import Qt
from PySide6.QtTest import QAbstractItemModelTester
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.document import job_cell, material_cell
from app.document.edit import Edit
from app.document.session import Session
from app.document.view import View
from app.panels.materials.lines import COLUMNS, lines_of
from app.panels.materials.model import MaterialsModel
from stackcore.job.records import MaterialRecord


def checked(session: Session, view: View) -> tuple[MaterialsModel, QAbstractItemModelTester]:
    """Return a model under Qt's checker, which stops the program at the first untruth."""
    model = MaterialsModel(session, view)
    return model, QAbstractItemModelTester(model, QAbstractItemModelTester.FailureReportingMode.Fatal)


def edit_of(kind: int, a: int, session: Session) -> Edit:
    """Return one of many edits of materials."""
    materials = session.record.materials
    name = materials[a % len(materials)].name if materials else "none"
    match kind:
        case 0:
            return edits.add_material(MaterialRecord(f"m{a}", model="constant", constants={"permittivity": 2 + 0j}))
        case 1:
            return edits.remove_material(name)
        case 2:
            return edits.rename_material(name, f"n{a}")
        case 3:
            return edits.type_into(material_cell(name, "permittivity"), f"{1 + a}")
        case 4:
            return edits.type_into(material_cell(name, "loss_tangent"), "lossy")
        case 5:
            return edits.use_library_entry(("metals/silver", "plastics/ptfe", "metals/copper")[a % 3])
        case _:
            return edits.type_into(job_cell("sweep.frequency.stop"), f"{20 + 100 * a} GHz")


@given(steps=st.lists(st.tuples(st.integers(0, 8), st.integers(0, 5)), max_size=14))
@settings(max_examples=40)
@pytest.mark.usefixtures("qapp")
def test_model_tells_the_truth_through_everything(steps: list[tuple[int, int]]) -> None:
    """Through edits, undo and redo the model shows the document's materials, and Qt's checker agrees."""
    session, view = Session(), View()
    model, tester = checked(session, view)
    for kind, a in steps:
        if kind == 7:
            session.undo()
        elif kind == 8:
            session.redo()
        else:
            session.apply(edit_of(kind, a, session))
        assert model.lines == lines_of(session.document, model.frequency)
        assert model.rowCount() == len(session.record.materials)
    while session.undo_sentence:
        session.undo()
    assert model.lines == lines_of(session.document, model.frequency)
    del tester, model


@pytest.mark.usefixtures("qapp")
def test_readings_are_those_at_the_active_marker(session: Session) -> None:
    """Moving the marker changes the skin depth and the title that says at which frequency it is."""
    view = View()
    model, tester = checked(session, view)
    column = [shown.name for shown in COLUMNS].index("reading")
    view.set(markers=(1e6, 1e8), active_marker=1)
    title = model.headerData(column, Qt.Orientation.Horizontal)
    assert title == "At 100 MHz"
    assert model.index(1, column).data() == "skin depth 6.519 µm"

    view.set(active_marker=0)
    assert model.headerData(column, Qt.Orientation.Horizontal) == "At 1 MHz"
    assert model.index(1, column).data() == "skin depth 65.19 µm"
    assert tester is not None


def test_dragging_a_face_changes_nothing_here(qtbot: QtBot, session: Session) -> None:
    """An edit of a thickness is not told to this table at all."""
    model, tester = checked(session, View())
    with qtbot.assertNotEmitted(model.dataChanged), qtbot.assertNotEmitted(model.headerDataChanged):
        session.apply(edits.set_thickness(0, 0, 0.002))

    assert tester is not None


@pytest.mark.usefixtures("qapp")
def test_only_constants_of_the_model_can_be_typed(session: Session) -> None:
    """A dielectric has no conductivity to type, a conductor no permittivity; model and reading are not typed."""
    model, tester = checked(session, View())
    can = [
        {
            COLUMNS[c].name
            for c in range(len(COLUMNS))
            if model.flags(model.index(row, c)) & Qt.ItemFlag.ItemIsEditable
        }
        for row in range(2)
    ]
    words = {"name", "label", "source"}

    assert can[0] == words | {"permittivity", "loss_tangent", "permeability"}
    assert can[1] == words | {"conductivity", "permeability"}
    assert not model.setData(model.index(1, [c.name for c in COLUMNS].index("permittivity")), "4")
    assert tester is not None
