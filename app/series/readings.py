"""The readings: one row a marker and one for the worst points, one column a curve."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Final

import numpy as np

from app.document.view import ViewState
from app.series.curves import Curve, Point, curves_of
from app.series.texts import exact_text, frequency_text, number_text, value_text
from stackcore.propagation import Response

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
    """

    number: str
    unit: str
    text: str
    exact: str
    value: float
    frequency: float


@dataclass(frozen=True, slots=True)
class ReadingRow:
    """One row of the readings.

    Parameters
    ----------
    label
        ``9.4 GHz``, or `WORST`.
    marker
        Index of the marker, or None for the row of worst points.
    frequency
        Of the marker in Hz; None for the worst points, each of which has its own.
    cells
        One a curve, in the order of `curves_of`; None where a curve has no worst point.
    """

    label: str
    marker: int | None
    frequency: float | None
    cells: tuple[Reading | None, ...]


def readings_of(
    response: Response, view_state: ViewState, at_markers: Response | None = None
) -> tuple[ReadingRow, ...]:
    """Return the rows for the markers in the order they were made, and the worst points last.

    Parameters
    ----------
    response
        Over the sweep.
    view_state
        Quantity, polarizations, markers.
    at_markers
        Solved at exactly the markers' frequencies, in their order, and the sweep's angles. Without it (or
        with one for other markers) a marker reads the sweep's nearest frequency, which its cells then name.
    """
    curves = curves_of(response, view_state)
    if at_markers is not None and np.array_equal(at_markers.frequency, view_state.markers):
        # The unit of a delay follows the sweep, so that a column has one unit.
        read = curves_of(at_markers, view_state, unit_from=response.frequency)
    else:
        read = curves
    rows = [
        ReadingRow(frequency_text(marker), index, marker, tuple(_at(curve, marker) for curve in read))
        for index, marker in enumerate(view_state.markers)
    ]
    if view_state.worst_shown and any(curve.worst or curve.worst_infinite for curve in curves):
        rows.append(ReadingRow(WORST, None, None, tuple(_worst(curve) for curve in curves)))
    return tuple(rows)


def table_text(rows: Sequence[ReadingRow], curves: Sequence[Curve], title: str) -> str:
    """Return the readings as tab-separated text with every digit, for the clipboard; `title` names the quantity."""
    lines = [[title, *(curve.label for curve in curves)]]
    for row in rows:
        lines.append([row.label, *(cell.exact if cell is not None else "" for cell in row.cells)])
    return "\n".join("\t".join(line) for line in lines) + "\n"


def _at(curve: Curve, frequency: float) -> Reading:
    nearest = int(np.argmin(np.abs(curve.x - frequency)))
    return _reading(curve, Point(float(curve.x[nearest]), float(curve.raw[nearest])))


def _worst(curve: Curve) -> Reading | None:
    if curve.worst is not None:
        return _reading(curve, curve.worst)
    if curve.worst_infinite is None:
        return None
    place = int(np.argmin(np.abs(curve.x - curve.worst_infinite)))
    return _reading(curve, Point(curve.worst_infinite, float(curve.raw[place])))


def _reading(curve: Curve, point: Point) -> Reading:
    return Reading(
        number_text(curve.quantity, point.y, curve.unit),
        curve.unit,
        value_text(curve.quantity, point.y, curve.unit),
        exact_text(point.y, curve.unit),
        point.y,
        point.x,
    )
