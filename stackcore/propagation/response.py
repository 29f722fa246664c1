"""What a stack does to a plane wave, over frequencies and angles, both polarizations."""

from dataclasses import dataclass
from functools import cached_property
from typing import TypeVar

import numpy as np
from numpy.typing import NDArray

from stackcore.arrays import ComplexArray, FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.propagation import delay, dissipation, entrance, passing
from stackcore.stack import PerfectConductor, Stack

_Number = TypeVar("_Number", np.float64, np.complex128)

_DB_PER_NEPER = 20 / np.log(10)
_WEAK_LOSS = 0.05
"""Nepers below which a loss is found from its small causes instead of from the logarithm of a ratio."""


@dataclass(frozen=True, eq=False)
class Response:
    """The answer of `stackcore.solve`.

    All arrays are (F, A, 2): frequency, angle, polarization (TE, TM). Names are those of the CSV columns; signs
    and reference planes are those of `stackcore.conventions`. What is not asked for is not computed; what was
    computed is kept.

    Attributes
    ----------
    stack
        What was solved.
    frequency, angle
        (F,) in Hz and (A,) in rad.
    """

    stack: Stack
    frequency: FloatArray
    angle: FloatArray
    # The solver's own arrays are (2, A, F).
    _reflection: ComplexArray
    _log_transmission: ComplexArray
    _log_ratio: FloatArray
    _bare_transmittance: FloatArray

    def knows(self, name: str) -> bool:
        """Return whether the attribute `name` can be had without computing: it was asked for before, or is free."""
        name = "insertion_loss_dB" if name == "shielding_effectiveness_dB" else name
        return name in vars(self) or name in ("reflection", "log_transmission", "bare_transmittance")

    @property
    def reflection(self) -> ComplexArray:
        """Complex r of the tangential electric field at the front face."""
        return _outward(self._reflection)

    @property
    def log_transmission(self) -> ComplexArray:
        """ln t, finite for a wall of any depth; −inf behind a metal back or a short circuit."""
        return _outward(self._log_transmission)

    @cached_property
    def transmission(self) -> ComplexArray:
        """Complex t of the tangential electric field between the two outer faces; 0 when below 1e-308."""
        return _outward(np.exp(self._log_transmission))

    @cached_property
    def reflectance(self) -> FloatArray:
        """Reflected part of the incident power."""
        return _outward(self._reflectance)

    @cached_property
    def transmittance(self) -> FloatArray:
        """Part of the incident power that enters the back half-space."""
        return _outward(self._transmittance)

    @property
    def bare_transmittance(self) -> FloatArray:
        """Transmittance without the stack: of the bare meeting of the two half-spaces."""
        return _outward(self._bare_transmittance)

    @cached_property
    def log_transmittance(self) -> FloatArray:
        """ln T, finite for a wall of any depth; −inf where no wave runs behind the stack."""
        with np.errstate(divide="ignore"):
            bare = np.log(np.maximum(self._bare_transmittance, 0.0))
        return _outward(bare - 2 * self._log_ratio)

    @cached_property
    def input_impedance(self) -> ComplexArray:
        """Tangential E over tangential H at the front face in ohm; both parts `inf` where the face is open."""
        arrived = self._transmittance + self._absorptance
        return _outward(entrance.input_impedance(self.stack, self.frequency, self.angle, arrived))

    @cached_property
    def amplitude_slope(self) -> ComplexArray:
        """d/df of ln of the transmitted amplitude normalised to power, per Hz; its phase is that of t."""
        return _outward(delay.amplitude_slope(self.stack, self.frequency, self.angle))

    @cached_property
    def absorptance(self) -> FloatArray:
        """Part of the incident power lost in the stack, summed over its elements."""
        return _outward(self._absorptance)

    @cached_property
    def element_absorptance(self) -> FloatArray:
        """Part of the incident power lost in each element, (F, A, 2, elements)."""
        parts = dissipation.element_absorptance(self.stack, self.frequency, self.angle)
        return np.transpose(parts, (3, 2, 1, 0))

    @cached_property
    def return_loss_dB(self) -> FloatArray:
        """−10 log₁₀ of the reflectance; `inf` where nothing is reflected."""
        reflected = self._reflectance
        kept = np.where(reflected > 0.5, self._transmittance + self._absorptance, 0.5)
        with np.errstate(divide="ignore"):
            logarithm = np.where(reflected > 0.5, np.log1p(-np.minimum(kept, 0.75)), np.log(reflected))
        return _outward(-0.5 * _DB_PER_NEPER * logarithm + 0.0)

    @cached_property
    def insertion_loss_dB(self) -> FloatArray:
        """10 log₁₀ of transmittance without the stack over that with it; `inf` where nothing passes."""
        return _outward(_DB_PER_NEPER * self._loss)

    @property
    def shielding_effectiveness_dB(self) -> FloatArray:
        """20 log₁₀ of the field behind without the stack over that with it.

        The half-space behind is the same in both, so that this is the insertion loss.
        """
        return self.insertion_loss_dB

    @cached_property
    def reflection_phase_deg(self) -> FloatArray:
        """Angle of r in degrees, −180 to 180."""
        return _outward(np.degrees(np.angle(self._reflection)))

    @cached_property
    def transmission_phase_deg(self) -> FloatArray:
        """Angle of t in degrees, −180 to 180; 0 behind a metal back."""
        phase = self._log_transmission.imag
        return _outward(np.degrees(phase - 2 * np.pi * np.rint(phase / (2 * np.pi))))

    @cached_property
    def insertion_phase_delay_deg(self) -> FloatArray:
        """−(arg t + k₀ D cos θ) in degrees with all its turns; 0 behind a metal back."""
        if isinstance(self.stack.back, PerfectConductor):
            return _outward(np.zeros(self._log_ratio.shape))
        phase = self._log_transmission.imag
        turns = np.rint((passing.turned_phase(self.stack, self.frequency, self.angle) - phase) / (2 * np.pi))
        # In turns and with guard digits: behind a thick wall the delay is the rest of two phases of 10⁸ degrees.
        air = np.longdouble(self.stack.thickness) / np.longdouble(SPEED_OF_LIGHT) * self.frequency
        across = np.cos(self.angle.astype(np.longdouble))[:, np.newaxis] * air
        return _outward(-(np.degrees(phase) + 360 * (turns + across).astype(np.float64)))

    @cached_property
    def group_delay_s(self) -> FloatArray:
        """−d(arg t)/dω in s, analytic; 0 behind a metal back."""
        return -self.amplitude_slope.imag / (2 * np.pi) + 0.0  # no minus zero behind a metal back

    @cached_property
    def _reflectance(self) -> FloatArray:
        reflectance: FloatArray = self._reflection.real**2 + self._reflection.imag**2
        return reflectance

    @cached_property
    def _transmittance(self) -> FloatArray:
        # + 0.0: no minus zero where the wave behind is evanescent
        return np.asarray(self._bare_transmittance * np.exp(-2 * self._log_ratio) + 0.0)

    @cached_property
    def _absorptance(self) -> FloatArray:
        if self.knows("element_absorptance"):
            return np.transpose(self.element_absorptance.sum(axis=-1))
        return dissipation.absorptance(self.stack, self.frequency, self.angle)

    @cached_property
    def _loss(self) -> FloatArray:
        """ln |t without the stack / t|, with its digits also where it is small."""
        weak = np.abs(self._log_ratio) < _WEAK_LOSS
        if not weak.any():
            return self._log_ratio
        if self.stack.front == self.stack.back:
            lost = np.where(weak, self._reflectance + self._absorptance, 0.0)
            precise = -0.5 * np.log1p(-lost)
        else:
            precise = passing.weak_loss(self.stack, self.frequency, self.angle)
        return np.where(weak & ~np.isnan(precise), precise, self._log_ratio)


def _outward(values: NDArray[_Number]) -> NDArray[_Number]:
    """Return the solver's (2, A, F) in the order users get, (F, A, 2)."""
    return np.transpose(values)
