"""Liquid water and sea water: each model against its own published figures, and the models against each other.

The tables were made from the published formulas by code that shares nothing with the program; where two
transcriptions of a source exist they agree. Printed digits.
"""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.media.constant import VACUUM
from stackcore.media.debye import DebyeMedium
from stackcore.media.sea_water import SeaWaterMedium
from stackcore.media.temperature import celsius
from stackcore.media.water import COLDEST_LIQUID, HOTTEST_LIQUID, EllisonWaterMedium, LiebeWaterMedium
from stackcore.propagation import solve
from stackcore.stack import Layer, Stack

# °C, GHz, Liebe-Hufford-Manabe 1991, Ellison 2007 with its resonances, single Debye of Ulaby and Long 2014.
ROWS = [
    (20, 1, 79.815 - 4.394j, 79.924 - 4.490j, 79.834 - 4.368j),
    (20, 2.45, 78.545 - 10.583j, 78.576 - 10.798j, 78.586 - 10.522j),
    (20, 10, 60.789 - 32.721j, 60.154 - 32.724j, 61.023 - 32.711j),
    (20, 30, 23.448 - 32.085j, 23.780 - 31.114j, 23.431 - 32.403j),
    (20, 100, 7.416 - 12.604j, 8.212 - 13.053j, 7.050 - 12.531j),
    (25, 10, 62.845 - 29.858j, 62.360 - 29.896j, 63.153 - 29.645j),
    (0, 10, 41.929 - 40.752j, 41.888 - 40.090j, None),
]

# °C, static permittivity at 101.325 kPa by IAPWS R8-97, worked out with the general package chemicals 1.5.2.
STATIC = [
    (0.01, 87.90010),
    (10, 83.97517),
    (20, 80.22325),
    (25, 78.40908),
    (40, 73.20117),
    (60, 66.77501),
    (80, 60.89842),
    (99, 55.78434),
]


def permittivity(medium: LiebeWaterMedium | EllisonWaterMedium | SeaWaterMedium, gigahertz: float) -> complex:
    """Return ε at a frequency in GHz."""
    return complex(medium.evaluate(np.array(gigahertz * 1e9)).permittivity)


def ulaby_long(t: float) -> DebyeMedium:
    """Return the fit of F. T. Ulaby, D. G. Long, Microwave Radar and Radiometric Remote Sensing (2014)."""
    static = 88.045 - 0.4147 * t + 6.295e-4 * t**2 + 1.075e-5 * t**3
    time = (1.1109e-10 - 3.824e-12 * t + 6.938e-14 * t**2 - 5.096e-16 * t**3) / (2 * np.pi)
    return DebyeMedium(4.9, static - 4.9, time)


@pytest.mark.parametrize(("degrees", "gigahertz", "liebe", "ellison", "debye"), ROWS)
def test_table_of_water(degrees: float, gigahertz: float, liebe: complex, ellison: complex, debye: complex) -> None:
    """Each model has its own figures: Liebe to 1e-4, and Ellison without its resonances to what these add."""
    temperature = celsius(degrees)
    assert permittivity(LiebeWaterMedium(temperature), gigahertz) == pytest.approx(liebe, rel=1e-4)
    # The resonances add 6e-5 at 30 GHz and 5e-4 at 100 GHz.
    allowed = 1e-4 if gigahertz <= 30 else 7e-4
    assert permittivity(EllisonWaterMedium(temperature), gigahertz) == pytest.approx(ellison, rel=allowed)
    if debye is not None:
        single = ulaby_long(degrees).evaluate(np.array(gigahertz * 1e9)).permittivity
        assert complex(single) == pytest.approx(debye, rel=1e-4)


@pytest.mark.parametrize(("degrees", "gigahertz"), [row[:2] for row in ROWS if row[1] <= 30])
def test_the_models_agree_up_to_30_ghz(degrees: float, gigahertz: float) -> None:
    """Three independent fits of water differ by less than 5 % up to 30 GHz."""
    liebe = permittivity(LiebeWaterMedium(celsius(degrees)), gigahertz)
    ellison = permittivity(EllisonWaterMedium(celsius(degrees)), gigahertz)
    single = complex(ulaby_long(degrees).evaluate(np.array(gigahertz * 1e9)).permittivity)
    assert abs(ellison / liebe - 1) < 0.05
    assert abs(single / liebe - 1) < 0.05


@pytest.mark.parametrize(("degrees", "static"), STATIC)
def test_static_permittivity_of_the_steam_association(degrees: float, static: float) -> None:
    """At low frequency both models have the static permittivity of IAPWS R8-97, Liebe within its own range."""
    assert permittivity(EllisonWaterMedium(celsius(degrees)), 1e-3).real == pytest.approx(
        static, rel=1e-3 if degrees < 70 else 4e-3
    )
    if degrees < 37:
        assert permittivity(LiebeWaterMedium(celsius(degrees)), 1e-3).real == pytest.approx(static, rel=3e-3)


# GHz, ε of double-Debye water at 20 °C as a planning guide prints it, three digits.
GUIDE = [(5.6, 72.7 - 22.3j), (12, 55.1 - 35.3j), (76.5, 8.84 - 16.0j)]


@pytest.mark.parametrize(("gigahertz", "expected"), GUIDE)
def test_figures_of_a_guide(gigahertz: float, expected: complex) -> None:
    """Liebe's water has the printed figures to their three digits, up to an automotive radar's band."""
    assert permittivity(LiebeWaterMedium(celsius(20)), gigahertz) == pytest.approx(expected, rel=2e-3)


def test_a_film_of_rain() -> None:
    """A film of 0.15 mm at 20 °C costs 5.7 dB at 12 GHz; reports of wet covers say over 5 dB."""
    film = Stack((Layer(LiebeWaterMedium(celsius(20)), 0.15e-3),), VACUUM, VACUUM)
    assert solve(film, frequency=12e9, angle=0.0).insertion_loss_dB[0, 0, 0] == pytest.approx(5.7, abs=0.05)


# GHz, °C, salinity in g/kg, ε and power reflectivity at normal incidence: Klein and Swift.
SEA = [
    (13.575, 20, 35, 47.0983 - 39.0633j, 0.6173),
    (1.43, 20, 35, 72.026 - 65.672j, 0.6850),
    (10, 20, 35, 55.848 - 37.711j, 0.6266),
]


@pytest.mark.parametrize(("gigahertz", "degrees", "salinity", "expected", "reflectivity"), SEA)
def test_table_of_sea_water(
    gigahertz: float, degrees: float, salinity: float, expected: complex, reflectivity: float
) -> None:
    """Sea water has the tabulated ε, and reflects the tabulated power."""
    found = permittivity(SeaWaterMedium(celsius(degrees), salinity), gigahertz)
    assert found == pytest.approx(expected, rel=2e-5)
    assert abs((1 - found**0.5) / (1 + found**0.5)) ** 2 == pytest.approx(reflectivity, abs=6e-5)


def test_sea_water_of_a_paper() -> None:
    """47.0823 − j39.0651 at 13.575 GHz, 20 °C, 35 g/kg is printed in a paper that public code quotes: 4e-4 off."""
    found = permittivity(SeaWaterMedium(celsius(20), 35), 13.575)
    assert found == pytest.approx(47.0823 - 39.0651j, rel=4e-4)


def test_constants_of_sea_water() -> None:
    """At 20 °C and 35 g/kg: εₛ 72.474, τ 9.092 ps, σ 4.788 S/m."""
    sea = SeaWaterMedium(celsius(20), 35)
    assert round(sea.static_permittivity, 3) == 72.474
    assert round(sea.relaxation_time * 1e12, 3) == 9.092
    assert round(sea.conductivity, 3) == 4.788


def test_sea_water_without_salt_is_water() -> None:
    """Without salt the model is within 3 % of fresh water up to its 10 GHz."""
    for gigahertz in (1.0, 2.45, 10.0):
        fresh = permittivity(SeaWaterMedium(celsius(20), 0), gigahertz)
        assert fresh == pytest.approx(permittivity(LiebeWaterMedium(celsius(20)), gigahertz), rel=0.03)


@given(st.floats(COLDEST_LIQUID, HOTTEST_LIQUID), st.floats(0.0, 15.0))
def test_water_is_passive_at_every_temperature(temperature: float, decades: float) -> None:
    """Also where the fits are only extrapolated, there is no gain at any frequency."""
    for medium in (LiebeWaterMedium(temperature), EllisonWaterMedium(temperature)):
        value = complex(medium.evaluate(np.array(10**decades)).permittivity)
        assert value.imag < 0
        assert value.real > 1


@given(st.floats(celsius(-5), celsius(45)), st.just(0.0) | st.floats(1e-3, 45.0), st.floats(0.0, 15.0))
def test_sea_water_is_passive(temperature: float, salinity: float, decades: float) -> None:
    """There is no gain at any temperature, salinity and frequency the model takes."""
    sea = SeaWaterMedium(temperature, salinity)
    assert complex(sea.evaluate(np.array(10**decades)).permittivity).imag < 0
    assert sea.conductivity >= 0


def test_ranges_are_data() -> None:
    """Each model tells the frequencies, temperatures and salinities of its source, and what was given."""
    water, sea = LiebeWaterMedium(305.0), SeaWaterMedium(celsius(42), 40)
    assert water.valid_range is not None
    assert (water.valid_range.highest, water.condition_ranges[0].held) == (1e12, True)
    assert [(each.name, each.unit, each.given, each.held) for each in sea.condition_ranges] == [
        ("temperature", "K", celsius(42), False),
        ("salinity", "g/kg", 40, False),
    ]
    assert EllisonWaterMedium(celsius(0)).condition_ranges[0].held
    assert "relaxation part" in EllisonWaterMedium(celsius(0)).provenance.source


@pytest.mark.parametrize(
    ("temperature", "told"),
    [
        (20.0, r"20 °C would be 293\.15 K"),
        (500.0, "must lie between"),
        (float("nan"), "temperature nan is not finite"),
    ],
)
@pytest.mark.parametrize("model", [LiebeWaterMedium, EllisonWaterMedium, SeaWaterMedium])
def test_what_is_no_water_is_refused(model: type, temperature: float, told: str) -> None:
    """Steam, 20 K and no number are refused; the number that was meant as °C is told in K."""
    with pytest.raises(ValueError, match=told):
        model(temperature)


@pytest.mark.parametrize(
    ("salinity", "told"), [(-1.0, "negative"), (60.0, "saltier"), (float("inf"), "not finite")]
)
def test_what_is_no_sea_is_refused(salinity: float, told: str) -> None:
    """A salinity below 0, beyond the model, or infinite is refused."""
    with pytest.raises(ValueError, match=told):
        SeaWaterMedium(celsius(20), salinity)
