"""JSON tree -> records. What a value must be is said here; what values must be to each other, in `checks`."""

from collections.abc import Mapping
from typing import Final, Literal

from stackcore.job import checks, limits
from stackcore.job.decode_facts import FACT_KEYS, decode_facts
from stackcore.job.decode_stacks import decode_conditions, decode_stack
from stackcore.job.inspector import Inspector, join, near, one_of, shown
from stackcore.job.materials import library_model
from stackcore.job.plies import plies_of
from stackcore.job.records import AngleGrid, FrequencyGrid, JobRecord, MaterialRecord, SweepRecord
from stackcore.media.models import CONSTANT_NAMES, MODELS, Model
from stackcore.media.models.kinds import number_of
from stackcore.units import Dimension, Measure, measure

FORMAT: Final = "slabwright-job"
"""Value of the key ``format``."""

JOB_KEYS: Final = ("format", "version", "title", "notes", "materials", "stacks", "conditions", "sweep")
FREQUENCY_KEYS: Final = ("start", "stop", "points", "spacing")
ANGLE_KEYS: Final = ("start", "stop", "points")

MATERIAL_KEYS: Final = (
    *("label", "library", "model", "range", "spread", "certainty", "source", "note"),
    *FACT_KEYS,
)
"""Keys of a material beside the constants of its model."""

_REQUIRED: Final = {
    "stacks": '"stacks": [{"name": "A", "elements": []}]',
    "sweep": '"sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}',
}
_SWEEP_REQUIRED: Final = {"frequency": '"frequency": ["10 GHz"]', "angle": '"angle": ["0 deg"]'}
_FREQUENCY_REQUIRED: Final = {"start": '"start": "8 GHz"', "stop": '"stop": "12 GHz"', "points": '"points": 401'}
_ANGLE_REQUIRED: Final = {"start": '"start": "0 deg"', "stop": '"stop": "60 deg"', "points": '"points": 7'}

_POINTS: Final = "a whole number from 1 to 1000000"
_LOW: Final = measure(1.0, Dimension.FREQUENCY)
_NORMAL: Final = measure(0.0, Dimension.ANGLE)


def decode_job(tree: Mapping[str, object], inspector: Inspector) -> JobRecord:
    """Return the record of a whole file of the current version; faults go to `inspector`.

    Where something is wrong a stand-in takes its place, so that what remains can be checked.
    """
    inspector.mapping(tree, "", JOB_KEYS, _REQUIRED)
    stacks = inspector.sequence(tree["stacks"], "stacks", limits.MOST_STACKS) if "stacks" in tree else []
    materials = _materials(inspector, tree.get("materials", {}))
    plies = plies_of(materials)
    return JobRecord(
        title=inspector.text(tree.get("title", ""), "title"),
        stacks=tuple(
            decode_stack(inspector, value, join("stacks", place), plies) for place, value in enumerate(stacks)
        ),
        sweep=_sweep(inspector, tree.get("sweep"), "sweep" in tree),
        materials=materials,
        notes=inspector.text(tree.get("notes", ""), "notes"),
        conditions=decode_conditions(inspector, tree.get("conditions", []), plies),
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
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an object", "an object {...}")
        return MaterialRecord(name, model="constant", constants={"permittivity": 1.0 + 0.0j})
    if not isinstance(value.get("library", ""), str):
        inspector.faulted.add(join(path, "model"))  # that the model is missing is no second fault

    def text(key: str) -> str:
        return inspector.text(value[key], join(path, key)) if key in value else ""

    library, model = text("library"), ""
    if "model" in value:
        model = inspector.choice(value["model"], join(path, "model"), MODELS, "")
    known = MODELS.get(model or ("" if "model" in value else library_model(library)))
    _material_keys(inspector, value, path, known)
    facts = decode_facts(inspector, value, path, known)
    return MaterialRecord(
        name,
        label=text("label"),
        model=model,
        library=library,
        constants=known.read(value, path, inspector.fault) if known else {},
        source=text("source"),
        valid_range=_range(inspector, value["range"], join(path, "range")) if "range" in value else None,
        certainty=text("certainty"),
        spread=_spread(inspector, value["spread"], join(path, "spread")) if "spread" in value else (),
        note=text("note"),
        density=facts.density,
        price=facts.price,
        ply_thickness=facts.ply_thickness,
        states=facts.states,
    )


def _material_keys(inspector: Inspector, value: dict[str, object], path: str, model: Model | None) -> None:
    """Note keys that no material has, and constants that the model does not have."""
    inspector.repeated(value, path)
    # Where it is not known which model counts, the constants of any may stand there.
    known = (*MATERIAL_KEYS, *(model.names if model else CONSTANT_NAMES))
    for key in value:
        if key not in known and model is not None and key in CONSTANT_NAMES:
            message = f"the model {model.name!r} has no {key}"
            inspector.fault(join(path, key), message, f"for this model {one_of(model.names)}")
        elif key not in known:
            inspector.fault(join(path, key), f"unknown key {shown(key)}{near(key, known)}", one_of(known))
        if inspector.untold:  # an object of a million wrong keys
            break


def _range(inspector: Inspector, value: object, path: str) -> tuple[Measure, Measure] | None:
    if not (isinstance(value, list) and len(value) == 2):
        inspector.fault(path, f"{shown(value)} is not a range of frequencies", checks.RANGE)
        return None
    lowest, highest = (
        inspector.measure(end, join(path, place), Dimension.FREQUENCY, _LOW) for place, end in enumerate(value)
    )
    # A stand-in for one end would only make a range that is reversed.
    return None if {join(path, 0), join(path, 1)} & inspector.faulted else (lowest, highest)


def _spread(inspector: Inspector, value: object, path: str) -> tuple[tuple[str, float], ...]:
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an object", 'for example {"permittivity": 0.02}')
        return ()
    inspector.repeated(value, path)
    found = []
    for name, given in value.items():
        share = number_of(given)
        if share is None:
            inspector.fault(join(path, name), f"{shown(given)} is not a number", checks.SHARE)
        else:
            found.append((name, share))
    return tuple(found)


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
