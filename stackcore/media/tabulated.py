"""Measured data: ε, and μ where it was measured, at a list of frequencies."""

import math
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from itertools import pairwise
from typing import Final

import numpy as np
from numpy.typing import ArrayLike, NDArray

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
from stackcore.media.checks import LARGEST, SMALLEST, check_positive
from stackcore.media.monotone import MonotoneCurve, monotone_curve
from stackcore.media.parts import both_slopes, complex_of, never_zero
from stackcore.units import Dimension, format_value

SAME_FREQUENCY: Final = 1e-9
"""Two rows whose frequencies differ by less than this share are two values for one frequency."""


@dataclass(frozen=True, slots=True)
class TabulatedMedium(AbstractMedium):
    """ε and μ interpolated between the rows of a table; μ = 1 where the table has none.

    Parameters
    ----------
    frequency
        Hz, two or more, rising.
    permittivity, permeability
        ε′ − jε″ and μ′ − jμ″ in each row; None for a table without μ.
    permittivity_scale, loss_scale
        Factors for all ε′ and all ε″, 1 for the table as it stands: batch spread of a measured material.
    permeability_scale, magnetic_loss_scale
        Likewise for μ.
    valid_range
        Inside the table; the ends of the table when None.
    provenance
        See `stackcore.media.base`.

    Raises
    ------
    InputError
        With a fault for every row that is not finite, has gain, an ε or μ of 0, or a frequency that does not rise.

    Notes
    -----
    Real part and loss are each interpolated over ln f by piecewise cubics that stay between neighbouring rows
    (`stackcore.media.monotone`), so there is no overshoot and no gain; a column of one sign is interpolated by its
    logarithm. The slopes are those of the interpolant, exactly. Outside the table the values of its ends are held,
    which no measurement supports. `constant_slopes` are those of the four scales; the rows are data, not constants.

    Examples
    --------
    >>> laminate = TabulatedMedium((8e9, 12e9), (4.30 - 0.060j, 4.28 - 0.066j))
    >>> complex(np.round(laminate.evaluate(np.array(10e9)).permittivity, 3))
    (4.289-0.063j)
    """

    frequency: tuple[float, ...]
    permittivity: tuple[complex, ...]
    permeability: tuple[complex, ...] | None = None
    permittivity_scale: float = field(default=1.0, kw_only=True)
    loss_scale: float = field(default=1.0, kw_only=True)
    permeability_scale: float = field(default=1.0, kw_only=True)
    magnetic_loss_scale: float = field(default=1.0, kw_only=True)
    valid_range: FrequencyRange | None = None
    provenance: Provenance = UNSOURCED
    _electric: tuple[MonotoneCurve, MonotoneCurve] = field(init=False, repr=False, compare=False)
    _magnetic: tuple[MonotoneCurve, MonotoneCurve] | None = field(init=False, repr=False, compare=False)

    def __post_init__(self) -> None:
        for name in ("permittivity_scale", "loss_scale", "permeability_scale", "magnetic_loss_scale"):
            check_positive(name, getattr(self, name))
        faults = [*table_faults(self.frequency, self.permittivity, self.permeability)]
        if not faults and self.valid_range is not None:
            faults += _range_faults(self.valid_range, self.frequency)
        if faults:
            raise InputError(faults)
        if self.valid_range is None:
            object.__setattr__(self, "valid_range", FrequencyRange(self.frequency[0], self.frequency[-1]))
        x = np.log(np.asarray(self.frequency, dtype=np.float64))
        object.__setattr__(self, "_electric", _curves(x, self.permittivity))
        object.__setattr__(self, "_magnetic", self.permeability and _curves(x, self.permeability))

    @classmethod
    def from_arrays(
        cls,
        frequency: ArrayLike,
        permittivity: ArrayLike,
        permeability: ArrayLike | None = None,
        provenance: Provenance = UNSOURCED,
    ) -> "TabulatedMedium":
        """Return the medium of columns; frequencies in Hz that fall throughout are turned round.

        Examples
        --------
        >>> wavelength, index, extinction = np.array([0.5e-6, 0.6e-6]), np.array([1.52, 1.51]), 1e-7
        >>> film = TabulatedMedium.from_arrays(299_792_458 / wavelength, (index - 1j * extinction) ** 2)
        >>> film.valid_range.lowest < film.valid_range.highest
        True
        """
        hertz = np.ravel(np.asarray(frequency, dtype=np.float64))
        order = slice(None, None, -1 if hertz.size > 1 and bool((hertz[1:] < hertz[:-1]).all()) else 1)
        mu = None if permeability is None else _column(permeability, order)
        return cls(tuple(hertz[order].tolist()), _column(permittivity, order), mu, provenance=provenance)

    @property
    def dispersive(self) -> bool:
        return True

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        frequency = np.asarray(frequency, dtype=np.float64)
        place = self._place(frequency)
        epsilon, epsilon_slope = self._scaled(self._electric, place, self.permittivity_scale, self.loss_scale)
        if self._magnetic is None:
            one = np.ones_like(epsilon)
            return Constitutive(epsilon, one, epsilon_slope, np.zeros_like(one))
        mu, mu_slope = self._scaled(self._magnetic, place, self.permeability_scale, self.magnetic_loss_scale)
        return Constitutive(epsilon, mu, epsilon_slope, mu_slope)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        values = self.evaluate(frequency)
        electric = {
            "permittivity_scale": complex_of(values.permittivity.real / self.permittivity_scale, 0.0),
            "loss_scale": complex_of(0.0, values.permittivity.imag / self.loss_scale),
        }
        if self._magnetic is None:
            return both_slopes(frequency, electric, {})
        magnetic = {
            "permeability_scale": complex_of(values.permeability.real / self.permeability_scale, 0.0),
            "magnetic_loss_scale": complex_of(0.0, values.permeability.imag / self.magnetic_loss_scale),
        }
        return both_slopes(frequency, electric, magnetic)

    def _place(self, frequency: FloatArray) -> "_Place":
        nodes = self._electric[0].x
        x = np.clip(np.log(frequency), nodes[0], nodes[-1])
        piece = np.clip(np.searchsorted(nodes, x, side="right") - 1, 0, nodes.size - 2)
        inside = (frequency >= self.frequency[0]) & (frequency <= self.frequency[-1])
        return _Place(x, piece, np.where(inside, 1 / frequency, 0.0))

    @staticmethod
    def _scaled(
        curves: tuple[MonotoneCurve, MonotoneCurve], place: "_Place", real_scale: float, loss_scale: float
    ) -> tuple[ComplexArray, ComplexArray]:
        (real, real_slope), (loss, loss_slope) = (curve.at(place.x, place.piece) for curve in curves)
        # Rounding may leave the smallest loss a last digit below 0.
        value = never_zero(complex_of(real_scale * real, -loss_scale * np.maximum(loss, 0.0)))
        by_log = complex_of(real_scale * real_slope, -loss_scale * loss_slope)
        return value, np.asarray(by_log * place.by_hertz)


@dataclass(frozen=True, slots=True)
class _Place:
    """Where frequencies lie in the table: ln f, the piece, and d ln f/df, which is 0 outside the table."""

    x: FloatArray
    piece: NDArray[np.intp]
    by_hertz: FloatArray


def _column(values: ArrayLike, order: slice) -> tuple[complex, ...]:
    return tuple(np.ravel(np.asarray(values, dtype=np.complex128))[order].tolist())


def _curves(x: FloatArray, values: tuple[complex, ...]) -> tuple[MonotoneCurve, MonotoneCurve]:
    column = np.asarray(values, dtype=np.complex128)
    return monotone_curve(x, column.real), monotone_curve(x, 0.0 - column.imag)


def table_faults(
    frequency: Sequence[float],
    permittivity: Sequence[complex],
    permeability: Sequence[complex] | None = None,
    names: Sequence[str] = (),
) -> Iterator[Fault]:
    """Yield a fault for everything that keeps columns from being a table, each with its row.

    `names` are what rows are called instead of their numbers, such as ``line 14`` of a file.
    """
    rows = len(frequency)
    if rows < 2:
        yield Fault("frequency", f"a table of {rows} rows", "two rows or more; one value is a constant medium")
    for name, column in (("permittivity", permittivity), ("permeability", permeability)):
        if column is not None and len(column) != rows:
            yield Fault(name, f"{len(column)} values for {rows} frequencies", "one value for each frequency")
    yield from _frequency_faults(frequency, names)
    yield from _value_faults("permittivity", permittivity, names)
    yield from _value_faults("permeability", permeability or (), names)


def _place(column: str, row: int, names: Sequence[str]) -> str:
    return names[row] if names else f"{column}[{row}]"


def _frequency_faults(frequency: Sequence[float], names: Sequence[str]) -> Iterator[Fault]:
    for row, given in enumerate(frequency):
        place = _place("frequency", row, names)
        if not math.isfinite(given):
            yield Fault(place, f"{given} is not a finite number", "a frequency in Hz above 0")
        elif not SMALLEST <= given <= LARGEST:
            yield Fault(place, f"{given:g} Hz is no frequency of a wave", "a frequency in Hz above 0")
    for row, (before, given) in enumerate(pairwise(frequency), 1):
        if not (math.isfinite(before) and math.isfinite(given)):
            continue
        place = _place("frequency", row, names)
        if abs(given - before) <= SAME_FREQUENCY * abs(before):
            told = f"{_hertz(given)} stands in {names[row - 1] if names else f'row {row - 1}'} already"
            yield Fault(place, told, "each frequency once; average what was measured twice")
        elif given < before:
            told = f"{_hertz(given)} follows {_hertz(before)}"
            yield Fault(place, told, "frequencies that rise from row to row")


def _value_faults(name: str, column: Sequence[complex], names: Sequence[str]) -> Iterator[Fault]:
    for row, value in enumerate(column):
        given, place = complex(value), _place(name, row, names)
        if not (math.isfinite(given.real) and math.isfinite(given.imag)):
            yield Fault(place, f"{given} is not finite", "a finite number; leave out rows without a value")
        elif given.imag > 0:
            told = f"the loss {-given.imag:g} is negative, which would be gain"
            yield Fault(place, told, "real − j·loss with a loss of 0 or more")
        elif given == 0:
            yield Fault(place, f"a {name} of 0", "a value other than 0")
        elif any(part and not SMALLEST <= abs(part) <= LARGEST for part in (given.real, given.imag)):
            allowed = f"parts of 0, or of a size from {SMALLEST:g} to {LARGEST:g}"
            yield Fault(place, f"{given} is beyond what any matter has", allowed)


def _range_faults(given: FrequencyRange, frequency: tuple[float, ...]) -> Iterator[Fault]:
    if not frequency[0] <= given.lowest <= given.highest <= frequency[-1]:
        told = f"{_hertz(given.lowest)} to {_hertz(given.highest)} does not lie inside the table"
        yield Fault("valid_range", told, f"a range inside {_hertz(frequency[0])} to {_hertz(frequency[-1])}")


def _hertz(frequency: float) -> str:
    return format_value(frequency, Dimension.FREQUENCY, digits=9)
