"""A job under one of its conditions: what it would be written as if it always rained."""

from collections.abc import Collection, Iterator, Mapping
from dataclasses import replace

from stackcore.errors import Fault
from stackcore.job import limits
from stackcore.job.inspector import join, near, one_of, shown
from stackcore.job.records import (
    ConditionRecord,
    ElementRecord,
    JobRecord,
    LayerRecord,
    StackRecord,
)
from stackcore.job.states import in_state, states_of
from stackcore.units import Dimension, measure


def record_under(record: JobRecord, condition: ConditionRecord) -> JobRecord:
    """Return the job as it would be written under a condition: additions, exchanges, states and factors in place.

    The stacks keep their names and order. Rows of an addition come before and behind those of the stack; they are
    not exchanged, and no factor counts for them.
    """
    materials = []
    for material in record.materials:
        known = {state.name for state in states_of(material)}
        wanted = next((name for name in condition.states if name in known), None)
        materials.append(material if wanted is None else in_state(material, wanted))
    exchange, factors = dict(condition.materials), dict(condition.thickness_factors)
    stacks = tuple(_stack_under(stack, condition, exchange, factors) for stack in record.stacks)
    return replace(record, materials=tuple(materials), stacks=stacks, conditions=())


def rows_shifted(rows: tuple[int, ...], condition: ConditionRecord, count: int) -> tuple[int, ...]:
    """Return rows of a stack under a condition as rows of the stack itself; −1 for what the condition added."""
    front = len(condition.front)
    return tuple(row - front if front <= row < front + count else -1 for row in rows)


def condition_faults(record: JobRecord, known: Collection[str]) -> Iterator[Fault]:
    """Yield what is wrong with the conditions but for their elements; `known` are the names of materials."""
    names = [condition.name for condition in record.conditions]
    states = {state.name for material in record.materials for state in states_of(material)}
    for place, condition in enumerate(record.conditions):
        path = join("conditions", place)
        if not condition.name.strip():
            yield Fault(join(path, "name"), "the name of the condition is empty", "a name, for example Wet")
        if condition.name in names[:place]:
            where = f"conditions[{names.index(condition.name)}]"
            told = f"the name {shown(condition.name)} is taken by {where}"
            yield Fault(join(path, "name"), told, "a name of its own")
        for name, other in condition.materials:
            where = join(join(path, "materials"), name)
            for given in (name, other):
                if given not in known:
                    yield Fault(where, f"unknown material {shown(given)}{near(given, known)}", one_of(known))
        for number, state in enumerate(condition.states):
            if state not in states:
                where = join(join(path, "states"), number)
                told = f"no material has a state {shown(state)}{near(state, states)}"
                yield Fault(where, told, one_of(sorted(states)) if states else "states given with a material")
        for name, factor in condition.thickness_factors:
            where = join(join(path, "thickness_factors"), name)
            if name not in known:
                yield Fault(where, f"unknown material {shown(name)}{near(name, known)}", one_of(known))
            elif not 0 <= factor <= limits.THICKEST_FACTOR:
                told = f"{factor:g} is out of range"
                yield Fault(where, told, f"a number from 0 to {limits.THICKEST_FACTOR:g}")


def _stack_under(
    stack: StackRecord, condition: ConditionRecord, exchange: Mapping[str, str], factors: Mapping[str, float]
) -> StackRecord:
    front = len(condition.front)
    own = tuple(_element_under(element, exchange, factors) for element in stack.elements)
    groups = tuple(replace(group, first=group.first + front, last=group.last + front) for group in stack.groups)
    return replace(stack, elements=(*condition.front, *own, *condition.back), groups=groups)


def _element_under(
    element: ElementRecord, exchange: Mapping[str, str], factors: Mapping[str, float]
) -> ElementRecord:
    if not isinstance(element, LayerRecord):
        return element
    thickness = element.thickness
    if element.material in factors:
        thickness = measure(thickness.value * factors[element.material], Dimension.LENGTH)
    return replace(element, material=exchange.get(element.material, element.material), thickness=thickness)
