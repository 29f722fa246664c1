"""A sweep as comma-separated values: one row per stack, frequency, angle and polarization.

RFC 4180 with a header row: lines end with CR LF, a text with a comma, a quotation mark or a line break stands in
quotation marks. UTF-8 without a byte order mark, a dot for the decimal sign whatever the locale, no comment lines.
Numbers are the shortest text that gives the same double again; infinite decibels are ``inf``.

A text cell that a spreadsheet would take for a formula, because ``=``, ``+``, ``-``, ``@``, a tab or a line break
comes first in it, is written with an apostrophe in front.
"""

from collections.abc import Generator, Iterator, Sequence
from typing import Final, TextIO

import numpy as np

from stackcore.conventions import POLARIZATIONS
from stackcore.job import Job
from stackcore.media.base import FloatArray
from stackcore.propagation import Response, solve
from stackcore.quantities import QUANTITIES
from stackcore.stack import Stack
from stackcore.units import degrees_of

_COLUMNS: Final = tuple(quantity for quantity in QUANTITIES.values() if quantity.exported)

CSV_HEADER: Final = ("stack", "frequency_Hz", "angle_deg", "polarization", *(column.name for column in _COLUMNS))
"""Names of the columns in order."""

LINE_END: Final = "\r\n"

_FORMULA_SIGNS: Final = ("=", "+", "-", "@", "\t", "\r", "\n", "\uff1d", "\uff0b", "\uff0d", "\uff20")
"""The last four are the full-width forms of the first, which some programs take for them."""

_BLOCK: Final = 16_384
"""Pairs of frequency and angle that are solved and written at a time."""


def text_cell(text: str) -> str:
    """Return `text` as one cell, quoted where RFC 4180 asks for it and never a formula.

    Examples
    --------
    >>> text_cell('1/4" cover, rev. B')
    '"1/4"" cover, rev. B"'
    >>> text_cell("=1+1")
    "'=1+1"
    """
    if text.lstrip(" ").startswith(_FORMULA_SIGNS):
        text = f"'{text}"
    if any(sign in text for sign in ',"\r\n'):
        return '"' + text.replace('"', '""') + '"'
    return text


def csv_rows(response: Response, name: str | None = None) -> str:
    """Return the rows of one response, each ended, without the header.

    Parameters
    ----------
    response
        Of any number of frequencies and angles.
    name
        For the first column; None takes the stack's own.
    """
    stack = text_cell(response.stack.name if name is None else name)
    frequencies = [f"{stack},{frequency!r}" for frequency in response.frequency.tolist()]
    cases = [f",{degrees_of(angle)!r},{letters}," for angle in response.angle.tolist() for letters in POLARIZATIONS]
    heads = [frequency + case for frequency in frequencies for case in cases]
    # Two quantities that are one array are written as text once.
    texts: dict[int, list[str]] = {}
    columns = []
    for quantity in _COLUMNS:
        values = quantity.values(response)
        if id(values) not in texts:
            texts[id(values)] = list(map(repr, np.ravel(values).tolist()))
        columns.append(texts[id(values)])
    rows = map(",".join, zip(*columns, strict=True))
    return "".join([f"{head}{row}{LINE_END}" for head, row in zip(heads, rows, strict=True)])


def write_csv(job: Job, stream: TextIO, *, stacks: Sequence[Stack] | None = None) -> Generator[float, None, None]:
    """Solve stacks over the sweep of `job` and write them, yielding after each part the fraction that is done.

    The sweep is solved and written in parts, so that its size is bounded by the disk and not by the memory. Nothing
    is done until the iterator is advanced; closing it gives up.

    Parameters
    ----------
    job
        Whose sweep is taken.
    stream
        Opened with ``encoding="utf-8", newline=""``; `stackcore.job.replacing` gives a file that takes the place of
        an old one only when all rows are there.
    stacks
        In the order to write them; None means all of the job.

    Raises
    ------
    OSError
        When the stream cannot be written.
    StackError
        When a stack cannot be solved.

    Examples
    --------
    >>> import io
    >>> from stackcore.job import job_from_json
    >>> job = Job(job_from_json('''{"format": "slabwright-job", "version": 1, "title": "Bare",
    ... "stacks": [{"name": "A", "elements": []}], "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''))
    >>> stream = io.StringIO(newline="")
    >>> list(write_csv(job, stream))
    [1.0]
    >>> stream.getvalue().splitlines()[1][:38]
    'A,10000000000.0,0.0,TE,0.0,1.0,0.0,inf'
    """
    chosen = job.stacks if stacks is None else tuple(stacks)
    stream.write(",".join(CSV_HEADER) + LINE_END)
    frequencies, angles = job.sweep.frequencies(), job.sweep.angles()
    done, total = 0, len(chosen) * frequencies.size * angles.size
    for stack in chosen:
        for frequency, angle in _parts(frequencies, angles):
            stream.write(csv_rows(solve(stack, frequency, angle)))
            done += frequency.size * angle.size
            yield done / total


def _parts(frequencies: FloatArray, angles: FloatArray) -> Iterator[tuple[FloatArray, FloatArray]]:
    """Yield the sweep in parts, in the order of the rows: all angles of some frequencies, or some of one."""
    step = max(1, _BLOCK // angles.size)
    for first in range(0, frequencies.size, step):
        part = frequencies[first : first + step]
        for first_angle in range(0, angles.size, _BLOCK):
            yield part, angles[first_angle : first_angle + _BLOCK]
