"""Shielding of metal sheets by a plane wave: absorption, reflection, the plateau, sheets of any thickness."""

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE, VACUUM_PERMEABILITY
from stackcore.media.conductor import ConductorMedium
from stackcore.stack import Layer
from tests.reference.published import (
    READ,
    REDERIVED,
    SECOND_METHOD,
    TE,
    assert_printed,
    assert_within,
    solved,
    wall,
)

COPPER = 5.8e7
MIL = 25.4e-6
SCHELKUNOFF = f"S. A. Schelkunoff, Electromagnetic Waves (1943), A + R + B ({REDERIVED})"
PAUL = f"C. R. Paul, Introduction to EMC, shielding chapter; H. W. Ott ({REDERIVED})"
HANDBOOK = f"MIL-HDBK-419A (1987), volume I, table 8-4, plane-wave columns ({READ}, order rebuilt)"
ABSORPTION_SOURCE = f"MIL-HDBK-419A, absorption at 150 kHz; White; Denny ({REDERIVED})"
PLATES_SOURCE = f"free-standing copper plate, recursion and closed form ({SECOND_METHOD})"

TWENTY_MIL = [  # frequency, A, R, B, total in dB of 20 mil of copper
    (60.0, "0.517", "150.358", "-15.990", "134.886"),
    (1e3, "2.111", "138.140", "-5.365", "134.887"),
    (10e3, "6.677", "128.140", "0.136", "134.953"),
    (1e6, "66.769", "108.140", "0.000", "174.908"),
]

PLATES = [  # thickness in m, frequency in Hz, shielding in dB
    (1e-3, 1e6, "239.5739"),
    (20e-6, 10e9, "331.0093"),
    (1e-3, 1e9, "4234.45"),
]

REFLECTION = [  # frequency, μ of iron, R of iron, R of copper, dB as printed, each to 1 dB
    (60.0, 1000.0, 113.0, 150.0),
    (1e3, 1000.0, 101.0, 138.0),
    (10e3, 1000.0, 91.0, 128.0),
    (150e3, 1000.0, 79.0, 117.0),
    (1e6, 700.0, 72.0, 108.0),
    (15e6, 400.0, 63.0, 96.0),
    (100e6, 100.0, 61.0, 88.0),
    (1.5e9, 10.0, 59.0, 76.0),
    (10e9, 1.0, 61.0, 68.0),
]

ABSORPTION = [  # metal, conductivity relative to copper, μ, dB per mm at 150 kHz
    ("silver", 1.05, 1.0, 52.0),
    ("copper", 1.00, 1.0, 51.0),
    ("gold", 0.70, 1.0, 42.0),
    ("aluminium", 0.61, 1.0, 40.0),
    ("zinc", 0.29, 1.0, 28.0),
    ("brass", 0.26, 1.0, 26.0),
    ("cadmium", 0.23, 1.0, 24.0),
    ("nickel", 0.20, 1.0, 23.0),
    ("bronze", 0.18, 1.0, 22.0),
    ("iron", 0.17, 1000.0, 650.0),
    ("tin", 0.15, 1.0, 20.0),
    ("steel SAE 1045", 0.10, 1000.0, 500.0),
    ("lead", 0.08, 1.0, 14.0),
    ("Monel", 0.04, 1.0, 10.0),
    ("mu-metal", 0.03, 80000.0, 2500.0),
    ("stainless steel", 0.02, 1000.0, 220.0),
]


def shielding(metal: ConductorMedium, thickness: float, frequency: float) -> float:
    """Return the shielding effectiveness in dB at normal incidence."""
    return float(solved(wall(Layer(metal, thickness)), frequency).shielding_effectiveness_dB[0, 0, TE])


def split(metal: ConductorMedium, thickness: float, frequency: float) -> tuple[float, float]:
    """Return absorption over `thickness` and the reflection loss of both faces, in dB, from two thick sheets."""
    deep = 12 * float(metal.skin_depth(np.array(frequency)))
    single, double = shielding(metal, deep, frequency), shielding(metal, 2 * deep, frequency)
    return (double - single) * thickness / deep, 2 * single - double


@pytest.mark.parametrize(("frequency", "absorbed", "reflected", "rereflected", "total"), TWENTY_MIL)
def test_twenty_mil_of_copper(
    frequency: float, absorbed: str, reflected: str, rereflected: str, total: str
) -> None:
    """Absorption, reflection, re-reflection and their sum for 0.508 mm of copper."""
    copper = ConductorMedium(COPPER)
    se = shielding(copper, 20 * MIL, frequency)
    a, r = split(copper, 20 * MIL, frequency)
    assert_printed(se, total, SCHELKUNOFF)
    assert_printed(a, absorbed, SCHELKUNOFF)
    assert_printed(r, reflected, SCHELKUNOFF)
    assert_printed(se - a - r, rereflected, SCHELKUNOFF)


def test_twenty_mil_of_copper_as_textbooks_round_it() -> None:
    """At 1 MHz A = 66.8, R = 108 and together 174.8 dB, the handbook's constants rounded to 0.15 dB."""
    a, r = split(ConductorMedium(COPPER), 20 * MIL, 1e6)
    assert_printed(a, "66.8", PAUL)
    assert_printed(r, "108", PAUL)
    assert_within(shielding(ConductorMedium(COPPER), 20 * MIL, 1e6), 174.8, 0.15, PAUL)


def test_plateau_at_low_frequency() -> None:
    """Well below the skin effect shielding is flat at 20 log(1 + Z₀/2R), R = 1/(σd): 134.886 dB."""
    source = f"ASTM D4935, Sarto's thin-sheet rule ({REDERIVED})"
    levels = [shielding(ConductorMedium(COPPER), 20 * MIL, f) for f in (1.0, 10.0, 60.0)]
    rule = 20 * np.log10(1 + FREE_SPACE_IMPEDANCE * COPPER * 20 * MIL / 2)
    for level in levels:
        assert_printed(level, "134.886", source)
        assert_within(level, float(rule), 1e-5, source)


@pytest.mark.parametrize(("thickness", "frequency", "expected"), PLATES)
def test_copper_plate(thickness: float, frequency: float, expected: str) -> None:
    """Shielding far past the double range of power is right to the printed digits."""
    assert_printed(shielding(ConductorMedium(COPPER), thickness, frequency), expected, PLATES_SOURCE)


@pytest.mark.parametrize("thickness", [1e-9, 1e-7, 1e-5, 1e-3, 0.1])
@pytest.mark.parametrize("frequency", [1e2, 1e5, 1e8, 1e11])
def test_schelkunoff_sum(thickness: float, frequency: float) -> None:
    """A + R + B of the closed form is the shielding of one homogeneous sheet, to 1e-9 dB or the double's digits."""
    omega = 2 * np.pi * frequency
    eps = 1 - 1j * COPPER * FREE_SPACE_IMPEDANCE * 299792458.0 / omega
    zeta = 1 / np.sqrt(eps)
    gamma_d = 1j * omega * np.sqrt(eps) / 299792458.0 * thickness
    absorbed = 20 / np.log(10) * gamma_d.real
    reflected = 20 * np.log10(np.abs((1 + zeta) ** 2 / (4 * zeta)))
    # 1 − ρ² e^(−2γd) by expm1 and 1 − ρ² = 4ζ/(1 + ζ)²: in a thin sheet both factors come close to 1.
    inner = -np.expm1(-2 * gamma_d) + 4 * zeta / (1 + zeta) ** 2 * np.exp(-2 * gamma_d)
    total = float(absorbed + reflected + 20 * np.log10(np.abs(inner)))
    se = shielding(ConductorMedium(COPPER), thickness, frequency)
    assert_within(se, total, 1e-9 + 1e-12 * abs(total), SCHELKUNOFF)


@pytest.mark.parametrize(("frequency", "mu", "iron", "copper"), REFLECTION)
def test_reflection_loss_table(frequency: float, mu: float, iron: float, copper: float) -> None:
    """Reflection loss of iron (0.17 of copper) and copper to a plane wave, within the table's 1 dB."""
    assert_within(split(ConductorMedium(0.17 * COPPER, mu), 1e-3, frequency)[1], iron, 1.0, HANDBOOK)
    assert_within(split(ConductorMedium(COPPER), 1e-3, frequency)[1], copper, 1.0, HANDBOOK)


@pytest.mark.parametrize(("frequency", "mu"), [(row[0], row[1]) for row in REFLECTION])
def test_reflection_loss_formula(frequency: float, mu: float) -> None:
    """R = 168.14 + 10 log(σ/(μf)) dB holds for iron and copper to a few hundredths of a decibel."""
    for relative, permeability in ((0.17, mu), (1.0, 1.0)):
        metal = ConductorMedium(relative * COPPER, permeability)
        formula = 168.140 + 10 * np.log10(relative / (permeability * frequency))
        assert_within(split(metal, 1e-3, frequency)[1], float(formula), 0.03, HANDBOOK)


@pytest.mark.parametrize(("metal", "relative", "mu", "expected"), ABSORPTION)
def test_absorption_table(metal: str, relative: float, mu: float, expected: float) -> None:
    """Absorption in dB per mm at 150 kHz, within the 4 per cent of the table's rounded constants."""
    absorbed = split(ConductorMedium(relative * COPPER, mu), 1e-3, 150e3)[0]
    assert_within(absorbed, expected, 0.04 * expected, f"{metal}, {ABSORPTION_SOURCE}")


def test_absorption_formula() -> None:
    """A = 131.434 t √(μfσ) dB, t in m: 3.33843e-3 per mil."""
    a = split(ConductorMedium(COPPER), 1.0, 1e6)[0]
    assert_printed(a / np.sqrt(1e6), "0.131434e3", SCHELKUNOFF)
    assert_printed(a * MIL / np.sqrt(1e6), "3.33843e-3", SCHELKUNOFF)


def test_absorption_scales() -> None:
    """30 dB at 10 kHz become 150 dB in five times the thickness and 21.2 dB in half of it at 20 kHz."""
    metal = ConductorMedium(COPPER, 1.0)
    delta = float(1 / np.sqrt(np.pi * 10e3 * VACUUM_PERMEABILITY * COPPER))
    thickness = 30 / (20 / np.log(10)) * delta
    source = f"question in public ({READ}), answer by the formula"
    assert_printed(split(metal, thickness, 10e3)[0], "30.0", source)
    assert_printed(split(metal, 5 * thickness, 10e3)[0], "150.0", source)
    assert_printed(split(metal, thickness / 2, 20e3)[0], "21.2", source)
