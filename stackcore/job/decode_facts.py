"""JSON tree -> what is known of a material beside its constants: density, price, plies, and named states."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

from stackcore.job import limits
from stackcore.job.inspector import Inspector, join, shown
from stackcore.job.records import StateRecord
from stackcore.media.models import Model
from stackcore.media.models.kinds import number_of
from stackcore.units import Dimension, Measure, measure

FACT_KEYS: Final = ("density", "price", "ply_thickness", "states")
STATE_KEYS: Final = ("source", "note")
"""Of a state, beside the constants of the model."""

PRICE: Final = "0 or more, of a kilogram in your own currency"


@dataclass(frozen=True, slots=True)
class Facts:
    """What `decode_facts` found."""

    density: Measure | None = None
    price: float | None = None
    ply_thickness: Measure | None = None
    states: tuple[StateRecord, ...] = ()


def decode_facts(inspector: Inspector, value: Mapping[str, object], path: str, model: Model | None) -> Facts:
    """Return the facts of a material; faults go to `inspector`."""

    def quantity(key: str, dimension: Dimension) -> Measure | None:
        if key not in value:
            return None
        place = join(path, key)
        found = inspector.measure(value[key], place, dimension, measure(1.0, dimension))
        return None if place in inspector.faulted else found

    price = number_of(value["price"]) if "price" in value else None
    if "price" in value and price is None:
        inspector.fault(join(path, "price"), f"{shown(value['price'])} is not a number", PRICE)
    states = _states(inspector, value["states"], join(path, "states"), model) if "states" in value else ()
    return Facts(
        quantity("density", Dimension.MASS_DENSITY), price, quantity("ply_thickness", Dimension.LENGTH), states
    )


def _states(inspector: Inspector, value: object, path: str, model: Model | None) -> tuple[StateRecord, ...]:
    if not isinstance(value, dict):
        inspector.fault(path, f"{shown(value)} is not an object", 'for example {"wet": {"loss_tangent": 0.03}}')
        return ()
    inspector.repeated(value, path)
    if len(value) > limits.MOST_STATES:
        inspector.fault(path, f"there are {len(value)} states", f"at most {limits.MOST_STATES}")
        return ()
    return tuple(_state(inspector, name, given, join(path, name), model) for name, given in value.items())


def _state(inspector: Inspector, name: str, value: object, path: str, model: Model | None) -> StateRecord:
    inspector.text(name, path)
    names = model.names if model is not None else ()
    given = inspector.mapping(value, path, (*STATE_KEYS, *names)) if model is not None else value
    if not isinstance(given, dict):
        if model is None:
            inspector.fault(path, f"{shown(value)} is not an object", "an object {...}")
        return StateRecord(name)
    texts = {key: inspector.text(given.get(key, ""), join(path, key)) for key in STATE_KEYS}
    constants = model.read(given, path, inspector.fault) if model is not None else {}
    return StateRecord(name, constants, **texts)
