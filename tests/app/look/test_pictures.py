"""Pictures as files, read back by programs that have nothing to do with the painting."""

import io
import re
import xml.etree.ElementTree as ElementTree

import pytest
from pypdf import PdfReader
from PySide6.QtCore import QPointF, QSize
from PySide6.QtGui import QColor, QFont, QGuiApplication, QImage, QPainter, QPen, QPolygonF
from pytestqt.qtbot import QtBot

from app.look.pictures import (
    Kind,
    Picture,
    clipboard_data,
    image_of,
    pdf_bytes,
    picture_bytes,
    png_bytes,
    svg_bytes,
)

SVG = "{http://www.w3.org/2000/svg}"
POINTS = [(10.0, 10.0), (50.25, 60.5), (190.125, 20.0)]


@pytest.fixture
def picture(qapp: QGuiApplication) -> Picture:
    """A curve of three points and a word, in red on a pale ground."""

    def paint(painter: QPainter) -> None:
        pen = QPen(QColor("#d02020"), 2.0)
        pen.setCosmetic(False)
        painter.setPen(pen)
        painter.drawPolyline(QPolygonF([QPointF(x, y) for x, y in POINTS]))
        painter.setFont(QFont(qapp.font()))
        painter.drawText(QPointF(20, 90), "Insertion loss, dB")

    return Picture("A curve", QSize(200, 100), 96, "#fefdf8", paint)


def test_a_png_is_three_times_as_fine_as_the_screen(picture: Picture) -> None:
    """It has the size, the ground and the ink of the picture, and its title."""
    image = QImage.fromData(png_bytes(picture))
    assert (image.width(), image.height()) == (600, 300)
    assert image.pixelColor(1, 1).name() == "#fefdf8"
    assert image.pixelColor(151, 181).red() > 180
    assert image.text("Title") == "A curve"
    assert image_of(picture, 1.0).width() == 200


def test_an_svg_has_the_points_and_the_word(picture: Picture) -> None:
    """The curve is a polyline at its very points, the word is text, and nothing is pixels."""
    root = ElementTree.fromstring(svg_bytes(picture))
    (line,) = root.iter(f"{SVG}polyline")
    numbers = [float(number) for number in re.split("[ ,]+", line.get("points", "").strip())]
    assert list(zip(numbers[::2], numbers[1::2], strict=True)) == POINTS
    assert "Insertion loss, dB" in "".join(root.itertext())
    assert not list(root.iter(f"{SVG}image"))
    assert root.get("viewBox") == "0 0 200 100"
    title = root.find(f"{SVG}title")
    assert title is not None
    assert title.text == "A curve"


def test_a_pdf_is_one_page_of_the_size_with_text_that_is_text(picture: Picture) -> None:
    """96 dots are an inch of 72 points; the word can be read and there is no image in the page."""
    reader = PdfReader(io.BytesIO(pdf_bytes(picture)))
    (page,) = reader.pages
    assert float(page.mediabox.width) == pytest.approx(150, abs=0.5)
    assert float(page.mediabox.height) == pytest.approx(75, abs=0.5)
    assert "Insertion loss, dB" in " ".join(page.extract_text().split())
    assert not page.images
    assert reader.metadata is not None
    assert reader.metadata.title == "A curve"


@pytest.mark.parametrize(("kind", "start"), [("png", b"\x89PNG"), ("svg", b"<?xml"), ("pdf", b"%PDF")])
def test_the_suffix_says_what_is_written(picture: Picture, kind: Kind, start: bytes) -> None:
    """Each kind begins as files of its kind do."""
    assert picture_bytes(picture, kind).startswith(start)


def test_a_painter_that_fails_is_ended(qtbot: QtBot) -> None:
    """The error comes out and the next picture can be made: a painter left open would end the program."""

    def fail(painter: QPainter) -> None:
        raise RuntimeError("no ink")

    broken = Picture("Broken", QSize(10, 10), 96, "#ffffff", fail)
    for make in (png_bytes, svg_bytes, pdf_bytes):
        with pytest.raises(RuntimeError, match="no ink"):
            make(broken)


def test_the_clipboard_gets_pixels_and_drawing(picture: Picture) -> None:
    """Programs take what they can: an image, a PNG or an SVG."""
    data = clipboard_data(picture)
    assert data.hasImage()
    assert set(data.formats()) >= {"image/png", "image/svg+xml"}
