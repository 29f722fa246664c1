"""A session with a dielectric and a metal, and the panel that shows its materials."""

from dataclasses import dataclass, field

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from PySide6.QtWidgets import QApplication, QLabel, QLineEdit, QWidget
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.theme import LIGHT
from app.panels.materials.lines import COLUMNS
from app.panels.materials.panel import MaterialsPanel
from stackcore.errors import Severity


@pytest.fixture
def session() -> Session:
    """PTFE, which the stack uses, and copper, which it does not; 1 GHz to 18 GHz."""
    session = Session()
    assert session.apply(edits.use_library_entry("metals/copper")) == ()
    return Session(session.job)


def press(key: Qt.Key, modifiers: Qt.KeyboardModifier = Qt.KeyboardModifier.NoModifier) -> None:
    """Press a key wherever the focus is."""
    focus = QApplication.focusWidget()
    assert focus is not None
    QTest.keyClick(focus, key, modifiers)


@dataclass
class Shown:
    """A panel on a screen, what it said, and its hands."""

    panel: MaterialsPanel
    session: Session
    view: View
    said: list[tuple[str, Severity]] = field(default_factory=list)

    def text(self, name: str, column: str) -> str:
        """Return what stands under a column for a material."""
        model = self.panel.table.materials_model()
        place = [shown.name for shown in COLUMNS].index(column)
        return str(model.index(model.row_of(name), place).data())

    def names(self) -> list[str]:
        """Return the names in the table."""
        return [line.name for line in self.panel.table.materials_model().lines]

    def type(self, name: str, column: str, text: str) -> None:
        """Type a text into a cell with the keyboard, and Enter."""
        self.panel.table.go_to(name, column)
        self.panel.table.setFocus()
        press(Qt.Key.Key_F2)
        line = QApplication.focusWidget()
        assert isinstance(line, QLineEdit)
        line.clear()
        QTest.keyClicks(line, text)
        press(Qt.Key.Key_Return)

    def sentences(self) -> str:
        """Return everything written under the table and the list."""
        labels: list[QLabel] = self.panel.findChildren(QLabel)
        return "\n".join(label.text() for label in labels if label.isVisible() and label.wordWrap())

    def focus(self) -> QWidget | None:
        """Return the widget with the focus."""
        return QApplication.focusWidget()


@pytest.fixture
def shown(qtbot: QtBot, session: Session) -> Shown:
    """Show the panel."""
    said: list[tuple[str, Severity]] = []
    view = View()
    panel = MaterialsPanel(session, view, LIGHT, lambda text, severity: said.append((text, severity)))
    qtbot.addWidget(panel)
    panel.resize(900, 700)
    panel.show()
    panel.activateWindow()
    panel.table.setFocus()
    qtbot.waitUntil(panel.table.hasFocus)
    return Shown(panel, session, view, said)
