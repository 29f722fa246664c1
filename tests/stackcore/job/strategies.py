"""Job records without faults, drawn by Hypothesis."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import replace
from typing import Final

from hypothesis import strategies as st

from stackcore.job.limits import SHEET_PARTS
from stackcore.job.records import (
    AngleGrid,
    ConditionRecord,
    ElementRecord,
    FrequencyGrid,
    Group,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    SheetRecord,
    Spacing,
    StackRecord,
    StateRecord,
    SweepRecord,
)
from stackcore.media.models import MODELS
from stackcore.units import Dimension
from tests.stackcore.media.model_strategies import measures, model_constants

SPACINGS: Final[tuple[Spacing, ...]] = ("linear", "log")
_RESERVED: Final = ("air", "vacuum", "metal")

texts: Final = st.text(st.characters(codec="utf-8"), max_size=20)
names: Final = texts.filter(lambda name: bool(name.strip()) and name not in _RESERVED)


@st.composite
def materials(draw: st.DrawFn, name: str, others: Sequence[str]) -> MaterialRecord:
    """Return a material of any model, or a reference into the library; `others` are what it may be made of."""
    label, source, certainty, note = (draw(texts) for _ in range(4))
    if draw(st.integers(0, 5)) == 0:
        library = draw(st.sampled_from(("metals/copper", "plastics/ptfe")))
        return MaterialRecord(name, label, library=library, source=source)
    model = MODELS[draw(st.sampled_from(tuple(MODELS)))]
    constants = draw(model_constants(model.name, ("air", "plastics/ptfe", *others)))
    ends = None
    if model.ranged and model.name != "tabulated" and draw(st.booleans()):
        two = st.tuples(*[measures(Dimension.FREQUENCY, 1.0, 1e16)] * 2)
        low, high = sorted(draw(two), key=lambda end: end.value)
        ends = low, high
    spread = tuple(
        (one.name, draw(st.floats(0, 0.5))) for one in model.constants if one.varies and draw(st.booleans())
    )
    plain = MaterialRecord(name, label, model.name, "", constants, source, ends, certainty, spread, note)
    state_names = draw(st.lists(names, max_size=2, unique=True))
    states = tuple(StateRecord(one, constants, draw(texts), draw(texts)) for one in state_names)
    return replace(
        plain,
        states=states,
        density=draw(st.none() | measures(Dimension.MASS_DENSITY, 0.1, 3e4)),
        price=draw(st.none() | st.floats(0, 1e6)),
        ply_thickness=draw(st.none() | measures(Dimension.LENGTH, 1e-6, 1e-2)),
    )


@st.composite
def elements(draw: st.DrawFn, known: list[str]) -> ElementRecord:
    """Return a layer of one of the materials `known`, a sheet or a film; some left out, some locked."""
    enabled, locked = draw(st.integers(0, 4)) > 0, draw(st.integers(0, 4)) == 0
    if draw(st.booleans()):
        return LayerRecord(draw(st.sampled_from(known)), draw(measures(Dimension.LENGTH, 0, 1)), enabled, locked)
    if draw(st.integers(0, 2)) == 0:
        conductivity = draw(measures(Dimension.CONDUCTIVITY, 1.0, 1e8))
        thickness = draw(measures(Dimension.LENGTH, 1e-9, 1e-6))
        return SheetRecord("film", conductivity=conductivity, thickness=thickness, enabled=enabled, locked=locked)
    ranges = {"resistance": (1e-3, 1e6), "inductance": (1e-15, 1e-3), "capacitance": (1e-18, 1e-3)}
    present = draw(st.sets(st.sampled_from(tuple(SHEET_PARTS)), min_size=1))
    parts = {part: draw(measures(SHEET_PARTS[part].dimension, *ranges[part])) for part in sorted(present)}
    return SheetRecord("series", **parts, enabled=enabled, locked=locked)


@st.composite
def groups(draw: st.DrawFn, count: int) -> tuple[Group, ...]:
    """Return groups of `count` rows, side by side."""
    found: list[Group] = []
    row = 0
    while row < count:
        last = draw(st.integers(row, count - 1))
        if draw(st.booleans()):
            found.append(Group(row, last, draw(st.integers(1, 5))))
        row = last + 1
    return tuple(found)


@st.composite
def stacks(draw: st.DrawFn, name: str, known: list[str]) -> StackRecord:
    """Return a stack of layers, sheets and groups."""
    inside = tuple(draw(st.lists(elements(known), max_size=4)))
    front, back = draw(st.sampled_from(("air", "vacuum"))), draw(st.sampled_from((*known, "metal")))
    return StackRecord(name, inside, front, back, draw(groups(len(inside))))


@st.composite
def conditions(draw: st.DrawFn, name: str, known: list[str], states: list[str]) -> ConditionRecord:
    """Return a condition that adds, exchanges and multiplies."""
    exchanged = draw(st.lists(st.sampled_from(known), max_size=2, unique=True))
    thicker = draw(st.lists(st.sampled_from(known), max_size=2, unique=True))
    return ConditionRecord(
        name,
        tuple(draw(st.lists(elements(known), max_size=2))),
        tuple(draw(st.lists(elements(known), max_size=1))),
        tuple((one, draw(st.sampled_from(known))) for one in exchanged),
        tuple(draw(st.lists(st.sampled_from(states), max_size=2, unique=True)) if states else ()),
        tuple((one, draw(st.floats(0, 10))) for one in thicker),
        draw(texts),
    )


@st.composite
def sweeps(draw: st.DrawFn) -> SweepRecord:
    """Return frequencies and angles, each as a grid or as a list."""
    frequency = measures(Dimension.FREQUENCY, 1.0, 1e16)
    angle = measures(Dimension.ANGLE, 0.0, 1.57)
    start, stop = sorted((draw(frequency), draw(frequency)), key=lambda measure: measure.value)
    points = draw(st.integers(2, 1000)) if start.value < stop.value else 1
    spacing: Spacing = draw(st.sampled_from(SPACINGS))
    low, high = sorted((draw(angle), draw(angle)), key=lambda measure: measure.value)
    angles = draw(st.integers(2, 1000)) if low.value < high.value else 1
    return SweepRecord(
        draw(st.just(FrequencyGrid(start, stop, points, spacing)) | st.lists(frequency, min_size=1).map(tuple)),
        draw(st.just(AngleGrid(low, high, angles)) | st.lists(angle, min_size=1).map(tuple)),
    )


@st.composite
def records(draw: st.DrawFn) -> JobRecord:
    """Return a whole job."""
    keys = draw(st.lists(names, max_size=4, unique=True))
    known = [*keys, "air", "vacuum"]
    stack_names = draw(st.lists(names, min_size=1, max_size=3, unique=True))
    built = tuple(draw(stacks(name, known)) for name in stack_names)
    # Each may be made of those before it; a chain of any length would be refused as too deep.
    made = tuple(draw(materials(key, keys[:place])) for place, key in enumerate(keys))
    states = [state.name for material in made for state in material.states]
    condition_names = draw(st.lists(names, max_size=2, unique=True))
    weather = tuple(draw(conditions(name, known, states)) for name in condition_names)
    return JobRecord(draw(texts), built, draw(sweeps()), made, draw(texts), weather)
