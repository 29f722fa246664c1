"""Files that a command cannot read, and text that it writes whole: to a file or to standard output."""

import contextlib
import io
import sys
from collections.abc import Iterator
from pathlib import Path
from typing import BinaryIO, TextIO

from stackcore.cli.telling import DONE, let_go_of_standard_output, one_line, tell
from stackcore.errors import Fault, nearest


def unreadable(path: str, error: OSError, suffix: str, wanted: str) -> Fault:
    """Return the fault of a file that cannot be read, with the nearest file of that `suffix` beside it."""
    if isinstance(error, FileNotFoundError):
        with contextlib.suppress(OSError):
            name, folder = Path(path).name, Path(path).parent
            others = [other.name for other in folder.iterdir() if other.suffix == suffix]
            return Fault(path, f"there is no such file{nearest(name, others)}", wanted)
    return Fault(path, f"cannot be read: {error.strerror or error}", wanted)


def unwritable(path: str, error: OSError) -> Fault:
    """Return the fault of a file that cannot be written."""
    message = f"cannot be written: {error.strerror or error}"
    return Fault(path, message, "a file in a folder that exists and can be written")


def write_text(path: str, text: str) -> int:
    """Write a whole text to a file, or to standard output for ``-``; return the exit status."""
    if path == "-":
        return _to_standard_output(text)
    from stackcore.job.replacing import replacing

    try:
        with replacing(path) as file:
            file.write(text.encode("utf-8"))
    except OSError as error:
        return tell([unwritable(path, error)])
    return DONE


def _to_standard_output(text: str) -> int:
    if sys.stdout is None:
        return one_line("standard output is closed; allowed: --csv with the name of a file")
    try:
        with utf8(sys.stdout.buffer) as stream:
            stream.write(text)
        sys.stdout.flush()
    except OSError as error:
        return standard_output_fault(error)
    return DONE


def standard_output_fault(error: OSError) -> int:
    """Say in one line why standard output took no more; return the exit status."""
    let_go_of_standard_output()
    if isinstance(error, BrokenPipeError):
        return one_line("standard output was closed before all rows were written")
    return one_line(f"standard output cannot be written: {error.strerror or error}")


@contextlib.contextmanager
def utf8(binary: BinaryIO) -> Iterator[TextIO]:
    """Write UTF-8 text with its own line ends into a binary stream, and leave that open."""
    stream = io.TextIOWrapper(binary, encoding="utf-8", newline="", write_through=True)
    try:
        yield stream
        stream.flush()
    finally:
        # Detached also after an error: else the binary stream would be closed, and flushed, once more.
        with contextlib.suppress(OSError):
            stream.detach()
