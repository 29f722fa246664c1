"""The door for older versions, tried with steps that never existed."""

import copy
from collections.abc import Mapping

import pytest

from stackcore.errors import JobError
from stackcore.job.migrations import STEPS, VERSION, migrate


def _rename_title(tree: Mapping[str, object]) -> dict[str, object]:
    """Take an imagined version 1, in which the title was called name, to version 2."""
    return {("title" if key == "name" else key): value for key, value in tree.items()}


def _add_notes(tree: Mapping[str, object]) -> dict[str, object]:
    """Take an imagined version 2, which had no notes, to version 3."""
    return {**tree, "notes": ""}


IMAGINED = {1: _rename_title, 2: _add_notes}


def test_steps_are_taken_in_order() -> None:
    """An old tree goes through every step up to the current version, which it then bears."""
    assert migrate({"version": 1, "name": "A"}, version=3, steps=IMAGINED) == {
        "version": 3,
        "title": "A",
        "notes": "",
    }
    assert migrate({"version": 2, "name": "A"}, version=3, steps=IMAGINED) == {
        "version": 3,
        "name": "A",
        "notes": "",
    }


def test_a_migration_changes_nothing_it_was_given() -> None:
    """Steps are pure: the tree that was read stays as it was."""
    tree = {"version": 1, "name": "A"}
    before = copy.deepcopy(tree)
    migrate(tree, version=3, steps=IMAGINED)
    assert tree == before


def test_the_current_version_is_left_alone() -> None:
    """A tree of the current version comes back as it is."""
    tree = {"version": VERSION, "title": "A"}
    assert migrate(tree) == tree


def test_there_is_a_step_from_every_older_version() -> None:
    """Whoever raises the version must write the step from the one before."""
    assert sorted(STEPS) == list(range(1, VERSION))


@pytest.mark.parametrize(
    ("version", "words"),
    [
        (4, "version 4, newer than version 3"),
        (1e300, "newer than version 3"),
        (0, "never was a version 0"),
        (-1, "never was a version -1"),
        (1.5, "1.5 is not a version"),
        ("1", "'1' is not a version"),
        (None, "null is not a version"),
        (True, "true is not a version"),
        (float("nan"), "nan is not a version"),
        (float("inf"), "inf is not a version"),
    ],
)
def test_other_versions_are_refused(version: object, words: str) -> None:
    """A version that is newer names both; one that never was, or is no whole number, is refused."""
    with pytest.raises(JobError) as caught:
        migrate({"version": version}, version=3, steps=IMAGINED)
    assert [fault.path for fault in caught.value.faults] == ["version"]
    assert words in caught.value.faults[0].message
