"""Fields with their words and faults, one under the other; they keep what is typed and follow the document."""

from collections.abc import Callable, Sequence

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QGridLayout, QLabel, QSizePolicy, QWidget

from app.look.theme import Theme
from app.panels.material_data.facts import FieldFacts
from app.panels.materials.pieces import ink
from app.panels.sweep.field import QuietChoice, QuietField
from app.panels.tables.words import fault_words

NOT_GIVEN = "not given"


class Row:
    """One field: words, the control, and the fault below it."""

    def __init__(self, facts: FieldFacts, theme: Theme, owner: QWidget, typed: Callable[[str, str], None]) -> None:
        self.label = QLabel(facts.label, owner)
        self.fault = QLabel(owner)
        self.fault.setWordWrap(True)
        self.fault.setTextFormat(Qt.TextFormat.PlainText)
        self.control: QuietField | QuietChoice
        policy = QSizePolicy.Policy
        if facts.options:
            choice = QuietChoice(theme, facts.label, facts.tip, owner)
            for option in facts.options:
                choice.addItem(option or NOT_GIVEN, option)
            choice.activated.connect(lambda _index: typed(facts.column, choice.currentData()))
            self.control = choice
        else:
            field = QuietField(theme, facts.label, facts.tip, "0" * (24 if facts.wide else 10), owner)
            field.setSizePolicy(policy.Expanding if facts.wide else policy.Maximum, policy.Fixed)
            field.setMinimumWidth(60)
            field.committed.connect(lambda text: typed(facts.column, text))
            self.control = field
        self.label.setBuddy(self.control)

    def show(self, facts: FieldFacts, theme: Theme) -> None:
        """Show what the document holds; what is being typed right now is left alone."""
        if isinstance(self.control, QuietField):
            self.control.setPlaceholderText(facts.hint)
            self.control.show_text(facts.text, facts.fault)
        else:
            self.control.show_choice(facts.text)
        self.fault.setText(fault_words(facts.fault) if facts.fault else "")
        self.fault.setVisible(facts.fault is not None)
        ink(self.fault, theme.fault)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.control.set_theme(theme)
        ink(self.label, theme.muted)
        ink(self.fault, theme.fault)


class Form(QWidget):
    """The fields of one material.

    Parameters
    ----------
    typed
        Takes the column and the text that was typed or chosen.
    """

    def __init__(self, theme: Theme, typed: Callable[[str, str], None], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._theme, self._typed = theme, typed
        self.rows: dict[str, Row] = {}
        self._shapes: tuple[tuple[str, tuple[str, ...]], ...] = ()
        self._grid = QGridLayout(self)
        self._grid.setContentsMargins(8, 0, 8, 0)
        self._grid.setHorizontalSpacing(12)
        self._grid.setVerticalSpacing(2)
        self._grid.setColumnStretch(1, 1)

    def show_fields(self, fields: Sequence[FieldFacts]) -> None:
        """Show these fields; controls stay where they are as long as the same ones are needed."""
        shapes = tuple(facts.shape for facts in fields)
        if shapes != self._shapes:
            self._shapes = shapes
            self._rebuild(fields)
        for facts in fields:
            self.rows[facts.column].show(facts, self._theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        for row in self.rows.values():
            row.set_theme(theme)

    def _rebuild(self, fields: Sequence[FieldFacts]) -> None:
        focused = next((column for column, row in self.rows.items() if row.control.hasFocus()), "")
        for row in self.rows.values():
            for part in (row.label, row.control, row.fault):
                self._grid.removeWidget(part)
                part.hide()
                part.deleteLater()
        self.rows = {}
        before: QWidget | None = None
        for place, facts in enumerate(fields):
            row = Row(facts, self._theme, self, self._typed)
            self._grid.addWidget(row.label, 2 * place, 0)
            side = Qt.AlignmentFlag(0) if facts.wide and not facts.options else Qt.AlignmentFlag.AlignLeft
            self._grid.addWidget(row.control, 2 * place, 1, side)
            self._grid.addWidget(row.fault, 2 * place + 1, 0, 1, 2)
            row.set_theme(self._theme)
            row.fault.hide()
            row.label.show()
            row.control.show()
            if before is not None:
                QWidget.setTabOrder(before, row.control)
            before = row.control
            self.rows[facts.column] = row
        if focused in self.rows:
            self.rows[focused].control.setFocus()
