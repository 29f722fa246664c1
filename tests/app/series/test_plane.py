"""Curves of the complex plane against closed forms, and the words and tables made of them."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.document.view import ViewState
from app.series.plane import PLANES, data_table, plane_curves, plane_extent, point_words, value_words
from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.job import Job, job_from_json
from stackcore.propagation import Response, solve

GHZ = 1e9
JOB = """{"format": "slabwright-job", "version": 1,
"materials": {"resin": {"model": "constant", "permittivity": 4.0}},
"stacks": [{"name": "Plate", "back": "metal", "elements": [{"layer": "resin", "thickness": "3 mm"}]},
           {"name": "Screen", "back": "metal", "elements": [
               {"sheet": "series", "resistance": "376.730313668 ohm"}, {"layer": "air", "thickness": "7.5 mm"}]},
           {"name": "Slab", "elements": [{"layer": "resin", "thickness": "3 mm"}]}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 41}, "angle": ["0 deg", "40 deg"]}}"""


def response(stack: int) -> Response:
    """Return the answer of one of the stacks over the sweep."""
    job = Job(job_from_json(JOB))
    return solve(job.stacks[stack], job.sweep.frequencies(), job.sweep.angles())


def test_a_lossless_layer_on_metal_has_the_impedance_of_a_shorted_line() -> None:
    """Z = jη tan(k d) with η = η₀/2 at normal incidence, and |r| = 1 at every angle.

    Source: the shorted line of any text on transmission lines, Z = j Z₀ tan βl; recalled.
    """
    found = response(0)
    curve = plane_curves(found, ViewState(polarizations=("TE",)), "impedance")[0]
    turn = 2 * np.pi * curve.frequency / SPEED_OF_LIGHT * 2 * 3e-3
    assert curve.values.imag == pytest.approx(FREE_SPACE_IMPEDANCE / 2 * np.tan(turn), rel=1e-9)
    assert curve.values.real == pytest.approx(0.0, abs=1e-6)
    for one in plane_curves(found, ViewState(), "reflection"):
        assert np.abs(one.values) == pytest.approx(1.0, abs=1e-12)


def test_a_sheet_of_free_space_before_metal_passes_through_the_middle() -> None:
    """A quarter wave before metal it matches free space: r = 0 and Z = η₀ at 9.993 GHz.

    Source: the absorbing screen of antenna handbooks, 377 Ω at λ/4; recalled.
    """
    at = SPEED_OF_LIGHT / (4 * 7.5e-3)
    curves = {plane: plane_curves(response(1), ViewState(), plane)[0] for plane in ("reflection", "impedance")}
    assert abs(curves["reflection"].at(at)) < 1e-3
    assert curves["impedance"].at(at) == pytest.approx(FREE_SPACE_IMPEDANCE, rel=2e-3)
    assert np.isnan(curves["reflection"].at(1e9).real)


def test_impedance_and_reflection_say_the_same() -> None:
    """At normal incidence from air Z/η₀ = (1 + r)/(1 − r), which is what the words for a reflection say."""
    found = response(2)
    reflection = plane_curves(found, ViewState(), "reflection")[0]
    impedance = plane_curves(found, ViewState(), "impedance")[0]
    ratio = impedance.values / FREE_SPACE_IMPEDANCE
    assert (1 + reflection.values) / (1 - reflection.values) == pytest.approx(ratio, rel=1e-9)
    told = point_words(reflection, "reflection", 5)
    assert told.startswith("TE 0°, 8.5 GHz: r = ")
    assert f"z = {ratio[5].real:.3f}" in told


def test_a_circular_wave_has_an_impedance_at_normal_incidence_only() -> None:
    """There TE and TM share it; at an angle there is no curve, and it is not drawn as one."""
    view = ViewState(polarizations=("circular",))
    assert [curve.label for curve in plane_curves(response(2), view, "impedance")] == ["Circular 0°"]
    assert len(plane_curves(response(2), view, "reflection")) == 2


@pytest.mark.parametrize("plane", list(PLANES))
@pytest.mark.parametrize("stack", [0, 1, 2])
def test_the_extent_holds_what_is_near(plane: str, stack: int) -> None:
    """Everything within the unit circle, or below the farthest impedance, is in sight."""
    curves = plane_curves(response(stack), ViewState(), plane)
    left, right, low, high = plane_extent(curves, plane)
    for curve in curves:
        near = curve.values[np.abs(curve.values) < (5e3 if PLANES[plane].unit else 10)]
        assert np.all((near.real >= left - 1e-9) & (near.real <= right))
        assert np.all((near.imag >= low) & (near.imag <= high))
    assert all(math.isfinite(end) for end in plane_extent((), plane))


def test_the_table_reads_back() -> None:
    """Every number is there with full precision, two columns a curve."""
    curves = plane_curves(response(2), ViewState(polarizations=("TE",)), "transmission")
    head, *rows = data_table(curves, "transmission").splitlines()
    assert head.split("\t")[:3] == ["Frequency, Hz", "Re t TE 0°", "Im t TE 0°"]
    row = [float(cell) for cell in rows[7].split("\t")]
    assert row[:3] == [curves[0].frequency[7], curves[0].values[7].real, curves[0].values[7].imag]


@given(st.complex_numbers(max_magnitude=1e6, allow_nan=False, allow_infinity=False))
def test_words_have_a_true_minus_and_no_sign_twice(value: complex) -> None:
    """However small or large, one sign stands before j and none follows it."""
    told = value_words("impedance", value)
    assert "-" not in told
    assert "j−" not in told
