"""The shape of a relaxation, shared by Debye, Cole-Cole, Cole-Davidson and Havriliak-Negami.

    h = 1/(1 + (jωτ)^a)^b,    0 < a ≤ 1,    0 < ab ≤ 1

It falls from 1 at low to 0 at high frequency. a < 1 broadens the loss peak on both sides of 1/(2πτ) alike, b < 1 on
its upper side. ε = ε∞ + Δε h, and likewise μ. Its phase lies between 0 and −abπ/2, hence the two conditions: beyond
them there would be gain.

Sources: P. Debye, Polar Molecules (1929); K. S. Cole, R. H. Cole, J. Chem. Phys. 9, 341 (1941), where a is written
1 − α; D. W. Davidson, R. H. Cole, J. Chem. Phys. 19, 1484 (1951); S. Havriliak, S. Negami, Polymer 8, 161 (1967).
"""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.parts import complex_of, conduction


@dataclass(frozen=True, slots=True)
class Relaxation:
    """A relaxation at some frequencies: h, its derivative ∂h/∂ln(ωτ), and ωτ with w = 1 + (jωτ)^a for the rest."""

    value: ComplexArray
    by_log_frequency: ComplexArray
    phase: FloatArray
    symmetric: float
    asymmetric: float

    def by_symmetric(self) -> ComplexArray:
        """Return ∂h/∂a."""
        turn = complex_of(np.log(self.phase), np.pi / 2)
        slope: ComplexArray = self.by_log_frequency * turn / self.symmetric
        return slope

    def by_asymmetric(self) -> ComplexArray:
        """Return ∂h/∂b."""
        logarithm, angle = _polar_bracket(self.phase, self.symmetric)
        slope: ComplexArray = -self.value * complex_of(logarithm, angle)
        return slope


def relaxation(frequency: FloatArray, time: float, symmetric: float = 1.0, asymmetric: float = 1.0) -> Relaxation:
    """Return the relaxation of `time` τ in s and exponents a and b at `frequency` in Hz."""
    x = 2 * np.pi * time * np.asarray(frequency, dtype=np.float64)
    if symmetric == 1 and asymmetric == 1:
        debye = 1 / complex_of(1.0, x)
        return Relaxation(debye, complex_of(0.0, -x) * debye * debye, x, 1.0, 1.0)
    power = complex_of(*_components(x, symmetric))
    if asymmetric == 1:
        value = 1 / (1 + power)
    else:
        logarithm, angle = _polar_bracket(x, symmetric)
        size, turn = np.exp(-asymmetric * logarithm), asymmetric * angle
        value = complex_of(size * np.cos(turn), -size * np.sin(turn))
    slope = (-symmetric * asymmetric) * value * (power / (1 + power))
    return Relaxation(value, slope, x, symmetric, asymmetric)


def relaxed(
    frequency: FloatArray, high: float, conductivity: float, *terms: tuple[float, Relaxation]
) -> tuple[ComplexArray, ComplexArray]:
    """Return ε∞ + Σ Δε h − jσ/(ωε₀), and its slope per Hz, for `terms` of (Δε, relaxation)."""
    frequency = np.asarray(frequency, dtype=np.float64)
    value = np.full(frequency.shape, high, dtype=np.complex128)
    by_log_frequency = np.zeros(frequency.shape, dtype=np.complex128)
    for step, part in terms:
        value += step * part.value
        by_log_frequency += step * part.by_log_frequency
    if conductivity:
        loss = conductivity * conduction(frequency)
        value += loss
        by_log_frequency -= loss
    return value, by_log_frequency / frequency


def _components(x: FloatArray, a: float) -> tuple[FloatArray, FloatArray]:
    """Return the parts of (jx)^a; the real one through a sine that keeps its digits as a goes to 1."""
    size = x**a
    return size * np.sin((1 - a) * np.pi / 2), size * np.sin(a * np.pi / 2)


def _polar_bracket(x: FloatArray, a: float) -> tuple[FloatArray, FloatArray]:
    """Return ln|w| and arg w of w = 1 + (jx)^a."""
    real, imaginary = _components(x, a)
    logarithm = 0.5 * np.log1p(real * (2 + real) + imaginary * imaginary)
    return logarithm, np.arctan2(imaginary, 1 + real)
