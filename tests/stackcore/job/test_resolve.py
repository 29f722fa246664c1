"""Records -> media and stacks, and the faults only a record built by hand can have."""

import pickle
from dataclasses import replace
from typing import cast

import numpy as np
import pytest

from stackcore.errors import JobError, LibraryError
from stackcore.job import Job, job_from_json, with_resolved_library
from stackcore.job.records import (
    AngleGrid,
    FrequencyGrid,
    JobRecord,
    LayerRecord,
    MaterialRecord,
    SheetRecord,
    StackRecord,
    SweepRecord,
)
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.library import library_entry
from stackcore.stack import METAL
from stackcore.units import Dimension, Measure, measure
from tests.stackcore.formats.files import HAND_WRITTEN

SWEEP = SweepRecord((measure(1e10, Dimension.FREQUENCY),), (measure(0.0, Dimension.ANGLE),))


def job_of(*materials: MaterialRecord, back: str = "air") -> Job:
    """Return a job with these materials and a stack of a layer of each."""
    layers = tuple(LayerRecord(material.name, measure(1e-3, Dimension.LENGTH)) for material in materials)
    return Job(JobRecord("", (StackRecord("A", layers, back=back),), SWEEP, materials))


def paths(record: JobRecord) -> list[str]:
    """Return the paths of the faults of `record`."""
    with pytest.raises(JobError) as caught:
        Job(record)
    return [fault.path for fault in caught.value.faults]


def test_job_delegates_to_its_record() -> None:
    """Title, sweep and materials of a job are those of its record."""
    record = job_from_json(HAND_WRITTEN.read_bytes())
    job = Job(record)
    assert (job.title, job.sweep, job.materials) == (record.title, record.sweep, record.materials)
    assert set(job.media) == {"air", "vacuum", "skin", "ferrite", "steel", "copper"}
    assert job.stack("A") is job.stacks[0]
    assert job.stack("B") is None


def test_jobs_are_values() -> None:
    """Jobs of equal records are equal, hash alike, cannot be changed, and survive the way to another process."""
    job, same = (Job(job_from_json(HAND_WRITTEN.read_bytes())) for _ in range(2))
    other = Job(replace(job.record, title="Other"))
    assert job == same
    assert hash(job) == hash(same)
    assert job != other
    copy = pickle.loads(pickle.dumps(job))
    assert copy == job
    assert copy.stacks == job.stacks
    with pytest.raises(TypeError):
        cast(dict[str, object], job.media)["air"] = VACUUM


def test_air_and_vacuum_are_exactly_one() -> None:
    """Air and vacuum are always there and are the vacuum itself; metal is the perfect back."""
    job = job_of(back="metal")
    assert job.media["air"] is VACUUM
    assert job.media["vacuum"] is VACUUM
    assert job.stacks[0].back is METAL


def test_a_loss_tangent_makes_the_loss() -> None:
    """ε is ε′(1 − j tan δ); a pair is ε′ − jε″."""
    job = job_of(
        MaterialRecord("a", model="constant", constants={"permittivity": 4 + 0j, "loss_tangent": 0.25}),
        MaterialRecord("b", model="constant", constants={"permittivity": 4 - 1j}),
    )
    assert job.media["b"] == ConstantMedium(4 - 1j)
    assert job.media["a"] == ConstantMedium.with_loss_tangent(4, 0.25)
    values = [job.media[name].evaluate(np.array(1e9)).permittivity for name in ("a", "b")]
    assert values[0] == values[1]


def test_the_source_stays_with_the_medium() -> None:
    """The source typed for a material is the provenance of its medium."""
    job = job_of(MaterialRecord("a", model="constant", constants={"permittivity": 4 + 0j}, source="coupon 7"))
    assert job.media["a"].provenance.source == "coupon 7"


def test_a_library_reference_is_the_entry_itself() -> None:
    """A mere reference gives the medium of the library with its range and source."""
    job = job_of(MaterialRecord("cu", library="metals/copper"))
    assert job.media["cu"] is library_entry("metals/copper").medium


def test_resolved_values_that_agree_keep_the_range() -> None:
    """Values beside the reference that still agree with the entry leave its range and spread known."""
    resolved = with_resolved_library(job_of(MaterialRecord("cu", library="metals/copper")).record)
    assert resolved.materials[0].model == "conductor"
    assert resolved.materials[0].source == library_entry("metals/copper").provenance.source
    assert Job(resolved).media["cu"].valid_range == library_entry("metals/copper").valid_range


def test_resolved_values_count_when_they_differ() -> None:
    """Values beside the reference count where the library says something else."""
    conductivity = measure(58e6, Dimension.CONDUCTIVITY)
    job = job_of(
        MaterialRecord("cu", model="conductor", library="metals/copper", constants={"conductivity": conductivity})
    )
    assert job.media["cu"] == ConductorMedium(58e6)
    assert with_resolved_library(job.record) == job.record


def test_values_beside_a_reference_without_a_model_replace_those_of_the_library() -> None:
    """Without a model the library supplies what is not given, and a given loss is not counted twice."""
    entry = library_entry("plastics/ptfe")
    stored = dict(entry.constants)
    job = job_of(
        MaterialRecord("tangent", library=entry.key, constants={"loss_tangent": 0.25}),
        MaterialRecord("pair", library=entry.key, constants={"permittivity": 2 - 0.5j}),
    )
    permittivity = stored["permittivity"]
    assert isinstance(permittivity, complex)
    assert job.media["tangent"].evaluate(np.array(1e10)).permittivity == permittivity.real * (1 - 0.25j)
    assert job.media["pair"].evaluate(np.array(1e10)).permittivity == 2 - 0.5j
    assert Job(with_resolved_library(job.record)).stacks == job.stacks


def test_a_reference_that_is_needed_must_exist() -> None:
    """Filling in the values of an entry that does not exist says which is nearest."""
    record = JobRecord("", (StackRecord("A"),), SWEEP, (MaterialRecord("cu", library="metals/coper"),))
    with pytest.raises(LibraryError, match="did you mean 'metals/copper'"):
        with_resolved_library(record)


LAYER = LayerRecord("air", measure(1e-3, Dimension.LENGTH))
STACK = StackRecord("A", (LAYER,))
RECORD = JobRecord("", (STACK,), SWEEP)
NAN = Measure(float("nan"), "nan")


@pytest.mark.parametrize(
    ("record", "path"),
    [
        (replace(RECORD, stacks=()), "stacks"),
        (replace(RECORD, stacks=(STACK, STACK)), "stacks[1].name"),
        (replace(RECORD, title="\ud800"), "title"),
        (replace(RECORD, stacks=(replace(STACK, name="\udfff"),)), "stacks[0].name"),
        (
            replace(RECORD, stacks=(StackRecord("A", (replace(LAYER, thickness=NAN),)),)),
            "stacks[0].elements[0].thickness",
        ),
        (
            replace(RECORD, stacks=(StackRecord("A", (replace(LAYER, material="x"),)),)),
            "stacks[0].elements[0].layer",
        ),
        (replace(RECORD, stacks=(StackRecord("A", (SheetRecord(),)),)), "stacks[0].elements[0]"),
        (
            replace(RECORD, stacks=(StackRecord("A", (SheetRecord(inductance=NAN),)),)),
            "stacks[0].elements[0].inductance",
        ),
        (replace(RECORD, materials=(MaterialRecord("a"),)), "materials.a.model"),
        (replace(RECORD, materials=(MaterialRecord("a", model="drood"),)), "materials.a.model"),
        (replace(RECORD, materials=(MaterialRecord(" ", library="metals/copper"),)), 'materials[" "]'),
        (
            replace(RECORD, materials=(MaterialRecord("a", model="constant", constants={"permittivity": 1 + 1j}),)),
            "materials.a.permittivity",
        ),
        (
            replace(
                RECORD,
                materials=(MaterialRecord("a", model="constant", constants={"permittivity": complex("nan")}),),
            ),
            "materials.a.permittivity",
        ),
        (
            replace(
                RECORD,
                materials=(
                    MaterialRecord("a", model="constant", constants={"permittivity": 1 - 1j, "loss_tangent": 0.1}),
                ),
            ),
            "materials.a.loss_tangent",
        ),
        (replace(RECORD, materials=(MaterialRecord("a", library="metals/copper"),) * 2), "materials[1]"),
        (replace(RECORD, sweep=replace(SWEEP, frequency=())), "sweep.frequency"),
        (replace(RECORD, sweep=replace(SWEEP, angle=(measure(2.0, Dimension.ANGLE),))), "sweep.angle[0]"),
    ],
)
def test_a_record_is_checked_as_a_file_is(record: JobRecord, path: str) -> None:
    """A record made by an edit gives the fault that the file would give, at the same path."""
    assert paths(record) == [path]


def test_a_front_that_carries_no_wave_is_refused() -> None:
    """A lossless front with a negative permittivity carries no wave that could arrive."""
    plasma = MaterialRecord("plasma", model="constant", constants={"permittivity": -2 + 0j})
    assert paths(replace(RECORD, materials=(plasma,), stacks=(replace(STACK, front="plasma"),))) == [
        "stacks[0].front"
    ]


def test_grids_hold_their_ends_exactly() -> None:
    """Both ends of a grid are the values that were typed, and one point is the start."""
    low, high = measure(0.1, Dimension.FREQUENCY), measure(0.7, Dimension.FREQUENCY)
    for spacing in ("linear", "log"):
        grid = FrequencyGrid(low, high, 7, "log" if spacing == "log" else "linear").values()
        assert (grid[0], grid[-1], grid.size) == (0.1, 0.7, 7)
    assert FrequencyGrid(low, high, 1).values().tolist() == [0.1]
    steep = measure(1.2345678901234567, Dimension.ANGLE)
    assert AngleGrid(low, steep, 3).values()[[0, -1]].tolist() == [0.1, 1.2345678901234567]
    assert AngleGrid(steep, steep, 1).values().tolist() == [1.2345678901234567]


def test_angles_of_a_grid_are_even_in_degrees() -> None:
    """The angles between 0° and 80° at 81 points are the whole degrees to the last digit."""
    grid = AngleGrid(measure(0.0, Dimension.ANGLE), measure(float(np.radians(80)), Dimension.ANGLE), 81)
    assert grid.values().tolist() == np.radians(np.arange(81)).tolist()
