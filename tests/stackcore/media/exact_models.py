"""Every model to 60 digits, written out from its published formula: shares nothing with the code but the fields.

Each function returns the terms of ε or μ, whose sum is the value: how much of it can cancel is seen from them.
"""

from collections.abc import Callable
from typing import Any

import mpmath

from stackcore.constants import (
    ELECTRON_MASS,
    ELEMENTARY_CHARGE,
    SPEED_OF_LIGHT,
    VACUUM_PERMEABILITY,
    VACUUM_PERMITTIVITY,
)
from stackcore.media.base import AbstractMedium
from stackcore.media.cauchy import CauchyMedium
from stackcore.media.cole_cole import ColeColeMedium
from stackcore.media.cole_davidson import ColeDavidsonMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.havriliak_negami import HavriliakNegamiMedium
from stackcore.media.lorentz import LorentzMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from stackcore.media.magnetic import MagneticMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.magnetic_lorentz import MagneticLorentzMedium
from stackcore.media.multi_debye import MultiDebyeMedium
from stackcore.media.multi_lorentz import MultiLorentzMedium
from stackcore.media.plasma import PlasmaMedium
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.sellmeier import SellmeierMedium
from stackcore.media.wideband import WidebandMedium, WidebandStepMedium

MP = mpmath.MPContext()
MP.dps = 60
J = MP.mpc(0, 1)
Number = Any  # mpmath has no type information
Terms = list[Number]


def _omega(f: Number) -> Number:
    return 2 * MP.pi * f


def _conduction(sigma: float, f: Number) -> Number:
    return -J * MP.mpf(sigma) / (_omega(f) * MP.mpf(VACUUM_PERMITTIVITY))


def _relaxation(step: float, time: float, f: Number, a: float = 1.0, b: float = 1.0) -> Number:
    x = _omega(f) * MP.mpf(time)
    turned = x ** MP.mpf(a) * MP.expj(MP.mpf(a) * MP.pi / 2)
    return MP.mpf(step) / (1 + turned) ** MP.mpf(b)


def _resonance(step: float, place: float, width: float, f: Number) -> Number:
    place = MP.mpf(place)
    return MP.mpf(step) * place**2 / (place**2 - f**2 + J * f * MP.mpf(width))


def _carriers(omega_squared: Number, rate: float, f: Number) -> Number:
    return -omega_squared / (_omega(f) * (_omega(f) - J * MP.mpf(rate)))


def _logarithm(f: Number, lower: float, upper: float) -> Number:
    return MP.log((MP.mpf(upper) + J * f) / (MP.mpf(lower) + J * f))


def _conductor(m: ConductorMedium, f: Number) -> Terms:
    mu = MP.mpf(VACUUM_PERMEABILITY) * MP.mpf(complex(m.permeability).real)
    factor = MP.mpf(1)
    if m.roughness:
        ratio = MP.mpf(m.roughness) * MP.sqrt(MP.pi * f * mu * MP.mpf(m.conductivity))
        if m.roughness_rule == "groiss":
            factor = 1 + MP.exp(-((1 / (2 * ratio)) ** MP.mpf(1.6)))
        else:
            factor = 1 + 2 / MP.pi * MP.atan(MP.mpf(1.4) * ratio**2)
    slowed = 1 + J * _omega(f) * MP.mpf(m.relaxation_time)
    return [MP.mpf(1), _conduction(m.conductivity, f) / slowed / factor**2]


def _lossy(m: LossyDielectricMedium, f: Number) -> Terms:
    real = MP.mpf(m.permittivity)
    loss = MP.mpf(m.loss_part) if m.loss_part is not None else real * MP.mpf(m.loss_tangent or 0.0)
    return [real, -J * loss, _conduction(m.conductivity, f)]


def _wideband(m: WidebandMedium, f: Number) -> Terms:
    there = _logarithm(MP.mpf(m.reference_frequency), m.lower_frequency, m.upper_frequency)
    here = _logarithm(f, m.lower_frequency, m.upper_frequency)
    factor = MP.mpf(m.permittivity) * MP.mpf(m.loss_tangent) / -there.imag
    return [MP.mpf(m.permittivity), -factor * there.real, factor * here]


def _wideband_step(m: WidebandStepMedium, f: Number) -> Terms:
    nepers = MP.log(MP.mpf(m.upper_frequency) / MP.mpf(m.lower_frequency))
    step = MP.mpf(m.permittivity_step) / nepers
    return [MP.mpf(m.high_frequency_permittivity), step * _logarithm(f, m.lower_frequency, m.upper_frequency)]


def _drude_lorentz(m: DrudeLorentzMedium, f: Number) -> Terms:
    carriers = _carriers(_omega(MP.mpf(m.plasma_frequency)) ** 2, m.collision_rate, f)
    bound = [_resonance(t.permittivity_step, t.resonance_frequency, t.linewidth, f) for t in m.terms]
    return [MP.mpf(m.high_frequency_permittivity), carriers, *bound]


def _plasma(m: PlasmaMedium, f: Number) -> Terms:
    charge, mass = MP.mpf(ELEMENTARY_CHARGE), MP.mpf(ELECTRON_MASS)
    omega_squared = MP.mpf(m.electron_density) * charge**2 / (MP.mpf(VACUUM_PERMITTIVITY) * mass)
    return [MP.mpf(1), _carriers(omega_squared, m.collision_rate, f)]


def _power_law(m: PowerLawMedium, f: Number) -> Terms:
    gigahertz = f / 10**9
    sigma = MP.mpf(m.conductivity) * gigahertz ** MP.mpf(m.conductivity_exponent)
    real = MP.mpf(m.permittivity) * gigahertz ** MP.mpf(m.permittivity_exponent)
    return [real, _conduction(1.0, f) * sigma]


def _sellmeier(m: SellmeierMedium, f: Number) -> Terms:
    wavelength = MP.mpf(SPEED_OF_LIGHT) / f
    terms = [MP.mpf(t.strength) * wavelength**2 / (wavelength**2 - MP.mpf(t.pole_wavelength) ** 2) for t in m.terms]
    return [MP.mpf(m.constant), MP.mpf(m.quadratic) * (wavelength * 10**6) ** 2, *terms]


def _cauchy(m: CauchyMedium, f: Number) -> Terms:
    micrometres = MP.mpf(SPEED_OF_LIGHT) / f * 10**6
    series = [MP.mpf(m.constant), *(MP.mpf(t.coefficient) * micrometres**t.exponent for t in m.terms)]
    total = abs(sum(series))
    index = MP.sqrt(total) if m.squared else total
    extinction = MP.mpf(m.extinction)
    return [index**2, -(extinction**2), -2 * J * index * extinction]


PERMITTIVITY: dict[type, Callable[[Any, Number], Terms]] = {
    ConstantMedium: lambda m, f: [MP.mpc(m.permittivity)],
    ConductorMedium: _conductor,
    LossyDielectricMedium: _lossy,
    DebyeMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        _relaxation(m.permittivity_step, m.relaxation_time, f),
        _conduction(m.conductivity, f),
    ],
    MultiDebyeMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        *(_relaxation(t.permittivity_step, t.relaxation_time, f) for t in m.terms),
        _conduction(m.conductivity, f),
    ],
    ColeColeMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        _relaxation(m.permittivity_step, m.relaxation_time, f, a=m.symmetric_exponent),
        _conduction(m.conductivity, f),
    ],
    ColeDavidsonMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        _relaxation(m.permittivity_step, m.relaxation_time, f, b=m.asymmetric_exponent),
        _conduction(m.conductivity, f),
    ],
    HavriliakNegamiMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        _relaxation(m.permittivity_step, m.relaxation_time, f, m.symmetric_exponent, m.asymmetric_exponent),
        _conduction(m.conductivity, f),
    ],
    WidebandMedium: _wideband,
    WidebandStepMedium: _wideband_step,
    LorentzMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        _resonance(m.permittivity_step, m.resonance_frequency, m.linewidth, f),
    ],
    MultiLorentzMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        *(_resonance(t.permittivity_step, t.resonance_frequency, t.linewidth, f) for t in m.terms),
    ],
    DrudeMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permittivity),
        _carriers(_omega(MP.mpf(m.plasma_frequency)) ** 2, m.collision_rate, f),
    ],
    DrudeLorentzMedium: _drude_lorentz,
    PlasmaMedium: _plasma,
    PowerLawMedium: _power_law,
    SellmeierMedium: _sellmeier,
    CauchyMedium: _cauchy,
}

PERMEABILITY: dict[type, Callable[[Any, Number], Terms]] = {
    ConstantMedium: lambda m, f: [MP.mpc(m.permeability)],
    ConductorMedium: lambda m, f: [MP.mpc(m.permeability)],
    LossyDielectricMedium: lambda m, f: [MP.mpc(m.permeability)],
    MagneticDebyeMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permeability),
        _relaxation(m.permeability_step, m.relaxation_time, f),
    ],
    MagneticLorentzMedium: lambda m, f: [
        MP.mpf(m.high_frequency_permeability),
        _resonance(m.permeability_step, m.resonance_frequency, m.linewidth, f),
    ],
}


def exact_terms(medium: AbstractMedium, quantity: str, frequency: float) -> Terms:
    """Return the terms of ``permittivity`` or ``permeability`` of `medium` at `frequency` in Hz."""
    if isinstance(medium, MagneticMedium):
        part = medium.permittivity_from if quantity == "permittivity" else medium.permeability_from
        return exact_terms(part, quantity, frequency)
    formulas = PERMITTIVITY if quantity == "permittivity" else PERMEABILITY
    formula = formulas.get(type(medium))
    return [MP.mpf(1)] if formula is None else formula(medium, MP.mpf(frequency))
