"""Published figures of metals, films, carbon composites and ferrites, through the entries of the library."""

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE, SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.library import library_entry
from stackcore.stack import METAL, Layer
from tests.reference.published import (
    READ,
    RECALLED,
    REDERIVED,
    SECOND_METHOD,
    TE,
    assert_printed,
    assert_within,
    solved,
    wall,
)

CHEN = f"J. Chen, University of Houston, table of skin depths (2019) ({READ})"
ENCYCLOPAEDIA = f"public encyclopaedia table, CRC Handbook and physics texts, 20 °C ({READ})"
POZAR = f"D. M. Pozar, Microwave Engineering, appendix F ({RECALLED})"
ZHGUN = f"D. V. Zhgun, EMC of high-voltage engineering, table P.3 ({READ})"
ABSORPTION = f"MIL-HDBK-419A (1987), volume I, absorption at 150 kHz ({REDERIVED}, 4 %)"
REFLECTION = f"MIL-HDBK-419A (1987), volume I, table 8-4, plane wave ({READ}, 1 dB)"
WOVEN = f"Functional Composite Materials 4 (2023), 42252-023-00041-3, table 1 ({READ})"
COATED = f"Technologies 11 (6), 175 (2023), abstract ({READ})"
TYPICAL = f"typical data of films and paints ({RECALLED})"
SIZE = f"thick limit of Fuchs and Sondheimer; mean free paths of Gall (2016) ({RECALLED})"
SNOEK = f"J. L. Snoek, Physica 14, 207 (1948); Y. Naito, K. Suetake, IEEE Trans. MTT 19, 65 (1971) ({RECALLED})"

TABLE = [  # key, resistivity in 1e-8 ohm m, conductivity in 1e7 S/m
    ("metals/tungsten", 5.60, "1.79"),
    ("metals/platinum", 10.6, "0.943"),
    ("metals/titanium", 42.0, "0.238"),
    ("magnetics/electrical-steel", 46.0, "0.217"),
    ("metals/mercury", 98.0, "0.102"),
    ("metals/nichrome", 110.0, "0.0909"),
    ("metals/steel-galvanized-microwave", 5.90, "1.69"),
    ("magnetics/iron-conduction", 10.0, "1.00"),
    ("magnetics/nickel-1-khz", 6.99, "1.43"),
    ("optical-metals/silver-carriers", 1.59, "6.30"),
    ("optical-metals/gold-carriers", 2.44, "4.10"),
]
SECOND_SOURCES = [  # key, conductivity in MS/m of another source
    ("metals/silver", 61.73, POZAR),
    ("metals/copper-tough-pitch", 58.13, POZAR),
    ("metals/gold", 40.98, POZAR),
    ("metals/aluminium", 38.16, POZAR),
    ("metals/nickel", 14.49, POZAR),
    ("metals/iron", 10.3, POZAR),
    ("metals/solder-tin-lead", 7.0, POZAR),
    ("metals/silver", 1.08 * 58, ZHGUN),
    ("metals/gold", 0.70 * 58, ZHGUN),
    ("metals/aluminium", 0.61 * 58, ZHGUN),
    ("metals/zinc", 0.30 * 58, ZHGUN),
    ("metals/tin", 0.15 * 58, ZHGUN),
    ("magnetics/nickel-iron-80", 0.03 * 58, ZHGUN),
    ("metals/cadmium", 0.23 * 58, ABSORPTION),
    ("metals/phosphor-bronze", 0.18 * 58, ABSORPTION),
    ("metals/nickel-copper", 0.04 * 58, ABSORPTION),
]
DECADES = ["6.6e-2", "2.1e-2", "6.6e-3", "2.1e-3", "0.66e-3", "0.21e-3"]
DECADES += ["66e-6", "21e-6", "6.6e-6", "2.1e-6", "0.66e-6", "0.21e-6"]
DECIBELS_PER_MILLIMETRE = [
    ("metals/silver", 52.0),
    ("metals/copper-annealed", 51.0),
    ("metals/gold", 42.0),
    ("metals/aluminium", 40.0),
    ("metals/zinc", 28.0),
    ("metals/cadmium", 24.0),
    ("metals/iron", 650.0),
    ("magnetics/iron-by-frequency", 650.0),
    ("metals/tin", 20.0),
    ("metals/steel-1045", 500.0),
    ("metals/lead", 14.0),
]
IRON = [  # Hz, permeability, reflection loss in dB
    (60.0, 1000, 113.0),
    (1e3, 1000, 101.0),
    (10e3, 1000, 91.0),
    (150e3, 1000, 79.0),
    (1e6, 700, 72.0),
    (15e6, 400, 63.0),
    (100e6, 100, 61.0),
    (1.5e9, 10, 59.0),
    (10e9, 1, 61.0),
]
SHEETS = [  # key, thickness in m, lowest and highest ohm per square
    ("films/silver-paint", (25e-6, 50e-6), (0.01, 0.05)),
    ("films/copper-paint", (25e-6, 50e-6), (0.05, 0.3)),
    ("films/nickel-paint", (50e-6, 50e-6), (0.5, 1.5)),
    ("films/doped-oxide-coat", (0.33e-6, 0.37e-6), (6.4, 6.8)),
]
THIN = [  # film, bulk, thickness and mean free path in nm
    ("films/silver-film-10nm", "metals/silver", 10.0, 53.0),
    ("films/gold-film-10nm", "metals/gold", 10.0, 38.0),
    ("films/copper-film-20nm", "metals/copper", 20.0, 40.0),
    ("films/aluminium-film-50nm", "metals/aluminium", 50.0, 19.0),
]
LAMINATES = [  # key, lowest and highest conductivity in S/m
    ("carbon/cfrp-woven-in-plane", 6171 - 437, 8012 + 982),
    ("carbon/cfrp-woven-through", 18.5 - 0.7, 23.0 + 1.0),
    ("carbon/cfrp-along-fibres", 1e4, 4e4),
    ("carbon/cfrp-across-fibres", 10, 1e3),
]


def medium_of(key: str, *frequencies: float) -> AbstractMedium:
    """Return the medium of an entry that holds at all these frequencies in Hz."""
    entry = library_entry(key)
    assert all(entry.valid_range.contains(np.array(f)) for f in frequencies), f"{key} does not hold there"
    return entry.medium


def conductor(key: str) -> ConductorMedium:
    """Return the conductor of an entry."""
    medium = library_entry(key).medium
    assert isinstance(medium, ConductorMedium)
    return medium


def shielding(medium: AbstractMedium, thickness: float, frequency: float) -> float:
    """Return the shielding effectiveness in dB of a plate in air at normal incidence."""
    return float(solved(wall(Layer(medium, thickness)), frequency).shielding_effectiveness_dB[0, 0, TE])


def decay(medium: AbstractMedium, frequency: float) -> float:
    """Return the depth in m in which the field falls to 1/e, from what twenty nepers of metal add."""
    values = medium.evaluate(np.array(frequency))
    index = np.sqrt(values.permittivity * values.permeability)
    nominal = SPEED_OF_LIGHT / (2 * np.pi * frequency * abs(complex(index).imag))
    added = shielding(medium, 40 * nominal, frequency) - shielding(medium, 20 * nominal, frequency)
    return float(20 * nominal * 20 / np.log(10) / added)


@pytest.mark.parametrize(("key", "resistivity", "printed"), TABLE)
def test_the_table_of_resistivity(key: str, resistivity: float, printed: str) -> None:
    """Conductivity has the printed digits and its inverse is the printed resistivity to three digits."""
    assert_printed(conductor(key).conductivity / 1e7, printed, ENCYCLOPAEDIA)
    assert_within(1e8 / conductor(key).conductivity, resistivity, 6e-3 * resistivity, ENCYCLOPAEDIA)


@pytest.mark.parametrize(("key", "megasiemens", "source"), SECOND_SOURCES)
def test_a_second_source_lies_within_three_spreads(key: str, megasiemens: float, source: str) -> None:
    """What another table has for the metal is within three standard deviations of the entry."""
    spread = dict(library_entry(key).provenance.spread)["conductivity"]
    assert_within(megasiemens * 1e6 / conductor(key).conductivity, 1.0, 3 * spread, source)


@pytest.mark.parametrize(("decade", "printed"), list(enumerate(DECADES)))
def test_skin_depths_of_copper(decade: int, printed: str) -> None:
    """The field falls to 1/e in the printed depth, from 1 Hz to 100 GHz."""
    frequency = 10.0**decade
    assert_printed(decay(medium_of("metals/copper-annealed", frequency), frequency), printed, CHEN)


@pytest.mark.parametrize(("key", "printed"), DECIBELS_PER_MILLIMETRE)
def test_absorption_at_150_khz(key: str, printed: float) -> None:
    """A millimetre of the metal absorbs what the handbook lists."""
    per_millimetre = 20 / np.log(10) * 1e-3 / decay(medium_of(key, 150e3), 150e3)
    assert_within(float(per_millimetre), printed, 0.04 * printed, ABSORPTION)


@pytest.mark.parametrize(("frequency", "permeability", "decibels"), IRON)
def test_reflection_of_iron(frequency: float, permeability: float, decibels: float) -> None:
    """Iron by frequency has the permeability of the table and reflects as the table says."""
    medium = medium_of("magnetics/iron-by-frequency", frequency)
    mu = complex(medium.evaluate(np.array(frequency)).permeability)
    assert_within(abs(mu - permeability), 0.0, 1e-9 * permeability, REFLECTION)
    depth = decay(medium, frequency)
    reflection = shielding(medium, 30 * depth, frequency) - 30 * 20 / np.log(10)
    assert_within(float(reflection), decibels, 1.0, REFLECTION)


def test_iron_falls_all_the_way() -> None:
    """Between the rows of its table the permeability of iron never rises."""
    mu = medium_of("magnetics/iron-by-frequency").evaluate(np.geomspace(60.0, 10e9, 400)).permeability
    assert np.all(np.diff(mu.real) <= 0), REFLECTION
    assert np.all(mu.imag <= 0)


@pytest.mark.parametrize(("key", "thickness", "limits"), SHEETS)
def test_films_and_paints(key: str, thickness: tuple[float, float], limits: tuple[float, float]) -> None:
    """At some thickness of the range named, a layer of it has an ohm per square of the range named."""
    source = COATED if key.endswith("coat") else TYPICAL
    middle = float(np.sqrt(thickness[0] * thickness[1]))
    # A film far thinner than its skin depth shields as its sheet does: t = 1/(1 + Z0/2R).
    loss = shielding(medium_of(key, 10e6), middle, 10e6)
    resistance = FREE_SPACE_IMPEDANCE / 2 / (10 ** (loss / 20) - 1)
    assert limits[0] < resistance < limits[1], f"{resistance:.3g} Ω/sq; {source}"


def test_shielding_of_a_coated_pane() -> None:
    """The coat of 6.4 to 6.8 Ω/sq shields by 29.2 to 29.7 dB."""
    loss = shielding(medium_of("films/doped-oxide-coat", 1e9), 0.347e-6, 1e9)
    assert 29.2 < loss < 29.7, f"sheet rule ({SECOND_METHOD}) with {COATED}"


def test_indium_tin_oxide_lies_in_its_range() -> None:
    """Its resistivity is 1e-4 to 4e-4 Ω·cm on glass, and more on polymer."""
    glass, polymer = (100 / conductor(f"films/ito-film{where}").conductivity for where in ("", "-on-polymer"))
    assert 1e-4 < glass < 4e-4 < polymer, TYPICAL


@pytest.mark.parametrize(("film", "bulk", "thickness", "path"), THIN)
def test_thin_films_conduct_less(film: str, bulk: str, thickness: float, path: float) -> None:
    """The resistivity of the film is that of the bulk times 1 + 3ℓ/8d."""
    ratio = conductor(bulk).conductivity / conductor(film).conductivity
    assert_within(ratio, 1 + 3 * path / (8 * thickness), 5e-3 * ratio, SIZE)


def test_ten_nanometres_of_silver() -> None:
    """10 nm of silver have 4.76 Ω/sq."""
    assert_printed(1 / (conductor("films/silver-film-10nm").conductivity * 10e-9), "4.76", SIZE)


@pytest.mark.parametrize(("key", "lowest", "highest"), LAMINATES)
def test_carbon_laminates(key: str, lowest: float, highest: float) -> None:
    """Each laminate lies within what was measured, or is published, for its direction."""
    assert lowest < conductor(key).conductivity < highest, WOVEN if "woven" in key else RECALLED


def test_a_carbon_fabric_conducts_in_its_plane() -> None:
    """In the plane it conducts about three hundred times better than through the thickness."""
    plane, through = (conductor(f"carbon/cfrp-woven-{way}").conductivity for way in ("in-plane", "through"))
    assert_within(plane / through, 300.0, 60.0, WOVEN)


def test_a_ferrite_tile_absorbs_at_its_matched_thickness() -> None:
    """At c/(2π·K·f_m), 6.36 mm, a tile on metal reflects less than −20 dB from 40 to 400 MHz."""
    frequency = np.geomspace(40e6, 400e6, 30)
    tile = medium_of("magnetics/ferrite-tile", 40e6, 400e6)
    matched = SPEED_OF_LIGHT / (2 * np.pi * 1000 * 7.5e6)
    assert_printed(1e3 * matched, "6.36", SNOEK)
    reflected = solved(wall(Layer(tile, matched), back=METAL), list(frequency)).reflectance[:, 0, TE]
    assert np.all(reflected < 0.01), SNOEK


def test_one_number_for_filled_rubber_agrees_with_its_law() -> None:
    """At 10 GHz the entry for the X band is the wide one, both by common practice."""
    wide, narrow = (
        medium_of(key, 10e9).evaluate(np.array(10e9))
        for key in ("magnetics/iron-rubber", "magnetics/iron-rubber-x-band")
    )
    assert abs(complex(wide.permeability - narrow.permeability)) < 0.02 * abs(complex(narrow.permeability))
    assert abs(complex(wide.permittivity - narrow.permittivity)) < 0.02 * abs(complex(narrow.permittivity))
