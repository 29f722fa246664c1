"""Curves in the complex plane: reflection, transmission and input impedance as frequency runs."""

from dataclasses import dataclass
from typing import Final

import numpy as np

from app.document.view import ViewState
from app.series.curves import curve_label
from app.series.texts import MINUS, frequency_text
from app.series.validity import Mask, doubts_of, held_by_all
from stackcore.arrays import ComplexArray, FloatArray
from stackcore.polarizations import polarization
from stackcore.propagation import Response
from stackcore.quantities import quantity_named


@dataclass(frozen=True, slots=True)
class Plane:
    """One complex number that can be drawn.

    Parameters
    ----------
    label
        In menus and headings.
    symbol
        Before its value: r, t, Z.
    real, imaginary
        Quantities of its two parts.
    unit
        Of both parts.
    bounded
        Whether passive walls keep it within the unit circle.
    """

    label: str
    symbol: str
    real: str
    imaginary: str
    unit: str = ""
    bounded: bool = False


PLANES: Final = {
    "reflection": Plane("Reflection coefficient", "r", "reflection_real", "reflection_imaginary", bounded=True),
    "transmission": Plane("Transmission coefficient", "t", "transmission_real", "transmission_imaginary"),
    "impedance": Plane("Input impedance", "Z", "input_resistance_ohm", "input_reactance_ohm", "Ω"),
}
"""What the plane can show."""

FARTHEST_IMPEDANCE: Final = 5e3
"""Ω; the plane of impedances shows at first what lies within: a resonance has no largest value."""


@dataclass(frozen=True, slots=True, eq=False)
class PlaneCurve:
    """One line in the plane.

    Parameters
    ----------
    label
        Words: ``TE 30°``.
    polarization
        Key of `stackcore.polarizations`.
    angle_rank, angle_count
        Place of the angle among the sweep's, for the colour.
    frequency
        (F,) Hz, rising.
    values
        (F,), complex; not a number where there is none.
    held
        For each point, whether every material of the stack is known there.
    """

    label: str
    polarization: str
    angle_rank: int
    angle_count: int
    frequency: FloatArray
    values: ComplexArray
    held: Mask

    def at(self, frequency: float) -> complex:
        """Return the value at a frequency in Hz, between the points along their chord; not a number outside."""
        inside = self.frequency[0] <= frequency <= self.frequency[-1]
        if not inside:
            return complex(np.nan, np.nan)
        real = np.interp(frequency, self.frequency, self.values.real)
        return complex(float(real), float(np.interp(frequency, self.frequency, self.values.imag)))


def plane_curves(response: Response, view: ViewState, plane: str) -> tuple[PlaneCurve, ...]:
    """Return the curves of a plane, angle by angle, for the polarizations of the view that have the number.

    A circular or tilted wave has an input impedance at normal incidence only.
    """
    row = PLANES[plane]
    order = np.argsort(response.frequency, kind="stable")
    ranks = np.argsort(np.argsort(response.angle, kind="stable"), kind="stable")
    held = held_by_all(doubts_of(response.stack, response.frequency), response.frequency)[order]
    tables = {key: _complex(row, response, key) for key in view.polarizations}
    curves = []
    for index, angle in enumerate(response.angle.tolist()):
        for key, table in tables.items():
            values = table[order, index]
            if np.isfinite(values).any():
                rank = (int(ranks[index]), len(response.angle))
                curve = PlaneCurve(curve_label(key, angle), key, *rank, response.frequency[order], values, held)
                curves.append(curve)
    return tuple(curves)


def plane_extent(curves: tuple[PlaneCurve, ...], plane: str) -> tuple[float, float, float, float]:
    """Return what of the plane is shown at first: left, right, low, high."""
    row = PLANES[plane]
    values = (
        np.concatenate([curve.values[np.isfinite(curve.values)] for curve in curves]) if curves else np.zeros(0)
    )
    if row.unit:
        near = values[np.abs(values) <= FARTHEST_IMPEDANCE]
        reach = max(400.0, float(np.abs(near.imag).max()) if near.size else 0.0) * 1.05
        right = max(400.0, float(near.real.max()) if near.size else 0.0) * 1.05
        return min(-0.04 * right, float(near.real.min()) if near.size else 0.0), right, -reach, reach
    largest = max(1.0, float(np.abs(values).max()) if values.size else 0.0) * 1.06
    return -largest, largest, -largest, largest


def value_words(plane: str, value: complex) -> str:
    """Return a complex value as real and imaginary part, and as magnitude and phase.

    Examples
    --------
    >>> value_words("reflection", -0.6 + 0.0j)
    'r = −0.6000 + j0.0000, 0.6000 at 180.00°'
    >>> value_words("impedance", 50 - 25j)
    'Z = 50.00 − j25.00 Ω'
    """
    row = PLANES[plane]
    decimals = 2 if row.unit else 4
    sign = MINUS if value.imag < 0 else "+"
    real = f"{value.real:.{decimals}f}".replace("-", MINUS)
    told = f"{row.symbol} = {real} {sign} j{abs(value.imag):.{decimals}f}"
    if row.unit:
        return f"{told} {row.unit}"
    phase = f"{np.degrees(np.angle(value)):.2f}".replace("-", MINUS)
    return f"{told}, {abs(value):.4f} at {phase}°"


def point_words(curve: PlaneCurve, plane: str, point: int) -> str:
    """Return the reading of a curve at one of its points; a reflection also as impedance of the front's wave.

    The impedance is normalised to that of the incident wave, z = (1 + r)/(1 − r).

    Source: any text on transmission lines, for tangential fields; recalled.
    """
    value = complex(curve.values[point])
    told = f"{curve.label}, {frequency_text(float(curve.frequency[point]))}: {value_words(plane, value)}"
    if plane == "reflection" and value != 1:
        z = (1 + value) / (1 - value)
        sign = MINUS if z.imag < 0 else "+"
        told += f", z = {z.real:.3f} {sign} j{abs(z.imag):.3f}".replace("-", MINUS)
    return told


def data_table(curves: tuple[PlaneCurve, ...], plane: str) -> str:
    """Return the curves as text with tabs: frequency in Hz, then both parts of each, full precision."""
    row = PLANES[plane]
    unit = f", {row.unit}" if row.unit else ""
    heads = [f"{part} {row.symbol} {curve.label}{unit}" for curve in curves for part in ("Re", "Im")]
    parts = [part for curve in curves for part in (curve.values.real, curve.values.imag)]
    table = np.column_stack([curves[0].frequency, *parts])
    rows = ["\t".join(map(repr, line)) for line in table.tolist()]
    return "\n".join(["\t".join(["Frequency, Hz", *heads]), *rows]) + "\n"


def _complex(row: Plane, response: Response, key: str) -> ComplexArray:
    wave = polarization(key)
    real = quantity_named(row.real).of(response, wave)
    found = np.empty(real.shape, dtype=np.complex128)
    found.real, found.imag = real, quantity_named(row.imaginary).of(response, wave)
    found[~np.isfinite(found)] = complex(np.nan, np.nan)
    return found
