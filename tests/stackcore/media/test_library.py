"""The material library that comes with the program, and how it is looked through."""

import time
from pathlib import Path

import numpy as np
import pytest

from stackcore.errors import LibraryError
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.library import (
    Library,
    LibraryEntry,
    families,
    library_entry,
    materials_dir,
    read_library,
)
from stackcore.media.library_file import CERTAINTIES
from stackcore.media.models import MODELS

ENTRIES = read_library().entries
KEYS = [entry.key for entry in ENTRIES]

HIGHEST = 5e15
"""Hz, 20 eV: the end of the widest fit of optical constants."""

RADIO_MODELS = ("constant", "conductor", "lossy-dielectric", "power-law", "wideband")
"""Models of matter far below its resonances, where ε′ is at least 1 and nothing is without loss."""

# Conductivity in MS/m at 20 °C, key of the library: a public encyclopaedia table that quotes the CRC Handbook of
# Chemistry and Physics and physics texts, several copies compared. Printed digits.
ENCYCLOPAEDIA = [
    ("metals/silver", 63.0),
    ("metals/copper", 59.6),
    ("metals/copper-annealed", 58.0),
    ("metals/gold", 41.0),
    ("metals/zinc", 16.9),
    ("metals/nickel", 14.3),
    ("metals/iron", 10.0),
    ("metals/tin", 9.17),
    ("metals/carbon-steel", 6.99),
    ("metals/carbon-steel-microwave", 6.99),
    ("metals/lead", 4.55),
    ("metals/stainless-steel", 1.45),
]

# Resistivity in nΩ·m of the same table.
RESISTIVITY = [
    ("metals/silver", 15.9),
    ("metals/copper", 16.8),
    ("metals/copper-annealed", 17.2),
    ("metals/gold", 24.4),
    ("metals/aluminium", 28.2),
    ("metals/zinc", 59.0),
    ("metals/nickel", 69.9),
    ("metals/iron", 100),
    ("metals/tin", 109),
    ("metals/carbon-steel", 143),
    ("metals/lead", 220),
    ("metals/stainless-steel", 690),
]

# Permittivity, loss tangent at 10 GHz or in the X band; where the sources give a range its middle stands here.
# A. R. von Hippel, Dielectric Materials and Applications (1954); NIST Technical Note 1520; the radome handbooks of
# Skolnik, Walton and Kozakoff; all recalled.
DIELECTRICS = [
    ("plastics/ptfe", 2.08, 3.7e-4),
    ("plastics/polyethylene", 2.25, 3.5e-4),
    ("plastics/polystyrene", 2.54, 4.3e-4),
    ("plastics/polystyrene-cross-linked", 2.53, 6e-4),
    ("plastics/acrylic", 2.59, 6.7e-3),
    ("plastics/polycarbonate", 2.77, 5.5e-3),
    ("ceramics/fused-quartz", 3.78, 1e-4),
    ("ceramics/alumina", 9.7, 1.5e-4),
    ("laminates/e-glass-epoxy", 4.4, 0.016),
    ("laminates/e-glass-polyester", 4.1, 0.015),
    ("laminates/quartz-cyanate", 3.2, 0.0055),
    ("laminates/aramid-epoxy", 3.45, 0.0165),
]

# Permittivity at 60 GHz of a handbook chapter that collects published values, for entries whose range ends below.
SIXTY_GHZ = [
    ("plastics/ptfe", 2.05),
    ("plastics/polypropylene", 2.2),
    ("plastics/polyethylene", 2.3),
    ("plastics/polycarbonate", 2.75),
    ("plastics/polystyrene-cross-linked", 2.5),
    ("ceramics/fused-quartz", 3.8),
]


def conductivity(key: str) -> float:
    """Return the conductivity of an entry in S/m."""
    medium = library_entry(key).medium
    assert isinstance(medium, ConductorMedium)
    return medium.conductivity


def test_the_library_has_no_fault() -> None:
    """No file that comes with the program has a fault."""
    assert [str(fault) for fault in read_library().faults] == []


def test_the_library_has_the_families_of_the_trade() -> None:
    """Dielectrics, metals, films, carbon composites and magnetic matter are there, listed in order."""
    trade = {"ceramics", "cores", "finishes", "laminates", "metals", "plastics"}
    trade |= {"carbon", "films", "magnetics", "optical-metals", "optical-dielectrics"}
    trade |= {"adhesives", "building", "glasses", "ground", "water"}
    assert trade <= set(families())
    assert list(families()) == sorted(families())
    assert len(set(KEYS)) == len(KEYS) >= 350


@pytest.mark.parametrize("entry", ENTRIES, ids=KEYS)
def test_every_entry_tells_where_it_comes_from(entry: LibraryEntry) -> None:
    """Every entry has a source, a certainty, a range and a spread for each constant that varies."""
    told = entry.provenance
    assert len(told.source) > 20
    assert told.certainty in CERTAINTIES
    assert told.note
    assert 0 < entry.valid_range.lowest < entry.valid_range.highest <= HIGHEST
    varying = {constant.name for constant in MODELS[entry.model].constants if constant.varies}
    spread = {name.partition("[")[0] for name, _ in told.spread}
    assert varying & set(entry.constants) <= spread <= set(entry.constants)
    assert all(0 <= share < 0.5 for _, share in told.spread)
    assert (told.certainty == "common practice") == ("common practice" in told.source.casefold())


@pytest.mark.parametrize("entry", ENTRIES, ids=KEYS)
def test_every_entry_is_passive_in_its_range(entry: LibraryEntry) -> None:
    """At both ends and in the middle of its range every entry has finite values without gain."""
    ends = entry.valid_range
    frequency = np.array([ends.lowest, np.sqrt(ends.lowest * ends.highest), ends.highest])
    values = entry.medium.evaluate(frequency)
    for array in (values.permittivity, values.permeability):
        assert np.isfinite(array).all()
        assert (array.imag <= 0).all()
    if entry.model in RADIO_MODELS and "relaxation_time" not in entry.constants:
        assert (values.permittivity.real >= 1).all()
        assert (values.permittivity.imag < 0).all(), "no solid is without loss"
    assert entry.medium.valid_range == ends
    assert entry.medium.provenance == entry.provenance


@pytest.mark.parametrize(("key", "given"), ENCYCLOPAEDIA)
def test_conductivities_of_the_table(key: str, given: float) -> None:
    """Conductivities are those printed in the table."""
    assert conductivity(key) == pytest.approx(given * 1e6, rel=1e-12)


@pytest.mark.parametrize(("key", "given"), RESISTIVITY)
def test_resistivities_of_the_table(key: str, given: float) -> None:
    """Conductivities agree with the resistivities of the same table to its three digits."""
    assert 1e9 / conductivity(key) == pytest.approx(given, rel=4e-3)


def test_brass_of_the_microwave_textbook() -> None:
    """Brass is 2.564e7 S/m in Pozar's appendix (recalled), kept to three digits, within its spread of 15 MS/m."""
    assert conductivity("metals/brass") == pytest.approx(2.564e7, rel=2e-3)
    spread = dict(library_entry("metals/brass").provenance.spread)["conductivity"]
    assert abs(15.1e6 / conductivity("metals/brass") - 1) < 2 * spread


@pytest.mark.parametrize(("key", "permittivity", "tangent"), DIELECTRICS)
def test_dielectrics_of_the_handbooks(key: str, permittivity: float, tangent: float) -> None:
    """Permittivities and loss tangents are those of the handbooks."""
    medium = library_entry(key).medium
    assert isinstance(medium, ConstantMedium)
    assert medium.permittivity == pytest.approx(permittivity * (1 - 1j * tangent), rel=1e-12)


@pytest.mark.parametrize(("key", "permittivity"), SIXTY_GHZ)
def test_plastics_at_60_ghz_lie_within_three_spreads(key: str, permittivity: float) -> None:
    """A second source at 60 GHz agrees with the entry within three of its standard deviations."""
    entry = library_entry(key)
    constants, spread = dict(entry.constants), dict(entry.provenance.spread)
    value = constants["permittivity"]
    assert isinstance(value, complex)
    assert abs(permittivity / value.real - 1) < 3 * spread["permittivity"]


def test_window_glass_stands_for_the_recommendation() -> None:
    """Over its range the constant loss lies within two spreads of ITU-R P.2040-3, σ = 0.0036·f^1.3394 S/m."""
    entry = library_entry("ceramics/window-glass")
    gigahertz = np.geomspace(entry.valid_range.lowest, entry.valid_range.highest, 50) / 1e9
    recommended = 17.98 * 0.0036 * gigahertz**1.3394 / gigahertz
    medium = entry.medium
    assert isinstance(medium, ConstantMedium)
    assert medium.permittivity.real == 6.31
    spread = dict(entry.provenance.spread)["loss_tangent"]
    assert np.abs(recommended / -medium.permittivity.imag - 1).max() < 2 * spread


def test_ice_stands_for_its_formula() -> None:
    """Over its range ice lies within two spreads of the formula of Mätzler and Wegmüller at 263.15 K."""
    entry = library_entry("ceramics/ice")
    gigahertz = np.linspace(entry.valid_range.lowest, entry.valid_range.highest, 50) / 1e9
    kelvin, theta = 263.15, 300 / 263.15 - 1
    alpha = (0.00504 + 0.0062 * theta) * np.exp(-22.1 * theta)
    exponential = np.exp(335 / kelvin)
    beta = 0.0207 / kelvin * exponential / (exponential - 1) ** 2 + 1.16e-11 * gigahertz**2
    beta += np.exp(-9.963 + 0.0372 * (kelvin - 273.16))
    loss = alpha / gigahertz + beta * gigahertz
    medium = entry.medium
    assert isinstance(medium, ConstantMedium)
    assert medium.permittivity.real == pytest.approx(3.1884 + 9.1e-4 * (kelvin - 273), rel=1e-3)
    spread = dict(entry.provenance.spread)["loss_tangent"]
    assert np.abs(loss / -medium.permittivity.imag - 1).max() < 2 * spread


@pytest.mark.parametrize(
    ("given", "meant"),
    [("metals/coper", "metals/copper"), ("copper", "metals/copper"), ("plastic/ptfe", "plastics/ptfe")],
)
def test_an_unknown_key_names_the_nearest(given: str, meant: str) -> None:
    """A key with a slip, without its family or with another family is answered with the one that was meant."""
    with pytest.raises(LibraryError, match=f"did you mean '{meant}'"):
        library_entry(given)


@pytest.mark.parametrize("given", ["", "/", "metals/", "nowhere/nothing", "metals/copper/x"])
def test_a_key_that_is_nothing_is_refused(given: str) -> None:
    """What names no entry raises LibraryError with one fault that lists the families."""
    with pytest.raises(LibraryError) as caught:
        library_entry(given)
    (fault,) = caught.value.faults
    assert "metals" in fault.allowed


def test_an_unknown_family_names_the_nearest() -> None:
    """A family with a slip is answered with the one that was meant."""
    with pytest.raises(LibraryError, match="did you mean 'metals'"):
        read_library().family("metal")


@pytest.mark.parametrize(
    ("words", "first"),
    [
        ("copper annealed", "metals/copper-annealed"),
        ("ANNEALED copper", "metals/copper-annealed"),
        ("aluminum", "metals/aluminium"),
        ("pmma", "plastics/acrylic"),
        ("OCA", "adhesives/acrylic-oca"),
        ("glass epoxy", "laminates/e-glass-epoxy"),
        ("P.2040", "building/concrete-p2040-1"),
    ],
)
def test_search_finds_by_every_word(words: str, first: str) -> None:
    """Names, further words and sources are searched; all words must be there; names come first."""
    assert read_library().search(words)[0].key == first


@pytest.mark.parametrize(
    ("word", "first"),
    [("copper", "metals/copper"), ("Gold", "metals/gold"), ("IRON", "metals/iron"), ("silver", "metals/silver")],
)
def test_the_plain_material_comes_before_its_kinds(word: str, first: str) -> None:
    """An entry called just what was typed comes first, of several the one with the shortest key."""
    found = read_library().search(word)
    assert found[0].key == first
    assert len(found) > 3


def test_search_with_nothing_and_for_nothing() -> None:
    """No words find all entries; a word that stands nowhere finds none."""
    assert read_library().search("  ") == ENTRIES
    assert read_library().search("unobtainium") == ()


def test_one_entry_reads_one_file(tmp_path: Path) -> None:
    """Only the family that is asked for is read: a later change of another file is still seen."""
    for name in ("metals", "cores"):
        (tmp_path / f"{name}.toml").write_bytes((materials_dir() / f"{name}.toml").read_bytes())
    library = Library(tmp_path)
    assert library.entry("metals/copper").label == "Copper"
    (tmp_path / "cores.toml").write_text('[family]\nlabel = "Emptied"\n', encoding="utf-8")
    (tmp_path / "metals.toml").write_text('[family]\nlabel = "Emptied"\n', encoding="utf-8")
    assert library.family("cores").label == "Emptied"
    assert library.family("metals").label == "Metals"


def test_a_broken_file_leaves_the_rest(tmp_path: Path) -> None:
    """With one file malformed and one entry faulty the others are found, and the faulty ones say why."""
    cores = (materials_dir() / "cores.toml").read_text(encoding="utf-8")
    (tmp_path / "cores.toml").write_text(
        cores.replace("permittivity = 1.10", "permittivity = -x"), encoding="utf-8"
    )
    spoiled = cores.replace('0.003\nrange = ["1 GHz", "12.4 GHz"]', '-0.003\nrange = ["1 GHz", "12.4 GHz"]')
    (tmp_path / "more.toml").write_text(spoiled, encoding="utf-8")
    library = Library(tmp_path)
    assert [fault.path for fault in library.faults] == ["cores.toml", "more.toml: honeycomb.loss_tangent"]
    rest = [entry.name for entry in read_library().family("cores").entries if entry.name != "honeycomb"]
    assert [entry.key for entry in library.entries] == [f"more/{name}" for name in rest]
    with pytest.raises(LibraryError, match="is not TOML"):
        library.entry("cores/foam")
    with pytest.raises(LibraryError, match="gain"):
        library.entry("more/honeycomb")


def test_a_file_that_cannot_be_opened_is_a_fault(tmp_path: Path) -> None:
    """A folder with the name of a family file is told as a fault of that file."""
    (tmp_path / "odd.toml").mkdir()
    (fault,) = Library(tmp_path).faults
    assert (fault.path, "cannot be read" in fault.message) == ("odd.toml", True)


def test_a_folder_that_is_not_there_is_an_error(tmp_path: Path) -> None:
    """A library without its folder raises LibraryError and names the folder."""
    with pytest.raises(LibraryError, match="nowhere"):
        Library(tmp_path / "nowhere")


def test_an_installed_package_brings_its_own_files(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    """Where the installed package holds the files they are used; in a checkout, those beside the package."""
    assert materials_dir() == Path(__file__).resolve().parents[3] / "materials"
    (tmp_path / "_materials").mkdir()
    monkeypatch.setattr("importlib.resources.files", {"stackcore": tmp_path}.__getitem__)
    assert materials_dir() == tmp_path / "_materials"


def test_the_library_is_read_once() -> None:
    """Every call gives the same library and the same entries."""
    assert read_library() is read_library()
    assert library_entry("metals/copper") is read_library().entry("metals/copper")


def test_reading_everything_is_quick() -> None:
    """The whole library is read within 60 ms, the best of five, so that no one waits for it."""
    taken = []
    for _ in range(5):
        start = time.perf_counter()
        assert len(Library(materials_dir()).entries) == len(ENTRIES)
        taken.append(time.perf_counter() - start)
    assert min(taken) < 0.060
