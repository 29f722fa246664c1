"""Everything that can go wrong, as values that hold their facts.

    SlabwrightError
    ├── InputError(ValueError)      one or more located faults in what the user gave
    │   ├── JobError                faults of a job file or a Job
    │   └── LibraryError            faults of a material library file
    ├── UnitError(ValueError)       text that is not a quantity of the wanted kind
    └── StackError(ValueError)      a stack, frequency or angle the solver cannot take

A `Fault` is the one currency: the command line prints it, a table cell shows it, the problem list jumps to it.
"""

import difflib
from collections.abc import Iterable
from dataclasses import dataclass
from typing import Literal

Severity = Literal["error", "warning", "note"]


@dataclass(frozen=True, slots=True)
class Fault:
    """One thing that is wrong at one place.

    Parameters
    ----------
    path
        Where, in the words of the file: ``stacks[0].elements[2].thickness``. Empty for the whole input.
    message
        What is wrong, with the value that was given.
    allowed
        What would be right, with an example; the next step when there is one.
    severity
        ``error`` stops the calculation; ``warning`` and ``note`` do not.

    Examples
    --------
    >>> str(Fault("sweep.frequency.points", "0 is too few", "a whole number from 1 to 1000000"))
    'sweep.frequency.points: 0 is too few; allowed: a whole number from 1 to 1000000'
    """

    path: str
    message: str
    allowed: str = ""
    severity: Severity = "error"

    def __str__(self) -> str:
        place = f"{self.path}: " if self.path else ""
        rest = f"; allowed: {self.allowed}" if self.allowed else ""
        return f"{place}{self.message}{rest}"


class SlabwrightError(Exception):
    """Base of every error this package raises on purpose."""


class InputError(SlabwrightError, ValueError):
    """What was given has faults; all of them are in `faults`."""

    def __init__(self, faults: Iterable[Fault]) -> None:
        self.faults: tuple[Fault, ...] = tuple(faults)
        super().__init__("\n".join(str(fault) for fault in self.faults))


class JobError(InputError):
    """A job file, or a Job, has faults."""


class LibraryError(InputError):
    """A material library file has faults."""


class UnitError(SlabwrightError, ValueError):
    """A text is not a quantity of the wanted kind."""

    def __init__(self, message: str, allowed: str = "") -> None:
        self.message = message
        self.allowed = allowed
        super().__init__(f"{message}; allowed: {allowed}" if allowed else message)


class StackError(SlabwrightError, ValueError):
    """A stack, a frequency or an angle that the solver cannot take."""


def nearest(given: str, known: Iterable[str]) -> str:
    """Return ``, did you mean 'x'?`` for the closest of `known`, or an empty text when none is close."""
    close = difflib.get_close_matches(given, list(known), n=1, cutoff=0.6)
    return f", did you mean {close[0]!r}?" if close else ""
