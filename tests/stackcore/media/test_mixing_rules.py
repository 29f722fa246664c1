"""Mixing rules against tabulated values and against the bounds they must keep."""

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.media.mixing_rules import RULES, hashin_shtrikman_bounds, wiener_bounds

# εᵢ, εₕ, f, Wiener low, Hashin-Shtrikman low, Lichtenecker, Bruggeman, Looyenga, Hashin-Shtrikman high, Wiener
# high: A. H. Sihvola, Electromagnetic Mixing Formulas and Applications (1999), formulas recalled, values
# re-derived.
ROWS = [
    (10, 1, 0.3, 1.36986, 1.87097, 1.99526, 2.26121, 2.44037, 3.07692, 3.70000),
    (3.78, 1, 0.5, 1.58159, 1.94989, 1.94422, 2.09650, 2.09162, 2.19582, 2.39000),
    (4, 1, 0.05, 1.03896, 1.07692, 1.07177, 1.07884, 1.09072, 1.11392, 1.15000),
    (80, 2, 0.2, 2.48447, 3.36842, 4.18256, 4.24513, 6.53617, 13.26203, 17.60000),
]

ISOTROPIC = ("maxwell-garnett", "bruggeman", "looyenga")
"""Rules of isotropic mixtures, which must keep the bounds of Hashin and Shtrikman."""


def mixed(rule: str, permittivities: list[complex], fractions: list[float]) -> complex:
    """Return ε of a mixture, the host first."""
    parts: list[ComplexArray] = [np.array([value], dtype=np.complex128) for value in permittivities]
    return complex(RULES[rule](parts, fractions).value[0])


def bounds(values: list[float], fractions: list[float]) -> tuple[float, float, float, float]:
    """Return Wiener low, Hashin-Shtrikman low, Hashin-Shtrikman high, Wiener high."""
    parts: list[FloatArray] = [np.array(value) for value in values]
    (low, high), (inner_low, inner_high) = (
        wiener_bounds(parts, fractions),
        hashin_shtrikman_bounds(parts, fractions),
    )
    return float(low), float(inner_low), float(inner_high), float(high)


@pytest.mark.parametrize("row", ROWS, ids=[f"{row[0]} in {row[1]}" for row in ROWS])
def test_table_of_rules(row: tuple[float, ...]) -> None:
    """Every rule and every bound has its tabulated value to all five digits."""
    inclusion, host, fraction, *expected = row
    values, shares = [host, inclusion], [1 - fraction, fraction]
    low, inner_low, inner_high, high = bounds(values, shares)
    rules = [mixed(rule, [*values], shares).real for rule in ("lichtenecker", "bruggeman", "looyenga")]
    found = [low, inner_low, *rules, inner_high, high]
    assert [round(value, 5) for value in found] == expected
    assert mixed("maxwell-garnett", [*values], shares).real == pytest.approx(inner_low, rel=1e-12)
    assert mixed("maxwell-garnett", [*values[::-1]], shares[::-1]).real == pytest.approx(inner_high, rel=1e-12)
    assert mixed("series", [*values], shares).real == pytest.approx(low, rel=1e-12)
    assert mixed("parallel", [*values], shares).real == pytest.approx(high, rel=1e-12)


LOSSLESS = st.floats(-2.0, 4.0).map(lambda decades: 10**decades)


@st.composite
def mixtures(draw: st.DrawFn) -> tuple[list[float], list[float]]:
    """Return permittivities of two to four lossless components and fractions that add up to 1."""
    count = draw(st.integers(2, 4))
    weights = np.array([draw(st.floats(0.001, 1.0)) for _ in range(count)])
    return [draw(LOSSLESS) for _ in range(count)], (weights / weights.sum()).tolist()


@given(mixtures())
def test_every_rule_keeps_the_bounds_of_wiener(mixture: tuple[list[float], list[float]]) -> None:
    """Any mixture lies between series and parallel; those of Hashin and Shtrikman lie inside."""
    values, shares = mixture
    low, inner_low, inner_high, high = bounds(values, shares)
    slack = 1 + 1e-10
    assert low <= inner_low * slack
    assert inner_low <= inner_high * slack
    assert inner_high <= high * slack
    for rule in RULES:
        found = mixed(rule, [*values], shares)
        assert abs(found.imag) <= 1e-9 * found.real
        assert low / slack <= found.real <= high * slack, rule


@given(mixtures())
def test_isotropic_rules_keep_the_bounds_of_hashin_and_shtrikman(mixture: tuple[list[float], list[float]]) -> None:
    """Bruggeman, Looyenga, and Maxwell Garnett of two components lie between the bounds of isotropic mixtures."""
    values, shares = mixture
    _, low, high, _ = bounds(values, shares)
    for rule in ISOTROPIC:
        if rule == "maxwell-garnett" and len(values) > 2 and values[0] not in (min(values), max(values)):
            continue  # with inclusions below and above the host the bounds of all components are not its own
        found = mixed(rule, [*values], shares).real
        assert low * (1 - 1e-9) <= found <= high * (1 + 1e-9), rule


def test_lichtenecker_may_leave_the_bounds_of_isotropic_mixtures() -> None:
    """In the second and third row Lichtenecker's empirical rule lies below the lower bound, and is allowed to."""
    for inclusion, host, fraction, *_ in ROWS[1:3]:
        low, inner_low, _, _ = bounds([host, inclusion], [1 - fraction, fraction])
        found = mixed("lichtenecker", [host, inclusion], [1 - fraction, fraction]).real
        assert low < found < inner_low


PASSIVE = st.builds(
    lambda decades, turn: complex(10**decades * np.cos(turn), -(10**decades) * np.sin(turn)),
    st.floats(-2.0, 6.0),
    st.just(0.0) | st.floats(1e-6, np.pi),
)


@given(st.lists(PASSIVE, min_size=2, max_size=4), st.data())
def test_every_rule_is_passive(components: list[complex], data: st.DataObject) -> None:
    """Of passive components, lossy, lossless or metallic, no rule makes gain beyond rounding."""
    weights = np.array([data.draw(st.floats(0.0, 1.0)) for _ in components]) + 1e-9
    shares = (weights / weights.sum()).tolist()
    for rule in RULES:
        found = mixed(rule, components, shares)
        assert np.isfinite(found)
        assert found.imag <= 1e-9 * abs(found), rule


@pytest.mark.parametrize("rule", RULES)
@pytest.mark.parametrize("components", [[3 - 0.1j, 40 - 30j], [2.0, -15 - 0.3j, 7 - 7j], [1.0, 1 - 1e6j]])
def test_the_ends_are_the_components(rule: str, components: list[complex]) -> None:
    """All volume in one component gives that component, whichever; none of it in another changes nothing."""
    for place, component in enumerate(components):
        shares = [float(other == place) for other in range(len(components))]
        if rule == "maxwell-garnett" and place:
            shares = [0.0, *shares[1:]]
        assert mixed(rule, components, shares) == pytest.approx(component, rel=1e-9)


@pytest.mark.parametrize("rule", [rule for rule in RULES if rule != "maxwell-garnett"])
def test_the_order_does_not_count(rule: str) -> None:
    """To all rules but Maxwell Garnett's the host is a component like any other."""
    components, shares = [3 - 0.1j, 40 - 30j, -5 - 1j], [0.5, 0.3, 0.2]
    found = mixed(rule, components, shares)
    assert mixed(rule, components[::-1], shares[::-1]) == pytest.approx(found, rel=1e-12)


def test_two_equal_inclusions_are_one() -> None:
    """An inclusion cut into two of the same medium changes nothing, to every rule."""
    for rule in RULES:
        whole = mixed(rule, [2.2 - 0.01j, 30 - 5j], [0.6, 0.4])
        parts = mixed(rule, [2.2 - 0.01j, 30 - 5j, 30 - 5j], [0.6, 0.1, 0.3])
        assert parts == pytest.approx(whole, rel=1e-12)


@pytest.mark.parametrize("bound", [wiener_bounds, hashin_shtrikman_bounds])
def test_bounds_are_for_lossless_media(bound: object) -> None:
    """An ε that is not above 0 has no such bounds and is refused with its place."""
    assert callable(bound)
    with pytest.raises(ValueError, match=r"permittivities\[1\] must be above 0"):
        bound([np.array(1.0), np.array([2.0, -3.0])], [0.5, 0.5])


@pytest.mark.parametrize("rule", ["maxwell-garnett", "series"])
def test_a_lossless_resonance_is_finite(rule: str) -> None:
    """Where a lossless mixture resonates exactly the value is huge and finite, not a division by zero."""
    fractions = [0.5, 0.5]
    components: list[complex] = [1.0, -1.0] if rule == "series" else [1.0, -5.0]
    assert np.isfinite(mixed(rule, components, fractions))
    assert abs(mixed(rule, components, fractions)) > 1e12
