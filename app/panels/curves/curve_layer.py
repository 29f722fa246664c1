"""The curves themselves: thin and fast while something moves, finer when it rests."""

from collections.abc import Sequence
from dataclasses import dataclass, field
from itertools import pairwise
from typing import Any, Final

import numpy as np
import pyqtgraph as pg
from numpy.typing import NDArray
from PySide6.QtCore import QPointF, QRectF, Qt
from PySide6.QtGui import QColor, QPainter, QPen, QPolygonF

from app.panels.curves.frame import Frame, finite_runs
from app.panels.curves.layer import Layer
from stackcore.arrays import FloatArray

Mask = NDArray[np.bool_]

LIVE_WIDTH: Final = 1.0
FINE_WIDTH: Final = 1.6
CHOSEN_WIDTH: Final = 2.4
# A stroke wider than a pixel costs the raster engine time that grows faster than its length; short pieces keep
# it proportional. They overlap by a fraction of a pixel, so that no joint shows.
_PIECE: Final = 48
_JOIN: Final = 0.6
DOTTED: Final[tuple[float, ...]] = (1.6, 3.2)
"""Dots where a solid curve stands on a guess."""
DOTTED_DASHES: Final[tuple[float, ...]] = (1.6, 2.4, 1.6, 6.4)
"""The same of a dashed curve: dots in pairs, so that the line style still tells the polarization."""
_ONE_MORE_DOT: Final = (1.6, 2.4)
"""For each dot in the dashes of a circular or a tilted wave."""
_FEW_POINTS: Final = 40
_POINT: Final = 2.5
_BAND: Final = 0.22
_FAINTEST: Final = 0.012
_BAND_EDGE: Final = 0.35
_SIGN_APART: Final = 90.0
SIGNS: Final[tuple[tuple[tuple[float, float], ...], ...]] = (
    ((-4.0, 3.5), (4.0, 3.5), (0.0, -4.5)),
    ((-3.5, -3.5), (3.5, -3.5), (3.5, 3.5), (-3.5, 3.5)),
    ((0.0, -5.0), (4.0, 0.0), (0.0, 5.0), (-4.0, 0.0)),
    ((-4.0, -3.5), (4.0, -3.5), (0.0, 4.5)),
)
"""Triangle, square, diamond, triangle on its tip: corners in pixels about the point."""
# Points beyond which the finer drawing would take longer than a person waits without noticing.
_FINE_POINTS: Final = 60_000


@dataclass(frozen=True, slots=True, eq=False)
class DrawnCurve:
    """One curve as it is drawn.

    Parameters
    ----------
    positions
        Along the frequency axis, rising.
    values
        As many; not a number where the curve has a gap.
    colour
        ``#rrggbb``.
    dashes
        Dash pattern in pixels; empty for solid.
    chosen
        Drawn a little wider: the angle and polarization that the wall drawing shows.
    leap
        Neighbouring values that differ by more are not joined.
    held
        For each point, whether what it stands on is known there; None for everywhere. Elsewhere it is dotted.
    low, high
        Ends of a band that is filled behind the curve, not a number where there is none; None without one.
    sign
        Sign that is set on the curve again and again: of a stack that is not the one in hand. -1 for none.
    """

    positions: FloatArray
    values: FloatArray
    colour: str
    dashes: tuple[float, ...] = ()
    chosen: bool = False
    leap: float = np.inf
    held: Mask | None = None
    low: FloatArray | None = None
    high: FloatArray | None = None
    sign: int = -1
    runs: tuple[tuple[int, int], ...] = field(init=False)
    pieces: tuple[tuple[int, int, bool], ...] = field(init=False)

    def __post_init__(self) -> None:
        runs = finite_runs(self.values, self.leap)
        object.__setattr__(self, "runs", runs)
        pieces = [piece for run in runs for piece in held_pieces(*run, self.held)]
        object.__setattr__(self, "pieces", tuple(pieces))

    def pattern(self, held: bool) -> tuple[float, ...]:
        """Return the dash pattern where the curve stands on data, or where it does not."""
        if held:
            return self.dashes
        return DOTTED if not self.dashes else _ONE_MORE_DOT * (len(self.dashes) // 2 - 1) + DOTTED_DASHES


class CurveLayer(Layer):
    """Draws all curves in one go, in pixels."""

    def __init__(self, area: Any, height: float) -> None:
        super().__init__(area, height)
        self._curves: tuple[DrawnCurve, ...] = ()
        self._fine = False

    @property
    def curves(self) -> tuple[DrawnCurve, ...]:
        """What is drawn."""
        return self._curves

    @property
    def fine(self) -> bool:
        """Whether lines are drawn at their full width."""
        return self._fine

    def set_curves(self, curves: Sequence[DrawnCurve]) -> None:
        """Draw these curves from now on."""
        self._curves = tuple(curves)
        self.update()

    def set_fine(self, fine: bool) -> None:
        """Draw at full width and keep the picture, or thin and anew each time."""
        wanted = fine and sum(len(curve.values) for curve in self._curves) <= _FINE_POINTS
        if wanted == self._fine:
            return
        self._fine = wanted
        mode = self.CacheMode.DeviceCoordinateCache if wanted else self.CacheMode.NoCache
        self.setCacheMode(mode)
        self.update()

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw the visible part of each curve; the chosen one lies on top."""
        # Half a line's width of room, so that a curve along the edge is not cut lengthwise.
        painter.setClipRect(QRectF(-1.5, -1.5, frame.width + 3.0, frame.height + 3.0))
        banded = [curve for curve in self._curves if curve.low is not None]
        for curve in banded:
            _draw_band(painter, curve, frame, _BAND / len(banded))
        for curve in sorted(self._curves, key=lambda one: (one.sign < 0, one.chosen)):
            width = LIVE_WIDTH if not self._fine else CHOSEN_WIDTH if curve.chosen else FINE_WIDTH
            pen = QPen(QColor(curve.colour), width)
            # One device pixel, whatever the scale of the screen, is what the raster engine draws fastest.
            pen.setCosmetic(not self._fine)
            pen.setJoinStyle(Qt.PenJoinStyle.BevelJoin)
            for first, last, held in curve.pieces:
                first, last = _visible(curve.positions, first, last, frame)
                across = frame.across(curve.positions[first:last])
                down = frame.down(curve.values[first:last])
                if last - first > 1:
                    _draw_run(painter, QPen(pen), curve.pattern(held), across, down)
                if last - first == 1 or len(curve.values) <= _FEW_POINTS:
                    for x, y in zip(across.tolist(), down.tolist(), strict=True):
                        _draw_dot(painter, curve, QPointF(x, y))
                if curve.sign >= 0:
                    draw_signs(painter, curve.colour, curve.sign, across, down)


def held_pieces(first: int, last: int, held: Mask | None) -> tuple[tuple[int, int, bool], ...]:
    """Return the stretches ``(first, past last, held)`` of a run; neighbours share the point where they meet.

    A line between two points is drawn as known only when both ends are.

    Examples
    --------
    >>> held_pieces(0, 4, np.array([True, True, False, False]))
    ((0, 2, True), (1, 4, False))
    """
    if held is None or held[first:last].all():
        return ((first, last, True),)
    if last - first < 2:
        return ((first, last, bool(held[first])),)
    known = held[first : last - 1] & held[first + 1 : last]
    turns = [0, *(np.flatnonzero(known[1:] != known[:-1]) + 1).tolist(), len(known)]
    return tuple((first + a, first + b + 1, bool(known[a])) for a, b in pairwise(turns))


def _visible(positions: FloatArray, first: int, last: int, frame: Frame) -> tuple[int, int]:
    """Return the stretch of points that can be seen, with a neighbour on either side."""
    run = positions[first:last]
    begin = int(np.searchsorted(run, frame.left, side="right")) - 1
    end = int(np.searchsorted(run, frame.right, side="left")) + 1
    return first + max(begin, 0), first + min(end, last - first)


def _draw_run(
    painter: QPainter, pen: QPen, dashes: tuple[float, ...], across: FloatArray, down: FloatArray
) -> None:
    width = pen.widthF()
    if dashes:
        pen.setDashPattern([length / width for length in dashes])
    if width <= LIVE_WIDTH:
        painter.setPen(pen)
        painter.drawPolyline(polygon(across, down))
        return
    pen.setCapStyle(Qt.PenCapStyle.FlatCap)
    painter.setPen(pen)
    steps = np.hypot(np.diff(across), np.diff(down))
    lengths = np.concatenate(([0.0], np.cumsum(steps)))
    for begin in range(0, len(across) - 1, _PIECE):
        stop = begin + _PIECE + 1
        points = polygon(across[begin:stop], down[begin:stop])
        lead = 0.0
        if begin and steps[begin - 1] > 0:
            lead = min(_JOIN, float(steps[begin - 1]))
            back = lead / steps[begin - 1]
            points.prepend(
                QPointF(
                    across[begin] + (across[begin - 1] - across[begin]) * back,
                    down[begin] + (down[begin - 1] - down[begin]) * back,
                )
            )
        if dashes:
            pen.setDashOffset((float(lengths[begin]) - lead) / width)
            painter.setPen(pen)
        painter.drawPolyline(points)


def _draw_band(painter: QPainter, curve: DrawnCurve, frame: Frame, strength: float) -> None:
    """Fill the envelope of a curve, so pale that all of them over each other leave the curves readable."""
    if curve.low is None or curve.high is None:
        return
    fill, edge = QColor(curve.colour), QColor(curve.colour)
    fill.setAlphaF(max(strength, _FAINTEST))
    edge.setAlphaF(_BAND_EDGE)
    for begin, end in finite_runs(curve.low, curve.leap):
        first, last = _visible(curve.positions, begin, end, frame)
        if last - first < 2:
            continue
        across = frame.across(curve.positions[first:last])
        ends = [frame.down(values[first:last]) for values in (curve.low, curve.high)]
        painter.setPen(Qt.PenStyle.NoPen)
        painter.setBrush(fill)
        painter.drawPolygon(
            polygon(np.concatenate((across, across[::-1])), np.concatenate((ends[0], ends[1][::-1])))
        )
        painter.setBrush(Qt.BrushStyle.NoBrush)
        pen = QPen(edge, LIVE_WIDTH)
        pen.setCosmetic(True)
        painter.setPen(pen)
        for down in ends:
            painter.drawPolyline(polygon(across, down))


def draw_signs(painter: QPainter, colour: str, sign: int, across: FloatArray, down: FloatArray) -> None:
    """Set a sign on a line every so many pixels; different signs begin at different places.

    Parameters
    ----------
    sign
        Which one: it begins anew after the last of `SIGNS`.
    """
    lengths = np.concatenate(([0.0], np.cumsum(np.hypot(np.diff(across), np.diff(down)))))
    first = _SIGN_APART * (0.25 + 0.5 * (sign % 2))
    places = np.arange(first, max(float(lengths[-1]), first + 1.0), _SIGN_APART)
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(colour))
    shape = SIGNS[sign % len(SIGNS)]
    for x, y in zip(np.interp(places, lengths, across), np.interp(places, lengths, down), strict=True):
        painter.drawPolygon(QPolygonF([QPointF(x + dx, y + dy) for dx, dy in shape]))
    painter.setBrush(Qt.BrushStyle.NoBrush)


def _draw_dot(painter: QPainter, curve: DrawnCurve, at: QPointF) -> None:
    """Draw a computed point, so that a few listed frequencies do not pass for a continuous sweep."""
    painter.setPen(Qt.PenStyle.NoPen)
    painter.setBrush(QColor(curve.colour))
    painter.drawEllipse(at, _POINT, _POINT)
    painter.setBrush(Qt.BrushStyle.NoBrush)


def polygon(across: FloatArray, down: FloatArray) -> QPolygonF:
    """Return points as Qt takes them, copied in one go."""
    points: QPolygonF = pg.functions.create_qpolygonf(len(across))
    memory = pg.functions.ndarray_from_qpolygonf(points)
    memory[:, 0] = across
    memory[:, 1] = down
    return points
