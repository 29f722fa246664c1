"""The keyboard page: keys of the menus from the table of actions, of the plot from its own table, and the rest."""

from collections.abc import Iterable
from typing import Final

from app.panels.curves.commands import Command
from app.window.actions import Act, keys_text
from app.window.help_pages import KeyGroup

EVERYWHERE: Final[KeyGroup] = (
    "Everywhere",
    (("Tab, Shift+Tab", "Next, previous control"), ("Esc", "Leave a field as it was; dismiss the message")),
)
TABLE: Final[KeyGroup] = (
    "In the table",
    (
        ("Any letter, F2", "Type into the cell"),
        ("Enter", "Keep what was typed and go down"),
        ("Tab, Shift+Tab", "Next, previous cell that can be typed into"),
        ("Insert", "Add a layer behind the selected element"),
        ("Shift+Insert", "Add a sheet behind the selected element"),
        ("Shift+Up, Shift+Down", "Select several elements"),
    ),
)
WALL: Final[KeyGroup] = (
    "In the wall drawing",
    (
        ("Left, Right", "Select the element before, behind"),
        ("Home, End", "Select the first, the last element"),
        ("+, −", "Make the selected layers thicker, thinner by a step"),
        ("Alt+Right, Alt+Left", "The same; with Shift by a tenth of a step"),
        ("Enter", "Type the thickness in the table"),
    ),
)
# Keys of the plot that stand in no menu, and so have no words there.
PLOT_MORE: Final = (
    ("Left, Right", "Move the marker along the sweep"),
    ("Up, Down", "Choose another curve"),
    ("N, P", "Next, previous marker"),
    ("+, −", "Zoom in, out"),
    ("Shift and arrows", "Move the visible part"),
)


def key_groups(table: Iterable[Act], plot: Iterable[Command]) -> tuple[KeyGroup, ...]:
    """Return the keys under headings: first what panels handle, then menu by menu."""
    menus: dict[str, list[tuple[str, str]]] = {}
    for act in table:
        if act.shortcuts:
            menus.setdefault(act.menu.replace("&", ""), []).append((keys_text(act.shortcuts), act.plain_text))
    native = [(keys_text(command.keys), command.text) for command in plot if command.text and command.keys]
    in_plot: KeyGroup = ("In the plot", (*PLOT_MORE, *native))
    in_menus = tuple((f"Menu {name}", tuple(lines)) for name, lines in menus.items())
    return (EVERYWHERE, TABLE, WALL, in_plot, *in_menus)
