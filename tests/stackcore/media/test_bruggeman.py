"""The root of Bruggeman's equation: the only one in the cone of the components, also where it is hard to find."""

from itertools import pairwise

import mpmath
import numpy as np
import pytest
from hypothesis import example, given
from hypothesis import strategies as st

from stackcore.arrays import ComplexArray
from stackcore.media.bruggeman import effective_permittivity

MP = mpmath.MPContext()
MP.dps = 50


def solved(components: list[complex], fractions: list[float]) -> complex:
    """Return the root by the program."""
    parts: list[ComplexArray] = [np.array([value], dtype=np.complex128) for value in components]
    return complex(effective_permittivity(parts, fractions)[0])


def exact(components: list[complex], fractions: list[float]) -> complex:
    """Return the root in the cone of the components to 50 digits, from all roots of the polynomial.

    The roots are the eigenvalues of its companion matrix.
    """
    count = len(components)
    polynomial = [MP.mpf(0)] * (count + 1)
    for place, share in enumerate(fractions):
        term = [MP.mpf(share) * MP.mpc(components[place]), -MP.mpf(share)]
        for other in (components[k] for k in range(count) if k != place):
            longer = [MP.mpc(0)] * (len(term) + 1)
            for power, value in enumerate(term):
                longer[power] += value * MP.mpc(other)
                longer[power + 1] += 2 * value
            term = longer
        polynomial = [known + more for known, more in zip(polynomial, term, strict=True)]
    companion = MP.zeros(count)
    for place in range(count):
        companion[place, count - 1] = -polynomial[place] / polynomial[count]
        if place:
            companion[place, place - 1] = 1
    roots = MP.eig(companion, left=False, right=False)
    angles = [-abs(float(MP.arg(MP.mpc(value)))) for value in components]
    inward = MP.expj(-(min(angles) + max(angles)) / 2)
    return complex(max(roots, key=lambda root: float(MP.re(root * inward) / abs(root))))


LOSSY = st.builds(
    lambda decades, turn: complex(10**decades * np.cos(turn), -(10**decades) * np.sin(turn)),
    st.floats(-2.0, 6.0),
    st.floats(1e-4, np.pi - 1e-4),
)


@given(st.lists(LOSSY, min_size=2, max_size=4), st.lists(st.floats(0.02, 1.0), min_size=4, max_size=4))
@example([1 - 1e-4j, -1e6 - 1j, 4 - 1e5j], [1.0, 0.5, 0.01, 1.0])
@example([1e6 - 1e5j, 2 - 1e-3j, 80 - 30j], [0.333, 0.333, 0.334, 1.0])
def test_the_root_in_the_cone(components: list[complex], weights: list[float]) -> None:
    """Two to four components with eight decades between them: the root is the exact one in their cone."""
    shares = np.array(weights[: len(components)]) / sum(weights[: len(components)])
    found, expected = solved(components, shares.tolist()), exact(components, shares.tolist())
    assert abs(found / expected - 1) < 1e-7
    assert found.imag < 0


def test_percolation_of_a_metal() -> None:
    """A metal in plastic conducts through from a third of its volume: below ε″ is less than 1, above it is huge."""
    loss = [-solved([3.0, 1 - 1e8j], [1 - share, share]).imag for share in (0.30, 0.33, 1 / 3, 0.337, 0.40)]
    assert all(after > before for before, after in pairwise(loss))
    assert loss[1] < 1
    # Past it, ε/εᵢ = (3f − 1)/2 for an ideal contrast.
    assert loss[4] == pytest.approx(0.5 * (3 * 0.40 - 1) * 1e8, rel=1e-4)
    # At a third of the volume exactly, ε² = ε₁ε₂/2 + ε ε₁/2.
    assert loss[2] == pytest.approx(abs(np.sqrt(3 * (1 - 1e8j) / 2).imag), rel=1e-3)


@pytest.mark.parametrize("pair", [(-100.0, 1.0), (1.0, -100.0), (-3.0, 2.0), (2.0, -3.0), (-0.5, 4.0)])
@pytest.mark.parametrize("share", [0.0, 0.1, 0.3, 0.45, 0.6, 0.9, 1.0])
@pytest.mark.parametrize("count", [2, 3])
def test_lossless_media_of_opposite_sign(pair: tuple[float, float], share: float, count: int) -> None:
    """Without loss the mixture is the limit of ever smaller loss, at every fraction."""
    expected = exact([complex(value, -1e-7) for value in pair], [share, 1 - share])
    others = [(1 - share) / (count - 1)] * (count - 1)
    found = solved([complex(pair[0]), *([complex(pair[1])] * (count - 1))], [share, *others])
    assert found == pytest.approx(expected, rel=1e-3, abs=1e-4)


def test_shapes_and_many_at_once() -> None:
    """Any shape is taken, and each frequency is solved as if it were alone."""
    rng = np.random.default_rng(7)
    turns = rng.uniform(0.001, 3.14, (3, 4, 5))
    parts: list[ComplexArray] = [*(10 ** rng.uniform(-1, 5, (3, 4, 5)) * np.exp(-1j * turns))]
    found = effective_permittivity(parts, [0.2, 0.5, 0.3])
    assert found.shape == (4, 5)
    for place in np.ndindex(4, 5):
        alone = solved([complex(part[place]) for part in parts], [0.2, 0.5, 0.3])
        assert found[place] == pytest.approx(alone, rel=1e-9)


def test_one_component() -> None:
    """One component alone is the mixture."""
    assert solved([3 - 1j], [1.0]) == 3 - 1j
