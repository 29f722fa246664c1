"""Angles and elements as a person reads them in the quiet line. No toolkit."""

import re
from typing import Final

from app.document.reading import list_text
from app.series.rows import places_of_row
from stackcore.job import Job
from stackcore.job.records import AngleGrid, LayerRecord
from stackcore.quantities import ElementAbsorptance
from stackcore.units import Measure

_PLAIN: Final = re.compile(r"(?P<number>\d+(?:\.\d+)?)\s*(?P<unit>\D+)")


def angles_text(angle: AngleGrid | tuple[Measure, ...]) -> str:
    """Return the angles of a sweep; a cell ``sweep.angle`` takes the text as it is.

    Examples
    --------
    >>> angles_text((Measure(0.0, "0 deg"), Measure(0.5235987755982988, "30 deg")))
    '0, 30 deg'
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


def element_offers(job: Job, stack: int) -> tuple[tuple[str, str], ...]:
    """Return for each element of a stack the name of its absorptance and its words: ``2  skin, 0.9 mm``."""
    record, offers = job.record, []
    for row, element in enumerate(record.stacks[stack].elements):
        places = places_of_row(job.rows[stack], row)
        if not places:
            continue
        words = f"{row + 1}  sheet"
        if isinstance(element, LayerRecord):
            material = record.material(element.material)
            label = material.label if material is not None and material.label else element.material
            words = f"{row + 1}  {label}, {element.thickness.text}"
        offers.append((ElementAbsorptance(*places).name, words))
    return tuple(offers)
