"""Undo and redo: the states that were, and a sentence for each step between them."""

import time
from collections.abc import Callable, Hashable
from dataclasses import dataclass, replace
from typing import Final

from app.document.document import Document, Selection

MERGE_SECONDS: Final = 1.0
"""Steps with the same `Brief` key no further apart than this become one."""


NEAR: Final = 50
"""Steps to either side of which the documents are kept ready; those further away are records, resolved when met."""


@dataclass(frozen=True, slots=True)
class Brief:
    """A merge key that joins only steps following each other within `MERGE_SECONDS`.

    For what has no clear end, such as a key pressed repeatedly. Any other merge key joins steps until
    `History.end_merge`: that of a drag, which may rest for as long as the hand does.
    """

    key: Hashable


@dataclass(frozen=True, slots=True)
class State:
    """A document and what was selected in it."""

    document: Document
    selection: Selection


@dataclass(frozen=True, slots=True)
class Step:
    """One edit as it was made: the states around it and the words for it."""

    before: State
    after: State
    sentence: str
    merge_key: Hashable | None


class History:
    """A line of steps and a position on it.

    Nothing is computed backwards: undoing gives back the very documents that were.

    Parameters
    ----------
    state
        Where the line begins.
    clock
        Seconds that only grow; tests give their own.
    """

    def __init__(self, state: State, clock: Callable[[], float] = time.monotonic) -> None:
        self._state = state
        self._saved = state.document.record
        self._steps: list[Step] = []
        self._position = 0
        self._clock = clock
        self._last_push = float("-inf")
        self._mergeable = False

    @property
    def state(self) -> State:
        """Where we are."""
        return self._state

    @property
    def modified(self) -> bool:
        """Whether the job differs from the one that was saved last (or that the line began with)."""
        record = self._state.document.record
        return record is not self._saved and record != self._saved

    @property
    def undo_sentence(self) -> str:
        """Words for the step that `undo` would take back, or an empty text."""
        return self._steps[self._position - 1].sentence if self._position else ""

    @property
    def redo_sentence(self) -> str:
        """Words for the step that `redo` would make again, or an empty text."""
        return self._steps[self._position].sentence if self._position < len(self._steps) else ""

    def push(self, after: State, sentence: str, merge_key: Hashable | None = None) -> None:
        """Go to `after` by a new step, or widen the last step when their merge keys agree.

        Steps that had been undone are given up. A step that has come back to its own start is dropped.
        """
        now = self._clock()
        step = Step(self._state, after, sentence, merge_key)
        del self._steps[self._position :]
        if self._joins(merge_key, now):
            step = replace(step, before=self._steps.pop().before)
        self._state = after
        if step.after.document == step.before.document:
            # The very document of before, so that nobody sees a difference where there is none.
            self._state = State(step.before.document, after.selection)
        else:
            self._steps.append(step)
        self._position = len(self._steps)
        self._last_push = now
        self._mergeable = True
        self._thin_out()

    def select(self, selection: Selection) -> None:
        """Change what is selected here; that is no step of its own."""
        self._state = replace(self._state, selection=selection)

    def undo(self) -> Step:
        """Go back over one step and return it; raises IndexError when there is none."""
        if not self._position:
            raise IndexError("nothing to undo")
        self.end_merge()
        self._position -= 1
        step = self._steps[self._position]
        self._state = step.before
        self._thin_out()
        return step

    def redo(self) -> Step:
        """Go forward over one step and return it; raises IndexError when there is none."""
        if self._position == len(self._steps):
            raise IndexError("nothing to redo")
        self.end_merge()
        step = self._steps[self._position]
        self._position += 1
        self._state = step.after
        self._thin_out()
        return step

    def _thin_out(self) -> None:
        """Let far documents be no more than their records: thousands of steps then take little memory."""
        behind, ahead = self._position - NEAR, self._position + NEAR
        if behind >= 0:
            self._steps[behind].before.document.job.forget()
        if ahead < len(self._steps):
            self._steps[ahead].after.document.job.forget()

    def mark_saved(self) -> None:
        """Remember the job of now as the one that was saved; later steps do not merge over this moment."""
        self._saved = self._state.document.record
        self.end_merge()

    def end_merge(self) -> None:
        """Let the next step stand for itself whatever its merge key."""
        self._mergeable = False

    def _joins(self, merge_key: Hashable | None, now: float) -> bool:
        if merge_key is None or not self._mergeable or not self._steps:
            return False
        if self._steps[-1].merge_key != merge_key:
            return False
        return not isinstance(merge_key, Brief) or now - self._last_push <= MERGE_SECONDS
