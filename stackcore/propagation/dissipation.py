"""The power that each element turns into heat, as a sum of terms that are never negative.

1 − R − T has no digits left where little is absorbed. Instead the power lost along the normal is integrated,

    −dP/dz = k (X″ |H|² + B″ |E|²),   X″ = −Im X ≥ 0,   B″ = −Im B ≥ 0

(symbols of `stackcore.propagation.waves`; P in units of |E|²/Z₀). Inside a layer, with E₁ and H₁ at its exit and
φ = kqz counted from there, E = E₁ cos φ + j(X H₁/q) sin φ and H = H₁ cos φ + j(B E₁/q) sin φ, whose squares
integrate in closed form. A sheet takes |E|² Re(Z₀/z).
"""

from dataclasses import dataclass

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.media.base import AbstractMedium
from stackcore.propagation.blocks import Block, blocks
from stackcore.propagation.march import Step, march
from stackcore.propagation.waves import Incidence, LayerWave, Passage, Wave
from stackcore.sheets.base import AbstractSheet
from stackcore.stack import Layer, Stack

_SERIES = (20.0, 42.0, 72.0, 110.0, 156.0)


def element_absorptance(stack: Stack, frequency: FloatArray, angle: FloatArray) -> FloatArray:
    """Return the fraction of the incident power lost in each element, (elements, 2, A, F)."""
    absorbed = np.zeros((len(stack.elements), 2, angle.size, frequency.size))
    for block in blocks(stack, frequency, angle):
        for index, part in _absorbed_in_block(block):
            absorbed[index][block.place] = part
    return absorbed


def absorptance(stack: Stack, frequency: FloatArray, angle: FloatArray) -> FloatArray:
    """Return the fraction of the incident power lost in the whole stack, (2, A, F)."""
    absorbed = np.zeros((2, angle.size, frequency.size))
    if not any(_can_absorb(stack, index, frequency) for index in range(len(stack.elements))):
        return absorbed
    for block in blocks(stack, frequency, angle):
        for _, part in _absorbed_in_block(block):
            absorbed[block.place] += part
    return absorbed


def _can_absorb(stack: Stack, index: int, frequency: FloatArray) -> bool:
    element = stack.elements[index]
    if not isinstance(element, Layer):
        return bool((element.sheet.impedance(frequency).real != 0).any())
    return _is_lossy(element.medium, frequency)


def _is_lossy(medium: AbstractMedium, frequency: FloatArray) -> bool:
    values = medium.evaluate(frequency if medium.dispersive else frequency[:1])
    return bool((values.permittivity.imag != 0).any() or (values.permeability.imag != 0).any())


def _absorbed_in_block(block: Block) -> list[tuple[int, FloatArray]]:
    """Return (index in the stack, absorbed fraction (2, A, F)) for the elements that absorb."""
    steps: list[Step] = []
    arrival = march(block.scene, block.frequency, watch=steps.append)
    y0 = block.scene.incidence.admittance
    inward = y0 * arrival.fields[:, 0] + arrival.fields[:, 1]
    # Power per |marched field|² at the entry of the element at hand, as a fraction of the incident power.
    weight: FloatArray = 4 * y0 / (inward.real**2 + inward.imag**2)
    absorbed: list[tuple[int, FloatArray]] = []
    for step in reversed(steps):
        behind = weight if step.shed is None else weight * np.exp(-2 * step.shed)
        if step.layer is not None:
            if _loses(step.layer.wave):
                # The layer's own decay is inside its integrals already.
                at_exit = weight if step.rescaled is None else weight * np.exp(-2 * step.rescaled)
                absorbed.append((step.index, at_exit * _lost_in_layer(step, block)))
        elif not isinstance(step.element, Layer):
            lost = _lost_in_sheet(step.element.sheet, step.fields[:, 0], block.frequency)
            absorbed.append((step.index, behind * lost))
        weight = behind
    return absorbed


def _loses(wave: Wave) -> bool:
    return bool((wave.permittivity.imag != 0).any() or (wave.permeability.imag != 0).any())


def _lost_in_sheet(sheet: AbstractSheet, e: ComplexArray, frequency: FloatArray) -> FloatArray:
    impedance = sheet.impedance(frequency)
    size = np.abs(impedance)
    # Re(1/z) = R/|z|²; a lossless short circuit loses nothing.
    conductance = np.divide(
        impedance.real / np.where(size > 0, size, 1.0), size, out=np.zeros_like(size), where=size > 0
    )
    lost: FloatArray = FREE_SPACE_IMPEDANCE * conductance * (e.real**2 + e.imag**2)
    return lost


def _lost_in_layer(step: Step, block: Block) -> FloatArray:
    """Return e^(−2β) k ∫ (X″|H|² + B″|E|²) dz for the marched fields at the exit, (2, A, F)."""
    layer, passage = step.layer, step.passage
    assert layer is not None
    assert passage is not None
    wave = layer.wave
    e, h = step.fields[:, 0], step.fields[:, 1]
    integrals = _integrals(layer, passage, block.frequency)
    electric = integrals.of_square(e, wave.x * h / wave.q)
    magnetic = integrals.of_square(h, wave.b * e / wave.q)
    x_loss, b_loss = _losses(wave, block.scene.incidence)
    lost: FloatArray = block.scene.incidence.wavenumber * (x_loss * magnetic + b_loss * electric)
    return lost


def _losses(wave: Wave, incidence: Incidence) -> tuple[FloatArray, FloatArray]:
    """Return X″ and B″, (2, A, 1 or F), each a sum of terms ≥ 0 (q² = εμ − s², s the front's n sin θ)."""
    epsilon, mu = wave.permittivity, wave.permeability
    s2 = incidence.index2 * np.sin(incidence.angle) ** 2
    zero = np.zeros_like(s2)
    epsilon_loss, mu_loss = zero - epsilon.imag, zero - mu.imag
    x_loss = np.stack([mu_loss, mu_loss + s2 * epsilon_loss / np.abs(epsilon) ** 2])
    b_loss = np.stack([epsilon_loss + s2 * mu_loss / np.abs(mu) ** 2, epsilon_loss])
    return x_loss, b_loss


@dataclass(frozen=True, slots=True)
class _Integrals:
    """e^(−2β) ∫ over a layer of |cos φ|², |sin φ|² and cos φ (sin φ)*, in m, (A, F)."""

    cosine2: FloatArray
    sine2: FloatArray
    mixed: ComplexArray

    def of_square(self, cosine: ComplexArray, j_sine: ComplexArray) -> FloatArray:
        """Return e^(−2β) ∫ |cosine · cos φ + j · j_sine · sin φ|² dz."""
        cross = cosine * np.conj(1j * j_sine) * self.mixed
        square: FloatArray = (
            (cosine.real**2 + cosine.imag**2) * self.cosine2
            + (j_sine.real**2 + j_sine.imag**2) * self.sine2
            + 2 * cross.real
        )
        return square


def _integrals(layer: LayerWave, passage: Passage, frequency: FloatArray) -> _Integrals:
    """Integrate with every difference taken in a form that does not cancel (α = 2a/2, β = 2b/2 below)."""
    alpha = layer.phase(frequency)
    sinc = np.divide(passage.sin_alpha, alpha, out=np.ones_like(alpha), where=alpha != 0)
    beta = np.zeros_like(alpha) if passage.decay is None else passage.decay
    shrunk = np.exp(-2 * beta)
    half = 0.5 * layer.thickness
    mean = np.divide(-np.expm1(-4 * beta), 4 * beta, out=np.ones_like(beta), where=beta != 0)
    sinc2 = sinc * passage.cos_alpha
    hyperbolic = np.where(2 * beta < 0.5, shrunk * _series(2 * beta, 1.0), mean - shrunk)
    circular = np.where(np.abs(2 * alpha) < 0.5, _series(2 * alpha, -1.0), 1 - sinc2)
    m = 0.5 * np.expm1(-2 * beta)
    grown = np.divide(m * m, beta, out=np.zeros_like(beta), where=beta != 0)
    mixed = half * (shrunk * passage.sin_alpha * sinc + 1j * grown)
    return _Integrals(half * (mean + shrunk * sinc2), half * (hyperbolic + shrunk * circular), mixed)


def _series(x: FloatArray, sign: float) -> FloatArray:
    """Return sinh x / x − 1 (sign 1) or 1 − sin x / x (sign −1) for |x| < 0.5, to a double's last digits."""
    square = sign * np.where(np.abs(x) < 0.5, x, 0.0) ** 2
    total = np.ones_like(square)
    for divisor in reversed(_SERIES):
        total = 1 + square / divisor * total
    return sign * square / 6 * total
