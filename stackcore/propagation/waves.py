"""Plane waves in the media of a stack: refraction, wave admittance and phase, for a block of points.

A block is a set of angles by a set of frequencies; arrays here are (angle, frequency), and (2, angle, frequency)
where the polarization counts (TE first). A medium that does not depend on frequency keeps a last axis of length
1, so that its square roots are taken once per angle.

Symbols. The tangential fields of one polarization obey, along the normal, with k = ω/c and H scaled by Z₀,

    dE/dz = −jk X H,    dH/dz = −jk B E,    q² = X B,    Y = q/X = B/q

    TE:  X = μ,      B = q²/μ          TM:  X = q²/ε,   B = ε

with q = kz/k. Source: M. Born, E. Wolf, Principles of Optics, 7th ed. (1999), section 1.6, in the sign
convention of `stackcore.conventions`.
"""

from dataclasses import dataclass
from typing import Any

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium

_SMALLEST_Q = 1e-30
"""Stands for q = 0 (a layer exactly at its critical angle): every formula below is even and smooth in q there."""

_FEW_HALF_TURNS = 0.75
"""Up to this the sines of a phase taken as it is keep their digits."""


@dataclass(frozen=True, slots=True)
class Incidence:
    """What all waves of a block share: frequencies, angles and the lossless front half-space.

    `frequency` and `wavenumber` are (F,); `angle`, `cos2`, `sin2` are (A, 1); `permittivity` and `permeability`
    of the front are (1,) or (F,), real; `q` is (A, 1 or F).
    """

    frequency: FloatArray
    angle: FloatArray
    permittivity: FloatArray
    permeability: FloatArray

    @property
    def wavenumber(self) -> FloatArray:
        """k = ω/c in rad/m."""
        return self.frequency * (2 * np.pi / SPEED_OF_LIGHT)

    @property
    def index2(self) -> FloatArray:
        """ε₀μ₀ of the front half-space."""
        return self.permittivity * self.permeability

    @property
    def q(self) -> FloatArray:
        """Normalized normal wave number in the front half-space, without the loss of 1 − sin² near grazing."""
        front: FloatArray = np.sqrt(self.index2) * np.cos(self.angle)
        return front

    @property
    def admittance(self) -> FloatArray:
        """Wave admittance of the front half-space, (2, A, 1 or F), real and positive."""
        return np.stack([self.q / self.permeability, self.permittivity / self.q])


@dataclass(frozen=True, slots=True)
class Wave:
    """The plane wave of a block in one medium; see the module for the symbols.

    `permittivity` and `permeability` are (1,) or (F,); `q2` and `q` are (A, 1 or F); `x` and `b` are
    (2, A, 1 or F). The branch has Im q ≤ 0, and Re Y ≥ 0 where q is real. `long_q` is Re q with more digits, for
    media that do not depend on frequency.
    """

    permittivity: ComplexArray
    permeability: ComplexArray
    q2: ComplexArray
    q: ComplexArray
    x: ComplexArray
    b: ComplexArray
    long_q: NDArray[np.longdouble] | None

    def rows(self, angles: slice) -> "Wave":
        """Return the wave at some of its angles."""
        return Wave(
            self.permittivity,
            self.permeability,
            self.q2[angles],
            self.q[angles],
            self.x[:, angles],
            self.b[:, angles],
            None if self.long_q is None else self.long_q[angles],
        )


def wave_in(medium: AbstractMedium, incidence: Incidence) -> Wave:
    """Return the wave that `incidence` raises in `medium`."""
    frequency = incidence.frequency if medium.dispersive else incidence.frequency[:1]
    values = medium.evaluate(frequency)
    epsilon, mu = values.permittivity, values.permeability
    long_q = None
    if medium.dispersive:
        q2 = _q2(epsilon, mu, incidence.index2, incidence.angle)
        q = np.sqrt(q2)
    else:
        # Taken once per angle, so it may cost more: near a critical angle q² is a small rest of large numbers.
        long_q2 = _q2(
            epsilon.astype(np.clongdouble),
            mu.astype(np.clongdouble),
            incidence.permittivity.astype(np.longdouble) * incidence.permeability,
            incidence.angle.astype(np.longdouble),
        )
        long_q = np.sqrt(long_q2)
        q2, q = long_q2.astype(np.complex128), long_q.astype(np.complex128)
    q = np.where(q.imag > 0, -q, q)
    q = np.where((q.imag == 0) & ((q / mu).real < 0), -q, q)
    critical = np.abs(q) < _SMALLEST_Q
    q, q2 = np.where(critical, _SMALLEST_Q, q), np.where(critical, _SMALLEST_Q**2, q2)
    real_q = None if long_q is None else np.where(critical, _SMALLEST_Q, np.copysign(long_q.real, q.real))
    shape = q.shape
    x = np.stack([np.broadcast_to(mu, shape), q2 / epsilon])
    b = np.stack([q2 / mu, np.broadcast_to(epsilon, shape)])
    return Wave(epsilon, mu, q2, q, x, b, real_q)


def _q2(epsilon: Any, mu: Any, index2: Any, angle: Any) -> Any:
    """Return q² = εμ − ε₀μ₀ sin²θ by whichever of sin and cos is small; in double or in long double.

    Near grazing, and near the front's own index, 1 − sin² has lost its digits; at steep incidence from a dense
    front 1 + (εμ/ε₀μ₀ − 1) has.
    """
    inside = epsilon * mu
    steep = angle < np.pi / 4
    if steep.all():
        return inside - index2 * np.sin(angle) ** 2
    flat = (inside - index2) + index2 * np.cos(angle) ** 2
    return np.where(steep, inside - index2 * np.sin(angle) ** 2, flat) if steep.any() else flat


def departure(wave: Wave, reference: Wave) -> ComplexArray:
    """Return B − X Y_ref², (2, A, 1 or F), without cancellation where the medium is close to the reference.

    It is what drives H − Y_ref E through a layer; it is exactly 0 in a layer of the reference medium.
    """
    epsilon, mu, q2 = wave.permittivity, wave.permeability, wave.q2
    near_epsilon, near_mu, near_q2 = reference.permittivity, reference.permeability, reference.q2
    difference = (epsilon - near_epsilon) * mu + near_epsilon * (mu - near_mu)
    mu_step = (mu - near_mu) * (mu + near_mu)
    epsilon_step = (epsilon - near_epsilon) * (epsilon + near_epsilon)
    te = _gentler((q2 / mu, mu * (near_q2 / near_mu**2)), (difference / mu, mu_step / mu * (near_q2 / near_mu**2)))
    tm = _gentler(
        (epsilon + 0 * q2, q2 / epsilon * (near_epsilon**2 / near_q2)),
        (epsilon_step / epsilon + 0 * q2, difference / epsilon * (near_epsilon**2 / near_q2)),
    )
    shape = np.broadcast_shapes(te.shape, tm.shape)
    return np.stack([np.broadcast_to(te, shape), np.broadcast_to(tm, shape)])


def _gentler(one: tuple[ComplexArray, ComplexArray], other: tuple[ComplexArray, ComplexArray]) -> ComplexArray:
    """Return the difference of one of two pairs, equal in value: of the pair with the smaller members."""
    return np.where(
        np.abs(one[0]) + np.abs(one[1]) <= np.abs(other[0]) + np.abs(other[1]),
        one[0] - one[1],
        other[0] - other[1],
    )


@dataclass(frozen=True, slots=True)
class Passage:
    """How a wave passes one layer.

    With φ = k q d = α − jβ: `cosine` = e^(−β) cos φ and `sine` = j e^(−β) sin φ / q, both (A, F) and never large;
    `decay` = β, or None in a layer without decay; `sin_alpha` and `cos_alpha` keep the digits of a thick layer.
    """

    cosine: ComplexArray
    sine: ComplexArray
    decay: FloatArray | None
    sin_alpha: FloatArray
    cos_alpha: FloatArray


@dataclass(frozen=True, slots=True)
class LayerWave:
    """A wave in a layer of some thickness, ready to be passed at any frequencies of its incidence.

    For media that do not depend on frequency the phase is proportional to it. The factor is kept to more digits
    than a double where the machine has a longer float (`half_turns_rest`), and the turns are taken off before the
    sine: a layer of a million wavelengths still has the right phase.

    `half_turns`, `half_turns_rest` and `decay_rate` are per Hz, (A, 1 or F).
    """

    wave: Wave
    thickness: float
    half_turns: FloatArray
    half_turns_rest: FloatArray | None
    decay_rate: FloatArray | None
    j_over_q: ComplexArray

    def rows(self, angles: slice) -> "LayerWave":
        """Return the wave at some of its angles."""
        rest, decay = self.half_turns_rest, self.decay_rate
        return LayerWave(
            self.wave.rows(angles),
            self.thickness,
            self.half_turns[angles],
            None if rest is None else rest[angles],
            None if decay is None else decay[angles],
            self.j_over_q[angles],
        )

    def passage(self, frequency: FloatArray) -> Passage:
        """Return the passage at `frequency` (F,), which for a dispersive medium must be the incidence's own."""
        sin_alpha, cos_alpha = self._sines(frequency)
        cosine = np.empty(sin_alpha.shape, dtype=np.complex128)
        sine = np.empty(sin_alpha.shape, dtype=np.complex128)
        if self.decay_rate is None:
            cosine[...] = cos_alpha
            sine[...] = sin_alpha
            sine *= self.j_over_q
            return Passage(cosine, sine, None, sin_alpha, cos_alpha)
        decay = self.decay_rate * frequency
        # e^(−β) cosh β = 1 + m and e^(−β) sinh β = −m, with m = (e^(−2β) − 1)/2: exact for thin and thick.
        m = decay * -2.0
        np.expm1(m, out=m)
        m *= 0.5
        np.multiply(cos_alpha, m, out=sine.imag)
        np.multiply(sin_alpha, m, out=cosine.imag)
        np.negative(cosine.imag, out=cosine.imag)
        m += 1.0
        np.multiply(cos_alpha, m, out=cosine.real)
        np.multiply(sin_alpha, m, out=sine.real)
        sine *= self.j_over_q
        return Passage(cosine, sine, decay, sin_alpha, cos_alpha)

    def phase(self, frequency: FloatArray) -> FloatArray:
        """Return α = k d Re q in rad, with all its turns."""
        turns: FloatArray = np.pi * self.half_turns * frequency
        return turns

    def _sines(self, frequency: FloatArray) -> tuple[FloatArray, FloatArray]:
        """Return sin α and cos α, through tan(α/2), which array libraries find several times faster."""
        half_turns = self.half_turns * frequency
        if float(np.abs(self.half_turns).max()) * float(frequency.max()) <= _FEW_HALF_TURNS:
            half_turns *= 0.5 * np.pi
            return _sines_of_double(np.tan(half_turns, out=half_turns), None)
        # Whole half turns are taken off, so that sin α keeps its digits where it is small (a half-wave wall).
        whole = np.rint(half_turns)
        rest = None
        if self.half_turns_rest is not None:
            rest = _product_error(self.half_turns, frequency, half_turns)
            rest += self.half_turns_rest * frequency
        half_turns -= whole
        if rest is not None:
            half_turns += rest
        half_turns *= 0.5 * np.pi
        # 1 after an even number of half turns, -1 after an odd one.
        odd = np.rint(whole * 0.5)
        odd *= -2.0
        odd += whole
        np.abs(odd, out=odd)
        odd *= -2.0
        odd += 1.0
        return _sines_of_double(np.tan(half_turns, out=half_turns), odd)


def _sines_of_double(tangent: FloatArray, sign: FloatArray | None) -> tuple[FloatArray, FloatArray]:
    """Return sin 2x and cos 2x from tan x, which is overwritten, both times `sign`."""
    square = tangent * tangent
    cosine = 1.0 - square
    square += 1.0
    if sign is not None:
        square *= sign
    cosine /= square
    tangent *= 2.0
    tangent /= square
    return tangent, cosine


def layer_wave(wave: Wave, thickness: float, incidence: Incidence) -> LayerWave:
    """Return `wave` in a layer of `thickness` in m."""
    per_hertz = 2 * np.pi * thickness / SPEED_OF_LIGHT
    decay_rate = -wave.q.imag * per_hertz
    half_turns: FloatArray = wave.q.real * (per_hertz / np.pi)
    rest = None
    if wave.long_q is not None and incidence.index2.size == 1:
        turns = wave.long_q * np.longdouble(2 * thickness) / np.longdouble(SPEED_OF_LIGHT)
        half_turns = turns.astype(np.float64)
        rest = (turns - half_turns).astype(np.float64)
    return LayerWave(wave, thickness, half_turns, rest, decay_rate if decay_rate.any() else None, 1j / wave.q)


def _product_error(a: FloatArray, b: FloatArray, product: FloatArray) -> FloatArray:
    """Return a·b − fl(a·b) exactly. Source: T. J. Dekker, Numer. Math. 18, 224 (1971)."""
    a_high, a_low = _split(a)
    b_high, b_low = _split(b)
    return ((a_high * b_high - product) + a_high * b_low + a_low * b_high) + a_low * b_low


def _split(value: FloatArray) -> tuple[FloatArray, FloatArray]:
    shifted = value * 134217729.0  # 2²⁷ + 1
    high = shifted - (shifted - value)
    return high, value - high
