"""The analytic slopes of every model against differences, with respect to frequency and to every constant."""

import dataclasses

import numpy as np
import pytest

from stackcore.arrays import ComplexArray
from stackcore.media.base import AbstractMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from tests.stackcore.media.dispersion import assert_same_slope, constant_of, difference, with_constant
from tests.stackcore.media.samples import MEDIA, frequencies_of

QUANTITIES = ("permittivity", "permeability")


@pytest.mark.parametrize("name", MEDIA)
@pytest.mark.parametrize("quantity", QUANTITIES)
def test_slope_with_frequency(name: str, quantity: str) -> None:
    """The slope per Hz is the derivative of the values."""
    medium, frequency = MEDIA[name], frequencies_of(name)
    values = medium.evaluate(frequency)

    def at(factor: float) -> ComplexArray:
        found: ComplexArray = getattr(medium.evaluate(frequency * factor), quantity)
        return found

    slope = getattr(values, f"{quantity}_slope") * frequency
    assert_same_slope(slope, difference(at), getattr(values, quantity), name)


@pytest.mark.parametrize("name", MEDIA)
@pytest.mark.parametrize("quantity", QUANTITIES)
def test_slopes_with_constants(name: str, quantity: str) -> None:
    """The slope with respect to each constant is the derivative of the values, all other constants held."""
    medium, frequency = MEDIA[name], frequencies_of(name)
    slopes = medium.constant_slopes(frequency)
    assert slopes
    for constant, slope in slopes.items():
        value = constant_of(medium, constant)
        step = value or 1.0

        def at(factor: float, constant: str = constant, value: float = value, step: float = step) -> ComplexArray:
            changed: AbstractMedium = with_constant(medium, constant, value + step * (factor - 1))
            found: ComplexArray = getattr(changed.evaluate(frequency), quantity)
            return found

        size = getattr(medium.evaluate(frequency), quantity)
        assert_same_slope(getattr(slope, quantity) * step, difference(at), size, f"{name}: {constant}")


def _real_constants(value: object, path: str = "") -> set[str]:
    """Return the names of all real constants in the fields of a medium, from their types alone."""
    names: set[str] = set()
    for field in dataclasses.fields(value):  # type: ignore[arg-type]
        inner, name = getattr(value, field.name), path + field.name
        if isinstance(inner, tuple):
            for place, item in enumerate(inner):
                names |= _real_constants(item, f"{name}[{place}].")
        elif isinstance(inner, AbstractMedium):
            names |= _real_constants(inner, f"{name}.")
        elif field.type in ("complex", complex):
            names |= {name, f"{name}_loss"}
        elif isinstance(inner, float):
            names.add(name)
    return names - {n for n in names if "provenance" in n or "valid_range" in n}


@pytest.mark.parametrize("name", set(MEDIA) - {"constant by loss tangent"})
def test_every_constant_has_a_slope(name: str) -> None:
    """No real constant of a model is forgotten, and none is invented."""
    medium = MEDIA[name]
    assert set(medium.constant_slopes(frequencies_of(name))) == _real_constants(medium)


@pytest.mark.parametrize("name", MEDIA)
@pytest.mark.parametrize("shape", [(), (3,), (2, 4)])
def test_arrays_have_the_shape_of_the_frequencies(name: str, shape: tuple[int, ...]) -> None:
    """Values and slopes are complex arrays of the shape of the frequencies, whatever it is."""
    frequency = np.full(shape, 1e9)
    values = MEDIA[name].evaluate(frequency)
    slopes = MEDIA[name].constant_slopes(frequency).values()
    for part in (values, *slopes):
        for field in dataclasses.fields(part):
            array = getattr(part, field.name)
            assert isinstance(array, np.ndarray)
            assert array.shape == shape
            assert array.dtype == np.complex128


def test_slope_with_a_conductivity_of_nothing() -> None:
    """A conductivity of 0 has the same slope as any other, though the values do not depend on frequency."""
    frequency = np.array([1e6, 1e9])
    dry, wet = LossyDielectricMedium(4.0), LossyDielectricMedium(4.0, conductivity=0.1)
    assert not dry.dispersive
    assert wet.dispersive
    for slope in (dry.constant_slopes(frequency), DebyeMedium(4.0, 1.0, 1e-9).constant_slopes(frequency)):
        found = slope["conductivity"].permittivity
        assert found == pytest.approx(wet.constant_slopes(frequency)["conductivity"].permittivity, rel=1e-15)
        assert found * frequency == pytest.approx(-17.975e9j, rel=1e-4)  # ITU-R P.2040 prints 17.98, f in GHz
