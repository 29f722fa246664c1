"""Curves to be drawn, made from a response."""

from dataclasses import dataclass

import numpy as np

from app.document.view import ViewState
from app.series.shown import SHOWN, shown_unit, shown_values
from app.series.validity import Doubt, Mask, doubts_of, held_by_all
from stackcore.conventions import POLARIZATIONS
from stackcore.media.base import FloatArray
from stackcore.propagation import Response
from stackcore.quantities import QUANTITIES


@dataclass(frozen=True, slots=True)
class Point:
    """A point of a curve: frequency in Hz, value in the unit of the curve."""

    x: float
    y: float


@dataclass(frozen=True, slots=True, eq=False)
class Curve:
    """One line of the plot.

    Parameters
    ----------
    quantity
        CSV column name.
    label
        Words for the end of the line: ``TE 30°``.
    polarization
        ``TE`` or ``TM``.
    angle
        In rad.
    angle_rank, angle_count
        Place of the angle among the sweep's angles, 0 for the smallest; colour follows it.
    x
        Frequencies in Hz.
    y
        Values in `unit`; nan where there is nothing to draw.
    raw
        The same values with infinite ones as they are.
    unit
        What the values are in, empty for a plain number.
    worst
        The worst point, or None: when the quantity has no worse end, or when the worst value is infinite.
    worst_infinite
        Where the value first is infinite at the worse end, as its frequency in Hz, or None.
    hidden_points
        How many points cannot be drawn because their value is not finite.
    held
        For each point, whether every material of the stack is known there.
    doubts
        The materials that are not known at all points.
    """

    quantity: str
    label: str
    polarization: str
    angle: float
    angle_rank: int
    angle_count: int
    x: FloatArray
    y: FloatArray
    raw: FloatArray
    unit: str
    worst: Point | None
    worst_infinite: float | None
    hidden_points: int
    held: Mask
    doubts: tuple[Doubt, ...] = ()


def curves_of(
    response: Response, view_state: ViewState, *, unit_from: FloatArray | None = None
) -> tuple[Curve, ...]:
    """Return the curves that `view_state` asks for, angle by angle, TE before TM.

    Reflectance, transmittance and absorptance come as the view shows fractions of power;
    group delay comes in the unit of `app.series.shown` for the frequencies `unit_from`, by default the
    response's own.
    """
    quantity = view_state.quantity
    frequency = response.frequency if unit_from is None else unit_from
    unit, factor = shown_unit(quantity, power=view_state.power, frequency=frequency)
    values = shown_values(quantity, QUANTITIES[quantity].values(response), power=view_state.power, factor=factor)
    ranks = np.argsort(np.argsort(response.angle, kind="stable"), kind="stable")
    doubts = doubts_of(response.stack, response.frequency)
    return tuple(
        _curve(quantity, polarization, response, values, unit, doubts, rank=int(ranks[index]), index=index)
        for index in range(len(response.angle))
        for polarization in POLARIZATIONS
        if polarization in view_state.polarizations
    )


def curve_label(polarization: str, angle: float) -> str:
    """Return the words for a curve: its polarization and its angle (rad) in degrees.

    Examples
    --------
    >>> curve_label("TM", np.radians(22.5))
    'TM 22.5°'
    """
    return f"{polarization} {float(f'{np.degrees(angle):.6g}'):g}°"


def _curve(
    quantity: str,
    polarization: str,
    response: Response,
    values: FloatArray,
    unit: str,
    doubts: tuple[Doubt, ...],
    *,
    rank: int,
    index: int,
) -> Curve:
    x = np.asarray(response.frequency, dtype=np.float64)
    raw = values[:, index, POLARIZATIONS.index(polarization)]
    finite = np.isfinite(raw)
    worst, infinite = _worst(quantity, x, raw)
    angle = float(response.angle[index])
    return Curve(
        quantity,
        curve_label(polarization, angle),
        polarization,
        angle,
        rank,
        len(response.angle),
        x,
        np.where(finite, raw, np.nan),
        raw,
        unit,
        worst,
        infinite,
        int(np.count_nonzero(~finite)),
        held_by_all(doubts, x),
        doubts,
    )


def _worst(quantity: str, x: FloatArray, raw: FloatArray) -> tuple[Point | None, float | None]:
    """Return the worst finite point, or else the frequency at which the worst value is infinite."""
    end = SHOWN[quantity].worst
    known = ~np.isnan(raw)
    if end is None or not known.any():
        return None, None
    badness = np.where(known, raw if end == "high" else -raw, -np.inf)
    place = int(np.argmax(badness))
    if np.isfinite(raw[place]):
        return Point(float(x[place]), float(raw[place])), None
    # argmax of values that are all infinitely good still points somewhere: every point is then the worst.
    return None, float(x[place])


LONG: int = 20_000
"""Points from which a quantity takes so long that the window must not work it out itself."""


def takes_long(response: Response, quantity: str) -> bool:
    """Return whether `quantity` of `response` is not worked out yet and would keep the window waiting."""
    points = response.frequency.size * response.angle.size
    return points > LONG and not response.knows(quantity)
