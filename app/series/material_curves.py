"""Curves of materials over frequency, with what is known of them where."""

from collections.abc import Sequence
from dataclasses import dataclass

import numpy as np

from app.series.material_quantities import CURRENT_RATIO, MATERIAL_QUANTITIES, unit_for, words_of
from app.series.texts import frequency_text
from app.series.validity import Mask, held_at, known_text
from stackcore.media.base import AbstractMedium, FloatArray


@dataclass(frozen=True, slots=True)
class Specimen:
    """A material to be looked at: what it is called, and its medium."""

    label: str
    medium: AbstractMedium


@dataclass(frozen=True, slots=True, eq=False)
class MaterialCurve:
    """One quantity of one material.

    Parameters
    ----------
    specimen
        Whose.
    quantity
        Key of `MATERIAL_QUANTITIES`.
    x
        Frequencies in Hz, rising.
    y
        Values in `unit`; nan where there is nothing to draw.
    raw
        Values in SI units, infinite ones as they are.
    unit
        The same for all curves drawn together; empty for a plain number.
    held
        For each point, whether the material is known there.
    hidden_points
        How many points cannot be drawn.
    crossover
        Where conduction and displacement current are equal, in Hz; only of the ratio of the two.
    """

    specimen: Specimen
    quantity: str
    x: FloatArray
    y: FloatArray
    raw: FloatArray
    unit: str
    held: Mask
    hidden_points: int
    crossover: tuple[float, ...] = ()


def material_curves(
    specimens: Sequence[Specimen], quantity: str, frequency: FloatArray, *, by_ratio: bool = False
) -> tuple[MaterialCurve, ...]:
    """Return a curve for each specimen, all in one unit.

    Parameters
    ----------
    frequency
        In Hz, in any order.
    by_ratio
        Whether values are drawn by ratio: those of 0 and below can then not be drawn.
    """
    x = np.unique(frequency)
    row = MATERIAL_QUANTITIES[quantity]
    columns = [row.values(x, each.medium.evaluate(x)) for each in specimens]
    unit, factor = unit_for(quantity, np.concatenate(columns) if columns else x[:0])
    curves = []
    for specimen, raw in zip(specimens, columns, strict=True):
        shown = np.isfinite(raw) & (raw > 0) if by_ratio else np.isfinite(raw)
        curves.append(
            MaterialCurve(
                specimen,
                quantity,
                x,
                np.where(shown, raw, np.nan) * factor,
                raw,
                unit,
                held_at(specimen.medium, x),
                int(np.count_nonzero(~shown)),
                crossovers(specimen.medium, x) if quantity == CURRENT_RATIO else (),
            )
        )
    return tuple(curves)


def crossovers(medium: AbstractMedium, frequency: FloatArray) -> tuple[float, ...]:
    """Return where conduction and displacement current are equal, in Hz, between the ends of `frequency` (rising).

    Between two points where one or the other prevails the place is found by halving.

    Examples
    --------
    >>> from stackcore.media.conductor import ConductorMedium
    >>> [f"{f:.4e}" for f in crossovers(ConductorMedium(1.0), np.geomspace(1e9, 1e12, 30))]
    ['1.7975e+10']
    """
    prevails = _conducts(medium, frequency)
    found = []
    for place in np.flatnonzero(prevails[1:] != prevails[:-1]).tolist():
        low, high = float(frequency[place]), float(frequency[place + 1])
        below = bool(prevails[place])
        for _ in range(60):
            middle = float(np.sqrt(low * high))
            if bool(_conducts(medium, np.array([middle]))[0]) == below:
                low = middle
            else:
                high = middle
        found.append(high)
    return tuple(found)


def readings_at(medium: AbstractMedium, frequency: float) -> tuple[tuple[str, str], ...]:
    """Return every quantity of a medium at `frequency` in Hz as pairs of symbol and words.

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> readings_at(ConstantMedium(4.0), 1e10)[:3]
    (('ε′', '4'), ('ε″', '0'), ('tan δ', '0'))
    """
    at = np.array([frequency])
    values = medium.evaluate(at)
    rows = MATERIAL_QUANTITIES.items()
    return tuple((row.figure.symbol, words_of(name, float(row.values(at, values)[0]))) for name, row in rows)


def reading_sentence(specimen: Specimen, frequency: float) -> str:
    """Return every quantity of a specimen at `frequency` in Hz in one line, and whether it is known there."""
    told = ", ".join(f"{symbol} {words}" for symbol, words in readings_at(specimen.medium, frequency))
    held = bool(held_at(specimen.medium, np.array([frequency]))[0])
    guess = "" if held else f" (a guess: known {known_text(specimen.medium)})"
    return f"{specimen.label}: {told}{guess}"


def crossover_sentence(curve: MaterialCurve) -> str:
    """Return where conduction takes over, or which current prevails over all of the sweep."""
    if curve.crossover:
        places = " and ".join(frequency_text(place, None) for place in map(_rounded, curve.crossover))
        return f"{curve.specimen.label}: conduction and displacement current are equal at {places}"
    known = curve.raw[~np.isnan(curve.raw)]
    if not known.size:
        return ""
    prevails = "conduction" if known[0] > 1 else "displacement current"
    return f"{curve.specimen.label}: {prevails} prevails over all of the sweep"


def data_table(curves: Sequence[MaterialCurve]) -> str:
    """Return curves as text with tabs between columns: SI units in the header, every digit.

    After each column of values stands one that says whether the material is known there, for curves that leave
    their range.
    """
    if not curves:
        return ""
    row = MATERIAL_QUANTITIES[curves[0].quantity]
    titles, columns = ["Frequency, Hz"], [list(map(repr, curves[0].x.tolist()))]
    for curve in curves:
        unit = row.dimension.si_unit
        titles.append(f"{row.figure.label} of {curve.specimen.label}{f', {unit}' if unit else ''}")
        columns.append(list(map(repr, curve.raw.tolist())))
        if not curve.held.all():
            titles.append(f"{curve.specimen.label} is known here")
            columns.append(["yes" if held else "no" for held in curve.held.tolist()])
    lines = [titles, *map(list, zip(*columns, strict=True))]
    return "\n".join("\t".join(line) for line in lines) + "\n"


def _conducts(medium: AbstractMedium, frequency: FloatArray) -> Mask:
    values = medium.evaluate(frequency).permittivity
    return np.asarray(0.0 - values.imag > np.abs(values.real))


def _rounded(frequency: float) -> float:
    """Return a frequency with as many digits as a place that depends on measured data deserves."""
    return float(f"{frequency:.4g}")
