"""What the values of a record must be to each other: every fault, with its path in the file.

A record made by an edit is checked as one read from a file is. What needs media is in `resolve`.
"""

import math
import re
from collections.abc import Collection, Iterator, Mapping
from typing import Final

from stackcore.errors import Fault
from stackcore.job import limits
from stackcore.job.conditions import condition_faults
from stackcore.job.decode_facts import PRICE
from stackcore.job.inspector import has_lone_surrogate, join, near, one_of, shown
from stackcore.job.limits import Limits
from stackcore.job.materials import library_model
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
from stackcore.job.references import ALWAYS_DEFINED as ALWAYS_DEFINED
from stackcore.job.references import reference_faults
from stackcore.job.states import state_faults
from stackcore.media.models import MODELS
from stackcore.units import Measure

METAL_NAME: Final = "metal"
"""Name of the perfect conductor as a back."""

RANGE: Final = 'the lower and the upper end, for example ["8 GHz", "12.4 GHz"]'
SHARE: Final = "one standard deviation as a fraction, 0 or more and below 1"

_RIGHT_ANGLE: Final = math.pi / 2


def faults_of(record: JobRecord) -> Iterator[Fault]:
    """Yield every fault that shows in the record alone, in the order of the file."""
    yield from _text_faults({"title": record.title, "notes": record.notes})
    for material in record.materials:
        yield from material_faults(material, join("materials", material.name))
    yield from reference_faults(record.materials)
    yield from _doubled((material.name for material in record.materials), "materials", "")
    known = dict.fromkeys((*(material.name for material in record.materials), *ALWAYS_DEFINED))
    if not record.stacks:
        yield Fault("stacks", "there is no stack", "at least one stack")
    for place, stack in enumerate(record.stacks):
        yield from _stack_faults(stack, join("stacks", place), known)
    yield from _doubled((stack.name for stack in record.stacks), "stacks", ".name")
    yield from condition_faults(record, known)
    for place, condition in enumerate(record.conditions):
        path = join("conditions", place)
        yield from _text_faults({join(path, "name"): condition.name, join(path, "note"): condition.note})
        for side, elements in (("front", condition.front), ("back", condition.back)):
            for row, element in enumerate(elements):
                yield from element_faults(element, join(join(path, side), row), known)
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
    """Yield what is wrong with one material, apart from those it refers to."""
    texts = {key: getattr(material, key) for key in ("label", "library", "source", "certainty", "note")}
    yield from _text_faults({path: material.name, **{join(path, key): text for key, text in texts.items()}})
    if not material.name.strip():
        yield Fault(path, "the name of the material is empty", "a name")
    if material.name in (*ALWAYS_DEFINED, METAL_NAME):
        what = (
            "is always defined, with 1 for both constants" if material.name != METAL_NAME else "is the perfect back"
        )
        yield Fault(path, f"{material.name!r} {what}", "another name for this material")
    if not material.model and not material.library:
        yield Fault(join(path, "model"), "is missing", f"{one_of(MODELS)}, or a library reference")
    if material.model and material.model not in MODELS:
        given = f"{shown(material.model)} is not known{near(material.model, MODELS)}"
        yield Fault(join(path, "model"), given, one_of(MODELS))
    yield from _constants_faults(material, path)
    if material.valid_range is not None:
        yield from _range_faults(material, join(path, "range"))
    yield from _spread_faults(material, join(path, "spread"))
    if material.density is not None:
        yield from _within(material.density, limits.MASS_DENSITY, join(path, "density"))
    if material.ply_thickness is not None:
        yield from _within(material.ply_thickness, limits.PLY, join(path, "ply_thickness"))
    if material.price is not None and not (math.isfinite(material.price) and material.price >= 0):
        yield Fault(join(path, "price"), f"{material.price!r} is no price", PRICE)
    yield from state_faults(material, path)


def _constants_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    """Yield what is wrong with the constants, or what is missing of them.

    Beside a library reference without a model those that the library has may be left out.
    """
    model = MODELS.get(material.model or library_model(material.library))
    if model is None or (material.library and not material.constants):
        return
    for fault in model.faults(material.given, path):
        if material.model or fault.message != "is missing" or "[" in fault.path.removeprefix(path):
            yield fault


def _range_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    assert material.valid_range is not None
    lowest, highest = material.valid_range
    if material.model in MODELS and not MODELS[material.model].ranged:
        yield Fault(path, f"the model {material.model!r} takes its range from its parts", "no range here")
        return
    told = [*_within(lowest, limits.FREQUENCY, join(path, 0)), *_within(highest, limits.FREQUENCY, join(path, 1))]
    yield from told
    if not told and lowest.value > highest.value:
        yield Fault(path, f"{shown(lowest.text)} to {shown(highest.text)} is reversed", RANGE)


def _spread_faults(material: MaterialRecord, path: str) -> Iterator[Fault]:
    model = MODELS.get(material.model or library_model(material.library))
    known = model.names if model else ()
    for name, share in material.spread:
        base = re.split(r"[.\[]", name)[0]
        if known and base not in known:
            yield Fault(join(path, name), f"is no constant of this material{near(name, known)}", one_of(known))
        elif not 0 <= share < 1:
            yield Fault(join(path, name), f"{share!r} is not a relative spread", SHARE)


def _within(measure: Measure, allowed: Limits, path: str) -> Iterator[Fault]:
    return limits.limit_faults(measure.value, measure.text, allowed, path)


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
    yield from _group_faults(stack, path)


def _group_faults(stack: StackRecord, path: str) -> Iterator[Fault]:
    behind, count = -1, 0
    for group in stack.groups:
        where = join(join(path, "elements"), max(group.first, 0))
        if not (behind < group.first <= group.last < len(stack.elements)):
            yield Fault(where, "this group overlaps another or has no elements", "groups side by side")
            return
        if not 1 <= group.repeat <= limits.MOST_REPEATS:
            what = "too few" if group.repeat < 1 else "too many"
            allowed = f"a whole number from 1 to {limits.MOST_REPEATS}"
            yield Fault(f"{where}.repeat", f"{group.repeat} is {what}", allowed)
        behind = group.last
        count += (group.last - group.first + 1) * (group.repeat - 1)
    if len(stack.elements) + count > limits.MOST_ELEMENTS:
        told = f"the groups make {len(stack.elements) + count} elements"
        yield Fault(join(path, "elements"), told, f"at most {limits.MOST_ELEMENTS}")


def element_faults(element: ElementRecord, path: str, known: Collection[str]) -> Iterator[Fault]:
    """Yield what is wrong with one layer or sheet; `known` are the names of materials."""
    if isinstance(element, LayerRecord):
        yield from _known(element.material, known, join(path, "layer"))
        yield from _within(element.thickness, limits.LENGTH, join(path, "thickness"))
        return
    yield from sheet_faults(element, path)


def sheet_faults(sheet: SheetRecord, path: str) -> Iterator[Fault]:
    """Yield what is wrong with one sheet."""
    if sheet.kind not in limits.PARTS_OF_KIND:
        yield Fault(join(path, "sheet"), f"{shown(sheet.kind)} is not known", one_of(limits.PARTS_OF_KIND))
        return
    known = limits.PARTS_OF_KIND[sheet.kind]
    parts = {name: getattr(sheet, name) for name in known if getattr(sheet, name) is not None}
    for name, value in parts.items():
        yield from _within(value, known[name], join(path, name))
    if sheet.kind == "film":
        for name in known:
            if name not in parts:
                yield Fault(join(path, name), "is missing", "conductivity and thickness of the film")
    elif not parts:
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
        bare = "" if any(letter.isalpha() or letter == "°" for letter in angle.text) else "; without a unit, rad"
        told = f"the angle {shown(angle.text)} is out of range"
        yield Fault(path, told, f"0 deg or more and below 90 deg{bare}")
