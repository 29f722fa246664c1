"""The first start offers the first steps once; one click dismisses them, and they stay in the menu Help."""

from pathlib import Path

import pytest
from PySide6.QtCore import QSettings

from app.look.theme import LIGHT
from app.window.first_run import TEXT, greet
from app.window.help_pages import STEPS, first_steps_page
from tests.app.window.conftest import Bench


@pytest.fixture
def settings(tmp_path: Path) -> QSettings:
    """Settings of a new user."""
    return QSettings(str(tmp_path / "fresh.ini"), QSettings.Format.IniFormat)


def test_it_greets_once(bench: Bench, settings: QSettings) -> None:
    """At the second start nothing is said."""
    greet(bench.window, settings)
    shown = bench.window.messages.shown
    assert shown is not None
    assert shown.text == TEXT
    bench.window.messages.dismiss()
    greet(bench.window, settings)
    assert bench.window.messages.shown is None


def test_the_steps_are_one_click_away(bench: Bench, settings: QSettings) -> None:
    """The first button opens the page; the menu has it too."""
    greet(bench.window, settings)
    shown = bench.window.messages.shown
    assert shown is not None
    shown.choices[0].act()
    assert bench.window.panels.help.isVisible()
    bench.trigger("help.start")
    assert bench.window.panels.help.isVisible()


def test_every_step_names_keys_that_are_true(bench: Bench) -> None:
    """Words and keys come from the table of actions, so that they cannot be wrong."""
    page = first_steps_page(LIGHT, bench.window.actions_table.words_and_keys)
    for step in STEPS:
        for key in step.acts:
            words, keys = bench.window.actions_table.words_and_keys(key)
            assert words.replace("&", "&amp;") in page
            assert keys in page
