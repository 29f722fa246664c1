"""The panel painted into a picture: in pixels for documents, as a drawing for those who edit it."""

from PySide6.QtCore import QBuffer, QByteArray, QIODevice, QRect, QSize
from PySide6.QtGui import QImage, QPainter
from PySide6.QtSvg import QSvgGenerator
from PySide6.QtWidgets import QGraphicsItem, QWidget

from app.panels.curves.plot import CurvePlot


def paint_picture(panel: QWidget, plot: CurvePlot, ratio: float = 2.0) -> QImage:
    """Return the panel as an image with `ratio` pixels for each pixel of the screen, lines at full width."""
    size = panel.size() * ratio
    image = QImage(size, QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(ratio)
    image.fill(panel.palette().window().color())
    with _at_rest(plot):
        panel.render(image)
    return image


def paint_svg(panel: QWidget, plot: CurvePlot) -> QByteArray:
    """Return the plot as an SVG drawing; its lines are lines and its texts are texts."""
    buffer = QBuffer()
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    device = QSvgGenerator()
    device.setOutputDevice(buffer)
    # Without this the drawing is made for 90 dots an inch and texts miss their places.
    device.setResolution(panel.logicalDpiX())
    device.setSize(plot.size())
    device.setViewBox(QRect(plot.rect().topLeft(), QSize(plot.size())))
    with _at_rest(plot):
        painter = QPainter(device)
        plot.render(painter)
        painter.end()
    return buffer.data()


class _at_rest:
    """Within it the plot is drawn finely, without caches (which are pixels) and without what the mouse shows."""

    def __init__(self, plot: CurvePlot) -> None:
        self._plot = plot
        self._items: tuple[QGraphicsItem, ...] = (plot.left_axis, plot.bottom_axis, plot.curve_layer)

    def __enter__(self) -> None:
        self._fine = self._plot.curve_layer.fine
        self._plot.curve_layer.set_fine(True)
        self._plot.pointer_layer.hide()
        self._modes = [item.cacheMode() for item in self._items]
        for item in self._items:
            item.setCacheMode(QGraphicsItem.CacheMode.NoCache)

    def __exit__(self, *_: object) -> None:
        for item, mode in zip(self._items, self._modes, strict=True):
            item.setCacheMode(mode)
        self._plot.pointer_layer.show()
        self._plot.curve_layer.set_fine(self._fine)
