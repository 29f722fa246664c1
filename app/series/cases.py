"""Which stacks are computed for the curves: the one in hand, under conditions, and those it is compared with."""

from collections.abc import Mapping
from dataclasses import dataclass

from app.document.view import ViewState
from stackcore.job import Job
from stackcore.job.records import JobRecord
from stackcore.propagation import Response
from stackcore.quantities import element_absorptance
from stackcore.stack import Stack


@dataclass(frozen=True, slots=True)
class Case:
    """One stack of a job, by its place, as it is built or under a condition."""

    stack: int
    condition: str = ""

    def resolved(self, job: Job) -> Stack:
        """Return the stack to be computed; raises `JobError` when it cannot be under the condition."""
        return job.stack_under(self.stack, self.condition) if self.condition else job.stacks[self.stack]


Responses = Mapping[Case, Response]


def cases_of(record: JobRecord, stack: int, view: ViewState) -> tuple[Case, ...]:
    """Return what must be computed besides the stack in hand as it is built; names the job lacks are passed over.

    The share that one element absorbs is compared with nothing: an element of one stack is none of another.
    """
    if element_absorptance(view.quantity) is not None:
        return ()
    conditions = conditions_shown(record, view)
    places = {one.name: place for place, one in enumerate(record.stacks)}
    wanted = [Case(stack, name) for name in conditions]
    reference = places.get(view.less)
    if reference is not None:
        wanted += [Case(reference), *(Case(reference, name) for name in conditions)]
    wanted += [Case(places[name]) for name in view.beside if name in places]
    return tuple(dict.fromkeys(case for case in wanted if case != Case(stack)))


def conditions_shown(record: JobRecord, view: ViewState) -> tuple[str, ...]:
    """Return the conditions of the envelope in the order of the job."""
    return tuple(one.name for one in record.conditions if one.name in view.conditions)
