"""Models of dielectrics and conductors from radio frequencies up."""

from dataclasses import replace
from typing import Any, Final

from stackcore.media.base import AbstractMedium
from stackcore.media.cole_cole import ColeColeMedium
from stackcore.media.cole_davidson import ColeDavidsonMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.havriliak_negami import HavriliakNegamiMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from stackcore.media.models import limits
from stackcore.media.models.constants import Constant
from stackcore.media.models.kinds import Choice, Number, Quantity
from stackcore.media.models.model import Media, Model
from stackcore.media.models.shared import (
    ASYMMETRIC,
    DEBYE_TERMS,
    HIGH,
    LOSS_CONDUCTIVITY,
    LOSS_TANGENT,
    PERMEABILITY,
    PERMITTIVITY,
    STEP,
    SYMMETRIC,
    TIME,
)
from stackcore.media.multi_debye import MultiDebyeMedium
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.roughness import ROUGHNESS_RULES
from stackcore.media.wideband import WidebandMedium, WidebandStepMedium


def _constant(
    medium: type[ConstantMedium], values: dict[str, Any], extras: dict[str, Any], media: Media
) -> AbstractMedium:
    permittivity, permeability = values["permittivity"], values.get("permeability", 1.0 + 0.0j)
    tangent = values.get("loss_tangent")
    if tangent is None or (tangent == 0 and permittivity.real < 0):
        return medium(permittivity, permeability, **extras)
    if permittivity.imag:
        raise ValueError("the dielectric loss is given twice, by loss_tangent and by [real, loss]")
    return medium.with_loss_tangent(permittivity.real, tangent, permeability, **extras)


def _lossy_dielectric(
    medium: type[LossyDielectricMedium], values: dict[str, Any], extras: dict[str, Any], media: Media
) -> AbstractMedium:
    permittivity = values.pop("permittivity")
    if permittivity.imag:
        if "loss_tangent" in values:
            raise ValueError("the dielectric loss is given twice, by loss_tangent and by [real, loss]")
        values["loss_part"] = -permittivity.imag
    return medium(permittivity.real, **values, **extras)


_REAL = Constant(
    "permittivity", "Permittivity", "ε′", Number(limits.POSITIVE), "Real part at the reference frequency."
)
_CORNERS = (
    Constant(
        "lower_frequency",
        "Lower corner",
        "f₁",
        Quantity(limits.FREQUENCY),
        "Far below what is computed.",
        start="1 kHz",
    ),
    Constant(
        "upper_frequency",
        "Upper corner",
        "f₂",
        Quantity(limits.FREQUENCY),
        "Far above what is computed.",
        start="1 THz",
    ),
)

MODELS: Final = (
    Model(
        "constant",
        "Constant",
        "The same ε and μ at every frequency: a narrow band, or a first guess.",
        ConstantMedium,
        (PERMITTIVITY, LOSS_TANGENT, PERMEABILITY),
        _constant,
    ),
    Model(
        "lossy-dielectric",
        "Dielectric with conductivity",
        "A dielectric with its own loss and a conductivity beside it: soil, concrete, filled plastics.",
        LossyDielectricMedium,
        (PERMITTIVITY, LOSS_TANGENT, replace(LOSS_CONDUCTIVITY, varies=True), PERMEABILITY),
        _lossy_dielectric,
    ),
    Model(
        "conductor",
        "Conductor",
        "A metal by its conductivity, with slow carriers and a rough surface if wanted.",
        ConductorMedium,
        (
            Constant(
                "conductivity",
                "Conductivity",
                "σ",
                Quantity(limits.CONDUCTIVITY),
                "More than 0; 59.6 MS/m or 100 %IACS.",
                varies=True,
            ),
            PERMEABILITY,
            Constant(
                "relaxation_time",
                "Time between collisions",
                "τ",
                Quantity(limits.TIME_OR_NONE),
                "Some 10 fs in good metals; matters above a terahertz.",
                required=False,
            ),
            Constant(
                "roughness",
                "Roughness",
                "Δ",
                Quantity(limits.LENGTH_OR_NONE),
                "Rms height of the surface; it raises the surface resistance.",
                required=False,
            ),
            Constant(
                "roughness_rule",
                "Rule for roughness",
                "",
                Choice(ROUGHNESS_RULES),
                "Which published rule counts the roughness.",
                required=False,
            ),
        ),
    ),
    Model(
        "debye",
        "Debye relaxation",
        "Dipoles with one relaxation time: simple polar liquids up to some tens of gigahertz.",
        DebyeMedium,
        (HIGH, STEP, TIME, LOSS_CONDUCTIVITY),
    ),
    Model(
        "multi-debye",
        "Several Debye relaxations",
        "A sum of relaxations; it can fit any passive relaxation over a finite band.",
        MultiDebyeMedium,
        (HIGH, DEBYE_TERMS, LOSS_CONDUCTIVITY),
    ),
    Model(
        "cole-cole",
        "Cole-Cole relaxation",
        "A relaxation broadened on both sides: polymers and moist matter.",
        ColeColeMedium,
        (HIGH, STEP, TIME, SYMMETRIC, LOSS_CONDUCTIVITY),
    ),
    Model(
        "cole-davidson",
        "Cole-Davidson relaxation",
        "A relaxation broadened on its upper side: glass-forming liquids and resins.",
        ColeDavidsonMedium,
        (HIGH, STEP, TIME, ASYMMETRIC, LOSS_CONDUCTIVITY),
    ),
    Model(
        "havriliak-negami",
        "Havriliak-Negami relaxation",
        "A relaxation broadened on either side as measured.",
        HavriliakNegamiMedium,
        (HIGH, STEP, TIME, SYMMETRIC, replace(ASYMMETRIC, kind=Number(limits.WIDE_EXPONENT)), LOSS_CONDUCTIVITY),
    ),
    Model(
        "wideband",
        "Wideband through a data sheet's point",
        "A nearly constant loss tangent that is causal, through ε and tan δ at one frequency: circuit laminates.",
        WidebandMedium,
        (
            _REAL,
            replace(LOSS_TANGENT, required=True, about="ε″/ε′ at the reference frequency.", varies=False),
            Constant(
                "reference_frequency",
                "Reference frequency",
                "f₀",
                Quantity(limits.FREQUENCY),
                "Where the data sheet gives ε and tan δ.",
            ),
            *(corner.optional() for corner in _CORNERS),
        ),
    ),
    Model(
        "wideband-step",
        "Wideband by its step",
        "The same shape as 'wideband', given by its whole step between the corners.",
        WidebandStepMedium,
        (HIGH, STEP, *_CORNERS),
    ),
    Model(
        "power-law",
        "Power law of building materials",
        "ε and σ as powers of frequency, as ITU-R P.2040 gives them; the edition belongs into the source.",
        PowerLawMedium,
        (
            replace(_REAL, symbol="a", about="ε′ at 1 GHz."),
            Constant("permittivity_exponent", "Exponent of ε", "b", Number(limits.POWER), "Mostly 0."),
            replace(LOSS_CONDUCTIVITY, symbol="c", about="σ at 1 GHz.", required=True),
            Constant(
                "conductivity_exponent", "Exponent of σ", "d", Number(limits.POWER), "How σ rises with frequency."
            ),
        ),
    ),
)
"""In the order of menus."""
