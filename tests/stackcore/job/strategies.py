"""Job records without faults, drawn by Hypothesis."""

from __future__ import annotations

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
from stackcore.units import Dimension, Measure, format_value, parse_measure

SPACINGS: Final[tuple[Spacing, ...]] = ("linear", "log")
_RESERVED: Final = ("air", "vacuum", "metal")

texts: Final = st.text(st.characters(codec="utf-8"), max_size=20)
names: Final = texts.filter(lambda name: bool(name.strip()) and name not in _RESERVED)


def measures(dimension: Dimension, lowest: float, highest: float) -> st.SearchStrategy[Measure]:
    """Return quantities as a person types them, in various units, or as bare numbers."""
    values = st.floats(lowest, highest)
    units = st.sampled_from(dimension.units)
    typed = st.builds(lambda value, unit: format_value(value, dimension, unit=unit, digits=5), values, units)
    given = st.one_of(typed, values.map(lambda value: format_value(value, dimension)), values)
    return given.map(lambda text: parse_measure(text, dimension)).filter(lambda m: lowest <= m.value <= highest)


def relative_constants() -> st.SearchStrategy[complex]:
    """Return ε or μ with loss or without."""
    return st.builds(lambda real, loss: complex(real, -loss or 0.0), st.floats(1e-3, 1e3), st.floats(0, 1e3))


@st.composite
def materials(draw: st.DrawFn, name: str) -> MaterialRecord:
    """Return a material with its constants, or a reference into the library."""
    label, source = draw(texts), draw(texts)
    permeability = draw(st.none() | relative_constants())
    match draw(st.sampled_from(("constant", "loss tangent", "conductor", "library"))):
        case "constant":
            permittivity = draw(relative_constants())
            return MaterialRecord(name, label, "constant", "", permittivity, permeability, None, None, source)
        case "loss tangent":
            real = complex(draw(st.floats(1, 100)))
            tangent = draw(st.floats(0, 10))
            return MaterialRecord(name, label, "constant", "", real, permeability, tangent, None, source)
        case "conductor":
            conductivity = draw(measures(Dimension.CONDUCTIVITY, 1e-3, 1e8))
            return MaterialRecord(name, label, "conductor", "", None, permeability, None, conductivity, source)
    library = draw(st.sampled_from(("metals/copper", "plastics/ptfe")))
    return MaterialRecord(name, label, library=library, source=source)


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
    made = tuple(draw(materials(key)) for key in keys)
    return JobRecord(draw(texts), tuple(stacks), draw(sweeps()), made, draw(texts))
