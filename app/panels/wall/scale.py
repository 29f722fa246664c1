"""The scale of the drawing: thickness in m -> width in px, so that nanometres and a hand's breadth show together.

Width = minimum + gain · (thickness / reference) ** exponent. While the thickest layer is no more than `SPREAD`
times the thinnest, the exponent is 1 and the drawing is true to scale but for the minimum; beyond that, the
exponent falls until the thickest is drawn `SPREAD` times as wide as the thinnest. A power has an exact inverse, is
smooth, and keeps the order; a thickness of 0 is drawn `minimum` wide, so that it can be caught and pulled open.
"""

import math
from collections.abc import Sequence
from dataclasses import dataclass
from typing import Final

SPREAD: Final = 6.0
"""Largest ratio of the widths drawn, the minimum apart."""
SMALLEST_WIDTH: Final = 12.0
"""Width of a layer of thickness 0 where there is room, in px."""
OPEN_THICKNESS: Final = 1e-3
"""Thickness in m that a layer of thickness 0 gains when it is pulled open by `OPEN_WIDTH` px in an empty wall."""
OPEN_WIDTH: Final = 40.0

LEAST_EXPONENT: Final = 0.03
"""Keeps the inverse finite for thicknesses no wall has."""
FINEST_STEP: Final = 1e-13
"""In m; nothing is drawn or made finer."""

# The fit leaves room, so that a layer can grow before everything has to be drawn anew.
_FILLED: Final = 0.9
_SLACK: Final = 1.001


@dataclass(frozen=True, slots=True)
class ThicknessScale:
    """The two ways between thickness and width.

    Parameters
    ----------
    reference
        Thickness in m that is drawn `minimum` + `gain` wide.
    minimum
        Width in px of a layer of thickness 0.
    gain
        Further width in px at the reference thickness.
    exponent
        More than 0 and at most 1; 1 is linear.

    Examples
    --------
    >>> scale = ThicknessScale(reference=4e-3, minimum=10.0, gain=100.0, exponent=0.5)
    >>> scale.width(1e-3), scale.thickness(60.0)
    (60.0, 0.001)
    """

    reference: float
    minimum: float
    gain: float
    exponent: float

    def width(self, thickness: float) -> float:
        """Return the width in px of a thickness in m."""
        return float(self.minimum + self.gain * (thickness / self.reference) ** self.exponent)

    def thickness(self, width: float) -> float:
        """Return the thickness in m drawn `width` px wide; 0 for every width up to the minimum."""
        opened = max(width - self.minimum, 0.0) / self.gain
        return float(self.reference * opened ** (1 / self.exponent))

    def rounded(self, width: float) -> float:
        """Return the thickness of a dragged width on a readable grid: the one just finer than a pixel here."""
        thickness = self.thickness(width)
        pixel = self.thickness(max(width, self.minimum) + 0.5) - self.thickness(width - 0.5)
        return snapped(thickness, max(readable_step(pixel), FINEST_STEP) if pixel > 0 else FINEST_STEP)


def fit_scale(thicknesses: Sequence[float], room: float, widest: float) -> ThicknessScale:
    """Return the scale that draws the layers as wide as `room` and `widest` (both px) allow.

    Parameters
    ----------
    thicknesses
        Of every layer, in m, 0 or more.
    room
        For all of them together.
    widest
        For the widest of them.
    """
    present = [thickness for thickness in thicknesses if thickness > 0]
    minimum = min(SMALLEST_WIDTH, room / (3 * max(len(thicknesses), 1)))
    if not present:
        return ThicknessScale(OPEN_THICKNESS, minimum, min(OPEN_WIDTH, room), 1.0)
    reference = max(present)
    spread = math.log(reference) - math.log(min(present))
    exponent = min(1.0, max(math.log(SPREAD) / spread, LEAST_EXPONENT)) if spread else 1.0
    total = sum((thickness / reference) ** exponent for thickness in present)
    left = room * _FILLED - minimum * len(thicknesses)
    gain = max(min(left / total, widest * _FILLED - minimum), minimum)
    return ThicknessScale(reference, minimum, gain, exponent)


def still_fits(scale: ThicknessScale, thicknesses: Sequence[float], room: float, widest: float) -> bool:
    """Return whether `scale` still draws the layers well, so that a change of thickness is seen as one of width.

    It does while nothing is too wide and the wall has not shrunk to less than half of what a new scale would give.
    """
    fitted = fit_scale(thicknesses, room, widest)
    if not math.isclose(scale.minimum, fitted.minimum) or not thicknesses:
        return False
    widths = [scale.width(thickness) for thickness in thicknesses]
    new_widths = [fitted.width(thickness) for thickness in thicknesses]
    largest_allowed = max(widest, *new_widths) * _SLACK
    total_allowed = max(room, sum(new_widths)) * _SLACK
    too_wide = max(widths) > largest_allowed or sum(widths) > total_allowed
    return not too_wide and sum(widths) > sum(new_widths) / 2


def readable_step(size: float) -> float:
    """Return the largest of 1, 2, 5 times a power of ten that is no more than `size`, which is > 0.

    Examples
    --------
    >>> readable_step(0.034e-3), readable_step(0.0046)
    (2e-05, 0.002)
    """
    decade = math.floor(math.log10(size))
    for exponent in (decade + 1, decade, decade - 1):
        for digit in (5, 2, 1):
            step = float(f"{digit}e{exponent}")
            if step <= size:
                return step
    return size


def snapped(thickness: float, step: float) -> float:
    """Return the multiple of `step` nearest to a thickness, as the decimal it reads as."""
    decimals = 1 - math.floor(math.log10(step))
    return round(round(thickness / step) * step, decimals)


def nudge(thickness: float, steps: float, idle: float = 1e-4) -> float:
    """Return a thickness moved by readable steps: units of its second digit, of which tenths may be asked for.

    Parameters
    ----------
    thickness
        In m.
    steps
        How many, negative for thinner; 0.1 is a tenth of a step. The result is never below 0.
    idle
        The step in m for a thickness of 0.

    Examples
    --------
    >>> nudge(9.86e-3, 1), nudge(9.86e-3, -0.1), nudge(200e-3, 1)
    (0.00996, 0.00985, 0.21)
    """
    decade = math.floor(math.log10(thickness) + 1e-12) if thickness > 0 else math.log10(idle) + 1
    exponent = round(decade) - 1
    if steps < 0 and thickness > 0 and math.isclose(thickness, 10.0 ** (exponent + 1)):
        exponent -= 1  # from 1.0 mm the step down is the one that leads up to it: 0.99 mm
    step = float(f"1e{exponent}")
    return max(round(thickness + steps * step, 12 - exponent), 0.0)
