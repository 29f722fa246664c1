"""Elements that are computed and rows of the table: groups repeat rows, and rows left out have no element."""

from collections.abc import Sequence

from stackcore.job import Job
from stackcore.stack import Element


def elements_by_row(job: Job, stack: int) -> tuple[Element | None, ...]:
    """Return for each row of a stack the first element that stands for it, None for one that is left out."""
    rows, elements = job.rows[stack], job.stacks[stack].elements
    found: list[Element | None] = [None] * len(job.record.stacks[stack].elements)
    for row, element in zip(reversed(rows), reversed(elements), strict=True):
        found[row] = element
    return tuple(found)


def places_of_row(rows: Sequence[int], row: int) -> tuple[int, ...]:
    """Return the indices of all elements that stand for a row.

    Examples
    --------
    >>> places_of_row((0, 1, 2, 1, 2), 2)
    (2, 4)
    """
    return tuple(place for place, other in enumerate(rows) if other == row)


def sums_by_row(rows: Sequence[int], values: Sequence[float], count: int) -> tuple[float, ...]:
    """Return for each of `count` rows the sum of the values of the elements that stand for it.

    Examples
    --------
    >>> sums_by_row((0, 1, 1), (0.1, 0.2, 0.3), 3)
    (0.1, 0.5, 0.0)
    """
    sums = [0.0] * count
    for row, value in zip(rows, values, strict=True):
        if row >= 0:
            sums[row] += value
    return tuple(sums)
