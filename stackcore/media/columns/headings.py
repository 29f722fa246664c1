"""What a heading such as ``f (GHz)``, ``eps_r`` or ``tan d`` says: a quantity, and perhaps a unit."""

import re
from dataclasses import dataclass
from fractions import Fraction
from typing import Final

from stackcore.constants import ELEMENTARY_CHARGE, PLANCK_CONSTANT, SPEED_OF_LIGHT
from stackcore.errors import UnitError
from stackcore.units import Dimension, parse_measure


@dataclass(frozen=True, slots=True)
class QuantityKind:
    """A kind of column.

    Parameters
    ----------
    name, label
        As in answers and data, and in words.
    dimension
        Of its unit; None for energies and wavenumbers, whose units are in `_OTHER_UNITS`.
    abscissa
        Whether it says at which frequency a row holds.
    names
        What headings call it, without spaces, marks and capitals.
    """

    name: str
    label: str
    dimension: Dimension | None
    abscissa: bool
    names: tuple[str, ...]


_RATIO: Final = Dimension.NUMBER

QUANTITY_KINDS: Final[dict[str, QuantityKind]] = {
    kind.name: kind
    for kind in (
        QuantityKind("frequency", "frequency", Dimension.FREQUENCY, True, ("f", "freq", "frequency", "frequenz")),
        QuantityKind(
            "wavelength",
            "vacuum wavelength",
            Dimension.LENGTH,
            True,
            ("wavelength", "lambda", "λ", "wl", "λ0", "lambda0"),
        ),
        QuantityKind("wavenumber", "wavenumber", None, True, ("wavenumber", "wavenumbers", "ν̃")),
        QuantityKind("energy", "photon energy", None, True, ("energy", "photonenergy", "hv", "hν")),
        QuantityKind(
            "permittivity",
            "ε′",
            _RATIO,
            False,
            (
                *("permittivity", "relativepermittivity", "dielectricconstant", "dk", "er", "e'", "εr", "ε", "ε'"),
                *(
                    "eps",
                    "epsr",
                    "eps'",
                    "epsr'",
                    "epsilon",
                    "epsilonr",
                    "epsilon'",
                    "epsreal",
                    "epsre",
                    "epsilonreal",
                ),
                *("reeps", "re(eps)", "re(ε)", "realeps", "eps1", "ε1", "e1", "epsprime", "permittivityreal"),
            ),
        ),
        QuantityKind(
            "loss",
            "ε″",
            _RATIO,
            False,
            (
                *("e''", "ε''", "εr''", "eps''", "epsr''", "epsilon''", "epsimag", "epsim", "epsilonimag", "imeps"),
                *("im(eps)", "im(ε)", "-im(eps)", "imageps", "eps2", "ε2", "e2", "epsdoubleprime"),
                *("permittivityimag", "permittivityloss", "dielectricloss"),
            ),
        ),
        QuantityKind(
            "loss_tangent",
            "tan δ",
            _RATIO,
            False,
            (
                "tand",
                "tanδ",
                "tandelta",
                "losstangent",
                "df",
                "dissipationfactor",
                "tgd",
                "tgδ",
                "tan(d)",
                "tan(δ)",
                "tan",
            ),
        ),
        QuantityKind("index", "n", _RATIO, False, ("n", "refractiveindex", "index", "nr", "indexofrefraction")),
        QuantityKind(
            "extinction",
            "k",
            _RATIO,
            False,
            ("k", "kappa", "κ", "extinction", "extinctioncoefficient", "extinctionindex"),
        ),
        QuantityKind(
            "conductivity",
            "σ, for all of the loss",
            Dimension.CONDUCTIVITY,
            False,
            ("sigma", "σ", "conductivity", "cond"),
        ),
        QuantityKind(
            "permeability",
            "μ′",
            _RATIO,
            False,
            (
                "permeability",
                "relativepermeability",
                "mu",
                "mur",
                "mu'",
                "μ",
                "μr",
                "μ'",
                "mureal",
                "mure",
                "mu1",
                "μ1",
            ),
        ),
        QuantityKind("magnetic_loss", "μ″", _RATIO, False, ("mu''", "μ''", "mur''", "muimag", "muim", "mu2", "μ2")),
        QuantityKind(
            "magnetic_loss_tangent",
            "tan δμ",
            _RATIO,
            False,
            ("tandm", "tanδm", "tanδμ", "magneticlosstangent", "tandmu"),
        ),
    )
}
"""Name -> kind, in the order questions list them."""

IGNORED: Final = "ignored"
"""The answer for a column that is not to be used."""

_IGNORED_NAMES: Final = frozenset(
    (
        *(
            "temperature",
            "t",
            "temp",
            "time",
            "sample",
            "no",
            "nr.",
            "#",
            "row",
            "point",
            "thickness",
            "d",
            "comment",
        ),
        *("uncertainty", "std", "stdev", "error", "s11", "s21", "density", "humidity"),
    )
)

_KIND_OF: Final = {name: kind.name for kind in QUANTITY_KINDS.values() for name in kind.names} | dict.fromkeys(
    _IGNORED_NAMES, IGNORED
)

_OTHER_UNITS: Final[dict[str, dict[str, float]]] = {
    "energy": {"eV": 1.0, "meV": 1e-3, "keV": 1e3},
    "wavenumber": {
        "1/cm": 100.0,
        "cm-1": 100.0,
        "cm^-1": 100.0,
        "cm⁻¹": 100.0,
        "1/m": 1.0,
        "m-1": 1.0,
        "1/µm": 1e6,
    },
}
"""Kind -> unit as typed -> size in eV, or in 1/m."""

UNIT_CHOICES: Final[dict[str, tuple[str, ...]]] = {
    "frequency": ("Hz", "kHz", "MHz", "GHz", "THz"),
    "wavelength": ("nm", "µm", "mm", "m"),
    "energy": ("eV", "meV"),
    "wavenumber": ("1/cm", "1/m"),
    "conductivity": ("S/m", "mS/m", "S/cm"),
}
"""Kind -> the units a question offers; kinds that are not here are plain ratios."""

_LONGEST: Final = 200
"""Signs of a heading that are looked at."""

_ONE: Final = frozenset({"", "-", "1", "none", "a.u.", "rel", "rel.", "relative", "–", "eps0", "ε0"})

_WITH_UNIT: Final = (
    re.compile(r"(?P<name>.+?)\s*[\[({]\s*(?P<unit>[^\])}]*)\s*[\])}]"),
    re.compile(r"(?P<name>.+?)\s*(?:,|;|:|\bin\b)\s*(?P<unit>\S.*)"),
    re.compile(r"(?P<name>[^/]+?)\s*/\s*(?P<unit>\S.*)"),
    re.compile(r"(?P<name>.+)[_ ](?P<unit>[^_ ]+)"),
)


@dataclass(frozen=True, slots=True)
class Heading:
    """What a heading was read as: a kind or `IGNORED` or None, and a unit or None; both as in `QUANTITY_KINDS`."""

    text: str
    kind: str | None
    unit: str | None


def read_heading(text: str) -> Heading:
    """Return what a heading says; None for what it does not say.

    Examples
    --------
    >>> read_heading("wavelength/µm")
    Heading(text='wavelength/µm', kind='wavelength', unit='µm')
    >>> read_heading("tan d").kind, read_heading("f_GHz").unit
    ('loss_tangent', 'GHz')
    """
    text = text[:_LONGEST]
    text = text.strip().strip('"').strip() if text.strip().count('"') == 2 else text.strip()
    whole = _KIND_OF.get(_key(text))
    if whole is not None:
        return Heading(text, whole, None)
    for pattern in _WITH_UNIT:
        found = pattern.fullmatch(text)
        if found is None:
            continue
        kind, unit = _KIND_OF.get(_key(found["name"])), found["unit"].strip()
        if kind == IGNORED:
            return Heading(text, kind, None)
        if unit_of_any(unit):
            return Heading(text, kind or _kind_by_unit(found["name"], unit), unit)
        if kind is not None and pattern is _WITH_UNIT[0]:
            return Heading(text, kind, unit)
    return Heading(text, None, None)


def unit_scale(kind: str, unit: str) -> float | None:
    """Return the size of `unit` for a kind of column, in Hz, m, eV, 1/m, S/m or 1; None when it is no such unit."""
    if kind in _OTHER_UNITS:
        return _OTHER_UNITS[kind].get(unit.replace("μ", "µ"))
    dimension = QUANTITY_KINDS[kind].dimension
    assert dimension is not None
    if dimension is Dimension.NUMBER:
        return 1.0 if unit.casefold() in _ONE else 0.01 if unit == "%" else 0.001 if unit == "‰" else None
    try:
        return parse_measure(f"1 {unit}", dimension).value
    except UnitError:
        return None


def unit_of_any(unit: str) -> bool:
    """Return whether a text is a unit of any kind of column."""
    return any(unit_scale(kind, unit) is not None for kind in QUANTITY_KINDS)


def hertz_per(kind: str, value: float) -> float:
    """Return the frequency in Hz of a frequency in Hz, wavelength in m, wavenumber in 1/m or energy in eV, > 0."""
    if kind == "wavelength":
        return SPEED_OF_LIGHT / value
    if kind == "wavenumber":
        return SPEED_OF_LIGHT * value
    if kind == "energy":
        return value * (ELEMENTARY_CHARGE / PLANCK_CONSTANT)
    return value


def _key(name: str) -> str:
    """Return a heading as `_KIND_OF` has it: one kind of prime, no spaces, underscores or dots."""
    name = name.strip().strip("'") if name.startswith("'") and name.endswith("'") else name.strip()
    for sign, plain in (("″", "''"), ('"', "''"), ("”", "''"), ("’", "'"), ("′", "'"), ("`", "'"), ("µ", "μ")):
        name = name.replace(sign, plain)
    name = name.replace("ϵ", "ε").replace("ɛ", "ε").replace("ᵣ", "r").casefold()
    return re.sub(r"[\s_.{}$\\-]", "", name) if not name.startswith("-im") else name


def _kind_by_unit(name: str, unit: str) -> str | None:
    """Return the kind of ``E (eV)`` and ``x / THz``, whose unit says it; a plain ratio says nothing."""
    if _key(name) == "e" and unit in _OTHER_UNITS["energy"]:
        return "energy"
    kinds = [kind for kind in UNIT_CHOICES if unit_scale(kind, unit) is not None and unit not in _ONE]
    return kinds[0] if len(kinds) == 1 and QUANTITY_KINDS[kinds[0]].abscissa else None


def exact_scale(scale: float) -> Fraction:
    """Return the decimal scale a double stands for, so that 8.2 GHz becomes the double nearest to 8.2e9."""
    return Fraction(repr(scale))
