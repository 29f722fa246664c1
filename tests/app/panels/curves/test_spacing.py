"""Texts of a column do not cover each other and stay where they are wanted."""

from itertools import pairwise

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.panels.curves.spacing import spread

WANTED = st.lists(st.floats(-50.0, 350.0), max_size=18)


@given(WANTED)
def test_no_text_covers_another(wanted: list[float]) -> None:
    """Neighbours are at least a height apart, inside the column, and keep their order."""
    placed = spread(wanted, 15.0, 0.0, 300.0)
    assert placed is not None
    ordered = sorted(placed)
    assert all(below - above >= 15.0 - 1e-6 for above, below in pairwise(ordered))
    assert all(7.5 - 1e-6 <= place <= 292.5 + 1e-6 for place in placed)
    for one, other in pairwise(range(len(wanted))):
        if wanted[one] < wanted[other]:
            assert placed[one] < placed[other]


def test_texts_with_room_stay_where_they_are() -> None:
    """Nothing moves when nothing overlaps."""
    assert spread([200.0, 20.0, 100.0], 15.0, 0.0, 300.0) == (200.0, 20.0, 100.0)


def test_a_cluster_spreads_about_its_middle() -> None:
    """Three texts wanted at one place stand around it, which moves each as little as possible."""
    assert spread([100.0, 100.0, 100.0], 20.0, 0.0, 300.0) == pytest.approx((80.0, 100.0, 120.0))


def test_no_room_is_said_and_not_squeezed() -> None:
    """More texts than the column holds give None."""
    assert spread([10.0] * 21, 15.0, 0.0, 300.0) is None
