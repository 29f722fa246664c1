"""Draws the wall into any painter: the widget, a picture or a vector device.

Only solid and gradient fills, lines and text are used, with no clipping, so that a vector file shows the same.
"""

from collections.abc import Iterable
from dataclasses import dataclass, replace
from typing import Final

from PySide6.QtCore import QLineF, QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QFontMetricsF, QLinearGradient, QPainter, QPen, QPolygonF

from app.look.theme import Theme, kind_style
from app.panels.wall import captions, wave_painting
from app.panels.wall.geometry import Box, Stroke
from app.panels.wall.hatch import strokes
from app.panels.wall.labels import Label, TextMeasure
from app.panels.wall.layout import Face, Held, Slab, WallLayout, lay_out
from app.panels.wall.parts import HalfSpacePart, Wall
from app.panels.wall.pens import FontMeasure, colour, rectangle
from app.panels.wall.scale import ThicknessScale
from app.panels.wall.symbols import paint_sheet
from app.panels.wall.wave import Wave
from app.panels.wall.words import EMPTY_HINT

RADIUS: Final = 4.0
HATCH_ALPHA: Final = 0.65


@dataclass(frozen=True, slots=True)
class Touch:
    """What the hand and the eye are on: selection, the face under the pointer, the value tag of a drag, focus."""

    selected: tuple[int, ...] = ()
    face: Face | None = None
    tag: str = ""
    focused: bool = False


def paint_wall(
    painter: QPainter,
    rect: QRectF,
    wall: Wall,
    theme: Theme,
    wave: Wave | None = None,
    touch: Touch | None = None,
) -> None:
    """Draw a wall into `rect` with the painter's font.

    Parameters
    ----------
    wave
        The rays and what they carry; None leaves them out.
    touch
        Selection and handles; None draws none, as for a report.
    """
    layout = laid_out(painter, rect, wall)
    painter.save()
    painter.translate(rect.topLeft())
    paint_layout(painter, layout, theme, wave, touch or Touch())
    painter.restore()


def laid_out(
    painter: QPainter,
    rect: QRectF,
    wall: Wall,
    last: ThicknessScale | None = None,
    held: Held | None = None,
) -> WallLayout:
    """Return the layout of a wall for the painter's font."""
    measure = FontMeasure(QFontMetricsF(painter.font(), painter.device()))
    return lay_out(wall, rect.width(), rect.height(), measure, last=last, held=held)


def paint_layout(painter: QPainter, layout: WallLayout, theme: Theme, wave: Wave | None, touch: Touch) -> None:
    """Draw a wall that is laid out, its upper left corner at the painter's origin."""
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    painter.fillRect(QRectF(0, 0, layout.width, layout.height), QColor(theme.base))
    _paint_half_space(painter, layout.front, layout.wall.front, theme, to_left=True)
    _paint_half_space(painter, layout.back, layout.wall.back, theme, to_left=False)
    for slab in layout.slabs:
        _paint_slab(painter, slab, theme)
    _paint_label_grounds(painter, layout, theme)
    measure = FontMeasure(QFontMetricsF(painter.font(), painter.device()))
    rays = None if wave is None else captions.rays_in(layout, wave, measure)
    painter.setOpacity(wave_painting.STALE_OPACITY if wave is not None and wave.stale else 1.0)
    if wave is not None and rays is not None:
        wave_painting.paint_levels(painter, layout, wave, theme)
        wave_painting.paint_within(painter, rays, theme)
    painter.setOpacity(1.0)
    _paint_faces(painter, layout, theme)
    _paint_sheets(painter, layout, theme)
    _paint_selection(painter, layout, theme, touch)
    _paint_labels(painter, layout, theme, touch)
    _paint_rail(painter, layout, measure, theme, touch)
    painter.setOpacity(wave_painting.STALE_OPACITY if wave is not None and wave.stale else 1.0)
    if wave is not None and rays is not None:
        wave_painting.paint_outside(painter, rays, wave, theme)
    painter.setOpacity(1.0)
    if wave is not None and rays is not None:
        written = captions.captions(layout, rays, wave, measure)
        wave_painting.paint_captions(painter, written, layout, theme, stale=wave.stale)
    if touch.face is not None:
        _paint_handle(painter, layout, touch.face, touch.tag, theme)


def _paint_slab(painter: QPainter, slab: Slab, theme: Theme) -> None:
    style = kind_style(theme, slab.part.kind)
    if slab.part.left_out:
        # A gap with its outline: what is not computed is not there, and yet it is in the list.
        painter.setBrush(Qt.BrushStyle.NoBrush)
        painter.setPen(QPen(QColor(style.ink), 1.0, Qt.PenStyle.DotLine))
        painter.drawRect(rectangle(slab.box).adjusted(2, 2, -2, -2))
        return
    painter.fillRect(rectangle(slab.box), QColor(style.tint))
    _paint_strokes(painter, strokes(style.hatch, slab.box), colour(style.ink, HATCH_ALPHA))


def _paint_strokes(painter: QPainter, lines: Iterable[Stroke], ink: QColor) -> None:
    # Lines of width 1 are drawn many times faster than broader ones.
    painter.setPen(QPen(ink, 1.0, Qt.PenStyle.SolidLine, Qt.PenCapStyle.FlatCap))
    painter.drawLines([QLineF(*line) for line in lines])


def _paint_half_space(painter: QPainter, box: Box, part: HalfSpacePart, theme: Theme, *, to_left: bool) -> None:
    """Draw the kind of a half-space beside the wall, fading into the ground; air is drawn as nothing."""
    if not part.kind or box.width < 1:
        return
    style = kind_style(theme, part.kind)
    reach = min(box.width, 220.0)
    near = box.right if to_left else box.left
    far = near - reach if to_left else near + reach
    seen = replace(box, left=min(near, far), right=max(near, far))
    painter.fillRect(rectangle(seen), QColor(style.tint))
    _paint_strokes(painter, strokes(style.hatch, seen), colour(style.ink, HATCH_ALPHA))
    veil = QLinearGradient(near, 0, far, 0)
    veil.setColorAt(0.0, colour(theme.base, 0.0))
    veil.setColorAt(0.25, colour(theme.base, 0.15))
    veil.setColorAt(1.0, colour(theme.base, 1.0))
    painter.fillRect(rectangle(seen.grown(0.5)), veil)


def _paint_faces(painter: QPainter, layout: WallLayout, theme: Theme) -> None:
    xs = {round(face.x, 3) for face in layout.faces()}
    painter.setPen(QPen(QColor(theme.edge), 1.0))
    for x in sorted(xs):
        painter.drawLine(QPointF(x, layout.body.top), QPointF(x, layout.body.bottom))
    if layout.wall.elements:
        return
    painter.setPen(QPen(QColor(theme.edge), 1.0, Qt.PenStyle.DashLine))
    x = layout.body.middle
    painter.drawLine(QPointF(x, layout.body.top), QPointF(x, layout.body.bottom))


def _paint_sheets(painter: QPainter, layout: WallLayout, theme: Theme) -> None:
    for sheet in layout.sheets:
        roomy = sheet.slot.width >= 14
        parts = sheet.part.parts if roomy else ()
        ink = QColor(theme.fault if sheet.part.faulty else theme.text)
        paint_sheet(painter, sheet.x, sheet.slot.top, sheet.slot.bottom, parts, ink, QColor(theme.base))


def _paint_selection(painter: QPainter, layout: WallLayout, theme: Theme, touch: Touch) -> None:
    painter.setBrush(Qt.BrushStyle.NoBrush)
    for row in touch.selected:
        if row >= len(layout.wall.elements):
            continue
        box = rectangle(layout.extent(row))
        painter.setPen(QPen(QColor(theme.accent), 2.0))
        painter.drawRect(box)
        if touch.focused:
            painter.setPen(QPen(colour(theme.accent, 0.35), 3.0))
            painter.drawRoundedRect(box.adjusted(-3, -3, 3, 3), RADIUS, RADIUS)
    if touch.focused and not touch.selected:
        painter.setPen(QPen(QColor(theme.accent), 2.0))
        edge = QRectF(1.5, 1.5, layout.width - 3, layout.height - 3)
        painter.drawRoundedRect(edge, RADIUS, RADIUS)


def _paint_label_grounds(painter: QPainter, layout: WallLayout, theme: Theme) -> None:
    """Take the hatch away where a label will stand; what the wave does is drawn over that."""
    # Opaque: a fill that mixes with what lies below costs several times as much.
    tints = {slab.row: QColor(kind_style(theme, slab.part.kind).tint) for slab in layout.slabs}
    for label in layout.labels:
        if label.leader is None:
            # Square corners: rounded ones cost as much as all hatches together.
            painter.fillRect(rectangle(label.box.grown(2.5)), tints[label.row])


def _paint_labels(painter: QPainter, layout: WallLayout, theme: Theme, touch: Touch) -> None:
    for label in layout.labels:
        part = layout.wall.elements[label.row]
        selected = label.row in touch.selected
        if label.leader is not None:
            x, top, bottom = label.leader
            painter.setPen(QPen(QColor(theme.accent if selected else theme.edge), 1.0))
            painter.drawLine(QPointF(x, top + 2), QPointF(x, bottom))
        _paint_runs(painter, label, theme, faulty=part.faulty, selected=selected)


def _paint_runs(painter: QPainter, label: Label, theme: Theme, *, faulty: bool, selected: bool) -> None:
    outside = label.leader is not None
    painter.save()
    if label.upright:
        painter.translate(label.box.left, label.box.bottom)
        painter.rotate(-90)
    for run in label.runs:
        ink = theme.accent if selected and outside else theme.text
        if run.role == "value":
            ink = theme.fault if faulty else (theme.muted if outside else theme.text)
        painter.setPen(QColor(ink))
        # A little wider than measured: rounding must not break the line.
        painter.drawText(rectangle(run.box).adjusted(0, 0, 4, 0), Qt.AlignmentFlag.AlignVCenter, run.text)
    painter.restore()


def _paint_rail(painter: QPainter, layout: WallLayout, measure: TextMeasure, theme: Theme, touch: Touch) -> None:
    """Write the half-spaces' names and the elements' numbers below the wall, and join those of groups."""
    _paint_groups(painter, layout, measure, theme)
    for number in layout.numbers:
        selected = number.row in touch.selected
        painter.setPen(QColor(theme.accent if selected else theme.muted))
        painter.drawText(rectangle(number.box.grown(4)), Qt.AlignmentFlag.AlignCenter, str(number.row + 1))
    painter.setPen(QColor(theme.text))
    for name in captions.end_names(layout, measure):
        painter.drawText(rectangle(name.box).adjusted(0, 0, 4, 0), Qt.AlignmentFlag.AlignVCenter, name.text)
    if not layout.wall.elements:
        painter.setPen(QColor(theme.muted))
        painter.drawText(rectangle(layout.rail), Qt.AlignmentFlag.AlignCenter, EMPTY_HINT)


def _paint_groups(painter: QPainter, layout: WallLayout, measure: TextMeasure, theme: Theme) -> None:
    """Draw a line below the elements of each group, and how often they are repeated beside their numbers."""
    painter.setPen(QPen(QColor(theme.text), 3.0, Qt.PenStyle.SolidLine, Qt.PenCapStyle.FlatCap))
    for group in layout.wall.groups:
        left, right = layout.extent(group.first).left, layout.extent(group.last).right
        y = layout.body.bottom - 1.5
        painter.drawLine(QPointF(left + 1, y), QPointF(right - 1, y))
    painter.setPen(QColor(theme.text))
    for name in captions.group_names(layout, measure):
        if name.box.bottom <= layout.body.bottom:
            painter.fillRect(rectangle(name.box), colour(theme.base, 0.85))
        painter.drawText(rectangle(name.box), Qt.AlignmentFlag.AlignCenter, name.text)


def _paint_handle(painter: QPainter, layout: WallLayout, face: Face, tag: str, theme: Theme) -> None:
    """Draw the face under the hand, and while it is dragged the thickness beside it."""
    painter.setPen(QPen(QColor(theme.accent), 2.5))
    painter.drawLine(QPointF(face.x, layout.body.top), QPointF(face.x, layout.body.bottom))
    middle = layout.body.top + layout.body.height / 2
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(theme.accent))
    for side in (-1, 1):
        points = [(face.x + side * 5, middle - 5), (face.x + side * 10, middle), (face.x + side * 5, middle + 5)]
        painter.drawPolygon(QPolygonF([QPointF(x, y) for x, y in points]))
    if not tag:
        return
    wide = QFontMetricsF(painter.font()).horizontalAdvance(tag) + 16
    left = min(max(face.x - wide / 2, 2.0), layout.width - wide - 2)
    pill = QRectF(left, middle - layout.line - 16, wide, layout.line + 6)
    painter.drawRoundedRect(pill, RADIUS, RADIUS)
    painter.setPen(QColor(theme.on_accent))
    painter.drawText(pill, Qt.AlignmentFlag.AlignCenter, tag)
