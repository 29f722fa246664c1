"""Constants of every model, drawn by Hypothesis; what a model refers to are the names handed in."""

from collections.abc import Sequence
from typing import Final

from hypothesis import assume
from hypothesis import strategies as st

from stackcore.media.base import AbstractMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.models import (
    MODELS,
    Choice,
    Constant,
    Constants,
    Flag,
    Kind,
    Number,
    Quantity,
    Reference,
    Relative,
    Terms,
    Value,
)
from stackcore.media.models.limits import Limits
from stackcore.units import Dimension, Measure, format_value, measure, parse_measure

PART: Final = ConstantMedium(3.0 - 0.01j)
"""What a reference leads to in tests of one model alone."""

_USUAL: Final[dict[Dimension, tuple[float, float]]] = {
    Dimension.CONDUCTIVITY: (1e-3, 1e8),
    Dimension.FREQUENCY: (1e6, 1e16),
    Dimension.TIME: (1e-15, 1e-6),
    Dimension.RATE: (1e6, 1e16),
    Dimension.LENGTH: (1e-8, 1e-4),
    Dimension.TEMPERATURE: (274.0, 300.0),
    Dimension.DENSITY: (1e12, 1e28),
    Dimension.NUMBER: (-2.0, 50.0),
}


def measures(dimension: Dimension, lowest: float, highest: float) -> st.SearchStrategy[Measure]:
    """Return quantities as a person types them, in various units, or as bare numbers."""
    values = st.floats(lowest, highest)
    units = st.sampled_from(dimension.units or ("",))
    typed = st.builds(lambda value, unit: format_value(value, dimension, unit=unit, digits=6), values, units)
    given = st.one_of(typed, values.map(lambda value: format_value(value, dimension)), values)
    return given.map(lambda text: parse_measure(text, dimension)).filter(lambda m: lowest <= m.value <= highest)


def relative_constants() -> st.SearchStrategy[complex]:
    """Return ε or μ with loss or without."""
    loss = st.just(0.0) | st.floats(1e-6, 1e3)
    return st.builds(lambda real, loss: complex(real, 0.0 - loss), st.floats(1e-3, 1e3), loss)


def _span(limits: Limits) -> tuple[float, float]:
    low, high = _USUAL[limits.dimension]
    lowest = limits.lowest * 1.001 if limits.open_below else limits.lowest
    return max(lowest, low), min(limits.highest, high)


def values_of(kind: Kind, names: Sequence[str]) -> st.SearchStrategy[Value]:
    """Return values of a kind, within its limits."""
    match kind:
        case Relative():
            return relative_constants()
        case Quantity(limits):
            return measures(limits.dimension, *_span(limits))
        case Number(limits, whole):
            numbers = st.floats(*_span(limits)).filter(limits.contains)
            return st.integers(-8, 8).filter(bool).map(float) if whole else numbers
        case Choice(options):
            return st.sampled_from(options)
        case Flag():
            return st.booleans()
        case Reference():
            return st.sampled_from(tuple(names))
        case Terms():
            rows = constants_of(kind.of, names)
            return st.lists(rows, min_size=kind.least, max_size=kind.least + 2).map(tuple)
    raise TypeError(kind)


@st.composite
def constants_of(draw: st.DrawFn, of: Sequence[Constant], names: Sequence[str]) -> Constants:
    """Return constants, those that may be left out now and then."""
    found: dict[str, Value] = {}
    for constant in of:
        if constant.required or draw(st.booleans()):
            found[constant.name] = draw(values_of(constant.kind, names))
    return Constants(found)


@st.composite
def model_constants(draw: st.DrawFn, name: str, names: Sequence[str] = ("air",)) -> Constants:
    """Return constants of the model called `name` that make a medium."""
    model = MODELS[name]
    constants = _mended(name, draw(constants_of(model.constants, names)))
    media: dict[str, AbstractMedium] = dict.fromkeys(names, PART)
    try:
        model.build(constants, media=media)
    except ValueError:  # such as corners in the wrong order, or too much loss
        assume(False)
    return constants


def _mended(name: str, constants: Constants) -> Constants:
    """Make what was drawn independently fit together: loss once, rising rows, joins in order."""
    permittivity = constants.get("permittivity")
    if "loss_tangent" in constants and isinstance(permittivity, complex):
        constants = constants.with_value("permittivity", complex(permittivity.real))
    if name == "ice":
        constants = constants.with_value("temperature", parse_measure("-10 °C", Dimension.TEMPERATURE))
    rows = constants.get("rows") or constants.get("parts") or constants.get("inclusions")
    if not isinstance(rows, tuple):
        return constants
    if name == "tabulated":
        mu = all("permeability" in row for row in rows)
        steps = [measure(1e9 * (place + 1), Dimension.FREQUENCY) for place in range(len(rows))]
        rows = tuple(row.with_value("frequency", step) for row, step in zip(rows, steps, strict=True))
        return constants.with_value(
            "rows", rows if mu else tuple(row.with_value("permeability", None) for row in rows)
        )
    if name == "joined":
        steps = [measure(1e9 * (place + 1), Dimension.FREQUENCY) for place in range(len(rows) - 1)]
        parts = [row.with_value("up_to", step) for row, step in zip(rows, steps, strict=False)]
        return constants.with_value("parts", (*parts, rows[-1].with_value("up_to", None)))
    share = 1.0 / len(rows)
    fractions = [row.get("fraction") for row in rows]
    return constants.with_value(
        "inclusions",
        tuple(
            row.with_value("fraction", fraction * share if isinstance(fraction, float) else share)
            for row, fraction in zip(rows, fractions, strict=True)
        ),
    )
