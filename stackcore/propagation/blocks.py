"""Cuts a sweep into blocks that stay in the processor's cache, and checks what the solver is asked."""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from stackcore.arrays import FloatArray
from stackcore.errors import StackError
from stackcore.propagation.march import Scene, SceneMaker
from stackcore.stack import Stack

_POINTS = 2048
"""Points of a block: its dozen complex arrays of 32 kB fit a second-level cache."""


@dataclass(frozen=True, slots=True)
class Block:
    """Where a block lies in the (2, A, F) arrays of the answer, and the stack under it."""

    angles: slice
    frequencies: slice
    frequency: FloatArray
    scene: Scene

    @property
    def place(self) -> tuple[slice, slice, slice]:
        """Index of the block in a (2, A, F) array."""
        return slice(None), self.angles, self.frequencies


def blocks(stack: Stack, frequency: FloatArray, angle: FloatArray) -> Iterator[Block]:
    """Yield the blocks of a sweep; each holds at most a few thousand points, whatever the sweep's size."""
    wide = min(max(frequency.size, 1), _POINTS)
    high = max(1, _POINTS // wide)
    maker = SceneMaker(stack, angle)
    for first in range(0, frequency.size, wide):
        frequencies = slice(first, min(first + wide, frequency.size))
        part = frequency[frequencies]
        for first_angle in range(0, angle.size, high):
            angles = slice(first_angle, min(first_angle + high, angle.size))
            yield Block(angles, frequencies, part, maker.scene(angles, part))


def checked_frequency(frequency: ArrayLike) -> FloatArray:
    """Return `frequency` as a flat array of Hz, or raise `StackError`."""
    values = np.atleast_1d(np.asarray(frequency, dtype=np.float64))
    if values.ndim != 1:
        raise StackError(f"frequency has {values.ndim} axes; a number or a flat list of Hz is allowed")
    wrong = ~(np.isfinite(values) & (values > 0))
    if wrong.any():
        raise StackError(f"frequency {values[wrong][0]} Hz must be more than 0 and finite; for example 10e9")
    return values


def checked_angle(angle: ArrayLike) -> FloatArray:
    """Return `angle` as a flat array of rad, or raise `StackError`."""
    values = np.atleast_1d(np.asarray(angle, dtype=np.float64))
    if values.ndim != 1:
        raise StackError(f"angle has {values.ndim} axes; a number or a flat list of rad is allowed")
    wrong = ~((values >= 0) & (values < np.pi / 2))
    if wrong.any():
        raise StackError(
            f"angle {values[wrong][0]} rad must be 0 or more and less than π/2, from the normal; "
            "for example numpy.radians(45)"
        )
    return values


def check_front(stack: Stack, frequency: FloatArray) -> None:
    """Raise `StackError` when the front half-space absorbs or carries no wave at one of the frequencies."""
    values = stack.front.evaluate(frequency if stack.front.dispersive else frequency[:1])
    epsilon, mu = values.permittivity, values.permeability
    if (epsilon.imag != 0).any() or (mu.imag != 0).any():
        raise StackError(
            "the front half-space must be lossless: in an absorbing one, incident and reflected power cannot be "
            "told apart; make it a layer behind a lossless front"
        )
    if (epsilon.real <= 0).any() or (mu.real <= 0).any():
        raise StackError("the front half-space must have positive permittivity and permeability to carry a wave")
