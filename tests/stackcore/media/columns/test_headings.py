"""Headings and numbers, one by one."""

import pytest

from stackcore.media.columns.cells import Decimal, missing_number, read_number
from stackcore.media.columns.headings import QUANTITY_KINDS, read_heading, unit_scale

HEADINGS = [
    ("f (GHz)", "frequency", "GHz"),
    ("Frequency [MHz]", "frequency", "MHz"),
    ("freq/GHz", "frequency", "GHz"),
    ("f_GHz", "frequency", "GHz"),
    ("f, GHz", "frequency", "GHz"),
    ("f in THz", "frequency", "THz"),
    ("wavelength/µm", "wavelength", "µm"),
    ("wavelength (μm)", "wavelength", "μm"),
    ("λ [nm]", "wavelength", "nm"),
    ("Photon energy (eV)", "energy", "eV"),
    ("E (eV)", "energy", "eV"),
    ("wavenumber (1/cm)", "wavenumber", "1/cm"),
    ("eps_r", "permittivity", None),
    ("ε_r", "permittivity", None),
    ("ϵ'", "permittivity", None),
    ("Re(eps)", "permittivity", None),
    ("Dk", "permittivity", None),
    ("ε″", "loss", None),
    ('eps"', "loss", None),
    ("eps''", "loss", None),
    ("Im(eps)", "loss", None),
    ("tan d", "loss_tangent", None),
    ("tan δ", "loss_tangent", None),
    ("tan_delta", "loss_tangent", None),
    ("Loss Tangent", "loss_tangent", None),
    ("Df", "loss_tangent", None),
    ("tan d (%)", "loss_tangent", "%"),
    ("n", "index", None),
    ("k", "extinction", None),
    ("n (1)", "index", "1"),
    ("mu_r", "permeability", None),
    ("µ'", "permeability", None),
    ("µ''", "magnetic_loss", None),
    ("sigma (S/m)", "conductivity", "S/m"),
    ("T (°C)", "ignored", None),
    ("sample", "ignored", None),
    ("quux", None, None),
    ("", None, None),
    ("loss factor", None, None),
]


@pytest.mark.parametrize(("text", "kind", "unit"), HEADINGS)
def test_headings(text: str, kind: str | None, unit: str | None) -> None:
    """A heading gives its kind of column and its unit, or says nothing."""
    heading = read_heading(text)
    assert (heading.kind, heading.unit) == (kind, unit)


def test_no_name_means_two_kinds() -> None:
    """No heading is claimed by two kinds of column."""
    names = [name for kind in QUANTITY_KINDS.values() for name in kind.names]
    assert len(names) == len(set(names))


@pytest.mark.parametrize(
    ("kind", "unit", "scale"),
    [
        ("frequency", "GHz", 1e9),
        ("wavelength", "nm", 1e-9),
        ("wavelength", "Å", 1e-10),
        ("wavenumber", "cm⁻¹", 100.0),
        ("energy", "meV", 1e-3),
        ("conductivity", "mS/cm", 0.1),
        ("loss_tangent", "%", 0.01),
        ("loss_tangent", "", 1.0),
        ("frequency", "mm", None),
        ("permittivity", "GHz", None),
        ("energy", "J", None),
    ],
)
def test_units(kind: str, unit: str, scale: float | None) -> None:
    """A unit of a kind of column has its size, any other has none."""
    assert unit_scale(kind, unit) == (scale if scale is None else pytest.approx(scale, rel=1e-15))


NUMBERS: list[tuple[str, Decimal, float | None]] = [
    ("8.2", ".", 8.2),
    ("8,2", ",", 8.2),
    ("8,2", ".", None),
    ("8.2", ",", None),
    ("+8.2e-3", ".", 8.2e-3),
    ("−8,2E+3", ",", -8200.0),
    ("1.5D3", ".", 1500.0),
    ("12,345", ".", 12345.0),
    ("12.345", ",", 12345.0),
    ("012,345", ".", None),
    ("1,234.5", ".", 1234.5),
    ("1.234,5", ",", 1234.5),
    ("1 234.5", ".", 1234.5),
    ("1\u00a0234,5", ",", 1234.5),
    ("5.", ".", 5.0),
    (".5", ".", 0.5),
    ("", ".", None),
    ("-", ".", None),
    ("nan", ".", None),
    ("inf", ".", None),
    ("1e999", ".", None),
    ("1e", ".", None),
    ("٣", ".", None),
    ("1_000", ".", None),
    ("0x10", ".", None),
]


@pytest.mark.parametrize(("text", "decimal", "value"), NUMBERS)
def test_numbers(text: str, decimal: Decimal, value: float | None) -> None:
    """Numbers of either decimal sign, with exponents and groups of thousands; everything else is none."""
    assert read_number(text, decimal) == value


@pytest.mark.parametrize("text", ["", " ", "nan", "NaN", "n/a", "-", "inf"])
def test_missing_numbers(text: str) -> None:
    """The usual ways to say that a number is missing are known."""
    assert missing_number(text)
    assert not missing_number("4.2")
