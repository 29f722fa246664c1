"""Reading a tree of JSON values piece by piece while collecting every fault with its path.

Each method returns a value that can be worked with: the one that was given, or the stand-in it was handed, so that
one fault never hides the next. What stands in for what is known by `Inspector.faulted`.
"""

import json
import math
import re
from collections.abc import Callable, Iterable
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


def join(path: str, key: str | int) -> str:
    """Return the path of a member: ``stacks`` and 0 -> ``stacks[0]``, ``sweep`` and ``angle`` -> ``sweep.angle``.

    A key that is not one word is written as in JSON: ``materials["E glass"]``.
    """
    if isinstance(key, int):
        return f"{path}[{key}]"
    if not _PLAIN_KEY.fullmatch(key):
        return f"{path}[{json.dumps(shortened(key), ensure_ascii=True)}]"
    return f"{path}.{key}" if path else key


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


def one_of(names: Iterable[str]) -> str:
    """Return ``one of a, b, c`` for an error, with the names in quotation marks."""
    listed = [repr(shortened(name)) for name in names]
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
        self, value: object, path: str, known: Iterable[str], required: Iterable[str] = ()
    ) -> dict[str, object] | None:
        """Return an object whose keys are all in `known`; unknown, missing and doubled keys are faults."""
        if not isinstance(value, dict):
            self.fault(path, f"{shown(value)} is not an object", "an object {...}")
            return None
        known = tuple(known)
        self.repeated(value, path)
        for key in value:
            if key not in known:
                near = nearest(key, known) if len(key) <= _LONGEST_SHOWN else ""
                self.fault(join(path, key), f"unknown key {shown(key)}{near}", one_of(known))
        for key in required:
            if key not in value:
                self.fault(join(path, key), "is missing", f"{key!r} must be given")
        return value

    def repeated(self, value: dict[str, object], path: str) -> None:
        """Note the keys of an object that were given more than once."""
        for key in getattr(value, "repeated", ()):
            self.fault(join(path, key), f"the key {shown(key)} is given more than once", "each key once")

    def sequence(self, value: object, path: str) -> list[object]:
        """Return a list."""
        if isinstance(value, list):
            return value
        self.fault(path, f"{shown(value)} is not a list", "a list [...]")
        return []

    def text(self, value: object, path: str, stand_in: str = "") -> str:
        """Return a text that can be written as UTF-8."""
        if not isinstance(value, str):
            self.fault(path, f"{shown(value)} is not a text", 'a text in quotation marks: "..."')
            return stand_in
        if any("\ud800" <= letter <= "\udfff" for letter in value):
            self.fault(path, f"{shown(value)} holds half a character (a lone surrogate)", "whole characters")
            return stand_in
        return value

    def choice(self, value: object, path: str, known: Iterable[str], stand_in: str) -> str:
        """Return a text that is one of `known`."""
        known = tuple(known)
        if isinstance(value, str) and value in known:
            return value
        near = nearest(value, known) if isinstance(value, str) and len(value) <= _LONGEST_SHOWN else ""
        self.fault(path, f"{shown(value)} is not known{near}", one_of(known))
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
        return self.read(lambda: parse_measure(value, dimension), path, stand_in)

    def read(self, read: Callable[[], T], path: str, stand_in: T) -> T:
        """Return what `read` does, or note the UnitError that it raises."""
        try:
            return read()
        except UnitError as error:
            self.fault(path, error.message, error.allowed)
            return stand_in
