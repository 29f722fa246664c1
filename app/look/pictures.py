"""Pictures that leave the window: pixels for documents, drawings for those who edit them.

Whatever can be painted becomes a PNG, an SVG or a PDF of the same size and look. In the drawings lines are lines
and texts are texts; nothing is turned into pixels.
"""

from collections.abc import Callable
from dataclasses import dataclass
from typing import Final, Literal, get_args

from PySide6.QtCore import QBuffer, QByteArray, QIODevice, QMarginsF, QMimeData, QRect, QSize, QSizeF
from PySide6.QtGui import QColor, QImage, QImageWriter, QPageLayout, QPageSize, QPainter, QPdfWriter
from PySide6.QtSvg import QSvgGenerator

Kind = Literal["png", "svg", "pdf"]
KINDS: Final[tuple[Kind, ...]] = get_args(Kind)
"""What a picture can be written as; also the suffix of the file."""

RATIO: Final = 3.0
"""Pixels of a PNG for each pixel of the screen: about 300 dots an inch at the size of the screen."""


@dataclass(frozen=True, slots=True, eq=False)
class Picture:
    """Something that can be painted.

    Parameters
    ----------
    title
        What it shows, for the file's own title and as a file name to suggest.
    size
        In pixels of the screen.
    dpi
        Dots an inch of the screen, which fonts were measured for.
    background
        Colour below everything.
    paint
        Paints it with a painter whose origin is the upper left corner; must not need pixels.
    """

    title: str
    size: QSize
    dpi: int
    background: str
    paint: Callable[[QPainter], None]


def picture_bytes(picture: Picture, kind: Kind) -> bytes:
    """Return the file that shows a picture."""
    makers = {"png": png_bytes, "svg": svg_bytes, "pdf": pdf_bytes}
    return makers[kind](picture)


def image_of(picture: Picture, ratio: float = RATIO) -> QImage:
    """Return the picture in pixels, `ratio` of them for each pixel of the screen."""
    image = QImage(picture.size * ratio, QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(ratio)
    image.fill(QColor(picture.background))
    _paint(picture, QPainter(image))
    return image


def png_bytes(picture: Picture) -> bytes:
    """Return the picture as PNG."""
    buffer = _buffer()
    image = image_of(picture)
    image.setText("Title", picture.title)
    QImageWriter(buffer, QByteArray(b"png")).write(image)
    return bytes(buffer.data().data())


def svg_bytes(picture: Picture) -> bytes:
    """Return the picture as SVG."""
    buffer = _buffer()
    device = QSvgGenerator()
    device.setOutputDevice(buffer)
    # Without this the drawing is made for 90 dots an inch and texts miss their places.
    device.setResolution(picture.dpi)
    device.setSize(picture.size)
    device.setViewBox(QRect(0, 0, picture.size.width(), picture.size.height()))
    device.setTitle(picture.title)
    _paint(picture, QPainter(device), fill=True)
    return bytes(buffer.data().data())


def pdf_bytes(picture: Picture) -> bytes:
    """Return the picture as a PDF page of its own size."""
    buffer = _buffer()
    device = QPdfWriter(buffer)
    inches = QSizeF(picture.size) / picture.dpi
    device.setResolution(picture.dpi)
    device.setPageSize(QPageSize(inches, QPageSize.Unit.Inch, picture.title, QPageSize.SizeMatchPolicy.ExactMatch))
    device.setPageMargins(QMarginsF(0, 0, 0, 0), QPageLayout.Unit.Inch)
    device.setTitle(picture.title)
    device.setCreator("Slabwright")
    _paint(picture, QPainter(device), fill=True)
    return bytes(buffer.data().data())


def clipboard_data(picture: Picture) -> QMimeData:
    """Return a picture for the clipboard, in pixels and as a drawing."""
    data = QMimeData()
    data.setImageData(image_of(picture, 2.0))
    data.setData("image/svg+xml", QByteArray(svg_bytes(picture)))
    data.setData("image/png", QByteArray(png_bytes(picture)))
    return data


def _paint(picture: Picture, painter: QPainter, *, fill: bool = False) -> None:
    if fill:
        painter.fillRect(QRect(0, 0, picture.size.width(), picture.size.height()), QColor(picture.background))
    try:
        picture.paint(painter)
    finally:
        painter.end()


def _buffer() -> QBuffer:
    buffer = QBuffer()
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    return buffer
