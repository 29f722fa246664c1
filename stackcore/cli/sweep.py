"""``slabwright sweep``: every stack of a job over its sweep, to CSV."""

import argparse
import contextlib
import io
import os
import sys
from collections.abc import Iterator, Sequence
from pathlib import Path
from typing import TYPE_CHECKING, BinaryIO, NoReturn, TextIO

from stackcore.cli.telling import DONE, let_go_of_standard_output, one_line, tell
from stackcore.errors import Fault, InputError, nearest

if TYPE_CHECKING:
    from stackcore.job import Job
    from stackcore.stack import Stack


class _Parser(argparse.ArgumentParser):
    """A parser whose complaint is a fault like any other."""

    def error(self, message: str) -> NoReturn:
        raise InputError([Fault("", message, f"see {self.prog} --help")])


def _parser() -> argparse.ArgumentParser:
    parser = _Parser(
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
        return tell([_unreadable(arguments.job, error)])
    stacks = _chosen(job, arguments.stack)
    if arguments.csv == "-":
        return _to_standard_output(job, stacks)
    if _same_file(arguments.job, arguments.csv):
        allowed = "another file for the table"
        return tell([Fault(arguments.csv, "the table would take the place of the job", allowed)])
    return _to_file(job, stacks, arguments.csv)


def _unreadable(path: str, error: OSError) -> Fault:
    if isinstance(error, FileNotFoundError):
        with contextlib.suppress(OSError):
            name, folder = Path(path).name, Path(path).parent
            others = [other.name for other in folder.iterdir() if other.suffix == ".slabjob"]
            return Fault(path, f"there is no such file{nearest(name, others)}", "a job file")
    return Fault(path, f"cannot be read: {error.strerror or error}", "a job file")


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
        with replacing(path) as file, _utf8(file) as stream:
            _write(job, stacks, stream)
    except OSError as error:
        message = f"cannot be written: {error.strerror or error}"
        return tell([Fault(path, message, "a file in a folder that exists and can be written")])
    return DONE


def _to_standard_output(job: "Job", stacks: tuple["Stack", ...]) -> int:
    if sys.stdout is None:
        return one_line("standard output is closed; allowed: --csv with the name of a file")
    try:
        with _utf8(sys.stdout.buffer) as stream:
            _write(job, stacks, stream)
        sys.stdout.flush()
    except OSError as error:
        let_go_of_standard_output()
        if isinstance(error, BrokenPipeError):
            return one_line("standard output was closed before all rows were written")
        return one_line(f"standard output cannot be written: {error.strerror or error}")
    return DONE


@contextlib.contextmanager
def _utf8(binary: BinaryIO) -> Iterator[TextIO]:
    """Write UTF-8 text with its own line ends into a binary stream, and leave that open."""
    stream = io.TextIOWrapper(binary, encoding="utf-8", newline="", write_through=True)
    try:
        yield stream
        stream.flush()
    finally:
        # Detached also after an error: else the binary stream would be closed, and flushed, once more.
        with contextlib.suppress(OSError):
            stream.detach()


def _write(job: "Job", stacks: tuple["Stack", ...], stream: TextIO) -> None:
    from stackcore.export import write_csv

    for _ in write_csv(job, stream, stacks=stacks):
        pass
