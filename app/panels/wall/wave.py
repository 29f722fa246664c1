"""What the wave does at the marker: frequency, angle, polarization, ways and powers as one value."""

import sys
from collections.abc import Sequence
from dataclasses import dataclass, replace

import numpy as np

from app.panels.wall.rays import Powers
from app.panels.wall.refraction import Directions, directions
from app.series.rows import sums_by_row
from app.series.texts import angle_text, frequency_text
from stackcore.polarizations import polarization as named
from stackcore.propagation.response import Response
from stackcore.stack import Stack


@dataclass(frozen=True, slots=True)
class Wave:
    """The wave that is drawn.

    Parameters
    ----------
    frequency, angle
        Of the marker, in Hz and rad.
    polarization
        Key of `stackcore.polarizations`.
    courses
        Where it goes in each medium of the stack that is drawn.
    powers
        What it carries; None while that is not known.
    stale
        Whether `powers` belong to an earlier job.
    """

    frequency: float
    angle: float
    polarization: str
    courses: Directions
    powers: Powers | None = None
    stale: bool = False

    @property
    def circumstances(self) -> str:
        """Frequency, angle and polarization in words."""
        return f"{frequency_text(self.frequency)}, {angle_text(self.angle)}, {named(self.polarization).label}"


def wave_in(
    stack: Stack,
    frequency: float,
    angle: float,
    polarization: str,
    response: Response | None = None,
    *,
    stale: bool = False,
    rows: Sequence[int] | None = None,
    count: int = 0,
) -> Wave:
    """Return the wave in `stack`, with the powers of a response at one point when it has as many elements.

    With `rows`, the row that each element stands for, everything is told for each of `count` rows: a row that is
    repeated has the way of its first element and the losses of all, one that is left out has neither.
    """
    powers = None
    if response is not None and len(response.stack.elements) == len(stack.elements):
        powers = powers_of(response, polarization)
    courses = directions(stack, frequency, angle)
    if rows is not None:
        firsts = [rows.index(row) if row in rows else None for row in range(count)]
        ways = tuple(courses.elements[place] if place is not None else None for place in firsts)
        courses = replace(courses, elements=ways)
        if powers is not None:
            powers = replace(powers, absorbed=sums_by_row(rows, powers.absorbed, count))
    return Wave(frequency, angle, polarization, courses, powers, stale)


def powers_of(response: Response, polarization: str) -> Powers:
    """Return the powers at the first frequency and angle of a response.

    A transmittance too small for a double, as of a thick metal sheet, is not 0: it becomes the smallest one.
    """
    shares = np.array(named(polarization).power_shares)
    transmittance = float(shares @ response.transmittance[0, 0])
    if transmittance == 0 and np.isfinite(response.insertion_loss_dB[0, 0, shares > 0]).any():
        transmittance = sys.float_info.min
    return Powers(
        float(shares @ response.reflectance[0, 0]),
        transmittance,
        tuple(float(share) for share in shares @ response.element_absorptance[0, 0]),
    )
