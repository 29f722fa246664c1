"""Water, ice, tables, mixtures and joined media with every constant in play, and the frequencies to look at."""

import numpy as np

from stackcore.arrays import FloatArray
from stackcore.media.base import AbstractMedium
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.media.debye import DebyeMedium
from stackcore.media.ice import IceMedium
from stackcore.media.joined import JoinedMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.mixing_rules import RULES
from stackcore.media.mixture import Inclusion, MixtureMedium
from stackcore.media.sea_water import SeaWaterMedium
from stackcore.media.tabulated import TabulatedMedium
from stackcore.media.temperature import celsius
from stackcore.media.water import EllisonWaterMedium, LiebeWaterMedium

RADIO: FloatArray = np.array([1.3e7, 1.5e8, 1.1e9, 2.05e9, 7e9, 2.9e10, 4e11])

LIQUID = DebyeMedium(4.0, 70.0, 8e-12, 0.5)
RESIN = ConstantMedium(3.2 - 0.05j)
SOOT = ConductorMedium(30.0)
FERRITE = MagneticDebyeMedium(1.1, 20.0, 1e-10)
MAGNETIC_RESIN = ConstantMedium(3.2 - 0.05j, 1.5 - 0.1j)

TABLE_ROWS: FloatArray = np.geomspace(1e7, 5e11, 40)
TABLE = TabulatedMedium.from_arrays(
    TABLE_ROWS, LIQUID.evaluate(TABLE_ROWS).permittivity, FERRITE.evaluate(TABLE_ROWS).permeability
)

WATERS: dict[str, AbstractMedium] = {
    "Liebe water": LiebeWaterMedium(celsius(12.0)),
    "Ellison water": EllisonWaterMedium(celsius(37.0)),
    "sea water": SeaWaterMedium(celsius(15.0), 33.0),
    "sea water without salt": SeaWaterMedium(celsius(15.0), 0.0),
    "ice": IceMedium(celsius(-8.0)),
    "cold ice": IceMedium(225.0),
}

TABLES: dict[str, AbstractMedium] = {"table": TABLE}

MIXTURES: dict[str, AbstractMedium] = {
    **{f"{rule} of two": MixtureMedium(RESIN, (Inclusion(LIQUID, 0.2),), rule) for rule in RULES},
    **{
        f"{rule} of three": MixtureMedium(RESIN, (Inclusion(LIQUID, 0.3), Inclusion(SOOT, 0.3)), rule)
        for rule in RULES
    },
    **{f"magnetic {rule}": MixtureMedium(MAGNETIC_RESIN, (Inclusion(FERRITE, 0.4),), rule) for rule in RULES},
    "mixture of a mixture": MixtureMedium(
        LIQUID, (Inclusion(MixtureMedium(RESIN, (Inclusion(SOOT, 0.1),), "bruggeman"), 0.6),), "looyenga"
    ),
}

JOINED: dict[str, AbstractMedium] = {
    "joined": JoinedMedium((SOOT, LIQUID, MAGNETIC_RESIN), (1e8, 1e10)),
    "joined mixture": JoinedMedium((MIXTURES["bruggeman of two"], RESIN), (1e9,)),
}

COMPOUNDS: dict[str, AbstractMedium] = {**WATERS, **TABLES, **MIXTURES, **JOINED}
