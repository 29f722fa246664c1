"""The wave as drawn: bands at the true angles, as tall along a face as the power they carry through it.

Every piece of the wall receives the same power, so power is drawn as height along the face: the incident band is
`FULL` px tall, the reflected and the transmitted one R and T of that. Within the wall the band is as tall as the
net power that flows on, 1 − R at the front; it loses in each element what is absorbed there and leaves as T.

A wall is drawn wider than a ray at its angle may fall within the height of the drawing. The wave is everywhere
along the wall; so where the band leaves the drawing below, the same wave enters again above.
"""

import math
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from typing import Final, Literal

from app.panels.wall.geometry import Box, Point, within_rows
from app.panels.wall.layout import MARGIN, WallLayout
from app.panels.wall.refraction import Direction, Directions

Role = Literal["incident", "reflectance", "transmittance"]

FULL: Final = 30.0
"""Height of the incident band in px where there is room."""
SHORTEST: Final = 150.0
"""Length of an arrow outside the wall, in px, where there is room; in a wide drawing it is longer."""
ROOM_IN_FRONT: Final = 0.27
ROOM_BEHIND: Final = 0.17
"""Parts of the wall's height kept for the arrows to rise to the front and to fall from the back."""
FAINTEST: Final = 1.5
"""Bands less tall than this, in px, are drawn this tall and dashed: they show the way and not the power."""
HEAD: Final = 5.0
"""How far an arrow's head stands out from its shaft, in px."""
_GENTLEST: Final = 0.02


@dataclass(frozen=True, slots=True)
class Powers:
    """Fractions of the incident power at the marker: reflected, transmitted, and absorbed in each element."""

    reflectance: float
    transmittance: float
    absorbed: tuple[float, ...]


@dataclass(frozen=True, slots=True)
class Band:
    """A piece of the wave: a closed outline with what it stands for.

    Parameters
    ----------
    role
        Whose colour it has.
    outline
        Corners in px.
    share
        Fraction of the incident power at its beginning, or None while it is not known.
    faint
        Whether it is only a line that shows the way.
    decays
        Whether the wave only decays there and goes nowhere.
    """

    role: Role
    outline: tuple[Point, ...]
    share: float | None
    faint: bool = False
    decays: bool = False


@dataclass(frozen=True, slots=True)
class Arc:
    """An angle as written: the point on a face it is measured at, its size in rad (signed), radius, and side."""

    x: float
    y: float
    angle: float
    radius: float
    behind: bool


@dataclass(frozen=True, slots=True)
class Rays:
    """Everything of the wave.

    Parameters
    ----------
    incident, reflected, transmitted
        The arrows outside; `reflected` is None while R is unknown or nothing is reflected, `transmitted` is None
        behind metal and in total reflection.
    within
        The band through the wall, piece by piece.
    entry, reflection, exit
        Where the incident, reflected and transmitted bands meet the wall: y in px.
    tails
        Outer ends of the arrows, by role.
    arcs
        Angles to write.
    total
        Whether the wave is totally reflected at the back half-space.
    full
        Height in px that stands for all the incident power.
    zone
        Where the wave stays within the wall.
    wraps
        Whether it leaves the zone below and enters again above.
    """

    incident: Band
    reflected: Band | None
    transmitted: Band | None
    within: tuple[Band, ...]
    entry: float
    reflection: float
    exit: float
    tails: dict[Role, Point]
    arcs: tuple[Arc, ...]
    total: bool
    full: float
    zone: Box
    wraps: bool


def trace(layout: WallLayout, courses: Directions, powers: Powers | None, foot: float, head: Box) -> Rays:
    """Return the rays in a laid-out wall.

    Parameters
    ----------
    courses
        Where the wave goes in each medium.
    powers
        How much of it; None draws the ways without widths.
    foot
        Height in px kept free at the lower end of the wall, for what is written there.
    head
        What is covered by text at the upper left.
    """
    full = min(FULL, layout.body.height / 7)
    zone = Box(layout.body.left, layout.body.top + 2, layout.body.right, layout.body.bottom - 2)
    steps = _steps(layout, courses, powers)
    fall = sum(step.fall for step in steps)
    entry, way_out = _entry_and_exit(zone, fall, full, foot, courses.front.angle)
    return _Tracer(layout, courses, powers, full, zone, foot, head).rays(steps, entry, way_out)


@dataclass(frozen=True, slots=True)
class _Step:
    """The way through one element, or through the gap between two sheets."""

    left: float
    right: float
    direction: Direction
    before: float | None
    after: float | None

    @property
    def fall(self) -> float:
        if self.direction.decays:
            return 0.0
        return (self.right - self.left) * math.tan(self.direction.angle)


def _steps(layout: WallLayout, courses: Directions, powers: Powers | None) -> list[_Step]:
    flow = None if powers is None else 1 - powers.reflectance
    boxes = {slab.row: slab.box for slab in layout.slabs}
    lines = {sheet.row: sheet.x for sheet in layout.sheets}
    steps: list[_Step] = []
    x = layout.body.left
    for row in range(len(layout.wall.elements)):
        loss = 0.0 if powers is None else powers.absorbed[row]
        after = None if flow is None else max(flow - loss, 0.0)
        course = courses.elements[row]
        right = boxes[row].right if row in boxes else lines[row]
        if row in boxes and course is not None:
            steps.append(_Step(x, right, course, flow, after))
        elif right > x:
            steps.append(_Step(x, right, Direction(0.0), flow, flow))
        x, flow = right, after
    return steps


def _entry_and_exit(zone: Box, fall: float, full: float, foot: float, angle: float) -> tuple[float, float]:
    """Return where the wave meets the front and where it leaves the back.

    When the whole way fits it stands in the middle, as far as the arrows outside leave it there; else it wraps, and
    the entry is chosen so that the way out comes to lie well inside the drawing.
    """
    top, bottom = zone.top + full / 2, zone.bottom - foot - full / 2
    middle, height = (top + bottom) / 2, bottom - top
    steepness = min(1.0, 2 * math.sin(angle))
    highest, lowest = top + ROOM_IN_FRONT * height * steepness, bottom - ROOM_BEHIND * height * steepness
    if abs(fall) <= lowest - highest:
        entry = max(highest, highest - fall, min(middle - fall / 2, lowest, lowest - fall))
        return entry, entry + fall
    candidates = [zone.top + zone.height * share / 100 for share in range(30, 61, 2)]
    ways_out = [zone.top + (entry + fall - zone.top) % zone.height for entry in candidates]
    misses = [
        abs(way_out - middle) + 0.5 * abs(entry - middle)
        for entry, way_out in zip(candidates, ways_out, strict=True)
    ]
    best = misses.index(min(misses))
    return candidates[best], ways_out[best]


@dataclass(frozen=True, slots=True)
class _Tracer:
    layout: WallLayout
    courses: Directions
    powers: Powers | None
    full: float
    zone: Box
    foot: float
    head: Box

    def rays(self, steps: Sequence[_Step], entry: float, way_out: float) -> Rays:
        body, theta = self.layout.body, self.courses.front.angle
        reflectance = None if self.powers is None else self.powers.reflectance
        incident, tail = self._incident(entry)
        reflection = self._reflection(entry, tail)
        tails: dict[Role, Point] = {"incident": tail}
        reflected = None
        if reflectance != 0:
            length = self._length(reflection, theta, body.left)
            reflected = self._arrow("reflectance", (body.left, reflection), theta, -1, length, reflectance)
            tails["reflectance"] = _along((body.left, reflection), theta, -1, length)
        back = self.courses.back
        transmitted = None
        arcs = [self._arc(body.left, entry, theta, behind=False)]
        if back is not None and not back.decays:
            share = None if self.powers is None else self.powers.transmittance
            length = self._length(way_out, back.angle, self.layout.width - body.right)
            start = (body.right, way_out)
            transmitted = self._arrow("transmittance", start, back.angle, 1, length, share)
            tails["transmittance"] = _along(start, back.angle, 1, length)
            if abs(back.angle - theta) > 1e-6:
                arcs.append(self._arc(*start, back.angle, behind=True))
        return Rays(
            incident,
            reflected,
            transmitted,
            tuple(self._bands(steps, entry)),
            entry,
            reflection,
            way_out,
            tails,
            tuple(arc for arc in arcs if abs(arc.angle) > _GENTLEST),
            back is not None and back.decays,
            self.full,
            self.zone,
            abs(sum(step.fall for step in steps)) > abs(way_out - entry) + 1,
        )

    def _arc(self, x: float, y: float, angle: float, *, behind: bool) -> Arc:
        """Return an angle's arc, far enough out for its figure to stand clear of the band."""
        room = (self.layout.width - x if behind else x) - 5 * MARGIN
        clear = (self.full / 2 + self.layout.line) / max(math.sin(abs(angle) / 2), 1e-3)
        return Arc(x, y, angle, min(max(clear - 20, 36.0), 110.0, max(room, 20.0)), behind)

    def _longest(self, room: float) -> float:
        return max(SHORTEST, 0.6 * room)

    def _length(self, y: float, angle: float, room: float) -> float:
        """Return how long an arrow from a face at height `y` may be, with `room` px to the edge of the drawing."""
        across = max(room - 2 * MARGIN, 12.0) / max(math.cos(angle), 1e-9)
        limit = self.zone.bottom - self.layout.line - 6 - y if angle >= 0 else y - self.zone.top
        down = max(limit, 16.0) / max(abs(math.sin(angle)), 1e-9)
        return min(self._longest(room), across, down)

    def _incident(self, entry: float) -> tuple[Band, Point]:
        theta = self.courses.front.angle
        x = self.layout.body.left
        half = self.full / 2
        across = max(x - 2 * MARGIN, 12.0) / max(math.cos(theta), 1e-9)
        length = min(self._longest(x), across, self._rise(entry - half - self.zone.top, theta))
        if x - length * math.cos(theta) - half < self.head.right:
            length = min(length, self._rise(entry - half - self.head.bottom, theta))
        tail = (x - length * math.cos(theta), entry - length * math.sin(theta))
        outline = _swallow_tail(tail, (x, entry), theta, self.full)
        return Band("incident", outline, 1.0), tail

    @staticmethod
    def _rise(height: float, angle: float) -> float:
        """Return how long a ray may be that has `height` px to rise."""
        return max(height, 16.0) / max(math.sin(angle), 1e-9)

    def _reflection(self, entry: float, tail: Point) -> float:
        """Return where the reflected band leaves: lower than the entry as far as the two would cover each other."""
        apart = 2 * (entry - tail[1])
        share = 1.0 if self.powers is None else self.powers.reflectance
        wanted = self.full * (1 + share) / 2 + HEAD + 4
        lowest = self.zone.bottom - self.foot - self.full * share / 2
        return min(entry + max(wanted - apart, 0.0), max(lowest, entry))

    def _arrow(self, role: Role, start: Point, angle: float, side: int, length: float, share: float | None) -> Band:
        tall, faint = _height(share, self.full)
        return Band(role, _arrow_outline(start, angle, side, length, tall), share, faint)

    def _bands(self, steps: Sequence[_Step], entry: float) -> Iterable[Band]:
        y = entry
        for step in steps:
            first, faint = _height(step.before, self.full)
            last, _ = _height(step.after, self.full)
            outline = (
                (step.left, y - first / 2),
                (step.right, y + step.fall - last / 2),
                (step.right, y + step.fall + last / 2),
                (step.left, y + first / 2),
            )
            for piece in _wrapped(outline, self.zone):
                yield Band("transmittance", piece, step.before, faint, step.direction.decays)
            y += step.fall


def _height(share: float | None, full: float) -> tuple[float, bool]:
    """Return how tall a band is, and whether that says nothing about its power."""
    tall = 0.0 if share is None else share * full
    return (tall, False) if tall >= FAINTEST else (FAINTEST, True)


def _along(start: Point, angle: float, side: int, length: float) -> Point:
    return start[0] + side * length * math.cos(angle), start[1] + length * math.sin(angle)


def _wrapped(outline: Sequence[Point], zone: Box) -> Iterable[tuple[Point, ...]]:
    """Yield the parts of an outline brought into the zone, each by a whole number of its heights."""
    first = math.floor((min(y for _, y in outline) - zone.top) / zone.height)
    last = math.floor((max(y for _, y in outline) - zone.top) / zone.height)
    for turn in range(first, last + 1):
        shift = turn * zone.height
        piece = within_rows(((x, y - shift) for x, y in outline), zone.top, zone.bottom)
        if len(piece) > 2:
            yield piece


def _arrow_outline(start: Point, angle: float, side: int, length: float, tall: float) -> tuple[Point, ...]:
    """Return an arrow that leaves a face at `start`; its foot lies along the face, `tall` high."""
    along = (side * math.cos(angle), math.sin(angle))
    normal = (-along[1], along[0])
    half = tall * math.cos(angle) / 2
    wing = half + HEAD
    head = min(wing * 1.2, length * 0.6)
    tip = (start[0] + along[0] * length, start[1] + along[1] * length)
    neck = (tip[0] - along[0] * head, tip[1] - along[1] * head)
    turn = 1 if normal[1] > 0 else -1

    def beside(point: Point, off: float) -> Point:
        return point[0] + normal[0] * off * turn, point[1] + normal[1] * off * turn

    return (
        (start[0], start[1] - tall / 2),
        beside(neck, -half),
        beside(neck, -wing),
        tip,
        beside(neck, wing),
        beside(neck, half),
        (start[0], start[1] + tall / 2),
    )


def _swallow_tail(tail: Point, end: Point, angle: float, tall: float) -> tuple[Point, ...]:
    """Return the incident band from a notched tail to the face, along which it is `tall` high."""
    along = (math.cos(angle), math.sin(angle))
    half = tall * math.cos(angle) / 2
    normal = (-along[1] * half, along[0] * half)
    notch = (tail[0] + along[0] * half * 0.8, tail[1] + along[1] * half * 0.8)
    return (
        (end[0], end[1] - tall / 2),
        (tail[0] - normal[0], tail[1] - normal[1]),
        notch,
        (tail[0] + normal[0], tail[1] + normal[1]),
        (end[0], end[1] + tall / 2),
    )
