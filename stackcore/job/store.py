"""Job files: read, and written as a whole or not at all."""

import os
from pathlib import Path

from stackcore.job.codec import job_from_json, job_to_json
from stackcore.job.materials import with_resolved_library
from stackcore.job.replacing import replacing
from stackcore.job.resolve import Job
from stackcore.job.tree import LARGEST_FILE


def read_job(path: str | os.PathLike[str]) -> Job:
    """Read a job file.

    Raises
    ------
    JobError
        With every fault of the file.
    OSError
        When the file cannot be read.
    """
    with Path(path).open("rb") as file:
        content = file.read(LARGEST_FILE + 1)
    return Job(job_from_json(content))


def write_job(job: Job, path: str | os.PathLike[str]) -> None:
    """Write a job file as a whole: the old file stays until the new one is complete.

    The values of library materials are written beside their references.

    Raises
    ------
    OSError
        When the file cannot be written; the old one is untouched.
    """
    content = job_to_json(with_resolved_library(job.record)).encode("utf-8")
    with replacing(path) as file:
        file.write(content)
