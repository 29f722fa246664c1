"""A stack: layers and sheets between two half-spaces, as frozen values in SI units."""

import math
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.errors import StackError
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM
from stackcore.sheets.base import AbstractSheet


class PerfectConductor:
    """The back that reflects everything; there is one of it, `METAL`."""

    __slots__ = ()

    def __repr__(self) -> str:
        return "METAL"


METAL: Final = PerfectConductor()
"""A perfect conductor as the back half-space."""


@dataclass(frozen=True, slots=True)
class Layer:
    """A flat, homogeneous layer.

    Parameters
    ----------
    medium
        What it is made of.
    thickness
        In m, 0 or more and finite. A layer of thickness 0 changes nothing.

    Raises
    ------
    StackError
        For a thickness that is negative or not finite.
    """

    medium: AbstractMedium
    thickness: float

    def __post_init__(self) -> None:
        if not (np.isfinite(self.thickness) and self.thickness >= 0):
            raise StackError(f"thickness {self.thickness} m must be 0 or more; for example 0.002")


@dataclass(frozen=True, slots=True)
class SheetPlacement:
    """An impedance sheet at its place between two layers."""

    sheet: AbstractSheet


Element = Layer | SheetPlacement


@dataclass(frozen=True, slots=True)
class Stack:
    """Elements from front to back between a front and a back half-space.

    Parameters
    ----------
    elements
        In the order the wave meets them.
    front
        Medium of the half-space the wave comes from; it must be lossless, which `solve` checks at the
        frequencies asked for.
    back
        Medium of the half-space behind, or `METAL`.
    name
        Shown in tables and exports.

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> Stack((Layer(ConstantMedium(4.0), 7.5e-3),)).thickness
    0.0075
    """

    elements: tuple[Element, ...] = ()
    front: AbstractMedium = VACUUM
    back: AbstractMedium | PerfectConductor = VACUUM
    name: str = ""

    @property
    def thickness(self) -> float:
        """Total thickness in m."""
        return math.fsum(element.thickness for element in self.elements if isinstance(element, Layer))
