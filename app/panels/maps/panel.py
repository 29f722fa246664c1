"""The panel of maps: the quantity of the curves over frequency and angle, or over a thickness or a constant."""

from collections.abc import Callable, Sequence
from typing import Final

from PySide6.QtCore import QPointF, Qt, Signal
from PySide6.QtGui import QGuiApplication, QHideEvent, QKeyEvent, QMouseEvent, QPainter, QPaintEvent, QShowEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QSizePolicy, QVBoxLayout, QWidget

from app.document.session import Change, Session
from app.document.view import View, ViewChange
from app.look.pictures import Picture, clipboard_data
from app.look.theme import LIGHT, Theme
from app.panels.curves.drawing import fill_palette
from app.panels.cuts.ends import EndFields
from app.panels.maps.picture import cell_at, frame_of, paint_map
from app.panels.maps.question import DrawnMap, MapQuestion, about, data_table, drawn, note, question_of
from app.panels.materials.pieces import Line, button, ink
from app.panels.sweep.field import QuietChoice, QuietField
from app.panels.sweep.flow import FlowLayout
from app.series.axis import is_power
from app.series.cases import conditions_shown
from app.workers.batch import BatchEnd, BatchFailure, BatchLane, BatchStep
from stackcore.errors import Fault, Severity, UnitError
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
        return cell_at(self.drawn, frame_of(self.drawn, self.width(), self.height()).area, at)

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
        self.ends = EndFields(theme, self._ask, self)
        self._limits: dict[tuple[str, str], tuple[float | None, float | None]] = {}
        self._words: list[QLabel] = []
        self.state, self.worst = QLabel(self), Line(self)
        self.map = MapView(theme, self)
        self.copy = button(self, "Copy data", "Put the map on the clipboard as a table.", self.copy_data)
        self._arrange()
        self._connect()
        self.set_theme(theme)

    @property
    def shown(self) -> DrawnMap | None:
        """The map of now, as far as it is computed."""
        return self.map.drawn

    @property
    def asked(self) -> MapQuestion | None:
        """What is or was computed last; None while the panel is hidden."""
        return self._asked

    def choose_over(self, path: str) -> None:
        """Let another number run upward: the path of a variation, or nothing for the angle."""
        self._over = path
        self._ask()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = self.map.theme = theme
        fill_palette(self, theme)
        for control in (self.over, self.low, self.high, *self.ends.fields):
            control.set_theme(theme)
        for label in (self.state, *self._words):
            ink(label, theme.muted)
        ink(self.worst, theme.text)
        self.map.update()

    @property
    def computing(self) -> bool:
        """Whether something is being computed."""
        return self._lane.busy

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

        heading = f"Map: {about(shown)}" if shown is not None else "Map"
        return Picture(heading, view.size(), view.logicalDpiX(), LIGHT.base, paint)

    def copy_data(self) -> None:
        """Put the map on the clipboard as a table: what it is of, frequencies across, the other axis down."""
        if self.shown is not None:
            QGuiApplication.clipboard().setText(data_table(self.shown))
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
        head = QWidget(self)
        flow = FlowLayout(head, across=8, down=2)
        low, high = self.ends.fields
        for parts in (("Frequency and", self.over), ("from", low, "to", high)):
            flow.addWidget(self._group(head, parts))
        flow.addWidget(self._group(head, ("colours from", self.low, "to", self.high)))
        flow.addWidget(self.copy)
        foot = QHBoxLayout()
        foot.setContentsMargins(8, 0, 8, 4)
        foot.addWidget(self.worst, 1)
        foot.addWidget(self.state)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 4, 0, 0)
        whole.setSpacing(4)
        whole.addWidget(head)
        whole.addWidget(self.map, 1)
        whole.addLayout(foot)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.map)

    def _group(self, owner: QWidget, parts: Sequence[QWidget | str]) -> QWidget:
        """Return parts and words in one widget, so that a line never breaks between them."""
        group = QWidget(owner)
        row = QHBoxLayout(group)
        row.setContentsMargins(8, 0, 0, 0)
        row.setSpacing(6)
        for part in parts:
            if isinstance(part, str):
                word = QLabel(part, group)
                self._words.append(word)
                row.addWidget(word)
            else:
                row.addWidget(part)
        return group

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
        if change.kind == "open":
            self.ends.forget()
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
        ends = self.ends.follow(job, stack, self._over)
        question = question_of(job, stack, self._view.state, self._over, ends)
        if question != self._asked:
            if self._asked is None or _scale(question) != _scale(self._asked):
                self._recall_limits(question)
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
        told = note(shown, conditions=bool(conditions_shown(self._session.record, self._view.state)))
        worst = f"Worst: {shown.worst[0]}" if shown.worst is not None else ""
        self.worst.setText("; ".join(part for part in (worst, told) if part))
        self.low.setPlaceholderText(f"{shown.low:.3g}")
        self.high.setPlaceholderText(f"{shown.high:.3g}")
        self.map.setAccessibleDescription(f"{shown.titles[2]}. {self.worst.text()}")
        if self.map.cursor_cell is not None:
            self.map.point(self.map.cursor_cell)

    def _recall_limits(self, question: MapQuestion) -> None:
        """Show the limits typed for this quantity and unit: those of another one mean nothing here."""
        self.map.limits = self._limits.get(_scale(question), (None, None))
        for field, end in zip((self.low, self.high), self.map.limits, strict=True):
            field.show_text("" if end is None else f"{end:g}")

    def _take_limits(self) -> None:
        """Take the typed limits; a text that is none stays with its reason, and the colours as they are."""
        if self._asked is None:
            return
        unit = self.shown.unit if self.shown is not None else ""
        ends = [_limit(field, unit) for field in (self.low, self.high)]
        if any(field.fault is not None for field in (self.low, self.high)):
            return
        low, high = ends
        if low is not None and high is not None and not low < high:
            fault = Fault("", f"{high:g} is not above {low:g}", "a larger value")
            self.high.show_text(self.high.text(), fault)
            return
        self._limits[_scale(self._asked)] = self.map.limits = (low, high)
        self.map.update()


def _scale(question: MapQuestion) -> tuple[str, str]:
    """Return what limits of colours belong to."""
    return question.quantity, question.power if is_power(question.quantity) else ""


def _limit(field: QuietField, unit: str) -> float | None:
    """Return the limit typed into a field, with or without the unit shown; marks a text that is none."""
    text = field.text().strip()
    sign = {"deg": "°"}.get(unit, "")
    bare = text.removesuffix(unit).removesuffix(sign).strip() if unit else text
    try:
        value = parse_measure(bare, Dimension.NUMBER).value if text else None
    except UnitError as error:
        field.show_text(text, Fault("", error.message, f"a number in {unit}" if unit else "a number"))
        return None
    field.show_text(text)
    return value
