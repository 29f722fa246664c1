"""What a map shows, as a value, and what it becomes when it is drawn. No toolkit."""

from collections.abc import Generator
from dataclasses import dataclass
from typing import Final

import numpy as np

from app.document.view import Power, ViewState
from app.series.axis import frequency_axis, quantity_axis
from app.series.shown import shown, shown_unit, shown_values
from app.series.texts import angle_text, frequency_text, value_text
from stackcore.arrays import FloatArray
from stackcore.job import Job
from stackcore.polarizations import polarization
from stackcore.quantities import quantity_named
from stackcore.studies import MapLevel, Variation, map_over, variations_of, worst
from stackcore.units import Dimension, format_value

ANGLES: Final = 181
STEEPEST: Final = 89.5
"""Degrees; grazing incidence itself is no angle of a plane wave."""
FREQUENCIES: Final = 601
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
    """

    job: Job
    stack: int
    quantity: str
    power: Power
    side: str
    log_frequency: bool
    over: str = ""
    angle: float = 0.0

    @property
    def variation(self) -> Variation | None:
        """What runs upward, None for the angle; also when what was chosen is no longer there."""
        offered = variations_of(self.job, self.stack)
        return next((one for one in offered if one.path == self.over), None)

    def frequencies(self) -> FloatArray:
        """Return the frequencies of the map in Hz: over the band of the sweep, evenly on its axis."""
        swept = self.job.sweep.frequencies()
        low, high = float(swept.min()), float(swept.max())
        if low == high:
            low, high = low * 0.95, high * 1.05
        return np.geomspace(low, high, FREQUENCIES) if self.log_frequency else np.linspace(low, high, FREQUENCIES)

    def angles(self) -> FloatArray:
        """Return the angles of the map in rad: those between the sweep's, or nearly all when it has only one."""
        swept = np.degrees(self.job.sweep.angles())
        low, high = float(swept.min()), float(swept.max())
        if low == high:
            low, high = 0.0, STEEPEST
        return np.radians(np.linspace(low, high, ANGLES))

    def study(self) -> Generator[MapLevel, None, None]:
        """Return the study that answers it."""
        quantity, side, frequency = quantity_named(self.quantity), polarization(self.side), self.frequencies()
        variation = self.variation
        if variation is None:
            return map_over(self.job, self.stack, quantity, side, frequency, self.angles())
        values = variation.values(VALUES)
        return map_over(self.job, self.stack, quantity, side, frequency, self.angle, variation, values)


def question_of(job: Job, stack: int, view: ViewState, over: str) -> MapQuestion:
    """Return the question of now."""
    return MapQuestion(
        job,
        stack,
        view.quantity,
        view.power,
        view.active_polarization,
        view.log_frequency,
        over,
        view.marker_angle(job.sweep) if over else 0.0,
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
    y, upward = _upward(question, level)
    finite = values[np.isfinite(values)]
    low, high = (float(finite.min()), float(finite.max())) if finite.size else (0.0, 1.0)
    end = shown(question.quantity).worst
    place = worst(level, "high" if end == "low" else "low") if end is not None else None
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
        (across.title, upward, title),
        unit,
        low,
        high,
        told,
        level.share,
    )


def _upward(question: MapQuestion, level: MapLevel) -> tuple[FloatArray, str]:
    """Return the numbers at the vertical axis and its title."""
    variation = question.variation
    if variation is None:
        return np.degrees(level.y), "Angle of incidence, deg"
    unit, factor = _unit(variation)
    return level.y * factor, f"{variation.label}, {unit}" if unit else variation.label


def _unit(variation: Variation) -> tuple[str, float]:
    """Return the unit that the largest value is readable in, and the factor to it."""
    if variation.dimension is Dimension.NUMBER:
        return "", 1.0
    text = format_value(float(f"{variation.high:.3g}"), variation.dimension)
    number, _, unit = text.partition(" ")
    return unit, float(number) / float(f"{variation.high:.3g}") if variation.high else 1.0


def _place(question: MapQuestion, level: MapLevel, row: int, column: int) -> str:
    frequency = frequency_text(float(level.x[column]))
    variation = question.variation
    if variation is None:
        return f"{frequency}, {angle_text(float(level.y[row]))}"
    value = format_value(float(f"{level.y[row]:.4g}"), variation.dimension)
    return f"{frequency}, {variation.label.lower()} {value}"
