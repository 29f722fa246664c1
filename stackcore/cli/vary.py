"""``slabwright vary``: stacks of a job while one of its numbers runs through a range, to CSV."""

import sys
from collections.abc import Callable, Iterator, Sequence
from pathlib import Path
from typing import TYPE_CHECKING, Final, TextIO

from stackcore.cli.arguments import Parser
from stackcore.cli.output import standard_output_fault, unreadable, unwritable, utf8
from stackcore.cli.telling import DONE, one_line, tell
from stackcore.errors import Fault, InputError, UnitError, nearest

if TYPE_CHECKING:
    from stackcore.arrays import FloatArray
    from stackcore.job import Job
    from stackcore.studies import Variation

MOST_VALUES: Final = 10_000
"""Of what is varied."""

_BLOCK: Final = 16_384
"""Pairs of frequency and angle that are solved and written at a time."""

_SHOWN: Final = 12
"""Places that a fault lists at most."""


def _parser() -> Parser:
    parser = Parser(
        prog="slabwright vary",
        description="Compute stacks of a job over its sweep while one number of it runs through a range, and write "
        "the columns of sweep with the number, in SI units, behind them as varied_value. The file appears only "
        "when it is complete.",
        allow_abbrev=False,
    )
    parser.add_argument("job", metavar="JOB", help="job file (.slabjob)")
    parser.add_argument("--csv", metavar="OUT", required=True, help="table to write; - is standard output")
    parser.add_argument(
        "--vary",
        metavar="PLACE",
        required=True,
        help="what is varied, as faults name it: stacks[0].elements[1].thickness, materials.skin.permittivity",
    )
    parser.add_argument("--from", metavar="VALUE", required=True, dest="first", help='first value, as "1 mm"')
    parser.add_argument("--to", metavar="VALUE", required=True, dest="last", help="last value")
    parser.add_argument(
        "--points", metavar="N", required=True, help="how many values, evenly spaced, with both ends"
    )
    parser.add_argument("--stack", metavar="NAME", help="only the stack of this name, where a material is varied")
    return parser


def main(argv: Sequence[str]) -> int:
    """Run ``slabwright vary`` with the arguments behind it; return the exit status.

    Raises
    ------
    InputError
        With every fault of the arguments or of the job file.
    """
    try:
        arguments = _parser().parse_args(argv)
    except SystemExit as end:  # after --help
        return int(end.code or 0)
    from stackcore.job import read_job

    try:
        job = read_job(arguments.job)
    except OSError as error:
        return tell([unreadable(arguments.job, error, ".slabjob", "a job file")])
    variations = _variations(job, arguments.vary, arguments.stack)
    values = _values(variations[0], arguments.first, arguments.last, arguments.points)

    def write(stream: TextIO) -> None:
        _write(job, variations, values, stream)

    if arguments.csv == "-":
        return _to_standard_output(write)
    if Path(arguments.csv).exists() and Path(arguments.csv).samefile(arguments.job):
        allowed = "another file for the table"
        return tell([Fault(arguments.csv, "the table would take the place of the job", allowed)])
    return _to_file(write, arguments.csv)


def _variations(job: "Job", path: str, name: str | None) -> "list[Variation]":
    """Return what `path` names, once for each stack that has it."""
    from stackcore.job.groups import file_path
    from stackcore.studies import variations_of

    known: list[str] = []
    found: list[Variation] = []
    for index, stack in enumerate(job.record.stacks):
        for variation in variations_of(job, index):
            # In a file the rows of a group stand inside it; in the window they are rows like others.
            written = file_path(variation.path, job.record.stacks)
            known.append(written)
            if path in (written, variation.path) and name in (None, stack.name):
                found.append(variation)
    if found:
        return found
    names = [stack.name for stack in job.record.stacks]
    if name is not None and name not in names:
        told = f"the job has no stack {name!r}{nearest(name, names)}"
        raise InputError([Fault("--stack", told, f"one of {', '.join(map(repr, names))}")])
    if path in known:
        told = f"nothing called {path!r} is in the stack {name!r}"
        raise InputError([Fault("--stack", told, "a stack that has it, or no --stack")])
    known = list(dict.fromkeys(known))
    more = f" and {len(known) - _SHOWN} more" if len(known) > _SHOWN else ""
    allowed = f"one of {', '.join(known[:_SHOWN])}{more}" if known else "the job has nothing to vary"
    raise InputError([Fault("--vary", f"the job has no number {path!r}{nearest(path, known)}", allowed)])


def _values(variation: "Variation", first: str, last: str, points: str) -> "FloatArray":
    import numpy as np

    from stackcore.job.limits import limit_faults
    from stackcore.units import parse_measure

    faults: list[Fault] = []
    ends: list[float] = []
    for option, text in (("--from", first), ("--to", last)):
        try:
            value = parse_measure(text, variation.dimension).value
        except UnitError as error:
            faults.append(Fault(option, error.message, error.allowed))
        else:
            ends.append(value)
            faults += limit_faults(value, text, variation.limits, option)
    count = int(points) if points.isascii() and points.isdigit() and len(points) < 10 else 0
    if not 1 <= count <= MOST_VALUES:
        faults.append(Fault("--points", f"{points!r} is out of range", f"a whole number from 1 to {MOST_VALUES}"))
    if faults:
        raise InputError(faults)
    values: FloatArray = np.linspace(ends[0], ends[1], count)
    return values


def _to_file(write: Callable[[TextIO], None], path: str) -> int:
    from stackcore.job.replacing import replacing

    try:
        with replacing(path) as file, utf8(file) as stream:
            write(stream)
    except OSError as error:
        return tell([unwritable(path, error)])
    return DONE


def _to_standard_output(write: Callable[[TextIO], None]) -> int:
    if sys.stdout is None:
        return one_line("standard output is closed; allowed: --csv with the name of a file")
    try:
        with utf8(sys.stdout.buffer) as stream:
            write(stream)
        sys.stdout.flush()
    except OSError as error:
        return standard_output_fault(error)
    return DONE


def _write(job: "Job", variations: "list[Variation]", values: "FloatArray", stream: TextIO) -> None:
    """Write stack after stack, value after value, in parts that bound the memory."""
    from stackcore.export.sweep_csv import CSV_HEADER, LINE_END, csv_rows, text_cell
    from stackcore.propagation import solve
    from stackcore.studies import varied_stack

    stream.write(",".join((*CSV_HEADER, "varied_value")) + LINE_END)
    frequencies, angles = job.sweep.frequencies(), job.sweep.angles()
    for variation in variations:
        name = text_cell(job.record.stacks[variation.stack].name)
        for value in values.tolist():
            stack = varied_stack(job, variation, value)
            for frequency, angle in _parts(frequencies, angles):
                # Without a name no cell holds the end of a line, whatever the stack is called.
                rows = csv_rows(solve(stack, frequency, angle), "").split(LINE_END)[:-1]
                stream.write("".join([f"{name}{row},{value!r}{LINE_END}" for row in rows]))


def _parts(frequencies: "FloatArray", angles: "FloatArray") -> "Iterator[tuple[FloatArray, FloatArray]]":
    """Yield the sweep in parts, in the order of the rows: all angles of some frequencies, or some of one."""
    step = max(1, _BLOCK // angles.size)
    for first in range(0, frequencies.size, step):
        for first_angle in range(0, angles.size, _BLOCK):
            yield frequencies[first : first + step], angles[first_angle : first_angle + _BLOCK]
