"""Pure ice of fresh water."""

import math
from collections.abc import Mapping
from dataclasses import dataclass
from typing import ClassVar, Final

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive, FrequencyRange, Provenance
from stackcore.media.parts import complex_of, electric, electric_slopes
from stackcore.media.temperature import ConditionRange, check_temperature

COLDEST_ICE: Final = 150.0
"""K. Below, the two terms of the loss that vanish with the cold are no longer known."""

MELTING: Final = 273.16
"""K, the triple point."""

MAETZLER_RANGE: Final = FrequencyRange(10e6, 300e9)

MAETZLER_SOURCE: Final = Provenance(
    "C. Mätzler, U. Wegmüller, J. Phys. D 20, 1623 (1987), ε′; C. Mätzler (ed.), Thermal Microwave Radiation, IET "
    "(2006), ε″",
    "read",
    note="pure ice without salt, bubbles or liquid water; coefficients read in transcriptions of the source, "
    "ranges recalled",
)


@dataclass(frozen=True, slots=True)
class IceMedium(AbstractMedium):
    """ε′ linear in temperature; ε″ = α/f + βf with f in GHz, μ = 1.

    ε′ = 3.1884 + 9.1e-4 (T − 273 K), below 243 K 3.1611 + 4.3e-4 (T − 243 K). With θ = 300 K/T − 1:
    α = (0.00504 + 0.0062 θ) exp(−22.1 θ);
    β = (B₁/T) e^{b/T}/(e^{b/T} − 1)² + B₂f² + exp(−9.963 + 0.0372 (T − 273.16 K)),
    B₁ = 0.0207, b = 335 K, B₂ = 1.16e-11.

    Parameters
    ----------
    temperature
        T in K (`celsius` gives it from °C).
    valid_range, provenance
        See `stackcore.media.base`; the defaults are those of the source.

    Raises
    ------
    ValueError
        Above the melting point or below 150 K.

    Notes
    -----
    ε′ does not follow the small loss, so the model is causal only to some parts in ten thousand. Wet ice and snow
    are mixtures with water and air (`stackcore.media.mixture`).

    Examples
    --------
    >>> import numpy as np
    >>> complex(np.round(IceMedium(263.15).evaluate(np.array(10e9)).permittivity, 5))
    (3.17944-0.00078j)
    """

    temperature: float
    valid_range: FrequencyRange | None = MAETZLER_RANGE
    provenance: Provenance = MAETZLER_SOURCE

    temperature_range: ClassVar[tuple[float, float]] = (200.0, MELTING)

    def __post_init__(self) -> None:
        check_temperature(self.temperature, COLDEST_ICE, MELTING, "where water is ice")

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def condition_ranges(self) -> tuple[ConditionRange, ...]:
        """Where the source's fit holds."""
        return (ConditionRange("temperature", *self.temperature_range, "K", self.temperature),)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        gigahertz = np.asarray(frequency, dtype=np.float64) * 1e-9
        (alpha, beta), _ = self._loss_constants()
        falling, rising, cubic = alpha / gigahertz, beta * gigahertz, _B2 * gigahertz**3
        permittivity = complex_of(self._real()[0], -(falling + rising + cubic))
        slope = complex_of(0.0, (falling - rising - 3 * cubic) / gigahertz * 1e-9)
        return electric(permittivity, slope)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        gigahertz = np.asarray(frequency, dtype=np.float64) * 1e-9
        _, (alpha, beta) = self._loss_constants()
        slope = complex_of(self._real()[1], -(alpha / gigahertz + beta * gigahertz))
        return electric_slopes(frequency, {"temperature": slope})

    def _real(self) -> tuple[float, float]:
        """Return ε′ and its derivative with respect to T."""
        if self.temperature > 243:
            return 3.1884 + 9.1e-4 * (self.temperature - 273), 9.1e-4
        return 3.1611 + 4.3e-4 * (self.temperature - 243), 4.3e-4

    def _loss_constants(self) -> tuple[tuple[float, float], tuple[float, float]]:
        """Return α and β without its B₂f², and their derivatives with respect to T."""
        kelvin = self.temperature
        theta, theta_change = 300 / kelvin - 1, -300 / kelvin**2
        decay = math.exp(-22.1 * theta)
        alpha = (0.00504 + 0.0062 * theta) * decay
        alpha_change = (0.0062 * decay - 22.1 * alpha) * theta_change
        # e^x/(e^x − 1)² is 1/(4 sinh²(x/2)).
        half = 335 / kelvin / 2
        lattice = 0.0207 / kelvin / (4 * math.sinh(half) ** 2)
        lattice_change = lattice / kelvin * (2 * half / math.tanh(half) - 1)
        warmth = math.exp(-9.963 + 0.0372 * (kelvin - 273.16))
        return (alpha, lattice + warmth), (alpha_change, lattice_change + 0.0372 * warmth)


_B2: Final = 1.16e-11
"""1/GHz³, the wing of the absorption in the infrared."""
