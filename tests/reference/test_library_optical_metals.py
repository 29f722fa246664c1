"""Published optical constants of metals and transparent conductors, through the entries of the library."""

import numpy as np
import pytest

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.joined import JoinedMedium
from stackcore.media.library import library_entry, read_library
from tests.reference.published import (
    READ,
    RECALLED,
    SECOND_METHOD,
    TE,
    assert_printed,
    assert_within,
    half_unit,
    light,
    solved,
    wall,
)

RAKIC = f"Rakić and others, Appl. Opt. 37, 5271 (1998), table of refractiveindex.info ({READ})"
COMPUTED = f"Rakić and others, Appl. Opt. 37, 5271 (1998), constants {READ}, n and k by a {SECOND_METHOD}"
HAMBERG = f"Hamberg and Granqvist, J. Appl. Phys. 60, R123 (1986), constants {RECALLED}; by a {SECOND_METHOD}"
ORDAL = f"Ordal and others, Appl. Opt. 24, 4493 (1985), damping in 1/cm ({RECALLED})"

COMMON_METALS = [  # metal, wavelength in µm, n, k, reflectance of an opaque mirror
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
ALL_METALS = [  # metal, wavelength in µm, n, k, all as printed to five digits
    ("silver", 0.30184, 1.3162, 0.63073),
    ("silver", 5.0193, 3.2508, 32.984),
    ("gold", 0.30109, 1.5247, 1.6757),
    ("gold", 5.0236, 3.4866, 31.039),
    ("copper", 0.29926, 1.4041, 1.6300),
    ("copper", 5.0143, 3.1145, 32.751),
    ("aluminium", 0.30020, 0.25129, 3.4853),
    ("aluminium", 5.0088, 9.4606, 46.291),
    ("beryllium", 0.29923, 2.4168, 3.0858),
    ("beryllium", 0.54960, 3.3455, 3.1517),
    ("beryllium", 1.5535, 2.7911, 5.7720),
    ("beryllium", 4.9863, 2.8124, 20.460),
    ("chromium", 0.29923, 1.0923, 2.6846),
    ("chromium", 0.54960, 2.8979, 4.2302),
    ("chromium", 1.5535, 4.2698, 4.9327),
    ("chromium", 4.9863, 3.7549, 16.041),
    ("nickel", 0.29989, 1.7122, 1.9438),
    ("nickel", 0.54958, 1.8136, 3.2564),
    ("nickel", 1.5510, 3.4427, 6.7572),
    ("nickel", 4.9955, 4.3676, 18.257),
    ("palladium", 0.30042, 1.1455, 2.2656),
    ("palladium", 0.54908, 1.6410, 3.7709),
    ("palladium", 1.5499, 3.1720, 8.2291),
    ("palladium", 4.9982, 3.2179, 21.211),
    ("platinum", 0.30042, 1.4787, 2.1679),
    ("platinum", 0.54908, 2.0885, 3.6984),
    ("platinum", 1.5499, 5.3528, 7.0534),
    ("platinum", 4.9982, 4.0935, 19.833),
    ("titanium", 0.29940, 0.61356, 1.9005),
    ("titanium", 0.55047, 1.7913, 3.0026),
    ("titanium", 1.5485, 3.8228, 4.4159),
    ("titanium", 5.0116, 4.6269, 9.1562),
    ("tungsten", 0.30042, 2.8892, 2.4591),
    ("tungsten", 0.54908, 3.4541, 2.7542),
    ("tungsten", 1.5499, 2.3737, 4.8147),
    ("tungsten", 4.9982, 3.1603, 22.850),
]
PRINTED = [  # metal, ħω_p, f0, Γ0 in eV; strength, damping and energy of the first oscillator
    ("silver", 9.01, 0.845, 0.048, (0.065, 3.886, 0.816)),
    ("gold", 9.03, 0.760, 0.053, (0.024, 0.241, 0.415)),
    ("copper", 10.83, 0.575, 0.030, (0.061, 0.378, 0.291)),
    ("aluminium", 14.98, 0.523, 0.047, (0.227, 0.333, 0.162)),
]
CARRIED_DOWN = [("silver", "1.92e7"), ("gold", "1.57e7"), ("copper", "3.02e7"), ("aluminium", "3.36e7")]
INDIUM_TIN_OXIDE = [  # wavelength in µm, n, k
    (0.55, "1.796306", "0.010529"),
    (1.0, "1.210798", "0.093373"),
    (1.5, "0.285863", "1.321818"),
    (2.0, "0.358793", "2.462842"),
    (5.0, "1.645994", "7.225196"),
    (10.0, "4.971420", "12.799394"),
    (20.0, "11.362896", "19.270448"),
]
DAMPINGS = [("silver", 145.0, 0.035), ("gold", 215.0, 0.035), ("aluminium", 660.0, 0.035)]
TRANSPARENT = [("ito", 0.48e6), ("azo", 0.20e6), ("fto", 0.28e6)]


def medium_of(name: str, *micrometres: float) -> AbstractMedium:
    """Return the medium of an entry that holds at all these vacuum wavelengths."""
    entry = library_entry(f"optical-metals/{name}")
    assert all(entry.valid_range.contains(np.array(light(w))) for w in micrometres), f"{name} does not hold there"
    return entry.medium


def index_of(medium: AbstractMedium, frequency: float) -> complex:
    """Return n − jk at a frequency in Hz."""
    values = medium.evaluate(np.array(frequency))
    return complex(np.sqrt(values.permittivity * values.permeability))


@pytest.mark.parametrize(("metal", "micrometres", "n", "k", "reflectance"), COMMON_METALS)
def test_metals_of_the_trade(metal: str, micrometres: float, n: str, k: str, reflectance: str) -> None:
    """n, k and the reflectance at normal incidence have the printed digits."""
    medium = medium_of(f"{metal}-light", micrometres)
    found = index_of(medium, light(micrometres))
    assert_printed(found.real, n, COMPUTED)
    assert_printed(-found.imag, k, COMPUTED)
    mirror = solved(wall(back=medium), light(micrometres))
    assert_printed(float(mirror.reflectance[0, 0, TE]), reflectance, COMPUTED)


@pytest.mark.parametrize(("metal", "micrometres", "n", "k"), ALL_METALS)
def test_eleven_metals(metal: str, micrometres: float, n: float, k: float) -> None:
    """n and k agree with the open data base; five digits of a wavelength leave 2e-4 of |n − jk|."""
    found = index_of(medium_of(f"{metal}-light", micrometres), light(micrometres))
    assert_within(abs(found - complex(n, -k)), 0.0, 2e-4 * abs(found), RAKIC)


@pytest.mark.parametrize(("metal", "plasma", "share", "damping", "oscillator"), PRINTED)
def test_constants_as_printed(
    metal: str, plasma: float, share: float, damping: float, oscillator: tuple[float, float, float]
) -> None:
    """The entry's constants are the printed ones in the form of the model."""
    medium = medium_of(f"{metal}-light")
    assert isinstance(medium, DrudeLorentzMedium)
    printed = DrudeLorentzMedium.from_electronvolts(plasma, share, damping, [oscillator])
    assert medium.plasma_frequency == pytest.approx(printed.plasma_frequency, rel=1e-9)
    assert medium.collision_rate == pytest.approx(printed.collision_rate, rel=1e-9)
    first, expected = medium.terms[0], printed.terms[0]
    assert first.permittivity_step == pytest.approx(expected.permittivity_step, rel=1e-9)
    assert first.resonance_frequency == pytest.approx(expected.resonance_frequency, rel=1e-9)
    assert first.linewidth == pytest.approx(expected.linewidth, rel=1e-9)


@pytest.mark.parametrize(("metal", "printed"), CARRIED_DOWN)
def test_light_is_not_carried_down_to_radio_frequency(metal: str, printed: str) -> None:
    """The free carriers of the fit give another conductivity than the metal has, and the range says so."""
    entry = library_entry(f"optical-metals/{metal}-light")
    assert isinstance(entry.medium, DrudeLorentzMedium)
    assert_printed(entry.medium.conductivity / 1e7, f"{float(printed) / 1e7:.2f}", COMPUTED)
    assert entry.valid_range.lowest > 1e12
    assert f"{entry.medium.conductivity / 1e6:.3g} MS/m" in entry.provenance.note


def test_there_are_eleven_metals_in_light() -> None:
    """All metals of the paper are there, none of them below 1 THz."""
    entries = [e for e in read_library().family("optical-metals").entries if e.model == "drude-lorentz"]
    assert len(entries) == 11
    assert min(entry.valid_range.lowest for entry in entries) > 1e12


@pytest.mark.parametrize(("micrometres", "n", "k"), INDIUM_TIN_OXIDE)
def test_indium_tin_oxide(micrometres: float, n: str, k: str) -> None:
    """1e27 carriers per m³ of 0.35 electron masses and 30 cm²/Vs have these n and k.

    The second method took the constants of CODATA 2018, which move the ninth digit.
    """
    found = index_of(medium_of("ito-film-carriers", micrometres), light(micrometres))
    assert_within(found.real, float(n), half_unit(n) + 5e-9, HAMBERG)
    assert_within(-found.imag, float(k), half_unit(k) + 5e-9, HAMBERG)


@pytest.mark.parametrize(("nanometres", "printed"), [(100, "20.805"), (200, "10.403"), (400, "5.201")])
def test_sheet_resistance_of_indium_tin_oxide(nanometres: int, printed: str) -> None:
    """The same constants give the film's ohm per square at radio frequency."""
    medium = medium_of("ito-film-carriers")
    assert isinstance(medium, DrudeMedium)
    assert_printed(1 / (medium.conductivity * nanometres * 1e-9), printed, HAMBERG)


@pytest.mark.parametrize(("oxide", "conductivity"), TRANSPARENT)
def test_transparent_conductors(oxide: str, conductivity: float) -> None:
    """Each conducts at 1 GHz as its note says, is clear in the visible and a mirror in the far infrared."""
    entry = library_entry(f"optical-metals/{oxide}-film-carriers")
    assert isinstance(entry.medium, DrudeMedium)
    assert_within(entry.medium.conductivity, conductivity, 0.02 * conductivity, HAMBERG)
    assert f"{conductivity / 1e6:.2f} MS/m" in entry.provenance.note
    assert -index_of(entry.medium, light(0.55)).imag < 0.02
    infrared = solved(wall(back=entry.medium), light(20.0))
    assert float(infrared.reflectance[0, 0, TE]) > 0.75


@pytest.mark.parametrize(("metal", "damping", "tolerance"), DAMPINGS)
def test_times_between_collisions(metal: str, damping: float, tolerance: float) -> None:
    """τ is 1/(2πc·ν) of the damping, seen as the frequency at which ε′ − 1 and ε″ are alike."""
    frequency = SPEED_OF_LIGHT * damping * 100
    value = complex(medium_of(f"{metal}-carriers").evaluate(np.array(frequency)).permittivity)
    assert_within((value.real - 1) / value.imag, 1.0, tolerance, ORDAL)


@pytest.mark.parametrize(("metal", "join", "share"), [("silver", 24.18e12, 0.35), ("gold", 48.36e12, 0.29)])
def test_a_film_from_radio_frequency_to_light(metal: str, join: float, share: float) -> None:
    """Below its declared join the film is the conductor, above it the fit; the jump is what its note says."""
    film = library_entry(f"optical-metals/{metal}-film-joined")
    assert isinstance(film.medium, JoinedMedium)
    assert film.medium.joins == pytest.approx((join,))
    assert film.medium.gaps == ()
    (step,) = film.medium.steps()
    assert_within(step.permittivity_step, share, 0.01, "the library's own note")
    assert f"{join / 1e12:.2f} THz" in film.provenance.note
    for frequency, part in ((10e9, "metals/{}"), (light(0.55), "optical-metals/{}-light")):
        other = library_entry(part.format(metal)).medium
        assert index_of(film.medium, frequency) == pytest.approx(index_of(other, frequency), rel=2e-3)
