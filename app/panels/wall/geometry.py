"""Points, boxes and strokes in pixels, y downward, without a toolkit."""

from collections.abc import Callable, Iterable
from dataclasses import dataclass

Point = tuple[float, float]
Stroke = tuple[float, float, float, float]
"""x and y of its beginning, x and y of its end."""


@dataclass(frozen=True, slots=True)
class Box:
    """An upright rectangle."""

    left: float
    top: float
    right: float
    bottom: float

    @property
    def width(self) -> float:
        """Extent in x."""
        return self.right - self.left

    @property
    def height(self) -> float:
        """Extent in y."""
        return self.bottom - self.top

    @property
    def middle(self) -> float:
        """The x half way between left and right."""
        return (self.left + self.right) / 2

    def overlaps(self, other: "Box") -> bool:
        """Return whether the two share more than an edge."""
        return (
            self.left < other.right
            and other.left < self.right
            and self.top < other.bottom
            and other.top < self.bottom
        )

    def grown(self, by: float) -> "Box":
        """Return the box with every side moved outward by `by`."""
        return Box(self.left - by, self.top - by, self.right + by, self.bottom + by)

    def moved(self, across: float, down: float) -> "Box":
        """Return the box moved to the right and down."""
        return Box(self.left + across, self.top + down, self.right + across, self.bottom + down)


def within_rows(outline: Iterable[Point], top: float, bottom: float) -> tuple[Point, ...]:
    """Return the part of a convex outline between two horizontal lines; empty when there is none.

    Each of the two edges cuts the outline in turn (I. Sutherland and G. Hodgman, "Reentrant polygon clipping",
    1974), so that nothing has to be clipped by the device: not every vector device can.
    """
    points = _cut(tuple(outline), top, lambda y: y >= top)
    return _cut(points, bottom, lambda y: y <= bottom)


def _cut(points: tuple[Point, ...], edge: float, inside: Callable[[float], bool]) -> tuple[Point, ...]:
    kept: list[Point] = []
    for index, (x, y) in enumerate(points):
        last_x, last_y = points[index - 1]
        if inside(y) != inside(last_y):
            kept.append((last_x + (x - last_x) * (edge - last_y) / (y - last_y), edge))
        if inside(y):
            kept.append((x, y))
    return tuple(kept)
