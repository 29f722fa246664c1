"""Metals in the visible and infrared against the table of their published fit."""

import numpy as np
import pytest

from stackcore.constants import ELEMENTARY_CHARGE, PLANCK_CONSTANT, SPEED_OF_LIGHT
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.resonance import LorentzTerm
from tests.reference.published import READ, assert_printed, light
from tests.stackcore.media.dispersion import index_of

RAKIC = f"Rakić, Djurišić, Elazar, Majewski, Appl. Opt. 37, 5271 (1998), parameters and table ({READ})"

# In eV: plasma energy; share and damping of the free carriers; strength, damping and energy of each oscillator.
# One public copy of the aluminium row has 1.188 instead of 1.808 in the third oscillator, two digits exchanged.
FITS = {
    "silver": (
        *(9.01, 0.845, 0.048),
        [
            (0.065, 3.886, 0.816),
            (0.124, 0.452, 4.481),
            (0.011, 0.065, 8.185),
            (0.840, 0.916, 9.083),
            (5.646, 2.419, 20.29),
        ],
    ),
    "gold": (
        *(9.03, 0.760, 0.053),
        [
            (0.024, 0.241, 0.415),
            (0.010, 0.345, 0.830),
            (0.071, 0.870, 2.969),
            (0.601, 2.494, 4.304),
            (4.384, 2.214, 13.32),
        ],
    ),
    "copper": (
        *(10.83, 0.575, 0.030),
        [(0.061, 0.378, 0.291), (0.104, 1.056, 2.957), (0.723, 3.213, 5.300), (0.638, 4.305, 11.18)],
    ),
    "aluminium": (
        *(14.98, 0.523, 0.047),
        [(0.227, 0.333, 0.162), (0.050, 0.312, 1.544), (0.166, 1.351, 1.808), (0.030, 3.382, 3.473)],
    ),
}
METALS = {name: DrudeLorentzMedium.from_electronvolts(*fit) for name, fit in FITS.items()}

# Wavelength in µm, n, k and the reflectance at normal incidence.
ROWS = [
    ("silver", 0.55, "0.13423", "3.17225", "0.95269"),
    ("silver", 0.6328, "0.14371", "3.80829", "0.96364"),
    ("silver", 1.0, "0.21960", "6.42512", "0.97946"),
    ("silver", 10.0, "11.8885", "63.3517", "0.98862"),
    ("gold", 0.55, "0.49742", "2.37040", "0.74689"),
    ("gold", 0.6328, "0.31228", "3.14605", "0.89250"),
    ("gold", 1.0, "0.25570", "5.98646", "0.97266"),
    ("copper", 0.55, "0.54993", "2.76551", "0.78113"),
    ("copper", 0.6328, "0.34129", "3.53737", "0.90461"),
    ("copper", 1.0, "0.25403", "6.48118", "0.97668"),
    ("copper", 10.0, "8.1712", "64.3001", "0.99225"),
    ("aluminium", 0.55, "0.96563", "6.45806", "0.91524"),
    ("aluminium", 0.6328, "1.33963", "7.29959", "0.90880"),
    ("aluminium", 1.0, "1.47806", "9.28249", "0.93595"),
    ("aluminium", 10.0, "22.2626", "82.7619", "0.98795"),
]


@pytest.mark.parametrize(("metal", "micrometres", "n", "k", "reflectance"), ROWS)
def test_table(metal: str, micrometres: float, n: str, k: str, reflectance: str) -> None:
    """Silver, gold, copper and aluminium have the tabulated index and reflectance."""
    index = complex(index_of(METALS[metal], np.array([light(micrometres)]))[0])
    assert_printed(index.real, n, RAKIC)
    assert_printed(-index.imag, k, RAKIC)
    assert_printed(abs((1 - index) / (1 + index)) ** 2, reflectance, RAKIC)


@pytest.mark.parametrize(
    ("metal", "printed", "handbook"),
    [
        ("silver", "1.92e7", 6.3e7),
        ("gold", "1.57e7", 4.5e7),
        ("copper", "3.02e7", 5.8e7),
        ("aluminium", "3.36e7", 3.77e7),
    ],
)
def test_fit_is_not_for_radio_frequency(metal: str, printed: str, handbook: float) -> None:
    """The conductivity that the fit would have at radio frequency is the known one, below that of the metal."""
    assert_printed(METALS[metal].conductivity, printed, "second method")
    assert METALS[metal].conductivity < 0.9 * handbook
    low = -float(METALS[metal].evaluate(np.array(1e6)).permittivity.imag)
    assert low * 2 * np.pi * 1e6 * 8.8541878188e-12 == pytest.approx(METALS[metal].conductivity, rel=1e-6)


def test_electronvolts() -> None:
    """1.239841984 eV is the photon of 1 µm; dampings become a width in Hz and a rate in 1/s."""
    metal = DrudeLorentzMedium.from_electronvolts(9.0, 0.25, 0.05, [(0.5, 0.1, 1.239841984)])
    assert metal.terms[0].resonance_frequency == pytest.approx(SPEED_OF_LIGHT / 1e-6, rel=1e-9)
    assert metal.terms[0].linewidth == pytest.approx(0.1 * ELEMENTARY_CHARGE / PLANCK_CONSTANT, rel=1e-15)
    assert metal.terms[0].permittivity_step == pytest.approx(0.5 * (9.0 / 1.239841984) ** 2, rel=1e-15)
    assert metal.plasma_frequency == pytest.approx(4.5 * ELEMENTARY_CHARGE / PLANCK_CONSTANT, rel=1e-15)
    assert metal.collision_rate == pytest.approx(7.5963e13, rel=1e-4)  # 0.05 eV over ħ


def test_what_is_no_metal_is_refused() -> None:
    """Gain in any part is refused with its place."""
    with pytest.raises(ValueError, match=r"terms\[1\].permittivity_step -.* is negative, which would be gain"):
        DrudeLorentzMedium.from_electronvolts(9.0, 0.8, 0.05, [(0.1, 0.5, 4.5), (-0.1, 0.5, 4.5)])
    with pytest.raises(ValueError, match=r"collision_rate .* is negative, which would be gain"):
        DrudeLorentzMedium.from_electronvolts(9.0, 0.8, -0.05, [(0.1, 0.5, 4.5)])
    with pytest.raises(ValueError, match=r"oscillators\[0\] energy 0 eV must be above 0"):
        DrudeLorentzMedium.from_electronvolts(9.0, 0.8, 0.05, [(0.1, 0.5, 0.0)])
    with pytest.raises(ValueError, match="free_share 0 must be above 0"):
        DrudeLorentzMedium.from_electronvolts(9.0, 0.0, 0.05, [(0.1, 0.5, 1.0)])
    with pytest.raises(ValueError, match=r"terms\[0\].linewidth 0 Hz must be above 0"):
        DrudeLorentzMedium(1.0, 1e15, 1e13, (LorentzTerm(1.0, 1e14, 0.0),))
