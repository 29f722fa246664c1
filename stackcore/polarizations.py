"""Polarizations of the incident wave: TE, TM, circular, and linear tilted from TE.

A wave is held as the amplitudes of its TE and its TM part, full fields normalised to power (see
`stackcore.conventions`). A stack of isotropic layers changes each part by itself, so that the answer for any
polarization is a sum of those for TE and TM with the weights given here.

The unit vectors p (TM) and y (TE) make a right-handed set with the direction of the incident and of the
transmitted wave, and a left-handed one with that of the reflected wave, because r compares tangential fields.
With exp(+jωt) a right-hand circular wave is (p − jy)/√2 along the one and (p + jy)/√2 along the other: the
same handedness in reflection is half the difference of the coefficients, and in transmission half their sum.
"""

import math
import re
from dataclasses import dataclass
from typing import Final, Literal

from stackcore.errors import Fault, InputError, UnitError, nearest
from stackcore.units import Dimension, degrees_of, format_value, parse_measure

Kind = Literal["TE", "TM", "circular", "tilted"]

_TILT: Final = re.compile(r"tilt(?:ed)?\b\s*(?P<angle>.*)", re.IGNORECASE)
_WORDS: Final = ("TE", "TM", "circular", "tilt 45 deg")
_ALLOWED: Final = "TE, TM, circular, or a tilt from TE of −90 to 90 deg such as tilt 45 deg"
_LEAST_SHARE: Final = 1e-15
"""Sines and cosines below this are those of a right angle, which no double is exactly."""


@dataclass(frozen=True, slots=True)
class Polarization:
    """How the incident electric field points.

    Parameters
    ----------
    kind
        ``TE``, ``TM``, ``circular`` or ``tilted``.
    tilt
        For a tilted linear wave the angle in rad of its field from that of TE toward that of TM, −π/2 to π/2; 0
        for the others.

    Raises
    ------
    InputError
        For a tilt out of range, or one of a wave that has none.

    Examples
    --------
    >>> polarization("tilt 45 deg").label, polarization("circular").power_shares
    ('45° tilt', (0.5, 0.5))
    """

    kind: Kind
    tilt: float = 0.0

    def __post_init__(self) -> None:
        if not abs(self.tilt) <= math.pi / 2 or (self.tilt and self.kind != "tilted"):
            raise InputError([Fault("polarization", f"{self.kind} with a tilt of {self.tilt} rad", _ALLOWED)])

    @property
    def key(self) -> str:
        """The text `polarization` reads: ``TE``, ``TM``, ``circular``, ``tilt 45 deg``."""
        if self.kind != "tilted":
            return self.kind
        return f"tilt {format_value(self.tilt, Dimension.ANGLE, unit='deg')}"

    @property
    def label(self) -> str:
        """Words for a curve: ``TE``, ``TM``, ``Circular``, ``45° tilt``."""
        if self.kind == "tilted":
            return f"{degrees_of(self.tilt):g}° tilt".replace("-", "−")
        return "Circular" if self.kind == "circular" else self.kind

    @property
    def single(self) -> int | None:
        """0 for a wave that is TE alone and 1 for TM alone, whatever it is called; None for one with both."""
        te, tm = self.power_shares
        return 0 if tm == 0 else 1 if te == 0 else None

    @property
    def power_shares(self) -> tuple[float, float]:
        """The parts of the incident power that come as TE and as TM."""
        if self.kind == "circular":
            return 0.5, 0.5
        cosine, sine = self._direction
        return cosine * cosine, sine * sine

    @property
    def _direction(self) -> tuple[float, float]:
        if self.kind != "tilted":
            return (1.0, 0.0) if self.kind == "TE" else (0.0, 1.0)
        cosine, sine = math.cos(self.tilt), math.sin(self.tilt)
        return (0.0, math.copysign(1.0, sine)) if cosine < _LEAST_SHARE else (cosine, sine)

    def copolar(self, *, reflected: bool = False) -> tuple[float, float]:
        """Return the weights of the TE and TM amplitudes whose sum is the co-polar amplitude.

        Co-polar has the handedness of the incident circular wave, each seen along its own way, or the direction
        of the incident linear one.
        """
        if self.kind == "circular":
            return (-0.5, 0.5) if reflected else (0.5, 0.5)
        return self.power_shares

    def crosspolar(self, *, reflected: bool = False) -> tuple[float, float]:
        """Return the weights of the TE and TM amplitudes whose sum is the cross-polar amplitude, up to its sign."""
        if self.kind == "circular":
            return (0.5, 0.5) if reflected else (-0.5, 0.5)
        cosine, sine = self._direction
        return -cosine * sine, cosine * sine

    @property
    def ratio(self) -> complex:
        """The incident TM amplitude over the TE amplitude; for a wave that has both."""
        if self.kind == "circular":
            return 1j
        cosine, sine = self._direction
        return complex(sine / cosine)


TE: Final = Polarization("TE")
TM: Final = Polarization("TM")
CIRCULAR: Final = Polarization("circular")


def tilted(tilt: float) -> Polarization:
    """Return the linear polarization whose field is `tilt` rad from that of TE, −π/2 to π/2."""
    return Polarization("tilted", tilt)


def polarization(key: str) -> Polarization:
    """Return what a text says: ``TE``, ``TM``, ``circular`` or ``tilt 45 deg``, in any case.

    A tilt without a unit is in degrees.

    Raises
    ------
    InputError
        When it is none of them; the fault names the nearest.

    Examples
    --------
    >>> polarization("Tilt 30").key
    'tilt 30 deg'
    """
    text = key.strip()
    for known in (TE, TM, CIRCULAR):
        if text.casefold() == known.kind.casefold():
            return known
    match = _TILT.fullmatch(text)
    if match is None:
        raise InputError([Fault("polarization", f"{key!r} is no polarization{nearest(text, _WORDS)}", _ALLOWED)])
    try:
        tilt = parse_measure(match["angle"].strip(), Dimension.ANGLE, default_unit="deg").value
    except UnitError as error:
        raise InputError([Fault("polarization", f"{key!r} has no tilt: {error}", _ALLOWED)]) from error
    if abs(tilt) > math.pi / 2:
        raise InputError([Fault("polarization", f"the tilt of {key!r} is out of range", _ALLOWED)])
    return tilted(tilt)
