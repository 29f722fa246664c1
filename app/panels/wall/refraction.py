"""Where the wave goes in each medium: the direction of the phase normal.

The tangential wave number s = √(ε₀μ₀) sin θ (relative, of the front half-space) is the same in every layer, so the
planes of equal phase in a medium with normal wave number q are tilted by ψ with tan ψ = s / Re q. Where q is
imaginary the wave only decays: there is no direction, and behind a lossless wall all power is reflected.
Source: M. Born and E. Wolf, Principles of Optics, 7th edition (1999), sections 1.5.4 and 14.2.
"""

import cmath
import math
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.media.base import AbstractMedium
from stackcore.stack import Layer, PerfectConductor, Stack

_DECAYING: Final = 20.0
"""A wave whose amplitude falls this much faster than its phase turns is drawn as one that only decays."""


@dataclass(frozen=True, slots=True)
class Direction:
    """Angle of the phase normal in rad, negative where refraction is, and whether the wave only decays there.

    At the critical angle itself the wave runs along the face; that counts as decaying too: it leads nowhere.
    """

    angle: float
    decays: bool = False


@dataclass(frozen=True, slots=True)
class Directions:
    """The directions in the front half-space, in each element (None for a sheet) and behind (None for metal)."""

    front: Direction
    elements: tuple[Direction | None, ...]
    back: Direction | None


def directions(stack: Stack, frequency: float, angle: float) -> Directions:
    """Return where the wave goes at `frequency` (Hz) for the angle of incidence `angle` (rad).

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> wall = Stack((Layer(ConstantMedium(4.0), 1e-3),))
    >>> round(math.degrees(directions(wall, 1e10, math.radians(30)).elements[0].angle), 2)
    14.48
    """
    front = _product(stack.front, frequency).real
    elements = tuple(
        _direction(element.medium, frequency, front, angle) if isinstance(element, Layer) else None
        for element in stack.elements
    )
    behind = stack.back
    back = None if isinstance(behind, PerfectConductor) else _direction(behind, frequency, front, angle)
    return Directions(Direction(angle), elements, back)


def _product(medium: AbstractMedium, frequency: float) -> complex:
    values = medium.evaluate(np.array(frequency))
    return complex(values.permittivity) * complex(values.permeability)


def _direction(medium: AbstractMedium, frequency: float, front: float, angle: float) -> Direction:
    values = medium.evaluate(np.array(frequency))
    permittivity, permeability = complex(values.permittivity), complex(values.permeability)
    # Not εμ − sin²: the cosine keeps the digits near grazing.
    square = (permittivity * permeability - front) + front * math.cos(angle) ** 2
    normal = cmath.sqrt(square)
    if normal.imag > 0:
        normal = -normal
    if permittivity.real < 0 and permeability.real < 0:
        normal = complex(-abs(normal.real), normal.imag)
    tangential = math.sqrt(front) * math.sin(angle)
    tilt = math.copysign(math.atan2(tangential, abs(normal.real)), normal.real)
    return Direction(tilt, decays=normal == 0 or abs(normal.imag) > _DECAYING * abs(normal.real))
