"""The drawing as values: slabs, sheet lines, faces, labels and numbers in px, for a size and a font."""

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import pairwise
from typing import Final, Literal

from app.panels.wall import labels
from app.panels.wall.geometry import Box
from app.panels.wall.labels import Label, TextMeasure, Wanted
from app.panels.wall.parts import LayerPart, SheetPart, Wall
from app.panels.wall.scale import ThicknessScale, fit_scale, still_fits

MARGIN: Final = 8.0
SHEET_SLOT: Final = 16.0
"""Width given to a sheet, which has no thickness, so that it can be seen and caught."""
WIDEST: Final = 1.15
"""Greatest width of a slab as a part of the drawing's height: rays at their angles need the height."""
FACE_REACH: Final = 5.0
"""How near to a face it is caught, in px."""
NUMBER_STEPS: Final = (1, 2, 5, 10, 20, 50, 100)


@dataclass(frozen=True, slots=True)
class Slab:
    """A layer as drawn; its box reaches to the line of a sheet next to it."""

    row: int
    part: LayerPart
    box: Box


@dataclass(frozen=True, slots=True)
class SheetLine:
    """A sheet as drawn: an upright line at `x`, and the slot in which it is caught."""

    row: int
    part: SheetPart
    x: float
    slot: Box


@dataclass(frozen=True, slots=True)
class Face:
    """A face that can be dragged: where it is, whose thickness it changes, and which side of that layer it is."""

    row: int
    x: float
    side: Literal["front", "back"]


@dataclass(frozen=True, slots=True)
class Number:
    """The number of an element in the row below the wall."""

    row: int
    box: Box


@dataclass(frozen=True, slots=True)
class Held:
    """A scale frozen while a face is dragged, and the end of the wall that stays where it is."""

    scale: ThicknessScale
    end: Literal["front", "back"]
    x: float


@dataclass(frozen=True, slots=True)
class WallLayout:
    """Everything that is drawn but the rays, in px from the upper left of the drawing."""

    width: float
    height: float
    wall: Wall
    scale: ThicknessScale
    front: Box
    back: Box
    body: Box
    slabs: tuple[Slab, ...]
    sheets: tuple[SheetLine, ...]
    labels: tuple[Label, ...]
    numbers: tuple[Number, ...]
    rail: Box
    line: float
    edges: tuple[float, ...]

    def extent(self, row: int) -> Box:
        """Return the box in which element `row` is caught."""
        for slab in self.slabs:
            if slab.row == row:
                return slab.box
        return next(sheet.slot for sheet in self.sheets if sheet.row == row)

    def row_at(self, x: float) -> int | None:
        """Return the element drawn at `x`, sheets before the slabs they lie on; None outside the wall."""
        for sheet in self.sheets:
            if abs(x - sheet.x) <= min(FACE_REACH, sheet.slot.width / 2):
                return sheet.row
        return next((slab.row for slab in self.slabs if slab.box.left <= x < slab.box.right), None)

    def face_at(self, x: float, preferred: Sequence[int] = ()) -> Face | None:
        """Return the face near `x`.

        A face belongs to the layer in front of it; to the one behind where there is none in front, or where only
        the one behind is among the `preferred` rows.
        """
        near = [face for face in self.faces() if abs(face.x - x) <= FACE_REACH]
        if not near:
            return None
        nearest = min(abs(face.x - x) for face in near)
        # In narrow slabs several faces are in reach.
        near = [face for face in near if abs(face.x - x) <= nearest + 0.5]
        return min(near, key=lambda face: (face.row not in preferred, face.side == "front"))

    def faces(self) -> tuple[Face, ...]:
        """Return the two faces of every layer."""
        both: list[Face] = []
        for slab in self.slabs:
            both += [Face(slab.row, slab.box.left, "front"), Face(slab.row, slab.box.right, "back")]
        return tuple(both)


def lay_out(
    wall: Wall,
    width: float,
    height: float,
    measure: TextMeasure,
    *,
    last: ThicknessScale | None = None,
    held: Held | None = None,
) -> WallLayout:
    """Return the drawing of `wall` in `width` x `height` px.

    Parameters
    ----------
    measure
        The font.
    last
        The scale of the drawing before, kept while it still fits.
    held
        During a drag: the scale and the end of the wall that do not move.
    """
    side = min(max(0.15 * width, 110.0), 340.0, width / 3)
    room = width - 2 * side
    count = len(wall.elements)
    sheet_count = sum(isinstance(part, SheetPart) for part in wall.elements)
    slot = min(SHEET_SLOT, room / (2 * max(count, 1)))
    scale = held.scale if held is not None else _scale(wall, room - slot * sheet_count, height, last)
    widths = [slot if isinstance(part, SheetPart) else scale.width(part.thickness) for part in wall.elements]
    total = sum(widths)
    left = (width - total) / 2
    if held is not None:
        left = held.x if held.end == "front" else held.x - total
    edges = [left]
    for part_width in widths:
        edges.append(edges[-1] + part_width)
    rail = Box(0, height - measure.line - MARGIN, width, height - MARGIN / 2)
    placed = _place(wall, edges, Box(0, MARGIN, width, rail.top - 2), measure)
    return _assembled(wall, width, height, measure, scale, edges, rail, placed)


def _scale(wall: Wall, room: float, height: float, last: ThicknessScale | None) -> ThicknessScale:
    thicknesses = [part.thickness for part in wall.elements if isinstance(part, LayerPart)]
    widest = max(WIDEST * height, 60.0)
    if last is not None and still_fits(last, thicknesses, room, widest):
        return last
    return fit_scale(thicknesses, room, widest)


@dataclass(frozen=True, slots=True)
class _Placed:
    body: Box
    slabs: tuple[Slab, ...]
    sheets: tuple[SheetLine, ...]
    labels: tuple[Label, ...]


def _place(wall: Wall, edges: Sequence[float], area: Box, measure: TextMeasure) -> _Placed:
    """Place the labels first: how many tiers they need decides where the slabs begin."""
    boxes = _extents(wall, edges, area.top, area.bottom)
    wanted = [
        Wanted(row, part.name, part.text, box, isinstance(part, LayerPart))
        for row, (part, box) in enumerate(zip(wall.elements, boxes, strict=True))
    ]
    outside = [one for one in wanted if labels.inside(one, measure) is None]
    most_tiers = max(int(0.42 * area.height / labels.tier_height(measure)), 1)
    bounds = Box(MARGIN, 0, area.right - MARGIN, 0)
    places, upright = _outside_places(outside, measure, bounds, most_tiers)
    tiers = max((place.tier + 1 for place in places.values()), default=0)
    top = area.top + tiers * labels.tier_height(measure) + (LEADER_SPACE if tiers else 0.0)
    body = Box(edges[0], top, edges[-1], area.bottom)
    made: list[Label] = []
    for one in wanted:
        box = Box(one.slab.left, body.top, one.slab.right, body.bottom)
        moved = Wanted(one.row, one.name, one.value, box, one.solid)
        label = _label(moved, places, upright, measure)
        if label is not None:
            made.append(label)
    slabs, sheets = _elements(wall, edges, body)
    return _Placed(body, slabs, sheets, tuple(made))


LEADER_SPACE: Final = 6.0


def _label(
    wanted: Wanted, places: dict[int, labels.Place], upright: frozenset[int], measure: TextMeasure
) -> Label | None:
    if wanted.row in places:
        return labels.leader_label(wanted, places[wanted.row], measure, wanted.slab.top)
    if wanted.row in upright:
        return labels.upright(wanted, measure, wanted.slab.bottom - measure.line - labels.INSET)
    return labels.inside(wanted, measure)


def _outside_places(
    outside: Sequence[Wanted], measure: TextMeasure, bounds: Box, tiers: int
) -> tuple[dict[int, labels.Place], frozenset[int]]:
    """Return the places of labels on leader lines, and the rows whose labels are turned into their slabs."""
    for cap in labels.CAPS[:2]:
        places, failed = labels.on_leaders(outside, measure, bounds, tiers, cap)
        if not failed:
            return places, frozenset()
    turned = frozenset(one.row for one in outside if one.solid and one.slab.width >= measure.line)
    rest = [one for one in outside if one.row not in turned]
    for cap in labels.CAPS:
        places, failed = labels.on_leaders(rest, measure, bounds, tiers, cap)
        if not failed:
            break
    if len(failed) > len(rest) / 2:
        # A few labels in a crowd of nameless slabs say less than the row of numbers alone.
        places = {}
    return places, turned


def _extents(wall: Wall, edges: Sequence[float], top: float, bottom: float) -> list[Box]:
    """Return the box of every element; layers reach to the lines of sheets beside them."""
    lines = [
        (edges[row] + edges[row + 1]) / 2 if isinstance(part, SheetPart) else None
        for row, part in enumerate(wall.elements)
    ]
    boxes = []
    for row, line in enumerate(lines):
        left, right = edges[row], edges[row + 1]
        if line is not None:
            boxes.append(Box(line, top, line, bottom))
            continue
        before = lines[row - 1] if row else None
        after = lines[row + 1] if row + 1 < len(lines) else None
        boxes.append(Box(left if before is None else before, top, right if after is None else after, bottom))
    return boxes


def _elements(wall: Wall, edges: Sequence[float], body: Box) -> tuple[tuple[Slab, ...], tuple[SheetLine, ...]]:
    slabs: list[Slab] = []
    sheets: list[SheetLine] = []
    boxes = _extents(wall, edges, body.top, body.bottom)
    for row, (part, box) in enumerate(zip(wall.elements, boxes, strict=True)):
        if isinstance(part, LayerPart):
            slabs.append(Slab(row, part, box))
        else:
            slot = Box(edges[row], body.top, edges[row + 1], body.bottom)
            sheets.append(SheetLine(row, part, box.left, slot))
    return tuple(slabs), tuple(sheets)


def _assembled(
    wall: Wall,
    width: float,
    height: float,
    measure: TextMeasure,
    scale: ThicknessScale,
    edges: Sequence[float],
    rail: Box,
    placed: _Placed,
) -> WallLayout:
    body = placed.body
    ends = _outer_ends(placed, body)
    return WallLayout(
        width=width,
        height=height,
        wall=wall,
        scale=scale,
        front=Box(0, body.top, ends[0], body.bottom),
        back=Box(ends[1], body.top, width, body.bottom),
        body=Box(ends[0], body.top, ends[1], body.bottom),
        slabs=placed.slabs,
        sheets=placed.sheets,
        labels=placed.labels,
        numbers=_numbers(edges, rail, measure),
        rail=rail,
        line=measure.line,
        edges=tuple(edges),
    )


def _outer_ends(placed: _Placed, body: Box) -> tuple[float, float]:
    """Return where the wall begins and ends: at a sheet's line when a sheet is outermost."""
    xs = [slab.box.left for slab in placed.slabs] + [slab.box.right for slab in placed.slabs]
    xs += [sheet.x for sheet in placed.sheets]
    return (min(xs), max(xs)) if xs else (body.left, body.right)


def _numbers(edges: Sequence[float], rail: Box, measure: TextMeasure) -> tuple[Number, ...]:
    """Return the numbers below the wall, every one or as many as do not touch: every 2nd, 5th, 10th ..."""
    count = len(edges) - 1
    numbers: tuple[Number, ...] = ()
    for step in NUMBER_STEPS:
        rows = [row for row in range(count) if row == 0 or (row + 1) % step == 0]
        numbers = tuple(_number(row, edges, rail, measure) for row in rows)
        pairs = pairwise(numbers)
        if all(one.box.right + 3 <= other.box.left for one, other in pairs):
            return numbers
    return numbers[:1]


def _number(row: int, edges: Sequence[float], rail: Box, measure: TextMeasure) -> Number:
    middle = (edges[row] + edges[row + 1]) / 2
    half = measure.width(str(row + 1)) / 2
    return Number(row, Box(middle - half, rail.top, middle + half, rail.bottom))
