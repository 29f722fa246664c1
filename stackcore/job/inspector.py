"""Reading a tree of JSON values piece by piece while collecting every fault with its path.

Each method returns a value that can be worked with: the one that was given, or the stand-in it was handed, so that
one fault never hides the next. What stands in for what is known by `Inspector.faulted`.
"""

import json
import math
import re
from collections.abc import Callable, Collection, Iterable, Mapping
from dataclasses import dataclass, field
from typing import Final, TypeVar

from stackcore.errors import Fault, UnitError, nearest
from stackcore.units import Dimension, Measure, parse_measure

MOST_FAULTS: Final = 500
"""Beyond this many, faults are counted but no longer told."""

T = TypeVar("T")

_PLAIN_KEY: Final = re.compile(r"[\w-]+")
_LONGEST_SHOWN: Final = 60
_LONGEST_MESSAGE: Final = 300
_MOST_COMPARED: Final = 1000


def join(path: str, key: str | int) -> str:
    """Return the path of a member: ``stacks`` and 0 -> ``stacks[0]``, ``sweep`` and ``angle`` -> ``sweep.angle``.

    A key that is not one word is written as in JSON: ``materials["E glass"]``.
    """
    if isinstance(key, int):
        return f"{path}[{key}]"
    if not _PLAIN_KEY.fullmatch(key):
        return f"{path}[{json.dumps(shortened(key), ensure_ascii=True)}]"
    return f"{path}.{key}" if path else key


def has_lone_surrogate(text: str) -> bool:
    """Return whether `text` holds what JSON can escape but UTF-8 cannot write."""
    return any("\ud800" <= letter <= "\udfff" for letter in text)


def shortened(text: str) -> str:
    """Return `text`, cut in the middle when it is long."""
    half = _LONGEST_SHOWN // 2
    return text if len(text) <= _LONGEST_SHOWN else f"{text[:half]}…{text[-half:]}"


def shown(value: object) -> str:
    """Return a JSON value on one line for a message; of lists and objects only what they are."""
    match value:
        case dict():
            return "an object {...}"
        case list():
            return f"a list of {len(value)}"
        case str():
            return repr(shortened(value))
        case bool() | None:
            return json.dumps(value)
        case int() | float():
            return shortened(repr(value))
    return f"a {type(value).__name__}"


def near(given: str, known: Collection[str]) -> str:
    """Return what `nearest` does, or nothing where the search would take long."""
    return nearest(given, known) if len(given) <= _LONGEST_SHOWN and len(known) <= _MOST_COMPARED else ""


def one_of(names: Iterable[str]) -> str:
    """Return ``one of a, b, c`` for an error, with the names in quotation marks."""
    listed = [repr(shortened(name)) for name in dict.fromkeys(names)]
    if len(listed) == 1:
        return listed[0]
    rest = f" and {len(listed) - 20} more" if len(listed) > 20 else ""
    return f"one of {', '.join(listed[:20])}{rest}"


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

    def constant(self, value: object, path: str, reader: Callable[[object], T]) -> T | None:
        """Return what the reader of a material's constant makes of `value`, None where it refuses."""
        try:
            return reader(value)
        except UnitError as error:
            plain = isinstance(value, str | int | float | list) and not isinstance(value, bool)
            self.fault(path, error.message if plain else f"{shown(value)} is not a number", error.allowed)
            return None
