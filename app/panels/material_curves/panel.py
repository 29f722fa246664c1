"""The curves of the chosen materials: one quantity of each over the job's sweep, and all of them at the marker."""

from collections.abc import Sequence
from functools import partial
from typing import Final

import numpy as np
from PySide6.QtCore import QPoint, QPointF, Qt, Signal
from PySide6.QtGui import QColor, QGuiApplication, QPalette, QShowEvent
from PySide6.QtWidgets import QLabel, QPlainTextEdit, QToolButton, QToolTip, QVBoxLayout, QWidget

from app.document.session import Change, Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.curves import drawing as plotting
from app.panels.curves.commands import Command, open_menu, take_key
from app.panels.curves.mark_layers import Spot
from app.panels.curves.plot import CurvePlot
from app.panels.curves.scale import FrequencyScale
from app.panels.material_curves import drawing, words
from app.panels.materials.pieces import ink
from app.panels.sweep.field import QuietChoice, QuietSwitch
from app.panels.sweep.flow import FlowLayout
from app.series.axis import frequency_axis
from app.series.markers import add_marker, move_marker, step_marker
from app.series.material_curves import MaterialCurve, Specimen, data_table, material_curves
from app.series.material_quantities import MATERIAL_QUANTITIES, plain_number

READING_LINES: Final = 4
"""Of the values at the marker that are seen at once; the others are scrolled to."""
LEAST_HEIGHT: Final = 160
"""Pixels of the plot below which its axes would lie upon each other."""

_REACH: Final = 9.0


class MaterialCurves(QWidget):
    """The plot with its line of choices above and the readings in words below.

    Parameters
    ----------
    session
        Its sweep is what the curves cover.
    view
        Its markers stand here too and can be moved here.
    """

    pointed = Signal(str)
    """What the mouse points at, in words, for the status line; empty for nothing."""

    def __init__(self, session: Session, view: View, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme = session, view, theme
        self._specimens: tuple[Specimen, ...] = ()
        self._curves: tuple[MaterialCurve, ...] = ()
        self.scale = FrequencyScale()
        self.quantity = QuietChoice(theme, "Quantity", "What is drawn of the materials.", self)
        for name, row in MATERIAL_QUANTITIES.items():
            self.quantity.addItem(row.label, name)
            self.quantity.setItemData(self.quantity.count() - 1, row.figure.definition, Qt.ItemDataRole.ToolTipRole)
        tip = "Space {} by their ratio: a factor of ten is as far everywhere."
        self.across = QuietSwitch(theme, "Log frequency", tip.format("frequencies"), self)
        self.upward = QuietSwitch(theme, "Log values", tip.format("values"), self)
        self.copy = QToolButton(self)
        self.plot = CurvePlot(theme, self)
        self.notes = QLabel(self)
        self.readings = QPlainTextEdit(self)
        self._arrange()
        self._connect()
        self.set_theme(theme)
        self._follow_sweep()

    def _arrange(self) -> None:
        self.copy.setText("Copy data")
        self.copy.setToolTip("Put the curves on the clipboard as a table with units (Ctrl+Shift+C).")
        self.copy.setAutoRaise(True)
        self.copy.setFocusPolicy(Qt.FocusPolicy.TabFocus)
        line = QWidget(self)
        self._flow = flow = FlowLayout(line, across=12, down=2)
        for control in (self.quantity, self.across, self.upward, self.copy):
            flow.addWidget(control)
        can = Qt.TextInteractionFlag
        self.notes.setAccessibleName("Notes on the curves")
        self.notes.setWordWrap(True)
        self.notes.setTextFormat(Qt.TextFormat.PlainText)
        self.notes.setTextInteractionFlags(can.TextSelectableByMouse | can.TextSelectableByKeyboard)
        self.readings.setAccessibleName("Values at the marker")
        self.readings.setReadOnly(True)
        self.readings.setTabChangesFocus(True)
        self.readings.setFrameShape(QPlainTextEdit.Shape.NoFrame)
        self.readings.document().setDocumentMargin(0)
        self.readings.setFixedHeight(READING_LINES * self.fontMetrics().height() + 2)
        column = QVBoxLayout(self)
        column.setContentsMargins(8, 4, 4, 4)
        column.setSpacing(4)
        column.addWidget(line)
        column.addWidget(self.plot, 1)
        column.addWidget(self.notes)
        column.addWidget(self.readings)
        self.plot.setMinimumSize(160, LEAST_HEIGHT)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.plot)

    def _connect(self) -> None:
        hand = self.plot.hand
        hand.pointed.connect(self._point)
        hand.marker_wanted.connect(lambda at: self._add_marker(self._frequency_at(at)))
        hand.marker_chosen.connect(lambda index: self._view.set(self, active_marker=index))
        hand.marker_dragged.connect(self._drag_marker)
        hand.menu_wanted.connect(self._open_menu)
        self.plot.key_taken = lambda event, run: take_key(self.commands, event, run)
        self.quantity.currentIndexChanged.connect(lambda _index: self._choose_quantity())
        self.across.toggled.connect(lambda _on: self._draw())
        self.upward.toggled.connect(lambda _on: self._draw())
        self.copy.clicked.connect(lambda: self.copy_data())
        ends = (self._session.subscribe(self._heard), self._view.subscribe(lambda _change: self._draw_marks()))
        self.destroyed.connect(lambda: [end() for end in ends])

    @property
    def curves(self) -> tuple[MaterialCurve, ...]:
        """The curves shown."""
        return self._curves

    @property
    def specimens(self) -> tuple[Specimen, ...]:
        """The materials shown."""
        return self._specimens

    @property
    def commands(self) -> tuple[Command, ...]:
        """What can be done in the plot, by key and menu."""
        plot = self.plot
        return (
            Command("Show all", plot.show_all, ("A",), "Show every point, and follow the data again."),
            Command(
                "Logarithmic frequencies",
                self.across.toggle,
                ("L",),
                "Space frequencies by their ratio.",
                checked=self.across.isChecked,
                group=1,
            ),
            Command(
                "Logarithmic values",
                self.upward.toggle,
                ("V",),
                "Space values by their ratio.",
                checked=self.upward.isChecked,
                group=1,
            ),
            Command("Next quantity", lambda: self._step_quantity(1), ("PgDown",), group=2),
            Command("Quantity before", lambda: self._step_quantity(-1), ("PgUp",), group=2),
            Command("Add marker", self._add_marker, ("M", "Insert"), "Add a marker in the middle.", group=3),
            Command("Copy data", self.copy_data, ("Ctrl+Shift+C",), "Put the curves on the clipboard.", group=4),
            *(Command("", partial(self._step_marker, step), (key,)) for key, step in (("Left", -1), ("Right", 1))),
            *(Command("", partial(self._zoom, by), keys) for by, keys in ((0.8, ("+", "=")), (1.25, ("-",)))),
        )

    def add_control(self, control: QWidget) -> None:
        """Put one more control into the line above the plot."""
        self._flow.addWidget(control)

    def show_specimens(self, specimens: Sequence[Specimen]) -> None:
        """Draw these materials from now on."""
        if tuple(specimens) != self._specimens:
            self._specimens = tuple(specimens)
            self._draw()

    def show_quantity(self, name: str) -> None:
        """Draw this quantity from now on."""
        self.quantity.show_choice(name)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        plotting.fill_palette(self, theme)
        self.plot.set_theme(theme)
        for control in (self.quantity, self.across, self.upward):
            control.set_theme(theme)
        ink(self.notes, theme.warning)
        palette = self.readings.palette()
        palette.setColor(QPalette.ColorRole.Base, QColor(theme.base))
        palette.setColor(QPalette.ColorRole.Text, QColor(theme.text))
        self.readings.setPalette(palette)
        self._draw()

    def copy_data(self) -> None:
        """Put the curves on the clipboard as a table."""
        if self._curves:
            QGuiApplication.clipboard().setText(data_table(self._curves))
            count = "1 curve" if len(self._curves) == 1 else f"{len(self._curves)} curves"
            self.pointed.emit(f"Copied {count} of {self._curves[0].x.size} points.")

    # Following

    def _heard(self, change: Change) -> None:
        if change.before.record.sweep is not change.after.record.sweep:
            self._follow_sweep() if change.kind == "open" else self._draw()

    def _follow_sweep(self) -> None:
        """Begin with the scales that suit the sweep and the quantity."""
        frequency = self._session.record.sweep.frequencies()
        self.across.setChecked(drawing.first_scales(frequency, self._view.state))
        self._choose_quantity()

    def _choose_quantity(self) -> None:
        row = MATERIAL_QUANTITIES[self.quantity.currentData()]
        self.quantity.setToolTip(row.figure.definition)
        self.quantity.setAccessibleDescription(row.figure.definition)
        self.upward.setChecked(row.by_ratio)
        self.plot.follows[1] = True
        self._draw()

    def _step_quantity(self, step: int) -> None:
        self.quantity.setCurrentIndex((self.quantity.currentIndex() + step) % self.quantity.count())

    # Drawing

    def showEvent(self, event: QShowEvent) -> None:
        """Draw what has changed while nobody looked."""
        super().showEvent(event)
        self._draw()

    def _draw(self) -> None:
        if not self.isVisible():
            return
        quantity, by_ratio, log = self.quantity.currentData(), self.upward.isChecked(), self.across.isChecked()
        frequency = self._session.record.sweep.frequencies()
        self._curves = material_curves(self._specimens, quantity, frequency, by_ratio=by_ratio)
        axis = frequency_axis(frequency, log=log)
        self.scale = FrequencyScale(axis.factor, log)
        row = MATERIAL_QUANTITIES[quantity]
        unit = self._curves[0].unit if self._curves else ""
        self.plot.bottom_axis.set_title(axis.title)
        self.plot.left_axis.set_title(f"{row.label}, {unit}" if unit else row.label)
        if self.plot.left_axis.logarithmic != by_ratio:
            self.plot.left_axis.logarithmic = by_ratio
            self.plot.left_axis.spell = plain_number
            self.plot.left_axis.picture = None
            self.plot.follows[1] = True
        drawn = drawing.draw_curves(self._curves, self._theme, self.scale, by_ratio=by_ratio)
        labels = drawing.end_labels(self._curves, drawn)
        self.plot.show_curves(drawn, labels, drawing.extent_of(drawn), logarithmic=log)
        spots = drawing.crossover_spots(self._curves, self._theme, self.scale, by_ratio=by_ratio)
        self.plot.worst_layer.set_spots(spots, None)
        self.plot.note_layer.set_text("" if self._specimens else words.NOTHING_CHOSEN)
        self.plot.setAccessibleName(f"Curves of materials: {row.label}")
        self.plot.setAccessibleDescription(words.description(self._curves))
        _say(self.notes, words.notes_text(self._curves))
        self._draw_marks()

    def _draw_marks(self) -> None:
        if not self.isVisible():
            return
        state = self._view.state
        self.plot.marker_layer.set_markers(
            plotting.draw_markers(state, self.plot.curve_layer.curves, self.scale) if self._curves else ()
        )
        frequency = state.marker_frequency(self._session.record.sweep)
        text = words.readings_text(self._curves, frequency)
        if text != self.readings.toPlainText():
            self.readings.setPlainText(text)
        self.readings.setVisible(bool(text))

    # Pointing, markers, menu

    def _frequency_at(self, at: QPointF) -> float:
        return self.scale.hertz(self.plot.frame().position(at.x()))

    def _point(self, at: QPointF | None) -> None:
        found = self._nearest(at) if at is not None else None
        if at is None or found is None:
            self.plot.pointer_layer.point(None)
            self.pointed.emit("")
            return
        place, point, gap = found
        curve, drawn = self._curves[place], self.plot.curve_layer.curves[place]
        self.plot.pointer_layer.point(Spot(float(drawn.positions[point]), float(drawn.values[point]), drawn.colour))
        told = words.point_sentence(curve, point)
        self.pointed.emit(told)
        if gap <= _REACH and not curve.held[point]:
            where = (at + self.plot.area_rect().topLeft()).toPoint()
            QToolTip.showText(self.plot.mapToGlobal(where), told.replace("   ", "\n"), self.plot)
        elif QToolTip.isVisible():
            QToolTip.hideText()

    def _nearest(self, at: QPointF) -> tuple[int, int, float] | None:
        """Return the curve nearest to a pixel: its place, its point, and the pixels between."""
        frame, best = self.plot.frame(), None
        for place, curve in enumerate(self.plot.curve_layer.curves):
            point = int(np.nanargmin(np.abs(curve.positions - frame.position(at.x()))))
            if np.isfinite(curve.values[point]):
                gap = abs(frame.down(float(curve.values[point])) - at.y())
                if best is None or gap < best[2]:
                    best = (place, point, gap)
        return best

    def _add_marker(self, frequency: float | None = None) -> None:
        state, sweep = self._view.state, self._session.record.sweep
        wanted = state.marker_frequency(sweep) if frequency is None else frequency
        self._view.replace(add_marker(state, wanted, sweep.frequencies()), self)

    def _drag_marker(self, index: int, at: QPointF) -> None:
        sweep = self._session.record.sweep.frequencies()
        self._view.replace(move_marker(self._view.state, index, self._frequency_at(at), sweep), self)

    def _step_marker(self, step: int) -> None:
        state = self._view.state
        sweep = self._session.record.sweep.frequencies()
        self._view.replace(step_marker(state, state.active_marker, step, sweep), self)

    def _zoom(self, factor: float) -> None:
        frame = self.plot.frame()
        self.plot.zoom(factor, factor, QPointF(frame.width / 2, frame.height / 2))

    def _open_menu(self, _at: QPointF, place: QPoint) -> None:
        self.menu = open_menu(self.commands, self.plot, place)


def _say(label: QLabel, text: str) -> None:
    label.setText(text)
    label.setVisible(bool(text))
