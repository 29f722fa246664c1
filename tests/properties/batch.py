"""Random stacks from a seed, over everything an engineer can type, far wider than `tests.strategies` draws.

1 to 40 elements, 1 Hz to 1 PHz, 0 to 89.999 degrees, |ε| to 1e4, loss tangents to 1e3, μ to 1e3, sheets of
1 milliohm to 1 megohm, perfect, good and bad conductors behind, different half-spaces. Thicknesses run from
1 nm to 1 m, and stop where a layer that lets the wave through reaches 1e6 rad (1e4 in a dispersive medium).
"""

import numpy as np

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, PerfectConductor, SheetPlacement, Stack
from tests.strategies import Case

THICKEST_RAD = 1e6
THICKEST_DISPERSIVE_RAD = 1e4


def random_case(rng: np.random.Generator, *, lossless: bool = False, most: int = 40) -> Case:
    """Return one plane wave on one random stack; `lossless` keeps loss out of every part of it."""
    frequency = _decades(rng, 1.0, 1e15)
    angle = float(np.radians(rng.choice((0.0, rng.uniform(0, 90), 90 - _decades(rng, 1e-3, 10.0)))))
    elements: list[Element] = []
    for _ in range(int(rng.integers(1, most + 1))):
        if rng.random() < 0.2:
            elements.append(SheetPlacement(random_sheet(rng, frequency, lossless=lossless)))
        else:
            medium = random_medium(rng, lossless=lossless)
            elements.append(Layer(medium, _thickness(rng, medium, frequency)))
    front = VACUUM
    if rng.random() < 0.4:
        front = ConstantMedium(_decades(rng, 1.0, 1e3), rng.choice((1.0, _decades(rng, 1.0, 30.0))))
    return Case(Stack(tuple(elements), front=front, back=_back(rng, lossless=lossless)), frequency, angle)


def random_medium(rng: np.random.Generator, *, lossless: bool = False) -> AbstractMedium:
    """Return a dielectric, magnetic, metal-like (ε′ < 0) or conducting medium."""
    eps, mu = _decades(rng, 1.0, 1e4), 1.0
    if rng.random() < 0.25:
        mu = _decades(rng, 1.0, 1e3)
    if rng.random() < 0.1:
        eps = -eps
    if rng.random() < 0.1:
        eps = float(np.sign(eps)) / _decades(rng, 1.0, 1e3)
    if lossless:
        return ConstantMedium(eps, mu)
    kind = rng.integers(0, 4)
    if kind == 0:
        return ConstantMedium(eps, mu)
    if kind == 1:
        slow = _decades(rng, 1e-16, 1e-12) if rng.random() < 0.3 else 0.0
        return ConductorMedium(_decades(rng, 1e-4, 6.3e7), mu, relaxation_time=slow)
    tangent = min(_decades(rng, 1e-6, 1e3), 1e4 / abs(eps))
    mu_loss = mu * _decades(rng, 1e-3, 10.0) if mu != 1.0 and kind == 2 else 0.0
    return ConstantMedium(eps - 1j * abs(eps) * tangent, mu - 1j * mu_loss)


def random_sheet(rng: np.random.Generator, frequency: float, *, lossless: bool = False) -> SeriesSheet:
    """Return a sheet whose resistance and reactances lie between 1 milliohm and 1 megohm."""
    omega = 2 * np.pi * frequency
    resistance = 0.0 if lossless else _decades(rng, 1e-3, 1e6)
    kind = rng.integers(1, 3) if lossless else rng.integers(0, 4)
    inductance = _decades(rng, 1e-3, 1e6) / omega if kind in (1, 3) else 0.0
    capacitance = 1 / (omega * _decades(rng, 1e-3, 1e6)) if kind in (2, 3) else None
    return SeriesSheet(resistance, inductance, capacitance)


def _back(rng: np.random.Generator, *, lossless: bool) -> AbstractMedium | PerfectConductor:
    """Return a half-space behind: vacuum, another medium or metal."""
    draw = rng.random()
    if draw < 0.35:
        return VACUUM
    if draw < 0.5:
        return METAL
    return random_medium(rng, lossless=lossless)


def _thickness(rng: np.random.Generator, medium: AbstractMedium, frequency: float) -> float:
    """Return a thickness in m, within the thickest phase where the medium carries the wave so far."""
    values = medium.evaluate(np.array(frequency))
    index = np.sqrt(complex(values.permittivity * values.permeability))
    thickest = 1.0
    if abs(index.imag) < 0.1 * abs(index.real):
        phase = THICKEST_DISPERSIVE_RAD if medium.dispersive else THICKEST_RAD
        thickest = min(thickest, phase * SPEED_OF_LIGHT / (2 * np.pi * frequency * abs(index)))
    return _decades(rng, 1e-9, thickest)


def _decades(rng: np.random.Generator, lowest: float, highest: float) -> float:
    """Return a number spread evenly over the decades from `lowest` to `highest`."""
    return float(10.0 ** rng.uniform(np.log10(lowest), np.log10(highest)))
