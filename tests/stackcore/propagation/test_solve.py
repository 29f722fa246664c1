"""What the solver accepts, the shape of what it gives, and that blocks leave no trace."""

from collections.abc import Mapping

import numpy as np
import pytest

from stackcore import (
    METAL,
    QUANTITIES,
    ConductorMedium,
    ConstantMedium,
    Layer,
    SeriesSheet,
    SheetPlacement,
    Stack,
    StackError,
    solve,
)
from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium, ConstantSlope, Constitutive, FrequencyRange, Provenance
from stackcore.propagation import blocks

GLASS = ConstantMedium(6.31 - 0.14j)
WALL = Stack(
    (
        Layer(GLASS, 4e-3),
        SheetPlacement(SeriesSheet(resistance=4.0, inductance=1e-11)),
        Layer(ConductorMedium(6e6, 200.0), 1e-7),
        Layer(ConstantMedium(1.05 + 0j), 16e-3),
    ),
    back=ConstantMedium(2.25 - 0.01j),
    name="A",
)


def test_axes_are_frequency_angle_polarization() -> None:
    """Every quantity has the shape (F, A, 2), for scalars and lists alike."""
    lists = solve(WALL, [1e9, 2e9, 3e9], [0.0, 0.5])
    scalars = solve(WALL, 1e9, 0.5)

    for quantity in QUANTITIES.values():
        assert quantity.values(lists).shape == (3, 2, 2)
        assert quantity.values(scalars).shape == (1, 1, 2)
        assert quantity.values(lists)[0, 1] == pytest.approx(quantity.values(scalars)[0, 0], rel=1e-12)
    assert lists.element_absorptance.shape == (3, 2, 2, 4)


def test_no_frequency_gives_no_answer() -> None:
    """An empty list of frequencies is an empty answer, not a fault."""
    assert solve(WALL, [], [0.0]).transmittance.shape == (0, 1, 2)


@pytest.mark.parametrize(
    ("frequency", "angle", "words"),
    [
        (0.0, 0.0, "frequency 0.0 Hz must be more than 0"),
        (-1e9, 0.0, "frequency -1000000000.0 Hz"),
        (np.nan, 0.0, "frequency nan"),
        (np.inf, 0.0, "frequency inf"),
        ([[1e9]], 0.0, "frequency has 2 axes"),
        (1e9, -0.1, "angle -0.1 rad"),
        (1e9, np.pi / 2, "less than π/2"),
        (1e9, np.nan, "angle nan"),
        (1e9, [[0.0]], "angle has 2 axes"),
    ],
)
def test_refuses_what_is_no_sweep(frequency: float, angle: float, words: str) -> None:
    """A frequency or an angle out of range is refused with the value and what is allowed."""
    with pytest.raises(StackError, match=words):
        solve(WALL, frequency, angle)


@pytest.mark.parametrize("front", [ConstantMedium(2.0 - 0.1j), ConstantMedium(-2.0 + 0j), ConductorMedium(1.0)])
def test_refuses_a_front_without_an_incident_wave(front: AbstractMedium) -> None:
    """A front half-space that absorbs, or in which no wave runs, is refused."""
    with pytest.raises(StackError, match="front half-space must"):
        solve(Stack((Layer(GLASS, 1e-3),), front=front), 1e9, 0.0)


@pytest.mark.parametrize("thickness", [-1e-9, np.nan, np.inf])
def test_refuses_a_thickness_that_is_none(thickness: float) -> None:
    """A negative or infinite thickness is refused when the layer is made."""
    with pytest.raises(StackError, match="must be 0 or more"):
        Layer(GLASS, thickness)


def test_blocks_leave_no_trace(monkeypatch: pytest.MonkeyPatch) -> None:
    """The answer is the same to rounding whether a sweep is cut into many blocks, one, or single points."""
    frequency = np.geomspace(1e6, 60e9, 97)
    angle = np.radians(np.linspace(0, 89, 23))
    whole = {name: q.values(solve(WALL, frequency, angle)) for name, q in QUANTITIES.items()}
    for points in (1, 7, 200):
        monkeypatch.setattr(blocks, "_POINTS", points)
        for name, quantity in QUANTITIES.items():
            cut = quantity.values(solve(WALL, frequency, angle))
            # Parts of complex numbers and differences of phases pass through 0 while the whole does not.
            floor = 1e-24 if quantity.exported else 1e-12
            assert cut == pytest.approx(whole[name], rel=1e-12, abs=floor), name


def test_no_order_of_frequencies_is_needed() -> None:
    """Unsorted and repeated frequencies each get their own answer."""
    frequency = np.array([3e9, 1e9, 3e9])
    response = solve(WALL, frequency, [0.3])

    assert (response.transmittance[0] == response.transmittance[2]).all()
    assert response.transmittance[1] == pytest.approx(solve(WALL, 1e9, 0.3).transmittance[0], rel=1e-13)


def test_a_metal_back_lets_nothing_through() -> None:
    """Behind a perfect conductor T is 0, both losses are infinite, and no column of the CSV is NaN."""
    response = solve(Stack(WALL.elements, back=METAL), [1e9, 10e9], [0.0, 1.0])

    assert (response.transmittance == 0).all()
    assert np.isposinf(response.insertion_loss_dB).all()
    assert np.isposinf(response.shielding_effectiveness_dB).all()
    for quantity in QUANTITIES.values():
        assert not quantity.exported or not np.isnan(quantity.values(response)).any()
    assert response.reflectance + response.absorptance == pytest.approx(np.ones((2, 2, 2)), abs=1e-14)


class _FrontOfGas(AbstractMedium):
    """A lossless front whose index rises with frequency."""

    @property
    def dispersive(self) -> bool:
        return True

    @property
    def valid_range(self) -> FrequencyRange | None:
        return None

    @property
    def provenance(self) -> Provenance:
        return Provenance()

    def evaluate(self, frequency: FloatArray) -> Constitutive:
        one = np.ones(np.shape(frequency), dtype=np.complex128)
        return Constitutive(1 + 0.1 * one * frequency / 1e10, one, 0.1e-10 * one, 0 * one)

    def constant_slopes(self, frequency: FloatArray) -> Mapping[str, ConstantSlope]:
        return {}  # its two numbers are not constants of a job


def test_a_front_may_depend_on_frequency(monkeypatch: pytest.MonkeyPatch) -> None:
    """A dispersive lossless front gives at each frequency what a constant one of that index gives."""
    monkeypatch.setattr(blocks, "_POINTS", 2)
    frequency = np.array([2e9, 5e9, 11e9])
    response = solve(Stack(WALL.elements, front=_FrontOfGas(), back=WALL.back), frequency, [0.2, 0.9])

    for index, f in enumerate(frequency):
        fixed = solve(Stack(WALL.elements, front=ConstantMedium(1 + 0.1 * f / 1e10), back=WALL.back), f, [0.2, 0.9])
        assert response.reflection[index] == pytest.approx(fixed.reflection[0], rel=1e-12)
        assert response.insertion_loss_dB[index] == pytest.approx(fixed.insertion_loss_dB[0], rel=1e-11)
        assert response.insertion_phase_delay_deg[index] == pytest.approx(
            fixed.insertion_phase_delay_deg[0], rel=1e-10
        )


def test_nothing_passes_beyond_the_critical_angle() -> None:
    """Behind total reflection T is 0, and not minus 0, which a table would print."""
    response = solve(Stack((), front=ConstantMedium(4.0 + 0j)), 10e9, [0.6, 1.2])

    assert (response.transmittance == 0).all()
    assert not np.signbit(response.transmittance).any()
