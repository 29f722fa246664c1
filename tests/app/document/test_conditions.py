"""Edits of conditions: the usual ones, their lines, and what is refused."""

import pytest

from app.document import edits
from app.document.condition_edits import PRESETS
from app.document.condition_rows import KINDS, Kind, rows_of
from app.document.edit import Edit
from app.document.session import Session
from stackcore.job import Job, job_from_json
from stackcore.job.records import ConditionRecord, LayerRecord
from stackcore.media.library import read_library
from stackcore.stack import Layer

JOB = """{"format": "slabwright-job", "version": 1,
"materials": {"skin": {"model": "constant", "permittivity": 4.2, "label": "Skin",
                       "states": {"wet": {"permittivity": 4.6}}},
              "paint": {"library": "finishes/polyurethane-paint"}},
"stacks": [{"name": "Wall", "elements": [{"layer": "paint", "thickness": "0.2 mm"},
                                         {"layer": "skin", "thickness": "5 mm"}]}],
"conditions": [{"name": "Storm", "front": [{"sheet": "series", "resistance": "100 ohm"}]}],
"sweep": {"frequency": ["9 GHz", "10 GHz"], "angle": ["0 deg"]}}"""


@pytest.fixture
def session() -> Session:
    """A painted wall whose skin can be wet, and a condition with a sheet in front."""
    return Session(Job(job_from_json(JOB.replace("finishes/polyurethane-paint", finish()))))


def finish() -> str:
    """Return the key of a finish of the shipped library."""
    return next(entry.key for entry in read_library().entries if entry.family == "finishes")


def condition(session: Session, name: str) -> ConditionRecord:
    """Return a condition of the session's job."""
    found = session.record.condition(name)
    assert found is not None
    return found


def done(session: Session, edit: Edit) -> None:
    """Make an edit that must be taken."""
    assert session.apply(edit) == ()


def refused(session: Session, edit: Edit) -> str:
    """Return why an edit is refused; nothing changes."""
    before = session.record
    faults = session.apply(edit)
    assert faults
    assert session.record is before
    return str(faults[0])


def test_the_usual_conditions(session: Session) -> None:
    """Wet adds water and asks for its state, ice a layer, a repaint doubles the finish; heat has no state here."""
    for preset in PRESETS[:3]:
        done(session, edits.add_condition(preset))
    wet, ice, repaint = (condition(session, name) for name in ("Wet", "Ice", "Repaint"))
    assert wet.states == ("wet",)
    assert [one.thickness.value for one in (*wet.front, *ice.front) if isinstance(one, LayerRecord)] == [1e-4, 2e-3]
    assert repaint.thickness_factors == (("paint", 2.0),)
    assert "no material of the job has a state for it" in refused(session, edits.add_condition(PRESETS[3]))
    paint = session.job.stack_under(0, "Repaint").elements[0]
    assert isinstance(paint, Layer)
    assert paint.thickness == pytest.approx(0.4e-3)


def test_every_kind_of_line_is_added_typed_and_taken_away(session: Session) -> None:
    """Each line becomes part of the condition, takes other texts, and goes again; undo brings all back."""
    start = session.record
    done(session, edits.new_condition())
    kinds: tuple[Kind, ...] = tuple(KINDS)
    for kind in kinds:
        done(session, edits.add_change(session.record, "Condition", kind))
    assert [row.kind for row in rows_of(condition(session, "Condition"))] == list(kinds)
    typed = {
        "front": ("skin", "0.3 mm"),
        "back": ("Skin", "12 mil"),
        "exchange": ("paint", "skin"),
        "factor": ("paint", "1.5"),
    }
    for row in rows_of(condition(session, "Condition")):
        for part, text in zip(("subject", "value"), typed.get(row.kind, ()), strict=False):
            now = next(one for one in rows_of(condition(session, "Condition")) if one.kind == row.kind)
            done(session, edits.type_change("Condition", now, "subject" if part == "subject" else "value", text))
    rows = {row.kind: (row.subject, row.value) for row in rows_of(condition(session, "Condition"))}
    assert rows == {
        "front": ("skin", "0.3 mm"),
        "back": ("skin", "12 mil"),
        "exchange": ("paint", "skin"),
        "factor": ("paint", "1.5"),
        "state": ("wet", ""),
    }
    for row in reversed(rows_of(condition(session, "Condition"))):
        done(session, edits.remove_change("Condition", row))
    assert condition(session, "Condition") == ConditionRecord("Condition")
    while session.undo_sentence:
        session.undo()
    assert session.record == start


@pytest.mark.parametrize(
    ("kind", "part", "text", "told"),
    [
        ("front", "value", "3 GHz", "is a frequency, not a length"),
        ("front", "value", "-1 mm", "-1 mm"),
        ("front", "subject", "skim", "did you mean 'skin'"),
        ("factor", "value", "two", "number"),
        ("factor", "value", "-2", "out of range"),
        ("factor", "subject", "pain", "did you mean 'paint'"),
        ("state", "subject", "wett", "did you mean 'wet'"),
        ("exchange", "value", "skim", "did you mean 'skin'"),
    ],
)
def test_what_has_no_value_is_refused_with_its_reason(
    session: Session, kind: Kind, part: str, text: str, told: str
) -> None:
    """Nothing changes, and the reason names what was given or the nearest match."""
    done(session, edits.new_condition())
    done(session, edits.add_change(session.record, "Condition", kind))
    row = rows_of(condition(session, "Condition"))[0]
    edit = edits.type_change("Condition", row, "subject" if part == "subject" else "value", text)
    assert told in refused(session, edit)


def test_a_material_comes_once(session: Session) -> None:
    """Two lines for the thickness of one material would contradict each other."""
    done(session, edits.new_condition())
    for _ in range(2):
        done(session, edits.add_change(session.record, "Condition", "factor"))
    row = rows_of(condition(session, "Condition"))[1]
    assert "comes twice" in refused(session, edits.type_change("Condition", row, "subject", "skin"))
    assert "nothing left to add" in refused(session, edits.add_change(session.record, "Condition", "factor"))


def test_a_sheet_of_a_file_is_shown_and_kept(session: Session) -> None:
    """A sheet that a job file adds is not typed into here; it can be taken away."""
    row = rows_of(condition(session, "Storm"))[0]
    assert (row.sheet, row.subject) == (True, "sheet, 100 ohm")
    assert "changed in the job file" in refused(session, edits.type_change("Storm", row, "subject", "skin"))
    done(session, edits.remove_change("Storm", row))
    assert condition(session, "Storm").front == ()


def test_names_and_notes(session: Session) -> None:
    """A condition is renamed and noted; an empty or a taken name is refused, an unknown one names the nearest."""
    done(session, edits.note_condition("Storm", "  measured on a panel "))
    done(session, edits.rename_condition("Storm", "Hail"))
    assert condition(session, "Hail").note == "measured on a panel"
    assert "empty" in refused(session, edits.rename_condition("Hail", "  "))
    done(session, edits.new_condition())
    assert "is taken" in refused(session, edits.rename_condition("Condition", "Hail"))
    assert "did you mean 'Hail'" in refused(session, edits.remove_condition("Hal"))
    done(session, edits.remove_condition("Hail"))
    assert [one.name for one in session.record.conditions] == ["Condition"]
