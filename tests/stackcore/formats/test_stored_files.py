"""Files of every version that was ever written still mean what they meant."""

import json
from pathlib import Path

import jsonschema
import numpy as np
import pytest

from stackcore.job import job_to_json, read_job, write_job
from stackcore.job.migrations import VERSION
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Layer, SheetPlacement
from tests.stackcore.formats.files import FORMATS, HAND_WRITTEN, SAVED, SCHEMA

STORED = sorted(FORMATS.glob("*.slabjob"))


def test_a_file_of_every_version_is_kept() -> None:
    """There is at least one stored file of each version, so that no migration goes untested."""
    versions = {json.loads(path.read_text(encoding="utf-8"))["version"] for path in STORED}
    assert versions == set(range(1, VERSION + 1))


def test_hand_written_file_means_what_it_says() -> None:
    """The example of the file format gives these media, thicknesses, sheets, frequencies and angles."""
    job = read_job(HAND_WRITTEN)
    stack = job.stacks[0]
    skin, sheet, copper = stack.elements
    assert job.title == "Harbour radar cover"
    assert (stack.name, stack.front, stack.back) == ("A", VACUUM, VACUUM)
    assert isinstance(skin, Layer)
    assert isinstance(skin.medium, ConstantMedium)
    assert skin.medium.permittivity == 4.2 - 1j * 4.2 * 0.015
    assert skin.thickness == 0.001
    assert sheet == SheetPlacement(SeriesSheet(377.0, 2e-11, 1e-12))
    assert isinstance(copper, Layer)
    assert isinstance(copper.medium, ConductorMedium)
    assert copper.thickness == 3.5e-5
    assert job.media["ferrite"] == ConstantMedium(12 - 0.5j, 2 - 0.8j)
    assert job.media["steel"] == ConductorMedium(6e6, 200)
    assert job.sweep.frequencies().tolist() == np.linspace(8e9, 12e9, 401).tolist()
    assert job.sweep.angles().tolist() == np.radians([0, 30, 45]).tolist()


def test_saved_file_means_what_it_says() -> None:
    """Fractions of an inch, decimal commas, bare numbers, %IACS, lists and a metal back are read as meant."""
    job = read_job(SAVED)
    bare, coated = job.stacks
    assert bare.elements == ()
    assert coated.back is METAL
    assert [element.thickness for element in coated.elements if isinstance(element, Layer)] == [
        0.00635,
        1e-8,
        1.5e-6,
    ]
    assert job.media["film"] == ConductorMedium(58e6)
    assert job.sweep.frequencies().tolist() == [9e8, 2.4e9, 5.45e14, 1e10]
    assert job.sweep.angles().tolist() == np.radians([0, 10, 20, 30, 40, 50, 60]).tolist()


def test_resolved_values_count_where_the_library_has_moved_on() -> None:
    """A reference to an entry that no longer exists is no fault when its values stand beside it."""
    assert read_job(SAVED).media["old copper"].evaluate(np.array(1e9)) is not None
    medium = read_job(SAVED).media["old copper"]
    assert isinstance(medium, ConductorMedium)
    assert medium.conductivity == 58e6
    assert medium.provenance.source == "a library that has moved on"


def test_saved_file_is_written_as_it_was() -> None:
    """A file that was saved by this version is written again byte for byte: diffs show edits only."""
    assert job_to_json(read_job(SAVED).record) == SAVED.read_text(encoding="utf-8")


@pytest.mark.parametrize("path", STORED, ids=lambda path: path.name)
def test_stored_files_and_their_copies_follow_the_schema(path: Path, tmp_path: Path) -> None:
    """What was stored and what is written now both follow the published schema."""
    schema = json.loads(SCHEMA.read_text(encoding="utf-8"))
    jsonschema.Draft202012Validator.check_schema(schema)
    write_job(read_job(path), tmp_path / "copy.slabjob")
    for stored in (path, tmp_path / "copy.slabjob"):
        jsonschema.validate(json.loads(stored.read_text(encoding="utf-8")), schema)


@pytest.mark.parametrize("path", STORED, ids=lambda path: path.name)
def test_a_copy_means_the_same(path: Path, tmp_path: Path) -> None:
    """Reading, writing and reading again gives the same stacks, also where library values were filled in."""
    job = read_job(path)
    write_job(job, tmp_path / "copy.slabjob")
    copy = read_job(tmp_path / "copy.slabjob")
    assert copy.stacks == job.stacks
    assert copy.record.sweep == job.record.sweep
