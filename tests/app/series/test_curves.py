"""Curves made from a response."""

import numpy as np
import pytest

from app.document.view import Power, ViewState
from app.series import curves as curves_module
from app.series.axis import frequency_axis, is_power, quantity_axis
from app.series.curves import curves_of, takes_long
from app.series.shown import SHOWN
from stackcore.media.constant import ConstantMedium
from stackcore.propagation import solve
from stackcore.quantities import QUANTITIES
from stackcore.stack import Layer, Stack
from tests.app.series.responses import ANGLE, FREQUENCY, slab

FRACTIONS = ("reflectance", "transmittance", "absorptance")
WORST_HIGH = ("reflectance", "absorptance", "insertion_loss_dB", "standing_wave_ratio", "copolar_reflectance_dB")
WORST_LOW = (
    "transmittance",
    "return_loss_dB",
    "shielding_effectiveness_dB",
    "transmission_magnitude_dB",
    "copolar_transmittance_dB",
)
NEED_BOTH = tuple(name for name, quantity in QUANTITIES.items() if quantity.needs_both)


def test_every_quantity_has_a_row() -> None:
    """The table of how quantities are shown knows exactly the quantities there are."""
    assert SHOWN.keys() == QUANTITIES.keys()


@pytest.mark.parametrize("quantity", QUANTITIES)
def test_a_curve_holds_the_values_of_its_angle_and_polarization(quantity: str) -> None:
    """Each curve is one column of the response, angle by angle, TE before TM."""
    response = slab()
    curves = curves_of(response, ViewState(quantity=quantity))
    values = QUANTITIES[quantity].values(response) * (1e12 if quantity == "group_delay_s" else 1.0)
    assert [curve.label for curve in curves] == ["TE 0°", "TM 0°", "TE 60°", "TM 60°", "TE 30°", "TM 30°"]
    for index, curve in enumerate(curves):
        assert curve.quantity == quantity
        assert np.array_equal(curve.x, FREQUENCY)
        assert np.array_equal(curve.raw, values[:, index // 2, index % 2])
        assert curve.angle == ANGLE[index // 2]
        assert curve.hidden_points == (5 if quantity in NEED_BOTH else 0)


def test_ranks_follow_the_size_of_the_angles() -> None:
    """The smallest angle has rank 0 wherever it stands in the list."""
    curves = curves_of(slab(), ViewState(polarizations=("TM",)))
    assert [(curve.polarization, curve.angle_rank, curve.angle_count) for curve in curves] == [
        ("TM", 0, 3),
        ("TM", 2, 3),
        ("TM", 1, 3),
    ]


@pytest.mark.parametrize("quantity", FRACTIONS)
def test_decibels_of_a_fraction(quantity: str) -> None:
    """A fraction of power in decibels is 10 log10 of it, negative, with the same worst frequency."""
    response = slab()
    plain = curves_of(response, ViewState(quantity=quantity))
    decibels = curves_of(response, ViewState(quantity=quantity, power="decibels"))
    for one, other in zip(plain, decibels, strict=True):
        assert 10 ** (other.y / 10) == pytest.approx(one.y, rel=1e-12)
        assert (other.unit, one.unit) == ("dB", "")
        assert one.worst is not None
        assert other.worst is not None
        assert one.worst.x == other.worst.x


@pytest.mark.parametrize("quantity", FRACTIONS)
def test_per_cent_of_a_fraction(quantity: str) -> None:
    """A fraction of power in per cent is a hundred times as large, also at its worst point."""
    response = slab()
    plain = curves_of(response, ViewState(quantity=quantity))
    for one, other in zip(plain, curves_of(response, ViewState(quantity=quantity, power="percent")), strict=True):
        assert other.y == pytest.approx(100 * one.y, rel=1e-15)
        assert other.unit == "%"
        assert one.worst is not None
        assert other.worst is not None
        assert other.worst.x == one.worst.x


@pytest.mark.parametrize("power", ["percent", "decibels"])
def test_other_quantities_are_left_alone(power: Power) -> None:
    """What is no fraction of power is shown in its own unit, however power is shown."""
    response = slab()
    for quantity in QUANTITIES.keys() - set(FRACTIONS):
        assert not is_power(quantity)
        one = curves_of(response, ViewState(quantity=quantity))[0]
        other = curves_of(response, ViewState(quantity=quantity, power=power))[0]
        assert np.array_equal(one.raw, other.raw)
        assert one.unit == other.unit


@pytest.mark.parametrize("quantity", WORST_HIGH + WORST_LOW)
def test_the_worst_point(quantity: str) -> None:
    """The worst point is the largest or the smallest value, whichever is bad, at its frequency."""
    for curve in curves_of(slab(), ViewState(quantity=quantity)):
        assert curve.worst is not None
        assert curve.worst.y == (max(curve.y) if quantity in WORST_HIGH else min(curve.y))
        assert curve.y[list(curve.x).index(curve.worst.x)] == curve.worst.y


@pytest.mark.parametrize("quantity", sorted(QUANTITIES.keys() - set(WORST_HIGH + WORST_LOW + NEED_BOTH)))
def test_phases_and_delays_have_no_worst_point(quantity: str) -> None:
    """Neither end of a phase or a delay is worse."""
    assert all(curve.worst is None for curve in curves_of(slab(), ViewState(quantity=quantity)))


@pytest.mark.parametrize("quantity", NEED_BOTH)
def test_what_needs_both_parts_has_a_worst_point_for_a_mixed_wave(quantity: str) -> None:
    """Discrimination is worst where it is small, what is cross-polar and an axial ratio where they are large."""
    for curve in curves_of(slab(), ViewState(quantity=quantity, polarizations=("circular",)))[1:]:
        assert curve.worst is not None
        ends = np.min if quantity == "cross_polar_discrimination_dB" else np.max
        assert curve.worst.y == ends(curve.y)


def test_mixed_waves_have_curves_of_their_own() -> None:
    """Circular and tilted come after TE and TM at each angle, with their words and their values."""
    response = slab()
    state = ViewState(polarizations=("tilt 45 deg", "TE", "circular", "TM"))
    curves = curves_of(response, state)
    assert state.polarizations == ("TE", "TM", "circular", "tilt 45 deg")
    assert [curve.label for curve in curves[8:]] == ["TE 30°", "TM 30°", "Circular 30°", "45° tilt 30°"]
    assert [curve.polarization for curve in curves[:4]] == list(state.polarizations)
    te, tm, circular, slanted = (curve.y for curve in curves[8:])
    assert circular == pytest.approx((te + tm) / 2, rel=1e-14)
    assert slanted == pytest.approx(circular, rel=1e-14)


def test_an_element_has_a_curve() -> None:
    """The power one element takes is shown like any fraction of power, also in per cent."""
    response = slab()
    state = ViewState(quantity="element_absorptance:0", power="percent")
    curves = curves_of(response, state)
    assert is_power(state.quantity)
    assert curves[3].y == pytest.approx(100 * response.absorptance[:, 1, 1], rel=1e-13)
    assert quantity_axis(state.quantity, FREQUENCY, power="percent").title == "Absorptance of element 1, %"
    assert np.isnan(curves_of(response, ViewState(quantity="element_absorptance:7"))[0].y).all()


@pytest.mark.parametrize("quantity", QUANTITIES)
def test_what_is_worked_out_beforehand_is_not_long(quantity: str, monkeypatch: pytest.MonkeyPatch) -> None:
    """Once its values were asked for, a quantity of a large response can be drawn at once, for any polarization."""
    monkeypatch.setattr(curves_module, "LONG", 1)
    response = slab()
    assert takes_long(response, quantity) == bool(QUANTITIES[quantity].needs)
    QUANTITIES[quantity].values(response)
    assert not takes_long(response, quantity)


def test_infinite_loss_is_masked_and_counted() -> None:
    """Behind metal the insertion loss is infinite: nothing to draw, all points counted, told as infinitely bad."""
    for curve in curves_of(slab(metal_back=True), ViewState(quantity="insertion_loss_dB")):
        assert np.isnan(curve.y).all()
        assert np.isposinf(curve.raw).all()
        assert (curve.hidden_points, curve.worst, curve.worst_infinite) == (5, None, 8e9)


def test_zero_transmittance_in_decibels() -> None:
    """A transmittance of 0 is drawn as it is, and in decibels is minus infinity, masked and the worst."""
    response = slab(metal_back=True)
    plain = curves_of(response, ViewState())[0]
    assert plain.worst is not None
    assert (plain.worst.y, plain.hidden_points) == (0.0, 0)
    decibels = curves_of(response, ViewState(power="decibels"))[0]
    assert (decibels.worst, decibels.hidden_points) == (None, 5)
    assert decibels.raw[0] == -np.inf


def test_infinite_goodness_is_not_the_worst() -> None:
    """Where nothing is reflected the return loss is infinite, which hides a point but is not the worst one."""
    frequency = np.array([5e9, 14.9896229e9, 16e9])
    response = solve(Stack((Layer(ConstantMedium(1.0), 1e-3),)), frequency, np.array([0.0]))
    curve = curves_of(response, ViewState(quantity="return_loss_dB"))[0]
    assert curve.hidden_points == 3
    assert curve.worst is None
    assert curve.worst_infinite is not None


@pytest.mark.parametrize(
    ("frequency", "log", "title", "factor"),
    [
        ([8e9, 12e9], False, "Frequency, GHz", 1e-9),
        ([3e8, 3e9], False, "Frequency, GHz", 1e-9),
        ([1e4, 1e10], True, "Frequency, MHz", 1e-6),
        ([1e4, 1e10], False, "Frequency, GHz", 1e-9),
        ([4e14, 7.5e14], False, "Frequency, THz", 1e-12),
        ([50.0], False, "Frequency, Hz", 1.0),
        ([0.5], True, "Frequency, Hz", 1.0),
    ],
)
def test_the_frequency_axis(frequency: list[float], log: bool, title: str, factor: float) -> None:
    """The unit fits the top of a linear axis and the middle of a logarithmic one."""
    axis = frequency_axis(np.array(frequency), log=log)
    assert (axis.title, axis.factor) == (title, factor)


@pytest.mark.parametrize(
    ("quantity", "power", "frequency", "title"),
    [
        ("insertion_loss_dB", "fraction", 1e10, "Insertion loss, dB"),
        ("transmittance", "fraction", 1e10, "Transmittance"),
        ("transmittance", "percent", 1e10, "Transmittance, %"),
        ("transmittance", "decibels", 1e10, "Transmittance, dB"),
        ("group_delay_s", "fraction", 1e10, "Group delay, ps"),
        ("group_delay_s", "decibels", 5e14, "Group delay, fs"),
        ("group_delay_s", "fraction", 1e7, "Group delay, ns"),
        ("group_delay_s", "fraction", 1e4, "Group delay, µs"),
        ("reflection_phase_deg", "fraction", 1e10, "Reflection phase, deg"),
    ],
)
def test_titles_are_words_with_unit(quantity: str, power: Power, frequency: float, title: str) -> None:
    """The axis of a quantity says what it is and in which unit."""
    assert quantity_axis(quantity, np.array([frequency]), power=power).title == title
