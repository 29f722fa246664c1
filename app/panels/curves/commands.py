"""What can be done in the plot: one table for its keys and its menu."""

from collections.abc import Callable, Iterable
from dataclasses import dataclass

from PySide6.QtCore import QPoint
from PySide6.QtGui import QKeyEvent, QKeySequence
from PySide6.QtWidgets import QMenu, QWidget


@dataclass(frozen=True, slots=True)
class Command:
    """One thing to do.

    Parameters
    ----------
    text
        In the menu; empty for a command that only a key gives.
    run
        Does it.
    keys
        Key sequences in Qt's portable spelling; the menu shows the first.
    tip
        One sentence, shown in the status line.
    checked
        For a command that is on or off: tells which.
    enabled
        Tells whether it can be done now.
    group
        Menu entries of a group stand together.
    """

    text: str
    run: Callable[[], None]
    keys: tuple[str, ...] = ()
    tip: str = ""
    checked: Callable[[], bool] | None = None
    enabled: Callable[[], bool] = lambda: True
    group: int = 0


def take_key(commands: Iterable[Command], event: QKeyEvent, run: bool) -> bool:
    """Find the command of a key and run it if asked to; tell whether there is one."""
    pressed = QKeySequence(event.keyCombination())
    for command in commands:
        if any(QKeySequence(key) == pressed for key in command.keys):
            if run and command.enabled():
                command.run()
            return True
    return False


def open_menu(commands: Iterable[Command], parent: QWidget, at: QPoint) -> QMenu:
    """Open the menu of the commands that have a text, without waiting for the answer."""
    menu = QMenu(parent)
    menu.setToolTipsVisible(True)
    group = None
    for command in commands:
        if not command.text:
            continue
        if group is not None and command.group != group:
            menu.addSeparator()
        group = command.group
        keys = [QKeySequence(key).toString(QKeySequence.SequenceFormat.NativeText) for key in command.keys[:1]]
        action = menu.addAction("\t".join([command.text, *keys]))
        action.setToolTip(command.tip)
        action.setStatusTip(command.tip)
        action.setEnabled(command.enabled())
        if command.checked is not None:
            action.setCheckable(True)
            action.setChecked(command.checked())
        action.triggered.connect(lambda _=False, run=command.run: run())
    menu.aboutToHide.connect(menu.deleteLater)
    menu.popup(at)
    return menu
