"""Every construction of the table, built with its defaults and with what people type."""

import math

import numpy as np
import pytest

import stackcore as sc
from stackcore.constructions import CONSTRUCTIONS, Built, DesignPoint, build
from stackcore.errors import InputError
from stackcore.job.records import LayerRecord, SheetRecord
from stackcore.media.constant import VACUUM, ConstantMedium
from stackcore.media.library import library_entry
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Element, Layer, SheetPlacement, Stack


def thickness_of(built: Built) -> float:
    """Return the thickness of all layers in m."""
    return sum(one.thickness.value for one in built.elements if isinstance(one, LayerRecord))


NOSE = DesignPoint(9.375e9, math.radians(55))


def stack_of(built: Built, **media: ConstantMedium) -> Stack:
    """Return what a construction stands for."""
    elements: list[Element] = []
    for one in built.elements:
        if isinstance(one, LayerRecord):
            medium = media.get(one.material) or (
                VACUUM if one.material == "air" else library_entry(one.material).medium
            )
            elements.append(Layer(medium, one.thickness.value))
        else:
            assert isinstance(one, SheetRecord)
            assert one.resistance is not None
            elements.append(SheetPlacement(SeriesSheet(resistance=one.resistance.value)))
    return Stack(tuple(elements), back=METAL) if built.back == "metal" else Stack(tuple(elements))


@pytest.mark.parametrize("key", CONSTRUCTIONS)
def test_every_construction_stands_with_its_defaults(key: str) -> None:
    """The defaults name entries of the library, the rule says a number, and the solver takes the result."""
    built = build(CONSTRUCTIONS[key], DesignPoint(10e9, math.radians(30)))
    response = sc.solve(stack_of(built), 10e9, math.radians(30))
    total = response.reflectance + response.transmittance + response.absorptance
    assert np.allclose(total, 1.0, atol=1e-12)
    assert any(letter.isdigit() for letter in built.rule)
    assert built.source
    assert built.cautions


@pytest.mark.parametrize(
    ("key", "given", "fixed"),
    [
        ("solid-wall", {"paint_thickness": "0 mm"}, 0.0),
        ("thin-wall", {"paint_thickness": "0 mm"}, 0.0),
        ("b-sandwich", {}, 6e-3),
        ("sheet-absorber", {"spacer": "air"}, 0.0),
    ],
)
def test_what_a_rule_sizes_follows_the_wavelength(key: str, given: dict[str, str], fixed: float) -> None:
    """At half the frequency the thickness doubles, to the four digits of a drawing; what is chosen stays."""
    high, low = (build(CONSTRUCTIONS[key], DesignPoint(hertz), given) for hertz in (10e9, 5e9))
    assert thickness_of(low) - fixed == pytest.approx(2 * (thickness_of(high) - fixed), rel=5e-4)


def test_the_nose_radome_has_the_thickness_of_its_rule() -> None:
    """ε 3.30 at 9.375 GHz and 55 degrees: 9.861 mm, and 8.802 mm at 0 (recomputed: λ₀/(2·√(3.30 − sin²θ)))."""
    skin = {"skin": ConstantMedium(3.30 * (1 - 0.008j))}
    for angle, millimetres in ((NOSE.angle, 9.861), (0.0, 8.802)):
        built = build(
            CONSTRUCTIONS["solid-wall"],
            DesignPoint(NOSE.frequency, angle),
            {"skin": "skin", "paint_thickness": "0 mm"},
            skin,
        )
        (wall,) = built.elements
        assert isinstance(wall, LayerRecord)
        assert wall.thickness.value == pytest.approx(millimetres * 1e-3, abs=1e-6)


def test_paint_is_taken_off_the_wall() -> None:
    """The painted wall is thinner, and at the design point it passes more than the wall with paint on top."""
    solid = CONSTRUCTIONS["solid-wall"]
    bare = build(solid, NOSE, {"paint_thickness": "0 mm"})
    painted = build(solid, NOSE, {"paint_thickness": "0.2 mm"})
    on_top = Built((*painted.elements[:1], *bare.elements), "", "")
    lost = [
        float(sc.solve(stack_of(one), NOSE.frequency, NOSE.angle).reflectance[0, 0].max())
        for one in (painted, on_top)
    ]
    assert len(painted.elements) == 2
    assert lost[0] < lost[1]


def test_the_oblique_absorber_has_the_sheet_and_foam_of_the_formula() -> None:
    """45 degrees, TE, 10 GHz, ε 1.05: 532.8 Ω and 10.106 mm (recomputed: Z₀/cos θ and λ₀/(4·√(ε − sin²θ)))."""
    built = build(
        CONSTRUCTIONS["sheet-absorber"],
        DesignPoint(10e9, math.radians(45)),
        {"spacer": "foam"},
        {"foam": ConstantMedium(1.05)},
    )
    sheet, spacer = built.elements
    assert isinstance(sheet, SheetRecord)
    assert isinstance(spacer, LayerRecord)
    assert sheet.resistance is not None
    assert sheet.resistance.value == pytest.approx(532.8, abs=0.05)
    assert spacer.thickness.value == pytest.approx(10.106e-3, abs=5e-6)
    assert built.back == "metal"


def test_the_core_of_a_sandwich_is_the_best_there_is() -> None:
    """With its bonds, its paint and its losses, no other core below a half-wave reflects much less."""
    built = build(CONSTRUCTIONS["a-sandwich"], NOSE)
    stack = stack_of(built)
    place = next(row for row, one in enumerate(built.elements) if getattr(one, "material", "") == "cores/foam")
    core = stack.elements[place]
    assert isinstance(core, Layer)

    def reflected(thickness: float) -> float:
        elements = (*stack.elements[:place], Layer(core.medium, thickness), *stack.elements[place + 1 :])
        return float(sc.solve(Stack(elements), NOSE.frequency, NOSE.angle).reflectance[0, 0, 0])

    least = min(reflected(thickness) for thickness in np.linspace(1e-4, 20e-3, 400))
    assert len(built.elements) == 6
    assert reflected(core.thickness) - least < 5e-4


@pytest.mark.parametrize(("key", "layers"), [("c-sandwich", 9 + 1), ("multilayer", 13 + 1)])
def test_stacked_sandwiches_share_their_inner_skins(key: str, layers: int) -> None:
    """Two cores have three skins, three have four; each core has two bonds, and the whole one coat of paint."""
    built = build(CONSTRUCTIONS[key], NOSE)
    skins = [
        one for one in built.elements if isinstance(one, LayerRecord) and one.material == "laminates/e-glass-epoxy"
    ]
    assert len(built.elements) == layers
    assert skins[1].thickness.value == pytest.approx(2 * skins[0].thickness.value)


def test_the_coat_of_an_enclosure_shields_by_what_was_asked() -> None:
    """The sheet for 60 dB gives 60 dB with nothing else around it."""
    built = build(CONSTRUCTIONS["coated-enclosure"], DesignPoint(1e9), {"shielding": "60"})
    sheet = built.elements[-1]
    assert isinstance(sheet, SheetRecord)
    alone = sc.solve(stack_of(Built((sheet,), "", "")), 1e9, 0.0)
    assert float(alone.shielding_effectiveness_dB[0, 0, 0]) == pytest.approx(60, abs=5e-3)


def test_the_coat_of_a_double_glazing_goes_to_its_surface() -> None:
    """Surface 2 is before the gap and surface 3 behind it."""
    places = []
    for face in ("2", "3"):
        built = build(CONSTRUCTIONS["coated-double-glazing"], DesignPoint(2e9), {"face": face})
        places.append([type(one).__name__ for one in built.elements].index("SheetRecord"))
    assert places == [1, 2]


def test_every_fault_is_told_at_once() -> None:
    """A wrong name, a wrong unit, an unknown material and a value out of range come together."""
    with pytest.raises(InputError) as caught:
        build(
            CONSTRUCTIONS["a-sandwich"],
            NOSE,
            {"skinn": "x", "skin_thickness": "3 GHz", "core": "cores/fome", "paint_thickness": "-1 mm"},
        )
    faults = {fault.path: str(fault) for fault in caught.value.faults}
    assert set(faults) == {"skinn", "skin_thickness", "core", "paint_thickness"}
    assert "skin" in faults["skinn"]
    assert "cores/foam" in faults["core"]


@pytest.mark.parametrize(
    ("key", "given", "place"),
    [
        ("solid-wall", {"paint_thickness": "9.9 mm"}, "paint_thickness"),
        ("foil-on-board", {"foil": "plastics/ptfe"}, "foil"),
        ("multilayer", {"cores": "2.5"}, "cores"),
        ("coated-double-glazing", {"face": "4"}, "face"),
    ],
)
def test_what_leaves_no_wall_is_refused_at_its_place(key: str, given: dict[str, str], place: str) -> None:
    """Choices that make no sense together are told where they were made."""
    with pytest.raises(InputError) as caught:
        build(CONSTRUCTIONS[key], DesignPoint(30e9), given)
    assert [fault.path for fault in caught.value.faults] == [place]
