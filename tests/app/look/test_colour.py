"""Colour arithmetic against published values."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.look.colour import clear_of, contrast, lightness, luminance, mix, with_lightness

colours = st.integers(0, 0xFFFFFF).map(lambda value: f"#{value:06x}")


@pytest.mark.parametrize(
    ("one", "other", "ratio"),
    [("#000000", "#ffffff", 21.0), ("#777777", "#ffffff", 4.48), ("#0000ff", "#ffffff", 8.59)],
)
def test_contrast_is_that_of_wcag(one: str, other: str, ratio: float) -> None:
    """Ratios that the WCAG literature quotes for well-known pairs come out to two decimals."""
    assert contrast(one, other) == pytest.approx(ratio, abs=0.01)
    assert contrast(other, one) == contrast(one, other)


def test_lightness_of_white_black_and_red() -> None:
    """Oklab gives 1 for white, 0 for black and 0.628 for the red primary."""
    assert lightness("#ffffff") == pytest.approx(1.0, abs=1e-4)
    assert lightness("#000000") == pytest.approx(0.0, abs=1e-6)
    assert lightness("#ff0000") == pytest.approx(0.62796, abs=1e-4)


@given(colours, st.floats(0.2, 0.95))
def test_a_wanted_lightness_is_reached(colour: str, wanted: float) -> None:
    """Whatever the hue, the new colour has the lightness asked for, to the rounding of 8 bits."""
    assert lightness(with_lightness(colour, wanted)) == pytest.approx(wanted, abs=0.012)


@given(colours)
def test_clear_of_reaches_its_ratio_on_both_grounds(colour: str) -> None:
    """A colour made clear of a light or of a dark ground has the contrast asked for."""
    assert contrast(clear_of(colour, ("#ffffff",), 4.5), "#ffffff") >= 4.5
    assert contrast(clear_of(colour, ("#101418",), 4.5), "#101418") >= 4.5


def test_mix_meets_its_ends_and_middle() -> None:
    """A mixture of nothing, of all and of half is where it should be."""
    assert mix("#102030", "#ffffff", 0.0) == "#102030"
    assert mix("#102030", "#ffffff", 1.0) == "#ffffff"
    assert mix("#000000", "#ffffff", 0.5) == "#808080"
    assert luminance("#808080") == pytest.approx(0.2159, abs=1e-4)
