"""Random stacks against the 50-digit reference: ten digits of R, T, A and of shielding, whatever the stack."""

import numpy as np
import pytest
from hypothesis import given, settings

from tests.exact import exact
from tests.properties.batch import random_case
from tests.properties.judging import lossless, misses, report
from tests.strategies import Case, any_back, cases, dense_fronts


def hold_batch(seed: int, count: int, *, lossless_only: bool = False, most: int = 40) -> None:
    """Assert that `count` random cases of `seed` agree with the reference; tell every one that does not."""
    rng = np.random.default_rng(seed)
    drawn = (random_case(rng, lossless=lossless_only, most=most) for _ in range(count))
    wrong = [(case, found) for case in drawn if (found := misses(case))]
    told = "\n\n".join(report(case, found) for case, found in wrong[:5])
    assert not wrong, f"{len(wrong)} of {count} cases disagree\n{told}"


@pytest.mark.parametrize("seed", range(6))
def test_random_stacks_agree_to_ten_digits(seed: int) -> None:
    """R, T, A and shielding of up to 40 random elements are right to 1e-10."""
    hold_batch(seed, 40)


@pytest.mark.parametrize("seed", range(100, 103))
def test_random_lossless_stacks_agree_and_absorb_exactly_nothing(seed: int) -> None:
    """Without loss anywhere R and T are right to 1e-10 and A is exactly 0."""
    hold_batch(seed, 40, lossless_only=True, most=12)


@pytest.mark.parametrize("seed", range(200, 202))
def test_random_single_elements_agree_to_ten_digits(seed: int) -> None:
    """One or two elements alone, where nothing hides a slip behind an opaque layer, are right to 1e-10."""
    hold_batch(seed, 100, most=2)


@pytest.mark.slow
@pytest.mark.parametrize("seed", range(1000, 1020))
def test_thousands_of_random_stacks_agree(seed: int) -> None:
    """The same over thousands of stacks, lossy, lossless and short."""
    hold_batch(seed, 150)
    hold_batch(seed + 1000, 100, lossless_only=True, most=20)
    hold_batch(seed + 2000, 150, most=3)


@settings(max_examples=120)
@given(cases(fronts=dense_fronts(), backs=any_back(), most=8, least=0, highest_deg=89.999))
def test_drawn_stacks_agree_to_ten_digits(case: Case) -> None:
    """Hypothesis, which seeks out corners, finds no stack further than 1e-10 from the reference."""
    found = misses(case)
    assert not found, report(case, found)


@settings(max_examples=60)
@given(cases(fronts=dense_fronts(), backs=any_back(), most=5, highest_deg=89.0))
def test_absorption_of_every_element_agrees(case: Case) -> None:
    """Each element's share of the absorbed power is right to 1e-10 of the incident power and of its own value."""
    response = case.solve()
    for p, truth in enumerate(exact(case.stack, case.frequency, case.angle)):
        got = response.element_absorptance[0, 0, p]
        right = np.array([float(part) for part in truth.element_absorptance])
        assert got.shape == right.shape
        if lossless(case):
            assert np.all(got == 0)
        np.testing.assert_allclose(got, right, rtol=1e-9, atol=1e-16)
