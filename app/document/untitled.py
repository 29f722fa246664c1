"""The job a new window begins with: valid, small, and ready to be changed."""

from typing import Final

from app.document.library import record_of_entry
from stackcore.job import Job
from stackcore.job.records import FrequencyGrid, JobRecord, LayerRecord, StackRecord, SweepRecord
from stackcore.units import Dimension, Measure, parse_measure

UNTITLED_MATERIAL: Final = "plastics/ptfe"
"""Library entry of the one layer."""


def untitled_job() -> Job:
    """Return a 3 mm layer of a library dielectric in air from 1 GHz to 18 GHz at 0°, 30° and 60°."""
    material = record_of_entry(UNTITLED_MATERIAL, taken=())
    layer = LayerRecord(material.name, _length("3 mm"))
    frequency = FrequencyGrid(_frequency("1 GHz"), _frequency("18 GHz"), 341)
    angle = tuple(parse_measure(text, Dimension.ANGLE) for text in ("0 deg", "30 deg", "60 deg"))
    record = JobRecord(
        title="",
        stacks=(StackRecord("A", (layer,)),),
        sweep=SweepRecord(frequency, angle),
        materials=(material,),
    )
    return Job(record)


def _length(text: str) -> Measure:
    return parse_measure(text, Dimension.LENGTH)


def _frequency(text: str) -> Measure:
    return parse_measure(text, Dimension.FREQUENCY)
