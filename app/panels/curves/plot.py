"""The plot: two axes, the layers over them and the ranges they show."""

import math
from collections.abc import Callable, Sequence
from dataclasses import dataclass
from typing import Final

import pyqtgraph as pg
from PySide6.QtCore import QEvent, QPointF, QRectF, QTimer, Signal
from PySide6.QtGui import (
    QColor,
    QContextMenuEvent,
    QFocusEvent,
    QFont,
    QFontInfo,
    QFontMetricsF,
    QKeyEvent,
    QMouseEvent,
    QPen,
    QWheelEvent,
)
from PySide6.QtWidgets import QWidget

from app.look.theme import Theme
from app.panels.curves.axis import QuietAxis
from app.panels.curves.curve_layer import CurveLayer, DrawnCurve
from app.panels.curves.end_labels import EndLabel, EndLabels
from app.panels.curves.frame import Frame
from app.panels.curves.hand import PlottingHand
from app.panels.curves.mark_layers import LevelLayer, MarkerLayer, PointerLayer, WorstLayer
from app.panels.curves.note_layer import NoteLayer
from app.panels.curves.range_history import RangeHistory, Shown
from app.panels.curves.scale import round_range

REST: Final = 250
"""Milliseconds without a change after which curves are drawn finer."""

_CLOSEST: Final = 1e-9
_SMALLEST: Final = 1e-300
_LARGEST: Final = 1e15


@dataclass(frozen=True, slots=True)
class Extent:
    """The whole of what there is to show: ends of the frequency axis (positions) and of the values.

    `floor` and `top` are ends that the values cannot pass, such as 1 of a fraction; `degrees` says that the
    values are angles; below `grain` they are rounding errors.
    """

    left: float
    right: float
    low: float
    high: float
    floor: float | None = None
    top: float | None = None
    degrees: bool = False
    grain: float = 1e-30

    def values(self, low: float, high: float) -> tuple[float, float]:
        """Return the range of the axis that shows the values from `low` to `high`."""
        return round_range(low, high, self.floor, self.top, degrees=self.degrees, grain=self.grain)


class CurvePlot(pg.GraphicsView):
    """Draws curves and marks and keeps the ranges of the axes; knows nothing of jobs.

    Ranges stay when the data change, except along an axis that follows the data (`follows`), which is how it
    begins and what `show_all` returns to.
    """

    ranges_changed = Signal()
    crowding_changed = Signal()

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent, background=theme.base)
        self.follows = [True, True]
        self.history = RangeHistory()
        self._extent = Extent(0.0, 1.0, 0.0, 1.0)
        self.area = pg.ViewBox(enableMenu=False, enableMouse=False, defaultPadding=0.0)
        self.area.disableAutoRange()
        # Marks on the edge are drawn whole; the curves clip themselves.
        self.area.setFlag(self.area.GraphicsItemFlag.ItemClipsChildrenToShape, False)
        self.left_axis, self.bottom_axis = QuietAxis("left"), QuietAxis("bottom")
        self.end_labels = EndLabels(self.area)
        self.curve_layer = CurveLayer(self.area, 10.0)
        self.worst_layer = WorstLayer(self.area, 20.0, theme)
        self.level_layer = LevelLayer(self.area, 15.0, theme)
        self.marker_layer = MarkerLayer(self.area, 30.0, theme)
        self.pointer_layer = PointerLayer(self.area, 40.0, theme)
        self.note_layer = NoteLayer(self.area, 50.0, theme)
        self._arrange()
        self._rest = QTimer(self)
        self._rest.setSingleShot(True)
        self._rest.setInterval(REST)
        self._rest.timeout.connect(lambda: self.curve_layer.set_fine(True))
        self._crowded = False
        self.area.sigResized.connect(self._check_crowding)
        self.hand = PlottingHand(self)
        self.key_taken: Callable[[QKeyEvent, bool], bool] = lambda event, run: False
        self.viewport().setMouseTracking(True)
        self.set_theme(theme)

    def _arrange(self) -> None:
        layout = pg.GraphicsLayout()
        layout.setContentsMargins(0, round(QFontMetricsF(self.font()).height()) + 6, 8, 5)
        layout.setSpacing(0)
        layout.addItem(self.left_axis, 0, 0)
        layout.addItem(self.area, 0, 1)
        layout.addItem(self.end_labels, 0, 2)
        layout.addItem(self.bottom_axis, 1, 1)
        layout.layout.setColumnStretchFactor(1, 100)
        layout.layout.setRowStretchFactor(0, 100)
        self.left_axis.linkToView(self.area)
        self.bottom_axis.linkToView(self.area)
        self.setCentralItem(layout)
        self._set_fonts(self.font())

    def _set_fonts(self, font: QFont) -> None:
        small = QFont(font)
        small.setPointSizeF(max(QFontInfo(font).pointSizeF() * 0.92, 7.0))
        small.setFeature(QFont.Tag("tnum"), 1)
        for axis in (self.left_axis, self.bottom_axis):
            axis.set_fonts(small)
        self.left_axis.label.setFont(font)
        self.bottom_axis.label.setFont(font)
        self.end_labels.set_font(small)
        self.marker_layer.font = small
        self.note_layer.font = font

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme; the curves are given again by whoever knows their colours."""
        self._theme = theme
        self.setBackground(theme.base)
        for axis in (self.left_axis, self.bottom_axis):
            axis.set_theme(theme)
        marks = (self.worst_layer, self.level_layer, self.marker_layer, self.pointer_layer, self.note_layer)
        for layer in marks:
            layer.theme = theme
            layer.update()
        self.show_focus(False)

    # What is shown

    def show_curves(
        self, curves: Sequence[DrawnCurve], labels: Sequence[EndLabel], extent: Extent, *, logarithmic: bool
    ) -> None:
        """Draw these curves from now on; along axes that follow the data, show all of `extent`."""
        self.rouse()
        if logarithmic != self.bottom_axis.logarithmic:
            self.bottom_axis.logarithmic = logarithmic
            self.follows[0] = True
            self.history = RangeHistory()
            self.bottom_axis.picture = None
        if extent.degrees != self.left_axis.degrees:
            self.left_axis.degrees = extent.degrees
            self.left_axis.picture = None
        self._extent = extent
        self.curve_layer.set_curves(curves)
        self.end_labels.set_labels(labels)
        self._follow()
        self._check_crowding()

    def rouse(self) -> None:
        """Draw fast from now until nothing has changed for a while."""
        self.curve_layer.set_fine(False)
        if self.isVisible():
            self._rest.start()

    def showEvent(self, event: object) -> None:
        """Wait for rest."""
        super().showEvent(event)
        self._rest.start()

    def hideEvent(self, event: object) -> None:
        """Stop waiting for rest: nobody looks."""
        self._rest.stop()
        super().hideEvent(event)

    # Ranges

    def frame(self) -> Frame:
        """Return what is visible, and on how many pixels."""
        return self.curve_layer.frame()

    def area_rect(self) -> QRectF:
        """Return where the plot area is, in pixels of this widget."""
        rect: QRectF = self.area.sceneBoundingRect()
        return rect

    def in_area(self, point: QPointF) -> QPointF:
        """Return a point of this widget in pixels of the plot area."""
        return point - self.area_rect().topLeft()

    def show_all(self) -> None:
        """Show everything, and follow the data from now on."""
        self.history.note(self._shown())
        self.follows = [True, True]
        self._follow()
        self.ranges_changed.emit()

    def follow_values(self) -> None:
        """Let the axis of values follow the data again, and leave the frequencies as they are."""
        self.history.note(self._shown())
        self.follows[1] = True
        self._follow()
        self.ranges_changed.emit()

    def follow_positions(self) -> None:
        """Let the frequency axis follow the data again, and leave the values as they are."""
        self.history.note(self._shown())
        self.follows[0] = True
        self._follow()
        self.ranges_changed.emit()

    def fit_values(self, low: float, high: float) -> None:
        """Show these values, rounded outward, and no longer follow the data."""
        self.set_ranges(values=self._extent.values(low, high))

    def set_ranges(
        self,
        positions: tuple[float, float] | None = None,
        values: tuple[float, float] | None = None,
    ) -> None:
        """Show these ranges of positions and values; an axis that is given no longer follows the data."""
        self.history.note(self._shown())
        self.rouse()
        for axis, wanted in enumerate((positions, values)):
            if wanted is not None and _sensible(*wanted):
                self.follows[axis] = False
                self._set_range(axis, wanted)
        self.ranges_changed.emit()
        self._check_crowding()

    def go_back(self) -> None:
        """Show what was shown before the last change of the ranges by hand."""
        self._show_again(self.history.back(self._shown()))

    def go_forward(self) -> None:
        """Take the last step back again."""
        self._show_again(self.history.forward(self._shown()))

    def _shown(self) -> Shown:
        across, upward = (tuple(map(float, ends)) for ends in self.area.viewRange())
        return Shown((across[0], across[1]), (upward[0], upward[1]), (self.follows[0], self.follows[1]))

    def _show_again(self, shown: Shown | None) -> None:
        if shown is None:
            return
        self.rouse()
        self.follows = list(shown.follows)
        self._set_range(0, shown.positions)
        self._set_range(1, shown.values)
        self._follow()
        self.ranges_changed.emit()
        self._check_crowding()

    def zoom(self, across: float, down: float, at: QPointF) -> None:
        """Scale the visible ranges by two factors (1 leaves an axis alone) about a pixel of the plot area."""
        frame = self.frame()
        x, y = frame.position(at.x()), frame.value(at.y())
        positions = (x + (frame.left - x) * across, x + (frame.right - x) * across)
        values = (y + (frame.bottom - y) * down, y + (frame.top - y) * down)
        self.set_ranges(positions if across != 1.0 else None, values if down != 1.0 else None)

    def pan(self, start: Frame, across: float | None, down: float | None) -> None:
        """Show what `start` showed, moved by so many pixels; None leaves an axis alone."""
        shift = (across or 0.0) * (start.right - start.left) / start.width
        rise = (down or 0.0) * (start.top - start.bottom) / start.height
        self.set_ranges(
            None if across is None else (start.left - shift, start.right - shift),
            None if down is None else (start.bottom + rise, start.top + rise),
        )

    def _follow(self) -> None:
        extent = self._extent
        if self.follows[0]:
            left, right = extent.left, extent.right
            if not right > left:
                span = max(abs(left) * 0.02, 0.01)
                left, right = left - span, right + span
            self._set_range(0, (left, right))
        if self.follows[1]:
            self._set_range(1, extent.values(extent.low, extent.high))

    def _set_range(self, axis: int, wanted: tuple[float, float]) -> None:
        if tuple(self.area.viewRange()[axis]) != wanted:
            names = ("xRange", "yRange")
            self.area.setRange(**{names[axis]: wanted}, padding=0, disableAutoRange=False)

    def _check_crowding(self, *_: object) -> None:
        crowded = self.end_labels.crowded
        if crowded != self._crowded:
            self._crowded = crowded
            self.crowding_changed.emit()

    # Mouse and keys

    def mousePressEvent(self, event: QMouseEvent) -> None:
        """Hand over to the hand."""
        self.hand.press(event)

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        """Hand over to the hand."""
        self.hand.move(event)

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        """Hand over to the hand."""
        self.hand.release(event)

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        """Hand over to the hand."""
        self.hand.double_click(event)

    def wheelEvent(self, event: QWheelEvent) -> None:
        """Hand over to the hand."""
        self.hand.wheel(event)

    def leaveEvent(self, event: QEvent) -> None:
        """Hand over to the hand."""
        self.hand.leave()

    def contextMenuEvent(self, event: QContextMenuEvent) -> None:
        """Ask for the menu when the keyboard does; the mouse asks on release."""
        if event.reason() == QContextMenuEvent.Reason.Keyboard:
            at = self.area_rect().center()
            self.hand.menu_wanted.emit(self.in_area(at), self.mapToGlobal(at.toPoint()))
        event.accept()

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Offer the key to `key_taken`; what it does not take goes on to the window."""
        if self.key_taken(event, True):
            event.accept()
        else:
            event.ignore()

    def event(self, event: QEvent) -> bool:
        """Keep keys that mean something here from the shortcuts of the window."""
        if (
            event.type() == QEvent.Type.ShortcutOverride
            and isinstance(event, QKeyEvent)
            and self.key_taken(event, False)
        ):
            event.accept()
            return True
        return bool(super().event(event))

    # Focus

    def focusInEvent(self, event: QFocusEvent) -> None:
        """Outline the plot when the keyboard brought the focus here."""
        super().focusInEvent(event)
        reasons = event.reason()
        self.show_focus(reasons.name in {"TabFocusReason", "BacktabFocusReason", "ShortcutFocusReason"})

    def focusOutEvent(self, event: QFocusEvent) -> None:
        """Take the outline away."""
        super().focusOutEvent(event)
        self.show_focus(False)

    def show_focus(self, shown: bool) -> None:
        """Show the frame of the keyboard focus, or take it away."""
        self.focus_shown = shown
        colour = QColor(self._theme.accent) if shown else QColor(0, 0, 0, 0)
        self.area.setBorder(QPen(colour, 2.0))


def _sensible(low: float, high: float) -> bool:
    """Whether a range is one that can be drawn: rising, finite, and not finer than doubles can tell apart."""
    if not (math.isfinite(low) and math.isfinite(high)) or not low < high:
        return False
    size = max(abs(low), abs(high))
    return size < _LARGEST and high - low > max(size * _CLOSEST, _SMALLEST)
