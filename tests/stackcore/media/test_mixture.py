"""Mixtures as media: components, ranges, and what is no mixture."""

import dataclasses

import numpy as np
import pytest

from stackcore.errors import InputError
from stackcore.media.base import FrequencyRange
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.ice import IceMedium
from stackcore.media.mixing_rules import RULES
from stackcore.media.mixture import Inclusion, MixtureMedium, common_range
from stackcore.media.temperature import celsius
from stackcore.media.water import LiebeWaterMedium

POLYMER = ConstantMedium(2.6 - 0.01j, valid_range=FrequencyRange(1e9, 40e9))


def test_the_host_takes_what_is_left() -> None:
    """The fractions start with what the inclusions leave, and never with less than nothing."""
    mixture = MixtureMedium(VACUUM, (Inclusion(POLYMER, 0.3), Inclusion(POLYMER, 0.6)))
    assert mixture.fractions == pytest.approx((0.1, 0.3, 0.6), abs=1e-15)
    assert MixtureMedium(VACUUM, (Inclusion(POLYMER, 0.7), Inclusion(POLYMER, 0.3))).fractions[0] == 0.0


def test_the_range_is_where_all_hold() -> None:
    """The range is the intersection of those of the components; without any it is not known."""
    water = LiebeWaterMedium(celsius(20), valid_range=FrequencyRange(5e9, 1e12))
    assert MixtureMedium(POLYMER, (Inclusion(water, 0.01),)).valid_range == FrequencyRange(5e9, 40e9)
    assert MixtureMedium(VACUUM, (Inclusion(POLYMER, 0.5),)).valid_range == FrequencyRange(1e9, 40e9)
    assert MixtureMedium(VACUUM, (Inclusion(VACUUM, 0.5),)).valid_range is None
    own = FrequencyRange(9e9, 10e9)
    assert MixtureMedium(POLYMER, (Inclusion(water, 0.01),), valid_range=own).valid_range == own


def test_ranges_without_a_common_frequency() -> None:
    """Components that never hold together leave a range that holds no frequency at all."""
    other = ConstantMedium(4.0, valid_range=FrequencyRange(60e9, 90e9))
    known = common_range((POLYMER, other))
    assert known is not None
    assert known.lowest > known.highest
    assert not known.contains(np.geomspace(1e8, 1e12, 99)).any()


@pytest.mark.parametrize("rule", RULES)
def test_dispersion_comes_from_the_components(rule: str) -> None:
    """A mixture depends on frequency only when a component does, and answers the same everywhere otherwise."""
    steady = MixtureMedium(VACUUM, (Inclusion(POLYMER, 0.4),), rule)
    assert not steady.dispersive
    values = steady.evaluate(np.array([1e6, 1e14]))
    assert values.permittivity[0] == values.permittivity[1]
    assert not values.permittivity_slope.any()
    assert MixtureMedium(VACUUM, (Inclusion(ConductorMedium(1.0), 0.4),), rule).dispersive


def test_a_rule_mixes_permeability_too() -> None:
    """μ is mixed by the same rule as ε, and stays 1 exactly where no component is magnetic."""
    magnetic = ConstantMedium(4.0, 9.0)
    mixture = MixtureMedium(VACUUM, (Inclusion(magnetic, 0.25),), "looyenga")
    values = mixture.evaluate(np.array(1e9))
    assert complex(values.permeability) == pytest.approx((0.75 + 0.25 * 9 ** (1 / 3)) ** 3, rel=1e-14)
    plain = MixtureMedium(VACUUM, (Inclusion(POLYMER, 0.25),), "looyenga").evaluate(np.array(1e9))
    assert plain.permeability == 1


def test_wet_snow() -> None:
    """Snow of 30 % ice and 2 % water at 10 GHz loses more than ten times as much as the same snow dry."""
    ice, water = IceMedium(celsius(0)), LiebeWaterMedium(celsius(0))
    dry = MixtureMedium(VACUUM, (Inclusion(ice, 0.32),), "bruggeman").evaluate(np.array(1e10)).permittivity
    wet = MixtureMedium(VACUUM, (Inclusion(ice, 0.30), Inclusion(water, 0.02)), "bruggeman")
    assert -wet.evaluate(np.array(1e10)).permittivity.imag > -10 * dry.imag
    assert dry.real == pytest.approx(1.55, abs=0.05)


def test_with_another_fraction() -> None:
    """`with_fraction` changes one share and leaves all else."""
    mixture = MixtureMedium(VACUUM, (Inclusion(POLYMER, 0.3), Inclusion(POLYMER, 0.6)), "series")
    changed = mixture.with_fraction(1, 0.5)
    assert changed.inclusions == (Inclusion(POLYMER, 0.3), Inclusion(POLYMER, 0.5))
    assert dataclasses.replace(changed, inclusions=mixture.inclusions) == mixture


def test_names_of_the_slopes() -> None:
    """Slopes are named by the path to each constant: the host's, the fractions', the inclusions'."""
    mixture = MixtureMedium(POLYMER, (Inclusion(ConductorMedium(1.0), 0.1),))
    names = set(mixture.constant_slopes(np.array(1e9)))
    assert {
        "host.permittivity",
        "host.permittivity_loss",
        "inclusions[0].fraction",
        "inclusions[0].medium.conductivity",
    } <= names


def test_slope_with_permeability_where_nothing_is_magnetic() -> None:
    """With μ = 1 throughout, a first trace in a component counts with its share of the volume, to every rule."""
    for rule in RULES:
        mixture = MixtureMedium(POLYMER, (Inclusion(VACUUM, 0.3),), rule)
        slope = mixture.constant_slopes(np.array(1e9))["inclusions[0].medium.permeability"].permeability
        trace = MixtureMedium(POLYMER, (Inclusion(ConstantMedium(1.0, 1 + 1e-6), 0.3),), rule)
        change = (trace.evaluate(np.array(1e9)).permeability - 1) / 1e-6
        assert complex(slope) == pytest.approx(0.3)
        assert complex(change) == pytest.approx(0.3, rel=1e-5)


@pytest.mark.parametrize(
    ("inclusions", "rule", "told"),
    [
        ((), "series", "without inclusions"),
        ((Inclusion(VACUUM, 1.2),), "series", r"inclusions\[0\].fraction: 1.2 is no share"),
        ((Inclusion(VACUUM, -0.1),), "series", "-0.1 is no share"),
        ((Inclusion(VACUUM, float("nan")),), "series", "nan is no share"),
        ((Inclusion(VACUUM, 0.6), Inclusion(VACUUM, 0.6)), "series", "add up to 1.2"),
        ((Inclusion(VACUUM, 0.6),), "brugeman", "did you mean 'bruggeman'"),
    ],
)
def test_what_is_no_mixture_is_refused(inclusions: tuple[Inclusion, ...], rule: str, told: str) -> None:
    """Each fault of a mixture is told with its place."""
    with pytest.raises(InputError, match=told):
        MixtureMedium(VACUUM, inclusions, rule)


def test_all_faults_are_told_together() -> None:
    """A wrong rule hides no wrong fraction."""
    with pytest.raises(InputError) as caught:
        MixtureMedium(VACUUM, (Inclusion(VACUUM, 2.0), Inclusion(VACUUM, -1.0)), "stirred")
    assert [fault.path for fault in caught.value.faults] == [
        "rule",
        "inclusions[0].fraction",
        "inclusions[1].fraction",
    ]
