"""Ice against figures of the published formula."""

import numpy as np
import pytest

from stackcore.media.ice import IceMedium
from stackcore.media.temperature import celsius

# K, GHz, ε: C. Mätzler, U. Wegmüller (1987) and C. Mätzler (2006), worked out by code of its own.
ROWS = [(263.15, 10, 3.17944 - 7.762e-4j), (263.15, 94, 3.17944 - 7.057e-3j)]


@pytest.mark.parametrize(("kelvin", "gigahertz", "expected"), ROWS)
def test_table_of_ice(kelvin: float, gigahertz: float, expected: complex) -> None:
    """Ice has the tabulated ε′ and ε″ to all printed digits."""
    found = complex(IceMedium(kelvin).evaluate(np.array(gigahertz * 1e9)).permittivity)
    assert round(found.real, 5) == expected.real
    assert found.imag == pytest.approx(expected.imag, rel=1e-4)


@pytest.mark.parametrize("kelvin", [215.0, 263.15, 272.0])
def test_loss_by_the_formula(kelvin: float) -> None:
    """The loss is α/f + βf as printed, with e^x/(e^x − 1)² written out."""
    gigahertz = np.geomspace(0.01, 300, 9)
    theta = 300 / kelvin - 1
    alpha = (0.00504 + 0.0062 * theta) * np.exp(-22.1 * theta)
    beta = 0.0207 / kelvin * np.exp(335 / kelvin) / (np.exp(335 / kelvin) - 1) ** 2 + 1.16e-11 * gigahertz**2
    beta += np.exp(-9.963 + 0.0372 * (kelvin - 273.16))
    loss = -IceMedium(kelvin).evaluate(gigahertz * 1e9).permittivity.imag
    assert loss == pytest.approx(alpha / gigahertz + beta * gigahertz, rel=1e-12)


def test_the_two_lines_of_the_real_part_meet() -> None:
    """At 243 K the branches of ε′ differ by nothing."""
    warm = IceMedium(243.0 + 1e-9).evaluate(np.array(1e10)).permittivity.real
    cold = IceMedium(243.0).evaluate(np.array(1e10)).permittivity.real
    assert warm == pytest.approx(cold, abs=1e-9)


def test_warmer_ice_loses_more() -> None:
    """At 10 GHz the loss grows with temperature throughout the range of the source."""
    loss = [-complex(IceMedium(t).evaluate(np.array(1e10)).permittivity).imag for t in np.linspace(200, 273, 20)]
    assert (np.diff(loss) > 0).all()


@pytest.mark.parametrize(
    ("temperature", "told"),
    [(-10.0, r"-10 °C would be 263\.15 K"), (280.0, "where water is ice"), (float("inf"), "not finite")],
)
def test_what_is_no_ice_is_refused(temperature: float, told: str) -> None:
    """Above the melting point, far too cold and infinite are refused."""
    with pytest.raises(ValueError, match=told):
        IceMedium(temperature)


def test_ranges_are_data() -> None:
    """The source's temperatures and frequencies are told, and what was given."""
    assert IceMedium(celsius(-10)).condition_ranges[0].held
    assert not IceMedium(180.0).condition_ranges[0].held
    valid = IceMedium(250.0).valid_range
    assert valid is not None
    assert (valid.lowest, valid.highest) == (1e7, 3e11)
