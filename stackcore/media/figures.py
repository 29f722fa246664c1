"""What can be read of a material at a frequency: the one table for command line, browser and export.

n − jk = √ε √μ, each root with a loss of 0 or more, so that n is negative where ε and μ both are. The loss as a
conductivity is ωε₀ε″, whatever its cause. The depth is where a plane wave's field has fallen to 1/e: c/(ωk), the
skin depth of a metal.
"""

from collections.abc import Callable, Mapping
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.base import AbstractMedium, Constitutive


@dataclass(frozen=True, slots=True)
class Figure:
    """One quantity of a material.

    Parameters
    ----------
    name
        Column of a table, with its unit.
    label, symbol, unit
        For people; the unit is that of the values.
    definition
        One sentence.
    values
        Function of ε and μ and the frequency in Hz; NaN where it means nothing.
    """

    name: str
    label: str
    symbol: str
    unit: str
    definition: str
    values: Callable[[Constitutive, FloatArray], FloatArray]


def _permittivity(values: Constitutive, frequency: FloatArray) -> FloatArray:
    return values.permittivity.real


def _loss(values: Constitutive, frequency: FloatArray) -> FloatArray:
    loss: FloatArray = 0.0 - values.permittivity.imag
    return loss


def _permeability(values: Constitutive, frequency: FloatArray) -> FloatArray:
    return values.permeability.real


def _magnetic_loss(values: Constitutive, frequency: FloatArray) -> FloatArray:
    loss: FloatArray = 0.0 - values.permeability.imag
    return loss


def _tangent(values: Constitutive, frequency: FloatArray) -> FloatArray:
    real, nothing = values.permittivity.real, np.full(values.permittivity.shape, np.nan)
    tangent: FloatArray = np.divide(_loss(values, frequency), real, out=nothing, where=real > 0)
    return tangent


def _n(values: Constitutive, frequency: FloatArray) -> FloatArray:
    return _index(values).real


def _k(values: Constitutive, frequency: FloatArray) -> FloatArray:
    k: FloatArray = np.maximum(0.0 - _index(values).imag, 0.0)
    return k


def _index(values: Constitutive) -> ComplexArray:
    index: ComplexArray = _root(values.permittivity) * _root(values.permeability)
    return index


def _root(value: ComplexArray) -> ComplexArray:
    root = np.sqrt(value)
    return np.where(root.imag > 0, -root, root)


def _conductivity(values: Constitutive, frequency: FloatArray) -> FloatArray:
    sigma: FloatArray = 2 * np.pi * VACUUM_PERMITTIVITY * frequency * _loss(values, frequency)
    return sigma


def _depth(values: Constitutive, frequency: FloatArray) -> FloatArray:
    k, endless = _k(values, frequency), np.full(frequency.shape, np.inf)
    depth: FloatArray = np.divide(SPEED_OF_LIGHT / (2 * np.pi * frequency), k, out=endless, where=k > 0)
    return depth


_TANGENT_MEANS: Final = (
    "ε″/ε′, also the conduction current over the displacement current; none where ε′ is 0 or less."
)

FIGURES: Final[Mapping[str, Figure]] = {
    figure.name: figure
    for figure in (
        Figure("permittivity", "Permittivity", "ε′", "", "Real part of the relative ε′ − jε″.", _permittivity),
        Figure("dielectric_loss", "Dielectric loss", "ε″", "", "Of the relative ε′ − jε″, 0 or more.", _loss),
        Figure("loss_tangent", "Loss tangent", "tan δ", "", _TANGENT_MEANS, _tangent),
        Figure("permeability", "Permeability", "μ′", "", "Real part of the relative μ′ − jμ″.", _permeability),
        Figure("magnetic_loss", "Magnetic loss", "μ″", "", "Of the relative μ′ − jμ″, 0 or more.", _magnetic_loss),
        Figure("refractive_index", "Refractive index", "n", "", "Real part of n − jk.", _n),
        Figure("extinction", "Extinction", "k", "", "Of n − jk, 0 or more.", _k),
        Figure("conductivity_S_per_m", "Loss as conductivity", "σ", "S/m", "ωε₀ε″ of all loss.", _conductivity),
        Figure("skin_depth_m", "Skin depth", "δ", "m", "Where the field of a plane wave is down to 1/e.", _depth),
    )
}
"""Name of the column -> figure, in the order of tables."""


def figures_of(medium: AbstractMedium, frequency: FloatArray) -> dict[str, FloatArray]:
    """Return every figure of `medium` at `frequency` in Hz, 1-D, by its name.

    Examples
    --------
    >>> from stackcore.media.conductor import ConductorMedium
    >>> figures_of(ConductorMedium(5.8e7), np.array([1e10]))["skin_depth_m"].round(9)
    array([6.61e-07])
    """
    values = medium.evaluate(frequency)
    return {name: figure.values(values, frequency) for name, figure in FIGURES.items()}
