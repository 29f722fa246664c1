"""What is looked at, as opposed to what is designed: not part of the job and not undone."""

from collections.abc import Callable
from dataclasses import dataclass, replace
from typing import Final, Literal, TypedDict, Unpack, get_args

import numpy as np

from app.document.listeners import Listeners, Report
from stackcore.job.records import SweepRecord
from stackcore.polarizations import TE, TM, Polarization, polarization
from stackcore.quantities import QUANTITIES, element_absorptance

Power = Literal["fraction", "percent", "decibels"]
"""How a fraction of the incident power is shown: as it is, times 100, or as 10 log10 of it."""

POWERS: Final[tuple[Power, ...]] = get_args(Power)


@dataclass(frozen=True, slots=True)
class ViewState:
    """Everything about the view, frozen.

    Parameters
    ----------
    quantity
        What the curves show: the name of a quantity of `stackcore.quantities`.
    power
        How fractions of power are shown; quantities that are no such fraction ignore it.
    log_frequency
        Draw the frequency axis logarithmically.
    polarizations
        Which curves are shown: keys of `stackcore.polarizations`, in the order TE, TM, circular, tilts.
    markers
        Frequencies in Hz, in the order they were made.
    active_marker
        Index of the marker the keys move and the wall drawing shows; 0 while there is none.
    active_angle
        Index into the sweep's angles: the angle the wall drawing shows.
    active_polarization
        The polarization the wall drawing shows.
    worst_shown
        Mark the worst point of each curve.
    conditions
        Names of the conditions over which the curves show an envelope, besides the stack as it is built.
    beside
        Names of other stacks of the job whose curves are drawn with those of the stack in hand.
    less
        Name of the stack whose values are taken off all curves; empty to show them whole.

    Raises
    ------
    ValueError
        For a quantity, a way to show power or a polarization that does not exist, no polarization at all, or a
        marker that is not a positive frequency.
    """

    quantity: str = "transmittance"
    power: Power = "fraction"
    log_frequency: bool = False
    polarizations: tuple[str, ...] = (TE.key, TM.key)
    markers: tuple[float, ...] = ()
    active_marker: int = 0
    active_angle: int = 0
    active_polarization: str = "TE"
    worst_shown: bool = True
    conditions: tuple[str, ...] = ()
    beside: tuple[str, ...] = ()
    less: str = ""

    def __post_init__(self) -> None:
        if self.quantity not in QUANTITIES and element_absorptance(self.quantity) is None:
            raise ValueError(f"no quantity {self.quantity!r}; one of {', '.join(QUANTITIES)}")
        if self.power not in POWERS:
            raise ValueError(f"no way {self.power!r} to show power; one of {', '.join(POWERS)}")
        if not self.polarizations:
            raise ValueError("polarizations (); one or more of TE, TM, circular and a tilt")
        if not all(np.isfinite(marker) and marker > 0 for marker in self.markers):
            raise ValueError(f"markers {self.markers} must be positive frequencies in Hz")
        shown = sorted({polarization(key) for key in self.polarizations}, key=_place)
        object.__setattr__(self, "polarizations", tuple(wave.key for wave in shown))
        object.__setattr__(self, "active_polarization", polarization(self.active_polarization).key)
        object.__setattr__(self, "active_marker", min(max(self.active_marker, 0), max(len(self.markers) - 1, 0)))
        object.__setattr__(self, "active_angle", max(self.active_angle, 0))

    def marker_frequency(self, sweep: SweepRecord) -> float:
        """Return the frequency of the active marker in Hz, or the middle of `sweep` while there is no marker."""
        if self.markers:
            return self.markers[self.active_marker]
        frequencies = sweep.frequencies()
        return float(np.sort(frequencies)[len(frequencies) // 2])

    def marker_angle(self, sweep: SweepRecord) -> float:
        """Return the angle the wall drawing shows, in rad."""
        angles = sweep.angles()
        return float(angles[min(self.active_angle, len(angles) - 1)])

    def within(self, sweep: SweepRecord) -> "ViewState":
        """Return the view with every marker and the active angle inside `sweep`.

        A marker outside goes to the nearer end; markers that meet there become one.
        """
        frequencies = sweep.frequencies()
        low, high = float(frequencies.min()), float(frequencies.max())
        inside = [min(max(marker, low), high) for marker in self.markers]
        kept = tuple(dict.fromkeys(inside))
        active = kept.index(inside[self.active_marker]) if kept else 0
        angle = min(self.active_angle, len(sweep.angles()) - 1)
        return replace(self, markers=kept, active_marker=active, active_angle=angle)


def _place(wave: Polarization) -> tuple[int, float]:
    """Return where a polarization stands among those shown."""
    return ("TE", "TM", "circular", "tilted").index(wave.kind), wave.tilt


@dataclass(frozen=True, slots=True)
class ViewChange:
    """What a listener of a view hears: the state before and after, and who changed it."""

    before: ViewState
    after: ViewState
    initiator: object | None = None


class ViewChanges(TypedDict, total=False):
    """The fields of `ViewState` that `View.set` takes by name."""

    quantity: str
    power: Power
    log_frequency: bool
    polarizations: tuple[str, ...]
    markers: tuple[float, ...]
    active_marker: int
    active_angle: int
    active_polarization: str
    worst_shown: bool
    conditions: tuple[str, ...]
    beside: tuple[str, ...]
    less: str


class View:
    """Holds the view state and tells listeners of every change.

    Parameters
    ----------
    state
        Where to begin.
    report
        Takes errors of listeners (see `app.document.listeners`).

    Examples
    --------
    >>> view = View()
    >>> view.set(quantity="insertion_loss_dB")
    >>> view.state.quantity
    'insertion_loss_dB'
    """

    def __init__(self, state: ViewState | None = None, report: Report | None = None) -> None:
        self._state = state if state is not None else ViewState()
        self._listeners: Listeners[ViewChange] = Listeners(report)

    @property
    def state(self) -> ViewState:
        """What is looked at now."""
        return self._state

    def subscribe(self, listener: Callable[[ViewChange], None]) -> Callable[[], None]:
        """Call `listener` after every change; returns the function that ends it."""
        return self._listeners.subscribe(listener)

    def set(self, initiator: object | None = None, **changes: Unpack[ViewChanges]) -> None:
        """Change the fields given; listeners hear one change, and none when nothing differs."""
        self.replace(replace(self._state, **changes), initiator)

    def replace(self, state: ViewState, initiator: object | None = None) -> None:
        """Take `state`, for example one that a function of `app.series.markers` made."""
        if state == self._state:
            return
        before, self._state = self._state, state
        self._listeners.tell(ViewChange(before, state, initiator))
