"""``slabwright materials``: the library listed, searched and read; the health check of any material."""

import sys
from collections.abc import Iterable, Sequence
from typing import TYPE_CHECKING, Final

from stackcore.cli.arguments import Parser
from stackcore.cli.output import write_text
from stackcore.cli.telling import DONE, one_line
from stackcore.errors import Fault, InputError, UnitError

if TYPE_CHECKING:
    from stackcore.arrays import FloatArray
    from stackcore.media.base import AbstractMedium
    from stackcore.media.library import LibraryEntry

_DIGITS: Final = 5


def _parser() -> Parser:
    parser = Parser(
        prog="slabwright materials",
        description="List the library of materials, search it by words, show one entry with its values at given "
        "frequencies, or check the health of the materials in a file.",
        allow_abbrev=False,
    )
    parser.add_argument("words", metavar="WORD", nargs="*", help="words to search for, or the KEY of one entry")
    parser.add_argument("--at", metavar="F,F", help="frequencies with their units: 10GHz,28GHz")
    parser.add_argument(
        "--csv", metavar="OUT", help="write the values, or the list, as a table; - is standard output"
    )
    parser.add_argument(
        "--check",
        metavar="FILE",
        help="check every material of a job file, of a library file (.toml) or of a table of columns",
    )
    return parser


def main(argv: Sequence[str]) -> int:
    """Run ``slabwright materials`` with the arguments behind it; return the exit status.

    1 means that the health check found an error.

    Raises
    ------
    InputError
        With every fault of the arguments or of the file.
    """
    try:
        arguments = _parser().parse_args(argv)
    except SystemExit as end:  # after --help
        return int(end.code or 0)
    frequencies = _frequencies(arguments.at)
    if arguments.check is not None:
        if arguments.words or arguments.csv:
            raise InputError([Fault("--check", "goes alone or with --at", "slabwright materials --check FILE")])
        from stackcore.cli.check_materials import check_file

        return check_file(arguments.check, frequencies)
    from stackcore.media.library import read_library

    library, words = read_library(), " ".join(arguments.words)
    for fault in library.faults:
        one_line(str(fault))
    if "/" in words and " " not in words.strip():
        return _show(library.entry(words.strip()), frequencies, arguments.csv)
    if frequencies is not None:
        raise InputError(
            [Fault("--at", "needs the key of one entry", "slabwright materials metals/copper --at 10GHz")]
        )
    return _list(library.search(words), words, arguments.csv)


def _frequencies(text: str | None) -> "FloatArray | None":
    if text is None:
        return None
    import numpy as np

    from stackcore.units import Dimension, parse_measure

    found, faults = [], []
    for part in text.split(","):
        try:
            frequency = parse_measure(part, Dimension.FREQUENCY).value
        except UnitError as error:
            faults.append(Fault("--at", error.message, error.allowed))
            continue
        if not 1e-3 <= frequency <= 1e21:
            faults.append(Fault("--at", f"{part.strip()!r} is no frequency of a wave", "0.001 Hz to 1e21 Hz"))
        found.append(frequency)
    if faults:
        raise InputError(faults)
    return np.array(found)


def _list(entries: "Sequence[LibraryEntry]", words: str, out: str | None) -> int:
    if not entries:
        raise InputError(
            [Fault("", f"no entry holds all of {words!r}", "other words; without any, all are listed")]
        )
    if out is not None:
        heads = ("key", "label", "model", "lowest_Hz", "highest_Hz", "certainty", "source")
        rows = [
            (
                entry.key,
                entry.label,
                entry.model,
                entry.valid_range.lowest,
                entry.valid_range.highest,
                entry.provenance.certainty,
                entry.provenance.source,
            )
            for entry in entries
        ]
        return write_text(out, _table(heads, rows))
    width = max(len(entry.key) for entry in entries)
    return _say(f"{entry.key:<{width}}  {entry.label}{_mark(entry)}" for entry in entries)


def _mark(entry: "LibraryEntry") -> str:
    if not entry.own:
        return ""
    return "  (your own, in the place of the library's)" if entry.shadows else "  (your own)"


def _show(entry: "LibraryEntry", frequencies: "FloatArray | None", out: str | None) -> int:
    import numpy as np

    from stackcore.media.figures import figures_of

    at = frequencies if frequencies is not None else _three(entry)
    outside = at[~entry.valid_range.contains(at)]
    if out is not None:
        figures = figures_of(entry.medium, at)
        rows = zip(at.tolist(), *(np.ravel(column).tolist() for column in figures.values()), strict=True)
        status = write_text(out, _table(("frequency_Hz", *figures), rows))
    else:
        status = _say([*_about(entry), "", *_values(entry.medium, at, outside)])
    if outside.size:
        told = ", ".join(_hertz(frequency) for frequency in outside)
        one_line(f"{entry.key}: {told} lies outside {_range(entry)}, where the values hold")
    return status


def _three(entry: "LibraryEntry") -> "FloatArray":
    """Return both ends and the middle of the entry's range, or 10 GHz for one without."""
    import numpy as np

    ends = entry.valid_range
    if not 0 < ends.lowest <= ends.highest < float("inf"):
        return np.array([1e10])
    return np.array([ends.lowest, (ends.lowest * ends.highest) ** 0.5, ends.highest])


def _about(entry: "LibraryEntry") -> list[str]:
    from stackcore.media.models import MODELS, value_text

    model, told = MODELS[entry.model], entry.provenance
    lines = [f"{entry.key}  {entry.label}{_mark(entry)}", f"  model      {entry.model}: {model.formula}"]
    for constant in model.constants:
        if constant.name in entry.constants:
            lines.append(f"  {constant.name}  {value_text(entry.constants[constant.name])}")
            value = entry.constants[constant.name]
            if isinstance(value, tuple):
                lines += [
                    "    " + ", ".join(f"{name} {value_text(one)}" for name, one in row.items()) for row in value
                ]
    spread = ", ".join(f"{name} ±{100 * share:.3g} %" for name, share in told.spread if share)
    facts = {
        "range": _range(entry),
        "density": entry.density.text if entry.density is not None else "",
        "ply": entry.ply_thickness.text if entry.ply_thickness is not None else "",
        "spread": f"{spread} (one standard deviation in production)" if spread else "",
        "certainty": told.certainty,
        "source": told.source,
        "note": told.note,
    }
    lines += [f"  {name:<10} {text}" for name, text in facts.items() if text]
    for state in entry.states:
        differs = ", ".join(f"{name} {value_text(value)}" for name, value in state.constants.items())
        note = "; ".join(part for part in (state.note, state.source) if part)
        lines.append(f"  state      {state.name}: {differs}{f' ({note})' if note else ''}")
    return lines


def _values(medium: "AbstractMedium", at: "FloatArray", outside: "FloatArray") -> list[str]:
    from stackcore.media.figures import FIGURES, figures_of

    columns = [["frequency", *(_hertz(frequency) + ("*" if frequency in outside else "") for frequency in at)]]
    for name, values in figures_of(medium, at).items():
        figure = FIGURES[name]
        head = f"{figure.symbol} ({figure.unit})" if figure.unit else figure.symbol
        columns.append([head, *("-" if value != value else f"{value:.{_DIGITS}g}" for value in values.tolist())])
    widths = [max(map(len, column)) for column in columns]
    lines = [
        "  " + "  ".join(cell.rjust(width) for cell, width in zip(row, widths, strict=True))
        for row in zip(*columns, strict=True)
    ]
    return [*lines, "  * outside the range"] if outside.size else lines


def _range(entry: "LibraryEntry") -> str:
    if entry.valid_range.highest == float("inf"):
        return "all frequencies"
    return f"{_hertz(entry.valid_range.lowest)} to {_hertz(entry.valid_range.highest)}"


def _hertz(frequency: float) -> str:
    from stackcore.units import Dimension, format_value

    return format_value(float(frequency), Dimension.FREQUENCY, digits=6)


def _table(heads: Sequence[str], rows: Iterable[Sequence[object]]) -> str:
    from stackcore.export.sweep_csv import text_cell

    lines = [",".join(heads)]
    lines += [",".join(text_cell(cell) if isinstance(cell, str) else repr(cell) for cell in row) for row in rows]
    return "".join(f"{line}\r\n" for line in lines)


def _say(lines: Iterable[str]) -> int:
    for line in lines:
        print("".join(letter if letter.isprintable() else " " for letter in line))
    sys.stdout.flush()
    return DONE
