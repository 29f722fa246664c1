"""Tool tips of the drawing: what is under the pointer, with its values at the marker."""

from collections.abc import Sequence
from typing import Final

from app.panels.wall.captions import Caption
from app.panels.wall.layout import WallLayout
from app.panels.wall.parts import LayerPart
from app.panels.wall.wave import Wave
from app.panels.wall.words import direction_text, medium_text, part_text, share_text, sheet_text
from app.series.texts import frequency_text
from stackcore.conventions import CONVENTIONS
from stackcore.media.base import AbstractMedium
from stackcore.quantities import QUANTITIES
from stackcore.stack import Element, Layer, Stack

LOCKED: Final = "Locked: its faces cannot be dragged; type the thickness, or unlock it."
LEFT_OUT: Final = "Left out of the computation."
DRAG_HINT: Final = "Drag to change the thickness."


Elements = Sequence[Element | None]
"""What stands for each row of the wall; None for a row that is left out."""


def tip_at(
    layout: WallLayout,
    wave: Wave,
    stack: Stack,
    written: Sequence[Caption],
    x: float,
    y: float,
    elements: Elements | None = None,
) -> str:
    """Return what to say of the place (x, y), empty where there is nothing to say.

    `elements` are those of the rows; without them every element of `stack` is a row.
    """
    caption = next((one for one in written if one.row is None and _holds(one, x, y)), None)
    if caption is not None:
        return _caption_tip(caption)
    row = row_at(layout, x, y)
    if row is not None:
        return element_tip(layout, wave, stack.elements if elements is None else elements, row)
    if not layout.body.top <= y <= layout.height:
        return ""
    if x < layout.body.left:
        return _half_space_tip("Front", layout.wall.front.name, stack.front, wave)
    if isinstance(stack.back, AbstractMedium):
        return _half_space_tip("Back", layout.wall.back.name, stack.back, wave)
    return "Back: metal, a perfect conductor. Nothing passes."


def row_at(layout: WallLayout, x: float, y: float) -> int | None:
    """Return the element at (x, y): in the wall, or by its label or number."""
    for label in layout.labels:
        box = label.box.grown(2)
        if label.leader is not None and box.left <= x <= box.right and box.top <= y <= box.bottom:
            return label.row
    return layout.row_at(x) if y >= layout.body.top else None


def element_tip(layout: WallLayout, wave: Wave, elements: Elements, row: int) -> str:
    """Return name, thickness, material values at the marker, direction of the wave and absorbed share."""
    part, element = layout.wall.elements[row], elements[row]
    lines = [part_text(row, part)]
    if element is None:
        return "\n".join([*lines, LEFT_OUT])
    if isinstance(element, Layer):
        lines.append(f"{medium_text(element.medium, wave.frequency)} at {frequency_text(wave.frequency)}")
        course = wave.courses.elements[row]
        lines += [direction_text(course)] if course is not None else []
    else:
        lines.append(f"{sheet_text(element.sheet, wave.frequency)} at {frequency_text(wave.frequency)}")
    if wave.powers is not None:
        old = " (of an earlier state)" if wave.stale else ""
        lines.append(f"absorbs {share_text(wave.powers.absorbed[row])} of the incident power{old}")
    if part.faulty:
        lines.append("What is typed for it in the table is no value yet; the last good one is drawn.")
    if isinstance(part, LayerPart) and part.locked:
        lines.append(LOCKED)
    elif isinstance(part, LayerPart):
        lines.append(DRAG_HINT.replace("Drag", "Drag a face"))
    return "\n".join(lines)


def _holds(caption: Caption, x: float, y: float) -> bool:
    box = caption.box
    return box.left <= x <= box.right and box.top <= y <= box.bottom


def _caption_tip(caption: Caption) -> str:
    if caption.role in ("reflectance", "transmittance", "absorptance"):
        quantity = QUANTITIES[caption.role]
        return f"{quantity.label}: {quantity.definition}"
    return CONVENTIONS["angle"]


def _half_space_tip(side: str, name: str, medium: AbstractMedium, wave: Wave) -> str:
    values = medium_text(medium, wave.frequency)
    return f"{side}: {name}\n{values} at {frequency_text(wave.frequency)}"
