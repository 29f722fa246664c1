"""The stacks of a job compared: thickness, mass, cost, and the worst value of what is shown."""

from collections.abc import Generator
from dataclasses import dataclass, replace

import numpy as np

from app.document.view import Power, ViewState
from app.series.cases import Case, conditions_shown
from app.series.shown import shown, shown_unit, shown_values
from app.series.texts import angle_text, frequency_text, value_text
from stackcore.arrays import FloatArray
from stackcore.errors import JobError
from stackcore.job import Job
from stackcore.job.mass import Sum, cost_per_area, mass_per_area
from stackcore.polarizations import polarization
from stackcore.propagation import solve
from stackcore.quantities import quantity_named


@dataclass(frozen=True, slots=True)
class Worst:
    """The worst value of a stack over the sweep: as a number in the unit on screen, and in words with its place."""

    value: float
    text: str
    place: str


@dataclass(frozen=True, slots=True)
class Variant:
    """One stack.

    Parameters
    ----------
    name
        Of the stack.
    thickness
        Of all layers, m.
    mass, cost
        By area, as far as materials say them.
    worst
        Of the quantity shown; None where it has no worse end, or while it is not worked out.
    """

    name: str
    thickness: float
    mass: Sum
    cost: Sum
    worst: Worst | None = None


@dataclass(frozen=True, slots=True)
class Comparison:
    """All stacks of a job, and what their worst values are of."""

    quantity: str
    power: Power
    variants: tuple[Variant, ...]
    unit: str = ""

    def difference(self, stack: int, reference: int) -> float | None:
        """Return the worst value of a stack less that of another, in the unit on screen; None without both."""
        one, other = self.variants[stack].worst, self.variants[reference].worst
        if one is None or other is None or stack == reference:
            return None
        gap = one.value - other.value
        return gap if np.isfinite(gap) else None


def comparing(job: Job, view: ViewState) -> Generator[Comparison, None, None]:
    """Compare the stacks of `job`, yielding after each all that is known; nothing is done until it is advanced.

    The worst value of each is that of the stack as it is built and under every condition that the view shows.
    """
    quantity, power = view.quantity, view.power
    if "element_absorptance" in quantity:
        quantity = "absorptance"  # an element of one stack is none of another
    frequency = job.sweep.frequencies()
    unit, factor = shown_unit(quantity, power=power, frequency=frequency)
    found = [
        Variant(stack.name, stack.thickness, mass_per_area(job, place), cost_per_area(job, place))
        for place, stack in enumerate(job.stacks)
    ]
    yield Comparison(quantity, power, tuple(found), unit)
    end = shown(quantity).worst
    failed: list[list[str]] = [[] for _ in job.stacks]
    for place in range(len(job.stacks)):
        for condition in ("", *conditions_shown(job.record, view)):
            try:
                stack = Case(place, condition).resolved(job)
            except JobError:
                if condition not in failed[place]:
                    failed[place].append(condition)
                continue
            response = solve(stack, frequency, job.sweep.angles())
            sides = [quantity_named(quantity).of(response, polarization(side)) for side in view.polarizations]
            values = shown_values(quantity, np.stack(sides, axis=-1), power=power, factor=factor)
            worst = _worst(quantity, unit, values, response.frequency, response.angle, view.polarizations)
            old = found[place]
            if worst is not None and (old.worst is None or _is_worse(worst, old.worst, end)):
                where = f"{worst.place}, {condition}" if condition else worst.place
                found[place] = replace(old, worst=replace(worst, place=where))
        worst_of = found[place].worst
        if failed[place] and worst_of is not None:
            told = f"{worst_of.place}; not computed: {', '.join(failed[place])}"
            found[place] = replace(found[place], worst=replace(worst_of, place=told))
        yield Comparison(quantity, power, tuple(found), unit)


def _is_worse(one: Worst, other: Worst, end: str | None) -> bool:
    return one.value > other.value if end == "high" else one.value < other.value


def _worst(
    quantity: str,
    unit: str,
    values: FloatArray,
    frequency: FloatArray,
    angle: FloatArray,
    sides: tuple[str, ...],
) -> Worst | None:
    end = shown(quantity).worst
    known = ~np.isnan(values)
    if end is None or not known.any():
        return None
    badness = np.where(known, values if end == "high" else -values, -np.inf)
    row, column, side = np.unravel_index(int(np.argmax(badness)), values.shape)
    value = float(values[row, column, side])
    label = polarization(sides[int(side)]).label
    place = f"{frequency_text(float(frequency[row]))}, {angle_text(float(angle[column]))}, {label}"
    return Worst(value, value_text(quantity, value, unit), place)
