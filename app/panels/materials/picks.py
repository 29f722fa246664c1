"""What is chosen to be looked at: materials of the job by name, entries of the library. No toolkit."""

from collections.abc import Iterable
from dataclasses import dataclass

from app.series.material_curves import Specimen
from stackcore.job import Job
from stackcore.media.library import LibraryEntry


@dataclass(frozen=True, slots=True)
class Pick:
    """One material chosen: the name of one of the job, or an entry of the library."""

    name: str = ""
    entry: LibraryEntry | None = None


def specimens_of(job: Job, picks: Iterable[Pick]) -> tuple[Specimen, ...]:
    """Return what is chosen as it is now, each once; a material that the job no longer has is left out."""
    found: dict[Pick, Specimen] = {}
    for pick in picks:
        if pick.entry is not None:
            found[pick] = Specimen(pick.entry.label, pick.entry.medium)
        elif pick.name in job.media:
            record = job.record.material(pick.name)
            found[pick] = Specimen((record.label if record else "") or pick.name, job.media[pick.name])
    return tuple(found.values())
