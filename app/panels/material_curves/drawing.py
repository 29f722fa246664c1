"""From curves of materials to curves on the screen: colours, line styles, places, marks, ranges."""

from collections.abc import Sequence
from typing import Final

import numpy as np

from app.document.view import ViewState
from app.look.theme import DASHED, SOLID, Theme
from app.panels.curves.curve_layer import DrawnCurve
from app.panels.curves.end_labels import EndLabel
from app.panels.curves.mark_layers import Spot
from app.panels.curves.plot import Extent
from app.panels.curves.scale import FrequencyScale
from app.series.material_curves import MaterialCurve
from stackcore.arrays import FloatArray

_HUES: Final = (
    "transmission",
    "reflection",
    "absorption",
    "reflection_phase",
    "delay",
    "shielding",
    "transmission_phase",
    "group_delay",
)
"""Names of the theme's data hues, in the order in which materials take them: neighbours differ most."""


def colour_of(theme: Theme, place: int) -> str:
    """Return the colour of the material at a place among those compared."""
    colour: str = getattr(theme, _HUES[place % len(_HUES)])
    return colour


def line_style(place: int) -> tuple[float, ...]:
    """Return the dash pattern of the material at a place: dashed once the colours repeat."""
    return DASHED if place // len(_HUES) % 2 else SOLID


def value_positions(values: FloatArray, *, by_ratio: bool) -> FloatArray:
    """Return where values lie on the axis: their log₁₀ when drawn by ratio."""
    if not by_ratio:
        return values
    places = np.full(values.shape, np.nan)
    return np.log10(values, out=places, where=values > 0)


def draw_curves(
    curves: Sequence[MaterialCurve], theme: Theme, scale: FrequencyScale, *, by_ratio: bool
) -> tuple[DrawnCurve, ...]:
    """Return the curves as they are drawn."""
    return tuple(
        DrawnCurve(
            scale.positions(curve.x),
            value_positions(curve.y, by_ratio=by_ratio),
            colour_of(theme, place),
            line_style(place),
            held=curve.held,
        )
        for place, curve in enumerate(curves)
    )


def end_labels(curves: Sequence[MaterialCurve], drawn: Sequence[DrawnCurve]) -> tuple[EndLabel, ...]:
    """Return the names at the ends."""
    return tuple(
        EndLabel(short(curve.specimen.label), picture)
        for curve, picture in zip(curves, drawn, strict=True)
        if picture.runs
    )


def short(label: str, most: int = 22) -> str:
    """Return a name that leaves room for the curves; the whole one stands in words below."""
    return label if len(label) <= most else f"{label[: most - 1].rstrip()}…"


def extent_of(drawn: Sequence[DrawnCurve]) -> Extent:
    """Return the whole of what there is to show."""
    known = [curve.values[np.isfinite(curve.values)] for curve in drawn]
    values = np.concatenate(known) if known else np.zeros(0)
    low, high = (float(values.min()), float(values.max())) if values.size else (0.0, 1.0)
    if not drawn:
        return Extent(0.0, 1.0, low, high)
    return Extent(float(drawn[0].positions[0]), float(drawn[0].positions[-1]), low, high)


def crossover_spots(
    curves: Sequence[MaterialCurve], theme: Theme, scale: FrequencyScale, *, by_ratio: bool
) -> tuple[Spot, ...]:
    """Return the places where conduction and displacement current are equal: the ratio is 1 there."""
    level = 0.0 if by_ratio else 1.0
    return tuple(
        Spot(scale.position(hertz), level, colour_of(theme, place))
        for place, curve in enumerate(curves)
        for hertz in curve.crossover
    )


def first_scales(frequency: FloatArray, state: ViewState) -> bool:
    """Return whether frequencies are drawn by ratio at first: as the curves of the wall are, or over decades."""
    return state.log_frequency or float(frequency.max()) > 10 * float(frequency.min())
