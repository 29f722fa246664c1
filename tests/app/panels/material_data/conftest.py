"""Constants and curves on a screen, and hands for them."""

from dataclasses import dataclass, field

import pytest
from PySide6.QtCore import Qt
from PySide6.QtTest import QTest
from pytestqt.qtbot import QtBot

from app.document import edits
from app.document.session import Session
from app.document.view import View
from app.look.theme import LIGHT
from app.panels.material_data.editor import EditorPage
from app.panels.material_data.panel import MaterialData
from app.panels.materials.picks import Pick
from app.panels.sweep.field import QuietChoice, QuietField
from stackcore.errors import Severity
from stackcore.job.records import MaterialRecord
from stackcore.media.models import MODELS, Constants
from stackcore.units import Measure


@dataclass
class Bench:
    """The panel with everything it stands on."""

    qtbot: QtBot
    session: Session = field(default_factory=Session)
    view: View = field(default_factory=View)
    told: list[tuple[str, Severity]] = field(default_factory=list)

    def __post_init__(self) -> None:
        def tell(text: str, severity: Severity) -> None:
            self.told.append((text, severity))

        self.panel = MaterialData(self.session, self.view, LIGHT, tell)
        self.qtbot.addWidget(self.panel)
        self.panel.resize(480, 900)
        self.panel.show()
        self.panel.activateWindow()
        self.qtbot.waitExposed(self.panel)

    @property
    def page(self) -> EditorPage:
        """The editor."""
        return self.panel.editor.page

    def look_at(self, *names: str) -> None:
        """Choose materials of the job, the last one the current."""
        self.panel.show_picks(tuple(Pick(name) for name in names), Pick(names[-1]))

    def add(self, model: str, name: str = "trial") -> MaterialRecord:
        """Add a material of a model with the constants to begin from, and look at it."""
        record = MaterialRecord(name, model=model, constants=MODELS[model].start())
        assert self.session.apply(edits.add_material(record)) == ()
        self.look_at(name)
        return record

    def type(self, column: str, text: str) -> None:
        """Type a text into a field with the keyboard, and Enter."""
        control = self.page.form.rows[column].control
        assert isinstance(control, QuietField)
        control.setFocus()
        control.selectAll()
        QTest.keyClick(control, Qt.Key.Key_Delete)
        QTest.keyClicks(control, text)
        QTest.keyClick(control, Qt.Key.Key_Return)

    def choose(self, column: str, option: str) -> None:
        """Choose an option as a person does."""
        control = self.page.form.rows[column].control
        assert isinstance(control, QuietChoice)
        choose(control, option)

    def measured(self, constant: str) -> str:
        """Return a quantity of the trial material as it was typed."""
        value = self.record().constants[constant]
        assert isinstance(value, Measure)
        return value.text

    def rows(self, constant: str) -> tuple[Constants, ...]:
        """Return the rows of a list of the trial material."""
        value = self.record().constants[constant]
        assert isinstance(value, tuple)
        return value

    def record(self, name: str = "trial") -> MaterialRecord:
        """Return a material of the job."""
        record = self.session.record.material(name)
        assert record is not None
        return record


def choose(control: QuietChoice, option: str) -> None:
    """Choose the item with this data as a person does."""
    place = control.findData(option)
    assert place >= 0
    control.setCurrentIndex(place)
    control.activated.emit(place)


@pytest.fixture
def bench(qtbot: QtBot) -> Bench:
    """A bench with the job that a session begins with."""
    return Bench(qtbot)
