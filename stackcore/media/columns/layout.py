"""How a text is laid out: comments, headings, separator and decimal sign."""

import csv
import re
from collections import Counter
from collections.abc import Iterator, Sequence
from dataclasses import dataclass, replace
from typing import Final, Literal

from stackcore.media.columns.cells import Decimal, read_number
from stackcore.media.columns.headings import read_heading, unit_of_any

Separator = Literal["tab", "semicolon", "comma", "spaces", "comma pairs"]

_SIGN_OF: Final[dict[Separator, str]] = {
    "tab": "\t",
    "semicolon": ";",
    "comma": ",",
    "spaces": " ",
    "comma pairs": ",",
}

_SAMPLE: Final = 2000
"""Lines that are looked at to find the layout."""

_COMMENT: Final = re.compile(r"\s*(#|%|!|//)\s?")

_NAME_PARTS: Final = re.compile(
    r"""[^\s(\[]+\s?[(\[][^)\]]*[)\]]      # name and unit in brackets
    |tan\s?(?:d|δ|delta)\w*                # of two words
    |(?:loss|dissipation|photon|refractive|relative|dielectric|extinction)\s\w+
    |\S+""",
    re.VERBOSE | re.IGNORECASE,
)


@dataclass(frozen=True, slots=True)
class Line:
    """A line of the file that is not empty: its number from 1, its text, and whether it was marked as a comment."""

    number: int
    text: str
    comment: bool


@dataclass(frozen=True, slots=True)
class Layout:
    """How the data lines are cut into numbers, and the readings that would cut them otherwise.

    Parameters
    ----------
    separator, decimal
        As taken.
    other_separator, other_decimal
        What they could be as well, with another result; None when there is no doubt.
    width
        Number of columns.
    first
        Place among the lines of the first one of numbers.
    """

    separator: Separator
    decimal: Decimal
    other_separator: Separator | None
    other_decimal: Decimal | None
    width: int
    first: int


def lines_of(text: str) -> tuple[Line, ...]:
    """Return the lines that hold anything, comment marks taken off."""
    found = []
    for number, line in enumerate(text.splitlines(), 1):
        mark = _COMMENT.match(line)
        stripped = line[mark.end() :] if mark else line
        if stripped.strip():
            found.append(Line(number, stripped.rstrip(), mark is not None))
    return tuple(found)


def cut(line: str, separator: Separator) -> list[str]:
    """Return the cells of a line; quotation marks hold a cell together.

    Examples
    --------
    >>> cut('8,2 ; "3,01" ', "semicolon"), cut("8,2,3,01", "comma pairs")
    (['8,2', '3,01'], ['8,2', '3,01'])
    """
    if separator == "spaces":
        line = line.replace("\t", " ").strip()
    # A double prime such as in ε" is no quotation mark.
    if line.count('"') % 2:
        rows = csv.reader([line], delimiter=_SIGN_OF[separator], skipinitialspace=True, quoting=csv.QUOTE_NONE)
    else:
        rows = csv.reader([line], delimiter=_SIGN_OF[separator], skipinitialspace=True)
    try:
        cells = [cell.strip() for cell in next(rows, [])]
    except csv.Error:  # a cell of more than a hundred thousand signs
        return [line]
    if separator == "comma pairs":
        return [",".join(cells[place : place + 2]) for place in range(0, len(cells), 2)]
    return cells


def find_layout(
    lines: Sequence[Line], separator: Separator | None = None, decimal: Decimal | None = None
) -> Layout | None:
    """Return the layout by which most lines are rows of numbers, None when none holds two columns of them.

    `separator` and `decimal` are taken as given when they are.
    """
    lines = lines[:_SAMPLE]
    best: tuple[int, int, Separator, Decimal] | None = None
    for candidate in ("tab", "semicolon", "comma", "spaces", "comma pairs"):
        if separator not in (None, candidate) or (separator is None and candidate == "comma pairs"):
            continue
        for mark in _decimals(candidate):
            if decimal in (None, mark):
                rows, width = _rows_of(lines, candidate, mark)
                if width >= 2 and (best is None or rows > best[0]):
                    best = (rows, width, candidate, mark)
    if best is None:
        return None
    _, width, chosen, mark = best
    numeric = [
        place for place, line in enumerate(lines) if not line.comment and _width(line, chosen, mark) == width
    ]
    data = [lines[place].text for place in numeric]
    other_decimal = None if decimal else _other_decimal(data, chosen, mark)
    if other_decimal == ",":
        mark, other_decimal = ",", "."  # a comma with three digits behind it is a decimal comma more often
    other_separator: Separator | None = None
    if separator is None and chosen == "comma" and _could_be_pairs(data):
        other_separator = "comma pairs"
        if any(re.search(r",0\d", text) for text in data):
            chosen, other_separator, mark, width = "comma pairs", "comma", ",", width // 2
    return Layout(chosen, mark, other_separator, other_decimal, width, numeric[0])


def find_headings(lines: Sequence[Line], layout: Layout) -> tuple[Line | None, tuple[str, ...]]:
    """Return the line of headings and its cells, with the units of a line of units below put behind them."""
    units: tuple[str, ...] | None = None
    for line in reversed(lines[: layout.first]):
        for cells in _ways_to_cut(line.text, layout):
            if len(cells) != layout.width:
                continue
            stripped = [cell.strip("[]() ") for cell in cells]
            if units is None and all(unit_of_any(cell) for cell in stripped) and any(map(str.strip, stripped)):
                units = tuple(stripped)
                break
            known = sum(read_heading(cell).kind is not None for cell in cells)
            if known or not line.comment:
                names = cells if units is None else _with_units(cells, units)
                return line, tuple(names)
    return None, ()


def settle_by_headings(lines: Sequence[Line], layout: Layout) -> tuple[Layout, Line | None, tuple[str, ...]]:
    """Return the layout, the line of headings and the headings; headings settle what was in doubt.

    The headings ``f/GHz, Dk`` over ``8,2,4,31`` say that there are two columns of numbers with decimal commas.
    """
    line, headings = find_headings(lines, layout)
    if line is None and layout.other_separator is not None:
        pairs = layout.other_separator == "comma pairs"
        width = layout.width // 2 if pairs else layout.width * 2
        other = replace(layout, separator=layout.other_separator, decimal="," if pairs else ".", width=width)
        line, headings = find_headings(lines, other)
        if line is not None:
            layout = other
    return (replace(layout, other_separator=None) if line is not None else layout), line, headings


def _with_units(names: Sequence[str], units: Sequence[str]) -> list[str]:
    return [f"{name} [{unit}]" if unit not in ("", "-") else name for name, unit in zip(names, units, strict=True)]


def _ways_to_cut(text: str, layout: Layout) -> Iterator[list[str]]:
    separator: Separator = "comma" if layout.separator == "comma pairs" else layout.separator
    yield cut(text, separator)
    yield [cell for cell in re.split(r"\t+|\s{2,}|;", text.strip()) if cell]
    yield _NAME_PARTS.findall(text)
    yield [cell.strip() for cell in text.split(",")]


def _decimals(separator: Separator) -> tuple[Decimal, ...]:
    return (",",) if separator == "comma pairs" else (".", ",")


def _rows_of(lines: Sequence[Line], separator: Separator, decimal: Decimal) -> tuple[int, int]:
    """Return how many lines are rows of the commonest number of numbers, and that number."""
    widths = Counter(
        width for line in lines if not line.comment and (width := _width(line, separator, decimal)) > 1
    )
    if not widths:
        return 0, 0
    width, rows = widths.most_common(1)[0]
    return rows, width


def _width(line: Line, separator: Separator, decimal: Decimal) -> int:
    """Return the number of numbers in a line, 0 when it holds anything else."""
    cells = cut(line.text, separator)
    while cells and not cells[-1]:
        cells.pop()
    return len(cells) if all(read_number(cell, decimal) is not None for cell in cells) else 0


def _other_decimal(data: Sequence[str], separator: Separator, decimal: Decimal) -> Decimal | None:
    """Return a decimal comma when all commas could as well part thousands."""
    if separator in ("comma", "comma pairs") or decimal != "." or not any("," in text for text in data):
        return None
    cells = [cell for text in data for cell in cut(text, separator) if cell]
    return "," if all(read_number(cell, ",") is not None for cell in cells) else None


def _could_be_pairs(data: Sequence[str]) -> bool:
    """Return whether lines such as ``8,2,3,01`` could be numbers with decimal commas that commas also part."""
    cells = [cut(text, "comma") for text in data]
    whole = all(re.fullmatch(r"-?\d+", cell) for row in cells for cell in row if cell)
    return whole and all(len(row) >= 4 and len(row) % 2 == 0 for row in cells)
