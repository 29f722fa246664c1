"""The series sheet: its impedance, its slope, and what it refuses."""

import numpy as np
import pytest

from stackcore import SeriesSheet


def test_impedance_is_the_sum_of_its_parts() -> None:
    """Z = R + jωL + 1/(jωC) with round numbers."""
    sheet = SeriesSheet(50.0, 1e-9, 1e-12)
    omega = 2 * np.pi * 1e9

    assert complex(sheet.impedance(np.array(1e9))) == pytest.approx(50 + 1j * (omega * 1e-9 - 1 / (omega * 1e-12)))


@pytest.mark.parametrize("sheet", [SeriesSheet(10.0), SeriesSheet(0, 1e-9), SeriesSheet(1, 1e-9, 1e-13)])
def test_slope_is_the_difference_quotient(sheet: SeriesSheet) -> None:
    """The slope equals a central difference at several frequencies."""
    frequency = np.array([1e6, 1e9, 3e10])
    step = 1e-5 * frequency
    difference = (sheet.impedance(frequency + step) - sheet.impedance(frequency - step)) / (2 * step)

    assert sheet.impedance_slope(frequency) == pytest.approx(difference, rel=1e-8, abs=1e-22)


@pytest.mark.parametrize(
    ("parts", "words"),
    [
        ((-1.0, 0.0, None), "resistance -1.0 must be 0 or more"),
        ((1.0, np.nan, None), "inductance nan"),
        ((1.0, 0.0, 0.0), "capacitance 0.0 must be more than 0"),
        ((0.0, 0.0, None), "needs a resistance"),
    ],
)
def test_refuses_what_is_no_sheet(parts: tuple[float, float, float | None], words: str) -> None:
    """Negative or absent parts are refused with the value."""
    with pytest.raises(ValueError, match=words):
        SeriesSheet(*parts)
