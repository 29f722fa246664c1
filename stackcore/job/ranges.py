"""Where a job asks a material outside the frequencies at which it is known to hold."""

from collections.abc import Iterator, Mapping
from dataclasses import dataclass

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import FloatArray
from stackcore.errors import Fault
from stackcore.job.inspector import join
from stackcore.job.materials import references_of
from stackcore.job.records import JobRecord, LayerRecord
from stackcore.job.resolve import Job
from stackcore.media.base import AbstractMedium, FrequencyRange
from stackcore.media.joined import JoinedMedium
from stackcore.units import Dimension, format_value


@dataclass(frozen=True, slots=True)
class RangeFinding:
    """One material that the sweep asks where it is not known to hold.

    Parameters
    ----------
    material
        Its name in the job.
    places
        Paths of the layers and half-spaces that are made of it, directly or through other materials.
    known
        Where it holds; empty (lowest above highest) when what it is made of has no common range.
    outside
        The parts of the sweep, in Hz, where it does not hold, from low to high.
    share
        Of the frequencies of the sweep, from 0 to 1.
    """

    material: str
    places: tuple[str, ...]
    known: FrequencyRange
    outside: tuple[FrequencyRange, ...]
    share: float

    @property
    def fault(self) -> Fault:
        """The finding as a warning at the material, for a list of messages."""
        parts = " and ".join(_span(part) for part in self.outside)
        known = f"holds from {_span(self.known)}" if self.known.lowest <= self.known.highest else "holds nowhere"
        told = f"{known}; the sweep asks it at {parts}, {self.share:.0%} of its frequencies"
        allowed = "a sweep within the range, or data beyond it; results outside are extrapolated"
        return Fault(join("materials", self.material), told, allowed, "warning")


def range_findings(job: Job) -> tuple[RangeFinding, ...]:
    """Return every material that something in the job is made of and that does not hold over all of the sweep.

    Of a material that is made of others the others are told as well, each by its own range.
    """
    frequencies = np.unique(job.sweep.frequencies())
    found = []
    for name, places in _places(job.record).items():
        medium = job.media[name]
        if not places or medium.valid_range is None:
            continue
        outside = ~_holds(medium, medium.valid_range, frequencies)
        if outside.any():
            parts = tuple(_parts(frequencies, outside))
            found.append(RangeFinding(name, places, medium.valid_range, parts, float(outside.mean())))
    return tuple(found)


def _holds(medium: AbstractMedium, known: FrequencyRange, frequencies: FloatArray) -> NDArray[np.bool_]:
    # A joined material may have gaps inside its range.
    return medium.holds(frequencies) if isinstance(medium, JoinedMedium) else known.contains(frequencies)


def _parts(frequencies: FloatArray, outside: NDArray[np.bool_]) -> Iterator[FrequencyRange]:
    """Yield each run of neighbouring frequencies that lie outside."""
    edges = np.flatnonzero(np.diff(np.concatenate(([0], outside.astype(np.int8), [0]))))
    for first, end in zip(edges[::2], edges[1::2], strict=True):
        yield FrequencyRange(float(frequencies[first]), float(frequencies[end - 1]))


def _places(record: JobRecord) -> Mapping[str, tuple[str, ...]]:
    """Return the paths at which each material of the job is used."""
    places: dict[str, list[str]] = {material.name: [] for material in record.materials}
    for number, stack in enumerate(record.stacks):
        path = join("stacks", number)
        uses = [(stack.front, f"{path}.front"), (stack.back, f"{path}.back")]
        uses += [
            (element.material, f"{path}.elements[{row}].layer")
            for row, element in enumerate(stack.elements)
            if isinstance(element, LayerRecord)
        ]
        for name, place in uses:
            if name in places:
                places[name].append(place)
    made_of = {material.name: {used for _, used in references_of(material)} for material in record.materials}
    inside = [(name, inner) for name, own in places.items() if own for inner in _all_inside(name, made_of)]
    direct = {name: tuple(own) for name, own in places.items()}
    for name, inner in inside:
        if inner in places:
            places[inner] += direct[name]
    return {name: tuple(dict.fromkeys(own)) for name, own in places.items()}


def _all_inside(name: str, made_of: Mapping[str, set[str]]) -> set[str]:
    """Return everything a material is made of, through all levels."""
    found: set[str] = set()
    waiting = set(made_of[name])
    while waiting:
        inner = waiting.pop()
        if inner not in found:
            found.add(inner)
            waiting |= made_of.get(inner, set())
    return found


def _span(band: FrequencyRange) -> str:
    ends = [format_value(end, Dimension.FREQUENCY, digits=4) for end in (band.lowest, band.highest)]
    return ends[0] if band.lowest == band.highest else f"{ends[0]} to {ends[1]}"
