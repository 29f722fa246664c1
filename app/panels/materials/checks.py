"""The health of the job's materials: checked while it is looked at, one material after the other."""

import contextlib
import threading
from collections.abc import Callable
from typing import Final, NamedTuple

from PySide6.QtCore import QObject, Qt, QTimer, Signal, Slot
from PySide6.QtGui import QGuiApplication, QHideEvent, QKeyEvent, QKeySequence, QResizeEvent, QShowEvent
from PySide6.QtWidgets import QListView, QWidget

from app.document.session import Change, Session
from app.look.theme import Theme
from app.panels.materials.findings import AskedOfFinding, FindingDelegate, FindingsModel, Told
from app.panels.materials.pieces import column, ink, words
from stackcore.job import Job
from stackcore.job.health import material_findings
from stackcore.job.records import SweepRecord
from stackcore.media.base import AbstractMedium
from stackcore.media.health import Finding

ALL_WELL: Final = "Nothing speaks against the materials of this job over its sweep."
CHECKING: Final = "Checking…"
ABOUT: Final = (
    "Checked over the sweep: gain, the range of the data, loss given twice, units, whether ε′ and its loss belong "
    "together, and other editions of the source."
)
PAUSE: Final = 150
"""Milliseconds without a change before a check begins, so that it does not run behind every letter typed."""


class FindingsList(QListView):
    """The findings; Enter goes to the material, Ctrl+C copies what is said."""

    def __init__(self, go: Callable[[], None], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._go = go
        self.setFrameShape(self.Shape.NoFrame)
        self.setVerticalScrollMode(self.ScrollMode.ScrollPerPixel)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setResizeMode(self.ResizeMode.Adjust)
        self.setAccessibleName("Findings on the materials of this job")
        self.setAccessibleDescription("Enter goes to the material, Ctrl+C copies the finding.")

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self._go()
        elif event.matches(QKeySequence.StandardKey.Copy) and self.currentIndex().isValid():
            told: Told = self.currentIndex().data(AskedOfFinding.TOLD)
            QGuiApplication.clipboard().setText(f"{told.heading}. {told.body}")
        else:
            super().keyPressEvent(event)

    def resizeEvent(self, event: QResizeEvent) -> None:
        super().resizeEvent(event)
        self.scheduleDelayedItemsLayout()


class Checked(NamedTuple):
    """The findings on one material, and the question they answer."""

    number: int
    job: Job
    findings: tuple[Finding, ...]


class Relay(QObject):
    """Carries findings from the thread; without a parent, so that it outlives the panel."""

    arrived = Signal(object)


def _check(relay: Relay, number: int, job: Job, name: str) -> None:
    with contextlib.suppress(RuntimeError):  # the program has ended meanwhile
        relay.arrived.emit(Checked(number, job, material_findings(job, name)))


class Checks(QWidget):
    """The findings on all materials of the job over its sweep."""

    wanted = Signal(str)
    """The name of the material whose finding was chosen."""
    counted = Signal(int)
    """How many findings are more than notes."""

    def __init__(self, session: Session, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session = session
        self._known: dict[str, tuple[AbstractMedium, SweepRecord, tuple[Finding, ...]]] = {}
        self._waiting: list[str] = []
        self._asked = 0
        self._relay = Relay()
        self._relay.arrived.connect(self._take, Qt.ConnectionType.QueuedConnection)
        self._model = FindingsModel(self)
        self._delegate = FindingDelegate(theme, self)
        self.list = FindingsList(self._go, self)
        self.list.setModel(self._model)
        self.list.setItemDelegate(self._delegate)
        self.list.doubleClicked.connect(lambda _index: self._go())
        self.state = words("", self)
        self._timer = QTimer(self)
        self._timer.setObjectName("check of materials")
        self._timer.setSingleShot(True)
        self._timer.timeout.connect(self._step)
        about = words(ABOUT, self)
        whole = column(self)
        whole.addSpacing(4)
        whole.addWidget(self.state)
        whole.addWidget(self.list, 1)
        whole.addWidget(about)
        self._about = about
        self.setFocusProxy(self.list)
        self.destroyed.connect(session.subscribe(self._heard))
        self.set_theme(theme)

    @property
    def told(self) -> tuple[Told, ...]:
        """What is listed."""
        return self._model.told

    @property
    def busy(self) -> bool:
        """Whether there is something still to be checked."""
        return bool(self._waiting)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._delegate.theme = theme
        self.list.viewport().update()
        ink(self.state, theme.muted)
        ink(self._about, theme.muted)

    def showEvent(self, event: QShowEvent) -> None:
        """Begin to check."""
        super().showEvent(event)
        self._begin(0)

    def hideEvent(self, event: QHideEvent) -> None:
        """Stop: nobody looks."""
        self._timer.stop()
        super().hideEvent(event)

    def _heard(self, change: Change) -> None:
        before, after = change.before.record, change.after.record
        same = before.materials is after.materials and before.sweep is after.sweep
        if not same or change.kind == "open":
            self._begin(PAUSE)

    def _begin(self, pause: int) -> None:
        job = self._session.job
        names = [material.name for material in job.materials]
        self._asked += 1  # what is being checked still belongs to an earlier job
        self._known = {name: known for name, known in self._known.items() if name in names}
        self._waiting = [name for name in names if not self._is_known(name)]
        self._show()
        if self._waiting and self.isVisible():
            self._timer.start(pause)

    def _is_known(self, name: str) -> bool:
        known = self._known.get(name)
        job = self._session.job
        return known is not None and known[0] == job.media[name] and known[1] == job.sweep

    def _step(self) -> None:
        """Check the next material aside; the window goes on meanwhile."""
        job = self._session.job
        self._waiting = [name for name in self._waiting if name in job.media]
        if self._waiting:
            self._asked += 1
            work = (self._relay, self._asked, job, self._waiting[0])
            threading.Thread(target=_check, args=work, name="check of materials", daemon=True).start()
        else:
            self._show()

    @Slot(object)
    def _take(self, checked: Checked) -> None:
        """Take what was found, unless the question has changed meanwhile, and go on."""
        if checked.number != self._asked or not self._waiting:
            return
        name = self._waiting.pop(0)
        self._known[name] = (checked.job.media[name], checked.job.sweep, checked.findings)
        self._show()
        if self._waiting and self.isVisible():
            self._timer.start(0)

    def _show(self) -> None:
        job = self._session.job
        told = [
            Told(material.name, material.label or material.name, finding)
            for material in job.materials
            if material.name in self._known
            for finding in self._known[material.name][2]
        ]
        self._model.show_told(told)
        text = CHECKING if self._waiting else "" if told else ALL_WELL
        self.state.setText(text)
        self.state.setVisible(bool(text))
        self.list.setVisible(bool(told))
        self.counted.emit(sum(one.finding.severity != "note" for one in told))

    def _go(self) -> None:
        index = self.list.currentIndex()
        if index.isValid():
            self.wanted.emit(index.data(AskedOfFinding.TOLD).name)
