"""The one table of what can be plotted, read, limited or exported.

Curves, menus, axis titles, CSV columns, the command line and the help pages derive from it; a new quantity is one
more entry.
"""

from typing import Final

from stackcore.quantities.elements import ElementAbsorptance, element_absorptance
from stackcore.quantities.exported import EXPORTED
from stackcore.quantities.further import FURTHER
from stackcore.quantities.quantity import Quantity

QUANTITIES: Final[dict[str, Quantity]] = {quantity.name: quantity for quantity in (*EXPORTED, *FURTHER)}
"""Name -> quantity: first the columns of the CSV in their order, then the others by group."""

GROUPS: Final[tuple[str, ...]] = tuple(dict.fromkeys(quantity.group for quantity in QUANTITIES.values()))
"""Headings of the table in order."""


def quantity_named(name: str, element: str = "") -> Quantity:
    """Return the quantity called `name`, also one that needs an element, such as ``element_absorptance:2``.

    Parameters
    ----------
    name
        A key of `QUANTITIES`, or the name of an `ElementAbsorptance`.
    element
        What the label calls the element.

    Raises
    ------
    KeyError
        When there is no such quantity.

    Examples
    --------
    >>> quantity_named("element_absorptance:2").label
    'Absorptance of element 3'
    """
    parametrised = element_absorptance(name)
    return QUANTITIES[name] if parametrised is None else parametrised.quantity(element)


__all__ = ["GROUPS", "QUANTITIES", "ElementAbsorptance", "Quantity", "element_absorptance", "quantity_named"]
