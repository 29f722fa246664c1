"""Responses of a stack while one of its numbers runs through a range."""

from collections.abc import Generator
from dataclasses import dataclass

import numpy as np
from numpy.typing import ArrayLike

from stackcore.arrays import FloatArray
from stackcore.job import Job
from stackcore.polarizations import Polarization
from stackcore.propagation import Response, solve
from stackcore.quantities import Quantity
from stackcore.studies.pacing import Pace
from stackcore.studies.variation import Variation
from stackcore.studies.varying import check_values, varied_stack


@dataclass(frozen=True, slots=True, eq=False)
class VariedResponse:
    """The answers over some values of what is varied.

    Parameters
    ----------
    variation
        What is varied.
    values
        (V,), SI, those that are solved so far, in the order asked for.
    responses
        One a value, each over the same frequencies and angles.
    share
        The part of all values that is solved, 0 to 1; 1 on the last.
    """

    variation: Variation
    values: FloatArray
    responses: tuple[Response, ...]
    share: float

    def of(self, quantity: Quantity, polarization: Polarization) -> FloatArray:
        """Return a quantity for an incident wave of `polarization`, (V, F, A)."""
        if not self.responses:
            return np.empty((0, 0, 0))
        return np.stack([quantity.of(response, polarization) for response in self.responses])


def curve_over(
    job: Job, variation: Variation, values: ArrayLike, frequency: ArrayLike, angle: ArrayLike
) -> Generator[VariedResponse, None, None]:
    """Solve a stack for each of some values, yielding about every 10 ms what there is so far; the last has all.

    Nothing is done until the generator is advanced; ``close()`` gives up. One value is solved in one go, so that
    closing takes as long as that: milliseconds for a sweep of a few angles.

    Parameters
    ----------
    job
        Under a condition: ``job.under(name)``, with a variation of that job.
    variation
        One of `variations_of`.
    values
        SI, in any order, one or more.
    frequency, angle
        Hz and rad, as `stackcore.propagation.solve` takes them.

    Raises
    ------
    JobError
        Before anything is solved when a value is out of its limits; on the way when a material is not passive
        with one.
    StackError
        When the stack cannot be solved.

    Examples
    --------
    >>> from stackcore import TE
    >>> from stackcore.job import job_from_json
    >>> from stackcore.quantities import quantity_named
    >>> from stackcore.studies import variations_of
    >>> job = Job(job_from_json('''{"format": "slabwright-job", "version": 1, "title": "Skin",
    ... "materials": {"skin": {"model": "constant", "permittivity": 4.0}},
    ... "stacks": [{"name": "A", "elements": [{"layer": "skin", "thickness": "2 mm"}]}],
    ... "sweep": {"frequency": ["10 GHz"], "angle": ["0 deg"]}}'''))
    >>> thickness = variations_of(job, 0)[0]
    >>> *_, last = curve_over(job, thickness, [0.0, 1e-3, 2e-3], 10e9, 0.0)
    >>> last.of(quantity_named("transmittance"), TE)[:, 0, 0].round(3).tolist()
    [1.0, 0.915, 0.763]
    """
    given = np.atleast_1d(np.asarray(values, dtype=np.float64))
    check_values(variation, given)
    responses: list[Response] = []
    pace = Pace()
    for value in given.tolist():
        responses.append(solve(varied_stack(job, variation, value), frequency, angle))
        if pace.due() or len(responses) == given.size:
            done = len(responses)
            yield VariedResponse(variation, given[:done], tuple(responses), done / given.size)
