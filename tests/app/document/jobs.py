"""Jobs the tests of the document begin with."""

from app.document.session import Session
from stackcore.job import Job, job_from_json

HARBOUR = """{"format": "slabwright-job", "version": 1, "title": "Harbour radar cover",
"materials": {"skin": {"label": "Glass-fibre skin", "model": "constant",
                       "permittivity": 4.2, "loss_tangent": 0.015},
              "core": {"model": "constant", "permittivity": 1.1},
              "steel": {"model": "conductor", "conductivity": "6 MS/m", "permeability": 200}},
"stacks": [{"name": "A", "front": "air", "back": "air", "elements": [
              {"layer": "skin", "thickness": "0.9 mm"},
              {"layer": "core", "thickness": "1/4 in"},
              {"sheet": "series", "resistance": "377 ohm/sq", "capacitance": "1 pF"},
              {"layer": "skin", "thickness": 0.001}]},
           {"name": "B", "back": "metal", "elements": [{"layer": "core", "thickness": "5 mm"}]}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 41, "spacing": "linear"},
          "angle": ["0 deg", "30 deg", "45 deg"]}}"""


class Clock:
    """Seconds that pass only when told."""

    def __init__(self) -> None:
        self.now = 0.0

    def __call__(self) -> float:
        return self.now


def harbour_job() -> Job:
    """Return a job with two stacks: four elements before air, one before metal."""
    return Job(job_from_json(HARBOUR))


def harbour(clock: Clock | None = None) -> Session:
    """Return a session with the harbour job."""
    return Session(harbour_job(), clock=clock if clock is not None else Clock())
