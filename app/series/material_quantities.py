"""How each figure of a material is shown: its unit on screen, its scale, and its values in words."""

from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.media.base import Constitutive, FloatArray
from stackcore.media.figures import FIGURES, Figure
from stackcore.units import Dimension, format_value, parse_measure

DIGITS: Final = 4
"""Significant digits of a value in words."""

MINUS: Final = "\u2212"
_SUPERSCRIPTS: Final = str.maketrans("-0123456789", "⁻⁰¹²³⁴⁵⁶⁷⁸⁹")
_SMALLEST_PLAIN: Final = 1e-4
_LARGEST_PLAIN: Final = 1e6


@dataclass(frozen=True, slots=True)
class ShownFigure:
    """One row of `MATERIAL_QUANTITIES`.

    Parameters
    ----------
    figure
        What it is; see `stackcore.media.figures`.
    dimension
        Kind of the values, which are in its SI unit.
    by_ratio
        Whether equal ratios are drawn equally far apart unless told otherwise.
    """

    figure: Figure
    dimension: Dimension = Dimension.NUMBER
    by_ratio: bool = False

    @property
    def label(self) -> str:
        """Words for axis and menu, with the symbol."""
        return f"{self.figure.label} {self.figure.symbol}"

    def values(self, frequency: FloatArray, constitutive: Constitutive) -> FloatArray:
        """Return values in SI units at frequencies in Hz; infinite or nan where there is none."""
        values: FloatArray = self.figure.values(constitutive, frequency)
        return values


def _current_ratio(values: Constitutive, frequency: FloatArray) -> FloatArray:
    real = np.abs(values.permittivity.real)
    endless = np.full(real.shape, np.inf)
    ratio: FloatArray = np.divide(0.0 - values.permittivity.imag, real, out=endless, where=real > 0)
    return ratio


CURRENT_RATIO: Final = "current_ratio"

_RATIO: Final = Figure(
    CURRENT_RATIO,
    "Conduction / displacement",
    "ε″/|ε′|",
    "",
    "Conduction over displacement current, all loss taken as conduction: above 1 a conductor, below a dielectric.",
    _current_ratio,
)

_BY_RATIO: Final = ("dielectric_loss", "loss_tangent", "magnetic_loss", "extinction")

MATERIAL_QUANTITIES: Final[dict[str, ShownFigure]] = {
    **{name: ShownFigure(figure, by_ratio=name in _BY_RATIO) for name, figure in FIGURES.items()},
    "conductivity_S_per_m": ShownFigure(FIGURES["conductivity_S_per_m"], Dimension.CONDUCTIVITY, by_ratio=True),
    "skin_depth_m": ShownFigure(FIGURES["skin_depth_m"], Dimension.LENGTH, by_ratio=True),
    CURRENT_RATIO: ShownFigure(_RATIO, by_ratio=True),
}
"""Name of the figure -> how it is shown, in the order of menus and tables."""


def words_of(quantity: str, value: float) -> str:
    """Return a value in SI units for reading, with its unit.

    Examples
    --------
    >>> words_of("skin_depth_m", 6.609e-7), words_of("loss_tangent", 1.5e-5), words_of("permittivity", -10.0)
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
    >>> unit_for("skin_depth_m", np.array([2e-6, 7e-6]))
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
