"""Numbers as people and instruments write them, with a decimal point or a decimal comma."""

import math
import re
from typing import Final, Literal

Decimal = Literal[".", ","]

_SIGNS: Final = str.maketrans({"−": "-", "\u2012": "-", "\u2013": "-", "\u00a0": " ", "\u2009": " ", "\u202f": " "})


def _pattern(mark: Decimal, group: Decimal) -> re.Pattern[str]:
    whole = rf"(?:[1-9]\d{{0,2}}(?:[{group}' ]\d{{3}})+|\d+)?"
    return re.compile(rf"[+-]?{whole}(?:[{mark}]\d+|(?<=\d)[{mark}])?(?:[eEdD][+-]?\d+)?")


_PATTERNS: Final[dict[Decimal, re.Pattern[str]]] = {".": _pattern(".", ","), ",": _pattern(",", ".")}
"""Groups of thousands are told by the other mark, an apostrophe or a space and start with no 0."""

_NOT_NUMBERS: Final = frozenset(
    {"nan", "inf", "-inf", "+inf", "infinity", "-infinity", "n/a", "na", "-", "--", "#n/a"}
)


def plain_cell(cell: str) -> str:
    """Return a cell without spaces around it and with one kind of minus and space."""
    return cell.translate(_SIGNS).strip()


def read_number(cell: str, decimal: Decimal) -> float | None:
    """Return the number a cell holds, None when it holds none.

    Examples
    --------
    >>> read_number("1,5e9", ","), read_number("1.234,5", ","), read_number("12,345", ".")
    (1500000000.0, 1234.5, 12345.0)
    >>> read_number("0,015", ".") is None
    True
    """
    text = plain_cell(cell)
    if not any(sign.isdigit() for sign in text) or not text.isascii() or not _PATTERNS[decimal].fullmatch(text):
        return None
    group = "," if decimal == "." else "."
    for sign in (group, "'", " "):
        text = text.replace(sign, "")
    value = float(text.replace(decimal, ".").replace("d", "e").replace("D", "e"))
    return value if math.isfinite(value) else None


def missing_number(cell: str) -> bool:
    """Return whether a cell says that a number is missing: empty, ``nan``, ``n/a``."""
    text = plain_cell(cell).casefold()
    return not text or text in _NOT_NUMBERS
