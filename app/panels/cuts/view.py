"""The plot of a cut: its curves, the flag of the present value, and what the mouse points at."""

from collections.abc import Sequence
from typing import Final

import numpy as np
from PySide6.QtCore import QPointF, Signal, SignalInstance
from PySide6.QtWidgets import QVBoxLayout, QWidget

from app.look.theme import Theme
from app.panels.curves import drawing
from app.panels.curves.legend import Legend, LegendFacts
from app.panels.curves.mark_layers import DrawnMarker, Spot
from app.panels.curves.plot import CurvePlot
from app.panels.curves.scale import FrequencyScale
from app.series.axis import quantity_axis
from app.series.curves import Curve
from app.series.cuts import Cut, best_words, point_words, where_words
from stackcore.quantities import quantity_named

EMPTY: Final = "The cut is computed while this panel is shown."


class CutView(QWidget):
    """A plot with its legend; knows the cut it shows and nothing of jobs."""

    pointed = Signal(str)
    """What is pointed at, in words; empty for nothing."""
    wanted = Signal(float)
    """A value was asked for by Ctrl and click, SI."""
    dragged = Signal(float)
    """The flag was dragged to a value, SI."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme = theme
        self._colours: tuple[str, ...] = ()
        self._flag: tuple[float, str] | None = None
        self.cut: Cut | None = None
        self.scale = FrequencyScale()
        self.legend = Legend(theme, self)
        self.plot = CurvePlot(theme, self)
        self.plot.setMinimumSize(240, 160)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(4)
        column.addWidget(self.legend)
        column.addWidget(self.plot, 1)
        hand = self.plot.hand
        hand.pointed.connect(self._point)
        hand.marker_wanted.connect(lambda at: self._ask(self.wanted, at))
        hand.marker_dragged.connect(lambda _index, at: self._ask(self.dragged, at))
        self.plot.crowding_changed.connect(self._show_legend)
        self.plot.note_layer.set_text(EMPTY)
        self._show_legend()
        self.setFocusProxy(self.plot)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.legend.set_theme(theme)
        self.plot.set_theme(theme)
        self._draw()

    def show_cut(self, cut: Cut) -> None:
        """Draw a cut; axes whose numbers mean something else follow it."""
        old, self.cut = self.cut, cut
        was, now = old.question if old is not None else None, cut.question
        if was is None or (was.quantity, was.power) != (now.quantity, now.power):
            self.plot.follows[1] = True
        if was is None or (was.over, was.low, was.high) != (now.over, now.low, now.high):
            self.plot.follows[0] = True
        self._draw()

    def set_flag(self, value: float | None, words: str = "") -> None:
        """Mark the present value (SI) of what is varied, or none."""
        self._flag = None if value is None else (value, words)
        self._draw_flag()

    def value_at(self, at: QPointF) -> float:
        """Return what stands at a pixel of the plot, SI, within the ends of the cut."""
        assert self.cut is not None
        value = self.scale.hertz(self.plot.frame().position(at.x()))
        return min(max(value, self.cut.question.low), self.cut.question.high)

    def pointed_value(self) -> float | None:
        """Return the value that the mouse points at, SI, or None."""
        spot = self.plot.pointer_layer.spot
        return None if spot is None else self.scale.hertz(spot.position)

    def _draw(self) -> None:
        cut = self.cut
        if cut is None:
            return
        self.plot.note_layer.set_text("")
        question, curves = cut.question, cut.curves
        axis = question.axis
        self.scale = FrequencyScale(axis.factor, False, axis.offset)
        self.plot.bottom_axis.set_title(axis.title)
        frequencies = np.array(question.frequencies)
        self.plot.left_axis.set_title(quantity_axis(question.quantity, frequencies, power=question.power).title)
        self._colours = drawing.colours_of(curves, self._theme, stale=False)
        drawn = drawing.draw_curves(curves, self._colours, self.scale, None)
        ends = (self.scale.position(question.low), self.scale.position(question.high))
        extent = drawing.with_ends(drawing.extent_of(curves, self.scale), *ends)
        self.plot.show_curves(drawn, drawing.end_labels(curves, drawn), extent, logarithmic=False)
        spots = drawing.worst_spots(curves, self._colours, self.scale)
        self.plot.worst_layer.set_spots(tuple(spots.values()), None)
        self._show_legend()
        self._draw_flag()
        label = quantity_named(question.quantity).label
        self.plot.setAccessibleName(f"{label} over {axis.title.partition(',')[0].lower()}")
        names = ", ".join(curve.label for curve in curves)
        self.plot.setAccessibleDescription(f"{names}, {where_words(question)}. {best_words(cut)}".strip())

    def _draw_flag(self) -> None:
        if self._flag is None or self.cut is None:
            self.plot.marker_layer.set_markers(())
            return
        value, words = self._flag
        position = self.scale.position(value)
        spots = [
            Spot(position, height, curve.colour)
            for curve in self.plot.curve_layer.curves
            for height in drawing.values_at(curve, position)
        ]
        self.plot.marker_layer.set_markers((DrawnMarker(words, position, True, tuple(spots)),))

    def _show_legend(self) -> None:
        curves: Sequence[Curve] = self.cut.curves if self.cut is not None else ()
        crowded = self.plot.end_labels.crowded and bool(curves)
        ranks: dict[int, tuple[str, str]] = {}
        for curve, colour in zip(curves, self._colours, strict=False):
            ranks.setdefault(curve.angle_rank, (curve.label.partition(" ")[2], colour))
        told = [ranks[rank] for rank in sorted(ranks)]
        sides = tuple(dict.fromkeys(curve.polarization for curve in curves))
        words, colours = tuple(word for word, _ in told), tuple(colour for _, colour in told)
        self.legend.set_facts(LegendFacts(sides, words, colours) if crowded else LegendFacts())
        self.legend.setVisible(crowded)

    def _ask(self, signal: SignalInstance, at: QPointF) -> None:
        if self.cut is not None:
            signal.emit(self.value_at(at))

    def _point(self, at: QPointF | None) -> None:
        cut, nearest, point = self.cut, None, 0
        if at is not None and cut is not None and cut.curves and cut.curves[0].x.size:
            frame, x = self.plot.frame(), cut.curves[0].x
            point = int(np.argmin(np.abs(self.scale.positions(x) - frame.position(at.x()))))
            gaps = np.array([abs(frame.down(float(curve.y[point])) - at.y()) for curve in cut.curves])
            nearest = int(np.nanargmin(gaps)) if np.isfinite(gaps).any() else None
        if cut is None or nearest is None:
            self.plot.pointer_layer.point(None)
            self.pointed.emit("")
            return
        curve = cut.curves[nearest]
        position = self.scale.position(float(curve.x[point]))
        self.plot.pointer_layer.point(Spot(position, float(curve.y[point]), self._colours[nearest]))
        self.pointed.emit(point_words(cut, curve, point))
