"""What a pasted block leaves open: numbers without a unit, and commas that may divide thousands. No toolkit."""

import re
from collections.abc import Mapping, Sequence
from dataclasses import dataclass
from typing import Final, Literal

from app.panels.elements.columns import ALL_COLUMNS, MATERIAL, THICKNESS, WHAT
from stackcore.units import Dimension, format_value, parse_measure

Comma = Literal["decimal", "thousands"]
Rows = Sequence[Mapping[str, str]]

UNITS: Final = ("mm", "µm", "nm", "cm", "m", "mil", "in")
"""Offered for thicknesses without one, the usual first."""
COMMAS: Final[dict[Comma, str]] = {"decimal": "the decimal sign", "thousands": "between thousands"}

_BARE: Final = re.compile(r"[-+−]?[\d.,]+(?:[eE][-+]?\d+)?")
_THOUSANDS: Final = re.compile(r"[-+−]?[1-9]\d{0,2}(?:,\d{3})+(?:\.\d+)?")
_COMMA: Final = re.compile(r"\d,\d")
_MEASURED: Final = tuple(column.name for column in ALL_COLUMNS if column.dimension not in (None, Dimension.NUMBER))


@dataclass(frozen=True, slots=True)
class Doubts:
    """What must be asked before a block is pasted.

    Parameters
    ----------
    unit
        Whether a thickness of a new element has no unit.
    comma
        Whether every comma of the block stands where it may divide thousands, ``1,234``.
    """

    unit: bool = False
    comma: bool = False

    def __bool__(self) -> bool:
        return self.unit or self.comma


def doubts_of(pasted: Rows, typed_over: int) -> Doubts:
    """Return what a block leaves open.

    Parameters
    ----------
    pasted
        Rows of texts by column name.
    typed_over
        How many of the first rows are typed over present elements; there a bare number has the unit of the
        number before, as when it is typed.

    Examples
    --------
    >>> doubts_of([{"material": "air", "thickness": "0.5"}], 0)
    Doubts(unit=True, comma=False)
    >>> doubts_of([{"thickness": "1,234 um"}, {"thickness": "0,5 um"}], 0)
    Doubts(unit=False, comma=False)
    """
    thicknesses = [texts.get(THICKNESS.name, "") for texts in pasted[typed_over:]]
    numbers = [text for texts in pasted for name in _MEASURED if _COMMA.search(text := texts.get(name, ""))]
    return Doubts(
        any(_BARE.fullmatch(text) for text in thicknesses),
        bool(numbers) and all(_THOUSANDS.match(text) and _only_thousands(text) for text in numbers),
    )


def settled(pasted: Rows, typed_over: int, unit: str, comma: Comma) -> tuple[dict[str, str], ...]:
    """Return the rows as they are pasted: thicknesses with `unit`, and commas as they are meant.

    Examples
    --------
    >>> settled([{"thickness": "1,234"}], 0, "um", "thousands")
    ({'thickness': '1234 um'},)
    """
    return tuple(
        _settled_row(texts, unit if place >= typed_over else "", comma) for place, texts in enumerate(pasted)
    )


def preview(rows: Rows) -> str:
    """Return the rows for reading, a line each: what it is, and its values in plain numbers."""
    return "\n".join("   ".join(part for part in _shown(texts) if part) for texts in rows)


def _only_thousands(text: str) -> bool:
    return not re.search(r",\d{1,2}(?!\d)|,\d{4,}", text)


def _settled_row(texts: Mapping[str, str], unit: str, comma: Comma) -> dict[str, str]:
    row = dict(texts)
    for name in _MEASURED:
        text = row.get(name, "")
        if _THOUSANDS.match(text):
            # Written so that it has one meaning only: with the comma it would be refused for its two.
            text = row[name] = text.replace(",", "" if comma == "thousands" or text.count(",") > 1 else ".")
        if name == THICKNESS.name and unit and _BARE.fullmatch(text):
            row[name] = f"{text} {unit}"
    return row


def _shown(texts: Mapping[str, str]) -> list[str]:
    parts = [texts.get(WHAT.name, ""), texts.get(MATERIAL.name, "")]
    for column in ALL_COLUMNS:
        text = texts.get(column.name, "")
        if column.name in _MEASURED and text and column.dimension is not None:
            try:
                value = parse_measure(text, column.dimension).value
            except ValueError:
                parts.append(f"{text} (has no value)")
            else:
                parts.append(format_value(value, column.dimension, digits=7))
    return parts
