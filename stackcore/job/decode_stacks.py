"""JSON tree -> stacks, their groups and the conditions of a job."""

from collections.abc import Mapping, Sequence
from typing import Final

from stackcore.errors import UnitError
from stackcore.job import limits
from stackcore.job.inspector import Inspector, join, near, one_of, shown
from stackcore.job.limits import PARTS_OF_KIND
from stackcore.job.plies import counts_plies, read_plies
from stackcore.job.records import (
    ConditionRecord,
    ElementRecord,
    Group,
    LayerRecord,
    SheetRecord,
    StackRecord,
)
from stackcore.media.models.kinds import number_of
from stackcore.units import Dimension, Measure, measure

STACK_KEYS: Final = ("name", "front", "back", "elements")
GROUP_KEYS: Final = ("repeat", "elements")
CONDITION_KEYS: Final = ("name", "front", "back", "materials", "states", "thickness_factors", "note")
SWITCHES: Final[Mapping[str, bool]] = {"enabled": True, "locked": False}
"""Key of an element that is true or false -> what it is when it is left out."""

FACTOR: Final = f"a number from 0 to {limits.THICKEST_FACTOR:g}"

_STACK_REQUIRED: Final = {"name": '"name": "A"', "elements": '"elements": []'}
_GROUP_REQUIRED: Final = {
    "repeat": '"repeat": 8',
    "elements": '"elements": [{"layer": "skin", "thickness": "1 mm"}]',
}
_CONDITION_REQUIRED: Final = {"name": '"name": "Wet"'}
_ELEMENT: Final = '{"layer": "skin", "thickness": "1 mm"} or {"sheet": "series", "resistance": "377 ohm/sq"}'
_MILLIMETRE: Final = measure(1e-3, Dimension.LENGTH)
_STAND_IN: Final = LayerRecord("air", _MILLIMETRE)

Plies = Mapping[str, float]
"""Name of a material -> thickness of one of its plies, m."""


def decode_stack(inspector: Inspector, value: object, path: str, plies: Plies) -> StackRecord:
    """Return one stack; the rows of its groups stand among its elements."""
    given = inspector.mapping(value, path, STACK_KEYS, _STACK_REQUIRED)
    if given is None:
        return StackRecord(path)
    place = join(path, "elements")
    items = inspector.sequence(given["elements"], place, limits.MOST_ELEMENTS) if "elements" in given else []
    elements: list[ElementRecord] = []
    groups: list[Group] = []
    for number, item in enumerate(items):
        where = join(place, number)
        if isinstance(item, dict) and "repeat" in item and "layer" not in item and "sheet" not in item:
            inside, repeat = _group(inspector, item, where, plies)
            if inside:
                groups.append(Group(len(elements), len(elements) + len(inside) - 1, repeat))
            elements += inside
        else:
            elements.append(_element(inspector, item, where, plies))
    return StackRecord(
        name=inspector.text(given["name"], join(path, "name"), path) if "name" in given else path,
        elements=tuple(elements),
        front=inspector.text(given.get("front", "air"), join(path, "front"), "air"),
        back=inspector.text(given.get("back", "air"), join(path, "back"), "air"),
        groups=tuple(groups),
    )


def decode_conditions(inspector: Inspector, value: object, plies: Plies) -> tuple[ConditionRecord, ...]:
    """Return the conditions of a job."""
    items = inspector.sequence(value, "conditions", limits.MOST_CONDITIONS)
    return tuple(_condition(inspector, item, join("conditions", place), plies) for place, item in enumerate(items))


def _group(
    inspector: Inspector, value: dict[str, object], path: str, plies: Plies
) -> tuple[list[ElementRecord], int]:
    inspector.mapping(value, path, GROUP_KEYS, _GROUP_REQUIRED)
    allowed = f"a whole number from 1 to {limits.MOST_REPEATS}"
    repeat = inspector.whole(value["repeat"], join(path, "repeat"), 1, allowed)
    place = join(path, "elements")
    items = inspector.sequence(value["elements"], place, limits.MOST_ELEMENTS) if "elements" in value else []
    if "elements" in value and isinstance(value["elements"], list) and not items:
        inspector.fault(place, "there is nothing in this group", "at least one element")
    elements = []
    for number, item in enumerate(items):
        where = join(place, number)
        if isinstance(item, dict) and "repeat" in item and "layer" not in item and "sheet" not in item:
            inspector.fault(where, "a group stands in a group", f"layers and sheets: {_ELEMENT}")
            continue
        elements.append(_element(inspector, item, where, plies))
    return elements, repeat


def _condition(inspector: Inspector, value: object, path: str, plies: Plies) -> ConditionRecord:
    given = inspector.mapping(value, path, CONDITION_KEYS, _CONDITION_REQUIRED)
    if given is None:
        return ConditionRecord(path)
    sides: dict[str, tuple[ElementRecord, ...]] = {}
    for side in ("front", "back"):
        place = join(path, side)
        items = inspector.sequence(given.get(side, []), place, limits.MOST_ELEMENTS)
        sides[side] = tuple(_element(inspector, item, join(place, row), plies) for row, item in enumerate(items))
    states = inspector.sequence(given.get("states", []), join(path, "states"), limits.MOST_STATES)
    return ConditionRecord(
        name=inspector.text(given["name"], join(path, "name"), path) if "name" in given else path,
        front=sides["front"],
        back=sides["back"],
        materials=_exchanged(inspector, given.get("materials", {}), join(path, "materials")),
        states=tuple(
            inspector.text(state, join(join(path, "states"), place)) for place, state in enumerate(states)
        ),
        thickness_factors=_factors(inspector, given.get("thickness_factors", {}), join(path, "thickness_factors")),
        note=inspector.text(given.get("note", ""), join(path, "note")),
    )


def _exchanged(inspector: Inspector, value: object, path: str) -> tuple[tuple[str, str], ...]:
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an object", 'for example {"skin": "wet skin"}')
        return ()
    inspector.repeated(value, path)
    return tuple((name, inspector.text(other, join(path, name), "air")) for name, other in value.items())


def _factors(inspector: Inspector, value: object, path: str) -> tuple[tuple[str, float], ...]:
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an object", 'for example {"paint": 2}')
        return ()
    inspector.repeated(value, path)
    found = []
    for name, given in value.items():
        factor = number_of(given)
        if factor is None:
            inspector.fault(join(path, name), f"{shown(given)} is not a number", FACTOR)
        else:
            found.append((name, factor))
    return tuple(found)


def _element(inspector: Inspector, value: object, path: str, plies: Plies) -> ElementRecord:
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an element", _ELEMENT)
        return _STAND_IN
    if ("layer" in value) == ("sheet" in value):
        given = "both a layer and a sheet" if "layer" in value else "neither a layer nor a sheet"
        inspector.fault(path, f"this is {given}", _ELEMENT)
        return _STAND_IN
    return _layer(inspector, value, path, plies) if "layer" in value else _sheet(inspector, value, path)


def _layer(inspector: Inspector, value: dict[str, object], path: str, plies: Plies) -> LayerRecord:
    inspector.mapping(value, path, ("layer", "thickness", *SWITCHES), {"thickness": '"thickness": "1 mm"'})
    material = inspector.text(value["layer"], join(path, "layer"), "air")
    thickness = _MILLIMETRE
    if "thickness" in value:
        thickness = _thickness(inspector, value["thickness"], join(path, "thickness"), plies.get(material))
    enabled, locked = _switches(inspector, value, path)
    return LayerRecord(material, thickness, enabled, locked)


def _thickness(inspector: Inspector, given: object, path: str, ply: float | None) -> Measure:
    if not (isinstance(given, str) and counts_plies(given)):
        return inspector.measure(given, path, Dimension.LENGTH, _MILLIMETRE)
    try:
        return read_plies(given, ply)
    except UnitError as error:
        inspector.fault(path, error.message, error.allowed)
        return _MILLIMETRE


def _sheet(inspector: Inspector, value: dict[str, object], path: str) -> SheetRecord:
    kind = inspector.choice(value["sheet"], join(path, "sheet"), PARTS_OF_KIND, "series")
    known = PARTS_OF_KIND[kind]
    required = {"conductivity": '"conductivity": "0.5 MS/m"', "thickness": '"thickness": "200 nm"'}
    if join(path, "sheet") in inspector.faulted:  # of which kind it is, and so what belongs to it, is not known
        known = {name: part for parts in PARTS_OF_KIND.values() for name, part in parts.items()}
    inspector.mapping(value, path, ("sheet", *known, *SWITCHES), required if kind == "film" else None)
    parts: dict[str, Measure] = {}
    for name, part in PARTS_OF_KIND[kind].items():
        stand_in = measure(1.0, part.dimension)
        if name in value:
            parts[name] = inspector.measure(value[name], join(path, name), part.dimension, stand_in)
        elif kind == "film":
            parts[name] = stand_in
    enabled, locked = _switches(inspector, value, path)
    return SheetRecord(kind, **parts, enabled=enabled, locked=locked)


def _switches(inspector: Inspector, value: Mapping[str, object], path: str) -> Sequence[bool]:
    found = []
    for name, usual in SWITCHES.items():
        given = value.get(name, usual)
        if not isinstance(given, bool):
            hint = near(str(given).lower(), ("true", "false"))
            inspector.fault(join(path, name), f"{shown(given)} is neither{hint}", one_of(("true", "false")))
            given = usual
        found.append(given)
    return found
