"""``slabwright materials --check``: the health of every material in a file."""

from collections.abc import Callable, Iterator
from pathlib import Path
from typing import TYPE_CHECKING, Final

from stackcore.cli.output import unreadable
from stackcore.cli.telling import DONE, NO, tell
from stackcore.errors import Fault

if TYPE_CHECKING:
    from stackcore.arrays import FloatArray
    from stackcore.media.base import AbstractMedium

_LARGEST: Final = 64 * 2**20
"""Bytes of a file that is looked at at all."""

Named = tuple[str, "AbstractMedium"]


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
    readers: dict[str, Callable[[str, bytes], tuple[list[Named], list[Fault], FloatArray | None]]]
    readers = {".slabjob": _of_job, ".json": _of_job, ".toml": _of_library}
    media, faults, sweep = readers.get(Path(path).suffix.casefold(), _of_columns)(path, content)
    status = DONE
    for name, medium in media:
        for line, is_error in _lines(name, medium, sweep if frequencies is None else frequencies):
            print(line)
            status = NO if is_error else status
    return tell(faults) if faults else status


def _lines(name: str, medium: "AbstractMedium", frequencies: "FloatArray | None") -> Iterator[tuple[str, bool]]:
    """Yield each finding of a medium as a line, and whether it is an error."""
    from stackcore.media.health import check_medium

    findings = check_medium(medium, frequencies)
    for finding in findings:
        yield f"{name}: {finding}", finding.severity == "error"
    if not findings:
        yield f"{name}: nothing speaks against it", False


def _of_job(path: str, content: bytes) -> tuple[list[Named], list[Fault], "FloatArray | None"]:
    from stackcore.job import Job, job_from_json

    job = Job(job_from_json(content))  # its faults are told by who called
    media = [(f"materials.{material.name}", job.media[material.name]) for material in job.materials]
    return media, [], job.sweep.frequencies()


def _of_library(path: str, content: bytes) -> tuple[list[Named], list[Fault], "FloatArray | None"]:
    from stackcore.errors import LibraryError
    from stackcore.media.library import read_library
    from stackcore.media.library_entry import media_of
    from stackcore.media.library_file import parse_family

    parsed = parse_family(Path(path).stem, content, path)
    own, library = {draft.key: draft for draft in parsed.drafts}, read_library()
    media: list[Named] = []
    faults = list(parsed.faults)
    for draft in parsed.drafts:
        try:
            entry = draft.entry(media_of(draft, lambda key: own.get(key) or library.draft(key)))
        except LibraryError as error:
            faults += error.faults
        else:
            media.append((draft.key, entry.medium))
    return media, faults, None


def _of_columns(path: str, content: bytes) -> tuple[list[Named], list[Fault], "FloatArray | None"]:
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
    return [(path, reading.table)], faults, None
