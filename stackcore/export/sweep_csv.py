"""A sweep as comma-separated values: one row per stack, frequency, angle and polarization.

RFC 4180 with a header row: lines end with CR LF, a text with a comma, a quotation mark or a line break stands in
quotation marks. UTF-8 without a byte order mark, a dot for the decimal sign whatever the locale, no comment lines.
Numbers are the shortest text that gives the same double again; infinite decibels are ``inf``.

A text cell that a spreadsheet would take for a formula, because ``=``, ``+``, ``-``, ``@``, a tab or a line break
comes first in it, is written with an apostrophe in front.
"""

import os
from collections.abc import Iterator, Sequence
from typing import BinaryIO, Final

import numpy as np

from stackcore.conventions import POLARIZATIONS
from stackcore.job import Job
from stackcore.job.replacing import replacing
from stackcore.media.base import FloatArray
from stackcore.propagation import Response, solve
from stackcore.quantities import QUANTITIES
from stackcore.stack import Stack
from stackcore.units import degrees_of

CSV_HEADER: Final = ("stack", "frequency_Hz", "angle_deg", "polarization", *QUANTITIES)
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
    for quantity in QUANTITIES.values():
        values = quantity.values(response)
        if id(values) not in texts:
            texts[id(values)] = list(map(repr, np.ravel(values).tolist()))
        columns.append(texts[id(values)])
    rows = map(",".join, zip(*columns, strict=True))
    return "".join([f"{head}{row}{LINE_END}" for head, row in zip(heads, rows, strict=True)])


def write_csv(
    job: Job, target: str | os.PathLike[str] | BinaryIO, *, stacks: Sequence[Stack] | None = None
) -> Iterator[float]:
    """Solve stacks over the sweep of `job` and write them, yielding after each part the fraction that is done.

    Nothing is done until the iterator is advanced. The sweep is solved and written in parts, so that its size is
    bounded by the disk and not by the memory.

    Parameters
    ----------
    job
        Whose sweep is taken.
    target
        A path, which is replaced as a whole when all rows are there and untouched when the iterator is closed
        before or an error ends it; or an open binary file.
    stacks
        In the order to write them; None means all of the job.

    Raises
    ------
    OSError
        When the target cannot be written.
    StackError
        When a stack cannot be solved.
    """
    chosen = job.stacks if stacks is None else tuple(stacks)
    if not isinstance(target, str | os.PathLike):
        yield from _write(job, target, chosen)
        return
    with replacing(target) as file:
        yield from _write(job, file, chosen)


def _write(job: Job, file: BinaryIO, stacks: Sequence[Stack]) -> Iterator[float]:
    file.write((",".join(CSV_HEADER) + LINE_END).encode())
    frequencies, angles = job.sweep.frequencies(), job.sweep.angles()
    done, total = 0, len(stacks) * frequencies.size * angles.size
    for stack in stacks:
        for frequency, angle in _parts(frequencies, angles):
            file.write(csv_rows(solve(stack, frequency, angle)).encode())
            done += frequency.size * angle.size
            yield done / total


def _parts(frequencies: FloatArray, angles: FloatArray) -> Iterator[tuple[FloatArray, FloatArray]]:
    """Yield the sweep in parts, in the order of the rows: all angles of a few frequencies, or some angles of one."""
    step = max(1, _BLOCK // angles.size)
    for first in range(0, frequencies.size, step):
        part = frequencies[first : first + step]
        for first_angle in range(0, angles.size, _BLOCK):
            yield part, angles[first_angle : first_angle + _BLOCK]
