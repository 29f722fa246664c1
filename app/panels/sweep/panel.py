"""The quiet line above the curves: what is computed and shown, read like a sentence and changed in place."""

from collections.abc import Callable, Sequence
from typing import Final

from PySide6.QtGui import QColor, QPalette
from PySide6.QtWidgets import QHBoxLayout, QLabel, QWidget

from app.document import edits
from app.document.document import job_cell
from app.document.reading import list_text
from app.document.session import Change, Session
from app.document.view import View, ViewChange
from app.look.theme import Theme
from app.panels.sweep.comparison_choice import ComparisonChoice
from app.panels.sweep.field import QuietChoice, QuietField
from app.panels.sweep.flow import FlowLayout
from app.panels.sweep.phrases import angles_text, element_offers
from app.panels.sweep.polarization_choice import PolarizationChoice
from app.panels.sweep.quantity_choice import QuantityChoice, quantity_tip
from app.series.axis import is_power
from stackcore.errors import Severity
from stackcore.job.records import FrequencyGrid, Spacing
from stackcore.quantities import quantity_named

Tell = Callable[[str, Severity], None]

START: Final = "sweep.frequency.start"
STOP: Final = "sweep.frequency.stop"
POINTS: Final = "sweep.frequency.points"
LIST: Final = "sweep.frequency"
ANGLES: Final = "sweep.angle"

_TIPS: Final = {
    START: "First frequency of the sweep; any unit from Hz to PHz, for example 8 GHz.",
    STOP: "Last frequency of the sweep; any unit from Hz to PHz, for example 12 GHz.",
    POINTS: "Number of frequencies, both ends included.",
    LIST: "Frequencies of the sweep, divided by semicolons, for example 2.4 GHz; 5.2 GHz.",
    ANGLES: (
        "Angles of incidence, measured from the normal; a list such as 0, 30, 45 deg or a range such as "
        "0 to 60 deg, 7 points. 0 or more and below 90 deg."
    ),
}
_NAMES: Final = {
    START: "First frequency",
    STOP: "Last frequency",
    POINTS: "Number of frequencies",
    LIST: "Frequencies",
    ANGLES: "Angles of incidence",
}


class SweepPanel(QWidget):
    """Quantity, scales, polarizations, band, points and angles, in one line that wraps.

    Parameters
    ----------
    session
        Where the sweep is read and changed; texts that are not values stay as drafts, shown at their field.
    view
        Where the quantity, the scales and the polarizations are read and changed.
    theme
        The look.
    tell
        Says what has no place of its own.
    """

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._captions: list[QLabel] = []
        self.setAccessibleName("What is computed and shown")
        self._make_controls()
        self._arrange()
        self._leave = (session.subscribe(self._session_changed), view.subscribe(self._view_changed))
        # Through the tuple and not through self: a widget being destroyed has no methods left.
        leave = self._leave
        self.destroyed.connect(lambda: [end() for end in leave])
        self.set_theme(theme)
        self._show_sweep()
        self._show_view()

    def field(self, column: str) -> QuietField:
        """Return the field of a cell such as ``sweep.frequency.start``."""
        return self._fields[column]

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        for caption in self._captions:
            palette = caption.palette()
            palette.setColor(QPalette.ColorRole.WindowText, QColor(theme.muted))
            caption.setPalette(palette)
        controls: list[QuietField | QuietChoice] = [*self._fields.values(), *self._choices]
        for control in controls:
            control.set_theme(theme)
        self.polarizations.set_theme(theme)
        self.comparison.set_theme(theme)

    # Making

    def _make_controls(self) -> None:
        samples = {START: "88 GHz", STOP: "88 GHz", POINTS: "401", LIST: "88 GHz; 88 GHz", ANGLES: "0, 30 deg"}
        self._fields = {
            column: QuietField(self._theme, _NAMES[column], _TIPS[column], samples[column]) for column in _NAMES
        }
        for column, field in self._fields.items():
            field.committed.connect(lambda text, column=column: self._typed(column, text))
        self.quantity = QuantityChoice(self._theme, "Quantity shown", self._elements)
        self.scale = QuietChoice(
            self._theme,
            "Scale of the values",
            "A fraction of the incident power, that in per cent, or 10 log10 of it in decibels.",
        )
        for text, power in (("as a fraction", "fraction"), ("in %", "percent"), ("in dB", "decibels")):
            self.scale.addItem(text, power)
        self.spacing = QuietChoice(
            self._theme, "Spacing of the frequencies", "Evenly spaced, evenly spaced in log, or a list of your own."
        )
        for text, data in (("linear", "linear"), ("log", "log"), ("listed", "list")):
            self.spacing.addItem(text, data)
        self.axis = QuietChoice(
            self._theme, "Scale of the frequency axis", "How the plot spaces frequencies; the sweep stays as it is."
        )
        self.axis.addItem("linear axis", False)
        self.axis.addItem("log axis", True)
        self._choices = (self.quantity, self.scale, self.spacing, self.axis)
        self.polarizations = PolarizationChoice(self._view, self._theme, self._tell)
        self.switches = self.polarizations.switches
        self.comparison = ComparisonChoice(self._session, self._view, self._theme)
        self._connect()

    def _connect(self) -> None:
        self.quantity.activated.connect(lambda _: self._view.set(self, quantity=self.quantity.currentData()))
        self.scale.activated.connect(lambda _: self._view.set(self, power=self.scale.currentData()))
        self.axis.activated.connect(lambda _: self._view.set(self, log_frequency=self.axis.currentData()))
        self.spacing.activated.connect(lambda _: self._choose_spacing(self.spacing.currentData()))

    def _arrange(self) -> None:
        flow = FlowLayout(self, across=16, down=2)
        fields = self._fields
        self._group(flow, self.quantity, self.scale)
        self._group(flow, *self.polarizations.parts)
        self._group(flow, self.axis)
        self._group(flow, self.comparison.opener)
        self._band = self._group(flow, "from", fields[START], "to", fields[STOP])
        self._count = self._group(flow, fields[POINTS], "points,", self.spacing)
        self._listed = self._group(flow, "at", fields[LIST])
        self._group(flow, "angles", fields[ANGLES])

    def _group(self, flow: FlowLayout, *parts: QWidget | str) -> QWidget:
        group = QWidget(self)
        line = QHBoxLayout(group)
        # A group that begins with a word starts where the words of the controls do.
        line.setContentsMargins(4 if isinstance(parts[0], str) else 0, 0, 0, 0)
        line.setSpacing(4)
        for part in parts:
            if isinstance(part, str):
                caption = QLabel(part)
                self._captions.append(caption)
                line.addWidget(caption)
            else:
                line.addWidget(part)
        flow.addWidget(group)
        return group

    # Showing

    def _session_changed(self, change: Change) -> None:
        self._show_sweep()
        self.comparison.show_view()

    def _view_changed(self, change: ViewChange) -> None:
        self._show_view()

    def _show_sweep(self) -> None:
        sweep = self._session.record.sweep
        grid = sweep.frequency if isinstance(sweep.frequency, FrequencyGrid) else None
        texts = {ANGLES: angles_text(sweep.angle)}
        if grid is not None:
            texts |= {START: grid.start.text, STOP: grid.stop.text, POINTS: str(grid.points)}
        elif not isinstance(sweep.frequency, FrequencyGrid):
            texts[LIST] = list_text(sweep.frequency)
        for column, field in self._fields.items():
            draft = self._session.document.draft(job_cell(column))
            if draft is not None:
                field.show_text(draft.text, draft.fault)
            else:
                field.show_text(texts.get(column, ""))
        self.spacing.show_choice(grid.spacing if grid is not None else "list")
        self._band.setVisible(grid is not None)
        self._listed.setVisible(grid is None)
        for part in (self._fields[POINTS], self._captions[2]):
            part.setVisible(grid is not None)

    def _show_view(self) -> None:
        state = self._view.state
        self.quantity.show_choice(state.quantity)
        tip = quantity_tip(quantity_named(state.quantity))
        self.quantity.setToolTip(tip)
        self.quantity.setStatusTip(tip)
        self.quantity.setAccessibleDescription(tip)
        self.scale.show_choice(state.power)
        self.scale.setVisible(is_power(state.quantity))
        self.axis.show_choice(state.log_frequency)
        self.polarizations.show_view()
        self.comparison.show_view()

    # Changing

    def _typed(self, column: str, text: str) -> None:
        for fault in self._session.apply(edits.type_into(job_cell(column), text), self):
            self._tell(str(fault), fault.severity)
        self._show_sweep()

    def _choose_spacing(self, wanted: str) -> None:
        frequency = self._session.record.sweep.frequency
        if isinstance(frequency, FrequencyGrid):
            values = frequency.values()
            chosen = values if len(values) <= 5 else values[[0, len(values) // 2, -1]]
            edit = (
                edits.set_frequency_list([float(value) for value in chosen])
                if wanted == "list"
                else edits.set_frequency_grid(frequency.start, frequency.stop, frequency.points, _spacing(wanted))
            )
        elif wanted == "list":
            return
        else:
            first, last = (pick(frequency, key=lambda measure: measure.value) for pick in (min, max))
            edit = edits.set_frequency_grid(first, last, max(len(frequency), 201), _spacing(wanted))
        for fault in self._session.apply(edit, self):
            self._tell(str(fault), fault.severity)
        self._show_sweep()

    def _elements(self) -> Sequence[tuple[str, str]]:
        return element_offers(self._session.job, self._session.selection.stack)


def _spacing(name: str) -> Spacing:
    return "log" if name == "log" else "linear"
