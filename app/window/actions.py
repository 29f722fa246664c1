"""The one kind of row of which menus, shortcuts, tips and the keyboard page are made, and what is made of it."""

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from typing import Final, Literal

from PySide6.QtCore import Qt
from PySide6.QtGui import QAction, QActionGroup, QKeySequence
from PySide6.QtWidgets import QMenu, QMenuBar, QWidget

LONGEST: Final = 64
"""Letters of a menu entry before it is cut; the whole sentence is in its tip."""

Place = Literal["window", "elements"]


def always() -> bool:
    """Return True: what can be done at any time."""
    return True


@dataclass(frozen=True, slots=True)
class Entry:
    """One line of a submenu that is filled each time it opens."""

    text: str
    run: Callable[[], None]
    enabled: bool = True
    tip: str = ""


@dataclass(frozen=True, slots=True)
class Act:
    """One thing a person can do.

    Parameters
    ----------
    key
        Its name in the program: ``file.save``.
    menu
        Title of the menu it stands in.
    text
        Words in the menu, with ``&`` before the access key.
    run
        Does it.
    shortcuts
        Key sequences in Qt's portable spelling; the menu shows the first.
    tip
        One sentence: what it does.
    enabled
        Tells whether it can be done now.
    words
        Gives the words when they change, as for undo.
    checked
        For what is on or off: tells which.
    choice
        Name of the set of which one is on, as for themes.
    place
        Where the shortcuts work: everywhere in the window, or while the elements (table or drawing) have the
        focus, so that Delete in a text field deletes a letter.
    group
        Entries of a menu with one number stand together.
    entries
        Makes the lines of a submenu; then `run` is not used.
    """

    key: str
    menu: str
    text: str
    run: Callable[[], None]
    shortcuts: tuple[str, ...] = ()
    tip: str = ""
    enabled: Callable[[], bool] = always
    words: Callable[[], str] | None = None
    checked: Callable[[], bool] | None = None
    choice: str = ""
    place: Place = "window"
    group: int = 0
    entries: Callable[[], Sequence[Entry]] | None = None

    @property
    def plain_text(self) -> str:
        """The words without marks for the access key or for a question to come."""
        return self.text.replace("&", "").rstrip("…")


class Actions:
    """The Qt actions and menus made of the table.

    Parameters
    ----------
    table
        Every act, in the order of the menus.
    window
        Owner; shortcuts of the place ``window`` work while it is active.
    elements
        The widgets in which the shortcuts of the place ``elements`` work.
    """

    def __init__(self, table: Sequence[Act], window: QWidget, elements: Iterable[QWidget]) -> None:
        self.table = tuple(table)
        self._window = window
        self._elements = tuple(elements)
        self._choices: dict[str, QActionGroup] = {}
        self._qt = {act.key: self._make(act) for act in self.table if act.entries is None}
        self.refresh()

    def __getitem__(self, key: str) -> QAction:
        """Return the Qt action of an act by its key."""
        return self._qt[key]

    def refresh(self) -> None:
        """Ask every act anew whether it can be done, its words, and whether it is on."""
        for act in self.table:
            action = self._qt.get(act.key)
            if action is None:
                continue
            action.setEnabled(act.enabled())
            if act.words is not None:
                words = act.words()
                action.setText(words if len(words) <= LONGEST else words[: LONGEST - 1] + "…")
                action.setToolTip(words.replace("&", ""))
            if act.checked is not None:
                action.setChecked(act.checked())

    def words_and_keys(self, key: str) -> tuple[str, str]:
        """Return the words of an act and its keys for reading, the latter empty where it has none."""
        act = next(act for act in self.table if act.key == key)
        return act.plain_text, keys_text(act.shortcuts)

    def chosen(self, menus: Iterable[str], owner: QWidget) -> list[QAction]:
        """Return the actions of some menus in their order, a separator between groups, for a menu beside."""
        found: list[QAction] = []
        before: tuple[str, int] | None = None
        for act in self.table:
            action = self._qt.get(act.key)
            if action is None or act.menu not in menus:
                continue
            if before is not None and before != (act.menu, act.group):
                line = QAction(owner)
                line.setSeparator(True)
                found.append(line)
            before = (act.menu, act.group)
            found.append(action)
        return found

    def fill(self, bar: QMenuBar) -> None:
        """Put every act into its menu."""
        menus: dict[str, QMenu] = {}
        last_group: dict[str, int] = {}
        for act in self.table:
            if act.menu not in menus:
                menus[act.menu] = bar.addMenu(act.menu)
                menus[act.menu].setToolTipsVisible(True)
                menus[act.menu].aboutToShow.connect(self.refresh)
            menu = menus[act.menu]
            if last_group.setdefault(act.menu, act.group) != act.group:
                menu.addSeparator()
                last_group[act.menu] = act.group
            if act.entries is None:
                menu.addAction(self._qt[act.key])
            else:
                _add_submenu(menu, act)

    def _make(self, act: Act) -> QAction:
        action = QAction(act.text, self._window)
        action.setObjectName(act.key)
        action.setShortcuts([QKeySequence(keys) for keys in act.shortcuts])
        action.setToolTip(act.tip)
        action.setStatusTip(act.tip)
        action.setMenuRole(QAction.MenuRole.NoRole)
        action.setCheckable(act.checked is not None)
        if act.choice:
            group = self._choices.setdefault(act.choice, QActionGroup(self._window))
            group.addAction(action)
        if act.place == "elements":
            action.setShortcutContext(Qt.ShortcutContext.WidgetWithChildrenShortcut)
            for widget in self._elements:
                widget.addAction(action)
        else:
            self._window.addAction(action)
        action.triggered.connect(lambda _=False: self._run(act))
        return action

    def _run(self, act: Act) -> None:
        # A shortcut can arrive before the last refresh did.
        if act.enabled():
            act.run()
        self.refresh()


def _add_submenu(menu: QMenu, act: Act) -> None:
    submenu = menu.addMenu(act.text)
    submenu.setToolTipsVisible(True)
    submenu.setObjectName(act.key)
    submenu.menuAction().setStatusTip(act.tip)

    def fill() -> None:
        submenu.clear()
        for entry in act.entries() if act.entries is not None else ():
            action = submenu.addAction(entry.text)
            action.setEnabled(entry.enabled)
            action.setToolTip(entry.tip)
            action.triggered.connect(lambda _=False, run=entry.run: run())

    submenu.aboutToShow.connect(fill)
    fill()


def keys_text(shortcuts: Iterable[str]) -> str:
    """Return key sequences for reading: ``Ctrl+Y or Ctrl+Shift+Z``."""
    native = QKeySequence.SequenceFormat.NativeText
    return " or ".join(QKeySequence(keys).toString(native) for keys in shortcuts)
