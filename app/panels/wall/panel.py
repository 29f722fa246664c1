"""The wall drawing as a panel: shows the stack that is looked at, and lets its faces be dragged."""

from collections.abc import Callable
from typing import TYPE_CHECKING

from PySide6.QtCore import QEvent, QSize, Qt, QTimer, Signal
from PySide6.QtGui import (
    QFocusEvent,
    QFontMetricsF,
    QGuiApplication,
    QHelpEvent,
    QKeyEvent,
    QMouseEvent,
    QPainter,
    QPaintEvent,
)
from PySide6.QtWidgets import QSizePolicy, QToolTip, QWidget

from app.document import edits
from app.document.document import Document, Selection
from app.document.edit import Edit
from app.document.session import Change, Session
from app.document.view import View, ViewChange, ViewState
from app.look.pictures import Picture, clipboard_data
from app.look.theme import LIGHT, Theme
from app.panels.wall import keys, tips, words
from app.panels.wall.captions import captions, rays_in
from app.panels.wall.drag import FaceDrag
from app.panels.wall.layout import Face, WallLayout, lay_out
from app.panels.wall.painting import Touch, paint_layout
from app.panels.wall.parts import LayerPart, Wall, wall_of
from app.panels.wall.pens import FontMeasure
from app.panels.wall.scale import ThicknessScale
from app.panels.wall.wave import Wave, wave_in
from app.series.rows import elements_by_row
from stackcore.errors import Fault, Severity
from stackcore.job.records import SweepRecord
from stackcore.stack import Stack

if TYPE_CHECKING:
    from app.workers.live import Answer

Tell = Callable[[str, Severity], None]

ANSWER_MS = 24
"""How long the drawing waits for the answer to a movement of the hand before it shows the movement alone."""
TYPED_MS = 60
"""The same for any other edit: nobody watches the drawing so closely then, and painting twice delays the curves."""


class WallPanel(QWidget):
    """The wall, seen from the side; the wave comes from the left.

    Parameters
    ----------
    session
        Whose selected stack is shown; faces dragged and keys change it there.
    view
        Whose marker, angle and polarization the rays have.
    theme
        The look.
    tell
        Says why something was refused.
    """

    edit_requested = Signal(int)
    """The row of an element that a person wants to edit in the table."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._answer: Answer | None = None
        self._stale = False
        self._stack = session.selection.stack
        self._scale: ThicknessScale | None = None
        self._layout: WallLayout | None = None
        self._wall: tuple[Document, int, Wall] | None = None
        self._wave: tuple[tuple[object, ...], Wave] | None = None
        self._face: Face | None = None
        self._drag: FaceDrag | None = None
        self.setObjectName("wall")
        self.setFocusPolicy(Qt.FocusPolicy.StrongFocus)
        self.setMouseTracking(True)
        self.setMinimumSize(360, 150)
        self.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Expanding)
        self.setAttribute(Qt.WidgetAttribute.WA_OpaquePaintEvent)
        # An edit is mostly followed by its answer within a frame; painting once for both halves the work.
        self._patience = QTimer(self, singleShot=True, interval=ANSWER_MS)
        self._patience.timeout.connect(self._show_now)
        leave_session, leave_view = session.subscribe(self._heard), view.subscribe(self._looked)
        self.destroyed.connect(lambda: (leave_session(), leave_view()))
        self._describe()

    # What the window calls

    def show_answer(self, answer: "Answer") -> None:
        """Draw the rays of an answer, as wide as it says."""
        self._answer = answer
        self._patience.stop()
        self._describe()
        self.update()

    def set_stale(self, stale: bool) -> None:
        """Dim the rays while they belong to an earlier job."""
        if stale != self._stale:
            self._stale = stale
            self.update()

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme
        self.update()

    def sizeHint(self) -> QSize:
        return QSize(1000, 250)

    def picture(self) -> Picture:
        """Return the drawing as it stands, in the light look, without selection and handles."""
        layout, wave = self.layout_now, self.wave
        name = self._session.record.stacks[self._stack].name

        def paint(painter: QPainter) -> None:
            painter.setFont(self.font())
            paint_layout(painter, layout, LIGHT, wave, Touch())

        return Picture(f"{name}: wall", self.size(), self.logicalDpiX(), LIGHT.base, paint)

    def copy_picture(self) -> None:
        """Put the drawing on the clipboard, in pixels and as a drawing."""
        QGuiApplication.clipboard().setMimeData(clipboard_data(self.picture()))
        self._tell("Copied the wall as a picture.", "note")

    # What is drawn

    @property
    def layout_now(self) -> WallLayout:
        """The drawing at its present size."""
        wall, size = self._shown_wall, (float(self.width()), float(self.height()))
        held = self._drag.held if self._drag is not None and self._drag.moving else None
        known = self._layout
        if known is None or held is not None or known.wall != wall or (known.width, known.height) != size:
            known = lay_out(wall, *size, self._measure(), last=self._scale, held=held)
            self._layout, self._scale = known, known.scale
        return known

    @property
    def _shown_wall(self) -> Wall:
        document = self._session.document
        if self._wall is None or self._wall[0] is not document or self._wall[1] != self._stack:
            self._wall = (document, self._stack, wall_of(document, self._stack))
        return self._wall[2]

    @property
    def wave(self) -> Wave:
        """The wave at the marker: that of the newest answer, or without powers before there is one."""
        job, answer = self._session.job, self._answer
        state, stack = self._view.state, self._solved
        key = (stack, job.sweep, state, answer, self._stale)
        if self._wave is None or any(old is not new for old, new in zip(self._wave[0], key, strict=True)):
            self._wave = (key, self._wave_now(stack, job.sweep, state))
        return self._wave[1]

    def _wave_now(self, stack: Stack, sweep: SweepRecord, state: ViewState) -> Wave:
        polarization, answer = state.active_polarization, self._answer
        if answer is None or len(answer.at_marker.stack.elements) != len(stack.elements):
            place = (state.marker_frequency(sweep), state.marker_angle(sweep))
            return wave_in(stack, *place, polarization, rows=self._rows, count=self._count)
        frequency, angle = answer.question.marker_frequency, answer.question.marker_angle
        response = answer.at_marker
        point = (frequency, angle, polarization, response)
        return wave_in(stack, *point, stale=self._stale, rows=self._rows, count=self._count)

    @property
    def _solved(self) -> Stack:
        return self._session.job.stacks[self._stack]

    @property
    def _rows(self) -> tuple[int, ...]:
        return self._session.job.rows[self._stack]

    @property
    def _count(self) -> int:
        return len(self._session.record.stacks[self._stack].elements)

    def _measure(self) -> FontMeasure:
        return FontMeasure(QFontMetricsF(self.font(), self))

    def paintEvent(self, event: QPaintEvent) -> None:
        layout, wave = self.layout_now, self.wave
        painter = QPainter(self)
        try:
            painter.setFont(self.font())
            paint_layout(painter, layout, self._theme, wave, self._touch(layout))
        finally:
            # A painter left open when an error passes brings the whole program down.
            painter.end()

    def _touch(self, layout: WallLayout) -> Touch:
        face, tag = self._face, ""
        if self._drag is not None:
            row, side = self._drag.face.row, self._drag.face.side
            face = next(face for face in layout.faces() if (face.row, face.side) == (row, side))
            part = layout.wall.elements[row]
            tag = part.text if self._drag.moving and isinstance(part, LayerPart) else ""
        return Touch(self._session.selection.rows, face, tag, self.hasFocus())

    # What happens elsewhere

    def _heard(self, change: Change) -> None:
        if self._drag is not None and change.initiator is not self and change.kind != "select":
            # Somebody else has changed what is in the hand.
            self._drag = None
        if change.kind == "open" or change.selection.stack != self._stack:
            self._answer, self._scale = None, None
        self._stack = change.selection.stack
        self._face = None
        if change.after.job is change.before.job:
            self._describe()
            self.update()
        elif not self._patience.isActive():
            self._patience.start(ANSWER_MS if self._drag is not None else TYPED_MS)

    def _show_now(self) -> None:
        self._describe()
        self.update()

    def _looked(self, change: ViewChange) -> None:
        self._describe()
        self.update()

    def _describe(self) -> None:
        """Say the wall in words, for those who hear it."""
        wall, wave = self._shown_wall, self.wave
        name = words.named(wall, self._session.selection.rows)
        if name != self.accessibleName():
            self.setAccessibleName(name)
        description = words.described(wall, wave.powers, wave.circumstances)
        if description != self.accessibleDescription():
            self.setAccessibleDescription(description)

    # The mouse

    def mousePressEvent(self, event: QMouseEvent) -> None:
        if event.button() != Qt.MouseButton.LeftButton or self._drag is not None:
            super().mousePressEvent(event)
            return
        x, y = event.position().x(), event.position().y()
        face = self._face_at(x, y)
        if face is not None:
            self._drag = FaceDrag(self._session, self, self.layout_now, face, x)
            self.update()
        else:
            self._click(x, y, event.modifiers())

    def mouseMoveEvent(self, event: QMouseEvent) -> None:
        x, y = event.position().x(), event.position().y()
        if self._drag is None:
            self._hover(self._face_at(x, y) if not event.buttons() else None)
            return
        was_moving = self._drag.moving
        faults = self._drag.move(x)
        if self._drag is not None and self._drag.moving and not was_moving:
            self._select((self._drag.face.row,))
        self._complain(faults)
        self.update()

    def mouseReleaseEvent(self, event: QMouseEvent) -> None:
        if event.button() != Qt.MouseButton.LeftButton or self._drag is None:
            super().mouseReleaseEvent(event)
            return
        drag, self._drag = self._drag, None
        x, y = event.position().x(), event.position().y()
        if drag.moving:
            drag.finish()
        else:
            self._click(x, y, event.modifiers())
        self._layout = None
        self._hover(self._face_at(x, y))
        self.update()

    def mouseDoubleClickEvent(self, event: QMouseEvent) -> None:
        row = tips.row_at(self.layout_now, event.position().x(), event.position().y())
        if event.button() == Qt.MouseButton.LeftButton and row is not None:
            self.edit_requested.emit(row)

    def leaveEvent(self, event: QEvent) -> None:
        if self._drag is None:
            self._hover(None)
        super().leaveEvent(event)

    def _face_at(self, x: float, y: float) -> Face | None:
        layout = self.layout_now
        if not layout.body.top <= y <= layout.body.bottom:
            return None
        face = layout.face_at(x, self._session.selection.rows)
        part = layout.wall.elements[face.row] if face is not None else None
        return None if isinstance(part, LayerPart) and part.locked else face

    def _hover(self, face: Face | None) -> None:
        if face is None:
            self.unsetCursor()
        else:
            self.setCursor(Qt.CursorShape.SplitHCursor)
        if face != self._face:
            self._face = face
            self.update()

    def _click(self, x: float, y: float, modifiers: Qt.KeyboardModifier) -> None:
        row = tips.row_at(self.layout_now, x, y)
        extend = bool(modifiers & Qt.KeyboardModifier.ShiftModifier)
        toggle = bool(modifiers & Qt.KeyboardModifier.ControlModifier)
        self._select(keys.clicked(self._session.selection.rows, row, extend=extend, toggle=toggle))

    # The keys

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if self._drag is not None and event.key() == Qt.Key.Key_Escape:
            drag, self._drag = self._drag, None
            drag.cancel()
            self._layout = None
            self.update()
            return
        if self._drag is not None or not self._take(event):
            super().keyPressEvent(event)

    def _take(self, event: QKeyEvent) -> bool:
        """Do what a key asks for; returns False for keys that mean nothing here."""
        rows, count = self._session.selection.rows, self._count
        wanted = keys.row_wanted(event.key(), event.modifiers(), rows, count)
        steps = keys.steps_wanted(event.key(), event.modifiers())
        if wanted is not None:
            self._select((wanted,))
        elif steps:
            self._nudge(steps)
        elif event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter) and rows:
            self.edit_requested.emit(rows[0])
        elif event.key() == Qt.Key.Key_Delete and rows:
            self._apply(edits.delete(self._stack, rows))
        else:
            return False
        return True

    def _nudge(self, steps: float) -> None:
        chosen = keys.nudges(self._session.record.stacks[self._stack], self._session.selection, steps)
        for edit in chosen:
            self._apply(edit)
        if not chosen:
            self._tell("Select a layer to change its thickness with + and −; a sheet has none.", "note")

    def _select(self, rows: tuple[int, ...]) -> None:
        self._session.select(Selection(self._stack, rows), self)

    def _apply(self, edit: Edit) -> None:
        self._complain(self._session.apply(edit, self))

    def _complain(self, faults: tuple[Fault, ...]) -> None:
        for fault in faults:
            self._tell(str(fault), fault.severity)

    # What Qt asks

    def event(self, event: QEvent) -> bool:
        if event.type() == QEvent.Type.ToolTip and isinstance(event, QHelpEvent):
            self._show_tip(event)
            return True
        if event.type() == QEvent.Type.ShortcutOverride and isinstance(event, QKeyEvent):
            # These keys work here, whatever the window does with them elsewhere.
            held = self._drag is not None and event.key() == Qt.Key.Key_Escape
            if held or keys.steps_wanted(event.key(), event.modifiers()):
                event.accept()
                return True
        if event.type() in (QEvent.Type.FontChange, QEvent.Type.StyleChange):
            self._layout = None
        return super().event(event)

    def _show_tip(self, event: QHelpEvent) -> None:
        layout, wave, measure = self.layout_now, self.wave, self._measure()
        written = captions(layout, rays_in(layout, wave, measure), wave, measure)
        elements = elements_by_row(self._session.job, self._stack)
        x, y = event.pos().x(), event.pos().y()
        text = tips.tip_at(layout, wave, self._solved, written, x, y, elements)
        QToolTip.showText(event.globalPos(), text, self)

    def focusInEvent(self, event: QFocusEvent) -> None:
        self.update()
        super().focusInEvent(event)

    def focusOutEvent(self, event: QFocusEvent) -> None:
        self.update()
        super().focusOutEvent(event)
