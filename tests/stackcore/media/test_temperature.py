"""Temperatures as a job file writes them."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.errors import UnitError
from stackcore.media.temperature import celsius, check_temperature, read_temperature


@pytest.mark.parametrize(
    ("given_text", "kelvin"),
    [
        ("20 °C", 293.15),
        ("20°C", 293.15),
        ("20 C", 293.15),
        ("−40 degC", 233.15),
        ("23,5 °C", 296.65),
        ("293.15 K", 293.15),
        ("2.9315e2 K", 293.15),
        ("300 kelvin", 300.0),
        ("25 ℃", 298.15),
        ("212 °F", 373.15),
        ("-40 °F", 233.15),
        (293.15, 293.15),
        (300, 300.0),
    ],
)
def test_temperatures_are_read(given_text: str | float, kelvin: float) -> None:
    """Degrees of three scales and plain kelvin become kelvin, to the last digit."""
    assert read_temperature(given_text).value == kelvin


def test_the_text_is_kept() -> None:
    """A temperature is shown again as it was typed."""
    assert read_temperature(" 20 °C ").text == "20 °C"


@pytest.mark.parametrize(
    ("wrong", "told"),
    [
        ("20", "has no unit"),
        ("warm", "is not a temperature"),
        ("", "is not a temperature"),
        ("20 m", "unknown unit 'm'"),
        ("-300 °C", "below absolute zero"),
        (-1.0, "below absolute zero"),
        (float("nan"), "not finite"),
        (True, "is not a temperature"),
        (None, "is not a temperature"),
        (["20 °C"], "is not a temperature"),
    ],
)
def test_what_is_no_temperature_is_refused(wrong: object, told: str) -> None:
    """Each refusal says what is wrong and what would be right."""
    with pytest.raises(UnitError, match=told) as caught:
        read_temperature(wrong)
    assert "20 °C" in caught.value.allowed


@given(st.decimals(-270, 2000, places=2))
def test_celsius_rounds_once(degrees: object) -> None:
    """`celsius` and the text in °C give the same double, the nearest one to the decimal sum."""
    assert celsius(float(str(degrees))) == read_temperature(f"{degrees} °C").value


def test_a_check_tells_its_limits() -> None:
    """A temperature out of range is told in K and °C with the range and its reason."""
    with pytest.raises(ValueError, match=r"400 K \(126\.85 °C\) must lie between 200 K and 300 K, where it holds"):
        check_temperature(400.0, 200.0, 300.0, "where it holds")
