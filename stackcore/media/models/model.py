"""What a model is to files, windows and the command line: its words, its constants, and how a medium is built."""

import inspect
import re
from collections.abc import Callable, Iterator, Mapping
from dataclasses import dataclass, replace
from functools import lru_cache
from typing import Any

from stackcore.errors import Fault, InputError
from stackcore.media.base import UNSOURCED, AbstractMedium, FrequencyRange, Provenance
from stackcore.media.models.constants import (
    Constant,
    Terms,
    constant_faults,
    read_constants,
    si_values,
    write_constants,
)
from stackcore.media.models.kinds import Reference, Tell
from stackcore.media.models.values import Constants, Value
from stackcore.media.models.wording import join

Media = Mapping[str, AbstractMedium]
"""Name of a material, as another refers to it -> its medium."""

Make = Callable[[type[Any], dict[str, Any], dict[str, Any], Media], AbstractMedium]
"""Takes the class, the SI values by name, range and provenance where given, and the media referred to."""

LOSS_TWICE = "permittivity as a number with loss_tangent, or [real, loss] alone"

_FIRST_WORD = re.compile(r"([a-z_]+)((?:\[\d+\])?(?:\.[a-z_]+)?)\b")


def plain(medium: type[Any], values: dict[str, Any], extras: dict[str, Any], media: Media) -> AbstractMedium:
    """Build a medium whose fields are called like the constants."""
    built: AbstractMedium = medium(**values, **extras)
    return built


@dataclass(frozen=True, slots=True, eq=False)
class Model:
    """One row of the table of models.

    Parameters
    ----------
    name
        In files: ``cole-cole``.
    label
        In menus: ``Cole-Cole relaxation``.
    about
        One sentence on what it is for.
    medium
        The class of the medium, whose fields are called like the constants unless `make` says otherwise.
    constants
        In the order of files and forms.
    make
        How the medium is built.
    ranged
        Whether a range may be given; a joined material takes it from its parts.
    place
        Function from the place in a fault of the medium to the place in a file.
    """

    name: str
    label: str
    about: str
    medium: type[AbstractMedium]
    constants: tuple[Constant, ...]
    make: Make = plain
    ranged: bool = True
    place: Callable[[str], str] = str

    @property
    def formula(self) -> str:
        """The formula, as the medium's own documentation has it."""
        return inspect.cleandoc(self.medium.__doc__ or "").partition("\n")[0]

    @property
    def required(self) -> tuple[str, ...]:
        """Names of the constants that must be given."""
        return tuple(constant.name for constant in self.constants if constant.required)

    @property
    def names(self) -> tuple[str, ...]:
        """Names of all constants."""
        return tuple(constant.name for constant in self.constants)

    @property
    def nested(self) -> bool:
        """Whether it is made of other materials."""
        return bool(self.references(None))

    def constant(self, name: str) -> Constant | None:
        """Return the constant called `name`, or None."""
        return next((constant for constant in self.constants if constant.name == name), None)

    def default(self, name: str) -> Value | None:
        """Return what a constant is when it is not given, None where that is nothing.

        Examples
        --------
        >>> from stackcore.media.models import MODELS
        >>> MODELS["wideband"].default("upper_frequency")
        Measure(value=1000000000000.0, text='1 THz')
        """
        constant = self.constant(name)
        field = inspect.signature(self.medium).parameters.get(name)
        if constant is None or constant.required or field is None:
            return None
        return constant.kind.of_si(field.default)

    def start(self) -> Constants:
        """Return constants for a new material: those that must be given, with values to begin from."""

        def tell(path: str, message: str, allowed: str) -> None:
            raise AssertionError(f"{self.name}: {path}: {message}")

        return self.read({one.name: one.first() for one in self.constants if one.required}, "", tell)

    def renamed(self, constants: Constants, old: str, new: str) -> Constants:
        """Return constants that refer to `new` where they referred to `old`."""
        for constant in self.constants:
            value = constants.get(constant.name)
            if isinstance(constant.kind, Reference) and value == old:
                constants = constants.with_value(constant.name, new)
            elif isinstance(constant.kind, Terms) and isinstance(value, tuple):
                inner = [part.name for part in constant.kind.of if isinstance(part.kind, Reference)]
                for name in inner:
                    value = tuple(row.with_value(name, new) if row.get(name) == old else row for row in value)
                constants = constants.with_value(constant.name, value)
        return constants

    def references(self, constants: Mapping[str, Value] | None) -> tuple[tuple[str, str], ...]:
        """Return place and name of every material that `constants` refer to; of None, the places there can be."""
        found: list[tuple[str, str]] = []
        for constant in self.constants:
            value = None if constants is None else constants.get(constant.name)
            if isinstance(constant.kind, Reference) and (constants is None or isinstance(value, str)):
                found.append((constant.name, str(value or "")))
            elif isinstance(constant.kind, Terms):
                inner = [part.name for part in constant.kind.of if isinstance(part.kind, Reference)]
                rows = value if isinstance(value, tuple) else ()
                found += [(f"{constant.name}[].{name}", "") for name in inner if constants is None]
                found += [
                    (f"{constant.name}[{row}].{name}", str(held[name]))
                    for row, held in enumerate(rows)
                    for name in inner
                    if name in held
                ]
        return tuple(found)

    def read(self, given: Mapping[str, object], path: str, tell: Tell) -> Constants:
        """Return the constants in an object of a file; what is wrong is told with its place."""
        if (
            "loss_tangent" in given
            and isinstance(given.get("permittivity"), list)
            and self.constant("permittivity")
        ):
            told = "the loss is given twice, permittivity has it as well"
            tell(join(path, "loss_tangent"), told, LOSS_TWICE)
        return read_constants(self.constants, given, path, tell)

    def written(self, constants: Mapping[str, Value]) -> dict[str, object]:
        """Return the constants as they stand in a file."""
        return write_constants(self.constants, constants)

    def faults(self, constants: Constants, path: str) -> Iterator[Fault]:
        """Yield what is wrong with constants, each by itself and with each other."""
        for fault in _checked(self, constants):
            yield replace(fault, path=f"{path}.{fault.path}" if path else fault.path)

    def _check(self, constants: Constants) -> Iterator[Fault]:
        yield from constant_faults(self.constants, constants, "", f"the model {self.name!r}")
        permittivity, tangent = constants.get("permittivity"), constants.get("loss_tangent")
        if isinstance(permittivity, complex) and isinstance(tangent, float | int):
            place = "loss_tangent"
            if permittivity.imag:
                yield Fault(place, "the loss is given twice, permittivity has it as well", LOSS_TWICE)
            elif permittivity.real < 0 < tangent:
                allowed = "permittivity as [real, loss] where its real part is negative"
                yield Fault(
                    place, f"{tangent!r} with a permittivity of {permittivity.real:g} would be gain", allowed
                )

    def build(
        self,
        constants: Mapping[str, Value],
        valid_range: FrequencyRange | None = None,
        provenance: Provenance = UNSOURCED,
        media: Media | None = None,
    ) -> AbstractMedium:
        """Return the medium.

        Parameters
        ----------
        constants
            Without faults.
        valid_range, provenance
            Given to the medium; None and `UNSOURCED` leave the model's own.
        media
            Those that `references` name.

        Raises
        ------
        ValueError
            When the constants are well each by itself and make no passive medium together.
        """
        if media is None:
            return _built(self, Constants(constants), valid_range, provenance)
        return self._make(constants, valid_range, provenance, media)

    def _make(
        self,
        constants: Mapping[str, Value],
        valid_range: FrequencyRange | None,
        provenance: Provenance,
        media: Media,
    ) -> AbstractMedium:
        extras: dict[str, Any] = {}
        if valid_range is not None and self.ranged:
            extras["valid_range"] = valid_range
        if provenance != UNSOURCED:
            extras["provenance"] = provenance
        return self.make(self.medium, si_values(self.constants, constants), extras, media)

    def located(self, error: ValueError, path: str) -> tuple[Fault, ...]:
        """Return the faults of an error that `build` raised, each at its place in the file under `path`."""
        if isinstance(error, InputError):
            return tuple(
                Fault(f"{path}.{self.place(fault.path)}" if fault.path else path, fault.message, fault.allowed)
                for fault in error.faults
            )
        message = str(error)
        first = _FIRST_WORD.match(message)
        if first and first[1] in self.names:
            rest = message[first.end() :].strip() or message
            return (Fault(f"{path}.{first[1]}{first[2]}", rest, "a value with which the material is passive"),)
        return (Fault(path, message, "the constants of a passive material"),)


@lru_cache(maxsize=512)
def _checked(model: Model, constants: Constants) -> tuple[Fault, ...]:
    """Check, or return what was found before: a table of thousands of rows is the same at nearly every edit."""
    return tuple(model._check(constants))


@lru_cache(maxsize=512)
def _built(
    model: Model, constants: Constants, valid_range: FrequencyRange | None, provenance: Provenance
) -> AbstractMedium:
    """Build, or return what the same constants have built before: most edits leave most materials as they are."""
    return model._make(constants, valid_range, provenance, {})
