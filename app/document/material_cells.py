"""What a material holds as texts: its names and words, and every constant of its model."""

import re
from collections.abc import Mapping
from dataclasses import replace
from typing import Final

from app.document.fact_cells import FACTS, fact_text, with_fact
from app.document.library import pinned
from app.document.material_edits import material_of
from app.document.reading import read_like, read_list, read_range, read_relative
from stackcore.errors import UnitError, nearest
from stackcore.job.records import JobRecord, MaterialRecord
from stackcore.media.models import (
    MODELS,
    Choice,
    Constant,
    Constants,
    Flag,
    Model,
    Quantity,
    Reference,
    Relative,
    Terms,
    Value,
    value_text,
)
from stackcore.units import Dimension, Measure, parse_measure

WORDS: Final = ("name", "label", "source", "certainty", "note", "range")
"""Columns of every material that are no constants."""

USUAL: Final = ("permittivity", "permeability", "loss_tangent", "conductivity")
"""Constants that have a place in a table of materials, whether the model has them or not."""

_IN_A_LIST: Final = re.compile(r"(?P<list>[a-z_]+)\[(?P<row>\d+)\]\.(?P<part>[a-z_]+)")
_FLAGS: Final = {"yes": True, "true": True, "1": True, "no": False, "false": False, "0": False}


def model_table() -> Mapping[str, Model]:
    """Return every model by its name, in the order of menus."""
    return MODELS


def model_of(material: MaterialRecord) -> Model:
    """Return the model of a material, also where only the library says which."""
    return MODELS[pinned(material).model]


def material_columns(material: MaterialRecord) -> tuple[str, ...]:
    """Return the places of a material that hold a text: words, constants, and those in its lists.

    Examples
    --------
    >>> oil = MaterialRecord("oil", model="multi-debye", constants=MODELS["multi-debye"].start())
    >>> material_columns(oil)[-3:]
    ('terms[0].permittivity_step', 'terms[0].relaxation_time', 'conductivity')
    """
    shown = pinned(material)
    columns: list[str] = [*WORDS, *FACTS, *USUAL]
    for constant in MODELS[shown.model].constants:
        if not isinstance(constant.kind, Terms):
            columns.append(constant.name)
            continue
        value = shown.constants.get(constant.name)
        rows = len(value) if isinstance(value, tuple) else 0
        columns += [f"{constant.name}[{row}].{part.name}" for row in range(rows) for part in constant.kind.of]
    words = len(WORDS) + len(FACTS)
    return (*dict.fromkeys(columns[:words]), *_last_wins(columns[words:]))


def _last_wins(names: list[str]) -> tuple[str, ...]:
    """Return each name once, where it stands last: constants of the model in the model's order."""
    return tuple(reversed(dict.fromkeys(reversed(names))))


def material_text(material: MaterialRecord, column: str) -> str:
    """Return the text of one column of a material; empty for a constant that is not given.

    A material that is only a reference into the library shows the values of its entry.
    """
    material = pinned(material)
    if column == "range":
        ends = material.valid_range
        return "" if ends is None else f"{ends[0].text} to {ends[1].text}"
    if column in WORDS:
        return str(getattr(material, column))
    if column in FACTS:
        return fact_text(material, column)
    return constant_text(material, column)


def constant_text(material: MaterialRecord, name: str) -> str:
    """Return a constant as it is typed, ``terms[0].relaxation_time`` for one in a list; empty when not given."""
    value = _value(pinned(material).given, name)
    return "" if value is None else value_text(value)


def with_material_text(record: JobRecord, name: str, column: str, text: str) -> JobRecord:
    """Return `record` with one column of the material `name` set; an empty text takes a constant away.

    A constant typed over one of the library cuts the tie: the reference goes, and the source says what it
    was. A name is not changed here, because whatever uses it must follow (`material_edits.rename_material`).
    """
    old = material_of(record, name)
    match column:
        case "label":
            new = replace(old, label=text.strip())
        case "source":
            new = replace(old, source=text.strip())
        case "certainty":
            new = replace(old, certainty=text.strip())
        case "note":
            new = replace(old, note=text.strip())
        case "range":
            new = replace(old, valid_range=_range(text))
        case _ if column in FACTS:
            new = with_fact(pinned(old), model_of(old), column, text, _read_constant)
        case _:
            new = with_constant_text(old, column, text)
    return replace(record, materials=tuple(new if one is old else one for one in record.materials))


def with_constant_text(material: MaterialRecord, name: str, text: str) -> MaterialRecord:
    """Return `material` with the constant of a text; an empty one takes it away.

    Raises
    ------
    UnitError
        When the text is no value of the kind, or stands for a whole list.
    """
    text, shown = text.strip(), pinned(material)
    constant = _constant(model_of(material), name)
    old = _value(shown.given, name)
    value = None if not text else parsed(constant, text, old)
    return with_constant(material, name, value)


def with_constant(material: MaterialRecord, name: str, value: Value | None) -> MaterialRecord:
    """Return `material` with a constant set, or taken away by None; a tie to the library is cut by any change."""
    old = pinned(material)
    place = _IN_A_LIST.fullmatch(name)
    constants = old.given
    if place is None:
        constants = constants.with_value(name, value)
    else:
        rows = constants.get(place["list"])
        assert isinstance(rows, tuple)
        row = int(place["row"])
        changed = rows[row].with_value(place["part"], value)
        constants = constants.with_value(place["list"], (*rows[:row], changed, *rows[row + 1 :]))
    return material if constants == old.given else untied(replace(old, constants=constants))


def with_model(material: MaterialRecord, name: str) -> MaterialRecord:
    """Return `material` by another model: constants that both have stay, the others begin anew."""
    old, model = pinned(material), MODELS[name]
    kinds = {constant.name: constant.kind for constant in MODELS[old.model].constants}
    kept = {
        constant.name: old.constants[constant.name]
        for constant in model.constants
        if constant.name in old.constants and kinds.get(constant.name) == constant.kind
    }
    ends = old.valid_range if model.ranged else None
    constants = Constants({**model.start(), **kept})
    return untied(replace(old, model=name, constants=constants, valid_range=ends, spread=()))


def untied(material: MaterialRecord) -> MaterialRecord:
    """Return `material` without its reference into the library, whose words hold for its own values only."""
    if not material.library:
        return material
    source = f"changed from {material.library}"
    return replace(material, library="", source=source, valid_range=None, certainty="", spread=(), note="")


def parsed(constant: Constant, text: str, old: Value | None) -> Value:
    """Return the value of a text typed over `old`; UnitError when it is none of the kind."""
    match constant.kind:
        case Relative():
            return read_relative(text)
        case Quantity(limits):
            return read_like(old if isinstance(old, Measure) else None, text, limits.dimension)
        case Flag():
            if text.casefold() not in _FLAGS:
                raise UnitError(f"{text!r} is neither yes nor no", "yes or no")
            return _FLAGS[text.casefold()]
        case Choice() | Reference():
            return text
        case Terms(row=row):
            raise UnitError(f"{text!r} is no list of {row}s", f"each {row} is typed by itself")
    return parse_measure(text, Dimension.NUMBER).value


def _read_constant(model: Model, name: str, text: str) -> Value:
    return parsed(_constant(model, name), text, None)


def _constant(model: Model, name: str) -> Constant:
    place = _IN_A_LIST.fullmatch(name)
    found = model.constant(place["list"] if place else name)
    if found is not None and place is not None and isinstance(found.kind, Terms):
        found = next((part for part in found.kind.of if part.name == place["part"]), None)
    if found is None:
        told = f"the model {model.name!r} has no {name}{nearest(name, model.names)}"
        raise UnitError(told, f"for this model one of {', '.join(model.names)}")
    return found


def _value(constants: Constants, name: str) -> Value | None:
    place = _IN_A_LIST.fullmatch(name)
    if place is None:
        return constants.get(name)
    rows, row = constants.get(place["list"]), int(place["row"])
    return rows[row].get(place["part"]) if isinstance(rows, tuple) and row < len(rows) else None


def _range(text: str) -> tuple[Measure, Measure] | None:
    if not text.strip():
        return None
    allowed = "the lower and the upper end: 8 GHz to 12.4 GHz"
    if " to " in text or "…" in text or ".." in text:
        both = read_range(f"{text.strip()}, 2 points", Dimension.FREQUENCY)
        if both is not None:
            return both[0], both[1]
    ends = read_list(text, Dimension.FREQUENCY)
    if len(ends) != 2:
        raise UnitError(f"{text!r} is not a range of frequencies", allowed)
    return ends[0], ends[1]
