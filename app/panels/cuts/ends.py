"""The two fields in which the ends of what a study varies are typed."""

from collections.abc import Callable
from typing import Final

import numpy as np
from PySide6.QtWidgets import QWidget

from app.look.theme import Theme
from app.panels.sweep.field import QuietField
from app.series.variation_axis import STEEPEST, usual_range, variation_at
from stackcore.errors import Fault, JobError, UnitError
from stackcore.job import Job
from stackcore.studies import Variation, check_values
from stackcore.units import Dimension, degrees_of, format_value, parse_measure

TIP: Final = "End of what is varied, with a unit; empty for the usual one."


class EndFields:
    """The ends of studies, remembered for each thing that is varied; an empty one is the usual end.

    The usual ends stay as they were first found while the present value lies between them, so that the plot stands
    still while a value is dragged.

    Parameters
    ----------
    changed
        Is called when an end was typed that is allowed.
    """

    def __init__(self, theme: Theme, changed: Callable[[], None], parent: QWidget) -> None:
        self._changed = changed
        self._usual: dict[tuple[int, str], tuple[float, float]] = {}
        self._typed: dict[tuple[int, str], list[float | None]] = {}
        self._key: tuple[int, str] = (0, "")
        self._variation: Variation | None = None
        self.low = QuietField(theme, "From", TIP, "000.00 mm", parent)
        self.high = QuietField(theme, "To", TIP, "000.00 mm", parent)
        for place, field in enumerate((self.low, self.high)):
            field.committed.connect(lambda text, at=place: self._take(at, text))

    @property
    def fields(self) -> tuple[QuietField, QuietField]:
        """From and to."""
        return self.low, self.high

    def forget(self) -> None:
        """Begin anew: another job."""
        self._usual.clear()
        self._typed.clear()
        for field in self.fields:
            field.show_text("")

    def follow(self, job: Job, stack: int, path: str) -> tuple[float, float]:
        """Show the ends of what is varied now and return them, SI."""
        other = self._key != (stack, path)
        self._key, self._variation = (stack, path), variation_at(job, stack, path)
        usual = self._usual.get(self._key)
        now = self._variation.value if self._variation is not None else None
        if usual is None or now is None or not usual[0] <= now <= usual[1]:
            usual = self._usual[self._key] = usual_range(job, stack, path)
        typed = self._typed.setdefault(self._key, [None, None])
        ends = [end if end is not None else common for end, common in zip(typed, usual, strict=True)]
        if not ends[0] < ends[1]:  # a usual end that has passed the typed one
            ends = list(usual)
        for field, end, text in zip(self.fields, typed, (self._words(end) for end in usual), strict=True):
            if other or field.fault is None:
                field.show_text("" if end is None else self._words(end))
            field.setPlaceholderText(text)
        return ends[0], ends[1]

    def widen(self) -> None:
        """Take the usual ends again."""
        self._usual.pop(self._key, None)
        self._typed.pop(self._key, None)
        for field in self.fields:
            field.show_text("")
        self._changed()

    def _words(self, value: float) -> str:
        if self._variation is None:
            return f"{degrees_of(value):.6g} deg"
        return format_value(value, self._variation.dimension, digits=6)

    def _take(self, place: int, text: str) -> None:
        typed = self._typed.setdefault(self._key, [None, None])
        field = self.fields[place]
        if not text.strip():
            typed[place] = None
            field.show_text("")
            self._changed()
            return
        try:
            value = self._read(text)
        except UnitError as error:
            field.show_text(text, Fault("", error.message, error.allowed))
            return
        except JobError as error:
            field.show_text(text, error.faults[0])
            return
        other = typed[1 - place]
        against = self._usual[self._key][1 - place] if other is None else other
        if not (value < against if place == 0 else value > against):
            rest = f"{'below' if place == 0 else 'above'} {self._words(against)}"
            field.show_text(text, Fault("", f"{text.strip()} leaves nothing between the ends", rest))
            return
        typed[place] = value
        field.show_text(text)
        self._changed()

    def _read(self, text: str) -> float:
        variation = self._variation
        if variation is not None:
            value = parse_measure(text, variation.dimension).value
            check_values(variation, np.array([value]))
            return value
        value = parse_measure(text, Dimension.ANGLE, default_unit="deg").value
        if not 0 <= value <= STEEPEST:
            raise UnitError(f"{text.strip()} is no angle of a plane wave on a wall", "0 deg to 89.5 deg")
        return value
