"""Painting into pictures and vector files, without a widget."""

import pytest
from PySide6.QtCore import QBuffer, QByteArray, QIODevice, QRectF, QSize
from PySide6.QtGui import QFont, QImage, QPainter
from PySide6.QtSvg import QSvgGenerator
from PySide6.QtWidgets import QApplication

from app.document.document import Document
from app.look.theme import LIGHT, kind_style
from app.panels.wall.painting import Touch, laid_out, paint_wall
from app.panels.wall.parts import wall_of
from tests.app.panels.wall.walls import layer, sandwich, stack_of, wall, wave_through


def picture(width: int, height: int, ratio: float = 1.0, rect: QRectF | None = None) -> QImage:
    """Return a picture of the sandwich with its wave."""
    image = QImage(round(width * ratio), round(height * ratio), QImage.Format.Format_RGB32)
    image.setDevicePixelRatio(ratio)
    image.fill(0)
    painter = QPainter(image)
    painter.setFont(QFont(QApplication.font()))
    area = rect or QRectF(0, 0, width, height)
    job = sandwich()
    paint_wall(painter, area, wall_of(Document(job), 0), LIGHT, wave_through(job.stacks[0]), Touch((0,)))
    painter.end()
    return image


@pytest.mark.parametrize("size", [(360, 150), (1200, 250), (2560, 480)])
def test_pictures_of_all_sizes(qapp: QApplication, size: tuple[int, int]) -> None:
    """The drawing fills its picture to the last pixel, at the least size and on a large screen."""
    image = picture(*size)
    corners = [image.pixel(x, y) for x in (0, size[0] - 1) for y in (0, size[1] - 1)]
    assert corners == [int(LIGHT.base.removeprefix("#"), 16) | 0xFF000000] * 4


def test_at_twice_the_pixels_the_drawing_is_the_same_and_sharper(qapp: QApplication) -> None:
    """Device ratio 2 gives the same layout in finer pixels: halved, it hardly differs."""
    once, twice = picture(1200, 250), picture(1200, 250, 2.0)
    assert (twice.width(), twice.height()) == (2400, 500)
    twice.setDevicePixelRatio(1.0)
    halved = twice.scaled(1200, 250)
    far = sum(
        abs((once.pixel(x, y) & 0xFF) - (halved.pixel(x, y) & 0xFF)) > 90
        for x in range(0, 1200, 2)
        for y in range(0, 250, 2)
    )
    assert far < 0.02 * 600 * 125


def test_it_keeps_to_its_rectangle(qapp: QApplication) -> None:
    """Painted into a part of a picture the drawing leaves the rest alone."""
    image = picture(1000, 400, rect=QRectF(100, 50, 800, 250))
    outside = [(x, y) for x in range(0, 1000, 7) for y in (10, 45, 305, 390)]
    outside += [(x, y) for x in (10, 95, 905, 990) for y in range(0, 400, 7)]
    assert {image.pixel(x, y) for x, y in outside} == {0xFF000000}


def test_a_vector_file_holds_text_and_no_pictures(qapp: QApplication) -> None:
    """In SVG names are text, nothing is a bitmap, and nothing depends on clipping."""
    data = QByteArray()
    buffer = QBuffer(data)
    buffer.open(QIODevice.OpenModeFlag.WriteOnly)
    generator = QSvgGenerator()
    generator.setOutputDevice(buffer)
    generator.setSize(QSize(1200, 250))
    painter = QPainter(generator)
    job = sandwich()
    paint_wall(painter, QRectF(0, 0, 1200, 250), wall_of(Document(job), 0), LIGHT, wave_through(job.stacks[0]))
    painter.end()
    text = bytes(data.data()).decode()
    assert "<image" not in text
    assert "clip" not in text.lower()
    for word in ("Foam core", "6 mm", "377 ohm/sq, 20 pH", "10 GHz, 30°, TE"):
        assert word in text


def test_every_slab_of_a_crowd_is_painted(qapp: QApplication) -> None:
    """Of sixty layers of two kinds each shows its own tint."""
    kinds = ("glass", "coating")
    drawn = wall(*(layer("film", 1e-7, kinds[row % 2]) for row in range(60)))
    image = QImage(2560, 480, QImage.Format.Format_RGB32)
    painter = QPainter(image)
    rect = QRectF(0, 0, 2560, 480)
    layout = laid_out(painter, rect, drawn)
    paint_wall(painter, rect, drawn, LIGHT, wave_through(stack_of(drawn), 5e14))
    painter.end()
    for slab in layout.slabs:
        tint = int(kind_style(LIGHT, slab.part.kind).tint.removeprefix("#"), 16) | 0xFF000000
        box = slab.box
        column = [image.pixel(round(box.left) + 3, y) for y in range(round(box.top), round(box.bottom))]
        assert column.count(tint) > len(column) / 3
