"""Envelopes over conditions, curves of other stacks, and differences, against closed forms and limits."""

import math
from dataclasses import replace

import numpy as np
import pytest

from app.document.following import following
from app.document.view import ViewState
from app.series.cases import Case, cases_of
from app.series.compared import Scene, curves_beside, curves_in_hand
from app.series.curves import Curve, curves_of
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.job import Job, job_from_json
from stackcore.propagation import Response, solve

GHZ = 1e9
JOB = """{"format": "slabwright-job", "version": 1,
"materials": {"skin": {"model": "constant", "permittivity": 4.0},
              "film": {"model": "constant", "permittivity": 9.0}},
"stacks": [{"name": "Wall", "elements": [{"layer": "skin", "thickness": "5 mm"}]},
           {"name": "Thin", "elements": [{"layer": "skin", "thickness": "2 mm"}]},
           {"name": "Closed", "back": "metal", "elements": [{"layer": "skin", "thickness": "2 mm"}]}],
"conditions": [{"name": "Wet", "front": [{"layer": "film", "thickness": "1 mm"}]},
               {"name": "Thick", "thickness_factors": {"skin": 1.2}}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 9}, "angle": ["0 deg", "40 deg"]}}"""


def job() -> Job:
    """Return three walls of one material and two conditions."""
    return Job(job_from_json(JOB))


def solved(state: ViewState, stack: int = 0) -> Scene:
    """Return the scene of a view, everything in it solved."""
    one = job()

    def answer(case: Case) -> Response:
        return solve(case.resolved(one), one.sweep.frequencies(), one.sweep.angles())

    others = {case: answer(case) for case in cases_of(one.record, stack, state)}
    return Scene(one.record, stack, answer(Case(stack)), others)


def normal_transmittance(thickness: float, frequency: float) -> float:
    """Return T of a lossless sheet of permittivity 4 in air at normal incidence.

    Source: Airy's sum, T = 1 / (1 + ((n² − 1) / 2n)² sin² k₀nd), as in any textbook of optics; recalled.
    """
    index = 2.0
    turn = 2 * math.pi * frequency / SPEED_OF_LIGHT * index * thickness
    return 1 / (1 + ((index**2 - 1) / (2 * index)) ** 2 * math.sin(turn) ** 2)


def ends(curve: Curve) -> tuple[list[float], list[float]]:
    """Return the ends of an envelope."""
    assert curve.low is not None
    assert curve.high is not None
    return curve.low.tolist(), curve.high.tolist()


def test_only_what_is_asked_for_and_exists_is_computed() -> None:
    """Conditions in the order of the job, the reference as built and under each, the others as built."""
    record = job().record
    state = ViewState(conditions=("Thick", "Wet", "Hail"), beside=("Closed", "Gone", "Wall"), less="Thin")
    assert cases_of(record, 0, state) == (
        Case(0, "Wet"),
        Case(0, "Thick"),
        Case(1),
        Case(1, "Wet"),
        Case(1, "Thick"),
        Case(2),
    )
    assert cases_of(record, 0, ViewState()) == ()
    assert cases_of(record, 0, ViewState(quantity="element_absorptance:0", conditions=("Wet",))) == ()


def test_the_envelope_of_a_thicker_wall_against_the_closed_form() -> None:
    """At every frequency the band reaches from the smaller to the larger T of 5 mm and 6 mm."""
    state = ViewState(conditions=("Thick",), polarizations=("TE",))
    curve = curves_in_hand(solved(state), state)[0]
    low, high = ends(curve)
    for frequency, least, most in zip(curve.x.tolist(), low, high, strict=True):
        both = [normal_transmittance(thickness, frequency) for thickness in (5e-3, 6e-3)]
        assert (least, most) == pytest.approx((min(both), max(both)), rel=1e-12)


def test_the_worst_point_names_its_condition() -> None:
    """The worst of a curve with an envelope is the worst of all cases, and says in which."""
    state = ViewState(conditions=("Wet", "Thick"), polarizations=("TE", "TM"))
    scene = solved(state)
    for index, curve in enumerate(curves_in_hand(scene, state)):
        found = {"": curves_of(scene.response, state)[index]}
        found |= {name: curves_of(scene.others[Case(0, name)], state)[index] for name in state.conditions}
        name, worst = min(found.items(), key=lambda item: float(item[1].y.min()))
        assert curve.worst is not None
        assert (curve.worst_in, curve.worst) == (name, worst.worst)


def test_the_built_stack_can_be_the_worst() -> None:
    """Where no condition is worse, the worst point is that of the stack as it is built and names none."""
    state = ViewState(quantity="return_loss_dB", conditions=("Thick",), polarizations=("TE",))
    scene = solved(state)
    curve = curves_in_hand(scene, state)[0]
    base, thick = (curves_of(one, state)[0] for one in (scene.response, scene.others[Case(0, "Thick")]))
    expected = "" if base.y.min() <= thick.y.min() else "Thick"
    assert curve.worst_in == expected


def test_an_infinite_worst_value_under_conditions() -> None:
    """Before metal nothing passes under any condition: the loss is infinite as built, and no band is drawn."""
    state = ViewState(quantity="insertion_loss_dB", conditions=("Wet",))
    curve = curves_in_hand(solved(state, stack=2), state)[0]
    assert (curve.worst, curve.worst_infinite, curve.infinite_value) == (None, 8 * GHZ, math.inf)
    assert np.isnan(ends(curve)).all()


def test_differences_are_taken_like_for_like() -> None:
    """A difference in dB is the ratio of the powers; under a condition from the other stack under it."""
    state = ViewState(power="decibels", less="Thin", conditions=("Wet",), polarizations=("TM",))
    scene = solved(state)
    curve = curves_in_hand(scene, state)[1]
    ratio = scene.response.transmittance[:, 1, 1] / scene.others[Case(1)].transmittance[:, 1, 1]
    wet = scene.others[Case(0, "Wet")].transmittance[:, 1, 1] / scene.others[Case(1, "Wet")].transmittance[:, 1, 1]
    both = 10 * np.log10([ratio, wet])
    assert curve.raw == pytest.approx(both[0], abs=1e-12)
    assert ends(curve)[0] == pytest.approx(both.min(axis=0), abs=1e-12)
    assert ends(curve)[1] == pytest.approx(both.max(axis=0), abs=1e-12)
    assert (curve.less, curve.worst) == ("Thin", None)


def test_a_difference_of_phases_stays_within_half_a_turn() -> None:
    """Phases are subtracted round the circle, and the values lie in (−180°, 180°]."""
    state = ViewState(quantity="transmission_phase_deg", less="Thin")
    scene = solved(state)
    curves = curves_in_hand(scene, state)
    assert all((np.abs(curve.raw) <= 180.0).all() for curve in curves)
    own, other = (
        np.radians(one.transmission_phase_deg[:, 0, 0]) for one in (scene.response, scene.others[Case(1)])
    )
    turn = np.exp(1j * np.radians(curves[0].raw))
    assert turn == pytest.approx(np.exp(1j * own) / np.exp(1j * other), abs=1e-12)


def test_a_stack_less_itself_is_shown_whole() -> None:
    """Looking at the very stack that is taken off, its values stand as they are."""
    state = ViewState(less="Wall")
    curve = curves_in_hand(solved(state), state)[0]
    assert (curve.less, curve.raw.tolist()) == ("", curves_of(solved(state).response, state)[0].raw.tolist())


def test_other_stacks_are_drawn_beside() -> None:
    """Each brings all its curves with its name; the stack in hand is not among them."""
    state = ViewState(beside=("Closed", "Wall", "Thin"))
    scene = solved(state)
    curves = curves_beside(scene, state)
    assert [curve.stack for curve in curves] == ["Closed"] * 4 + ["Thin"] * 4
    assert curves[4].raw.tolist() == scene.others[Case(1)].transmittance[:, 0, 0].tolist()


def test_what_has_not_been_computed_is_not_drawn() -> None:
    """An answer to an earlier view draws the plain curves and nothing made up."""
    state = ViewState(conditions=("Wet",), beside=("Thin",), less="Thin")
    scene = solved(ViewState())
    curve = curves_in_hand(scene, state)[0]
    assert (curve.low, curve.less, curves_beside(scene, state)) == (None, "", ())


def test_the_view_follows_names() -> None:
    """A renamed stack or condition stays chosen, one that is gone does not."""
    text = JOB.replace('"name": "Wet"', '"name": "Rain"').replace('"name": "Thin"', '"name": "Slim"')
    before, after = job().record, job_from_json(text)
    state = ViewState(conditions=("Wet", "Thick"), beside=("Thin", "Closed"), less="Thin")
    renamed = following(state, before, after)
    assert (renamed.conditions, renamed.beside, renamed.less) == (("Rain", "Thick"), ("Slim", "Closed"), "Slim")
    emptied = following(renamed, after, replace(after, stacks=after.stacks[:1], conditions=()))
    assert (emptied.conditions, emptied.beside, emptied.less) == ((), (), "")
