"""A session with a few elements, and the panel that shows it."""

from dataclasses import dataclass, field

import pytest
from PySide6.QtCore import QItemSelectionModel, Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QLineEdit, QWidget
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.look.theme import LIGHT
from app.panels.elements.panel import ElementsPanel
from stackcore.errors import Severity
from stackcore.units import Dimension, Measure, parse_measure


def length(text: str) -> Measure:
    """Return a thickness."""
    return parse_measure(text, Dimension.LENGTH)


def make_session() -> Session:
    """Return a session with PTFE 3 mm, copper 35 um and air 1/8 in, and nothing to undo before them."""
    session = Session()
    assert session.apply(edits.add_layer(0, 1, "metals/copper", length("35 um"))) == ()
    assert session.apply(edits.add_layer(0, 2, "air", length("1/8 in"))) == ()
    return Session(session.job)


@pytest.fixture
def session() -> Session:
    """PTFE 3 mm, copper 35 um, air 1/8 in."""
    return make_session()


def keyboard_target() -> QWidget:
    """Return the widget that a key pressed now goes to: a list that has opened, else the one with the focus."""
    target = QApplication.activePopupWidget() or QApplication.focusWidget()
    assert target is not None
    return target


def press(key: Qt.Key, modifiers: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
    """Press a key wherever it goes."""
    QTest.keyClick(keyboard_target(), key, modifiers)


@dataclass
class Shown:
    """A panel on a screen, what it said, and its hands."""

    panel: ElementsPanel
    session: Session
    said: list[tuple[str, Severity]] = field(default_factory=list)

    def texts(self) -> list[list[str]]:
        """Return the texts of all cells, row by row."""
        model = self.panel.table.elements_model()
        columns = range(model.columnCount())
        return [[str(model.index(row, c).data()) for c in columns] for row in range(model.rowCount())]

    def go(self, row: int, column: int) -> None:
        """Make a cell the current one, as a click does."""
        index = self.panel.table.elements_model().index(row, column)
        flags = QItemSelectionModel.SelectionFlag
        self.panel.table.selectionModel().setCurrentIndex(index, flags.ClearAndSelect | flags.Rows)

    def at(self) -> tuple[int, int]:
        """Return row and column of the current cell."""
        index = self.panel.table.currentIndex()
        return index.row(), index.column()

    def editor(self) -> QWidget | None:
        """Return what is open for typing, or None."""
        focus = QApplication.focusWidget()
        inside = focus is not None and self.panel.table.viewport().isAncestorOf(focus)
        return focus if inside else None

    def keys(self, text: str) -> None:
        """Type letters wherever they go."""
        for letter in text:
            QTest.keyClicks(keyboard_target(), letter)

    def line(self) -> QLineEdit:
        """Return the open line."""
        editor = self.editor()
        assert isinstance(editor, QLineEdit)
        return editor


@pytest.fixture
def shown(qtbot: QtBot, session: Session) -> Shown:
    """Show the panel with the focus in its table."""
    said: list[tuple[str, Severity]] = []
    panel = ElementsPanel(session, LIGHT, lambda text, severity: said.append((text, severity)))
    qtbot.addWidget(panel)
    panel.resize(560, 420)
    panel.show()
    panel.activateWindow()
    panel.table.setFocus()
    qtbot.waitUntil(panel.table.hasFocus)
    return Shown(panel, session, said)
