"""Texts of cells -> values: relative constants and lists of quantities.

Single quantities are `stackcore.units`' affair; what is here is what a job file writes as ``[real, loss]`` or
as a list, and a person as ``4.2 - 0.06j`` or ``0, 30, 45 deg``.
"""

import contextlib
import re
from typing import Final

from stackcore.errors import UnitError
from stackcore.media.models import relative_text as relative_text
from stackcore.units import Dimension, Measure, parse_measure

_ALLOWED_RELATIVE: Final = "a number, or real - j loss; for example 4.2 or 4.2 - 0.06j"
_NUMBER: Final = r"(?:\d+(?:[.,]\d*)?|[.,]\d+)(?:[eE][+-]?\d+)?"
_COMPLEX: Final = re.compile(
    rf"(?P<real>[+-]?\s*{_NUMBER})\s*(?P<sign>[+-])\s*(?:[ij]\s*\*?\s*(?P<after>{_NUMBER})|(?P<before>{_NUMBER})\s*\*?\s*[ij])"
)
_SUM: Final = re.compile(r"[\d.,]\s*[+-]\s*[\d.,]")
_PAIR: Final = re.compile(r"\[(?P<inner>[^\[\]]*)\]")
_SPACED: Final = re.compile(rf"({_NUMBER}\s+)+{_NUMBER}(\s*[^\s\d.,]+)?")
_ENTRY: Final = re.compile(rf"{_NUMBER}(?:\s*[^\s\d.,]+)?")
_RANGE: Final = re.compile(
    r"(?:from\s+)?(?P<start>.+?)\s*(?:\bto\b|…|\.\.+)\s*(?P<stop>[^,;]+?)"
    r"(?:\s*(?:[,;]|\bin\b)\s*(?P<points>\d+)(?:\s*(?:points?|angles?|frequencies))?)?",
    re.IGNORECASE,
)
_UNIT_AT_END: Final = re.compile(r"[\d.,)]\s*(?P<unit>[^\s\d.,()+*-][^\d.,()+*-]*)$")
_COMMA_IN_NUMBER: Final = re.compile(r"\d,\d")


def read_relative(text: str) -> complex:
    """Return ε or μ as real − j·loss.

    Takes ``4.2``, ``4.2 - 0.06j``, ``4.2 - j0.06`` and ``[4.2, 0.06]`` as in the job file. Whether the value
    is one a passive material can have is for the job to say.

    Raises
    ------
    UnitError
        For any other text.

    Examples
    --------
    >>> read_relative("12 − j0.5"), read_relative("[12, 0.5]")
    ((12-0.5j), (12-0.5j))
    """
    plain = text.replace("\u2212", "-").strip()
    if pair := _PAIR.fullmatch(plain):
        inner = pair["inner"]
        # As in a list: a comma divides unless something clearer does.
        divider = ";" if ";" in inner else r",\s" if re.search(r",\s", inner) else ","
        parts = re.split(divider, inner)
        if len(parts) != 2:
            raise UnitError(f"{text!r} is not a pair of numbers", "[real, loss], for example [12, 0.5]")
        return _lossy(_number(parts[0]), _number(parts[1]))
    if match := _COMPLEX.fullmatch(plain):
        size = _number(match["after"] or match["before"])
        real = _number(match["real"].replace(" ", ""))
        return _lossy(real, size if match["sign"] == "-" else -size)
    if _SUM.search(plain):
        # The units would read 4.2 - 0.06 as 4.14; whoever types that has most likely left out the j.
        raise UnitError(f"{text!r} may be a sum, or a loss without its j", _ALLOWED_RELATIVE)
    try:
        return complex(_number(plain))
    except UnitError as error:
        raise UnitError(error.message, _ALLOWED_RELATIVE) from None


def read_list(text: str, dimension: Dimension) -> tuple[Measure, ...]:
    """Return the quantities of a list.

    Entries are divided by semicolons, by commas with a space behind, or, when they are bare numbers, by
    spaces. An entry without a unit has that of the last entry: ``0, 30, 45 deg``; when that has none either,
    the usual unit.

    Raises
    ------
    UnitError
        For an empty list, an entry that is no quantity, and a comma that may be a decimal sign or divide
        entries.

    Examples
    --------
    >>> [measure.text for measure in read_list("8, 10, 12 GHz", Dimension.FREQUENCY)]
    ['8 GHz', '10 GHz', '12 GHz']
    """
    entries = [entry.strip() for entry in _divide(text.strip().strip("[]"))]
    entries = [entry for entry in entries if entry]
    if not entries:
        raise UnitError("the list is empty", f"values divided by semicolons: {dimension.example}; ...")
    unit = unit_of(entries[-1], dimension)
    return tuple(parse_measure(entry, dimension, default_unit=unit) for entry in entries)


def read_range(text: str, dimension: Dimension) -> tuple[Measure, Measure, int] | None:
    """Return start, stop and number of points of an even sweep, or None when the text is no range.

    A start without a unit has that of the stop; when that has none either, the usual unit.

    Raises
    ------
    UnitError
        For an end that is no quantity, and for a range that does not say how many points.

    Examples
    --------
    >>> start, stop, points = read_range("0 to 60 deg, 7 points", Dimension.ANGLE)
    >>> start.text, stop.text, points
    ('0 deg', '60 deg', 7)
    >>> read_range("0, 30, 45 deg", Dimension.ANGLE) is None
    True
    """
    match = _RANGE.fullmatch(text.strip())
    if match is None:
        return None
    if match["points"] is None:
        raise UnitError(f"{text!r} does not say how many points", f"{text.strip()}, 7 points")
    unit = unit_of(match["stop"], dimension) or dimension.usual_unit
    start, stop = (parse_measure(match[end], dimension, default_unit=unit) for end in ("start", "stop"))
    return start, stop, int(match["points"])


def list_text(measures: tuple[Measure, ...]) -> str:
    """Return the text of a list that `read_list` reads back."""
    return "; ".join(measure.text for measure in measures)


def read_points(text: str) -> int:
    """Return a number of points; whether it is one the sweep can take is for the job to say.

    Raises
    ------
    UnitError
        For a text that is no whole number.
    """
    value = _number(text)
    if value != int(value):
        raise UnitError(f"{text!r} is not a whole number", "a whole number, for example 401")
    return int(value)


def unit_of(text: str, dimension: Dimension) -> str:
    """Return the unit `text` ends with, or the usual one when it has none of `dimension`.

    Examples
    --------
    >>> unit_of("35 um", Dimension.LENGTH), unit_of("1/8 in", Dimension.LENGTH), unit_of("7", Dimension.LENGTH)
    ('um', 'in', 'mm')
    """
    return _own_unit(text, dimension) or dimension.usual_unit


def read_like(old: Measure | None, text: str, dimension: Dimension) -> Measure:
    """Return the quantity of `text` typed over `old`; a bare number has the unit `old` was written in.

    Over nothing it has the usual unit, and over a bare number the SI unit, which is what that one is in.

    Examples
    --------
    >>> read_like(Measure(35e-6, "35 um"), "40", Dimension.LENGTH)
    Measure(value=4e-05, text='40 um')
    """
    unit = dimension.usual_unit if old is None else _own_unit(old.text, dimension) or dimension.si_unit
    return parse_measure(text.strip(), dimension, default_unit=unit)


def _own_unit(text: str, dimension: Dimension) -> str:
    match = _UNIT_AT_END.search(text.strip())
    if match:
        unit = match["unit"].strip()
        with contextlib.suppress(UnitError):
            parse_measure(f"1 {unit}", dimension)
            return unit
    return ""


def _divide(text: str) -> list[str]:
    if ";" in text or "\n" in text:
        return re.split(r"[;\n]", text)
    if _COMMA_IN_NUMBER.search(text) and not re.search(r",\s", text):
        with_dot, divided = text.replace(",", "."), text.replace(",", "; ")
        raise UnitError(f"{text!r} may mean {with_dot} or {divided}", f"write {with_dot} or {divided}")
    if "," in text:
        return re.split(r",(?=\s|$)", text)
    return _ENTRY.findall(text) if _SPACED.fullmatch(text) else [text]


def _number(text: str) -> float:
    return parse_measure(text.strip(), Dimension.NUMBER).value


def _lossy(real: float, loss: float) -> complex:
    return complex(real, -loss if loss else 0.0)
