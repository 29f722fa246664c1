"""The analytic slopes of every model against differences, with respect to frequency and to every constant."""

import dataclasses
from typing import Any

import numpy as np
import pytest

from stackcore.arrays import ComplexArray
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive
from stackcore.media.cauchy import CauchyMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
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
    """The slope with respect to each constant that is not 0 is the derivative of the values, all others held."""
    medium, frequency = MEDIA[name], frequencies_of(name)
    slopes = medium.constant_slopes(frequency)
    assert slopes
    for constant, slope in slopes.items():
        value = constant_of(medium, constant)
        if value == 0:
            continue  # below it the medium would be refused; see the tests at 0

        def at(factor: float, constant: str = constant, value: float = value) -> ComplexArray:
            changed: AbstractMedium = with_constant(medium, constant, value * factor)
            found: ComplexArray = getattr(changed.evaluate(frequency), quantity)
            return found

        size = getattr(medium.evaluate(frequency), quantity)
        assert_same_slope(getattr(slope, quantity) * value, difference(at), size, f"{name}: {constant}")


def _real_constants(value: Any, path: str = "") -> set[str]:
    """Return the names of all real constants in the fields of a medium, from their types alone."""
    names: set[str] = set()
    for field in dataclasses.fields(value):
        inner, name = getattr(value, field.name), path + field.name
        if field.name in ("provenance", "valid_range"):
            continue
        if isinstance(inner, tuple):
            for place, item in enumerate(inner):
                names |= _real_constants(item, f"{name}[{place}].")
        elif isinstance(inner, AbstractMedium):
            names |= _real_constants(inner, f"{name}.")
        elif field.type in ("complex", complex):
            names |= {name, f"{name}_loss"}
        elif isinstance(inner, float):
            names.add(name)
    return names


def _loss_in_one_of_two(medium: AbstractMedium) -> bool:
    """Return whether the loss may be given by either of two constants, which the types do not tell."""
    return isinstance(medium, LossyDielectricMedium) or getattr(medium, "loss_as", "part") == "tangent"


@pytest.mark.parametrize("name", [name for name, medium in MEDIA.items() if not _loss_in_one_of_two(medium)])
def test_every_constant_has_a_slope(name: str) -> None:
    """No real constant of a model is forgotten, and none is invented."""
    medium = MEDIA[name]
    assert set(medium.constant_slopes(frequencies_of(name))) == _real_constants(medium)


@pytest.mark.parametrize("name", MEDIA)
@pytest.mark.parametrize("shape", [(), (3,), (2, 4)])
def test_arrays_have_the_shape_of_the_frequencies(name: str, shape: tuple[int, ...]) -> None:
    """Values and slopes are complex arrays of the shape of the frequencies, whatever it is."""
    frequency = np.full(shape, 1e9)
    medium = MEDIA[name]
    parts: list[Constitutive | ConstantSlope] = [medium.evaluate(frequency)]
    parts += medium.constant_slopes(frequency).values()
    for part in parts:
        for array in dataclasses.astuple(part):
            assert isinstance(array, np.ndarray)
            assert array.shape == shape
            assert array.dtype == np.complex128


def test_loss_has_the_constant_it_was_given_by() -> None:
    """Where the loss can be given in two ways, the slopes are those of the way taken."""
    frequency = np.array(1e9)
    others = {"permittivity", "permeability", "permeability_loss"}
    by_tangent = ConstantMedium.with_loss_tangent(4.2, 0.02)
    assert set(by_tangent.constant_slopes(frequency)) == others | {"loss_tangent"}
    assert set(ConstantMedium(4.2 - 0.084j).constant_slopes(frequency)) == others | {"permittivity_loss"}
    others.add("conductivity")
    assert set(LossyDielectricMedium(4.2).constant_slopes(frequency)) == others | {"loss_tangent"}
    assert set(LossyDielectricMedium(4.2, loss_part=0.1).constant_slopes(frequency)) == others | {"loss_part"}


def test_slopes_at_nothing() -> None:
    """At a relaxation time, roughness, loss or extinction of 0 the slope is that of the first bit of it."""
    frequency = np.array([1e8, 1e10])
    metal = ConductorMedium(5.8e7, 2.0)
    slopes = metal.constant_slopes(frequency)
    later = ConductorMedium(5.8e7, 2.0, relaxation_time=1e-18)
    change = (later.evaluate(frequency).permittivity - metal.evaluate(frequency).permittivity) / 1e-18
    assert slopes["relaxation_time"].permittivity.real == pytest.approx(change.real, rel=1e-7, abs=0)
    rough = ConductorMedium(5.8e7, 2.0, roughness=1e-12)
    assert np.abs(rough.evaluate(frequency).permittivity / metal.evaluate(frequency).permittivity - 1).max() < 1e-9
    assert not slopes["roughness"].permittivity.any()

    clear = CauchyMedium(1.5)
    assert clear.constant_slopes(frequency)["extinction"].permittivity.tolist() == [-3j, -3j]
    assert not clear.dispersive
    tangent = LossyDielectricMedium(4.0).constant_slopes(frequency)["loss_tangent"]
    assert tangent.permittivity.tolist() == [-4j, -4j]


def test_slope_with_a_conductivity_of_nothing() -> None:
    """A conductivity of 0 has the same slope as any other, though the values do not depend on frequency."""
    frequency = np.array([1e6, 1e9])
    dry, wet = LossyDielectricMedium(4.0), LossyDielectricMedium(4.0, conductivity=0.1)
    assert not dry.dispersive
    assert wet.dispersive
    for slope in (dry.constant_slopes(frequency), DebyeMedium(4.0, 1.0, 1e-9).constant_slopes(frequency)):
        found = slope["conductivity"].permittivity
        assert found == pytest.approx(wet.constant_slopes(frequency)["conductivity"].permittivity, rel=1e-15, abs=0)
        assert found * frequency == pytest.approx(-17.975e9j, rel=1e-4)  # ITU-R P.2040 prints 17.98, f in GHz
