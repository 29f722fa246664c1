"""From coarse to fine over two axes: which points come when, and which cells show each until theirs come."""

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Final

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import FloatArray

Indices = NDArray[np.intp]

COARSEST: Final = 16
"""Every so many points of an axis are computed first."""


@dataclass(frozen=True, slots=True, eq=False)
class Batch:
    """Points that come together: all of `rows` with all of `columns`.

    Each stands for its neighbours up to half a step away.

    Parameters
    ----------
    rows, columns
        Increasing indices along y and x.
    row_step, column_step
        Between all the points that are computed once this level is complete.
    """

    rows: Indices
    columns: Indices
    row_step: int
    column_step: int


def batches(height: int, width: int, *, whole_rows: bool) -> Iterator[Batch]:
    """Yield batches that together hold every point of a (height, width) grid once, evenly spread and ever finer.

    Parameters
    ----------
    height, width
        Points along y and x.
    whole_rows
        Whether from the second level on a row is computed whole: right where a row costs more than its points.

    Examples
    --------
    >>> [(batch.rows.tolist(), batch.columns.tolist()) for batch in batches(1, 20, whole_rows=True)][0]
    ([0], [0, 16])
    """
    every_row, every_column = np.arange(height), np.arange(width)
    row_step = column_step = COARSEST
    yield Batch(every_row[::row_step], every_column[::column_step], row_step, column_step)
    while row_step > 1 or column_step > 1:
        finer_row, finer_column = max(row_step // 2, 1), 1 if whole_rows else max(column_step // 2, 1)
        old_rows = every_row[::row_step]
        new_rows = np.setdiff1d(every_row[::finer_row], old_rows)
        columns = every_column[::finer_column]
        new_columns = np.setdiff1d(columns, every_column[::column_step])
        for rows, part in ((old_rows, new_columns), (new_rows, columns)):
            if rows.size and part.size:
                yield Batch(rows, part, finer_row, finer_column)
        row_step, column_step = finer_row, finer_column


def show(cells: FloatArray, batch: Batch, values: FloatArray) -> None:
    """Write the values of a batch, (rows, columns), into the cells they stand for until those are computed."""
    height, width = cells.shape
    rows, row_counts = _covered(batch.rows, batch.row_step, height)
    columns, column_counts = _covered(batch.columns, batch.column_step, width)
    if batch.row_step > 1:
        values = np.repeat(values, row_counts, axis=0)
    if batch.column_step > 1:
        values = np.repeat(values, column_counts, axis=1)
    cells[np.ix_(rows, columns)] = values


def spread(cells: FloatArray, chunk: Batch) -> None:
    """Fill what comes behind the first chunks, for which nothing is computed yet, with their last values."""
    height, width = cells.shape
    rows, _ = _covered(chunk.rows, chunk.row_step, height)
    columns, _ = _covered(chunk.columns, chunk.column_step, width)
    cells[rows, columns[-1] + 1 :] = cells[rows, columns[-1], np.newaxis]
    cells[rows[-1] + 1 :] = cells[rows[-1]]


def _covered(points: Indices, step: int, count: int) -> tuple[Indices, Indices]:
    """Return the indices of all cells nearest to one of `points`, and how many there are of each point."""
    first = np.maximum(points - step // 2, 0)
    # The last point of the level also stands for the rest of the axis, which is shorter than a step.
    end = np.where(points + step >= count, count, np.minimum(points - step // 2 + step, count))
    counts = end - first
    offsets = np.arange(counts.sum()) - np.repeat(np.cumsum(counts) - counts, counts)
    return np.repeat(first, counts) + offsets, counts
