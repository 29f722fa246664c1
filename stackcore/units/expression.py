"""Text -> exact number with a unit: one number, or a short sum or product of them.

The text is cut into numbers, units and signs; a Python expression is written with a name in place of each number
and unit, and its syntax tree is walked with a whitelist. No text of the user is ever evaluated.
"""

import ast
import re
from collections.abc import Iterator
from dataclasses import dataclass
from fractions import Fraction
from typing import Final

from stackcore.errors import UnitError
from stackcore.units.dimensions import Dimension
from stackcore.units.spelling import find_unit, plain

LONGEST_TEXT: Final = 100
"""Characters; long enough for any value, short enough that nothing nests deep."""

_NUMBER: Final = r"(?:[0-9][0-9.,]*|[.,][0-9][0-9.,]*)(?:[eE][+-]?[0-9]+)?"
_INVERSE: Final = r"(?:1 *)?/ *(?:c?m\^?3|c?m³|s)(?!\w)|(?:s\^-1|c?m\^-3)(?!\w)"
_UNIT: Final = rf"{_INVERSE}|[^\W\d_]\w*(?: */ *[^\W\d_]\w*(?:\^\d)?)?|% *[A-Za-z]*|° *[CcFf]?|\""
_TOKEN: Final = re.compile(rf" *(?:(?P<number>{_NUMBER})|(?P<unit>{_UNIT})|(?P<sign>[-+*/()]))")
_SIMPLE: Final = re.compile(rf"(?P<number>[-+]?{_NUMBER}) *(?P<unit>{_UNIT})?")


@dataclass(frozen=True, slots=True)
class Amount:
    """An exact number of SI base units, or a pure number when `dimension` is None."""

    value: Fraction
    dimension: Dimension | None


def read_amount(text: str, dimension: Dimension) -> Amount:
    """Return what `text` amounts to; a text without any unit is a pure number.

    Raises
    ------
    UnitError
        When the text is not an amount. `dimension` is what is expected and only shapes the message: an amount of
        another dimension is returned as it is.
    """
    if len(text) > LONGEST_TEXT:
        raise UnitError(f"a text of {len(text)} characters is too long", f"at most {LONGEST_TEXT} characters")
    text = plain(text)
    if not text:
        raise UnitError("nothing is written", dimension.allowed)
    if simple := _SIMPLE.fullmatch(text):
        number = read_number(simple["number"])
        return Amount(number, None) if simple["unit"] is None else _of_unit(number, simple["unit"], dimension)
    return _evaluate(text, dimension)


def read_number(text: str) -> Fraction:
    """Return one decimal number exactly; a decimal comma counts where it can be nothing else.

    Raises
    ------
    UnitError
        For a comma that may separate thousands, and for a number beyond the range of a double.
    """
    if "," in text:
        text = _with_decimal_point(text)
    try:
        nearest = float(text)
    except ValueError:
        raise UnitError(f"{text!r} is not a number", "a number such as 1.5 or 1.5e-3") from None
    if nearest in (float("inf"), float("-inf")):
        raise UnitError(f"{text} is too large", "a finite number below 1.8e308")
    # A double that is 0 must come from digits that are all 0, or the exact fraction could fill the memory.
    if nearest == 0:
        if re.search(r"[1-9]", re.split(r"[eE]", text)[0]):
            raise UnitError(f"{text} is too small to be told from 0", "0, or a number beyond 5e-324")
        return Fraction(0)
    return Fraction(text)


def _with_decimal_point(text: str) -> str:
    """Return `text` with its decimal comma as a dot; refuse it when the comma may mean something else."""
    digits = re.split(r"[eE]", text)[0]
    whole, _, rest = digits.partition(",")
    if "." in digits or "," in rest:
        raise UnitError(f"{text!r} has more than one decimal sign", "one dot or one comma and no thousands signs")
    if len(rest) == 3 and whole.strip("+-0"):
        readings = f"{whole}.{rest} or {whole}{rest}"
        raise UnitError(f"{text!r} may mean {readings}", f"write {readings}")
    return text.replace(",", ".")


def _of_unit(number: Fraction, name: str, dimension: Dimension) -> Amount:
    unit = find_unit(name, dimension)
    kind = None if unit.dimension is Dimension.NUMBER else unit.dimension
    return Amount(number * unit.scale + unit.zero, kind)


def _unit_amount(name: str, dimension: Dimension) -> Amount:
    unit = find_unit(name, dimension)
    if unit.zero:
        raise UnitError(
            f"{unit.symbol} is a scale of its own zero and cannot be reckoned with", "one number in it, or K"
        )
    return Amount(unit.scale, None if unit.dimension is Dimension.NUMBER else unit.dimension)


def _tokens(text: str) -> Iterator[re.Match[str]]:
    place = 0
    while place < len(text):
        match = _TOKEN.match(text, place)
        if match is None:
            raise UnitError(
                f"{text[place:].strip()!r} cannot be read", "a number and a unit, joined by + - * / ( )"
            )
        yield match
        place = match.end()


def _evaluate(text: str, dimension: Dimension) -> Amount:
    amounts: list[Amount] = []
    source = ""
    after_value = False
    for token in _tokens(text):
        kind, written = token.lastgroup, token.group().strip()
        if kind == "sign":
            if written == "(" and after_value:
                raise UnitError(f"a sign is missing before '(' in {text!r}", "+ - * or / between two numbers")
            source += written
            after_value = written == ")"
            continue
        if kind == "number":
            if after_value:
                raise UnitError(
                    f"a sign is missing before {written!r} in {text!r}", "+ - * or / between two numbers"
                )
            amounts.append(Amount(read_number(written), None))
        else:
            if not after_value:
                raise UnitError(f"a number is missing before {written!r}", dimension.allowed)
            amounts.append(_unit_amount(written, dimension))
            source += "*"  # like any product, from left to right: 1/8 in is an eighth of an inch
        source += f"a{len(amounts) - 1}"
        after_value = True
    try:
        tree = ast.parse(source, mode="eval")
    except (SyntaxError, MemoryError, RecursionError):
        raise UnitError(f"{text!r} is not complete", "a number and a unit, joined by + - * / ( )") from None
    return _walk(tree.body, amounts)


def _walk(node: ast.expr, amounts: list[Amount]) -> Amount:
    match node:
        case ast.Name(id=name):
            return amounts[int(name[1:])]
        case ast.UnaryOp(op=ast.USub(), operand=operand):
            inner = _walk(operand, amounts)
            return Amount(-inner.value, inner.dimension)
        case ast.UnaryOp(op=ast.UAdd(), operand=operand):
            return _walk(operand, amounts)
        case ast.BinOp(left=left, op=ast.Add(), right=right):
            return _plus(_walk(left, amounts), _walk(right, amounts), 1)
        case ast.BinOp(left=left, op=ast.Sub(), right=right):
            return _plus(_walk(left, amounts), _walk(right, amounts), -1)
        case ast.BinOp(left=left, op=ast.Mult(), right=right):
            return _times(_walk(left, amounts), _walk(right, amounts))
        case ast.BinOp(left=left, op=ast.Div(), right=right):
            return _over(_walk(left, amounts), _walk(right, amounts))
    raise UnitError("only + - * / and ( ) can be read between numbers", "for example '2 * (1 mm + 20 um)'")


def _plus(left: Amount, right: Amount, sign: int) -> Amount:
    if left.dimension is not right.dimension:
        kinds = " and ".join(a.dimension.phrase if a.dimension else "a bare number" for a in (left, right))
        raise UnitError(f"{kinds} cannot be added", "a sum of one kind, each part with its unit: '1 mm + 20 um'")
    return Amount(left.value + sign * right.value, left.dimension)


def _times(left: Amount, right: Amount) -> Amount:
    if left.dimension is not None and right.dimension is not None:
        raise UnitError(
            f"{left.dimension.phrase} times {right.dimension.phrase} is neither", "one unit in each product"
        )
    return Amount(left.value * right.value, left.dimension or right.dimension)


def _over(left: Amount, right: Amount) -> Amount:
    if right.value == 0:
        raise UnitError("a division by 0", "a divisor other than 0")
    if right.dimension is None:
        return Amount(left.value / right.value, left.dimension)
    if left.dimension is right.dimension:
        return Amount(left.value / right.value, None)
    raise UnitError(f"a division by {right.dimension.phrase}", "a divisor without a unit")
