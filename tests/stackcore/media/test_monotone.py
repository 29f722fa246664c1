"""Monotone interpolation: against the same method of SciPy, exact for powers, never beyond its points."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from numpy.typing import NDArray
from scipy.interpolate import PchipInterpolator

from stackcore.arrays import FloatArray
from stackcore.media.monotone import MonotoneCurve, monotone_curve


def pieces(curve: MonotoneCurve, x: FloatArray) -> NDArray[np.intp]:
    """Return the number of the piece that each x lies in."""
    return np.clip(np.searchsorted(curve.x, x, side="right") - 1, 0, curve.x.size - 2)


@given(st.lists(st.tuples(st.floats(0.01, 3.0), st.floats(-100, 100)), min_size=2, max_size=12))
def test_same_as_scipy(points: list[tuple[float, float]]) -> None:
    """Values and slopes of columns of mixed sign are those of SciPy's interpolant by the same method."""
    x = np.cumsum([width for width, _ in points])
    y = np.round([value for _, value in points], 3)
    y[0] = -abs(y[0])
    y[-1] = abs(y[-1])
    curve = monotone_curve(x, y)
    assert curve.ordinate == "plain"
    at = np.linspace(x[0], x[-1], 101)
    value, slope = curve.at(at, pieces(curve, at))
    expected = PchipInterpolator(x, y)
    assert value == pytest.approx(expected(at), rel=1e-9, abs=1e-9)
    assert slope == pytest.approx(expected.derivative()(at), rel=1e-7, abs=1e-6)


@pytest.mark.parametrize("sign", [1.0, -1.0])
def test_powers_are_exact(sign: float) -> None:
    """Over a logarithm, a column that follows a power is met exactly between the points, with its slope."""
    frequency = np.geomspace(1e9, 1e11, 5)
    curve = monotone_curve(np.log(frequency), sign * 0.3 * frequency**-0.7)
    between = np.geomspace(1e9, 1e11, 57)
    value, slope = curve.at(np.log(between), pieces(curve, np.log(between)))
    assert value == pytest.approx(sign * 0.3 * between**-0.7, rel=1e-12)
    assert slope == pytest.approx(-0.7 * value, rel=1e-10)


@given(st.lists(st.floats(0, 1e6).map(lambda y: 0.0 if y < 1e-6 else y), min_size=2, max_size=15))
def test_no_overshoot(values: list[float]) -> None:
    """Between two points the curve stays between their values, whatever the others do."""
    y = np.array(values)
    x = np.arange(y.size, dtype=np.float64)
    curve = monotone_curve(x, y)
    at = np.linspace(0, y.size - 1, 40 * y.size)
    piece = pieces(curve, at)
    value, _ = curve.at(at, piece)
    lowest, highest = np.minimum(y[piece], y[piece + 1]), np.maximum(y[piece], y[piece + 1])
    slack = 1e-12 * highest
    assert (value >= lowest - slack).all()
    assert (value <= highest + slack).all()


def test_points_are_met() -> None:
    """At its points the curve has their values, the last one included."""
    x, y = np.array([0.0, 1.0, 1.5, 4.0]), np.array([2.0, -1.0, 0.0, 5.0])
    curve = monotone_curve(x, y)
    assert curve.at(x, pieces(curve, x))[0] == pytest.approx(y, abs=1e-12)
