"""The readings: one row a marker and one for the worst points, one column a curve."""

from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Final, Literal

import numpy as np

from app.document.view import ViewState
from app.series.curves import Curve, Point
from app.series.shown import shown
from app.series.texts import exact_text, frequency_text, number_text, value_text

WORST: Final = "Worst"


@dataclass(frozen=True, slots=True)
class Reading:
    """One value.

    Parameters
    ----------
    number, unit
        As shown; the unit of degrees is ``deg``.
    text
        Number, unit and, where it says more, words.
    exact
        Every digit and the unit, to be copied.
    value
        In `unit`; infinite or nan as it is.
    frequency
        Where it is read, Hz.
    condition
        Under which it is read, empty for the stack as it is built.
    """

    number: str
    unit: str
    text: str
    exact: str
    value: float
    frequency: float
    condition: str = ""


@dataclass(frozen=True, slots=True)
class ReadingRow:
    """One row of the readings.

    Parameters
    ----------
    label
        ``9.4 GHz``, `WORST`, or ``2 less 1: 300 MHz``.
    marker
        Index of the marker, or None for a row that is of none.
    frequency
        Of the marker in Hz; None for other rows.
    cells
        One a curve, in the order of `curves_of`; None where a curve has no worst point or no difference.
    kind
        Of a marker, of two markers, or of the worst points, each of which has its own frequency.
    """

    label: str
    marker: int | None
    frequency: float | None
    cells: tuple[Reading | None, ...]
    kind: Literal["marker", "difference", "worst"] = "marker"


def readings_of(
    curves: Sequence[Curve], view_state: ViewState, at_markers: Sequence[Curve] | None = None
) -> tuple[ReadingRow, ...]:
    """Return the rows for the markers in the order they were made, differences, and the worst points last.

    Parameters
    ----------
    curves
        Over the sweep.
    view_state
        Markers, and whether worst points are shown.
    at_markers
        The same curves solved at exactly the markers' frequencies, in their order. Without them (or with those
        of other markers) a marker reads the sweep's nearest frequency, which its cells then name.
    """
    exact = at_markers is not None and all(np.array_equal(one.x, view_state.markers) for one in at_markers)
    read = at_markers if at_markers is not None and exact else curves
    rows = [
        ReadingRow(frequency_text(marker), index, marker, tuple(_at(curve, marker) for curve in read))
        for index, marker in enumerate(view_state.markers)
    ]
    if len(rows) > 1:
        rows.append(_difference(rows, view_state.active_marker, curves))
    if view_state.worst_shown and any(curve.worst or curve.worst_infinite for curve in curves):
        rows.append(ReadingRow(WORST, None, None, tuple(_worst(curve) for curve in curves), "worst"))
    return tuple(rows)


def table_text(rows: Sequence[ReadingRow], curves: Sequence[Curve], title: str) -> str:
    """Return the readings as tab-separated text with every digit, for the clipboard; `title` names the quantity."""
    lines = [[title, *(curve.label for curve in curves)]]
    for row in rows:
        lines.append([row.label, *(cell.exact if cell is not None else "" for cell in row.cells)])
    return "\n".join("\t".join(line) for line in lines) + "\n"


def _difference(rows: Sequence[ReadingRow], active: int, curves: Sequence[Curve]) -> ReadingRow:
    """Return what the active marker reads more than the first; of the first itself, what the second does."""
    one, first = rows[active if active else 1], rows[0]
    assert one.marker is not None
    assert one.frequency is not None
    assert first.frequency is not None
    apart = one.frequency - first.frequency
    sign = "−" if apart < 0 else ""
    cells = []
    for curve, value, other in zip(curves, one.cells, first.cells, strict=True):
        gap = np.nan if value is None or other is None else _gap(curve, value.value, other.value)
        cells.append(_reading(curve, Point(one.frequency, gap)) if np.isfinite(gap) else None)
    label = f"{one.marker + 1} less 1: {sign}{frequency_text(abs(apart))}"
    return ReadingRow(label, None, None, tuple(cells), "difference")


def _gap(curve: Curve, value: float, other: float) -> float:
    if not (np.isfinite(value) and np.isfinite(other)):
        return np.nan
    gap = value - other
    return 180.0 - (180.0 - gap) % 360.0 if shown(curve.quantity).wraps else gap


def _at(curve: Curve, frequency: float) -> Reading:
    nearest = int(np.argmin(np.abs(curve.x - frequency)))
    return _reading(curve, Point(float(curve.x[nearest]), float(curve.raw[nearest])))


def _worst(curve: Curve) -> Reading | None:
    if curve.worst is not None:
        return replace(_reading(curve, curve.worst), condition=curve.worst_in)
    if curve.worst_infinite is None:
        return None
    return replace(_reading(curve, Point(curve.worst_infinite, curve.infinite_value)), condition=curve.worst_in)


def _reading(curve: Curve, point: Point) -> Reading:
    return Reading(
        number_text(curve.quantity, point.y, curve.unit),
        curve.unit,
        value_text(curve.quantity, point.y, curve.unit),
        exact_text(point.y, curve.unit),
        point.y,
        point.x,
    )
