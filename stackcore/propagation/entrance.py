"""The wave impedance that the incident wave finds at the front face."""

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.propagation.blocks import Block, blocks
from stackcore.propagation.march import march
from stackcore.stack import Stack


def input_impedance(stack: Stack, frequency: FloatArray, angle: FloatArray, arrived: FloatArray) -> ComplexArray:
    """Return tangential E over tangential H at the front face in ohm, (2, A, F).

    Parameters
    ----------
    arrived
        T + A, the part of the incident power that enters, (2, A, F). It is a sum of terms that are never negative,
        so that the resistance of a nearly lossless wall has its digits too.

    Returns
    -------
    complex array
        Resistance + j reactance; both infinite where H is 0, at an open face. The reactance has the sign that
        belongs to exp(+jωt): positive is inductive.

    Notes
    -----
    With the impedance Z₀ of the front half-space, T + A = 4 Re(Z) Z₀/|Z + Z₀|².
    """
    impedance = np.empty((2, angle.size, frequency.size), dtype=np.complex128)
    for block in blocks(stack, frequency, angle):
        impedance[block.place] = _of_block(block, arrived[block.place])
    return impedance


def _of_block(block: Block, arrived: FloatArray) -> ComplexArray:
    fields = march(block.scene, block.frequency).fields
    e, h = fields[:, 0], fields[:, 1]
    y0 = block.scene.incidence.admittance
    is_open = h == 0
    found: ComplexArray = e / np.where(is_open, 1.0, h)
    through = found + 1 / y0
    size2 = through.real**2 + through.imag**2
    found = found.copy()
    found.real = 0.25 * arrived * y0 * size2
    found *= FREE_SPACE_IMPEDANCE
    return np.where(is_open, complex(np.inf, np.inf), found)
