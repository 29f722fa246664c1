"""What the menu Markers does: changes of the view, never of the job."""

from itertools import pairwise

from app.document.session import Session
from app.document.view import View
from app.panels.curves.plot_commands import PlotCommands
from app.series.markers import nearest_frequency


class MarkerCommands:
    """Add markers, go from one to the next, and to the worst point.

    Parameters
    ----------
    plot
        What the plot can do with markers; keys, its own menu and this one do the same.
    """

    def __init__(self, session: Session, view: View, plot: PlotCommands) -> None:
        self._session, self._view, self._plot = session, view, plot

    def any(self) -> bool:
        """Whether there is a marker."""
        return bool(self._view.state.markers)

    def add(self) -> None:
        """Add a marker in the middle of the widest gap that the ends of the sweep and the markers leave."""
        sweep = self._session.job.sweep.frequencies()
        low, high = float(sweep.min()), float(sweep.max())
        between = sorted(marker for marker in self._view.state.markers if low < marker < high)
        low, high = max(pairwise([low, *between, high]), key=self._width)
        middle = (low * high) ** 0.5 if self._view.state.log_frequency else (low + high) / 2
        self._plot.add_marker(nearest_frequency(middle, sweep))

    def remove(self) -> None:
        """Remove the active marker."""
        self._plot.remove()

    def next(self) -> None:
        """Make the next marker in frequency the active one, after the last the first."""
        self._plot.next_marker(1)

    def previous(self) -> None:
        """Make the marker before in frequency the active one, before the first the last."""
        self._plot.next_marker(-1)

    def to_worst(self) -> None:
        """Put the active marker (a new one when there is none) at the worst point over all curves."""
        self._plot.to_worst()

    def _width(self, gap: tuple[float, float]) -> float:
        low, high = gap
        return high / low if self._view.state.log_frequency else high - low
