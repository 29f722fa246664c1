"""The shapes of a resonance and of free carriers, shared by Lorentz, Drude, plasma and magnetic resonance.

    Resonance      R = f₀²/(f₀² − f² + jfΓ)        1 at low frequency, loss peak of width Γ at f₀
    Free carriers  C = −f_p²/(f (f − jg))          g = ν/2π

All in Hz. ε = ε∞ + Σ Δε R + C, and likewise μ with R. Sources: H. A. Lorentz, The Theory of Electrons (1909);
P. Drude, Ann. Phys. 306, 566 (1900); F. Wooten, Optical Properties of Solids (1972), chapter 3.
"""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.checks import check_loss, check_positive
from stackcore.media.parts import complex_of


@dataclass(frozen=True, slots=True)
class LorentzTerm:
    """One Lorentz oscillator.

    Parameters
    ----------
    permittivity_step
        Δε ≥ 0, what it adds to the static permittivity. Where a source gives a strength f and a plasma frequency
        f_p, Δε = f f_p²/f₀².
    resonance_frequency
        f₀ in Hz, > 0.
    linewidth
        Γ in Hz, > 0: the full width at half the loss peak where it is narrow. A damping rate γ in 1/s is 2πΓ.
    """

    permittivity_step: float
    resonance_frequency: float
    linewidth: float

    def check(self, path: str = "") -> None:
        """Refuse constants that make no passive oscillator; `path` goes before their names."""
        check_loss(f"{path}permittivity_step", self.permittivity_step)
        check_positive(f"{path}resonance_frequency", self.resonance_frequency, "Hz")
        check_positive(f"{path}linewidth", self.linewidth, "Hz")

    def at(self, frequency: FloatArray) -> "Resonance":
        """Return the shape at `frequency` in Hz."""
        return resonance(frequency, self.resonance_frequency, self.linewidth)

    def slopes(self, frequency: FloatArray, path: str = "") -> dict[str, ComplexArray | complex]:
        """Return what each constant changes in ε, by name; `path` goes before the names."""
        shape = self.at(frequency)
        return {
            f"{path}permittivity_step": shape.value,
            f"{path}resonance_frequency": self.permittivity_step * shape.by_resonance,
            f"{path}linewidth": self.permittivity_step * shape.by_linewidth,
        }


@dataclass(frozen=True, slots=True)
class Resonance:
    """R at some frequencies, with its derivatives with respect to f, f₀ and Γ, per Hz."""

    value: ComplexArray
    inverse: ComplexArray
    frequency: FloatArray
    resonance_frequency: float
    linewidth: float

    @property
    def by_frequency(self) -> ComplexArray:
        """∂R/∂f."""
        slope: ComplexArray = self.value * self.inverse * complex_of(2 * self.frequency, -self.linewidth)
        return slope

    @property
    def by_resonance(self) -> ComplexArray:
        """∂R/∂f₀, where 1 − R = (−f² + jfΓ)/(f₀² − f² + jfΓ)."""
        f = self.frequency
        rest = complex_of(-f * f, f * self.linewidth) * self.inverse
        slope: ComplexArray = 2 / self.resonance_frequency * self.value * rest
        return slope

    @property
    def by_linewidth(self) -> ComplexArray:
        """∂R/∂Γ."""
        slope: ComplexArray = -1j * self.frequency * (self.value * self.inverse)
        return slope


def resonance(frequency: FloatArray, resonance_frequency: float, linewidth: float) -> Resonance:
    """Return R of f₀ and Γ, in Hz, at `frequency` in Hz."""
    f = np.asarray(frequency, dtype=np.float64)
    # f₀² − f² as a product keeps its digits at the resonance.
    inverse = 1 / complex_of((resonance_frequency - f) * (resonance_frequency + f), f * linewidth)
    return Resonance(resonance_frequency**2 * inverse, inverse, f, resonance_frequency, linewidth)


@dataclass(frozen=True, slots=True)
class FreeCarriers:
    """C at some frequencies, with its derivatives with respect to f and g, per Hz."""

    value: ComplexArray
    by_frequency: ComplexArray
    by_collision_frequency: ComplexArray


def free_carriers(frequency: FloatArray, plasma_frequency: float, collision_rate: float) -> FreeCarriers:
    """Return C of f_p in Hz and the collision rate ν in 1/s at `frequency` in Hz."""
    f = np.asarray(frequency, dtype=np.float64)
    slowed = 1 / complex_of(f, -collision_rate / (2 * np.pi))
    value = -(plasma_frequency**2 / f) * slowed
    return FreeCarriers(value, -value * (1 / f + slowed), 1j * value * slowed)
