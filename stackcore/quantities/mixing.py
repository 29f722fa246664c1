"""The quantities of the CSV for a wave that has a TE and a TM part, (F, A) each.

Powers add with the powers of the parts; phases and delays are those of the co-polar part.
"""

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.polarizations import Polarization
from stackcore.propagation import Response
from stackcore.quantities.amplitudes import NEPER_DB, mean_loss_dB, power_mean, reflected, transmitted, weighted


def reflectance(response: Response, polarization: Polarization) -> FloatArray:
    """Return the reflected part of the incident power."""
    return power_mean(response.reflectance, polarization)


def transmittance(response: Response, polarization: Polarization) -> FloatArray:
    """Return the part of the incident power that enters the half-space behind."""
    return power_mean(response.transmittance, polarization)


def absorptance(response: Response, polarization: Polarization) -> FloatArray:
    """Return the part of the incident power lost in the stack."""
    return power_mean(response.absorptance, polarization)


def return_loss_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return −10 log₁₀ of the reflectance of the whole wave."""
    losses = response.return_loss_dB
    return mean_loss_dB(losses, np.broadcast_to(polarization.power_shares, losses.shape))


def insertion_loss_dB(response: Response, polarization: Polarization) -> FloatArray:
    """Return 10 log₁₀ of the power that passes without the stack over that with it."""
    losses = response.insertion_loss_dB
    return mean_loss_dB(losses, _bare_shares(response, polarization))


def _bare_shares(response: Response, polarization: Polarization) -> FloatArray:
    """Return how the power that would pass the bare half-spaces is shared between TE and TM, (F, A, 2).

    Where no power passes them (beyond the critical angle) the squares of the tangential fields stand for it.
    """
    bare = response.bare_transmittance
    losses, left = response.insertion_loss_dB, response.log_transmission.real
    known = np.isfinite(losses) & np.isfinite(left)
    fields = np.where(known, left, 0.0) + np.where(known, losses, 0.0) / NEPER_DB
    fields = np.exp(2 * (fields - fields.max(axis=-1, keepdims=True)))
    passed = np.array(polarization.power_shares) * np.where(bare.max(axis=-1, keepdims=True) > 0, bare, fields)
    return np.asarray(passed / passed.sum(axis=-1, keepdims=True))


def reflection_phase_deg(response: Response, polarization: Polarization) -> FloatArray:
    """Return the phase of the co-polar reflected amplitude in degrees; NaN where there is none."""
    return np.degrees(weighted(reflected(response), polarization.copolar(reflected=True)).phase)


def transmission_phase_deg(response: Response, polarization: Polarization) -> FloatArray:
    """Return the phase of the co-polar transmitted amplitude in degrees; NaN where there is none."""
    return np.degrees(weighted(transmitted(response), polarization.copolar()).phase)


def insertion_phase_delay_deg(response: Response, polarization: Polarization) -> FloatArray:
    """Return the insertion phase delay of the co-polar part, within a quarter turn of its stronger part's."""
    fractions = weighted(transmitted(response), polarization.copolar()).fractions
    first = np.abs(fractions[..., 0]) >= np.abs(fractions[..., 1])
    delays = response.insertion_phase_delay_deg
    # The sum is the stronger part over its fraction; what the weaker adds turns it by 90° at most.
    stronger = np.where(first, fractions[..., 0], fractions[..., 1])
    return np.where(first, delays[..., 0], delays[..., 1]) + np.degrees(np.angle(stronger))


def group_delay_s(response: Response, polarization: Polarization) -> FloatArray:
    """Return −d(arg)/dω of the co-polar transmitted amplitude in s; NaN where there is none."""
    fractions = weighted(transmitted(response), polarization.copolar()).fractions
    slope = np.sum(fractions * response.amplitude_slope, axis=-1)
    return np.asarray(-slope.imag / (2 * np.pi))
