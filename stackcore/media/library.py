"""The material library: entries by key, by family and by words.

Family files are read when first asked for, so that opening a job with one library material reads one file.
A fault in one entry or one file leaves the rest usable; `Library.faults` tells them all.
"""

from functools import cache
from pathlib import Path
from typing import TYPE_CHECKING

from stackcore.errors import Fault, LibraryError, nearest
from stackcore.media.library_file import Family, LibraryEntry, read_family

if TYPE_CHECKING:
    from importlib.resources.abc import Traversable

__all__ = ["Family", "Library", "LibraryEntry", "families", "library_entry", "materials_dir", "read_library"]


class Library:
    """The files ``*.toml`` of a folder, each a family, read when first needed.

    Parameters
    ----------
    folder
        Where the files are.

    Raises
    ------
    LibraryError
        When the folder cannot be listed. Faults inside the files are not raised here, see `faults`.

    Examples
    --------
    >>> read_library().entry("metals/copper").label
    'Copper'
    """

    def __init__(self, folder: "Traversable") -> None:
        try:
            files = {Path(file.name).stem: file for file in folder.iterdir() if file.name.endswith(".toml")}
        except OSError as error:
            fault = Fault(str(folder), f"the material library cannot be listed: {error}", "a folder of TOML files")
            raise LibraryError([fault]) from error
        self._files = dict(sorted(files.items()))
        self._read: dict[str, Family] = {}

    def families(self) -> tuple[str, ...]:
        """Return the keys of all families in alphabetical order, without reading a file."""
        return tuple(self._files)

    def family(self, key: str) -> Family:
        """Return one family with its entries; LibraryError when there is no such family."""
        if key not in self._files:
            known = f"one of {', '.join(self._files)}"
            raise LibraryError([Fault("", f"no family {key!r}{nearest(key, self._files)}", known)])
        if key not in self._read:
            self._read[key] = self._read_file(key)
        return self._read[key]

    def _read_file(self, key: str) -> Family:
        try:
            content = self._files[key].read_bytes()
        except OSError as error:
            fault = Fault(f"{key}.toml", f"cannot be read: {error}", "a readable file")
            return Family(key, key, "", (), (fault,))
        return read_family(key, content)

    @property
    def entries(self) -> tuple[LibraryEntry, ...]:
        """All entries without a fault, family by family, each in the order of its file."""
        return tuple(entry for key in self._files for entry in self.family(key).entries)

    @property
    def faults(self) -> tuple[Fault, ...]:
        """Every fault of every file."""
        return tuple(fault for key in self._files for fault in self.family(key).faults)

    def entry(self, key: str) -> LibraryEntry:
        """Return the entry ``family/name``.

        Raises
        ------
        LibraryError
            When there is none: with the faults of the entry or its file if that is why, else with the nearest
            match.
        """
        family, _, name = key.partition("/")
        if family in self._files:
            read = self.family(family)
            for entry in read.entries:
                if entry.name == name:
                    return entry
            own = [fault for fault in read.faults if f"{fault.path}.".startswith(f"{family}.toml: {name}.")]
            whole = [fault for fault in read.faults if fault.path == f"{family}.toml"]
            if own or whole:
                raise LibraryError(own or whole)
        raise LibraryError([self._unknown(key)])

    def _unknown(self, key: str) -> Fault:
        known = [entry.key for entry in self.entries]
        name = key.rpartition("/")[2]
        same_name = [other for other in known if other.rpartition("/")[2] == name]
        hint = f", did you mean {same_name[0]!r}?" if same_name else nearest(key, known)
        allowed = f"family/name with a family of {', '.join(self._files)}"
        return Fault("", f"no material {key!r} in the library{hint}", allowed)

    def search(self, words: str) -> tuple[LibraryEntry, ...]:
        """Return the entries that hold every one of `words`, those that hold them in their names first.

        Upper and lower case are the same; no words find everything. Names are the key, the label and the
        further words; the label of the family, the note and the source are looked through as well.
        """
        wanted = words.casefold().split()
        by_name, by_text = [], []
        for entry in self.entries:
            names = " ".join((entry.key, entry.label, *entry.also)).casefold()
            family = self.family(entry.family).label
            text = f"{names} {family} {entry.provenance.note} {entry.provenance.source}".casefold()
            if all(word in names for word in wanted):
                by_name.append(entry)
            elif all(word in text for word in wanted):
                by_text.append(entry)
        return (*by_name, *by_text)


def materials_dir() -> "Traversable":
    """Return the folder of the library: inside the installed package, else beside it in a checkout."""
    # Imported here because the library is not needed at every start.
    from importlib.resources import files

    packaged = files("stackcore") / "_materials"
    return packaged if packaged.is_dir() else Path(__file__).resolve().parents[2] / "materials"


@cache
def read_library() -> Library:
    """Return the library that comes with the program; the same one at every call."""
    return Library(materials_dir())


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
