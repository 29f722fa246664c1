"""SI values -> readable texts that read as the same value."""

import math

import hypothesis.strategies as st
import pytest
from hypothesis import example, given

from stackcore.errors import UnitError
from stackcore.units import Dimension, degrees_of, format_value, known_units, measure, parse_measure

READABLE = [
    (0.0009, Dimension.LENGTH, "0.9 mm"),
    (35e-6, Dimension.LENGTH, "35 µm"),
    (127e-6, Dimension.LENGTH, "0.127 mm"),
    (550e-9, Dimension.LENGTH, "550 nm"),
    (1e-6, Dimension.LENGTH, "1 µm"),
    (0.15, Dimension.LENGTH, "150 mm"),
    (2.0, Dimension.LENGTH, "2 m"),
    (-0.003, Dimension.LENGTH, "-3 mm"),
    (0.0, Dimension.LENGTH, "0 mm"),
    (-0.0, Dimension.LENGTH, "0 mm"),
    (1e10, Dimension.FREQUENCY, "10 GHz"),
    (9.375e9, Dimension.FREQUENCY, "9.375 GHz"),
    (545e12, Dimension.FREQUENCY, "545 THz"),
    (50.0, Dimension.FREQUENCY, "50 Hz"),
    (math.radians(30), Dimension.ANGLE, "30 deg"),
    (377.0, Dimension.RESISTANCE, "377 Ω/sq"),
    (1200.0, Dimension.RESISTANCE, "1.2 kΩ/sq"),
    (2e-11, Dimension.INDUCTANCE, "20 pH"),
    (1e-12, Dimension.CAPACITANCE, "1 pF"),
    (5.8e7, Dimension.CONDUCTIVITY, "58 MS/m"),
    (293.15, Dimension.TEMPERATURE, "20 °C"),
    (273.15, Dimension.TEMPERATURE, "0 °C"),
    (77.0, Dimension.TEMPERATURE, "77 K"),
    (8e-12, Dimension.TIME, "8 ps"),
    (2.5e-14, Dimension.TIME, "25 fs"),
    (1e18, Dimension.DENSITY, "1e18 1/m3"),
    (0.015, Dimension.NUMBER, "0.015"),
    (200.0, Dimension.NUMBER, "200"),
]


@pytest.mark.parametrize(("value", "dimension", "text"), READABLE)
def test_a_readable_unit_is_chosen(value: float, dimension: Dimension, text: str) -> None:
    """The unit is the one a person would take, and no digit more than needed is written."""
    assert format_value(value, dimension) == text


@pytest.mark.parametrize("dimension", list(Dimension))
@given(value=st.floats(allow_nan=False, allow_infinity=False))
@example(value=5e-324)
@example(value=1.7976931348623157e308)
@example(value=2.2250738585072014e-308)
def test_reading_what_was_written_gives_the_same_double(value: float, dimension: Dimension) -> None:
    """parse(format(x)) is x to the last bit, for every finite double and every dimension."""
    assert parse_measure(format_value(value, dimension), dimension).value == value


@given(value=st.floats(1e-30, 1e30), data=st.data())
def test_reading_is_exact_in_every_unit(value: float, data: st.DataObject) -> None:
    """Also in a unit that was asked for, such as the mil, no digit is lost."""
    dimension = data.draw(st.sampled_from([d for d in Dimension if d is not Dimension.NUMBER]))
    unit = data.draw(st.sampled_from(known_units(dimension)))
    assert parse_measure(format_value(value, dimension, unit=unit), dimension).value == value


@pytest.mark.parametrize(
    ("value", "digits", "text"),
    [
        (1e10 / 3, 4, "3.333 GHz"),
        (999.96e6, 4, "1 GHz"),
        (999.94e6, 4, "999.9 MHz"),
        (1e10, 4, "10 GHz"),
        (12345.678, 1, "10 kHz"),
    ],
)
def test_digits_are_significant_and_choose_the_unit(value: float, digits: int, text: str) -> None:
    """Rounding comes before the choice of the unit: 999.96 MHz at four digits is 1 GHz."""
    assert format_value(value, Dimension.FREQUENCY, digits=digits) == text


def test_a_unit_can_be_asked_for() -> None:
    """A value is written in the unit asked for, as it was spelled."""
    assert format_value(254e-6, Dimension.LENGTH, unit="mil") == "10 mil"
    assert format_value(0.003175, Dimension.LENGTH, unit="in") == "0.125 in"
    assert format_value(58e6, Dimension.CONDUCTIVITY, unit="%IACS", digits=3) == "100 %IACS"


def test_a_unit_of_another_dimension_is_refused() -> None:
    """A length is not written in gigahertz."""
    with pytest.raises(UnitError, match="a unit of frequency, not of length"):
        format_value(1.0, Dimension.LENGTH, unit="GHz")


@pytest.mark.parametrize("value", [math.inf, -math.inf, math.nan])
def test_what_is_not_finite_is_written_but_not_read(value: float) -> None:
    """A value that is not finite can be shown, and its text cannot be taken for a value."""
    text = format_value(value, Dimension.LENGTH)
    assert text.startswith(str(value))
    with pytest.raises(UnitError):
        parse_measure(text, Dimension.LENGTH)


def test_measure_holds_the_text_it_reads_as() -> None:
    """measure(x) pairs a value with a text that reads as it, and prints as that text."""
    thickness = measure(0.0009, Dimension.LENGTH)
    assert parse_measure(str(thickness), Dimension.LENGTH) == thickness


@given(st.integers(0, 90_000_000))
def test_degrees_come_back_from_radians(millionths: int) -> None:
    """degrees_of undoes math.radians for every angle given to a millionth of a degree."""
    degrees = millionths / 1_000_000
    assert degrees_of(math.radians(degrees)) == degrees


def test_degrees_come_back_from_texts() -> None:
    """Tenths of a degree typed in a job file are the tenths that a table shows."""
    tenths = [tenth / 10 for tenth in range(900)]
    assert [degrees_of(parse_measure(f"{tenth} deg", Dimension.ANGLE).value) for tenth in tenths] == tenths
