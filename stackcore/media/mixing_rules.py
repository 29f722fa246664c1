"""Rules that give one permittivity for a mixture, each with its derivatives, and the bounds that hold for it.

A rule takes the permittivities of the components, the host first, and their volume fractions. All of them assume
grains much smaller than the wavelength inside them, and hold for permeabilities as they do for permittivities.

Sources: A. H. Sihvola, Electromagnetic Mixing Formulas and Applications, IEE (1999); J. C. Maxwell Garnett, Phil.
Trans. R. Soc. A 203, 385 (1904); D. A. G. Bruggeman, Ann. Phys. 416, 636 (1935); H. Looyenga, Physica 31, 401
(1965); K. Lichtenecker, Phys. Z. 27, 115 (1926); O. Wiener, Abh. Sächs. Akad. Wiss. 32, 509 (1912); Z. Hashin,
S. Shtrikman, J. Appl. Phys. 33, 3125 (1962).
"""

from collections.abc import Callable, Mapping, Sequence
from dataclasses import dataclass
from typing import Final

import numpy as np

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.bruggeman import effective_permittivity

_LAST_DIGIT: Final = float(np.finfo(np.float64).eps)


@dataclass(frozen=True, slots=True)
class Mixed:
    """The permittivity of a mixture and its derivatives.

    Parameters
    ----------
    value
        ε of the mixture.
    by_component
        ∂ε/∂εᵢ for each component, the host first.
    by_fraction
        ∂ε/∂fᵢ for each component but the host, which gives way: its fraction is what the others leave.
    """

    value: ComplexArray
    by_component: tuple[ComplexArray, ...]
    by_fraction: tuple[ComplexArray, ...]


Rule = Callable[[Sequence[ComplexArray], Sequence[float]], Mixed]
"""Permittivities and volume fractions, the host first, to the mixture."""


def maxwell_garnett(components: Sequence[ComplexArray], fractions: Sequence[float]) -> Mixed:
    """Return spheres in a host: (ε − εₕ)/(ε + 2εₕ) = Σ fᵢ (εᵢ − εₕ)/(εᵢ + 2εₕ).

    The host stays the connected phase at every fraction. With one kind of inclusion it is a Hashin-Shtrikman bound.
    """
    host, inclusions, shares = components[0], components[1:], fractions[1:]
    polarizations, by_inclusion, by_host = [], [], []
    for inclusion in inclusions:
        inverse = 1 / _never_zero(inclusion + 2 * host, host)
        polarizations.append((inclusion - host) * inverse)
        by_inclusion.append(3 * host * inverse * inverse)
        by_host.append(-3 * inclusion * inverse * inverse)
    total = _sum(shares, polarizations, host)
    inverse = 1 / _never_zero(1 - total, np.ones_like(host))
    by_total = 3 * host * inverse * inverse
    return Mixed(
        host * (1 + 2 * total) * inverse,
        (
            (1 + 2 * total) * inverse + by_total * _sum(shares, by_host, host),
            *(by_total * share * slope for share, slope in zip(shares, by_inclusion, strict=True)),
        ),
        tuple(by_total * polarization for polarization in polarizations),
    )


def bruggeman(components: Sequence[ComplexArray], fractions: Sequence[float]) -> Mixed:
    """Return grains of every component in the mixture itself: Σ fᵢ (εᵢ − ε)/(εᵢ + 2ε) = 0.

    No component is a host, and beyond a third of the volume a component connects.
    """
    value = effective_permittivity(components, fractions)
    inverses = [1 / _never_zero(component + 2 * value, value) for component in components]
    weights = [3 * component * inverse * inverse for component, inverse in zip(components, inverses, strict=True)]
    divisor = 1 / _never_zero(_sum(fractions, weights, value), 1 / value)
    differences = [(part - value) * inverse for part, inverse in zip(components, inverses, strict=True)]
    return Mixed(
        value,
        tuple(
            3 * share * value * inverse * inverse * divisor
            for share, inverse in zip(fractions, inverses, strict=True)
        ),
        tuple((difference - differences[0]) * divisor for difference in differences[1:]),
    )


def looyenga(components: Sequence[ComplexArray], fractions: Sequence[float]) -> Mixed:
    """Return the average of cube roots: ε^⅓ = Σ fᵢ εᵢ^⅓; powders and foams of moderate contrast."""
    roots = [np.exp(_passive_log(component) / 3) for component in components]
    root = _never_zero(_sum(fractions, roots, components[0]), roots[0])
    return Mixed(
        root**3,
        tuple(share * (root / part) ** 2 for share, part in zip(fractions, roots, strict=True)),
        tuple(3 * root**2 * (part - roots[0]) for part in roots[1:]),
    )


def lichtenecker(components: Sequence[ComplexArray], fractions: Sequence[float]) -> Mixed:
    """Return the average of logarithms: ln ε = Σ fᵢ ln εᵢ.

    An empirical rule: it keeps Wiener's bounds but not those of Hashin and Shtrikman.
    """
    logarithms = [_passive_log(component) for component in components]
    value = np.exp(_sum(fractions, logarithms, components[0]))
    return Mixed(
        value,
        tuple(share * value / component for share, component in zip(fractions, components, strict=True)),
        tuple(value * (logarithm - logarithms[0]) for logarithm in logarithms[1:]),
    )


def series(components: Sequence[ComplexArray], fractions: Sequence[float]) -> Mixed:
    """Return layers that the field crosses: 1/ε = Σ fᵢ/εᵢ; Wiener's lower bound."""
    inverses = [1 / component for component in components]
    value = 1 / _never_zero(_sum(fractions, inverses, components[0]), inverses[0])
    square = value * value
    return Mixed(
        value,
        tuple(share * square * inverse * inverse for share, inverse in zip(fractions, inverses, strict=True)),
        tuple(square * (inverses[0] - inverse) for inverse in inverses[1:]),
    )


def parallel(components: Sequence[ComplexArray], fractions: Sequence[float]) -> Mixed:
    """Return layers that the field runs along: ε = Σ fᵢεᵢ; Wiener's upper bound."""
    one = np.ones_like(components[0])
    return Mixed(
        _sum(fractions, components, components[0]),
        tuple(share * one for share in fractions),
        tuple(component - components[0] for component in components[1:]),
    )


RULES: Final[Mapping[str, Rule]] = {
    "maxwell-garnett": maxwell_garnett,
    "bruggeman": bruggeman,
    "looyenga": looyenga,
    "lichtenecker": lichtenecker,
    "series": series,
    "parallel": parallel,
}
"""Name of the rule in a job file -> the rule."""


def wiener_bounds(
    permittivities: Sequence[FloatArray], fractions: Sequence[float]
) -> tuple[FloatArray, FloatArray]:
    """Return the bounds of any mixture of lossless components: series and parallel.

    Parameters
    ----------
    permittivities
        Real, > 0, one array for each component.
    fractions
        Of the volume; they add up to 1.

    Raises
    ------
    ValueError
        For permittivities that are not above 0. With loss the bounds are regions of the complex plane, not these.

    Examples
    --------
    >>> lower, upper = wiener_bounds([np.array(1.0), np.array(10.0)], [0.7, 0.3])
    >>> float(lower.round(5)), float(upper.round(5))
    (1.36986, 3.7)
    """
    parts = _positive(permittivities)
    lower = 1 / sum(share / part for share, part in zip(fractions, parts, strict=True))
    upper = sum(share * part for share, part in zip(fractions, parts, strict=True))
    return np.asarray(lower), np.asarray(upper)


def hashin_shtrikman_bounds(
    permittivities: Sequence[FloatArray], fractions: Sequence[float]
) -> tuple[FloatArray, FloatArray]:
    """Return the bounds of an isotropic mixture of lossless components, narrower than Wiener's.

    The parameters and errors are those of `wiener_bounds`.

    Notes
    -----
    ε = (Σ fᵢ/(εᵢ + 2ε₀))⁻¹ − 2ε₀ with ε₀ the least, or the greatest, of the εᵢ. For two components these are
    Maxwell Garnett's rule and the same with the components exchanged.

    Examples
    --------
    >>> lower, upper = hashin_shtrikman_bounds([np.array(1.0), np.array(10.0)], [0.7, 0.3])
    >>> float(lower.round(5)), float(upper.round(5))
    (1.87097, 3.07692)
    """
    parts = _positive(permittivities)
    stack = np.broadcast_arrays(*parts)
    bounds = []
    for reference in (np.minimum.reduce(stack), np.maximum.reduce(stack)):
        inverse = sum(share / (part + 2 * reference) for share, part in zip(fractions, parts, strict=True))
        bounds.append(np.asarray(1 / inverse - 2 * reference))
    return bounds[0], bounds[1]


def _positive(permittivities: Sequence[FloatArray]) -> list[FloatArray]:
    parts = [np.asarray(part, dtype=np.float64) for part in permittivities]
    for place, part in enumerate(parts):
        if not (part > 0).all():
            raise ValueError(f"permittivities[{place}] must be above 0 throughout; bounds hold for lossless media")
    return parts


def _passive_log(value: ComplexArray) -> ComplexArray:
    """Return ln ε with the argument between −π and 0, as passive media have it, also for a loss of −0."""
    out = np.empty(np.shape(value), dtype=np.complex128)
    out.real = np.log(np.abs(value))
    out.imag = -np.arctan2(np.abs(value.imag), value.real)
    return out


def _sum(shares: Sequence[float], parts: Sequence[ComplexArray], like: ComplexArray) -> ComplexArray:
    total = np.zeros_like(like)
    for share, part in zip(shares, parts, strict=True):
        total += share * part
    return total


def _never_zero(divisor: ComplexArray, scale: ComplexArray) -> ComplexArray:
    """Return `divisor` with an exact 0, the resonance of a lossless mixture, off by the last digit of `scale`."""
    zero = divisor == 0
    return np.where(zero, _LAST_DIGIT * np.abs(scale), divisor) if zero.any() else divisor
