"""What the command line says on standard error: one line a fault."""

import contextlib
import os
import sys
from collections.abc import Iterable
from typing import Final

from stackcore.errors import Fault, InputError, SlabwrightError

DONE: Final = 0
NO: Final = 1
"""The answer is no."""

WRONG: Final = 2
GIVEN_UP: Final = 130
"""What shells expect of a program that Ctrl+C has ended."""


def tell(faults: SlabwrightError | Iterable[Fault]) -> int:
    """Print faults and return the exit status that goes with them."""
    if isinstance(faults, InputError):
        faults = faults.faults
    elif isinstance(faults, SlabwrightError):
        faults = [Fault("", str(faults))]
    for fault in faults:
        one_line(str(fault))
    return WRONG


def one_line(text: str) -> int:
    """Print ``slabwright: text`` on one line, whatever a file name or a value may hold; return the exit status."""
    shown = "".join(letter if letter.isprintable() else repr(letter)[1:-1] for letter in text)
    # Without standard error there is nobody to tell.
    if sys.stderr is not None:
        print(f"slabwright: {shown}", file=sys.stderr)
    return WRONG


def let_go_of_standard_output() -> None:
    """Point standard output at nothing, so that the interpreter does not stumble over it when it ends."""
    with contextlib.suppress(OSError, ValueError):
        nothing = os.open(os.devnull, os.O_WRONLY)
        os.dup2(nothing, sys.stdout.fileno())
        os.close(nothing)
