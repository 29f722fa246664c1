"""Parts of curves beyond the range of a material: dotted, and told why."""

import numpy as np
import pytest
from PySide6.QtCore import Qt
from PySide6.QtGui import QImage, QPainter
from PySide6.QtWidgets import QToolTip
from pytestqt.qtbot import QtBot

from app.document.session import Session
from app.panels.curves.curve_layer import DOTTED, DOTTED_DASHES, DrawnCurve, held_pieces
from stackcore.job import Job, job_from_json
from tests.app.panels.curves.conftest import Bench
from tests.app.panels.results import SLAB

BOUND = SLAB.replace('"permittivity": 4.0', '"permittivity": 4.0, "label": "Resin", "range": ["8 GHz", "10 GHz"]')


@pytest.fixture
def bound(qtbot: QtBot) -> Bench:
    """The slab of a resin that is known to 10 GHz, swept to 12 GHz."""
    bench = Bench(qtbot, session=Session(Job(job_from_json(BOUND))))
    bench.answer()
    return bench


def test_pieces_meet_and_only_known_ends_make_a_known_line() -> None:
    """Neighbouring pieces share a point; a line with one unknown end is unknown; nothing is left out."""
    held = np.array([False, True, True, False, True])

    assert held_pieces(0, 5, None) == ((0, 5, True),)
    assert held_pieces(0, 5, held) == ((0, 2, False), (1, 3, True), (2, 5, False))
    assert held_pieces(3, 4, held) == ((3, 4, False),)
    assert held_pieces(1, 3, held) == ((1, 3, True),)


def test_curve_is_dotted_beyond_the_range(bound: Bench) -> None:
    """The solid piece ends at 10 GHz; TE has dots, TM dots in pairs, so that the style still tells them apart."""
    for curve in bound.plot.curve_layer.curves:
        (first, last, known), (begin, end, unknown) = curve.pieces
        assert (known, unknown) == (True, False)
        assert curve.positions[last - 1] == pytest.approx(10.0)
        assert (first, begin, end) == (0, last - 1, 41)
    solid, dashed = bound.plot.curve_layer.curves[:2]
    assert (solid.pattern(True), solid.pattern(False)) == ((), DOTTED)
    assert dashed.pattern(True) == dashed.dashes
    assert dashed.pattern(False) == DOTTED_DASHES


def test_dots_leave_gaps_on_the_screen(bound: Bench) -> None:
    """A horizontal curve covers every column where it is known and about a third of them beyond."""
    layer = bound.plot.curve_layer
    positions = np.linspace(8.0, 12.0, 41)
    flat = DrawnCurve(positions, np.full(41, 0.5), "#000000", held=positions <= 10.0)
    layer.set_curves((flat,))
    frame = layer.frame()
    image = QImage(int(frame.width), int(frame.height), QImage.Format.Format_RGB32)
    image.fill(Qt.GlobalColor.white)
    painter = QPainter(image)
    painter.setRenderHint(QPainter.RenderHint.Antialiasing)
    layer.draw(painter, frame)
    painter.end()
    middle = int(frame.down(0.5))
    border = int(frame.across(10.0))

    def covered(first: int, last: int) -> float:
        rows = (middle - 1, middle, middle + 1)
        light = [min(image.pixelColor(x, y).lightness() for y in rows) for x in range(first, last)]
        return sum(one < 200 for one in light) / len(light)

    assert covered(5, border - 5) == 1.0
    assert 0.1 < covered(border + 5, int(frame.width) - 5) < 0.75


def test_reason_is_told_above_and_to_those_who_listen(bound: Bench) -> None:
    """The line above names that there are dotted parts, its tip and the description say why."""
    doubt = bound.panel.header.doubt
    assert doubt.isVisible()
    assert doubt.text() == "Dotted parts: beyond material data"
    assert doubt.toolTip() == "Resin is known from 8 GHz to 10 GHz."
    assert "Dotted where Resin is known from 8 GHz to 10 GHz." in bound.plot.accessibleDescription()


def test_reason_is_told_on_hover(bound: Bench, monkeypatch: pytest.MonkeyPatch) -> None:
    """Over the dotted part the tip and the status line say why; over the solid part they do not."""
    tips: list[str] = []
    monkeypatch.setattr(QToolTip, "showText", lambda _place, text, _owner: tips.append(text))
    curve = bound.panel.curves[0]
    for point, guessed in ((5, False), (35, True)):
        bound.move(bound.pixel(float(curve.x[point]), float(curve.y[point])))
        assert ("Resin is known from 8 GHz to 10 GHz" in bound.pointed[-1]) == guessed
        assert any("Dotted: Resin is known" in tip for tip in tips) == guessed


def test_nothing_is_dotted_inside_the_range(bench: Bench) -> None:
    """Materials without a range raise no doubt."""
    assert not bench.panel.header.doubt.isVisible()
    assert all(len(curve.pieces) == 1 for curve in bench.plot.curve_layer.curves)
