"""Walls of a shielded room: 3 mm of steel and 35 μm of copper foil before a plane wave.

An invented job; its figures come from the closed form in the log domain. Seams and doors, not walls of this
kind, decide what a room shields.
"""

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.media.conductor import ConductorMedium
from stackcore.stack import Layer
from tests.reference.published import SECOND_METHOD, TE, assert_printed, assert_within, solved, wall

SOURCE = f"shielded room scenario ({SECOND_METHOD})"
FOIL = wall(Layer(ConductorMedium(5.8e7), 35e-6))
STEEL_MEDIUM = ConductorMedium(6e6, 200.0)
STEEL = wall(Layer(STEEL_MEDIUM, 3e-3))

TRANSFER = [  # frequency in Hz, transfer impedance of the foil in mΩ
    (10e3, "0.4926"),
    (1e6, "0.4917"),
    (10e6, "0.4227"),
    (100e6, "0.0370"),
]


@pytest.mark.parametrize("frequency", [10e3, 100e3, 1e6])
def test_foil_to_one_megahertz(frequency: float) -> None:
    """The foil is a sheet of 0.4926 mΩ and shields a plane wave by 111.65 dB, flat to 1 MHz within 0.02 dB."""
    assert_printed(1e3 / (5.8e7 * 35e-6), "0.4926", SOURCE)
    se = float(solved(FOIL, frequency).shielding_effectiveness_dB[0, 0, TE])
    assert_within(se, 111.65, 0.005 if frequency < 1e6 else 0.02, SOURCE)


@pytest.mark.parametrize(("frequency", "milliohm"), TRANSFER)
def test_transfer_impedance_of_the_foil(frequency: float, milliohm: str) -> None:
    """E behind over the current in front is |t| Z₀/2 for a shield as good as this."""
    t = float(np.abs(solved(FOIL, frequency).transmission[0, 0, TE]))
    # A whole unit of the last digit: 0.49175 and 0.42265 were cut to either side.
    assert_within(t * FREE_SPACE_IMPEDANCE / 2 * 1e3, float(milliohm), 1e-4, SOURCE)


def test_steel_at_ten_kilohertz() -> None:
    """δ = 145.3 μm, A = 179.4 dB, R = 95.3 dB, together 274.6 dB."""
    assert_printed(float(STEEL_MEDIUM.skin_depth(np.array(10e3))) * 1e6, "145.3", SOURCE)
    single, double = (
        float(solved(wall(Layer(STEEL_MEDIUM, d)), 10e3).shielding_effectiveness_dB[0, 0, TE]) for d in (3e-3, 6e-3)
    )
    assert_printed(double - single, "179.4", SOURCE)
    assert_printed(2 * single - double, "95.3", SOURCE)
    assert_printed(single, "274.6", SOURCE)


def test_steel_absorbs_without_end() -> None:
    """Absorption is 5671 dB at 10 MHz (cut, not rounded) and 5.7e4 dB at 1 GHz: plain finite numbers."""
    for frequency, expected, unit in ((10e6, 5671.0, 1.0), (1e9, 5.7e4, 0.1e4)):
        single, double = (
            float(solved(wall(Layer(STEEL_MEDIUM, d)), frequency).shielding_effectiveness_dB[0, 0, TE])
            for d in (3e-3, 6e-3)
        )
        assert_within(double - single, expected, unit, SOURCE)
        assert np.isfinite(single)
