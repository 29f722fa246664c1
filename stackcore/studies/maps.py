"""Maps: one quantity over frequency and angle, or over one of them and something varied, coarse to fine."""

import time
from collections.abc import Generator, Iterator
from dataclasses import dataclass, replace
from typing import ClassVar, Final, Literal

import numpy as np
from numpy.typing import ArrayLike

from stackcore.arrays import FloatArray
from stackcore.errors import Fault, InputError
from stackcore.job import Job
from stackcore.polarizations import Polarization
from stackcore.propagation import solve
from stackcore.propagation.blocks import checked_angle, checked_frequency
from stackcore.quantities import Quantity
from stackcore.stack import Stack
from stackcore.studies.pacing import ChunkSize
from stackcore.studies.refining import Batch, Indices, batches, show, spread
from stackcore.studies.variation import Variation
from stackcore.studies.varying import check_values, varied_stack

Axis = Literal["frequency", "angle", "variation"]

MOST_CELLS: Final = 20_000_000
"""Of a map."""


@dataclass(frozen=True, slots=True, eq=False)
class MapLevel:
    """A map as far as it is computed.

    Parameters
    ----------
    x
        (X,): frequencies in Hz, or angles in rad of a map of angle and variation.
    y
        (Y,): angles in rad, or values of the variation in SI units.
    values
        (Y, X), read-only. Every cell is filled: with its own value when it is computed, until then with that of a
        computed point near by. Infinite decibels are infinite; NaN is where the quantity has no meaning.
    share
        The part of all cells that is computed, more than 0 to 1; 1 on the last level, which is exact at every cell.
    x_axis, y_axis
        What runs along x and y: ``frequency``, ``angle`` or ``variation``.
    """

    x: FloatArray
    y: FloatArray
    values: FloatArray
    share: float
    x_axis: Axis = "frequency"
    y_axis: Axis = "angle"


def map_over(
    job: Job,
    stack: int,
    quantity: Quantity,
    polarization: Polarization,
    frequency: ArrayLike,
    angle: ArrayLike,
    variation: Variation | None = None,
    values: ArrayLike | None = None,
) -> Generator[MapLevel, None, None]:
    """Compute a map from coarse to fine, yielding about every 10 ms a level in which every cell is filled.

    It begins with every 16th point of either axis; later levels fill in between, and no point is computed twice.
    Nothing is done until the generator is advanced; ``close()`` gives up, and takes no longer than a chunk.

    Parameters
    ----------
    job
        Under a condition: ``job.under(name)``, with a variation of that job.
    stack
        Index of the stack; that of `variation` where one is given.
    quantity
        Of `stackcore.quantities`, one number a point.
    polarization
        Of the incident wave.
    frequency, angle
        Increasing, Hz and rad. Without a variation the map is frequency along x by angle along y. With one, either
        of the two is a single value, and the other runs along x.
    variation, values
        What runs along y, one of `variations_of`, and its values, SI.

    Raises
    ------
    InputError
        Before anything is solved when the axes do not make a map of at most `MOST_CELLS`, or a value is out of its
        limits; on the way when a material is not passive with one.
    StackError
        When the stack cannot be solved.

    Examples
    --------
    >>> from stackcore import TE
    >>> from stackcore.job import job_from_json
    >>> from stackcore.quantities import quantity_named
    >>> job = Job(job_from_json('''{"format": "slabwright-job", "version": 1, "title": "Bare",
    ... "stacks": [{"name": "A", "elements": []}], "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''))
    >>> *_, last = map_over(job, 0, quantity_named("transmittance"), TE, [1e9, 2e9, 3e9], [0.0, 0.5])
    >>> last.values.tolist(), last.share
    ([[1.0, 1.0, 1.0], [1.0, 1.0, 1.0]], 1.0)
    """
    frequency, angle = checked_frequency(frequency), checked_angle(angle)
    study: _ByAngle | _ByVariation
    if variation is None:
        study = _ByAngle(job.stacks[stack], quantity, polarization, frequency, angle)
    else:
        given = np.atleast_1d(np.asarray([] if values is None else values, dtype=np.float64))
        study = _ByVariation(job, variation, quantity, polarization, frequency, angle, given, {})
    study.check()
    x, y = study.x, study.y
    cells = np.empty((y.size, x.size))
    size, done, first = ChunkSize(), 0, True
    for batch in batches(y.size, x.size, whole_rows=variation is not None):
        for chunk in _chunks(batch, size):
            begun = time.perf_counter()
            show(cells, chunk, study.computed(chunk.rows, chunk.columns))
            if first:
                spread(cells, chunk)
            points = chunk.rows.size * chunk.columns.size
            size.learn(points, time.perf_counter() - begun)
            done += points
            yield MapLevel(x, y, _frozen(cells), done / cells.size, study.x_axis, study.y_axis)
        first = False


@dataclass(frozen=True, slots=True, eq=False)
class _ByAngle:
    """Frequency along x by angle along y."""

    stack: Stack
    quantity: Quantity
    polarization: Polarization
    frequency: FloatArray
    angle: FloatArray

    x_axis: ClassVar[Axis] = "frequency"
    y_axis: ClassVar[Axis] = "angle"

    @property
    def x(self) -> FloatArray:
        return self.frequency

    @property
    def y(self) -> FloatArray:
        return self.angle

    def check(self) -> None:
        _check_size(self.frequency.size, self.angle.size)

    def computed(self, rows: Indices, columns: Indices) -> FloatArray:
        response = solve(self.stack, self.frequency[columns], self.angle[rows])
        return self.quantity.of(response, self.polarization).T


@dataclass(frozen=True, slots=True, eq=False)
class _ByVariation:
    """Frequency or angle along x by values of a variation along y."""

    job: Job
    variation: Variation
    quantity: Quantity
    polarization: Polarization
    frequency: FloatArray
    angle: FloatArray
    y: FloatArray
    stacks: dict[int, Stack]
    """Row -> its stack, made when it is first asked for."""

    y_axis: ClassVar[Axis] = "variation"

    @property
    def x_axis(self) -> Axis:
        return "angle" if self.frequency.size == 1 and self.angle.size > 1 else "frequency"

    @property
    def x(self) -> FloatArray:
        return self.angle if self.x_axis == "angle" else self.frequency

    def check(self) -> None:
        if self.frequency.size > 1 and self.angle.size > 1:
            told = f"{self.frequency.size} frequencies and {self.angle.size} angles beside a variation"
            raise InputError([Fault("", told, "one frequency or one angle in a map over a variation")])
        _check_size(self.x.size, self.y.size)
        check_values(self.variation, self.y)

    def computed(self, rows: Indices, columns: Indices) -> FloatArray:
        along = self.x[columns]
        frequency, angle = (self.frequency, along) if self.x_axis == "angle" else (along, self.angle)
        found = np.empty((rows.size, columns.size))
        for place, row in enumerate(rows.tolist()):
            if row not in self.stacks:
                self.stacks[row] = varied_stack(self.job, self.variation, float(self.y[row]))
            response = solve(self.stacks[row], frequency, angle)
            found[place] = self.quantity.of(response, self.polarization).ravel()
        return found


def _check_size(width: int, height: int) -> None:
    if not 0 < width * height <= MOST_CELLS:
        raise InputError([Fault("", f"a map of {width} by {height} points", f"1 to {MOST_CELLS} points in all")])


def _chunks(batch: Batch, size: ChunkSize) -> Iterator[Batch]:
    """Cut a batch into parts that take the time of a chunk: some whole rows, or a part of one."""
    row = 0
    while row < batch.rows.size:
        rows = batch.rows[row : row + max(1, size.points // batch.columns.size)]
        row += rows.size
        parts = -(-batch.columns.size * rows.size // size.points)
        for columns in np.array_split(batch.columns, min(parts, batch.columns.size)):
            yield replace(batch, rows=rows, columns=columns)


def _frozen(cells: FloatArray) -> FloatArray:
    copy = cells.copy()
    copy.flags.writeable = False
    return copy
