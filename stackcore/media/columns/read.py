"""The door: bytes or text in, a reading out."""

from collections.abc import Mapping, Sequence
from typing import Final, TypeVar, get_args

from stackcore.errors import Fault, nearest
from stackcore.media.columns.cells import Decimal, missing_number, read_number
from stackcore.media.columns.kinds import name_columns
from stackcore.media.columns.layout import Layout, Line, Separator, cut, find_layout, lines_of, settle_by_headings
from stackcore.media.columns.quantities import Findings, quantities
from stackcore.media.columns.reading import Alternative, Column, ColumnsReading, Question
from stackcore.media.tabulated import TabulatedMedium, table_faults

LARGEST_FILE: Final = 20_000_000
"""Bytes."""

MOST_ROWS: Final = 100_000

_DECIMALS: Final[tuple[Decimal, ...]] = (".", ",")

_Answer = TypeVar("_Answer", bound=str)


def read_columns(content: str | bytes, answers: Mapping[str, str] | None = None) -> ColumnsReading:
    """Read columns of a material's data: separated by commas, semicolons, tabs or spaces.

    Nothing is raised for what stands in the file. Its faults, and the questions it leaves open, are in the reading.

    Parameters
    ----------
    content
        Of the file.
    answers
        Name of a question -> answer, for questions of an earlier reading of the same file. ``column 3`` and
        ``unit of column 3`` may be given unasked.

    Examples
    --------
    >>> reading = read_columns("f (GHz); eps_r; tan d\\n8,2; 4,31; 0,014\\n12,4; 4,28; 0,016\\n")
    >>> reading.understood[:2], [column.label for column in reading.columns]
    (('2 rows of 3 columns, parted by semicolons', 'decimal comma'), ['frequency in GHz', 'ε′', 'tan δ'])
    >>> reading.medium().frequency
    (8200000000.0, 12400000000.0)
    """
    answers = answers or {}
    found = Findings()
    text, encoding = (content, "") if isinstance(content, str) else _decoded(content, found)
    lines = lines_of(text.removeprefix("\ufeff")) if len(content) <= LARGEST_FILE else ()
    if len(content) > LARGEST_FILE:
        found.faults.append(
            Fault("", f"{len(content)} bytes are too many", f"{LARGEST_FILE} at most; thin out the rows")
        )
    given_separator = _given(answers, "separator", get_args(Separator), found)
    given_decimal = _given(answers, "decimal", _DECIMALS, found)
    layout = find_layout(lines, given_separator, given_decimal)
    if layout is None:
        if not found.faults:
            found.faults.append(
                Fault("", "there are no rows of numbers", "two columns of numbers or more, with headings")
            )
        return ColumnsReading(encoding, "spaces", ".", None, (), (), (), tuple(found.faults), ())
    layout, heading_line, headings = settle_by_headings(lines, layout)
    _ask_layout(layout, found)
    rows, numbers = _rows(lines, layout, found)
    columns = name_columns(headings, layout.width, rows, answers, found)
    _refuse_unknown(answers, layout.width, found)
    table = _table(columns, numbers, answers, found)
    return ColumnsReading(
        encoding,
        layout.separator,
        layout.decimal,
        heading_line.number if heading_line else None,
        tuple(numbers),
        tuple(columns),
        tuple(found.questions),
        tuple(found.faults),
        tuple(found.notes),
        table,
    )


def _refuse_unknown(answers: Mapping[str, str], width: int, found: Findings) -> None:
    known = ["decimal", "separator", "abscissa", "material", "loss"]
    for number in range(1, width + 1):
        known += [f"column {number}", f"unit of column {number}"]
    for name in answers:
        if name not in known:
            found.faults.append(
                Fault(name, f"no question is called {name!r}{nearest(name, known)}", ", ".join(known))
            )


def _decoded(content: bytes, found: Findings) -> tuple[str, str]:
    if content.startswith((b"\xff\xfe", b"\xfe\xff")):
        encoding = "utf-16"
    else:
        encoding = "utf-8-sig"
    try:
        text = content.decode(encoding)
    except UnicodeDecodeError:
        encoding = "cp1252"
        text = content.decode(encoding, errors="replace")
        found.notes.append("the text is not UTF-8 and was read as Windows-1252")
    if "\0" in text:
        found.faults.append(Fault("", "the file is not a text", "columns saved as text, such as CSV"))
        return "", encoding
    return text, encoding


def _given(answers: Mapping[str, str], name: str, allowed: Sequence[_Answer], found: Findings) -> _Answer | None:
    given = answers.get(name)
    for each in allowed:
        if each == given:
            return each
    if given is not None:
        told = f"{given!r} is no answer{nearest(given, allowed)}"
        found.faults.append(Fault(name, told, ", ".join(repr(each) for each in allowed)))
    return None


def _ask_layout(layout: Layout, found: Findings) -> None:
    if layout.other_decimal is not None:
        text = "is the comma in the numbers the decimal sign, or does it part thousands?"
        meanings = (Alternative(",", "decimal sign: 1,234 is 1.234"), Alternative(".", "thousands: 1,234 is 1234"))
        found.questions.append(Question("decimal", text, meanings, layout.decimal))
    if layout.other_separator is not None:
        text = "do commas only part the columns, or are they the decimal sign too?"
        meanings = (
            Alternative("comma", "they part whole numbers: 8,2 are 8 and 2"),
            Alternative("comma pairs", "each second one is a decimal sign: 8,2,3,01 are 8.2 and 3.01"),
        )
        found.questions.append(Question("separator", text, meanings, layout.separator))


def _rows(lines: Sequence[Line], layout: Layout, found: Findings) -> tuple[list[list[float]], list[int]]:
    """Return the rows of numbers and the number of each one's line; what is no row is a fault."""
    rows: list[list[float]] = []
    numbers: list[int] = []
    for line in lines[layout.first :]:
        if line.comment:
            continue
        cells = cut(line.text, layout.separator)
        while len(cells) > layout.width and not cells[-1]:
            cells.pop()
        values = [read_number(cell, layout.decimal) for cell in cells]
        if all(value is None for value in values):
            told = f"{line.text.strip()[:40]!r} is no row of numbers and was left out"
            found.faults.append(Fault(f"line {line.number}", told, "numbers, or # in front of a remark", "warning"))
            continue
        if len(cells) != layout.width:
            told = f"{len(cells)} cells where other lines have {layout.width}"
            found.faults.append(Fault(f"line {line.number}", told, f"{layout.width} numbers in each line"))
            continue
        bad = [place for place, value in enumerate(values) if value is None]
        for place in bad:
            told = "a number is missing" if missing_number(cells[place]) else f"{cells[place]!r} is not a number"
            allowed = "a finite number; leave the whole row out where one is missing"
            found.faults.append(Fault(f"line {line.number}, column {place + 1}", told, allowed))
        if not bad:
            rows.append([value for value in values if value is not None])
            numbers.append(line.number)
    if len(rows) > MOST_ROWS:
        found.faults.append(Fault("", f"{len(rows)} rows are too many", f"{MOST_ROWS} at most; thin out the rows"))
        return rows[:MOST_ROWS], numbers[:MOST_ROWS]
    return rows, numbers


def _table(
    columns: Sequence[Column], lines: Sequence[int], answers: Mapping[str, str], found: Findings
) -> TabulatedMedium | None:
    """Return the table under what is assumed, None when it cannot be made; faults are told by line."""
    said = quantities(columns, lines, answers, found)
    if said is None:
        return None
    falling = said.frequency.size > 1 and bool((said.frequency[1:] < said.frequency[:-1]).all())
    if falling:
        found.notes.append("frequencies fall from row to row: the rows are turned round")
    step = -1 if falling else 1
    frequency, permittivity = said.frequency[::step].tolist(), said.permittivity[::step].tolist()
    permeability = None if said.permeability is None else said.permeability[::step].tolist()
    names = [f"line {number}" for number in lines[::step]]
    faults = tuple(table_faults(frequency, permittivity, permeability, names))
    found.faults.extend(faults)
    if faults:
        return None
    return TabulatedMedium.from_arrays(frequency, permittivity, permeability)
