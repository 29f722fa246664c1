"""Fabry-Perot etalons, tunnelling through a gap, and the delay of a slab."""

import numpy as np
import pytest
from scipy.optimize import brentq

from stackcore.constants import SPEED_OF_LIGHT, VACUUM_PERMITTIVITY
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import VACUUM
from stackcore.stack import Layer
from tests.reference.published import (
    READ,
    REDERIVED,
    SECOND_METHOD,
    TE,
    TM,
    assert_printed,
    index,
    solved,
    wall,
)

ETALON = f"Born and Wolf, section 7.6; Hecht, section 9.6; Saleh and Teich ({REDERIVED})"
ZHU = f"S. Zhu et al., Am. J. Phys. 54, 601 (1986); Born and Wolf, section 1.5.4 ({REDERIVED})"
HOMEWORK = f"homework statement ({READ}), answer by Zhu's formula ({REDERIVED})"

ETALONS = [  # reflectance of one face, full width finesse, lowest transmittance
    (0.04, None, "0.852071"),
    (0.5, "4.3468", "0.111111"),
    (0.8, "14.0203", "0.0123457"),
    (0.9, "29.7900", "0.0027701"),
    (0.95, "61.2342", "6.5746e-4"),
    (0.99, "312.5832", "2.525e-5"),
]

TUNNELLING = [  # index, degrees, gap in wavelengths, T of TE, T of TM, source
    (1.5, 45.0, 0.1, "0.87769530", "0.94837732", ZHU),
    (1.5, 45.0, 0.25, "0.51321023", "0.72965255", ZHU),
    (1.5, 45.0, 0.5, "0.16421363", "0.33465677", ZHU),
    (1.5, 45.0, 1.0, "0.01704718", "0.04251028", ZHU),
    (1.5, 43.0, 0.25, "0.54585500", "0.82115355", HOMEWORK),
]

PLASMA = [(0.3, "2.0965697"), (0.5, "2.3094011"), (0.8, "3.3333333")]  # ω/ω_p, delay in units of 1/ω_p

SLAB_DELAYS = [  # index, phase across the slab in quarter turns, delay in units of thickness / c
    (3.0, 2, 5.0, "resonance, (n/2)(n² + 1)/n"),
    (3.0, 1, 1.8, "antiresonance, 2n²/(n² + 1)"),
    (3.0, 400, 5.0, "resonance of a high order"),
]


@pytest.mark.parametrize(("face", "finesse", "lowest"), ETALONS)
def test_etalon(face: float, finesse: str | None, lowest: str) -> None:
    """A slab whose faces reflect R has Airy's finesse, full transmission between and the printed least."""
    n = (1 + np.sqrt(face)) / (1 - np.sqrt(face))
    thickness = 1e-3
    spacing = SPEED_OF_LIGHT / (2 * n * thickness)
    stack = wall(Layer(index(n), thickness))

    def transmittance(frequency: float) -> float:
        return float(solved(stack, frequency).transmittance[0, 0, TE])

    assert_printed(transmittance(10.5 * spacing), lowest, ETALON)
    np.testing.assert_allclose(transmittance(10 * spacing), 1.0, rtol=1e-9)
    if finesse is not None:
        ends = (10.0 * spacing, 10.5 * spacing)
        half = brentq(lambda f: transmittance(f) - 0.5, *ends, xtol=spacing * 1e-12)
        assert_printed(spacing / (2 * (half - 10 * spacing)), finesse, ETALON)


def test_free_spectral_range() -> None:
    """Transmission maxima of 1 mm of index 1.5 lie 99.930819 GHz apart."""
    stack = wall(Layer(index(1.5), 1e-3))

    def crossing(order: int) -> float:
        def imaginary(f: float) -> float:
            return float(solved(stack, f).transmission[0, 0, TE].imag)

        return brentq(imaginary, (order - 0.2) * 99.93e9, (order + 0.2) * 99.93e9, xtol=1e-3)

    assert_printed((crossing(9) - crossing(8)) / 1e9, "99.930819", ETALON)


@pytest.mark.parametrize(("n", "degrees", "gap", "te", "tm", "source"), TUNNELLING)
def test_tunnelling_through_a_gap(n: float, degrees: float, gap: float, te: str, tm: str, source: str) -> None:
    """Light that is totally reflected crosses a gap of vacuum between equal prisms in part."""
    f = 5e14
    stack = wall(Layer(VACUUM, gap * SPEED_OF_LIGHT / f), front=index(n), back=index(n))
    r = solved(stack, f, degrees)
    assert_printed(float(r.transmittance[0, 0, TE]), te, source)
    assert_printed(float(r.transmittance[0, 0, TM]), tm, source)
    assert np.all(r.absorptance == 0)


@pytest.mark.parametrize(("n", "quarters", "expected", "what"), SLAB_DELAYS)
def test_group_delay_of_a_slab(n: float, quarters: int, expected: float, what: str) -> None:
    """The group delay of a slab of index 3 is 5 d/c at resonance and 1.8 d/c between."""
    thickness = 1e-2
    f = quarters * SPEED_OF_LIGHT / (4 * n * thickness)
    delay = float(solved(wall(Layer(index(n), thickness)), f).group_delay_s[0, 0, TE])
    np.testing.assert_allclose(
        delay * SPEED_OF_LIGHT / thickness, expected, rtol=1e-12, err_msg=f"{what} ({SECOND_METHOD})"
    )


@pytest.mark.parametrize(("ratio", "delay"), PLASMA)
def test_delay_through_a_plasma(ratio: float, delay: str) -> None:
    """Below cutoff the delay of a thick plasma is 2/√(ω_p² − ω²), however thick it is (T. E. Hartman, 1962)."""
    plasma_frequency = 1e10
    relaxation = 1e12 / plasma_frequency
    plasma = ConductorMedium(VACUUM_PERMITTIVITY * plasma_frequency**2 * relaxation, relaxation_time=relaxation)
    for depths in (12.0, 30.0):
        thickness = depths * SPEED_OF_LIGHT / plasma_frequency / np.sqrt(1 - ratio**2)
        r = solved(wall(Layer(plasma, float(thickness))), ratio * plasma_frequency / (2 * np.pi))
        found = float(r.group_delay_s[0, 0, TE]) * plasma_frequency
        assert_printed(found, delay, f"plasma slab, thick limit ({SECOND_METHOD})")


@pytest.mark.parametrize("n", [1.5, 2.0, 4.0])
def test_dwell_time_is_the_mean_delay(n: float) -> None:
    """R τ_r + T τ_t is the energy stored over the power that comes in (H. G. Winful, PRL 91, 260401, 2003)."""
    thickness, f = 5e-3, 17.3e9
    stack = wall(Layer(index(n), thickness))
    step = 1e-6
    r = solved(stack, [f * (1 - step), f, f * (1 + step)])
    reflection_delay = -float(np.angle(r.reflection[2, 0, TE] / r.reflection[0, 0, TE])) / (4 * np.pi * f * step)
    mean = float(r.reflectance[1, 0, TE]) * reflection_delay
    mean += float(r.transmittance[1, 0, TE]) * float(r.group_delay_s[1, 0, TE])
    # The field inside: from the back face, E = t (cos φ + j sin φ / n), H = t (cos φ + j n sin φ).
    nodes, weights = np.polynomial.legendre.leggauss(60)
    phase = 2 * np.pi * f * n * thickness / SPEED_OF_LIGHT * (nodes + 1) / 2
    electric = np.abs(np.cos(phase) + 1j * np.sin(phase) / n) ** 2
    magnetic = np.abs(np.cos(phase) + 1j * np.sin(phase) * n) ** 2
    energy = float(r.transmittance[1, 0, TE]) * float(np.sum(weights / 2 * (n**2 * electric + magnetic) / 2))
    np.testing.assert_allclose(mean, energy * thickness / SPEED_OF_LIGHT, rtol=1e-7)
