"""``slabwright sweep``: every stack of a job over its sweep, to CSV."""

import os
import sys
from collections.abc import Sequence
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
    stacks = _chosen(job, arguments.stack)
    if arguments.csv == "-":
        return _to_standard_output(job, stacks)
    if _same_file(arguments.job, arguments.csv):
        allowed = "another file for the table"
        return tell([Fault(arguments.csv, "the table would take the place of the job", allowed)])
    return _to_file(job, stacks, arguments.csv)


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


def _to_file(job: "Job", stacks: tuple["Stack", ...], path: str) -> int:
    from stackcore.job.replacing import replacing

    try:
        with replacing(path) as file, utf8(file) as stream:
            _write(job, stacks, stream)
    except OSError as error:
        return tell([unwritable(path, error)])
    return DONE


def _to_standard_output(job: "Job", stacks: tuple["Stack", ...]) -> int:
    if sys.stdout is None:
        return one_line("standard output is closed; allowed: --csv with the name of a file")
    try:
        with utf8(sys.stdout.buffer) as stream:
            _write(job, stacks, stream)
        sys.stdout.flush()
    except OSError as error:
        return standard_output_fault(error)
    return DONE


def _write(job: "Job", stacks: tuple["Stack", ...], stream: TextIO) -> None:
    from stackcore.export import write_csv

    for _ in write_csv(job, stream, stacks=stacks):
        pass
