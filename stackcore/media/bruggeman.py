"""The root of Bruggeman's equation that is a medium.

Σ fᵢ (εᵢ − ε)/(εᵢ + 2ε) = 0 has as many roots as there are components. The map t → (t − ε)/(t + 2ε) takes a half
plane bounded by the line through 0 and ε to a half plane, so the sum can vanish only where that line parts the εᵢ:
a root lies in the cone that the εᵢ span, or in its negative. For a single component one root is in the cone, all
others are in its negative, and no root can pass from one to the other through 0 or ∞. So exactly one root lies in
the cone for all fractions: it is the mixture, passive as its components are, also past the percolation of a metal.
"""

from collections.abc import Sequence
from typing import Final

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.parts import complex_of

_MOST_STEPS: Final = 15
_CLOSE: Final = 1e-13
_LEAST_LOSS: Final = 1e-9
"""rad, given to lossless components of opposite sign where there are three or more; see `_normalized`."""


def effective_permittivity(components: Sequence[ComplexArray], fractions: Sequence[float]) -> ComplexArray:
    """Return ε of the mixture of `components`, passive and of one shape, with `fractions` that add up to 1."""
    if len(components) == 1:
        return components[0]
    if len(components) == 2:
        return _of_two(components[0], components[1], fractions[0], fractions[1])
    shape = np.shape(components[0])
    return _of_many([np.ravel(component) for component in components], fractions).reshape(shape)


def _of_two(first: ComplexArray, second: ComplexArray, first_share: float, second_share: float) -> ComplexArray:
    """Solve 2ε² − (aε₁ + bε₂)ε − ε₁ε₂ = 0, a = 3f₁ − 1 and b = 3f₂ − 1, in units of √(ε₁ε₂).

    In these units the product of the roots is −1/2 and the cone lies in the half plane of positive real part, where
    the principal square root puts its root.
    """
    a, b = 3 * first_share - 1, 3 * second_share - 1
    first_root, second_root = _passive_root(first), _passive_root(second)
    ratio = first_root / second_root
    middle = a * ratio + b / ratio
    square = middle * middle + 8
    root = np.sqrt(square)
    # Lossless components of opposite sign, outside the fractions at which their mixture resonates: both roots are
    # real and on the edge of the half plane. The mixture is the one that a first trace of loss moves inwards.
    open_sign = (square.imag == 0) & (square.real < 0)
    if open_sign.any():
        size = np.abs(ratio)
        upward = (np.abs(b) > np.abs(a) * size * size) == (first.real < 0)
        edge = complex_of(0.0, np.where(upward, 1.0, -1.0) * np.sqrt(np.abs(square.real)))
        root = np.where(open_sign, edge, root)
    return first_root * second_root * _inner_root(middle, root)


def _inner_root(middle: ComplexArray, root: ComplexArray) -> ComplexArray:
    """Return (m + r)/4, r² = m² + 8, of its two forms the one that adds numbers of one sign."""
    turned = (middle * np.conj(root)).real < 0
    return np.where(turned, 2 / np.where(turned, root - middle, 1.0), (middle + root) / 4)


def _of_many(components: Sequence[ComplexArray], fractions: Sequence[float]) -> ComplexArray:
    """Solve F(ε) = 3ε Σ fᵢ/(εᵢ + 2ε) − 1 = 0.

    Newton's steps serve nearly everywhere. Where one leads astray, ε → ε/(1 + F) maps the half plane around the
    cone into itself and so comes nearer; the few points that this leaves open are solved as an eigenvalue problem.
    """
    parts, unit = _normalized(components)
    root = _two_by_two(parts, fractions)
    excess, slope = _excess(root, parts, fractions)
    for _ in range(_MOST_STEPS):
        open_yet = np.abs(excess) > _CLOSE
        if not open_yet.any():
            break
        ahead = root - np.where(open_yet, excess / slope, 0.0)
        ahead = np.where(ahead.real > 0, ahead, root)
        ahead_excess, ahead_slope = _excess(ahead, parts, fractions)
        astray = open_yet & (np.abs(ahead_excess) >= 0.5 * np.abs(excess))
        if astray.any():
            ahead = np.where(astray, root / (1 + excess), ahead)
            ahead_excess, ahead_slope = _excess(ahead, parts, fractions)
        root, excess, slope = ahead, ahead_excess, ahead_slope
    open_yet = np.abs(excess) > _CLOSE
    root = root - excess / slope  # the last step is free, and leaves nothing but rounding
    if open_yet.any():
        root[open_yet] = _by_eigenvalues([part[open_yet] for part in parts], fractions)
    product: ComplexArray = root * unit
    return product


def _two_by_two(parts: Sequence[ComplexArray], fractions: Sequence[float]) -> ComplexArray:
    """Return a root to start from, in the cone and mostly close: the components mixed one after the other."""
    mixed, share = parts[0], fractions[0]
    for part, more in zip(parts[1:], fractions[1:], strict=True):
        if (whole := share + more) > 0:
            first_root: ComplexArray = np.sqrt(mixed)
            second_root: ComplexArray = np.sqrt(part)
            ratio = first_root / second_root
            middle: ComplexArray = (3 * share / whole - 1) * ratio + (3 * more / whole - 1) / ratio
            root: ComplexArray = np.sqrt(middle * middle + 8)
            mixed = first_root * second_root * _inner_root(middle, root)
            share = whole
    return mixed


def _by_eigenvalues(parts: Sequence[ComplexArray], fractions: Sequence[float]) -> ComplexArray:
    """Return the roots, which are half the eigenvalues of diag(−ε) + 3 uuᵀ with uᵢ = √(fᵢεᵢ), made sharp."""
    values = np.stack(parts, axis=-1)
    vector = np.sqrt(np.asarray(fractions) * values)
    matrix = 3 * vector[..., :, None] * vector[..., None, :]
    matrix[..., range(len(parts)), range(len(parts))] -= values
    roots = np.asarray(np.linalg.eigvals(matrix) / 2, dtype=np.complex128)
    inmost = np.argmax(roots.real / np.abs(roots), axis=-1)
    root: ComplexArray = np.take_along_axis(roots, inmost[..., None], axis=-1)[..., 0]
    for _ in range(3):
        excess, slope = _excess(root, parts, fractions)
        ahead = root - excess / slope
        root = np.where(np.abs(_excess(ahead, parts, fractions)[0]) < np.abs(excess), ahead, root)
    return root


def _excess(
    root: ComplexArray, parts: Sequence[ComplexArray], fractions: Sequence[float]
) -> tuple[ComplexArray, ComplexArray]:
    """Return F and its derivative."""
    total, slope = np.zeros_like(root), np.zeros_like(root)
    for share, part in zip(fractions, parts, strict=True):
        inverse = 1 / (part + 2 * root)
        total += share * inverse
        slope += share * part * inverse * inverse
    return 3 * root * total - 1, 3 * slope


def _normalized(components: Sequence[ComplexArray]) -> tuple[list[ComplexArray], ComplexArray]:
    """Return the components turned so that their cone lies around the positive axis, and the unit that undoes it.

    Where components without loss have opposite signs the cone is a half plane and the root lies on its edge; a
    trace of loss makes the cone narrower and moves the root inwards.
    """
    angles = np.stack([_passive_angle(component) for component in components])
    lowest, highest = angles.min(axis=0), angles.max(axis=0)
    flat = highest - lowest > np.pi - 2 * _LEAST_LOSS
    if flat.any():
        angles = np.where(flat, np.clip(angles, -np.pi + _LEAST_LOSS, -_LEAST_LOSS), angles)
    middle = (lowest + highest) / 2
    sizes = np.abs(np.stack(components))
    scale = np.exp(np.log(sizes).mean(axis=0))
    parts = [size / scale * _turn(angle - middle) for size, angle in zip(sizes, angles, strict=True)]
    return parts, scale * _turn(middle)


def _turn(angle: FloatArray) -> ComplexArray:
    return complex_of(np.cos(angle), np.sin(angle))


def _passive_angle(value: ComplexArray) -> FloatArray:
    """Return the argument between −π and 0, whatever the sign of a zero loss."""
    angle: FloatArray = -np.arctan2(np.abs(value.imag), value.real)
    return angle


def _passive_root(value: ComplexArray) -> ComplexArray:
    """Return the square root with an argument between −π/2 and 0."""
    return np.sqrt(complex_of(value.real, -np.abs(value.imag)))
