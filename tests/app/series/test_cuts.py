"""Cuts over the angle, a thickness and a constant, against closed forms and plain solving."""

import math
from dataclasses import replace

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.document.view import ViewState
from app.series.cuts import (
    POINTS,
    Cut,
    CutQuestion,
    Where,
    best_words,
    cut_question,
    point_words,
    where_words,
)
from app.series.variation_axis import unit_of, usual_range
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.job import Job, job_from_json
from stackcore.propagation import solve
from stackcore.quantities import QUANTITIES
from stackcore.studies import variations_of, varied_stack
from stackcore.units import Dimension, parse_measure

JOB = """{"format": "slabwright-job", "version": 1,
"materials": {"resin": {"model": "constant", "permittivity": 4.0},
              "sea": {"model": "sea-water", "temperature": "10 degC", "salinity": 35}},
"stacks": [{"name": "Slab", "elements": [{"layer": "resin", "thickness": "5 mm"}]},
           {"name": "Wet", "elements": [{"layer": "sea", "thickness": "0.2 mm"}]}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 301}, "angle": ["0 deg", "55 deg"]}}"""
THICKNESS = "stacks[0].elements[0].thickness"
GHZ = 1e9


def job() -> Job:
    """Return a lossless slab of permittivity 4, and a film of sea water."""
    return Job(job_from_json(JOB))


def asked(
    view: ViewState,
    over: str = "",
    where: Where = "marker",
    ends: tuple[float, float] | None = None,
    *,
    of: Job | None = None,
    stack: int = 0,
) -> CutQuestion:
    """Return the question a view asks."""
    one = job() if of is None else of
    return cut_question(one, stack, view, over, usual_range(one, stack, over) if ends is None else ends, where)


def whole(question: CutQuestion) -> Cut:
    """Return the last answer."""
    *_, last = question.study()
    assert last.share == 1
    return last


def test_a_thickness_cut_is_the_sum_of_all_echoes() -> None:
    """T of a lossless sheet of permittivity 4 at normal incidence, over its thickness.

    Source: Airy's sum, T = 1 / (1 + ((n² − 1) / 2n)² sin² k₀nd), as in any textbook of optics; recalled.
    """
    cut = whole(asked(ViewState(markers=(10 * GHZ,), polarizations=("TE",)), THICKNESS, ends=(1e-3, 2e-2)))
    curve = next(one for one in cut.curves if one.angle == 0)
    turn = 2 * np.pi * 10 * GHZ / SPEED_OF_LIGHT * 2 * curve.x
    assert curve.y == pytest.approx(1 / (1 + 0.75**2 * np.sin(turn) ** 2), abs=1e-12)
    assert curve.x[[0, -1]] == pytest.approx([1e-3, 2e-2])
    assert len(curve.x) == POINTS


def test_the_best_thickness_of_one_curve_is_half_a_wave() -> None:
    """At 55° TE it is λ/2 of what runs across the sheet, d = λ / (2 √(ε − sin²θ)), to half a step of the axis.

    Source: the half-wave wall of radome handbooks, where both echoes cancel; recalled.
    """
    one = job()
    steep = parse_measure("55 deg", Dimension.ANGLE)
    single = replace(one.record, sweep=replace(one.record.sweep, angle=(steep,)))
    view = ViewState(markers=(9.4 * GHZ,), polarizations=("TE",))
    cut = whole(asked(view, THICKNESS, ends=(5e-3, 1.2e-2), of=Job(single)))
    wanted = SPEED_OF_LIGHT / 9.4e9 / 2 / math.sqrt(4 - math.sin(math.radians(55)) ** 2)
    best = cut.best()
    assert best is not None
    assert best[0] == pytest.approx(wanted, abs=7e-3 / (POINTS - 1) / 2)
    assert best[1] == pytest.approx(1.0, abs=1e-3)
    assert best_words(cut).startswith("Best 8.7")


def test_the_best_is_found_between_the_points() -> None:
    """The peak of the worst of a band is sharp: a scan forty times as fine finds no better value."""
    one = job()
    cut = whole(asked(ViewState(), THICKNESS, "band", ends=(3e-3, 1.2e-2)))
    best = cut.best()
    assert best is not None
    assert best[0] not in cut.curves[0].x
    frequency, angle = one.sweep.frequencies(), one.sweep.angles()
    variation = variations_of(one, 0)[0]
    near = np.linspace(best[0] - 4.5e-5, best[0] + 4.5e-5, 81)
    scanned = [
        float(solve(varied_stack(one, variation, value), frequency, angle).transmittance.min()) for value in near
    ]
    assert best[1] >= max(scanned) - 1e-5
    assert best[1] == pytest.approx(max(scanned), abs=1e-4)


def test_the_best_is_best_for_all_conditions_shown() -> None:
    """With a film of water in front another thickness is best; each curve has its envelope."""
    text = JOB.replace(
        '"sweep"', '"conditions": [{"name": "Film", "front": [{"layer": "resin", "thickness": "1 mm"}]}], "sweep"'
    )
    one = Job(job_from_json(text))
    view = ViewState(conditions=("Film",), markers=(10 * GHZ,), polarizations=("TE",))
    cut = whole(asked(view, THICKNESS, ends=(4e-3, 9e-3), of=one))
    assert cut.question.conditions == ("Film",)
    curve = cut.curves[0]
    assert curve.low is not None
    place = 50
    stack = Job(job_from_json(text.replace('"5 mm"', f'"{float(curve.x[place])!r} m"'))).stack_under(0, "Film")
    filmed = float(solve(stack, 10 * GHZ, 0.0).transmittance[0, 0, 0])
    assert curve.low[place] == pytest.approx(min(filmed, curve.raw[place]), abs=1e-12)
    dry = whole(asked(replace(view, conditions=()), THICKNESS, ends=(4e-3, 9e-3), of=one)).best()
    best = cut.best()
    assert best is not None
    assert dry is not None
    # A millimetre of the same material in front: half of it is made up for by a thinner slab.
    assert best[0] == pytest.approx(dry[0] - 0.5e-3, abs=0.3e-3)


def test_there_is_nothing_to_choose_where_all_reads_the_same() -> None:
    """Behind metal nothing passes at any thickness; at an end of the range the words say so."""
    metal = Job(job_from_json(JOB.replace('"name": "Slab"', '"name": "Slab", "back": "metal"')))
    assert best_words(whole(asked(ViewState(), THICKNESS, of=metal))) == ""
    rising = whole(asked(ViewState(markers=(10 * GHZ,)), THICKNESS, ends=(4e-4, 2e-3)))
    assert best_words(rising).endswith("at the end of the range")


def test_dragging_what_is_varied_asks_nothing_new() -> None:
    """The cut over a thickness does not depend on the thickness of now."""
    thicker = Job(job_from_json(JOB.replace('"5 mm"', '"6 mm"')))
    ends = (4e-3, 9e-3)
    assert asked(ViewState(), THICKNESS, ends=ends) == asked(ViewState(), THICKNESS, ends=ends, of=thicker)


def test_a_cut_over_the_angle_has_its_brewster_angle() -> None:
    """TM reflects nothing at arctan n, at every frequency and thickness; TE rises throughout towards grazing.

    Source: Brewster's law, tan θ = n₂/n₁, as in any textbook of optics; recalled.
    """
    view = ViewState("reflectance", markers=(9 * GHZ, 10 * GHZ), polarizations=("TM",))
    cut = whole(asked(view, ends=(math.radians(50), math.radians(75))))
    assert [curve.label for curve in cut.curves] == ["TM 9 GHz", "TM 10 GHz"]
    for curve in cut.curves:
        assert curve.x[int(np.argmin(curve.y))] == pytest.approx(math.atan(2), abs=math.radians(25 / 200))
        assert curve.y.min() < 1e-4


def test_the_worst_of_the_band_is_the_worst_of_a_sweep() -> None:
    """Each point is the lowest transmittance over the sweep with that thickness."""
    one = job()
    cut = whole(asked(ViewState(), THICKNESS, "band", ends=(4e-3, 8e-3)))
    frequency = one.sweep.frequencies()
    assert cut.question.frequencies == pytest.approx(frequency.tolist())
    variation = variations_of(one, 0)[0]
    assert variation.path == THICKNESS
    for place in (0, 77, POINTS - 1):
        text = JOB.replace('"5 mm"', f'"{float(cut.curves[0].x[place])!r} m"')
        response = solve(Job(job_from_json(text)).stacks[0], frequency, one.sweep.angles())
        table = response.transmittance.min(axis=0)  # (A, 2)
        assert [curve.y[place] for curve in cut.curves] == pytest.approx(table.ravel().tolist(), abs=1e-12)
    assert where_words(cut.question) == "worst from 8 GHz to 12 GHz"


def test_of_angles_nothing_is_chosen_and_without_a_worse_end_there_is_no_best() -> None:
    """No angle of incidence is a choice, and no phase is better than another."""
    assert best_words(whole(asked(ViewState()))) == ""
    cut = whole(asked(ViewState("transmission_phase_deg"), THICKNESS, "band"))
    assert cut.question.where == "marker"
    assert cut.best() is None
    assert best_words(cut) == ""


def test_a_temperature_runs_in_degrees() -> None:
    """The axis of a temperature is in °C, whatever the solver counts in."""
    path = "materials.sea.temperature"
    question = asked(ViewState(), path, stack=1)
    axis = question.axis
    assert axis.title.endswith(", °C")
    assert axis.unit == "°C"
    assert axis.numbers(np.array([question.low, question.high])) == pytest.approx([-10.0, 30.0])
    narrow = asked(ViewState(), path, ends=(275.15, 300.15), stack=1)
    cut = whole(narrow)
    assert point_words(cut, cut.curves[0], 0).endswith("at 2 °C")


@pytest.mark.parametrize("quantity", list(QUANTITIES))
@pytest.mark.parametrize("over", ["", THICKNESS])
def test_every_quantity_has_its_cut(quantity: str, over: str) -> None:
    """As many curves as angles or markers, and polarizations; each is what the solver says at three places."""
    view = ViewState(quantity, markers=(9 * GHZ,), polarizations=("TE", "TM"))
    cut = whole(asked(view, over))
    assert len(cut.curves) == (4 if over else 2)
    response = solve(job().stacks[0], 9e9, cut.curves[0].x if not over else job().sweep.angles())
    if not over:
        table = QUANTITIES[quantity].values(response)[0]  # (A, 2)
        assert cut.question.axis.factor == pytest.approx(180 / math.pi)
        ratio = [curve.raw[[3, 90, 150]] for curve in cut.curves]
        same = pytest.approx(table[[3, 90, 150]], rel=1e-9, abs=1e-12, nan_ok=True) == np.array(ratio).T
        assert same or cut.curves[0].unit in ("ps", "fs", "ns")


@given(st.floats(1e-9, 1e3))
def test_the_unit_reads_well(size: float) -> None:
    """A length is written in a unit in which its number is neither tiny nor endless."""
    unit = unit_of(Dimension.LENGTH, size)
    assert unit in ("nm", "µm", "mm", "m", "cm", "km")
