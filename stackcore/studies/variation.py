"""What can be varied in a stack: thicknesses, parts of sheets, constants of the materials it is made of."""

from collections.abc import Iterator
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.job import Job
from stackcore.job import limits as job_limits
from stackcore.job.inspector import join
from stackcore.job.limits import Limits
from stackcore.job.materials import references_of, with_library_values
from stackcore.job.records import ElementRecord, LayerRecord, MaterialRecord
from stackcore.media.models import MODELS, Constants, Kind, Model, Number, Quantity, Relative, Terms, Value
from stackcore.media.models.limits import LARGEST_RELATIVE
from stackcore.units import Dimension, Measure

_MOST_TERMS: Final = 20
"""Of a list of which each is offered; a longer one is data, and no single row of it says anything."""

_REAL: Final = Limits(Dimension.NUMBER, -LARGEST_RELATIVE, LARGEST_RELATIVE, example="4.2")
_LOSS: Final = Limits(Dimension.NUMBER, 0.0, LARGEST_RELATIVE, gain=True, example="0.06")

_BEGIN: Final = {
    Dimension.LENGTH: 1e-3,
    Dimension.RESISTANCE: 377.0,
    Dimension.INDUCTANCE: 1e-9,
    Dimension.CAPACITANCE: 1e-12,
    Dimension.CONDUCTIVITY: 1.0,
}
"""Upper end of the range, in SI units, for what is 0 now."""
_BEGIN_NUMBER: Final = 0.05
_WARMER: Final = 20.0
"""K to either side of a temperature."""


@dataclass(frozen=True, slots=True)
class ElementPart:
    """A number of one row of a stack.

    Parameters
    ----------
    row
        Of the record.
    name
        ``thickness``, ``resistance``, ``inductance``, ``capacitance``, ``conductivity``.
    """

    row: int
    name: str


@dataclass(frozen=True, slots=True)
class MaterialPart:
    """A number of one material.

    Parameters
    ----------
    material
        Name in the job.
    constant
        Of its model.
    term, inner
        Where the constant is a list: which row of it, and which constant of the row. Else None and empty.
    loss
        Whether it is the loss part of a relative constant, not its real part.
    """

    material: str
    constant: str
    term: int | None = None
    inner: str = ""
    loss: bool = False


@dataclass(frozen=True, slots=True)
class Variation:
    """One number of a job that a study varies, in the sight of one stack.

    Parameters
    ----------
    stack
        Index of the stack that is solved.
    part
        What is varied.
    path
        Place in the record, as faults name it: ``stacks[0].elements[1].thickness``,
        ``materials.skin.permittivity``; a loss part is ``materials.skin.permittivity[1]``.
    label
        Words for menus and axes, without the unit: ``Thickness of element 2 (foam)``.
    dimension
        Of the value.
    value
        What it is now, SI.
    low, high
        A sensible range to begin with, SI: half to double the present value, or 0 to double where 0 is allowed and
        usual; 20 K to either side of a temperature.
    limits
        What is allowed at all.
    """

    stack: int
    part: ElementPart | MaterialPart
    path: str
    label: str
    dimension: Dimension
    value: float
    low: float
    high: float
    limits: Limits

    def values(self, points: int) -> FloatArray:
        """Return `points` even steps from `low` to `high`, SI."""
        return np.linspace(self.low, self.high, points)


def variations_of(job: Job, stack: int) -> tuple[Variation, ...]:
    """Return everything that can be varied of a stack: its elements from front to back, then its materials.

    Rows that are not computed are left out, also when their material is used nowhere else; so are lists of data.

    Examples
    --------
    >>> from stackcore.job import job_from_json
    >>> job = Job(job_from_json('''{"format": "slabwright-job", "version": 1, "title": "Skin",
    ... "materials": {"skin": {"model": "constant", "permittivity": 4.0, "loss_tangent": 0.01}},
    ... "stacks": [{"name": "A", "elements": [{"layer": "skin", "thickness": "2 mm"}]}],
    ... "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''))
    >>> [found.path for found in variations_of(job, 0)]
    ['stacks[0].elements[0].thickness', 'materials.skin.permittivity', 'materials.skin.loss_tangent']
    """
    return (*_of_elements(job, stack), *_of_materials(job, stack))


def places_of(job: Job, stack: int, row: int) -> tuple[int, ...]:
    """Return where a row of the record stands among the elements of the resolved stack: nowhere, once, or often.

    Groups repeat their rows, and disabled rows are not there.
    """
    return tuple(place for place, found in enumerate(job.rows[stack]) if found == row)


def _of_elements(job: Job, stack: int) -> Iterator[Variation]:
    for row, element in enumerate(job.record.stacks[stack].elements):
        if not places_of(job, stack, row):
            continue
        for name, limits in _parts_of(element):
            given = getattr(element, name)
            if not isinstance(given, Measure):
                continue
            what = element.material if isinstance(element, LayerRecord) else f"{element.kind} sheet"
            low, high = _range(given.value, limits, from_zero=False)
            path = join(join(join(join("stacks", stack), "elements"), row), name)
            label = f"{name.capitalize()} of element {row + 1} ({what})"
            part = ElementPart(row, name)
            yield Variation(stack, part, path, label, limits.dimension, given.value, low, high, limits)


def _parts_of(element: ElementRecord) -> tuple[tuple[str, Limits], ...]:
    if isinstance(element, LayerRecord):
        return (("thickness", job_limits.LENGTH),)
    return tuple(job_limits.PARTS_OF_KIND[element.kind].items())


def _of_materials(job: Job, stack: int) -> Iterator[Variation]:
    for material in _materials_of(job, stack):
        whole = with_library_values(material)
        model = MODELS[whole.model]
        for part, label, kind, value in _numbers(material.name, model, whole.given):
            limits = _limits(kind, loss=part.loss)
            path = join(join("materials", material.name), part.constant)
            if part.term is not None:
                path = join(join(path, part.term), part.inner)
            path = join(path, 1) if part.loss else path
            low, high = _range(value, limits, from_zero=part.loss or not isinstance(kind, Relative))
            words = f"{label} of {material.label or material.name}"
            yield Variation(stack, part, path, words, limits.dimension, value, low, high, limits)


def _materials_of(job: Job, stack: int) -> tuple[MaterialRecord, ...]:
    """Return the materials of a stack and those they are made of, in the order of the job."""
    record = job.record.stacks[stack]
    layers = [record.elements[row] for row in set(job.rows[stack]) if row >= 0]
    used = {record.front, record.back, *(one.material for one in layers if isinstance(one, LayerRecord))}
    waiting = list(used)
    while waiting:
        material = job.record.material(waiting.pop())
        inner = {name for _, name in references_of(material)} - used if material is not None else set()
        used |= inner
        waiting += inner
    return tuple(material for material in job.materials if material.name in used)


def _numbers(name: str, model: Model, given: Constants) -> Iterator[tuple[MaterialPart, str, Kind, float]]:
    for constant in model.constants:
        kind, value = constant.kind, given.get(constant.name)
        if isinstance(kind, Terms) and isinstance(value, tuple):
            if kind.row == "row" or len(value) > _MOST_TERMS:
                continue
            for number, row in enumerate(value):
                for inner in kind.of:
                    part = MaterialPart(name, constant.name, number, inner.name)
                    label = f"{inner.label}, {kind.row} {number + 1},"
                    yield from _scalars(part, label, inner.kind, row.get(inner.name))
            continue
        if value is None and not isinstance(kind, Relative):
            value = _unsaid(model, given, constant.name)
        yield from _scalars(MaterialPart(name, constant.name), constant.label, kind, value)


def _unsaid(model: Model, given: Constants, name: str) -> Value | None:
    """Return what a constant is that is not given: a loss tangent beside a lossless permittivity is 0."""
    permittivity = given.get("permittivity")
    if name == "loss_tangent" and isinstance(permittivity, complex):
        return 0.0 if permittivity.imag == 0 and permittivity.real > 0 else None
    return model.default(name)


def _scalars(
    part: MaterialPart, label: str, kind: Kind, value: Value | None
) -> Iterator[tuple[MaterialPart, str, Kind, float]]:
    if isinstance(value, Measure) and isinstance(kind, Quantity):
        yield part, label, kind, value.value
    elif isinstance(kind, Number) and not kind.whole and isinstance(value, float | int):
        yield part, label, kind, float(value)
    elif isinstance(kind, Relative) and isinstance(value, complex | float | int):
        value = complex(value)
        yield part, label, kind, value.real
        if value.imag:
            lossy = MaterialPart(part.material, part.constant, part.term, part.inner, loss=True)
            yield lossy, f"{label}, loss part,", kind, -value.imag


def _limits(kind: Kind, *, loss: bool) -> Limits:
    if isinstance(kind, Number | Quantity):
        return kind.limits
    return _LOSS if loss else _REAL


def _range(value: float, limits: Limits, *, from_zero: bool) -> tuple[float, float]:
    """Return a range to begin with, inside the limits."""
    if limits.dimension is Dimension.TEMPERATURE:
        low, high = value - _WARMER, value + _WARMER
    elif value == 0:
        low, high = 0.0, _BEGIN.get(limits.dimension, _BEGIN_NUMBER)
    else:
        low, high = sorted((0.0 if from_zero and limits.contains(0.0) else value / 2, 2 * value))
        if limits is _REAL and value >= 1:
            low = max(low, 1.0)
    lowest = np.nextafter(limits.lowest, np.inf) if limits.open_below else limits.lowest
    low = low if limits.contains(low) else float(max(low, lowest))
    return low, min(high, limits.highest)
