"""What a map shows, as a value, and what it becomes when it is drawn. No toolkit."""

from collections.abc import Generator
from dataclasses import dataclass
from typing import Final

import numpy as np

from app.document.view import Power, ViewState
from app.series.axis import frequency_axis, quantity_axis
from app.series.shown import shown, shown_unit, shown_values
from app.series.texts import angle_text, frequency_text, value_text
from app.series.variation_axis import variation_at, variation_axis, varied_words
from stackcore.arrays import FloatArray
from stackcore.job import Job
from stackcore.polarizations import polarization
from stackcore.quantities import quantity_named
from stackcore.studies import MapLevel, Variation, map_over, worst

ANGLES: Final = 181
FREQUENCIES: Final = 601
GRAIN: Final = 1e-9
"""Of the values; what differs by less is the same."""
VALUES: Final = 121


@dataclass(frozen=True, slots=True)
class MapQuestion:
    """What is asked.

    Parameters
    ----------
    job, stack
        Whose map it is.
    quantity, power, side
        What is shown, how fractions of power are, and the polarization, as `ViewState` has them.
    log_frequency
        Whether frequencies are spaced by their ratio.
    over
        Path of what runs upward (see `stackcore.studies.Variation`), empty for the angle.
    angle
        Of incidence, rad, while something else runs upward.
    low, high
        Ends of what runs upward, SI.
    """

    job: Job
    stack: int
    quantity: str
    power: Power
    side: str
    log_frequency: bool
    over: str = ""
    angle: float = 0.0
    low: float = 0.0
    high: float = 0.0

    @property
    def variation(self) -> Variation | None:
        """What runs upward, None for the angle; also when what was chosen is no longer there."""
        return variation_at(self.job, self.stack, self.over)

    def frequencies(self) -> FloatArray:
        """Return the frequencies of the map in Hz: over the band of the sweep, evenly on its axis."""
        swept = self.job.sweep.frequencies()
        low, high = float(swept.min()), float(swept.max())
        if low == high:
            low, high = low * 0.95, high * 1.05
        return np.geomspace(low, high, FREQUENCIES) if self.log_frequency else np.linspace(low, high, FREQUENCIES)

    def study(self) -> Generator[MapLevel, None, None]:
        """Return the study that answers it."""
        quantity, side, frequency = quantity_named(self.quantity), polarization(self.side), self.frequencies()
        variation = self.variation
        if variation is None:
            angles = np.linspace(self.low, self.high, ANGLES)
            return map_over(self.job, self.stack, quantity, side, frequency, angles)
        values = np.linspace(self.low, self.high, VALUES)
        return map_over(self.job, self.stack, quantity, side, frequency, self.angle, variation, values)


def question_of(job: Job, stack: int, view: ViewState, over: str, ends: tuple[float, float]) -> MapQuestion:
    """Return the question of now, with the ends of what runs upward, SI."""
    return MapQuestion(
        job,
        stack,
        view.quantity,
        view.power,
        view.active_polarization,
        view.log_frequency,
        over,
        view.marker_angle(job.sweep) if over else 0.0,
        *ends,
    )


@dataclass(frozen=True, slots=True, eq=False)
class DrawnMap:
    """A level in the units of its axes.

    Parameters
    ----------
    x, y
        At the axes, increasing; `x` may be spaced by ratio.
    values
        (Y, X) in `unit`.
    titles
        Of the horizontal axis, the vertical one, and of the values.
    unit
        Of the values.
    low, high
        The finite range of the values.
    worst
        Words for the worst cell and its place at the axes, or None.
    share
        Of the cells that are computed.
    """

    question: MapQuestion
    level: MapLevel
    x: FloatArray
    y: FloatArray
    values: FloatArray
    titles: tuple[str, str, str]
    unit: str
    low: float
    high: float
    worst: tuple[str, float, float] | None
    share: float

    def words_at(self, row: int, column: int) -> str:
        """Return what stands in a cell, and where it is."""
        value = value_text(self.question.quantity, float(self.values[row, column]), self.unit)
        return f"{value} at {_place(self.question, self.level, row, column)}"


def drawn(question: MapQuestion, level: MapLevel) -> DrawnMap:
    """Return a level as it is drawn."""
    power = question.power
    unit, factor = shown_unit(question.quantity, power=power, frequency=level.x)
    values = shown_values(question.quantity, level.values, power=power, factor=factor)
    across = frequency_axis(level.x, log=question.log_frequency)
    upward = variation_axis(question.variation, question.low, question.high)
    y = upward.numbers(level.y)
    finite = values[np.isfinite(values)]
    low, high = (float(finite.min()), float(finite.max())) if finite.size else (0.0, 1.0)
    if high - low <= GRAIN * max(abs(low), abs(high)):
        # Rounding errors are no pattern: a map of one value has one colour.
        pad = max(abs(high) * 1e-3, 1e-12)
        low, high = low - pad, high + pad
    end = shown(question.quantity).worst
    some = bool(finite.size)
    place = worst(level, "high" if end == "low" else "low") if end is not None and some else None
    told = None
    if place is not None:
        cell = value_text(question.quantity, float(values[place.row, place.column]), unit)
        where = _place(question, level, place.row, place.column)
        told = (f"{cell} at {where}", float(level.x[place.column] * across.factor), float(y[place.row]))
    title = quantity_axis(question.quantity, level.x, power=power).title
    return DrawnMap(
        question,
        level,
        level.x * across.factor,
        y,
        values,
        (across.title, upward.title, title),
        unit,
        low,
        high,
        told,
        level.share,
    )


def note(shown: DrawnMap, *, conditions: bool) -> str:
    """Return what a map does not say by itself: what it leaves out, and what it shows beyond the job.

    Parameters
    ----------
    conditions
        Whether the curves show conditions, which the map does not.
    """
    swept = np.unique(shown.question.job.sweep.frequencies())
    told = ["as built, without the conditions"] if conditions else []
    told += [f"the job has {frequency_text(float(swept[0]))} only"] if swept.size == 1 else []
    infinite = np.isinf(shown.level.values)
    if infinite.all():
        told.append("infinite everywhere: nothing to compare")
    return "; ".join(told)


def about(shown: DrawnMap) -> str:
    """Return what a map is of: job, stack, polarization, and the angle where something else runs upward."""
    question = shown.question
    record = question.job.record
    parts = [record.title, record.stacks[question.stack].name, polarization(question.side).label]
    parts += [angle_text(question.angle)] if question.variation is not None else []
    parts += ["as built"] if question.job.record.conditions else []
    return ", ".join(part for part in parts if part)


def data_table(shown: DrawnMap) -> str:
    """Return a map as text with tabs: what it is of, then frequencies across and the other axis down.

    Every number has full precision; a cell that is not computed is ``nan``.
    """
    lines = [about(shown), f"{shown.titles[2]}; across: {shown.titles[0]}; down: {shown.titles[1]}"]
    lines.append("\t".join(["", *map(repr, shown.x.tolist())]))
    for value, row in zip(shown.y.tolist(), shown.values.tolist(), strict=True):
        lines.append("\t".join(map(repr, [value, *row])))
    return "\n".join(lines) + "\n"


def _place(question: MapQuestion, level: MapLevel, row: int, column: int) -> str:
    frequency = frequency_text(float(level.x[column]))
    variation = question.variation
    value = varied_words(variation, float(level.y[row]))
    return f"{frequency}, {value}" if variation is None else f"{frequency}, {variation.label.lower()} {value}"
