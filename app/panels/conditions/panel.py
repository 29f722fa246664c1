"""The panel of conditions: a card for each, and the usual ones to begin with."""

from collections.abc import Callable
from functools import partial
from typing import Final

from PySide6.QtCore import Qt
from PySide6.QtGui import QShowEvent
from PySide6.QtWidgets import QLabel, QScrollArea, QToolButton, QVBoxLayout, QWidget

from app.document import edits
from app.document.condition_edits import PRESETS
from app.document.condition_rows import ConditionRow, Part, rows_of
from app.document.edit import Edit
from app.document.session import Change, Session
from app.document.view import View, ViewChange
from app.look.theme import Theme
from app.panels.conditions.card import Card, Deeds, Told, Typed
from app.panels.curves.drawing import fill_palette
from app.panels.elements.names import MaterialNames
from app.panels.materials.pieces import buttons, ink, words
from stackcore.errors import Fault, Severity
from stackcore.job.states import states_of

Tell = Callable[[str, Severity], None]

ABOUT: Final = (
    "A condition is what rain, ice, heat or another coat of paint makes of every stack of the job. No stack is "
    "changed by it; the curves show the envelope over those that are on. The usual ones above are common practice: "
    "put in the figures your job asks for."
)


class ConditionsPanel(QWidget):
    """Conditions made, changed, and taken into the envelope of the curves.

    Parameters
    ----------
    session
        Where conditions live; each change is one step of undo.
    view
        Where it stands which conditions the curves show.
    tell
        Says why something was refused that has no field of its own.
    """

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._refused: dict[tuple[str, int, str], Typed] = {}
        self._shapes: tuple[object, ...] = ()
        self._stands_for: object = None
        self.cards: list[Card] = []
        self.about = words(ABOUT, self)
        self.none = QLabel("No conditions yet.", self)
        self.none.setContentsMargins(8, 8, 8, 0)
        self.presets = buttons(
            self,
            *((preset.name, preset.note, partial(self._add_usual, place)) for place, preset in enumerate(PRESETS)),
            ("Empty", "Add a condition that changes nothing yet.", lambda: self._apply(edits.new_condition())),
        )
        self.presets.addStretch(1)
        self._inside = QWidget(self)
        self._column = QVBoxLayout(self._inside)
        self._column.setContentsMargins(0, 0, 0, 0)
        self._column.setSpacing(8)
        self._column.addStretch(1)
        area = QScrollArea(self)
        area.setWidgetResizable(True)
        area.setFrameShape(QScrollArea.Shape.NoFrame)
        area.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        area.setWidget(self._inside)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 4, 0, 0)
        whole.setSpacing(4)
        whole.addLayout(self.presets)
        whole.addWidget(self.none)
        whole.addWidget(area, 1)
        whole.addWidget(self.about)
        self.setAutoFillBackground(True)
        for first in self.findChildren(QToolButton)[:1]:
            self.setFocusProxy(first)
        self.setMinimumWidth(300)
        leave = (session.subscribe(self._edited), view.subscribe(self._looked))
        self.destroyed.connect(lambda: [end() for end in leave])
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        fill_palette(self, theme)
        fill_palette(self._inside, theme)
        for card in self.cards:
            card.set_theme(theme)
        ink(self.about, theme.muted)
        ink(self.none, theme.muted)

    def showEvent(self, event: QShowEvent) -> None:
        """Show what the job has become meanwhile."""
        super().showEvent(event)
        self._show()

    # What cards ask for

    def _deeds(self) -> Deeds:
        return Deeds(
            show=self._switch,
            rename=self._rename,
            remove=lambda name: self._apply(edits.remove_condition(name)),
            note=lambda name, text: self._apply_at((name, -1, "note"), text, edits.note_condition(name, text)),
            type_into=self._type_into,
            add=lambda name, kind: self._apply(edits.add_change(self._session.record, name, kind)),
            drop=self._drop,
        )

    def _switch(self, name: str, on: bool) -> None:
        others = tuple(one for one in self._view.state.conditions if one != name)
        self._view.set(self, conditions=(*others, name) if on else others)

    def _rename(self, name: str, text: str) -> None:
        self._apply_at((name, -1, "name"), text, edits.rename_condition(name, text))

    def _type_into(self, name: str, row: ConditionRow, part: Part, text: str) -> None:
        condition = self._session.record.condition(name)
        assert condition is not None
        place = rows_of(condition).index(row)
        given = text if row.kind == "state" else self._names().given(text)
        wanted = given if part == "subject" or row.kind == "exchange" else text
        self._apply_at((name, place, part), text, edits.type_change(name, row, part, wanted))

    def _drop(self, name: str, row: ConditionRow) -> None:
        # Rows behind the one that goes would stand for others: texts that were refused go with it.
        self._refused = {key: one for key, one in self._refused.items() if key[0] != name or key[1] < 0}
        self._apply(edits.remove_change(name, row))

    def _add_usual(self, place: int) -> None:
        before = {one.name for one in self._session.record.conditions}
        for fault in self._session.apply(edits.add_condition(PRESETS[place]), self):
            self._tell(f"{fault.message}: {fault.allowed}.", "note")  # nothing is wrong with the job
        for one in self._session.record.conditions:
            if one.name not in before:
                self._switch(one.name, on=True)

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit, self):
            self._tell(str(fault), fault.severity)

    def _apply_at(self, key: tuple[str, int, str], text: str, edit: Edit) -> None:
        """Make an edit that was typed; when it is refused, the text stays in its field with the first fault."""
        faults: tuple[Fault, ...] = self._session.apply(edit, self)
        if faults:
            self._refused[key] = Typed(text, faults[0])
        else:
            self._refused.pop(key, None)
        self._show()

    # Showing

    def _edited(self, change: Change) -> None:
        if change.kind == "open":
            self._refused = {}
        self._show()

    def _looked(self, change: ViewChange) -> None:
        if change.after.conditions != change.before.conditions:
            self._show()

    def _names(self) -> MaterialNames:
        return MaterialNames(self._session.record)

    def _show(self) -> None:
        if not self.isVisible():
            return
        record, state = self._session.record, self._view.state
        refused = {key: one for key, one in self._refused.items() if record.condition(key[0]) is not None}
        stands_for = (record.conditions, record.materials, state.conditions, dict(refused))
        if stands_for == self._stands_for:
            return
        self._stands_for, self._refused = stands_for, refused
        names = self._names()
        states = tuple(dict.fromkeys(one.name for made in record.materials for one in states_of(made)))

        def told(name: str) -> Told:
            return Told(
                name in state.conditions,
                names.shown,
                lambda: names.offers(with_metal=False),
                states,
                self._refused,
            )

        shapes = tuple(Card.shape(one) for one in record.conditions)
        if shapes != self._shapes:
            self._rebuild(told)
            self._shapes = shapes
        for card, condition in zip(self.cards, record.conditions, strict=True):
            card.show_condition(condition, told(condition.name))
        self.none.setVisible(not record.conditions)

    def _rebuild(self, told: Callable[[str], Told]) -> None:
        for card in self.cards:
            self._column.removeWidget(card)
            card.hide()
            card.deleteLater()
        self.cards = [
            Card(one, told(one.name), self._deeds(), self._theme, self._inside)
            for one in self._session.record.conditions
        ]
        for place, card in enumerate(self.cards):
            self._column.insertWidget(place, card)
            card.show()
