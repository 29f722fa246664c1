"""What is written around the wave: circumstances, R and T at their arrows, absorbed shares, angles, end names."""

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace
from typing import Final, Literal

from app.panels.wall.geometry import Box
from app.panels.wall.labels import TextMeasure, elided
from app.panels.wall.layout import MARGIN, WallLayout
from app.panels.wall.rays import FIGURE, Arc, Arrow, Clear, Powers, Rays, trace
from app.panels.wall.wave import Wave
from app.panels.wall.words import share_text, tilt_text
from app.series.texts import angle_text, frequency_text
from stackcore.polarizations import polarization

Role = Literal["incident", "reflectance", "transmittance", "absorptance", "angle", "end", "group"]

END_GAP: Final = 6.0
"""Between the end of an arrow and what is written there, in px."""
SHEET_CLEAR: Final = 13.0
"""From a sheet's line to a text beside it, in px."""


@dataclass(frozen=True, slots=True)
class Caption:
    """A text, where it stands and whose colour it has."""

    text: str
    box: Box
    role: Role
    row: int | None = None


def rays_in(layout: WallLayout, wave: Wave, measure: TextMeasure) -> Rays:
    """Return the rays of a wave, clear of what will be written about it."""
    written = [caption.box for caption in circumstances(layout, wave, measure)]
    head = Box(0, 0, max(box.right for box in written), max(box.bottom for box in written))
    texts = () if wave.powers is None else arrow_texts(wave.powers)
    caption = max((measure.width(text) + END_GAP for text in texts), default=0.0)
    return trace(layout, wave.courses, wave.powers, Clear(head, measure.line + 4, caption))


def captions(layout: WallLayout, rays: Rays, wave: Wave, measure: TextMeasure) -> tuple[Caption, ...]:
    """Return everything written around the wave, what matters most first; what would cover another is left out."""
    wanted = [*circumstances(layout, wave, measure)]
    if wave.powers is not None:
        wanted += _arrow_captions(layout, rays, wave, measure)
        wanted += share_captions(layout, wave, measure)
        wanted += _absorbed_in_all(layout, wave, measure)
    if rays.total:
        wanted.append(_total_caption(layout, rays, measure))
    wanted += [_angle_caption(arc, measure) for arc in rays.arcs]
    taken = [label.box for label in layout.labels] + [name.box for name in group_names(layout, measure)]
    placed = []
    for caption in wanted:
        inside = caption.box.left >= 0 and caption.box.right <= layout.width
        if inside and caption.text and not any(caption.box.overlaps(box) for box in taken):
            placed.append(caption)
            taken.append(caption.box)
    return tuple(placed)


def circumstances(layout: WallLayout, wave: Wave, measure: TextMeasure) -> tuple[Caption, ...]:
    """Return frequency, angle and polarization at the upper left, on as many lines as the room asks for."""
    parts = (frequency_text(wave.frequency), angle_text(wave.angle), polarization(wave.polarization).label)
    room = layout.body.left - 2 * MARGIN
    lines = [", ".join(parts)]
    if measure.width(lines[0]) > room:
        lines = [parts[0], ", ".join(parts[1:])]
    made = []
    for number, line in enumerate(lines):
        text = elided(line, room, measure)
        top = layout.body.top + number * measure.line
        made.append(Caption(text, Box(MARGIN, top, MARGIN + measure.width(text), top + measure.line), "incident"))
    return tuple(made)


def share_captions(layout: WallLayout, wave: Wave, measure: TextMeasure) -> tuple[Caption, ...]:
    """Return the absorbed share at the foot of each slab, and beside each sheet, where there is room for it."""
    if wave.powers is None:
        return ()
    found: list[Caption] = []
    for slab in layout.slabs:
        share = wave.powers.absorbed[slab.row]
        texts = (f"absorbed {small_share_text(share)}", small_share_text(share))
        text = next((text for text in texts if measure.width(text) <= slab.box.width - 4), "")
        if text and share > 0:
            half = measure.width(text) / 2
            bottom = _above_level(slab.box, share, measure)
            box = Box(slab.box.middle - half, bottom - measure.line, slab.box.middle + half, bottom)
            found.append(Caption(text, box, "absorptance", slab.row))
    for sheet in layout.sheets:
        text = small_share_text(wave.powers.absorbed[sheet.row])
        boxes = (
            Box(x, sheet.slot.bottom - 3 - (row + 1) * measure.line, x + measure.width(text), 0)
            for row in (1, 2, 0)
            for x in (sheet.x + SHEET_CLEAR, sheet.x - SHEET_CLEAR - measure.width(text))
        )
        standing = (replace(box, bottom=box.top + measure.line) for box in boxes)
        free = next((box for box in standing if _is_free(box, layout, found)), None)
        if free is not None and wave.powers.absorbed[sheet.row] > 0:
            found.append(Caption(text, free, "absorptance", sheet.row))
    return tuple(found)


def small_share_text(share: float) -> str:
    """Return an absorbed share for the drawing, where less than a hundredth of a per cent is only told as such."""
    return share_text(share) if share >= 1e-4 or share == 0 else "< 0.01 %"


def _above_level(box: Box, share: float, measure: TextMeasure) -> float:
    """Return the lower edge of a text that keeps clear of the line at the top of a level."""
    level = share * box.height
    return box.bottom - 3 if level > measure.line + 6 else box.bottom - 3 - level


def _is_free(box: Box, layout: WallLayout, taken: Sequence[Caption]) -> bool:
    """Return whether a text beside a sheet keeps to the wall and off other sheets, labels and texts."""
    if box.left < layout.body.left or box.right > layout.body.right:
        return False
    if any(box.left - 4 < sheet.x < box.right + 4 for sheet in layout.sheets):
        return False
    return not any(
        box.overlaps(other) for other in (*(one.box for one in taken), *(one.box for one in layout.labels))
    )


def end_names(layout: WallLayout, measure: TextMeasure) -> tuple[Caption, ...]:
    """Return the names of the half-spaces at the two ends of the row of numbers."""
    numbers = [number.box for number in layout.numbers]
    rail = layout.rail
    first = min((box.left for box in numbers), default=layout.width / 2) - 2 * MARGIN
    last = max((box.right for box in numbers), default=layout.width / 2) + 2 * MARGIN
    front = elided(layout.wall.front.name, first - MARGIN, measure)
    back = elided(layout.wall.back.name, layout.width - MARGIN - last, measure)
    left = Box(MARGIN, rail.top, MARGIN + measure.width(front), rail.bottom)
    edge = layout.width - MARGIN
    right = Box(edge - measure.width(back), rail.top, edge, rail.bottom)
    return Caption(front, left, "end"), Caption(back, right, "end")


def group_names(layout: WallLayout, measure: TextMeasure) -> tuple[Caption, ...]:
    """Return how often each group is repeated: among the numbers below it, or at its foot for want of room."""
    taken = [number.box for number in layout.numbers] + [name.box for name in end_names(layout, measure)]
    found = []
    for group in layout.wall.groups:
        text = f"×{group.repeat}"
        box = _group_box(layout, group.first, group.last, measure.width(text) + 4, taken)
        taken.append(box)
        found.append(Caption(text, box, "group", group.last))
    return tuple(found)


def _group_box(layout: WallLayout, first: int, last: int, width: float, taken: Sequence[Box]) -> Box:
    rail, left, right = layout.rail, layout.extent(first).left, layout.extent(last).right
    starts = [right - width, (left + right - width) / 2, left, right + 3, left - width - 3]
    starts += [box.right + 4 for box in taken] + [box.left - width - 4 for box in taken]
    boxes = [Box(start, rail.top, start + width, rail.bottom) for start in starts]
    near = [box for box in boxes if box.right > left - width - 8 and box.left < right + width + 8]
    for box in near:
        inside = box.left >= 0 and box.right <= layout.width
        if inside and not any(box.grown(2).overlaps(other) for other in taken):
            return box
    bottom = layout.body.bottom - 5
    start = min(max(right - width, left), layout.width - width)
    return Box(start, bottom - layout.line, start + width, bottom)


def arrow_texts(powers: Powers) -> tuple[str, str]:
    """Return what is written at the ends of the reflected and of the transmitted arrow."""
    return f"R {share_text(powers.reflectance)}", f"T {share_text(powers.transmittance)}"


def _arrow_captions(layout: WallLayout, rays: Rays, wave: Wave, measure: TextMeasure) -> list[Caption]:
    assert wave.powers is not None
    texts = arrow_texts(wave.powers)
    made = []
    if rays.reflected is not None:
        edges = (MARGIN, layout.body.left - MARGIN)
        made.append(_arrow_caption(rays.reflected, texts[0], "reflectance", edges, layout, measure))
    if rays.transmitted is not None:
        edges = (layout.body.right + MARGIN, layout.width - MARGIN)
        made.append(_arrow_caption(rays.transmitted, texts[1], "transmittance", edges, layout, measure))
    return made


def _arrow_caption(
    arrow: Arrow,
    text: str,
    role: Role,
    edges: tuple[float, float],
    layout: WallLayout,
    measure: TextMeasure,
) -> Caption:
    """Return a caption beyond the end of its arrow, or below it where there is no room, between two x."""
    width, line = measure.width(text), measure.line
    x, y = arrow.end
    leftward = x < arrow.foot[0]
    if arrow.beside:
        left = x - END_GAP - width if leftward else x + END_GAP
        top = y - line / 2
    else:
        left = x if leftward else x - width
        top = max(corner[1] for corner in arrow.band.outline) + 2
    left = min(max(left, edges[0]), max(edges[1] - width, edges[0]))
    top = min(max(top, layout.body.top), layout.body.bottom - line)
    return Caption(text, Box(left, top, left + width, top + line), role)


def _absorbed_in_all(layout: WallLayout, wave: Wave, measure: TextMeasure) -> list[Caption]:
    """Return A of the whole wall at the upper right, opposite the circumstances."""
    assert wave.powers is not None
    text = f"A {small_share_text(math.fsum(wave.powers.absorbed))}"
    right, top = layout.width - MARGIN, layout.body.top
    box = Box(right - measure.width(text), top, right, top + measure.line)
    shown = layout.wall.elements and box.left > layout.body.right + 4
    return [Caption(text, box, "absorptance")] if shown else []


def _total_caption(layout: WallLayout, rays: Rays, measure: TextMeasure) -> Caption:
    room = layout.width - MARGIN - layout.body.right - 2 * MARGIN
    text = elided("total reflection", room, measure)
    left = layout.body.right + 2 * MARGIN
    top = rays.way_out - measure.line / 2
    return Caption(text, Box(left, top, left + measure.width(text), top + measure.line), "transmittance")


def _angle_caption(arc: Arc, measure: TextMeasure) -> Caption:
    """Return the angle written beyond its arc, half way between the normal and the ray."""
    text = tilt_text(arc.angle)
    side = 1 if arc.behind else -1
    width = measure.width(text)
    # In front the incident ray comes from above: the angle opens upward there.
    lean = arc.angle / 2 if arc.behind else -arc.angle / 2
    reach = arc.radius + FIGURE
    x = arc.x + side * reach * math.cos(lean)
    y = arc.y + reach * math.sin(lean)
    box = Box(x - width / 2, y - measure.line / 2, x + width / 2, y + measure.line / 2)
    return Caption(text, box, "angle")
