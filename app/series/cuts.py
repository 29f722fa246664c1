"""Cuts: a quantity over the angle, or over one number of the stack, at the marker or at the worst of the band."""

import contextlib
from collections.abc import Generator, Sequence
from dataclasses import dataclass, replace
from typing import Final, Literal

import numpy as np

from app.document.view import Power, ViewState
from app.series.cases import conditions_shown
from app.series.curves import Curve, curve_label, worst_point
from app.series.shown import shown, shown_unit, shown_values
from app.series.texts import frequency_text, value_text
from app.series.validity import doubts_of, held_by_all
from app.series.variation_axis import VariationAxis, variation_at, variation_axis, varied_words
from stackcore.arrays import FloatArray
from stackcore.errors import JobError
from stackcore.job import Job
from stackcore.polarizations import polarization
from stackcore.propagation import Response, solve
from stackcore.quantities import element_absorptance, quantity_named
from stackcore.stack import Stack
from stackcore.studies import Variation, check_values, varied, varied_stack
from stackcore.studies.pacing import Pace

Where = Literal["marker", "band"]
"""At the frequency of a marker, or at the frequency of the band where each value is worst."""

POINTS: Final = 201
_WORST: Final = 1e300
BAND_POINTS: Final = 601
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
    conditions
        Over which each curve has an envelope; the best value is best for all of them.
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
    conditions: tuple[str, ...] = ()

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
    refined
        The best value (SI) between the points and the worst there; None before it is looked for.
    """

    question: CutQuestion
    curves: tuple[Curve, ...]
    share: float
    refined: tuple[float, float] | None = None

    def best(self) -> tuple[float, float] | None:
        """Return the value (SI) at which the worst of all curves is best, and that worst; None where none is.

        Where the worst reads the same everywhere there is nothing to choose. Infinitely good values count.

        Source: the minimax choice of any design for limits; no formula.
        """
        worst = self.worst()
        if worst is None:
            return None
        ends = (float(np.nanmin(worst)), float(np.nanmax(worst)))
        unit = self.curves[0].unit
        if len({value_text(self.question.quantity, end, unit) for end in ends}) < len(ends):
            return None
        if self.refined is not None:
            return self.refined
        place = self.best_place(worst)
        return float(self.curves[0].x[place]), float(worst[place])

    def worst(self) -> FloatArray | None:
        """Return at each point the worst value of all curves and conditions; None where no value is worse."""
        end = shown(self.question.quantity).worst
        if end is None or not self.curves or not self.curves[0].x.size:
            return None
        lines = [line for curve in self.curves for line in (curve.raw, curve.low, curve.high) if line is not None]
        values = np.stack(lines)
        known = ~np.isnan(values).any(axis=0)
        if not known.any():
            return None
        return np.where(known, values.min(axis=0) if end == "low" else values.max(axis=0), np.nan)

    def best_place(self, worst: FloatArray) -> int:
        """Return the point at which `worst` is best, the first of equal ones."""
        return int(np.nanargmax(worst) if shown(self.question.quantity).worst == "low" else np.nanargmin(worst))


def cut_question(
    job: Job, stack: int, view: ViewState, over: str, ends: tuple[float, float], where: Where
) -> CutQuestion:
    """Return the question of now.

    Its job has what is varied at the lower end, so that the question stays the same while that is dragged.
    """
    variation = variation_at(job, stack, over)
    if variation is not None:
        with contextlib.suppress(JobError):
            job = varied(job, variation, ends[0])
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
        conditions_shown(job.record, view) if element_absorptance(view.quantity) is None else (),
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
    what = "worst of the curves" if len(cut.curves) > 1 or cut.question.conditions else "value"
    question = cut.question
    step = (question.high - question.low) / (POINTS - 1)
    near = min(value - question.low, question.high - value) < step / 2
    return f"Best {question.words(value)}: {what} {told}{', at the end of the range' if near else ''}"


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
    frequency = np.array(question.frequencies)
    stacks = _stacks(question, question.job)
    responses = [solve(stack, frequency, angles) for stack in stacks]
    known = held_by_all(doubts_of(stacks[0], frequency), frequency)
    curves = []
    for key in question.polarizations:
        tables = np.stack([_values(question, response, key) for response in responses])  # (C, F, A)
        if question.where == "band":
            label, held = polarization(key).label, bool(known.all())
            cases = np.stack([_worst_of(question, table) for table in tables])
            curves.append(_curve(question, key, label, (0, 1), angles, cases, held))
            continue
        count = len(question.frequencies)
        for rank, hertz in enumerate(question.frequencies):
            label = f"{polarization(key).label} {frequency_text(hertz)}"
            curves.append(_curve(question, key, label, (rank, count), angles, tables[:, rank], bool(known[rank])))
    yield Cut(question, tuple(curves), 1.0)


def _over_variation(question: CutQuestion, variation: Variation) -> Generator[Cut, None, None]:
    values = question.values()
    check_values(variation, values)
    rows: list[FloatArray] = []  # each (C, P, A)
    held = True
    pace = Pace()
    for value in values.tolist():
        row, known = _row(question, variation, value)
        rows.append(row)
        held = held and known
        if pace.due() or len(rows) == values.size:
            cut = Cut(
                question, _curves(question, values[: len(rows)], np.stack(rows), held), len(rows) / values.size
            )
            yield cut if cut.share < 1 else replace(cut, refined=_refined(cut, variation))


def _stacks(question: CutQuestion, job: Job) -> list[Stack]:
    """Return the stack as it is built and under each condition."""
    under = [job.stack_under(question.stack, name) for name in question.conditions]
    return [job.stacks[question.stack], *under]


def _row(question: CutQuestion, variation: Variation, value: float) -> tuple[FloatArray, bool]:
    """Return the values of all cases, polarizations and angles, (C, P, A), and whether they stand on known data."""
    angles, frequency = np.array(question.angles), np.array(question.frequencies)
    if question.conditions:
        stacks = _stacks(question, varied(question.job, variation, value))
    else:
        stacks = [varied_stack(question.job, variation, value)]
    cases = []
    for stack in stacks:
        response = solve(stack, frequency, angles)
        cases.append([_worst_of(question, _values(question, response, key)) for key in question.polarizations])
    return np.array(cases), bool(held_by_all(doubts_of(stacks[0], frequency), frequency).all())


def _curves(question: CutQuestion, x: FloatArray, table: FloatArray, held: bool) -> tuple[Curve, ...]:
    """Return the curves of a table (V, C, P, A), angle by angle."""
    angles = np.array(question.angles)
    order = np.argsort(np.argsort(angles, kind="stable"), kind="stable")
    return tuple(
        _curve(
            question,
            key,
            curve_label(key, float(angle)),
            (int(order[column]), angles.size),
            x,
            table[:, :, side, column].T,
            held,
            float(angle),
        )
        for column, angle in enumerate(angles)
        for side, key in enumerate(question.polarizations)
    )


def _refined(cut: Cut, variation: Variation) -> tuple[float, float] | None:
    """Return the best value between the points beside the best one, to a thousandth of their distance."""
    worst = cut.worst()
    if worst is None or np.isnan(worst).all():
        return None
    from scipy.optimize import minimize_scalar  # here, since importing it takes longer than the window

    x, place = cut.curves[0].x, cut.best_place(worst)
    sign = -1.0 if shown(cut.question.quantity).worst == "low" else 1.0

    def badness(value: float) -> float:
        row, _ = _row(cut.question, variation, value)
        return float(np.nan_to_num(sign * row, nan=_WORST, posinf=_WORST, neginf=-_WORST).max())

    ends = (float(x[max(place - 1, 0)]), float(x[min(place + 1, x.size - 1)]))
    known = (float(x[place]), float(worst[place]))
    if not np.isfinite(known[1]) or not ends[0] < ends[1]:
        return known
    answer = minimize_scalar(badness, bounds=ends, options={"xatol": (ends[1] - ends[0]) * 1e-3})
    # Never worse than the point that was known.
    found = float(answer.x), sign * float(answer.fun)
    return found if sign * found[1] < sign * known[1] else known


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
    cases: FloatArray,
    held: bool,
    angle: float = np.nan,
) -> Curve:
    """Return a curve of values (C, V): as built, with the envelope over all cases when there are several."""
    raw = cases[0]
    finite = np.isfinite(raw)
    several = len(cases) > 1
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
        low=cases.min(axis=0) if several else None,
        high=cases.max(axis=0) if several else None,
    )
