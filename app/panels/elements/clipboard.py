"""Blocks of cells as spreadsheets put them on the clipboard: tab-separated text, read and written. No toolkit."""

import csv
import html
import io
import re
from collections.abc import Iterable, Sequence
from dataclasses import dataclass
from typing import Final

from app.panels.elements.columns import ALL_COLUMNS, MATERIAL, NUMBER, WHAT, Column

_UNIT_IN_TITLE: Final = re.compile(
    r"^(?P<title>[^,(\[]*?)\s*(?:,\s*(?P<a>\S+)|\((?P<b>[^)]*)\)|\[(?P<c>[^\]]*)\])?$"
)
_BARE_NUMBER: Final = re.compile(r"[-+−]?[\d.,]+(?:[eE][-+]?\d+)?")
_NOTHING: Final = ("-", "–", "—")
_FORMULA_STARTS: Final = ("=", "+", "-", "@")


@dataclass(frozen=True, slots=True)
class Block:
    """A block of texts, row by row, and the columns its header names; no columns without a header."""

    rows: tuple[tuple[str, ...], ...]
    columns: tuple[str, ...] = ()

    @property
    def width(self) -> int:
        """Number of columns of the widest row."""
        return max((len(row) for row in self.rows), default=0)


def read_block(text: str) -> Block:
    """Return the cells of tab-separated `text`, as a spreadsheet copies them.

    A first row made of the table's own column titles is taken as a header. A title may carry a unit, as in
    ``Thickness (mm)``, ``Thickness [mm]`` or ``Thickness, mm``; bare numbers below it then get that unit.

    Examples
    --------
    >>> read_block("Material\\tThickness (mm)\\nair\\t0,5\\n").rows
    (('air', '0,5 mm'),)
    """
    reader = csv.reader(io.StringIO(text, newline=""), dialect="excel-tab")
    rows = [tuple(_cleaned(cell) for cell in row) for row in reader]
    while rows and not any(rows[-1]):
        rows.pop()
    header = _header(rows[0]) if rows else None
    if header is None:
        return Block(tuple(rows))
    columns = tuple(name for name, _ in header)
    units = tuple(unit for _, unit in header)
    return Block(tuple(_with_units(row, units) for row in rows[1:]), columns)


def place(block: Block, anchor: str) -> tuple[dict[str, str], ...]:
    """Return for each row of `block` its texts by column name.

    Parameters
    ----------
    anchor
        The column the block starts in when it has no header. Numbers and the words layer and sheet are not
        typed into, so a block put there is whole rows when it looks like them, and else starts at the material.
    """
    columns = block.columns or _columns_from(block, anchor)
    return tuple(dict(zip(columns, row, strict=False)) for row in block.rows)


def write_block(columns: Sequence[Column], rows: Iterable[Sequence[str]]) -> str:
    """Return a header and `rows` as tab-separated text."""
    out = io.StringIO(newline="")
    writer = csv.writer(out, dialect="excel-tab", lineterminator="\n")
    writer.writerow([column.title for column in columns])
    for row in rows:
        writer.writerow([_as_text(cell, column) for cell, column in zip(row, columns, strict=True)])
    return out.getvalue()


def write_html(columns: Sequence[Column], rows: Iterable[Sequence[str]]) -> str:
    """Return a header and `rows` as an HTML table, for word processors."""
    head = "".join(f"<th>{html.escape(column.title)}</th>" for column in columns)
    lines = ["".join(f"<td>{html.escape(cell)}</td>" for cell in row) for row in rows]
    body = "".join(f"<tr>{line}</tr>" for line in lines)
    return f"<table><tr>{head}</tr>{body}</table>"


def _cleaned(cell: str) -> str:
    """Return a cell without the blanks, also the hard ones, around it, and without the mark that keeps it text.

    A dash alone is how many tables write that there is nothing.
    """
    cell = cell.replace("\u00a0", " ").strip()
    if cell in _NOTHING:
        return ""
    return cell[1:] if cell.startswith("'") and cell[1:].startswith(_FORMULA_STARTS) else cell


def _as_text(cell: str, column: Column) -> str:
    """Return a cell of words so that a spreadsheet does not take it for a formula."""
    is_words = column.dimension is None
    return f"'{cell}" if is_words and cell.startswith(_FORMULA_STARTS) else cell


def _header(row: Sequence[str]) -> list[tuple[str, str]] | None:
    """Return name and unit of each title of a header, or None when the row is not one."""
    titles = {column.title.rstrip(".").casefold(): column.name for column in ALL_COLUMNS}
    titles |= {column.name: column.name for column in ALL_COLUMNS}
    header = []
    for cell in row:
        match = _UNIT_IN_TITLE.match(cell)
        name = titles.get(match["title"].rstrip(".").casefold()) if match else None
        if match is None or name is None:
            return None
        header.append((name, match["a"] or match["b"] or match["c"] or ""))
    return header


def _with_units(row: Sequence[str], units: Sequence[str]) -> tuple[str, ...]:
    padded = [*units, *[""] * (len(row) - len(units))]
    return tuple(
        f"{cell} {unit}" if unit and _BARE_NUMBER.fullmatch(cell) else cell
        for cell, unit in zip(row, padded, strict=False)
    )


def _columns_from(block: Block, anchor: str) -> tuple[str, ...]:
    names = [column.name for column in ALL_COLUMNS]
    if anchor in (NUMBER.name, WHAT.name) and not _are_whole_rows(block, names.index(anchor)):
        anchor = MATERIAL.name
    return tuple(names[names.index(anchor) :])


def _are_whole_rows(block: Block, offset: int) -> bool:
    """Whether the column that would be under What holds only the words it can hold."""
    place_of_what = 1 - offset
    words = [
        row[place_of_what].partition(",")[0].strip().casefold() for row in block.rows if len(row) > place_of_what
    ]
    return bool(words) and all(word in {"layer", "sheet", "film", "front", "back"} for word in words)
