"""Holds a response of the solver against the 50-digit answer."""

from dataclasses import dataclass

import mpmath
import numpy as np

from stackcore.stack import Layer, PerfectConductor
from tests.exact import Exact, exact, relative_error
from tests.strategies import Case

TOLERANCE = 1e-10
BOTTOM = 1e-290  # below it a double has lost digits, or holds nothing at all
NO_REFLECTION = 1e-90  # the reference holds r, a difference of numbers near 1, to 50 digits: this is 0 to it


@dataclass(frozen=True, slots=True)
class Miss:
    """A quantity further from the truth than allowed."""

    name: str
    polarization: str
    got: float
    right: float
    error: float

    def __str__(self) -> str:
        return f"{self.name} {self.polarization}: got {self.got!r}, right {self.right!r}, error {self.error:.2e}"


def misses(case: Case) -> list[Miss]:
    """Return every quantity of `case` that is off by more than the tolerance; an empty list when all is well."""
    response = case.solve()
    found: list[Miss] = []
    for p, (name, truth) in enumerate(
        zip(("TE", "TM"), exact(case.stack, case.frequency, case.angle), strict=True)
    ):
        rows = [
            ("reflectance", response.reflectance, truth.reflectance),
            ("transmittance", response.transmittance, truth.transmittance),
            ("absorptance", response.absorptance, truth.absorptance),
        ]
        for quantity, got, right in rows:
            found += _power_miss(quantity, name, float(got[0, 0, p]), right, case)
        for quantity, got, right in (
            ("shielding", response.shielding_effectiveness_dB, truth.shielding_effectiveness_dB),
            ("insertion loss", response.insertion_loss_dB, truth.shielding_effectiveness_dB),
            ("return loss", response.return_loss_dB, truth.return_loss_dB),
        ):
            found += _decibel_miss(quantity, name, float(got[0, 0, p]), right, case)
        found += _reflection_phase_miss(name, float(response.reflection_phase_deg[0, 0, p]), truth, case)
        if not isinstance(case.stack.back, PerfectConductor):
            delay = float(response.insertion_phase_delay_deg[0, 0, p])
            log_t = complex(response.log_transmission[0, 0, p])
            found += _phase_miss(name, delay, truth, case, log_t)
    return found


def report(case: Case, found: list[Miss]) -> str:
    """Return what a person needs to look into the misses of `case`."""
    return "\n".join([repr(case), *(str(miss) for miss in found)])


def lossless(case: Case) -> bool:
    """Return whether nothing in the stack absorbs: every layer and sheet is lossless."""
    for element in case.stack.elements:
        if isinstance(element, Layer):
            values = element.medium.evaluate(np.array(case.frequency))
            if complex(values.permittivity).imag or complex(values.permeability).imag:
                return False
        elif complex(element.sheet.impedance(np.array(case.frequency))).real:
            return False
    return True


def null_floor(case: Case) -> float:
    """Return the reflectance that one unit in the last place of every thickness can make of a perfect null.

    An exactly half-wave layer reflects nothing; a double holds its thickness to 1e-16, and the rest reflects.
    """
    k = 2 * np.pi / case.wavelength
    phase = 0.0
    for element in case.stack.elements:
        if isinstance(element, Layer):
            values = element.medium.evaluate(np.array(case.frequency))
            phase += k * element.thickness * float(np.sqrt(np.abs(values.permittivity * values.permeability)))
    return (2.0**-51 * phase) ** 2


def handed_over(case: Case) -> float:
    """Return the relative error of R that comes from a dispersive medium's ε being handed over as a double.

    A conductor far above its collision rate has ε − 1 of 1e-6, of which a double keeps ten digits.
    """
    worst = 0.0
    for element in case.stack.elements:
        if isinstance(element, Layer) and element.medium.dispersive:
            values = element.medium.evaluate(np.array(case.frequency))
            worst = max(worst, 8 * 2.0**-53 / max(abs(complex(values.permittivity) - 1), 2.0**-53))
    return worst


def _power_miss(quantity: str, polarization: str, got: float, right: mpmath.mpf, case: Case) -> list[Miss]:
    """Return the miss of a fraction of power, if it is one."""
    if quantity == "absorptance" and lossless(case):
        return [] if got == 0 else [Miss(quantity, polarization, got, 0.0, float("inf"))]
    # R and A come to the reference as differences of numbers near 1, whose 50-digit π leaves 1e-100 and less.
    bottom = BOTTOM if quantity == "transmittance" else NO_REFLECTION
    if right < bottom:
        return [] if 0 <= got <= 2 * bottom else [Miss(quantity, polarization, got, float(right), float("inf"))]
    error = relative_error(got, right)
    forgiven = error <= handed_over(case) or abs(got - float(right)) <= null_floor(case)
    if quantity == "reflectance" and forgiven:
        return []
    # At a node of the field a sheet of a milliohm takes 4 Z₀/R times what that unit lets through.
    if quantity == "absorptance" and abs(got - float(right)) <= 1e7 * null_floor(case):
        return []
    return [Miss(quantity, polarization, got, float(right), error)] if not error <= TOLERANCE else []


def _decibel_miss(quantity: str, polarization: str, got: float, right: mpmath.mpf, case: Case) -> list[Miss]:
    """Return the miss of a number of decibels: relative to it, or to 1 dB when it is less."""
    if quantity == "return loss" and right > 900:  # no reflection to the reference, see NO_REFLECTION
        return [] if got > 900 else [Miss(quantity, polarization, got, float(right), float("inf"))]
    if right == mpmath.inf:
        return [] if got == np.inf else [Miss(quantity, polarization, got, np.inf, float("inf"))]
    if quantity == "return loss":
        reflected, truth = 10.0 ** (-got / 10), float(10 ** (-right / 10))
        if abs(reflected - truth) <= max(null_floor(case), handed_over(case) * truth):
            return []
    error = float(abs(mpmath.mpf(got) - right) / max(1, abs(right)))
    return [Miss(quantity, polarization, got, float(right), error)] if not error <= TOLERANCE else []


def _reflection_phase_miss(polarization: str, got: float, truth: Exact, case: Case) -> list[Miss]:
    """Return the miss of the phase of r, modulo 360 degrees, where anything is reflected: 1e-7 degrees."""
    if truth.reflectance < NO_REFLECTION:
        return []
    right = mpmath.degrees(mpmath.arg(truth.reflection))
    turns = mpmath.mpf(got) - right
    error = float(abs(turns - 360 * mpmath.nint(turns / 360)))
    allowed = 1e-7 + np.degrees(min(np.pi, float(mpmath.sqrt(null_floor(case) / truth.reflectance))))
    return [Miss("reflection phase", polarization, got, float(right), error)] if not error <= allowed else []


def _phase_miss(polarization: str, got: float, truth: Exact, case: Case, log_t: complex) -> list[Miss]:
    """Return the miss of the insertion phase delay, modulo 360 degrees.

    It is the difference of two phases that may each be millions of turns, and a double cannot hold such numbers
    more finely than their spacing.
    """
    turns = mpmath.mpf(got) - truth.insertion_phase_delay_deg
    error = float(abs(turns - 360 * mpmath.nint(turns / 360)))
    right = float(truth.insertion_phase_delay_deg)
    air = 360 * case.stack.thickness / case.wavelength
    largest = max(abs(got), abs(float(np.degrees(log_t.imag))), air)
    allowed = 1e-8 + 4 * float(np.spacing(largest))
    return [Miss("insertion phase delay", polarization, got, right, error)] if not error <= allowed else []
