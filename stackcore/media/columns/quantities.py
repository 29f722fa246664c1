"""From columns with kinds and units to frequency, ε and μ."""

from collections.abc import Mapping, Sequence
from dataclasses import dataclass, field
from typing import Final

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.errors import Fault
from stackcore.media.columns.headings import QUANTITY_KINDS, exact_scale, hertz_per, unit_scale
from stackcore.media.columns.reading import Alternative, Column, Question
from stackcore.media.parts import complex_of

_AGREE: Final = 0.02
"""Two columns of the same loss that differ by less than this share of its largest value say the same."""


@dataclass(slots=True)
class Findings:
    """What came up on the way, collected."""

    questions: list[Question] = field(default_factory=list)
    faults: list[Fault] = field(default_factory=list)
    notes: list[str] = field(default_factory=list)


@dataclass(frozen=True, slots=True)
class Quantities:
    """Frequency in Hz, ε and μ in the order of the file; μ None without magnetic columns."""

    frequency: FloatArray
    permittivity: ComplexArray
    permeability: ComplexArray | None


def quantities(
    columns: Sequence[Column], lines: Sequence[int], answers: Mapping[str, str], found: Findings
) -> Quantities | None:
    """Return what the columns say, None when something essential is missing; what came up goes to `found`."""
    by_kind: dict[str, Column] = {}
    for column in columns:
        if column.kind in QUANTITY_KINDS:
            if column.kind in by_kind:
                label = QUANTITY_KINDS[column.kind].label
                told = f"columns {by_kind[column.kind].number} and {column.number} are both {label}"
                found.faults.append(
                    Fault(f"column {column.number}", told, "one of them; answer 'ignored' for the other")
                )
            else:
                by_kind[column.kind] = column
    if found.faults and not all(column.kind for column in columns):
        return None  # a column is not known because of a fault that was told
    frequency = _frequency(by_kind, lines, answers, found)
    if frequency is None:
        return None
    permittivity = _permittivity(by_kind, frequency, lines, answers, found)
    if permittivity is None:
        return None
    return Quantities(frequency, permittivity, _permeability(by_kind, lines, found))


def _frequency(
    by_kind: Mapping[str, Column], lines: Sequence[int], answers: Mapping[str, str], found: Findings
) -> FloatArray | None:
    present = [kind for kind in by_kind if QUANTITY_KINDS[kind].abscissa]
    if not present:
        if not found.questions:
            told = "no column says at which frequency a row holds"
            found.faults.append(Fault("", told, "a column of frequencies or wavelengths, with its unit"))
        return None
    chosen = present[0]
    if len(present) > 1:
        labels = " and ".join(QUANTITY_KINDS[kind].label for kind in present)
        chosen = choose(
            "abscissa", f"both {labels} are given; which one holds?", present, answers, found, present[0]
        )
    column = by_kind[chosen]
    wrong = [place for place, value in enumerate(column.values) if not value > 0]
    for place in wrong:
        told = f"a {QUANTITY_KINDS[chosen].label} of {column.values[place]:g}"
        found.faults.append(Fault(f"line {lines[place]}", told, "a number above 0"))
    if wrong:
        return None
    return np.array([hertz_per(chosen, value) for value in _scaled(column)])


def _permittivity(
    by_kind: Mapping[str, Column],
    frequency: FloatArray,
    lines: Sequence[int],
    answers: Mapping[str, str],
    found: Findings,
) -> ComplexArray | None:
    present = [kind for kind in ("permittivity", "index") if kind in by_kind]
    if not present:
        if "permeability" in by_kind:
            found.notes.append("no column of ε: ε is taken as 1")
            return np.ones(frequency.size, dtype=np.complex128)
        if not found.questions:
            told = "no column says what the material does"
            found.faults.append(Fault("", told, "a column of ε′ or n, and one of its loss"))
        return None
    chosen = present[0]
    if len(present) > 1:
        text = "both ε and n are given; which one holds?"
        chosen = choose("material", text, present, answers, found, present[0])
    real = np.array(_scaled(by_kind[chosen]))
    if chosen == "index":
        loss = _loss_column(by_kind.get("extinction"), lines, found)
        if loss is None:
            found.notes.append("no column of k: the material is taken as lossless")
            return complex_of(real * real, 0.0)
        return complex_of((real - loss) * (real + loss), -2 * real * loss)
    return complex_of(real, 0.0 - _dielectric_loss(by_kind, real, frequency, lines, answers, found))


def _dielectric_loss(
    by_kind: Mapping[str, Column],
    real: FloatArray,
    frequency: FloatArray,
    lines: Sequence[int],
    answers: Mapping[str, str],
    found: Findings,
) -> FloatArray:
    """Return ε″ from the one column of loss that holds."""
    losses: dict[str, FloatArray] = {}
    for kind, factor in (
        ("loss", np.ones_like(real)),
        ("loss_tangent", np.abs(real)),
        ("conductivity", 1 / (2 * np.pi * VACUUM_PERMITTIVITY * frequency)),
    ):
        column = _loss_column(by_kind.get(kind), lines, found)
        if column is not None:
            losses[kind] = column * factor
    if not losses:
        found.notes.append("no column of loss: the material is taken as lossless")
        return np.zeros_like(real)
    first = next(iter(losses))
    if len(losses) == 1:
        return losses[first]
    labels = " and ".join(QUANTITY_KINDS[kind].label for kind in losses)
    largest = max(float(loss.max()) for loss in losses.values())
    apart = max(float(np.abs(loss - losses[first]).max()) for loss in losses.values())
    if apart <= _AGREE * largest:
        found.notes.append(f"{labels} say the same loss; it is counted once, from {QUANTITY_KINDS[first].label}")
        return losses[first]
    text = f"{labels} give different losses; which one is all of the loss?"
    return losses[choose("loss", text, tuple(losses), answers, found, "")]


def _permeability(by_kind: Mapping[str, Column], lines: Sequence[int], found: Findings) -> ComplexArray | None:
    if "permeability" not in by_kind:
        return None
    real = np.array(_scaled(by_kind["permeability"]))
    loss = _loss_column(by_kind.get("magnetic_loss"), lines, found)
    if loss is None:
        tangent = _loss_column(by_kind.get("magnetic_loss_tangent"), lines, found)
        loss = np.zeros_like(real) if tangent is None else tangent * np.abs(real)
    return complex_of(real, 0.0 - loss)


def _loss_column(column: Column | None, lines: Sequence[int], found: Findings) -> FloatArray | None:
    """Return a column of loss; one that is negative throughout is an imaginary part, its loss the opposite."""
    if column is None:
        return None
    loss = np.array(_scaled(column))
    label = QUANTITY_KINDS[column.kind].label
    if (loss <= 0).all() and (loss < 0).any():
        note = (
            f"column {column.number} is negative throughout and taken as an imaginary part: {label} is its opposite"
        )
        found.notes.append(note)
        return 0.0 - loss
    for place in np.flatnonzero(loss < 0).tolist():
        told = f"{label} of {column.values[place]:g} is negative, which would be gain"
        allowed = "0 or more; set it to 0 where it is within the noise of the measurement"
        found.faults.append(Fault(f"line {lines[place]}, column {column.number}", told, allowed))
    return np.asarray(np.maximum(loss, 0.0))


def choose(
    name: str, text: str, kinds: Sequence[str], answers: Mapping[str, str], found: Findings, assumed: str
) -> str:
    """Return the kind that was answered, otherwise ask and return what is assumed, or the first."""
    if answers.get(name) in kinds:
        return answers[name]
    alternatives = tuple(Alternative(kind, QUANTITY_KINDS[kind].label) for kind in kinds)
    found.questions.append(Question(name, text, alternatives, assumed))
    return assumed or kinds[0]


def _scaled(column: Column) -> tuple[float, ...]:
    """Return the values in Hz, m, eV, 1/m, S/m or as ratios, each the double nearest to the decimal in the file."""
    scale = unit_scale(column.kind, column.unit)
    assert scale is not None, "units are settled before"
    if scale == 1:
        return column.values
    exact = exact_scale(scale)
    return tuple(float(exact_scale(value) * exact) for value in column.values)
