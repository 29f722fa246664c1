"""The solver against a cascade of transmission lines, built with the general-purpose network library scikit-rf.

At normal incidence a layer is a line of impedance Z₀√(μ/ε) and propagation constant jk₀√(εμ), a sheet a shunt.
"""

import math
from functools import reduce
from typing import Any

import numpy as np
import pytest
import skrf
from hypothesis import given, settings

from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.propagation import solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import Layer, SheetPlacement, Stack
from tests.strategies import TE, TM, Case, cases

FREQUENCY = np.linspace(2e9, 18e9, 33)
GLASS_FIBRE = ConstantMedium(4.2 * (1 - 0.015j))
FERRITE = ConstantMedium(12.0 - 0.5j, 2.0 - 0.8j)

WALLS = {
    "one lossy laminate": Stack((Layer(GLASS_FIBRE, 5e-3),)),
    "sandwich": Stack(
        (Layer(GLASS_FIBRE, 0.8e-3), Layer(ConstantMedium(1.1 - 0.002j), 8e-3), Layer(GLASS_FIBRE, 0.8e-3))
    ),
    "ferrite and foam": Stack((Layer(ConstantMedium(1.05), 20e-3), Layer(FERRITE, 3e-3))),
    "copper foil on film": Stack((Layer(ConductorMedium(5.8e7), 2e-7), Layer(ConstantMedium(3.0 - 0.03j), 50e-6))),
    "three sheets": Stack(
        (
            SheetPlacement(SeriesSheet(300.0)),
            Layer(VACUUM, 7e-3),
            SheetPlacement(SeriesSheet(50.0, 2e-9, 0.1e-12)),
            SheetPlacement(SeriesSheet(0.0, 5e-9)),
            Layer(GLASS_FIBRE, 2e-3),
        )
    ),
}


@pytest.mark.parametrize("name", WALLS)
def test_wall_is_a_cascade_of_lines(name: str) -> None:
    """r and t of walls in air equal S11 and S21 of the cascade from 2 to 18 GHz."""
    response = solve(WALLS[name], FREQUENCY, 0.0)
    scattering = cascade(WALLS[name], FREQUENCY)
    for polarization in (TE, TM):
        np.testing.assert_allclose(response.reflection[:, 0, polarization], scattering[:, 0, 0], atol=1e-11)
        np.testing.assert_allclose(
            response.transmission[:, 0, polarization], scattering[:, 1, 0], rtol=1e-9, atol=1e-14
        )


def test_line_between_different_half_spaces() -> None:
    """With other half-spaces S21 is t times √(Y_back / Y_front), from power waves to tangential fields."""
    stack = Stack((Layer(GLASS_FIBRE, 3e-3),), front=ConstantMedium(2.0), back=ConstantMedium(9.0))
    response = solve(stack, FREQUENCY, 0.0)
    scattering = cascade(stack, FREQUENCY)
    np.testing.assert_allclose(response.reflection[:, 0, TE], scattering[:, 0, 0], atol=1e-12)
    np.testing.assert_allclose(
        response.transmission[:, 0, TE] * math.sqrt(3.0 / math.sqrt(2.0)), scattering[:, 1, 0], rtol=1e-11
    )


@settings(max_examples=40)
@given(cases(frequency_range=(1e6, 1e12), highest_deg=0.0))
def test_random_stack_is_a_cascade_of_lines(case: Case) -> None:
    """Random stacks in air equal their cascade; shunts of an ohm about a resonance leave it five digits."""
    response = case.solve()
    scattering = cascade(case.stack, np.array([case.frequency]))
    # At two exact half-wave layers the cascade itself is off by 1.7e-8, where 50 digits say 0.
    np.testing.assert_allclose(response.reflection[0, 0], scattering[0, 0, 0], atol=1e-7)
    np.testing.assert_allclose(response.transmission[0, 0], scattering[0, 1, 0], rtol=1e-4, atol=1e-9)


def cascade(stack: Stack, frequency: np.ndarray[Any, np.dtype[np.float64]]) -> np.ndarray[Any, Any]:
    """Return the S-parameters of `stack` as lines and shunts between its half-spaces, (F, 2, 2)."""
    axis = skrf.Frequency.from_f(frequency, unit="Hz")
    free = skrf.media.DefinedGammaZ0(axis, z0=FREE_SPACE_IMPEDANCE, gamma=1j)
    parts = []
    for element in stack.elements:
        if isinstance(element, Layer):
            values = element.medium.evaluate(frequency)
            index = np.sqrt(values.permittivity * values.permeability)
            gamma = 2j * np.pi * frequency / SPEED_OF_LIGHT * index
            impedance = FREE_SPACE_IMPEDANCE * values.permeability / index
            medium = skrf.media.DefinedGammaZ0(axis, gamma=gamma, z0=impedance, z0_port=FREE_SPACE_IMPEDANCE)
            # On the way to units that are not asked for the library divides by the phase constant, which may be 0.
            with np.errstate(divide="ignore", invalid="ignore"):
                parts.append(medium.line(element.thickness, "m"))
        else:
            parts.append(free.shunt(free.load(_load(element.sheet.impedance(frequency)))))
    network = reduce(lambda left, right: left**right, parts)
    ports = []
    for half_space in (stack.front, stack.back):
        assert isinstance(half_space, ConstantMedium)
        eps, mu = complex(half_space.permittivity).real, complex(half_space.permeability).real
        ports.append(FREE_SPACE_IMPEDANCE * math.sqrt(mu / eps))
    network.renormalize(ports)
    return np.asarray(network.s)


def _load(impedance: np.ndarray[Any, Any]) -> np.ndarray[Any, Any]:
    """Return the reflection coefficient of `impedance` in free space."""
    return (impedance - FREE_SPACE_IMPEDANCE) / (impedance + FREE_SPACE_IMPEDANCE)
