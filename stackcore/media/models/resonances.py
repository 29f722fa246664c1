"""Models of resonances, free carriers and refractive indices."""

from dataclasses import replace
from typing import Final

from stackcore.media.cauchy import CauchyMedium, CauchyTerm
from stackcore.media.drude import DrudeMedium
from stackcore.media.drude_lorentz import DrudeLorentzMedium
from stackcore.media.lorentz import LorentzMedium
from stackcore.media.models import limits
from stackcore.media.models.constants import Constant, Terms
from stackcore.media.models.kinds import Flag, Number, Quantity
from stackcore.media.models.model import Model
from stackcore.media.models.shared import (
    COLLISIONS,
    HIGH,
    LINEWIDTH,
    LORENTZ_TERMS,
    PLASMA,
    RESONANCE,
    STEP,
)
from stackcore.media.multi_lorentz import MultiLorentzMedium
from stackcore.media.plasma import PlasmaMedium
from stackcore.media.sellmeier import SellmeierMedium, SellmeierTerm

_POLES = Terms(
    (
        Constant("strength", "Strength", "B", Number(limits.STEP), "Of the term."),
        Constant(
            "pole_wavelength",
            "Pole",
            "λᵢ",
            Quantity(limits.WAVELENGTH),
            "Vacuum wavelength of the pole; where a catalogue prints C in µm², its root.",
        ),
    ),
    SellmeierTerm,
)
_POWERS = Terms(
    (
        Constant("coefficient", "Coefficient", "c", Number(limits.COEFFICIENT), "With the wavelength in µm."),
        Constant("exponent", "Exponent", "p", Number(limits.WHOLE_POWER, whole=True), "Of the wavelength in µm."),
    ),
    CauchyTerm,
    least=0,
)

MODELS: Final = (
    Model(
        "lorentz",
        "Lorentz resonance",
        "A bound charge with damping: lattice bands, electronic absorption.",
        LorentzMedium,
        (HIGH, STEP, RESONANCE, LINEWIDTH),
    ),
    Model(
        "multi-lorentz",
        "Several Lorentz resonances",
        "A sum of resonances: crystals and glasses in the infrared and ultraviolet.",
        MultiLorentzMedium,
        (HIGH, LORENTZ_TERMS),
    ),
    Model(
        "drude",
        "Drude metal",
        "Free carriers in a background: transparent conductors, doped semiconductors, metals in the infrared.",
        DrudeMedium,
        (HIGH, PLASMA, COLLISIONS),
    ),
    Model(
        "drude-lorentz",
        "Drude-Lorentz metal",
        "Free carriers and bound resonances: metals in the visible, not to be carried down to radio frequencies.",
        DrudeLorentzMedium,
        (HIGH, PLASMA, COLLISIONS, LORENTZ_TERMS),
    ),
    Model(
        "plasma",
        "Plasma",
        "A cold plasma of electrons, by their density.",
        PlasmaMedium,
        (
            Constant(
                "electron_density",
                "Electron density",
                "n",
                Quantity(limits.DENSITY),
                "Electrons in a cubic metre; 1e12 1/cm3 are 1e18 1/m3.",
            ),
            replace(COLLISIONS, about="Of electrons with the gas.", required=False),
        ),
    ),
    Model(
        "sellmeier",
        "Sellmeier formula",
        "The lossless index of crystals and glasses between their absorption bands.",
        SellmeierMedium,
        (
            Constant("terms", "Terms", "", _POLES, "The poles, each with its strength and wavelength."),
            Constant(
                "constant", "Constant", "A", Number(limits.COEFFICIENT), "1 in the original form.", required=False
            ),
            Constant(
                "quadratic",
                "Quadratic coefficient",
                "D",
                Number(limits.COEFFICIENT),
                "Of λ² with λ in µm; 0 in the original form.",
                required=False,
            ),
        ),
    ),
    Model(
        "cauchy",
        "Cauchy series",
        "The index as a power series in the wavelength, as glass makers publish it.",
        CauchyMedium,
        (
            Constant("constant", "Constant", "A", Number(limits.COEFFICIENT), "Of the series."),
            Constant("terms", "Powers", "", _POWERS, "The powers of the wavelength in µm.", required=False),
            Constant(
                "extinction",
                "Extinction",
                "k",
                Number(limits.EXTINCTION),
                "Of the index n − jk, the same at every wavelength.",
                required=False,
            ),
            Constant(
                "squared", "Series of n²", "", Flag(), "Whether the series gives n² instead of n.", required=False
            ),
        ),
    ),
)
"""In the order of menus."""
