"""Reflection and transmission of a stack: the only door into this package."""

from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.propagation.blocks import Block, blocks, check_front, checked_angle, checked_frequency
from stackcore.propagation.march import march, start_fields
from stackcore.propagation.response import Response
from stackcore.stack import Stack

_WEAK = 1e-4
"""Below this |r| the difference Y₀E − H has lost too many digits and N = H − Y₀E is marched by itself."""


def solve(stack: Stack, frequency: ArrayLike, angle: ArrayLike) -> Response:
    """Return what `stack` does to a plane wave, over every pair of a frequency and an angle.

    Parameters
    ----------
    stack
        Layers and sheets between two half-spaces; the front one must be lossless.
    frequency
        In Hz, a number or (F,); > 0.
    angle
        Angle of incidence in rad from the normal, in the front half-space, a number or (A,); 0 ≤ angle < π/2.

    Returns
    -------
    Response
        Arrays are (F, A, 2): frequency, angle, polarization (TE, TM).

    Raises
    ------
    StackError
        For a frequency or an angle out of range, or a front half-space that absorbs.

    Notes
    -----
    Exact for flat, infinite, homogeneous, isotropic, linear layers and a plane wave. Layers may absorb, be
    magnetic, evanescent or of any thickness: shielding of 10⁶ dB is a number. Memory beyond the answer is
    bounded by blocks. Method: `stackcore.propagation.march`.

    Examples
    --------
    A half-wave wall reflects nothing:

    >>> import numpy as np
    >>> from stackcore import ConstantMedium, Layer, Stack, solve
    >>> wall = Stack((Layer(ConstantMedium(4.0), 299792458 / 10e9 / 4),))
    >>> bool(solve(wall, 10e9, 0.0).reflectance.max() < 1e-30)
    True
    """
    frequency, angle = checked_frequency(frequency), checked_angle(angle)
    shape = (2, angle.size, frequency.size)
    reflection = np.empty(shape, dtype=np.complex128)
    log_transmission = np.empty(shape, dtype=np.complex128)
    log_ratio = np.empty(shape)
    bare = np.zeros(shape)
    if frequency.size and angle.size:
        check_front(stack, frequency)
    for block in blocks(stack, frequency, angle):
        answer = _solve_block(block)
        reflection[block.place], log_transmission[block.place] = answer.reflection, answer.log_transmission
        log_ratio[block.place], bare[block.place] = answer.log_ratio, answer.bare_transmittance
    return Response(stack, frequency, angle, reflection, log_transmission, log_ratio, bare)


@dataclass(frozen=True, slots=True)
class _Answer:
    """r, ln t and ln |t without the stack / t| of a block, (2, A, F), and T without the stack, (2, A, 1 or F)."""

    reflection: ComplexArray
    log_transmission: ComplexArray
    log_ratio: FloatArray
    bare_transmittance: FloatArray


def _solve_block(block: Block) -> _Answer:
    scene = block.scene
    arrival = march(scene, block.frequency)
    y0 = scene.incidence.admittance
    fields = arrival.fields
    inward = y0 * fields[:, 0]
    reflection = inward - fields[:, 1]
    inward += fields[:, 1]
    reflection /= inward
    if float(np.abs(reflection.real).min()) < _WEAK and bool((np.abs(reflection) < _WEAK).any()):
        reflection = _weak_reflection(block, reflection)
    log_inward = np.empty_like(inward)
    size = inward.real**2
    size += inward.imag**2
    log_inward.real = 0.5 * np.log(size) + arrival.shed
    log_inward.imag = np.arctan2(inward.imag, inward.real) + arrival.turned
    if scene.back is None:
        nothing = np.full(inward.shape, -np.inf)
        return _Answer(reflection, nothing.astype(np.complex128), -nothing, np.zeros_like(y0))
    start = start_fields(scene.back, (y0.shape[1], scene.back.q.shape[1]))
    e, h = start[:, 0], start[:, 1]
    without = y0 * e + h
    bare_transmittance = 4 * y0 * (h * np.conj(e)).real / (without.real**2 + without.imag**2)
    log_transmission = np.log(2 * y0 * e) - log_inward
    return _Answer(reflection, log_transmission, log_inward.real - np.log(np.abs(without)), bare_transmittance)


def _weak_reflection(block: Block, reflection: ComplexArray) -> ComplexArray:
    """Return `reflection` with every weak value replaced by one that has all its digits."""
    scene = block.scene
    fields = march(scene, block.frequency, reference=scene.front).fields
    precise = -fields[:, 2] / (scene.incidence.admittance * fields[:, 0] + fields[:, 1])
    return np.where(np.abs(reflection) < _WEAK, precise, reflection)
