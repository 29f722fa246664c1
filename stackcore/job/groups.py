"""Groups of a stack: how they lie among its rows, in its file, and in the elements that are computed."""

import re
from collections.abc import Iterator, Sequence
from dataclasses import replace
from typing import Final

from stackcore.job.records import Group, StackRecord

_ROW: Final = re.compile(r"(?P<head>stacks\[(?P<stack>\d+)\]\.elements)\[(?P<row>\d+)\](?P<rest>.*)", re.DOTALL)


def group_of(stack: StackRecord, row: int) -> Group | None:
    """Return the group that a row belongs to, or None."""
    return next((group for group in stack.groups if group.first <= row <= group.last), None)


def items_of(stack: StackRecord) -> Iterator[tuple[Group | None, range]]:
    """Yield what stands in the file, from front to back: a group with its rows, or no group and one row."""
    row = 0
    starts = {group.first: group for group in stack.groups}
    while row < len(stack.elements):
        group = starts.get(row)
        rows = range(row, group.last + 1) if group is not None else range(row, row + 1)
        yield group, rows
        row = rows.stop


def expanded_rows(stack: StackRecord) -> tuple[int, ...]:
    """Return the row of every element in the order the wave meets them, disabled ones left out.

    Examples
    --------
    >>> from stackcore.job.records import LayerRecord
    >>> from stackcore.units import Measure
    >>> layer = LayerRecord("air", Measure(1e-3, "1 mm"))
    >>> expanded_rows(StackRecord("A", (layer,) * 4, groups=(Group(1, 2, 3),)))
    (0, 1, 2, 1, 2, 1, 2, 3)
    """
    rows: list[int] = []
    for group, inside in items_of(stack):
        there = [row for row in inside if stack.elements[row].enabled]
        rows += there * (group.repeat if group is not None else 1)
    return tuple(rows)


def file_path(path: str, stacks: Sequence[StackRecord]) -> str:
    """Return the place in the file of a place in the record, in which the rows of groups are rows like others.

    Examples
    --------
    >>> from stackcore.job.records import LayerRecord
    >>> from stackcore.units import Measure
    >>> stack = StackRecord("A", (LayerRecord("air", Measure(1e-3, "1 mm")),) * 3, groups=(Group(1, 2, 2),))
    >>> file_path("stacks[0].elements[2].thickness", (stack,))
    'stacks[0].elements[1].elements[1].thickness'
    """
    match = _ROW.fullmatch(path)
    if match is None or int(match["stack"]) >= len(stacks):
        return path
    row = int(match["row"])
    for place, (group, rows) in enumerate(items_of(stacks[int(match["stack"])])):
        if row in rows:
            deeper = group is not None and match["rest"] != ".repeat"
            inner = f".elements[{row - rows.start}]" if deeper else ""
            return f"{match['head']}[{place}]{inner}{match['rest']}"
    return path


def rearranged(groups: Sequence[Group], origins: Sequence[int | None]) -> tuple[Group, ...]:
    """Return the groups of a stack after its rows were rearranged.

    Parameters
    ----------
    groups
        Those of before.
    origins
        For each row of now the row it came from, or None for a new one.

    Notes
    -----
    A group is where most of its rows still stand together: rows that left it are no longer in it, rows that came
    between two of its own belong to it. A group of which nothing is left is gone; a second copy of one is a group
    of its own.
    """
    found: list[Group] = []
    for group in groups:
        inside = [place for place, origin in enumerate(origins) if _within(origin, group)]
        for run in _runs(inside, origins, group):
            found.append(replace(group, first=run[0], last=run[-1]))
    kept: list[Group] = []
    for group in sorted(found, key=lambda one: one.first):
        if not kept or group.first > kept[-1].last:
            kept.append(group)
    return tuple(kept)


def _within(origin: int | None, group: Group) -> bool:
    return origin is not None and group.first <= origin <= group.last


def _runs(inside: list[int], origins: Sequence[int | None], group: Group) -> list[list[int]]:
    """Return the rows of one group as runs: one for each whole copy of it, else the longest part that is left."""
    runs: list[list[int]] = []
    for place in inside:
        together = runs and all(
            origins[between] is None or _within(origins[between], group)
            for between in range(runs[-1][-1] + 1, place)
        )
        again = runs and origins[place] in [origins[other] for other in runs[-1]]
        if together and not again:
            runs[-1].append(place)
        else:
            runs.append([place])
    size = group.last - group.first + 1
    whole = [run for run in runs if len(run) == size]
    return whole or (sorted(runs, key=len)[-1:] if runs else [])
