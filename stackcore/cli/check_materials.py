"""``slabwright materials --check``: the health of every material in a file."""

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from pathlib import Path
from typing import TYPE_CHECKING, Final

from stackcore.cli.output import unreadable
from stackcore.cli.telling import DONE, NO, tell
from stackcore.errors import Fault

if TYPE_CHECKING:
    from stackcore.arrays import FloatArray
    from stackcore.media.base import AbstractMedium
    from stackcore.media.library_entry import LibraryEntry

_LARGEST: Final = 64 * 2**20
"""Bytes of a file that is looked at at all."""


@dataclass(frozen=True, slots=True)
class Checked:
    """A material to be checked: its place in the file, its medium, and the library entry it is or came from.

    `among` are the entries to look for other editions in; None takes the library.
    """

    place: str
    medium: "AbstractMedium"
    entry: "str | LibraryEntry" = ""
    among: "tuple[LibraryEntry, ...] | None" = None


def check_file(path: str, frequencies: "FloatArray | None") -> int:
    """Print what speaks against each material of a file; return 0, 1 for an error, 2 for a file that is faulty.

    Parameters
    ----------
    path
        A job file (``.slabjob``, ``.json``), a library file (``.toml``), or a table of columns.
    frequencies
        What the materials are to serve, in Hz; None takes the sweep of a job, else each material's own range.
    """
    try:
        with Path(path).open("rb") as file:
            content = file.read(_LARGEST)
    except OSError as error:
        return tell([unreadable(path, error, Path(path).suffix, "a job file, a library file or a table")])
    readers: dict[str, Callable[[str, bytes], tuple[list[Checked], list[Fault], FloatArray | None]]]
    readers = {".slabjob": _of_job, ".json": _of_job, ".toml": _of_library}
    media, faults, sweep = readers.get(Path(path).suffix.casefold(), _of_columns)(path, content)
    status = DONE
    for checked in media:
        for line, is_error in _lines(checked, sweep if frequencies is None else frequencies):
            print(line)
            status = NO if is_error else status
    return tell(faults) if faults else status


def _lines(checked: Checked, frequencies: "FloatArray | None") -> Iterator[tuple[str, bool]]:
    """Yield each finding of a medium as a line, and whether it is an error."""
    from stackcore.media.health import check_medium, edition_findings

    findings = [*check_medium(checked.medium, frequencies)]
    findings += edition_findings(checked.entry, frequencies, checked.among) if checked.entry else ()
    for finding in findings:
        yield f"{checked.place}: {finding}", finding.severity == "error"
    if not findings:
        yield f"{checked.place}: nothing speaks against it", False


def _of_job(path: str, content: bytes) -> tuple[list[Checked], list[Fault], "FloatArray | None"]:
    from stackcore.job import Job, job_from_json

    job = Job(job_from_json(content))  # its faults are told by who called
    media = [
        Checked(f"materials.{material.name}", job.media[material.name], material.library)
        for material in job.materials
    ]
    return media, [], job.sweep.frequencies()


def _of_library(path: str, content: bytes) -> tuple[list[Checked], list[Fault], "FloatArray | None"]:
    from stackcore.errors import LibraryError
    from stackcore.media.library import read_library
    from stackcore.media.library_entry import media_of
    from stackcore.media.library_file import parse_family

    parsed = parse_family(Path(path).stem, content, path)
    own, library = {draft.key: draft for draft in parsed.drafts}, read_library()
    entries, faults = [], list(parsed.faults)
    for draft in parsed.drafts:
        try:
            entries.append(draft.entry(media_of(draft, lambda key: own.get(key) or library.draft(key))))
        except LibraryError as error:
            faults += error.faults
    # Of an edition that stands in the file and in the library, the file has the word.
    known = library.family(parsed.key).entries if parsed.key in library.families() else ()
    among = (*entries, *(entry for entry in known if entry.key not in own))
    return [Checked(entry.key, entry.medium, entry, among) for entry in entries], faults, None


def _of_columns(path: str, content: bytes) -> tuple[list[Checked], list[Fault], "FloatArray | None"]:
    from stackcore.media.columns import read_columns

    reading = read_columns(content)
    if reading.questions and not reading.faults:
        for question in reading.questions:
            print(f"{path}: note: supposed: {question.text} {question.assumed or 'not known'}")
        reading = read_columns(content, reading.assumptions)
    faults = [
        Fault(f"{path}: {fault.path}" if fault.path else path, fault.message, fault.allowed)
        for fault in reading.faults
    ]
    if reading.table is None:
        faults += [
            Fault(path, f"not known: {question.text}", "a heading that says it") for question in reading.questions
        ]
        return [], faults or [Fault(path, "holds no table of a material", "columns with headings")], None
    for sentence in reading.understood:
        print(f"{path}: note: {sentence}")
    return [Checked(path, reading.table)], faults, None
