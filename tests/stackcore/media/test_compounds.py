"""What water, tables, mixtures and joined media must all hold: slopes, shapes, passivity, speed, equality."""

import dataclasses
import pickle
from time import perf_counter
from typing import Any

import numpy as np
import pytest

from stackcore.arrays import ComplexArray
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive
from tests.stackcore.media.compounds import COMPOUNDS, RADIO, TABLES
from tests.stackcore.media.dispersion import assert_same_slope, constant_of, difference, with_constant

QUANTITIES = ("permittivity", "permeability")

ALLOWED = 3e-3
"""s, for 10 001 frequencies."""


def allowed_time(name: str) -> float:
    """Return the time for a compound in s: more where ε and μ are mixed, for more parts, or two mixtures.

    Bruggeman's equation of three components has no closed form and is solved by steps.
    """
    if name == "bruggeman of three":
        return 4 * ALLOWED
    return ALLOWED * (2 if name.startswith("magnetic") or "of a mixture" in name else 1.5 if "three" in name else 1)


def _values(medium: AbstractMedium, quantity: str, factor: float) -> ComplexArray:
    found: ComplexArray = getattr(medium.evaluate(RADIO * factor), quantity)
    return found


@pytest.mark.parametrize("name", [name for name in COMPOUNDS if name not in TABLES])
@pytest.mark.parametrize("quantity", QUANTITIES)
def test_slope_with_frequency(name: str, quantity: str) -> None:
    """The slope per Hz is the derivative of the values."""
    values = COMPOUNDS[name].evaluate(RADIO)
    slope = getattr(values, f"{quantity}_slope") * RADIO
    expected = difference(lambda factor: _values(COMPOUNDS[name], quantity, factor))
    assert_same_slope(slope, expected, getattr(values, quantity), name)


@pytest.mark.parametrize("name", COMPOUNDS)
@pytest.mark.parametrize("quantity", QUANTITIES)
def test_slopes_with_constants(name: str, quantity: str) -> None:
    """The slope with respect to each constant is the derivative of the values, all others held."""
    medium = COMPOUNDS[name]
    slopes = medium.constant_slopes(RADIO)
    assert slopes
    for constant, slope in slopes.items():
        value = constant_of(medium, constant)
        if value == 0:
            continue  # a difference would need gain

        def at(factor: float, constant: str = constant, value: float = value) -> ComplexArray:
            return _values(with_constant(medium, constant, value * factor), quantity, 1.0)

        # Solved by steps, a mixture of three has some last digits of rounding.
        size = _values(medium, quantity, 1.0) * (10 if name == "bruggeman of three" else 1)
        assert_same_slope(getattr(slope, quantity) * value, difference(at), size, f"{name}: {constant}")


@pytest.mark.parametrize("name", COMPOUNDS)
@pytest.mark.parametrize("shape", [(), (0,), (3,), (2, 4)])
def test_arrays_have_the_shape_of_the_frequencies(name: str, shape: tuple[int, ...]) -> None:
    """Values and slopes are complex arrays of the shape of the frequencies, whatever it is."""
    medium, frequency = COMPOUNDS[name], np.full(shape, 1.2e9)
    parts: list[Constitutive | ConstantSlope] = [medium.evaluate(frequency)]
    parts += medium.constant_slopes(frequency).values()
    for part in parts:
        for array in (getattr(part, field.name) for field in dataclasses.fields(part)):
            assert isinstance(array, np.ndarray)
            assert (array.shape, array.dtype) == (shape, np.complex128)


@pytest.mark.parametrize("name", COMPOUNDS)
def test_passive_and_finite_from_a_hertz_to_a_petahertz(name: str) -> None:
    """No compound has gain, is infinite or exactly 0 anywhere, inside its range or not."""
    values = COMPOUNDS[name].evaluate(np.geomspace(1.0, 1e15, 500))
    for column in (values.permittivity, values.permeability):
        assert np.isfinite(column).all()
        assert (column.imag <= 0).all()
        assert (column != 0).all()
    assert np.isfinite(values.permittivity_slope).all()
    assert np.isfinite(values.permeability_slope).all()


@pytest.mark.parametrize("name", COMPOUNDS)
def test_a_compound_is_a_value(name: str) -> None:
    """A compound equals its copy, is a key of a mapping, and comes back from a pickle with the same answers."""
    medium: Any = COMPOUNDS[name]
    copy = pickle.loads(pickle.dumps(medium))
    assert copy == medium == dataclasses.replace(medium)
    assert {medium: 1}[copy] == 1
    assert np.array_equal(copy.evaluate(RADIO).permittivity, medium.evaluate(RADIO).permittivity)


@pytest.mark.parametrize("name", COMPOUNDS)
def test_speed(name: str) -> None:
    """A compound answers at 10 001 frequencies in less than 3 ms; the best of some tries counts."""
    medium, frequency = COMPOUNDS[name], np.geomspace(1e7, 5e11, 10_001)
    allowed, best = allowed_time(name), np.inf
    for _ in range(60):
        start = perf_counter()
        medium.evaluate(frequency)
        best = min(best, perf_counter() - start)
        if best < allowed:
            return
    assert best < allowed, f"{1e3 * best:.2f} ms"
