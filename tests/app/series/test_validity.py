"""Where results stand on material data."""

import numpy as np

from app.document.view import ViewState
from app.series.curves import curves_of
from app.series.validity import doubt_sentence, doubts_of, held_at, held_by_all, known_text, material_label
from stackcore.job import Job, job_from_json
from stackcore.media.base import FrequencyRange
from stackcore.media.constant import ConstantMedium
from stackcore.media.joined import JoinedMedium
from stackcore.propagation import solve
from stackcore.stack import Layer, Stack

BAND = FrequencyRange(8e9, 12e9)
KNOWN = ConstantMedium(4.0 + 0j, valid_range=BAND)
SWEEP = np.array([7e9, 8e9, 10e9, 12e9, 13e9])

JOB = """{"format": "slabwright-job", "version": 1, "title": "Cover",
"materials": {"skin": {"label": "Skin", "model": "constant", "permittivity": 4.0, "range": ["8 GHz", "12 GHz"]},
              "core": {"model": "constant", "permittivity": 1.1, "range": ["9 GHz", "20 GHz"]},
              "spare": {"model": "constant", "permittivity": 3.0, "range": ["1 MHz", "2 MHz"]}},
"stacks": [{"name": "A", "elements": [{"layer": "skin", "thickness": "1 mm"},
                                      {"layer": "core", "thickness": "5 mm"},
                                      {"layer": "spare", "thickness": "0 mm"}]}],
"sweep": {"frequency": ["7 GHz", "8 GHz", "10 GHz", "12 GHz", "13 GHz"], "angle": ["0 deg"]}}"""


def test_range_is_closed() -> None:
    """Both ends of the range still hold; a medium without a range always does."""
    assert held_at(KNOWN, SWEEP).tolist() == [False, True, True, True, False]
    assert held_at(ConstantMedium(2.0 + 0j), SWEEP).all()


def test_gap_between_joined_parts_is_not_held() -> None:
    """Of a joined medium the part that answers must hold."""
    high = ConstantMedium(3.0 + 0j, valid_range=FrequencyRange(12.5e9, 20e9))
    joined = JoinedMedium((KNOWN, high), (12e9,))

    assert held_at(joined, SWEEP).tolist() == [False, True, True, False, True]
    assert known_text(joined) == "from 8 GHz to 12 GHz and from 12.5 GHz to 20 GHz"
    assert doubts_of(Stack((Layer(joined, 1e-3),)), SWEEP)[0].held.tolist() == [False, True, True, False, True]


def test_doubts_name_each_material_once_and_leave_out_what_changes_nothing() -> None:
    """Layers without thickness and media that hold everywhere raise no doubt."""
    other = ConstantMedium(2.0 + 0j, valid_range=FrequencyRange(1e6, 2e6))
    stack = Stack(
        (Layer(KNOWN, 1e-3), Layer(other, 0.0), Layer(KNOWN, 2e-3), Layer(ConstantMedium(3.0 + 0j), 1e-3))
    )

    assert [doubt.medium for doubt in doubts_of(stack, SWEEP)] == [KNOWN]
    assert doubts_of(stack, np.array([9e9, 11e9])) == ()


def test_curves_of_a_wall_carry_mask_and_reason() -> None:
    """The mask is that of all materials together; at a point only those are named that do not hold there."""
    job = Job(job_from_json(JOB))
    curves = curves_of(solve(job.stacks[0], job.sweep.frequencies(), job.sweep.angles()), ViewState())

    for curve in curves:
        assert curve.held.tolist() == [False, False, True, True, False]
        assert held_by_all(curve.doubts, curve.x).tolist() == curve.held.tolist()
    doubts = curves[0].doubts
    both = "Skin is known from 8 GHz to 12 GHz; core is known from 9 GHz to 20 GHz"
    assert doubt_sentence(job, doubts) == both
    assert doubt_sentence(job, doubts, 0) == both
    assert doubt_sentence(job, doubts, 1) == "core is known from 9 GHz to 20 GHz"
    assert doubt_sentence(job, doubts, 4) == "Skin is known from 8 GHz to 12 GHz"
    assert doubt_sentence(job, doubts, 2) == ""


def test_medium_of_an_earlier_job_has_no_name() -> None:
    """What the job does not have is told without a name rather than by a wrong one."""
    assert material_label(Job(job_from_json(JOB)), ConstantMedium(9.9 + 0j)) == "A material"
