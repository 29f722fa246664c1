"""What the plot says in words: the worst point, what is not shown, what will be here. No toolkit."""

import math
from collections.abc import Sequence
from typing import Final

import numpy as np

from app.series.curves import Curve
from app.series.shown import shown
from app.series.texts import angle_text, frequency_text, value_text
from stackcore.polarizations import polarization
from stackcore.quantities import quantity_named

MOST_READ: Final = 24
"""Curves named one by one in the description for screen readers; more would be read for minutes."""


_NOTHING: Final = {
    "reflectance": "nothing is reflected",
    "return_loss_dB": "nothing is reflected",
    "absorptance": "nothing is absorbed",
}


def worst_curve(curves: Sequence[Curve]) -> int | None:
    """Return the index of the curve with the worst value of all; an infinitely bad one comes first."""
    best: int | None = None
    badness = -math.inf
    for index, curve in enumerate(curves):
        if curve.worst_infinite is not None:
            bad = -curve.infinite_value if shown(curve.quantity).worst == "low" else curve.infinite_value
        elif curve.worst is not None:
            bad = -curve.worst.y if shown(curve.quantity).worst == "low" else curve.worst.y
        else:
            continue
        if best is None or bad > badness:
            best, badness = index, bad
    return best


def worst_sentence(curves: Sequence[Curve]) -> str:
    """Return one line on the worst value, or on both ends of a quantity that has no worse one.

    Examples
    --------
    ``Worst: 0.9104 at 9.45 GHz, 55°, TE``
    """
    index = worst_curve(curves)
    if index is not None:
        return f"Worst: {_worst_text(curves[index])}, {_whose(curves[index])}"
    ends = [_end(curves, low=True), _end(curves, low=False)]
    words = [
        f"{name} {value_text(curve.quantity, float(curve.y[at]), curve.unit)} at "
        f"{frequency_text(float(curve.x[at]))}, {_whose(curve)}"
        for name, end in zip(("Lowest", "highest"), ends, strict=True)
        if end is not None
        for curve, at in [end]
    ]
    return "; ".join(words)


def curve_sentence(curve: Curve) -> str:
    """Return the worst point of one curve in words, as its mark says it."""
    if curve.worst is None and curve.worst_infinite is None:
        return curve.label
    return f"Worst of {curve.label}: {_worst_text(curve)}"


def value_words(curve: Curve, index: int) -> tuple[str, ...]:
    """Return the name of a curve and one of its values with what it is a value of, and the ends of its envelope."""
    value = value_text(curve.quantity, float(curve.raw[index]), curve.unit)
    less = f", difference to {curve.less}" if curve.less else ""
    name = f"{curve.stack}, {curve.label}" if curve.stack else curve.label
    told = (name, f"{quantity_named(curve.quantity).label}{less} {value}")
    if curve.low is None or curve.high is None or not np.isfinite(curve.low[index]):
        return told
    ends = [value_text(curve.quantity, float(end[index]), curve.unit) for end in (curve.low, curve.high)]
    return (*told, f"under conditions {ends[0]} to {ends[1]}")


def point_sentence(curve: Curve, index: int) -> str:
    """Return one point of a curve in words, as the status line says it."""
    return "   ".join([frequency_text(float(curve.x[index])), *value_words(curve, index)])


def hidden_sentence(curves: Sequence[Curve]) -> str:
    """Return how many points the plot cannot show, or nothing."""
    count = sum(curve.hidden_points for curve in curves)
    if not count:
        return ""
    return f"{count} {'point' if count == 1 else 'points'} not shown (beyond the scale)"


def empty_sentence(quantity: str, curves: Sequence[Curve]) -> str:
    """Return what stands in the middle of the plot when there is no curve in it, or nothing."""
    label = quantity_named(quantity).label
    if not curves:
        return f"{label} over frequency will be drawn here as soon as the stack has been computed."
    if any(np.isfinite(curve.y).any() for curve in curves):
        return ""
    singles = all(polarization(curve.polarization).single is not None for curve in curves)
    if quantity_named(quantity).needs_both and singles:
        return f"{label} says something of a circular or tilted wave: choose one above under “more”."
    if any(np.isinf(curve.raw).any() for curve in curves):
        return f"{label} is infinite at every frequency: {_NOTHING.get(quantity, 'nothing passes')}."
    return f"{label} has no value here: there is no wave whose {label.lower()} could be told."


def description(curves: Sequence[Curve]) -> str:
    """Return the plot for those who hear it: band, worst values, and what is not shown."""
    if not curves:
        return "No curves yet."
    first = curves[0]
    low, high = float(first.x.min()), float(first.x.max())
    count = "1 curve" if len(curves) == 1 else f"{len(curves)} curves"
    parts = [
        f"{quantity_named(first.quantity).label} from {frequency_text(low)} to {frequency_text(high)}, {count}.",
        f"{worst_sentence(curves)}.",
    ]
    if len(curves) <= MOST_READ:
        parts += [f"{curve_sentence(curve)}." for curve in curves if curve.worst is not None]
    hidden = hidden_sentence(curves)
    return " ".join([*parts, f"{hidden}." if hidden else ""]).strip()


def _worst_text(curve: Curve) -> str:
    if curve.worst is not None:
        value, frequency = curve.worst.y, curve.worst.x
    else:
        frequency = curve.worst_infinite if curve.worst_infinite is not None else float(curve.x[0])
        value = curve.infinite_value if curve.worst_infinite is not None else float(curve.raw[0])
    text = value_text(curve.quantity, value, curve.unit)
    under = f", {curve.worst_in}" if curve.worst_in else ""
    return f"{text} at {frequency_text(frequency)}{under}"


def _whose(curve: Curve) -> str:
    return f"{angle_text(curve.angle)}, {polarization(curve.polarization).label}"


def _end(curves: Sequence[Curve], *, low: bool) -> tuple[Curve, int] | None:
    """Return the curve and the index of the smallest or largest value of all, or None without any."""
    sign = 1.0 if low else -1.0
    known = [curve for curve in curves if np.isfinite(curve.y).any()]
    if not known:
        return None
    curve = min(known, key=lambda one: float(np.nanmin(sign * one.y)))
    return curve, int(np.nanargmin(sign * curve.y))
