"""Directions of the wave: Snell's law, lossy media and total reflection against independent numbers."""

import math

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.panels.wall.refraction import Direction, directions
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Layer, SheetPlacement, Stack


def in_layer(
    medium: AbstractMedium, degrees: float, front: AbstractMedium = VACUUM, frequency: float = 1e10
) -> Direction:
    """Return the direction in a layer of `medium`."""
    found = directions(Stack((Layer(medium, 1e-3),), front=front), frequency, math.radians(degrees)).elements[0]
    assert found is not None
    return found


@pytest.mark.parametrize(
    ("permittivity", "degrees", "expected"),
    # From a table of sines: sin 14.4775° = 0.25, sin 28.1255° = 0.471405, sin 35.2644° = 0.577350.
    [(4.0, 30.0, 14.4775), (2.25, 45.0, 28.1255), (2.25, 60.0, 35.2644), (9.0, 0.0, 0.0), (1.0, 75.0, 75.0)],
)
def test_snell_without_loss(permittivity: float, degrees: float, expected: float) -> None:
    """In a lossless layer the wave goes where Snell's law says."""
    assert math.degrees(in_layer(ConstantMedium(permittivity), degrees).angle) == pytest.approx(expected, abs=1e-3)


def test_snell_with_permeability() -> None:
    """The index is the root of ε times μ: ε = 2 and μ = 2 refract like ε = 4."""
    assert math.degrees(in_layer(ConstantMedium(2.0, 2.0), 30.0).angle) == pytest.approx(14.4775, abs=1e-3)


@given(st.floats(1.0, 8.0), st.floats(0.01, 8.0), st.floats(1.0, 89.0))
def test_phase_normal_in_a_lossy_medium(index: float, extinction: float, degrees: float) -> None:
    """The angle in a lossy medium follows from the real closed form for n − jκ (Born and Wolf, section 14.2)."""
    sine = math.sin(math.radians(degrees))
    base = index**2 - extinction**2
    normal = math.sqrt((base - sine**2 + math.hypot(base - sine**2, 2 * index * extinction)) / 2)
    found = in_layer(ConstantMedium((index - 1j * extinction) ** 2), degrees)
    assert found.angle == pytest.approx(math.atan(sine / normal), rel=1e-9)


def test_in_copper_the_wave_goes_straight_in() -> None:
    """At 1 GHz the index of copper is some 2e4: whatever the incidence, the wave goes along the normal."""
    found = in_layer(ConductorMedium(5.8e7), 80.0, frequency=1e9)
    assert 0 < math.degrees(found.angle) < 0.005
    assert not found.decays


def test_total_reflection_behind_glass() -> None:
    """From n = 1.5 into air beyond the critical angle of 41.81° the wave only decays, and below it does not."""
    glass = ConstantMedium(2.25)
    back = directions(Stack((), front=glass), 1e10, math.radians(41.7)).back
    assert back is not None
    assert not back.decays
    assert math.degrees(back.angle) == pytest.approx(86.2, abs=0.1)
    back = directions(Stack((), front=glass), 1e10, math.radians(42.0)).back
    assert back is not None
    assert back.decays


@pytest.mark.parametrize("loss", [0.0, 0.01])
def test_a_medium_with_negative_index_bends_the_wave_back(loss: float) -> None:
    """With ε and μ both negative the phase normal lies on the other side of the normal, with and without loss."""
    medium = ConstantMedium(-4 - 1j * loss, -1 - 0.1j * loss)
    assert math.degrees(in_layer(medium, 30.0).angle) == pytest.approx(-14.48, abs=0.1)


def test_sheets_and_metal_have_no_direction() -> None:
    """A sheet has no inside and nothing goes into a perfect conductor."""
    stack = Stack((SheetPlacement(SeriesSheet(resistance=377.0)), Layer(VACUUM, 1e-3)), back=METAL)
    found = directions(stack, 1e10, math.radians(20))
    assert found.elements[0] is None
    assert found.back is None
    assert found.front.angle == pytest.approx(math.radians(20))
