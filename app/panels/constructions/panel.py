"""The panel of constructions: choose a wall as it is built, see it sized, put it into the job."""

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtGui import QShowEvent
from PySide6.QtWidgets import QHBoxLayout, QScrollArea, QWidget

from app.document.construction_edits import insert_construction, stack_of_construction
from app.document.edit import Edit
from app.document.session import Change, Session
from app.look.theme import Theme
from app.panels.constructions.choice import Choosing, Outcome, fields_of, outcome
from app.panels.constructions.preview import Preview
from app.panels.material_data.form import Form
from app.panels.materials.pieces import button, column, ink, words
from app.panels.sweep.field import QuietChoice
from stackcore.constructions import CONSTRUCTIONS, Built
from stackcore.errors import Severity

Tell = Callable[[str, Severity], None]

NEW_TIP = "Add a stack of its own made of this construction, to compare it with the others."
INSERT_TIP = "Put the elements before the selected row of this stack, or at its end when none is selected."
PICK_TIP = "Walls with their bonds, paint and coats, sized by a rule that is told below."


class ConstructionsPanel(QWidget):
    """A form over the table of constructions.

    Parameters
    ----------
    session
        Whose sweep sizes the construction, whose materials can be chosen, and which takes the result.
    tell
        Says why something was refused.
    """

    def __init__(self, session: Session, theme: Theme, tell: Tell, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session, self._tell, self._theme = session, tell, theme
        self._choosing = Choosing()
        self._outcome: Outcome | None = None
        self._stands_for: object = None
        self.pick = QuietChoice(theme, "Construction", PICK_TIP, self)
        for key, construction in CONSTRUCTIONS.items():
            self.pick.addItem(construction.label, key)
        self.pick.activated.connect(lambda _index: self.choose(self.pick.currentData()))
        self.about = words("", self)
        self.preview = Preview(theme, self)
        self.form = Form(theme, self.type_into, self)
        self.rule, self.source, self.cautions = words("", self), words("", self), words("", self)
        for label in (self.rule, self.source, self.cautions):
            label.setTextInteractionFlags(Qt.TextInteractionFlag.TextSelectableByMouse)
        self.insert = button(self, "Insert here", INSERT_TIP, self.insert_here)
        self.add = button(self, "New stack", NEW_TIP, self.add_stack)
        self._arrange()
        self.destroyed.connect(session.subscribe(self._follow))
        self.set_theme(theme)
        # Nothing is shown before it is looked at: the library would be read at the start of the program.

    @property
    def choosing(self) -> Choosing:
        """What is chosen now."""
        return self._choosing

    def choose(self, key: str) -> None:
        """Choose a construction."""
        self._take(self._choosing.with_key(key))

    def type_into(self, name: str, text: str) -> None:
        """Take a text for an option or for what it is sized for; an empty one is the default again."""
        self._take(self._choosing.with_text(name, text))

    def insert_here(self) -> None:
        """Put the elements into the stack that is looked at."""
        selection = self._session.selection
        count = len(self._session.record.stacks[selection.stack].elements)
        row = selection.rows[0] if selection.rows else count
        self._apply(lambda label, built: insert_construction(selection.stack, row, label, built))

    def add_stack(self) -> None:
        """Make a new stack of the elements."""
        self._apply(stack_of_construction)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.pick.set_theme(theme)
        self.preview.set_theme(theme)
        self.form.set_theme(theme)
        for label, colour in (
            (self.about, theme.muted),
            (self.rule, theme.text),
            (self.source, theme.muted),
            (self.cautions, theme.muted),
        ):
            ink(label, colour)

    def _arrange(self) -> None:
        inside = QWidget(self)
        rows = column(inside)
        for part in (self.about, self.form, self.rule, self.source, self.cautions):
            rows.addWidget(part)
        rows.addStretch(1)
        area = QScrollArea(self)
        area.setWidgetResizable(True)
        area.setFrameShape(QScrollArea.Shape.NoFrame)
        area.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        area.setWidget(inside)
        choices = QHBoxLayout()
        choices.setContentsMargins(8, 4, 8, 0)
        choices.addWidget(self.pick)
        choices.addStretch(1)
        deeds = QHBoxLayout()
        deeds.setContentsMargins(4, 0, 4, 4)
        deeds.addWidget(self.insert)
        deeds.addWidget(self.add)
        deeds.addStretch(1)
        whole = column(self)
        whole.addLayout(choices)
        whole.addWidget(self.preview)
        whole.addWidget(area, 1)
        whole.addLayout(deeds)
        self.setFocusProxy(self.pick)
        self.setMinimumWidth(260)

    def _take(self, choosing: Choosing) -> None:
        if choosing != self._choosing:
            self._choosing = choosing
            if self.isVisible():
                self._show()

    def _follow(self, change: Change) -> None:
        # The curves move at every step of a drag; what is shown here follows sweep and materials only.
        if change.after.record.sweep != change.before.record.sweep or (
            change.after.record.materials != change.before.record.materials
        ):
            self._stands_for = None
            if self.isVisible():
                self._show()

    def showEvent(self, event: QShowEvent) -> None:
        """Show what the job has become meanwhile."""
        self._show()

    def _show(self) -> None:
        job = self._session.job
        stands_for = (self._choosing, job.record.sweep, job.record.materials)
        if stands_for == self._stands_for:
            return
        self._stands_for = stands_for
        self._outcome = result = outcome(self._choosing, job)
        construction = self._choosing.construction
        self.pick.show_choice(self._choosing.key)
        self.about.setText(construction.about)
        self.form.show_fields(fields_of(self._choosing, job, result.faults))
        self.preview.show_job(result.preview)
        built = result.built
        known = set(self.form.rows)
        left = [str(fault) for fault in result.faults if fault.path not in known]
        self.rule.setText(built.rule if built is not None else "\n".join(left) or "See the fields above.")
        self.source.setText(f"Rule: {built.source}." if built is not None else "")
        self.cautions.setText("\n".join(built.cautions) if built is not None else "")
        for deed in (self.insert, self.add):
            deed.setEnabled(built is not None)

    def _apply(self, edit: Callable[[str, Built], Edit]) -> None:
        if self._outcome is None or self._outcome.built is None:
            return
        label = self._choosing.construction.label
        for fault in self._session.apply(edit(label, self._outcome.built), self):
            self._tell(str(fault), fault.severity)
