"""What the menu Markers does: changes of the view, never of the job."""

from collections.abc import Callable
from dataclasses import replace
from itertools import pairwise

from app.document.session import Session
from app.document.view import View
from app.series.curves import Curve, curves_of
from app.series.markers import add_marker, nearest_frequency, remove_marker
from app.series.shown import SHOWN
from app.workers.live import Answer


class MarkerCommands:
    """Add markers, go from one to the next, and to the worst point.

    Parameters
    ----------
    answer
        Gives the newest result, or None before there is one.
    """

    def __init__(self, session: Session, view: View, answer: Callable[[], Answer | None]) -> None:
        self._session, self._view, self._answer = session, view, answer

    def any(self) -> bool:
        """Whether there is a marker."""
        return bool(self._view.state.markers)

    def has_result(self) -> bool:
        """Whether there is a result whose curves have a worst point."""
        return self._answer() is not None and SHOWN[self._view.state.quantity].worst is not None

    def add(self) -> None:
        """Add a marker in the middle of the widest gap that the ends of the sweep and the markers leave."""
        sweep = self._session.job.sweep.frequencies()
        ends = sorted({float(sweep.min()), float(sweep.max()), *self._view.state.markers})
        if len(ends) < 2:
            self._view.replace(add_marker(self._view.state, ends[0], sweep))
            return
        low, high = max(pairwise(ends), key=self._width)
        middle = (low * high) ** 0.5 if self._view.state.log_frequency else (low + high) / 2
        self._view.replace(add_marker(self._view.state, nearest_frequency(middle, sweep), sweep))

    def remove(self) -> None:
        """Remove the active marker."""
        self._view.replace(remove_marker(self._view.state, self._view.state.active_marker))

    def next(self) -> None:
        """Make the next marker in frequency the active one, after the last the first."""
        self._step(1)

    def previous(self) -> None:
        """Make the marker before in frequency the active one, before the first the last."""
        self._step(-1)

    def to_worst(self) -> None:
        """Put the active marker (a new one when there is none) at the worst point over all curves.

        The angle and the polarization of that curve become those of the wall drawing.
        """
        worst = self._worst_curve()
        if worst is None:
            return
        frequency = worst.worst.x if worst.worst is not None else worst.worst_infinite
        if frequency is None:
            return
        state = self._view.state
        if state.markers:
            markers = list(state.markers)
            markers[state.active_marker] = frequency
            state = replace(state, markers=tuple(markers))
        else:
            state = add_marker(state, frequency, worst.x)
        angles = self._session.job.sweep.angles()
        nearest = min(range(len(angles)), key=lambda place: abs(float(angles[place]) - worst.angle))
        self._view.replace(replace(state, active_angle=nearest, active_polarization=worst.polarization))

    def _width(self, gap: tuple[float, float]) -> float:
        low, high = gap
        return high / low if self._view.state.log_frequency else high - low

    def _step(self, step: int) -> None:
        markers = self._view.state.markers
        order = sorted(range(len(markers)), key=lambda index: markers[index])
        place = order.index(self._view.state.active_marker)
        self._view.set(active_marker=order[(place + step) % len(order)])

    def _worst_curve(self) -> Curve | None:
        answer = self._answer()
        side = SHOWN[self._view.state.quantity].worst
        if answer is None or side is None:
            return None
        curves = curves_of(answer.response, self._view.state)
        for curve in curves:
            if curve.worst_infinite is not None:
                return curve
        known = [(curve.worst.y, curve) for curve in curves if curve.worst is not None]
        if not known:
            return None
        choose = max if side == "high" else min
        return choose(known, key=lambda pair: pair[0])[1]
