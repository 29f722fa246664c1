"""Quantities that are shown and read but are no columns of the CSV.

Books and standards are named from memory, for their definitions; nothing is quoted from them.
"""

from typing import Final

from stackcore.quantities import coefficients, ellipse
from stackcore.quantities.quantity import Quantity, by_parts

COEFFICIENTS: Final = "Coefficients and match"
POLARIZATION: Final = "Polarization"

_POZAR: Final = "D. M. Pozar, Microwave Engineering, 4th ed. (2012), section 2.3"
_WAVE_IMPEDANCE: Final = "C. A. Balanis, Advanced Engineering Electromagnetics, 2nd ed. (2012), chapter 5"
_IEEE_145: Final = "IEEE Std 145-2013, Definitions of Terms for Antennas"
_P310: Final = "Recommendation ITU-R P.310, Definitions of terms"

_COEFFICIENT_SIGN: Final = (
    "For exp(+jωt), tangential field, at the outer faces; of a circular or tilted wave the co-polar amplitude, "
    "normalised to power."
)
_IMPEDANCE_SIGN: Final = (
    "At the front face, for exp(+jωt): a positive reactance is inductive. Infinite where the face is open. "
    "It belongs to TE and to TM apart; a mixture has one at normal incidence only."
)
_SENSE: Final = (
    "Co-polar has the handedness of the incident circular wave, each seen along its own way, or the direction of "
    "the incident linear one"
)

FURTHER: Final = (
    Quantity(
        "standing_wave_ratio",
        "Standing wave ratio (VSWR)",
        "VSWR",
        "",
        "(1 + |r|)/(1 − |r|): largest over smallest field of the standing wave in front of the stack.",
        "1 without reflection, infinite at total reflection.",
        lambda response: coefficients.standing_wave_ratio(response.return_loss_dB),
        coefficients.mixed_standing_wave_ratio,
        COEFFICIENTS,
        _POZAR,
        needs=("return_loss_dB",),
    ),
    Quantity(
        "reflection_real",
        "Real part of r",
        "Re r",
        "",
        "Real part of the reflection coefficient.",
        _COEFFICIENT_SIGN,
        lambda response: response.reflection.real,
        lambda response, polarization: coefficients.copolar_reflection(response, polarization).real,
        COEFFICIENTS,
    ),
    Quantity(
        "reflection_imaginary",
        "Imaginary part of r",
        "Im r",
        "",
        "Imaginary part of the reflection coefficient.",
        _COEFFICIENT_SIGN,
        lambda response: response.reflection.imag,
        lambda response, polarization: coefficients.copolar_reflection(response, polarization).imag,
        COEFFICIENTS,
    ),
    Quantity(
        "transmission_real",
        "Real part of t",
        "Re t",
        "",
        "Real part of the transmission coefficient between the outer faces.",
        _COEFFICIENT_SIGN,
        lambda response: response.transmission.real,
        lambda response, polarization: coefficients.copolar_transmission(response, polarization).real,
        COEFFICIENTS,
    ),
    Quantity(
        "transmission_imaginary",
        "Imaginary part of t",
        "Im t",
        "",
        "Imaginary part of the transmission coefficient between the outer faces.",
        _COEFFICIENT_SIGN,
        lambda response: response.transmission.imag,
        lambda response, polarization: coefficients.copolar_transmission(response, polarization).imag,
        COEFFICIENTS,
    ),
    Quantity(
        "transmission_magnitude_dB",
        "Magnitude of t",
        "|t|",
        "dB",
        "20 log₁₀ of the transmission coefficient's magnitude; equal to T in dB between equal half-spaces.",
        "Of field, negative for less than the incident one. " + _COEFFICIENT_SIGN,
        coefficients.transmission_magnitude_dB,
        ellipse.copolar_transmittance_dB,
        COEFFICIENTS,
    ),
    Quantity(
        "input_resistance_ohm",
        "Input resistance",
        "Re Z",
        "ohm",
        "Real part of the wave impedance that the incident wave finds: tangential E over tangential H.",
        _IMPEDANCE_SIGN,
        lambda response: response.input_impedance.real,
        lambda response, _: coefficients.mixed_input_impedance(response).real,
        COEFFICIENTS,
        _WAVE_IMPEDANCE,
        needs=("input_impedance",),
    ),
    Quantity(
        "input_reactance_ohm",
        "Input reactance",
        "Im Z",
        "ohm",
        "Imaginary part of the wave impedance that the incident wave finds: tangential E over tangential H.",
        _IMPEDANCE_SIGN,
        lambda response: response.input_impedance.imag,
        lambda response, _: coefficients.mixed_input_impedance(response).imag,
        COEFFICIENTS,
        _WAVE_IMPEDANCE,
        needs=("input_impedance",),
    ),
    Quantity(
        "input_impedance_ohm",
        "Input impedance",
        "|Z|",
        "ohm",
        "Magnitude of the wave impedance that the incident wave finds: tangential E over tangential H.",
        _IMPEDANCE_SIGN,
        lambda response: coefficients.magnitude(response.input_impedance),
        lambda response, _: coefficients.magnitude(coefficients.mixed_input_impedance(response)),
        COEFFICIENTS,
        _WAVE_IMPEDANCE,
        needs=("input_impedance",),
    ),
    Quantity(
        "copolar_transmittance_dB",
        "Co-polar transmittance",
        "T co",
        "dB",
        "10 log₁₀ of the part of the incident power that passes in the polarization of the incident wave.",
        _SENSE + ". Of power, 0 or less.",
        by_parts(ellipse.copolar_transmittance_dB),
        ellipse.copolar_transmittance_dB,
        POLARIZATION,
        _IEEE_145,
    ),
    Quantity(
        "crosspolar_transmittance_dB",
        "Cross-polar transmittance",
        "T cross",
        "dB",
        "10 log₁₀ of the part of the incident power that passes orthogonal to the incident polarization.",
        _SENSE + "; cross-polar is the rest. None of TE or TM alone.",
        by_parts(ellipse.crosspolar_transmittance_dB),
        ellipse.crosspolar_transmittance_dB,
        POLARIZATION,
        _IEEE_145,
        needs_both=True,
    ),
    Quantity(
        "copolar_reflectance_dB",
        "Co-polar reflectance",
        "R co",
        "dB",
        "10 log₁₀ of the part of the incident power that is reflected in the polarization of the incident wave.",
        _SENSE + ": a metal plate reflects a circular wave all cross-polar.",
        by_parts(ellipse.copolar_reflectance_dB),
        ellipse.copolar_reflectance_dB,
        POLARIZATION,
        _IEEE_145,
    ),
    Quantity(
        "crosspolar_reflectance_dB",
        "Cross-polar reflectance",
        "R cross",
        "dB",
        "10 log₁₀ of the part of the incident power that is reflected orthogonal to the incident polarization.",
        _SENSE + ": a metal plate reflects a circular wave all cross-polar. None of TE or TM alone.",
        by_parts(ellipse.crosspolar_reflectance_dB),
        ellipse.crosspolar_reflectance_dB,
        POLARIZATION,
        _IEEE_145,
        needs_both=True,
    ),
    Quantity(
        "cross_polar_discrimination_dB",
        "Cross-polar discrimination",
        "XPD",
        "dB",
        "10 log₁₀ of the co-polar over the cross-polar transmitted power, for a purely polarized incident wave.",
        "Positive decibels when most stays co-polar; infinite when all does, as at normal incidence.",
        by_parts(ellipse.cross_polar_discrimination_dB),
        ellipse.cross_polar_discrimination_dB,
        POLARIZATION,
        _P310,
        needs_both=True,
    ),
    Quantity(
        "transmitted_axial_ratio_dB",
        "Axial ratio, transmitted",
        "AR",
        "dB",
        "20 log₁₀ of the long over the short axis of the ellipse that the transmitted field runs through.",
        "0 dB is circular and infinite is linear; which way it turns is not said.",
        by_parts(ellipse.transmitted_axial_ratio_dB),
        ellipse.transmitted_axial_ratio_dB,
        POLARIZATION,
        _IEEE_145,
        needs_both=True,
    ),
    Quantity(
        "reflected_axial_ratio_dB",
        "Axial ratio, reflected",
        "AR refl",
        "dB",
        "20 log₁₀ of the long over the short axis of the ellipse that the reflected field runs through.",
        "0 dB is circular and infinite is linear; which way it turns is not said.",
        by_parts(ellipse.reflected_axial_ratio_dB),
        ellipse.reflected_axial_ratio_dB,
        POLARIZATION,
        _IEEE_145,
        needs_both=True,
    ),
    Quantity(
        "transmission_phase_difference_deg",
        "Transmission phase, TE − TM",
        "Δ arg t",
        "deg",
        "Angle of t for TE minus that for TM.",
        "From −180 to 180 degrees; positive when TM comes later. The same for every incident polarization.",
        ellipse.transmission_phase_difference_deg,
        lambda response, _: ellipse.transmission_phase_difference_deg(response)[..., 0],
        POLARIZATION,
    ),
    Quantity(
        "reflection_phase_difference_deg",
        "Reflection phase, TE − TM",
        "Δ arg r",
        "deg",
        "Angle of r for TE minus that for TM.",
        "From −180 to 180 degrees, tangential fields; the same for every incident polarization.",
        ellipse.reflection_phase_difference_deg,
        lambda response, _: ellipse.reflection_phase_difference_deg(response)[..., 0],
        POLARIZATION,
    ),
)
