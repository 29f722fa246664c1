"""Pictures of plots and of the wall as files, from the menu and read back."""

import io
import xml.etree.ElementTree as ElementTree
from pathlib import Path

import numpy as np
import pytest
from pypdf import PdfReader
from PySide6.QtGui import QImage

from app.look.theme import LIGHT
from tests.app.window.conftest import Bench

SVG = "{http://www.w3.org/2000/svg}"


@pytest.mark.parametrize(("action", "word"), [("file.export_plot", "Frequency"), ("file.export_wall", "core")])
@pytest.mark.parametrize("theme", ["light", "dark"])
def test_a_drawing_has_texts_and_no_pixels(
    bench: Bench, tmp_path: Path, action: str, word: str, theme: str
) -> None:
    """The SVG of the plot and of the wall hold their words as text and no image, in the light look always."""
    bench.window.set_theme_choice(theme)
    target = tmp_path / "picture.svg"
    bench.dialogs.picture_paths = [target]
    bench.trigger(action)
    root = ElementTree.fromstring(target.read_bytes())
    assert word in "".join(root.itertext())
    assert not list(root.iter(f"{SVG}image"))
    assert f'fill="{LIGHT.base}"' in target.read_text(encoding="utf-8")


@pytest.mark.parametrize(("action", "word"), [("file.export_plot", "Frequency"), ("file.export_wall", "core")])
def test_a_page_has_texts_and_no_pixels(bench: Bench, tmp_path: Path, action: str, word: str) -> None:
    """The PDF is one page with readable words and no image."""
    target = tmp_path / "picture.pdf"
    bench.dialogs.picture_paths = [target]
    bench.trigger(action)
    reader = PdfReader(io.BytesIO(target.read_bytes()))
    (page,) = reader.pages
    assert word in page.extract_text()
    assert not page.images


def test_the_curves_of_a_drawing_are_those_of_the_solver(bench: Bench, tmp_path: Path) -> None:
    """Each curve is a line of as many points as the sweep, at the places its values say, to a tenth of a pixel."""
    panel = bench.window.panels.curves
    target = tmp_path / "plot.svg"
    bench.dialogs.picture_paths = [target]
    bench.trigger("file.export_plot")
    root = ElementTree.fromstring(target.read_bytes())
    frame = panel.plot.frame()
    curve = panel.curves[0]
    drawn = [
        np.array([float(number) for number in line.get("points", "").replace(",", " ").split()]).reshape(-1, 2)
        for line in root.iter(f"{SVG}polyline")
    ]
    wanted_x = np.array([frame.across(float(position)) for position in panel.scale.positions(curve.x)])
    wanted_y = np.array([frame.down(float(value)) for value in curve.y])
    shapes = [line for line in drawn if len(line) == len(curve.x)]
    assert shapes, "no line has the points of the sweep"
    closest = min(
        float(
            np.abs(np.diff(line[:, 0]) - np.diff(wanted_x)).max()
            + np.abs(np.diff(line[:, 1]) - np.diff(wanted_y)).max()
        )
        for line in shapes
    )
    assert closest < 0.1


def test_pixels_are_fine_and_light(bench: Bench, tmp_path: Path) -> None:
    """The PNG has three pixels for each of the screen, from the dark window too."""
    bench.window.set_theme_choice("dark")
    target = tmp_path / "plot.png"
    bench.dialogs.picture_paths = [target]
    bench.trigger("file.export_plot")
    image = QImage(str(target))
    assert image.width() == 3 * bench.window.panels.curves.plot.width()
    assert image.pixelColor(2, 2).lightness() > 230
    assert bench.window.theme.name == "dark"


def test_a_suffix_that_is_none_is_told_with_those_there_are(bench: Bench, tmp_path: Path) -> None:
    """Nothing is written, and the nearest kind is named."""
    target = tmp_path / "plot.pngg"
    bench.dialogs.picture_paths = [target]
    bench.trigger("file.export_plot")
    assert not target.exists()
    assert bench.window.messages.shown is not None
    assert ".png" in bench.window.messages.shown.text


def test_a_folder_that_is_not_there_is_told(bench: Bench, tmp_path: Path) -> None:
    """The reason is told and no file is left."""
    bench.dialogs.picture_paths = [tmp_path / "nowhere" / "plot.png"]
    bench.trigger("file.export_wall")
    assert bench.window.messages.shown is not None
    assert "No such file or directory" in bench.window.messages.shown.text
