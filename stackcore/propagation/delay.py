"""Group delay of the transmission between the outer faces, without differences.

The march itself is differentiated with respect to frequency: every layer takes (E, H) and (dE/df, dH/df)
together, so that the delay depends on no grid. With u = φ² = (kdq)² and S = sin φ / q,

    d(cos φ)/df = −S u′/(2kd),      dS/df = S/f + kd u′ (cos φ − sin φ/φ)/(2u)

which are smooth at q = 0; the factor e^(−β) of the march is carried along as a plain number.
"""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.media.base import AbstractMedium
from stackcore.propagation.blocks import Block, blocks
from stackcore.propagation.march import Step, march, start_fields
from stackcore.propagation.waves import Incidence, Wave
from stackcore.sheets.base import AbstractSheet
from stackcore.stack import Layer, PerfectConductor, Stack

_SMALL_U = 0.04


def amplitude_slope(stack: Stack, frequency: FloatArray, angle: FloatArray) -> ComplexArray:
    """Return d/df of ln(√T e^(j arg t)) per Hz, (2, A, F); 0 behind a metal back, where nothing is transmitted.

    The group delay is −1/(2π) of the imaginary part. The real part is that of the amplitude normalised to power;
    where no wave runs behind the stack it is that of the tangential field.
    """
    slope = np.zeros((2, angle.size, frequency.size), dtype=np.complex128)
    if isinstance(stack.back, PerfectConductor):
        return slope
    for block in blocks(stack, frequency, angle):
        slope[block.place] = _slope_of_block(stack, stack.back, block)
    return slope


@dataclass(frozen=True, slots=True)
class _Slopes:
    """d/df of ε and μ (F or 1), q² (A, F or 1), X and B (2, A, F or 1)."""

    epsilon: ComplexArray
    mu: ComplexArray
    q2: ComplexArray
    x: ComplexArray
    b: ComplexArray


def _slopes(medium: AbstractMedium, wave: Wave, incidence: Incidence, front_index2: ComplexArray) -> _Slopes:
    """Return the slopes of `wave`; `front_index2` is d(ε₀μ₀)/df of the front."""
    values = medium.evaluate(incidence.frequency if medium.dispersive else incidence.frequency[:1])
    epsilon, mu = values.permittivity, values.permeability
    epsilon_slope, mu_slope = values.permittivity_slope, values.permeability_slope
    q2 = epsilon_slope * mu + epsilon * mu_slope - front_index2 * np.sin(incidence.angle) ** 2
    x = np.stack([np.broadcast_to(mu_slope, q2.shape), (q2 - wave.q2 * epsilon_slope / epsilon) / epsilon])
    b = np.stack([(q2 - wave.q2 * mu_slope / mu) / mu, np.broadcast_to(epsilon_slope, q2.shape)])
    return _Slopes(epsilon_slope, mu_slope, q2, x, b)


def _slope_of_block(stack: Stack, back: AbstractMedium, block: Block) -> ComplexArray:
    scene, frequency = block.scene, block.frequency
    assert scene.back is not None
    incidence = scene.incidence
    front = stack.front.evaluate(frequency if stack.front.dispersive else frequency[:1])
    front_index2 = front.permittivity_slope * front.permeability + front.permittivity * front.permeability_slope
    steps: list[Step] = []
    arrival = march(scene, frequency, watch=steps.append)
    start, log_slope = _start_slope(_slopes(back, scene.back, incidence, front_index2), scene.back)
    # From the field behind to its power; the field in front has its own half of that.
    log_slope = log_slope + _power_slope(start, scene.back, log_slope)
    slope = start * np.ones(frequency.size)
    for step in steps:
        if step.layer is not None and isinstance(step.element, Layer):
            slopes = _slopes(step.element.medium, step.layer.wave, incidence, front_index2)
            slope = _through_layer(step, slope, slopes, incidence.wavenumber * step.element.thickness, frequency)
        elif not isinstance(step.element, Layer):
            slope, gained = _through_sheet(step, slope, step.element.sheet, frequency)
            log_slope = log_slope + gained
        if step.rescaled is not None:
            slope *= np.exp(-step.rescaled)[:, np.newaxis]
    fields, y0 = arrival.fields, incidence.admittance
    ratio = front.permittivity_slope / front.permittivity - front.permeability_slope / front.permeability
    y0_slope = 0.5 * ratio.real * y0
    inward = y0 * fields[:, 0] + fields[:, 1]
    inward_slope = y0_slope * fields[:, 0] + y0 * slope[:, 0] + slope[:, 1]
    found: ComplexArray = log_slope + 0.5 * y0_slope / y0 - inward_slope / inward
    return found


def _start_slope(slopes: _Slopes, back: Wave) -> tuple[ComplexArray, ComplexArray]:
    """Return d/df of the fields that `march.start_fields` gives, (2, 2, A, F or 1), and of ln E."""
    q_slope = slopes.q2 / (2 * back.q)
    zero = np.zeros_like(q_slope)
    te = [zero, q_slope / back.permeability - back.q * slopes.mu / back.permeability**2]
    tm = [q_slope, np.broadcast_to(slopes.epsilon, q_slope.shape)]
    return np.stack([np.stack(te), np.stack(tm)]), np.stack([zero, q_slope / back.q])


def _power_slope(start: ComplexArray, back: Wave, log_slope: ComplexArray) -> FloatArray:
    """Return d/df of ln √Re Y of the half-space behind, (2, A, F or 1); 0 where its wave carries no power.

    `start` and `log_slope` are the slopes of `start_fields` and of the logarithm of its E.
    """
    fields = start_fields(back, start.shape[2:])
    e, h = fields[:, 0], fields[:, 1]
    power = (h * np.conj(e)).real
    power_slope = (start[:, 1] * np.conj(e) + h * np.conj(start[:, 0])).real
    runs = power > 0
    change: FloatArray = 0.5 * power_slope / np.where(runs, power, 1.0) - log_slope.real
    return np.where(runs, change, 0.0)


def _through_layer(
    step: Step, slope: ComplexArray, slopes: _Slopes, kd: FloatArray, frequency: FloatArray
) -> ComplexArray:
    """Return d/df of the entry fields of a layer from those of its exit, `slope`."""
    assert step.layer is not None
    assert step.passage is not None
    wave, cosine, j_sine = step.layer.wave, step.passage.cosine, step.passage.sine
    u = kd**2 * wave.q2
    u_slope = 2 * u / frequency + kd**2 * slopes.q2
    cosine_slope = 0.5j * j_sine * u_slope / kd
    scale = np.ones(()) if step.passage.decay is None else np.exp(-step.passage.decay)
    j_sine_slope = j_sine / frequency + 1j * kd * u_slope * _sinc_slope(u, cosine, -1j * j_sine / kd, scale)
    e, h = step.fields[:, 0], step.fields[:, 1]
    e_slope, h_slope = slope[:, 0], slope[:, 1]
    return np.stack(
        [
            cosine_slope * e + cosine * e_slope
            + (slopes.x * j_sine + wave.x * j_sine_slope) * h + wave.x * j_sine * h_slope,
            cosine_slope * h + cosine * h_slope
            + (slopes.b * j_sine + wave.b * j_sine_slope) * e + wave.b * j_sine * e_slope,
        ],
        axis=1,
    )  # fmt: skip


def _sinc_slope(u: ComplexArray, cosine: ComplexArray, sinc: ComplexArray, scale: FloatArray) -> ComplexArray:
    """Return d(sin φ/φ)/du times `scale`, given cos φ and sin φ/φ times `scale`; u = φ²."""
    small = np.abs(u) < _SMALL_U
    series = -1 / 6 + u * (1 / 60 + u * (-1 / 1680 + u * (1 / 90720 - u / 7983360)))
    quotient = (cosine - sinc) / (2 * np.where(small, 1.0, u))
    return np.where(small, scale * np.where(small, series, 0.0), quotient)


def _through_sheet(
    step: Step, slope: ComplexArray, sheet: AbstractSheet, frequency: FloatArray
) -> tuple[ComplexArray, ComplexArray]:
    """Return d/df of the entry fields of a sheet, and d/df of ln z, which the march takes out of them."""
    impedance, impedance_slope = sheet.impedance(frequency), sheet.impedance_slope(frequency)
    size = np.abs(impedance) + FREE_SPACE_IMPEDANCE
    through = (slope * impedance + step.fields * impedance_slope) / size
    through[:, 1] += slope[:, 0] * FREE_SPACE_IMPEDANCE / size
    shorted = impedance == 0
    gained: ComplexArray = np.where(shorted, 0.0, impedance_slope / np.where(shorted, 1.0, impedance))
    return through, gained
