"""No model loses digits: all of them against 60-digit arithmetic, over all constants that they allow."""

import math

import numpy as np
import pytest
from hypothesis import given, settings

from stackcore.media.base import AbstractMedium
from stackcore.media.cauchy import CauchyMedium
from stackcore.media.lorentz import LorentzMedium
from stackcore.media.magnetic_lorentz import MagneticLorentzMedium
from stackcore.media.sellmeier import NEAREST_TO_POLE, SellmeierMedium
from tests.stackcore.media.exact_models import MP, exact_terms
from tests.stackcore.media.samples import MEDIA, frequencies_of
from tests.strategies import frequencies, model_media

REAL, LOSS = 2e-15, 1e-12
"""Allowed errors: of the real part relative to what it is the sum of; of the loss relative to itself."""

SMALLEST_NORMAL = float(np.finfo(np.float64).tiny)


def assert_all_digits(medium: AbstractMedium, frequency: float) -> None:
    """Assert that ε and μ have all their digits, small losses too."""
    values = medium.evaluate(np.array(frequency))
    for quantity in ("permittivity", "permeability"):
        got = complex(getattr(values, quantity))
        terms = exact_terms(medium, quantity, frequency)
        exact, size = sum(terms), sum(abs(term) for term in terms)
        growth = 1 + abs(float(MP.log(MP.mpf(frequency)))) + _steepness(medium, frequency)
        assert abs(got.real - exact.real) <= REAL * growth * size + 1e-15, (quantity, got, exact)
        assert abs(got.imag - exact.imag) <= LOSS * abs(exact.imag) + SMALLEST_NORMAL, (quantity, got, exact)


def _steepness(medium: AbstractMedium, frequency: float) -> float:
    """Return |d ln ε/d ln f| of a Sellmeier medium: beside a pole the last digit of the wavelength goes into ε."""
    if not isinstance(medium, SellmeierMedium):
        return 0.0
    values = medium.evaluate(np.array(frequency))
    return abs(complex(values.permittivity_slope)) * frequency / abs(complex(values.permittivity))


@pytest.mark.parametrize("name", MEDIA)
def test_digits_of_the_samples(name: str) -> None:
    """One medium of each model has all its digits where it is used and at the ends of the range."""
    for frequency in (*frequencies_of(name), 1.0, 1e15):
        assert_all_digits(MEDIA[name], float(frequency))


@pytest.mark.parametrize("distance", [0.0, 1e-15, 1e-12, 1e-9, 1e-6, -1e-9])
def test_digits_beside_a_narrow_line(distance: float) -> None:
    """Beside a resonance of hardly any width nothing cancels."""
    for medium in (LorentzMedium(1.0, 3.0, 1e13, 1.0), MagneticLorentzMedium(1.0, 3.0, 1e13, 1.0)):
        assert_all_digits(medium, 1e13 * (1 + distance))


@settings(max_examples=1000)
@given(model_media(), frequencies())
def test_digits_of_any_medium(medium: AbstractMedium, frequency: float) -> None:
    """So does any medium at any frequency."""
    if isinstance(medium, SellmeierMedium):
        u = np.array([frequency * term.pole_wavelength / 299792458 for term in medium.terms])
        if (abs(1 - u) < NEAREST_TO_POLE).any():
            return  # held there on purpose
    if isinstance(medium, CauchyMedium):
        micrometres = 299792458e6 / frequency
        parts = [medium.constant, *(t.coefficient * micrometres**t.exponent for t in medium.terms)]
        if sum(abs(part) for part in parts) > 1e3 * abs(math.fsum(parts)):
            return  # a series that cancels far outside any glass has no more digits than its sum
    assert_all_digits(medium, frequency)
