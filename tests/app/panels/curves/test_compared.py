"""What is drawn beside the curves in hand: the band of conditions, other stacks with their signs, differences."""

import numpy as np
import pytest
from PySide6.QtGui import QColor

from app.document import edits
from app.document.condition_rows import rows_of
from app.panels.curves.curve_layer import DrawnCurve
from tests.app.panels.curves.conftest import Bench


def thick(bench: Bench) -> None:
    """Give the job a condition under which its material is a tenth thicker, and show only TE."""
    for edit in (edits.new_condition(), edits.rename_condition("Condition", "Thick")):
        assert bench.session.apply(edit) == ()
    assert bench.session.apply(edits.add_change(bench.session.record, "Thick", "factor")) == ()
    condition = bench.session.record.condition("Thick")
    assert condition is not None
    assert bench.session.apply(edits.type_change("Thick", rows_of(condition)[0], "value", "1.1")) == ()
    bench.view.set(polarizations=("TE",), power="percent")


def banded(bench: Bench) -> DrawnCurve:
    """Return the first curve."""
    return bench.plot.curve_layer.curves[0]


def test_the_band_holds_the_curve_and_is_inked(bench: Bench) -> None:
    """Between its ends the ground takes some of the colour of the curve; without the condition it does not."""
    thick(bench)
    bench.answer()
    assert banded(bench).low is None
    bench.view.set(conditions=("Thick",))
    bench.answer()
    curve = banded(bench)
    assert curve.low is not None
    assert curve.high is not None
    assert np.all(curve.low <= curve.values)
    assert np.all(curve.values <= curve.high)
    assert np.any(curve.high > curve.low)
    widest = int(np.argmax(curve.high - curve.low))
    hertz = float(bench.session.job.sweep.frequencies()[widest])
    at = bench.pixel(hertz, float((curve.low[widest] + curve.high[widest]) / 2))
    image = bench.plot.grab().toImage()
    ratio = image.devicePixelRatio()
    inked = image.pixelColor(int(at.x() * ratio), int(at.y() * ratio))
    ground = bench.plot.backgroundBrush().color()
    assert inked != ground
    assert _apart(inked, QColor(curve.colour)) < _apart(ground, QColor(curve.colour))


def test_another_stack_lies_beside_with_a_sign(bench: Bench) -> None:
    """Its curves are as many as those in hand, quieter, and carry the first sign."""
    bench.view.set(polarizations=("TE",), power="percent")
    bench.answer()
    own = bench.plot.curve_layer.curves
    bench.view.set(beside=("C",))
    bench.answer()
    curves = bench.plot.curve_layer.curves
    assert len(curves) == 2 * len(own)
    beside = [curve for curve in curves if curve.sign == 0]
    for curve, in_hand in zip(beside, own, strict=True):
        assert QColor(curve.colour).saturation() < QColor(in_hand.colour).saturation()
        # Nothing at all in the way passes everything.
        assert curve.values == pytest.approx(100.0)


def test_a_stack_less_another_is_their_difference(bench: Bench) -> None:
    """Point by point, in the unit shown; the axis says so."""
    bench.view.set(polarizations=("TE",), power="percent")
    bench.answer()
    own = [curve.values for curve in bench.plot.curve_layer.curves]
    bench.view.set(less="C")
    bench.answer()
    for curve, whole in zip(bench.plot.curve_layer.curves, own, strict=True):
        assert curve.values == pytest.approx(whole - 100.0)
    assert bench.plot.left_axis.labelText.startswith("Difference")


def _apart(one: QColor, other: QColor) -> int:
    return abs(one.red() - other.red()) + abs(one.green() - other.green()) + abs(one.blue() - other.blue())
