"""The one table of what can be plotted, read, limited or exported.

Curves, menus, axis titles, CSV columns, the command line and the help pages derive from it; a new quantity is one
more entry.
"""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Final

from stackcore.arrays import FloatArray
from stackcore.propagation import Response


@dataclass(frozen=True, slots=True)
class Quantity:
    """One quantity of a response.

    Parameters
    ----------
    name
        Name of the CSV column and of the attribute of `Response`.
    label
        Words for menus and axes.
    symbol
        The letter the trade uses.
    unit
        ``dB``, ``deg``, ``s``, or empty for a fraction of the incident power.
    definition
        One sentence that says what the number is.
    sign
        One sentence that says which sign or direction it has and what its reference is.
    values
        From a response to an (F, A, 2) array.
    """

    name: str
    label: str
    symbol: str
    unit: str
    definition: str
    sign: str
    values: Callable[[Response], FloatArray]

    @property
    def title(self) -> str:
        """Label with unit, for an axis: ``Insertion loss, dB``."""
        return f"{self.label}, {self.unit}" if self.unit else self.label


QUANTITIES: Final[dict[str, Quantity]] = {
    quantity.name: quantity
    for quantity in (
        Quantity(
            "reflectance",
            "Reflectance",
            "R",
            "",
            "Reflected part of the incident power.",
            "A fraction from 0 to 1, of power, one way.",
            lambda response: response.reflectance,
        ),
        Quantity(
            "transmittance",
            "Transmittance",
            "T",
            "",
            "Part of the incident power that enters the half-space behind the stack.",
            "A fraction from 0 to 1, of power, one way.",
            lambda response: response.transmittance,
        ),
        Quantity(
            "absorptance",
            "Absorptance",
            "A",
            "",
            "Part of the incident power that turns into heat in the stack.",
            "A fraction from 0 to 1, of power; R + T + A = 1.",
            lambda response: response.absorptance,
        ),
        Quantity(
            "return_loss_dB",
            "Return loss",
            "RL",
            "dB",
            "−10 log₁₀ of the reflectance.",
            "Positive decibels of power; more is less reflection.",
            lambda response: response.return_loss_dB,
        ),
        Quantity(
            "insertion_loss_dB",
            "Insertion loss",
            "IL",
            "dB",
            "10 log₁₀ of the transmittance without the stack over the transmittance with it.",
            "Positive decibels of power, one way; without means the bare meeting of the two half-spaces.",
            lambda response: response.insertion_loss_dB,
        ),
        Quantity(
            "shielding_effectiveness_dB",
            "Shielding effectiveness",
            "SE",
            "dB",
            "20 log₁₀ of the tangential electric field at the exit face without the stack over that with it.",
            "Positive decibels of field, for a plane wave on an infinite sheet; seams and apertures govern a room.",
            lambda response: response.shielding_effectiveness_dB,
        ),
        Quantity(
            "reflection_phase_deg",
            "Reflection phase",
            "arg r",
            "deg",
            "Angle of the reflection coefficient of the tangential electric field.",
            "From −180 to 180 degrees, at the front face, for exp(+jωt); a metal plate gives 180.",
            lambda response: response.reflection_phase_deg,
        ),
        Quantity(
            "transmission_phase_deg",
            "Transmission phase",
            "arg t",
            "deg",
            "Angle of the transmission coefficient of the tangential electric field between the outer faces.",
            "From −180 to 180 degrees, for exp(+jωt); a later wave is more negative.",
            lambda response: response.transmission_phase_deg,
        ),
        Quantity(
            "insertion_phase_delay_deg",
            "Insertion phase delay",
            "IPD",
            "deg",
            "−(arg t + k₀·D·cos θ): the phase delay beyond the air that the stack displaces, with all its turns.",
            "Positive is later than the same path in air; D is the total thickness.",
            lambda response: response.insertion_phase_delay_deg,
        ),
        Quantity(
            "group_delay_s",
            "Group delay",
            "τ",
            "s",
            "−d(arg t)/dω between the outer faces, found analytically.",
            "Seconds, positive is later; the total delay, not the excess over air.",
            lambda response: response.group_delay_s,
        ),
    )
}
"""Column name -> quantity, in the order of the CSV columns."""
