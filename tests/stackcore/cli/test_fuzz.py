"""Two thousand spoiled job files: each is read, or refused with located faults, and never ends in a traceback."""

import os
import re
import subprocess
import sys
import time
from pathlib import Path
from typing import Final

import pytest

from stackcore.errors import JobError
from stackcore.job import job_from_json, job_to_json
from stackcore.job.records import AngleGrid, FrequencyGrid, JobRecord
from tests.stackcore.cli.conftest import Run
from tests.stackcore.cli.spoiling import spoiled
from tests.stackcore.formats.files import HAND_WRITTEN, SAVED

FILES: Final = 2000
BATCH: Final = 100
LONGEST: Final = 3.0
"""Seconds that a file may take."""

FEW: Final = 5000
"""Pairs of frequency and angle that are solved here; larger sweeps are only read."""

# One fault: a place (in the file, or a line of it, or an option) unless it is the whole file that is wrong.
LINE: Final = re.compile(r"slabwright: (\S.*: )?\S.*; allowed: \S.*")


def content_of(seed: int) -> bytes:
    """Return a spoiled job file; both stored files take turns, with a shorter sweep."""
    whole = (HAND_WRITTEN, SAVED)[seed % 2].read_bytes().replace(b'"points": 401', b'"points": 11')
    return spoiled(seed, whole)


def pairs(record: JobRecord) -> int:
    """Return how many pairs of frequency and angle a sweep has."""
    sizes = [
        axis.points if isinstance(axis, FrequencyGrid | AngleGrid) else len(axis)
        for axis in (record.sweep.frequency, record.sweep.angle)
    ]
    return sizes[0] * sizes[1] * len(record.stacks)


def read(content: bytes) -> JobRecord | None:
    """Return the record of a file, or None when it has faults, each of which must be one printable line."""
    try:
        return job_from_json(content)
    except JobError as error:
        faults = error.faults
    assert faults
    assert all(str(fault).isprintable() and fault.message for fault in faults)
    return None


@pytest.mark.parametrize("first", range(0, FILES, BATCH))
def test_a_spoiled_file_is_read_or_refused(first: int, run: Run, tmp_path: Path) -> None:
    """A spoiled file that can be read means the same after a save; any other gives status 2 and a line a fault."""
    path = tmp_path / "spoiled.slabjob"
    for seed in range(first, first + BATCH):
        content = content_of(seed)
        path.write_bytes(content)
        start = time.process_time()
        record = read(content)
        assert time.process_time() - start < LONGEST, seed
        if record is not None:
            assert job_from_json(job_to_json(record)) == record, seed
            if pairs(record) > FEW:
                continue
        start = time.process_time()
        outcome = run("sweep", path, "--csv", os.devnull)
        assert time.process_time() - start < LONGEST, seed
        assert outcome.status == (2 if record is None else 0), seed
        assert bool(outcome.lines) == (record is None), seed
        assert all(LINE.fullmatch(line) for line in outcome.lines), (seed, outcome.lines)


def test_spoiling_reaches_both_ends() -> None:
    """The spoiled files are not all refused and not all read, and their faults lie all over the file."""
    places: set[str] = set()
    refused = 0
    for seed in range(0, FILES, 4):
        try:
            job_from_json(content_of(seed))
        except JobError as error:
            refused += 1
            places |= {re.sub(r"\[.*?\]", "[]", fault.path) for fault in error.faults}
    assert FILES / 4 * 0.5 < refused < FILES / 4 * 0.95
    assert {"", "format", "stacks[].elements[].thickness", "sweep.angle[]", "sweep.frequency.points"} <= places
    assert len(places) > 50


@pytest.mark.parametrize("seed", [3, 500, 1001, 1502, 1999])
def test_a_process_of_its_own_says_the_same(seed: int, run: Run, tmp_path: Path) -> None:
    """Run as a command, a spoiled file gives the same status and the same lines as in this process."""
    path = tmp_path / "spoiled.slabjob"
    path.write_bytes(content_of(seed))
    command = [sys.executable, "-m", "stackcore", "sweep", str(path), "--csv", os.devnull]
    process = subprocess.run(command, capture_output=True, check=False)
    assert (process.returncode, process.stderr.decode().splitlines()) == run("sweep", path, "--csv", os.devnull)[
        ::2
    ]
