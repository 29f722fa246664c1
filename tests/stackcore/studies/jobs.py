"""A job with a group, a disabled row, sheets, a library material and a mixture, for the studies."""

from stackcore.job import Job, job_from_json
from stackcore.studies import Variation, variations_of

TEXT = """{"format": "slabwright-job", "version": 1, "title": "Ferry dome",
"materials": {"skin": {"label": "Glass skin", "model": "constant", "permittivity": 4.2, "loss_tangent": 0.015},
              "core": {"model": "constant", "permittivity": [1.1, 0.002]},
              "water": {"model": "multi-debye", "high_frequency_permittivity": 5.2, "terms": [
                  {"permittivity_step": 73.0, "relaxation_time": "8.3 ps"}]},
              "cover": {"library": "plastics/ptfe"},
              "damp": {"model": "mixture", "rule": "looyenga", "host": "core",
                       "inclusions": [{"material": "water", "fraction": 0.02}]}},
"stacks": [{"name": "A", "elements": [
              {"layer": "skin", "thickness": "0.9 mm"},
              {"repeat": 3, "elements": [{"layer": "damp", "thickness": "2 mm"},
                                         {"layer": "skin", "thickness": "0.2 mm", "enabled": false},
                                         {"sheet": "series", "resistance": "400 ohm/sq", "capacitance": "1 pF"}]},
              {"layer": "cover", "thickness": "1 mm"},
              {"sheet": "film", "conductivity": "0.55 MS/m", "thickness": "18 nm"},
              {"layer": "skin", "thickness": "1 mm"}]},
           {"name": "B", "back": "metal", "elements": [{"layer": "core", "thickness": "5 mm"}]}],
"sweep": {"frequency": ["8 GHz", "10 GHz"], "angle": ["0 deg", "45 deg"]}}"""


def dome_job() -> Job:
    """Return the job."""
    return Job(job_from_json(TEXT))


def variation(job: Job, path: str, stack: int = 0) -> Variation:
    """Return the variation at a place of the record."""
    return next(found for found in variations_of(job, stack) if found.path == path)
