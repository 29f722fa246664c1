"""Messages: one at a time, nothing lost behind another, buttons that act, notes that pass by."""

import pytest
from PySide6.QtWidgets import QPlainTextEdit, QPushButton
from pytestqt.qtbot import QtBot

from app.look.colour import contrast, mix
from app.look.theme import DARK, LIGHT, Theme
from app.window.messages import KEPT, Choice, Message, Messages, MessageStrip


@pytest.fixture
def messages(qtbot: QtBot) -> Messages:
    """No messages yet."""
    return Messages()


@pytest.fixture
def strip(qtbot: QtBot, messages: Messages) -> MessageStrip:
    """A strip that shows `messages`."""
    strip = MessageStrip(messages, LIGHT)
    qtbot.addWidget(strip)
    return strip


def test_a_note_passes_by_and_the_rest_stays(qtbot: QtBot, messages: Messages) -> None:
    """A note goes to the status line; a warning waits to be dismissed."""
    with qtbot.waitSignal(messages.noted) as noted:
        messages.tell("Saved.")
    assert noted.args == ["Saved."]
    assert messages.shown is None
    messages.tell("Mind the gap.", "warning")
    assert messages.shown == Message("warning", "Mind the gap.")


def test_older_messages_come_back_when_newer_are_dismissed(messages: Messages) -> None:
    """The newest covers the others; dismissing goes back one by one; equal words are one message."""
    for text in ("one", "two", "one"):
        messages.tell(text, "error")
    assert messages.shown is not None
    assert (messages.shown.text, messages.hidden) == ("one", 1)
    messages.dismiss()
    assert messages.shown.text == "two"
    messages.dismiss()
    messages.dismiss()
    assert messages.shown is None


def test_a_flood_of_messages_is_bounded(messages: Messages) -> None:
    """A thousand different messages keep only the newest few."""
    for number in range(1000):
        messages.tell(f"fault {number}", "error")
    assert messages.hidden == KEPT - 1


def test_a_message_that_no_longer_holds_is_withdrawn(messages: Messages) -> None:
    """Withdrawing takes away the message with these words wherever it stands."""
    messages.tell("cannot be computed", "error")
    messages.tell("other", "error")
    messages.withdraw("cannot be computed")
    assert messages.hidden == 0
    messages.withdraw("never said")
    assert messages.shown is not None


def test_the_strip_shows_text_details_and_buttons(strip: MessageStrip, messages: Messages) -> None:
    """A button acts and dismisses; details are all there; without messages the strip is hidden."""
    done: list[str] = []
    assert strip.isHidden()
    details = tuple(f"place {number}: wrong" for number in range(30))
    messages.show(Message("error", "30 faults", (Choice("Open again", lambda: done.append("again")),), details))
    assert not strip.isHidden()
    assert strip.accessibleName() == "Fault: 30 faults"
    (shown,) = strip.findChildren(QPlainTextEdit)
    assert shown.toPlainText().splitlines() == list(details)
    button = next(button for button in strip.findChildren(QPushButton) if button.text() == "Open again")
    button.click()
    assert done == ["again"]
    assert strip.isHidden()


@pytest.mark.parametrize("theme", [LIGHT, DARK], ids=["light", "dark"])
@pytest.mark.parametrize("ink", ["fault", "warning", "accent"])
def test_words_of_the_strip_are_readable_on_its_ground(theme: Theme, ink: str) -> None:
    """The tinted ground of a message keeps the contrast of text."""
    ground = mix(theme.base, getattr(theme, ink), 0.06)
    assert contrast(getattr(theme, ink), ground) >= 4.5
    assert contrast(theme.text, ground) >= 4.5
