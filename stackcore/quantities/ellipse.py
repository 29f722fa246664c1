"""How a wave's polarization leaves a stack: co- and cross-polar parts, discrimination, axial ratio.

With d = ln(TM amplitude/TE amplitude) of what the stack does, a circular wave passes with the parts cosh(d/2)
and sinh(d/2) of the geometric mean: the cross-polar discrimination is −20 log₁₀ |tanh(d/2)|.
"""

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.polarizations import Polarization
from stackcore.propagation import Response
from stackcore.quantities.amplitudes import NEPER_DB, Sum, ratio_nepers, reflected, transmitted, weighted

_LARGE = 20.0
"""Beyond this sinh x is e^x/2 to the last digit."""


def copolar_transmittance_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return 10 log₁₀ of the part of the incident power that passes co-polar."""
    return _decibels(weighted(transmitted(response), polarization.copolar()))


def crosspolar_transmittance_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return 10 log₁₀ of the part of the incident power that passes cross-polar; −inf where none does."""
    return _decibels(weighted(transmitted(response), polarization.crosspolar()))


def copolar_reflectance_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return 10 log₁₀ of the part of the incident power that is reflected co-polar."""
    return _decibels(weighted(reflected(response), polarization.copolar(reflected=True)))


def crosspolar_reflectance_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return 10 log₁₀ of the part of the incident power that is reflected cross-polar."""
    return _decibels(weighted(reflected(response), polarization.crosspolar(reflected=True)))


def cross_polar_discrimination_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return co-polar over cross-polar transmitted power in dB; NaN where nothing passes."""
    logs = transmitted(response)
    co = weighted(logs, polarization.copolar()).size
    cross = weighted(logs, polarization.crosspolar()).size
    passes = np.isfinite(co) | np.isfinite(cross)
    return np.where(passes, NEPER_DB * (np.where(passes, co, 0.0) - np.where(passes, cross, 0.0)), np.nan)


def transmitted_axial_ratio_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return the axial ratio of the transmitted wave in dB; `inf` for a linear one, NaN where nothing passes."""
    return _axial_ratio_dB(transmitted(response), polarization)


def reflected_axial_ratio_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return the axial ratio of the reflected wave in dB; `inf` for a linear one, NaN where there is none."""
    return _axial_ratio_dB(reflected(response), polarization)


def transmission_phase_difference_deg(response: Response) -> FloatArray:
    """Return arg t of TE minus that of TM in degrees, −180 to 180, (F, A, 2), the same for both."""
    return _difference_deg(transmitted(response))


def reflection_phase_difference_deg(response: Response) -> FloatArray:
    """Return arg r of TE minus that of TM in degrees, −180 to 180, (F, A, 2), the same for both."""
    return _difference_deg(reflected(response))


def _decibels(part: Sum) -> FloatArray:
    return np.asarray(NEPER_DB * part.size + 0.0)


def _axial_ratio_dB(logs: ComplexArray, polarization: Polarization) -> FloatArray:
    """Return 20 log₁₀ of the axes of the ellipse; which way it turns does not matter.

    With TM/TE = e^(a + jb) the ellipse has sin 2χ = sin b/cosh a and the axial ratio cot |χ| (M. Born, E. Wolf,
    Principles of Optics, section 1.4.2); as the sum u + √(1 + u²), u = √(sinh²a + cos²b)/|sin b|, it has its
    digits near 1 too.
    """
    size = ratio_nepers(logs)
    if polarization.single is not None:
        return np.where(np.isnan(size), np.nan, np.inf)
    incident = polarization.ratio
    unit = incident / abs(incident)
    a = np.abs(size + np.log(abs(incident)))
    turn = logs.imag[..., 1] - logs.imag[..., 0]
    sine = np.abs(unit.real * np.sin(turn) + unit.imag * np.cos(turn))
    cosine = unit.real * np.cos(turn) - unit.imag * np.sin(turn)
    moderate = np.where(a < _LARGE, a, 0.0)
    with np.errstate(divide="ignore"):
        near = np.arcsinh(np.hypot(np.sinh(moderate), cosine) / sine)
        ratio = np.where(a < _LARGE, near, a - np.log(sine))
    return np.where(np.isnan(size), np.nan, NEPER_DB * ratio)


def _difference_deg(logs: ComplexArray) -> FloatArray:
    te, tm = logs.imag[..., 0], logs.imag[..., 1]
    turn = te - tm
    turn = turn - 2 * np.pi * np.rint(turn / (2 * np.pi))
    known = np.isfinite(logs.real).all(axis=-1)
    difference = np.where(known, np.degrees(turn) + 0.0, np.nan)
    return np.stack([difference, difference], axis=-1)
