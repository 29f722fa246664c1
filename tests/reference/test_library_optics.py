"""Published indices of refraction through the entries of the library."""

import numpy as np
import pytest

from stackcore.media.library import library_entry

# Wavelength in µm and index, from the publication named in each entry; computed in double precision from the
# coefficients of an open data base of optical constants (M. N. Polyanskiy, Sci. Data 11, 94 (2024), CC0).
ROWS = [
    ("fused-silica", 0.5875618, 1.4584637),
    ("fused-silica", 0.6328, 1.4570179),
    ("fused-silica", 1.0, 1.4504174),
    ("fused-silica", 1.55, 1.4440236),
    ("crown-517642", 0.5875618, 1.5168000),
    ("crown-517642", 0.6328, 1.5150892),
    ("float-glass", 0.55, 1.525139),
    ("float-glass", 0.6328, 1.521625),
    ("float-glass", 1.0, 1.513793),
    ("float-glass", 2.0, 1.501314),
    ("rutile-o", 0.5893, 2.612914),
    ("rutile-e", 0.5893, 2.908649),
    ("silicon-nitride-film", 0.6328, 2.0104973),
    ("silicon-nitride-luke", 1.55, 1.9962797),
    ("zinc-oxide-o", 0.6328, 1.9888181),
    ("zinc-oxide-e", 0.6328, 2.0049930),
    ("sapphire-o", 0.5893, 1.7680764),
    ("sapphire-e", 0.5893, 1.7600020),
    ("magnesium-fluoride-o", 0.5893, 1.3777118),
    ("magnesium-fluoride-e", 0.5893, 1.3895235),
    ("calcite-o", 0.5893, 1.6583434),
    ("calcite-e", 0.5893, 1.4861301),
    ("quartz-o", 0.5893, 1.5442057),
    ("quartz-e", 0.5893, 1.5533058),
]


def index(name: str, micrometres: float) -> float:
    """Return n of an entry at a vacuum wavelength."""
    medium = library_entry(f"optical-dielectrics/{name}").medium
    frequency = np.array([299792458.0 / (micrometres * 1e-6)])
    return float(np.sqrt(medium.evaluate(frequency).permittivity[0].real))


@pytest.mark.parametrize(("name", "micrometres", "expected"), ROWS)
def test_the_index_is_that_of_the_publication(name: str, micrometres: float, expected: float) -> None:
    """All printed digits."""
    digits = len(str(expected).partition(".")[2])
    assert index(name, micrometres) == pytest.approx(expected, abs=0.6 * 10.0 ** -min(digits, 7) + 1e-8)


def test_crown_glass_has_its_code() -> None:
    """517642: n_d − 1 = 0.517 and V_d = (n_d − 1)/(n_F − n_C) = 64.2, at 587.56, 486.13 and 656.27 nm."""
    d, f, c = (index("crown-517642", wave) for wave in (0.5875618, 0.4861327, 0.6562725))
    assert round(d - 1, 3) == 0.517
    assert round((d - 1) / (f - c), 1) == 64.2


@pytest.mark.parametrize(
    ("name", "expected"),
    [("magnesium-fluoride-film", 1.38), ("zinc-sulfide-film", 2.3), ("silica-film", 1.46), ("pmma-visible", 1.491)],
)
def test_films_have_the_index_of_their_note(name: str, expected: float) -> None:
    """What the note says is what is computed with."""
    assert index(name, 0.55) == pytest.approx(expected, rel=1e-12)
    assert str(expected) in library_entry(f"optical-dielectrics/{name}").provenance.note
