"""Readings: markers and worst points against curves."""

from dataclasses import replace

import numpy as np
import pytest

from app.document.view import ViewState
from app.series.curves import curves_of
from app.series.readings import WORST, ReadingRow, readings_of, table_text
from stackcore.propagation import Response
from tests.app.series.responses import slab

MARKERS = (9.1234e9, 8e9)


def read(response: Response, state: ViewState, at_markers: Response | None = None) -> tuple[ReadingRow, ...]:
    """Return the readings of a response, with those solved at the markers when they are given."""
    exact = None if at_markers is None else curves_of(at_markers, state, unit_from=response.frequency)
    return readings_of(curves_of(response, state), state, exact)


def test_markers_read_exactly_where_they_stand() -> None:
    """With the markers solved, each row holds the values at its own frequency, in the order of making."""
    at_markers = slab(frequency=np.array(MARKERS))
    rows = read(slab(), ViewState(markers=MARKERS), at_markers)
    assert [(row.label, row.marker, row.frequency) for row in rows] == [
        ("9.1234 GHz", 0, 9.1234e9),
        ("8 GHz", 1, 8e9),
        ("2 less 1: −1.1234 GHz", None, None),
        (WORST, None, None),
    ]
    for index, row in enumerate(rows[:2]):
        values = [cell.value for cell in row.cells if cell is not None]
        assert values == at_markers.transmittance[index].ravel().tolist()


@pytest.mark.parametrize("solved", [None, (9.2e9, 8e9)])
def test_markers_not_solved_read_the_nearest_frequency(solved: tuple[float, ...] | None) -> None:
    """Without a solution for just these markers the nearest frequency of the sweep is read, and named."""
    response = slab()
    at_markers = None if solved is None else slab(frequency=np.array(solved))
    cell = read(response, ViewState(markers=MARKERS), at_markers)[0].cells[0]
    assert cell is not None
    assert (cell.frequency, cell.value) == (9e9, response.transmittance[1, 0, 0])


def test_the_worst_row() -> None:
    """The last row holds each curve's worst point with its own frequency, unless it is not wanted."""
    response = slab()
    curves = curves_of(response, ViewState())
    row = read(response, ViewState())[-1]
    for cell, curve in zip(row.cells, curves, strict=True):
        assert cell is not None
        assert curve.worst is not None
        assert (cell.value, cell.frequency) == (curve.worst.y, curve.worst.x)
    assert read(response, ViewState(worst_shown=False)) == ()
    assert read(response, ViewState(quantity="group_delay_s")) == ()


def test_infinite_readings() -> None:
    """Behind metal the loss reads as infinite, at a marker and as the worst."""
    state = ViewState(quantity="insertion_loss_dB", markers=(10e9,))
    marker, worst = read(slab(metal_back=True), state)
    for row in (marker, worst):
        cell = row.cells[0]
        assert cell is not None
        assert (cell.text, cell.exact) == ("∞ dB", "inf dB")


def test_texts_of_a_reading() -> None:
    """Number, unit and words for the screen; every digit for the clipboard."""
    state = ViewState(quantity="reflection_phase_deg", markers=(10e9,), polarizations=("TE",))
    response = slab()
    cell = read(response, state)[0].cells[0]
    assert cell is not None
    value = float(response.reflection_phase_deg[2, 0, 0])
    assert cell.exact == f"{value!r} deg"
    assert (cell.number, cell.unit) == (f"{value:.2f}".replace("-", "−"), "deg")
    assert cell.text == f"{cell.number}°"


def test_a_delay_keeps_the_unit_of_its_column() -> None:
    """A marker far below the top of the sweep is read in the unit of the sweep's curves."""
    frequency = np.array([5e8, 12e9])
    state = ViewState(quantity="group_delay_s", markers=(5e8,))
    rows = read(slab(frequency=frequency), state, slab(frequency=np.array([5e8])))
    cell = rows[0].cells[0]
    assert cell is not None
    assert cell.unit == "ps"


def test_readings_for_the_clipboard() -> None:
    """The table has a title, a heading for each curve and every digit."""
    response, state = slab(), ViewState(markers=(10e9,), polarizations=("TM",))
    text = table_text(read(response, state), curves_of(response, state), "Transmittance")
    lines = [line.split("\t") for line in text.splitlines()]
    assert lines[0] == ["Transmittance", "TM 0°", "TM 60°", "TM 30°"]
    assert [line[0] for line in lines[1:]] == ["10 GHz", WORST]
    assert [float(value) for value in lines[1][1:]] == response.transmittance[2, :, 1].tolist()


def test_what_the_active_marker_reads_more_than_the_first() -> None:
    """Between two markers stands a row of differences; the first marker active, the second is compared with it."""
    response = slab()
    for active in (0, 1):
        rows = read(response, ViewState(markers=(8e9, 10e9), active_marker=active, worst_shown=False))
        assert [row.kind for row in rows] == ["marker", "marker", "difference"]
        assert rows[2].label == "2 less 1: 2 GHz"
        gaps = [cell.value for cell in rows[2].cells if cell is not None]
        assert gaps == pytest.approx((response.transmittance[2] - response.transmittance[0]).ravel(), abs=1e-15)


def test_a_difference_of_phases_stays_within_half_a_turn() -> None:
    """From 170° to −170° it is 20° further, not 340° back."""
    state = ViewState(quantity="transmission_phase_deg", markers=(8e9, 12e9))
    curve = curves_of(slab(), state)[0]
    curve = replace(curve, x=np.array([8e9, 12e9]), raw=np.array([170.0, -170.0]))
    cell = readings_of([curve], state, [curve])[2].cells[0]
    assert cell is not None
    assert cell.value == pytest.approx(20.0)
