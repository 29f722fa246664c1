"""JSON tree -> records. What a value must be is said here; what values must be to each other, in `checks`."""

from collections.abc import Callable, Mapping
from typing import Final, Literal, TypeVar

from stackcore.job import checks, limits
from stackcore.job.inspector import Inspector, join, one_of, shown
from stackcore.job.limits import SHEET_PARTS
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
from stackcore.media.models import read_conductivity, read_loss_tangent, read_relative
from stackcore.units import Dimension, Measure, measure

FORMAT: Final = "slabwright-job"
"""Value of the key ``format``."""

JOB_KEYS: Final = ("format", "version", "title", "notes", "materials", "stacks", "sweep")
STACK_KEYS: Final = ("name", "front", "back", "elements")
FREQUENCY_KEYS: Final = ("start", "stop", "points", "spacing")
ANGLE_KEYS: Final = ("start", "stop", "points")
SHEET_KINDS: Final = ("series",)

MATERIAL_KEYS: Final = ("label", "library", "model", *checks.CONSTANTS, "source")

T = TypeVar("T")

_REQUIRED: Final = {
    "stacks": '"stacks": [{"name": "A", "elements": []}]',
    "sweep": '"sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}',
}
_STACK_REQUIRED: Final = {"name": '"name": "A"', "elements": '"elements": []'}
_SWEEP_REQUIRED: Final = {"frequency": '"frequency": ["10 GHz"]', "angle": '"angle": ["0 deg"]'}
_FREQUENCY_REQUIRED: Final = {"start": '"start": "8 GHz"', "stop": '"stop": "12 GHz"', "points": '"points": 401'}
_ANGLE_REQUIRED: Final = {"start": '"start": "0 deg"', "stop": '"stop": "60 deg"', "points": '"points": 7'}

_POINTS: Final = "a whole number from 1 to 1000000"
_MILLIMETRE: Final = measure(1e-3, Dimension.LENGTH)
_LOW: Final = measure(1.0, Dimension.FREQUENCY)
_NORMAL: Final = measure(0.0, Dimension.ANGLE)


def decode_job(tree: Mapping[str, object], inspector: Inspector) -> JobRecord:
    """Return the record of a whole file of the current version; faults go to `inspector`.

    Where something is wrong a stand-in takes its place, so that what remains can be checked.
    """
    inspector.mapping(tree, "", JOB_KEYS, _REQUIRED)
    stacks = inspector.sequence(tree["stacks"], "stacks", limits.MOST_STACKS) if "stacks" in tree else []
    return JobRecord(
        title=inspector.text(tree.get("title", ""), "title"),
        stacks=tuple(_stack(inspector, value, join("stacks", place)) for place, value in enumerate(stacks)),
        sweep=_sweep(inspector, tree.get("sweep"), "sweep" in tree),
        materials=_materials(inspector, tree.get("materials", {})),
        notes=inspector.text(tree.get("notes", ""), "notes"),
    )


def _materials(inspector: Inspector, value: object) -> tuple[MaterialRecord, ...]:
    if not isinstance(value, dict):
        allowed = 'an object: "materials": {"skin": {"model": "constant", "permittivity": 4.2}}'
        inspector.fault("materials", f"{shown(value)} is not an object", allowed)
        return ()
    if len(value) > limits.MOST_MATERIALS:
        inspector.fault("materials", f"there are {len(value)} materials", f"at most {limits.MOST_MATERIALS}")
        return ()
    inspector.repeated(value, "materials")
    return tuple(_material(inspector, key, item, join("materials", key)) for key, item in value.items())


def _material(inspector: Inspector, name: str, value: object, path: str) -> MaterialRecord:
    inspector.text(name, path)
    given = inspector.mapping(value, path, MATERIAL_KEYS)
    if given is None:
        return MaterialRecord(name, model="constant", permittivity=1.0 + 0.0j)
    _loss_twice(inspector, given, path)
    if not isinstance(given.get("library", ""), str):
        inspector.faulted.add(join(path, "model"))  # that the model is missing is no second fault
    known = {key: (item, join(path, key)) for key, item in given.items() if key in MATERIAL_KEYS}

    def text(key: str) -> str:
        return inspector.text(*known[key]) if key in known else ""

    def constant(key: str, reader: Callable[[object], T]) -> T | None:
        if key not in known:
            return None
        return inspector.constant(*known[key], reader)

    return MaterialRecord(
        name,
        label=text("label"),
        model=inspector.choice(*known["model"], checks.JOB_MODELS, "") if "model" in known else "",
        library=text("library"),
        permittivity=constant("permittivity", read_relative),
        permeability=constant("permeability", read_relative),
        loss_tangent=constant("loss_tangent", read_loss_tangent),
        conductivity=constant("conductivity", read_conductivity),
        source=text("source"),
    )


def _loss_twice(inspector: Inspector, given: dict[str, object], path: str) -> None:
    if "loss_tangent" in given and isinstance(given.get("permittivity"), list):
        allowed = "permittivity as a number with loss_tangent, or [real, loss] alone"
        inspector.fault(join(path, "loss_tangent"), "the loss is given twice, permittivity has it as well", allowed)


def _stack(inspector: Inspector, value: object, path: str) -> StackRecord:
    given = inspector.mapping(value, path, STACK_KEYS, _STACK_REQUIRED)
    if given is None:
        return StackRecord(path)
    place = join(path, "elements")
    elements = inspector.sequence(given["elements"], place, limits.MOST_ELEMENTS) if "elements" in given else []
    return StackRecord(
        name=inspector.text(given["name"], join(path, "name"), path) if "name" in given else path,
        elements=tuple(_element(inspector, item, join(place, row)) for row, item in enumerate(elements)),
        front=inspector.text(given.get("front", "air"), join(path, "front"), "air"),
        back=inspector.text(given.get("back", "air"), join(path, "back"), "air"),
    )


def _element(inspector: Inspector, value: object, path: str) -> ElementRecord:
    stand_in = LayerRecord("air", _MILLIMETRE)
    allowed = '{"layer": "skin", "thickness": "1 mm"} or {"sheet": "series", "resistance": "377 ohm/sq"}'
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an element", allowed)
        return stand_in
    if ("layer" in value) == ("sheet" in value):
        given = "both a layer and a sheet" if "layer" in value else "neither a layer nor a sheet"
        inspector.fault(path, f"this is {given}", allowed)
        return stand_in
    return _layer(inspector, value, path) if "layer" in value else _sheet(inspector, value, path)


def _layer(inspector: Inspector, value: dict[str, object], path: str) -> LayerRecord:
    inspector.mapping(value, path, ("layer", "thickness"), {"thickness": '"thickness": "1 mm"'})
    thickness = _MILLIMETRE
    if "thickness" in value:
        thickness = inspector.measure(value["thickness"], join(path, "thickness"), Dimension.LENGTH, _MILLIMETRE)
    return LayerRecord(inspector.text(value["layer"], join(path, "layer"), "air"), thickness)


def _sheet(inspector: Inspector, value: dict[str, object], path: str) -> SheetRecord:
    inspector.mapping(value, path, ("sheet", *SHEET_PARTS))
    kind = inspector.choice(value["sheet"], join(path, "sheet"), SHEET_KINDS, "series")
    parts: dict[str, Measure] = {}
    for name, part in SHEET_PARTS.items():
        if name in value:
            stand_in = measure(1.0, part.dimension)
            parts[name] = inspector.measure(value[name], join(path, name), part.dimension, stand_in)
    return SheetRecord(kind, **parts)


def _sweep(inspector: Inspector, value: object, present: bool) -> SweepRecord:
    given = inspector.mapping(value, "sweep", tuple(_SWEEP_REQUIRED), _SWEEP_REQUIRED) if present else None
    given = given or {}
    return SweepRecord(
        _frequency(inspector, given["frequency"]) if "frequency" in given else (_LOW,),
        _angle(inspector, given["angle"]) if "angle" in given else (_NORMAL,),
    )


def _frequency(inspector: Inspector, value: object) -> FrequencyGrid | tuple[Measure, ...]:
    path = "sweep.frequency"
    listed = _listed(inspector, value, path, Dimension.FREQUENCY, _LOW)
    if listed is not None:
        return listed
    given = inspector.mapping(value, path, FREQUENCY_KEYS, _FREQUENCY_REQUIRED) or {}
    start, stop, points = _grid(inspector, given, path, Dimension.FREQUENCY, _LOW)
    spacing: Literal["linear", "log"] = "linear"
    if "spacing" in given:
        chosen = inspector.choice(given["spacing"], join(path, "spacing"), ("linear", "log"), "linear")
        spacing = "log" if chosen == "log" else "linear"
    return FrequencyGrid(start, stop, points, spacing)


def _angle(inspector: Inspector, value: object) -> AngleGrid | tuple[Measure, ...]:
    path = "sweep.angle"
    listed = _listed(inspector, value, path, Dimension.ANGLE, _NORMAL)
    if listed is not None:
        return listed
    given = inspector.mapping(value, path, ANGLE_KEYS, _ANGLE_REQUIRED) or {}
    return AngleGrid(*_grid(inspector, given, path, Dimension.ANGLE, _NORMAL))


def _listed(
    inspector: Inspector, value: object, path: str, dimension: Dimension, stand_in: Measure
) -> tuple[Measure, ...] | None:
    """Return the measures of a list, a stand-in for what is neither list nor object, or None for an object."""
    if isinstance(value, list):
        if len(value) > limits.MOST_LISTED:
            allowed = f"at most {limits.MOST_LISTED}; more as start, stop and points"
            inspector.fault(path, f"the list has {len(value)} values", allowed)
            return (stand_in,)
        return tuple(
            inspector.measure(item, join(path, place), dimension, stand_in) for place, item in enumerate(value)
        )
    if isinstance(value, dict):
        return None
    allowed = f"{{start, stop, points}} or a list such as {one_of([dimension.example])}"
    inspector.fault(path, f"{shown(value)} is neither a grid nor a list", allowed)
    return (stand_in,)


def _grid(
    inspector: Inspector, given: dict[str, object], path: str, dimension: Dimension, stand_in: Measure
) -> tuple[Measure, Measure, int]:
    ends = [
        inspector.measure(given[key], join(path, key), dimension, stand_in) if key in given else stand_in
        for key in ("start", "stop")
    ]
    points = inspector.whole(given["points"], join(path, "points"), 1, _POINTS) if "points" in given else 1
    return ends[0], ends[1], points
