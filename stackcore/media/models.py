"""The models a library file can name: which constants each takes and how a medium is built from them.

A new model is one row in `MODELS`; the reading of files does not change.
"""

import math
from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Final

from stackcore.errors import UnitError
from stackcore.media.base import AbstractMedium, FrequencyRange, Provenance
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.units import Dimension, Measure, parse_measure

Constant = complex | float | Measure
"""A relative constant, a loss tangent, or a quantity with a unit."""


@dataclass(frozen=True, slots=True)
class Model:
    """One row of `MODELS`.

    Parameters
    ----------
    readers
        Name of each constant the model takes -> function from the value in the file to the constant. It
        raises `UnitError`.
    required
        The constants that must be given.
    build
        Function of the constants, the valid range and the provenance. It raises ValueError for values that
        each can be read but together do not make a medium.
    """

    readers: Mapping[str, Callable[[object], Constant]]
    required: tuple[str, ...]
    build: Callable[[Mapping[str, Constant], FrequencyRange | None, Provenance], AbstractMedium]


def read_relative(value: object) -> complex:
    """Return real − j·loss from a number or a pair ``[real, loss]``.

    Raises
    ------
    UnitError
        For anything else, a number that is not finite, or a negative loss.

    Examples
    --------
    >>> read_relative([4.0, 0.1])
    (4-0.1j)
    """
    allowed = "a number, or [real, loss] with loss 0 or more; for example 4.2 or [4.2, 0.06]"
    pair = [_number(part) for part in (value if isinstance(value, list) else [value, 0.0])]
    if len(pair) != 2 or None in pair:
        raise UnitError(f"{value!r} is not a relative constant", allowed)
    real, loss = (part for part in pair if part is not None)
    if loss < 0:
        raise UnitError(f"the loss {loss:g} is negative, which would be gain", allowed)
    return complex(real, -loss if loss else 0.0)


def read_loss_tangent(value: object) -> float:
    """Return a loss tangent, 0 or more; anything else raises `UnitError`."""
    tangent = _number(value)
    allowed = "a number, 0 or more; for example 0.015"
    if tangent is None:
        raise UnitError(f"{value!r} is not a loss tangent", allowed)
    if tangent < 0:
        raise UnitError(f"the loss tangent {tangent:g} is negative, which would be gain", allowed)
    return tangent


def read_conductivity(value: object) -> Measure:
    """Return a conductivity above 0 with the text it was given as; anything else raises `UnitError`."""
    allowed = "a conductivity above 0 with its unit; for example '58 MS/m' or '100 %IACS'"
    given = value if isinstance(value, str) else _number(value)
    if given is None:
        raise UnitError(f"{value!r} is not a conductivity", allowed)
    conductivity = parse_measure(given, Dimension.CONDUCTIVITY)
    if not conductivity.value > 0:
        raise UnitError(f"the conductivity {conductivity.text!r} is not above 0", allowed)
    return conductivity


def _number(value: object) -> float | None:
    """Return `value` as a finite float, or None; a truth value is not a number."""
    if isinstance(value, bool) or not isinstance(value, int | float):
        return None
    try:
        number = float(value)
    except OverflowError:
        return None
    return number if math.isfinite(number) else None


def _relative(constants: Mapping[str, Constant], name: str, default: complex) -> complex:
    value = constants.get(name, default)
    assert not isinstance(value, Measure)
    return complex(value)


def _build_constant(
    constants: Mapping[str, Constant], valid_range: FrequencyRange | None, provenance: Provenance
) -> ConstantMedium:
    permittivity = _relative(constants, "permittivity", 1.0)
    if "loss_tangent" in constants:
        if permittivity.imag != 0:
            raise ValueError("the dielectric loss is given twice, by loss_tangent and by [real, loss]")
        tangent = _relative(constants, "loss_tangent", 0.0).real
        permittivity = complex(permittivity.real, -permittivity.real * tangent)
    return ConstantMedium(permittivity, _relative(constants, "permeability", 1.0), valid_range, provenance)


def _build_conductor(
    constants: Mapping[str, Constant], valid_range: FrequencyRange | None, provenance: Provenance
) -> ConductorMedium:
    conductivity = constants["conductivity"]
    assert isinstance(conductivity, Measure)
    permeability = _relative(constants, "permeability", 1.0)
    return ConductorMedium(conductivity.value, permeability, valid_range, provenance)


MODELS: Final[Mapping[str, Model]] = {
    "constant": Model(
        {"permittivity": read_relative, "loss_tangent": read_loss_tangent, "permeability": read_relative},
        ("permittivity",),
        _build_constant,
    ),
    "conductor": Model(
        {"conductivity": read_conductivity, "permeability": read_relative},
        ("conductivity",),
        _build_conductor,
    ),
}
"""Name of the model in a file -> how to read and build it."""
