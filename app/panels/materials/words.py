"""What the panel says of a material: values at a frequency, where they hold, how sure they are. No toolkit."""

import math
from collections.abc import Sequence
from typing import Final

import numpy as np

from app.series.texts import frequency_text
from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.job import Job
from stackcore.job.records import JobRecord, LayerRecord
from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.conductor import ConductorMedium
from stackcore.media.library import LibraryEntry
from stackcore.media.models import MODELS, Value, value_text
from stackcore.units import Dimension, format_value

DIGITS: Final = 4
CONDUCTOR: Final = 100.0
"""Conduction over displacement current from which a material is told by its conductivity."""

LOSS_ONCE: Final = (
    "Loss is given once: as a loss tangent, or as the loss in ε′ − jε″. Both together are refused, so that it is "
    "never counted twice."
)


def reading_at(medium: AbstractMedium, frequency: float) -> str:
    """Return what a medium is at `frequency` in Hz: ε′ and tan δ, or the skin depth of a conductor.

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> reading_at(ConstantMedium(4.2 - 0.063j), 1e10), reading_at(ConductorMedium(5.8e7), 1e10)
    ('ε′ 4.2, tan δ 0.015', 'skin depth 660.9 nm')
    """
    at = np.array([frequency])
    if isinstance(medium, ConductorMedium):
        depth = float(medium.skin_depth(at)[0])
        return f"skin depth {format_value(depth, Dimension.LENGTH, digits=DIGITS)}"
    values = medium.evaluate(at)
    permittivity, permeability = complex(values.permittivity[0]), complex(values.permeability[0])
    return pair_text("ε", permittivity) + (f", {pair_text('μ', permeability)}" if permeability != 1 else "")


def glance(permittivity: complex, frequency: float) -> str:
    """Return what a material of this relative permittivity at `frequency` in Hz is, in a few letters.

    A good conductor is known by its conductivity, a dielectric by ε′ and tan δ, and what is between by ε′ and ε″.

    Examples
    --------
    >>> glance(4.2 - 0.063j, 1e10), glance(1 - 1.0425e8j, 1e10)
    ('ε′ 4.2, tan δ 0.015', 'σ 58 MS/m')
    """
    loss = -permittivity.imag
    if loss > CONDUCTOR * abs(permittivity.real):
        conductivity = 2 * math.pi * frequency * VACUUM_PERMITTIVITY * loss
        return f"σ {format_value(conductivity, Dimension.CONDUCTIVITY, digits=DIGITS)}"
    return pair_text("ε", permittivity)


def range_caution(job: Job, name: str) -> str:
    """Return the sentence for a material that is not known over all of the sweep, or an empty text."""
    medium, record = job.media.get(name), job.record.material(name)
    if medium is None or record is None or medium.valid_range is None:
        return ""
    frequencies = job.sweep.frequencies()
    lowest, highest = float(frequencies.min()), float(frequencies.max())
    known = medium.valid_range
    if known.lowest <= lowest and highest <= known.highest:
        return ""
    beyond = []
    if lowest < known.lowest:
        beyond.append(f"down to {frequency_text(lowest)}")
    if highest > known.highest:
        beyond.append(f"up to {frequency_text(highest)}")
    known_words = f"{record.label or name} is known from {range_text(known)}"
    return f"{known_words}; the sweep goes {' and '.join(beyond)}, where its constants are a guess."


def cautions_text(cautions: Sequence[str]) -> str:
    """Return the cautions in as many words as there is room for: one by one, or how many there are."""
    if len(cautions) < 3:
        return "\n".join(cautions)
    return f"{len(cautions)} materials are not known over all of the sweep; the page Checks says where."


def range_text(known: FrequencyRange) -> str:
    """Return a range of frequencies for reading: ``8 GHz to 12.4 GHz``."""
    return f"{frequency_text(known.lowest)} to {frequency_text(known.highest)}"


def values_text(entry: LibraryEntry) -> str:
    """Return the constants of a library entry, each with its symbol."""
    model = MODELS[entry.model]
    told = []
    for constant in model.constants:
        if constant.name in entry.constants:
            value = entry.constants[constant.name]
            told.append(f"{constant.symbol or constant.label.lower()} {_constant_text(value)}")
    return ", ".join(told)


def spread_text(entry: LibraryEntry) -> str:
    """Return the typical relative spreads in production: ``ε ±2 %, tan δ ±20 %``; empty when there is none."""
    symbols = {constant.name: constant.symbol or constant.label for constant in MODELS[entry.model].constants}
    spread = [(symbols.get(name, name), share) for name, share in entry.provenance.spread if share]
    return ", ".join(f"{symbol} ±{share * 100:.3g} %" for symbol, share in spread)


def uses_text(record: JobRecord, name: str) -> str:
    """Return where a material is used, in words of the table: ``stack A: front, elements 1 and 3``."""
    return "; ".join(f"stack {stack} {', '.join(places)}" for stack, places in _uses(record, name) if places)


def _uses(record: JobRecord, name: str) -> list[tuple[str, list[str]]]:
    uses = []
    for stack in record.stacks:
        sides = [side for side in ("front", "back") if getattr(stack, side) == name]
        rows = [
            f"element {row}"
            for row, element in enumerate(stack.elements, 1)
            if isinstance(element, LayerRecord) and element.material == name
        ]
        uses.append((stack.name, sides + rows))
    return uses


def pair_text(symbol: str, value: complex) -> str:
    """Return real part and loss tangent of a relative constant; a real part of 0 or less has no tangent to read."""
    if value.real <= 0:
        return f"{symbol}′ {value.real:.{DIGITS}g}, {symbol}″ {-value.imag:.{DIGITS}g}".replace("-", "−")
    tangent = -value.imag / value.real
    name = "tan δ" if symbol == "ε" else "tan δ of μ"
    return f"{symbol}′ {value.real:.{DIGITS}g}" + (f", {name} {tangent:.{DIGITS}g}" if tangent else "")


def _constant_text(value: Value) -> str:
    if isinstance(value, bool) or not isinstance(value, complex | float | int):
        return value_text(value)
    number = complex(value)
    if number.imag == 0:
        return f"{number.real:g}"
    return f"{number.real:g} − {-number.imag:g}j"
