"""What is drawn over the grid: items that place data by the visible frame, in the pixels of the plot area."""

from typing import Any, Final

from PySide6.QtCore import QRectF
from PySide6.QtGui import QPainter
from PySide6.QtWidgets import QGraphicsItem, QStyleOptionGraphicsItem, QWidget

from app.panels.curves.frame import Frame

SLACK: Final = 12.0
"""Pixels that a mark may reach beyond the plot area; twice as many above, where the flags of markers are."""


class Layer(QGraphicsItem):
    """One transparent sheet over the plot area; its own coordinates are the pixels of that area.

    Placing the data here, in double precision and in one place, spares every mark from having to know
    whether an axis is logarithmic, and keeps pens in pixels for the screen and for pictures alike.
    """

    def __init__(self, area: Any, height: float) -> None:
        super().__init__(area)
        self._area = area
        self._bounds = self._room()
        self.setZValue(height)
        area.sigRangeChanged.connect(self._moved)
        area.sigResized.connect(self._resized)

    def frame(self) -> Frame:
        """Return what is visible, and on how many pixels."""
        (left, right), (bottom, top) = self._area.viewRange()
        rect = self._area.rect()
        return Frame(left, right, bottom, top, max(rect.width(), 1.0), max(rect.height(), 1.0))

    def boundingRect(self) -> QRectF:
        """Return the plot area, with room for marks that stand on its edge."""
        return self._bounds

    def paint(self, painter: QPainter, option: QStyleOptionGraphicsItem, widget: QWidget | None = None) -> None:
        """Draw; subclasses fill in `draw`."""
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        self.draw(painter, self.frame())

    def draw(self, painter: QPainter, frame: Frame) -> None:
        """Draw what this layer shows of `frame`."""
        raise NotImplementedError

    def _moved(self, *_: object) -> None:
        self.update()

    def _resized(self, *_: object) -> None:
        self.prepareGeometryChange()
        self._bounds = self._room()

    def _room(self) -> QRectF:
        return QRectF(self._area.rect()).adjusted(-SLACK, -2 * SLACK, SLACK, SLACK)
