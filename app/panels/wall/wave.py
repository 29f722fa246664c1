"""What the wave does at the marker: frequency, angle, polarization, ways and powers as one value."""

import math
import sys
from dataclasses import dataclass

from app.panels.wall.rays import Powers
from app.panels.wall.refraction import Directions, directions
from app.series.texts import angle_text, frequency_text
from stackcore.conventions import POLARIZATIONS
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
        ``TE`` or ``TM``.
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
        return f"{frequency_text(self.frequency)}, {angle_text(self.angle)}, {self.polarization}"


def wave_in(
    stack: Stack,
    frequency: float,
    angle: float,
    polarization: str,
    response: Response | None = None,
    *,
    stale: bool = False,
) -> Wave:
    """Return the wave in `stack`, with the powers of a response at one point when it has as many elements."""
    powers = None
    if response is not None and len(response.stack.elements) == len(stack.elements):
        powers = powers_of(response, polarization)
    return Wave(frequency, angle, polarization, directions(stack, frequency, angle), powers, stale)


def powers_of(response: Response, polarization: str) -> Powers:
    """Return the powers at the first frequency and angle of a response.

    A transmittance too small for a double, as of a thick metal sheet, is not 0: it becomes the smallest one.
    """
    point = (0, 0, POLARIZATIONS.index(polarization))
    transmittance = float(response.transmittance[point])
    if transmittance == 0 and math.isfinite(response.insertion_loss_dB[point]):
        transmittance = sys.float_info.min
    return Powers(
        float(response.reflectance[point]),
        transmittance,
        tuple(float(share) for share in response.element_absorptance[point]),
    )
