"""Record -> the text of a job file: keys in one order, an element a line, texts as typed."""

import json
from typing import Final

from stackcore.job.decode import FORMAT
from stackcore.job.decode_stacks import SWITCHES
from stackcore.job.groups import items_of
from stackcore.job.limits import PARTS_OF_KIND
from stackcore.job.materials import library_model
from stackcore.job.migrations import VERSION
from stackcore.job.plies import counts_plies
from stackcore.job.records import (
    AngleGrid,
    ConditionRecord,
    ElementRecord,
    FrequencyGrid,
    Group,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    StackRecord,
    StateRecord,
    SweepRecord,
)
from stackcore.media.models import MODELS, Model
from stackcore.media.models.values import plain_number
from stackcore.units import Dimension, Measure
from stackcore.units.written import written_measure

_WIDTH: Final = 110
"""Columns; a list of values that is longer is broken."""


def encode_job(record: JobRecord) -> str:
    """Return the text of a job file of the current version, ending with a line break."""
    members = [
        f'  "format": {_json(FORMAT)}',
        f'  "version": {VERSION}',
        f'  "title": {_json(record.title)}',
        f'  "notes": {_json(record.notes)}',
        f'  "materials": {_block("{}", [_material(material) for material in record.materials], 4)}',
        f'  "stacks": {_block("[]", [_stack(stack) for stack in record.stacks], 4)}',
        *_conditions(record.conditions),
        f'  "sweep": {_sweep(record.sweep)}',
    ]
    return "{\n" + ",\n".join(members) + "\n}\n"


def _json(value: object) -> str:
    return json.dumps(value, ensure_ascii=False, allow_nan=False)


def _block(brackets: str, lines: list[str], indent: int) -> str:
    """Return `lines` between brackets, each on a line of its own."""
    if not lines:
        return brackets
    inner = ",\n".join(" " * indent + line for line in lines)
    return f"{brackets[0]}\n{inner}\n{' ' * (indent - 2)}{brackets[1]}"


def _material(material: MaterialRecord) -> str:
    members: dict[str, object] = {}
    for key in ("label", "library", "model"):
        if value := getattr(material, key):
            members[key] = value
    if model := MODELS.get(material.model or library_model(material.library)):
        members |= model.written(material.constants)
    if material.valid_range is not None:
        members["range"] = [written_measure(end, Dimension.FREQUENCY) for end in material.valid_range]
    if material.spread:
        members["spread"] = {name: plain_number(share) for name, share in material.spread}
    for key in ("certainty", "source", "note"):
        if value := getattr(material, key):
            members[key] = value
    members |= fact_members(material)
    return f"{_json(material.name)}: {_members(members)}"


def _members(members: dict[str, object]) -> str:
    """Return an object on one line; a list of rows that is long has a line for each of them."""
    parts = [f"{_json(key)}: {_rows(value)}" for key, value in members.items()]
    return f"{{{', '.join(parts)}}}"


def _rows(value: object) -> str:
    flat = _json(value)
    if not (isinstance(value, list) and len(flat) > _WIDTH and all(isinstance(row, dict) for row in value)):
        return flat
    return "[\n      " + ",\n      ".join(_json(row) for row in value) + "\n    ]"


def fact_members(material: MaterialRecord) -> dict[str, object]:
    """Return density, price, ply thickness and states of a material as they are written."""
    members: dict[str, object] = {}
    if material.density is not None:
        members["density"] = written_measure(material.density, Dimension.MASS_DENSITY)
    if material.price is not None:
        members["price"] = plain_number(material.price)
    if material.ply_thickness is not None:
        members["ply_thickness"] = written_measure(material.ply_thickness, Dimension.LENGTH)
    if material.states:
        model = MODELS.get(material.model or library_model(material.library))
        members["states"] = {state.name: _state(state, model) for state in material.states}
    return members


def _state(state: StateRecord, model: Model | None) -> dict[str, object]:
    texts = {key: value for key in ("source", "note") if (value := getattr(state, key))}
    return {**(model.written(state.constants) if model is not None else {}), **texts}


def _stack(stack: StackRecord) -> str:
    members = [
        f'      "name": {_json(stack.name)}',
        f'      "front": {_json(stack.front)}',
        f'      "back": {_json(stack.back)}',
        f'      "elements": {_block("[]", [_item(stack, group, rows) for group, rows in items_of(stack)], 8)}',
    ]
    return "{\n" + ",\n".join(members) + "\n    }"


def _item(stack: StackRecord, group: Group | None, rows: range) -> str:
    if group is None:
        return _json(_element(stack.elements[rows.start]))
    inside = _block("[]", [_json(_element(stack.elements[row])) for row in rows], 10)
    return f'{{"repeat": {group.repeat}, "elements": {inside}}}'


def _element(element: ElementRecord) -> dict[str, object]:
    members: dict[str, object]
    if isinstance(element, LayerRecord):
        text = element.thickness.text
        thickness = text if counts_plies(text) else written_measure(element.thickness, Dimension.LENGTH)
        members = {"layer": element.material, "thickness": thickness}
    else:
        members = {"sheet": element.kind}
        for name, limits in PARTS_OF_KIND[element.kind].items():
            if (part := getattr(element, name)) is not None:
                members[name] = written_measure(part, limits.dimension)
    for name, usual in SWITCHES.items():
        if getattr(element, name) != usual:
            members[name] = not usual
    return members


def _conditions(conditions: tuple[ConditionRecord, ...]) -> list[str]:
    """Return the member ``conditions``, nothing when there are none."""
    return (
        [f'  "conditions": {_block("[]", [_json(_condition(one)) for one in conditions], 4)}'] if conditions else []
    )


def _condition(condition: ConditionRecord) -> dict[str, object]:
    members: dict[str, object] = {"name": condition.name}
    for side in ("front", "back"):
        if elements := getattr(condition, side):
            members[side] = [_element(element) for element in elements]
    if condition.materials:
        members["materials"] = dict(condition.materials)
    if condition.states:
        members["states"] = list(condition.states)
    if condition.thickness_factors:
        members["thickness_factors"] = {name: plain_number(one) for name, one in condition.thickness_factors}
    if condition.note:
        members["note"] = condition.note
    return members


def _sweep(sweep: SweepRecord) -> str:
    frequency = _axis(sweep.frequency, Dimension.FREQUENCY, "frequency")
    angle = _axis(sweep.angle, Dimension.ANGLE, "angle")
    return f"{{\n    {frequency},\n    {angle}\n  }}"


def _axis(axis: FrequencyGrid | AngleGrid | tuple[Measure, ...], dimension: Dimension, name: str) -> str:
    if isinstance(axis, tuple):
        return f'"{name}": {_wrapped([_json(written_measure(measure, dimension)) for measure in axis])}'
    members: dict[str, object] = {
        "start": written_measure(axis.start, dimension),
        "stop": written_measure(axis.stop, dimension),
        "points": axis.points,
    }
    if isinstance(axis, FrequencyGrid):
        members["spacing"] = axis.spacing
    return f'"{name}": {_json(members)}'


def _wrapped(values: list[str]) -> str:
    """Return a list on one line, or on as few lines as fit the width."""
    flat = f"[{', '.join(values)}]"
    if len(flat) <= _WIDTH - 20:
        return flat
    lines, line = [], ""
    for value in values:
        if line and len(line) + len(value) + 9 > _WIDTH:
            lines.append(line)
            line = value
        else:
            line = f"{line}, {value}" if line else value
    lines.append(line)
    return "[\n      " + ",\n      ".join(lines) + "\n    ]"
