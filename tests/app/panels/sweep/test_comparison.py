"""What the curves are compared with: the word on the quiet line and its menu."""

import pytest
from PySide6.QtGui import QAction
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.theme import LIGHT
from app.panels.sweep.comparison_choice import COMPARE, ComparisonChoice
from app.window.samples import samples
from stackcore.job import read_job

pytestmark = pytest.mark.qt_log_ignore("This plugin does not support", extend=True)
"""Menus make the offscreen platform say what it cannot do."""


class Bench:
    """The choice on a radar cover of three stacks."""

    def __init__(self, qtbot: QtBot) -> None:
        cover = next(one for one in samples() if "radar" in one.path.name)
        self.session, self.view = Session(read_job(cover.path)), View()
        self.choice = ComparisonChoice(self.session, self.view, LIGHT)
        qtbot.addWidget(self.choice.opener)
        self.view.subscribe(lambda _: self.choice.show_view())
        self.session.subscribe(lambda _: self.choice.show_view())
        self.choice.opener.show()
        qtbot.waitExposed(self.choice.opener)

    def actions(self) -> list[QAction]:
        """Open the menu and return its entries."""
        self.choice.opener.click()
        assert self.choice.menu is not None
        return [one for one in self.choice.menu.actions() if not one.isSeparator()]

    def choose(self, words: str, nth: int = 0) -> None:
        """Choose an entry of the menu by its text."""
        found = [one for one in self.actions() if one.text() == words][nth]
        assert self.choice.menu is not None
        self.choice.menu.close()
        found.trigger()


@pytest.fixture
def bench(qtbot: QtBot) -> Bench:
    """A bench on the radar cover."""
    return Bench(qtbot)


def test_nothing_is_compared_at_first(bench: Bench) -> None:
    """The word says what it is for, and the menu has nothing ticked but the plain values."""
    bench.choice.show_view()
    assert bench.choice.opener.text() == COMPARE
    assert [one.text() for one in bench.actions() if one.isChecked()] == ["Values as they are"]


def test_other_stacks_are_put_beside_and_taken_off(bench: Bench) -> None:
    """Every other stack is offered for both, the one in hand for neither; the word says what was chosen."""
    own, *others = [stack.name for stack in bench.session.record.stacks]
    texts = [one.text() for one in bench.actions()]
    assert own not in texts
    assert f"Less {own}" not in texts
    assert all(f"Less {other}" in texts for other in others)
    bench.choose(others[0])
    bench.choose(f"Less {others[1]}")
    assert list(bench.view.state.beside) == [others[0]]
    assert bench.view.state.less == others[1]
    told = bench.choice.sentence()
    assert told == f"beside {others[0]}; less {others[1]}"
    assert told in bench.choice.opener.toolTip()
    bench.choose(others[0])
    assert not bench.view.state.beside
    bench.choose("Compare with nothing")
    assert bench.choice.opener.text() == COMPARE


def test_conditions_make_the_envelope(bench: Bench) -> None:
    """A condition of the job is offered; where to make one is one step away."""
    bench.session.apply(edits.new_condition())
    bench.choose("Condition")
    assert bench.view.state.conditions == ("Condition",)
    assert bench.choice.sentence() == "over Condition"
    asked: list[bool] = []
    bench.choice.conditions_wanted.connect(lambda: asked.append(True))
    bench.choose("Conditions…")
    assert asked == [True]


def test_the_word_stays_short_and_the_hint_whole(bench: Bench) -> None:
    """However many stacks are beside, the line keeps its width; the hint names them all."""
    others = [stack.name for stack in bench.session.record.stacks][1:]
    bench.view.set(None, beside=tuple(others), less=others[0])
    assert len(bench.choice.opener.text()) <= 34
    assert all(other in bench.choice.opener.toolTip() for other in others)
