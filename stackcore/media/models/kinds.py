"""The kinds of constants a model can have: how each is read, checked, written and made into SI values.

A value of the wrong type is told where it is read, one that is out of its range by `Kind.faults`, which also judges
values that never were in a file.
"""

import cmath
import json
import math
from abc import ABC, abstractmethod
from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import Any

from stackcore.errors import Fault, UnitError
from stackcore.media.models import limits
from stackcore.media.models.limits import Limits, limit_faults
from stackcore.media.models.values import Value, plain_number
from stackcore.media.models.wording import near, one_of, shortened, shown
from stackcore.units import Dimension, Measure, measure, parse_measure
from stackcore.units.written import written_measure

Tell = Callable[[str, str, str], None]
"""Takes the path, the message and what is allowed of a fault."""


class Kind(ABC):
    """What values a constant may have."""

    __slots__ = ()

    @property
    @abstractmethod
    def word(self) -> str:
        """What it is in a word or two, for a table of models: ``relative``, ``number``, ``time``."""

    @property
    @abstractmethod
    def allowed(self) -> str:
        """What may be written, with an example."""

    @abstractmethod
    def read(self, given: object, path: str, tell: Tell) -> Value | None:
        """Return the value that stands in a file, or None after telling what is wrong with it."""

    @abstractmethod
    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        """Yield what is wrong with a value."""

    def written(self, value: Value) -> object:
        """Return what stands in a file for a value."""
        return value

    def si(self, value: Value) -> Any:
        """Return what the medium is built from."""
        return value

    def first(self) -> object:
        """Return what stands in a new file for a constant that must be given."""
        return 1.0

    def of_si(self, given: Any) -> Value | None:
        """Return the value of what a medium is built from, None where there is none."""
        return given if isinstance(given, float | str | bool) else None


@dataclass(frozen=True, slots=True)
class Relative(Kind):
    """ε or μ: a number, or a pair ``[real, loss]`` meaning real − j·loss."""

    @property
    def word(self) -> str:
        return "relative"

    @property
    def allowed(self) -> str:
        return "a number, or [real, loss] with loss 0 or more; for example 4.2 or [4.2, 0.06]"

    def read(self, given: object, path: str, tell: Tell) -> complex | None:
        parts = given if isinstance(given, list) else [given, 0.0]
        pair = [number_of(part) for part in parts]
        if len(pair) == 2 and pair[0] is not None and pair[1] is not None:
            return complex(pair[0], 0.0 - pair[1])
        what = shortened(repr(given)) if isinstance(given, list) else shown(given)
        told = "is not a relative constant" if isinstance(given, list) else "is not a number"
        tell(path, f"{what} {told}", self.allowed)
        return None

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if isinstance(value, bool) or not isinstance(value, complex | float | int):
            yield Fault(path, f"{typed(value)} is not a relative constant", self.allowed)
            return
        value = complex(value)
        if cmath.isnan(value):
            yield Fault(path, f"{shown_relative(value)} is not a number", self.allowed)
        elif not abs(value) <= limits.LARGEST_RELATIVE:
            yield Fault(path, f"{shown_relative(value)} is too large", "at most 1e12 in magnitude")
        elif value == 0:
            yield Fault(path, "must not be 0", "for example 4.2 or [4.2, 0.06]")
        elif value.imag > 0:
            message = f"the loss {-value.imag:g} is negative, which would be gain"
            yield Fault(path, message, "[real, loss] with loss 0 or more")

    def written(self, value: Value) -> object:
        assert isinstance(value, complex | float)
        value = complex(value)
        return (
            plain_number(value.real) if value.imag == 0 else [plain_number(value.real), plain_number(-value.imag)]
        )

    def of_si(self, given: Any) -> Value | None:
        return complex(given) if isinstance(given, complex | float) else None


@dataclass(frozen=True, slots=True)
class Number(Kind):
    """A number without a unit."""

    limits: Limits
    whole: bool = False

    @property
    def word(self) -> str:
        return "whole number" if self.whole else "number"

    @property
    def allowed(self) -> str:
        return f"a {self.word}, {self.limits.allowed}"

    def read(self, given: object, path: str, tell: Tell) -> float | None:
        number = number_of(given)
        if number is None:
            tell(path, f"{shown(given)} is not a {self.word}", self.allowed)
        return number

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if isinstance(value, bool) or not isinstance(value, float | int):
            yield Fault(path, f"{typed(value)} is not a {self.word}", self.allowed)
            return
        told = list(
            limit_faults(
                value, f"{plain_number(value)!r}" if math.isfinite(value) else str(value), self.limits, path
            )
        )
        if not told and self.whole and (not float(value).is_integer() or value == 0):
            told = [Fault(path, f"{value:g} is not a whole number other than 0", self.allowed)]
        yield from told

    def written(self, value: Value) -> object:
        assert isinstance(value, float | int)
        return plain_number(value)

    def first(self) -> object:
        return number_of(json.loads(self.limits.example.split()[0])) if self.limits.example else 1.0

    def si(self, value: Value) -> Any:
        assert isinstance(value, float | int)
        return int(value) if self.whole else float(value)


@dataclass(frozen=True, slots=True)
class Quantity(Kind):
    """A number with a unit; without one it is in the SI unit."""

    limits: Limits

    @property
    def dimension(self) -> Dimension:
        """What it measures."""
        return self.limits.dimension

    @property
    def word(self) -> str:
        return self.dimension.word

    @property
    def allowed(self) -> str:
        return f"{self.dimension.phrase} in {' '.join(self.dimension.units)}; {self.limits.allowed}"

    def read(self, given: object, path: str, tell: Tell) -> Measure | None:
        if isinstance(given, bool) or not isinstance(given, str | int | float):
            tell(path, f"{shown(given)} is not {self.dimension.phrase}", self.dimension.allowed)
            return None
        try:
            return parse_measure(given, self.dimension)
        except UnitError as error:
            tell(path, error.message, error.allowed)
            return None

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if not isinstance(value, Measure):
            yield Fault(path, f"{typed(value)} is not {self.dimension.phrase}", self.dimension.allowed)
            return
        yield from limit_faults(value.value, value.text, self.limits, path)

    def written(self, value: Value) -> object:
        assert isinstance(value, Measure)
        return written_measure(value, self.dimension)

    def first(self) -> object:
        return self.limits.example.strip("'") or self.dimension.example

    def si(self, value: Value) -> Any:
        assert isinstance(value, Measure)
        return value.value

    def of_si(self, given: Any) -> Value | None:
        return measure(given, self.dimension) if isinstance(given, float) else None


@dataclass(frozen=True, slots=True)
class Choice(Kind):
    """One of some words."""

    options: tuple[str, ...]

    @property
    def word(self) -> str:
        return "choice"

    @property
    def allowed(self) -> str:
        return one_of(self.options)

    def read(self, given: object, path: str, tell: Tell) -> str | None:
        if isinstance(given, str):
            return given
        tell(path, f"{shown(given)} is not a text", self.allowed)
        return None

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if value not in self.options:
            hint = near(value, self.options) if isinstance(value, str) else ""
            yield Fault(path, f"{typed(value)} is not known{hint}", self.allowed)


@dataclass(frozen=True, slots=True)
class Flag(Kind):
    """True or false."""

    @property
    def word(self) -> str:
        return "yes or no"

    @property
    def allowed(self) -> str:
        return "true or false"

    def read(self, given: object, path: str, tell: Tell) -> bool | None:
        if isinstance(given, bool):
            return given
        tell(path, f"{shown(given)} is neither true nor false", self.allowed)
        return None

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if not isinstance(value, bool):
            yield Fault(path, f"{typed(value)} is neither true nor false", self.allowed)


@dataclass(frozen=True, slots=True)
class Reference(Kind):
    """The name of another material; whether there is one is for who knows them to say."""

    @property
    def word(self) -> str:
        return "material"

    @property
    def allowed(self) -> str:
        return "the name of a material, or 'family/name' of one in the library"

    def read(self, given: object, path: str, tell: Tell) -> str | None:
        if isinstance(given, str):
            return given
        tell(path, f"{shown(given)} is not the name of a material", self.allowed)
        return None

    def first(self) -> object:
        return "air"

    def faults(self, value: Value, path: str) -> Iterator[Fault]:
        if not isinstance(value, str):
            yield Fault(path, f"{typed(value)} is not the name of a material", self.allowed)
        elif any("\ud800" <= letter <= "\udfff" for letter in value):
            yield Fault(path, f"{shown(value)} holds half a character (a lone surrogate)", "whole characters")


def number_of(value: object) -> float | None:
    """Return a finite number of a file as a float, or None; a truth value is not a number."""
    if isinstance(value, bool) or not isinstance(value, int | float):
        return None
    try:
        number = float(value)
    except OverflowError:
        return None
    return number if math.isfinite(number) else None


def shown_relative(value: complex) -> str:
    """Return ε or μ as a file has it: ``4.2`` or ``[4.2, 0.06]``."""
    return repr(value.real) if value.imag == 0 else f"[{value.real!r}, {-value.imag!r}]"


def typed(value: object) -> str:
    """Return a value that has the wrong type as a fault shows it."""
    return shown(value) if isinstance(value, str | bool | float | int) else f"a {type(value).__name__}"
