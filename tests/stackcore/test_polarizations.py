"""Polarizations: what is read and written, the weights, and what is refused."""

import math

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from stackcore.errors import InputError
from stackcore.polarizations import CIRCULAR, TE, TM, Polarization, polarization, tilted


@pytest.mark.parametrize(
    ("text", "wanted", "key", "label"),
    [
        ("TE", TE, "TE", "TE"),
        (" tm ", TM, "TM", "TM"),
        ("Circular", CIRCULAR, "circular", "Circular"),
        ("tilt 45 deg", tilted(math.radians(45)), "tilt 45 deg", "45° tilt"),
        ("tilted 30°", tilted(math.radians(30)), "tilt 30 deg", "30° tilt"),
        ("TILT 22,5", tilted(math.radians(22.5)), "tilt 22.5 deg", "22.5° tilt"),
        ("tilt -90 deg", tilted(-math.pi / 2), "tilt -90 deg", "−90° tilt"),
        ("tilt 0.5 rad", tilted(0.5), polarization("tilt 0.5 rad").key, "28.6479° tilt"),
    ],
)
def test_what_is_read_and_how_it_is_called(text: str, wanted: Polarization, key: str, label: str) -> None:
    """Any case, a unit or degrees; the key is the one spelling that is kept."""
    found = polarization(text)
    assert (found, found.key, found.label) == (wanted, key, label)


@given(st.floats(-math.pi / 2, math.pi / 2))
def test_a_key_is_read_back_to_the_last_bit(tilt: float) -> None:
    """What is written of a tilt gives the very same tilt again."""
    assert polarization(tilted(tilt).key) == tilted(tilt)


@pytest.mark.parametrize(
    ("text", "words"),
    [
        ("circulr", "did you mean 'circular'"),
        ("", "no polarization"),
        ("tilt", "no tilt"),
        ("tilt 3 mm", "length"),
        ("tilt 91 deg", "out of range"),
        ("tilting 3", "no polarization"),
    ],
)
def test_what_is_no_polarization_is_refused(text: str, words: str) -> None:
    """The fault says what was given, what is allowed, and what was perhaps meant."""
    with pytest.raises(InputError, match=words) as caught:
        polarization(text)
    assert "−90 to 90 deg" in caught.value.faults[0].allowed


def test_only_a_tilted_wave_has_a_tilt() -> None:
    """A value that means nothing cannot be made."""
    with pytest.raises(InputError, match="TE with a tilt of"):
        Polarization("TE", 0.1)
    for tilt in (1.6, math.nan):
        with pytest.raises(InputError, match="tilt of"):
            tilted(tilt)


@pytest.mark.parametrize("reflected", [False, True])
@pytest.mark.parametrize(
    "wave", [TE, TM, CIRCULAR, *(tilted(math.radians(d)) for d in (-90, -45, 0, 10, 45, 60, 90))], ids=str
)
def test_weights_project_on_two_orthogonal_waves(wave: Polarization, reflected: bool) -> None:
    """Co and cross are projections: with any amplitudes of TE and TM their powers add to the mean power."""
    rng = np.random.default_rng(7)
    for _ in range(20):
        te, tm = rng.normal(size=2) + 1j * rng.normal(size=2)
        co, cross = (
            a * te + b * tm for a, b in (wave.copolar(reflected=reflected), wave.crosspolar(reflected=reflected))
        )
        share_te, share_tm = wave.power_shares
        assert abs(co) ** 2 + abs(cross) ** 2 == pytest.approx(
            share_te * abs(te) ** 2 + share_tm * abs(tm) ** 2, rel=1e-14
        )
    assert sum(wave.power_shares) == pytest.approx(1, rel=1e-15)


def test_a_tilt_of_a_right_angle_is_tm_exactly() -> None:
    """No rest of TE is left over from π/2 not being a double."""
    assert tilted(math.pi / 2).power_shares == tilted(-math.pi / 2).power_shares == TM.power_shares
    assert (tilted(0.0).single, tilted(math.pi / 2).single, CIRCULAR.single, tilted(0.1).single) == (
        0,
        1,
        None,
        None,
    )
