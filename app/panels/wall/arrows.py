"""Outlines of the bands and arrows of the wave, as corners in px.

Along a face an arrow is as tall as its power; across its own direction it is narrower by the cosine of its angle.
"""

import math
from collections.abc import Iterable, Sequence
from typing import Final

from app.panels.wall.geometry import Box, Point, within_rows

HEAD: Final = 5.0
"""How far an arrow's head stands out from its shaft, in px."""


def along(start: Point, angle: float, side: int, length: float) -> Point:
    """Return the point `length` px from `start`, to the right (`side` 1) or left, downward by `angle`."""
    return start[0] + side * length * math.cos(angle), start[1] + length * math.sin(angle)


def leaving_outline(start: Point, angle: float, side: int, length: float, tall: float) -> tuple[Point, ...]:
    """Return an arrow that leaves a face at `start`; its foot lies along the face, `tall` high."""
    half = tall * math.cos(angle) / 2
    wing = half + HEAD
    head = min(wing * 1.2, length * 0.6)
    tip, neck = along(start, angle, side, length), along(start, angle, side, length - head)

    def beside(off: float) -> Point:
        # Downward for a positive `off`, on either side.
        return neck[0] - side * math.sin(angle) * off, neck[1] + math.cos(angle) * off

    return (
        (start[0], start[1] - tall / 2),
        beside(-half),
        beside(-wing),
        tip,
        beside(wing),
        beside(half),
        (start[0], start[1] + tall / 2),
    )


def arriving_outline(tail: Point, end: Point, angle: float, tall: float) -> tuple[Point, ...]:
    """Return a band from a notched tail at the upper left to a face, along which it is `tall` high."""
    half = tall * math.cos(angle) / 2
    across = (-math.sin(angle) * half, math.cos(angle) * half)
    return (
        (end[0], end[1] - tall / 2),
        (tail[0] - across[0], tail[1] - across[1]),
        along(tail, angle, 1, half * 0.8),
        (tail[0] + across[0], tail[1] + across[1]),
        (end[0], end[1] + tall / 2),
    )


def wrapped(outline: Sequence[Point], zone: Box) -> Iterable[tuple[Point, ...]]:
    """Yield the parts of a convex outline brought into the zone, each by a whole number of its heights."""
    first = math.floor((min(y for _, y in outline) - zone.top) / zone.height)
    last = math.floor((max(y for _, y in outline) - zone.top) / zone.height)
    for turn in range(first, last + 1):
        shift = turn * zone.height
        piece = within_rows(((x, y - shift) for x, y in outline), zone.top, zone.bottom)
        if len(piece) > 2:
            yield piece
