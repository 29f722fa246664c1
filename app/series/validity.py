"""Where results stand on material data, and where on a guess: masks over the sweep, each with its reason."""

from collections.abc import Iterator
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from app.series.texts import frequency_text
from stackcore.job import Job
from stackcore.media.base import AbstractMedium, FloatArray, FrequencyRange
from stackcore.media.joined import JoinedMedium
from stackcore.stack import Layer, Stack

Mask = NDArray[np.bool_]


@dataclass(frozen=True, slots=True, eq=False)
class Doubt:
    """A medium of a stack that is not known at all frequencies asked for.

    Parameters
    ----------
    medium
        Which.
    held
        For each frequency, whether the medium is known there.
    """

    medium: AbstractMedium
    held: Mask


def held_at(medium: AbstractMedium, frequency: FloatArray) -> Mask:
    """Return, for each frequency in Hz, whether the medium is known there; a medium without limits always is.

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> held_at(ConstantMedium(4.0, valid_range=FrequencyRange(8e9, 12e9)), np.array([9e9, 7.7e10])).tolist()
    [True, False]
    """
    if isinstance(medium, JoinedMedium):
        return medium.holds(frequency)
    known = medium.valid_range
    return np.ones(np.shape(frequency), dtype=np.bool_) if known is None else known.contains(frequency)


def doubts_of(stack: Stack, frequency: FloatArray) -> tuple[Doubt, ...]:
    """Return the media of a stack that are not known at all of `frequency` in Hz, in the order of the wave.

    A layer without thickness changes nothing and is left out.
    """
    lowest, highest = float(frequency.min()), float(frequency.max())
    found: dict[int, Doubt] = {}
    for medium in _media(stack):
        known = medium.valid_range
        inside = known is not None and known.lowest <= lowest and highest <= known.highest
        if id(medium) in found or known is None or (inside and not isinstance(medium, JoinedMedium)):
            continue
        held = held_at(medium, frequency)
        if not held.all():
            found[id(medium)] = Doubt(medium, held)
    return tuple(found.values())


def held_by_all(doubts: tuple[Doubt, ...], frequency: FloatArray) -> Mask:
    """Return, for each frequency, whether every medium is known there."""
    held = np.ones(np.shape(frequency), dtype=np.bool_)
    for doubt in doubts:
        held &= doubt.held
    return held


def doubt_sentence(job: Job, doubts: tuple[Doubt, ...], point: int | None = None) -> str:
    """Return why a curve is dotted: at one of its points, or anywhere when `point` is None; empty where it is not.

    Examples
    --------
    ``Resin is known from 8 GHz to 12 GHz``
    """
    told = [
        f"{material_label(job, doubt.medium)} is known {known_text(doubt.medium)}"
        for doubt in doubts
        if point is None or not doubt.held[point]
    ]
    return "; ".join(told)


def material_label(job: Job, medium: AbstractMedium) -> str:
    """Return what a job calls a medium; of an earlier job's medium nothing is known but that it is one."""
    for name, own in job.media.items():
        if own is medium or own == medium:
            record = job.record.material(name)
            return (record.label if record is not None else "") or name
    return "A material"


def known_text(medium: AbstractMedium) -> str:
    """Return where a medium is known, in words that follow "known".

    Examples
    --------
    >>> from stackcore.media.constant import ConstantMedium
    >>> known_text(ConstantMedium(4.0, valid_range=FrequencyRange(8e9, 12.4e9)))
    'from 8 GHz to 12.4 GHz'
    """
    ranges = medium.valid_ranges if isinstance(medium, JoinedMedium) else (medium.valid_range,)
    told = [span_text(known) for known in ranges if known is not None and known.lowest <= known.highest]
    return f"from {' and from '.join(told)}" if told else "at no frequency"


def span_text(known: FrequencyRange) -> str:
    """Return a range of frequencies for reading: ``8 GHz to 12.4 GHz``."""
    ends = [frequency_text(end) if np.isfinite(end) and end > 0 else "any" for end in (known.lowest, known.highest)]
    return " to ".join(ends)


def _media(stack: Stack) -> Iterator[AbstractMedium]:
    yield stack.front
    for element in stack.elements:
        if isinstance(element, Layer) and element.thickness > 0:
            yield element.medium
    if isinstance(stack.back, AbstractMedium):
        yield stack.back
