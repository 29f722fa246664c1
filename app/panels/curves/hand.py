"""What the mouse does in the plot: pan, zoom, draw a box, drag a marker, choose, point."""

from dataclasses import dataclass
from typing import TYPE_CHECKING, Final, Literal

from PySide6.QtCore import QObject, QPoint, QPointF, QRectF, Qt, Signal
from PySide6.QtGui import QMouseEvent, QWheelEvent

from app.panels.curves.frame import Frame

if TYPE_CHECKING:
    from app.panels.curves.plot import CurvePlot

Zone = Literal["area", "above", "left", "bottom", "outside"]

_STILL: Final = 4.0
_NOTCH: Final = 0.85
_MOVABLE: Final = ("area", "left", "bottom")


@dataclass(slots=True)
class _Drag:
    """A drag that is going on: what it does, where it began and what was visible then."""

    kind: Literal["press", "pan", "box", "marker"]
    start: QPointF
    frame: Frame
    zone: Zone
    button: Qt.MouseButton
    marker: int = 0


class PlottingHand(QObject):
    """Turns mouse events of the plot into ranges and into signals; holds only the drag that is going on.

    Plain drag pans, on an axis only along it; with Shift it draws a box to zoom into; on a marker it drags the
    marker. The wheel zooms at the mouse, over an axis only that axis. Double click shows all, on an axis it
    asks for the range. Ctrl and click asks for a marker.
    """

    pointed = Signal(object)
    """Where the mouse is, a QPointF in pixels of the plot area, or None when it has left."""
    clicked = Signal(QPointF)
    marker_wanted = Signal(QPointF)
    marker_chosen = Signal(int)
    marker_dragged = Signal(int, QPointF)
    marker_dropped = Signal()
    menu_wanted = Signal(QPointF, QPoint)
    range_wanted = Signal(str)

    def __init__(self, plot: "CurvePlot") -> None:
        super().__init__(plot)
        self._plot = plot
        self._drag: _Drag | None = None

    def zone(self, point: QPointF) -> Zone:
        """Return what lies at a point of the plot widget."""
        area = self._plot.area_rect()
        if area.contains(point):
            return "area"
        if point.x() < area.left() and area.top() <= point.y() <= area.bottom():
            return "left"
        if point.y() > area.bottom() and area.left() <= point.x() <= area.right():
            return "bottom"
        if point.y() < area.top() and area.left() <= point.x() <= area.right():
            return "above"
        return "outside"

    def press(self, event: QMouseEvent) -> None:
        """Begin a click or a drag."""
        point, zone = event.position(), self.zone(event.position())
        self._drag = _Drag("press", point, self._plot.frame(), zone, event.button())
        if event.button() != Qt.MouseButton.LeftButton or zone not in ("area", "above"):
            return
        marker = self._marker_at(point)
        if marker is not None:
            self._drag.kind, self._drag.marker = "marker", marker
            self.marker_chosen.emit(marker)

    def move(self, event: QMouseEvent) -> None:
        """Go on with a drag, or point."""
        drag, point = self._drag, event.position()
        if drag is None or event.buttons() == Qt.MouseButton.NoButton:
            self._drag = None
            self._point(point)
            return
        if drag.kind == "press" and (point - drag.start).manhattanLength() > _STILL:
            boxed = event.modifiers() & Qt.KeyboardModifier.ShiftModifier and drag.zone == "area"
            drag.kind = "box" if boxed else "pan"
            self.pointed.emit(None)
        if drag.kind == "marker":
            self.marker_dragged.emit(drag.marker, self._plot.in_area(point))
        elif drag.kind == "pan" and drag.button != Qt.MouseButton.RightButton and drag.zone in _MOVABLE:
            self._pan(drag, point)
        elif drag.kind == "box":
            self._plot.pointer_layer.set_box(self._box(drag, point))

    def release(self, event: QMouseEvent) -> None:
        """End a drag, or make a click of it."""
        drag, self._drag = self._drag, None
        if drag is None:
            return
        if drag.kind == "marker":
            self.marker_dropped.emit()
        elif drag.kind == "box":
            self._plot.pointer_layer.set_box(None)
            self._zoom_into(drag, self._box(drag, event.position()))
        elif drag.kind == "press":
            self._click(drag, event)

    def double_click(self, event: QMouseEvent) -> None:
        """Show all, or ask for the range of an axis."""
        self._drag = None
        zone = self.zone(event.position())
        if event.button() != Qt.MouseButton.LeftButton:
            return
        if zone == "area":
            self._plot.show_all()
        elif zone in ("left", "bottom"):
            self.range_wanted.emit(zone)

    def wheel(self, event: QWheelEvent) -> None:
        """Zoom at the mouse; over an axis only along it."""
        zone = self.zone(event.position())
        turned = event.angleDelta().y() or event.angleDelta().x()
        if zone not in _MOVABLE or turned == 0:
            event.ignore()
            return
        factor = _NOTCH ** (turned / 120)
        at = self._plot.in_area(event.position())
        self._plot.zoom(1.0 if zone == "left" else factor, 1.0 if zone == "bottom" else factor, at)
        event.accept()

    def leave(self) -> None:
        """Point at nothing."""
        self.pointed.emit(None)

    def _point(self, point: QPointF) -> None:
        zone = self.zone(point)
        shapes = {"left": Qt.CursorShape.SizeVerCursor, "bottom": Qt.CursorShape.SizeHorCursor}
        shape = shapes.get(zone, Qt.CursorShape.ArrowCursor)
        if zone in ("area", "above") and self._marker_at(point) is not None:
            shape = Qt.CursorShape.SplitHCursor
        elif zone == "area":
            shape = Qt.CursorShape.CrossCursor
        self._plot.viewport().setCursor(shape)
        self.pointed.emit(self._plot.in_area(point) if zone == "area" else None)

    def _marker_at(self, point: QPointF) -> int | None:
        return self._plot.marker_layer.at(self._plot.in_area(point), self._plot.frame())

    def _pan(self, drag: _Drag, point: QPointF) -> None:
        moved = point - drag.start
        self._plot.pan(
            drag.frame,
            None if drag.zone == "left" else moved.x(),
            None if drag.zone == "bottom" else moved.y(),
        )

    def _box(self, drag: _Drag, point: QPointF) -> QRectF:
        size = self._plot.area_rect().size()
        inside = QRectF(QPointF(0.0, 0.0), size)
        return QRectF(self._plot.in_area(drag.start), self._plot.in_area(point)).normalized() & inside

    def _zoom_into(self, drag: _Drag, box: QRectF) -> None:
        if box.width() < _STILL or box.height() < _STILL:
            return
        frame = drag.frame
        self._plot.set_ranges(
            (frame.position(box.left()), frame.position(box.right())),
            (frame.value(box.bottom()), frame.value(box.top())),
        )

    def _click(self, drag: _Drag, event: QMouseEvent) -> None:
        at = self._plot.in_area(event.position())
        if drag.button == Qt.MouseButton.RightButton:
            self.menu_wanted.emit(at, event.globalPosition().toPoint())
        elif drag.button == Qt.MouseButton.LeftButton and drag.zone == "area":
            wanted = event.modifiers() & Qt.KeyboardModifier.ControlModifier
            (self.marker_wanted if wanted else self.clicked).emit(at)
