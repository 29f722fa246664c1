"""Angles as a person writes them in the quiet line: a list, or a range with a number of points. No toolkit."""

import re
from dataclasses import dataclass
from typing import Final

from app.document.reading import list_text, unit_of
from stackcore.job.records import AngleGrid
from stackcore.units import Dimension, Measure

_RANGE: Final = re.compile(
    r"(?:from\s+)?(?P<start>.+?)\s*(?:to|…|\.\.+|–)\s*(?P<stop>.+?)"
    r"(?:\s*[,;]\s*|\s+in\s+)(?P<points>\d+)(?:\s*(?:points|point|angles|angle))?",
    re.IGNORECASE,
)
_PLAIN: Final = re.compile(r"(?P<number>\d+(?:\.\d+)?)\s*(?P<unit>\D+)")


@dataclass(frozen=True, slots=True)
class AngleRange:
    """An even sweep of angles as it was typed."""

    start: str
    stop: str
    points: int


def read_angle_range(text: str) -> AngleRange | None:
    """Return the range a text describes, or None when it is none (then it is a list).

    A start without a unit has the unit of the stop.

    Examples
    --------
    >>> read_angle_range("0 to 60 deg, 7 points")
    AngleRange(start='0 deg', stop='60 deg', points=7)
    >>> read_angle_range("0, 30, 45 deg") is None
    True
    """
    match = _RANGE.fullmatch(text.strip())
    if match is None:
        return None
    start, stop = match["start"].strip(), match["stop"].strip()
    unit = unit_of(stop, Dimension.ANGLE)
    both = [bare if re.search(r"[^\d.,\s+−-]", bare) else f"{bare} {unit}" for bare in (start, stop)]
    return AngleRange(both[0], both[1], int(match["points"]))


def angles_text(angle: AngleGrid | tuple[Measure, ...]) -> str:
    """Return the angles of a sweep in the shortest words that are read back as the same.

    Examples
    --------
    >>> angles_text((Measure(0.0, "0 deg"), Measure(0.5, "0.5 rad")))
    '0 deg; 0.5 rad'
    """
    if isinstance(angle, AngleGrid):
        return f"{angle.start.text} to {angle.stop.text}, {angle.points} points"
    found = [_PLAIN.fullmatch(measure.text.strip()) for measure in angle]
    units = {match["unit"].strip() for match in found if match is not None}
    if None in found or len(units) != 1:
        return list_text(angle)
    numbers = ", ".join(match["number"] for match in found if match is not None)
    return f"{numbers} {units.pop()}"
