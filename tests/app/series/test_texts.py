"""Numbers as they read on screen."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.series.texts import (
    angle_text,
    beyond_practical,
    exact_text,
    frequency_text,
    number_text,
    value_text,
)


@pytest.mark.parametrize(
    ("quantity", "value", "unit", "text"),
    [
        ("transmittance", 1.0, "", "1.000"),
        ("transmittance", 0.99996, "", "1.000"),
        ("transmittance", 0.83456, "", "0.8346"),
        ("transmittance", 0.0012342, "", "0.001234"),
        ("transmittance", 0.00099996, "", "0.001000"),
        ("transmittance", 1.2342e-7, "", "1.234×10⁻⁷"),
        ("transmittance", 0.0, "", "0"),
        ("transmittance", -0.78512, "dB", "−0.785"),
        ("transmittance", 91.7371, "%", "91.74"),
        ("transmittance", 100.0, "%", "100.0"),
        ("transmittance", 0.0351, "%", "0.03510"),
        ("reflectance", -math.inf, "dB", "−∞"),
        ("insertion_loss_dB", 0.0004, "", "0.000"),
        ("insertion_loss_dB", -0.0004, "", "0.000"),
        ("insertion_loss_dB", 5671.23, "", "5671.2"),
        ("shielding_effectiveness_dB", math.inf, "", "∞"),
        ("insertion_phase_delay_deg", -12.346, "", "−12.35"),
        ("group_delay_s", 35.35534, "", "35.36"),
        ("group_delay_s", 123460.0, "", "1.235×10⁵"),
        ("group_delay_s", math.nan, "", "–"),
    ],
)
def test_numbers(quantity: str, value: float, unit: str, text: str) -> None:
    """Fractions and per cent have four digits, decibels three decimals, degrees two; infinity is a sign."""
    assert number_text(quantity, value, unit) == text


@pytest.mark.parametrize(
    ("quantity", "value", "unit", "text"),
    [
        ("transmittance", 0.5, "", "0.5000"),
        ("insertion_loss_dB", 0.5, "dB", "0.500 dB"),
        ("reflection_phase_deg", 180.0, "deg", "180.00°"),
        ("shielding_effectiveness_dB", 400.0, "dB", "400.000 dB"),
        ("shielding_effectiveness_dB", 400.5, "dB", "400.500 dB, beyond practical limit (seams govern)"),
        ("insertion_loss_dB", math.inf, "dB", "∞ dB"),
        ("return_loss_dB", 500.0, "dB", "500.000 dB"),
    ],
)
def test_values_with_units(quantity: str, value: float, unit: str, text: str) -> None:
    """The unit follows the number; beyond 400 dB of shielding the text says what that is worth."""
    assert value_text(quantity, value, unit) == text


def test_beyond_the_practical_limit() -> None:
    """Only finite losses of a wall above 400 dB are beyond practice."""
    assert beyond_practical("shielding_effectiveness_dB", 400.1)
    assert not beyond_practical("shielding_effectiveness_dB", 400.0)
    assert not beyond_practical("shielding_effectiveness_dB", math.inf)
    assert not beyond_practical("insertion_phase_delay_deg", 4000.0)


@given(st.floats(allow_nan=False))
def test_the_exact_text_is_exact(value: float) -> None:
    """What is copied reads back as the very number."""
    number, unit = exact_text(value, "dB").split(" ")
    assert (float(number), unit) == (value, "dB")


@given(st.floats(1e-9, 1e9), st.sampled_from(["transmittance", "insertion_loss_dB", "group_delay_s"]))
def test_a_number_on_screen_is_near_the_value(value: float, quantity: str) -> None:
    """Rounding for the screen keeps within half a unit of the last digit shown."""
    text = number_text(quantity, value)
    mantissa, _, power = text.partition("×10")
    shown = float(mantissa) * 10.0 ** int(power.translate(str.maketrans("⁻⁰¹²³⁴⁵⁶⁷⁸⁹", "-0123456789")) or "0")
    allowed = max(0.5e-3 * value, 0.5e-3 if quantity == "insertion_loss_dB" else 0.0)
    assert abs(shown - value) <= allowed * 1.01


def test_other_texts() -> None:
    """Frequencies and angles read in readable units, short."""
    assert frequency_text(9.4e9) == "9.4 GHz"
    assert frequency_text(9.4e9, "MHz") == "9400 MHz"
    assert frequency_text(1e9 / 3) == "333.3333 MHz"
    assert angle_text(math.radians(45)) == "45°"
    assert angle_text(0.1) == "5.72958°"
