"""The closed formulas that size a wall, each with its source.

Symbols: k₀ = 2π/λ₀, s = sin θ in air, q = √(ε − s²) the normalized wave number across a layer.
"""

import cmath
import math
from collections.abc import Sequence

import numpy as np

from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.constructions.construction import DesignPoint
from stackcore.media.base import AbstractMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.propagation import solve
from stackcore.stack import Element, Layer, Stack


def across(permittivity: complex, point: DesignPoint) -> float:
    """Return q = √(ε′ − sin²θ), more than 0: what the wavelength across a layer is shortened by.

    Raises
    ------
    ValueError
        When the wave does not go through at this angle.

    Examples
    --------
    >>> across(4.0, DesignPoint(10e9))
    2.0
    """
    squared = complex(permittivity).real - math.sin(point.angle) ** 2
    if squared <= 0:
        raise ValueError("the wave does not pass at this angle")
    return math.sqrt(squared)


def half_wave(permittivity: complex, point: DesignPoint, order: int = 1) -> float:
    """Return the thickness of a wall of `order` half-waves, m: d = m·λ₀/(2q), the same for TE and TM.

    Source: Cady, Karelitz, Turner (eds.), Radar Scanners and Radomes, MIT Radiation Laboratory Series 26 (1948),
    recalled; a lossless wall of that thickness between equal media does not reflect.

    Examples
    --------
    >>> round(half_wave(4.0, DesignPoint(10e9)) * 1e3, 3)
    7.495
    """
    return order * point.wavelength / (2 * across(permittivity, point))


def quarter_wave(permittivity: complex, point: DesignPoint) -> float:
    """Return the thickness of a quarter wave, m: d = λ₀/(4q)."""
    return half_wave(permittivity, point) / 2


def same_phase(thickness: float, of: complex, in_: complex, point: DesignPoint) -> float:
    """Return the thickness, m, of the medium `in_` that delays the wave as `thickness` of the medium `of` does."""
    return thickness * across(of, point) / across(in_, point)


def outward_reflection(
    core: complex, outside: Sequence[tuple[AbstractMedium, float]], point: DesignPoint
) -> complex:
    """Return r seen from inside a core through the layers `outside`, nearest first, to air.

    The core counts without its loss. Reference: the core's face.
    """
    inside = ConstantMedium(complex(core.real))
    elements: tuple[Element, ...] = tuple(Layer(medium, thickness) for medium, thickness in outside)
    angle = math.asin(math.sin(point.angle) / math.sqrt(core.real))
    response = solve(Stack(elements, front=inside, back=VACUUM), np.array([point.frequency]), np.array([angle]))
    return complex(response.reflection[0, 0, 0 if point.polarization == "TE" else 1])


def matched_core(core: complex, seen: Sequence[complex], point: DesignPoint) -> float:
    """Return the least thickness, m, of a core between two faces at which their reflections cancel.

    φ = (arg r₁ + arg r₂)/2 + mπ with r seen from the core outward; for two equal faces without loss the wall
    then reflects nothing. Derived from the condition that the sum over all passes vanishes.
    """
    mean = sum(cmath.phase(one) for one in seen) / len(seen)
    phase = mean % math.pi
    return phase * point.wavelength / (2 * math.pi * across(core, point))


def wave_impedance(point: DesignPoint) -> float:
    """Return the ratio of tangential E and H in air, ohm: Z₀/cos θ for TE, Z₀·cos θ for TM."""
    slope = math.cos(point.angle)
    return FREE_SPACE_IMPEDANCE / slope if point.polarization == "TE" else FREE_SPACE_IMPEDANCE * slope


def sheet_shielding(resistance: float) -> float:
    """Return the shielding of a sheet alone in air at normal incidence, dB: 20 log₁₀(1 + Z₀/(2R)).

    Source: S. A. Schelkunoff, Electromagnetic Waves (1943), recalled.

    Examples
    --------
    >>> round(sheet_shielding(10.0), 4)
    25.9493
    """
    return 20 / math.log(10) * math.log1p(FREE_SPACE_IMPEDANCE / (2 * resistance))


def sheet_for_shielding(decibels: float) -> float:
    """Return the resistance, ohm per square, of the sheet that shields by `decibels` alone in air, more than 0.

    Examples
    --------
    >>> round(sheet_for_shielding(sheet_shielding(10.0)), 9)
    10.0
    """
    return FREE_SPACE_IMPEDANCE / (2 * math.expm1(decibels * math.log(10) / 20))
