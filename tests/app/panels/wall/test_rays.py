"""The rays: true angles, heights along the faces in proportion to the power."""

import math

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from app.panels.wall.captions import rays_in
from app.panels.wall.geometry import Box, Point
from app.panels.wall.layout import WallLayout, lay_out
from app.panels.wall.parts import LayerPart, Wall
from app.panels.wall.rays import FAINTEST, Arrow, Clear, Powers, Rays, trace
from app.panels.wall.refraction import Direction, Directions
from app.panels.wall.wave import Wave
from stackcore.media.constant import ConstantMedium
from stackcore.stack import METAL, Layer, Stack
from tests.app.panels.wall.walls import EvenFont, layer, stack_of, wall, walls, wave_through

FONT = EvenFont()
shares = st.floats(0.0, 1.0)


def laid_out(drawn: Wall) -> WallLayout:
    """Return the drawing in a window of usual size."""
    return lay_out(drawn, 1200, 250, FONT)


def height_at(outline: tuple[Point, ...], x: float) -> float:
    """Return how tall an outline is along the face at `x`."""
    ys = [y for corner, y in outline if corner == pytest.approx(x)]
    return max(ys) - min(ys)


def traced(reflectance: float, absorbed: tuple[float, ...], degrees: float = 20.0) -> tuple[WallLayout, Rays]:
    """Return the rays in a wall of two layers of ε = 4 with these powers."""
    layout = laid_out(wall(layer("skin", 1e-3), layer("core", 2e-3)))
    inner = Direction(math.asin(math.sin(math.radians(degrees)) / 2))
    courses = Directions(Direction(math.radians(degrees)), (inner, inner), Direction(math.radians(degrees)))
    powers = Powers(reflectance, max(1 - reflectance - math.fsum(absorbed), 0.0), absorbed)
    return layout, trace(layout, courses, powers, Clear(Box(0, 0, 0, 0), 19.0, 60.0))


@given(shares, shares, shares)
def test_heights_along_the_faces_are_the_powers(reflected: float, first: float, second: float) -> None:
    """R, what flows in, what is left behind the first layer, and T: each as tall as its part of the whole."""
    first *= 1 - reflected
    second *= 1 - reflected - first
    layout, rays = traced(reflected, (first, second))
    faces = [slab.box.left for slab in layout.slabs] + [layout.body.right]
    assert height_at(rays.incident.band.outline, faces[0]) == pytest.approx(rays.full)
    flow = [1 - reflected, 1 - reflected - first, 1 - reflected - first - second]
    arrows = [(rays.reflected, faces[0], reflected), (rays.transmitted, faces[2], flow[2])]
    bands = [(rays.within[0].outline, faces[0], flow[0]), (rays.within[-1].outline, faces[2], flow[2])]
    bands += [(rays.within[0].outline, faces[1], flow[1]), (rays.within[-1].outline, faces[1], flow[1])]
    bands += [(arrow.band.outline, x, share) for arrow, x, share in arrows if arrow is not None]
    assert not rays.wraps
    for outline, x, share in bands:
        assert height_at(outline, x) == pytest.approx(max(share * rays.full, FAINTEST), abs=1e-6)


def test_a_line_too_thin_to_show_its_power_is_marked_as_such() -> None:
    """A millionth of the power is drawn as a faint line that shows the way."""
    _, rays = traced(1 - 1e-6, (0.0, 0.0))
    assert rays.transmitted is not None
    assert rays.transmitted.band.faint
    assert rays.reflected is not None
    assert not rays.reflected.band.faint


def direction(arrow: Arrow) -> float:
    """Return the angle of an arrow to the normal, downward positive, in degrees."""
    across, down = arrow.end[0] - arrow.foot[0], arrow.end[1] - arrow.foot[1]
    return math.degrees(math.atan2(down, abs(across)))


@settings(max_examples=60)
@given(walls(12), st.floats(0, 88), st.sampled_from(["TE", "TM"]))
def test_arrows_outside_have_the_true_angles(drawn: Wall, degrees: float, polarization: str) -> None:
    """The incident ray comes from above, the reflected and transmitted ones leave downward, at the same angle."""
    layout = laid_out(drawn)
    wave = wave_through(stack_of(drawn), 1e10, degrees, polarization)
    rays = rays_in(layout, wave, FONT)
    assert direction(rays.incident) == pytest.approx(-degrees, abs=1e-6)
    assert rays.incident.end[0] < rays.incident.foot[0] == layout.body.left
    assert rays.transmitted is not None
    assert direction(rays.transmitted) == pytest.approx(degrees, abs=1e-6)
    if rays.reflected is not None:
        assert direction(rays.reflected) == pytest.approx(degrees, abs=1e-6)
        assert rays.reflected.end[0] < layout.body.left


@settings(max_examples=60)
@given(walls(12), st.floats(0, 88))
def test_within_the_wall_every_piece_has_the_slope_of_its_medium(drawn: Wall, degrees: float) -> None:
    """Bands in layers of ε = 3 follow sin ψ = sin θ / √3, also where they wrap, and stay in the wall."""
    layout = laid_out(drawn)
    stack = stack_of(drawn, 3.0)
    courses = wave_through(stack, 1e10, degrees).courses
    powers = Powers(0.0, 1.0, (0.0,) * len(stack.elements))
    rays = trace(layout, courses, powers, Clear(Box(0, 0, 0, 0), 19.0, 60.0))
    slope = math.tan(math.asin(math.sin(math.radians(degrees)) / math.sqrt(3)))
    fall = slope * math.fsum(slab.box.width for slab in layout.slabs)
    turns = (rays.incident.foot[1] + fall - rays.way_out) / rays.zone.height
    assert turns == pytest.approx(round(turns), abs=1e-6)
    for band in rays.within:
        ys = [y for _, y in band.outline]
        assert rays.zone.top - 1e-6 <= min(ys)
        assert max(ys) <= rays.zone.bottom + 1e-6
        for (x, y), (next_x, next_y) in zip(band.outline, band.outline[1:] + band.outline[:1], strict=True):
            # Edges along a face are upright, those where the band was cut are level.
            if abs(next_x - x) > 1e-3 and abs(next_y - y) > 1e-3:
                assert (next_y - y) / (next_x - x) == pytest.approx(slope, rel=1e-3)


def test_the_way_through_a_single_slab_is_snells() -> None:
    """From entry to exit the band falls by the slab's width times the tangent of the refracted angle."""
    drawn = wall(layer("laminate", 5e-3))
    layout = laid_out(drawn)
    rays = rays_in(layout, wave_through(stack_of(drawn, 4.0), 1e10, 30.0), FONT)
    assert not rays.wraps
    fall = rays.way_out - rays.incident.foot[1]
    # tan(arcsin(0.25)) = 1 / sqrt(15)
    assert fall / layout.body.width == pytest.approx(1 / math.sqrt(15))


@pytest.mark.parametrize("degrees", [0.0, 3.0, 8.0])
def test_near_the_normal_the_reflected_band_is_not_hidden(degrees: float) -> None:
    """At their outer ends the incident and the reflected band lie apart, though their angles hardly differ."""
    _, rays = traced(0.8, (0.0, 0.0), degrees)
    assert rays.reflected is not None
    lowest = max(y for x, y in rays.incident.band.outline if x < rays.incident.foot[0])
    highest = min(y for x, y in rays.reflected.band.outline if x < rays.reflected.foot[0] - 100)
    assert highest > lowest


def wave_and_layout(stack: Stack, degrees: float) -> tuple[Wave, WallLayout]:
    """Return the wave in a stack and a drawing of its layers."""
    parts: list[LayerPart] = []
    for element in stack.elements:
        assert isinstance(element, Layer)
        parts.append(layer("film", element.thickness))
    return wave_through(stack, 2e10, degrees), laid_out(wall(*parts))


def test_total_reflection_sends_nothing_on() -> None:
    """Beyond the critical angle there is no transmitted ray, and the drawing knows why."""
    stack = Stack((Layer(ConstantMedium(1.8), 2e-3),), front=ConstantMedium(2.31))
    wave, layout = wave_and_layout(stack, 60.0)
    rays = rays_in(layout, wave, FONT)
    assert rays.total
    assert rays.transmitted is None
    assert rays.reflected is not None
    assert rays.reflected.band.share == pytest.approx(1.0)


def test_nothing_goes_on_behind_metal() -> None:
    """A perfect conductor behind the wall has no transmitted ray and it is not called total reflection."""
    wave, layout = wave_and_layout(Stack((Layer(ConstantMedium(2.0), 2e-3),), back=METAL), 30.0)
    rays = rays_in(layout, wave, FONT)
    assert rays.transmitted is None
    assert not rays.total


def test_refraction_into_another_half_space_writes_both_angles() -> None:
    """Behind, where the wave goes on at another angle, an arc shows it: 30° becomes 19.47° in n = 1.5."""
    stack = Stack((Layer(ConstantMedium(2.25), 2e-3),), back=ConstantMedium(2.25))
    wave, layout = wave_and_layout(stack, 30.0)
    arcs = rays_in(layout, wave, FONT).arcs
    assert [round(math.degrees(arc.angle), 2) for arc in arcs] == [30.0, 19.47]
    assert [arc.behind for arc in arcs] == [False, True]


def test_without_powers_the_ways_are_drawn_without_widths() -> None:
    """Before there is an answer all bands but the incident one are faint."""
    drawn = wall(layer("skin", 1e-3))
    layout = laid_out(drawn)
    full = wave_through(stack_of(drawn), 1e10, 30.0)
    rays = rays_in(layout, Wave(full.frequency, full.angle, "TE", full.courses), FONT)
    assert rays.reflected is not None
    assert rays.transmitted is not None
    assert all(band.faint for band in (*rays.within, rays.reflected.band, rays.transmitted.band))
