"""Nearly constant loss over many decades, and causal: the wideband logarithmic model (Djordjevic-Sarkar).

    ε = ε∞ + m L(f),    L = ln((f₂ + jf)/(f₁ + jf)),    f₁ < f₂

Between the corners f₁ and f₂ the loss is nearly mπ/2 and ε′ falls by m ln 10 a decade. Two classes take the two
ways in which ε∞ and m are known: `WidebandMedium` permittivity and loss tangent at one frequency, as on a
laminate's data sheet; `WidebandStepMedium` ε∞ and the whole step.

Source: A. R. Djordjevic, R. M. Biljic, V. D. Likar-Smiljanic, T. K. Sarkar, IEEE Trans. Electromagn. Compat. 43(4),
662 (2001), in the form with natural logarithms.
"""

from collections.abc import Mapping
from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)
from stackcore.media.checks import check_loss, check_positive
from stackcore.media.parts import complex_of, electric, electric_slopes


@dataclass(frozen=True, slots=True)
class _Logarithm:
    """L and its derivatives with respect to f, f₁ and f₂, each taken in a form that keeps its digits."""

    value: ComplexArray
    by_frequency: ComplexArray
    by_lower: ComplexArray
    by_upper: ComplexArray


def _logarithm(frequency: FloatArray, lower: float, upper: float) -> _Logarithm:
    f = np.asarray(frequency, dtype=np.float64)
    width, lower_part, upper_part = upper - lower, 1 / complex_of(lower, f), 1 / complex_of(upper, f)
    real = 0.5 * np.log1p(width * (upper + lower) / (lower * lower + f * f))
    angle = np.arctan(width / (f + lower * (upper / f)))
    return _Logarithm(
        complex_of(real, -angle),
        -1j * width * (lower_part * upper_part),
        -lower_part,
        upper_part,
    )


@dataclass(frozen=True, slots=True)
class WidebandMedium(AbstractMedium):
    """ε = ε′₀ [1 + tan δ₀ (L(f) − Re L(f₀))/θ₀], θ₀ = −Im L(f₀), μ = 1: the model through a data sheet's point.

    Parameters
    ----------
    permittivity, loss_tangent
        ε′₀ > 0 and tan δ₀ ≥ 0 at `reference_frequency`.
    reference_frequency
        f₀ in Hz, > 0.
    lower_frequency, upper_frequency
        The corners f₁ < f₂ in Hz; far outside what is to be computed. 1 kHz and 1 THz are common.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite, corners in the wrong order, gain, or a loss so large that ε would fall
        below 0 at high frequency.

    Notes
    -----
    A constant ε′ with a constant loss tangent is not causal; this is its causal replacement. The source is named in
    the module.

    Examples
    --------
    >>> laminate = WidebandMedium(4.3, 0.02, 1e9)
    >>> complex(np.round(laminate.evaluate(np.array(1e10)).permittivity, 4))
    (4.1739-0.0855j)
    """

    permittivity: float
    loss_tangent: float
    reference_frequency: float
    lower_frequency: float = 1e3
    upper_frequency: float = 1e12
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("permittivity", self.permittivity)
        check_loss("loss_tangent", self.loss_tangent)
        check_positive("reference_frequency", self.reference_frequency, "Hz")
        _check_corners(self.lower_frequency, self.upper_frequency)
        if not self.high_frequency_permittivity > 0:
            raise ValueError(
                f"loss_tangent {self.loss_tangent:g} between {self.lower_frequency:g} Hz and "
                f"{self.upper_frequency:g} Hz is too large: the permittivity would fall to "
                f"{self.high_frequency_permittivity:g} at high frequency"
            )

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def high_frequency_permittivity(self) -> float:
        """ε∞, far above the upper corner."""
        at = self._reference()
        return self.permittivity * (1 + self.loss_tangent * float(at.value.real / at.value.imag))

    @property
    def permittivity_step(self) -> float:
        """The whole step Δε = ε(static) − ε∞."""
        factor = self.permittivity * self.loss_tangent / -float(self._reference().value.imag)
        return factor * float(np.log1p((self.upper_frequency - self.lower_frequency) / self.lower_frequency))

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        at, here = self._reference(), self._logarithm(frequency)
        factor = self.permittivity * self.loss_tangent / -at.value.imag
        value = factor * (here.value - at.value.real)
        return electric(self.permittivity + value, factor * here.by_frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        at, here = self._reference(), self._logarithm(frequency)
        angle = -at.value.imag
        shape = (here.value - at.value.real) / angle

        def through_point(local: ComplexArray | float, fixed: ComplexArray) -> ComplexArray:
            # L and its value at the reference move together; θ₀ = −Im L(f₀).
            turned: ComplexArray = (local - fixed.real + shape * fixed.imag) / angle
            return self.permittivity * self.loss_tangent * turned

        return electric_slopes(
            frequency,
            {
                "permittivity": 1 + self.loss_tangent * shape,
                "loss_tangent": self.permittivity * shape,
                "reference_frequency": through_point(0.0, at.by_frequency),
                "lower_frequency": through_point(here.by_lower, at.by_lower),
                "upper_frequency": through_point(here.by_upper, at.by_upper),
            },
        )

    def _reference(self) -> _Logarithm:
        return self._logarithm(np.asarray(self.reference_frequency, dtype=np.float64))

    def _logarithm(self, frequency: FloatArray) -> _Logarithm:
        return _logarithm(frequency, self.lower_frequency, self.upper_frequency)


@dataclass(frozen=True, slots=True)
class WidebandStepMedium(AbstractMedium):
    """ε = ε∞ + Δε L(f)/ln(f₂/f₁), μ = 1.

    Parameters
    ----------
    high_frequency_permittivity
        ε∞, > 0, far above the upper corner.
    permittivity_step
        The whole step Δε = ε(static) − ε∞, ≥ 0. A source that gives the fall per decade gives Δε/log₁₀(f₂/f₁).
    lower_frequency, upper_frequency
        The corners f₁ < f₂ in Hz.
    valid_range, provenance
        See `stackcore.media.base`.

    Raises
    ------
    ValueError
        For a constant that is not finite, corners in the wrong order, or gain.

    Notes
    -----
    The same model as `WidebandMedium`; the source is named in the module.

    Examples
    --------
    >>> medium = WidebandStepMedium(3.9, 0.6, 1e3, 1e12)
    >>> complex(np.round(medium.evaluate(np.array(1.0)).permittivity, 4))
    (4.5-0j)
    """

    high_frequency_permittivity: float
    permittivity_step: float
    lower_frequency: float
    upper_frequency: float
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        check_positive("high_frequency_permittivity", self.high_frequency_permittivity)
        check_loss("permittivity_step", self.permittivity_step)
        _check_corners(self.lower_frequency, self.upper_frequency)

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def _nepers(self) -> float:
        """ln(f₂/f₁)."""
        return float(np.log1p((self.upper_frequency - self.lower_frequency) / self.lower_frequency))

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        here = _logarithm(frequency, self.lower_frequency, self.upper_frequency)
        factor = self.permittivity_step / self._nepers
        return electric(self.high_frequency_permittivity + factor * here.value, factor * here.by_frequency)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        here = _logarithm(frequency, self.lower_frequency, self.upper_frequency)
        factor, share = self.permittivity_step / self._nepers, here.value / self._nepers
        return electric_slopes(
            frequency,
            {
                "high_frequency_permittivity": 1.0,
                "permittivity_step": share,
                "lower_frequency": factor * (here.by_lower + share / self.lower_frequency),
                "upper_frequency": factor * (here.by_upper - share / self.upper_frequency),
            },
        )


def _check_corners(lower: float, upper: float) -> None:
    check_positive("lower_frequency", lower, "Hz")
    check_positive("upper_frequency", upper, "Hz")
    if not lower < upper:
        raise ValueError(f"lower_frequency {lower:g} Hz must lie below upper_frequency {upper:g} Hz")
