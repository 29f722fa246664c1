"""The text of a job file and the record it stands for. Every fault of a text is told at once, with its path."""

import re
from collections.abc import Iterable
from dataclasses import replace

from stackcore.errors import Fault, JobError
from stackcore.job.decode import FORMAT, JOB_KEYS, decode_job
from stackcore.job.encode import encode_job
from stackcore.job.groups import file_path
from stackcore.job.inspector import MOST_FAULTS, Inspector, join, near, shown
from stackcore.job.migrations import VERSION, migrate
from stackcore.job.records import JobRecord
from stackcore.job.resolve import resolve
from stackcore.job.tree import read_tree

__all__ = ["VERSION", "job_from_json", "job_to_json"]


def job_from_json(content: str | bytes) -> JobRecord:
    """Return the record that the text of a job file stands for.

    Parameters
    ----------
    content
        The text, or its bytes in UTF-8.

    Raises
    ------
    JobError
        With every fault of the file in the order of the file, each with its path, what was given, what is allowed
        and the nearest match.

    Examples
    --------
    >>> job_from_json('{"format": "slabwright-job", "version": 2}')
    Traceback (most recent call last):
        ...
    stackcore.errors.JobError: version: the file has version 2, newer than version 1 that this program reads; \
allowed: version 1 or older; a newer slabwright reads this file
    """
    tree = read_tree(content)
    inspector = Inspector()
    if not isinstance(tree, dict):
        raise JobError([Fault("", f"the file holds {shown(tree)}", "an object {...} with the keys of a job")])
    inspector.repeated(tree, "")
    _check_format(tree, inspector)
    try:
        current = dict(migrate(tree))
    except JobError as error:
        if isinstance(tree.get("version"), int | float) and not isinstance(tree.get("version"), bool):
            raise JobError([*inspector.faults, *error.faults]) from None
        inspector.faults += error.faults
        current = tree
    record = decode_job({key: current[key] for key in current}, inspector)
    found = [replace(fault, path=file_path(fault.path, record.stacks)) for fault in resolve(record).faults]
    faults = [*inspector.faults, *_not_told_yet(found, inspector.faulted)]
    if faults:
        raise JobError(_told(faults, inspector.untold, record))
    return record


def job_to_json(record: JobRecord) -> str:
    """Return the text of a job file for `record`: texts as typed, keys in one order, an element a line.

    ``job_from_json(job_to_json(record)) == record`` for every record without faults.
    """
    return encode_job(record)


def _check_format(tree: dict[str, object], inspector: Inspector) -> None:
    """Note a missing format; raise when another one is given, since then nothing else would make sense."""
    if "format" not in tree:
        inspector.fault("format", "is missing", f"{FORMAT!r}")
    elif tree["format"] != FORMAT:
        given = tree["format"]
        hint = near(given, [FORMAT]) if isinstance(given, str) else ""
        raise JobError([Fault("format", f"{shown(given)} is not a job file{hint}", f"{FORMAT!r}")])


def _not_told_yet(faults: Iterable[Fault], faulted: set[str]) -> list[Fault]:
    """Return the faults that do not come from a stand-in: no fault was told at, or above, their place."""
    return [fault for fault in faults if not any(place in faulted for place in _places_above(fault.path))]


def _places_above(path: str) -> list[str]:
    """Return `path` and every path it lies under."""
    ends = [match.start() for match in re.finditer(r"\.|\[", path)]
    return [path, *(path[:end] for end in ends)]


def _told(faults: list[Fault], untold: int, record: JobRecord) -> list[Fault]:
    """Return `faults` in the order of the file, at most `MOST_FAULTS`, and how many more there are."""
    sections = {key: place for place, key in enumerate(JOB_KEYS)}
    materials = {join("materials", material.name): place for place, material in enumerate(record.materials)}

    def order(fault: Fault) -> tuple[int, list[int]]:
        section = sections.get(re.split(r"[.\[]", fault.path)[0], -1)
        if fault.path.startswith("materials"):
            return section, [materials[place] for place in _places_above(fault.path) if place in materials]
        places = [int(digits) for digits in re.findall(r"\[(\d+)\]", fault.path)]
        return section, [int(fault.path.startswith("sweep.angle")), *places]

    told = sorted(faults, key=order)
    untold += len(told[MOST_FAULTS:])
    if untold:
        return [*told[:MOST_FAULTS], Fault("", f"{untold} more faults are not listed", "correct these first")]
    return told
