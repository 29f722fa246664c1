"""Models of magnetic matter and water, tables of measured data, and materials made of others."""

import re
from dataclasses import replace
from typing import Any, Final

from stackcore.errors import Fault, InputError
from stackcore.media.base import AbstractMedium
from stackcore.media.ice import IceMedium
from stackcore.media.joined import JoinedMedium
from stackcore.media.magnetic import MagneticMedium
from stackcore.media.magnetic_debye import MagneticDebyeMedium
from stackcore.media.magnetic_lorentz import MagneticLorentzMedium
from stackcore.media.mixing_rules import RULES
from stackcore.media.mixture import Inclusion, MixtureMedium
from stackcore.media.models import limits
from stackcore.media.models.constants import Constant, Terms
from stackcore.media.models.kinds import Choice, Number, Quantity, Reference
from stackcore.media.models.model import Media, Model
from stackcore.media.models.shared import LINEWIDTH, PERMEABILITY, PERMITTIVITY, RESONANCE, TEMPERATURE, TIME
from stackcore.media.sea_water import SeaWaterMedium
from stackcore.media.tabulated import TabulatedMedium
from stackcore.media.water import EllisonWaterMedium, LiebeWaterMedium

MOST_ROWS: Final = 20_000
"""Of a table of measured data."""


def _magnetic(
    medium: type[MagneticMedium], values: dict[str, Any], extras: dict[str, Any], media: Media
) -> AbstractMedium:
    return medium(media[values["permittivity_from"]], media[values["permeability_from"]], **extras)


def _tabulated(
    medium: type[TabulatedMedium], values: dict[str, Any], extras: dict[str, Any], media: Media
) -> AbstractMedium:
    rows: tuple[dict[str, Any], ...] = values.pop("rows")
    with_mu = [place for place, row in enumerate(rows) if "permeability" in row]
    if 0 < len(with_mu) < len(rows):
        place = next(place for place in range(len(rows)) if place not in with_mu)
        told = f"is missing, row {with_mu[0]} has it"
        raise InputError([Fault(f"permeability[{place}]", told, "in every row, or in none")])
    mu = tuple(row["permeability"] for row in rows) if with_mu else None
    frequency = tuple(row["frequency"] for row in rows)
    return medium(frequency, tuple(row["permittivity"] for row in rows), mu, **values, **extras)


def _row(place: str) -> str:
    """Return where in a file a fault of a table is: ``permittivity[3]`` -> ``rows[3].permittivity``."""
    if place == "valid_range":
        return "range"
    found = re.fullmatch(r"(frequency|permittivity|permeability)\[(\d+)\]", place)
    return f"rows[{found[2]}].{found[1]}" if found else "rows"


def _mixture(
    medium: type[MixtureMedium], values: dict[str, Any], extras: dict[str, Any], media: Media
) -> AbstractMedium:
    inclusions = tuple(Inclusion(media[row["material"]], row["fraction"]) for row in values.pop("inclusions"))
    return medium(media[values.pop("host")], inclusions, **values, **extras)


def _joined(
    medium: type[JoinedMedium], values: dict[str, Any], extras: dict[str, Any], media: Media
) -> AbstractMedium:
    parts: tuple[dict[str, Any], ...] = values["parts"]
    faults = [
        Fault(f"parts[{place}].up_to", "is missing", "where the next part takes over, for example '10 THz'")
        for place, part in enumerate(parts[:-1])
        if "up_to" not in part
    ]
    if "up_to" in parts[-1]:
        place = f"parts[{len(parts) - 1}].up_to"
        faults.append(Fault(place, "the last part has no end", "no up_to in the last part, or one more part"))
    if faults:
        raise InputError(faults)
    return medium(
        tuple(media[part["material"]] for part in parts), tuple(part["up_to"] for part in parts[:-1]), **extras
    )


def _join(place: str) -> str:
    found = re.fullmatch(r"joins\[(\d+)\]", place)
    return f"parts[{found[1]}].up_to" if found else place


_HIGH_MU = Constant(
    "high_frequency_permeability", "Permeability far above", "μ∞", Number(limits.POSITIVE), "Mostly 1."
)
_STEP_MU = Constant(
    "permeability_step", "Step", "Δμ", Number(limits.STEP), "What it adds to the static permeability."
)
_ROWS = Terms(
    (
        Constant("frequency", "Frequency", "f", Quantity(limits.FREQUENCY), "Rising from row to row."),
        PERMITTIVITY,
        PERMEABILITY,
    ),
    least=2,
    most=MOST_ROWS,
    row="row",
)
_FIRST_ROWS = [{"frequency": "8 GHz", "permittivity": 1.0}, {"frequency": "12 GHz", "permittivity": 1.0}]
_FIRST_PARTS = [{"material": "air", "up_to": "1 THz"}, {"material": "air"}]
_SCALE = Constant(
    "permittivity_scale", "Factor of ε′", "", Number(limits.SCALE), "1 for the table as it stands.", False
)
_MATERIAL = Constant("material", "Material", "", Reference(), "Its name in this job, or a library entry.")
_INCLUSIONS = Terms(
    (_MATERIAL, Constant("fraction", "Share", "", Number(limits.FRACTION), "Of the volume, from 0 to 1.")),
    most=20,
    row="inclusion",
)
_PARTS = Terms(
    (
        _MATERIAL,
        Constant(
            "up_to",
            "Up to",
            "",
            Quantity(limits.FREQUENCY),
            "Where the next part takes over; the last has none.",
            required=False,
        ),
    ),
    least=2,
    most=20,
    row="part",
)

MODELS: Final = (
    Model(
        "magnetic-debye",
        "Magnetic relaxation",
        "μ that relaxes, with ε = 1: damped walls of ferrites; join it with an ε by 'magnetic'.",
        MagneticDebyeMedium,
        (_HIGH_MU, _STEP_MU, TIME),
    ),
    Model(
        "magnetic-lorentz",
        "Magnetic resonance",
        "μ with a resonance, with ε = 1: filled absorbers; join it with an ε by 'magnetic'.",
        MagneticLorentzMedium,
        (_HIGH_MU, _STEP_MU, RESONANCE, LINEWIDTH),
    ),
    Model(
        "magnetic",
        "ε of one with μ of another",
        "The permittivity of one material with the permeability of another.",
        MagneticMedium,
        (
            Constant("permittivity_from", "ε of", "", Reference(), "The material whose ε counts."),
            Constant("permeability_from", "μ of", "", Reference(), "The material whose μ counts."),
        ),
        _magnetic,
    ),
    Model(
        "water-liebe",
        "Water (Liebe)",
        "Pure liquid water at a temperature, up to a terahertz.",
        LiebeWaterMedium,
        (TEMPERATURE,),
    ),
    Model(
        "water-ellison",
        "Water (Ellison)",
        "Pure liquid water from 0 °C to 100 °C, by a later fit to more data.",
        EllisonWaterMedium,
        (TEMPERATURE,),
    ),
    Model(
        "sea-water",
        "Sea water (Klein and Swift)",
        "Sea water by its temperature and salinity.",
        SeaWaterMedium,
        (
            TEMPERATURE,
            Constant(
                "salinity", "Salinity", "S", Number(limits.SALINITY), "Grams of salt in a kilogram.", required=False
            ),
        ),
    ),
    Model(
        "ice",
        "Ice",
        "Pure ice of fresh water at a temperature.",
        IceMedium,
        (replace(TEMPERATURE, start="-10 °C"),),
    ),
    Model(
        "tabulated",
        "Table of measured data",
        "ε, and μ where measured, at a list of frequencies, interpolated without overshoot.",
        TabulatedMedium,
        (
            Constant("rows", "Rows", "", _ROWS, "Frequency and values of each measurement.", start=_FIRST_ROWS),
            _SCALE,
            replace(_SCALE, name="loss_scale", label="Factor of ε″"),
            replace(_SCALE, name="permeability_scale", label="Factor of μ′"),
            replace(_SCALE, name="magnetic_loss_scale", label="Factor of μ″"),
        ),
        _tabulated,
        place=_row,
    ),
    Model(
        "mixture",
        "Mixture",
        "Other materials mixed by a published rule: foams, filled resins, moist or layered matter.",
        MixtureMedium,
        (
            Constant("host", "Host", "", Reference(), "The material that takes the volume the others leave."),
            Constant("inclusions", "Inclusions", "", _INCLUSIONS, "The other materials and their shares."),
            Constant(
                "rule", "Mixing rule", "", Choice(tuple(RULES)), "Which published rule mixes them.", required=False
            ),
        ),
        _mixture,
    ),
    Model(
        "joined",
        "Joined by range",
        "One material by other models in other ranges, such as a metal film at radio frequency and in light.",
        JoinedMedium,
        (Constant("parts", "Parts", "", _PARTS, "From low to high frequency.", start=_FIRST_PARTS),),
        _joined,
        ranged=False,
        place=_join,
    ),
)
"""In the order of menus."""
