"""What the menus Edit, Stack and Markers do: each method one edit of the session or one change of the view."""

from collections.abc import Callable
from typing import Final

from app.document import edits
from app.document.document import Selection
from app.document.edit import Edit
from app.document.session import Session
from app.window.dialogs import Dialogs
from stackcore.errors import Severity
from stackcore.job.records import LayerRecord
from stackcore.units import Dimension, Measure, parse_measure

Tell = Callable[[str, Severity], None]

NEW_THICKNESS: Final = "1 mm"


class ElementCommands:
    """Edits of the selected elements of the stack that is looked at."""

    def __init__(self, session: Session, tell: Tell) -> None:
        self._session = session
        self._tell = tell

    def any_selected(self) -> bool:
        """Whether at least one element is selected."""
        return bool(self._session.selection.rows)

    def can_rise(self) -> bool:
        """Whether the selected elements can move towards the front."""
        rows = self._session.selection.rows
        return bool(rows) and rows != tuple(range(len(rows)))

    def can_sink(self) -> bool:
        """Whether the selected elements can move towards the back."""
        rows, count = self._session.selection.rows, self._count()
        return bool(rows) and rows != tuple(range(count - len(rows), count))

    def add_layer(self) -> None:
        """Add a layer like the one selected behind it, of 1 mm."""
        self._apply(edits.add_layer(self._stack, self._behind(), *self._new_layer()))

    def add_sheet(self) -> None:
        """Add a resistive sheet behind the selection."""
        self._apply(edits.add_sheet(self._stack, self._behind()))

    def duplicate(self) -> None:
        """Duplicate the selected elements."""
        self._apply(edits.duplicate(self._stack, self._rows))

    def delete(self) -> None:
        """Delete the selected elements."""
        self._apply(edits.delete(self._stack, self._rows))

    def rise(self) -> None:
        """Move the selected elements one place towards the front."""
        self._apply(edits.move(self._stack, self._rows, max(self._rows[0] - 1, 0)))

    def sink(self) -> None:
        """Move the selected elements one place towards the back."""
        self._apply(edits.move(self._stack, self._rows, min(self._rows[-1] + 2, self._count())))

    @property
    def _stack(self) -> int:
        return self._session.selection.stack

    @property
    def _rows(self) -> tuple[int, ...]:
        return self._session.selection.rows

    def _count(self) -> int:
        return len(self._session.record.stacks[self._stack].elements)

    def _behind(self) -> int:
        return self._rows[-1] + 1 if self._rows else self._count()

    def _new_layer(self) -> tuple[str, Measure]:
        elements = self._session.record.stacks[self._stack].elements
        behind = self._behind()
        before = [element for element in elements[:behind] if isinstance(element, LayerRecord)]
        materials = self._session.record.materials
        first = materials[0].name if materials else "air"
        material = before[-1].material if before else first
        return material, parse_measure(NEW_THICKNESS, Dimension.LENGTH)

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit):
            self._tell(str(fault), fault.severity)


class StackCommands:
    """Edits of the list of stacks, and which of them is looked at."""

    def __init__(self, session: Session, dialogs: Dialogs, tell: Tell) -> None:
        self._session = session
        self._dialogs = dialogs
        self._tell = tell

    def several(self) -> bool:
        """Whether the job has more than one stack."""
        return len(self._session.record.stacks) > 1

    def add(self) -> None:
        """Add an empty stack and look at it."""
        self._apply(edits.add_stack())

    def duplicate(self) -> None:
        """Put a copy of the stack behind it and look at the copy."""
        self._apply(edits.duplicate_stack(self._stack))

    def rename(self) -> None:
        """Ask for another name of the stack."""
        name = self._session.record.stacks[self._stack].name
        self._dialogs.ask_text("Rename stack", "Name of the stack", name, self._rename)

    def delete(self) -> None:
        """Delete the stack; the last one stays."""
        self._apply(edits.delete_stack(self._stack))

    def next(self) -> None:
        """Look at the next stack, after the last at the first."""
        self._look(1)

    def previous(self) -> None:
        """Look at the stack before, before the first at the last."""
        self._look(-1)

    @property
    def _stack(self) -> int:
        return self._session.selection.stack

    def _look(self, step: int) -> None:
        count = len(self._session.record.stacks)
        self._session.select(Selection((self._stack + step) % count))

    def _rename(self, name: str) -> None:
        if name.strip() != self._session.record.stacks[self._stack].name:
            self._apply(edits.rename_stack(self._stack, name))

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit):
            self._tell(str(fault), fault.severity)
