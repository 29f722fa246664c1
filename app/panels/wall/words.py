"""What the drawing says in words: fractions of power, tool tips, and the wall for those who hear it."""

import cmath
import math
from typing import Final

import numpy as np

from app.panels.wall.parts import LayerPart, Part, Wall
from app.panels.wall.rays import Powers
from app.panels.wall.refraction import Direction
from app.series.texts import MINUS, angle_text
from stackcore.media.base import AbstractMedium
from stackcore.sheets.base import AbstractSheet

EMPTY_HINT: Final = "No layers yet. Add one in the table below (Insert)."
PRACTICAL_LIMIT: Final = 1e-40
"""Fraction of power below which no wall keeps its word: seams and doors govern."""


def share_text(share: float) -> str:
    """Return a fraction of power to read: per cent, and decibels where per cent would be all zeros.

    Examples
    --------
    >>> share_text(0.08259), share_text(0.9), share_text(2.5e-4), share_text(3e-9)
    ('8.26 %', '90.0 %', '0.025 %', '−85.2 dB')
    """
    if share >= 0.9995:
        return f"{100 * share:.4g} %" if share < 0.99995 else "100 %"
    if share >= 1e-2:
        return f"{100 * share:#.3g} %"
    if share >= 1e-4:
        return f"{100 * share:#.2g} %"
    if share >= PRACTICAL_LIMIT:
        return f"{MINUS}{-10 * math.log10(share):.1f} dB"
    return f"under {MINUS}400 dB" if share > 0 else "0 %"


def tilt_text(angle: float) -> str:
    """Return a signed angle in rad to read, to a tenth of a degree."""
    return angle_text(math.radians(round(math.degrees(angle), 1))).replace("-", MINUS)


def medium_text(medium: AbstractMedium, frequency: float) -> str:
    """Return permittivity, loss and permeability at a frequency, one line."""
    values = medium.evaluate(np.array(frequency))
    permittivity, permeability = complex(values.permittivity), complex(values.permeability)
    texts = [_constant_text("ε", permittivity)]
    if permeability != 1:
        texts.append(_constant_text("μ", permeability))
    if permittivity.real > 0 and 0 < -permittivity.imag < permittivity.real:
        texts.append(f"loss tangent {-permittivity.imag / permittivity.real:.3g}")
    return ", ".join(texts)


def sheet_text(sheet: AbstractSheet, frequency: float) -> str:
    """Return the impedance of a sheet at a frequency."""
    impedance = complex(sheet.impedance(np.array(frequency)))
    sign = "+" if impedance.imag >= 0 else MINUS
    size = f"|Z| {abs(impedance):.4g} Ω/sq, {tilt_text(cmath.phase(impedance))}"
    return f"Z = {impedance.real:.4g} {sign} j{abs(impedance.imag):.4g} Ω/sq ({size})"


def direction_text(direction: Direction) -> str:
    """Return where the wave goes in a medium."""
    if direction.decays:
        return "the wave only decays here"
    return f"wave at {tilt_text(direction.angle)} to the normal"


def part_text(row: int, part: Part) -> str:
    """Return an element in a few words: ``2: Foam core, 6 mm``."""
    return f"{row + 1}: {part.name}, {part.text}" if part.text else f"{row + 1}: {part.name}"


def described(wall: Wall, powers: Powers | None, circumstances: str = "") -> str:
    """Return the whole wall in words, front to back, with what the wave does at the marker.

    Parameters
    ----------
    circumstances
        Frequency, angle and polarization of `powers`.
    """
    layers = sum(isinstance(part, LayerPart) for part in wall.elements)
    sheets = len(wall.elements) - layers
    counts = [_counted(layers, "layer")] + ([_counted(sheets, "sheet")] if sheets else [])
    parts = [f"{part_text(row, part)}." for row, part in enumerate(wall.elements)]
    words = [f"Wall: front {wall.front.name}, {' and '.join(counts)}, back {wall.back.name}."]
    words += parts
    words += [
        f"Elements {group.first + 1} to {group.last + 1} are repeated {group.repeat} times."
        for group in wall.groups
    ]
    if powers is not None:
        words.append(
            f"At {circumstances}: reflected {share_text(powers.reflectance)}, "
            f"transmitted {share_text(powers.transmittance)}, "
            f"absorbed {share_text(math.fsum(powers.absorbed))}."
        )
    return " ".join(words)


def named(wall: Wall, rows: tuple[int, ...]) -> str:
    """Return the name of the drawing for a screen reader, with what is selected."""
    chosen = [part_text(row, wall.elements[row]) for row in rows if row < len(wall.elements)]
    return f"Wall drawing, selected {'; '.join(chosen)}" if chosen else "Wall drawing"


def _constant_text(letter: str, value: complex) -> str:
    if value.imag == 0:
        return f"{letter} = {_real(value)}"
    return f"{letter} = {_real(value)} {MINUS} j{-value.imag:.3g}"


def _real(value: complex) -> str:
    return f"{value.real:.4g}".replace("-", MINUS)


def _counted(count: int, word: str) -> str:
    return f"{count or 'no'} {word}{'' if count == 1 else 's'}"
