"""What the very first start says: a message that one click dismisses, and that never comes again."""

from typing import Final, Protocol

from PySide6.QtCore import QSettings

from app.window.messages import Choice, Message, Messages

SEEN_KEY: Final = "first-run/seen"
TEXT: Final = "New here? Six first steps lead from a wall to what you hand on. They stay in the menu Help."


class Guided(Protocol):
    """A window that can show a page of help."""

    messages: Messages

    def show_help(self, page: str) -> None:
        """Show a page."""


def greet(window: Guided, settings: QSettings) -> None:
    """Offer the first steps at the first start with these settings, and at no other."""
    if settings.value(SEEN_KEY, False, type=bool):
        return
    settings.setValue(SEEN_KEY, True)
    choices = (
        Choice("Show the first steps", lambda: window.show_help("start")),
        Choice("No, thanks", lambda: None),
    )
    window.messages.show(Message("note", TEXT, choices))
