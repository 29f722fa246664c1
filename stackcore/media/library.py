"""The material library: entries by key, by family and by words.

Family files are read when first asked for, so that opening a job with one library material reads one file.
A fault in one entry or one file leaves the rest usable; `Library.faults` tells them all. A user may have a folder
of files of the same form: its entries stand beside those of the program, or in their place where the key is the
same.
"""

import os
import sys
from functools import lru_cache
from pathlib import Path
from typing import TYPE_CHECKING, Final

from stackcore.errors import Fault, LibraryError, nearest
from stackcore.media.library_entry import Draft, Family, FamilyFile, LibraryEntry, media_of
from stackcore.media.library_file import parse_family

if TYPE_CHECKING:
    from importlib.resources.abc import Traversable

__all__ = [
    "Family",
    "Library",
    "LibraryEntry",
    "families",
    "forget_library",
    "library_entry",
    "materials_dir",
    "own_materials_dir",
    "read_library",
]

HOME_VARIABLE: Final = "SLABWRIGHT_HOME"
"""Environment variable with the folder that holds everything the user keeps; for tests and portable use."""


_parsed: Final = lru_cache(maxsize=256)(parse_family)


class Library:
    """The files ``*.toml`` of a folder, each a family, read when first needed.

    Parameters
    ----------
    folder
        Where the files are.
    own
        A folder of the user's own files, which need not exist.

    Raises
    ------
    LibraryError
        When `folder` cannot be listed. Faults inside the files are not raised here, see `faults`.

    Examples
    --------
    >>> read_library().entry("metals/copper").label
    'Copper'
    """

    def __init__(self, folder: "Traversable", own: Path | None = None) -> None:
        try:
            self._files = _toml_files(folder)
        except OSError as error:
            fault = Fault(str(folder), f"the material library cannot be listed: {error}", "a folder of TOML files")
            raise LibraryError([fault]) from error
        try:
            self._own = _toml_files(own) if own is not None and own.is_dir() else {}
            self._own_fault: tuple[Fault, ...] = ()
        except OSError as error:
            self._own = {}
            self._own_fault = (Fault(str(own), f"cannot be listed: {error}", "a folder of TOML files"),)
        self._families = tuple(sorted({*self._files, *self._own}))
        self._parsed: dict[tuple[str, bool], FamilyFile] = {}
        self._read: dict[str, Family] = {}

    def families(self) -> tuple[str, ...]:
        """Return the keys of all families in alphabetical order, without reading a file."""
        return self._families

    def family(self, key: str) -> Family:
        """Return one family with its entries; LibraryError when there is no such family."""
        if key not in self._families:
            known = f"one of {', '.join(self._families)}"
            raise LibraryError([Fault("", f"no family {key!r}{nearest(key, self._families)}", known)])
        if key not in self._read:
            self._read[key] = self._linked(key)
        return self._read[key]

    def _linked(self, key: str) -> Family:
        """Return the family with the user's entries in the place of, and behind, those of the program."""
        shipped, own = self._file(key, False), self._file(key, True)
        ours = {draft.name: draft for draft in own.drafts}
        names = {draft.name for draft in shipped.drafts}
        both = [(ours.get(draft.name, draft), draft.name in ours, True) for draft in shipped.drafts]
        both += [(draft, True, False) for draft in own.drafts if draft.name not in names]
        entries, faults = [], [*shipped.faults, *own.faults]
        for draft, mine, shadows in both:
            try:
                entries.append(draft.entry(media_of(draft, self.draft), own=mine, shadows=mine and shadows))
            except LibraryError as error:
                faults += error.faults
        head = shipped if key in self._files else own
        return Family(key, head.label, head.note, tuple(entries), tuple(faults))

    def draft(self, key: str) -> Draft | None:
        """Return what a file holds for the entry ``family/name``, the user's own first; None when none does."""
        family, _, name = key.partition("/")
        found = (*self._file(family, True).drafts, *self._file(family, False).drafts)
        return next((draft for draft in found if draft.name == name), None)

    def _file(self, key: str, own: bool) -> FamilyFile:
        """Return what stands in one file; nothing when there is none."""
        if (key, own) not in self._parsed:
            self._parsed[key, own] = self._parse(key, own)
        return self._parsed[key, own]

    def _parse(self, key: str, own: bool) -> FamilyFile:
        file = (self._own if own else self._files).get(key)
        if file is None:
            return FamilyFile(key, key, "", (), ())
        place = str(file) if own else f"{key}.toml"
        try:
            return _parsed(key, file.read_bytes(), place)
        except OSError as error:
            fault = Fault(place, f"cannot be read: {error}", "a readable file")
            return FamilyFile(key, key, "", (), (fault,))

    @property
    def entries(self) -> tuple[LibraryEntry, ...]:
        """All entries without a fault, family by family, each in the order of its file."""
        return tuple(entry for key in self._families for entry in self.family(key).entries)

    @property
    def faults(self) -> tuple[Fault, ...]:
        """Every fault of every file."""
        return (*self._own_fault, *(fault for key in self._families for fault in self.family(key).faults))

    def entry(self, key: str) -> LibraryEntry:
        """Return the entry ``family/name``.

        Raises
        ------
        LibraryError
            When there is none: with the faults of the entry or its file if that is why, else with the nearest
            match.
        """
        family, _, name = key.partition("/")
        if family in self._families:
            read = self.family(family)
            for entry in read.entries:
                if entry.name == name:
                    return entry
            places = (f"{family}.toml", str(self._own.get(family)))
            own = [
                fault
                for fault in read.faults
                if f"{fault.path}.".startswith(tuple(f"{place}: {name}." for place in places))
            ]
            whole = [fault for fault in read.faults if fault.path in places]
            if own or whole:
                raise LibraryError(own or whole)
        raise LibraryError([self._unknown(key)])

    def _unknown(self, key: str) -> Fault:
        known = [entry.key for entry in self.entries]
        name = key.rpartition("/")[2]
        same_name = [other for other in known if other.rpartition("/")[2] == name]
        hint = f", did you mean {same_name[0]!r}?" if same_name else nearest(key, known)
        allowed = f"family/name with a family of {', '.join(self._families)}"
        return Fault("", f"no material {key!r} in the library{hint}", allowed)

    def search(self, words: str) -> tuple[LibraryEntry, ...]:
        """Return the entries that hold every one of `words`: those called so, then by name and by text.

        Upper and lower case are the same; no words find everything. Names are the key, the label and the
        further words; the label of the family, the note and the source are looked through as well. Of entries
        with one of their names just as given, those with the shorter key come first: the plain material before
        its kinds.
        """
        wanted = words.casefold().split()
        called, by_name, by_text = [], [], []
        for entry in self.entries:
            names = " ".join((entry.key, entry.label, *entry.also)).casefold()
            family = self.family(entry.family).label
            text = f"{names} {family} {entry.provenance.note} {entry.provenance.source}".casefold()
            if wanted and " ".join(wanted) in (name.casefold() for name in (entry.name, entry.label, *entry.also)):
                called.append(entry)
            elif all(word in names for word in wanted):
                by_name.append(entry)
            elif all(word in text for word in wanted):
                by_text.append(entry)
        return (*sorted(called, key=lambda entry: len(entry.name)), *by_name, *by_text)


def materials_dir() -> "Traversable":
    """Return the folder of the library: inside the installed package, else beside it in a checkout."""
    # Imported here because the library is not needed at every start.
    from importlib.resources import files

    packaged = files("stackcore") / "_materials"
    return packaged if packaged.is_dir() else Path(__file__).resolve().parents[2] / "materials"


def own_materials_dir() -> Path:
    """Return the folder of the user's own library files; it need not exist.

    ``SLABWRIGHT_HOME/materials`` where that variable is set, else ``slabwright/materials`` in the folder where the
    system keeps a user's data.
    """
    if home := os.environ.get(HOME_VARIABLE):
        return Path(home) / "materials"
    if sys.platform == "win32":
        base = os.environ.get("APPDATA") or str(Path.home() / "AppData" / "Roaming")
    elif sys.platform == "darwin":
        base = str(Path.home() / "Library" / "Application Support")
    else:
        base = os.environ.get("XDG_DATA_HOME") or str(Path.home() / ".local" / "share")
    return Path(base) / "slabwright" / "materials"


def _toml_files(folder: "Traversable") -> "dict[str, Traversable]":
    files = {Path(file.name).stem: file for file in folder.iterdir() if file.name.endswith(".toml")}
    return dict(sorted(files.items()))


@lru_cache(maxsize=4)
def _library(own: Path) -> Library:
    return Library(materials_dir(), own)


def read_library() -> Library:
    """Return the library that comes with the program and the user's own; the same one until `forget_library`."""
    return _library(own_materials_dir())


def forget_library() -> None:
    """Read the files anew when the library is asked for next, as after one of them was written."""
    _library.cache_clear()


def library_entry(key: str) -> LibraryEntry:
    """Return the entry ``family/name``; `LibraryError` with the nearest match when there is none.

    Examples
    --------
    >>> library_entry("plastics/ptfe").model
    'constant'
    """
    return read_library().entry(key)


def families() -> tuple[str, ...]:
    """Return the keys of the library's families in alphabetical order."""
    return read_library().families()
