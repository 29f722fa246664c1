"""The Kramers-Kronig relation over a finite band: exact integrals, causal and acausal media, honest tails."""

import numpy as np
import pytest
from scipy.integrate import quad

from stackcore.media.base import AbstractMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.health.kramers_kronig import _hat_responses, kramers_kronig
from tests.stackcore.media.compounds import COMPOUNDS
from tests.stackcore.media.samples import CAUSAL

NODES = np.array([0.5, 0.7, 1.0, 1.5, 4.0])
PLACES = [0.6, 1.2, 3.3, 20.0, 1e-3]


@pytest.mark.parametrize("place", PLACES)
@pytest.mark.parametrize("node", range(NODES.size))
def test_integrals_of_hats(place: float, node: int) -> None:
    """P∫ x h(x)/(x² − ω²) dx of each hat is that of adaptive quadrature, inside the hat and far from it."""
    found = _hat_responses(NODES, np.array([place]))[0, node]
    left, middle, right = np.concatenate(([0.0], NODES, [8.0]))[node : node + 3]
    expected = 0.0
    for start, stop in ((left, middle), (middle, right)):
        rising = start == left

        def hat(x: float, start: float = start, stop: float = stop, rising: bool = rising) -> float:
            return (x - start if rising else stop - x) / (stop - start)

        if start < place < stop:
            expected += quad(lambda x, h=hat: x * h(x) / (x + place), start, stop, weight="cauchy", wvar=place)[0]
        else:
            expected += quad(lambda x, h=hat: x * h(x) / (x * x - place * place), start, stop)[0]
    assert found == pytest.approx(expected, rel=1e-7, abs=1e-12)


def test_hats_add_up_to_a_line() -> None:
    """A loss of 1 between nodes has the integral ½ ln|(b² − ω²)/(a² − ω²)|, also where ω is a node."""
    nodes = np.linspace(1.0, 3.0, 41)
    for omega in (nodes[20], nodes[7], 2.03):
        inside = _hat_responses(nodes, np.array([omega]))[0]
        # The halves of the first and last hat that lie outside are taken off by quadrature.
        below = quad(lambda x, w=omega: x * x / (x * x - w * w), 0.0, 1.0)[0]
        above = quad(lambda x, w=omega: x * (6 - x) / 3 / (x * x - w * w), 3.0, 6.0)[0]
        expected = 0.5 * np.log(abs((9 - omega**2) / (1 - omega**2)))
        assert inside.sum() - below - above == pytest.approx(expected, rel=1e-8)


@pytest.mark.parametrize("name", CAUSAL)
@pytest.mark.parametrize("quantity", ["permittivity", "permeability"])
def test_causal_media_are_found_causal(name: str, quantity: str) -> None:
    """Over two decades no causal model has a misfit above three parts in a thousand."""
    frequency = np.geomspace(2e8, 2e10, 300)
    values = getattr(CAUSAL[name].evaluate(frequency), quantity)
    assert kramers_kronig(frequency, values).misfit < 3e-3


@pytest.mark.parametrize("name", ["Liebe water", "Ellison water", "sea water", "ice"])
def test_water_and_ice_are_causal(name: str) -> None:
    """Water is causal over five decades; so is ice, as far as its small loss shows."""
    frequency = np.geomspace(1e6, 1e11, 300)
    assert kramers_kronig(frequency, COMPOUNDS[name].evaluate(frequency).permittivity).misfit < 1e-3


@pytest.mark.parametrize("name", [name for name in COMPOUNDS if name.endswith(("of two", "of three"))])
def test_mixtures_of_causal_media_are_causal(name: str) -> None:
    """A rule that is analytic in its components keeps causality: liquid and soot in resin of nearly constant ε."""
    frequency = np.geomspace(1e8, 1e11, 300)
    assert kramers_kronig(frequency, COMPOUNDS[name].evaluate(frequency).permittivity).misfit < 2e-2


LIQUID = DebyeMedium(4.0, 70.0, 8e-12, 1.0)


@pytest.mark.parametrize(
    "wrong",
    [
        pytest.param(lambda e: e.real + 0j, id="loss left out"),
        pytest.param(lambda e: -e.imag - 1j * e.real, id="columns swapped"),
        pytest.param(lambda e: e.real[::-1] + 1j * e.imag, id="order turned"),
        pytest.param(lambda e: e.real + 0.3j * e.imag, id="loss of another sample"),
    ],
)
def test_what_does_not_belong_together_is_found(wrong: object) -> None:
    """ε′ of water without its loss, swapped, turned round, or with too little loss, is off by 5 % at least."""
    assert callable(wrong)
    frequency = np.geomspace(1e9, 1e11, 200)
    values = wrong(LIQUID.evaluate(frequency).permittivity)
    assert kramers_kronig(frequency, values).misfit > 0.05


def test_a_narrow_band_proves_little() -> None:
    """A constant ε with loss is explained by absorption outside 8 GHz to 12 GHz, but not over three decades."""
    lossy: AbstractMedium = ConstantMedium(4 - 0.2j)
    misfits = []
    for lowest, highest in ((8e9, 12e9), (1e8, 1e11)):
        frequency = np.geomspace(lowest, highest, 200)
        misfits.append(kramers_kronig(frequency, lossy.evaluate(frequency).permittivity).misfit)
    assert misfits[0] < 1e-6
    assert misfits[1] > 0.03


def test_tails_are_told() -> None:
    """Above the peak of a relaxation much of the change of ε′ comes from below the band, and is told."""
    frequency = np.geomspace(1e10, 1e12, 200)
    values = DebyeMedium(4.0, 70.0, 8e-12).evaluate(frequency).permittivity
    result = kramers_kronig(frequency, values)
    assert result.below > 5
    assert (result.lowest, result.highest) == (1e10, 1e12)
    assert 1e10 <= result.worst_frequency <= 1e12
    assert result.misfit <= result.worst


def test_only_some_places_may_be_tested() -> None:
    """Where ε′ is known at a few frequencies only, the loss between them may still be dense."""
    frequency = np.geomspace(1e9, 1e11, 200)
    values = LIQUID.evaluate(frequency).permittivity
    broken = values.copy()
    broken[1::10] += 5
    tested = np.arange(0, 200, 10)
    assert kramers_kronig(frequency, broken, tested).misfit < 1e-4
    assert kramers_kronig(frequency, broken).misfit > 0.02
