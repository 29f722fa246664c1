"""One condition on the panel: its switch, its name, and a line for each thing it changes."""

from collections.abc import Callable, Sequence
from functools import partial
from typing import Final, NamedTuple

from PySide6.QtCore import Qt
from PySide6.QtWidgets import (
    QCompleter,
    QGridLayout,
    QHBoxLayout,
    QLabel,
    QSizePolicy,
    QToolButton,
    QVBoxLayout,
    QWidget,
)

from app.document.condition_rows import KINDS, ConditionRow, Kind, Part, rows_of
from app.look.theme import Theme
from app.panels.materials.pieces import button, ink
from app.panels.sweep.field import QuietField, QuietSwitch
from app.panels.sweep.flow import FlowLayout
from app.panels.tables.words import fault_words
from stackcore.errors import Fault
from stackcore.job.records import ConditionRecord

SHOW_TIP: Final = "Take this condition into the envelope of the curves."
_SUBJECT_TIPS: Final[dict[Kind, str]] = {
    "front": "Material of a layer before the first element of every stack; type a part of its name to choose.",
    "back": "Material of a layer behind the last element of every stack; type a part of its name to choose.",
    "exchange": "Material of the job that another one takes the place of.",
    "factor": "Material of which every layer becomes thicker or thinner.",
    "state": "Every material that has this state is in it.",
}
_VALUE_TIPS: Final[dict[Kind, str]] = {
    "front": "Thickness of the layer, for example 0.1 mm.",
    "back": "Thickness of the layer, for example 0.1 mm.",
    "exchange": "Material that comes instead.",
    "factor": "By which the thickness is multiplied, for example 2.",
}
_ADD_TIPS: Final[dict[Kind, str]] = {
    "front": "Add a layer before the first element of every stack.",
    "back": "Add a layer behind the last element of every stack.",
    "exchange": "Let another material take the place of one of the job.",
    "factor": "Multiply the thickness of every layer of a material.",
    "state": "Ask for a state of the materials that have it.",
}
_BETWEEN: Final[dict[Kind, str]] = {"front": "", "back": "", "exchange": "→", "factor": "×"}


class Typed(NamedTuple):
    """A text that was refused where it was typed: it stays there with its fault."""

    text: str
    fault: Fault


class Deeds(NamedTuple):
    """What a card asks for; the panel does it."""

    show: Callable[[str, bool], None]
    rename: Callable[[str, str], None]
    remove: Callable[[str], None]
    note: Callable[[str, str], None]
    type_into: Callable[[str, ConditionRow, Part, str], None]
    add: Callable[[str, Kind], None]
    drop: Callable[[str, ConditionRow], None]


class Told(NamedTuple):
    """What a card shows besides the condition itself."""

    shown: bool
    name_of: Callable[[str], str]
    offers: Callable[[], Sequence[str]]
    states: Sequence[str]
    refused: dict[tuple[str, int, str], Typed]


class Card(QWidget):
    """The widgets of one condition; they follow it as long as it has the same kinds of rows.

    Parameters
    ----------
    condition
        What is shown.
    deeds
        Takes what is typed and pressed.
    """

    def __init__(self, condition: ConditionRecord, told: Told, deeds: Deeds, theme: Theme, parent: QWidget) -> None:
        super().__init__(parent)
        self._condition, self._deeds, self._theme = condition, deeds, theme
        self._told = told
        self._words: list[QLabel] = []
        self.fields: dict[tuple[int, str], QuietField] = {}
        self.fault = QLabel(self)
        self.fault.setWordWrap(True)
        self.fault.setTextFormat(Qt.TextFormat.PlainText)
        self.switch = QuietSwitch(theme, "on the curves", SHOW_TIP, self)
        self.switch.clicked.connect(lambda on: deeds.show(self._condition.name, on))
        self.name = self._field("Name of the condition", "What it is called on the curves and in files.", 9)
        self.name.committed.connect(lambda text: deeds.rename(self._condition.name, text))
        self.note = self._field("Note", "Where its figures come from, or anything a reader must know.", 20)
        self.note.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        self.note.committed.connect(lambda text: deeds.note(self._condition.name, text))
        self.note.setPlaceholderText("Note")
        self._arrange(rows_of(condition))
        self.show_condition(condition, told)
        self.set_theme(theme)

    @staticmethod
    def shape(condition: ConditionRecord) -> tuple[tuple[Kind, bool], ...]:
        """Return what decides which widgets a card has."""
        return tuple((row.kind, row.sheet) for row in rows_of(condition))

    def show_condition(self, condition: ConditionRecord, told: Told) -> None:
        """Show the condition as it is now; it has the same shape."""
        self._condition, self._told = condition, told
        self.switch.setChecked(told.shown)
        self.switch.setAccessibleName(f"{condition.name} on the curves")
        self._fill(self.name, -1, "name", condition.name)
        self._fill(self.note, -1, "note", condition.note)
        for place, row in enumerate(rows_of(condition)):
            subject = row.subject if row.kind == "state" or row.sheet else told.name_of(row.subject)
            self._fill(self.fields[place, "subject"], place, "subject", subject)
            if (place, "value") in self.fields:
                value = told.name_of(row.value) if row.kind == "exchange" else row.value
                self._fill(self.fields[place, "value"], place, "value", value)
        faults = [one.fault for (name, _, _), one in told.refused.items() if name == condition.name]
        self.fault.setText(" ".join(fault_words(fault) for fault in faults))
        self.fault.setVisible(bool(faults))

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.switch.set_theme(theme)
        for field in (self.name, self.note, *self.fields.values()):
            field.set_theme(theme)
        for label in self._words:
            ink(label, theme.muted)
        ink(self.fault, theme.fault)

    def _fill(self, field: QuietField, place: int, part: str, text: str) -> None:
        typed = self._told.refused.get((self._condition.name, place, part))
        if typed is None:
            field.show_text(text)
        else:
            field.show_text(typed.text, typed.fault)

    def _arrange(self, rows: Sequence[ConditionRow]) -> None:
        head = QHBoxLayout()
        head.setSpacing(8)
        for part in (self.name, self.switch):
            head.addWidget(part)
        head.addStretch(1)
        head.addWidget(button(self, "Delete", "Delete the condition; no stack changes.", self._remove))
        grid = QGridLayout()
        grid.setHorizontalSpacing(8)
        grid.setVerticalSpacing(2)
        grid.setColumnStretch(1, 1)
        for place, row in enumerate(rows):
            self._add_line(grid, place, row)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(8, 8, 8, 8)
        whole.setSpacing(4)
        whole.addLayout(head)
        whole.addLayout(grid)
        whole.addWidget(self.fault)
        whole.addWidget(self._adders())
        whole.addWidget(self.note)

    def _add_line(self, grid: QGridLayout, place: int, row: ConditionRow) -> None:
        label = QLabel(KINDS[row.kind], self)
        self._words.append(label)
        grid.addWidget(label, place, 0)
        subject = self._field(f"{KINDS[row.kind]}, {'state' if row.kind == 'state' else 'material'}", "", 12)
        subject.setSizePolicy(QSizePolicy.Policy.Ignored, QSizePolicy.Policy.Fixed)
        subject.setToolTip(_SUBJECT_TIPS[row.kind])
        subject.setReadOnly(row.sheet)
        subject.committed.connect(partial(self._typed, place, "subject"))
        self._complete(subject, row.kind)
        subject.setMinimumWidth(60)
        self.fields[place, "subject"] = subject
        grid.addWidget(subject, place, 1)
        if row.kind != "state" and not row.sheet:
            between = QLabel(_BETWEEN[row.kind], self)
            self._words.append(between)
            grid.addWidget(between, place, 2)
            value = self._field(f"{KINDS[row.kind]}, value", _VALUE_TIPS[row.kind], 6)
            value.committed.connect(partial(self._typed, place, "value"))
            if row.kind == "exchange":
                self._complete(value, row.kind)
            self.fields[place, "value"] = value
            grid.addWidget(value, place, 3)
        drop = button(self, "×", f"Take this line away: {KINDS[row.kind].lower()}.", partial(self._drop, place))
        drop.setAccessibleName(f"Take away: {KINDS[row.kind].lower()}")
        grid.addWidget(drop, place, 4)

    def _adders(self) -> QWidget:
        owner = QWidget(self)
        line = FlowLayout(owner, across=0, down=0)
        for kind, words in KINDS.items():
            line.addWidget(self._adder(kind, words))
        return owner

    def _adder(self, kind: Kind, words: str) -> QToolButton:
        made = button(self, f"+ {words}", _ADD_TIPS[kind], lambda: self._deeds.add(self._condition.name, kind))
        made.setAccessibleName(f"Add: {words.lower()}")
        return made

    def _field(self, name: str, tip: str, letters: int) -> QuietField:
        return QuietField(self._theme, name, tip, "0" * letters, self)

    def _complete(self, field: QuietField, kind: Kind) -> None:
        """Offer what may stand in a field while it is typed into, the offers read when they are first needed."""
        told = self._told
        completer = QCompleter(list(told.states) if kind == "state" else list(told.offers()), field)
        completer.setCaseSensitivity(Qt.CaseSensitivity.CaseInsensitive)
        completer.setFilterMode(Qt.MatchFlag.MatchContains)
        field.setCompleter(completer)

    def _typed(self, place: int, part: Part, text: str) -> None:
        self._deeds.type_into(self._condition.name, rows_of(self._condition)[place], part, text)

    def _drop(self, place: int) -> None:
        self._deeds.drop(self._condition.name, rows_of(self._condition)[place])

    def _remove(self) -> None:
        self._deeds.remove(self._condition.name)
