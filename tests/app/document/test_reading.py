"""Relative constants and lists as texts."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.document.reading import (
    list_text,
    read_like,
    read_list,
    read_points,
    read_range,
    read_relative,
    relative_text,
)
from stackcore.errors import UnitError
from stackcore.units import Dimension, Measure, parse_measure

FINITE = st.floats(allow_nan=False, allow_infinity=False)


@pytest.mark.parametrize(
    ("text", "value"),
    [
        ("4.2", 4.2),
        ("4,2", 4.2),
        ("12 - 0.5j", 12 - 0.5j),
        ("12-j0.5", 12 - 0.5j),
        ("12 − j 0,5", 12 - 0.5j),
        ("-10 - 2i", -10 - 2j),
        ("1e1 - 5e-1j", 10 - 0.5j),
        ("[12, 0.5]", 12 - 0.5j),
        ("[12,0.5]", 12 - 0.5j),
        ("[1,5; 0,5]", 1.5 - 0.5j),
        ("4 + 0.1j", 4 + 0.1j),
    ],
)
def test_relative_constants(text: str, value: complex) -> None:
    """All the ways a person or the job file writes a relative constant."""
    assert read_relative(text) == value


@pytest.mark.parametrize("text", ["", "j", "4.2 mm", "4 - j", "[1]", "[1, 2, 3]", "4 - 0.1", "a - 0.1j", "1,234,5"])
def test_what_is_no_relative_constant(text: str) -> None:
    """Anything else is refused with what is allowed."""
    with pytest.raises(UnitError) as caught:
        read_relative(text)
    assert caught.value.allowed


@given(st.complex_numbers(allow_nan=False, allow_infinity=False))
def test_relative_constants_come_back_exactly(value: complex) -> None:
    """What is shown for a constant reads back to the last bit."""
    read = read_relative(relative_text(value))
    assert (read.real, read.imag) == (value.real, value.imag)


@pytest.mark.parametrize(
    ("text", "degrees"),
    [
        ("0, 30, 45 deg", [0, 30, 45]),
        ("0; 30; 45", [0, 30, 45]),
        ("0 30 45", [0, 30, 45]),
        ("0 30  45 deg", [0, 30, 45]),
        ("22,5; 45", [22.5, 45]),
        ("22.5", [22.5]),
        ("22.5°", [22.5]),
        ("[0 deg, 0.5 rad]", [0, math.degrees(0.5)]),
        ("10 deg\n20 deg\n", [10, 20]),
        ("0, 30,", [0, 30]),
    ],
)
def test_lists(text: str, degrees: list[float]) -> None:
    """Entries are divided as people divide them, and share the last unit."""
    found = [math.degrees(measure.value) for measure in read_list(text, Dimension.ANGLE)]
    assert found == pytest.approx(degrees)


@pytest.mark.parametrize("text", ["", " ; ", "22,5", "0,30,45", "0, 30 GHz", "a; b", "0 30 deg 45"])
def test_what_is_no_list(text: str) -> None:
    """An empty list, a comma of two meanings and wrong entries are refused."""
    with pytest.raises(UnitError):
        read_list(text, Dimension.ANGLE)


@given(st.lists(st.floats(0, 1.5), min_size=1, max_size=5))
def test_lists_come_back_exactly(values: list[float]) -> None:
    """What is shown for a list reads back to the last bit."""
    measures = tuple(parse_measure(value, Dimension.ANGLE) for value in values)
    measures = tuple(Measure(measure.value, f"{measure.text} rad") for measure in measures)
    read = read_list(list_text(measures), Dimension.ANGLE)
    assert [measure.value for measure in read] == values


def test_a_bare_number_has_the_unit_of_the_old_value() -> None:
    """Over 35 µm it is in µm, over a bare number in m, over nothing in the usual unit."""
    old = Measure(35e-6, "35 um")
    assert read_like(old, "40", Dimension.LENGTH).value == 40e-6
    assert read_like(old, "0.1 mm", Dimension.LENGTH).value == 1e-4
    assert read_like(Measure(0.001, "0.001"), "0.002", Dimension.LENGTH).value == 0.002
    assert read_like(None, "2", Dimension.LENGTH).value == 0.002
    assert read_like(Measure(0.0031, "1/8 in"), "1/4", Dimension.LENGTH).value == 0.00635


def test_points_are_whole() -> None:
    """A number of points is whole, however it is written."""
    assert read_points(" 4e2 ") == 400
    with pytest.raises(UnitError, match="whole"):
        read_points("4.5")


@pytest.mark.parametrize(
    ("text", "start", "stop", "points"),
    [
        ("0 to 60 deg, 7 points", "0 deg", "60 deg", 7),
        ("0 deg to 60 deg, 7 points", "0 deg", "60 deg", 7),
        ("from 0 to 1 rad in 11 angles", "0 rad", "1 rad", 11),
        ("10 to 20; 3", "10 deg", "20 deg", 3),
    ],
)
def test_ranges(text: str, start: str, stop: str, points: int) -> None:
    """An even sweep as a person says it, and as the cell itself writes it."""
    found = read_range(text, Dimension.ANGLE)
    assert found is not None
    assert (found[0].text, found[1].text, found[2]) == (start, stop, points)


def test_what_is_no_range_or_not_a_whole_one() -> None:
    """A list is no range; a range without a number of points says what is missing."""
    assert read_range("0, 30, 45 deg", Dimension.ANGLE) is None
    with pytest.raises(UnitError, match="how many points"):
        read_range("0 to 60 deg", Dimension.ANGLE)
