"""Quarter-wave mirrors: reflectance by pairs, stop band, delay of reflection, the count of distinct orders."""

from itertools import product

import numpy as np
import pytest

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.stack import Stack
from tests.reference.published import (
    READ,
    REDERIVED,
    SECOND_METHOD,
    TE,
    assert_printed,
    half_unit,
    index,
    light,
    quarter,
    solved,
    wall,
)

WAVELENGTH = 500e-9
ORFANIDIS = f"S. J. Orfanidis, Electromagnetic Waves and Antennas; Born and Wolf, section 1.6.5 ({REDERIVED})"
OPTICS_TEXTS = f"Born and Wolf, section 1.6; Heavens; Hecht ({REDERIVED})"
TENNESSEE = f"University of Tennessee, Optics 507, assignment 3 ({READ}); digits by a {SECOND_METHOD}"

MIRRORS = [  # pairs, whether a high layer lies on the glass, n high, n low, n glass, reflectance, source
    (4, False, 2.3, 1.35, 1.5, "0.96312802", ORFANIDIS),
    (8, False, 2.3, 1.35, 1.5, "0.99947089", ORFANIDIS),
    (2, True, 2.32, 1.38, 1.52, "0.86807876", ORFANIDIS),
    (4, True, 2.32, 1.38, 1.52, "0.98245228", ORFANIDIS),
    (8, True, 2.32, 1.38, 1.52, "0.99972259", ORFANIDIS),
    (16, True, 2.32, 1.38, 1.52, "0.99999993", ORFANIDIS),
    (3, False, 4.0, 1.5, 1.5, "0.99261165", ORFANIDIS),
    (1, True, 2.3, 1.38, 1.52, "0.660177", OPTICS_TEXTS),
    (2, True, 2.3, 1.38, 1.52, "0.861549", OPTICS_TEXTS),
    (3, True, 2.3, 1.38, 1.52, "0.947786", OPTICS_TEXTS),
    (4, True, 2.3, 1.38, 1.52, "0.980881", OPTICS_TEXTS),
    (5, True, 2.3, 1.38, 1.52, "0.993074", OPTICS_TEXTS),
    (6, True, 2.3, 1.38, 1.52, "0.997501", OPTICS_TEXTS),
    (7, False, 2.5, 1.5, 1.5, "0.99791247", TENNESSEE),
    (4, False, 2.8, 1.4, 1.5, "0.98963738", f"textbook exercise; answer by a {SECOND_METHOD}"),
]

EDGES = ["429.727", "597.749"]  # nm, of the stop band of 2.32 and 1.38 at 500 nm

DELAYS = [  # index in front, first index, second index, delay of reflection in periods at the centre
    (1.0, 2.3, 1.38, "0.54347826"),
    (3.5, 1.38, 2.3, "0.49285714"),
]
BABIC = f"D. I. Babić, S. W. Corzine, IEEE J. Quantum Electron. 28, 514 (1992) ({REDERIVED})"


def mirror(pairs: int, closed: bool, high: float, low: float, glass: float) -> Stack:
    """Return (HL)^pairs, with one more H on the glass when `closed`."""
    layers = [quarter(high, WAVELENGTH), quarter(low, WAVELENGTH)] * pairs
    return wall(*layers, *([quarter(high, WAVELENGTH)] if closed else []), back=index(glass))


@pytest.mark.parametrize(("pairs", "closed", "high", "low", "glass", "expected", "source"), MIRRORS)
def test_quarter_wave_mirror(
    pairs: int, closed: bool, high: float, low: float, glass: float, expected: str, source: str
) -> None:
    """The reflectance at the centre agrees to the printed digits."""
    r = solved(mirror(pairs, closed, high, low, glass), light(0.5))
    assert_printed(float(r.reflectance[0, 0, TE]), expected, source)


def test_pairs_for_a_wanted_reflectance() -> None:
    """0.995 with 2.5 and 1.5 on 1.5 takes seven pairs: six are not enough."""
    six, seven = (float(solved(mirror(n, False, 2.5, 1.5, 1.5), light(0.5)).reflectance[0, 0, TE]) for n in (6, 7))
    assert six < 0.995 < seven, TENNESSEE


@pytest.mark.parametrize("nanometres", EDGES)
def test_edges_of_the_stop_band(nanometres: str) -> None:
    """cos of the phase of one pair, Re(1/t), passes −1 within half a unit of the printed edge."""
    pair = wall(quarter(2.32, WAVELENGTH), quarter(1.38, WAVELENGTH))
    at = float(nanometres) + half_unit(nanometres) * np.array([-1.0, 1.0])
    cosine = (1 / solved(pair, list(light(1e-3) * (1 / at))).transmission[::-1, 0, TE]).real
    assert (cosine[0] + 1) * (cosine[1] + 1) < 0, ORFANIDIS


def test_width_of_the_stop_band() -> None:
    """R of a mirror of 100 pairs is 1 throughout 168.02 nm and falls just outside."""
    stack = mirror(100, False, 2.32, 1.38, 1.52)
    edges = np.array([429.727, 597.749])
    inside = solved(stack, list(light(1e-3) / (edges + np.array([1.5, -1.5]))))
    outside = solved(stack, list(light(1e-3) / (edges + np.array([-2.5, 4.0]))))
    assert np.all(inside.reflectance[:, 0, TE] > 0.9999)
    assert np.all(outside.reflectance[:, 0, TE] < 0.99), ORFANIDIS


@pytest.mark.parametrize(("front", "first", "second", "expected"), DELAYS)
def test_delay_of_reflection(front: float, first: float, second: float, expected: str) -> None:
    """The slope of the reflected phase at the centre of 40 pairs is that of an infinite mirror."""
    pair = [quarter(first, WAVELENGTH), quarter(second, WAVELENGTH)]
    stack = wall(*pair * 40, front=index(front), back=index(front))
    f = SPEED_OF_LIGHT / WAVELENGTH
    step = 1e-5
    low, high = solved(stack, [f * (1 - step), f * (1 + step)]).reflection[:, 0, TE]
    periods = -float(np.angle(high / low)) / (2 * np.pi * 2 * step)
    assert_printed(periods, expected, BABIC)


@pytest.mark.parametrize(("layers", "distinct"), [(4, 3), (5, 6), (6, 4), (7, 8)])
def test_orders_of_quarter_waves_fall_into_few_classes(layers: int, distinct: int) -> None:
    """All 2^N orders of two quarter-wave materials have N/2 + 1 (N even) or N + 1 (N odd) transmittances."""
    kinds = (quarter(2.3, WAVELENGTH), quarter(1.38, WAVELENGTH))
    found = [
        float(solved(wall(*order), light(0.5)).transmittance[0, 0, TE]) for order in product(kinds, repeat=layers)
    ]
    assert len(set(np.round(found, 10))) == distinct, (
        f"Hidden symmetries in N-layer dielectric stacks, arXiv ({READ})"
    )
