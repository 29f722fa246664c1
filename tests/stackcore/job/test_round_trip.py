"""Records -> text -> records."""

import json

import jsonschema
from hypothesis import given, settings

from stackcore.job import Job, job_from_json, job_to_json, with_resolved_library
from stackcore.job.records import JobRecord, LayerRecord, StackRecord, SweepRecord
from stackcore.units import Dimension, Measure, parse_measure
from tests.stackcore.formats.files import HAND_WRITTEN, SCHEMA
from tests.stackcore.job.strategies import records

VALIDATOR = jsonschema.Draft202012Validator(json.loads(SCHEMA.read_text(encoding="utf-8")))


@given(records())
@settings(max_examples=60)
def test_a_record_survives_its_text(record: JobRecord) -> None:
    """Every record comes back from its text as it was, every text as typed."""
    text = job_to_json(record)
    assert job_from_json(text) == record
    assert job_from_json(text.encode()) == record


@given(records())
@settings(max_examples=40)
def test_texts_follow_the_schema(record: JobRecord) -> None:
    """What is written follows the schema of the file, which knows nothing of this code."""
    VALIDATOR.validate(json.loads(job_to_json(record)))


@given(records())
@settings(max_examples=25)
def test_library_values_beside_a_reference_change_nothing(record: JobRecord) -> None:
    """A job with the library's values written in has the same stacks as the one that only refers to it."""
    assert Job(with_resolved_library(record)).stacks == Job(record).stacks


def test_texts_stay_as_typed() -> None:
    """Quantities are written as they were typed, and numbers as numbers."""
    text = job_to_json(job_from_json(HAND_WRITTEN.read_text(encoding="utf-8")))
    for typed in ('"1.0 mm"', '"377 ohm/sq"', '"35 um"', '"6 MS/m"', '"permeability": 200', "[12, 0.5]", "0.015"):
        assert typed in text


def test_an_element_stands_on_its_line() -> None:
    """Each element of a stack is one line, so that a diff shows which layer was changed."""
    text = job_to_json(job_from_json(HAND_WRITTEN.read_text(encoding="utf-8")))
    lines = [line.strip().rstrip(",") for line in text.splitlines()]
    for element in json.loads(text)["stacks"][0]["elements"]:
        assert json.dumps(element) in lines


def test_long_lists_are_broken() -> None:
    """A list of many frequencies is broken into lines that fit the width."""
    frequencies = tuple(parse_measure(f"{step / 8} GHz", Dimension.FREQUENCY) for step in range(8, 200))
    sweep = SweepRecord(frequencies, (parse_measure("0 deg", Dimension.ANGLE),))
    record = JobRecord("", (StackRecord("A"),), sweep)
    text = job_to_json(record)
    assert max(map(len, text.splitlines())) <= 110
    assert job_from_json(text) == record


def test_a_text_that_does_not_say_its_value_is_replaced() -> None:
    """A record built by hand with a text that reads differently is written with its value."""
    layers = (LayerRecord("air", Measure(0.002, "two millimetres")), LayerRecord("air", Measure(0.003, "5 mm")))
    angle = (parse_measure(0, Dimension.ANGLE),)
    sweep = SweepRecord((parse_measure("1 GHz", Dimension.FREQUENCY),), angle)
    written = job_from_json(job_to_json(JobRecord("", (StackRecord("A", layers),), sweep)))
    thicknesses = [layer.thickness for layer in written.stacks[0].elements if isinstance(layer, LayerRecord)]
    assert thicknesses == [Measure(0.002, "2 mm"), Measure(0.003, "3 mm")]
