"""Crystals and glasses against the indices, group indices and dispersions of their published formulas.

The coefficients were read in the open data base of M. N. Polyanskiy, Sci. Data 11, 94 (2024), CC0, under the papers
named here. Indices marked as published are printed there or in tables; the others were computed by a second method.
"""

import numpy as np
import pytest

from stackcore.arrays import FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.sellmeier import NEAREST_TO_POLE, SellmeierMedium, SellmeierTerm
from tests.reference.published import READ, SECOND_METHOD, assert_printed, assert_within, light

SILICA = SellmeierMedium.from_micrometres([(0.6961663, 0.0684043), (0.4079426, 0.1162414), (0.8974794, 9.896161)])
BK7 = SellmeierMedium.from_micrometres(
    [(1.03961212, 0.00600069867), (0.231792344, 0.0200179144), (1.01046945, 103.560653)], squared=True
)
MALITSON = "fused silica, I. H. Malitson, JOSA 55, 1205 (1965)"
SCHOTT = "N-BK7, catalogue of the glass maker"


def _cubic(*pairs: tuple[float, float]) -> SellmeierMedium:
    return SellmeierMedium.from_micrometres(pairs)


# Source, medium, wavelength in µm, index, certainty of the index.
INDICES = [
    (MALITSON, SILICA, 0.5875618, "1.45846", READ),
    (MALITSON, SILICA, 0.5875618, "1.4584637", SECOND_METHOD),
    (MALITSON, SILICA, 0.6328, "1.4570179", SECOND_METHOD),
    (MALITSON, SILICA, 1.0, "1.4504174", SECOND_METHOD),
    (MALITSON, SILICA, 1.55, "1.4440236", SECOND_METHOD),
    (SCHOTT, BK7, 0.5875618, "1.5168", READ),
    (SCHOTT, BK7, 0.5875618, "1.5168000", SECOND_METHOD),
    (SCHOTT, BK7, 0.6328, "1.5150892", SECOND_METHOD),
    (
        "rutile, ordinary, J. R. Devore, JOSA 41, 416 (1951)",
        SellmeierMedium.from_fractions(5.913, [(0.2441, 0.0803)]),
        0.5893,
        "2.612914",
        SECOND_METHOD,
    ),
    (
        "rutile, extraordinary, J. R. Devore, JOSA 41, 416 (1951)",
        SellmeierMedium.from_fractions(7.197, [(0.3322, 0.0843)]),
        0.5893,
        "2.908649",
        SECOND_METHOD,
    ),
    (
        "silicon nitride, H. R. Philipp 1973, fit by T. Bååk 1982",
        _cubic((2.8939, 0.13967)),
        0.6328,
        "2.0104973",
        SECOND_METHOD,
    ),
    (
        "silicon nitride, K. Luke and others, Opt. Lett. 40, 4823 (2015)",
        _cubic((3.0249, 0.1353406), (40314.0, 1239.842)),
        1.55,
        "1.9962797",
        SECOND_METHOD,
    ),
    (
        "zinc oxide, ordinary, W. L. Bond 1965",
        SellmeierMedium.from_micrometres([(0.87968, 0.3042)], constant=2.81418, quadratic=-0.00711),
        0.6328,
        "1.9888181",
        SECOND_METHOD,
    ),
    (
        "zinc oxide, extraordinary, W. L. Bond 1965",
        SellmeierMedium.from_micrometres([(0.94470, 0.3004)], constant=2.80333, quadratic=-0.00714),
        0.6328,
        "2.0049930",
        SECOND_METHOD,
    ),
    (
        "sapphire, ordinary, I. H. Malitson and M. J. Dodge",
        _cubic((1.4313493, 0.0726631), (0.65054713, 0.1193242), (5.3414021, 18.028251)),
        0.5893,
        "1.7680764",
        SECOND_METHOD,
    ),
    (
        "sapphire, extraordinary, I. H. Malitson and M. J. Dodge",
        _cubic((1.5039759, 0.0740288), (0.55069141, 0.1216529), (6.5927379, 20.072248)),
        0.5893,
        "1.7600020",
        SECOND_METHOD,
    ),
    (
        "magnesium fluoride, ordinary, M. J. Dodge, Appl. Opt. 23, 1980 (1984)",
        _cubic((0.48755108, 0.04338408), (0.39875031, 0.09461442), (2.3120353, 23.793604)),
        0.5893,
        "1.3777118",
        SECOND_METHOD,
    ),
    (
        "magnesium fluoride, extraordinary, M. J. Dodge, Appl. Opt. 23, 1980 (1984)",
        _cubic((0.41344023, 0.03684262), (0.50497499, 0.09076162), (2.4904862, 23.771995)),
        0.5893,
        "1.3895235",
        SECOND_METHOD,
    ),
    (
        "calcite, ordinary, G. Ghosh, Opt. Commun. 163, 95 (1999)",
        SellmeierMedium.from_micrometres(
            [(0.96464345, 0.0194325203), (1.82831454, 120.0)], constant=1.73358749, squared=True
        ),
        0.5893,
        "1.6583434",
        SECOND_METHOD,
    ),
    (
        "calcite, extraordinary, G. Ghosh, Opt. Commun. 163, 95 (1999)",
        SellmeierMedium.from_micrometres(
            [(0.82427830, 0.0106689543), (0.14429128, 120.0)], constant=1.35859695, squared=True
        ),
        0.5893,
        "1.4861301",
        SECOND_METHOD,
    ),
    (
        "quartz, ordinary, G. Ghosh, Opt. Commun. 163, 95 (1999)",
        SellmeierMedium.from_micrometres(
            [(1.07044083, 0.0100585997), (1.10202242, 100.0)], constant=1.28604141, squared=True
        ),
        0.5893,
        "1.5442057",
        SECOND_METHOD,
    ),
    (
        "quartz, extraordinary, G. Ghosh, Opt. Commun. 163, 95 (1999)",
        SellmeierMedium.from_micrometres(
            [(1.09509924, 0.0102101864), (1.15662475, 100.0)], constant=1.28851804, squared=True
        ),
        0.5893,
        "1.5533058",
        SECOND_METHOD,
    ),
    (
        "water at 20 °C, M. Daimon and A. Masumura, Appl. Opt. 46, 3811 (2007)",
        SellmeierMedium.from_micrometres(
            [
                (0.5684027565, 0.005101829712),
                (0.1726177391, 0.01821153936),
                (0.02086189578, 0.02620722293),
                (0.1130748688, 10.69792721),
            ],
            squared=True,
        ),
        0.5893,
        "1.3333491",
        SECOND_METHOD,
    ),
]


def index(medium: SellmeierMedium, micrometres: float | FloatArray) -> FloatArray:
    """Return the index at a vacuum wavelength in µm."""
    permittivity = medium.evaluate(SPEED_OF_LIGHT / (np.asarray(micrometres) * 1e-6)).permittivity
    assert not permittivity.imag.any()
    found: FloatArray = np.sqrt(permittivity.real)
    return found


@pytest.mark.parametrize(("source", "medium", "micrometres", "printed", "certainty"), INDICES)
def test_index(source: str, medium: SellmeierMedium, micrometres: float, printed: str, certainty: str) -> None:
    """The index has the digits that are printed for it."""
    assert_printed(float(index(medium, micrometres)), printed, f"{source} ({certainty})")


@pytest.mark.parametrize(
    ("medium", "abbe", "source"),
    [
        (SILICA, "67.8214", f"{MALITSON} ({SECOND_METHOD})"),
        (BK7, "64.17", f"{SCHOTT} ({READ})"),
        (BK7, "64.1673", f"{SCHOTT} ({SECOND_METHOD})"),
    ],
)
def test_abbe_number(medium: SellmeierMedium, abbe: str, source: str) -> None:
    """The Abbe number between the lines d, F and C has the digits that are printed for it."""
    d, f, c = (float(index(medium, line)) for line in (0.5875618, 0.4861327, 0.6562725))
    assert_within((d - 1) / (f - c), float(abbe), 5e-3 if len(abbe) == 5 else 5e-4, source)


def group_index(medium: SellmeierMedium, frequency: FloatArray) -> FloatArray:
    """Return n + f dn/df from the medium's own slope."""
    values = medium.evaluate(frequency)
    n = np.sqrt(values.permittivity.real)
    found: FloatArray = n + frequency * values.permittivity_slope.real / (2 * n)
    return found


@pytest.mark.parametrize(
    ("medium", "printed", "source"),
    [(SILICA, "1.4671448", MALITSON), (BK7, "1.5266496", SCHOTT)],
)
def test_group_index(medium: SellmeierMedium, printed: str, source: str) -> None:
    """The slope gives the group index at 0.8 µm."""
    assert_printed(float(group_index(medium, np.array(light(0.8)))), printed, f"{source} ({SECOND_METHOD})")


def dispersion(medium: SellmeierMedium, micrometres: float) -> float:
    """Return the group velocity dispersion in fs²/mm, (dn_g/dω)/c, the last derivative by a difference."""
    frequency = light(micrometres)
    ahead, behind = (float(group_index(medium, np.array(frequency * (1 + step)))) for step in (1e-5, -1e-5))
    return (ahead - behind) / (2e-5 * 2 * np.pi * frequency) / SPEED_OF_LIGHT * 1e30 / 1e3


@pytest.mark.parametrize(
    ("medium", "micrometres", "printed", "source"),
    [
        (SILICA, 0.8, "36.162", MALITSON),
        (SILICA, 1.55, "-27.947", MALITSON),
        (BK7, 0.8, "44.652", SCHOTT),
    ],
)
def test_group_velocity_dispersion(medium: SellmeierMedium, micrometres: float, printed: str, source: str) -> None:
    """The slope of the slope gives the dispersion of pulses."""
    assert_printed(dispersion(medium, micrometres), printed, f"{source} ({SECOND_METHOD})")


def test_silica_has_no_dispersion_at_its_zero() -> None:
    """The dispersion of fused silica changes sign at 1.272754 µm (second method)."""
    assert dispersion(SILICA, 1.272753) > 0 > dispersion(SILICA, 1.272755)


def test_forms_of_the_formula_agree() -> None:
    """The same glass by poles in µm, by squares in µm², by fractions and in SI units is the same medium."""
    b, c = 1.2, 0.11
    forms = [
        SellmeierMedium.from_micrometres([(b, c)]),
        SellmeierMedium.from_micrometres([(b, c**2)], squared=True),
        SellmeierMedium.from_fractions(1.0 + b, [(b * c**2, c**2)]),
        SellmeierMedium((SellmeierTerm(b, c * 1e-6),)),
    ]
    wavelengths = np.array([0.3, 0.5, 1.0, 5.0])
    written_out = np.sqrt(1 + b * wavelengths**2 / (wavelengths**2 - c**2))
    for medium in forms:
        assert index(medium, wavelengths) == pytest.approx(written_out, rel=1e-14)


def test_beyond_a_pole_nothing_goes_through() -> None:
    """Just beyond the pole n² is negative: a real ε below 0, without loss; at the pole it is held."""
    medium = SellmeierMedium((SellmeierTerm(0.9, 9e-6),))
    pole = SPEED_OF_LIGHT / 9e-6
    values = medium.evaluate(pole * np.array([0.99, 1.0, 1.01])).permittivity
    assert values.real[0] > 1
    assert values.real[1] == pytest.approx(0.9 / NEAREST_TO_POLE, rel=1e-6)
    assert values.real[2] < 0
    assert not values.imag.any()


@pytest.mark.parametrize(
    ("terms", "told"),
    [
        ((SellmeierTerm(-0.1, 1e-6),), r"terms\[0\].strength -0.1 is negative, which would be gain"),
        ((SellmeierTerm(1.0, 1e-6), SellmeierTerm(1.0, 0.0)), r"terms\[1\].pole_wavelength 0 m must be above 0"),
        ((), "terms must hold at least one term"),
        ([SellmeierTerm(1.0, 1e-6)], "terms must be a tuple, not a list"),
    ],
)
def test_what_is_no_crystal_is_refused(terms: tuple[SellmeierTerm, ...], told: str) -> None:
    """Negative strengths, a pole nowhere and a missing sum are refused with their place."""
    with pytest.raises(ValueError, match=told):
        SellmeierMedium(terms)


def test_published_forms_refuse_a_pole_at_nothing() -> None:
    """A pole of 0 µm or −1 µm² is refused with its unit."""
    with pytest.raises(ValueError, match=r"terms\[0\] pole 0 µm must be above 0"):
        SellmeierMedium.from_micrometres([(1.0, 0.0)])
    with pytest.raises(ValueError, match=r"terms\[0\] pole -1 µm² must be above 0"):
        SellmeierMedium.from_fractions(2.0, [(1.0, -1.0)])
