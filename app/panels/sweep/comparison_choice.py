"""What the curves are compared with: conditions, other stacks, and the stack whose values are taken off."""

from collections.abc import Callable, Iterable
from functools import partial
from typing import Final

from PySide6.QtCore import QObject, QPoint, Signal
from PySide6.QtGui import QActionGroup
from PySide6.QtWidgets import QMenu

from app.document.session import Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.sweep.opener import QuietOpener
from app.series.cases import cases_of, conditions_shown

COMPARE: Final = "compare"
_TIP: Final = (
    "Show the envelope of the curves over conditions, the curves of other stacks beside them, or the difference to "
    "another stack."
)
_LONGEST: Final = 34


class ComparisonChoice(QObject):
    """The word of the quiet line that says what the curves are compared with, and its menu.

    Parameters
    ----------
    session
        For the names of stacks and conditions.
    view
        Where the choice is read and changed.
    """

    conditions_wanted = Signal()
    """The conditions are to be shown, to be made or changed."""

    def __init__(self, session: Session, view: View, theme: Theme) -> None:
        super().__init__()
        self._session, self._view = session, view
        self.opener = QuietOpener(theme, COMPARE, "Comparison", _TIP)
        self.opener.clicked.connect(lambda _: self._open_menu())
        self.menu: QMenu | None = None

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.opener.set_theme(theme)

    def show_view(self) -> None:
        """Say what is compared now."""
        told = self.sentence()
        text = told if len(told) <= _LONGEST else f"{told[: _LONGEST - 1].rstrip()}…"
        self.opener.setText(text or COMPARE)
        tip = f"{told}. {_TIP}" if told else _TIP
        self.opener.setToolTip(tip)
        self.opener.setStatusTip(tip)
        self.opener.setAccessibleDescription(tip)
        self.opener.updateGeometry()

    def sentence(self) -> str:
        """Return what is compared in words, or nothing."""
        record, state, here = self._session.record, self._view.state, self._session.selection.stack
        if not cases_of(record, here, state):
            return ""
        own = record.stacks[here].name
        names = [one.name for one in record.stacks if one.name != own]
        conditions = conditions_shown(record, state)
        beside = [name for name in names if name in state.beside]
        parts = (
            f"over {', '.join(conditions)}" if conditions else "",
            f"beside {', '.join(beside)}" if beside else "",
            f"less {state.less}" if state.less in names else "",
        )
        return "; ".join(part for part in parts if part)

    def _open_menu(self) -> None:
        menu = self.menu = QMenu(self.opener)
        record, state = self._session.record, self._view.state
        others = [one.name for place, one in enumerate(record.stacks) if place != self._session.selection.stack]
        menu.addSection("Envelope over conditions")
        for name in (one.name for one in record.conditions):
            self._tick(menu, name, name in state.conditions, partial(self._toggle_condition, name))
        menu.addAction("Conditions…", self.conditions_wanted.emit)
        if others:
            menu.addSection("Curves of other stacks beside")
            for name in others:
                self._tick(menu, name, name in state.beside, partial(self._toggle_beside, name))
            menu.addSection("Difference to another stack")
            self._add_differences(menu, others)
        menu.addSeparator()
        clear = menu.addAction("Compare with nothing", self._clear)
        clear.setEnabled(bool(state.conditions or state.beside or state.less))
        menu.aboutToHide.connect(menu.deleteLater)
        menu.popup(self.opener.mapToGlobal(QPoint(0, self.opener.height())))

    def _add_differences(self, menu: QMenu, others: Iterable[str]) -> None:
        group = QActionGroup(menu)
        for name in ("", *others):
            action = menu.addAction(f"Less {name}".replace("&", "&&") if name else "Values as they are")
            action.setCheckable(True)
            action.setChecked(self._view.state.less == name)
            group.addAction(action)
            action.triggered.connect(partial(self._take_off, name))

    @staticmethod
    def _tick(menu: QMenu, text: str, on: bool, run: Callable[[], None]) -> None:
        action = menu.addAction(text.replace("&", "&&"))
        action.setCheckable(True)
        action.setChecked(on)
        action.triggered.connect(run)

    def _toggle_condition(self, name: str) -> None:
        self._view.set(self, conditions=_toggled(self._view.state.conditions, name))

    def _toggle_beside(self, name: str) -> None:
        self._view.set(self, beside=_toggled(self._view.state.beside, name))

    def _take_off(self, name: str) -> None:
        self._view.set(self, less=name)

    def _clear(self) -> None:
        self._view.set(self, conditions=(), beside=(), less="")


def _toggled(names: tuple[str, ...], name: str) -> tuple[str, ...]:
    return tuple(one for one in names if one != name) if name in names else (*names, name)
