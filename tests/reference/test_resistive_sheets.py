"""Thin resistive sheets: alone, at an angle, on a dielectric, and on window glass."""

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE, VACUUM_PERMITTIVITY
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.stack import Element, Layer
from tests.reference.published import (
    READ,
    REDERIVED,
    SECOND_METHOD,
    TE,
    TM,
    assert_printed,
    assert_within,
    half_unit,
    index,
    sheet,
    solved,
    wall,
)

SCHELKUNOFF = f"sheet in free space after Schelkunoff (formula {READ}, numbers {REDERIVED})"
WOLTERSDORFF = f"W. Woltersdorff, Z. Phys. 91, 230 (1934) ({REDERIVED})"
OBLIQUE_SOURCE = f"sheet at an angle ({REDERIVED})"
WINDOW = f"coated window glass, ITU-R P.2040-3 constants ({SECOND_METHOD})"

FREE_SHEETS = [  # ohm, shielding dB, R, T, A
    (1.0, "45.5460", "0.9895", "2.79e-5", "0.0105"),
    (5.0, "31.7482", "0.9490", "0.00067", "0.0504"),
    (10.0, "25.9493", "0.9017", "0.0025", "0.0957"),
    (50.0, "13.5655", "0.6245", "0.0440", "0.3315"),
    (100.0, "9.1989", "0.4267", "0.1203", "0.4530"),
    (188.365, "6.0206", "0.2500", "0.2500", "0.5000"),
    (376.730, "3.5218", "0.1111", "0.4444", "0.4444"),
]

EMITTERS = [  # ohm, shielding dB, A, R (also the infrared emissivity and reflectance of a thin film)
    (1.0, "45.5460", "0.010506", "0.989466"),
    (2.0, "39.5711", "0.020791", "0.979098"),
    (4.0, "33.6413", "0.040723", "0.958845"),
    (10.0, "25.9493", "0.095741", "0.901717"),
    (15.0, "22.6437", "0.136637", "0.857922"),
    (50.0, "13.5655", "0.331524", "0.624476"),
    (100.0, "9.1989", "0.453049", "0.426693"),
    (FREE_SPACE_IMPEDANCE / 2, "6.0206", "0.500000", "0.250000"),
    (FREE_SPACE_IMPEDANCE, "3.5218", "0.444444", "0.111111"),
]

OBLIQUE = [  # ohm, degrees, shielding of TE and TM
    (4.0, 30.0, "34.866", "32.420"),
    (4.0, 45.0, "36.599", "30.706"),
    (4.0, 60.0, "39.571", "27.799"),
    (4.0, 75.0, "45.246", "22.404"),
    (10.0, 45.0, "28.83", "23.12"),
]

INSIDE = [(1.5, "33.3"), (2.0, "50.0"), (3.0, "66.7"), (4.0, "75.0")]  # index, absorbed per cent

GIGAHERTZ = (0.8, 1.0, 2.0, 3.0, 4.0, 5.0, 6.0)
WINDOWS = [  # name, ohm or None, panes and gaps in mm, loss at GIGAHERTZ in dB
    ("single", 4.0, (6.0,), "33.4 33.3 32.2 30.3 27.8 26.4 28.1"),
    ("double", 4.0, (4.0, 16.0, 4.0), "32.6 32.1 30.1 33.5 36.2 36.6 35.0"),
    ("single", 10.0, (6.0,), "25.7 25.6 24.5 22.8 20.5 19.3 20.8"),
    ("double", 10.0, (4.0, 16.0, 4.0), "25.0 24.5 22.5 25.8 28.6 29.0 27.6"),
    ("single", None, (6.0,), "0.32 0.48 1.49 2.47 3.12 3.34 3.12"),
]

FACADE = [  # GHz, degrees, polarization, whether coated with 4 ohm, loss in dB of 4/16/4
    (0.7, 0.0, TE, True, "32.88"),
    (1.8, 0.0, TE, True, "30.09"),
    (3.5, 0.0, TE, True, "35.16"),
    (28.0, 0.0, TE, True, "33.21"),
    (0.7, 0.0, TE, False, "0.36"),
    (1.8, 0.0, TE, False, "0.59"),
    (3.5, 0.0, TE, False, "2.69"),
    (28.0, 0.0, TE, False, "3.35"),
    (3.5, 60.0, TE, True, "38.86"),
    (3.5, 60.0, TM, True, "25.66"),
]


@pytest.mark.parametrize(("ohm", "shielding", "reflected", "transmitted", "absorbed"), FREE_SHEETS)
def test_free_sheet(ohm: float, shielding: str, reflected: str, transmitted: str, absorbed: str) -> None:
    """A sheet alone shields by 20 log(1 + Z₀/2R) and shares the power as printed."""
    r = solved(wall(sheet(ohm)), 1e9)
    assert_printed(float(r.shielding_effectiveness_dB[0, 0, TE]), shielding, SCHELKUNOFF)
    assert_printed(float(r.reflectance[0, 0, TE]), reflected, SCHELKUNOFF)
    assert_printed(float(r.transmittance[0, 0, TE]), transmitted, SCHELKUNOFF)
    assert_printed(float(r.absorptance[0, 0, TE]), absorbed, SCHELKUNOFF)


@pytest.mark.parametrize(("ohm", "shielding", "absorbed", "reflected"), EMITTERS)
def test_sheet_at_radio_and_infrared(ohm: float, shielding: str, absorbed: str, reflected: str) -> None:
    """Emissivity and reflectance in the infrared follow from the same sheet resistance as shielding."""
    source = f"B. Frank, E. Kauer, H. Köstlin, Thin Solid Films 77, 107 (1981) ({REDERIVED})"
    r = solved(wall(sheet(ohm)), [1e9, 3e13])
    assert_printed(float(r.shielding_effectiveness_dB[0, 0, TE]), shielding, source)
    assert_printed(float(r.absorptance[1, 0, TE]), absorbed, source)
    assert_printed(float(r.reflectance[1, 0, TE]), reflected, source)


def test_plain_fractions_at_the_free_space_impedance() -> None:
    """A sheet of Z₀ reflects 1/9, passes 4/9 and absorbs 4/9; of Z₀/2, 1/4, 1/4 and 1/2."""
    whole = solved(wall(sheet(FREE_SPACE_IMPEDANCE)), 1e9)
    half = solved(wall(sheet(FREE_SPACE_IMPEDANCE / 2)), 1e9)
    for r, shares in ((whole, (1 / 9, 4 / 9, 4 / 9)), (half, (1 / 4, 1 / 4, 1 / 2))):
        found = [float(q[0, 0, TE]) for q in (r.reflectance, r.transmittance, r.absorptance)]
        np.testing.assert_allclose(found, shares, rtol=1e-14, err_msg=WOLTERSDORFF)


@pytest.mark.parametrize(("ohm", "degrees", "te", "tm"), OBLIQUE)
def test_sheet_at_an_angle(ohm: float, degrees: float, te: str, tm: str) -> None:
    """TE sees the sheet R cos θ, TM the sheet R / cos θ."""
    shielding = solved(wall(sheet(ohm)), 1e9, degrees).shielding_effectiveness_dB[0, 0]
    assert_printed(float(shielding[TE]), te, OBLIQUE_SOURCE)
    assert_printed(float(shielding[TM]), tm, OBLIQUE_SOURCE)


@pytest.mark.parametrize("degrees", [0.0, 30.0, 60.0, 80.0])
def test_most_that_a_sheet_can_absorb(degrees: float) -> None:
    """Half, at every angle, with Z₀/(2 cos θ) for TE and Z₀ cos θ/2 for TM, and less to either side."""
    cosine = float(np.cos(np.radians(degrees)))
    for polarization, best in ((TE, 0.5 / cosine), (TM, 0.5 * cosine)):
        less, most, more = (
            float(
                solved(wall(sheet(FREE_SPACE_IMPEDANCE * best * k)), 1e9, degrees).absorptance[0, 0, polarization]
            )
            for k in (0.9, 1.0, 1.1)
        )
        assert_within(most, 0.5, 1e-14, WOLTERSDORFF)
        assert max(less, more) < 0.4995


@pytest.mark.parametrize(("n", "per_cent"), INSIDE)
def test_sheet_behind_a_dielectric(n: float, per_cent: str) -> None:
    """From inside a dielectric nothing is reflected with R = Z₀/(n − 1), and (n − 1)/n is absorbed."""
    source = f"Infrared absorption of thin metal films (1954) (abstract {READ}, {REDERIVED})"
    r = solved(wall(sheet(FREE_SPACE_IMPEDANCE / (n - 1)), front=index(n)), 1e9)
    assert float(r.reflectance[0, 0, TE]) < 1e-29, source
    assert_printed(100 * float(r.absorptance[0, 0, TE]), per_cent, source)


def test_oxide_coated_glass() -> None:
    """A measured film of 6.4 to 6.8 ohm per square implies 29.7 to 29.2 dB by the sheet rule."""
    source = f"Technologies 11(6), 175 (2023), abstract (film {READ}, shielding {REDERIVED})"
    for ohm, decibels in ((6.4, "29.7"), (6.8, "29.2")):
        assert_printed(float(solved(wall(sheet(ohm)), 1e9).shielding_effectiveness_dB[0, 0, TE]), decibels, source)


@pytest.mark.parametrize(("name", "ohm", "millimetres", "losses"), WINDOWS)
def test_coated_window(name: str, ohm: float | None, millimetres: tuple[float, ...], losses: str) -> None:
    """Single and double glazing, plain and coated on a cavity face, 0.8 to 6 GHz."""
    for gigahertz, printed in zip(GIGAHERTZ, losses.split(), strict=True):
        stack = wall(*_glazing(gigahertz, ohm, millimetres))
        loss = float(solved(stack, gigahertz * 1e9).insertion_loss_dB[0, 0, TE])
        assert_within(loss, float(printed), half_unit(printed), f"{name}, {gigahertz} GHz, {WINDOW}")


@pytest.mark.parametrize(("gigahertz", "degrees", "polarization", "coated", "printed"), FACADE)
def test_facade(gigahertz: float, degrees: float, polarization: int, coated: bool, printed: str) -> None:
    """Double glazing of 4/16/4 mm with and without 4 ohm on its third surface."""
    stack = wall(*_glazing(gigahertz, 4.0 if coated else None, (4.0, 16.0, 4.0)))
    loss = float(solved(stack, gigahertz * 1e9, degrees).insertion_loss_dB[0, 0, polarization])
    assert_printed(loss, printed, WINDOW)


def _glazing(gigahertz: float, ohm: float | None, millimetres: tuple[float, ...]) -> tuple[Element, ...]:
    """Return panes and gaps in turn, the coating on the front of the last pane."""
    conductivity = 0.0036 * gigahertz**1.3394
    loss = conductivity / (2 * np.pi * gigahertz * 1e9 * VACUUM_PERMITTIVITY)
    glass = ConstantMedium(6.31 - 1j * float(loss))
    found: list[Element] = [
        Layer(VACUUM if place % 2 else glass, thickness * 1e-3) for place, thickness in enumerate(millimetres)
    ]
    if ohm is not None:
        found.insert(len(found) - 1, sheet(ohm))
    return tuple(found)
