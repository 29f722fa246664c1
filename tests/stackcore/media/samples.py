"""One medium of each model with every constant in play, the frequencies it is looked at, and what is causal."""

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.constants import SPEED_OF_LIGHT
from stackcore.media.base import AbstractMedium
from stackcore.media.cauchy import CauchyMedium, CauchyTerm
from stackcore.media.cole_cole import ColeColeMedium
from stackcore.media.cole_davidson import ColeDavidsonMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.drude import DrudeMedium
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.havriliak_negami import HavriliakNegamiMedium
from stackcore.media.lorentz import LorentzMedium
from stackcore.media.lossy_dielectric import LossyDielectricMedium
from stackcore.media.magnetic import MagneticMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.magnetic_lorentz import MagneticLorentzMedium
from stackcore.media.multi_debye import MultiDebyeMedium, RelaxationTerm
from stackcore.media.multi_lorentz import MultiLorentzMedium
from stackcore.media.plasma import PlasmaMedium
from stackcore.media.power_law import PowerLawMedium
from stackcore.media.resonance import LorentzTerm
from stackcore.media.sellmeier import SellmeierMedium
from stackcore.media.wideband import WidebandMedium, WidebandStepMedium

NANOSECOND = 1e-9
OSCILLATORS = (LorentzTerm(3.0, 2e9, 4e8), LorentzTerm(0.7, 3e10, 5e9))

CAUSAL: dict[str, AbstractMedium] = {
    "lossy_dielectric with conductivity alone": LossyDielectricMedium(5.0, conductivity=0.3),
    "conductor": ConductorMedium(3e3),
    "conductor with slow carriers": ConductorMedium(2.0, 1.0, relaxation_time=1e-10),
    "debye": DebyeMedium(2.0, 8.0, NANOSECOND, 0.02),
    "multi_debye": MultiDebyeMedium(3.0, (RelaxationTerm(6.0, 1e-9), RelaxationTerm(2.0, 1e-11)), 0.01),
    "cole_cole": ColeColeMedium(2.0, 8.0, NANOSECOND, 0.7, 0.02),
    "cole_davidson": ColeDavidsonMedium(2.0, 8.0, NANOSECOND, 0.5, 0.02),
    "havriliak_negami": HavriliakNegamiMedium(2.0, 8.0, NANOSECOND, 0.8, 0.6, 0.02),
    "havriliak_negami, second exponent above 1": HavriliakNegamiMedium(2.0, 8.0, NANOSECOND, 0.5, 1.9, 0.02),
    "wideband": WidebandMedium(4.3, 0.02, 1e9, 1e5, 1e12),
    "wideband_step": WidebandStepMedium(3.9, 0.6, 1e5, 1e12),
    "lorentz": LorentzMedium(1.5, 3.0, 2e9, 4e8),
    "multi_lorentz": MultiLorentzMedium(1.5, OSCILLATORS),
    "drude": DrudeMedium(4.0, 2e10, 1e10),
    "drude_lorentz": DrudeLorentzMedium(1.0, 1e10, 4e9, OSCILLATORS),
    "plasma": PlasmaMedium(2e17, 5e8),
    "magnetic_debye": MagneticDebyeMedium(1.1, 30.0, NANOSECOND),
    "magnetic_lorentz": MagneticLorentzMedium(1.2, 4.0, 2e9, 1e9),
    "magnetic": MagneticMedium(DebyeMedium(8.0, 5.0, NANOSECOND, 0.01), MagneticLorentzMedium(1.2, 4.0, 2e9, 1e9)),
}
"""Media whose ε′ and μ′ follow from their loss."""

NOT_CAUSAL: dict[str, AbstractMedium] = {
    "constant": ConstantMedium(4.2 - 0.3j, 2.0 - 0.1j),
    "constant by loss tangent": ConstantMedium.with_loss_tangent(4.2, 0.02, 2.0 - 0.1j),
    "lossy_dielectric by loss tangent": LossyDielectricMedium(5.0, 0.02, conductivity=0.3, permeability=2 - 0.2j),
    "lossy_dielectric by loss part": LossyDielectricMedium(5.0, loss_part=0.1, conductivity=0.3),
    "conductor with roughness": ConductorMedium(5.8e7, 3 - 0.2j, relaxation_time=1e-12, roughness=1e-6),
    "conductor with Groiss roughness": ConductorMedium(5.8e7, 2.0, roughness=1e-6, roughness_rule="groiss"),
    "power_law": PowerLawMedium(15.0, -0.1, 0.035, 1.63),
}
"""Media fitted over a band, without regard to what must follow outside it."""

OPTICAL: dict[str, AbstractMedium] = {
    "sellmeier": SellmeierMedium.from_micrometres([(2.8, 0.12), (0.9, 9.0)], constant=1.1, quadratic=-0.00711),
    "cauchy": CauchyMedium(1.5, (CauchyTerm(-0.003, 2), CauchyTerm(0.004, -2)), 0.01),
    "cauchy of the square": CauchyMedium(2.3, (CauchyTerm(-0.01, 2), CauchyTerm(0.011, -4)), 0.01, squared=True),
}
"""Index formulas, in the visible and near infrared."""

MEDIA: dict[str, AbstractMedium] = {**CAUSAL, **NOT_CAUSAL, **OPTICAL}

RADIO: FloatArray = np.array([1e7, 1.5e8, 1.1e9, 2.05e9, 7e9, 2.9e10, 4e11])
LIGHT: FloatArray = SPEED_OF_LIGHT / np.array([3.1e-6, 1.6e-6, 1.1e-6, 0.55e-6, 0.4e-6])


def frequencies_of(name: str) -> FloatArray:
    """Return frequencies in Hz at which a medium of `MEDIA` is to be looked at."""
    return LIGHT if name in OPTICAL else RADIO
