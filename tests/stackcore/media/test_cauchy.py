"""Power series of glasses against published indices."""

import numpy as np
import pytest

from stackcore.media.cauchy import CauchyMedium, CauchyTerm
from tests.reference.published import READ, SECOND_METHOD, assert_printed, light
from tests.stackcore.media.dispersion import index_of

RUBIN = f"float glass, M. Rubin, Sol. Energy Mater. 12, 275 (1985), formula {READ}, values {SECOND_METHOD}"
FLOAT_GLASS = (CauchyTerm(-0.003169, 2), CauchyTerm(0.003962, -2))

# Wavelength in µm, index; the extinction of clear glass where it is listed.
ROWS = [
    (0.55, "1.525139", 2.200e-7),
    (0.6328, "1.521625", 0.0),
    (1.0, "1.513793", 4.591e-6),
    (2.0, "1.501314", 4.423e-6),
]


@pytest.mark.parametrize(("micrometres", "printed", "extinction"), ROWS)
def test_float_glass(micrometres: float, printed: str, extinction: float) -> None:
    """Float glass has the index of its formula, and the extinction that it is given."""
    glass = CauchyMedium(1.5130, FLOAT_GLASS, extinction)
    index = complex(index_of(glass, np.array([light(micrometres)]))[0])
    assert_printed(index.real, printed, RUBIN)
    assert -index.imag == pytest.approx(extinction, rel=1e-9, abs=0)


def test_series_of_the_square() -> None:
    """A glass maker's series for n² gives √ of its sum, worked out term by term."""
    coefficients = [(-0.010108, 2), (0.010592, -2), (2.0082e-4, -4), (-7.4764e-6, -6), (4.7e-7, -8)]
    glass = CauchyMedium(2.2718929, tuple(CauchyTerm(c, p) for c, p in coefficients), squared=True)
    micrometres = np.array([0.4047, 0.5876, 1.014])
    total = 2.2718929 + sum(c * micrometres**p for c, p in coefficients)
    index = index_of(glass, 299792458e6 / micrometres)
    assert index.real == pytest.approx(np.sqrt(total), rel=1e-14)
    assert index.real[1] == pytest.approx(1.5168, abs=2e-4)  # a borosilicate crown


def test_outside_its_range_the_series_stays_passive() -> None:
    """Where the sum has fallen below 0, in the far infrared, the medium has no gain for all that."""
    glass = CauchyMedium(1.5130, FLOAT_GLASS, 1e-3)
    far = glass.evaluate(np.geomspace(1e6, 1e15, 200)).permittivity
    assert (far.imag < 0).all()


@pytest.mark.parametrize(
    ("arguments", "told"),
    [
        ((1.5, (), -1e-6), "extinction -1e-06 is negative, which would be gain"),
        ((1.5, (CauchyTerm(1.0, 0),)), r"terms\[0\].exponent 0 must be a whole number"),
        ((1.5, (CauchyTerm(1.0, 11),)), r"terms\[0\].exponent 11 must be a whole number"),
        ((1.5, (CauchyTerm(1e9, 2),)), r"terms\[0\].coefficient 1e\+09 is beyond 1e\+06; the wavelength is in µm"),
        ((0.0,), "there is no index left"),
        ((float("inf"),), "constant inf is not finite"),
        ((1.5, [CauchyTerm(1.0, 2)]), "terms must be a tuple, not a list"),
    ],
)
def test_what_is_no_glass_is_refused(arguments: tuple[float], told: str) -> None:
    """Gain, powers and coefficients beyond all publications and an index of 0 are refused by name."""
    with pytest.raises(ValueError, match=told):
        CauchyMedium(*arguments)
