"""The panel of cuts: curves over the angle, a thickness or a constant, and the value that is best."""

from collections.abc import Callable, Sequence
from typing import Final

import numpy as np
from PySide6.QtCore import QPoint, QPointF, Signal
from PySide6.QtGui import QGuiApplication, QHideEvent, QShowEvent
from PySide6.QtWidgets import QHBoxLayout, QLabel, QVBoxLayout, QWidget

from app.document import edits
from app.document.session import Change, Session
from app.document.view import View, ViewChange, ViewState
from app.look.pictures import Picture, clipboard_data
from app.look.theme import Theme
from app.panels.curves import drawing
from app.panels.curves.commands import Command, open_menu, take_key
from app.panels.curves.picture import plot_picture
from app.panels.cuts.copying import data_table
from app.panels.cuts.ends import EndFields
from app.panels.cuts.view import CutView
from app.panels.materials.pieces import Line, button, ink
from app.panels.sweep.field import QuietChoice
from app.panels.sweep.flow import FlowLayout
from app.series.cuts import (
    Cut,
    CutQuestion,
    Where,
    best_words,
    cut_question,
    where_words,
)
from app.series.shown import shown
from app.series.texts import angle_text, frequency_text
from app.series.variation_axis import variation_at
from app.workers.batch import BatchEnd, BatchFailure, BatchLane, BatchStep
from stackcore.errors import Severity
from stackcore.job import Job
from stackcore.quantities import quantity_named
from stackcore.studies import variations_of

Tell = Callable[[str, Severity], None]

ANGLE: Final = "the angle of incidence"
OVER_TIP: Final = "What runs along the axis: the angle, or a thickness, sheet part or constant of this stack."
WHERE_TIP: Final = "At the marker, or at the frequency of the sweep where each value is worst."
BEST_TIP: Final = "Give the stack the value at which the worst of the curves is best (B)."
_STEP_KEYS: Final = {"Left": -1, "Right": 1, "Ctrl+Left": -10, "Ctrl+Right": 10}


class CutsPanel(QWidget):
    """Curves of the quantity and polarizations that the view shows; they follow every edit while it is shown.

    What is varied stands as a flag in the plot: dragging it changes the stack, one step of undo for the whole way.

    Parameters
    ----------
    session, view
        The job, and what is looked at.
    tell
        Says why a cut cannot be computed, or a value not be taken.
    """

    pointed = Signal(str)
    """What is pointed at, in words, for the status line."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._over = ""
        self._where: Where = "marker"
        self._asked: CutQuestion | None = None
        self._place: float | None = None
        self.live_busy: Callable[[], bool] = lambda: False
        self._lane = BatchLane(lambda: self.live_busy(), self)
        self.over = QuietChoice(theme, "Over", OVER_TIP, self)
        self.where = QuietChoice(theme, "At", WHERE_TIP, self)
        self.ends = EndFields(theme, self._ask, self)
        self.copy = button(self, "Copy data", "Put the curves on the clipboard as a table.", self.copy_data)
        self.cut_view = CutView(theme, self)
        self.plot = self.cut_view.plot
        self.state, self.best = QLabel(self), Line(self)
        self.take_best = button(self, "Take it", BEST_TIP, self.to_best)
        self.commands = self._commands()
        self._words: list[QLabel] = []
        self._arrange()
        self._connect()
        self.set_theme(theme)

    # What others ask

    @property
    def shown(self) -> Cut | None:
        """The cut of now, as far as it is computed."""
        return self.cut_view.cut

    @property
    def asked(self) -> CutQuestion | None:
        """What is or was computed last; None while the panel is hidden."""
        return self._asked

    def choose_over(self, path: str) -> None:
        """Vary another number: the path of a variation, or nothing for the angle."""
        self._over = path
        self.plot.follows = [True, True]
        self._ask()

    def choose_where(self, where: Where) -> None:
        """Show the curves at the marker, or at the worst of the band."""
        self._where = where
        self._ask()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        drawing.fill_palette(self, theme)
        for control in (self.over, self.where, *self.ends.fields):
            control.set_theme(theme)
        for label in (self.state, *self._words):
            ink(label, theme.muted)
        ink(self.best, theme.text)
        self.cut_view.set_theme(theme)

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
        """Return the cut as it stands, in the light look."""
        stack = self._session.record.stacks[self._session.selection.stack].name
        note = "" if self.shown is None else where_words(self.shown.question)
        heading = f"{stack}: {quantity_named(self._view.state.quantity).label}"
        return plot_picture(self.plot, heading, f"{note[:1].upper()}{note[1:]}", self.set_theme, self._theme)

    def copy_picture(self) -> None:
        """Put the cut on the clipboard as a picture."""
        QGuiApplication.clipboard().setMimeData(clipboard_data(self.picture()))
        self.pointed.emit("Copied the cut as a picture.")

    def copy_data(self) -> None:
        """Put the curves on the clipboard as a table, full precision."""
        if self.shown is not None and self.shown.curves:
            record = self._session.record
            stack = record.stacks[self._session.selection.stack].name
            QGuiApplication.clipboard().setText(data_table(self.shown, record.title, stack))
            self.pointed.emit(f"Copied {len(self.shown.curves)} curves of {self.shown.curves[0].x.size} points.")

    def to_best(self) -> None:
        """Give the stack the value at which the worst of the curves is best."""
        best = self.shown.best() if self.shown is not None and self.shown.share == 1 else None
        if best is not None:
            self.take(best[0])

    def take(self, value: float, *, going_on: bool = False) -> None:
        """Give the stack a value of what is varied (SI), or the view the nearest angle of the sweep.

        Parameters
        ----------
        going_on
            Whether it is a drag or a step by key, which become one step of undo.
        """
        job, stack = self._session.job, self._session.selection.stack
        variation = variation_at(job, stack, self._over)
        if variation is None:
            nearest = int(np.argmin(np.abs(job.sweep.angles() - value)))
            self._view.set(self, active_angle=nearest)
            return
        key = ("cut", self._over) if going_on else None
        for fault in self._session.apply(edits.take_value(variation, value, merge_key=key), self):
            self._tell(str(fault), fault.severity)
        if not going_on:
            self._session.end_merge()

    def showEvent(self, event: QShowEvent) -> None:
        """Begin to compute; over the thickness of the selected element, until something else was chosen."""
        super().showEvent(event)
        selection = self._session.selection
        if not self._over and self.shown is None and selection.rows:
            self._over = f"stacks[{selection.stack}].elements[{selection.rows[0]}].thickness"
        self._ask()

    def hideEvent(self, event: QHideEvent) -> None:
        """Compute nothing that nobody sees."""
        self._lane.cancel()
        self._asked = None
        super().hideEvent(event)

    # Making

    def _arrange(self) -> None:
        head = QWidget(self)
        flow = FlowLayout(head, across=8, down=2)
        low, high = self.ends.fields
        self._words = [QLabel(word, head) for word in ("Over", "from", "to")]
        over, start, stop = self._words
        groups = ((over, self.over), (start, low, stop, high), (self.where,), (self.copy,))
        for parts in groups:
            flow.addWidget(_side_by_side(head, parts))
        foot = QHBoxLayout()
        foot.setContentsMargins(0, 0, 0, 0)
        foot.addWidget(self.best, 1)
        foot.addWidget(self.take_best)
        foot.addWidget(self.state)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(8, 4, 4, 4)
        whole.setSpacing(4)
        whole.addWidget(head)
        whole.addWidget(self.cut_view, 1)
        whole.addLayout(foot)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.cut_view)

    def _connect(self) -> None:
        self.over.activated.connect(lambda _index: self.choose_over(str(self.over.currentData())))
        self.where.activated.connect(
            lambda _index: self.choose_where("band" if self.where.currentData() == "band" else "marker")
        )
        hand = self.plot.hand
        self.cut_view.pointed.connect(self.pointed)
        self.cut_view.wanted.connect(self.take)
        self.cut_view.dragged.connect(lambda value: self.take(value, going_on=True))
        hand.marker_dropped.connect(self._session.end_merge)
        hand.menu_wanted.connect(self._open_menu)
        hand.range_wanted.connect(self._type_range)
        self.plot.key_taken = lambda event, run: take_key(self.commands, event, run)
        self._lane.stepped.connect(self._take_step)
        self._lane.ended.connect(self._finish)
        self._lane.failed.connect(self._fail)
        leave = (self._session.subscribe(self._edited), self._view.subscribe(self._looked))
        self.destroyed.connect(lambda: [end() for end in leave])

    def _commands(self) -> tuple[Command, ...]:
        def best() -> bool:
            return bool(self.best.text())

        def stepping(steps: int) -> Command:
            key = next(name for name, by in _STEP_KEYS.items() if by == steps)
            return Command("", lambda: self._step(steps), (key,))

        return (
            Command("Show all", self._show_all, ("A",), "Show the whole cut, and follow the data again."),
            Command("Type the ends…", lambda: self._type_range("bottom"), ("R",), "Type the ends of the cut."),
            Command("Take this value", self._take_here, ("T",), "Give the stack the value pointed at.", group=1),
            Command("Take the best value", self.to_best, ("B",), BEST_TIP, enabled=best, group=1),
            Command("Copy picture", self.copy_picture, ("Ctrl+C",), "Put the cut on the clipboard.", group=2),
            Command("Copy data", self.copy_data, ("Ctrl+Shift+C",), "Put the curves on the clipboard.", group=2),
            *(stepping(steps) for steps in _STEP_KEYS.values()),
            Command("", lambda: self._zoom(0.8), ("+", "=")),
            Command("", lambda: self._zoom(1.25), ("-",)),
        )

    # Asking

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
        job, stack, state = self._session.job, self._session.selection.stack, self._view.state
        offered = variations_of(job, stack)
        if self._over and self._over not in [one.path for one in offered]:
            self._over = ""
        _offer(self.over, [("", ANGLE), *((one.path, one.label) for one in offered)], self._over)
        self._offer_where(job, state)
        ends = self.ends.follow(job, stack, self._over)
        question = cut_question(job, stack, state, self._over, ends, self._where)
        if question != self._asked:
            self._asked = question
            self._lane.ask(question.study())
        self._draw_flag()

    def _offer_where(self, job: Job, state: ViewState) -> None:
        worst = shown(state.quantity).worst is not None
        several = not self._over and len(state.markers) > 1
        marker = "at the markers" if several else f"at {frequency_text(state.marker_frequency(job.sweep))}"
        choices = [("marker", marker), *([("band", "worst of the band")] if worst else [])]
        _offer(self.where, choices, self._where if worst else "marker")

    def _take_step(self, step: BatchStep) -> None:
        cut = step.value
        if self._asked is None or not isinstance(cut, Cut):
            return
        whole = cut.share == 1
        self.state.setText("" if whole else f"{cut.share:.0%}")
        old = self.shown
        # While a value is dragged, whole curves of a moment ago say more than the first part of the new ones.
        if whole or old is None or not old.question.same_axis(cut.question):
            self._show(cut)

    def _finish(self, end: BatchEnd) -> None:
        if end.cancelled:
            self.state.setText("Not finished")

    def _fail(self, failure: BatchFailure) -> None:
        self.state.setText("Not computed")
        for fault in failure.faults[:1]:
            self._tell(f"The cut cannot be computed: {fault}", "warning")

    def _show(self, cut: Cut) -> None:
        self.cut_view.show_cut(cut)
        self.best.setText(best_words(cut))
        self.take_best.setVisible(bool(self.best.text()))
        self._draw_flag()

    def _draw_flag(self) -> None:
        """Mark the present value of what is varied."""
        cut, job, stack = self.shown, self._session.job, self._session.selection.stack
        if cut is None or cut.question.over != self._over:
            self.cut_view.set_flag(None)
            return
        variation = variation_at(job, stack, self._over)
        if variation is None:
            angle = self._view.state.marker_angle(job.sweep)
            self.cut_view.set_flag(angle, angle_text(angle))
        else:
            self.cut_view.set_flag(variation.value, cut.question.words(variation.value))

    # Taking

    def _take_here(self) -> None:
        """Take the value the menu was opened at, or the one the mouse points at."""
        place, self._place = self._place, None
        place = self.cut_view.pointed_value() if place is None else place
        if place is None:
            self.pointed.emit("Point at a value first, or step with the arrow keys.")
        else:
            self.take(place)

    def _step(self, steps: int) -> None:
        """Move the present value along the axis of the cut by key."""
        cut = self.shown
        if cut is None or cut.question.over != self._over:
            return
        job, stack = self._session.job, self._session.selection.stack
        variation = variation_at(job, stack, self._over)
        if variation is None:
            order = np.argsort(job.sweep.angles(), kind="stable")
            at = int(np.flatnonzero(order == min(self._view.state.active_angle, order.size - 1))[0])
            self._view.set(self, active_angle=int(order[min(max(at + steps, 0), order.size - 1)]))
            return
        values = cut.question.values()
        wanted = variation.value + steps * float(values[1] - values[0])
        self.take(min(max(wanted, cut.question.low), cut.question.high), going_on=True)
        self.pointed.emit(cut.question.words(variation.value))

    def _show_all(self) -> None:
        self.ends.widen()
        self.plot.show_all()

    def _zoom(self, factor: float) -> None:
        frame = self.plot.frame()
        self.plot.zoom(factor, factor, QPointF(frame.width / 2, frame.height / 2))

    def _type_range(self, axis: str) -> None:
        field = self.ends.low
        field.setFocus()
        field.selectAll()

    def _open_menu(self, at: QPointF, place: QPoint) -> None:
        self._place = self.cut_view.value_at(at) if self.shown is not None else None
        self.menu = open_menu(self.commands, self.plot, place)


def _side_by_side(owner: QWidget, parts: Sequence[QWidget]) -> QWidget:
    """Return the parts in one widget, so that a line never breaks between them."""
    group = QWidget(owner)
    row = QHBoxLayout(group)
    row.setContentsMargins(0, 0, 0, 0)
    row.setSpacing(6)
    for part in parts:
        row.addWidget(part)
    return group


def _offer(choice: QuietChoice, entries: Sequence[tuple[str, str]], now: str) -> None:
    present = [(choice.itemData(place), choice.itemText(place)) for place in range(choice.count())]
    if present != list(entries):
        choice.clear()
        for data, label in entries:
            choice.addItem(label, data)
    choice.show_choice(now)
