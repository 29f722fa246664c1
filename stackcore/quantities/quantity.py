"""What a row of the table of quantities is."""

from collections.abc import Callable
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.polarizations import TE, TM, Polarization
from stackcore.propagation import Response

ForMixed = Callable[[Response, Polarization], FloatArray]
"""From a response and a polarization with both a TE and a TM part to an (F, A) array."""


@dataclass(frozen=True, slots=True)
class Quantity:
    """One quantity of a response.

    Parameters
    ----------
    name
        Name of the CSV column, of the attribute of `Response` where it is one, and in what is saved of a view.
    label
        Words for menus and axes.
    symbol
        The letter the trade uses.
    unit
        ``dB``, ``deg``, ``s``, ``ohm``, or empty for a plain number such as a fraction of the incident power.
    definition
        One sentence that says what the number is.
    sign
        One sentence that says which sign or direction it has and what its reference is.
    values
        From a response to an (F, A, 2) array for TE and TM.
    mixed
        From a response to an (F, A) array for a polarization that has a TE and a TM part.
    group
        Heading under which menus and the help list it.
    source
        Where the definition stands, or empty for plain physics.
    exported
        Whether it is a column of the CSV; those columns are fixed.
    needs_both
        Whether it says something only of a wave that has a TE and a TM part.
    needs
        The attributes of `Response` it takes long for when they are not worked out yet.
    """

    name: str
    label: str
    symbol: str
    unit: str
    definition: str
    sign: str
    values: Callable[[Response], FloatArray]
    mixed: ForMixed
    group: str
    source: str = ""
    exported: bool = False
    needs_both: bool = False
    needs: tuple[str, ...] = ()

    @property
    def title(self) -> str:
        """Label with unit, for an axis: ``Insertion loss, dB``."""
        return f"{self.label}, {self.unit}" if self.unit else self.label

    def ready(self, response: Response) -> bool:
        """Return whether the values can be had without solving anything more."""
        return all(response.knows(name) for name in self.needs)

    def of(self, response: Response, polarization: Polarization) -> FloatArray:
        """Return the quantity for an incident wave of `polarization`, (F, A).

        NaN stands where there is no wave that could have it, such as the axial ratio behind a metal plate.

        Examples
        --------
        >>> from stackcore import CIRCULAR, QUANTITIES, ConstantMedium, Layer, Stack, solve
        >>> wall = solve(Stack((Layer(ConstantMedium(4.0), 2e-3),)), 10e9, 0.5)
        >>> te, tm = wall.transmittance[0, 0]
        >>> bool(QUANTITIES["transmittance"].of(wall, CIRCULAR)[0, 0] == (te + tm) / 2)
        True
        """
        if polarization.single is not None:
            return self.values(response)[:, :, polarization.single]
        return self.mixed(response, polarization)


def by_parts(of: ForMixed) -> Callable[[Response], FloatArray]:
    """Return the function for TE and TM, (F, A, 2), made from one that takes any polarization."""
    return lambda response: np.stack([of(response, TE), of(response, TM)], axis=-1)
