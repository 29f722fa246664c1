"""Draws the rays, the levels of absorbed power, the angles and what is written about them."""

import math
from dataclasses import replace
from typing import Final

from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QLinearGradient, QPainter, QPen, QPolygonF

from app.look.theme import Theme, curve_colour, kind_style, label_colour
from app.panels.wall.captions import Caption
from app.panels.wall.geometry import Box
from app.panels.wall.layout import WallLayout
from app.panels.wall.pens import colour, rectangle
from app.panels.wall.rays import Arc, Band, Rays
from app.panels.wall.wave import Wave
from stackcore.polarizations import polarization

STALE_OPACITY: Final = 0.35
LEVEL_ALPHA: Final = 0.34
BAND_ALPHA: Final = 0.82
WITHIN_ALPHA: Final = 0.62
FAINT_ALPHA: Final = 0.6
DECAY_ALPHA: Final = 0.25
INCIDENT_ALPHA: Final = 0.45
FADE: Final = 22.0
"""Height in px over which a band that wraps fades."""


def paint_levels(painter: QPainter, layout: WallLayout, wave: Wave, theme: Theme) -> None:
    """Draw the absorbed share of each element as a level: one filled to the top would absorb everything."""
    if wave.powers is None:
        return
    boxes = {slab.row: slab.box for slab in layout.slabs}
    boxes |= {
        sheet.row: Box(sheet.x - 5, sheet.slot.top, sheet.x + 5, sheet.slot.bottom) for sheet in layout.sheets
    }
    for row, box in boxes.items():
        tall = wave.powers.absorbed[row] * box.height
        if tall < 0.5:
            continue
        level = replace(box, top=box.bottom - tall)
        painter.fillRect(rectangle(level), colour(theme.absorption, LEVEL_ALPHA))
        painter.setPen(QPen(QColor(theme.absorption), 1.6, Qt.PenStyle.SolidLine, Qt.PenCapStyle.FlatCap))
        painter.drawLine(QPointF(level.left, level.top), QPointF(level.right, level.top))


def paint_within(painter: QPainter, rays: Rays, theme: Theme) -> None:
    """Draw the wave on its way through the wall."""
    for band in rays.within:
        _paint_band(painter, band, theme, WITHIN_ALPHA, rays.zone if rays.wraps else None)


def paint_outside(painter: QPainter, rays: Rays, wave: Wave, theme: Theme) -> None:
    """Draw the arrows in the half-spaces with their angles and the direction of the electric field."""
    _paint_normals(painter, rays, theme)
    for arrow in (rays.incident, rays.reflected, rays.transmitted):
        if arrow is not None:
            _paint_band(painter, arrow.band, theme, BAND_ALPHA)
    _paint_field(painter, rays, wave, theme)


def paint_captions(
    painter: QPainter,
    written: tuple[Caption, ...],
    layout: WallLayout,
    theme: Theme,
    *,
    stale: bool = False,
) -> None:
    """Write what belongs to the wave, upon a quiet ground where it stands in a slab; all in one ink when stale."""
    grounds = {slab.row: kind_style(theme, slab.part.kind).tint for slab in layout.slabs}
    for caption in written:
        end = layout.wall.front if caption.box.right < layout.body.left else layout.wall.back
        if caption.row is not None or end.kind:
            ground = theme.base if caption.row is None else grounds.get(caption.row, theme.base)
            painter.setPen(Qt.PenStyle.NoPen)
            painter.setBrush(colour(ground, 0.8))
            painter.drawRoundedRect(rectangle(caption.box.grown(1.5)), 3, 3)
        painter.setPen(QColor(theme.stale if stale else _ink(caption, theme)))
        painter.drawText(rectangle(caption.box).adjusted(0, 0, 4, 0), Qt.AlignmentFlag.AlignVCenter, caption.text)


def _ink(caption: Caption, theme: Theme) -> str:
    if caption.row is None and caption.role in ("reflectance", "transmittance", "absorptance"):
        return label_colour(theme, curve_colour(theme, caption.role, 0, 1))
    return theme.muted if caption.role == "angle" else theme.text


def _paint_band(painter: QPainter, band: Band, theme: Theme, alpha: float, fading: Box | None = None) -> None:
    """Fill a band; one that wraps fades where it leaves the zone and comes back."""
    code = theme.muted if band.role == "incident" else curve_colour(theme, band.role, 0, 1)
    if band.role == "incident":
        alpha = INCIDENT_ALPHA
    if band.faint:
        alpha = FAINT_ALPHA
    if band.decays:
        alpha = DECAY_ALPHA
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(colour(code, alpha))
    if fading is not None:
        gradient = QLinearGradient(0, fading.top, 0, fading.bottom)
        edge = FADE / fading.height
        for place, share in ((0.0, 0.0), (edge, 1.0), (1 - edge, 1.0), (1.0, 0.0)):
            gradient.setColorAt(place, colour(code, alpha * share))
        painter.setBrush(gradient)
    painter.drawPolygon(QPolygonF([QPointF(x, y) for x, y in band.outline]))


def _paint_normals(painter: QPainter, rays: Rays, theme: Theme) -> None:
    for arc in rays.arcs:
        _paint_angle(painter, arc, theme)


def _paint_angle(painter: QPainter, arc: Arc, theme: Theme) -> None:
    """Draw the normal where the angle is measured and the arc between it and the ray."""
    side = 1 if arc.behind else -1
    painter.setBrush(Qt.BrushStyle.NoBrush)
    painter.setPen(QPen(QColor(theme.muted), 1.0, Qt.PenStyle.DashLine))
    painter.drawLine(QPointF(arc.x, arc.y), QPointF(arc.x + side * (arc.radius + 22), arc.y))
    painter.setPen(QPen(QColor(theme.muted), 1.0))
    square = QRectF(arc.x - arc.radius, arc.y - arc.radius, 2 * arc.radius, 2 * arc.radius)
    # Qt counts sixteenths of a degree anticlockwise from three o'clock, on a y axis that points up.
    sixteenths = round(math.degrees(arc.angle) * 16)
    begin = 0 if arc.behind else 180 * 16
    painter.drawArc(square, begin, -sixteenths)


def _paint_field(painter: QPainter, rays: Rays, wave: Wave, theme: Theme) -> None:
    """Mark the field on the incident ray: a point toward the eye for TE, a double arrow for TM, or both."""
    tail, end = rays.incident.end, rays.incident.foot
    x, y = tail[0] + 0.42 * (end[0] - tail[0]), tail[1] + 0.42 * (end[1] - tail[1])
    te, tm = polarization(wave.polarization).power_shares
    if tm > 0:
        _paint_arrow(painter, (x, y), wave.angle, theme)
    if te > 0:
        ink = QColor(theme.text)
        painter.setPen(QPen(ink, 1.4))
        painter.setBrush(QColor(theme.base))
        painter.drawEllipse(QPointF(x, y), 6.0, 6.0)
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(ink)
        painter.drawEllipse(QPointF(x, y), 2.0, 2.0)


def _paint_arrow(painter: QPainter, place: tuple[float, float], theta: float, theme: Theme) -> None:
    x, y = place
    ink = QColor(theme.text)
    painter.setPen(QPen(ink, 1.4))
    across = (math.sin(theta), -math.cos(theta))
    along = (math.cos(theta), math.sin(theta))
    painter.drawLine(
        QPointF(x - 13 * across[0], y - 13 * across[1]), QPointF(x + 13 * across[0], y + 13 * across[1])
    )
    for sign in (-1, 1):
        tip = (x + sign * 14 * across[0], y + sign * 14 * across[1])
        foot = (x + sign * 8 * across[0], y + sign * 8 * across[1])
        wings = [(foot[0] + turn * 3.5 * along[0], foot[1] + turn * 3.5 * along[1]) for turn in (-1, 1)]
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(ink)
        painter.drawPolygon(QPolygonF([QPointF(*tip), *(QPointF(*wing) for wing in wings)]))
