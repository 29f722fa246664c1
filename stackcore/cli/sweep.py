"""``slabwright sweep``: every stack of a job over its sweep, to CSV."""

import os
import sys
from collections.abc import Sequence
from dataclasses import replace
from typing import TYPE_CHECKING, TextIO

from stackcore.cli.arguments import Parser
from stackcore.cli.output import standard_output_fault, unreadable, unwritable, utf8
from stackcore.cli.telling import DONE, one_line, tell
from stackcore.errors import Fault, InputError, nearest

if TYPE_CHECKING:
    from stackcore.job import Job
    from stackcore.stack import Stack


def _parser() -> Parser:
    parser = Parser(
        prog="slabwright sweep",
        description="Compute every stack of a job over its sweep and write one row per stack, frequency, angle "
        "and polarization. The file appears only when it is complete.",
        allow_abbrev=False,
    )
    parser.add_argument("job", metavar="JOB", help="job file (.slabjob)")
    parser.add_argument("--csv", metavar="OUT", required=True, help="table to write; - is standard output")
    parser.add_argument("--stack", metavar="NAME", help="only the stack of this name")
    parser.add_argument(
        "--condition",
        metavar="NAME",
        action="append",
        default=[],
        help="under this condition of the job, in rows of their own; may be given more than once",
    )
    parser.add_argument(
        "--wide",
        metavar="QUANTITY",
        help="one quantity, a row a frequency and a column a stack, angle and polarization; for spreadsheets",
    )
    return parser


def main(argv: Sequence[str]) -> int:
    """Run ``slabwright sweep`` with the arguments behind it; return the exit status.

    Raises
    ------
    InputError
        With every fault of the arguments or of the job file.
    """
    try:
        arguments = _parser().parse_args(argv)
    except SystemExit as end:  # after --help
        return int(end.code or 0)
    # The solver is not needed to say what is wrong with the arguments, or to help.
    from stackcore.job import read_job

    try:
        job = read_job(arguments.job)
    except OSError as error:
        return tell([unreadable(arguments.job, error, ".slabjob", "a job file")])
    stacks = _under(job, _chosen(job, arguments.stack), arguments.condition)
    quantity = _quantity(arguments.wide)
    if arguments.csv == "-":
        return _to_standard_output(job, stacks, quantity)
    if _same_file(arguments.job, arguments.csv):
        allowed = "another file for the table"
        return tell([Fault(arguments.csv, "the table would take the place of the job", allowed)])
    return _to_file(job, stacks, arguments.csv, quantity)


def _same_file(one: str, other: str) -> bool:
    try:
        return os.path.samefile(one, other)
    except OSError:
        return False


def _chosen(job: "Job", name: str | None) -> tuple["Stack", ...]:
    if name is None:
        return job.stacks
    chosen = tuple(stack for stack in job.stacks if stack.name == name)
    if not chosen:
        names = [stack.name for stack in job.stacks]
        message = f"the job has no stack {name!r}{nearest(name, names)}"
        raise InputError([Fault("--stack", message, f"one of {', '.join(map(repr, names))}")])
    return chosen


def _under(job: "Job", stacks: tuple["Stack", ...], conditions: Sequence[str]) -> tuple["Stack", ...]:
    """Return the stacks and, behind each, the stack under every condition, called ``A, Wet``."""
    known = [condition.name for condition in job.record.conditions]
    faults = []
    for name in conditions:
        if name not in known:
            allowed = f"one of {', '.join(map(repr, known))}" if known else "the job has no conditions"
            faults.append(Fault("--condition", f"the job has no condition {name!r}{nearest(name, known)}", allowed))
    if faults:
        raise InputError(faults)
    places = [job.stacks.index(stack) for stack in stacks]
    found = []
    for place, stack in zip(places, stacks, strict=True):
        found.append(stack)
        for name in conditions:
            found.append(replace(job.stack_under(place, name), name=f"{stack.name}, {name}"))
    return tuple(found)


def _quantity(name: str | None) -> str | None:
    if name is None:
        return None
    from stackcore.quantities import QUANTITIES

    if name not in QUANTITIES:
        message = f"there is no quantity {name!r}{nearest(name, QUANTITIES)}"
        raise InputError([Fault("--wide", message, f"one of {', '.join(QUANTITIES)}")])
    return name


def _to_file(job: "Job", stacks: tuple["Stack", ...], path: str, quantity: str | None) -> int:
    from stackcore.job.replacing import replacing

    try:
        with replacing(path) as file, utf8(file) as stream:
            _write(job, stacks, stream, quantity)
    except OSError as error:
        return tell([unwritable(path, error)])
    return DONE


def _to_standard_output(job: "Job", stacks: tuple["Stack", ...], quantity: str | None) -> int:
    if sys.stdout is None:
        return one_line("standard output is closed; allowed: --csv with the name of a file")
    try:
        with utf8(sys.stdout.buffer) as stream:
            _write(job, stacks, stream, quantity)
        sys.stdout.flush()
    except OSError as error:
        return standard_output_fault(error)
    return DONE


def _write(job: "Job", stacks: tuple["Stack", ...], stream: TextIO, quantity: str | None) -> None:
    from stackcore.export import write_csv, write_wide_csv

    if quantity is None:
        for _ in write_csv(job, stream, stacks=stacks):
            pass
    else:
        for _ in write_wide_csv(job, stream, quantity, stacks=stacks):
            pass
