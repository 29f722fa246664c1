"""The conventions every number rests on, stated once.

The window shows these sentences, exports that have room for them stamp them, and abstract classes refer to
them instead of repeating them.
"""

from typing import Final

TIME_FACTOR: Final = "exp(+jωt)"
POLARIZATIONS: Final = ("TE", "TM")

CONVENTIONS: Final[dict[str, str]] = {
    "time": (
        "Fields vary as exp(+jωt); relative permittivity is ε = ε′ − jε″ and relative permeability is "
        "μ = μ′ − jμ″, so that loss is a positive number."
    ),
    "angle": (
        "The angle of incidence is measured from the normal, in the front half-space. TE has the electric "
        "field perpendicular to the plane of incidence, TM has it in that plane."
    ),
    "coefficients": (
        "r and t are ratios of the tangential electric field, so TE and TM agree at normal incidence."
    ),
    "polarizations": (
        "A circular or tilted wave is a sum of TE and TM. A tilt is measured from the electric field of TE toward "
        "that of TM. Its powers are the means of those of TE and TM, half and half for circular, cos² and sin² of "
        "the tilt for linear; losses are those of the mean power; phases and delays are of the co-polar part."
    ),
    "amplitudes": (
        "Co- and cross-polar parts are sums of the full fields, normalised to power: the tangential field of TM is "
        "only cos θ of its full field, so between different half-spaces r and t are not added as they are."
    ),
    "co-polar": (
        "Co-polar is the polarization of the incident wave, cross-polar the one orthogonal to it, each wave seen "
        "along its own direction of propagation (the sense of IEEE Std 145). A circular wave reflected by a metal "
        "plate turns its handedness and is cross-polar; its co-polar reflected part is (r of TM − r of TE)/2, "
        "the co-polar transmitted part (t of TE + t of TM)/2 in full fields."
    ),
    "planes": (
        "Phases refer to the two outer faces. Insertion phase delay is −(arg t + k₀·D·cos θ) with D the total "
        "thickness: the delay beyond the air that the stack displaces, positive when later."
    ),
    "power": "Reflectance, transmittance and absorptance are fractions of the incident power.",
    "decibels": (
        "Return loss, insertion loss and shielding effectiveness are positive decibels. Insertion loss and "
        "shielding effectiveness compare the wave with the stack to the bare meeting of the two half-spaces."
    ),
    "group delay": "Group delay is −d(arg t)/dω of the transmission between the faces, found analytically.",
}
"""Name of the convention -> the sentence shown for it."""
