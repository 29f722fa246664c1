"""Where a frequency or a value lies on an axis, and which round numbers are written beside it. No toolkit.

The plot draws log₁₀ of the frequency when its axis is logarithmic; this file is the one place that converts,
for curves, markers, worst points and typed ranges alike.
"""

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import FloatArray

WIDE: Final = 1e5
"""Ratio of the ends of a logarithmic band from which numbers carry their own unit: 1 kHz ... 1 THz."""
_TINY: Final = 1e-300
_ROUND: Final = (1.0, 2.0, 5.0, 10.0)
_TURN_PARTS: Final = (15.0, 30.0, 45.0, 90.0, 180.0, 360.0)


@dataclass(frozen=True, slots=True)
class FrequencyScale:
    """The horizontal axis: hertz, or what else runs along it in SI units, to position on the axis and back.

    Parameters
    ----------
    factor
        Axis units per hertz (1e-9 for GHz).
    logarithmic
        Whether a position is log₁₀ of the value in axis units.
    offset
        Is added to the value in axis units: −273.15 where kelvins are shown as °C.

    Examples
    --------
    >>> FrequencyScale(1e-9, True).position(1e10)
    1.0
    """

    factor: float = 1e-9
    logarithmic: bool = False
    offset: float = 0.0

    def position(self, hertz: float) -> float:
        """Return where a frequency in Hz lies."""
        value = hertz * self.factor + self.offset
        return math.log10(max(value, _TINY)) if self.logarithmic else value

    def positions(self, hertz: FloatArray) -> FloatArray:
        """Return where frequencies in Hz lie; not positive ones on a logarithmic axis are not a number."""
        values: FloatArray = np.asarray(hertz, dtype=float) * self.factor + self.offset
        if not self.logarithmic:
            return values
        shown = np.full(values.shape, np.nan)
        return np.log10(values, out=shown, where=values > 0)

    def hertz(self, position: float) -> float:
        """Return the frequency in Hz at a position; the inverse of `position`."""
        value = 10.0 ** min(max(position, -300.0), 300.0) if self.logarithmic else position
        return (value - self.offset) / self.factor


@dataclass(frozen=True, slots=True)
class Ticks:
    """Positions and texts of the labelled ticks, and positions of those between them."""

    major: tuple[float, ...]
    texts: tuple[str, ...]
    minor: tuple[float, ...] = ()


def round_step(span: float, most: float, *, degrees: bool = False) -> float:
    """Return the smallest round step that divides `span` into at most `most` parts.

    Round is 1, 2 or 5 times a power of ten; for `degrees` from 10 upward a part of a turn that quarters it.

    Examples
    --------
    >>> round_step(4.0, 5), round_step(360.0, 10, degrees=True)
    (1.0, 45.0)
    """
    least = max(span, _TINY) / max(most, 1.0)
    if degrees and 10.0 < least <= _TURN_PARTS[-1]:
        return next(step for step in _TURN_PARTS if step >= least * (1 - 1e-9))
    power = 10.0 ** math.floor(math.log10(least))
    return next(step * power for step in _ROUND if step * power >= least * (1 - 1e-9))


def linear_ticks(low: float, high: float, most: float, *, degrees: bool = False) -> Ticks:
    """Return round numbers between `low` and `high`, at most about `most` of them."""
    step = round_step(high - low, most, degrees=degrees)
    first, last = math.ceil(low / step - 1e-9), math.floor(high / step + 1e-9)
    major = tuple(index * step for index in range(first, min(last, first + 200) + 1))
    return Ticks(major, number_texts(major, step))


def logarithmic_ticks(low: float, high: float, most: float, spell: Callable[[float], str] | None = None) -> Ticks:
    """Return ticks for an axis of log₁₀ values, written as plain numbers or as `spell` writes a value.

    Decades are thinned when they are many; 1-2-5 or all digits are written when there is room; within
    less than half a decade the numbers are evenly spaced round ones.
    """
    if high - low < 0.5:
        near = linear_ticks(10.0**low, 10.0**high, most)
        shown = [(value, text) for value, text in zip(near.major, near.texts, strict=True) if value > 0]
        texts = tuple(spell(value) if spell else text for value, text in shown)
        return Ticks(tuple(math.log10(value) for value, _ in shown), texts)
    decades = range(math.floor(low), math.ceil(high) + 1)
    every = max(1, math.ceil(len(decades) / max(most, 1.0)))
    digits: tuple[int, ...] = (1,)
    for more in ((1, 3), (1, 2, 5), (1, 2, 3, 4, 5, 6, 7, 8, 9)):
        if every == 1 and (high - low) * len(more) * (1.6 if len(more) > 3 else 1.0) <= most:
            digits = more
    inside = [
        (decade + math.log10(digit), digit * 10.0**decade)
        for decade in decades
        if decade % every == 0
        for digit in digits
    ]
    kept = [(at, value) for at, value in inside if low - 1e-9 <= at <= high + 1e-9]
    roomy = high - low <= 0.7 * most
    between = tuple(d + math.log10(n) for d in decades for n in range(1, 10)) if roomy else ()
    written = {round(at, 9) for at, _ in kept}
    minor = tuple(at for at in between if low <= at <= high and round(at, 9) not in written)
    return Ticks(tuple(at for at, _ in kept), tuple((spell or _plain)(value) for _, value in kept), minor)


def number_texts(values: Sequence[float], step: float) -> tuple[str, ...]:
    """Return texts of the multiples of `step`, all with the same decimals, with a true minus sign."""
    largest = max((abs(value) for value in values), default=0.0)
    exponent = math.floor(math.log10(step) + 1e-9)
    if largest >= 1e7 or 0.0 < largest < 1e-3:
        digits = max(1, math.floor(math.log10(largest)) - exponent + 1)
        texts = [f"{value + 0.0:.{digits}g}" for value in values]
    else:
        texts = [f"{value + 0.0:.{max(0, -exponent)}f}" for value in values]
    return tuple(text.replace("-", "−") for text in texts)


def round_range(
    low: float,
    high: float,
    floor: float | None = None,
    top: float | None = None,
    *,
    degrees: bool = False,
    grain: float = 1e-30,
) -> tuple[float, float]:
    """Return a range a little larger than the data, on round numbers, so that it does not tremble with them.

    Zero is not passed by data that do not pass it: a loss from 0 to 2.8 dB is drawn from 0.

    Parameters
    ----------
    low, high
        Smallest and largest value to show.
    floor, top
        Values the range hardly passes unless the data do, such as 1 for a fraction.
    degrees
        Round to parts of a turn.
    grain
        Values smaller than this are rounding errors: they are drawn as zero in a range around it.
    """
    if max(abs(low), abs(high)) < grain:
        return -1.0, 1.0
    span = high - low
    first, last = low, high
    if span <= max(abs(low), abs(high)) * 1e-6:
        span = abs(high) * 0.02
        first, last = low - span / 2, high + span / 2
    step = round_step(span, 10, degrees=degrees)
    below = math.floor((first - span * 0.02) / step) * step
    above = math.ceil((last + span * 0.02) / step) * step
    # A hair beyond, so that a curve that lies on the end is not cut in half.
    hair = span * 0.012
    for bound in (0.0, floor):
        if bound is not None and low >= bound - hair / 10:
            below = max(below, bound - hair)
    for bound in (0.0, top):
        if bound is not None and high <= bound + hair / 10:
            above = min(above, bound + hair)
    return below, above


def _plain(value: float) -> str:
    """Return a power-of-ten tick as people write it: 0.2, 20, 2000, and 1e+07 only when it is long."""
    return f"{value:.0f}" if 1 <= value < 1e6 else f"{value:.6g}"
