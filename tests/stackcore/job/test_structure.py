"""Groups, plies, films, elements left out, conditions and states: what they mean, and what is refused."""

import json
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given

import stackcore as sc
from stackcore.errors import JobError
from stackcore.job import Job, job_from_json, job_to_json
from stackcore.job.groups import expanded_rows, file_path, rearranged
from stackcore.job.records import ConditionRecord, Group, JobRecord, LayerRecord, StackRecord
from stackcore.job.states import in_state
from stackcore.media.constant import ConstantMedium
from stackcore.sheets.film import FilmSheet
from stackcore.stack import Layer, SheetPlacement
from stackcore.units import Dimension, measure
from tests.stackcore.formats.files import FORMATS
from tests.stackcore.job.strategies import records

BUILT_UP = (FORMATS / "built-up-v1.slabjob").read_text(encoding="utf-8")


@pytest.fixture
def job() -> Job:
    """The stored job that uses everything."""
    return Job(job_from_json(BUILT_UP))


def faults_of(text: str) -> dict[str, str]:
    """Return the faults of a job file by their places."""
    with pytest.raises(JobError) as caught:
        job_from_json(text)
    return {fault.path: str(fault) for fault in caught.value.faults}


def test_groups_are_repeated_and_elements_left_out_are_not_there(job: Job) -> None:
    """Rows stand in the order the wave meets them; the last row has no element."""
    assert job.rows[0] == (0, 1, 2, 3, 2, 3, 2, 3)
    assert len(job.record.stacks[0].elements) == 5
    thick = [one.thickness for one in job.stacks[0].elements if isinstance(one, Layer)]
    assert thick == pytest.approx([1e-4, 1.5e-3, 2e-3, 2e-3, 2e-3], rel=1e-12)


def test_a_film_is_a_sheet_of_its_resistance(job: Job) -> None:
    """0.5 MS/m and 10 nm are 200 Ω: by definition R = 1/(σd)."""
    films = [one.sheet for one in job.stacks[0].elements if isinstance(one, SheetPlacement)]
    assert [film.resistance for film in films if isinstance(film, FilmSheet)] == pytest.approx([200.0] * 3)
    assert complex(films[0].impedance(np.array(1e9))) == pytest.approx(200.0)
    assert complex(films[0].impedance_slope(np.array(1e9))) == 0


@pytest.mark.parametrize(("conductivity", "thickness"), [(0.0, 1e-8), (1e6, 0.0), (np.inf, 1e-8), (-1.0, 1e-8)])
def test_a_film_of_nothing_is_refused(conductivity: float, thickness: float) -> None:
    """Both must be positive and finite."""
    with pytest.raises(ValueError, match="more than 0"):
        FilmSheet(conductivity, thickness)


def test_a_thin_film_agrees_with_a_layer_of_the_metal() -> None:
    """A nanometre of a conductor is the sheet of its resistance, far below its skin depth."""
    sigma, thickness = 5e6, 1e-9
    metal = sc.ConductorMedium(sigma)
    layer = sc.solve(sc.Stack((Layer(metal, thickness),)), 1e10, 0.3)
    sheet = sc.solve(sc.Stack((SheetPlacement(FilmSheet(sigma, thickness)),)), 1e10, 0.3)
    assert layer.transmittance == pytest.approx(sheet.transmittance, rel=1e-6)


def test_plies_count_the_material_s_own(job: Job) -> None:
    """6 ply of 0.25 mm are 1.5 mm, the text stays as typed, and both survive a file."""
    layer = job.record.stacks[0].elements[1]
    assert isinstance(layer, LayerRecord)
    assert (layer.thickness.value, layer.thickness.text) == (1.5e-3, "6 ply")
    assert layer.locked
    assert job_from_json(job_to_json(job.record)) == job.record


def test_plies_of_a_material_without_are_told() -> None:
    """The reason names the way out."""
    told = faults_of(
        BUILT_UP.replace('"0.1 mm"},\n        {"layer": "skin"', '"2 ply"},\n        {"layer": "skin"')
    )
    assert "no ply thickness" in told["stacks[0].elements[0].thickness"]


def test_wet_adds_rain_and_wets_the_skin(job: Job) -> None:
    """The film of rain comes first, belongs to no row, and the skin has the constants of its state."""
    wet = job.stack_under(0, "Wet")
    assert job.rows_under(0, "Wet") == (-1, *job.rows[0])
    skin = wet.elements[2]
    assert isinstance(skin, Layer)
    assert isinstance(skin.medium, ConstantMedium)
    assert skin.medium.permittivity == pytest.approx(4.5 * (1 - 0.03j))
    dry, rained = (sc.solve(one, 10e9, 0.0).transmittance[0, 0, 0] for one in (job.stacks[0], wet))
    assert rained < dry


def test_repaint_multiplies_and_aged_exchanges(job: Job) -> None:
    """The paint is twice as thick, the skin is another material, and something lies behind."""
    painted, aged = job.stack_under(0, "Repaint"), job.stack_under(0, "Aged")
    assert isinstance(painted.elements[0], Layer)
    assert painted.elements[0].thickness == pytest.approx(2e-4)
    assert isinstance(aged.elements[1], Layer)
    assert aged.elements[1].medium == job.media["wet skin"]
    assert job.rows_under(0, "Aged") == (*job.rows[0], -1)


def test_a_state_has_the_material_s_other_constants(job: Job) -> None:
    """What a state does not name stays; the loss counts once, whichever way it is given."""
    wet = job.medium_in("skin", "wet")
    assert isinstance(wet, ConstantMedium)
    assert wet.permittivity == pytest.approx(4.5 * (1 - 0.03j))
    skin = job.record.material("skin")
    assert skin is not None
    pair = replace(skin.states[0], constants={"permittivity": 5 - 1j})
    assert "loss_tangent" not in in_state(replace(skin, states=(pair,)), "wet").given


@pytest.mark.parametrize(("condition", "hint"), [("wet", "Wet"), ("Repainted", "Repaint"), ("Dry", "Wet")])
def test_an_unknown_condition_names_those_there_are(job: Job, condition: str, hint: str) -> None:
    """With the nearest match."""
    with pytest.raises(JobError, match=hint):
        job.under(condition)


def test_an_unknown_state_names_those_there_are(job: Job) -> None:
    """With the nearest match, at the material."""
    with pytest.raises(JobError, match="did you mean 'wet'"):
        job.medium_in("skin", "wett")
    with pytest.raises(JobError, match="did you mean 'skin'"):
        job.medium_in("skinn", "wet")


def test_every_fault_is_told_at_its_place_in_the_file() -> None:
    """Faults in groups, films, switches, facts, states and conditions come together."""
    tree = json.loads(BUILT_UP)
    elements = tree["stacks"][0]["elements"]
    elements[1]["locked"] = "yes"
    elements[2]["repeat"] = 0
    elements[2]["elements"][0]["thickness"] = "-1 mm"
    elements[2]["elements"][1]["thickness"] = "10 GHz"
    elements.append({"repeat": 2, "elements": [{"repeat": 2, "elements": []}]})
    tree["materials"]["skin"]["density"] = "-5 kg/m3"
    tree["materials"]["skin"]["price"] = "cheap"
    tree["materials"]["skin"]["states"]["hot"] = {"permitivity": 5}
    tree["conditions"][0]["states"] = ["wte"]
    tree["conditions"][1]["thickness_factors"] = {"pain": 2}
    tree["conditions"][2]["materials"] = {"skin": "wet skinn"}
    tree["conditions"][2]["name"] = "Wet"
    told = faults_of(json.dumps(tree))
    assert set(told) >= {
        "stacks[0].elements[1].locked",
        "stacks[0].elements[2].repeat",
        "stacks[0].elements[2].elements[0].thickness",
        "stacks[0].elements[2].elements[1].thickness",
        "stacks[0].elements[4].elements[0]",
        "materials.skin.density",
        "materials.skin.price",
        "materials.skin.states.hot.permitivity",
        "conditions[0].states[0]",
        "conditions[1].thickness_factors.pain",
        "conditions[2].materials.skin",
        "conditions[2].name",
    }
    assert "did you mean 'wet'" in told["conditions[0].states[0]"]
    assert "did you mean 'paint'" in told["conditions[1].thickness_factors.pain"]


@pytest.mark.parametrize(
    ("state", "place", "words"),
    [
        ({"permittivity": [4.5, 0.1], "loss_tangent": 0.03}, ".loss_tangent", "twice"),
        ({"permittivity": [4.5, -0.1]}, ".permittivity", "gain"),
        ({}, "", "nothing differs"),
        ({"conductivity": "3 S/m"}, ".conductivity", "unknown key"),
    ],
)
def test_a_state_must_make_a_material(state: dict[str, object], place: str, words: str) -> None:
    """Loss given twice, gain, nothing at all, and constants of another model are told at the state."""
    tree = json.loads(BUILT_UP)
    tree["materials"]["skin"]["states"] = {"wet": state}
    told = faults_of(json.dumps(tree))
    assert words in told[f"materials.skin.states.wet{place}"]


def test_too_many_elements_are_told() -> None:
    """Repetitions count; a stack of ten thousand elements is the limit."""
    tree = json.loads(BUILT_UP)
    tree["stacks"][0]["elements"][2]["repeat"] = 1000
    tree["stacks"][0]["elements"] *= 8
    assert "at most 10000" in faults_of(json.dumps(tree))["stacks[0].elements"]


@given(records())
def test_a_group_is_its_elements_written_out(record: JobRecord) -> None:
    """Without groups, disabled elements and conditions the stacks are the same."""
    written = tuple(
        replace(stack, elements=tuple(stack.elements[row] for row in expanded_rows(stack)), groups=())
        for stack in record.stacks
    )
    assert Job(replace(record, stacks=written)).stacks == Job(record).stacks


@given(records())
def test_a_condition_that_says_nothing_changes_nothing(record: JobRecord) -> None:
    """The stacks under it are those without it, and every row is its own."""
    job = Job(replace(record, conditions=(ConditionRecord("Fair"),)))
    for place, stack in enumerate(job.stacks):
        assert job.stack_under(place, "Fair") == stack
        assert job.rows_under(place, "Fair") == job.rows[place]


@given(records())
def test_every_condition_can_be_computed(record: JobRecord) -> None:
    """What passes the checks resolves under each of its conditions, and rows point into the stack or nowhere."""
    job = Job(record)
    for condition in record.conditions:
        for place, stack in enumerate(record.stacks):
            rows = job.rows_under(place, condition.name)
            assert len(rows) == len(job.stack_under(place, condition.name).elements)
            assert all(-1 <= row < len(stack.elements) for row in rows)


LAYER = LayerRecord("air", measure(1e-3, Dimension.LENGTH))


@pytest.mark.parametrize(
    ("origins", "expected"),
    [
        ([0, 1, 2, 3, 4], [(1, 3)]),
        ([0, 1, None, 2, 3, 4], [(1, 4)]),
        ([None, 0, 1, 2, 3, 4], [(2, 4)]),
        ([0, 1, 3, 4], [(1, 2)]),
        ([0, 4], []),
        ([1, 2, 3, 0, 4], [(0, 2)]),
        ([0, 1, 2, 3, 1, 2, 3, 4], [(1, 3), (4, 6)]),
        ([0, 3, 2, 1, 4], [(1, 3)]),
        ([0, 2, 3, 4, 1], [(1, 2)]),
        ([0, 1, 1, 2, 3, 4], [(2, 4)]),
    ],
)
def test_groups_follow_their_rows(origins: list[int | None], expected: list[tuple[int, int]]) -> None:
    """Rows 1 to 3 are a group: inserted, deleted, moved, copied and turned round."""
    found = rearranged((Group(1, 3, 5),), origins)
    assert [(group.first, group.last) for group in found] == expected
    assert all(group.repeat == 5 for group in found)


def test_places_in_the_file_and_in_the_record() -> None:
    """Rows of groups stand deeper in the file; everything else stays where it is."""
    stack = StackRecord("A", (LAYER,) * 5, groups=(Group(1, 2, 2),))
    places = [file_path(f"stacks[0].elements[{row}].thickness", (stack,)) for row in range(5)]
    assert places == [
        "stacks[0].elements[0].thickness",
        "stacks[0].elements[1].elements[0].thickness",
        "stacks[0].elements[1].elements[1].thickness",
        "stacks[0].elements[2].thickness",
        "stacks[0].elements[3].thickness",
    ]
    assert file_path("materials.skin", (stack,)) == "materials.skin"
