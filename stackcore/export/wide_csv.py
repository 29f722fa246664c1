"""One quantity of a sweep as a wide table: one row per frequency, one column per stack, angle and polarization.

The tidy table of `stackcore.export.sweep_csv` is for programs; this one is for a spreadsheet and its charts. The
rules of writing are the same: RFC 4180, UTF-8, a dot for the decimal sign, full precision, ``inf`` for infinite
decibels.
"""

from collections.abc import Generator, Sequence
from typing import TextIO

import numpy as np

from stackcore.conventions import POLARIZATIONS
from stackcore.export.sweep_csv import LINE_END, text_cell
from stackcore.job import Job
from stackcore.propagation import solve
from stackcore.quantities import quantity_named
from stackcore.stack import Stack
from stackcore.units import degrees_of

_BLOCK = 16_384
"""Pairs of frequency and angle that are solved at a time."""


def wide_header(job: Job, quantity: str, stacks: Sequence[Stack] | None = None) -> tuple[str, ...]:
    """Return the names of the columns: ``frequency_Hz``, then ``A TE 30 deg transmittance`` and so on."""
    angles = [f"{degrees_of(angle):.12g} deg" for angle in job.sweep.angles().tolist()]
    chosen = job.stacks if stacks is None else stacks
    cases = [f"{side} {angle} {quantity}" for angle in angles for side in POLARIZATIONS]
    return ("frequency_Hz", *(f"{stack.name} {case}" for stack in chosen for case in cases))


def write_wide_csv(
    job: Job, stream: TextIO, quantity: str, *, stacks: Sequence[Stack] | None = None
) -> Generator[float, None, None]:
    """Solve stacks over the sweep of `job` and write one quantity, yielding after each part the fraction done.

    Parameters
    ----------
    job
        Whose sweep is taken.
    stream
        Opened with ``encoding="utf-8", newline=""``.
    quantity
        Name of a quantity of `stackcore.quantities`.
    stacks
        In the order of the columns; None means all of the job.

    Raises
    ------
    KeyError
        For a quantity that does not exist.
    OSError, StackError
        When the stream cannot be written or a stack cannot be solved.

    Examples
    --------
    >>> import io
    >>> from stackcore.job import job_from_json
    >>> job = Job(job_from_json('''{"format": "slabwright-job", "version": 1, "title": "Bare",
    ... "stacks": [{"name": "A", "elements": []}], "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''))
    >>> stream = io.StringIO(newline="")
    >>> list(write_wide_csv(job, stream, "transmittance"))
    [1.0]
    >>> stream.getvalue().splitlines()
    ['frequency_Hz,A TE 0 deg transmittance,A TM 0 deg transmittance', '10000000000.0,1.0,1.0']
    """
    values = quantity_named(quantity).values
    chosen = job.stacks if stacks is None else tuple(stacks)
    stream.write(",".join(map(text_cell, wide_header(job, quantity, chosen))) + LINE_END)
    frequencies, angles = job.sweep.frequencies(), job.sweep.angles()
    step = max(1, _BLOCK // angles.size)
    for first in range(0, frequencies.size, step):
        part = frequencies[first : first + step]
        columns = [values(solve(stack, part, angles)).reshape(len(part), -1) for stack in chosen]
        table = np.column_stack([part, *columns])
        stream.write("".join([",".join(map(repr, row)) + LINE_END for row in table.tolist()]))
        yield min(first + step, frequencies.size) / frequencies.size
