"""Glazing, film windows, enclosures, absorbers and foil: constructions around a conducting sheet."""

from typing import Final

from stackcore.constructions.construction import Built, Chosen, Construction, DesignPoint, Option, no_room
from stackcore.constructions.parts import (
    BOND_FAMILIES,
    CORE_FAMILIES,
    GLASS_FAMILIES,
    METAL_FAMILIES,
    SKIN_FAMILIES,
    layer,
    length,
    length_words,
    material,
    ohms,
    sheet,
    sized,
)
from stackcore.constructions.sizing import (
    half_wave,
    quarter_wave,
    sheet_for_shielding,
    sheet_shielding,
    wave_impedance,
)
from stackcore.job.records import ElementRecord
from stackcore.media.conductor import ConductorMedium
from stackcore.units import Dimension

GLAZING: Final = (
    "Transmission through the glass only: frames, borders and other ways in decide what a room gets. Thermal, "
    "structural and safety glazing are separate and follow local codes."
)
ENCLOSURE: Final = (
    "A plane wave on an infinite wall: seams, apertures and cables govern an enclosure, and near sources differ. "
    "Shielded rooms are accepted by test."
)
ABSORBER: Final = (
    "The sheet's heat is not in this figure: near transmitters keep to the exposure limits that apply, and check "
    "the temperature of the sheet."
)

_SCHELKUNOFF: Final = "S. A. Schelkunoff, Electromagnetic Waves (1943), for the sheet alone, recalled"


def _resistance(default: str, label: str = "Coating") -> Option:
    return Option("coating", label, default, Dimension.RESISTANCE, least=1e-6, most=1e6)


def _sheet_rule(resistance: float) -> str:
    return (
        f"The sheet alone, {ohms(resistance)}, shields by 20·log₁₀(1 + Z₀/(2R)) = "
        f"{sheet_shielding(resistance):.2f} dB at normal incidence; panes and gaps move this up and down with "
        "frequency."
    )


def _single_glazing(point: DesignPoint, chosen: Chosen) -> Built:
    resistance = chosen.value("coating")
    return Built(
        (*layer(chosen, "glass", "pane"), sheet(resistance)),
        _sheet_rule(resistance) + " The coat lies on the face towards the room.",
        _SCHELKUNOFF,
        cautions=(GLAZING,),
    )


def _double_glazing(point: DesignPoint, chosen: Chosen) -> Built:
    resistance = chosen.value("coating")
    outer, inner = layer(chosen, "glass", "outer_pane"), layer(chosen, "glass", "inner_pane")
    gap = layer(chosen, "gas", "gap")
    face = chosen.count("face")
    coat = sheet(resistance)
    elements: tuple[ElementRecord, ...] = (*outer, *gap, coat, *inner)
    if face == 2:
        elements = (*outer, coat, *gap, *inner)
    half = half_wave(1.0, point)
    rule = (
        f"{_sheet_rule(resistance)} The coat is on surface {face}, counted from outside. The loss repeats about "
        f"every {length_words(half)} of gap at {point.words}, so a gap can be chosen that passes more."
    )
    return Built(elements, rule, _SCHELKUNOFF, cautions=(GLAZING,))


def _laminated(point: DesignPoint, chosen: Chosen) -> Built:
    resistance = chosen.value("coating")
    pane, interlayer = layer(chosen, "glass", "pane"), layer(chosen, "interlayer", "interlayer_thickness")
    carrier = layer(chosen, "carrier", "carrier_thickness")
    return Built(
        (*pane, *interlayer, sheet(resistance), *carrier, *interlayer, *pane),
        _sheet_rule(resistance) + " Glass on both sides lowers this at most frequencies.",
        _SCHELKUNOFF,
        cautions=(GLAZING,),
    )


def _enclosure(point: DesignPoint, chosen: Chosen) -> Built:
    wanted = chosen.value("shielding")
    resistance = sheet_for_shielding(wanted)
    return Built(
        (*layer(chosen, "wall", "wall_thickness"), sheet(resistance)),
        f"R = Z₀/(2·(10^(SE/20) − 1)) = {ohms(resistance)} for {wanted:g} dB of the coat alone; order it "
        "with the margin that its ageing needs.",
        _SCHELKUNOFF,
        cautions=(ENCLOSURE,),
    )


def _absorber(point: DesignPoint, chosen: Chosen) -> Built:
    spacer = chosen.permittivity("spacer", point)
    resistance, thickness = wave_impedance(point), quarter_wave(spacer, point)
    formula = "Z₀/cos θ" if point.polarization == "TE" else "Z₀·cos θ"
    return Built(
        (sheet(resistance), sized(chosen, "spacer", thickness)),
        f"A sheet of {formula} = {ohms(resistance)} a quarter wave, λ₀/(4·√(ε − sin²θ)) = "
        f"{length_words(thickness)}, before metal: no reflection for {point.polarization} at {point.words}.",
        "W. W. Salisbury, US patent 2,599,944 (1952), recalled; derived for oblique incidence",
        back="metal",
        cautions=(ABSORBER,),
    )


def _foil(point: DesignPoint, chosen: Chosen) -> Built:
    medium = chosen.medium("foil")
    thickness = chosen.value("foil_thickness")
    if not isinstance(medium, ConductorMedium) or medium.conductivity <= 0:
        raise no_room("foil", f"{chosen.material('foil')!r} is no conductor", "a metal, such as metals/copper")
    resistance = 1 / (medium.conductivity * thickness)
    return Built(
        (*layer(chosen, "foil", "foil_thickness"), *layer(chosen, "board", "board_thickness")),
        f"The foil is R = 1/(σ·d) = {ohms(resistance)} and shields by 20·log₁₀(1 + Z₀/(2R)) = "
        f"{sheet_shielding(resistance):.1f} dB while it is thinner than its skin depth, and by more above.",
        _SCHELKUNOFF,
        cautions=(ENCLOSURE,),
    )


WINDOWS: Final = (
    Construction(
        "coated-single-glazing",
        "Single glazing with a coat",
        "One pane with a conducting coat on the face towards the room.",
        (
            material("glass", "Glass", "ceramics/window-glass", GLASS_FAMILIES),
            length("pane", "Pane", "6 mm", least=1e-6, most=0.1),
            _resistance("16 ohm/sq"),
        ),
        _single_glazing,
    ),
    Construction(
        "coated-double-glazing",
        "Double glazing with a coat",
        "Two panes with a gap, the coat on surface 2 or 3 counted from outside.",
        (
            material("glass", "Glass", "ceramics/window-glass", GLASS_FAMILIES),
            length("outer_pane", "Outer pane", "4 mm", least=1e-6, most=0.1),
            material("gas", "Gap filled with", "air", ("air",)),
            length("gap", "Gap", "16 mm", least=1e-6, most=0.1),
            length("inner_pane", "Inner pane", "4 mm", least=1e-6, most=0.1),
            _resistance("4 ohm/sq"),
            Option("face", "Coated surface", "3", Dimension.NUMBER, whole=True, least=2, most=3),
        ),
        _double_glazing,
    ),
    Construction(
        "laminated-film-window",
        "Laminated window with a film",
        "A conducting film on its carrier between two panes, bonded on both sides.",
        (
            material("glass", "Panes", "ceramics/window-glass", GLASS_FAMILIES),
            length("pane", "Each pane", "4 mm", least=1e-6, most=0.1),
            material("interlayer", "Interlayer", "adhesives/pvb-interlayer", BOND_FAMILIES),
            length("interlayer_thickness", "Each interlayer", "0.38 mm", most=0.01),
            material("carrier", "Carrier of the film", "plastics/pet", SKIN_FAMILIES),
            length("carrier_thickness", "Carrier", "50 um", most=0.01),
            _resistance("10 ohm/sq", "Film"),
        ),
        _laminated,
    ),
    Construction(
        "coated-enclosure",
        "Enclosure wall with a conducting coat",
        "A plastic wall coated inside, the coat sized for the shielding wanted.",
        (
            material("wall", "Wall", "plastics/abs", SKIN_FAMILIES),
            length("wall_thickness", "Wall", "2.5 mm", least=1e-6, most=0.1),
            Option("shielding", "Shielding wanted, dB", "60", Dimension.NUMBER, least=0.1, most=200),
        ),
        _enclosure,
    ),
    Construction(
        "sheet-absorber",
        "Sheet absorber",
        "A resistive sheet a quarter wave before metal: no reflection at one frequency.",
        (material("spacer", "Spacer", "cores/foam-light", ("cores", "plastics")),),
        _absorber,
    ),
    Construction(
        "foil-on-board",
        "Foil on board",
        "A metal foil on a building board, as in shielded rooms and behind insulation.",
        (
            material("foil", "Foil", "metals/aluminium", METAL_FAMILIES),
            length("foil_thickness", "Foil", "35 um", least=1e-9, most=0.01),
            material("board", "Board", "building/plasterboard-p2040-3", ("building", *CORE_FAMILIES)),
            length("board_thickness", "Board", "12.5 mm", least=1e-6, most=0.5),
        ),
        _foil,
    ),
)
"""The recipes of this file."""
