"""What is known of a material beside its constants, as texts: density, price, plies, spread and named states.

A spread is written ``permittivity 3 %; loss_tangent 20 %``, a list of states
``wet: permittivity 4.6, loss_tangent 0.03; hot: conductivity 45 MS/m``. Both are read back from what is written.
"""

import re
from collections.abc import Callable
from dataclasses import replace
from typing import Final

from app.document.reading import read_like
from stackcore.errors import UnitError, nearest
from stackcore.job.records import MaterialRecord, StateRecord
from stackcore.media.models import Constants, Model, Value, value_text
from stackcore.units import Dimension, Measure, parse_measure

FACTS: Final = ("density", "ply_thickness", "price", "spread", "states")
"""Columns of every material that are facts."""

_DIMENSIONS: Final = {"density": Dimension.MASS_DENSITY, "ply_thickness": Dimension.LENGTH}
_PART: Final = re.compile(r"\s*(?P<name>[a-z_]+(?:\[\d+\]\.[a-z_]+)?)\s*[=:]?\s*(?P<value>.+?)\s*", re.DOTALL)
_COMMA: Final = re.compile(r",\s*(?=[a-z_]{2,}[\s=:])")

ReadConstant = Callable[[Model, str, str], Value]
"""Takes the model, the name of a constant and a text, and returns its value; raises UnitError."""


def fact_text(material: MaterialRecord, column: str) -> str:
    """Return the text of a fact, empty where there is none.

    Examples
    --------
    >>> fact_text(MaterialRecord("skin", spread=(("permittivity", 0.03),)), "spread")
    'permittivity 3 %'
    """
    if column == "spread":
        return "; ".join(f"{name} {_number(100 * share)} %" for name, share in material.spread)
    if column == "states":
        return "; ".join(_state_text(state) for state in material.states)
    value = getattr(material, column)
    if isinstance(value, Measure):
        return value.text
    return "" if value is None else _number(value)


def with_fact(material: MaterialRecord, model: Model, column: str, text: str, read: ReadConstant) -> MaterialRecord:
    """Return `material` with a fact of a text; an empty one takes it away.

    Raises
    ------
    UnitError
        When the text is no value of the kind, or names a constant that the model does not have.
    """
    text = text.strip()
    if column == "spread":
        return replace(material, spread=_spread(model, text))
    if column == "states":
        return replace(material, states=_states(material, model, text, read))
    if column == "price":
        return replace(material, price=parse_measure(text, Dimension.NUMBER).value if text else None)
    old = getattr(material, column)
    value = read_like(old, text, _DIMENSIONS[column]) if text else None
    if column == "density":
        return replace(material, density=value)
    return replace(material, ply_thickness=value)


def _number(value: float) -> str:
    return f"{float(f'{value:.12g}'):g}" if abs(value) < 1e6 else repr(value)


def _spread(model: Model, text: str) -> tuple[tuple[str, float], ...]:
    found = []
    for part in filter(None, (one.strip() for one in text.split(";"))):
        match = _PART.fullmatch(part)
        if match is None:
            raise UnitError(f"{part!r} is not a spread", "a constant and its share, for example permittivity 3 %")
        name = match["name"]
        if re.split(r"[.\[]", name)[0] not in model.names:
            hint = nearest(name, model.names)
            raise UnitError(f"this material has no constant {name!r}{hint}", f"one of {', '.join(model.names)}")
        found.append((name, parse_measure(match["value"], Dimension.NUMBER).value))
    return tuple(found)


def _states(material: MaterialRecord, model: Model, text: str, read: ReadConstant) -> tuple[StateRecord, ...]:
    found = []
    for part in filter(None, (one.strip() for one in text.split(";"))):
        name, colon, rest = part.partition(":")
        if not colon or not name.strip():
            allowed = "a name, a colon and what differs: wet: permittivity 4.6, loss_tangent 0.03"
            raise UnitError(f"{part!r} is not a state", allowed)
        old = material.state(name.strip())
        constants = Constants(_constants(model, rest, read))
        found.append(StateRecord(name.strip(), constants, old.source if old else "", old.note if old else ""))
    return tuple(found)


def _constants(model: Model, text: str, read: ReadConstant) -> dict[str, Value]:
    values: dict[str, Value] = {}
    for part in filter(None, (one.strip() for one in _COMMA.split(text))):
        match = _PART.fullmatch(part)
        if match is None:
            raise UnitError(f"{part!r} is not a constant", "a constant and its value: loss_tangent 0.03")
        values[match["name"]] = read(model, match["name"], match["value"])
    return values


def _state_text(state: StateRecord) -> str:
    return f"{state.name}: {', '.join(f'{name} {value_text(value)}' for name, value in state.given.items())}"
