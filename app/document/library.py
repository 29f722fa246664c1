"""Materials of a job that come from the library."""

from collections.abc import Iterable
from dataclasses import replace
from typing import Final

from stackcore.errors import LibraryError
from stackcore.job.records import JobRecord, MaterialRecord
from stackcore.media.library import LibraryEntry, library_entry
from stackcore.units import Measure

ALWAYS_DEFINED: Final = ("air", "vacuum")
"""Materials every job has without saying so."""

PERFECT_METAL: Final = "metal"
"""Name of the perfect conductor; a back half-space only."""


def record_of_entry(key: str, taken: Iterable[str]) -> MaterialRecord:
    """Return the record of a library entry, its values beside the reference, under a name not in `taken`.

    Raises LibraryError, with the nearest match, when there is no such entry.
    """
    entry = library_entry(key)
    name = free_name(entry.name, (*taken, *ALWAYS_DEFINED, PERFECT_METAL))
    return with_values(MaterialRecord(name, label=entry.label, library=key), entry)


def with_values(record: MaterialRecord, entry: LibraryEntry) -> MaterialRecord:
    """Return `record` with the model, the constants and the source of `entry`."""
    constants = dict(entry.constants)
    relative = {
        name: complex(value)
        for name in ("permittivity", "permeability")
        if (value := constants.get(name)) is not None and not isinstance(value, Measure)
    }
    tangent, conductivity = constants.get("loss_tangent"), constants.get("conductivity")
    return replace(
        record,
        label=record.label or entry.label,
        model=entry.model,
        permittivity=relative.get("permittivity"),
        permeability=relative.get("permeability"),
        loss_tangent=tangent if isinstance(tangent, float) else None,
        conductivity=conductivity if isinstance(conductivity, Measure) else None,
        source=record.source or entry.provenance.source,
    )


def with_material(record: JobRecord, given: str) -> tuple[JobRecord, str]:
    """Return the job and the name in it of the material `given`.

    `given` is tried as a name, as a label (upper and lower case the same), as the key of a library entry the job
    already uses, and as a key of the library, whose entry is then added. What is none of these comes back as it
    is: the job that takes it will say what is wrong.
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
