"""What the menus Edit and Stack ask and do: on the selected elements, and on the stack that is looked at."""

from collections.abc import Callable

from app.document import edits
from app.document.document import Selection
from app.document.edit import Edit
from app.document.session import Session
from stackcore.errors import Severity
from stackcore.job.groups import group_of
from stackcore.job.records import ElementRecord, LayerRecord, StackRecord

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


class StructureCommands:
    """What is done to the selected elements as parts of a whole: use, lock, group, mirror, reverse, fill."""

    def __init__(self, session: Session, tell: Tell) -> None:
        self._session, self._tell = session, tell

    def used(self) -> bool:
        """Whether every selected element is computed."""
        chosen = self._chosen()
        return bool(chosen) and all(element.enabled for element in chosen)

    def locked(self) -> bool:
        """Whether every selected layer is locked."""
        chosen = self._layers()
        return bool(chosen) and all(self._stack.elements[row].locked for row in chosen)

    def any_layer(self) -> bool:
        """Whether a selected element has a thickness to lock."""
        return bool(self._layers())

    def can_group(self) -> bool:
        """Whether elements are selected, none of which is in a group already."""
        return self.any_selected() and not self.in_a_group()

    def can_mirror(self) -> bool:
        """Whether there are two elements or more to mirror."""
        return len(self._stack.elements) > 1

    def any_selected(self) -> bool:
        """Whether at least one element is selected."""
        return bool(self._session.selection.rows)

    def several(self) -> bool:
        """Whether at least two elements are selected."""
        return len(self._session.selection.rows) > 1

    def in_a_group(self) -> bool:
        """Whether a selected element is in a group."""
        stack = self._stack
        return any(group_of(stack, row) is not None for row in self._session.selection.rows)

    def any_elements(self) -> bool:
        """Whether the stack has elements."""
        return bool(self._stack.elements)

    def use(self) -> None:
        """Compute the selected elements, or leave them out."""
        selection = self._session.selection
        self._apply(edits.set_enabled(selection.stack, selection.rows, not self.used()))

    def lock(self) -> None:
        """Lock the thickness of the selected layers, or unlock it."""
        self._apply(edits.set_locked(self._session.selection.stack, self._layers(), not self.locked()))

    def group(self) -> None:
        """Repeat the selected elements as a group, twice at first; the count stands in the table."""
        selection = self._session.selection
        self._apply(edits.group_rows(selection.stack, selection.rows))

    def end_group(self) -> None:
        """Let the elements of the group stand once each."""
        selection = self._session.selection
        self._apply(edits.ungroup(selection.stack, selection.rows))

    def write_out(self) -> None:
        """Write the group out, element by element."""
        selection = self._session.selection
        self._apply(edits.ungroup(selection.stack, selection.rows, written_out=True))

    def mirror(self) -> None:
        """Make the selected elements, or the whole stack, symmetric about the last of them."""
        selection = self._session.selection
        self._apply(edits.mirror(selection.stack, selection.rows if self.several() else ()))

    def reverse(self) -> None:
        """Turn the selected elements, or the whole stack, round."""
        selection = self._session.selection
        self._apply(edits.reverse(selection.stack, selection.rows if self.several() else ()))

    def fill(self) -> None:
        """Give the selected elements what the first of them is made of."""
        selection = self._session.selection
        self._apply(edits.fill_elements(selection.stack, selection.rows))

    @property
    def _stack(self) -> StackRecord:
        return self._session.record.stacks[self._session.selection.stack]

    def _layers(self) -> list[int]:
        rows = self._session.selection.rows
        return [row for row in rows if isinstance(self._stack.elements[row], LayerRecord)]

    def _chosen(self) -> list[ElementRecord]:
        return [self._stack.elements[row] for row in self._session.selection.rows]

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit):
            self._tell(str(fault), fault.severity)


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
