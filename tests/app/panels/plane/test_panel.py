"""The panel of the complex plane: what it draws, points at and gives away."""

import pytest
from PySide6.QtCore import QPoint, QPointF, Qt
from PySide6.QtGui import QGuiApplication
from PySide6.QtTest import QTest
from pytestqt.qtbot import QtBot

from app.document.session import Session
from app.document.view import View
from app.look.pictures import svg_bytes
from app.look.theme import DARK, LIGHT
from app.panels.plane.panel import EMPTY, WAITING, PlanePanel
from tests.app.panels.results import Told, answer_to, slab_job


class Bench:
    """The panel on a slab."""

    def __init__(self, qtbot: QtBot) -> None:
        self.qtbot = qtbot
        self.session, self.view, self.told = Session(slab_job()), View(), Told()
        self.pointed: list[str] = []
        self.panel = PlanePanel(self.session, self.view, LIGHT, self.told)
        self.panel.pointed.connect(self.pointed.append)
        qtbot.addWidget(self.panel)
        self.panel.resize(420, 620)

    def show(self) -> None:
        """Show it with its first answer."""
        self.panel.show()
        self.qtbot.waitExposed(self.panel)
        self.answer()

    def answer(self, stack: int = 0) -> None:
        """Give it an answer."""
        self.panel.show_answer(answer_to(self.session, self.view, stack))

    def pixel(self, value: complex) -> QPoint:
        """Return where a point of the plane is on the plot."""
        plot = self.panel.plot
        frame = plot.frame()
        inside = QPointF(frame.across(value.real), frame.down(value.imag))
        return (inside + plot.area_rect().topLeft()).toPoint()


@pytest.fixture
def bench(qtbot: QtBot) -> Bench:
    """A bench with nothing shown yet."""
    return Bench(qtbot)


def test_a_circle_is_round_and_whole(bench: Bench) -> None:
    """A pixel is as long both ways, and the unit circle is in sight, whatever the shape of the panel."""
    bench.show()
    for size in ((420, 620), (800, 400)):
        bench.panel.resize(*size)
        bench.qtbot.wait(50)
        frame = bench.panel.plot.frame()
        across, down = (frame.right - frame.left) / frame.width, (frame.top - frame.bottom) / frame.height
        assert across == pytest.approx(down, rel=1e-6)
        assert frame.left < -1
        assert frame.right > 1
        assert frame.bottom < -1
        assert frame.top > 1


def test_it_waits_for_an_answer_and_says_when_there_is_no_curve(bench: Bench) -> None:
    """Nothing is drawn before the first answer; a circular wave has no impedance at an angle."""
    bench.panel.show()
    assert _note(bench) == WAITING
    bench.answer()
    assert _paths(bench) == 6
    assert _note(bench) == ""
    bench.view.set(polarizations=("circular",))
    bench.panel.choice.setCurrentIndex(2)
    assert _paths(bench) == 1
    assert _note(bench) != EMPTY


def _paths(bench: Bench) -> int:
    return len(bench.panel.layer.paths)


def _note(bench: Bench) -> str:
    return bench.panel.plot.note_layer.text


def _impedances(bench: Bench) -> bool:
    return bench.panel.layer.impedances


def test_markers_stand_on_the_curves_and_are_stepped_by_key(bench: Bench) -> None:
    """A dot a curve, numbered once; Right moves the marker by a frequency and says its value."""
    bench.view.set(markers=(10e9,))
    bench.show()
    assert [mark.text for mark in bench.panel.layer.marks if mark.text] == ["1"]
    assert len(bench.panel.layer.marks) == 6
    QTest.keyClick(bench.panel.plot, Qt.Key.Key_Right)
    assert bench.view.state.markers == pytest.approx((10.1e9,))
    assert "10.1 GHz: r = " in bench.pointed[-1]


def test_pointing_says_frequency_value_and_impedance(bench: Bench) -> None:
    """The nearest point of all curves is ringed and read."""
    bench.show()
    curve = bench.panel.curves[-1]
    value = complex(curve.values[20])
    QTest.mouseMove(bench.panel.plot.viewport(), bench.pixel(value))
    bench.qtbot.waitUntil(lambda: bench.panel.layer.pointed is not None)
    ringed = bench.panel.layer.pointed
    assert ringed is not None
    assert abs(ringed - value) < 0.05
    assert "r = " in bench.pointed[-1]
    assert "z = " in bench.pointed[-1]


def test_the_grid_is_for_reflections_only(bench: Bench) -> None:
    """Its switch goes with them, and comes back as it was."""
    bench.show()
    bench.panel.grid.click()
    assert _impedances(bench)
    bench.panel.choice.setCurrentIndex(1)
    assert not _impedances(bench)
    assert not bench.panel.grid.isVisible()
    bench.panel.choice.setCurrentIndex(0)
    assert _impedances(bench)


def test_data_and_picture_leave_it(bench: Bench) -> None:
    """The table is on the clipboard, the drawing has its words as text, and the grid in it."""
    bench.show()
    bench.panel.grid.click()
    bench.panel.copy_data()
    assert QGuiApplication.clipboard().text().startswith("Frequency, Hz\tRe r TE 0°\tIm r TE 0°")
    drawing = svg_bytes(bench.panel.picture()).decode()
    assert "Imaginary part of r" in drawing
    assert "+j1" in drawing
    assert "<image" not in drawing
    bench.panel.copy_picture()
    assert QGuiApplication.clipboard().mimeData().hasImage()


def test_the_curve_of_the_wall_is_chosen_and_old_ones_fade(bench: Bench) -> None:
    """As over frequency: the chosen one is wider, curves of an earlier job are nearly grey."""
    bench.view.set(active_angle=1, active_polarization="TM")
    bench.show()
    assert [path.chosen for path in bench.panel.layer.paths].index(True) == 3
    before = [path.colour for path in bench.panel.layer.paths]
    bench.panel.set_stale(True)
    assert all(path.colour != old for path, old in zip(bench.panel.layer.paths, before, strict=True))
    bench.panel.set_stale(False)
    bench.panel.set_theme(DARK)
    assert bench.panel.plot.backgroundBrush().color().name() == DARK.base
