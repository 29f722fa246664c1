"""Tables of measured data: what lies between the rows, outside of them, and what is no table."""

import dataclasses
from itertools import pairwise

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.errors import InputError
from stackcore.media.base import FrequencyRange
from stackcore.media.debye import DebyeMedium
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.tabulated import TabulatedMedium

GLASS = PowerLawMedium(6.31, 0.0, 0.0036, 1.3394)
"""Of ITU-R P.2040-3."""


def test_rows_are_met_exactly() -> None:
    """At its rows the table answers with them."""
    rows = (4.3 - 0.06j, 4.28 - 0.0j, 4.4 - 0.2j)
    table = TabulatedMedium((1e9, 2e9, 5e9), rows)
    assert table.evaluate(np.array(table.frequency)).permittivity == pytest.approx(np.array(rows), rel=1e-14)


def test_a_power_law_is_exact_from_few_rows() -> None:
    """Glass of P.2040 sampled at five frequencies over three decades is met to 1e-12 between them."""
    rows = np.geomspace(1e8, 1e11, 5)
    table = TabulatedMedium.from_arrays(rows, GLASS.evaluate(rows).permittivity)
    between = np.geomspace(1e8, 1e11, 301)
    found, expected = table.evaluate(between), GLASS.evaluate(between)
    assert found.permittivity == pytest.approx(expected.permittivity, rel=1e-12)
    assert found.permittivity_slope == pytest.approx(expected.permittivity_slope, rel=1e-9, abs=1e-24)


def test_a_relaxation_converges() -> None:
    """Each doubling of the rows of a relaxation lowers the error at least threefold, to 1e-5 with 320 rows."""
    liquid = DebyeMedium(4.0, 70.0, 8e-12)
    between = np.geomspace(1.1e9, 0.9e11, 999)
    errors = []
    for count in (20, 40, 80, 160, 320):
        rows = np.geomspace(1e9, 1e11, count)
        table = TabulatedMedium.from_arrays(rows, liquid.evaluate(rows).permittivity)
        error = table.evaluate(between).permittivity / liquid.evaluate(between).permittivity - 1
        errors.append(float(np.abs(error).max()))
    assert all(after < before / 3 for before, after in pairwise(errors))
    assert errors[-1] < 1e-5


def test_slopes_are_those_of_the_interpolant() -> None:
    """The slope per Hz is the derivative of what the table answers, on both sides of a row and where ε′ turns."""
    table = TabulatedMedium((1e9, 2e9, 3e9, 5e9), (2 - 0.1j, -1 - 0.3j, 0.5 - 0.0j, 0.5 - 0.2j), (1, 2 - 1j, 3, 1))
    frequency = np.array([1.1e9, 1.999e9, 2.001e9, 2.7e9, 2.9e9, 3.5e9, 4.9e9])
    step = 1e-5 * frequency
    values, ahead, behind = (table.evaluate(f) for f in (frequency, frequency + step, frequency - step))
    for quantity in ("permittivity", "permeability"):
        expected = (getattr(ahead, quantity) - getattr(behind, quantity)) / (2 * step)
        assert getattr(values, f"{quantity}_slope") == pytest.approx(expected, rel=1e-5, abs=1e-16)


def test_outside_the_ends_are_held_and_out_of_range() -> None:
    """Beyond the table the first and last row are held with no slope, and the range says that they do not hold."""
    table = TabulatedMedium((8e9, 12e9), (4.3 - 0.06j, 4.2 - 0.07j))
    frequency = np.array([1.0, 7.9e9, 12.1e9, 1e15])
    values = table.evaluate(frequency)
    assert values.permittivity == pytest.approx(np.array([4.3 - 0.06j] * 2 + [4.2 - 0.07j] * 2), rel=1e-14)
    assert not values.permittivity_slope.any()
    assert table.valid_range == FrequencyRange(8e9, 12e9)
    assert not table.valid_range.contains(frequency).any()


@given(
    st.lists(
        st.tuples(st.floats(1.01, 3.0), st.floats(-50, 50).filter(lambda e: abs(e) > 1e-3), st.floats(0, 50)),
        min_size=2,
        max_size=10,
    )
)
def test_passive_between_any_rows(rows: list[tuple[float, float, float]]) -> None:
    """Whatever the rows, there is no gain between them and nothing beyond the values of neighbours."""
    frequency = 1e9 * np.cumprod([ratio for ratio, _, _ in rows])
    loss = np.array([0.0 if loss < 1e-9 else loss for _, _, loss in rows])
    real = np.array([real for _, real, _ in rows])
    table = TabulatedMedium.from_arrays(frequency, real - 1j * loss)
    values = table.evaluate(np.geomspace(frequency[0] / 2, frequency[-1] * 2, 333)).permittivity
    assert (values.imag <= 0).all()
    assert values.real.min() >= real.min() - 1e-9
    assert values.real.max() <= real.max() + 1e-9
    assert -values.imag.min() <= loss.max() * (1 + 1e-12)


def test_index_and_extinction_against_wavelength() -> None:
    """A table of n and k against wavelength, as optics prints it, is a table of (n − jk)² in rising frequency."""
    wavelength, n, k = np.array([0.4e-6, 0.6e-6, 0.8e-6]), np.array([1.53, 1.52, 1.51]), np.array([0.0, 1e-4, 0.2])
    table = TabulatedMedium.from_arrays(SPEED_OF_LIGHT / wavelength, (n - 1j * k) ** 2)
    assert table.frequency[0] == pytest.approx(SPEED_OF_LIGHT / 0.8e-6)
    index = np.sqrt(table.evaluate(SPEED_OF_LIGHT / wavelength).permittivity)
    assert index == pytest.approx(n - 1j * k, abs=1e-12)


def test_scales() -> None:
    """The scales change all of ε′, ε″, μ′ or μ″, as a batch of the material would."""
    table = TabulatedMedium((1e9, 2e9), (4 - 0.1j, 5 - 0.2j), (2 - 0.3j, 1 - 0.1j))
    batch = dataclasses.replace(
        table, permittivity_scale=1.1, loss_scale=2.0, permeability_scale=0.9, magnetic_loss_scale=0.5
    )
    before, after = (medium.evaluate(np.array(1.4e9)) for medium in (table, batch))
    assert complex(after.permittivity) == pytest.approx(
        complex(1.1 * before.permittivity.real, 2 * before.permittivity.imag)
    )
    assert complex(after.permeability) == pytest.approx(
        complex(0.9 * before.permeability.real, 0.5 * before.permeability.imag)
    )
    assert set(TabulatedMedium((1e9, 2e9), (4, 5)).constant_slopes(np.array(1e9))) == {
        "permittivity_scale",
        "loss_scale",
    }


def test_every_row_that_is_wrong_is_named() -> None:
    """Rows out of order, given twice, not finite, of gain, of 0 and out of this world are all told at once."""
    nan, inf = float("nan"), float("inf")
    with pytest.raises(InputError) as caught:
        TabulatedMedium(
            (1e9, 3e9, 2e9, 2e9, nan, -1.0, 9e9),
            (4, complex(4, 0.1), complex(nan, 0), 0, complex(4, -inf), 1e50, 4),
            (1, 1, 1, 1, 1, 1, 1 + 1j),
        )
    told = {fault.path: fault.message for fault in caught.value.faults}
    assert "beyond what any matter has" in told.pop("permittivity[5]")
    assert told == {
        "frequency[2]": "2 GHz follows 3 GHz",
        "frequency[3]": "2 GHz stands in row 2 already",
        "frequency[4]": "nan is not a finite number",
        "frequency[5]": "-1 Hz is no frequency of a wave",
        "permittivity[1]": "the loss -0.1 is negative, which would be gain",
        "permittivity[2]": "(nan+0j) is not finite",
        "permittivity[3]": "a permittivity of 0",
        "permittivity[4]": "(4-infj) is not finite",
        "permeability[6]": "the loss -1 is negative, which would be gain",
    }
    assert all(fault.allowed for fault in caught.value.faults)


@pytest.mark.parametrize(
    ("frequency", "permittivity", "permeability", "told"),
    [
        ((), (), None, "a table of 0 rows"),
        ((1e9,), (4,), None, "one value is a constant medium"),
        ((1e9, 2e9), (4,), None, "1 values for 2 frequencies"),
        ((1e9, 2e9), (4, 4), (1, 1, 1), "3 values for 2 frequencies"),
        ((1e9, 1e9 * (1 + 1e-10)), (4, 4), None, "stands in row 0 already"),
    ],
)
def test_what_is_no_table_is_refused(
    frequency: tuple[float, ...],
    permittivity: tuple[complex, ...],
    permeability: tuple[complex, ...] | None,
    told: str,
) -> None:
    """Too few rows, columns of different lengths and one frequency twice are refused."""
    with pytest.raises(InputError, match=told):
        TabulatedMedium(frequency, permittivity, permeability)


def test_a_range_must_lie_inside_the_table() -> None:
    """A range narrower than the table is taken, one beyond it is refused."""
    rows = ((1e9, 2e9, 3e9), (4, 4.1, 4.2))
    narrow = FrequencyRange(1.5e9, 2e9)
    assert TabulatedMedium(*rows, valid_range=narrow).valid_range == narrow
    with pytest.raises(InputError, match="does not lie inside the table"):
        TabulatedMedium(*rows, valid_range=FrequencyRange(0.5e9, 2e9))


def test_a_scale_must_be_above_zero() -> None:
    """A scale of 0 or below would make gain or nothing."""
    with pytest.raises(ValueError, match="loss_scale -1 must be above 0"):
        TabulatedMedium((1e9, 2e9), (4, 4), loss_scale=-1.0)
