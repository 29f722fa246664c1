"""The command ``slabwright``: which part of the program a command line is for.

Exit status: 0 done; 1 the answer is no; 2 the input is wrong, told on standard error, one line a fault.
"""

import sys
from collections.abc import Callable, Sequence
from typing import Final

from stackcore.cli import materials, sweep, vary
from stackcore.cli.telling import DONE, GIVEN_UP, let_go_of_standard_output, one_line, tell
from stackcore.errors import Fault, SlabwrightError, nearest

__all__ = ["main"]

COMMANDS: Final[dict[str, Callable[[Sequence[str]], int]]] = {
    "sweep": sweep.main,
    "vary": vary.main,
    "materials": materials.main,
}
"""Name -> function of the arguments behind it. What is not here belongs to the window."""

WINDOW_COMMANDS: Final = ("picture",)

HELP: Final = """\
usage: slabwright [JOB]
       slabwright sweep JOB --csv OUT [--stack NAME]
       slabwright vary JOB --csv OUT --vary PLACE --from VALUE --to VALUE --points N [--stack NAME]
       slabwright materials [WORD ...] [--at F,F] [--csv OUT] [--check FILE]
       slabwright picture JOB --png OUT [--size WxH]

Plane waves through flat multilayer walls.

  slabwright [JOB]   open the window, with a job file if one is named
  sweep              compute every stack of a job over its sweep and write a table
  vary               the same while one number of the job runs through a range
  materials          list, search and show the material library; check materials of a file
  picture            draw the window with a job to a PNG, without a display

options:
  -h, --help         show this help; after a command, that of the command
  --version          show the version

exit status: 0 done; 1 the answer is no; 2 the input is wrong, one line a fault on standard error
"""


def main(argv: Sequence[str] | None = None) -> int:
    """Run one command line.

    Parameters
    ----------
    argv
        Arguments without the program's name; None takes those of the process.

    Returns
    -------
    int
        The exit status.
    """
    arguments = list(sys.argv[1:] if argv is None else argv)
    first = arguments[0] if arguments else ""
    try:
        if first in ("-h", "--help"):
            return _say(HELP)
        if first == "--version":
            return _say(f"slabwright {_version()}\n")
        if first in COMMANDS:
            return COMMANDS[first](arguments[1:])
        return _window(arguments)
    except SlabwrightError as error:
        return tell(error)
    except BrokenPipeError:
        let_go_of_standard_output()
        return one_line("standard output was closed before everything was written")
    except KeyboardInterrupt:
        return GIVEN_UP


def _say(text: str) -> int:
    # Flushed here, because an error at the end of the process could no longer be told in one line.
    print(text, end="", flush=True)
    return DONE


def _version() -> str:
    # Reading the metadata takes longer than all else that --version needs, and nothing else needs it.
    from importlib.metadata import PackageNotFoundError, version

    try:
        return version("slabwright")
    except PackageNotFoundError:
        return "(from a checkout that is not installed)"


def _window(arguments: list[str]) -> int:
    """Hand over to the window, unless the first word can only be a mistyped command."""
    from stackcore.cli.window import looks_like_a_file, open_window

    first = arguments[0] if arguments else ""
    if first and not first.startswith("-") and first not in WINDOW_COMMANDS and not looks_like_a_file(first):
        known = (*COMMANDS, *WINDOW_COMMANDS)
        allowed = f"{', '.join(known)}, or a job file"
        return tell([Fault("", f"there is no command and no file {first!r}{nearest(first, known)}", allowed)])
    return open_window(arguments)
