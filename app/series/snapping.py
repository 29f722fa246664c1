"""Where a marker snaps to: the next extremum of a curve, and the next place where it crosses a level."""

from collections.abc import Callable, Iterator

import numpy as np

from app.document.view import Power
from app.series.curves import Curve
from app.series.shown import shown, shown_unit, shown_values
from stackcore.arrays import FloatArray
from stackcore.polarizations import polarization
from stackcore.propagation import solve
from stackcore.quantities import quantity_named
from stackcore.stack import Stack

Evaluate = Callable[[float], float]
"""Value of a curve, in its unit, at a frequency in Hz."""

_HALF_TURN = 180.0


def evaluator(stack: Stack, curve: Curve, power: Power) -> Evaluate | None:
    """Return the curve between its points: solved anew at each frequency; None for a difference, which has none."""
    if curve.less or curve.stack:
        return None
    _, factor = shown_unit(curve.quantity, power=power, frequency=curve.x)
    wave = polarization(curve.polarization)

    def value(hertz: float) -> float:
        response = solve(stack, hertz, curve.angle)
        table = quantity_named(curve.quantity).of(response, wave)
        return float(shown_values(curve.quantity, table, power=power, factor=factor)[0, 0])

    return value


def next_extremum(curve: Curve, start: float, step: int, evaluate: Evaluate | None = None) -> float | None:
    """Return the frequency in Hz of the next smallest or largest value, going round at the ends.

    Parameters
    ----------
    start
        Where the marker is, Hz.
    step
        1 upward, −1 downward.
    evaluate
        Finds it between the points of the curve; without it the nearest point is taken.

    Returns
    -------
    float or None
        None for a curve that only rises or only falls; its ends do not count.
    """
    x, y = _rising(curve)
    found = [_finest(x, y, place, evaluate) for place in _turns(y)]
    return _next(found, start, step, x)


def next_crossing(
    curve: Curve, level: float, start: float, step: int, evaluate: Evaluate | None = None
) -> float | None:
    """Return the frequency in Hz of the next place where the curve crosses `level`, as `next_extremum` does.

    A phase that turns over from 180° to −180° crosses nothing there.
    """
    x, y = _rising(curve)
    wraps = shown(curve.quantity).wraps
    found = [_crossing(x, y, level, place, evaluate) for place in _changes(y, level, wraps=wraps)]
    return _next([*found, *x[y == level].tolist()], start, step, x)


def _rising(curve: Curve) -> tuple[FloatArray, FloatArray]:
    order = np.argsort(curve.x, kind="stable")
    return curve.x[order], curve.y[order]


def _turns(y: FloatArray) -> Iterator[int]:
    """Yield the points at which a curve turns; of a flat top or bottom the middle."""
    rise, since = 0, 0
    for place in range(1, len(y)):
        change = y[place] - y[place - 1]
        if np.isnan(change):
            rise = 0
            continue
        if change == 0:
            continue
        now = 1 if change > 0 else -1
        if rise and now != rise:
            yield (since + place - 1) // 2
        rise, since = now, place


def _changes(y: FloatArray, level: float, *, wraps: bool) -> list[int]:
    """Return the points after which the curve is on the other side of the level."""
    side = np.sign(y - level)
    change = side[:-1] * side[1:] < 0
    if wraps:
        change &= np.abs(np.diff(y)) <= _HALF_TURN
    return [int(place) for place in np.flatnonzero(change)]


def _crossing(x: FloatArray, y: FloatArray, level: float, place: int, evaluate: Evaluate | None) -> float:
    low, high = float(x[place]), float(x[place + 1])
    share = (level - y[place]) / (y[place + 1] - y[place])
    chord = low + float(share) * (high - low)
    if evaluate is None:
        return chord
    ends = evaluate(low) - level, evaluate(high) - level
    if not np.isfinite(ends).all() or ends[0] * ends[1] > 0:
        return chord
    from scipy.optimize import brentq  # here, since importing it takes longer than the window

    return float(brentq(lambda hertz: evaluate(hertz) - level, low, high, xtol=1e-9 * high))


def _finest(x: FloatArray, y: FloatArray, place: int, evaluate: Evaluate | None) -> float:
    at = float(x[place])
    if evaluate is None or not 0 < place < len(x) - 1:
        return at
    from scipy.optimize import minimize_scalar  # here, as above

    sign = 1.0 if y[place] <= y[place - 1] else -1.0
    ends = (float(x[place - 1]), float(x[place + 1]))
    answer = minimize_scalar(lambda hertz: sign * evaluate(hertz), bounds=ends, options={"xatol": 1e-7 * ends[1]})
    found = float(answer.x)
    # Never worse than the point that was known.
    return found if sign * evaluate(found) <= sign * float(y[place]) else at


def _next(found: list[float], start: float, step: int, x: FloatArray) -> float | None:
    """Return the next of some frequencies; one where the marker already is does not count."""
    if not found:
        return None
    # Nearer than a thousandth of a step of the sweep it is the same place.
    near = 1e-3 * float(np.median(np.diff(x))) if len(x) > 1 else 0.0
    ordered = sorted(found, reverse=step < 0)
    beyond = [one for one in ordered if (one - start) * step > near]
    return beyond[0] if beyond else ordered[0]
