"""The panel of maps: the quantity of the curves over frequency and angle, or over a thickness or a constant."""

from collections.abc import Callable
from typing import Final

import numpy as np
from PySide6.QtCore import QPointF, Qt, Signal
from PySide6.QtGui import QGuiApplication, QHideEvent, QKeyEvent, QMouseEvent, QPainter, QPaintEvent, QShowEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QSizePolicy, QVBoxLayout, QWidget

from app.document.session import Change, Session
from app.document.view import View, ViewChange
from app.look.pictures import Picture, clipboard_data
from app.look.theme import LIGHT, Theme
from app.panels.curves.drawing import fill_palette
from app.panels.maps.picture import frame_of, paint_map
from app.panels.maps.question import DrawnMap, MapQuestion, drawn, question_of
from app.panels.materials.pieces import button, ink
from app.panels.sweep.field import QuietChoice, QuietField
from app.workers.batch import BatchEnd, BatchFailure, BatchLane, BatchStep
from stackcore.errors import Severity, UnitError
from stackcore.studies import MapLevel, variations_of
from stackcore.units import Dimension, parse_measure

Tell = Callable[[str, Severity], None]

ANGLE: Final = "the angle of incidence"
OVER_TIP: Final = "What runs upward: the angle, or a thickness, sheet part or constant of this stack."
LIMIT_TIP: Final = "End of the colours, in the unit of the quantity; empty follows the values."
EMPTY: Final = "The map is computed while this panel is shown."


class MapView(QWidget):
    """The picture, with a cell that is pointed at by the mouse or moved by the arrow keys."""

    pointed = Signal(str)
    """Words for the cell, empty for none."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.theme = theme
        self.drawn: DrawnMap | None = None
        self.limits: tuple[float | None, float | None] = (None, None)
        self.cursor_cell: tuple[int, int] | None = None
        self.setMouseTracking(True)
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setMinimumSize(280, 200)
        self.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Expanding)
        self.setAccessibleName("Map")

    def range_shown(self) -> tuple[float, float]:
        """Return the ends of the colours: as typed, else those of the values."""
        assert self.drawn is not None
        low = self.drawn.low if self.limits[0] is None else self.limits[0]
        high = self.drawn.high if self.limits[1] is None else self.limits[1]
        return (low, high) if low < high else (low, low + 1.0)

    def show_map(self, shown: DrawnMap | None) -> None:
        """Draw a map, or nothing."""
        self.drawn = shown
        if shown is not None and self.cursor_cell is not None:
            rows, columns = shown.values.shape
            self.cursor_cell = (min(self.cursor_cell[0], rows - 1), min(self.cursor_cell[1], columns - 1))
        self.update()

    def point(self, cell: tuple[int, int] | None) -> None:
        """Point at a cell and say what stands in it."""
        self.cursor_cell = cell
        self.pointed.emit("" if cell is None or self.drawn is None else self.drawn.words_at(*cell))
        self.update()

    def cell_at(self, at: QPointF) -> tuple[int, int] | None:
        """Return the cell at a pixel, None outside the map."""
        if self.drawn is None:
            return None
        frame = frame_of(self.drawn, self.width(), self.height())
        if not frame.area.contains(at):
            return None
        rows, columns = self.drawn.values.shape
        across = (at.x() - frame.area.left()) / frame.area.width()
        up = (frame.area.bottom() - at.y()) / frame.area.height()
        return min(int(up * rows), rows - 1), min(int(across * columns), columns - 1)

    def paintEvent(self, event: QPaintEvent) -> None:
        painter = QPainter(self)
        try:
            painter.setFont(self.font())
            if self.drawn is None:
                painter.setPen(self.palette().placeholderText().color())
                painter.drawText(self.rect(), Qt.AlignmentFlag.AlignCenter, EMPTY)
            else:
                size = (self.width(), self.height())
                paint_map(painter, self.drawn, *size, self.theme, self.range_shown(), self.cursor_cell)
        finally:
            painter.end()

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        self.point(self.cell_at(event.position()))

    def keyPressEvent(self, event: QKeyEvent) -> None:
        steps = {
            Qt.Key.Key_Left: (0, -1),
            Qt.Key.Key_Right: (0, 1),
            Qt.Key.Key_Up: (1, 0),
            Qt.Key.Key_Down: (-1, 0),
        }
        step = steps.get(Qt.Key(event.key()))
        if step is None or self.drawn is None:
            super().keyPressEvent(event)
            return
        rows, columns = self.drawn.values.shape
        far = 10 if event.modifiers() & Qt.KeyboardModifier.ControlModifier else 1
        row, column = self.cursor_cell or (rows // 2, columns // 2)
        row = min(max(row + far * step[0], 0), rows - 1)
        self.point((row, min(max(column + far * step[1], 0), columns - 1)))


class MapPanel(QWidget):
    """A map of the quantity, polarization and axis that the view shows; it follows every edit while it is shown.

    Parameters
    ----------
    session, view
        The job, and what is looked at.
    tell
        Says why a map cannot be computed.
    """

    pointed = Signal(str)
    """What is pointed at, in words, for the status line."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._over = ""
        self._asked: MapQuestion | None = None
        self.live_busy: Callable[[], bool] = lambda: False
        self._lane = BatchLane(lambda: self.live_busy(), self)
        self.over = QuietChoice(theme, "Over", OVER_TIP, self)
        self.low = QuietField(theme, "Colours from", LIMIT_TIP, "0000000", self)
        self.high = QuietField(theme, "to", LIMIT_TIP, "0000000", self)
        self.state, self.worst = QLabel(self), QLabel(self)
        self.map = MapView(theme, self)
        self.copy = button(self, "Copy data", "Put the map on the clipboard as a table.", self.copy_data)
        self._arrange()
        self._connect()
        self.set_theme(theme)

    @property
    def shown(self) -> DrawnMap | None:
        """The map of now, as far as it is computed."""
        return self.map.drawn

    def choose_over(self, path: str) -> None:
        """Let another number run upward: the path of a variation, or nothing for the angle."""
        self._over = path
        self._ask()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = self.map.theme = theme
        fill_palette(self, theme)
        for control in (self.over, self.low, self.high):
            control.set_theme(theme)
        ink(self.state, theme.muted)
        ink(self.worst, theme.text)
        self.map.update()

    def give_way(self) -> None:
        """Compute nothing for a moment: the curves are asked for."""
        self._lane.give_way()

    def close_lane(self) -> None:
        """End what is being computed, for good."""
        self._lane.close()

    def picture(self) -> Picture:
        """Return the map as it stands, in the light look."""
        shown, limits, view = self.shown, None, self.map
        limits = view.range_shown() if shown is not None else (0.0, 1.0)
        width, height = view.width(), view.height()

        def paint(painter: QPainter) -> None:
            painter.setFont(view.font())
            if shown is not None:
                paint_map(painter, shown, width, height, LIGHT, limits)

        stack = self._session.record.stacks[self._session.selection.stack].name
        return Picture(f"{stack}: map", view.size(), view.logicalDpiX(), LIGHT.base, paint)

    def copy_data(self) -> None:
        """Put the map on the clipboard as a table: frequencies across, the other axis down, full precision."""
        shown = self.shown
        if shown is None:
            return
        lines = ["\t".join([f"{shown.titles[1]} \\ {shown.titles[0]}", *map(repr, shown.x.tolist())])]
        for value, row in zip(shown.y.tolist(), shown.values.tolist(), strict=True):
            lines.append("\t".join(map(repr, [value, *row])))
        QGuiApplication.clipboard().setText("\n".join(lines) + "\n")
        self.pointed.emit("Copied the map as a table.")

    def copy_picture(self) -> None:
        """Put the map on the clipboard as a picture."""
        QGuiApplication.clipboard().setMimeData(clipboard_data(self.picture()))
        self.pointed.emit("Copied the map as a picture.")

    def showEvent(self, event: QShowEvent) -> None:
        """Begin to compute."""
        super().showEvent(event)
        self._ask()

    def hideEvent(self, event: QHideEvent) -> None:
        """Compute nothing that nobody sees."""
        self._lane.cancel()
        self._asked = None
        super().hideEvent(event)

    def _arrange(self) -> None:
        rows: tuple[tuple[QWidget, ...], ...] = (
            (QLabel("Over frequency and", self), self.over),
            (QLabel("Colours from", self), self.low, QLabel("to", self), self.high, self.copy),
        )
        heads: list[QHBoxLayout] = []
        for parts in rows:
            head = QHBoxLayout()
            head.setContentsMargins(8, 4 if not heads else 0, 8, 0)
            head.setSpacing(8)
            for part in parts:
                head.addWidget(part)
            head.addStretch(1)
            heads.append(head)
        foot = QHBoxLayout()
        foot.setContentsMargins(8, 0, 8, 4)
        foot.addWidget(self.worst)
        foot.addStretch(1)
        foot.addWidget(self.state)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(4)
        for head in heads:
            whole.addLayout(head)
        whole.addWidget(self.map, 1)
        whole.addLayout(foot)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.map)

    def _connect(self) -> None:
        self.over.activated.connect(lambda _index: self.choose_over(str(self.over.currentData())))
        self.low.committed.connect(lambda _text: self._take_limits())
        self.high.committed.connect(lambda _text: self._take_limits())
        self.map.pointed.connect(self.pointed)
        self._lane.stepped.connect(self._take)
        self._lane.ended.connect(self._finish)
        self._lane.failed.connect(self._fail)
        leave = (self._session.subscribe(self._edited), self._view.subscribe(self._looked))
        self.destroyed.connect(lambda: [end() for end in leave])

    def _edited(self, change: Change) -> None:
        if change.after.job is not change.before.job or change.kind in ("open", "select"):
            self._ask()

    def _looked(self, change: ViewChange) -> None:
        self._ask()

    def _ask(self) -> None:
        if not self.isVisible():
            return
        job, stack = self._session.job, self._session.selection.stack
        offered = variations_of(job, stack)
        if self._over and self._over not in [one.path for one in offered]:
            self._over = ""
        self._offer([("", ANGLE), *((one.path, one.label) for one in offered)])
        question = question_of(job, stack, self._view.state, self._over)
        if question != self._asked:
            self._asked = question
            self._lane.ask(question.study())
            self.state.setText("Computing …")

    def _offer(self, entries: list[tuple[str, str]]) -> None:
        present = [(self.over.itemData(place), self.over.itemText(place)) for place in range(self.over.count())]
        if present != entries:
            self.over.clear()
            for path, label in entries:
                self.over.addItem(label, path)
        self.over.show_choice(self._over)

    def _take(self, step: BatchStep) -> None:
        if self._asked is None or not isinstance(step.value, MapLevel):
            return
        self._show(drawn(self._asked, step.value))
        self.state.setText(f"{step.value.share:.0%}" if step.value.share < 1 else "")

    def _finish(self, end: BatchEnd) -> None:
        self.state.setText("" if not end.cancelled else "Not finished")

    def _fail(self, failure: BatchFailure) -> None:
        self.state.setText("Not computed")
        for fault in failure.faults[:1]:
            self._tell(f"The map cannot be computed: {fault}", "warning")

    def _show(self, shown: DrawnMap) -> None:
        self.map.show_map(shown)
        self.worst.setText(f"Worst: {shown.worst[0]}" if shown.worst is not None else "")
        self.low.setPlaceholderText(f"{shown.low:.3g}")
        self.high.setPlaceholderText(f"{shown.high:.3g}")
        self.map.setAccessibleDescription(f"{shown.titles[2]}. {self.worst.text()}")
        if self.map.cursor_cell is not None:
            self.map.point(self.map.cursor_cell)

    def _take_limits(self) -> None:
        ends: list[float | None] = []
        for field in (self.low, self.high):
            text = field.text().strip()
            try:
                ends.append(parse_measure(text, Dimension.NUMBER).value if text else None)
            except UnitError as error:
                self._tell(str(error), "warning")
                return
        low, high = ends
        if low is not None and high is not None and not (np.isfinite([low, high]).all() and low < high):
            self._tell(
                f"{low:g} to {high:g} is no range of colours; the first must be below the second.", "warning"
            )
            return
        self.map.limits = (low, high)
        self.map.update()
