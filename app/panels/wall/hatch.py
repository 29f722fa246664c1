"""Hatches of the kinds of material as strokes: each lies inside its box, so nothing needs to be clipped.

Every kind keeps its pattern at every size and in grey, where tints alone can not be told apart.
"""

import math
from collections.abc import Iterator
from typing import Final

from app.look.theme import Hatch
from app.panels.wall.geometry import Box, Stroke

DOT: Final = 0.8
"""Half the length of a dot: a stroke so short that it is seen as a point."""


def strokes(hatch: Hatch, box: Box) -> tuple[Stroke, ...]:
    """Return the strokes of `hatch` in `box`; none for a box without area.

    Patterns are anchored to the drawing and not to the box, so that dragging a face uncovers more of the same.
    """
    if box.width < 1 or box.height < 1:
        return ()
    if hatch == "diagonal":
        return tuple(_slanted(box, 10.0, 1))
    if hatch == "dense":
        return tuple(_slanted(box, 4.5, 1))
    if hatch == "cross":
        return (*_slanted(box, 11.0, 1), *_slanted(box, 11.0, -1))
    if hatch == "dots":
        return tuple(_dashes(box, 12.0, 7.0, DOT))
    if hatch == "dashes":
        return tuple(_dashes(box, 26.0, 9.0, 6.0))
    if hatch == "glint":
        return tuple(_glints(box))
    return ()


def _slanted(box: Box, spacing: float, rise: int) -> Iterator[Stroke]:
    """Yield lines at 45° that go up to the right (`rise` 1) or down: x + rise · y is the same all along a line."""
    step = spacing * math.sqrt(2)
    ends = [x + rise * y for x in (box.left, box.right) for y in (box.top, box.bottom)]
    for number in range(math.ceil(min(ends) / step), math.floor(max(ends) / step) + 1):
        level = number * step
        # y runs over the part of the box the line crosses.
        at_left, at_right = rise * (level - box.left), rise * (level - box.right)
        top = max(box.top, min(at_left, at_right))
        bottom = min(box.bottom, max(at_left, at_right))
        if bottom - top > 1:
            yield level - rise * top, top, level - rise * bottom, bottom


def _dashes(box: Box, across: float, down: float, half: float) -> Iterator[Stroke]:
    """Yield short level strokes on a grid of which every other row is moved by half a step; whole ones only."""
    for row in range(math.ceil((box.top + 2) / down), math.floor((box.bottom - 2) / down) + 1):
        offset = across / 2 if row % 2 else 0.0
        first = math.ceil((box.left + half + 1 - offset) / across)
        last = math.floor((box.right - half - 1 - offset) / across)
        for column in range(first, last + 1):
            x = offset + column * across
            yield x - half, row * down, x + half, row * down


def _glints(box: Box) -> Iterator[Stroke]:
    """Yield groups of three short slanted strokes, as a pane is marked; whole groups only."""
    group = ((0.0, 14.0), (6.0, 8.0), (-6.0, 8.0))
    across, down, half_width, half_height = 52.0, 44.0, 10.0, 8.0
    for row in range(math.ceil((box.top + half_height) / down), math.floor((box.bottom - half_height) / down) + 1):
        offset = across / 2 if row % 2 else 0.0
        first = math.ceil((box.left + half_width - offset) / across)
        last = math.floor((box.right - half_width - offset) / across)
        for column in range(first, last + 1):
            x, y = offset + column * across, row * down
            for shift, length in group:
                half = length / 2 / math.sqrt(2)
                yield x + shift - half, y + half, x + shift + half, y - half
