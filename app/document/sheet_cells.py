"""Cells of a sheet: its parts, and a film's resistance, conductivity and thickness kept to each other."""

from dataclasses import replace
from typing import Final

from app.document.reading import read_like
from stackcore.errors import UnitError
from stackcore.job.limits import SHEET_PARTS
from stackcore.job.records import SheetRecord
from stackcore.units import Dimension, Measure, measure

DIGITS: Final = 6
"""Of a value that follows from two others, such as the conductivity of a film of a typed resistance."""

_DIMENSIONS: Final = {
    "resistance": Dimension.RESISTANCE,
    "inductance": Dimension.INDUCTANCE,
    "capacitance": Dimension.CAPACITANCE,
    "conductivity": Dimension.CONDUCTIVITY,
    "thickness": Dimension.LENGTH,
}


def sheet_columns(sheet: SheetRecord) -> tuple[str, ...]:
    """Return the columns of a sheet.

    A film has resistance, conductivity and thickness, of which any two give the third. A sheet that is nothing but
    a resistance can become a film, and so has a thickness to type into.
    """
    if sheet.kind == "film":
        return ("resistance", "conductivity", "thickness")
    return (*SHEET_PARTS, "thickness") if _resistive(sheet) else tuple(SHEET_PARTS)


def part_of(sheet: SheetRecord, column: str) -> Measure | None:
    """Return the value in a column of a sheet; the resistance of a film follows from its other two."""
    if sheet.kind == "film" and column == "resistance":
        conductivity, thickness = _film(sheet)
        return _rounded(1 / (conductivity * thickness), Dimension.RESISTANCE)
    value = getattr(sheet, column, None)
    return value if isinstance(value, Measure) else None


def with_part(sheet: SheetRecord, column: str, text: str) -> SheetRecord:
    """Return `sheet` with the value of `text` in a column; an empty text takes the value away.

    Of a film the resistance typed keeps the thickness, and the thickness typed keeps the conductivity. A thickness
    typed for a plain resistance makes it a film of that resistance, and one that is cleared makes a film a plain
    resistance again.

    Raises
    ------
    UnitError
        When the text is no value, or a film would lack one of its two.
    """
    wanted = read_like(part_of(sheet, column), text, _DIMENSIONS[column]) if text.strip() else None
    if sheet.kind == "film":
        return _with_film_part(sheet, column, wanted)
    if column == "thickness":
        return sheet if wanted is None else _as_film(sheet, wanted)
    if column == "resistance":
        return replace(sheet, resistance=wanted)
    if column == "inductance":
        return replace(sheet, inductance=wanted)
    return replace(sheet, capacitance=wanted)


def _with_film_part(sheet: SheetRecord, column: str, wanted: Measure | None) -> SheetRecord:
    _, thickness = _film(sheet)
    if wanted is None and column == "conductivity":
        raise UnitError("a film needs its conductivity", "a conductivity, for example '0.5 MS/m'")
    if wanted is None:  # without its thickness, or typed away, it is the plain resistance that it was
        plain = part_of(sheet, "resistance")
        return replace(sheet, kind="series", resistance=plain, conductivity=None, thickness=None)
    if wanted.value <= 0:
        raise UnitError(f"{wanted.text} makes no film", "more than 0")
    if column == "resistance":
        return replace(sheet, conductivity=_rounded(1 / (wanted.value * thickness), Dimension.CONDUCTIVITY))
    return replace(sheet, conductivity=wanted) if column == "conductivity" else replace(sheet, thickness=wanted)


def _as_film(sheet: SheetRecord, thickness: Measure) -> SheetRecord:
    assert sheet.resistance is not None
    if thickness.value <= 0 or sheet.resistance.value <= 0:
        raise UnitError(f"{thickness.text} makes no film of {sheet.resistance.text}", "more than 0")
    conductivity = _rounded(1 / (sheet.resistance.value * thickness.value), Dimension.CONDUCTIVITY)
    return replace(sheet, kind="film", resistance=None, conductivity=conductivity, thickness=thickness)


def _resistive(sheet: SheetRecord) -> bool:
    return sheet.resistance is not None and sheet.inductance is None and sheet.capacitance is None


def _film(sheet: SheetRecord) -> tuple[float, float]:
    assert sheet.conductivity is not None
    assert sheet.thickness is not None
    return sheet.conductivity.value, sheet.thickness.value


def _rounded(value: float, dimension: Dimension) -> Measure:
    return measure(float(f"{value:.{DIGITS}g}"), dimension)
