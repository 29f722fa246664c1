"""Answers for the panels that show results, solved on the spot without a lane."""

import numpy as np

from app.document.session import Session
from app.document.view import View
from app.series.cases import cases_of
from app.workers.live import Answer, Question, solve_cases
from stackcore.errors import Severity
from stackcore.job import Job, job_from_json
from stackcore.propagation import solve

SLAB = """{"format": "slabwright-job", "version": 1, "title": "Slab",
"materials": {"resin": {"model": "constant", "permittivity": 4.0}},
"stacks": [{"name": "A", "elements": [{"layer": "resin", "thickness": "5 mm"}]},
           {"name": "B", "back": "metal", "elements": [{"layer": "resin", "thickness": "5 mm"}]},
           {"name": "C", "elements": []}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 41, "spacing": "linear"},
          "angle": ["0 deg", "30 deg", "60 deg"]}}"""


def slab_job() -> Job:
    """Return a lossless 5 mm slab of permittivity 4, before air, before metal, and nothing at all."""
    return Job(job_from_json(SLAB))


def answer_to(session: Session, view: View, stack: int = 0) -> Answer:
    """Return the answer for a stack of the session's job over its sweep, with the view's markers."""
    job, state = session.job, view.state
    frequency, angle = job.sweep.frequencies(), job.sweep.angles()
    at, tilt = state.marker_frequency(job.sweep), state.marker_angle(job.sweep)
    question = Question(
        1,
        job.stacks[stack],
        frequency,
        angle,
        at,
        tilt,
        state.markers,
        job=job,
        place=stack,
        cases=cases_of(job.record, stack, state),
    )
    return Answer(
        question,
        solve(question.stack, frequency, angle),
        solve(question.stack, np.array([at]), np.array([tilt])),
        solve(question.stack, np.array(state.markers), angle) if state.markers else None,
        0.0,
        solve_cases(question, solve),
    )


class Told:
    """Remembers what a panel told."""

    def __init__(self) -> None:
        self.words: list[tuple[str, Severity]] = []

    def __call__(self, text: str, severity: Severity) -> None:
        self.words.append((text, severity))
