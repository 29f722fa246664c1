"""Edits of how a stack is built up: groups keep their counts, fills keep what a sheet is, undo brings all back."""

import pytest

from app.document import edits
from app.document.document import Cell
from app.document.edit import Edit
from app.document.session import Session
from stackcore.job import Job, job_from_json
from stackcore.job.records import Group, LayerRecord, SheetRecord, StackRecord

JOB = """{"format": "slabwright-job", "version": 1,
"materials": {"skin": {"model": "constant", "permittivity": 4.2},
              "core": {"model": "constant", "permittivity": 1.1}},
"stacks": [{"name": "A", "elements": [
    {"layer": "skin", "thickness": "1 mm"}, {"layer": "core", "thickness": "5 mm"},
    {"layer": "skin", "thickness": "2 mm"},
    {"sheet": "film", "conductivity": "0.5 MS/m", "thickness": "10 nm"},
    {"sheet": "series", "resistance": "377 ohm"},
    {"sheet": "series", "resistance": "50 ohm", "inductance": "20 pH", "capacitance": "1 pF"}]}],
"sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}"""


@pytest.fixture
def session() -> Session:
    """Three layers, a film and two sheets."""
    return Session(Job(job_from_json(JOB)))


def stack(session: Session) -> StackRecord:
    """Return the stack of now."""
    return session.record.stacks[0]


def refused(session: Session, edit: Edit) -> str:
    """Return why an edit is refused; nothing changes."""
    before = session.record
    faults = session.apply(edit)
    assert faults
    assert session.record is before
    return str(faults[0])


def test_a_count_that_stands_is_never_lost(session: Session) -> None:
    """Grouping what is in a group already is refused with the count, whether all of it, a part or more."""
    assert session.apply(edits.group_rows(0, (0, 1), 3)) == ()
    for rows in ((0, 1), (1,), (0, 1, 2), (1, 2)):
        assert "rows 1 to 2 are repeated 3 times already" in refused(session, edits.group_rows(0, rows))
    assert stack(session).groups == (Group(0, 1, 3),)


def test_a_film_filled_down_stays_a_film(session: Session) -> None:
    """Conductivity and thickness go along, and other rows keep whether they are computed."""
    session.apply(edits.set_enabled(0, (4,), on=False))
    assert session.apply(edits.fill_elements(0, (3, 4, 5))) == ()
    film, second, third = stack(session).elements[3:]
    assert isinstance(film, SheetRecord)
    for one in (second, third):
        assert isinstance(one, SheetRecord)
        assert (one.kind, one.conductivity, one.thickness) == ("film", film.conductivity, film.thickness)
        assert (one.resistance, one.inductance, one.capacitance) == (None, None, None)
    assert not second.enabled
    assert session.document.drafts == ()
    session.undo()
    assert stack(session).elements[4] != film


def test_filling_sheets_takes_every_part(session: Session) -> None:
    """Inductance and capacitance go along; a text without a value in the way is gone."""
    session.apply(edits.type_into(Cell(0, 4, "resistance"), "many"))
    assert session.document.drafts
    session.apply(edits.move(0, (5,), 4))
    assert session.apply(edits.fill_elements(0, (4, 5))) == ()
    first, second = stack(session).elements[4:]
    assert first == second
    assert session.document.drafts == ()


def test_filling_layers_takes_material_and_thickness(session: Session) -> None:
    """Sheets among the chosen stay as they are."""
    assert session.apply(edits.fill_elements(0, (0, 1, 2, 3))) == ()
    layers = stack(session).elements[:3]
    assert all(isinstance(one, LayerRecord) and one.material == "skin" for one in layers)
    assert [one.thickness.text for one in layers if isinstance(one, LayerRecord)] == ["1 mm"] * 3
    assert isinstance(stack(session).elements[3], SheetRecord)
    assert "nothing below" in refused(session, edits.fill_elements(0, (0,)))


def test_mirror_reverse_and_groups_come_back_by_undo(session: Session) -> None:
    """Each is one step."""
    start = session.record
    for edit in (
        edits.mirror(0, (0, 1, 2)),
        edits.reverse(0),
        edits.group_rows(0, (0, 1), 4),
        edits.set_locked(0, (2,), on=True),
        edits.set_enabled(0, (3,), on=False),
    ):
        assert session.apply(edit) == ()
    for _ in range(5):
        session.undo()
    assert session.record == start
