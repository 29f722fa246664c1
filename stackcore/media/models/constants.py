"""A constant of a model: its name, words and kind; and lists of rows that each hold constants."""

from collections.abc import Callable, Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from typing import Any

from stackcore.errors import Fault
from stackcore.media.models.kinds import Kind, Tell, typed
from stackcore.media.models.values import Constants, Value
from stackcore.media.models.wording import join, near, one_of, shown


@dataclass(frozen=True, slots=True)
class Terms(Kind):
    """A list of rows that each hold the same constants.

    Parameters
    ----------
    of
        The constants of a row.
    make
        What a row becomes in the medium, from its SI values by name.
    least, most
        How many rows there may be.
    row
        What a row is called.
    """

    of: tuple["Constant", ...]
    make: Callable[..., Any] = dict
    least: int = 1
    most: int = 1000
    row: str = "term"

    @property
    def word(self) -> str:
        return "table" if self.row == "row" else f"list of {self.row}s"

    @property
    def allowed(self) -> str:
        inner = ", ".join(f'"{part.name}": ...' for part in self.of if part.required)
        return f"a list of {self.least} to {self.most} {self.row}s, each {{{inner}}}"

    def read(self, given: object, path: str, tell: Tell) -> Value | None:
        if not isinstance(given, list):
            tell(path, f"{shown(given)} is not a list", self.allowed)
            return None
        if len(given) > self.most:
            tell(path, f"the list has {len(given)} {self.row}s", self.allowed)
            return None
        rows = [self._row(item, join(path, place), tell) for place, item in enumerate(given)]
        return None if None in rows else tuple(row for row in rows if row is not None)

    def _row(self, given: object, path: str, tell: Tell) -> Constants | None:
        if not isinstance(given, dict):
            tell(path, f"{shown(given)} is not an object", self.allowed)
            return None
        tell_unknown(given, [part.name for part in self.of], path, tell)
        return read_constants(self.of, given, path, tell)

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if not isinstance(value, tuple) or not all(isinstance(row, Constants) for row in value):
            yield Fault(path, f"{typed(value)} is not a list of {self.row}s", self.allowed)
            return
        if not self.least <= len(value) <= self.most:
            yield Fault(path, f"the list has {len(value)} {self.row}{'' if len(value) == 1 else 's'}", self.allowed)
        for place, row in enumerate(value):
            yield from constant_faults(self.of, row, join(path, place), f"a {self.row}")

    def written(self, value: Value) -> object:
        assert isinstance(value, tuple)
        return [write_constants(self.of, row) for row in value]

    def first(self) -> object:
        return [{part.name: part.first() for part in self.of if part.required}] * self.least

    def first_row(self) -> Constants:
        """Return a row to begin from."""

        def tell(path: str, message: str, allowed: str) -> None:
            raise AssertionError(f"{path}: {message}")

        given = {part.name: part.first() for part in self.of if part.required}
        return read_constants(self.of, given, "", tell)

    def si(self, value: Value) -> Any:
        assert isinstance(value, tuple)
        return tuple(self.make(**si_values(self.of, row)) for row in value)

    def of_si(self, given: Any) -> Value | None:
        return None


@dataclass(frozen=True, slots=True)
class Constant:
    """One constant of a model, or of a row of a list.

    Parameters
    ----------
    name
        In files, and of the medium's field.
    label
        In the window and on the command line: ``Relaxation time``.
    symbol
        In formulas: ``τ``.
    kind
        What values it may have.
    about
        One sentence on what it is.
    required
        Whether it must be given.
    varies
        Whether a library entry must say how much it varies in production.
    start
        What it is in a new material, as it stands in a file; None takes the example of its kind.
    """

    name: str
    label: str
    symbol: str
    kind: Kind
    about: str
    required: bool = True
    varies: bool = False
    start: Any = None

    def optional(self, about: str = "") -> "Constant":
        """Return the constant as one that may be left out."""
        return replace(self, about=about or self.about, required=False)

    def first(self) -> object:
        """Return what it is in a new material, as it stands in a file."""
        return self.kind.first() if self.start is None else self.start


def tell_unknown(given: Mapping[str, object], known: Sequence[str], path: str, tell: Tell) -> None:
    """Tell the keys of an object that are not known, and those that were given more than once."""
    for key in getattr(given, "repeated", ()):
        tell(join(path, key), f"the key {shown(key)} is given more than once", "each key once")
    for key in given:
        if key not in known:
            tell(join(path, key), f"unknown key {shown(key)}{near(key, known)}", one_of(known))


def read_constants(of: Sequence[Constant], given: Mapping[str, object], path: str, tell: Tell) -> Constants:
    """Return those constants of an object that can be read; what is wrong with the others is told."""
    found: dict[str, Value] = {}
    for constant in of:
        if constant.name in given:
            value = constant.kind.read(given[constant.name], join(path, constant.name), tell)
            if value is not None:
                found[constant.name] = value
    return Constants(found)


def constant_faults(of: Sequence[Constant], constants: Constants, path: str, owner: str) -> Iterator[Fault]:
    """Yield what is wrong with constants: missing ones, unknown ones, values out of range."""
    known = {constant.name: constant for constant in of}
    for name in constants:
        if name not in known:
            yield Fault(join(path, name), f"{owner} has no {name}{near(name, known)}", one_of(known))
    for name, constant in known.items():
        if name in constants:
            yield from constant.kind.faults(constants[name], join(path, name))
        elif constant.required:
            yield Fault(join(path, name), "is missing", f"{owner} needs it: {constant.kind.allowed}")


def write_constants(of: Sequence[Constant], constants: Mapping[str, Value]) -> dict[str, object]:
    """Return what stands in a file for constants, in the order of the model."""
    return {
        constant.name: constant.kind.written(constants[constant.name])
        for constant in of
        if constant.name in constants
    }


def si_values(of: Sequence[Constant], constants: Mapping[str, Value]) -> dict[str, Any]:
    """Return the SI values of constants by name."""
    return {
        constant.name: constant.kind.si(constants[constant.name]) for constant in of if constant.name in constants
    }
