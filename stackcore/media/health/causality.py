"""Is the medium causal, as far as a finite band can tell?"""

from collections.abc import Iterator
from typing import Final

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.health.findings import Finding
from stackcore.media.health.kramers_kronig import KramersKronig, kramers_kronig
from stackcore.media.health.words import hertz, percent, span
from stackcore.media.tabulated import TabulatedMedium

NARROW: Final = 2.0
"""Ratio of the ends of a band below which the relation says next to nothing."""

_GRID: Final = 200
_FEW_ROWS: Final = 8
_MOST_ROWS: Final = 400


def causality_findings(medium: AbstractMedium, band: FrequencyRange | None) -> Iterator[Finding]:
    """Yield what the relation of Kramers and Kronig says of a medium that is not made of others.

    `band` is where to look, in Hz; a table is judged over all of its rows instead.
    """
    if isinstance(medium, TabulatedMedium):
        yield from _table_findings(medium)
    elif band is None or not band.highest > 1.05 * band.lowest:
        return
    elif not medium.dispersive:
        yield from _constant_findings(medium, band)
    else:
        yield from _model_findings(medium, band)


def _constant_findings(medium: AbstractMedium, band: FrequencyRange) -> Iterator[Finding]:
    """A loss that is the same at all frequencies makes ε′ fall by (2/π) ε″ for every factor e of frequency."""
    values = medium.evaluate(np.array(band.lowest))
    decades = np.log10(band.highest / band.lowest)
    for name, symbol, value in (
        ("permittivity", "ε", complex(values.permittivity)),
        ("permeability", "μ", complex(values.permeability)),
    ):
        drift = 2 / np.pi * -value.imag / abs(value) * np.log(band.highest / band.lowest)
        if drift < (0.005 if decades < 1 else 0.001):
            continue
        yield Finding(
            "warning" if drift >= 0.02 else "note",
            "causality",
            name,
            f"a constant {symbol}′ with a constant loss over {span(band)} is not causal: with that loss {symbol}′ "
            f"would fall by about {percent(drift)} over the sweep",
            "use the wideband logarithmic model, or keep to a narrow band; pulses would show precursors",
        )


def _model_findings(medium: AbstractMedium, band: FrequencyRange) -> Iterator[Finding]:
    frequency = np.geomspace(band.lowest, band.highest, _GRID)
    values = medium.evaluate(frequency)
    for name, symbol, column in (
        ("permittivity", "ε", values.permittivity),
        ("permeability", "μ", values.permeability),
    ):
        if np.ptp(column.imag) == 0 and np.ptp(column.real) == 0:
            continue
        result = kramers_kronig(frequency, column)
        if result.misfit >= 0.005:
            yield Finding(
                "warning" if result.misfit >= 0.05 else "note",
                "causality",
                name,
                f"over {span(band)} the model is not causal: no absorption at any frequency explains {symbol}′ to "
                f"better than {percent(result.misfit)} ({_worst(result)})",
                "fine for a sweep of frequencies; for pulses fit a sum of relaxations to it",
            )


def _table_findings(medium: TabulatedMedium) -> Iterator[Finding]:
    frequency, tested = _dense(np.asarray(medium.frequency))
    values = medium.evaluate(frequency)
    columns: list[tuple[str, str, ComplexArray]] = [("permittivity", "ε", values.permittivity)]
    if medium.permeability is not None:
        columns.append(("permeability", "μ", values.permeability))
    for name, symbol, column in columns:
        if len(medium.frequency) < _FEW_ROWS:
            yield Finding(
                "note",
                "causality",
                name,
                f"{len(medium.frequency)} rows are too few to tell whether {symbol}′ and {symbol}″ belong together",
                f"measure {_FEW_ROWS} frequencies or more to have it checked",
            )
        else:
            yield _table_finding(name, symbol, kramers_kronig(frequency, column, tested))


def _table_finding(name: str, symbol: str, result: KramersKronig) -> Finding:
    band = span(FrequencyRange(result.lowest, result.highest))
    if result.misfit >= 0.005:
        return Finding(
            "warning" if result.misfit >= 0.02 else "note",
            "causality",
            name,
            f"over {band} {symbol}′ and {symbol}″ do not belong together: no absorption outside the table explains "
            f"{symbol}′ to better than {percent(result.misfit)} ({_worst(result)})",
            "look for noise, a wrong sample thickness, or columns that were swapped or of different samples",
        )
    told = f"over {band} {symbol}′ and {symbol}″ agree with causality to {percent(result.misfit)}"
    tails = (
        f"supposing absorption outside that changes {symbol}′ across the table by {result.below:.2g} from below "
        f"and {result.above:.2g} from above"
    )
    if result.highest < NARROW * result.lowest:
        hint = "so narrow a band proves little: absorption outside it can explain almost any slow change"
    else:
        hint = "a finite band cannot prove more; data beyond its ends would narrow the tails"
    return Finding("note", "causality", name, f"{told}, {tails}", hint)


def _worst(result: KramersKronig) -> str:
    return f"{percent(result.worst)} near {hertz(result.worst_frequency)}"


def _dense(rows: FloatArray) -> tuple[FloatArray, NDArray[np.intp]]:
    """Return frequencies dense enough for the integral, with the rows of the table among them, and their places."""
    if rows.size > _MOST_ROWS:
        rows = rows[np.unique(np.linspace(0, rows.size - 1, _MOST_ROWS).astype(np.intp))]
    between = np.geomspace(rows[0], rows[-1], _GRID)[1:-1]
    nearest = np.abs(np.log(between[:, None] / rows)).min(axis=1)
    # A grid point next to a row would make a sliver of a piece.
    spacing = np.log(rows[-1] / rows[0]) / _GRID
    frequency = np.sort(np.concatenate((rows, between[nearest > 0.3 * spacing])))
    return frequency, np.searchsorted(frequency, rows)
