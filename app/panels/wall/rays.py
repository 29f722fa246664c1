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

from app.panels.wall.arrows import HEAD, along, arriving_outline, leaving_outline, wrapped
from app.panels.wall.geometry import Box, Point
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
LEAST_BESIDE: Final = 60.0
"""Room in px for an arrow from which its caption stands beyond its end."""
FIGURE: Final = 20.0
"""From an arc to the middle of its figure, in px."""


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
class Arrow:
    """A band outside the wall.

    Parameters
    ----------
    band
        What is drawn.
    foot
        Where its middle meets the face.
    end
        Its outer end: the tip of an arrow that leaves, the tail of the one that comes.
    beside
        Whether its caption stands beyond its end; else it stands below.
    """

    band: Band
    foot: Point
    end: Point
    beside: bool = False


@dataclass(frozen=True, slots=True)
class Rays:
    """Everything of the wave.

    Parameters
    ----------
    incident, reflected, transmitted
        The arrows outside; `reflected` is None when nothing is reflected, `transmitted` behind metal and in total
        reflection.
    within
        The band through the wall, piece by piece.
    way_out
        Where the wave meets the back, y in px.
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

    incident: Arrow
    reflected: Arrow | None
    transmitted: Arrow | None
    within: tuple[Band, ...]
    way_out: float
    arcs: tuple[Arc, ...]
    total: bool
    full: float
    zone: Box
    wraps: bool


@dataclass(frozen=True, slots=True)
class Clear:
    """What the rays keep clear of.

    Parameters
    ----------
    head
        Covered by text at the upper left.
    foot
        Height in px at the lower end of the wall, for the absorbed shares.
    caption
        Width in px of what is written at the end of an arrow.
    """

    head: Box
    foot: float
    caption: float


def trace(layout: WallLayout, courses: Directions, powers: Powers | None, clear: Clear) -> Rays:
    """Return the rays in a laid-out wall.

    Parameters
    ----------
    courses
        Where the wave goes in each medium.
    powers
        How much of it; None draws the ways without widths.
    clear
        What is kept free for text.
    """
    full = min(FULL, layout.body.height / 7)
    zone = Box(layout.body.left, layout.body.top + 2, layout.body.right, layout.body.bottom - 2)
    steps = _steps(layout, courses, powers)
    fall = math.fsum(step.fall for step in steps)
    entry, way_out = _entry_and_exit(zone, fall, full, clear.foot, courses.front.angle)
    tracer = _Tracer(layout, courses, powers, full, zone, clear)
    incident = tracer.incident(entry)
    back = courses.back
    return Rays(
        incident,
        tracer.reflected(incident),
        tracer.transmitted(way_out),
        tuple(tracer.bands(steps, entry)),
        way_out,
        tuple(tracer.arcs(entry, way_out)),
        back is not None and back.decays,
        full,
        zone,
        abs(fall) > abs(way_out - entry) + 1,
    )


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
    clear: Clear

    def incident(self, entry: float) -> Arrow:
        """Return the arrow that comes, as long as it can be under what is written above."""
        theta, x, half = self.courses.front.angle, self.layout.body.left, self.full / 2
        length = min(_longest(x), _across(x, theta), _rise(entry - half - self.zone.top, theta))
        if x - length * math.cos(theta) - half < self.clear.head.right:
            length = min(length, _rise(entry - half - self.clear.head.bottom, theta))
        tail = along((x, entry), -theta, -1, length)
        outline = arriving_outline(tail, (x, entry), theta, self.full)
        return Arrow(Band("incident", outline, 1.0), (x, entry), tail)

    def reflected(self, incident: Arrow) -> Arrow | None:
        """Return the arrow that goes back, from lower than the entry as far as the two would cover each other."""
        if self.powers is not None and self.powers.reflectance == 0:
            return None
        share = None if self.powers is None else self.powers.reflectance
        tall, entry = _height(share, self.full)[0], incident.foot[1]
        wanted = (self.full + tall) / 2 + HEAD + 4 - 2 * (entry - incident.end[1])
        lowest = self.zone.bottom - self.clear.foot - tall / 2
        start = (self.layout.body.left, min(entry + max(wanted, 0.0), max(lowest, entry)))
        return self._leaving("reflectance", start, self.courses.front.angle, -1, share)

    def transmitted(self, way_out: float) -> Arrow | None:
        """Return the arrow that goes on, or None when there is no way on."""
        back = self.courses.back
        if back is None or back.decays:
            return None
        share = None if self.powers is None else self.powers.transmittance
        return self._leaving("transmittance", (self.layout.body.right, way_out), back.angle, 1, share)

    def arcs(self, entry: float, way_out: float) -> Iterable[Arc]:
        """Yield the angle of incidence, and the one behind where it is another."""
        theta, back = self.courses.front.angle, self.courses.back
        found = [self._arc(self.layout.body.left, entry, theta, 1.0, behind=False)]
        if back is not None and not back.decays and abs(back.angle - theta) > 1e-6:
            share = 0.0 if self.powers is None else self.powers.transmittance
            found.append(self._arc(self.layout.body.right, way_out, back.angle, share, behind=True))
        yield from (arc for arc in found if arc is not None)

    def bands(self, steps: Sequence[_Step], entry: float) -> Iterable[Band]:
        """Yield the pieces of the wave within the wall, brought into the zone."""
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
            for piece in wrapped(outline, self.zone):
                yield Band("transmittance", piece, step.before, faint, step.direction.decays)
            y += step.fall

    def _leaving(self, role: Role, start: Point, angle: float, side: int, share: float | None) -> Arrow:
        tall, faint = _height(share, self.full)
        wing = tall * math.cos(angle) / 2 + HEAD
        room = self.layout.width - start[0] if side > 0 else start[0]
        lowest = self.zone.bottom - wing * math.cos(angle)
        beside = room - self.clear.caption - 2 * MARGIN > LEAST_BESIDE
        if beside:
            room -= self.clear.caption + MARGIN
        else:
            lowest -= self.layout.line + 2
        down = lowest - start[1] if angle >= 0 else start[1] - self.zone.top - wing
        length = min(_longest(room), _across(room, angle), _rise(down, abs(angle)))
        outline = leaving_outline(start, angle, side, length, tall)
        return Arrow(Band(role, outline, share, faint), start, along(start, angle, side, length), beside)

    def _arc(self, x: float, y: float, angle: float, share: float, *, behind: bool) -> Arc | None:
        """Return an angle's arc, so far out that its figure is clear of the band; None without room for that."""
        room = (self.layout.width - x if behind else x) - 5 * MARGIN
        half = share * self.full * math.cos(angle) / 2
        opening = max(math.sin(abs(angle) / 2), 1e-3)
        radius = min(max((half + self.layout.line) / opening - FIGURE, 36.0), 110.0, room)
        if not behind and x - radius < self.clear.head.right:
            radius = min(radius, _rise(y - self.clear.head.bottom, angle))
        clear = (radius + FIGURE) * opening >= half + 0.4 * self.layout.line
        return Arc(x, y, angle, radius, behind) if clear and radius > FIGURE else None


def _height(share: float | None, full: float) -> tuple[float, bool]:
    """Return how tall a band is, and whether that says nothing about its power."""
    tall = 0.0 if share is None else share * full
    return (tall, False) if tall >= FAINTEST else (FAINTEST, True)


def _longest(room: float) -> float:
    return max(SHORTEST, 0.6 * room)


def _across(room: float, angle: float) -> float:
    """Return how long a ray may be that has `room` px to the edge of the drawing."""
    return max(room - 2 * MARGIN, 12.0) / max(math.cos(angle), 1e-9)


def _rise(height: float, angle: float) -> float:
    """Return how long a ray may be that has `height` px to rise or fall."""
    return max(height, 16.0) / max(math.sin(angle), 1e-9)
