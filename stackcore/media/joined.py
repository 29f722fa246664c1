"""One material by different models in different ranges, with the joins told."""

import math
from collections.abc import Iterator, Mapping
from dataclasses import dataclass
from itertools import pairwise

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.errors import Fault, InputError
from stackcore.media.base import (
    UNSOURCED,
    AbstractMedium,
    ConstantSlope,
    Constitutive,
    FrequencyRange,
    Provenance,
)


@dataclass(frozen=True, slots=True)
class JoinStep:
    """How the values jump at a join.

    Parameters
    ----------
    frequency
        Of the join, in Hz.
    permittivity_below, permittivity_above, permeability_below, permeability_above
        Of the parts on both sides, at the join.
    """

    frequency: float
    permittivity_below: complex
    permittivity_above: complex
    permeability_below: complex
    permeability_above: complex

    @property
    def permittivity_step(self) -> float:
        """|Δε| as a share of the larger |ε|."""
        return _share(self.permittivity_below, self.permittivity_above)

    @property
    def permeability_step(self) -> float:
        """|Δμ| as a share of the larger |μ|."""
        return _share(self.permeability_below, self.permeability_above)


@dataclass(frozen=True, slots=True)
class JoinedMedium(AbstractMedium):
    """A medium that is one part up to a join and the next part from there on.

    Parameters
    ----------
    parts
        Two or more media, from low to high frequency.
    joins
        Hz, rising, one between each two parts. At a join itself the part above it answers.
    provenance
        See `stackcore.media.base`.

    Raises
    ------
    InputError
        With a fault for every join that is out of order, or a wrong number of joins.

    Notes
    -----
    ε and μ jump at a join; `steps` tells by how much. Across a join the material is not causal, and a pulse that
    holds the join in its band is distorted by the jump. `constant_slopes` are those of the part that answers; the
    joins are declarations, not constants.

    Examples
    --------
    >>> from stackcore.media.conductor import ConductorMedium
    >>> from stackcore.media.constant import ConstantMedium
    >>> film = JoinedMedium((ConductorMedium(5e5), ConstantMedium(3.8 - 0.02j)), (1e13,))
    >>> film.part_at(np.array([1e10, 1e13, 5e14])).tolist()
    [0, 1, 1]
    """

    parts: tuple[AbstractMedium, ...]
    joins: tuple[float, ...]
    provenance: Provenance = UNSOURCED

    def __post_init__(self) -> None:
        if faults := tuple(_faults(self.parts, self.joins)):
            raise InputError(faults)

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def spans(self) -> tuple[FrequencyRange, ...]:
        """The frequencies for which each part answers, from 0 to infinity altogether."""
        ends = (0.0, *self.joins, math.inf)
        return tuple(FrequencyRange(lowest, highest) for lowest, highest in pairwise(ends))

    @property
    def valid_ranges(self) -> tuple[FrequencyRange, ...]:
        """Where each part both answers and holds; between them there may be gaps (`holds`)."""
        found = []
        for part, span in zip(self.parts, self.spans, strict=True):
            own = part.valid_range or span
            lowest, highest = max(own.lowest, span.lowest), min(own.highest, span.highest)
            if lowest <= highest:
                found.append(FrequencyRange(lowest, highest))
        return tuple(found)

    @property
    def valid_range(self) -> FrequencyRange | None:
        """From the lowest frequency at which a part holds to the highest; None when there is no limit.

        Gaps inside are left to `valid_ranges`. A medium none of whose parts holds where it answers has a range that
        holds no frequency.
        """
        ranges = self.valid_ranges
        if not ranges:
            return FrequencyRange(math.inf, 0.0)
        overall = FrequencyRange(ranges[0].lowest, ranges[-1].highest)
        return None if overall == FrequencyRange(0.0, math.inf) and not self.gaps else overall

    @property
    def gaps(self) -> tuple[FrequencyRange, ...]:
        """The open ranges inside `valid_range` where no part holds."""
        return tuple(
            FrequencyRange(before.highest, after.lowest)
            for before, after in pairwise(self.valid_ranges)
            if before.highest < after.lowest
        )

    def part_at(self, frequency: FloatArray) -> NDArray[np.intp]:
        """Return the number of the part that answers at each frequency in Hz."""
        return np.searchsorted(np.asarray(self.joins), frequency, side="right")

    def holds(self, frequency: FloatArray) -> NDArray[np.bool_]:
        """Return whether the part that answers at each frequency in Hz also holds there."""
        frequency = np.asarray(frequency, dtype=np.float64)
        held = np.zeros(frequency.shape, dtype=np.bool_)
        which = self.part_at(frequency)
        for number, part in enumerate(self.parts):
            inside = True if part.valid_range is None else part.valid_range.contains(frequency)
            held |= (which == number) & inside
        return held

    def steps(self) -> tuple[JoinStep, ...]:
        """Return the jump at each join."""
        found = []
        for join, (below, above) in zip(self.joins, pairwise(self.parts), strict=True):
            left, right = below.evaluate(np.array(join)), above.evaluate(np.array(join))
            found.append(
                JoinStep(
                    join,
                    complex(left.permittivity),
                    complex(right.permittivity),
                    complex(left.permeability),
                    complex(right.permeability),
                )
            )
        return tuple(found)

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        epsilon, mu, epsilon_slope, mu_slope = (np.empty(frequency.shape, np.complex128) for _ in range(4))
        for part, here in self._shares(frequency):
            values = part.evaluate(frequency[here])
            epsilon[here], mu[here] = values.permittivity, values.permeability
            epsilon_slope[here], mu_slope[here] = values.permittivity_slope, values.permeability_slope
        return Constitutive(epsilon, mu, epsilon_slope, mu_slope)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        frequency = np.asarray(frequency, dtype=np.float64)
        slopes: dict[str, ConstantSlope] = {}
        which = self.part_at(frequency)
        for number, part in enumerate(self.parts):
            here = which == number
            for constant, slope in part.constant_slopes(frequency[here]).items():
                slopes[f"parts[{number}].{constant}"] = ConstantSlope(
                    _spread(slope.permittivity, here), _spread(slope.permeability, here)
                )
        return slopes

    def _shares(self, frequency: FloatArray) -> Iterator[tuple[AbstractMedium, NDArray[np.bool_]]]:
        """Yield each part that answers anywhere, and where; no part is asked outside its span."""
        which = self.part_at(frequency)
        for number, part in enumerate(self.parts):
            here = np.asarray(which == number)
            if here.any():
                yield part, here


def _spread(values: ComplexArray, here: NDArray[np.bool_]) -> ComplexArray:
    """Return `values` at their places, 0 elsewhere."""
    out = np.zeros(np.shape(here), dtype=np.complex128)
    out[here] = values
    return out


def _share(below: complex, above: complex) -> float:
    return abs(above - below) / max(abs(below), abs(above))


def _faults(parts: tuple[AbstractMedium, ...], joins: tuple[float, ...]) -> Iterator[Fault]:
    if len(parts) < 2:
        yield Fault("parts", f"{len(parts)} parts have nothing to join", "two parts or more")
    elif len(joins) != len(parts) - 1:
        yield Fault("joins", f"{len(joins)} joins for {len(parts)} parts", "one join between each two parts")
    for place, join in enumerate(joins):
        if not (math.isfinite(join) and join > 0):
            yield Fault(f"joins[{place}]", f"{join:g} Hz is no frequency", "a frequency in Hz above 0")
    for place, (before, join) in enumerate(pairwise(joins), 1):
        if join <= before:
            yield Fault(f"joins[{place}]", f"{join:g} Hz follows {before:g} Hz", "joins that rise")
