"""``python -m app`` and the window's end of the command ``slabwright``."""

import sys
from collections.abc import Sequence
from importlib.util import find_spec
from pathlib import Path
from typing import Final

from app.window.display import display_fault
from stackcore.cli import main as command
from stackcore.cli.telling import one_line, tell
from stackcore.cli.window import looks_like_a_file, toolkit_missing
from stackcore.errors import Fault

KNOWN: Final = ("-h", "--help", "--version")

NO_DISPLAY: Final = (
    "there is no display to open the window on ({}); "
    "allowed: slabwright picture JOB --png OUT draws it without one, "
    "slabwright sweep JOB --csv OUT computes without one"
)


def main(argv: Sequence[str] | None = None) -> int:
    """Open the window, with a job file if one is named, or draw a picture of it.

    Every other command line is handed to `stackcore.cli`.

    Parameters
    ----------
    argv
        Arguments without the program's name; None takes those of the process.

    Returns
    -------
    int
        The exit status: 0 done, 2 the input is wrong or there is no display.
    """
    try:
        return _run(list(sys.argv[1:] if argv is None else argv))
    except ImportError as error:
        return toolkit_missing(error)


def _run(arguments: list[str]) -> int:
    first = arguments[0] if arguments else ""
    if first == "picture":
        from app.window import picture

        return picture.main(arguments[1:])
    if first and not looks_like_a_file(first):
        return command(arguments) if not first.startswith("-") or first in KNOWN else _unknown(first)
    if len(arguments) > 1:
        return tell([Fault("", f"{arguments[1]!r} is one argument too many", "slabwright [JOB]")])
    return _open(Path(first) if first else None)


def _unknown(option: str) -> int:
    return tell([Fault("", f"there is no option {option!r}", f"{', '.join(KNOWN)}, or a job file")])


def _open(job: Path | None) -> int:
    if job is not None and not job.is_file():
        return tell([Fault(str(job), "there is no such file", "a job file")])
    # Where the toolkit is missing too, the import below says so: that comes first.
    fault = display_fault()
    if fault and find_spec("PySide6") is not None:
        return one_line(NO_DISPLAY.format(fault))
    from app.window.open import open_window

    return open_window(job)


if __name__ == "__main__":
    sys.exit(main())
