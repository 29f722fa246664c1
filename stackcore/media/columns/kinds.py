"""Which kind and unit each column has: from its heading, from an answer, or as a question."""

from collections.abc import Mapping, Sequence
from typing import Final

from stackcore.errors import Fault, nearest
from stackcore.media.columns.headings import (
    IGNORED,
    QUANTITY_KINDS,
    UNIT_CHOICES,
    Heading,
    read_heading,
    unit_scale,
)
from stackcore.media.columns.quantities import Findings
from stackcore.media.columns.reading import Alternative, Column, Question

_USUAL: Final = ("frequency", "permittivity", "loss_tangent")
"""What the first columns of a file without headings are assumed to be, until answered."""

_SURELY_HERTZ: Final = 1e8
"""A frequency above it that has no unit is in Hz: 1e8 kHz is a tenth of a terahertz already."""

_SIZES: Final[Mapping[str, tuple[tuple[float, str], ...]]] = {
    "frequency": ((2.0e3, "GHz"), (_SURELY_HERTZ, "MHz")),
    "wavelength": ((1e-2, "m"), (100.0, "µm"), (1e7, "nm")),
    "energy": ((1e3, "eV"),),
    "wavenumber": ((1e6, "1/cm"),),
    "conductivity": ((float("inf"), "S/m"),),
}
"""Kind -> largest value below this is assumed to be in that unit, until answered."""


def name_columns(
    headings: Sequence[str],
    width: int,
    rows: Sequence[Sequence[float]],
    answers: Mapping[str, str],
    found: Findings,
) -> list[Column]:
    """Return the columns with kind and unit; what is not known is asked, what cannot be is a fault."""
    columns = []
    for place in range(width):
        text = headings[place] if headings else ""
        values = tuple(row[place] for row in rows)
        heading = read_heading(text)
        kind = _kind(place, heading, bool(headings), answers, found)
        unit = _unit(place, kind, heading, values, answers, found) if kind in QUANTITY_KINDS else ""
        if unit is None:
            kind, unit = "", ""
        columns.append(Column(place + 1, text, kind, unit, values))
    return columns


def _kind(place: int, heading: Heading, headed: bool, answers: Mapping[str, str], found: Findings) -> str:
    name = f"column {place + 1}"
    known = (*QUANTITY_KINDS, IGNORED)
    given = answers.get(name)
    if given in known:
        return given
    if given is not None:
        found.faults.append(Fault(name, f"{given!r} is no kind of column{nearest(given, known)}", ", ".join(known)))
    if heading.kind is not None:
        return heading.kind
    alternatives = [Alternative(kind.name, kind.label) for kind in QUANTITY_KINDS.values()]
    alternatives.append(Alternative(IGNORED, "not used"))
    assumed = "" if headed or place >= len(_USUAL) else _USUAL[place]
    if headed:
        text = f"what is column {place + 1}, headed {heading.text!r}?" if heading.text else f"what is {name}?"
    else:
        text = f"what is column {place + 1}? The file has no headings"
    found.questions.append(Question(name, text, tuple(alternatives), assumed))
    return assumed


def _unit(
    place: int,
    kind: str,
    heading: Heading,
    values: Sequence[float],
    answers: Mapping[str, str],
    found: Findings,
) -> str | None:
    """Return the unit, None when the one that is given is none of this kind."""
    name, label = f"unit of column {place + 1}", QUANTITY_KINDS[kind].label
    choices = UNIT_CHOICES.get(kind, ("", "%"))
    for source, unit in ((name, answers.get(name)), (f"column {place + 1}", heading.unit)):
        if unit is None:
            continue
        if unit_scale(kind, unit) is not None and (unit or kind not in UNIT_CHOICES):
            return "" if unit_scale(kind, unit) == 1 and kind not in UNIT_CHOICES else unit
        allowed = " ".join(choice or "no unit" for choice in choices)
        found.faults.append(Fault(source, f"{unit!r} is no unit of {label}", allowed))
        return None
    if kind not in UNIT_CHOICES:
        return ""
    largest = max((abs(value) for value in values), default=0.0)
    if kind == "frequency" and largest >= _SURELY_HERTZ:
        found.notes.append(f"column {place + 1} names no unit: numbers up to {largest:g} are taken as Hz")
        return "Hz"
    assumed = next((unit for limit, unit in _SIZES[kind] if largest < limit), choices[0])
    text = f"in which unit is column {place + 1}, {label}? It names none and reaches {largest:g}"
    alternatives = tuple(Alternative(unit, f"{label} up to {largest:g} {unit}") for unit in choices)
    found.questions.append(Question(name, text, alternatives, assumed))
    return assumed
