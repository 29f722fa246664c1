"""The one table of what can be drawn of a material over frequency: name, unit, definition, function."""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.constants import SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.base import ComplexArray, Constitutive, FloatArray
from stackcore.units import Dimension, format_value, parse_measure

DIGITS: Final = 4
"""Significant digits of a value in words."""

MINUS: Final = "\u2212"
_SUPERSCRIPTS: Final = str.maketrans("-0123456789", "⁻⁰¹²³⁴⁵⁶⁷⁸⁹")
_SMALLEST_PLAIN: Final = 1e-4
_LARGEST_PLAIN: Final = 1e6


@dataclass(frozen=True, slots=True)
class MaterialQuantity:
    """One row of `MATERIAL_QUANTITIES`.

    Parameters
    ----------
    label, symbol
        Words for the axis, and the symbol before a value.
    definition
        One sentence or two.
    values
        Function of frequencies in Hz and what the medium is there, to values in the SI unit of `dimension`;
        infinite or nan where there is none.
    dimension
        Kind of the values.
    by_ratio
        Whether equal ratios are drawn equally far apart unless told otherwise.
    """

    label: str
    symbol: str
    definition: str
    values: Callable[[FloatArray, Constitutive], FloatArray]
    dimension: Dimension = Dimension.NUMBER
    by_ratio: bool = False


def refractive_index(values: Constitutive) -> ComplexArray:
    """Return n − jk = √(εμ), the root whose wave decays.

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> complex(refractive_index(ConstantMedium(-9.0).evaluate(np.array(1e15))))
    -3j
    """
    root = np.sqrt(values.permittivity) * np.sqrt(values.permeability)
    # A lossless negative ε or μ may come with either sign of a zero loss, and the root with it.
    index: ComplexArray = np.where(root.imag > 0, -root, root) + 0.0
    return index


def loss_over(value: ComplexArray, *, whole: bool = False) -> FloatArray:
    """Return loss over real part; nan where the real part is not above 0, unless its size is wanted (`whole`)."""
    real = np.abs(value.real) if whole else np.where(value.real > 0, value.real, np.nan)
    with np.errstate(divide="ignore", invalid="ignore"):
        return np.asarray((0.0 - value.imag) / real)


def _depth(frequency: FloatArray, values: Constitutive) -> FloatArray:
    decay = 2 * np.pi * frequency / SPEED_OF_LIGHT * (0.0 - refractive_index(values).imag)
    with np.errstate(divide="ignore"):
        return np.asarray(1 / decay)


def _conductivity(frequency: FloatArray, values: Constitutive) -> FloatArray:
    return np.asarray(2 * np.pi * frequency * VACUUM_PERMITTIVITY * (0.0 - values.permittivity.imag))


MATERIAL_QUANTITIES: Final[dict[str, MaterialQuantity]] = {
    "permittivity": MaterialQuantity(
        "Permittivity ε′",
        "ε′",
        "Real part of the relative permittivity ε = ε′ − jε″.",
        lambda _, v: v.permittivity.real,
    ),
    "loss_part": MaterialQuantity(
        "Loss ε″",
        "ε″",
        "Loss part of the relative permittivity ε = ε′ − jε″, 0 or more; conduction is in it.",
        lambda _, v: np.asarray(0.0 - v.permittivity.imag),
        by_ratio=True,
    ),
    "loss_tangent": MaterialQuantity(
        "Loss tangent",
        "tan δ",
        "ε″/ε′ with all loss in it; there is none where ε′ is not above 0.",
        lambda _, v: loss_over(v.permittivity),
        by_ratio=True,
    ),
    "permeability": MaterialQuantity(
        "Permeability μ′",
        "μ′",
        "Real part of the relative permeability μ = μ′ − jμ″.",
        lambda _, v: v.permeability.real,
    ),
    "magnetic_loss": MaterialQuantity(
        "Magnetic loss μ″",
        "μ″",
        "Loss part of the relative permeability μ = μ′ − jμ″, 0 or more.",
        lambda _, v: np.asarray(0.0 - v.permeability.imag),
        by_ratio=True,
    ),
    "index": MaterialQuantity(
        "Refractive index n",
        "n",
        "Real part of √(εμ) = n − jk: vacuum wavelength over wavelength in the material.",
        lambda _, v: refractive_index(v).real,
    ),
    "extinction": MaterialQuantity(
        "Extinction k",
        "k",
        "Loss part of √(εμ) = n − jk, 0 or more: how fast a wave decays.",
        lambda _, v: np.asarray(0.0 - refractive_index(v).imag),
        by_ratio=True,
    ),
    "conductivity": MaterialQuantity(
        "Conductivity",
        "σ",
        "ωε₀ε″: the conductivity that makes all of the electric loss at that frequency.",
        _conductivity,
        Dimension.CONDUCTIVITY,
        by_ratio=True,
    ),
    "skin_depth": MaterialQuantity(
        "Skin depth",
        "depth",
        "Depth at which the field of a wave has fallen to 1/e (37 %) and its power to 14 %: λ₀/(2πk).",
        _depth,
        Dimension.LENGTH,
        by_ratio=True,
    ),
    "current_ratio": MaterialQuantity(
        "Conduction over displacement current",
        "ratio",
        "ε″/|ε′|, all loss counted as conduction. Above 1 the material is a conductor, below 1 a dielectric.",
        lambda _, v: loss_over(v.permittivity, whole=True),
        by_ratio=True,
    ),
}
"""Name -> what it is, in the order of menus and tables."""


def words_of(quantity: str, value: float) -> str:
    """Return a value in SI units for reading, with its unit.

    Examples
    --------
    >>> words_of("skin_depth", 6.609e-7), words_of("loss_tangent", 1.5e-5), words_of("permittivity", -10.0)
    ('660.9 nm', '1.5×10⁻⁵', '−10')
    """
    row = MATERIAL_QUANTITIES[quantity]
    if np.isnan(value):
        return "none"
    if np.isinf(value):
        return "∞"
    if row.dimension is not Dimension.NUMBER and value != 0:
        return format_value(value, row.dimension, digits=DIGITS).replace("-", MINUS)
    return plain_number(value)


def plain_number(value: float) -> str:
    """Return a number with four significant digits, long ones with a power of ten."""
    if value == 0 or _SMALLEST_PLAIN <= abs(value) < _LARGEST_PLAIN:
        text = format_value(value, Dimension.NUMBER, digits=DIGITS)
    else:
        mantissa, _, power = f"{value:.{DIGITS - 1}e}".partition("e")
        mantissa = mantissa.rstrip("0").rstrip(".") if "." in mantissa else mantissa
        text = f"{mantissa}×10{str(int(power)).translate(_SUPERSCRIPTS)}"
    return text.replace("-", MINUS)


def unit_for(quantity: str, values: FloatArray) -> tuple[str, float]:
    """Return the unit that fits most of `values` (SI), and how many of it one SI unit is.

    Examples
    --------
    >>> unit_for("skin_depth", np.array([2e-6, 7e-6]))
    ('µm', 1000000.0)
    """
    dimension = MATERIAL_QUANTITIES[quantity].dimension
    if dimension is Dimension.NUMBER:
        return "", 1.0
    sizes = np.abs(values[np.isfinite(values) & (values != 0)])
    middle = float(np.median(sizes)) if sizes.size else 1.0
    # The ladder of a dimension begins with its largest unit and the least size it is used for, or with its SI unit.
    fitting = [unit for unit, least in dimension.ladder if middle >= float(least)] or [dimension.ladder[-1][0]]
    return fitting[0], 1 / parse_measure(f"1 {fitting[0]}", dimension).value
