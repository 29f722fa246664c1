"""What the menus Edit and Stack ask and do: on the selected elements, and on the stack that is looked at."""

from collections.abc import Callable

from app.document import edits
from app.document.document import Selection
from app.document.edit import Edit
from app.document.session import Session
from stackcore.errors import Severity

Tell = Callable[[str, Severity], None]


class ElementQuestions:
    """What can be done with the selected elements now."""

    def __init__(self, session: Session) -> None:
        self._session = session

    def any_selected(self) -> bool:
        """Whether at least one element is selected."""
        return bool(self._session.selection.rows)

    def can_rise(self) -> bool:
        """Whether the selected elements can move towards the front."""
        rows = self._session.selection.rows
        return bool(rows) and rows != tuple(range(len(rows)))

    def can_sink(self) -> bool:
        """Whether the selected elements can move towards the back."""
        selection = self._session.selection
        rows, count = selection.rows, len(self._session.record.stacks[selection.stack].elements)
        return bool(rows) and rows != tuple(range(count - len(rows), count))


class StackCommands:
    """Edits of the list of stacks, and which of them is looked at."""

    def __init__(self, session: Session, tell: Tell) -> None:
        self._session = session
        self._tell = tell

    def several(self) -> bool:
        """Whether the job has more than one stack."""
        return len(self._session.record.stacks) > 1

    def add(self) -> None:
        """Add an empty stack and look at it."""
        self._apply(edits.add_stack())

    def duplicate(self) -> None:
        """Put a copy of the stack behind it and look at the copy."""
        self._apply(edits.duplicate_stack(self._session.selection.stack))

    def delete(self) -> None:
        """Delete the stack; the last one stays."""
        self._apply(edits.delete_stack(self._session.selection.stack))

    def next(self) -> None:
        """Look at the next stack, after the last at the first."""
        self._look(1)

    def previous(self) -> None:
        """Look at the stack before, before the first at the last."""
        self._look(-1)

    def _look(self, step: int) -> None:
        count = len(self._session.record.stacks)
        self._session.select(Selection((self._session.selection.stack + step) % count))

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit):
            self._tell(str(fault), fault.severity)
