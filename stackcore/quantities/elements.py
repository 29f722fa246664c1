"""The power that one element turns into heat: a quantity that needs to be told which element."""

from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.polarizations import Polarization
from stackcore.propagation import Response
from stackcore.quantities.amplitudes import power_mean
from stackcore.quantities.quantity import Quantity

PREFIX: Final = "element_absorptance"


@dataclass(frozen=True, slots=True)
class ElementAbsorptance:
    """The absorptance of one element, or of several together, such as all repeats of one row.

    Parameters
    ----------
    rows
        Places of the elements in `Stack.elements`, from 0.

    Examples
    --------
    >>> ElementAbsorptance(2).quantity("skin").title
    'Absorptance of skin'
    >>> element_absorptance("element_absorptance:0,3") == ElementAbsorptance(0, 3)
    True
    """

    rows: tuple[int, ...]

    def __init__(self, *rows: int) -> None:
        object.__setattr__(self, "rows", rows)

    @property
    def name(self) -> str:
        """The name of its quantity: ``element_absorptance:2``, or ``element_absorptance:0,3`` for a sum."""
        return f"{PREFIX}:{','.join(map(str, self.rows))}"

    def values(self, response: Response) -> FloatArray:
        """Return the part of the incident power lost there, (F, A, 2); NaN for an element the stack has not."""
        parts = response.element_absorptance
        if not all(0 <= row < parts.shape[-1] for row in self.rows):
            return np.full(parts.shape[:-1], np.nan)
        total: FloatArray = parts[..., list(self.rows)].sum(axis=-1)
        return total

    def quantity(self, element: str = "") -> Quantity:
        """Return its row of the table, with `element` as the name of the element in the label."""
        number = ", ".join(str(row + 1) for row in self.rows)

        def mixed(response: Response, polarization: Polarization) -> FloatArray:
            return power_mean(self.values(response), polarization)

        return Quantity(
            self.name,
            f"Absorptance of {element or f'element {number}'}",
            "Aᵢ",
            "",
            "Part of the incident power that turns into heat in one element of the stack.",
            "A fraction from 0 to 1, of power; over all elements these add up to A.",
            self.values,
            mixed,
            "Power",
            needs=("element_absorptance",),
        )


def element_absorptance(name: str) -> ElementAbsorptance | None:
    """Return what ``element_absorptance:2`` names, or None for another text."""
    head, colon, rest = name.partition(":")
    rows = rest.split(",")
    if head != PREFIX or not colon or not all(row.isascii() and row.isdigit() for row in rows):
        return None
    return ElementAbsorptance(*map(int, rows))
