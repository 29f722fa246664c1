"""The complex plane: how reflection, transmission or input impedance move as the frequency runs."""

from collections.abc import Callable
from typing import TYPE_CHECKING, Final

import numpy as np
from PySide6.QtCore import QPoint, QPointF, Signal
from PySide6.QtGui import QGuiApplication, QShowEvent
from PySide6.QtWidgets import QLabel, QVBoxLayout, QWidget

from app.document.session import Session
from app.document.view import View, ViewChange
from app.look.colour import mix
from app.look.pictures import Picture, clipboard_data
from app.look.theme import Theme, curve_colour, dashes
from app.panels.curves import drawing
from app.panels.curves.commands import Command, open_menu, take_key
from app.panels.curves.legend import Legend, LegendFacts
from app.panels.curves.picture import plot_picture
from app.panels.curves.plot import CurvePlot, Extent
from app.panels.materials.pieces import button, ink
from app.panels.plane.layer import DrawnPath, PlaneLayer, PlaneMark
from app.panels.sweep.field import QuietChoice, QuietSwitch
from app.panels.sweep.flow import FlowLayout
from app.series.curves import takes_long
from app.series.markers import step_marker
from app.series.plane import PLANES, PlaneCurve, data_table, plane_curves, plane_extent, point_words
from app.series.texts import angle_text
from stackcore.errors import Severity

if TYPE_CHECKING:
    from app.workers.live import Answer

Tell = Callable[[str, Severity], None]

SHOW_TIP: Final = "What is drawn: reflection or transmission coefficient, or the input impedance."
GRID_TIP: Final = "Circles of constant resistance and reactance, as shares of the impedance of the incident wave."
EMPTY: Final = "No curve: the polarizations shown have no such number here."
WAITING: Final = "The plane is drawn with the first result."
LATE: Final = "Too many points for the input impedance: fewer frequencies or angles."
FADED: Final = 0.72
_COLOURS: Final = {
    "reflection": "reflectance",
    "transmission": "transmittance",
    "impedance": "input_impedance_ohm",
}


class ExactExtent(Extent):
    """An extent whose values are not rounded outward, so that both axes keep the same scale."""

    __slots__ = ()

    def values(self, low: float, high: float) -> tuple[float, float]:
        """Return just what is given."""
        return low, high


def even(
    extent: tuple[float, float, float, float], width: float, height: float
) -> tuple[float, float, float, float]:
    """Return an extent that holds the given one (left, right, low, high) and is as long a pixel both ways.

    Examples
    --------
    >>> even((-1.0, 1.0, -1.0, 1.0), 100.0, 200.0)
    (-1.0, 1.0, -2.0, 2.0)
    """
    left, right, low, high = extent
    scale = max((right - left) / max(width, 1.0), (high - low) / max(height, 1.0))
    wide, tall = (scale * max(width, 1.0) - (right - left)) / 2, (scale * max(height, 1.0) - (high - low)) / 2
    return left - wide, right + wide, low - tall, high + tall


class PlanePanel(QWidget):
    """Curves of a complex number for the angles and polarizations the view shows, with the markers upon them.

    A small ring is at the lowest frequency of each curve, an arrow at the highest.

    Parameters
    ----------
    session, view
        The job, and what is looked at; markers are stepped here.
    """

    pointed = Signal(str)
    """What is pointed at, in words, for the status line."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._answer: Answer | None = None
        self._stale = False
        self._drawn_as = ""
        self.curves: tuple[PlaneCurve, ...] = ()
        self.choice = QuietChoice(theme, "Shown", SHOW_TIP, self)
        for key, plane in PLANES.items():
            self.choice.addItem(plane.label, key)
        self.grid = QuietSwitch(theme, "impedance grid", GRID_TIP, self)
        self.copy = button(self, "Copy data", "Put the curves on the clipboard as a table.", self.copy_data)
        self.legend = Legend(theme, self)
        self.plot = CurvePlot(theme, self)
        self.layer = PlaneLayer(self.plot.area, 15.0, theme)
        self.note = QLabel(self)
        self.commands = self._commands()
        self._arrange()
        self._connect()
        self.set_theme(theme)

    @property
    def plane(self) -> str:
        """Key of what is drawn."""
        return str(self.choice.currentData())

    def show_answer(self, answer: "Answer") -> None:
        """Draw an answer."""
        self._answer = answer
        self._draw()

    def set_stale(self, stale: bool) -> None:
        """Say whether the curves belong to an earlier job."""
        self._stale = stale
        self._draw()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = self.layer.theme = theme
        drawing.fill_palette(self, theme)
        for control in (self.choice, self.grid, self.legend):
            control.set_theme(theme)
        ink(self.note, theme.muted)
        self.plot.set_theme(theme)
        self._draw()

    def picture(self) -> Picture:
        """Return the plane as it stands, in the light look."""
        stack = self._session.record.stacks[self._session.selection.stack].name
        heading = f"{stack}: {PLANES[self.plane].label.lower()}"
        return plot_picture(self.plot, heading, self.note.text(), self.set_theme, self._theme)

    def copy_picture(self) -> None:
        """Put the plane on the clipboard as a picture."""
        QGuiApplication.clipboard().setMimeData(clipboard_data(self.picture()))
        self.pointed.emit("Copied the plane as a picture.")

    def copy_data(self) -> None:
        """Put the curves on the clipboard as a table."""
        if self.curves:
            QGuiApplication.clipboard().setText(data_table(self.curves, self.plane))
            self.pointed.emit(f"Copied {len(self.curves)} curves of {self.curves[0].frequency.size} points.")

    def showEvent(self, event: QShowEvent) -> None:
        """Draw what has come meanwhile."""
        super().showEvent(event)
        self._draw()

    def _arrange(self) -> None:
        head = QWidget(self)
        flow = FlowLayout(head, across=12, down=2)
        for part in (self.choice, self.grid, self.copy):
            flow.addWidget(part)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(8, 4, 4, 4)
        whole.setSpacing(4)
        whole.addWidget(head)
        whole.addWidget(self.legend)
        whole.addWidget(self.plot, 1)
        whole.addWidget(self.note)
        self.plot.setMinimumSize(240, 200)
        self.note.setWordWrap(True)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.plot)

    def _connect(self) -> None:
        self.choice.currentIndexChanged.connect(lambda _index: self._draw())
        self.grid.toggled.connect(lambda _on: self._draw())
        hand = self.plot.hand
        hand.pointed.connect(self._point)
        hand.menu_wanted.connect(self._open_menu)
        self.plot.key_taken = lambda event, run: take_key(self.commands, event, run)
        self.plot.area.sigResized.connect(self._resized)
        leave = self._view.subscribe(self._looked)
        self.destroyed.connect(lambda: leave())

    def _commands(self) -> tuple[Command, ...]:
        plot = self.plot
        return (
            Command("Show all", plot.show_all, ("A",), "Show the whole plane, and follow the data again."),
            Command("Impedance grid", self.grid.toggle, ("G",), GRID_TIP, checked=self.grid.isChecked, group=1),
            Command("Next number", self._next, ("PgDown",), "Reflection, transmission, input impedance.", group=1),
            Command("Copy picture", self.copy_picture, ("Ctrl+C",), "Put the plane on the clipboard.", group=2),
            Command("Copy data", self.copy_data, ("Ctrl+Shift+C",), "Put the curves on the clipboard.", group=2),
            Command("", lambda: self._step(-1), ("Left",)),
            Command("", lambda: self._step(1), ("Right",)),
            Command("", lambda: self._step(-10), ("Ctrl+Left",)),
            Command("", lambda: self._step(10), ("Ctrl+Right",)),
            Command("", lambda: self._zoom(0.8), ("+", "=")),
            Command("", lambda: self._zoom(1.25), ("-",)),
        )

    def _looked(self, change: ViewChange) -> None:
        self._draw()

    def _draw(self) -> None:
        if not self.isVisible():
            return
        plane, row, state = self.plane, PLANES[self.plane], self._view.state
        response = self._answer.response if self._answer is not None else None
        late = response is not None and takes_long(response, row.real)
        self.curves = plane_curves(response, state, plane) if response is not None and not late else ()
        self.grid.setVisible(row.bounded)
        colours = [
            curve_colour(self._theme, _COLOURS[plane], curve.angle_rank, curve.angle_count) for curve in self.curves
        ]
        if self._stale:
            colours = [mix(colour, self._theme.stale, FADED) for colour in colours]
        chosen = self._chosen()
        paths = [
            DrawnPath(curve.values, colour, dashes(curve.polarization), curve is chosen, bool(curve.held.all()))
            for curve, colour in zip(self.curves, colours, strict=True)
        ]
        self.layer.font = self.plot.marker_layer.font
        gridded = row.bounded and self.grid.isChecked()
        self.layer.show_paths(paths, self._marks(), bounded=not row.unit, impedances=gridded)
        self._fit(plane)
        unit = f", {row.unit}" if row.unit else ""
        self.plot.bottom_axis.set_title(f"Real part of {row.symbol}{unit}")
        self.plot.left_axis.set_title(f"Imaginary part of {row.symbol}{unit}")
        note = LATE if late else WAITING if response is None else "" if self.curves else EMPTY
        self.plot.note_layer.set_text(note)
        self._speak(colours)

    def _resized(self, *_: object) -> None:
        if self.isVisible() and any(self.plot.follows):
            self._fit(self.plane)

    def _fit(self, plane: str) -> None:
        if plane != self._drawn_as:
            self.plot.follows = [True, True]
            self._drawn_as = plane
        frame = self.plot.frame()
        extent = even(plane_extent(self.curves, plane), frame.width, frame.height)
        self.plot.show_curves((), (), ExactExtent(*extent), logarithmic=False)

    def _speak(self, colours: list[str]) -> None:
        response = self._answer.response if self._answer is not None else None
        sides = tuple(dict.fromkeys(curve.polarization for curve in self.curves))
        if response is None or not self.curves:
            self.legend.set_facts(LegendFacts())
        else:
            angles = np.sort(response.angle).tolist()
            told = {curve.angle_rank: colour for curve, colour in zip(self.curves, colours, strict=True)}
            ranks = sorted(told)
            texts = tuple(angle_text(angles[rank]) for rank in ranks)
            self.legend.set_facts(LegendFacts(sides, texts, tuple(told[rank] for rank in ranks)))
        self.note.setText("Ring: lowest frequency. Arrow: highest. For exp(+jωt), at the outer faces.")
        names = ", ".join(curve.label for curve in self.curves)
        self.plot.setAccessibleName(f"{PLANES[self.plane].label} in the complex plane")
        self.plot.setAccessibleDescription(names or EMPTY)

    def _chosen(self) -> PlaneCurve | None:
        """Return the curve that the wall drawing shows, when it is one of several."""
        state = self._view.state
        if len(self.curves) < 2 or self._answer is None:
            return None
        angle = state.marker_angle(self._session.job.sweep)
        ranks = np.argsort(np.argsort(self._answer.response.angle, kind="stable"), kind="stable")
        here = [int(rank) for rank, at in zip(ranks, self._answer.response.angle, strict=True) if at == angle]
        found = (one for one in self.curves if one.angle_rank in here)
        return next((one for one in found if one.polarization == state.active_polarization), None)

    def _marks(self) -> tuple[PlaneMark, ...]:
        """Return the markers on all curves; on one of them they are numbered."""
        state = self._view.state
        numbered = self._chosen() or (self.curves[0] if self.curves else None)
        return tuple(
            PlaneMark(str(index + 1) if curve is numbered else "", curve.at(hertz), index == state.active_marker)
            for index, hertz in enumerate(state.markers)
            for curve in self.curves
        )

    # Pointing and keys

    def _point(self, at: QPointF | None) -> None:
        found = self._nearest(at) if at is not None else None
        if found is None:
            self.layer.point(None)
            self.pointed.emit("")
            return
        curve, point = found
        self.layer.point(complex(curve.values[point]))
        self.pointed.emit(point_words(curve, self.plane, point))

    def _nearest(self, at: QPointF) -> tuple[PlaneCurve, int] | None:
        frame, best, found = self.plot.frame(), np.inf, None
        for curve in self.curves:
            gaps = np.hypot(frame.across(curve.values.real) - at.x(), frame.down(curve.values.imag) - at.y())
            if np.isfinite(gaps).any() and float(np.nanmin(gaps)) < best:
                best, found = float(np.nanmin(gaps)), (curve, int(np.nanargmin(gaps)))
        return found

    def _step(self, steps: int) -> None:
        """Move the active marker along the sweep."""
        state = self._view.state
        sweep = self._session.record.sweep.frequencies()
        self._view.replace(step_marker(state, state.active_marker, steps, sweep), self)
        curve = self._chosen() or (self.curves[0] if self.curves else None)
        if curve is not None and self._view.state.markers:
            hertz = self._view.state.markers[self._view.state.active_marker]
            self.pointed.emit(point_words(curve, self.plane, int(np.argmin(np.abs(curve.frequency - hertz)))))

    def _next(self) -> None:
        self.choice.setCurrentIndex((self.choice.currentIndex() + 1) % self.choice.count())

    def _zoom(self, factor: float) -> None:
        frame = self.plot.frame()
        self.plot.zoom(factor, factor, QPointF(frame.width / 2, frame.height / 2))

    def _open_menu(self, _at: QPointF, place: QPoint) -> None:
        self.menu = open_menu(self.commands, self.plot, place)
