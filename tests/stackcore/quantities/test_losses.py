"""The mean of losses: digits from 1e-12 dB to 1e7 dB, gains, and nothing left at all."""

import math

import mpmath
import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.quantities.amplitudes import mean_loss_dB

SIZES = st.one_of(st.floats(0, 1e7), st.floats(-14, 7).map(lambda power: 10**power))


def mean(first: float, second: float, share: float = 0.5) -> float:
    """Return the loss of a power of which `share` has the first loss and the rest the second."""
    with np.errstate(all="raise", under="ignore"):
        return float(mean_loss_dB(np.array([first, second]), np.array([share, 1 - share])))


@given(SIZES, SIZES, st.floats(0, 1))
def test_losses_of_any_size_keep_their_digits(first: float, second: float, share: float) -> None:
    """Twelve digits, against the formula with 40 digits and more."""
    with mpmath.workdps(40):
        shares = mpmath.mpf(share), mpmath.mpf(1 - share)
        left = shares[0] * mpmath.mpf(10) ** (-mpmath.mpf(first) / 10)
        left += shares[1] * mpmath.mpf(10) ** (-mpmath.mpf(second) / 10)
        wanted = float(-10 * mpmath.log10(left / (shares[0] + shares[1])))
    # A share of 1 − 1e-17 is 1 to a double; what such a rest changes is below every digit asked for here.
    assert mean(first, second, share) == pytest.approx(wanted, rel=1e-12, abs=5e-16)


def test_nothing_left_of_one_or_of_both() -> None:
    """Half of the power lost altogether is 3 dB; all of it is infinite; a part without power does not count."""
    assert mean(0.0, math.inf) == pytest.approx(10 * math.log10(2), rel=1e-15)
    assert mean(math.inf, math.inf) == math.inf
    assert mean(1e5, math.inf) == pytest.approx(1e5 + 10 * math.log10(2), rel=1e-15)
    assert mean(math.inf, 7.0, 0.0) == pytest.approx(7.0, rel=1e-15)


def test_a_gain_against_the_bare_half_spaces_is_a_negative_loss() -> None:
    """A coating that lets more through than nothing has a negative loss, and so has the mean."""
    assert mean(-0.5, -0.5) == pytest.approx(-0.5, rel=1e-14)
    assert mean(-30.0, -10.0) == pytest.approx(-10 * math.log10(505), rel=1e-14)
