"""The transmitted wave along its way: its phase with all its turns, and a loss too small to be a difference."""

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.propagation.blocks import Block, blocks
from stackcore.propagation.march import Step, march, start_fields
from stackcore.stack import Layer, PerfectConductor, Stack

_DEEP = 30.0


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

    The ratio is (Y₀E + H at the front face)/(Y₀E + H at the back face) of the same fields; every element adds its
    own small part to the numerator, and the parts are summed apart from the 1. NaN where the fields grow by more
    than e^30 on the way, where the plain ratio is at its best.
    """
    loss = np.zeros((2, angle.size, frequency.size))
    for block in blocks(stack, frequency, angle):
        loss[block.place] = _weak_loss_of_block(block)
    return loss


def _weak_loss_of_block(block: Block) -> FloatArray:
    scene, frequency = block.scene, block.frequency
    assert scene.back is not None
    y0 = scene.incidence.admittance
    shape = (y0.shape[1], frequency.size)
    added = np.zeros((2, *shape), dtype=np.complex128)
    factor = np.ones((2, *shape), dtype=np.complex128)  # true fields over marched fields
    deep = np.zeros((2, *shape), dtype=np.bool_)

    def watch(step: Step) -> None:
        nonlocal factor
        taken = np.zeros(()) if step.shed is None else step.shed
        np.logical_or(deep, np.abs(np.log(np.abs(factor)) + taken) > _DEEP, out=deep)
        fields = np.where(deep[:, np.newaxis], 0.0, step.fields * factor[:, np.newaxis])
        added_here = _added_by(step, fields, y0, frequency)
        np.add(added, np.where(deep, 0.0, added_here), out=added)
        factor = factor * np.exp(np.clip(taken, -_DEEP, _DEEP))
        if not isinstance(step.element, Layer):
            factor = factor * np.exp(-1j * np.angle(step.element.sheet.impedance(frequency)))
        factor = np.where(deep, 1.0, factor)

    march(scene, frequency, watch=watch)
    start = start_fields(scene.back, shape)
    loss = _log_of_one_plus(added / (y0 * start[:, 0] + start[:, 1]))
    return np.where(deep, np.nan, loss)


def _added_by(step: Step, fields: ComplexArray, y0: FloatArray, frequency: FloatArray) -> ComplexArray:
    """Return what an element adds to Y₀E + H of the true `fields` at its exit, (2, A, F)."""
    e, h = fields[:, 0], fields[:, 1]
    if not isinstance(step.element, Layer):
        impedance = step.element.sheet.impedance(frequency)
        added: ComplexArray = e * FREE_SPACE_IMPEDANCE / np.where(impedance == 0, np.inf, impedance)
        return added
    layer, passage = step.layer, step.passage
    assert layer is not None
    assert passage is not None
    alpha = layer.phase(frequency)
    decay = np.zeros_like(alpha) if passage.decay is None else np.minimum(passage.decay, _DEEP)
    # cos φ − 1 with φ = α − jβ, as a sum of small parts.
    drop = np.where(np.abs(alpha) < 1, 2 * np.sin(alpha / 2) ** 2, 1 - passage.cos_alpha)
    cosine = 2 * passage.cos_alpha * np.sinh(decay / 2) ** 2 - drop + 1j * passage.sin_alpha * np.sinh(decay)
    j_sine = passage.sine * np.exp(decay)
    wave = layer.wave
    gained: ComplexArray = cosine * (y0 * e + h) + j_sine * (wave.x * y0 * h + wave.b * e)
    return gained


def _log_of_one_plus(z: ComplexArray) -> FloatArray:
    """Return ln |1 + z| without losing a small z."""
    logarithm: FloatArray = 0.5 * np.log1p(np.maximum(2 * z.real + (z.real**2 + z.imag**2), -1 + 1e-16))
    return logarithm
