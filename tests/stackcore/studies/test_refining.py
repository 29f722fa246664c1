"""Coarse to fine: every point once, every cell filled from a near neighbour."""

import numpy as np
from hypothesis import given
from hypothesis import strategies as st

from stackcore.studies.refining import COARSEST, batches, show, spread

sizes = st.integers(1, 70)


@given(height=sizes, width=sizes, whole_rows=st.booleans())
def test_every_point_comes_once(height: int, width: int, whole_rows: bool) -> None:
    """The batches together hold every point of the grid exactly once."""
    count = np.zeros((height, width), dtype=int)
    for batch in batches(height, width, whole_rows=whole_rows):
        count[np.ix_(batch.rows, batch.columns)] += 1
    assert (count == 1).all()


@given(height=sizes, width=sizes, whole_rows=st.booleans())
def test_cells_show_a_near_point(height: int, width: int, whole_rows: bool) -> None:
    """After each batch every cell shows a computed point within half a step, or a step at the far ends; at last its
    own."""
    rows, columns = np.mgrid[:height, :width]
    cells = np.full((height, width), np.nan)
    known = np.zeros((height, width), dtype=bool)
    for number, batch in enumerate(batches(height, width, whole_rows=whole_rows)):
        place = np.ix_(batch.rows, batch.columns)
        known[place] = True
        show(cells, batch, (rows * width + columns)[place].astype(float))
        if number == 0:
            spread(cells, batch)
        shown = cells.astype(int)
        assert known.ravel()[shown.ravel()].all()
        assert (cells[known] == (rows * width + columns)[known]).all()
        assert (np.abs(shown // width - rows) < COARSEST).all()
        assert (np.abs(shown % width - columns) < COARSEST).all()
    assert known.all()
    assert (cells == rows * width + columns).all()
