"""What the models share when they put their values together."""

from collections.abc import Mapping

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.media.base import ConstantSlope, Constitutive

Slopes = Mapping[str, ComplexArray | complex]
"""Name of a constant -> what it changes, in the shape of the frequencies or the same at all of them."""

_LAST_DIGIT = float(np.finfo(np.float64).eps)


def complex_of(real: FloatArray | float, imaginary: FloatArray | float) -> ComplexArray:
    """Return real + j·imaginary without a multiplication; at least one of the two is an array."""
    out = np.empty(np.broadcast_shapes(np.shape(real), np.shape(imaginary)), dtype=np.complex128)
    out.real = real
    out.imag = imaginary
    return out


def everywhere(value: complex, frequency: FloatArray) -> ComplexArray:
    """Return `value` in the shape of `frequency`."""
    return np.full(np.shape(frequency), value, dtype=np.complex128)


def electric(permittivity: ComplexArray, slope: ComplexArray) -> Constitutive:
    """Return a non-magnetic medium's values, μ = 1, from its ε and the slope of ε per Hz."""
    permittivity = np.asarray(permittivity, dtype=np.complex128)
    one, zero = np.ones_like(permittivity), np.zeros_like(permittivity)
    return Constitutive(permittivity, one, np.asarray(slope, dtype=np.complex128), zero)


def magnetic(permeability: ComplexArray, slope: ComplexArray) -> Constitutive:
    """Return the values of a medium with ε = 1 from its μ and the slope of μ per Hz."""
    permeability = np.asarray(permeability, dtype=np.complex128)
    one, zero = np.ones_like(permeability), np.zeros_like(permeability)
    return Constitutive(one, permeability, zero, np.asarray(slope, dtype=np.complex128))


def electric_slopes(frequency: FloatArray, slopes: Slopes) -> dict[str, ConstantSlope]:
    """Return the slopes of ε by name of the constant, in the shape of `frequency`; μ has none."""
    return both_slopes(frequency, slopes, {})


def magnetic_slopes(frequency: FloatArray, slopes: Slopes) -> dict[str, ConstantSlope]:
    """Return the slopes of μ by name of the constant, in the shape of `frequency`; ε has none."""
    return both_slopes(frequency, {}, slopes)


def both_slopes(
    frequency: FloatArray, of_permittivity: Slopes, of_permeability: Slopes
) -> dict[str, ConstantSlope]:
    """Return the slopes of ε and μ by name of the constant, in the shape of `frequency`; 0 where one has none."""
    zero = everywhere(0.0, frequency)
    names = dict.fromkeys([*of_permittivity, *of_permeability])
    return {
        name: ConstantSlope(
            _shaped(of_permittivity[name], frequency) if name in of_permittivity else zero,
            _shaped(of_permeability[name], frequency) if name in of_permeability else zero,
        )
        for name in names
    }


def _shaped(slope: ComplexArray | complex, frequency: FloatArray) -> ComplexArray:
    if isinstance(slope, complex | float | int):
        return everywhere(slope, frequency)
    return np.asarray(slope, dtype=np.complex128)


def conduction(frequency: FloatArray) -> ComplexArray:
    """Return −j/(ωε₀), what 1 S/m of conductivity adds to ε. Its slope per Hz is minus itself over f."""
    return complex_of(0.0, -1 / (2 * np.pi * VACUUM_PERMITTIVITY * np.asarray(frequency, dtype=np.float64)))


def never_zero(permittivity: ComplexArray) -> ComplexArray:
    """Return ε of a lossless medium with an exact 0, as at a plasma frequency, off by the last digit of 1.

    No wave can be told in a medium of ε = 0, and the rounding of the model is of that size.
    """
    return np.where(permittivity == 0, _LAST_DIGIT, permittivity)
