"""Materials made of other materials of the job or of the library."""

import json
from typing import Any

import numpy as np
import pytest

from stackcore.job import Job, job_from_json, range_findings, with_resolved_library
from stackcore.job.references import MOST_NESTED
from stackcore.media.base import FrequencyRange
from stackcore.media.joined import JoinedMedium
from stackcore.media.library import library_entry
from stackcore.media.magnetic import MagneticMedium
from stackcore.media.mixture import MixtureMedium
from tests.stackcore.job.examples import faults_in

RESIN = {"model": "constant", "permittivity": 3.0, "loss_tangent": 0.02, "range": ["8 GHz", "12 GHz"]}


def tree(materials: dict[str, Any], layer: str = "it", stop: str = "12 GHz") -> dict[str, Any]:
    """Return a job file with these materials and one layer."""
    return {
        "format": "slabwright-job",
        "version": 1,
        "materials": materials,
        "stacks": [{"name": "A", "elements": [{"layer": layer, "thickness": "1 mm"}]}],
        "sweep": {"frequency": {"start": "8 GHz", "stop": stop, "points": 9}, "angle": ["0 deg"]},
    }


def job_of(materials: dict[str, Any], **more: str) -> Job:
    """Return the job of these materials."""
    return Job(job_from_json(json.dumps(tree(materials, **more))))


def told(materials: dict[str, Any]) -> dict[str, str]:
    """Return path and message of every fault of these materials."""
    return {fault.path: fault.message for fault in faults_in(tree(materials))}


def mixture(host: str, inclusion: str = "air", fraction: float = 0.3) -> dict[str, Any]:
    """Return a mixture of two materials."""
    return {"model": "mixture", "host": host, "inclusions": [{"material": inclusion, "fraction": fraction}]}


def test_materials_may_stand_in_any_order() -> None:
    """A mixture that stands before its parts is made of them, and the media keep the order of the file."""
    job = job_of({"it": mixture("resin"), "resin": RESIN})
    medium = job.media["it"]
    assert isinstance(medium, MixtureMedium)
    assert medium.host is job.media["resin"]
    assert medium.valid_range == FrequencyRange(8e9, 12e9)
    assert list(job.media)[2:] == ["it", "resin"]


def test_magnetic_and_joined_materials_are_made_of_their_parts() -> None:
    """ε of one with μ of another, and two parts with a join, are built from the materials named."""
    job = job_of(
        {
            "mu": {
                "model": "magnetic-debye",
                "high_frequency_permeability": 1,
                "permeability_step": 9,
                "relaxation_time": "1 ns",
            },
            "it": {"model": "magnetic", "permittivity_from": "resin", "permeability_from": "mu"},
            "both": {"model": "joined", "parts": [{"material": "resin", "up_to": "10 GHz"}, {"material": "air"}]},
            "resin": RESIN,
        }
    )
    magnetic, joined = job.media["it"], job.media["both"]
    assert isinstance(magnetic, MagneticMedium)
    assert (magnetic.permittivity_from, magnetic.permeability_from) == (job.media["resin"], job.media["mu"])
    assert isinstance(joined, JoinedMedium)
    assert joined.joins == (1e10,)


def test_a_material_that_does_not_exist_is_told_where_it_is_named() -> None:
    """Unknown names have the path of the reference and the nearest match; the rest is not dragged along."""
    assert told({"it": mixture("rsin", "airr"), "resin": RESIN}) == {
        "materials.it.host": "unknown material 'rsin', did you mean 'resin'?",
        "materials.it.inclusions[0].material": "unknown material 'airr', did you mean 'air'?",
    }
    assert "no material 'plastics/ptfee'" in told({"it": mixture("plastics/ptfee")})["materials.it.host"]


def test_a_material_made_of_itself_is_told_once_for_each_circle() -> None:
    """Two circles are two faults, each with its way round; what hangs on a circle is not told."""
    faults = told({"a": mixture("b"), "b": mixture("a"), "it": mixture("it"), "c": mixture("a")})
    assert faults == {
        "materials.a.host": "'a → b → a' leads back to itself",
        "materials.it.host": "'it → it' leads back to itself",
    }


def test_a_faulty_part_is_told_once() -> None:
    """What a mixture is made of has its fault, and the mixture has none."""
    assert list(told({"it": mixture("resin"), "resin": {**RESIN, "loss_tangent": -1}})) == [
        "materials.resin.loss_tangent"
    ]


def test_nesting_has_a_bottom() -> None:
    """Materials of materials are refused beyond a depth at which each frequency would take for ever."""
    chain = {f"m{place}": mixture(f"m{place + 1}") for place in range(MOST_NESTED + 1)}
    faults = told({"it": RESIN, **chain, f"m{MOST_NESTED + 1}": RESIN})
    assert list(faults) == ["materials.m0"]
    assert f"{MOST_NESTED + 1} levels" in faults["materials.m0"]


def test_a_wide_tree_has_an_end() -> None:
    """Doubling eight times over with three parts each is too many parts."""
    wide = {
        f"m{place}": {
            "model": "mixture",
            "host": f"m{place + 1}",
            "inclusions": [{"material": f"m{place + 1}", "fraction": 0.1}] * 3,
        }
        for place in range(5)
    }
    assert "materials.m0" in told({"it": RESIN, **wide, "m5": RESIN})


def test_a_long_chain_of_circles_is_told_without_recursion() -> None:
    """A thousand materials in one circle are one fault."""
    count = 900
    ring = {f"m{place}": mixture(f"m{(place + 1) % count}") for place in range(count)}
    faults = told({"it": RESIN, **ring})
    assert list(faults) == ["materials.m0.host"]


def test_entries_of_the_library_that_are_used_become_materials_when_saved() -> None:
    """A mixture of a library entry is saved with that entry's values, so that it means the same elsewhere."""
    job = job_of({"it": mixture("plastics/ptfe")})
    resolved = with_resolved_library(job.record)
    assert [material.name for material in resolved.materials] == ["it", "plastics/ptfe"]
    assert resolved.materials[1].model == "constant"
    assert Job(resolved).stacks == job.stacks
    assert Job(resolved).media["plastics/ptfe"] is library_entry("plastics/ptfe").medium


def test_the_sweep_outside_a_range_is_found_with_its_places() -> None:
    """The material, what is made of it, where it is used and which part of the sweep lies outside are told."""
    job = job_of({"it": mixture("resin"), "resin": RESIN, "idle": RESIN}, stop="16 GHz")
    mixed, resin = range_findings(job)
    assert (mixed.material, resin.material) == ("it", "resin")
    assert mixed.places == resin.places == ("stacks[0].elements[0].layer",)
    assert mixed.outside == (FrequencyRange(13e9, 16e9),)
    assert mixed.share == pytest.approx(4 / 9)
    assert mixed.fault.severity == "warning"
    assert "8 GHz to 12 GHz" in mixed.fault.message
    assert "13 GHz to 16 GHz, 44%" in mixed.fault.message


def test_both_sides_and_gaps_of_a_range_are_found() -> None:
    """A sweep beyond both ends is two parts, and a gap between the parts of a joined material is found."""
    materials = {
        "it": {"model": "joined", "parts": [{"material": "low", "up_to": "12 GHz"}, {"material": "high"}]},
        "low": {**RESIN, "range": ["9 GHz", "10 GHz"]},
        "high": {**RESIN, "range": ["14 GHz", "15 GHz"]},
    }
    found = {finding.material: finding.outside for finding in range_findings(job_of(materials, stop="16 GHz"))}
    assert found["it"] == (
        FrequencyRange(8e9, 8e9),
        FrequencyRange(11e9, 13e9),
        FrequencyRange(16e9, 16e9),
    )


def test_no_finding_inside_the_range() -> None:
    """A sweep within the range gives none, and neither does a material without one."""
    assert range_findings(job_of({"it": RESIN})) == ()
    plain = {key: value for key, value in RESIN.items() if key != "range"}
    assert range_findings(job_of({"it": plain}, stop="90 GHz")) == ()


def test_a_dispersive_front_without_loss_is_taken() -> None:
    """The front may be a glass by a formula, and one that absorbs in the sweep is refused."""
    glass = {"model": "sellmeier", "terms": [{"strength": 1.1, "pole_wavelength": "0.1 um"}]}
    given = tree({"glass": glass, "it": RESIN})
    given["stacks"][0]["front"] = "glass"
    assert faults_in(given) == ()
    given["stacks"][0]["front"] = "it"
    assert [fault.path for fault in faults_in(given)] == ["stacks[0].front"]


@pytest.mark.parametrize(
    ("key", "value", "place", "words"),
    [
        ("range", ["12 GHz", "8 GHz"], "range", "is reversed"),
        ("range", ["8 GHz"], "range", "not a range"),
        ("range", "8 GHz", "range", "not a range"),
        ("range", ["8 GHz", "1 mm"], "range[1]", "is a length"),
        ("range", ["0 Hz", "1 GHz"], "range[0]", "is 0"),
        ("spread", 3, "spread", "not an object"),
        ("spread", {"permittivity": 2}, "spread.permittivity", "not a relative spread"),
        ("spread", {"permittivity": "2 %"}, "spread.permittivity", "not a number"),
        ("spread", {"permitivity": 0.1}, "spread.permitivity", "did you mean 'permittivity'"),
        ("certainty", 3, "certainty", "not a text"),
        ("note", ["a"], "note", "not a text"),
        ("relaxation_time", "1 ps", "relaxation_time", "'constant' has no relaxation_time"),
    ],
)
def test_faults_of_what_is_said_beside_the_constants(key: str, value: object, place: str, words: str) -> None:
    """Range, spread, certainty and note are checked at their places."""
    faults = told({"it": {**RESIN, key: value}})
    assert list(faults) == [f"materials.it.{place}"]
    assert words in faults[f"materials.it.{place}"]


def test_the_range_of_a_material_is_that_of_its_medium() -> None:
    """Range, spread, certainty and note of a job's material reach the medium."""
    told_of = {"spread": {"permittivity": 0.02}, "certainty": "read", "note": "dry", "source": "coupon"}
    medium = job_of({"it": {**RESIN, **told_of}}).media["it"]
    assert medium.valid_range == FrequencyRange(8e9, 12e9)
    assert medium.provenance.spread == (("permittivity", 0.02),)
    assert (medium.provenance.certainty, medium.provenance.note) == ("read", "dry")
    assert np.isfinite(medium.evaluate(np.array(1e10)).permittivity)
