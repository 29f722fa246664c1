"""Where names and thicknesses stand: inside a slab when they fit, else above the wall on leader lines.

Labels on leader lines stand in tiers above the slabs. Those of a crowded group spread like a fan, the left half to
the left of their lines and the right half to the right, so that no line has to cross a label. When the tiers do not
suffice, slabs wide enough for a line of text take theirs upright, and names are cut shorter; what still finds no
place has its number below the wall, and its full text in the tool tip.
"""

from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from typing import Final, Literal, Protocol

from app.panels.wall.geometry import Box

Role = Literal["name", "value"]

INSET: Final = 6.0
"""Space between a slab's faces and text inside, in px."""
GAP: Final = 8.0
"""Between two labels of a tier."""
LEADER_GAP: Final = 4.0
"""Between a leader line and its text."""
WORD_GAP: Final = 6.0
"""Between a name and a thickness on one line."""
CAPS: Final = (220.0, 150.0, 96.0)
"""Widths in px to which labels on leader lines are cut, tried in turn for the whole wall."""
LEAST_INSIDE: Final = 90.0
"""Width of a slab from which a name too long is cut inside it rather than moved outside."""
ELLIPSIS: Final = "…"


class TextMeasure(Protocol):
    """What placing text needs to know of a font, in px."""

    @property
    def line(self) -> float:
        """Height of a line."""

    def width(self, text: str) -> float:
        """Return how wide `text` is."""


@dataclass(frozen=True, slots=True)
class TextRun:
    """A piece of text of one role and where it stands; in an upright label before turning."""

    text: str
    role: Role
    box: Box


@dataclass(frozen=True, slots=True)
class Label:
    """The label of an element.

    Parameters
    ----------
    row
        Index of the element.
    box
        What it covers.
    runs
        Its texts. When `upright`, their boxes are measured along the text: x upward from the lower end of `box`,
        y to the right from its left edge.
    leader
        x of the leader line and y of its two ends, top first; None inside a slab.
    upright
        Whether the text is turned to be read from the right.
    """

    row: int
    box: Box
    runs: tuple[TextRun, ...]
    leader: tuple[float, float, float] | None = None
    upright: bool = False


@dataclass(frozen=True, slots=True)
class Wanted:
    """A label to place: the element's row, name and value, and the box of its slab (for a sheet: its line)."""

    row: int
    name: str
    value: str
    slab: Box
    solid: bool = True


def elided(text: str, room: float, measure: TextMeasure) -> str:
    """Return `text`, cut at its end with an ellipsis so that it is no wider than `room` px; empty if none fits."""
    if measure.width(text) <= room:
        return text
    low, high = 0, len(text)
    while low < high:
        middle = (low + high + 1) // 2
        if measure.width(text[:middle].rstrip() + ELLIPSIS) <= room:
            low = middle
        else:
            high = middle - 1
    return text[:low].rstrip() + ELLIPSIS if low else ""


def inside(wanted: Wanted, measure: TextMeasure) -> Label | None:
    """Return the label at the top of its slab, name over thickness, or None when it does not fit."""
    room = wanted.slab.width - 2 * INSET
    if not wanted.solid or measure.width(wanted.value) > room:
        return None
    lines = _wrapped(wanted.name, room, measure)
    if len(lines) > 2:
        if wanted.slab.width < LEAST_INSIDE:
            return None
        rest = wanted.name[len(lines[0]) :].strip()
        lines = (lines[0], elided(rest, room, measure))
    if not all(measure.width(line) <= room for line in lines):
        return None
    left, top = wanted.slab.left + INSET, wanted.slab.top + INSET
    texts: list[tuple[str, Role]] = [(line, "name") for line in lines]
    runs = []
    for number, (text, role) in enumerate([*texts, (wanted.value, "value")]):
        y = top + number * measure.line
        runs.append(TextRun(text, role, Box(left, y, left + measure.width(text), y + measure.line)))
    return Label(wanted.row, _around(run.box for run in runs), tuple(runs))


def upright(wanted: Wanted, measure: TextMeasure, floor: float) -> Label | None:
    """Return the label turned into its slab, between the top and `floor`; None when the slab is too narrow."""
    slab = wanted.slab
    length = floor - slab.top - INSET
    if not wanted.solid or slab.width < measure.line or length < 4 * measure.line:
        return None
    runs = _line_of(wanted, length, measure)
    extent = runs[-1].box.right
    left = slab.middle - measure.line / 2
    top = slab.top + INSET
    return Label(wanted.row, Box(left, top, left + measure.line, top + extent), runs, upright=True)


def on_leaders(
    wanted: Sequence[Wanted], measure: TextMeasure, bounds: Box, tiers: int, cap: float
) -> tuple[dict[int, "Place"], tuple[Wanted, ...]]:
    """Place labels above the slabs, in order of x.

    Parameters
    ----------
    bounds
        What labels may cover; its bottom is where the slabs begin.
    tiers
        How many there may be.
    cap
        Greatest width of a label in px.

    Returns
    -------
    tuple
        Row -> place, and those that found none.
    """
    places: list[Place] = []
    failed: list[Wanted] = []
    for group in _groups(wanted, measure, cap):
        half = len(group) // 2
        # Outermost first, so that the tiers rise toward the middle of the fan.
        for side, members in ((-1, group[:half]), (1, group[: half - 1 if half else None : -1])):
            for member in members:
                place = _first_free(member, measure, cap, bounds, tiers, places, (side, -side))
                if place is None:
                    failed.append(member)
                else:
                    places.append(place)
    return {place.row: place for place in places}, tuple(failed)


@dataclass(frozen=True, slots=True)
class Place:
    """Where a label on a leader line goes: its tier (0 is next to the slabs), x extent and line."""

    row: int
    tier: int
    left: float
    right: float
    leader: float


def leader_label(wanted: Wanted, place: Place, measure: TextMeasure, slabs_top: float) -> Label:
    """Return the label for its place when the slabs begin at `slabs_top`."""
    height = tier_height(measure)
    bottom = slabs_top - LEADER_GAP - place.tier * height
    top = bottom - measure.line
    runs = tuple(
        TextRun(run.text, run.role, run.box.moved(place.left, top))
        for run in _line_of(wanted, place.right - place.left, measure)
    )
    box = Box(place.left, top, place.right, bottom)
    return Label(wanted.row, box, runs, (place.leader, top, slabs_top))


def tier_height(measure: TextMeasure) -> float:
    """Return the distance of two tiers in px."""
    return measure.line + 2


def _around(boxes: Iterable[Box]) -> Box:
    every = tuple(boxes)
    return Box(
        min(box.left for box in every),
        min(box.top for box in every),
        max(box.right for box in every),
        max(box.bottom for box in every),
    )


def _wrapped(text: str, room: float, measure: TextMeasure) -> tuple[str, ...]:
    lines = [""]
    for word in text.split():
        longer = f"{lines[-1]} {word}".strip()
        if measure.width(longer) <= room or not lines[-1]:
            lines[-1] = longer
        else:
            lines.append(word)
    return tuple(lines)


def _line_of(wanted: Wanted, room: float, measure: TextMeasure) -> tuple[TextRun, ...]:
    """Return name and value on one line from x = 0, the name cut first when there is too little room."""
    value_width = measure.width(wanted.value)
    name = elided(wanted.name, max(room - value_width - WORD_GAP, 0.0), measure)
    if not name:
        value = elided(wanted.value, room, measure)
        return (TextRun(value, "value", Box(0, 0, measure.width(value), measure.line)),)
    name_width = measure.width(name)
    start = name_width + WORD_GAP
    return (
        TextRun(name, "name", Box(0, 0, name_width, measure.line)),
        TextRun(wanted.value, "value", Box(start, 0, start + value_width, measure.line)),
    )


def _width(wanted: Wanted, measure: TextMeasure, cap: float) -> float:
    full = measure.width(wanted.name) + WORD_GAP + measure.width(wanted.value)
    return _line_of(wanted, min(full + 0.01, cap), measure)[-1].box.right


def _groups(wanted: Sequence[Wanted], measure: TextMeasure, cap: float) -> list[list[Wanted]]:
    """Return the labels in groups that stand in each other's way."""
    groups: list[list[Wanted]] = []
    reach = float("-inf")
    for member in sorted(wanted, key=lambda one: one.slab.middle):
        width = _width(member, measure, cap) + LEADER_GAP + GAP
        if member.slab.middle < reach:
            groups[-1].append(member)
        else:
            groups.append([member])
        reach = member.slab.middle + width
    return groups


def _first_free(
    wanted: Wanted,
    measure: TextMeasure,
    cap: float,
    bounds: Box,
    tiers: int,
    placed: Sequence[Place],
    sides: tuple[int, int],
) -> Place | None:
    width = _width(wanted, measure, cap)
    x = wanted.slab.middle
    for side in sides:
        for tier in range(tiers):
            left = x + LEADER_GAP if side > 0 else x - LEADER_GAP - width
            place = Place(wanted.row, tier, left, left + width, x)
            inside_bounds = left >= bounds.left and place.right <= bounds.right
            if inside_bounds and not any(_in_the_way(place, other) for other in placed):
                return place
    return None


def _in_the_way(one: Place, other: Place) -> bool:
    """Return whether two labels, or the line of one and the text of the other, would meet."""
    if one.tier == other.tier:
        return one.left < other.right + GAP and other.left < one.right + GAP
    upper, lower = (one, other) if one.tier > other.tier else (other, one)
    return lower.left - LEADER_GAP < upper.leader < lower.right + LEADER_GAP
