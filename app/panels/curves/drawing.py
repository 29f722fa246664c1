"""From curves of numbers to curves on the screen: colours, dashes, places, and what is marked."""

from collections.abc import Sequence
from typing import Final

import numpy as np
from PySide6.QtGui import QColor, QPalette
from PySide6.QtWidgets import QWidget

from app.document.view import ViewState
from app.look.colour import mix
from app.look.theme import Theme, curve_colour, dashes
from app.panels.curves.curve_layer import DrawnCurve
from app.panels.curves.end_labels import EndLabel
from app.panels.curves.legend import LegendFacts
from app.panels.curves.mark_layers import DrawnMarker, Spot
from app.panels.curves.plot import Extent
from app.panels.curves.scale import FrequencyScale
from app.series.axis import is_power
from app.series.curves import Curve
from app.series.texts import angle_text, frequency_text
from stackcore.polarizations import polarization
from stackcore.quantities import quantity_named

_TURNS: Final = {
    "reflection_phase_deg": 180.0,
    "transmission_phase_deg": 180.0,
    "transmission_phase_difference_deg": 180.0,
    "reflection_phase_difference_deg": 180.0,
}
_FADED: Final = 0.72
_NORMAL: Final = 1e-12
_GRAINS: Final = {"dB": 1e-9, "deg": 1e-7}


def fill_palette(widget: QWidget, theme: Theme) -> None:
    """Give a panel the ground and inks of a theme, whatever look the application has."""
    palette = widget.palette()
    palette.setColor(QPalette.ColorRole.Window, QColor(theme.base))
    palette.setColor(QPalette.ColorRole.WindowText, QColor(theme.text))
    palette.setColor(QPalette.ColorRole.ButtonText, QColor(theme.accent))
    widget.setPalette(palette)


def colours_of(curves: Sequence[Curve], theme: Theme, *, stale: bool) -> tuple[str, ...]:
    """Return the colour of each curve; those of an earlier job are nearly grey."""
    full = (curve_colour(theme, curve.quantity, curve.angle_rank, curve.angle_count) for curve in curves)
    return tuple(mix(colour, theme.stale, _FADED) if stale else colour for colour in full)


def chosen_index(curves: Sequence[Curve], state: ViewState) -> int | None:
    """Return the index of the curve the wall drawing shows, or None when it is not among several."""
    shown = len(state.polarizations)
    if len(curves) < 2 or state.active_polarization not in state.polarizations:
        return None
    index = state.active_angle * shown + state.polarizations.index(state.active_polarization)
    return index if index < len(curves) else None


def draw_curves(
    curves: Sequence[Curve], colours: Sequence[str], scale: FrequencyScale, chosen: int | None
) -> tuple[DrawnCurve, ...]:
    """Return the curves as they are drawn, each rising in frequency."""
    drawn = []
    for index, (curve, colour) in enumerate(zip(curves, colours, strict=True)):
        positions, values, held = scale.positions(curve.x), curve.y, curve.held
        if len(positions) > 1 and not bool(np.all(positions[1:] >= positions[:-1])):
            order = np.argsort(positions, kind="stable")
            positions, values, held = positions[order], values[order], held[order]
        leap = _TURNS.get(curve.quantity, np.inf)
        style = dashes(curve.polarization)
        drawn.append(DrawnCurve(positions, values, colour, style, index == chosen, leap, held))
    return tuple(drawn)


def end_labels(curves: Sequence[Curve], drawn: Sequence[DrawnCurve]) -> tuple[EndLabel, ...]:
    """Return the names at the ends; curves of one angle that lie on each other have one name.

    At normal incidence those are TE and TM, and at every angle what is the same for both.
    """
    groups: list[tuple[list[Curve], DrawnCurve]] = []
    for curve, picture in zip(curves, drawn, strict=True):
        if not picture.runs:
            continue
        group = next((members for members, _ in groups if _lies_on(curve, members[0])), None)
        if group is None:
            groups.append(([curve], picture))
        else:
            group.append(curve)
    shown = len({curve.polarization for curve in curves})
    return tuple(EndLabel(_name(members, shown), picture) for members, picture in groups)


def _lies_on(curve: Curve, other: Curve) -> bool:
    if curve.angle != other.angle:
        return False
    waves = (polarization(curve.polarization), polarization(other.polarization))
    if curve.angle <= _NORMAL and all(wave.single is not None for wave in waves):
        return True  # whatever rounding makes of a phase of half a turn
    return bool(np.allclose(curve.y, other.y, rtol=1e-9, atol=1e-12, equal_nan=True))


def _name(members: Sequence[Curve], shown: int) -> str:
    if len(members) == 1:
        return members[0].label
    if len(members) == shown > 2:
        return f"all {angle_text(members[0].angle)}"
    words = ", ".join(polarization(curve.polarization).label for curve in members)
    return f"{words} {angle_text(members[0].angle)}"


def extent_of(curves: Sequence[Curve], scale: FrequencyScale) -> Extent:
    """Return the whole of what there is to show."""
    ends = [scale.position(float(end)) for curve in curves[:1] for end in (curve.x.min(), curve.x.max())]
    known = [curve.y[np.isfinite(curve.y)] for curve in curves]
    values = np.concatenate(known) if known else np.zeros(0)
    low, high = (float(values.min()), float(values.max())) if len(values) else (0.0, 1.0)
    left, right = ends if ends else (0.0, 1.0)
    if not curves:
        return Extent(left, right, low, high)
    quantity, unit = curves[0].quantity, curves[0].unit
    turn = _TURNS.get(quantity)
    floor, top = (-turn, turn) if turn is not None else (None, None)
    if is_power(quantity) and unit != "dB":
        top = 100.0 if unit == "%" else 1.0
    return Extent(left, right, low, high, floor, top, unit == "deg", _GRAINS.get(unit, 1e-30))


def worst_spots(curves: Sequence[Curve], colours: Sequence[str], scale: FrequencyScale) -> dict[int, Spot]:
    """Return the worst points by the index of their curve."""
    return {
        index: Spot(scale.position(curve.worst.x), curve.worst.y, colours[index])
        for index, curve in enumerate(curves)
        if curve.worst is not None
    }


def draw_markers(state: ViewState, drawn: Sequence[DrawnCurve], scale: FrequencyScale) -> tuple[DrawnMarker, ...]:
    """Return the markers; the active one also says its frequency."""
    markers = []
    for index, hertz in enumerate(state.markers):
        position = scale.position(hertz)
        active = index == state.active_marker
        text = f"{index + 1}   {frequency_text(hertz)}" if active else str(index + 1)
        spots = [Spot(position, value, curve.colour) for curve in drawn for value in _values_at(curve, position)]
        markers.append(DrawnMarker(text, position, active, tuple(spots)))
    return tuple(markers)


def legend_facts(curves: Sequence[Curve], colours: Sequence[str], state: ViewState) -> LegendFacts:
    """Return what the legend says of these curves."""
    by_angle = sorted({(curve.angle, colour) for curve, colour in zip(curves, colours, strict=True)})
    return LegendFacts(
        state.polarizations,
        tuple(angle_text(angle) for angle, _ in by_angle),
        tuple(colour for _, colour in by_angle),
    )


def quantity_label(state: ViewState) -> str:
    """Return the words for what is shown."""
    return quantity_named(state.quantity).label


def _values_at(curve: DrawnCurve, position: float) -> tuple[float, ...]:
    """Return the value of a curve at a position, or nothing in a gap or beyond its ends."""
    for begin, end in curve.runs:
        if curve.positions[begin] <= position <= curve.positions[end - 1]:
            stretch = slice(begin, end)
            return (float(np.interp(position, curve.positions[stretch], curve.values[stretch])),)
    return ()
