"""Job records without faults, drawn by Hypothesis."""

from __future__ import annotations

from collections.abc import Sequence
from typing import Final

from hypothesis import strategies as st

from stackcore.job.limits import SHEET_PARTS
from stackcore.job.records import (
    AngleGrid,
    ElementRecord,
    FrequencyGrid,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    SheetRecord,
    Spacing,
    StackRecord,
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
    return MaterialRecord(name, label, model.name, "", constants, source, ends, certainty, spread, note)


@st.composite
def elements(draw: st.DrawFn, known: list[str]) -> ElementRecord:
    """Return a layer of one of the materials `known`, or a sheet."""
    if draw(st.booleans()):
        return LayerRecord(draw(st.sampled_from(known)), draw(measures(Dimension.LENGTH, 0, 1)))
    ranges = {"resistance": (1e-3, 1e6), "inductance": (1e-15, 1e-3), "capacitance": (1e-18, 1e-3)}
    present = draw(st.sets(st.sampled_from(tuple(SHEET_PARTS)), min_size=1))
    parts = {part: draw(measures(SHEET_PARTS[part].dimension, *ranges[part])) for part in sorted(present)}
    return SheetRecord("series", **parts)


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
    stacks = [
        StackRecord(
            name,
            tuple(draw(st.lists(elements(known), max_size=4))),
            draw(st.sampled_from(("air", "vacuum"))),
            draw(st.sampled_from((*known, "metal"))),
        )
        for name in stack_names
    ]
    # Each may be made of those before it; a chain of any length would be refused as too deep.
    made = tuple(draw(materials(key, keys[:place])) for place, key in enumerate(keys))
    return JobRecord(draw(texts), tuple(stacks), draw(sweeps()), made, draw(texts))
