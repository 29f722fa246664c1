"""Reading a tree of JSON values piece by piece while collecting every fault with its path.

Each method returns a value that can be worked with: the one that was given, or the stand-in it was handed, so that
one fault never hides the next. What stands in for what is known by `Inspector.faulted`.
"""

import math
from collections.abc import Iterable, Mapping
from dataclasses import dataclass, field
from typing import Final

from stackcore.errors import Fault, UnitError
from stackcore.media.models.wording import join as join
from stackcore.media.models.wording import near as near
from stackcore.media.models.wording import one_of as one_of
from stackcore.media.models.wording import shortened as shortened
from stackcore.media.models.wording import shown as shown
from stackcore.units import Dimension, Measure, parse_measure

MOST_FAULTS: Final = 500
"""Beyond this many, faults are counted but no longer told."""

_LONGEST_MESSAGE: Final = 300


def has_lone_surrogate(text: str) -> bool:
    """Return whether `text` holds what JSON can escape but UTF-8 cannot write."""
    return any("\ud800" <= letter <= "\udfff" for letter in text)


@dataclass(slots=True)
class Inspector:
    """Faults found so far."""

    faults: list[Fault] = field(default_factory=list)
    faulted: set[str] = field(default_factory=set)
    untold: int = 0

    def fault(self, path: str, message: str, allowed: str = "") -> None:
        """Note a fault; its message is kept to one line of reasonable length."""
        self.faulted.add(path)
        if len(self.faults) >= MOST_FAULTS:
            self.untold += 1
            return
        if len(message) > _LONGEST_MESSAGE:
            message = f"{message[: _LONGEST_MESSAGE - 60]}…{message[-60:]}"
        self.faults.append(Fault(path, message, allowed))

    def mapping(
        self, value: object, path: str, known: Iterable[str], required: Mapping[str, str] | None = None
    ) -> dict[str, object] | None:
        """Return an object whose keys are all in `known`; unknown, missing and doubled keys are faults.

        `required` has, for each key that must be there, an example of it as it stands in a file.
        """
        if not isinstance(value, dict):
            self.fault(path, f"{shown(value)} is not an object", "an object {...}")
            return None
        known = tuple(known)
        self.repeated(value, path)
        for key in value:
            if key not in known:
                self.fault(join(path, key), f"unknown key {shown(key)}{near(key, known)}", one_of(known))
            if self.untold:  # an object of a million wrong keys
                break
        for key, example in (required or {}).items():
            if key not in value:
                self.fault(join(path, key), "is missing", example)
        return value

    def repeated(self, value: dict[str, object], path: str) -> None:
        """Note the keys of an object that were given more than once."""
        for key in getattr(value, "repeated", ()):
            self.fault(join(path, key), f"the key {shown(key)} is given more than once", "each key once")

    def sequence(self, value: object, path: str, most: int) -> list[object]:
        """Return a list of at most `most` values."""
        if not isinstance(value, list):
            self.fault(path, f"{shown(value)} is not a list", "a list [...]")
            return []
        if len(value) > most:
            self.fault(path, f"the list has {len(value)} values", f"at most {most}")
            return []
        return value

    def text(self, value: object, path: str, stand_in: str = "") -> str:
        """Return a text that can be written as UTF-8."""
        if not isinstance(value, str):
            self.fault(path, f"{shown(value)} is not a text", 'a text in quotation marks: "..."')
            return stand_in
        if has_lone_surrogate(value):
            self.fault(path, f"{shown(value)} holds half a character (a lone surrogate)", "whole characters")
            return stand_in
        return value

    def choice(self, value: object, path: str, known: Iterable[str], stand_in: str) -> str:
        """Return a text that is one of `known`."""
        known = tuple(known)
        if isinstance(value, str) and value in known:
            return value
        hint = near(value, known) if isinstance(value, str) else ""
        self.fault(path, f"{shown(value)} is not known{hint}", one_of(known))
        return stand_in

    def whole(self, value: object, path: str, stand_in: int, allowed: str) -> int:
        """Return a whole number; 401.0 is one, true is none."""
        if isinstance(value, int) and not isinstance(value, bool):
            return value
        if isinstance(value, float) and math.isfinite(value) and value.is_integer():
            return int(value)
        self.fault(path, f"{shown(value)} is not a whole number", allowed)
        return stand_in

    def measure(self, value: object, path: str, dimension: Dimension, stand_in: Measure) -> Measure:
        """Return a quantity with its unit."""
        if isinstance(value, bool) or not isinstance(value, str | int | float):
            self.fault(path, f"{shown(value)} is not {dimension.phrase}", dimension.allowed)
            return stand_in
        try:
            return parse_measure(value, dimension)
        except UnitError as error:
            self.fault(path, error.message, error.allowed)
            return stand_in
