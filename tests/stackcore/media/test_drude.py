"""Free carriers: a transparent conductor, a plasma, and the identities of the Drude model."""

import numpy as np
import pytest

from stackcore.constants import ELEMENTARY_CHARGE, PLANCK_CONSTANT, SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.drude import DrudeMedium
from stackcore.media.plasma import PlasmaMedium
from tests.reference.published import SECOND_METHOD, assert_printed, assert_within, light
from tests.stackcore.media.dispersion import index_of

FILM = DrudeMedium.from_carriers(1e27, 0.35, 30e-4, high_frequency_permittivity=4.0)
"""Tin-doped indium oxide; typical of Hamberg and Granqvist, J. Appl. Phys. 60, R123 (1986), recalled."""

SOURCE = f"Drude film of n 1e27, m* 0.35, mobility 30 cm²/(V·s), ε∞ 4 ({SECOND_METHOD})"

# Wavelength in µm, n, k.
ROWS = [
    (0.55, "1.796306", "0.010529"),
    (1.0, "1.210798", "0.093373"),
    (1.5, "0.285863", "1.321818"),
    (2.0, "0.358793", "2.462842"),
    (5.0, "1.645994", "7.225196"),
    (10.0, "4.971420", "12.799394"),
    (20.0, "11.362896", "19.270448"),
]


@pytest.mark.parametrize(("micrometres", "n", "k"), ROWS)
def test_transparent_conductor(micrometres: float, n: str, k: str) -> None:
    """The film is transparent in the visible and a metal in the infrared, with the digits of a second method."""
    index = complex(index_of(FILM, np.array([light(micrometres)]))[0])
    # The second method has the 2018 values of the constants of nature, which differ by some 1e-9 from those here.
    assert_within(index.real, float(n), 5e-7 + 5e-9 * abs(index), SOURCE)
    assert_within(-index.imag, float(k), 5e-7 + 5e-9 * abs(index), SOURCE)


def test_constants_of_the_film() -> None:
    """Plasma energy, damping, conductivity, sheet resistances and screened plasma wavelength of the film."""
    electronvolt = ELEMENTARY_CHARGE / PLANCK_CONSTANT
    assert_printed(FILM.plasma_frequency / electronvolt, "1.984830", SOURCE)
    assert_printed(FILM.collision_rate / (2 * np.pi) / electronvolt, "0.110255", SOURCE)
    assert_printed(FILM.conductivity, "480652.99", SOURCE)
    for nanometres, resistance in ((100, "20.805"), (200, "10.403"), (400, "5.201")):
        # The source cuts 5.2013 and 10.4026 after rounding the resistivity to 2.0805e-4 Ω·cm.
        assert 1 / (FILM.conductivity * nanometres * 1e-9) == pytest.approx(float(resistance), abs=1e-3)
    screened = np.sqrt(FILM.plasma_frequency**2 / 4.0 - (FILM.collision_rate / (2 * np.pi)) ** 2)
    assert_printed(SPEED_OF_LIGHT / screened * 1e6, "1.257100", SOURCE)
    assert abs(float(FILM.evaluate(np.array(screened)).permittivity.real)) < 1e-12


def test_conductivity_at_low_frequency() -> None:
    """Far below the collision rate the loss is that of the static conductivity, n e times the mobility."""
    assert FILM.conductivity == pytest.approx(1e27 * ELEMENTARY_CHARGE * 30e-4, rel=1e-14)
    loss = -float(FILM.evaluate(np.array(1e6)).permittivity.imag)
    assert 2 * np.pi * 1e6 * VACUUM_PERMITTIVITY * loss == pytest.approx(FILM.conductivity, rel=1e-12)
    assert DrudeMedium(1.0, 1e15, 0.0).conductivity == float("inf")


def test_plasma_frequency_of_electrons() -> None:
    """8.98 √n Hz, n in 1/m³, the plasma frequency of every textbook on the ionosphere (recalled, re-derived)."""
    assert PlasmaMedium(1e12).plasma_frequency == pytest.approx(8.98e6, rel=1e-3)
    assert PlasmaMedium(4e12).plasma_frequency == pytest.approx(2 * PlasmaMedium(1e12).plasma_frequency, rel=1e-15)


def test_plasma_is_a_drude_medium() -> None:
    """The plasma by its density is the Drude medium of its plasma frequency."""
    plasma = PlasmaMedium(2e17, 5e8)
    drude = DrudeMedium(1.0, plasma.plasma_frequency, 5e8)
    frequency = np.geomspace(1.0, 1e15, 31)
    one, other = plasma.evaluate(frequency), drude.evaluate(frequency)
    assert np.array_equal(one.permittivity, other.permittivity)
    assert np.array_equal(one.permittivity_slope, other.permittivity_slope)


@pytest.mark.parametrize(
    ("arguments", "told"),
    [
        ((0.0, 1e15, 1e13), "high_frequency_permittivity 0 must be above 0"),
        ((1.0, 0.0, 1e13), "plasma_frequency 0 Hz must be above 0"),
        ((1.0, 1e15, -1.0), "collision_rate -1 1/s is negative, which would be gain"),
        ((1.0, 1e41, 1e13), r"plasma_frequency 1e\+41 is beyond 1e\+40"),
        ((1.0, 1e-41, 1e13), "plasma_frequency 1e-41 is below 1e-40"),
    ],
)
def test_what_is_no_drude_medium_is_refused(arguments: tuple[float, float, float], told: str) -> None:
    """Gain and constants that no matter has are refused by name."""
    with pytest.raises(ValueError, match=told):
        DrudeMedium(*arguments)


def test_what_is_no_plasma_is_refused() -> None:
    """No electrons, no mass, no mobility and a negative collision rate are refused by name."""
    with pytest.raises(ValueError, match="electron_density 0 1/m³ must be above 0"):
        PlasmaMedium(0.0)
    with pytest.raises(ValueError, match="collision_rate -1 1/s is negative, which would be gain"):
        PlasmaMedium(1e18, -1.0)
    with pytest.raises(ValueError, match="mobility 0 m²"):
        DrudeMedium.from_carriers(1e27, 0.35, 0.0)
    with pytest.raises(ValueError, match="effective_mass -1 must be above 0"):
        DrudeMedium.from_carriers(1e27, -1.0, 1e-3)
