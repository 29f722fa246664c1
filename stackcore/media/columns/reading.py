"""Columns of numbers as they were understood: data that a preview shows before anything is made of them."""

from collections.abc import Mapping
from dataclasses import dataclass
from typing import Final

from stackcore.errors import Fault, InputError
from stackcore.media.base import UNSOURCED, Provenance
from stackcore.media.columns.cells import Decimal
from stackcore.media.columns.headings import IGNORED, QUANTITY_KINDS
from stackcore.media.tabulated import TabulatedMedium

_WORDS_OF: Final[Mapping[str, str]] = {
    "tab": "tabs",
    "semicolon": "semicolons",
    "comma": "commas",
    "spaces": "spaces",
    "comma pairs": "commas, which are the decimal sign too",
}


@dataclass(frozen=True, slots=True)
class Alternative:
    """One possible answer to a question: what to answer, and what it means."""

    answer: str
    meaning: str


@dataclass(frozen=True, slots=True)
class Question:
    """Something the file does not say.

    Parameters
    ----------
    name
        Key for the answer: ``decimal``, ``separator``, ``column 2``, ``unit of column 1``, ``abscissa``, ``loss``,
        ``material``.
    text
        The question, in words.
    alternatives
        What can be answered.
    assumed
        The answer the reading goes by until another is given; empty when there is none to go by.
    """

    name: str
    text: str
    alternatives: tuple[Alternative, ...]
    assumed: str = ""


@dataclass(frozen=True, slots=True)
class Column:
    """One column.

    Parameters
    ----------
    number
        From 1, as in the file.
    heading
        As it stands in the file, empty without one.
    kind
        A name of `stackcore.media.columns.headings.QUANTITY_KINDS`, ``ignored``, or empty while not known.
    unit
        As it stands in the file or was answered; empty for a ratio.
    values
        As they stand in the file, in `unit`.
    """

    number: int
    heading: str
    kind: str
    unit: str
    values: tuple[float, ...]

    @property
    def label(self) -> str:
        """Kind and unit in words: ``frequency in GHz``."""
        if self.kind in ("", IGNORED):
            return self.kind or "not known"
        label = QUANTITY_KINDS[self.kind].label
        return f"{label} in {self.unit}" if self.unit else label


@dataclass(frozen=True, slots=True)
class ColumnsReading:
    """What a text of columns was understood as.

    Parameters
    ----------
    encoding
        Of the bytes, empty when a text was read.
    separator, decimal
        ``tab``, ``semicolon``, ``comma``, ``spaces`` or ``comma pairs``; ``.`` or ``,``.
    heading_line
        Number of the line of headings, None without one.
    lines
        Number of the line each row stands in.
    columns
        In the order of the file.
    questions
        What is to be answered before a medium can be made.
    faults
        What must be mended in the file, each with its line.
    notes
        What was supposed without being in doubt, in sentences.
    """

    encoding: str
    separator: str
    decimal: Decimal
    heading_line: int | None
    lines: tuple[int, ...]
    columns: tuple[Column, ...]
    questions: tuple[Question, ...]
    faults: tuple[Fault, ...]
    notes: tuple[str, ...]
    table: TabulatedMedium | None = None

    @property
    def understood(self) -> tuple[str, ...]:
        """What the file was taken for, in sentences for a preview."""
        if not self.columns:
            return ()
        sign = "comma" if self.decimal == "," else "point"
        told = [f"{len(self.lines)} rows of {len(self.columns)} columns, parted by {_WORDS_OF[self.separator]}"]
        told.append(f"decimal {sign}")
        told.append(f"headings in line {self.heading_line}" if self.heading_line else "no headings")
        told += [f"column {column.number}: {column.label}" for column in self.columns]
        return (*told, *self.notes)

    @property
    def assumptions(self) -> dict[str, str]:
        """The answers the reading goes by; give them to `read_columns` to accept them."""
        return {question.name: question.assumed for question in self.questions if question.assumed}

    def medium(self, provenance: Provenance = UNSOURCED) -> TabulatedMedium:
        """Return the medium of the columns.

        Raises
        ------
        InputError
            With every fault of the file, and every question that is open.
        """
        faults = [fault for fault in self.faults if fault.severity == "error"]
        for question in self.questions:
            answers = ", ".join(repr(each.answer) for each in question.alternatives)
            faults.append(Fault(question.name, question.text, f"an answer: {answers}"))
        if faults or self.table is None:
            raise InputError(faults or [Fault("", "there is no table in the file", "two columns of numbers")])
        return TabulatedMedium(
            self.table.frequency, self.table.permittivity, self.table.permeability, provenance=provenance
        )
