"""One step between two lists of rows."""

from hypothesis import example, given
from hypothesis import strategies as st

from app.panels.elements.difference import Inserted, Moved, Removed, Step, step_between

rows = st.lists(st.sampled_from("abcd"), max_size=8)


def followed(old: list[str], new: list[str], step: Step) -> list[str]:
    """Return `old` after `step`, the rows that came taken from `new`."""
    match step:
        case Inserted(first, count):
            return old[:first] + new[first : first + count] + old[first:]
        case Removed(first, count):
            return old[:first] + old[first + count :]
        case Moved(first, count, before):
            rest = old[:first] + old[first + count :]
            at = before - count if before > first else before
            return rest[:at] + old[first : first + count] + rest[at:]
    return list(old)


@given(old=rows, new=rows)
@example(old=list("abcd"), new=list("cdab"))
def test_step_gives_as_many_rows_and_keeps_the_ends(old: list[str], new: list[str]) -> None:
    """After the step there are as many rows as wanted, and the equal rows at both ends are where they were."""
    after = followed(old, new, step_between(old, new))

    assert len(after) == len(new)
    ends = [place for place in range(min(len(old), len(new))) if old[place] != new[place]]
    head = ends[0] if ends else min(len(old), len(new))
    assert after[:head] == new[:head]


@given(old=rows, at=st.integers(0, 8), new=st.lists(st.sampled_from("xyz"), min_size=1, max_size=4))
def test_block_that_came_or_went_is_found_exactly(old: list[str], at: int, new: list[str]) -> None:
    """One block put in is one insertion at its place, and the way back one removal."""
    at = min(at, len(old))
    longer = old[:at] + new + old[at:]

    assert step_between(old, longer) == Inserted(at, len(new))
    assert step_between(longer, old) == Removed(at, len(new))


@given(old=st.lists(st.integers(), min_size=2, max_size=8, unique=True), data=st.data())
def test_block_that_moved_is_one_move(old: list[int], data: st.DataObject) -> None:
    """Distinct rows of which one block moved are reached by one move."""
    first = data.draw(st.integers(0, len(old) - 1))
    count = data.draw(st.integers(1, len(old) - first))
    rest = old[:first] + old[first + count :]
    at = data.draw(st.integers(0, len(rest)))
    new = rest[:at] + old[first : first + count] + rest[at:]

    step = step_between(old, new)

    assert (step is None) == (old == new)
    words = [str(row) for row in old]
    assert followed(words, [], step) == [str(row) for row in new]


def test_changes_in_place_are_no_step() -> None:
    """Rows that differ where as many were are not taken for rows that came and went."""
    assert step_between("abcd", "axyd") is None
