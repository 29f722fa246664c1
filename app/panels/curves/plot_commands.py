"""What can be done with the curves and their markers, as the table that keys and menu share."""

from functools import partial
from typing import TYPE_CHECKING, Final

from PySide6.QtCore import QPointF

from app.document.view import View
from app.panels.curves import words
from app.panels.curves.commands import Command
from app.series.markers import add_marker, move_marker, remove_marker, snap_to_worst, step_marker
from app.series.snapping import next_crossing, next_extremum
from app.series.texts import frequency_text, value_text

if TYPE_CHECKING:
    from app.panels.curves.panel import CurvesPanel


_STEPS: Final = {
    "Left": -1,
    "Right": 1,
    "Ctrl+Left": -10,
    "Ctrl+Right": 10,
    "Home": -(10**9),
    "End": 10**9,
}
"""Key -> steps of the sweep that the active marker goes."""


class PlotCommands:
    """Acts on the view and on the ranges of the plot for keys, menu and buttons."""

    def __init__(self, panel: "CurvesPanel", view: View) -> None:
        self._panel, self._view = panel, view
        self._place: float | None = None
        self.table = (*self._range_commands(), *self._marker_commands(), *self._other_commands())

    # Markers

    def place(self) -> float:
        """Return the frequency where a new marker goes: where the menu was opened, the mouse is, or the middle."""
        place, self._place = self._place, None
        if place is not None:
            return place
        plot = self._panel.plot
        spot, frame = plot.pointer_layer.spot, plot.frame()
        across = frame.width / 2 if spot is None else frame.across(spot.position)
        return self._panel.frequency_at(QPointF(across, 0.0))

    def remember(self, at: QPointF) -> None:
        """Remember where the menu is being opened."""
        self._place = self._panel.frequency_at(at)

    def add_marker(self, hertz: float) -> None:
        """Add a marker and make it the active one."""
        self._view.replace(add_marker(self._view.state, hertz, self._panel.sweep), self._panel)
        self._say_marker()

    def move_marker(self, index: int, hertz: float) -> None:
        """Move a marker."""
        self._view.replace(move_marker(self._view.state, index, hertz, self._panel.sweep), self._panel)
        self._say_marker()

    def step(self, steps: int) -> None:
        """Move the active marker along the sweep."""
        state = self._view.state
        self._view.replace(step_marker(state, state.active_marker, steps, self._panel.sweep), self._panel)
        self._say_marker()

    def remove(self) -> None:
        """Remove the active marker."""
        state = self._view.state
        if state.markers:
            self._view.replace(remove_marker(state, state.active_marker), self._panel)
            self._panel.say("Marker removed.")

    def to_worst(self) -> None:
        """Move the active marker, or a new one, to the worst value of all, and choose its curve."""
        index = words.worst_curve(self._panel.curves)
        if index is None:
            return
        curve = self._panel.curves[index]
        if not self._view.state.markers:
            self.add_marker(float(curve.x[0]))
        state = self._view.state
        self._view.replace(snap_to_worst(state, state.active_marker, curve), self._panel)
        self._panel.choose_curve(index)

    def to_extremum(self, step: int) -> None:
        """Take the active marker, or a new one, to the next extremum of the chosen curve."""
        curve = self._panel.curve_in_hand
        if curve is None:
            return
        start = self._begin_marker()
        found = next_extremum(curve, start, step, self._panel.between_points(curve))
        if found is None:
            self._panel.say(f"{curve.label} has no extremum between its ends.")
        else:
            self.move_marker(self._view.state.active_marker, found)

    def to_level(self, level: float, step: int) -> None:
        """Take the active marker, or a new one, to the next place where the chosen curve crosses a level."""
        curve = self._panel.curve_in_hand
        if curve is None:
            return
        self._panel.plot.level_layer.set_level(level)
        start = self._begin_marker()
        found = next_crossing(curve, level, start, step, self._panel.between_points(curve))
        if found is None:
            self._panel.say(f"{curve.label} does not cross {value_text(curve.quantity, level, curve.unit)}.")
        else:
            self.move_marker(self._view.state.active_marker, found)

    def _begin_marker(self) -> float:
        """Return the frequency of the active marker; without one, of a new one at the lower end of the sweep."""
        if not self._view.state.markers:
            self.add_marker(float(self._panel.sweep.min()))
        state = self._view.state
        return state.markers[state.active_marker]

    def next_marker(self, step: int) -> None:
        """Make the next marker along the axis the active one."""
        state = self._view.state
        if not state.markers:
            return
        order = sorted(range(len(state.markers)), key=lambda index: state.markers[index])
        at = order.index(state.active_marker)
        self._view.set(self._panel, active_marker=order[(at + step) % len(order)])
        self._say_marker()

    def next_curve(self, step: int) -> None:
        """Choose the next curve."""
        curves, state = self._panel.curves, self._view.state
        if not curves:
            return
        sides = state.polarizations
        side = sides.index(state.active_polarization) if state.active_polarization in sides else 0
        at = min(state.active_angle * len(sides) + side, len(curves) - 1)
        self._panel.choose_curve((at + step) % len(curves))

    def _say_marker(self) -> None:
        state = self._view.state
        if not state.markers:
            self._panel.say("No marker yet: press M, or hold Ctrl and click in the plot.")
            return
        hertz = state.markers[state.active_marker]
        values = self._panel.values_at(hertz)
        self._panel.say("   ".join([f"Marker {state.active_marker + 1}: {frequency_text(hertz)}", *values]))

    # Ranges

    def fit_visible(self) -> None:
        """Show all values between the visible frequencies."""
        found = self._panel.visible_values()
        if found is not None:
            self._panel.plot.fit_values(*found)

    def toggle_follow(self) -> None:
        """Let the axis of values follow the curves, or stay."""
        plot = self._panel.plot
        if plot.follows[1]:
            frame = plot.frame()
            plot.set_ranges(values=(frame.bottom, frame.top))
        else:
            plot.follow_values()

    def zoom(self, factor: float) -> None:
        """Zoom about the middle."""
        plot = self._panel.plot
        frame = plot.frame()
        plot.zoom(factor, factor, QPointF(frame.width / 2, frame.height / 2))

    def pan(self, across: float, down: float) -> None:
        """Move the visible part by shares of itself."""
        plot = self._panel.plot
        frame = plot.frame()
        plot.pan(frame, across * frame.width or None, down * frame.height or None)

    def reset(self) -> None:
        """Show everything, without markers."""
        self._view.set(self._panel, markers=(), active_marker=0, worst_shown=True)
        self._panel.plot.show_all()

    # Tables

    def _range_commands(self) -> tuple[Command, ...]:
        panel, plot = self._panel, self._panel.plot
        return (
            Command("Show all", plot.show_all, ("A",), "Show every point, and follow the data again."),
            Command(
                "Fit values to the visible band",
                self.fit_visible,
                ("Y",),
                "Show all values between the visible frequencies.",
            ),
            Command(
                "Whole band",
                plot.follow_positions,
                ("X",),
                "Show every frequency of the sweep, and leave the values as they are.",
                enabled=lambda: not plot.follows[0],
            ),
            Command(
                "Values follow the curves",
                self.toggle_follow,
                ("F",),
                "Let the axis of values adapt whenever the curves change.",
                checked=lambda: plot.follows[1],
            ),
            Command(
                "Ranges before",
                plot.go_back,
                ("Z",),
                "Show what was shown before the last zoom or shift.",
                enabled=lambda: plot.history.can_go[0],
            ),
            Command(
                "Ranges after",
                plot.go_forward,
                ("Shift+Z",),
                "Take the last step back again.",
                enabled=lambda: plot.history.can_go[1],
            ),
            Command(
                "Set ranges…", lambda: panel.strips.type_range("bottom"), ("R",), "Type the ends of both axes."
            ),
            Command("", lambda: self.zoom(0.8), ("+", "=")),
            Command("", lambda: self.zoom(1.25), ("-",)),
            Command("", lambda: self.pan(0.1, 0.0), ("Shift+Left",)),
            Command("", lambda: self.pan(-0.1, 0.0), ("Shift+Right",)),
            Command("", lambda: self.pan(0.0, 0.1), ("Shift+Up",)),
            Command("", lambda: self.pan(0.0, -0.1), ("Shift+Down",)),
        )

    def _marker_commands(self) -> tuple[Command, ...]:
        def some() -> bool:
            return bool(self._view.state.markers)

        return (
            Command(
                "Add marker",
                lambda: self.add_marker(self.place()),
                ("M", "Insert"),
                "Add a marker here; Ctrl and click does the same.",
                group=1,
            ),
            Command(
                "Marker to the worst point",
                self.to_worst,
                ("W",),
                "Move the active marker to the worst point of all curves.",
                enabled=lambda: words.worst_curve(self._panel.curves) is not None,
                group=1,
            ),
            Command(
                "Marker to the next extremum",
                lambda: self.to_extremum(1),
                ("E",),
                "Take the marker to the next smallest or largest value of the chosen curve; Shift+E goes back.",
                enabled=lambda: bool(self._panel.curves),
                group=1,
            ),
            Command(
                "Marker to a level…",
                self._panel.strips.type_level,
                ("V",),
                "Type a value; the marker goes where the chosen curve crosses it.",
                enabled=lambda: bool(self._panel.curves),
                group=1,
            ),
            Command(
                "Remove marker",
                self.remove,
                ("Del", "Backspace"),
                "Remove the active marker.",
                enabled=some,
                group=1,
            ),
            *(Command("", partial(self.step, steps), (key,)) for key, steps in _STEPS.items()),
            Command("", lambda: self.to_extremum(-1), ("Shift+E",)),
            Command("", lambda: self.next_marker(1), ("N", "PgDown")),
            Command("", lambda: self.next_marker(-1), ("P", "PgUp")),
            Command("", lambda: self.next_curve(1), ("Down",)),
            Command("", lambda: self.next_curve(-1), ("Up",)),
        )

    def _other_commands(self) -> tuple[Command, ...]:
        view, panel = self._view, self._panel

        def any_curves() -> bool:
            return bool(panel.curves)

        return (
            Command(
                "Mark worst points",
                lambda: view.set(panel, worst_shown=not view.state.worst_shown),
                tip="Mark the worst point of each curve.",
                checked=lambda: view.state.worst_shown,
                group=2,
            ),
            Command(
                "Logarithmic frequency axis",
                lambda: view.set(panel, log_frequency=not view.state.log_frequency),
                ("L",),
                "Space frequencies by their ratio.",
                checked=lambda: view.state.log_frequency,
                group=2,
            ),
            Command(
                "Copy picture",
                panel.copy_picture,
                ("Ctrl+C",),
                "Put the plot on the clipboard, as pixels and as a drawing, in the light look.",
                enabled=any_curves,
                group=3,
            ),
            Command(
                "Copy data",
                panel.copy_data,
                ("Ctrl+Shift+C",),
                "Put the curves on the clipboard as a table with units.",
                enabled=any_curves,
                group=3,
            ),
            Command("Reset plot", self.reset, tip="Show everything, without markers.", group=4),
        )
