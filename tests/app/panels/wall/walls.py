"""Walls, waves and a font for the tests of the drawing."""

import math
from dataclasses import dataclass

import numpy as np
from hypothesis import strategies as st

from app.panels.wall.parts import HalfSpacePart, LayerPart, Part, SheetPart, Wall
from app.panels.wall.wave import Wave, wave_in
from stackcore.job.codec import job_from_json
from stackcore.job.resolve import Job
from stackcore.media.constant import ConstantMedium
from stackcore.propagation.solve import solve
from stackcore.sheets.series import SeriesSheet
from stackcore.stack import Element, Layer, SheetPlacement, Stack
from stackcore.units import Dimension, format_value


@dataclass(frozen=True)
class EvenFont:
    """A font of which every letter is as wide as the next."""

    line: float = 15.0
    letter: float = 6.5

    def width(self, text: str) -> float:
        """Return the width of `text`."""
        return self.letter * len(text)


def layer(name: str, thickness: float, kind: str = "dielectric") -> LayerPart:
    """Return a layer of the drawing."""
    return LayerPart(name, thickness, format_value(thickness, Dimension.LENGTH, digits=3), kind)


def wall(*elements: Part) -> Wall:
    """Return a wall in air."""
    return Wall(HalfSpacePart("air", ""), elements, HalfSpacePart("air", ""))


names = st.text(alphabet="abcdefgh MWil", min_size=1, max_size=60).filter(lambda text: bool(text.strip()))
thicknesses = st.one_of(
    st.floats(1e-9, 1e-6),
    st.floats(1e-6, 1e-3),
    st.floats(1e-3, 0.3),
    st.just(0.0),
)
layers = st.builds(layer, names, thicknesses, st.sampled_from(["dielectric", "metal", "foam", "glass"]))
sheets = st.builds(
    SheetPart,
    st.sampled_from([("R",), ("R", "L"), ("R", "L", "C"), ("C",)]),
    st.sampled_from(["377 Ω/sq", "4 Ω/sq, 20 pH", "50 Ω/sq, 2 nH, 1 pF"]),
)
parts = st.one_of(layers, layers, layers, sheets)


def walls(most: int = 70) -> st.SearchStrategy[Wall]:
    """Return walls of up to `most` elements."""
    return st.lists(parts, max_size=most).map(lambda elements: wall(*elements))


def stack_of(drawn: Wall, permittivity: complex = 3.0 - 0.05j) -> Stack:
    """Return a stack as the wall is drawn, every layer of the same medium."""
    elements: list[Element] = []
    for part in drawn.elements:
        if isinstance(part, LayerPart):
            elements.append(Layer(ConstantMedium(permittivity), part.thickness))
        else:
            elements.append(SheetPlacement(SeriesSheet(resistance=377.0)))
    return Stack(tuple(elements))


def wave_through(stack: Stack, frequency: float = 1e10, degrees: float = 30.0, polarization: str = "TE") -> Wave:
    """Return the wave in a stack with its powers."""
    angle = math.radians(degrees)
    response = solve(stack, np.array([frequency]), np.array([angle]))
    return wave_in(stack, frequency, angle, polarization, response)


JOB = """{"format": "slabwright-job", "version": 1, "title": "Cover",
"materials": {
  "skin": {"label": "Glass-fibre skin", "model": "constant", "permittivity": 4.2, "loss_tangent": 0.015},
  "core": {"label": "Foam core", "model": "constant", "permittivity": 1.1},
  "copper": {"model": "conductor", "conductivity": "58 MS/m"}},
"stacks": [
  {"name": "A", "elements": [{"layer": "skin", "thickness": "1 mm"}, {"layer": "core", "thickness": "6 mm"},
    {"sheet": "series", "resistance": "377 ohm/sq", "inductance": "20 pH"},
    {"layer": "skin", "thickness": "0.8 mm"}]},
  {"name": "B", "back": "metal", "elements": [{"layer": "copper", "thickness": "35 um"}]},
  {"name": "C", "elements": []}],
"sweep": {"frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 5}, "angle": ["0 deg", "30 deg"]}}"""


def sandwich() -> Job:
    """Return a job with a sandwich that has a sheet, a foil on metal, and an empty stack."""
    return Job(job_from_json(JOB))
