"""The lines that open below the plot: typed ranges of the axes, and a level that the marker goes to."""

from collections.abc import Callable

from PySide6.QtWidgets import QVBoxLayout, QWidget

from app.look.theme import Theme
from app.panels.curves.level_strip import LevelStrip
from app.panels.curves.plot import CurvePlot
from app.panels.curves.range_strip import RangeStrip
from app.panels.curves.scale import FrequencyScale


class Strips(QWidget):
    """Both lines, closed at first; the focus goes back to the plot when one is closed.

    Parameters
    ----------
    plot
        Whose ranges are typed and where the level is drawn.
    scale
        Gives the frequency axis of now.
    """

    def __init__(self, plot: CurvePlot, scale: Callable[[], FrequencyScale], theme: Theme, parent: QWidget) -> None:
        super().__init__(parent)
        self._plot, self._scale = plot, scale
        self._units = ("GHz", "")
        self.ranges, self.level = RangeStrip(theme, self), LevelStrip(theme, self)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.addWidget(self.ranges)
        column.addWidget(self.level)
        self.ranges.wanted.connect(self._set_ranges)
        self.ranges.all_wanted.connect(plot.show_all)
        self.ranges.closed.connect(lambda: self._close(self.ranges))
        self.level.closed.connect(lambda: self._close(self.level))
        plot.ranges_changed.connect(self._follow)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.ranges.set_theme(theme)
        self.level.set_theme(theme)

    def set_units(self, frequency: str, values: str) -> None:
        """Take the units of the axes."""
        self._units = (frequency, values)
        self.level.set_unit(values)

    def type_range(self, axis: str) -> None:
        """Open the typed ranges at the axis ``left`` or ``bottom``."""
        self._fill()
        self.ranges.start(axis)

    def type_level(self) -> None:
        """Open the level; it begins in the middle of what is visible."""
        frame = self._plot.frame()
        self.level.start((frame.bottom + frame.top) / 2)
        self._show_level()

    def _set_ranges(self, hertz: tuple[float, float], values: tuple[float, float]) -> None:
        low, high = (self._scale().position(end) for end in hertz)
        self._plot.set_ranges((low, high), values)

    def _follow(self) -> None:
        if self.ranges.isVisible():
            self._fill()

    def _fill(self) -> None:
        frame, scale = self._plot.frame(), self._scale()
        hertz = (scale.hertz(frame.left), scale.hertz(frame.right))
        self.ranges.show_ranges(hertz, (frame.bottom, frame.top), scale.factor, self._units)

    def _close(self, strip: QWidget) -> None:
        strip.hide()
        self._show_level()
        self._plot.setFocus()

    def _show_level(self) -> None:
        """Draw the level while it is typed and used."""
        self._plot.level_layer.set_level(self.level.level if self.level.isVisible() else None)
