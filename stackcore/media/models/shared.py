"""Constants that several models have."""

from typing import Final

from stackcore.media.models import limits
from stackcore.media.models.constants import Constant, Terms
from stackcore.media.models.kinds import Number, Quantity, Relative
from stackcore.media.multi_debye import RelaxationTerm
from stackcore.media.resonance import LorentzTerm

PERMITTIVITY: Final = Constant(
    "permittivity", "Permittivity", "ε", Relative(), "Relative: ε′, or with its loss ε′ − jε″.", varies=True
)
LOSS_TANGENT: Final = Constant(
    "loss_tangent",
    "Loss tangent",
    "tan δ",
    Number(limits.LOSS_TANGENT),
    "ε″/ε′; left out where the loss is part of ε.",
    required=False,
    varies=True,
)
PERMEABILITY: Final = Constant(
    "permeability", "Permeability", "μ", Relative(), "Relative: μ′, or with its loss μ′ − jμ″.", False, True
)
LOSS_CONDUCTIVITY: Final = Constant(
    "conductivity",
    "Conductivity",
    "σ",
    Quantity(limits.LOSS_CONDUCTIVITY),
    "Of mobile charges, beside the loss of the dipoles.",
    required=False,
)
HIGH: Final = Constant(
    "high_frequency_permittivity",
    "Permittivity far above",
    "ε∞",
    Number(limits.POSITIVE),
    "Far above all that the model holds.",
)
STEP: Final = Constant(
    "permittivity_step", "Step", "Δε", Number(limits.STEP), "What it adds to the static permittivity."
)
TIME: Final = Constant(
    "relaxation_time", "Relaxation time", "τ", Quantity(limits.TIME), "The loss peaks at 1/(2πτ)."
)
SYMMETRIC: Final = Constant(
    "symmetric_exponent",
    "Symmetric exponent",
    "a",
    Number(limits.EXPONENT),
    "Below 1 it broadens the loss peak on both sides; where a source prints α, a = 1 − α.",
)
ASYMMETRIC: Final = Constant(
    "asymmetric_exponent",
    "Asymmetric exponent",
    "b",
    Number(limits.EXPONENT),
    "Below 1 it broadens the loss peak on its upper side.",
)
RESONANCE: Final = Constant(
    "resonance_frequency",
    "Resonance",
    "f₀",
    Quantity(limits.FREQUENCY),
    "Where the loss of a narrow resonance peaks.",
)
LINEWIDTH: Final = Constant(
    "linewidth",
    "Linewidth",
    "Γ",
    Quantity(limits.FREQUENCY),
    "Full width at half the loss peak, in Hz; a damping rate in 1/s is 2πΓ.",
)
PLASMA: Final = Constant(
    "plasma_frequency",
    "Plasma frequency",
    "ω_p/2π",
    Quantity(limits.FREQUENCY),
    "Of the free carriers, not screened by ε∞.",
)
COLLISIONS: Final = Constant(
    "collision_rate",
    "Collision rate",
    "ν",
    Quantity(limits.RATE),
    "Of the carriers, in 1/s: the inverse of their relaxation time.",
)
LORENTZ_TERMS: Final = Constant(
    "terms",
    "Oscillators",
    "",
    Terms((STEP, RESONANCE, LINEWIDTH), LorentzTerm),
    "The bound resonances, each with step, place and width.",
)
DEBYE_TERMS: Final = Constant(
    "terms",
    "Relaxations",
    "",
    Terms((STEP, TIME), RelaxationTerm),
    "The relaxations, each with its step and its time.",
)
TEMPERATURE: Final = Constant("temperature", "Temperature", "T", Quantity(limits.TEMPERATURE), "Of the material.")
