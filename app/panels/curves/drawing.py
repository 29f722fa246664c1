"""From curves of numbers to curves on the screen: colours, dashes, places, and what is marked."""

from collections.abc import Sequence
from dataclasses import replace
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
from app.series.shown import shown
from app.series.texts import angle_text, frequency_text
from stackcore.polarizations import polarization
from stackcore.quantities import quantity_named

_HALF_TURN: Final = 180.0
_FADED: Final = 0.72
_ASIDE: Final = 0.8
_LONGEST: Final = 16
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
    """Return the colour of each curve; those of an earlier job and of other stacks are nearly grey."""
    full = (curve_colour(theme, curve.quantity, curve.angle_rank, curve.angle_count) for curve in curves)
    return tuple(
        mix(colour, theme.stale, _FADED) if stale else mix(colour, theme.muted, _ASIDE) if curve.stack else colour
        for colour, curve in zip(full, curves, strict=True)
    )


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
    stacks = list(dict.fromkeys(curve.stack for curve in curves if curve.stack))
    drawn = []
    for index, (given, colour) in enumerate(zip(curves, colours, strict=True)):
        curve = _rising(given)
        drawn.append(
            DrawnCurve(
                scale.positions(curve.x),
                curve.y,
                colour,
                dashes(curve.polarization),
                index == chosen,
                _HALF_TURN if shown(curve.quantity).wraps else np.inf,
                curve.held,
                curve.low,
                curve.high,
                stacks.index(curve.stack) if curve.stack else -1,
            )
        )
    return tuple(drawn)


def _rising(curve: Curve) -> Curve:
    """Return a curve with its points in the order of their frequencies."""
    if len(curve.x) < 2 or bool(np.all(curve.x[1:] >= curve.x[:-1])):
        return curve
    order = np.argsort(curve.x, kind="stable")
    low = None if curve.low is None else curve.low[order]
    high = None if curve.high is None else curve.high[order]
    return replace(curve, x=curve.x[order], y=curve.y[order], held=curve.held[order], low=low, high=high)


def end_labels(curves: Sequence[Curve], drawn: Sequence[DrawnCurve]) -> tuple[EndLabel, ...]:
    """Return the names at the ends; curves of one angle that lie on each other have one name.

    At normal incidence those are TE and TM, and at every angle what is the same for both. Of another stack one
    curve is named, with the name of the stack.
    """
    groups: list[tuple[list[Curve], DrawnCurve]] = []
    others: dict[str, EndLabel] = {}
    for curve, picture in zip(curves, drawn, strict=True):
        if not picture.runs:
            continue
        if curve.stack:
            others[curve.stack] = EndLabel(_short(curve.stack), picture)
            continue
        group = next((members for members, _ in groups if _lies_on(curve, members[0])), None)
        if group is None:
            groups.append(([curve], picture))
        else:
            group.append(curve)
    count = len({curve.polarization for curve in curves})
    return (*(EndLabel(_name(members, count), picture) for members, picture in groups), *others.values())


def _short(name: str) -> str:
    return name if len(name) <= _LONGEST else f"{name[: _LONGEST - 1].rstrip()}…"


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
    lines = [line for curve in curves for line in (curve.y, curve.low, curve.high) if line is not None]
    known = [line[np.isfinite(line)] for line in lines]
    values = np.concatenate(known) if known else np.zeros(0)
    low, high = (float(values.min()), float(values.max())) if len(values) else (0.0, 1.0)
    left, right = ends if ends else (0.0, 1.0)
    if not curves:
        return Extent(left, right, low, high)
    quantity, unit = curves[0].quantity, curves[0].unit
    floor, top = (-_HALF_TURN, _HALF_TURN) if shown(quantity).wraps else (None, None)
    if is_power(quantity) and unit != "dB" and not curves[0].less:
        top = 100.0 if unit == "%" else 1.0
    return Extent(left, right, low, high, floor, top, unit == "deg", _GRAINS.get(unit, 1e-30))


def with_ends(extent: Extent, left: float, right: float) -> Extent:
    """Return an extent whose horizontal axis has these ends, however far the curves reach."""
    return replace(extent, left=left, right=right)


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
        spots = [Spot(position, value, curve.colour) for curve in drawn for value in values_at(curve, position)]
        markers.append(DrawnMarker(text, position, active, tuple(spots)))
    return tuple(markers)


def legend_facts(
    curves: Sequence[Curve], colours: Sequence[str], state: ViewState, *, crowded: bool
) -> LegendFacts:
    """Return what the legend says: the other stacks and the envelope, and all when names have no room."""
    own = [(curve, colour) for curve, colour in zip(curves, colours, strict=True) if not curve.stack]
    by_angle = sorted({(curve.angle, colour) for curve, colour in own}) if crowded else []
    return LegendFacts(
        state.polarizations if crowded else (),
        tuple(angle_text(angle) for angle, _ in by_angle),
        tuple(colour for _, colour in by_angle),
        tuple(dict.fromkeys(curve.stack for curve in curves if curve.stack)),
        state.conditions if any(curve.low is not None for curve, _ in own) else (),
        own[0][1] if own else "",
    )


def quantity_label(state: ViewState) -> str:
    """Return the words for what is shown."""
    less = f", difference to {state.less}" if state.less else ""
    return f"{quantity_named(state.quantity).label}{less}"


def values_at(curve: DrawnCurve, position: float) -> tuple[float, ...]:
    """Return the value of a curve at a position, or nothing in a gap or beyond its ends."""
    for begin, end in curve.runs:
        if curve.positions[begin] <= position <= curve.positions[end - 1]:
            stretch = slice(begin, end)
            return (float(np.interp(position, curve.positions[stretch], curve.values[stretch])),)
    return ()
