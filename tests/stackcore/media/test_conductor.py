"""Good conductors against published skin depths and loss."""

import numpy as np
import pytest

from stackcore.constants import VACUUM_PERMITTIVITY
from stackcore.media.conductor import ConductorMedium

COPPER = 5.8e7
"""S/m."""

# Frequency in Hz, skin depth of copper in m to two digits.
# J. Chen, University of Houston, table of skin depths (2019), conductivity 5.8e7 S/m.
COPPER_DEPTHS = [
    (1.0, 6.6e-2),
    (10.0, 2.1e-2),
    (100.0, 6.6e-3),
    (1e3, 2.1e-3),
    (1e4, 0.66e-3),
    (1e5, 0.21e-3),
    (1e6, 66e-6),
    (1e7, 21e-6),
    (1e8, 6.6e-6),
    (1e9, 2.1e-6),
    (1e10, 0.66e-6),
    (1e11, 0.21e-6),
    (60.0, 8.5e-3),  # public encyclopaedia article on the skin effect, "about 8.5 mm"
]

# Conductivity in S/m, skin depth in m at 10 GHz.
# D. M. Pozar, Microwave Engineering, chapter 1, worked example, with the conductivities of its appendix; recalled,
# and re-derived to 0.2 %.
DEPTHS_10_GHZ = [(3.816e7, 8.14e-7), (5.813e7, 6.60e-7), (4.098e7, 7.86e-7), (6.173e7, 6.40e-7)]

# Resistivity in Ω·m, frequency in Hz, skin depth in mm. Public table (2018) with resistivities after R. A. Matula,
# J. Phys. Chem. Ref. Data 8 (1979), for copper at 300 K and 600 K, and after Simmons (1960) for aluminium.
LOW_FREQUENCY_DEPTHS = [
    (resistivity, frequency, depth)
    for resistivity, depths in [
        (1.7e-8, [66, 8.5, 3.3, 2.1, 0.93, 0.46, 0.15]),
        (2.8e-8, [84, 11, 4.2, 2.7, 1.2, 0.60, 0.19]),
        (3.8e-8, [98, 13, 4.9, 3.1, 1.4, 0.69, 0.22]),
        (5.9e-8, [122, 16, 6.1, 3.9, 1.7, 0.86, 0.27]),
    ]
    for frequency, depth in zip([1, 60, 400, 1e3, 5e3, 20e3, 200e3], depths, strict=True)
]


@pytest.mark.parametrize(("frequency", "depth"), COPPER_DEPTHS)
def test_skin_depth_of_copper(frequency: float, depth: float) -> None:
    """Copper has the published skin depth to the two digits it is printed with."""
    assert ConductorMedium(COPPER).skin_depth(np.array(frequency)) == pytest.approx(depth, rel=0.01)


@pytest.mark.parametrize(("conductivity", "depth"), DEPTHS_10_GHZ)
def test_skin_depths_at_10_ghz(conductivity: float, depth: float) -> None:
    """Aluminium, copper, gold and silver have the skin depths of the textbook example."""
    assert ConductorMedium(conductivity).skin_depth(np.array(1e10)) == pytest.approx(depth, rel=2e-3)


@pytest.mark.parametrize(("resistivity", "frequency", "depth"), LOW_FREQUENCY_DEPTHS)
def test_skin_depths_at_low_frequency(resistivity: float, frequency: float, depth: float) -> None:
    """Copper and aluminium, cold and hot, have the tabulated skin depths; half a unit of the last digit is 3 %."""
    found = ConductorMedium(1 / resistivity).skin_depth(np.array(frequency))
    assert found == pytest.approx(depth * 1e-3, rel=0.03)


# Share of 5.82e7 S/m, the book's copper; skin depth in inches at 60 Hz.
# H. W. Ott, Electromagnetic Compatibility Engineering (2009), chapter 6, recalled.
INCH_DEPTHS = [(1.0, 0.335), (0.61, 0.429)]


@pytest.mark.parametrize(("share", "depth"), INCH_DEPTHS)
def test_skin_depths_in_inches(share: float, depth: float) -> None:
    """Copper and aluminium at 60 Hz have the skin depths of the shielding handbook, in inches."""
    assert ConductorMedium(share * 5.82e7).skin_depth(np.array(60.0)) / 0.0254 == pytest.approx(depth, rel=2e-3)


def test_permeability_thins_the_skin() -> None:
    """A permeability of 400 makes the skin 20 times thinner."""
    plain = ConductorMedium(6e6).skin_depth(np.array(1e4))
    assert ConductorMedium(6e6, 400).skin_depth(np.array(1e4)) == pytest.approx(plain / 20, rel=1e-12)


def test_loss_follows_the_conductivity() -> None:
    """ε″ is 17.98 σ/f with σ in S/m and f in GHz, as ITU-R P.2040 prints it."""
    loss = -ConductorMedium(2.5).evaluate(np.array([1e9, 4e9])).permittivity.imag
    assert loss == pytest.approx([17.98 * 2.5, 17.98 * 2.5 / 4], rel=5e-4)


def test_the_slope_is_the_derivative() -> None:
    """ε = 1 − jσ/(ωε₀) falls as 1/f: the slope is −ε″ part over f, and μ has none."""
    frequency = np.array([1e3, 1e9, 1e12])
    values = ConductorMedium(COPPER, 3 - 0.1j).evaluate(frequency)
    exact = 1j * COPPER / (2 * np.pi * VACUUM_PERMITTIVITY * frequency**2)
    assert values.permittivity_slope == pytest.approx(exact, rel=1e-14)
    step = 1e-6 * frequency
    ahead = ConductorMedium(COPPER).evaluate(frequency + step).permittivity
    behind = ConductorMedium(COPPER).evaluate(frequency - step).permittivity
    assert (ahead - behind) / (2 * step) == pytest.approx(exact, rel=1e-8)
    assert not values.permeability_slope.any()
    assert values.permeability.tolist() == [3 - 0.1j] * 3


@pytest.mark.parametrize(
    ("conductivity", "permeability", "told"),
    [
        (0.0, 1, "conductivity"),
        (-1.0, 1, "conductivity"),
        (float("inf"), 1, "conductivity"),
        (float("nan"), 1, "conductivity"),
        (1e6, 0, "permeability"),
        (1e6, 200 + 1j, "permeability"),
        (1e6, float("nan"), "permeability"),
    ],
)
def test_what_is_no_conductor_is_refused(conductivity: float, permeability: complex, told: str) -> None:
    """No conductivity, gain and values that are not finite raise ValueError and name the constant."""
    with pytest.raises(ValueError, match=told):
        ConductorMedium(conductivity, permeability)
