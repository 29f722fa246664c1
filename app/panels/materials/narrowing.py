"""Narrowing the library: by words, by family, by what the materials are at the marker. No toolkit."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Final, Literal

import numpy as np

from stackcore.errors import Fault, UnitError
from stackcore.media.library import Library, LibraryEntry
from stackcore.units import Dimension, parse_measure

Bound = Literal["lowest", "highest", "lossiest"]

BOUNDS: Final[dict[Bound, tuple[str, str]]] = {
    "lowest": ("ε′ from", "Least permittivity ε′ at the marker, for example 2."),
    "highest": ("to", "Largest permittivity ε′ at the marker, for example 4."),
    "lossiest": ("tan δ to", "Largest loss tangent at the marker, for example 0.01."),
}
"""Name of a bound -> words before its field, and what it means."""


@dataclass(frozen=True, slots=True)
class Wanted:
    """What is looked for.

    Parameters
    ----------
    words
        All of which an entry must hold.
    family
        Key of the family, or empty for all.
    lowest, highest
        Bounds of ε′ at the marker, or None.
    lossiest
        Largest loss tangent at the marker, or None; an entry whose ε′ is not above 0 has none and is left out.
    """

    words: str = ""
    family: str = ""
    lowest: float | None = None
    highest: float | None = None
    lossiest: float | None = None

    @property
    def by_values(self) -> bool:
        """Whether entries must be evaluated to be found."""
        return any(bound is not None for bound in (self.lowest, self.highest, self.lossiest))

    def fits(self, permittivity: complex) -> bool:
        """Return whether a material of this relative permittivity is within the bounds."""
        real, loss = permittivity.real, -permittivity.imag
        if self.lowest is not None and real < self.lowest:
            return False
        if self.highest is not None and real > self.highest:
            return False
        return self.lossiest is None or (real > 0 and loss <= self.lossiest * real)


class Values:
    """ε of library entries at one frequency, worked out when asked for and kept until the frequency changes."""

    def __init__(self) -> None:
        self._frequency = 0.0
        self._known: dict[str, complex] = {}

    def permittivity(self, entry: LibraryEntry, frequency: float) -> complex:
        """Return the relative permittivity of an entry at `frequency` in Hz."""
        if frequency != self._frequency:
            self._frequency = frequency
            self._known.clear()
        if entry.key not in self._known:
            value = entry.medium.evaluate(np.array([frequency])).permittivity
            self._known[entry.key] = complex(value[0])
        return self._known[entry.key]


def narrowed(
    library: Library, wanted: Wanted, permittivity: Callable[[LibraryEntry], complex]
) -> Sequence[LibraryEntry]:
    """Return the entries that fit, in the order of the library's search; they are evaluated only for bounds."""
    found: Sequence[LibraryEntry] = library.search(wanted.words)
    if wanted.family:
        found = [entry for entry in found if entry.family == wanted.family]
    if wanted.by_values:
        found = [entry for entry in found if wanted.fits(permittivity(entry))]
    return found


def read_bound(text: str) -> float | Fault | None:
    """Return the number of a bound, None for an empty text, or what is wrong with it.

    Examples
    --------
    >>> read_bound("2,5"), read_bound(" ")
    (2.5, None)
    """
    if not text.strip():
        return None
    try:
        return parse_measure(text.strip(), Dimension.NUMBER).value
    except UnitError as error:
        return Fault("", error.message, error.allowed)
