"""The wideband logarithmic model against a table, and its two forms against each other."""

import numpy as np
import pytest

from stackcore.media.wideband import WidebandMedium, WidebandStepMedium
from tests.reference.published import REDERIVED, assert_printed

SOURCE = f"Djordjevic and others, IEEE Trans. EMC 43, 662 (2001), formula read in two references ({REDERIVED})"
LAMINATE = WidebandMedium(4.3, 0.02, 1e9, 1e3, 1e12)

# Frequency in Hz, ε′ and tan δ of a laminate of 4.3 and 0.02 at 1 GHz, corners at 1 kHz and 1 THz.
ROWS = [
    (1e6, "4.67844", "0.018382"),
    (1e8, "4.42615", "0.019441"),
    (1e9, "4.30000", "0.020000"),
    (1e10, "4.17386", "0.020486"),
    (1e11, "4.04798", "0.019910"),
]


@pytest.mark.parametrize(("frequency", "permittivity", "tangent"), ROWS)
def test_table(frequency: float, permittivity: str, tangent: str) -> None:
    """The laminate has the tabulated permittivity and loss tangent from 1 MHz to 100 GHz."""
    value = complex(LAMINATE.evaluate(np.array(frequency)).permittivity)
    assert_printed(value.real, permittivity, SOURCE)
    assert_printed(-value.imag / value.real, tangent, SOURCE)


def test_loss_and_slope_belong_together() -> None:
    """Between the corners ε″ is 0.6822 times the fall of ε′ in a decade, π/(2 ln 10)."""
    values = LAMINATE.evaluate(np.array([10**7.5, 1e7, 1e8])).permittivity
    fall = float(values[1].real - values[2].real)
    assert -float(values[0].imag) / fall == pytest.approx(0.6822, abs=5e-5)
    assert np.pi / (2 * np.log(10)) == pytest.approx(0.6822, abs=5e-5)


def test_both_forms_are_one_model() -> None:
    """By ε∞ and the whole step the medium is the same as by its point at 1 GHz."""
    other = WidebandStepMedium(LAMINATE.high_frequency_permittivity, LAMINATE.permittivity_step, 1e3, 1e12)
    frequency = np.geomspace(1.0, 1e15, 61)
    one, two = LAMINATE.evaluate(frequency), other.evaluate(frequency)
    assert one.permittivity == pytest.approx(two.permittivity, rel=1e-14, abs=0)
    assert one.permittivity_slope == pytest.approx(two.permittivity_slope, rel=1e-13, abs=0)


def test_ends() -> None:
    """Far below the corners ε is ε∞ + Δε, far above it is ε∞, and both without loss."""
    medium = WidebandStepMedium(3.9, 0.6, 1e6, 1e9)
    ends = medium.evaluate(np.array([1.0, 1e15])).permittivity
    assert ends.real == pytest.approx([4.5, 3.9], rel=1e-9)
    assert np.abs(ends.imag).max() < 1e-6


@pytest.mark.parametrize(
    ("arguments", "told"),
    [
        ((4.3, 0.02, 1e9, 1e12, 1e3), "lower_frequency .* must lie below upper_frequency"),
        ((4.3, 0.02, 1e9, 1e9, 1e9), "lower_frequency .* must lie below upper_frequency"),
        ((4.3, 0.5, 1e9, 1e3, 1e12), "loss_tangent 0.5 .* is too large: the permittivity would fall to -"),
        ((4.3, -0.02, 1e9, 1e3, 1e12), "loss_tangent -0.02 is negative, which would be gain"),
        ((4.3, 0.02, 0.0, 1e3, 1e12), "reference_frequency 0 Hz must be above 0"),
    ],
)
def test_what_is_no_such_medium_is_refused(arguments: tuple[float, float, float, float, float], told: str) -> None:
    """Corners in the wrong order, gain, and more loss than the corners leave room for are refused."""
    with pytest.raises(ValueError, match=told):
        WidebandMedium(*arguments)
