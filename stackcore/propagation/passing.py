"""The transmitted wave along its way: its phase with all its turns, and a loss too small to be a difference."""

import numpy as np

from stackcore.media.base import ComplexArray, FloatArray
from stackcore.propagation.blocks import Block, blocks
from stackcore.propagation.march import Step, march
from stackcore.stack import PerfectConductor, Stack


def turned_phase(stack: Stack, frequency: FloatArray, angle: FloatArray) -> FloatArray:
    """Return arg t in rad, continuous in every thickness from 0, (2, A, F), to a few digits.

    It tells the number of turns; the digits come from the solver's principal value. 0 behind a metal back.

    Notes
    -----
    Through a layer E turns by α + arg(1 + y) + arg(1 + ρ e^(−2jφ)), y = Y_load/Y and ρ = (1 − y)/(1 + y); each
    argument stays within half a turn while the thickness grows from 0, where their sum is 0.
    """
    phase = np.zeros((2, angle.size, frequency.size))
    if isinstance(stack.back, PerfectConductor):
        return phase
    for block in blocks(stack, frequency, angle):
        turned = np.zeros_like(phase[block.place])

        def watch(step: Step, turned: FloatArray = turned, frequency: FloatArray = block.frequency) -> None:
            if step.layer is not None:
                turned += _turn_in_layer(step, frequency)

        fields = march(block.scene, block.frequency, watch=watch).fields
        inward = block.scene.incidence.admittance * fields[:, 0] + fields[:, 1]
        phase[block.place] = -(turned + np.angle(inward * np.conj(fields[:, 0])))
    return phase


def _turn_in_layer(step: Step, frequency: FloatArray) -> FloatArray:
    layer, passage = step.layer, step.passage
    assert layer is not None
    assert passage is not None
    wave = layer.wave
    e, h = step.fields[:, 0], step.fields[:, 1]
    alpha = layer.phase(frequency)
    decay = np.zeros_like(alpha) if passage.decay is None else passage.decay
    round_trip = np.exp(-2 * decay) * (passage.cos_alpha - 1j * passage.sin_alpha) ** 2
    with_load, against = wave.q * e + wave.x * h, wave.q * e - wave.x * h
    rho = np.divide(against, with_load, out=np.zeros_like(with_load), where=with_load != 0)
    thick = alpha + np.angle(with_load * np.conj(wave.q * e)) + np.angle(1 + rho * round_trip)
    thin = np.angle((passage.cosine * e + wave.x * passage.sine * h) * np.conj(e))
    return np.where(np.hypot(alpha, decay) < 0.5, thin, thick)


def weak_loss(stack: Stack, frequency: FloatArray, angle: FloatArray) -> FloatArray:
    """Return ln |t without the stack / t|, (2, A, F), with its digits where it is far below 1.

    Every factor of the ratio is taken as 1 + something small:

        t₀/t = [1 + (Y_in − Y_back)/(Y₀ + Y_back)] Π (E_in/E_out of each layer)
    """
    loss = np.zeros((2, angle.size, frequency.size))
    for block in blocks(stack, frequency, angle):
        loss[block.place] = _weak_loss_of_block(block)
    return loss


def _weak_loss_of_block(block: Block) -> FloatArray:
    scene = block.scene
    assert scene.back is not None
    total = np.zeros((2, scene.incidence.angle.shape[0], block.frequency.size))

    def watch(step: Step) -> None:
        nonlocal total
        if step.layer is not None:
            total = total + _loss_in_layer(step, block.frequency)

    fields = march(scene, block.frequency, reference=scene.back, watch=watch).fields
    bare = scene.incidence.admittance + scene.back.q / scene.back.x
    return total + _log_of_one_plus(fields[:, 2] / (bare * fields[:, 0]))


def _loss_in_layer(step: Step, frequency: FloatArray) -> FloatArray:
    """Return ln |E at the entry / E at the exit| of a layer, (2, A, F)."""
    layer, passage = step.layer, step.passage
    assert layer is not None
    assert passage is not None
    e, h = step.fields[:, 0], step.fields[:, 1]
    alpha = layer.phase(frequency)
    decay = np.zeros_like(alpha) if passage.decay is None else passage.decay
    marched = passage.cosine + layer.wave.x * passage.sine * h / e
    shallow = np.minimum(decay, 1.0)
    drop = np.where(np.abs(alpha) < 1, 2 * np.sin(alpha / 2) ** 2, 1 - passage.cos_alpha)
    cosine = 2 * passage.cos_alpha * np.sinh(shallow / 2) ** 2 - drop
    step_of_e = cosine + 1j * passage.sin_alpha * np.sinh(shallow)
    step_of_e = step_of_e + np.exp(shallow) * (layer.wave.x * passage.sine * h / e)
    small = (decay < 1) & (np.abs(step_of_e) < 0.5)
    precise = _log_of_one_plus(np.where(small, step_of_e, 0.0))
    with np.errstate(divide="ignore"):
        return np.where(small, precise, decay + np.log(np.abs(marched)))


def _log_of_one_plus(z: ComplexArray) -> FloatArray:
    """Return ln |1 + z| without losing a small z."""
    logarithm: FloatArray = 0.5 * np.log1p(np.maximum(2 * z.real + (z.real**2 + z.imag**2), -1 + 1e-16))
    return logarithm
