"""A value with the text it was typed as, and the two ways between them."""

import math
from dataclasses import dataclass
from decimal import ROUND_HALF_EVEN, Context, Decimal
from fractions import Fraction
from functools import lru_cache
from typing import Final

from stackcore.errors import UnitError
from stackcore.units.dimensions import UNITS, Dimension, Unit
from stackcore.units.expression import read_amount
from stackcore.units.spelling import find_unit, plain

_LARGE: Final = 1e300
_COLD: Final = 150
_HOT: Final = 3000
"""K, between which temperatures are shown in °C."""
_EXACT: Final = Context(prec=60, rounding=ROUND_HALF_EVEN)


@dataclass(frozen=True, slots=True)
class Measure:
    """A quantity: its value in the SI base unit and the text that says so.

    `parse_measure(text, dimension)` gives `value` again; `parse_measure` and `measure` see to that.

    Examples
    --------
    >>> parse_measure("1/8 in", Dimension.LENGTH)
    Measure(value=0.003175, text='1/8 in')
    """

    value: float
    text: str

    def __str__(self) -> str:
        return self.text


def parse_measure(given: str | float | int, dimension: Dimension, *, default_unit: str | None = None) -> Measure:
    """Read a quantity of one dimension.

    Parameters
    ----------
    given
        A number is in the SI base unit. A text is one number and a unit, or a short sum, product or quotient of
        them: ``2 mm``, ``1/8 in``, ``1 mm + 20 um``, ``3 * 0.2 mm``. One decimal comma is understood.
    dimension
        What is expected.
    default_unit
        Unit of a text without one; None means the SI base unit.

    Returns
    -------
    Measure
        The nearest double, and the text as typed. A text that took `default_unit` has it written behind, so that it
        means the same where there is another default, or none.

    Raises
    ------
    UnitError
        When it is not such a quantity; the message says what was expected and names the nearest unit.

    Examples
    --------
    >>> parse_measure("30 µm", Dimension.LENGTH).value
    3e-05
    >>> parse_measure("1,5", Dimension.LENGTH, default_unit="mm")
    Measure(value=0.0015, text='1,5 mm')
    """
    if isinstance(given, str):
        return _parse_text(given, dimension, default_unit)
    if isinstance(given, bool) or not isinstance(given, int | float):
        raise UnitError(f"{given!r} is not a number or a text", dimension.allowed)
    try:
        value = float(given)
    except OverflowError:
        raise UnitError("the number is too large", "a finite number below 1.8e308") from None
    if not math.isfinite(value):
        raise UnitError(f"{value} is not a finite number", dimension.allowed)
    return Measure(value, repr(given) if type(given) is int else repr(value))


@lru_cache(maxsize=4096)
def _parse_text(text: str, dimension: Dimension, default_unit: str | None) -> Measure:
    amount = read_amount(text, dimension)
    text = text.strip()
    value = amount.value
    if amount.dimension is None and dimension is not Dimension.NUMBER:
        if "%" in text:
            raise UnitError(f"{text!r} is a fraction, not {dimension.phrase}", dimension.allowed)
        if default_unit is not None:
            unit = _unit(default_unit, dimension)
            value = value * unit.scale + unit.zero
            bare = text if not any(sign in plain(text)[1:] for sign in "+-") or _is_number(text) else f"({text})"
            text = f"{bare} {default_unit}"
    elif amount.dimension is not None and amount.dimension is not dimension:
        raise UnitError(f"{text!r} is {amount.dimension.phrase}, not {dimension.phrase}", dimension.allowed)
    return Measure(_nearest_double(value, text), text)


def _is_number(text: str) -> bool:
    try:
        float(plain(text).replace(",", "."))
    except ValueError:
        return False
    return True


def _unit(unit: str, dimension: Dimension) -> Unit:
    """Return the unit called `unit`, or raise UnitError when it is no unit of `dimension`."""
    if not unit and dimension is Dimension.NUMBER:
        return Unit("", Fraction(1), dimension)
    found = find_unit(plain(unit), dimension)
    if found.dimension is not dimension:
        raise UnitError(f"{unit!r} is a unit of {found.dimension.word}, not of {dimension.word}", dimension.allowed)
    return found


def _nearest_double(value: Fraction, text: str) -> float:
    try:
        # Division of whole numbers rounds once, to the nearest double.
        nearest = value.numerator / value.denominator
    except OverflowError:
        raise UnitError(f"{text!r} is too large", "a finite number below 1.8e308 in SI units") from None
    if nearest == 0 and value != 0:
        raise UnitError(f"{text!r} is too small to be told from 0", "0, or a number beyond 5e-324 in SI units")
    return nearest


def format_value(value: float, dimension: Dimension, *, unit: str | None = None, digits: int | None = None) -> str:
    """Write a value in a readable unit.

    Parameters
    ----------
    value
        In the SI base unit.
    dimension
        What it is.
    unit
        The unit to write it in, as it is to be spelled; None chooses: ``0.9 mm``, ``35 µm``, ``10 GHz``.
    digits
        Significant digits, zeros at the end left out; None writes as many as `parse_measure` needs to find exactly
        `value` again.

    Returns
    -------
    str
        Number, space, unit. A value that is not finite is written ``inf``, ``-inf`` or ``nan``, which
        `parse_measure` refuses.

    Raises
    ------
    UnitError
        When `unit` is no unit of `dimension`.

    Examples
    --------
    >>> format_value(0.0009, Dimension.LENGTH), format_value(1e10 / 3, Dimension.FREQUENCY, digits=4)
    ('0.9 mm', '3.333 GHz')
    """
    value = float(value)
    if not math.isfinite(value):
        return f"{value} {unit or dimension.usual_unit}".strip()
    if unit is None and abs(value) > _LARGE:
        unit = dimension.si_unit  # in another one the number itself might be beyond every double
    elif unit is None:
        # The decimal a person sees, not the double a hair below it, decides: 1e-12 F is 1 pF.
        seen = Decimal(repr(value)) if digits is None else _rounded(Fraction(value), digits)
        unit = _readable_unit(abs(Fraction(seen)), dimension)
    written = _unit(unit, dimension) if unit else _unit(dimension.si_unit, dimension)
    exact = _from_zero(value, written) / written.scale
    number = _shortest(value, written) if digits is None else _rounded(exact, digits)
    return f"{_plain_number(number)} {unit}".strip()


def measure(value: float, dimension: Dimension) -> Measure:
    """Return `value` (SI) with the text `format_value` writes for it.

    Examples
    --------
    >>> measure(0.0009, Dimension.LENGTH)
    Measure(value=0.0009, text='0.9 mm')
    """
    return Measure(float(value), format_value(value, dimension))


def degrees_of(angle: float) -> float:
    """Return the degrees that an angle in rad was given as, by a text or through `math.radians`.

    It is the shortest number that either makes into `angle` again.

    Examples
    --------
    >>> degrees_of(math.radians(57.0)), math.degrees(math.radians(57.0))
    (57.0, 57.00000000000001)
    """
    scale = _unit("deg", Dimension.ANGLE).scale
    for digits in range(1, 18):
        degrees = float(f"{math.degrees(angle):.{digits}g}")
        exact = Fraction(repr(degrees)) * scale
        if angle in (math.radians(degrees), exact.numerator / exact.denominator):
            return degrees
    return math.degrees(angle)


def _readable_unit(magnitude: Fraction, dimension: Dimension) -> str:
    if dimension is Dimension.TEMPERATURE:
        return dimension.usual_unit if _COLD <= magnitude <= _HOT else dimension.si_unit
    if magnitude == 0:
        return dimension.usual_unit
    ladder = dimension.ladder
    return next((unit for unit, smallest in ladder if magnitude >= smallest), ladder[-1][0])


def _from_zero(value: float, unit: Unit) -> Fraction:
    """Return how far a value lies from the zero of its unit; nothing where it is the double nearest to it."""
    return Fraction(0) if unit.zero and float(unit.zero) == value else Fraction(value) - unit.zero


def _decimal(value: Fraction) -> Decimal:
    return _EXACT.divide(Decimal(value.numerator), Decimal(value.denominator))


def _rounded(value: Fraction, digits: int) -> Decimal:
    return Context(prec=max(digits, 1), rounding=ROUND_HALF_EVEN).plus(_decimal(value))


def _shortest(value: float, unit: Unit) -> Decimal:
    """Return the decimal with the fewest digits that has `value` as nearest double when it is in `unit`."""
    wanted = _decimal(_from_zero(value, unit) / unit.scale)
    if not wanted:
        return Decimal(0)
    # A double near absolute zero needs the digits of 273.15 in front of its own.
    most = _EXACT.prec if unit.zero else 18
    for digits in range(1, most):
        candidate = Context(prec=digits, rounding=ROUND_HALF_EVEN).plus(wanted)
        try:
            found = Fraction(candidate) * unit.scale + unit.zero
            if found.numerator / found.denominator == value:
                return candidate
        except OverflowError:  # rounded up beyond the largest double
            continue
    return Context(prec=20).plus(wanted)


def _plain_number(number: Decimal) -> str:
    """Return `number` without an exponent where that is readable, without zeros at the end."""
    number = number.normalize(_EXACT)
    if not number:
        return "0"
    if -5 <= number.adjusted() < 16:
        return format(number, "f")
    mantissa, exponent = number.as_tuple().digits, number.adjusted()
    digits = str(mantissa[0]) + ("." + "".join(map(str, mantissa[1:])) if len(mantissa) > 1 else "")
    return f"{'-' if number.is_signed() else ''}{digits}e{exponent}"


def known_units(dimension: Dimension) -> tuple[str, ...]:
    """Return every name a unit of `dimension` may be typed as, for completion in an input."""
    return tuple(name for name, unit in UNITS.items() if unit.dimension is dimension)
