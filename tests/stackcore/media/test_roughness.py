"""Rough conductors against the published rules, and slow carriers against Drude's formula."""

import numpy as np
import pytest

from stackcore.constants import FREE_SPACE_IMPEDANCE
from stackcore.media.conductor import ConductorMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.roughness import ROUGHNESS_RULES, roughness_factor
from tests.reference.published import REDERIVED, assert_printed

COPPER = 5.8e7
RATIOS = (0.25, 0.5, 1.0, 2.0, 4.0)
RULES = {  # K at rms roughness over skin depth of RATIOS
    "hammerstad-jensen": "1.05556 1.21433 1.60514 1.88750 1.97160",
    "groiss": "1.04825 1.36788 1.71901 1.89689 1.96474",
}
SOURCES = {
    "hammerstad-jensen": f"Hammerstad and Jensen 1980 ({REDERIVED})",
    "groiss": f"Groiss and others 1996 ({REDERIVED})",
}
ROWS = [
    (rule, ratio, printed)
    for rule, row in RULES.items()
    for ratio, printed in zip(RATIOS, row.split(), strict=True)
]


@pytest.mark.parametrize(("rule", "ratio", "printed"), ROWS)
def test_factor(rule: str, ratio: float, printed: str) -> None:
    """K has the tabulated values."""
    assert_printed(float(roughness_factor(rule, np.array(ratio**2))[0]), printed, SOURCES[rule])


@pytest.mark.parametrize(("rule", "ratio", "printed"), ROWS)
def test_surface_resistance(rule: str, ratio: float, printed: str) -> None:
    """A rough conductor has K times the surface resistance of the smooth one, and as much of the reactance."""
    frequency = np.array(1e10)
    depth = float(ConductorMedium(COPPER).skin_depth(frequency))
    rough = ConductorMedium(COPPER, roughness=ratio * depth, roughness_rule=rule)
    impedances = [
        FREE_SPACE_IMPEDANCE / np.sqrt(complex(medium.evaluate(frequency).permittivity - 1))
        for medium in (rough, ConductorMedium(COPPER))
    ]
    ratio_found = impedances[0] / impedances[1]
    assert_printed(ratio_found.real, printed, SOURCES[rule])
    assert abs(ratio_found.imag) < 1e-12


@pytest.mark.parametrize("rule", ROUGHNESS_RULES)
def test_a_smooth_surface_and_a_very_rough_one(rule: str) -> None:
    """K goes to 1 where the roughness is far below the skin depth and to 2 where it is far above."""
    factor, slope = roughness_factor(rule, np.array([1e-200, 1e-12, 1e12, 1e200]))
    assert factor == pytest.approx([1, 1, 2, 2], abs=1e-9)
    assert slope == pytest.approx([0, 0, 0, 0], abs=1e-9)


def test_an_unknown_rule_is_refused() -> None:
    """A rule that does not exist is refused with the ones that do."""
    with pytest.raises(ValueError, match="roughness_rule 'jagged' is unknown; there are hammerstad-jensen, groiss"):
        ConductorMedium(COPPER, roughness_rule="jagged")
    with pytest.raises(ValueError, match="no roughness rule 'jagged'"):
        roughness_factor("jagged", np.array(1.0))


@pytest.mark.parametrize(
    ("roughness", "time", "told"),
    [
        (-1e-6, 0.0, "roughness -1e-06 m is negative"),
        (0.0, -1e-14, "relaxation_time -1e-14 s is negative, which would be gain"),
        (float("nan"), 0.0, "roughness nan is not finite"),
    ],
)
def test_what_is_no_surface_is_refused(roughness: float, time: float, told: str) -> None:
    """Negative roughness or time and values that are not finite raise ValueError and name the constant."""
    with pytest.raises(ValueError, match=told):
        ConductorMedium(COPPER, roughness=roughness, relaxation_time=time)


def test_roughness_needs_a_skin_depth() -> None:
    """A rough surface of negative μ′ has no skin depth to be compared with."""
    with pytest.raises(ValueError, match="permeability -2 must be above 0"):
        ConductorMedium(COPPER, -2 - 0.1j, roughness=1e-6)
    assert ConductorMedium(COPPER, -2 - 0.1j).permeability == -2 - 0.1j


def test_slow_carriers_are_drude() -> None:
    """With a relaxation time the conductor is the Drude model of the same conductivity and ε∞ = 1."""
    drude = DrudeMedium(1.0, 2e15, 3e13)
    metal = ConductorMedium(drude.conductivity, relaxation_time=1 / 3e13)
    frequency = np.geomspace(1.0, 1e15, 31)
    one, other = metal.evaluate(frequency), drude.evaluate(frequency)
    assert one.permittivity.imag == pytest.approx(other.permittivity.imag, rel=1e-13, abs=0)
    assert one.permittivity.real == pytest.approx(other.permittivity.real, rel=1e-11, abs=0)
    assert one.permittivity_slope == pytest.approx(other.permittivity_slope, rel=1e-12, abs=0)


@pytest.mark.parametrize("phase", [1e-6, 0.1, 1.0, 30.0])
def test_skin_depth_with_slow_carriers(phase: float) -> None:
    """The skin depth is the reciprocal of the decay k₀ Im √(−(ε − 1)), in infrared too."""
    time = 2.5e-14
    metal = ConductorMedium(COPPER, relaxation_time=time)
    frequency = np.array(phase / (2 * np.pi * time))
    root = np.sqrt(complex(metal.evaluate(frequency).permittivity - 1))
    decay = 2 * np.pi * float(frequency) / 299792458 * abs(root.imag)
    assert float(metal.skin_depth(frequency)) == pytest.approx(1 / decay, rel=1e-10, abs=0)
