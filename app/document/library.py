"""Materials of a job that come from the library."""

from collections.abc import Iterable
from dataclasses import replace
from typing import Final

from stackcore.errors import LibraryError
from stackcore.job import checks, with_resolved_library
from stackcore.job.records import JobRecord, MaterialRecord, SweepRecord
from stackcore.media.library import library_entry

ALWAYS_DEFINED: Final = checks.ALWAYS_DEFINED
"""Materials every job has without saying so."""

PERFECT_METAL: Final = checks.METAL_NAME
"""Name of the perfect conductor; a back half-space only."""


def record_of_entry(key: str, taken: Iterable[str]) -> MaterialRecord:
    """Return the record of a library entry, its values beside the reference, under a name not in `taken`.

    Raises LibraryError, with the nearest match, when there is no such entry.
    """
    entry = library_entry(key)
    name = free_name(entry.name, (*taken, *ALWAYS_DEFINED, PERFECT_METAL))
    return pinned(MaterialRecord(name, label=entry.label, library=key))


def pinned(material: MaterialRecord) -> MaterialRecord:
    """Return `material` with model, constants and source written beside its reference into the library, if any.

    Raises LibraryError when the library has no such entry; a job that resolves has none of those.
    """
    alone = JobRecord("", (), SweepRecord((), ()), (material,))
    return with_resolved_library(alone).materials[0]


def with_material(record: JobRecord, given: str) -> tuple[JobRecord, str]:
    """Return the job and the name in it of the material `given`.

    `given` is tried as a name, as a label (upper and lower case the same), as the key of a library entry the
    job already uses, and as a key of the library, whose entry is then added. What is none of these comes back
    as it is: the job that takes it will say what is wrong.
    """
    given = given.strip()
    if given in ALWAYS_DEFINED or given == PERFECT_METAL or record.material(given) is not None:
        return record, given
    labelled = [known.name for known in record.materials if known.label.casefold() == given.casefold() != ""]
    used = [known.name for known in record.materials if known.library == given != ""]
    if len(labelled) == 1 or used:
        return record, (used or labelled)[0]
    try:
        added = record_of_entry(given, (known.name for known in record.materials))
    except LibraryError:
        return record, given
    return replace(record, materials=(*record.materials, added)), added.name


def free_name(wanted: str, taken: Iterable[str]) -> str:
    """Return `wanted`, or the first of ``wanted-2``, ``wanted-3``, ... that is not `taken`."""
    names = set(taken)
    number, name = 1, wanted
    while name in names:
        number += 1
        name = f"{wanted}-{number}"
    return name
