"""Session: listeners, undo, merging, files."""

from pathlib import Path

import pytest

from app.document import edits
from app.document.cells import value_text
from app.document.document import Cell, Selection, job_cell
from app.document.session import Change, Session
from stackcore.errors import JobError
from stackcore.job import read_job
from tests.app.document.jobs import HARBOUR, Clock, harbour


def heard(session: Session) -> list[Change]:
    """Return the list that fills with what a listener hears."""
    changes: list[Change] = []
    session.subscribe(changes.append)
    return changes


def test_a_new_session_is_valid_and_clean() -> None:
    """The untitled job solves, has one layer between air, and nothing to undo or to save."""
    session = Session()
    (stack,) = session.record.stacks
    assert len(stack.elements) == 1
    assert (stack.front, stack.back) == ("air", "air")
    assert session.job.stacks[0].thickness == 0.003
    assert session.record.sweep.frequencies()[[0, -1]].tolist() == [1e9, 18e9]
    assert (session.modified, session.path, session.undo_sentence, session.redo_sentence) == (False, None, "", "")
    assert session.title == "Untitled job"


def test_what_a_listener_hears() -> None:
    """Each change comes once with both documents, the sentence, the initiator and its kind."""
    session = harbour()
    changes = heard(session)
    me = object()
    begin = session.document
    session.select(Selection(0, (1,)), me)
    session.apply(edits.set_title("Cover"), me)
    edited = session.document
    session.undo()
    session.redo(me)
    kinds = [(change.kind, change.sentence, change.initiator) for change in changes]
    assert kinds == [
        ("select", "", me),
        ("edit", "set title to Cover", me),
        ("undo", "set title to Cover", None),
        ("redo", "set title to Cover", me),
    ]
    assert (changes[1].before, changes[1].after) == (begin, edited)
    assert changes[2].after is begin
    assert changes[3].after is edited
    assert all(change.selection == Selection(0, (1,)) for change in changes)


def test_what_changes_nothing_tells_nobody() -> None:
    """The same text, the same selection, and undo without a step are no changes."""
    session = harbour()
    changes = heard(session)
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "0.9 mm"))
    session.apply(edits.set_title("Harbour radar cover"))
    session.select(Selection())
    session.undo()
    session.redo()
    assert changes == []
    assert session.undo_sentence == ""


def test_unsubscribing() -> None:
    """A listener that has gone hears nothing, even when it goes while others are being told."""
    session = harbour()
    second: list[Change] = []
    leave_second = session.subscribe(lambda change: leave_third())
    leave_third = session.subscribe(second.append)
    session.apply(edits.set_title("a"))
    assert second == []
    leave_second()
    leave_second()
    session.apply(edits.set_title("b"))
    assert second == []


def test_a_failing_listener_does_not_break_the_others() -> None:
    """The others hear the change, the change stands, and the errors are raised together at the end."""
    session = harbour()

    def fail(change: Change) -> None:
        raise RuntimeError(change.sentence)

    session.subscribe(fail)
    changes = heard(session)
    with pytest.raises(ExceptionGroup) as caught:
        session.apply(edits.set_title("Cover"))
    assert [str(error) for error in caught.value.exceptions] == ["set title to Cover"]
    assert session.record.title == "Cover"
    assert len(changes) == 1


def test_errors_of_listeners_can_be_reported() -> None:
    """With a report function nothing is raised."""
    errors: list[Exception] = []
    session = Session(report=errors.append)

    def fail(change: Change) -> None:
        raise RuntimeError(change.kind)

    session.subscribe(fail)
    assert session.apply(edits.set_title("Cover")) == ()
    assert [str(error) for error in errors] == ["edit"]


def test_a_change_made_by_a_listener_comes_second_to_all() -> None:
    """A listener that changes the document again does not turn the order around for those after it."""
    session = harbour()

    def correct(change: Change) -> None:
        if session.record.title == "first":
            session.apply(edits.set_title("second"))

    session.subscribe(correct)
    changes = heard(session)
    session.apply(edits.set_title("first"))
    assert [change.after.record.title for change in changes] == ["first", "second"]


def test_undo_restores_the_selection_of_its_moment() -> None:
    """Undo selects what was selected before the edit, redo what was selected after it."""
    session = harbour()
    session.select(Selection(0, (1, 2)))
    session.apply(edits.delete(0, (1, 2)))
    session.select(Selection(1, (0,)))
    session.undo()
    assert session.selection == Selection(0, (1, 2))
    session.redo()
    assert session.selection == Selection(0, (1,))


def test_a_selection_is_always_inside() -> None:
    """Rows and stacks that do not exist are brought inside or left out."""
    session = harbour()
    session.select(Selection(9, (0, 5, -1)))
    assert session.selection == Selection(1, (0,))
    session.apply(edits.delete_stack(1))
    assert session.selection.stack == 0


def test_undo_to_the_start_is_the_very_job() -> None:
    """Nothing is computed backwards: the same object comes back."""
    session = harbour()
    job = session.job
    for thickness in (1e-3, 2e-3, 3e-3):
        session.apply(edits.set_thickness(0, 0, thickness))
    while session.undo_sentence:
        session.undo()
    assert session.job is job
    assert not session.modified


def test_a_new_edit_gives_up_what_was_undone() -> None:
    """After an undo and another edit there is nothing to redo."""
    session = harbour()
    session.apply(edits.set_title("a"))
    session.undo()
    session.apply(edits.set_notes("b"))
    assert session.redo_sentence == ""
    session.undo()
    assert session.undo_sentence == ""


def drag(session: Session, *thicknesses: float) -> None:
    """Drag the front face of the first layer through `thicknesses`, in m."""
    for thickness in thicknesses:
        session.apply(edits.set_thickness(0, 0, thickness, merge_key="drag"))


def test_a_drag_is_one_step_however_long_it_rests() -> None:
    """Steps with one key merge until the drag ends, with the last sentence and the first start."""
    clock = Clock()
    session = harbour(clock)
    job = session.job
    drag(session, 1e-3, 2e-3)
    clock.now += 100
    drag(session, 3e-3)
    assert session.undo_sentence == "set thickness of layer 1 to 3 mm"
    session.end_merge()
    drag(session, 4e-3)
    session.undo()
    assert value_text(session.record, Cell(0, 0, "thickness")) == "3 mm"
    session.undo()
    assert session.job is job


def test_a_drag_back_to_its_start_is_dropped() -> None:
    """A face dragged away and back leaves no step, and the job of before is the job of now."""
    session = harbour()
    document = session.document
    drag(session, 2e-3)
    assert session.modified
    drag(session, 0.9e-3)
    assert session.document is document
    assert (session.undo_sentence, session.modified) == ("", False)
    drag(session, 2e-3)
    session.undo()
    assert session.document is document


@pytest.mark.parametrize("between", ["undo", "redo", "save", "other"])
def test_nothing_merges_over_a_break(between: str, tmp_path: Path) -> None:
    """An undo, a save or another edit in between ends the merging."""
    session = harbour()
    drag(session, 2e-3)
    if between == "save":
        session.save(tmp_path / "a.slabjob")
    elif between == "other":
        session.apply(edits.set_notes("n"))
    else:
        session.undo()
        if between == "redo":
            session.redo()
    before = session.document
    drag(session, 3e-3)
    session.undo()
    assert session.document is before


def test_typing_merges_within_a_second() -> None:
    """One cell typed again at once is one step; after a rest, or in another cell, it is another."""
    clock = Clock()
    session = harbour(clock)
    cell = Cell(0, 0, "thickness")
    for pause, text in ((0.0, "1 mm"), (0.9, "2 mm"), (0.9, "bad"), (1.1, "3 mm")):
        clock.now += pause
        session.apply(edits.type_into(cell, text))
    session.apply(edits.type_into(Cell(0, 1, "thickness"), "4 mm"))
    steps = []
    while session.undo_sentence:
        steps.append(session.undo_sentence)
        session.undo()
    assert steps == [
        "set thickness of layer 2 to 4 mm",
        "set thickness of layer 1 to 3 mm",
        "set thickness of layer 1 to bad",
    ]


def test_undo_brings_drafts_back() -> None:
    """A draft that an edit ended is there again after undo, and gone after undoing its own step."""
    clock = Clock()
    session = harbour(clock)
    cell = Cell(0, 0, "thickness")
    session.apply(edits.type_into(cell, "bad"))
    clock.now += 5
    session.apply(edits.type_into(cell, "1 mm"))
    session.undo()
    draft = session.document.draft(cell)
    assert draft is not None
    assert draft.text == "bad"
    session.undo()
    assert session.document.drafts == ()


def test_modified_is_about_the_job_that_was_saved(tmp_path: Path) -> None:
    """Undoing back to the saved job is not modified, and a job typed anew to be equal is not either."""
    session = harbour()
    seen = []

    def look() -> None:
        seen.append(session.modified)

    session.apply(edits.set_title("one"))
    look()
    session.save(tmp_path / "cover.slabjob")
    look()
    session.apply(edits.set_title("two"))
    look()
    session.undo()
    look()
    session.undo()
    look()
    session.apply(edits.set_title("one"))
    look()
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "bad"))
    look()
    assert seen == [True, False, True, False, True, False, False]


def test_save_and_open(tmp_path: Path) -> None:
    """What is saved is read back, the path is kept, and the history begins anew."""
    session = harbour()
    changes = heard(session)
    path = tmp_path / "cover.slabjob"
    with pytest.raises(ValueError, match="path"):
        session.save()
    session.apply(edits.set_title("Saved"))
    session.save(path)
    assert read_job(path).record == session.record
    session.apply(edits.set_notes("later"))
    session.save()
    assert read_job(path).record.notes == "later"
    assert session.title == "Saved – cover.slabjob"
    session.new()
    assert (session.path, session.undo_sentence, session.title) == (None, "", "Untitled job")
    session.open(path)
    assert (session.path, session.record.title, session.modified) == (path, "Saved", False)
    assert [change.kind for change in changes] == ["edit", "save", "edit", "save", "open", "open"]


def test_a_faulty_file_leaves_everything(tmp_path: Path) -> None:
    """Opening a file with faults, or none at all, raises and changes nothing."""
    session = harbour()
    session.apply(edits.set_title("mine"))
    session.apply(edits.type_into(job_cell("sweep.frequency.points"), "x"))
    document = session.document
    path = tmp_path / "faulty.slabjob"
    path.write_text(HARBOUR.replace('"layer": "core"', '"layer": "cork"'))
    changes = heard(session)
    with pytest.raises(JobError) as caught:
        session.open(path)
    assert len(caught.value.faults) == 2
    with pytest.raises(FileNotFoundError):
        session.open(tmp_path / "missing.slabjob")
    assert session.document is document
    assert (session.path, session.modified, changes) == (None, True, [])
    assert session.undo_sentence


def test_a_save_that_fails_leaves_it_modified(tmp_path: Path) -> None:
    """When writing fails the session is as modified as before and keeps its path."""
    session = harbour()
    session.apply(edits.set_title("mine"))
    with pytest.raises(OSError, match="No such file"):
        session.save(tmp_path / "no" / "folder.slabjob")
    assert session.modified
    assert session.path is None
