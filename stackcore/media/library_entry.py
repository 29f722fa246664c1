"""Entries of the material library, and how one is made of others."""

import math
from collections.abc import Callable
from dataclasses import dataclass
from typing import Final

from stackcore.errors import Fault, LibraryError
from stackcore.media.base import AbstractMedium, FrequencyRange, Provenance
from stackcore.media.models import Constants, Model
from stackcore.units import Measure

EVERYWHERE: Final = FrequencyRange(0.0, math.inf)
"""The range of an entry that has no limit of its own."""

_MOST_NESTED: Final = 8


@dataclass(frozen=True, slots=True)
class EntryState:
    """A named state of an entry: the constants that differ in it, where they come from, and what else to know."""

    name: str
    constants: Constants
    source: str = ""
    note: str = ""


@dataclass(frozen=True, slots=True)
class Facts:
    """What is known of an entry beside its constants."""

    density: Measure | None = None
    ply_thickness: Measure | None = None
    states: tuple[EntryState, ...] = ()


NO_FACTS: Final = Facts()
"""Of an entry whose source gives none."""


@dataclass(frozen=True, slots=True)
class LibraryEntry:
    """One material of the library.

    Parameters
    ----------
    key
        ``family/name``, what a job file refers to.
    label
        Name for people.
    family
        Key of the family, the part of `key` before the slash.
    model
        Key of `stackcore.media.models.MODELS`.
    constants
        As given, named as in a job file: relative constants complex, a loss tangent as a number, quantities with
        a unit as `Measure`.
    valid_range, provenance
        See `stackcore.media.base`; `medium` carries the same.
    medium
        Ready for a layer.
    also
        Further words it can be found by.
    own
        Whether it comes from the user's folder.
    shadows
        Whether it stands in the place of an entry that came with the program.
    facts
        Density, ply thickness and named states.
    """

    key: str
    label: str
    family: str
    model: str
    constants: Constants
    valid_range: FrequencyRange
    provenance: Provenance
    medium: AbstractMedium
    also: tuple[str, ...] = ()
    own: bool = False
    shadows: bool = False
    facts: Facts = NO_FACTS

    @property
    def name(self) -> str:
        """Part of `key` after the slash."""
        return self.key.partition("/")[2]

    @property
    def density(self) -> Measure | None:
        """Mass by volume, or None where the source gives none."""
        return self.facts.density

    @property
    def ply_thickness(self) -> Measure | None:
        """Of one cured ply, for what is built up of plies."""
        return self.facts.ply_thickness

    @property
    def states(self) -> tuple[EntryState, ...]:
        """Named states in which constants differ."""
        return self.facts.states


@dataclass(frozen=True, slots=True)
class Family:
    """The entries of one file, in its order, and what is wrong with the others."""

    key: str
    label: str
    note: str
    entries: tuple[LibraryEntry, ...]
    faults: tuple[Fault, ...]


@dataclass(frozen=True, slots=True)
class Draft:
    """An entry as it stands in its file, checked but for what it is made of.

    Parameters
    ----------
    place
        Where it stands, for faults: ``metals.toml: copper``.
    key, label, model, constants, valid_range, provenance, also
        As of `LibraryEntry`; without a range it follows from other entries.
    """

    place: str
    key: str
    label: str
    model: Model
    constants: Constants
    valid_range: FrequencyRange | None
    provenance: Provenance
    also: tuple[str, ...]
    facts: Facts = NO_FACTS

    @property
    def name(self) -> str:
        """Part of `key` after the slash."""
        return self.key.partition("/")[2]

    @property
    def used(self) -> tuple[tuple[str, str], ...]:
        """Place and key of every entry it is made of."""
        return self.model.references(self.constants)

    def entry(self, media: dict[str, AbstractMedium], *, own: bool = False, shadows: bool = False) -> LibraryEntry:
        """Return the entry, given the media that it is made of.

        Raises
        ------
        LibraryError
            When its constants make no passive medium.
        """
        try:
            medium = self.model.build(self.constants, self.valid_range, self.provenance, media or None)
        except ValueError as error:
            raise LibraryError(self.model.located(error, self.place)) from None
        known = self.valid_range or medium.valid_range or EVERYWHERE
        family, values = self.key.partition("/")[0], self.constants
        return LibraryEntry(
            self.key,
            self.label,
            family,
            self.model.name,
            values,
            known,
            self.provenance,
            medium,
            self.also,
            own,
            shadows,
            self.facts,
        )


@dataclass(frozen=True, slots=True)
class FamilyFile:
    """What stands in one file, and what is wrong with the rest of it."""

    key: str
    label: str
    note: str
    drafts: tuple[Draft, ...]
    faults: tuple[Fault, ...]


def media_of(
    draft: Draft, find: Callable[[str], Draft | None], trail: tuple[str, ...] = ()
) -> dict[str, AbstractMedium]:
    """Return the media of all entries that `draft` is made of, which `find` finds by their keys.

    Raises
    ------
    LibraryError
        For a key that is not found, and for an entry that is made of itself.
    """
    media: dict[str, AbstractMedium] = {}
    trail = (*trail, draft.key)
    for place, key in draft.used:
        inner = find(key)
        where = f"{draft.place}.{place}"
        if inner is None:
            raise LibraryError([Fault(where, f"there is no entry {key!r}", "family/name of an entry")])
        if key in trail or len(trail) > _MOST_NESTED:
            ring = " → ".join((*trail, key))
            raise LibraryError([Fault(where, f"{ring!r} does not end", "an entry that is not made of this one")])
        media[key] = inner.entry(media_of(inner, find, trail)).medium
    return media
