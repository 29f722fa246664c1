"""Radar covers and radome walls: solid, thin, sandwiches."""

from typing import Final

from stackcore.constructions.construction import Built, Chosen, Construction, DesignPoint, no_room
from stackcore.constructions.parts import (
    BOND_FAMILIES,
    CORE_FAMILIES,
    FINISH_FAMILIES,
    SKIN_FAMILIES,
    layer,
    length,
    length_words,
    material,
    sized,
    whole,
)
from stackcore.constructions.sizing import (
    across,
    half_wave,
    matched_core,
    outward_reflection,
    quarter_wave,
    same_phase,
)
from stackcore.job.records import ElementRecord
from stackcore.media.base import AbstractMedium

ELECTRICAL_ONLY: Final = (
    "An electrical first cut only: structure, lightning, static, erosion, moisture and airworthiness are separate "
    "and need licensed practice; verify by test."
)

_LAMINATE: Final = material("skin", "Laminate", "laminates/e-glass-epoxy", SKIN_FAMILIES)
_PAINT: Final = (
    material("paint", "Paint", "finishes/radome-paint", FINISH_FAMILIES),
    length("paint_thickness", "Paint build", "0.15 mm", most=0.01),
)
_BOND: Final = (
    material("bond", "Bond", "finishes/film-adhesive", BOND_FAMILIES),
    length("bond_thickness", "Bond line", "0.15 mm", most=0.01),
)
_SKINS: Final = (_LAMINATE, length("skin_thickness", "Each skin", "0.75 mm", least=1e-6, most=0.1))
_CORE: Final = material("core", "Core", "cores/foam", CORE_FAMILIES)


def _solid(point: DesignPoint, chosen: Chosen) -> Built:
    wall = chosen.permittivity("skin", point)
    order = chosen.count("order")
    paint = chosen.value("paint_thickness")
    bare = half_wave(wall, point, order)
    taken = same_phase(paint, chosen.permittivity("paint", point), wall, point) if paint else 0.0
    if taken >= bare:
        raise no_room("paint_thickness", "the paint alone is thicker than the wall", "a thinner paint")
    waves = "half a wave" if order == 1 else f"{order} half-waves"
    rule = f"d = m·λ₀/(2·√(ε − sin²θ)) = {length_words(bare)}: {waves} at {point.words}"
    if paint:
        rule += f"; less {length_words(taken)}, which the paint stands for by its phase"
    return Built(
        (*layer(chosen, "paint", "paint_thickness"), sized(chosen, "skin", bare - taken)),
        f"{rule}.",
        "Radar Scanners and Radomes, MIT Radiation Laboratory Series 26 (1948), recalled",
        cautions=(ELECTRICAL_ONLY,),
    )


def _thin(point: DesignPoint, chosen: Chosen) -> Built:
    wall = chosen.permittivity("skin", point)
    thickness = point.wavelength / (20 * wall.real**0.5)
    return Built(
        (*layer(chosen, "paint", "paint_thickness"), sized(chosen, "skin", thickness)),
        f"A wall is electrically thin below about a twentieth of the wave in it: d = λ₀/(20·√ε) = "
        f"{length_words(thickness)} at {point.words}; paint adds to it.",
        "Common practice",
        cautions=(ELECTRICAL_ONLY,),
    )


def _outside(chosen: Chosen, *, painted: bool) -> list[tuple[AbstractMedium, float]]:
    """Return what lies outside a core, nearest first."""
    names = ("bond", "skin", "paint") if painted else ("bond", "skin")
    parts = [(chosen.medium(name), chosen.value(f"{name}_thickness")) for name in names]
    return [(medium, thickness) for medium, thickness in parts if thickness > 0]


def _core_thickness(point: DesignPoint, chosen: Chosen, *, painted: bool) -> float:
    core = chosen.permittivity("core", point)
    if core.real <= 0:
        raise no_room("core", "the core does not let a wave through", "a dielectric core")
    seen = [outward_reflection(core, _outside(chosen, painted=side), point) for side in (painted, False)]
    return matched_core(core, seen, point)


_MATCH: Final = (
    "the core delays by φ = arg r + mπ, r seen from the core outward through bond, skin and paint, so that the "
    "reflections of both faces cancel"
)
_MATCH_SOURCE: Final = "Derived from the sum over all passes; the condition of an exact match of a symmetric wall"


def _single(point: DesignPoint, chosen: Chosen) -> Built:
    thickness = _core_thickness(point, chosen, painted=chosen.value("paint_thickness") > 0)
    skin, bond = layer(chosen, "skin", "skin_thickness"), layer(chosen, "bond", "bond_thickness")
    core = sized(chosen, "core", thickness)
    elements: tuple[ElementRecord, ...] = (
        *layer(chosen, "paint", "paint_thickness"),
        *(*skin, *bond, core, *bond, *skin),
    )
    rule = f"{length_words(thickness)} of core for {point.polarization} at {point.words}: {_MATCH}."
    return Built(elements, rule, _MATCH_SOURCE, cautions=(ELECTRICAL_ONLY,))


def _stacked(point: DesignPoint, chosen: Chosen) -> Built:
    """Return several sandwiches back to back; where two meet, their skins are one of twice the thickness."""
    count = chosen.count("cores")
    thickness = _core_thickness(point, chosen, painted=False)
    skin, bond = layer(chosen, "skin", "skin_thickness"), layer(chosen, "bond", "bond_thickness")
    core = sized(chosen, "core", thickness)
    inner = sized(chosen, "skin", 2 * chosen.value("skin_thickness"))
    elements: tuple[ElementRecord, ...] = (*layer(chosen, "paint", "paint_thickness"), *skin)
    for place in range(count):
        elements += (*bond, core, *bond, *(skin if place == count - 1 else (inner,)))
    rule = (
        f"{count} sandwiches back to back, inner skins twice the outer ones, {length_words(thickness)} of core "
        f"each for {point.polarization} at {point.words}: {_MATCH}. Paint is left out of the match."
    )
    return Built(elements, rule, _MATCH_SOURCE, cautions=(ELECTRICAL_ONLY,))


def _matched(point: DesignPoint, chosen: Chosen) -> Built:
    """Return a dense core between quarter-wave skins."""
    dense, skin = chosen.permittivity("core", point), chosen.permittivity("skin", point)
    thickness = quarter_wave(skin, point)
    wanted = (across(dense, point) * across(1.0, point)) + _sine_squared(point)
    skins = sized(chosen, "skin", thickness)
    paint, core = layer(chosen, "paint", "paint_thickness"), layer(chosen, "core", "core_thickness")
    rule = (
        f"Skins of a quarter wave, d = λ₀/(4·√(ε − sin²θ)) = {length_words(thickness)} at {point.words}, on a "
        f"dense core of any thickness; they match it fully for TE where ε of the skins is {wanted:.3g}, and here "
        f"it is {skin.real:.3g}."
    )
    return Built(
        (*paint, skins, *core, skins),
        rule,
        "UK patent GB 1 375 906 (1972) for the rule at normal incidence; the quarter-wave transformer of any text",
        cautions=(ELECTRICAL_ONLY,),
    )


def _sine_squared(point: DesignPoint) -> float:
    return 1.0 - across(1.0, point) ** 2


COVERS: Final = (
    Construction(
        "solid-wall",
        "Solid half-wave wall, painted",
        "One laminate of a whole number of half-waves: narrow band, strong, simple.",
        (_LAMINATE, whole("order", "Half-waves", 1, 50), *_PAINT),
        _solid,
    ),
    Construction(
        "thin-wall",
        "Thin wall, painted",
        "One skin much thinner than the wave in it: wide band towards low frequencies.",
        (_LAMINATE, *_PAINT),
        _thin,
    ),
    Construction(
        "a-sandwich",
        "A-sandwich with bonds and paint",
        "Two thin skins bonded to a light core: the usual wall for a band of 20 to 30 per cent.",
        (*_SKINS, _CORE, *_BOND, *_PAINT),
        _single,
    ),
    Construction(
        "b-sandwich",
        "B-sandwich: dense core between matching skins",
        "A strong core of high permittivity, matched by quarter-wave skins of low permittivity.",
        (
            material("core", "Core", "laminates/e-glass-epoxy", SKIN_FAMILIES),
            length("core_thickness", "Core", "6 mm", least=1e-6, most=1.0),
            material("skin", "Matching skins", "plastics/ptfe", CORE_FAMILIES),
            material("paint", "Paint", "finishes/radome-paint", FINISH_FAMILIES),
            length("paint_thickness", "Paint build", "0 mm", most=0.01),
        ),
        _matched,
    ),
    Construction(
        "c-sandwich",
        "C-sandwich with bonds and paint",
        "Three skins and two cores: steeper angles and more strength than an A-sandwich.",
        (*_SKINS, _CORE, whole("cores", "Cores", 2, 2), *_BOND, *_PAINT),
        _stacked,
    ),
    Construction(
        "multilayer",
        "Multilayer wall with bonds and paint",
        "Several sandwiches in a row, an odd number of layers: wide band at steep angles.",
        (*_SKINS, _CORE, whole("cores", "Cores", 3, 40), *_BOND, *_PAINT),
        _stacked,
    ),
)
"""The recipes of this file."""
