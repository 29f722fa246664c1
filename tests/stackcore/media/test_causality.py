"""Kramers-Kronig: the causal models have the real part that must follow from their loss; sum rules.

Sources of the rules: L. D. Landau, E. M. Lifshitz, Electrodynamics of Continuous Media, section 82; M. Altarelli,
D. L. Dexter, H. M. Nussenzveig, D. Y. Smith, Phys. Rev. B 6, 4502 (1972), recalled and re-derived. Quadrature by
scipy.integrate to 1e-11; asked for is 1e-8 of the value.
"""

import numpy as np
import pytest
from scipy.integrate import quad

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.lorentz import LorentzMedium
from stackcore.media.multi_lorentz import MultiLorentzMedium
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.resonance import LorentzTerm
from stackcore.media.sellmeier import SellmeierMedium, SellmeierTerm
from tests.stackcore.media.dispersion import index_of, kramers_kronig, loss_of
from tests.stackcore.media.samples import CAUSAL

BREAKS = (1e5, 1.6e8, 1.8e9, 2e9, 2.2e9, 1.6e10, 3e10, 1e12)
NEVER, ALWAYS = 1e-20, 1e40
"""Hz, far below and far above all that happens."""


def _value(medium: AbstractMedium, quantity: str, frequency: float) -> complex:
    return complex(getattr(medium.evaluate(np.array(frequency)), quantity))


def _static_loss(medium: AbstractMedium, quantity: str) -> float:
    """Return f ε″ at the lowest frequencies, σ/(2πε₀) in Hz: a pole that Kramers-Kronig must leave out."""
    loss = -NEVER * _value(medium, quantity, NEVER).imag
    return loss if loss > 1.0 else 0.0


@pytest.mark.parametrize("name", CAUSAL)
@pytest.mark.parametrize("quantity", ["permittivity", "permeability"])
@pytest.mark.parametrize("frequency", [3e7, 1.9e9, 2.4e10])
def test_real_part_follows_from_the_loss(name: str, quantity: str, frequency: float) -> None:
    """ε′ − ε∞ is the Kramers-Kronig integral of ε″ without the part σ/(ωε₀) of a static conductivity; so is μ′."""
    medium = CAUSAL[name]
    found = kramers_kronig(loss_of(medium, quantity, _static_loss(medium, quantity)), frequency, BREAKS)
    expected = _value(medium, quantity, frequency).real - _value(medium, quantity, ALWAYS).real
    assert found == pytest.approx(expected, rel=1e-8, abs=1e-8)


def test_a_power_law_is_not_causal() -> None:
    """The loss f^(d − 1) of P.2040 asks for a part ε″ cot((1 − d)π/2) in ε′, which the model does not have."""
    concrete = PowerLawMedium(5.24, 0.0, 0.0462, 0.7822)
    loss = -_value(concrete, "permittivity", 1e9).imag
    found = kramers_kronig(loss_of(concrete, "permittivity"), 1e9)
    assert found == pytest.approx(loss / np.tan((1 - 0.7822) * np.pi / 2), rel=1e-8)
    assert found > 2


def test_lorentz_example() -> None:
    """ε′ − 1 of strength 0.4, ω₀ = 0.7, γ = 0.1: 1.5973378 at 0.5 both ways, 0.8163265 at 0 (second method)."""
    medium = LorentzMedium(1.0, 0.4 / 0.49, 0.7e9, 0.1e9)
    assert round(_value(medium, "permittivity", 0.5e9).real - 1, 7) == 1.5973378
    through_loss = kramers_kronig(loss_of(medium, "permittivity"), 0.5e9, [0.6e9, 0.7e9, 0.8e9])
    assert round(through_loss, 7) == 1.5973378
    static = quad(lambda u: loss_of(medium, "permittivity")(float(np.exp(u))), 0, 60, points=[20.3], limit=200)[0]
    assert round(2 / np.pi * static, 7) == 0.8163265


METAL = DrudeLorentzMedium(
    1.0, np.sqrt(0.6) / (2 * np.pi), 0.1, (LorentzTerm(0.4 / 0.49, 0.7 / (2 * np.pi), 0.1 / (2 * np.pi)),)
)
"""Free carriers of 0.6 and an oscillator of 0.4, together ω_p² = 1, in units of 1 rad/s; both damped by 0.1/s."""


def _over_frequency(function: str) -> float:
    """Return the integral over ω from 0 to ∞ of ωε″, ωk, n − 1 or ε′ − 1 of `METAL`.

    Above ω = 1000 all four fall as 1/ω², with corrections of 1e-6; that tail is added in closed form.
    """

    def integrand(u: float) -> float:
        omega = float(np.exp(u))
        f = np.array(omega / (2 * np.pi))
        permittivity, index = complex(METAL.evaluate(f).permittivity), complex(index_of(METAL, f))
        value = {
            "loss": -omega * permittivity.imag,
            "extinction": -omega * index.imag,
            "index": index.real - 1,
            "permittivity": permittivity.real - 1,
        }[function]
        return value * omega

    corners = [-2.5, -0.7, -0.36, 0.0, 0.3]
    below, above = (float(np.log(x)) for x in (1e-24, 1e3))
    tail = {"loss": 0.1, "extinction": 0.05, "index": -0.5, "permittivity": -1.0}[function] / 1e3
    return float(quad(integrand, below, above, points=corners, limit=500, epsabs=1e-9, epsrel=1e-9)[0]) + tail


@pytest.mark.parametrize(
    ("function", "expected"),
    [
        ("loss", "1.5707963"),  # π ω_p²/2
        ("extinction", "0.7853982"),  # π ω_p²/4
        ("index", "0.0000000"),
        ("permittivity", "-9.4247780"),  # −π σ/(2ε₀), σ/ε₀ = 0.6/0.1
    ],
)
def test_sum_rules(function: str, expected: str) -> None:
    """The sum rules of a metal hold to the digits of a second method, which are the closed forms beside them."""
    assert _over_frequency(function) == pytest.approx(float(expected), abs=1e-7)


def test_sellmeier_is_a_sum_of_narrow_resonances() -> None:
    """Between its poles the Sellmeier formula is the causal Lorentz sum whose lines have no width."""
    poles = ((2.8, 0.12e-6), (0.9, 9e-6))
    crystal = SellmeierMedium(tuple(SellmeierTerm(b, pole) for b, pole in poles), 1.1)
    lines = MultiLorentzMedium(1.1, tuple(LorentzTerm(b, SPEED_OF_LIGHT / pole, 1.0) for b, pole in poles))
    frequency = SPEED_OF_LIGHT / np.array([0.2e-6, 0.5e-6, 2e-6, 8e-6, 20e-6, 1.0])
    narrow, exact = lines.evaluate(frequency), crystal.evaluate(frequency)
    assert narrow.permittivity.real == pytest.approx(exact.permittivity.real, rel=1e-12, abs=0)
    assert narrow.permittivity_slope.real == pytest.approx(exact.permittivity_slope.real, rel=1e-10, abs=0)
