"""What became of a list of elements, as the one smallest step a table can follow. No toolkit."""

from collections.abc import Hashable, Sequence
from dataclasses import dataclass


@dataclass(frozen=True, slots=True)
class Inserted:
    """`count` rows came in before row `first`."""

    first: int
    count: int


@dataclass(frozen=True, slots=True)
class Removed:
    """`count` rows from row `first` on went away."""

    first: int
    count: int


@dataclass(frozen=True, slots=True)
class Moved:
    """`count` rows from row `first` on went before row `before`, counted as the list was."""

    first: int
    count: int
    before: int


Step = Inserted | Removed | Moved | None


def step_between(old: Sequence[Hashable], new: Sequence[Hashable]) -> Step:
    """Return the change in structure that leads from `old` to `new`, or None when rows only changed in place.

    Equal rows at the start and at the end stay what they are. Between them lies either a block that moved, or
    rows that came or went; what else differs there changed in place.

    Examples
    --------
    >>> step_between("abc", "abxc")
    Inserted(first=2, count=1)
    >>> step_between("abcd", "acdb")
    Moved(first=1, count=1, before=4)
    >>> step_between("abc", "axc") is None
    True
    """
    head = _common(old, new)
    tail = _common(old[head:][::-1], new[head:][::-1])
    before, after = len(old) - head - tail, len(new) - head - tail
    if before == after:
        return _moved(old[head : head + before], new[head : head + after], head)
    kept = min(before, after)
    if after > before:
        return Inserted(head + kept, after - before)
    return Removed(head + kept, before - after)


def _common(old: Sequence[Hashable], new: Sequence[Hashable]) -> int:
    """Return how many leading rows are equal."""
    count = 0
    for one, other in zip(old, new, strict=False):
        if one != other:
            break
        count += 1
    return count


def _moved(old: Sequence[Hashable], new: Sequence[Hashable], first: int) -> Moved | None:
    """Return the move of the shorter of two neighbouring blocks that changed places, or None."""
    old, new = list(old), list(new)
    for cut in range(1, len(old)):
        if old[cut:] + old[:cut] != new:
            continue
        if cut <= len(old) - cut:
            return Moved(first, cut, first + len(old))
        return Moved(first + cut, len(old) - cut, first)
    return None
