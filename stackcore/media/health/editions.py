"""The same material in two editions of a source, whose figures differ where they are used."""

import re
from collections.abc import Iterable, Iterator
from typing import TYPE_CHECKING, Final

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.health.findings import Finding
from stackcore.media.health.words import hertz, percent

if TYPE_CHECKING:
    from stackcore.media.library_entry import LibraryEntry

_EDITION: Final = re.compile(r"(?P<stem>.+-p\d+)-(?P<edition>\d+)")

LEAST: Final = 0.01
"""Share of the larger value by which two editions must differ to be told apart."""


def edition_findings(
    entry: "str | LibraryEntry",
    frequencies: FloatArray | None = None,
    among: "Iterable[LibraryEntry] | None" = None,
) -> Iterator[Finding]:
    """Yield a note for each other edition of a library entry that says something else in the sweep.

    Parameters
    ----------
    entry
        The entry, or its key ``family/name``; a name such as ``glass-p2040-3`` says its edition last.
    frequencies
        Of the sweep in Hz; None looks at the range that both editions share.
    among
        Entries to look through; None takes its family in the library of the program and the user.

    Examples
    --------
    >>> found = next(edition_findings("building/glass-p2040-3", np.array([28e9])))
    >>> found.topic, "glass-p2040-1" in found.reason
    ('edition', True)
    """
    family, _, name = (entry if isinstance(entry, str) else entry.key).partition("/")
    match = _EDITION.fullmatch(name)
    if match is None:
        return
    entries = _family(family) if among is None else tuple(among)
    own = next((one for one in entries if one.name == name), None) if isinstance(entry, str) else entry
    for other in entries:
        same = _EDITION.fullmatch(other.name)
        if own is not None and same is not None and other.name != name and same["stem"] == match["stem"]:
            finding = _difference(own, other, frequencies)
            if finding is not None:
                yield finding


def _family(key: str) -> "tuple[LibraryEntry, ...]":
    """Return the entries of a family of the library; none where there is no such family."""
    from stackcore.media.library import read_library

    library = read_library()
    return library.family(key).entries if key in library.families() else ()


def _difference(own: "LibraryEntry", other: "LibraryEntry", frequencies: FloatArray | None) -> Finding | None:
    """Return where two entries differ most, or None when they agree there."""
    lowest = max(own.valid_range.lowest, other.valid_range.lowest)
    highest = min(own.valid_range.highest, other.valid_range.highest)
    if not 0 < lowest <= highest:
        return None
    grid = _shared(lowest, highest) if frequencies is None else np.asarray(frequencies)
    grid = grid[(grid >= lowest) & (grid <= highest)]
    if not grid.size:
        return None
    ours, theirs = (np.asarray(entry.medium.evaluate(grid).permittivity) for entry in (own, other))
    parts = {"ε′": _apart(ours.real, theirs.real), "ε″": _apart(ours.imag, theirs.imag)}
    part = max(parts, key=lambda name: float(parts[name].max()))
    place = int(np.argmax(parts[part]))
    size = float(parts[part][place])
    if not size > LEAST:
        return None
    told = ", ".join(
        f"{value.real:.4g} − j{0.0 - value.imag:.3g} in {entry.name}"
        for value, entry in ((complex(ours[place]), own), (complex(theirs[place]), other))
    )
    return Finding(
        "note",
        "edition",
        "library",
        f"editions differ: {part} by {percent(size)} at {hertz(float(grid[place]))} ({told})",
        "name the edition with every figure, and do not mix the two",
    )


def _shared(lowest: float, highest: float) -> FloatArray:
    """Return frequencies over a finite range; the ends exactly."""
    if not np.isfinite(highest):
        return np.array([max(lowest, 1e10)])
    grid: FloatArray = np.geomspace(lowest, highest, 41)
    grid[0], grid[-1] = lowest, highest
    return grid


def _apart(ours: FloatArray, theirs: FloatArray) -> FloatArray:
    """Return the difference as a share of the larger; 0 where both are 0, as in two editions without loss."""
    larger = np.maximum(np.abs(ours), np.abs(theirs))
    share: FloatArray = np.abs(theirs - ours) / np.where(larger > 0, larger, 1.0)
    return share
