"""What the values of a record must be to each other: every fault, with its path in the file.

A record made by an edit is checked as one read from a file is. What needs media is in `resolve`.
"""

import cmath
import math
from collections.abc import Collection, Iterator, Mapping
from typing import Final

from stackcore.errors import Fault
from stackcore.job import limits
from stackcore.job.inspector import has_lone_surrogate, join, near, one_of, shown
from stackcore.job.limits import Limits
from stackcore.job.records import (
    AngleGrid,
    ElementRecord,
    FrequencyGrid,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    SheetRecord,
    StackRecord,
    SweepRecord,
)
from stackcore.media.models import MODELS
from stackcore.units import Measure

ALWAYS_DEFINED: Final = ("air", "vacuum")
"""Materials of every job."""

METAL_NAME: Final = "metal"
"""Name of the perfect conductor as a back."""

CONSTANTS: Final = ("permittivity", "loss_tangent", "permeability", "conductivity")
"""The constants a material of a job may have, whatever its model, in the order of the file."""

JOB_MODELS: Final = {name: model for name, model in MODELS.items() if set(model.readers) <= set(CONSTANTS)}
"""The models a job file can spell out; those of the library that need other constants can only be referred to."""

_RIGHT_ANGLE: Final = math.pi / 2


def faults_of(record: JobRecord) -> Iterator[Fault]:
    """Yield every fault that shows in the record alone, in the order of the file."""
    yield from _text_faults({"title": record.title, "notes": record.notes})
    for material in record.materials:
        yield from material_faults(material, join("materials", material.name))
    yield from _doubled((material.name for material in record.materials), "materials", "")
    known = dict.fromkeys((*(material.name for material in record.materials), *ALWAYS_DEFINED))
    if not record.stacks:
        yield Fault("stacks", "there is no stack", "at least one stack")
    for place, stack in enumerate(record.stacks):
        yield from _stack_faults(stack, join("stacks", place), known)
    yield from _doubled((stack.name for stack in record.stacks), "stacks", ".name")
    yield from sweep_faults(record.sweep)


def _text_faults(texts: Mapping[str, str]) -> Iterator[Fault]:
    """Yield a fault for each text, given by its path, that cannot be written as UTF-8."""
    for path, text in texts.items():
        if has_lone_surrogate(text):
            yield Fault(path, f"{shown(text)} holds half a character (a lone surrogate)", "whole characters")


def _doubled(names: Iterator[str], path: str, member: str) -> Iterator[Fault]:
    """Yield a fault for each name that an earlier one has already."""
    listed = list(names)
    if len(set(listed)) == len(listed):
        return
    first: dict[str, int] = {}
    for place, name in enumerate(listed):
        if name in first:
            where = f"{path}[{first[name]}]"
            yield Fault(
                f"{path}[{place}]{member}", f"the name {shown(name)} is taken by {where}", "a name of its own"
            )
        first.setdefault(name, place)


def material_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    """Yield what is wrong with one material, apart from its library reference."""
    texts = {"label": material.label, "library": material.library, "source": material.source}
    yield from _text_faults({path: material.name, **{join(path, key): text for key, text in texts.items()}})
    if not material.name.strip():
        yield Fault(path, "the name of the material is empty", "a name")
    if material.name in (*ALWAYS_DEFINED, METAL_NAME):
        what = (
            "is always defined, with 1 for both constants" if material.name != METAL_NAME else "is the perfect back"
        )
        yield Fault(path, f"{material.name!r} {what}", "another name for this material")
    if not material.model and not material.library:
        yield Fault(join(path, "model"), "is missing", f"{one_of(JOB_MODELS)}, or a library reference")
    if material.model and material.model not in JOB_MODELS:
        given = f"{shown(material.model)} is not known{near(material.model, JOB_MODELS)}"
        yield Fault(join(path, "model"), given, one_of(JOB_MODELS))
    elif material.model:
        yield from _model_faults(material, path)
    yield from _constant_faults(material, path)


def _model_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    """Yield constants that the model does not take, and those it needs."""
    model = JOB_MODELS[material.model]
    for name in given_constants(material):
        if name not in model.readers:
            message = f"the model {material.model!r} has no {name}"
            yield Fault(join(path, name), message, f"for this model {one_of(model.readers)}")
    if material.library and not given_constants(material):
        return
    for name in model.required:
        if getattr(material, name) is None:
            yield Fault(join(path, name), "is missing", f"the model {material.model!r} needs it")


def given_constants(material: MaterialRecord) -> tuple[str, ...]:
    """Return the names of the constants a material has."""
    return tuple(name for name in CONSTANTS if getattr(material, name) is not None)


def _constant_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    for name in ("permittivity", "permeability"):
        value: complex | None = getattr(material, name)
        if value is None:
            continue
        if not cmath.isfinite(value) or abs(value) > limits.LARGEST_RELATIVE:
            yield Fault(join(path, name), f"{shown_relative(value)} is too large", "at most 1e12 in magnitude")
        elif value == 0:
            yield Fault(join(path, name), "must not be 0", "for example 4.2 or [4.2, 0.06]")
        elif value.imag > 0:
            message = f"the loss {-value.imag:g} is negative, which would be gain"
            yield Fault(join(path, name), message, "[real, loss] with loss 0 or more")
    if material.loss_tangent is not None:
        yield from _loss_faults(material.loss_tangent, material.permittivity, path)
    if material.conductivity is not None:
        yield from _within(material.conductivity, limits.CONDUCTIVITY, join(path, "conductivity"))


def _loss_faults(tangent: float, permittivity: complex | None, path: str) -> Iterator[Fault]:
    place = join(path, "loss_tangent")
    if not limits.LOSS_TANGENT.contains(tangent):
        yield Fault(place, f"{tangent!r} is out of range", limits.LOSS_TANGENT.allowed)
    if permittivity is None:
        return
    if permittivity.imag:
        allowed = "permittivity as a number with loss_tangent, or [real, loss] alone"
        yield Fault(place, "the loss is given twice, permittivity has it as well", allowed)
    elif permittivity.real < 0 < tangent:
        allowed = "permittivity as [real, loss] where its real part is negative"
        yield Fault(place, f"{tangent!r} with a permittivity of {permittivity.real:g} would be gain", allowed)


def shown_relative(value: complex) -> str:
    """Return ε or μ as a file has it: ``4.2`` or ``[4.2, 0.06]``."""
    return repr(value.real) if value.imag == 0 else f"[{value.real!r}, {-value.imag!r}]"


def _within(measure: Measure, allowed: Limits, path: str) -> Iterator[Fault]:
    if allowed.contains(measure.value):
        return
    if measure.value < 0:
        what = "is negative"
    elif measure.value == 0:
        what = "is 0"
    else:
        what = "is too small" if measure.value < allowed.lowest else "is too large"
    yield Fault(path, f"{shown(measure.text)} {what}", allowed.allowed)


def _stack_faults(stack: StackRecord, path: str, known: Collection[str]) -> Iterator[Fault]:
    yield from _text_faults({join(path, "name"): stack.name})
    if not stack.name.strip():
        yield Fault(join(path, "name"), "the name of the stack is empty", "a name")
    if stack.front == METAL_NAME:
        yield Fault(join(path, "front"), "the wave cannot come from a perfect conductor", "a lossless material")
    else:
        yield from _known(stack.front, known, join(path, "front"))
    if stack.back != METAL_NAME:
        yield from _known(stack.back, known, join(path, "back"), f" or {METAL_NAME!r}")
    for place, element in enumerate(stack.elements):
        yield from element_faults(element, join(join(path, "elements"), place), known)


def element_faults(element: ElementRecord, path: str, known: Collection[str]) -> Iterator[Fault]:
    """Yield what is wrong with one layer or sheet; `known` are the names of materials."""
    if isinstance(element, LayerRecord):
        yield from _known(element.material, known, join(path, "layer"))
        yield from _within(element.thickness, limits.LENGTH, join(path, "thickness"))
        return
    yield from sheet_faults(element, path)


def sheet_faults(sheet: SheetRecord, path: str) -> Iterator[Fault]:
    """Yield what is wrong with one sheet."""
    parts = {name: getattr(sheet, name) for name in limits.SHEET_PARTS if getattr(sheet, name) is not None}
    for name, value in parts.items():
        yield from _within(value, limits.SHEET_PARTS[name], join(path, name))
    if not parts:
        allowed = f'{one_of(limits.SHEET_PARTS)} or more, for example "resistance": "377 ohm/sq"'
        yield Fault(path, "there is nothing in this sheet", allowed)
    elif sheet.capacitance is None and all(value.value == 0 for value in parts.values()):
        name = next(iter(parts))
        yield Fault(join(path, name), "a sheet of 0 ohm is a perfect conductor", "a part that is more than 0")


def _known(name: str, known: Collection[str], path: str, more: str = "") -> Iterator[Fault]:
    if name not in known:
        yield Fault(path, f"unknown material {shown(name)}{near(name, known)}", one_of(known) + more)


def sweep_faults(sweep: SweepRecord) -> Iterator[Fault]:
    """Yield what is wrong with the frequencies and the angles, and with how many there are."""
    path = "sweep.frequency"
    if isinstance(sweep.frequency, FrequencyGrid):
        yield from _frequency_grid_faults(sweep.frequency, path)
        frequencies = sweep.frequency.points
    else:
        yield from _list_faults(len(sweep.frequency), path)
        for place, frequency in enumerate(sweep.frequency):
            yield from _within(frequency, limits.FREQUENCY, join(path, place))
        frequencies = len(sweep.frequency)
    path = "sweep.angle"
    if isinstance(sweep.angle, AngleGrid):
        yield from _angle_grid_faults(sweep.angle, path)
        angles = sweep.angle.points
    else:
        yield from _list_faults(len(sweep.angle), path)
        for place, angle in enumerate(sweep.angle):
            yield from _angle_faults(angle, join(path, place))
        angles = len(sweep.angle)
    if frequencies * angles > limits.MOST_PAIRS and max(frequencies, angles) <= limits.MOST_POINTS:
        message = f"{frequencies} frequencies at {angles} angles are {frequencies * angles} points"
        yield Fault("sweep", message, f"at most {limits.MOST_PAIRS} in all")


def _frequency_grid_faults(grid: FrequencyGrid, path: str) -> Iterator[Fault]:
    yield from _within(grid.start, limits.FREQUENCY, join(path, "start"))
    yield from _within(grid.stop, limits.FREQUENCY, join(path, "stop"))
    yield from _grid_faults(grid, path)
    if grid.spacing not in ("linear", "log"):
        yield Fault(join(path, "spacing"), f"{shown(grid.spacing)} is not known", one_of(("linear", "log")))


def _angle_grid_faults(grid: AngleGrid, path: str) -> Iterator[Fault]:
    yield from _angle_faults(grid.start, join(path, "start"))
    yield from _angle_faults(grid.stop, join(path, "stop"))
    yield from _grid_faults(grid, path)


def _grid_faults(grid: FrequencyGrid | AngleGrid, path: str) -> Iterator[Fault]:
    if not 1 <= grid.points <= limits.MOST_POINTS:
        what = "too few" if grid.points < 1 else "too many"
        allowed = f"a whole number from 1 to {limits.MOST_POINTS}"
        yield Fault(join(path, "points"), f"{shown(grid.points)} is {what}", allowed)
    if grid.start.value > grid.stop.value:
        message = f"{shown(grid.stop.text)} is below the start, {shown(grid.start.text)}"
        yield Fault(join(path, "stop"), message, "a stop above the start")
    elif grid.start.value == grid.stop.value and grid.points > 1:
        message = f"{shown(grid.stop.text)} is also the start of {shown(grid.points)} points"
        yield Fault(join(path, "stop"), message, "a stop above the start, or 1 point")


def _list_faults(count: int, path: str) -> Iterator[Fault]:
    if count == 0:
        yield Fault(path, "the list is empty", "at least one value")
    if count > limits.MOST_LISTED:
        allowed = f"at most {limits.MOST_LISTED}; more as start, stop and points"
        yield Fault(path, f"the list has {count} values", allowed)


def _angle_faults(angle: Measure, path: str) -> Iterator[Fault]:
    if not 0 <= angle.value < _RIGHT_ANGLE:
        yield Fault(
            path,
            f"the angle {shown(angle.text)} is out of range",
            "0 deg or more and below 90 deg; without a unit, rad",
        )
