"""The curves: one quantity over frequency, a curve for each angle and polarization."""

from collections.abc import Callable
from typing import TYPE_CHECKING, Final

import numpy as np
from PySide6.QtCore import QPoint, QPointF, Signal
from PySide6.QtGui import QGuiApplication, QKeyEvent
from PySide6.QtWidgets import QToolTip, QVBoxLayout, QWidget

from app.document.session import Session
from app.document.view import View, ViewChange
from app.look.pictures import Picture, clipboard_data
from app.look.theme import Theme
from app.panels.curves import drawing, words
from app.panels.curves.commands import open_menu, take_key
from app.panels.curves.copying import data_table
from app.panels.curves.header import Header
from app.panels.curves.mark_layers import Spot
from app.panels.curves.picture import plot_picture
from app.panels.curves.plot import CurvePlot
from app.panels.curves.plot_commands import PlotCommands
from app.panels.curves.scale import WIDE, FrequencyScale
from app.panels.curves.strips import Strips
from app.series.axis import frequency_axis, quantity_axis
from app.series.cases import Case, cases_of
from app.series.compared import curves_beside, curves_in_hand
from app.series.curves import Curve, takes_long
from app.series.snapping import Evaluate, evaluator
from app.series.texts import frequency_text
from app.series.validity import doubt_sentence
from app.workers.scene import scene_of
from stackcore.arrays import FloatArray
from stackcore.errors import Severity

if TYPE_CHECKING:
    from app.workers.live import Answer

Tell = Callable[[str, Severity], None]

_REACH: Final = 9.0
DRAWN: Final = (
    "quantity",
    "power",
    "log_frequency",
    "polarizations",
    "active_angle",
    "active_polarization",
    "conditions",
    "beside",
    "less",
)
"""What of the view changes curves, not only marks on them."""


class CurvesPanel(QWidget):
    """The plot with its line of words above and the typed ranges below.

    Parameters
    ----------
    session
        Whose sweep the curves cover.
    view
        What is shown and marked; markers are made, moved and removed here.
    theme
        The look.
    tell
        Says what has no place of its own.
    """

    pointed = Signal(str)
    """What the mouse or the keys point at, in words, for the status line; empty for nothing."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._answer: Answer | None = None
        self._stale = False
        self._curves: tuple[Curve, ...] = ()
        self._beside: tuple[Curve, ...] = ()
        self._colours: tuple[str, ...] = ()
        self._worst_spots: dict[int, Spot] = {}
        self._shown_as: tuple[object, ...] = ()
        self.scale = FrequencyScale()
        self.header = Header(theme, self)
        self.plot = CurvePlot(theme, self)
        self.strips = Strips(self.plot, lambda: self.scale, theme, self)
        self.commands = PlotCommands(self, view)
        self._arrange()
        self._connect()
        self.set_theme(theme)

    def _arrange(self) -> None:
        column = QVBoxLayout(self)
        column.setContentsMargins(8, 4, 4, 4)
        column.setSpacing(4)
        column.addWidget(self.header)
        column.addWidget(self.plot, 1)
        column.addWidget(self.strips)
        self.setAutoFillBackground(True)
        self.setMinimumSize(240, 160)
        self.setFocusProxy(self.plot)

    def _connect(self) -> None:
        hand = self.plot.hand
        hand.pointed.connect(self._point)
        hand.clicked.connect(self._choose_curve)
        hand.marker_wanted.connect(lambda at: self.commands.add_marker(self.frequency_at(at)))
        hand.marker_chosen.connect(lambda index: self._view.set(self, active_marker=index))
        hand.marker_dragged.connect(lambda index, at: self.commands.move_marker(index, self.frequency_at(at)))
        hand.menu_wanted.connect(self._open_menu)
        hand.range_wanted.connect(self.strips.type_range)
        self.plot.key_taken = self._take_key
        self.plot.ranges_changed.connect(self._ranges_moved)
        self.plot.crowding_changed.connect(self._show_legend)
        self.header.marker_wanted.connect(lambda: self.commands.add_marker(self.commands.place()))
        self.strips.level.wanted.connect(self.commands.to_level)
        leave = self._view.subscribe(self._view_changed)
        self.destroyed.connect(lambda: leave())

    # What the window calls

    def show_answer(self, answer: "Answer") -> None:
        """Draw the curves of an answer."""
        self._answer = answer
        self._draw()

    def set_stale(self, stale: bool) -> None:
        """Say whether the curves belong to an earlier job, because the present one cannot be computed."""
        if stale != self._stale:
            self._stale = stale
            self.header.set_stale(stale)
            self._draw()

    def set_busy(self, busy: bool) -> None:
        """Say whether a newer answer is being computed; shown only when it takes longer than a moment."""
        self.header.set_busy(busy)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        drawing.fill_palette(self, theme)
        self.header.set_theme(theme)
        self.strips.set_theme(theme)
        self.plot.set_theme(theme)
        self._draw()

    # What others ask

    @property
    def curves(self) -> tuple[Curve, ...]:
        """The curves shown."""
        return self._curves

    @property
    def sweep(self) -> FloatArray:
        """The frequencies of the curves in Hz; those of the job while there are none."""
        return self._curves[0].x if self._curves else self._session.record.sweep.frequencies()

    def frequency_at(self, at: QPointF) -> float:
        """Return the frequency of the sweep nearest to a pixel of the plot area, in Hz."""
        places = self.scale.positions(self.sweep)
        wanted = self.plot.frame().position(at.x())
        return float(self.sweep[int(np.nanargmin(np.abs(places - wanted)))])

    @property
    def curve_in_hand(self) -> Curve | None:
        """The chosen curve, or the first; None while there are none."""
        return self._curves[drawing.chosen_index(self._curves, self._view.state) or 0] if self._curves else None

    def between_points(self, curve: Curve) -> Evaluate | None:
        """Return what solves a curve between its points, or None for what is no curve of the stack in hand."""
        if self._answer is None or self._stale:
            return None
        return evaluator(self._answer.response.stack, curve, self._view.state.power)

    def visible_values(self) -> tuple[float, float] | None:
        """Return the smallest and largest value between the visible frequencies, or None."""
        frame = self.plot.frame()
        found = []
        for curve in self.plot.curve_layer.curves:
            inside = (curve.positions >= frame.left) & (curve.positions <= frame.right)
            found.append(curve.values[inside & np.isfinite(curve.values)])
        values = np.concatenate(found) if found else np.zeros(0)
        return (float(values.min()), float(values.max())) if len(values) else None

    def values_at(self, hertz: float) -> tuple[str, ...]:
        """Return the reading of the chosen curve, or of the first, at the nearest frequency, in words."""
        curve = self.curve_in_hand
        if curve is None:
            return ()
        point = int(np.argmin(np.abs(curve.x - hertz)))
        return words.value_words(curve, point)

    def copy_data(self) -> None:
        """Put the curves on the clipboard as a table."""
        curves = (*self._curves, *self._beside)
        if curves:
            QGuiApplication.clipboard().setText(data_table(curves))
            self.pointed.emit(f"Copied {len(curves)} curves of {len(curves[0].x)} points.")

    def picture(self) -> Picture:
        """Return the plot as it stands, in the light look, with the stack's name and the worst point above."""
        stack = self._session.record.stacks[self._session.selection.stack].name
        heading = f"{stack}: {drawing.quantity_label(self._view.state)}"
        return plot_picture(self.plot, heading, words.worst_sentence(self._curves), self.set_theme, self._theme)

    def copy_picture(self) -> None:
        """Put the plot on the clipboard as a picture in pixels and as a drawing, in the light look."""
        QGuiApplication.clipboard().setMimeData(clipboard_data(self.picture()))
        self.pointed.emit("Copied the plot as a picture.")

    def say(self, text: str) -> None:
        """Put words into the status line."""
        self.pointed.emit(text)

    # Drawing

    def _view_changed(self, change: ViewChange) -> None:
        if self._answer is not None and takes_long(self._answer.response, change.after.quantity):
            return  # it is being worked out elsewhere and comes as an answer
        if self._answer is not None and any(case not in self._answer.compared for case in self._cases()):
            return  # what is compared comes with the next answer
        if any(getattr(change.before, name) != getattr(change.after, name) for name in DRAWN):
            self._draw()
        else:
            self._draw_marks()

    def _draw(self) -> None:
        state = self._view.state
        scene = scene_of(self._session.record, self._answer) if self._answer is not None else None
        self._curves = curves_in_hand(scene, state) if scene is not None else ()
        self._beside = curves_beside(scene, state) if scene is not None else ()
        curves = (*self._curves, *self._beside)
        self._colours = drawing.colours_of(curves, self._theme, stale=self._stale)
        across = frequency_axis(self.sweep, log=state.log_frequency)
        upward = quantity_axis(state.quantity, self.sweep, power=state.power)
        self.strips.set_units(across.unit, upward.unit)
        self.scale = FrequencyScale(across.factor, state.log_frequency)
        wide = state.log_frequency and float(self.sweep.max()) > float(self.sweep.min()) * WIDE
        self.plot.bottom_axis.spell = self._spell if wide else None
        self.plot.bottom_axis.set_title("Frequency" if wide else across.title)
        less = self._curves[0].less if self._curves else ""
        self.plot.left_axis.set_title(f"Difference: {upward.title}" if less else upward.title)
        shown_as = (state.quantity, state.power, less, across.unit, state.log_frequency)
        # Where other numbers stand at an axis, a range of the old ones would show nothing: follow the new.
        self.plot.follows[0] |= shown_as[3:] != self._shown_as[3:]
        self.plot.follows[1] |= shown_as[:3] != self._shown_as[:3]
        self._shown_as = shown_as
        chosen = drawing.chosen_index(self._curves, state)
        drawn = drawing.draw_curves(curves, self._colours, self.scale, chosen)
        self.plot.show_curves(
            drawn,
            drawing.end_labels(curves, drawn),
            drawing.extent_of(curves, self.scale),
            logarithmic=state.log_frequency,
        )
        self._draw_marks()
        self._speak()

    def _spell(self, value: float) -> str:
        return frequency_text(value / self.scale.factor)

    def _draw_marks(self) -> None:
        state = self._view.state
        self._worst_spots = drawing.worst_spots(self._curves, self._colours, self.scale)
        shown = self._worst_spots if state.worst_shown else {}
        worst = words.worst_curve(self._curves)
        order = list(shown)
        self.plot.worst_layer.set_spots(tuple(shown.values()), order.index(worst) if worst in shown else None)
        markers = drawing.draw_markers(state, self.plot.curve_layer.curves, self.scale)
        self.plot.marker_layer.set_markers(markers)

    def _speak(self) -> None:
        state, curves = self._view.state, self._curves
        label = drawing.quantity_label(state)
        self.header.set_worst(words.worst_sentence(curves))
        empty = words.empty_sentence(state.quantity, curves)
        self.header.set_hidden("" if empty else words.hidden_sentence(curves))
        doubt = doubt_sentence(self._session.job, curves[0].doubts) if curves else ""
        self.header.set_doubt(doubt)
        self._show_legend()
        self.plot.note_layer.set_text(empty)
        beside = f" Beside: {', '.join(dict.fromkeys(one.stack for one in self._beside))}." if self._beside else ""
        said = words.description(curves) + beside + (f" Dotted where {doubt}." if doubt else "")
        self.plot.setAccessibleName(f"Curves of {label.lower()}")
        self.plot.setAccessibleDescription(f"{'Last good result. ' if self._stale else ''}{empty} {said}".strip())

    def _show_legend(self) -> None:
        curves, crowded = (*self._curves, *self._beside), self.plot.end_labels.crowded
        facts = drawing.legend_facts(curves, self._colours, self._view.state, crowded=crowded)
        self.header.legend.set_facts(facts)
        self.header.legend.setVisible(bool(self._curves) and bool(facts))

    def _cases(self) -> tuple[Case, ...]:
        return cases_of(self._session.record, self._session.selection.stack, self._view.state)

    # Pointing and choosing

    def _nearest(self, at: QPointF) -> tuple[int, int, float] | None:
        """Return the curve nearest to a pixel: its index, the index of its point, and the pixels between."""
        frame, best = self.plot.frame(), None
        places = self.scale.positions(self.sweep)
        point = int(np.nanargmin(np.abs(places - frame.position(at.x()))))
        for index, curve in enumerate((*self._curves, *self._beside)):
            if np.isfinite(curve.y[point]):
                gap = abs(frame.down(float(curve.y[point])) - at.y())
                if best is None or gap < best[2]:
                    best = (index, point, gap)
        return best

    def _point(self, at: QPointF | None) -> None:
        found = self._nearest(at) if at is not None and self._curves else None
        if at is None or found is None:
            self.plot.pointer_layer.point(None)
            self.pointed.emit("")
            return
        index, point, _ = found
        curve = (*self._curves, *self._beside)[index]
        spot = Spot(self.scale.position(float(curve.x[point])), float(curve.y[point]), self._colours[index])
        self.plot.pointer_layer.point(spot)
        guess = doubt_sentence(self._session.job, curve.doubts, point)
        self.pointed.emit("   ".join(part for part in (words.point_sentence(curve, point), guess) if part))
        self._hint(at, f"Dotted: {guess}." if guess and found[2] <= _REACH else "")

    def _hint(self, at: QPointF, guess: str) -> None:
        """Say the worst point under the mouse in a tooltip, and why the curve there is dotted."""
        frame = self.plot.frame()
        told = [guess] if guess else []
        for index, spot in self._worst_spots.items():
            gap = QPointF(frame.across(spot.position), frame.down(spot.value)) - at
            if self._view.state.worst_shown and gap.manhattanLength() <= _REACH:
                told.insert(0, words.curve_sentence(self._curves[index]))
                break
        if told:
            place = (at + self.plot.area_rect().topLeft()).toPoint()
            QToolTip.showText(self.plot.mapToGlobal(place), "\n".join(told), self.plot)
        elif QToolTip.isVisible():
            QToolTip.hideText()

    def _choose_curve(self, at: QPointF) -> None:
        found = self._nearest(at)
        if found is not None and found[2] <= _REACH and found[0] < len(self._curves):
            self.choose_curve(found[0])

    def choose_curve(self, index: int) -> None:
        """Let the wall drawing show the angle and polarization of a curve."""
        shown = len(self._view.state.polarizations)
        curve = self._curves[index]
        self._view.set(self, active_angle=index // shown, active_polarization=curve.polarization)
        self.pointed.emit(words.curve_sentence(curve))

    # Menu, keys and ranges

    def _open_menu(self, at: QPointF, place: QPoint) -> None:
        self.commands.remember(at)
        self.menu = open_menu(self.commands.table, self.plot, place)

    def _take_key(self, event: QKeyEvent, run: bool) -> bool:
        return take_key(self.commands.table, event, run)

    def _ranges_moved(self) -> None:
        self.plot.pointer_layer.point(None)
