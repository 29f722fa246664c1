"""Coefficients, standing wave ratio and input impedance."""

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.polarizations import Polarization
from stackcore.propagation import Response
from stackcore.quantities import mixing
from stackcore.quantities.amplitudes import NEPER_DB, reflected, transmitted, weighted


def standing_wave_ratio(return_loss_dB: FloatArray) -> FloatArray:
    """Return (1 + |r|)/(1 − |r|) from a return loss in dB; `inf` at total reflection.

    It is coth of half the return loss in nepers, which has no difference of numbers near 1.

    Examples
    --------
    >>> float(np.round(standing_wave_ratio(np.array(20 * np.log10(3))), 12))  # |r| = 1/3
    2.0
    """
    with np.errstate(divide="ignore"):
        return np.asarray(1 / np.tanh(return_loss_dB / (2 * NEPER_DB)))


def mixed_standing_wave_ratio(response: Response, polarization: Polarization) -> FloatArray:
    """Return the standing wave ratio that belongs to the reflectance of the whole wave."""
    return standing_wave_ratio(mixing.return_loss_dB(response, polarization))


def copolar_reflection(response: Response, polarization: Polarization) -> ComplexArray:
    """Return the co-polar reflected amplitude over the incident one, (F, A)."""
    found = weighted(reflected(response), polarization.copolar(reflected=True))
    return _amplitude(found.size, found.phase)


def copolar_transmission(response: Response, polarization: Polarization) -> ComplexArray:
    """Return the co-polar transmitted amplitude over the incident one, (F, A)."""
    found = weighted(transmitted(response), polarization.copolar())
    return _amplitude(found.size, found.phase)


def transmission_magnitude_dB(response: Response) -> FloatArray:
    """Return 20 log₁₀ |t| of the tangential field, (F, A, 2), finite for a wall of any depth."""
    return np.asarray(NEPER_DB * response.log_transmission.real + 0.0)


def mixed_input_impedance(response: Response) -> ComplexArray:
    """Return the input impedance where TE and TM share it, at normal incidence, and NaN elsewhere, (F, A)."""
    return np.where(response.angle == 0, response.input_impedance[..., 0], complex(np.nan, np.nan))


def magnitude(impedance: ComplexArray) -> FloatArray:
    """Return |Z|; infinite where the face is open."""
    return np.hypot(impedance.real, impedance.imag)


def _amplitude(size: FloatArray, phase: FloatArray) -> ComplexArray:
    known = np.where(np.isnan(phase), 0.0, phase)
    found: ComplexArray = np.exp(size) * (np.cos(known) + 1j * np.sin(known))
    return found
