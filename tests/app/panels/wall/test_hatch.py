"""Hatches: each kind its own pattern, none outside its box."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.look.theme import KINDS, LIGHT, Hatch, kind_style
from app.panels.wall.geometry import Box, within_rows
from app.panels.wall.hatch import strokes

HATCHES: tuple[Hatch, ...] = ("none", "diagonal", "dots", "dense", "cross", "glint", "dashes")
edges = st.floats(0, 900)


@given(st.sampled_from(HATCHES), edges, edges, edges, edges)
def test_strokes_stay_in_their_box(hatch: Hatch, left: float, top: float, right: float, bottom: float) -> None:
    """No stroke leaves the slab, so that nothing has to be clipped."""
    box = Box(min(left, right), min(top, bottom), max(left, right), max(top, bottom)).grown(0.0)
    inside = box.grown(1e-6)
    for x, y, end_x, end_y in strokes(hatch, box):
        assert inside.left <= min(x, end_x)
        assert max(x, end_x) <= inside.right
        assert inside.top <= min(y, end_y)
        assert max(y, end_y) <= inside.bottom


def test_every_kind_but_the_plain_one_has_a_pattern_of_its_own() -> None:
    """In grey, kinds are told apart by their strokes alone."""
    box = Box(0, 0, 200, 150)
    patterns = {kind: strokes(kind_style(LIGHT, kind).hatch, box) for kind in KINDS}
    assert len(set(patterns.values())) == len(KINDS)
    assert [kind for kind, pattern in patterns.items() if not pattern] == ["coating"]


def test_a_face_uncovers_more_of_the_same_pattern() -> None:
    """Widening a slab leaves the strokes that were there."""
    narrow = set(strokes("dots", Box(10, 0, 60, 100)))
    assert narrow
    assert narrow < set(strokes("dots", Box(10, 0, 90, 100)))


@pytest.mark.parametrize(("top", "bottom", "area"), [(0, 10, 100.0), (2, 5, 30.0), (-5, 4, 40.0), (20, 30, 0.0)])
def test_a_square_cut_between_two_rows(top: float, bottom: float, area: float) -> None:
    """Cutting a square of side 10 leaves the rectangle between the rows, or nothing."""
    piece = within_rows([(0, 0), (10, 0), (10, 10), (0, 10)], top, bottom)
    twice = sum(x * piece[i - 1][1] - piece[i - 1][0] * y for i, (x, y) in enumerate(piece))
    assert abs(twice) / 2 == pytest.approx(area)
