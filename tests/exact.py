"""The answer to 50 digits, by a second method: plain 2×2 characteristic matrices in mpmath.

It shares nothing with the solver but the fields of the frozen media, sheets and stacks. Every input double is
taken exactly. A layer carries the tangential fields from its back face to its front face,

    E' = cos(φ) E + j X s H,   H' = j B s E + cos(φ) H,   φ = k₀ q d,   s = sin(φ)/q,
    TE: X = μ, B = q²/μ;   TM: X = q²/ε, B = ε;   q² = εμ − ε₀μ₀ sin²θ,

with H in units of E over the impedance of free space (M. Born and E. Wolf, Principles of Optics, section 1.6).
Going from the back to the front, growing exponentials only outgrow what does not matter; the digits they eat
from net power are added beforehand.
"""

from dataclasses import dataclass
from typing import Any

import mpmath

from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.sheets.base import AbstractSheet
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import Layer, PerfectConductor, Stack

Number = Any  # mpmath has no type information
MOST_EXTRA_DIGITS = 400  # powers below 1e-308 of the incident one are below the double range


@dataclass(frozen=True, slots=True)
class Exact:
    """Everything about one stack, frequency, angle and polarization, as mpmath numbers.

    `bare_transmission` is t without the stack: the bare meeting of the two half-spaces (0 before a metal back).
    """

    reflection: Number
    transmission: Number
    bare_transmission: Number
    reflectance: Number
    transmittance: Number
    absorptance: Number
    element_absorptance: tuple[Number, ...]
    insertion_phase_delay_deg: Number

    @property
    def shielding_effectiveness_dB(self) -> Number:
        """20 log10 |t without the stack / t with it|; infinite when nothing comes through."""
        if self.transmission == 0:
            return mpmath.inf
        return 20 * mpmath.log10(abs(self.bare_transmission / self.transmission))

    @property
    def return_loss_dB(self) -> Number:
        """-10 log10 R; infinite when nothing is reflected."""
        return -10 * mpmath.log10(self.reflectance) if self.reflectance else mpmath.inf


def exact(stack: Stack, frequency: float, angle: float, *, digits: int = 50) -> tuple[Exact, Exact]:
    """Return the answers for TE and TM at `frequency` in Hz and `angle` in rad, right to about `digits` digits."""
    mp = mpmath.MPContext()
    mp.dps = digits + 15
    f = mp.mpf(frequency)
    mp.dps += min(int(0.87 * _nepers(mp, stack, f, angle)) + 1, MOST_EXTRA_DIGITS)
    te, tm = (_answer(mp, stack, f, angle, polarization) for polarization in ("TE", "TM"))
    return te, tm


def exact_group_delay(stack: Stack, frequency: float, angle: float) -> tuple[Number, Number]:
    """Return −d(arg t)/dω in s for TE and TM, by a central difference with a relative step of 1e-20."""
    mp = mpmath.MPContext()
    mp.dps = 100
    f = mp.mpf(frequency)
    step = f * mp.mpf(10) ** -20
    delays = []
    for polarization in ("TE", "TM"):
        later = _answer(mp, stack, f + step, angle, polarization).transmission
        sooner = _answer(mp, stack, f - step, angle, polarization).transmission
        delays.append(-mp.log(later / sooner).imag / (4 * mp.pi * step))
    return delays[0], delays[1]


def relative_error(got: float, right: Number) -> float:
    """Return |got − right| / |right| as a float; 0 when both are 0 and infinite when only `right` is."""
    difference = abs(mpmath.mpmathify(float(got)) - right)
    if difference == 0:
        return 0.0
    return float(difference / abs(right)) if right else float("inf")


def constitutive(mp: Any, medium: AbstractMedium, f: Number) -> tuple[Number, Number]:
    """Return relative ε and μ of `medium` from its fields."""
    if isinstance(medium, ConstantMedium):
        return mp.mpc(medium.permittivity), mp.mpc(medium.permeability)
    if isinstance(medium, ConductorMedium) and medium.roughness == 0:
        omega = 2 * mp.pi * f
        slowed = mp.mpf(medium.conductivity) / mp.mpc(1, omega * mp.mpf(medium.relaxation_time))
        return 1 - mp.j * slowed / (omega * mp.mpf(VACUUM_PERMITTIVITY)), mp.mpc(medium.permeability)
    raise TypeError(f"no exact form of {type(medium).__name__} here")


def sheet_admittance(mp: Any, sheet: AbstractSheet, f: Number) -> Number:
    """Return the admittance of `sheet`, in units of that of free space."""
    if not isinstance(sheet, SeriesSheet):
        raise TypeError(f"no exact form of {type(sheet).__name__} here")
    omega = 2 * mp.pi * f
    reactance = omega * mp.mpf(sheet.inductance)
    if sheet.capacitance is not None:
        reactance -= 1 / (omega * mp.mpf(sheet.capacitance))
    return mp.mpf(FREE_SPACE_IMPEDANCE) / mp.mpc(mp.mpf(sheet.resistance), reactance)


def wave_admittance(mp: Any, eps: Number, mu: Number, q_squared: Number, polarization: str) -> Number:
    """Return the admittance of the wave that leaves into a half-space, in units of that of free space."""
    q = mp.sqrt(q_squared)
    if q.imag > 0 or (q.imag == 0 and (q / mu).real < 0):
        q = -q
    return q / mu if polarization == "TE" else eps / q


def _nepers(mp: Any, stack: Stack, f: Number, angle: float) -> float:
    """Return the attenuation along all layers, sum of |Im φ|."""
    eps, mu = constitutive(mp, stack.front, f)
    sine_squared = (eps * mu).real * mp.sin(mp.mpf(angle)) ** 2
    k0 = 2 * mp.pi * f / mp.mpf(SPEED_OF_LIGHT)
    total = mp.mpf(0)
    for element in stack.elements:
        if isinstance(element, Layer):
            eps, mu = constitutive(mp, element.medium, f)
            total += abs((mp.sqrt(eps * mu - sine_squared) * k0 * mp.mpf(element.thickness)).imag)
    return float(total)


def _answer(mp: Any, stack: Stack, f: Number, angle: float, polarization: str) -> Exact:
    """Return the exact answer in the context `mp`, whose digits are set."""
    theta = mp.mpf(angle)
    eps0, mu0 = constitutive(mp, stack.front, f)
    sine_squared = (eps0 * mu0).real * mp.sin(theta) ** 2
    k0 = 2 * mp.pi * f / mp.mpf(SPEED_OF_LIGHT)
    y_front = wave_admittance(mp, eps0, mu0, (eps0 * mu0).real * mp.cos(theta) ** 2, polarization).real
    if isinstance(stack.back, PerfectConductor):
        electric, magnetic, bare = mp.mpc(0), mp.mpc(1), mp.mpc(0)
    else:
        eps, mu = constitutive(mp, stack.back, f)
        y_back = wave_admittance(mp, eps, mu, eps * mu - sine_squared, polarization)
        electric, magnetic, bare = mp.mpc(1), y_back, 2 * y_front / (y_front + y_back)
    flows = [(electric * mp.conj(magnetic)).real]
    for element in reversed(stack.elements):
        if isinstance(element, Layer):
            eps, mu = constitutive(mp, element.medium, f)
            cosine, x, b = _layer(
                mp, eps, mu, eps * mu - sine_squared, k0 * mp.mpf(element.thickness), polarization
            )
            electric, magnetic = cosine * electric + x * magnetic, b * electric + cosine * magnetic
        else:
            magnetic = magnetic + sheet_admittance(mp, element.sheet, f) * electric
        flows.append((electric * mp.conj(magnetic)).real)
    entering = y_front * electric + magnetic
    scale = 4 * y_front / abs(entering) ** 2  # turns E H* into a fraction of the incident power
    reflection = (y_front * electric - magnetic) / entering
    no_way_out = isinstance(stack.back, PerfectConductor)
    transmission = mp.mpc(0) if no_way_out else 2 * y_front / entering
    displaced = k0 * sum((mp.mpf(e.thickness) for e in stack.elements if isinstance(e, Layer)), mp.mpf(0))
    delay = -mp.degrees(mp.arg(transmission) + displaced * mp.cos(theta)) if transmission else mp.nan
    return Exact(
        reflection=reflection,
        transmission=transmission,
        bare_transmission=bare,
        reflectance=abs(reflection) ** 2,
        transmittance=flows[0] * scale,
        absorptance=(flows[-1] - flows[0]) * scale,
        element_absorptance=tuple((flows[i + 1] - flows[i]) * scale for i in reversed(range(len(flows) - 1))),
        insertion_phase_delay_deg=delay,
    )


def _layer(
    mp: Any, eps: Number, mu: Number, q_squared: Number, k0_d: Number, polarization: str
) -> tuple[Number, Number, Number]:
    """Return cos φ and the two off-diagonal entries of a layer's characteristic matrix."""
    if q_squared == 0:
        cosine, s = mp.mpf(1), k0_d
    else:
        q = mp.sqrt(q_squared)
        cosine, sine = mp.cos_sin(q * k0_d)
        s = sine / q
    if polarization == "TE":
        return cosine, mp.j * mu * s, mp.j * q_squared / mu * s
    return cosine, mp.j * q_squared / eps * s, mp.j * eps * s
