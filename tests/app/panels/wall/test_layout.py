"""The layout: everything in its place, nothing upon another, whatever the wall and the size."""

from itertools import combinations, pairwise

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from app.panels.wall import labels
from app.panels.wall.captions import captions, end_names, rays_in
from app.panels.wall.geometry import Box
from app.panels.wall.layout import Held, WallLayout, lay_out
from app.panels.wall.parts import SheetPart, Wall
from tests.app.panels.wall.walls import EvenFont, layer, names, stack_of, wall, walls, wave_through

FONT = EvenFont()
LONG = "Quartz-fibre reinforced cyanate ester prepreg, three plies"
widths = st.integers(360, 2600)
heights = st.integers(150, 500)


def laid_out(drawn: Wall, width: float = 1200, height: float = 250) -> WallLayout:
    """Return the layout in the even font."""
    return lay_out(drawn, width, height, FONT)


def standing(label: labels.Label, font: EvenFont) -> list[Box]:
    """Return the boxes of a label's texts as they stand, also when turned."""
    if not label.upright:
        return [run.box for run in label.runs]
    low = label.box.bottom
    return [
        Box(label.box.left + run.box.top, low - run.box.right, label.box.left + run.box.bottom, low - run.box.left)
        for run in label.runs
    ]


@settings(max_examples=150)
@given(walls(), widths, heights, st.sampled_from([5.0, 6.5, 9.0]))
def test_labels_never_overlap_and_no_leader_crosses_one(
    drawn: Wall, width: int, height: int, letter: float
) -> None:
    """No text covers another, no leader line runs through a text, and all of it is inside the drawing."""
    font = EvenFont(line=2.2 * letter, letter=letter)
    layout = lay_out(drawn, width, height, font)
    for one, other in combinations(layout.labels, 2):
        assert not one.box.overlaps(other.box)
    for label in layout.labels:
        box = label.box
        assert box.left >= 0
        assert box.right <= width
        assert box.top >= 0
        assert box.bottom <= layout.body.bottom
        for text in standing(label, font):
            assert box.grown(1e-6).left <= text.left
            assert text.right <= box.grown(1e-6).right
            assert text.bottom <= box.grown(1e-6).bottom
        if label.leader is None:
            continue
        x, top, bottom = label.leader
        assert bottom == layout.body.top
        line = Box(x - 0.5, top, x + 0.5, bottom)
        assert not any(line.overlaps(other.box) for other in layout.labels)


@settings(max_examples=100)
@given(walls(), widths, heights)
def test_slabs_fill_the_wall_without_gap_or_overlap(drawn: Wall, width: int, height: int) -> None:
    """From front to back each element begins where the one before ends, and half-spaces are left on both sides."""
    layout = laid_out(drawn, width, height)
    elements = [(slab.row, slab.box.left, slab.box.right) for slab in layout.slabs]
    elements += [(sheet.row, sheet.x, sheet.x) for sheet in layout.sheets]
    ordered = sorted(elements)
    assert [row for row, _, _ in ordered] == list(range(len(drawn.elements)))
    for (one, _, right), (other, left, _) in pairwise(ordered):
        both_sheets = all(isinstance(drawn.elements[row], SheetPart) for row in (one, other))
        assert left > right if both_sheets else left == pytest.approx(right)
    assert layout.body.left >= 0.13 * width
    assert layout.front.right == layout.body.left
    assert layout.back.left == layout.body.right
    assert layout.body.right <= 0.87 * width
    assert layout.body.height >= 0.35 * height


@settings(max_examples=100)
@given(walls(), widths, heights, st.floats(0, 85), st.sampled_from(["TE", "TM"]))
def test_nothing_written_covers_anything_written(
    drawn: Wall, width: int, height: int, degrees: float, polarization: str
) -> None:
    """Captions of the wave, labels, numbers and names at the ends keep off each other."""
    layout = laid_out(drawn, width, height)
    wave = wave_through(stack_of(drawn), 1e10, degrees, polarization)
    written = captions(layout, rays_in(layout, wave, FONT), wave, FONT)
    boxes = [caption.box for caption in written] + [label.box for label in layout.labels]
    boxes += [number.box for number in layout.numbers]
    boxes += [name.box for name in end_names(layout, FONT) if name.text]
    assert not [pair for pair in combinations(boxes, 2) if pair[0].overlaps(pair[1])]


@pytest.mark.parametrize("width", [1200, 2560])
def test_powers_are_always_written_in_a_window_of_usual_size(width: int) -> None:
    """R, T, A and the circumstances find their place beside a wall of any number of layers."""
    for count in (1, 3, 12, 60):
        drawn = wall(*(layer("skin", 1e-3) for _ in range(count)))
        layout = laid_out(drawn, width, 250 if width == 1200 else 480)
        for degrees in (0, 5, 30, 60, 80):
            wave = wave_through(stack_of(drawn), 1e10, degrees)
            written = captions(layout, rays_in(layout, wave, FONT), wave, FONT)
            # An incident ray, R and T; A and the share of a wide slab.
            assert {caption.text[0] for caption in written} >= {"1", "R", "T", "A"}


def test_a_short_name_stands_inside_its_slab() -> None:
    """Name over thickness at the top of a slab that is wide enough, without a leader line."""
    layout = laid_out(wall(layer("skin", 1e-3), layer("core", 4e-3)))
    assert [label.leader for label in layout.labels] == [None, None]
    assert [run.text for run in layout.labels[1].runs] == ["core", "4 mm"]


def test_a_name_too_long_for_a_thin_slab_stands_on_a_leader_line() -> None:
    """A thin layer's label is above the wall with its line on the slab, in full."""
    layout = laid_out(wall(layer("Film adhesive number four", 1e-4), layer("core", 9e-3)))
    label = layout.labels[0]
    assert label.leader is not None
    assert layout.slabs[0].box.left < label.leader[0] < layout.slabs[0].box.right
    assert [run.text for run in label.runs] == ["Film adhesive number four", "0.1 mm"]
    assert label.box.bottom < layout.body.top


def test_long_names_are_cut_and_thicknesses_are_not() -> None:
    """Sixty letters end in an ellipsis, the thickness behind stays whole."""
    drawn = wall(*(layer(LONG, thickness) for thickness in (1e-4, 5e-3, 1e-4, 1e-4, 5e-3)))
    found = laid_out(drawn).labels
    assert [label.runs[-1].text for label in found] == ["0.1 mm", "5 mm", "0.1 mm", "0.1 mm", "5 mm"]
    on_leaders = [label.runs[0].text for label in found if label.leader is not None]
    assert len(on_leaders) == 3
    assert all(text.endswith("…") and LONG.startswith(text[:-1]) for text in on_leaders)


def test_sixty_layers_take_their_names_upright_where_a_line_fits() -> None:
    """In a wide window every one of sixty slabs has a label, turned into it."""
    drawn = wall(*(layer("silica", 1e-7) for _ in range(60)))
    layout = laid_out(drawn, 2560, 480)
    assert len(layout.labels) == 60
    assert all(label.upright for label in layout.labels)
    assert [number.row for number in layout.numbers] == list(range(60))


def test_numbers_thin_out_before_they_touch() -> None:
    """A narrow window shows every second, fifth or tenth number, the first always."""
    layout = laid_out(wall(*(layer("silica", 1e-7) for _ in range(60))), 500, 200)
    rows = [number.row for number in layout.numbers]
    assert rows[0] == 0
    assert 5 < len(rows) < 60
    assert all((row + 1) % (rows[1] + 1) == 0 for row in rows[1:])


def test_labels_of_a_crowd_fan_out() -> None:
    """Of two thin layers side by side the front one's label goes to the left and the other's to the right."""
    layout = laid_out(wall(layer("first adhesive", 1e-4), layer("second adhesive", 1e-4), layer("core", 9e-3)))
    first, second = layout.labels[:2]
    assert first.leader is not None
    assert second.leader is not None
    assert first.box.right < first.leader[0] < second.leader[0] < second.box.left
    assert first.box.top == second.box.top


@given(names, st.floats(0, 300))
def test_elided_text_fits_and_says_so(text: str, room: float) -> None:
    """A cut text is no wider than its room and ends in an ellipsis; what fits is left alone."""
    cut = labels.elided(text, room, FONT)
    assert FONT.width(cut) <= room
    assert cut == text or cut == "" or (cut.endswith("…") and text.startswith(cut[:-1]))


def test_a_face_belongs_to_the_layer_in_front_of_it() -> None:
    """Unless there is none in front, or only the one behind is selected."""
    layout = laid_out(wall(layer("skin", 1e-3), layer("core", 4e-3)))
    left, middle = layout.slabs[0].box.left, layout.slabs[1].box.left
    first, inner = layout.face_at(left + 2), layout.face_at(middle - 2)
    assert first is not None
    assert (first.row, first.side) == (0, "front")
    assert inner is not None
    assert (inner.row, inner.side) == (0, "back")
    preferred = layout.face_at(middle - 2, (1,))
    assert preferred is not None
    assert (preferred.row, preferred.side) == (1, "front")
    assert layout.face_at((left + middle) / 2) is None


def test_a_sheet_is_caught_at_its_line() -> None:
    """A sheet has no thickness, yet it is found where it is drawn; beside it the layers are."""
    layout = laid_out(wall(layer("skin", 1e-3), SheetPart(("R",), "377 Ω/sq"), layer("core", 4e-3)))
    x = layout.sheets[0].x
    assert [layout.row_at(x + off) for off in (-12, -3, 0, 3, 12)] == [0, 1, 1, 1, 2]
    assert layout.row_at(layout.body.left - 20) is None
    assert layout.extent(1) == layout.sheets[0].slot


def test_a_held_scale_keeps_one_end_where_it_is() -> None:
    """While a face is dragged the other end of the wall and all other widths stay."""
    before = laid_out(wall(layer("skin", 1e-3), layer("core", 4e-3)))
    thicker = wall(layer("skin", 1e-3), layer("core", 5e-3))
    front = lay_out(thicker, 1200, 250, FONT, held=Held(before.scale, "front", before.body.left))
    back = lay_out(thicker, 1200, 250, FONT, held=Held(before.scale, "back", before.body.right))
    assert front.slabs[0].box.left == before.slabs[0].box.left
    assert front.slabs[0].box.width == pytest.approx(before.slabs[0].box.width)
    assert back.slabs[1].box.right == before.slabs[1].box.right
    assert back.slabs[1].box.width == front.slabs[1].box.width > before.slabs[1].box.width


def test_a_wall_of_nothing_is_one_line() -> None:
    """Without elements front and back meet in the middle and there is nothing to catch."""
    layout = laid_out(wall())
    assert layout.body.width == 0
    assert layout.body.middle == 600
    assert layout.row_at(600) is None
    assert layout.face_at(600) is None
