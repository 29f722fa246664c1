"""Curves to be drawn, made from a response."""

from dataclasses import dataclass

import numpy as np

from app.document.view import ViewState
from app.series.shown import shown, shown_unit, shown_values
from app.series.validity import Doubt, Mask, doubts_of, held_by_all
from stackcore.media.base import FloatArray
from stackcore.polarizations import Polarization, polarization
from stackcore.propagation import Response
from stackcore.quantities import quantity_named


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
        Name of the quantity.
    label
        Words for the end of the line: ``TE 30°``, ``Circular 30°``, ``45° tilt 30°``.
    polarization
        Key of `stackcore.polarizations`: ``TE``, ``TM``, ``circular``, ``tilt 45 deg``.
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
    stack
        Name of the stack when it is not the one in hand.
    less
        Name of the stack whose values are taken off; there is then no worst point.
    low, high
        Ends of the envelope over the conditions in `unit`, nan where nothing can be drawn, or None without one.
    worst_in
        The condition in which the worst point is, empty for the stack as it is built.
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
    stack: str = ""
    less: str = ""
    low: FloatArray | None = None
    high: FloatArray | None = None
    worst_in: str = ""

    @property
    def infinite_value(self) -> float:
        """The worst value where it is infinite; that of a condition where the curve itself is not."""
        assert self.worst_infinite is not None
        value = float(self.raw[int(np.argmin(np.abs(self.x - self.worst_infinite)))])
        if np.isfinite(value):
            return np.inf if shown(self.quantity).worst == "high" else -np.inf
        return value


def curves_of(
    response: Response, view_state: ViewState, *, unit_from: FloatArray | None = None
) -> tuple[Curve, ...]:
    """Return the curves that `view_state` asks for, angle by angle, the polarizations in its order.

    Reflectance, transmittance and absorptance come as the view shows fractions of power;
    group delay comes in the unit of `app.series.shown` for the frequencies `unit_from`, by default the
    response's own.
    """
    quantity = view_state.quantity
    frequency = response.frequency if unit_from is None else unit_from
    unit, factor = shown_unit(quantity, power=view_state.power, frequency=frequency)
    row = quantity_named(quantity)
    waves = [polarization(key) for key in view_state.polarizations]
    values = [
        shown_values(quantity, row.of(response, wave), power=view_state.power, factor=factor) for wave in waves
    ]
    ranks = np.argsort(np.argsort(response.angle, kind="stable"), kind="stable")
    doubts = doubts_of(response.stack, response.frequency)
    return tuple(
        _curve(quantity, wave, response, column, unit, doubts, rank=int(ranks[index]), index=index)
        for index in range(len(response.angle))
        for wave, column in zip(waves, values, strict=True)
    )


def curve_label(key: str, angle: float) -> str:
    """Return the words for a curve: its polarization and its angle (rad) in degrees.

    Examples
    --------
    >>> curve_label("TM", np.radians(22.5)), curve_label("tilt 45 deg", np.radians(30))
    ('TM 22.5°', '45° tilt 30°')
    """
    return f"{polarization(key).label} {float(f'{np.degrees(angle):.6g}'):g}°"


def _curve(
    quantity: str,
    wave: Polarization,
    response: Response,
    values: FloatArray,
    unit: str,
    doubts: tuple[Doubt, ...],
    *,
    rank: int,
    index: int,
) -> Curve:
    x = np.asarray(response.frequency, dtype=np.float64)
    raw = values[:, index]
    finite = np.isfinite(raw)
    worst, infinite = worst_point(quantity, x, raw)
    angle = float(response.angle[index])
    return Curve(
        quantity,
        curve_label(wave.key, angle),
        wave.key,
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


def worst_point(quantity: str, x: FloatArray, raw: FloatArray) -> tuple[Point | None, float | None]:
    """Return the worst finite point, or else the frequency at which the worst value is infinite."""
    end = shown(quantity).worst
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
    return points > LONG and not quantity_named(quantity).ready(response)
