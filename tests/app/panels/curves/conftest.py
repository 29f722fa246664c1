"""A plot with the curves of a slab, shown and ready for mouse and keys."""

from collections.abc import Iterator
from dataclasses import dataclass, field

import pytest
from PySide6.QtCore import QEvent, QPoint, QPointF, Qt
from PySide6.QtGui import QMouseEvent, QWheelEvent
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication
from pytestqt.qtbot import QtBot

from app.document.session import Session
from app.document.view import View
from app.look.theme import LIGHT
from app.panels.curves import CurvesPanel
from app.panels.curves.plot import CurvePlot
from tests.app.panels.results import Told, answer_to, slab_job

LEFT = Qt.MouseButton.LeftButton
CTRL = Qt.KeyboardModifier.ControlModifier
SHIFT = Qt.KeyboardModifier.ShiftModifier


@dataclass
class Bench:
    """The panel with everything it stands on, and a hand for its plot."""

    qtbot: QtBot
    session: Session = field(default_factory=lambda: Session(slab_job()))
    view: View = field(default_factory=View)
    told: Told = field(default_factory=Told)
    pointed: list[str] = field(default_factory=list)

    def __post_init__(self) -> None:
        self.panel = CurvesPanel(self.session, self.view, LIGHT, self.told)
        self.panel.pointed.connect(self.pointed.append)
        self.qtbot.addWidget(self.panel)
        self.panel.resize(900, 500)
        self.panel.show()
        self.qtbot.waitExposed(self.panel)

    @property
    def plot(self) -> CurvePlot:
        """The plot."""
        return self.panel.plot

    def answer(self, stack: int = 0) -> None:
        """Show the answer for one stack of the job."""
        self.panel.show_answer(answer_to(self.session, self.view, stack))

    def pixel(self, hertz: float, value: float) -> QPoint:
        """Return where a point of the plot is on its widget."""
        frame = self.plot.frame()
        inside = QPointF(frame.across(self.panel.scale.position(hertz)), frame.down(value))
        return (inside + self.plot.area_rect().topLeft()).toPoint()

    def press(self, key: Qt.Key, modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
        """Press a key in the plot."""
        QTest.keyClick(self.plot, key, modifier)

    def click(self, at: QPoint, modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
        """Click in the plot."""
        QTest.mouseClick(self.plot.viewport(), LEFT, modifier, at)

    def drag(
        self, start: QPoint, stop: QPoint, modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier
    ) -> None:
        """Drag in the plot in three movements."""
        viewport = self.plot.viewport()
        QTest.mousePress(viewport, LEFT, modifier, start)
        for share in (0.3, 0.7, 1.0):
            step = QPointF(start) + (QPointF(stop) - QPointF(start)) * share
            self.move(step.toPoint(), LEFT, modifier)
        QTest.mouseRelease(viewport, LEFT, modifier, stop)

    def move(
        self,
        at: QPoint,
        button: Qt.MouseButton = Qt.MouseButton.NoButton,
        modifier: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier,
    ) -> None:
        """Move the mouse; a movement with a button needs an event of its own, which QTest does not make."""
        place = QPointF(at)
        event = QMouseEvent(
            QEvent.Type.MouseMove, place, self.plot.mapToGlobal(place), Qt.MouseButton.NoButton, button, modifier
        )
        QApplication.sendEvent(self.plot.viewport(), event)

    def wheel(self, at: QPoint, notches: int) -> None:
        """Turn the wheel over the plot."""
        place = QPointF(at)
        event = QWheelEvent(
            place,
            self.plot.mapToGlobal(place),
            QPoint(),
            QPoint(0, 120 * notches),
            Qt.MouseButton.NoButton,
            Qt.KeyboardModifier.NoModifier,
            Qt.ScrollPhase.NoScrollPhase,
            False,
        )
        QApplication.sendEvent(self.plot.viewport(), event)


@pytest.fixture
def bench(qtbot: QtBot) -> Iterator[Bench]:
    """The plot with the curves of the first stack."""
    found = Bench(qtbot)
    found.answer()
    yield found
    found.panel.hide()
