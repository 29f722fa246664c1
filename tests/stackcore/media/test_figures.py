"""What is read of a material at a frequency."""

import numpy as np
import pytest

from stackcore.constants import SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.figures import FIGURES, figures_of

AT = np.array([1e9, 1e10])


def test_a_lossy_dielectric() -> None:
    """ε″ = ε′ tan δ, σ = ωε₀ε″, (n − jk)² = εμ and the depth is c/(ωk), at every frequency."""
    found = figures_of(ConstantMedium(4.2 - 0.063j, 2 - 0.5j), AT)
    assert list(found) == list(FIGURES)
    assert found["loss_tangent"] == pytest.approx([0.015, 0.015])
    assert found["conductivity_S_per_m"] == pytest.approx(2 * np.pi * AT * VACUUM_PERMITTIVITY * 0.063)
    index = found["refractive_index"] - 1j * found["extinction"]
    assert index**2 == pytest.approx((4.2 - 0.063j) * (2 - 0.5j) * np.ones(2))
    assert found["skin_depth_m"] == pytest.approx(SPEED_OF_LIGHT / (2 * np.pi * AT * found["extinction"]))


def test_vacuum_has_no_end() -> None:
    """Without loss the depth is infinite and every loss is 0, not −0."""
    found = figures_of(VACUUM, AT)
    assert found["skin_depth_m"].tolist() == [np.inf, np.inf]
    losses = [*found["dielectric_loss"].tolist(), *found["magnetic_loss"].tolist()]
    assert {repr(value) for value in losses} == {"0.0"}


def test_copper_has_the_handbook_depth() -> None:
    """Copper of 58 MS/m has 0.66 µm at 10 GHz (handbooks of shielding)."""
    assert figures_of(ConductorMedium(5.8e7), AT)["skin_depth_m"][1] == pytest.approx(0.661e-6, rel=1e-3)


def test_both_negative_is_a_backward_wave() -> None:
    """Where ε and μ are both negative n is negative and k still 0 or more."""
    found = figures_of(ConstantMedium(-2 - 0.01j, -1 - 0.01j), AT)
    assert (found["refractive_index"] < 0).all()
    assert (found["extinction"] > 0).all()


def test_a_negative_permittivity_has_no_loss_tangent() -> None:
    """Where ε′ is not above 0 the loss tangent is nothing, and a lossless metal is all extinction."""
    found = figures_of(ConstantMedium(-4 + 0j), AT)
    assert np.isnan(found["loss_tangent"]).all()
    assert found["extinction"] == pytest.approx([2, 2])
