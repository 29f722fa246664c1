"""Cuts: a quantity over the angle, or over one number of the stack, at the marker or at the worst of the band."""

from collections.abc import Generator, Sequence
from dataclasses import dataclass
from typing import Final, Literal

import numpy as np

from app.document.view import Power, ViewState
from app.series.curves import Curve, curve_label, worst_point
from app.series.shown import shown, shown_unit, shown_values
from app.series.texts import frequency_text, value_text
from app.series.validity import doubts_of, held_by_all
from app.series.variation_axis import VariationAxis, variation_at, variation_axis, varied_words
from stackcore.arrays import FloatArray
from stackcore.job import Job
from stackcore.polarizations import polarization
from stackcore.propagation import Response, solve
from stackcore.quantities import quantity_named
from stackcore.studies import Variation, check_values, curve_over

Where = Literal["marker", "band"]
"""At the frequency of a marker, or at the frequency of the band where each value is worst."""

POINTS: Final = 201
BAND_POINTS: Final = 101
"""Frequencies at which the worst of the band is looked for, unless the sweep has fewer."""


@dataclass(frozen=True, slots=True)
class CutQuestion:
    """What a cut is asked for.

    Parameters
    ----------
    job, stack
        Whose cut it is.
    quantity, power, polarizations
        As `ViewState` has them.
    over
        Path of what is varied (see `stackcore.studies.Variation`), empty for the angle.
    low, high
        Ends of what is varied, SI: m, rad, K, Ω.
    where
        At the markers, or at the worst of the band.
    frequencies
        Of the curves in Hz: the markers', or those of the band.
    angles
        Of the curves in rad, while something else than the angle is varied.
    """

    job: Job
    stack: int
    quantity: str
    power: Power
    polarizations: tuple[str, ...]
    over: str
    low: float
    high: float
    where: Where
    frequencies: tuple[float, ...]
    angles: tuple[float, ...]

    @property
    def variation(self) -> Variation | None:
        """What is varied, None for the angle."""
        return variation_at(self.job, self.stack, self.over)

    def values(self) -> FloatArray:
        """Return what stands at the axis, SI."""
        return np.linspace(self.low, self.high, POINTS)

    @property
    def axis(self) -> VariationAxis:
        """What stands beside the axis."""
        return variation_axis(self.variation, self.low, self.high)

    def words(self, value: float) -> str:
        """Return a value of what is varied in words."""
        return varied_words(self.variation, value)

    def study(self) -> "Generator[Cut, None, None]":
        """Return the study that answers it."""
        variation = self.variation
        return _over_angle(self) if variation is None else _over_variation(self, variation)

    def same_axis(self, other: "CutQuestion") -> bool:
        """Return whether the curves of another question may stand until those of this one are whole."""
        return (self.quantity, self.power, self.over, self.low, self.high, self.where) == (
            other.quantity,
            other.power,
            other.over,
            other.low,
            other.high,
            other.where,
        )


@dataclass(frozen=True, slots=True, eq=False)
class Cut:
    """The answer as far as it is computed.

    Parameters
    ----------
    question
        What was asked.
    curves
        Each over the values computed so far: `Curve.x` is SI, in the order of the axis.
    share
        Of the values that are computed.
    """

    question: CutQuestion
    curves: tuple[Curve, ...]
    share: float

    def best(self) -> tuple[float, float] | None:
        """Return the value (SI) at which the worst of all curves is best, and that worst; None where none is.

        Of equal ones the first; infinitely good values count.

        Source: the minimax choice of any design for limits; no formula.
        """
        end = shown(self.question.quantity).worst
        if end is None or not self.curves or not self.curves[0].x.size:
            return None
        raw = np.stack([curve.raw for curve in self.curves])
        known = ~np.isnan(raw).any(axis=0)
        if not known.any():
            return None
        worst = raw.min(axis=0) if end == "low" else -raw.max(axis=0)
        place = int(np.argmax(np.where(known, worst, -np.inf)))
        return float(self.curves[0].x[place]), float(worst[place] if end == "low" else -worst[place])


def cut_question(
    job: Job, stack: int, view: ViewState, over: str, ends: tuple[float, float], where: Where
) -> CutQuestion:
    """Return the question of now."""
    variation = variation_at(job, stack, over)
    band = where == "band" and shown(view.quantity).worst is not None
    if band:
        frequencies: Sequence[float] = _band(job).tolist()
    elif variation is None:
        frequencies = sorted(view.markers) or [view.marker_frequency(job.sweep)]
    else:
        frequencies = [view.marker_frequency(job.sweep)]
    return CutQuestion(
        job,
        stack,
        view.quantity,
        view.power,
        view.polarizations,
        over if variation is not None else "",
        *ends,
        "band" if band else "marker",
        tuple(frequencies),
        () if variation is None else tuple(job.sweep.angles().tolist()),
    )


def point_words(cut: Cut, curve: Curve, point: int) -> str:
    """Return the reading of a curve at a point of it."""
    where = cut.question.words(float(curve.x[point]))
    return f"{curve.label}: {value_text(curve.quantity, float(curve.raw[point]), curve.unit)} at {where}"


def best_words(cut: Cut) -> str:
    """Return where the worst of all curves is best, in words, or nothing; of the angle nothing is chosen."""
    found = cut.best() if cut.question.over and cut.share == 1 else None
    if found is None:
        return ""
    value, worst = found
    unit = cut.curves[0].unit
    told = value_text(cut.question.quantity, worst, unit)
    what = "worst of the curves" if len(cut.curves) > 1 else "value"
    return f"Best {cut.question.words(value)}: {what} {told}"


def where_words(question: CutQuestion) -> str:
    """Return at which frequency the curves are, in words."""
    if question.where == "band":
        low, high = min(question.frequencies), max(question.frequencies)
        return f"worst from {frequency_text(low)} to {frequency_text(high)}"
    return f"at {', '.join(frequency_text(hertz) for hertz in question.frequencies)}"


def _band(job: Job) -> FloatArray:
    swept = np.unique(job.sweep.frequencies())
    if swept.size <= BAND_POINTS:
        return swept
    # Of the sweep's own points, so that its worst value can be found among them.
    return swept[np.unique(np.linspace(0, swept.size - 1, BAND_POINTS).round().astype(np.intp))]


def _over_angle(question: CutQuestion) -> Generator[Cut, None, None]:
    angles = question.values()
    response = solve(question.job.stacks[question.stack], np.array(question.frequencies), angles)
    curves = []
    for key in question.polarizations:
        table = _values(question, response, key)  # (F, A)
        known = held_by_all(doubts_of(response.stack, response.frequency), response.frequency)
        if question.where == "band":
            label, held = polarization(key).label, bool(known.all())
            curves.append(_curve(question, key, label, (0, 1), angles, _worst_of(question, table), held))
            continue
        count = len(question.frequencies)
        for rank, hertz in enumerate(question.frequencies):
            label = f"{polarization(key).label} {frequency_text(hertz)}"
            curves.append(_curve(question, key, label, (rank, count), angles, table[rank], bool(known[rank])))
    yield Cut(question, tuple(curves), 1.0)


def _over_variation(question: CutQuestion, variation: Variation) -> Generator[Cut, None, None]:
    values = question.values()
    check_values(variation, values)
    angles, frequency = np.array(question.angles), np.array(question.frequencies)
    order = np.argsort(np.argsort(angles, kind="stable"), kind="stable")
    rows: list[FloatArray] = []  # each (P, A)
    held = True
    for step in curve_over(question.job, variation, values, frequency, angles):
        for response in step.responses[len(rows) :]:
            by_side = [_values(question, response, key) for key in question.polarizations]
            rows.append(np.stack([_worst_of(question, table) for table in by_side]))
            held = held and bool(held_by_all(doubts_of(response.stack, frequency), frequency).all())
        table = np.stack(rows)  # (V, P, A)
        done = values[: len(rows)]
        curves = [
            _curve(
                question,
                key,
                curve_label(key, float(angle)),
                (int(order[column]), angles.size),
                done,
                table[:, side, column],
                held,
                float(angle),
            )
            for column, angle in enumerate(angles)
            for side, key in enumerate(question.polarizations)
        ]
        yield Cut(question, tuple(curves), step.share)


def _values(question: CutQuestion, response: Response, key: str) -> FloatArray:
    """Return the quantity as it is shown, (F, A)."""
    _, factor = shown_unit(question.quantity, power=question.power, frequency=response.frequency)
    table = quantity_named(question.quantity).of(response, polarization(key))
    return shown_values(question.quantity, table, power=question.power, factor=factor)


def _worst_of(question: CutQuestion, table: FloatArray) -> FloatArray:
    """Return the worst over the frequencies of (F, A), (A,); of one frequency its own values."""
    if len(table) == 1:
        only: FloatArray = table[0]
        return only
    low = shown(question.quantity).worst == "low"
    known = ~np.isnan(table)
    filled = np.where(known, table, np.inf if low else -np.inf)
    worst: FloatArray = filled.min(axis=0) if low else filled.max(axis=0)
    worst[~known.any(axis=0)] = np.nan
    return worst


def _curve(
    question: CutQuestion,
    key: str,
    label: str,
    rank: tuple[int, int],
    x: FloatArray,
    raw: FloatArray,
    held: bool,
    angle: float = np.nan,
) -> Curve:
    finite = np.isfinite(raw)
    worst, infinite = worst_point(question.quantity, x, raw)
    unit, _ = shown_unit(question.quantity, power=question.power, frequency=np.array(question.frequencies))
    return Curve(
        question.quantity,
        label,
        key,
        angle,
        *rank,
        x,
        np.where(finite, raw, np.nan),
        raw,
        unit,
        worst,
        infinite,
        int(np.count_nonzero(~finite)),
        np.full(x.shape, held),
    )
