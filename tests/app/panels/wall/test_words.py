"""The drawing in words: shares, parts, values at the marker, and the whole wall for a screen reader."""

import math

import numpy as np
import pytest

from app.document.document import Cell, Document
from app.document.edits import type_into
from app.panels.wall import tips, words
from app.panels.wall.captions import captions, rays_in
from app.panels.wall.layout import WallLayout, lay_out
from app.panels.wall.parts import HalfSpacePart, LayerPart, SheetPart, wall_of, written
from app.panels.wall.rays import Powers
from app.panels.wall.refraction import Direction
from app.panels.wall.wave import Wave, powers_of, wave_in
from stackcore.media.conductor import ConductorMedium
from stackcore.media.constant import ConstantMedium
from stackcore.propagation.solve import solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import METAL, Layer, Stack
from stackcore.units import Dimension, Measure
from tests.app.panels.wall.walls import EvenFont, sandwich, wave_through


@pytest.mark.parametrize(
    ("share", "text"),
    [
        (1.0, "100 %"),
        (0.99996, "100 %"),
        (0.9997, "99.97 %"),
        (0.08259, "8.26 %"),
        (0.5, "50.0 %"),
        (0.8996, "90.0 %"),
        (0.0003, "0.030 %"),
        (0.00412, "0.41 %"),
        (2.5e-4, "0.025 %"),
        (3e-9, "−85.2 dB"),
        (1e-300, "under −400 dB"),
        (0.0, "0 %"),
    ],
)
def test_shares_read_as_per_cent_or_decibels(share: float, text: str) -> None:
    """Per cent while that has digits, decibels below, and no more than the practical limit."""
    assert words.share_text(share) == text


def test_medium_at_the_marker() -> None:
    """ε with its loss, the loss tangent, and μ where it is not 1."""
    assert words.medium_text(ConstantMedium(4.2 - 0.063j), 1e10) == "ε = 4.2 − j0.063, loss tangent 0.015"
    assert words.medium_text(ConstantMedium(2.0), 1e10) == "ε = 2"
    assert words.medium_text(ConstantMedium(12.0, 2 - 5j), 1e8) == "ε = 12, μ = 2 − j5"
    # σ/(ωε₀) of 1 S/m at 1 GHz is 17.975.
    assert words.medium_text(ConductorMedium(1.0), 1e9) == "ε = 1 − j18"


def test_sheet_at_the_marker() -> None:
    """R + jωL + 1/(jωC) as a number: 10 Ω with 1 nH at 1 GHz has a reactance of 6.283 Ω."""
    text = words.sheet_text(SeriesSheet(resistance=10.0, inductance=1e-9), 1e9)
    assert text == "Z = 10 + j6.283 Ω/sq (|Z| 11.81 Ω/sq, 32.1°)"


def test_directions_in_words() -> None:
    """An angle to the normal with its sign, or that there is none."""
    assert words.direction_text(Direction(math.radians(14.4775))) == "wave at 14.5° to the normal"
    assert words.direction_text(Direction(math.radians(-20))) == "wave at −20° to the normal"
    assert "only decays" in words.direction_text(Direction(1.5, decays=True))


def test_the_parts_of_a_job() -> None:
    """Labels, thicknesses as typed, kinds, the letters of a sheet, and half-spaces."""
    document = Document(sandwich())
    skin, core, sheet, _ = wall_of(document, 0).elements
    assert skin == LayerPart("Glass-fibre skin", 1e-3, "1 mm", "dielectric")
    assert core == LayerPart("Foam core", 6e-3, "6 mm", "foam")
    assert sheet == SheetPart(("R", "L"), "377 ohm/sq, 20 pH")
    foil = wall_of(document, 1)
    assert foil.elements == (LayerPart("copper", 35e-6, "35 um", "metal"),)
    assert (foil.front, foil.back) == (HalfSpacePart("air", ""), HalfSpacePart("metal", "metal"))


def test_a_text_that_is_no_value_marks_its_part_and_leaves_the_last_thickness() -> None:
    """While "2 kg" stands in the table the drawing shows the last good thickness and says that it does."""
    document = type_into(Cell(0, 0, "thickness"), "2 kg").change(Document(sandwich()))
    drawn = wall_of(document, 0)
    assert [part.faulty for part in drawn.elements] == [True, False, False, False]
    assert drawn.elements[0].text == "1 mm"
    layout, wave, stack = scene(document)
    assert "no value yet" in tips.element_tip(layout, wave, stack.elements, 0)


def test_a_bare_number_gets_its_unit() -> None:
    """A thickness given as a number of metres in the file is written with a unit, a text as it was typed."""
    assert written(Measure(0.002, "0.002"), Dimension.LENGTH) == "2 mm"
    assert written(Measure(2e-6, "2e-06"), Dimension.LENGTH) == "2 µm"
    assert written(Measure(0.003175, "1/8 in"), Dimension.LENGTH) == "1/8 in"


def scene(document: Document) -> tuple[WallLayout, Wave, Stack]:
    """Return the first stack of a document as it is drawn, with the wave at 30°."""
    stack = document.job.stacks[0]
    return lay_out(wall_of(document, 0), 1200, 250, EvenFont()), wave_through(stack), stack


def test_the_wall_in_words() -> None:
    """Front to back, and what the wave does at the marker."""
    document = Document(sandwich())
    powers = Powers(0.25, 0.5, (0.1, 0.05, 0.1, 0.0))
    text = words.described(wall_of(document, 0), powers, "10 GHz, 30°, TE")
    assert text == (
        "Wall: front air, 3 layers and 1 sheet, back air. 1: Glass-fibre skin, 1 mm. 2: Foam core, 6 mm. "
        "3: sheet, 377 ohm/sq, 20 pH. 4: Glass-fibre skin, 0.8 mm. "
        "At 10 GHz, 30°, TE: reflected 25.0 %, transmitted 50.0 %, absorbed 25.0 %."
    )
    assert words.described(wall_of(document, 2), None) == "Wall: front air, no layers, back air."


def test_the_selection_is_in_the_name() -> None:
    """A screen reader hears what is selected when the selection moves."""
    drawn = wall_of(Document(sandwich()), 0)
    assert words.named(drawn, ()) == "Wall drawing"
    assert words.named(drawn, (1,)) == "Wall drawing, selected 2: Foam core, 6 mm"


def test_tip_of_a_slab_has_everything_about_it() -> None:
    """Name and thickness, values at the marker, the direction of the wave, the share it absorbs."""
    layout, wave, stack = scene(Document(sandwich()))
    middle = layout.slabs[0].box
    text = tips.tip_at(layout, wave, stack, (), middle.middle, (middle.top + middle.bottom) / 2)
    assert text.startswith(
        "1: Glass-fibre skin, 1 mm\nε = 4.2 − j0.063, loss tangent 0.015 at 10 GHz\nwave at 14.1°"
    )
    assert "of the incident power" in text
    assert tips.tip_at(layout, wave, stack, (), 5, layout.body.bottom - 5).startswith("Front: air")
    assert tips.tip_at(layout, wave, stack, (), 1195, layout.body.bottom - 5).startswith("Back: air")


def test_tips_of_what_is_written_define_it() -> None:
    """R, T and A say what they are; the circumstances say how the angle and polarizations are counted."""
    layout, wave, stack = scene(Document(sandwich()))
    found_captions = captions(layout, rays_in(layout, wave, EvenFont()), wave, EvenFont())
    found = {}
    for caption in found_captions:
        box = caption.box
        x, y = box.middle, (box.top + box.bottom) / 2
        found[caption.text[:2]] = tips.tip_at(layout, wave, stack, found_captions, x, y)
    assert found["R "].startswith("Reflectance: ")
    assert found["T "].startswith("Transmittance: ")
    assert found["A "].startswith("Absorptance: ")
    assert "TE has the electric field" in found["10"]


def test_tip_of_a_metal_back_says_that_nothing_passes() -> None:
    """A perfect conductor has no values; it is told as what it is."""
    document = Document(sandwich())
    stack = document.job.stacks[1]
    layout = lay_out(wall_of(document, 1), 1200, 250, EvenFont())
    wave = wave_through(stack)
    assert "Nothing passes" in tips.tip_at(layout, wave, stack, (), 1195, 150)


def test_powers_add_up_and_underflow_is_not_nothing() -> None:
    """R + T + A is 1; a centimetre of copper passes less than a double can say, and still not nothing."""
    found = powers_of(solve(sandwich().stacks[0], np.array([1e10]), np.array([0.3])), "TM")
    assert found.reflectance + found.transmittance + math.fsum(found.absorbed) == pytest.approx(1.0)
    copper = Stack((Layer(ConductorMedium(5.8e7), 0.01),))
    deep = powers_of(solve(copper, np.array([1e10]), np.array([0.0])), "TE")
    assert 0 < deep.transmittance < 1e-300
    closed = Stack(copper.elements, back=METAL)
    assert powers_of(solve(closed, np.array([1e10]), np.array([0.0])), "TE").transmittance == 0


def test_powers_of_another_stack_are_not_drawn() -> None:
    """Until the answer for a changed number of elements comes, ways are drawn without powers."""
    stack = sandwich().stacks[0]
    response = solve(Stack(stack.elements[:2]), np.array([1e10]), np.array([0.0]))
    assert wave_in(stack, 1e10, 0.0, "TE", response).powers is None
