"""Published rows of dielectrics through the entries of the library, and what physics asks of them."""

import numpy as np
import pytest

from stackcore.media.library import library_entry, read_library

SIXTY_GHZ = "handbook chapter that collects published values at 60 GHz, read in a copy"
MILLIMETRES = "literature values in a public note on a millimetre-wave instrument, read in a copy"

# Least and largest permittivity of the source: one number where it prints one; where it prints an index, the square
# of it half a unit of its last digit down and up.
AT_MILLIMETRES = [
    ("ceramics/alumina-mm", 60e9, 9.3, 9.3, SIXTY_GHZ),
    ("plastics/acrylic-mm", 60e9, 2.5, 2.6, SIXTY_GHZ),
    ("plastics/peek", 60e9, 3.12, 3.12, SIXTY_GHZ),
    ("plastics/polycarbonate-mm", 60e9, 2.75, 2.75, SIXTY_GHZ),
    ("plastics/polypropylene", 60e9, 2.2, 2.2, SIXTY_GHZ),
    ("plastics/ptfe-mm", 60e9, 2.05, 2.05, SIXTY_GHZ),
    ("plastics/hdpe", 100e9, 1.52465**2, 1.52475**2, MILLIMETRES),
    ("plastics/pet", 100e9, 1.745**2, 1.755**2, MILLIMETRES),
    ("plastics/ptfe-porous", 100e9, 1.215**2, 1.225**2, MILLIMETRES),
    ("ceramics/magnesium-fluoride-glass", 90e9, 5.49, 5.51, "V. B. Yurchenko and others, PIER M 62, 89 (2017)"),
    ("ceramics/sapphire-across", 10e9, 9.3, 11.5, "public encyclopaedia, read"),
    ("plastics/lcp-film", 60e9, 3.11, 3.21, "D. C. Thompson and others, IEEE Trans. MTT 52, 1343 (2004), recalled"),
]

# Range of the radome handbooks for cores in the X band: M. Skolnik; J. D. Walton (1970); D. J. Kozakoff, recalled.
CORES = ("foam", "foam-light", "honeycomb", "pmi-31", "pmi-52", "pmi-71", "pmi-110", "pvc-foam-60", "pvc-foam-100")

# Foam, the plastic it is blown from.
FOAMS = [
    ("cores/xps-33", "plastics/polystyrene"),
    ("cores/eps-20", "plastics/polystyrene"),
    ("cores/pe-foam-45", "plastics/polyethylene"),
    ("cores/pei-foam-80", "plastics/pei"),
    ("cores/pvc-foam-60", "plastics/pvc-rigid"),
    ("cores/pvc-foam-100", "plastics/pvc-rigid"),
    ("cores/pu-foam-100", "plastics/polyurethane-cast"),
    ("plastics/ptfe-porous", "plastics/ptfe-mm"),
]

# Laminate, its fibre, share of resin by weight; the resin is taken as the neat epoxy of the library.
LAMINATES = [
    ("laminates/e-glass-epoxy", "glasses/e-glass-bulk", 0.35),
    ("laminates/s-glass-epoxy", "glasses/s-glass-bulk", 0.35),
    ("laminates/quartz-epoxy", "glasses/quartz-fibre-bulk", 0.35),
]


def at(key: str, frequency: float) -> complex:
    """Return ε of an entry at a frequency in Hz, which must lie in its range."""
    entry = library_entry(key)
    assert entry.valid_range.lowest <= frequency <= entry.valid_range.highest
    return complex(entry.medium.evaluate(np.array([frequency])).permittivity[0])


def middle(key: str) -> float:
    """Return ε′ in the middle of the range of an entry."""
    ends = library_entry(key).valid_range
    return at(key, float(np.sqrt(ends.lowest * ends.highest))).real


def mass(key: str) -> float:
    """Return the density of an entry in kg/m³."""
    density = library_entry(key).density
    assert density is not None, key
    return density.value


@pytest.mark.parametrize(("key", "frequency", "least", "largest", "source"), AT_MILLIMETRES)
def test_rows_at_their_own_frequency(key: str, frequency: float, least: float, largest: float, source: str) -> None:
    """The entry lies in what the source prints, where it measured; entries keep three decimals at most."""
    assert least - 5e-4 <= at(key, frequency).real <= largest + 5e-4, source


def test_magnesium_fluoride_has_the_loss_of_its_paper() -> None:
    """5e-5, from the abstract (V. B. Yurchenko and others, Prog. Electromagn. Res. M 62, 89 (2017))."""
    value = at("ceramics/magnesium-fluoride-glass", 90e9)
    assert -value.imag / value.real == pytest.approx(5e-5, rel=1e-12)


@pytest.mark.parametrize("name", CORES)
def test_cores_lie_in_the_range_of_the_handbooks(name: str) -> None:
    """Permittivity 1.05 to 1.2 and loss tangent up to 0.005 in the X band."""
    value = at(f"cores/{name}", 10e9)
    assert 1.05 <= value.real <= 1.2
    assert 0 < -value.imag / value.real <= 0.005


@pytest.mark.parametrize(("foam", "solid"), FOAMS)
def test_foams_lie_between_the_bounds_of_their_density(foam: str, solid: str) -> None:
    """ε′ lies between the bounds of Z. Hashin and S. Shtrikman, J. Appl. Phys. 33, 3125 (1962), within spreads."""
    share, full = mass(foam) / mass(solid), middle(solid)
    lower = 1 + 3 * share * (full - 1) / (full + 2 - share * (full - 1))
    upper = full + 3 * (1 - share) * full * (1 - full) / (1 + 2 * full - (1 - share) * (1 - full))
    spread = 2 * dict(library_entry(foam).provenance.spread)["permittivity"]
    assert lower * (1 - spread) <= middle(foam) <= upper * (1 + spread)


@pytest.mark.parametrize(("laminate", "fibre", "resin_by_weight"), LAMINATES)
def test_laminates_lie_between_fibre_and_resin(laminate: str, fibre: str, resin_by_weight: float) -> None:
    """ε′ lies between layers in series and in parallel (O. Wiener, 1912), and the mass is that of the mixture."""
    glass, resin = (1 - resin_by_weight) / mass(fibre), resin_by_weight / mass("plastics/epoxy-neat")
    share = glass / (glass + resin)
    hard, soft = middle(fibre), middle("plastics/epoxy-neat")
    spread = 2 * dict(library_entry(laminate).provenance.spread)["permittivity"]
    series, parallel = 1 / (share / hard + (1 - share) / soft), share * hard + (1 - share) * soft
    assert series * (1 - spread) <= middle(laminate) <= parallel * (1 + spread)
    assert mass(laminate) == pytest.approx(1 / (glass + resin), rel=0.06)


@pytest.mark.parametrize(
    ("key", "permittivity", "tangent"),
    [("laminates/fr4", 4.3, 0.02), ("laminates/polyimide-glass-board", 4.2, 0.015)],
)
def test_circuit_boards_follow_the_causal_law(key: str, permittivity: float, tangent: float) -> None:
    """ε = ε∞ + m ln((f₂ + jf)/(f₁ + jf)), its two constants solved here from the values at 1 GHz.

    A. R. Djordjević and others, IEEE Trans. Electromagn. Compat. 43, 662 (2001); corners 10 kHz and 1 THz.
    """

    def law(frequency: float) -> complex:
        return complex(np.log((1e12 + 1j * frequency) / (1e4 + 1j * frequency)))

    m = -permittivity * tangent / law(1e9).imag
    high = permittivity - m * law(1e9).real
    for frequency in (1e6, 1e8, 1e9, 1e10):
        assert at(key, frequency) == pytest.approx(high + m * law(frequency), rel=1e-9)
    fall = at(key, 1e8).real - at(key, 1e9).real
    assert -at(key, 1e9).imag == pytest.approx(0.6822 * fall, rel=2e-3), "ε″ is π/2 log₁₀e of the fall per decade"


def test_silicon_loses_by_its_carriers() -> None:
    """10 kΩ·cm at 30 GHz: tan δ = 1/(ωε₀ερ) = 5.1e-4, a tenth of that at ten times f; 2e-5 more of the lattice."""
    low, high = (at("ceramics/silicon-high-resistivity", f) for f in (30e9, 300e9))
    carriers = 1 / (2 * np.pi * 30e9 * 8.8541878128e-12 * 11.67 * 100)
    assert -low.imag / low.real == pytest.approx(carriers + 2e-5, rel=1e-6)
    assert -high.imag / high.real == pytest.approx(carriers / 10 + 2e-5, rel=1e-6)


@pytest.mark.parametrize(
    "key", [entry.key for entry in read_library().entries if any(state.name == "wet" for state in entry.states)]
)
def test_wet_is_never_better_than_dry(key: str) -> None:
    """Water raises permittivity and loss tangent of every entry that has a wet state."""
    entry = library_entry(key)
    (wet,) = (state.constants for state in entry.states if state.name == "wet")
    for name, value in wet.items():
        dry = entry.constants[name]
        assert isinstance(value, int | float | complex)
        assert isinstance(dry, int | float | complex)
        assert complex(value).real > complex(dry).real


def test_no_family_of_dielectrics_is_thin() -> None:
    """What a wall or a window is built of is there."""
    least = {"plastics": 40, "laminates": 20, "cores": 20, "adhesives": 10, "finishes": 15, "ceramics": 25}
    least |= {"glasses": 10, "optical-glasses": 25}
    for family, count in least.items():
        assert len(read_library().family(family).entries) >= count, family
