"""What a health check says."""

from collections.abc import Iterable
from dataclasses import dataclass, replace
from typing import Final, Literal

from stackcore.errors import Severity

Topic = Literal["passivity", "causality", "range", "condition", "join", "loss", "units", "edition"]

_ORDER: Final[dict[Severity, int]] = {"error": 0, "warning": 1, "note": 2}


@dataclass(frozen=True, slots=True)
class Finding:
    """One thing a user should know of a medium.

    Parameters
    ----------
    severity
        ``error``: results would be wrong; ``warning``: likely a slip, or far outside what is known; ``note``: good
        to know.
    topic
        What was checked.
    place
        Which constant, row or component, as in a path: ``inclusions[0].medium``; empty for the whole medium.
    reason
        What was found, with its numbers.
    hint
        What to do about it.

    Examples
    --------
    >>> str(Finding("warning", "range", "host", "the sweep leaves 8 GHz to 12 GHz", "look for data beyond"))
    'warning: host: the sweep leaves 8 GHz to 12 GHz; look for data beyond'
    """

    severity: Severity
    topic: Topic
    place: str
    reason: str
    hint: str

    def __str__(self) -> str:
        place = f"{self.place}: " if self.place else ""
        return f"{self.severity}: {place}{self.reason}; {self.hint}"

    def within(self, place: str) -> "Finding":
        """Return the finding as one of the component at `place`."""
        return replace(self, place=f"{place}.{self.place}" if self.place else place)


def worst_first(findings: Iterable[Finding]) -> tuple[Finding, ...]:
    """Return findings by severity, each once, otherwise in their order."""
    return tuple(sorted(dict.fromkeys(findings), key=lambda finding: _ORDER[finding.severity]))
