"""Record -> the text of a job file: keys in one order, an element a line, texts as typed."""

import json
from typing import Final

from stackcore.errors import UnitError
from stackcore.job.decode import FORMAT
from stackcore.job.limits import SHEET_PARTS
from stackcore.job.migrations import VERSION
from stackcore.job.records import (
    AngleGrid,
    ElementRecord,
    FrequencyGrid,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    StackRecord,
    SweepRecord,
)
from stackcore.units import Dimension, Measure, format_value, parse_measure

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
    if material.permittivity is not None:
        members["permittivity"] = _relative(material.permittivity)
    if material.loss_tangent is not None:
        members["loss_tangent"] = _number(material.loss_tangent)
    if material.permeability is not None:
        members["permeability"] = _relative(material.permeability)
    if material.conductivity is not None:
        members["conductivity"] = _measure(material.conductivity, Dimension.CONDUCTIVITY)
    if material.source:
        members["source"] = material.source
    return f"{_json(material.name)}: {_json(members)}"


def _relative(value: complex) -> object:
    value = complex(value)
    return _number(value.real) if value.imag == 0 else [_number(value.real), _number(-value.imag)]


def _number(value: float) -> int | float:
    """Return whole numbers without the ``.0`` that nobody types."""
    value = float(value)
    return int(value) if value.is_integer() and abs(value) < 1e15 else value


def _measure(measure: Measure, dimension: Dimension) -> str | int | float:
    """Return the text as typed, or the number that was given instead of a text.

    A text that does not give the value again, which only a record built by hand can hold, is replaced.
    """
    try:
        number = json.loads(measure.text)
    except ValueError:
        number = None
    if type(number) in (int, float) and repr(number) == measure.text and float(number) == measure.value:
        return float(number) if type(number) is float else int(number)
    try:
        if parse_measure(measure.text, dimension).value == measure.value:
            return measure.text
    except UnitError:
        pass
    return format_value(measure.value, dimension)


def _stack(stack: StackRecord) -> str:
    members = [
        f'      "name": {_json(stack.name)}',
        f'      "front": {_json(stack.front)}',
        f'      "back": {_json(stack.back)}',
        f'      "elements": {_block("[]", [_json(_element(element)) for element in stack.elements], 8)}',
    ]
    return "{\n" + ",\n".join(members) + "\n    }"


def _element(element: ElementRecord) -> dict[str, object]:
    if isinstance(element, LayerRecord):
        return {"layer": element.material, "thickness": _measure(element.thickness, Dimension.LENGTH)}
    members: dict[str, object] = {"sheet": element.kind}
    for name, limits in SHEET_PARTS.items():
        if (part := getattr(element, name)) is not None:
            members[name] = _measure(part, limits.dimension)
    return members


def _sweep(sweep: SweepRecord) -> str:
    frequency = _axis(sweep.frequency, Dimension.FREQUENCY, "frequency")
    angle = _axis(sweep.angle, Dimension.ANGLE, "angle")
    return f"{{\n    {frequency},\n    {angle}\n  }}"


def _axis(axis: FrequencyGrid | AngleGrid | tuple[Measure, ...], dimension: Dimension, name: str) -> str:
    if isinstance(axis, tuple):
        return f'"{name}": {_wrapped([_json(_measure(measure, dimension)) for measure in axis])}'
    members: dict[str, object] = {
        "start": _measure(axis.start, dimension),
        "stop": _measure(axis.stop, dimension),
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
