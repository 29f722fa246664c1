"""Columns of numbers before they become a table: pasted, understood aloud, asked about, and taken."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import Qt, QTimer
from PySide6.QtWidgets import QGridLayout, QHBoxLayout, QLabel, QPlainTextEdit, QPushButton, QVBoxLayout, QWidget

from app.look.theme import Theme
from app.panels.materials.pieces import ink, words
from app.panels.materials.words import pair_text
from app.panels.sweep.field import QuietChoice
from app.panels.tables.words import fault_words
from app.series.texts import frequency_text
from stackcore.errors import Fault
from stackcore.media.columns import ColumnsReading, Question, read_columns
from stackcore.media.models import Constants
from stackcore.media.tabulated import TabulatedMedium
from stackcore.units import Dimension, measure

PLACEHOLDER: Final = (
    "Paste columns here: frequency or wavelength, then ε′ and its loss, or n and k. Headings with units help: "
    "f (GHz); eps_r; tan d"
)
PAUSE: Final = 200
"""Milliseconds without a key after which the text is read."""
MOST_FAULTS: Final = 6
ENDS: Final = 2
"""Rows shown from each end of the table."""


def rows_of(table: TabulatedMedium) -> tuple[Constants, ...]:
    """Return the rows of a table as a material of a job has them."""
    permeability = table.permeability or (None,) * len(table.frequency)
    rows = []
    for hertz, epsilon, mu in zip(table.frequency, table.permittivity, permeability, strict=True):
        row = Constants(frequency=measure(hertz, Dimension.FREQUENCY), permittivity=complex(epsilon))
        rows.append(row if mu is None else row.with_value("permeability", complex(mu)))
    return tuple(rows)


def understood_text(reading: ColumnsReading) -> str:
    """Return what was understood, and the first and last rows as they would be taken."""
    told = [f"{sentence}." for sentence in reading.understood]
    table = reading.table
    if table is not None:
        count = len(table.frequency)
        places = [*range(min(ENDS, count)), *range(max(count - ENDS, ENDS), count)]
        lines = [
            f"{frequency_text(table.frequency[place])}: {pair_text('ε', complex(table.permittivity[place]))}"
            for place in places
        ]
        told.append("; ".join(lines) + ".")
    return " ".join(f"{text[:1].upper()}{text[1:]}" for text in told)


class ColumnsPreview(QWidget):
    """Text pasted, what was understood of it, and what it leaves open.

    Parameters
    ----------
    take
        Takes the rows.
    close
        Is called when the person wants no more of it.
    """

    def __init__(
        self,
        theme: Theme,
        take: Callable[[tuple[Constants, ...]], None],
        close: Callable[[], None],
        parent: QWidget | None = None,
    ) -> None:
        super().__init__(parent)
        self._theme, self._take = theme, take
        self._answers: dict[str, str] = {}
        self._asked: dict[str, Question] = {}
        self._choices: dict[str, tuple[QLabel, QuietChoice]] = {}
        self.reading: ColumnsReading | None = None
        self.text = QPlainTextEdit(self)
        self.text.setPlaceholderText(PLACEHOLDER)
        self.text.setAccessibleName("Columns of data")
        self.text.setTabChangesFocus(True)
        self.text.setFixedHeight(6 * self.fontMetrics().height())
        self.understood, self.faults = words("", self), words("", self)
        self.understood.setAccessibleName("What was understood")
        self._questions = QGridLayout()
        self._questions.setContentsMargins(8, 0, 8, 0)
        self.accept = QPushButton("Take these rows", self)
        self.cancel = QPushButton("Cancel", self)
        self.accept.clicked.connect(lambda: self._finish())
        self.cancel.clicked.connect(lambda: close())
        self._timer = QTimer(self)
        self._timer.setSingleShot(True)
        self._timer.setInterval(PAUSE)
        self._timer.timeout.connect(self._read_anew)
        self.text.textChanged.connect(self._timer.start)
        row = QHBoxLayout()
        row.setContentsMargins(8, 0, 8, 0)
        row.addWidget(self.accept)
        row.addWidget(self.cancel)
        row.addStretch(1)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 4, 0, 4)
        whole.setSpacing(4)
        whole.addWidget(self.text)
        whole.addWidget(self.understood)
        whole.addLayout(self._questions)
        whole.addWidget(self.faults)
        whole.addLayout(row)
        self.setFocusProxy(self.text)
        self.set_theme(theme)
        self._show()

    @property
    def choices(self) -> dict[str, QuietChoice]:
        """The questions that are open, by name, each with its answers."""
        return {name: choice for name, (_, choice) in self._choices.items()}

    def paste(self, text: str) -> None:
        """Read this text now."""
        self.text.setPlainText(text)
        self._timer.stop()
        self._read_anew()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        ink(self.understood, theme.muted)
        ink(self.faults, theme.fault)
        for label, choice in self._choices.values():
            ink(label, theme.text)
            choice.set_theme(theme)

    def hideEvent(self, event: object) -> None:
        """Stop waiting: nobody looks."""
        self._timer.stop()

    def _read_anew(self) -> None:
        self._answers, self._asked = {}, {}
        self._read()

    def _read(self) -> None:
        text = self.text.toPlainText()
        self.reading = read_columns(text, self._answers) if text.strip() else None
        if self.reading is not None:
            self._asked.update({question.name: question for question in self.reading.questions})
        self._ask()
        self._show()

    def _show(self) -> None:
        reading = self.reading
        self.understood.setText(understood_text(reading) if reading else "")
        found: tuple[Fault, ...] = reading.faults if reading else ()
        told = [f"{fault.path}: {fault_words(fault)}" if fault.path else fault_words(fault) for fault in found]
        more = f"… and {len(told) - MOST_FAULTS} more." if len(told) > MOST_FAULTS else ""
        self.faults.setText("\n".join([*told[:MOST_FAULTS], *([more] if more else [])]))
        for label in (self.understood, self.faults):
            label.setVisible(bool(label.text()))
        bad = any(fault.severity == "error" for fault in found)
        self.accept.setEnabled(reading is not None and reading.table is not None and not bad)

    def _ask(self) -> None:
        """Show a choice for each question, with what was answered or is assumed."""
        if list(self._choices) != list(self._asked):
            for label, choice in self._choices.values():
                for part in (label, choice):
                    self._questions.removeWidget(part)
                    part.hide()
                    part.deleteLater()
            self._choices = {name: self._question(question) for name, question in self._asked.items()}
        for name, (_, choice) in self._choices.items():
            choice.show_choice(self._answers.get(name, self._asked[name].assumed))

    def _question(self, question: Question) -> tuple[QLabel, QuietChoice]:
        place = self._questions.rowCount()
        text = f"{question.text[:1].upper()}{question.text[1:]}"
        label = QLabel(text, self)
        label.setWordWrap(True)
        choice = QuietChoice(self._theme, text, "", self)
        if not question.assumed:
            choice.addItem("choose", "")
        for each in question.alternatives:
            choice.addItem(each.meaning, each.answer)
        choice.activated.connect(
            lambda _index, name=question.name, box=choice: self._answer(name, box.currentData())
        )
        self._questions.addWidget(label, 2 * place, 0)
        self._questions.addWidget(choice, 2 * place + 1, 0, Qt.AlignmentFlag.AlignLeft)
        ink(label, self._theme.text)
        label.show()
        choice.show()
        return label, choice

    def _answer(self, name: str, answer: str) -> None:
        if answer:
            self._answers[name] = answer
        self._read()

    def _finish(self) -> None:
        """Take the rows: what is still assumed is thereby accepted."""
        if self.reading is None:
            return
        final = read_columns(self.text.toPlainText(), {**self.reading.assumptions, **self._answers})
        if final.table is None or any(fault.severity == "error" for fault in final.faults) or final.questions:
            self.reading = final
            self._show()
            return
        self._take(rows_of(final.table))
