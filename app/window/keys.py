"""The keyboard page: keys of the menus from the table of actions, and those that a panel handles itself."""

from collections.abc import Iterable
from typing import Final

from app.window.actions import Act, keys_text
from app.window.help_pages import KeyGroup

PANELS: Final[tuple[KeyGroup, ...]] = (
    ("Everywhere", (("Tab, Shift+Tab", "Next, previous control"), ("Esc", "Dismiss the message"))),
)


def key_groups(table: Iterable[Act]) -> tuple[KeyGroup, ...]:
    """Return the keys under headings: first what panels handle, then menu by menu."""
    menus: dict[str, list[tuple[str, str]]] = {}
    for act in table:
        if act.shortcuts:
            menus.setdefault(act.menu.replace("&", ""), []).append((keys_text(act), act.plain_text))
    return (*PANELS, *((f"Menu {name}", tuple(lines)) for name, lines in menus.items()))
