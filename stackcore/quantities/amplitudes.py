"""Amplitudes of a wave that has a TE and a TM part, as logarithms, so that a wall of any depth has them.

Amplitudes are full fields normalised to power: |amplitude|² is the part of the incident power. Between different
half-spaces the tangential field of TM is not the full one (it is cos θ of it), so that r and t of the solver may
not be added as they are. Weights come from `stackcore.polarizations`.
"""

import math
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.polarizations import Polarization
from stackcore.propagation import Response

NEPER_DB: Final = 20 / math.log(10)
"""Decibels of a factor e of the field."""


@dataclass(frozen=True, slots=True, eq=False)
class Sum:
    """A weighted sum of the TE and TM amplitudes.

    Attributes
    ----------
    size
        ln of its absolute value, (F, A); −inf where it is 0.
    fractions
        The complex parts that TE and TM have in it, (F, A, 2); they add up to 1, and are NaN where it is 0.
    phase
        Its phase in rad, −π to π, (F, A); NaN where it is 0.
    """

    size: FloatArray
    fractions: ComplexArray
    phase: FloatArray


def transmitted(response: Response) -> ComplexArray:
    """Return ln of the transmitted amplitudes, (F, A, 2); −inf where no wave runs behind the stack."""
    found = np.empty(response.log_transmission.shape, dtype=np.complex128)
    found.real = 0.5 * response.log_transmittance
    found.imag = response.log_transmission.imag
    return _alike_at_normal(response, found)


def reflected(response: Response) -> ComplexArray:
    """Return ln of the reflected amplitudes, (F, A, 2); −inf where nothing is reflected."""
    reflection = response.reflection
    found = np.empty(reflection.shape, dtype=np.complex128)
    with np.errstate(divide="ignore"):
        found.real = np.log(np.abs(reflection))
    found.imag = np.angle(reflection)
    return _alike_at_normal(response, found)


def weighted(logs: ComplexArray, weights: tuple[float, float]) -> Sum:
    """Return the sum of amplitudes e^`logs`, (F, A, 2), with `weights` for TE and TM."""
    te, tm = weights
    top = np.max(logs.real, axis=-1)
    top = np.where(np.isfinite(top), top, 0.0)
    scaled = np.exp(logs - top[..., np.newaxis])
    total = te * scaled[..., 0] + tm * scaled[..., 1]
    if te == -tm:
        # Two amplitudes that hardly differ: their difference from the difference of the logarithms.
        near, step = _small_step(logs)
        total = np.where(near, tm * scaled[..., 0] * np.expm1(step), total)
    none = total == 0
    with np.errstate(divide="ignore"):
        size = np.log(np.abs(total)) + top
    parts = np.array(weights) * scaled / np.where(none, 1.0, total)[..., np.newaxis]
    return Sum(
        size,
        np.where(none[..., np.newaxis], complex(np.nan, np.nan), parts),
        np.where(none, np.nan, np.angle(total)),
    )


def ratio_nepers(logs: ComplexArray) -> FloatArray:
    """Return ln |TM amplitude/TE amplitude|, (F, A); NaN where both are 0."""
    te, tm = logs.real[..., 0], logs.real[..., 1]
    known = np.isfinite(te) | np.isfinite(tm)
    return np.where(known, np.where(known, tm, 0.0) - np.where(known, te, 0.0), np.nan)


def power_mean(values: FloatArray, polarization: Polarization) -> FloatArray:
    """Return the mean of a fraction of power (F, A, 2) over the TE and TM power of the incident wave, (F, A)."""
    te, tm = polarization.power_shares
    mean: FloatArray = te * values[..., 0] + tm * values[..., 1]
    return mean


def mean_loss_dB(losses: FloatArray, weights: FloatArray) -> FloatArray:
    """Return the loss in dB of a power whose parts have the `losses` in dB, (F, A, 2).

    Parameters
    ----------
    losses
        −10 log₁₀ of the part left of each part; `inf` where nothing is left, negative for a gain.
    weights
        The parts of the power before the loss, (F, A, 2), adding up to 1.

    Notes
    -----
    A small mean is summed from the parts' 1 − e^(−L), a large one from the smallest loss down, so that 1e-12 dB
    and 1e5 dB both keep their digits.
    """
    nepers = losses * (2 / NEPER_DB)
    least = np.min(np.where(weights > 0, nepers, np.inf), axis=-1)
    start = np.where(np.isfinite(least), least, 0.0)
    gained = np.sum(weights * np.expm1(-np.maximum(nepers, -1.0)), axis=-1)
    small = (start > -1) & (gained > -0.5)
    left = np.sum(weights * np.exp(-np.maximum(nepers - start[..., np.newaxis], 0.0)), axis=-1)
    mean = np.where(small, -np.log1p(np.where(small, gained, 0.0)), start - np.log(np.where(left > 0, left, 1.0)))
    return np.asarray(np.where(np.isfinite(least), mean, np.inf) * (NEPER_DB / 2) + 0.0)


def _small_step(logs: ComplexArray) -> tuple[np.ndarray[tuple[int, ...], np.dtype[np.bool_]], ComplexArray]:
    """Return where TE and TM hardly differ, and ln(TM/TE) there (0 elsewhere), both (F, A)."""
    step = np.zeros(logs.shape[:-1], dtype=np.complex128)
    known = np.isfinite(logs.real).all(axis=-1)
    step[known] = logs[known, 1] - logs[known, 0]
    step.imag -= 2 * np.pi * np.rint(step.imag / (2 * np.pi))
    near = known & (np.abs(step) < 1)
    return near, np.where(near, step, 0.0)


def _alike_at_normal(response: Response, logs: ComplexArray) -> ComplexArray:
    """Make TM the very same as TE at normal incidence, where they are one wave and differ by rounding alone."""
    normal = response.angle == 0
    logs[:, normal, 1] = logs[:, normal, 0]
    return logs
