"""Nose radome of a weather radar: the half-wave laminate, its painted and its robust form.

Laminate of permittivity 3.30 and loss tangent 0.008, 9.30 to 9.45 GHz, 0 to 55 degrees, both polarizations. An
invented job; its figures come from the closed form of one slab and an independent program.
"""

import numpy as np
import pytest

from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.constant import ConstantMedium
from stackcore.stack import Layer, Stack
from tests.reference.published import SECOND_METHOD, TE, TM, assert_printed, solved, wall

SOURCE = f"nose radome scenario ({SECOND_METHOD})"
CENTRE = 9.375e9
BAND = (9.30e9, 9.375e9, 9.45e9)
ANGLES = (0.0, 20.0, 40.0, 55.0)
LAMINATE = ConstantMedium(3.30 * (1 - 0.008j))
PAINT = ConstantMedium(3.6 * (1 - 0.03j))

FIGURES = [  # degrees, polarization, T in per cent, insertion loss dB, insertion phase delay in degrees
    (0.0, TE, "91.74", "0.375", "94.03"),
    (55.0, TE, "95.14", "0.216", "116.30"),
    (55.0, TM, "96.86", "0.139", "116.31"),
]

WORST = [  # laminate in mm, paint in mm, least T in per cent over band and angles
    (9.86, 0.0, "91.04"),
    (9.56, 0.0, "93.49"),
    (9.86, 0.2, "88.66"),
    (9.34, 0.2, "93.08"),
]


def laminate(millimetres: float, paint: float = 0.0) -> Stack:
    """Return the wall, painted on its front when `paint` is given in mm."""
    coats = [Layer(PAINT, paint * 1e-3)] if paint else []
    return wall(*coats, Layer(LAMINATE, millimetres * 1e-3))


@pytest.mark.parametrize(("degrees", "printed"), [(55.0, "9.861"), (0.0, "8.802")])
def test_half_wave_thickness(degrees: float, printed: str) -> None:
    """A lossless wall of the printed half-wave thickness reflects nothing at its angle in either polarization."""
    thickness = SPEED_OF_LIGHT / CENTRE / (2 * np.sqrt(3.30 - np.sin(np.radians(degrees)) ** 2))
    assert_printed(float(thickness) * 1e3, printed, SOURCE)
    r = solved(wall(Layer(ConstantMedium(3.30), float(thickness))), CENTRE, degrees)
    assert np.all(r.reflectance < 1e-28)


@pytest.mark.parametrize(("degrees", "polarization", "transmitted", "loss", "delay"), FIGURES)
def test_figures_at_the_centre(degrees: float, polarization: int, transmitted: str, loss: str, delay: str) -> None:
    """T, insertion loss and insertion phase delay of 9.86 mm at 9.375 GHz."""
    r = solved(laminate(9.86), CENTRE, degrees)
    assert_printed(100 * float(r.transmittance[0, 0, polarization]), transmitted, SOURCE)
    assert_printed(float(r.insertion_loss_dB[0, 0, polarization]), loss, SOURCE)
    assert_printed(float(r.insertion_phase_delay_deg[0, 0, polarization]) % 360, delay, SOURCE)


def test_return_loss_at_normal_incidence() -> None:
    """13.00 dB for 9.86 mm."""
    assert_printed(float(solved(laminate(9.86), CENTRE).return_loss_dB[0, 0, TE]), "13.00", SOURCE)


def test_average_transmission() -> None:
    """The mean over the four angles and both polarizations at 9.375 GHz is 94.05 per cent."""
    assert_printed(100 * float(solved(laminate(9.86), CENTRE, ANGLES).transmittance.mean()), "94.05", SOURCE)


@pytest.mark.parametrize(("millimetres", "paint", "printed"), WORST)
def test_worst_transmission(millimetres: float, paint: float, printed: str) -> None:
    """The least T over band, angles and polarizations: textbook, robust, painted, and painted and retuned."""
    least = float(solved(laminate(millimetres, paint), BAND, ANGLES).transmittance.min())
    assert_printed(100 * least, printed, SOURCE)


@pytest.mark.parametrize(("polarization", "printed"), [(TE, "22.57"), (TM, "12.02")])
def test_slope_of_the_phase_delay_with_thickness(polarization: int, printed: str) -> None:
    """Without loss the delay at 55 degrees grows by 22.57 (TE) and 12.02 (TM) degrees per mm at half a wave."""
    half_wave = SPEED_OF_LIGHT / CENTRE / (2 * np.sqrt(3.30 - np.sin(np.radians(55.0)) ** 2))
    thin, thick = (
        float(
            solved(wall(Layer(ConstantMedium(3.30), half_wave + step)), CENTRE, 55.0).insertion_phase_delay_deg[
                0, 0, polarization
            ]
        )
        for step in (-1e-6, 1e-6)
    )
    assert_printed((thick - thin) / 2e-3, printed, SOURCE)
