"""What is designed, as one frozen value: a job that resolves, and the texts typed that are not values yet."""

import re
from dataclasses import dataclass, replace
from typing import Final

from stackcore.errors import Fault
from stackcore.job import Job
from stackcore.job.inspector import join
from stackcore.job.records import JobRecord

WHOLE_ROW: Final = -1
"""The row of a cell that belongs to no element."""

WHOLE_JOB: Final = -1
"""The stack of a cell that belongs to no stack; `Cell` sets it by itself."""

ELEMENT_COLUMNS: Final = (
    *("material", "thickness", "resistance", "conductivity", "inductance", "capacitance"),
    "repeat",
)
STACK_COLUMNS: Final = ("name", "front", "back")


_IN_A_LIST: Final = re.compile(r"material:(?P<name>.*)\.(?P<constant>[a-z_]+\[\d+\]\.[a-z_]+)", re.DOTALL)


@dataclass(frozen=True, slots=True)
class Cell:
    """One place a person can type into.

    Parameters
    ----------
    stack
        Index of the stack. Cells of the whole job carry `WHOLE_JOB` whatever was given.
    row
        Index of the element, or -1 for a place that belongs to no element.
    column
        Of an element ``material``, ``thickness``, ``resistance``, ``conductivity``, ``inductance``,
        ``capacitance``, and ``repeat`` of the group it belongs to; of a stack ``name``, ``front``, ``back``; of the
        job ``title``, ``notes``, ``sweep.frequency``, ``sweep.frequency.start`` (``stop``, ``points``,
        ``spacing``), ``sweep.angle``, ``sweep.angle.start`` (``stop``, ``points``) and
        ``material:skin.permittivity`` (``name``, ``label``, ``source``, any constant of its model, and
        ``terms[0].relaxation_time`` of a list).

    Examples
    --------
    >>> Cell(0, 2, "thickness").path
    'stacks[0].elements[2].thickness'
    >>> Cell(0, -1, "sweep.frequency.start") == job_cell("sweep.frequency.start")
    True
    """

    stack: int
    row: int
    column: str

    def __post_init__(self) -> None:
        if self.of_job:
            object.__setattr__(self, "stack", WHOLE_JOB)

    @property
    def of_job(self) -> bool:
        """Whether the cell belongs to the job and to none of its stacks."""
        return self.row == WHOLE_ROW and self.column not in STACK_COLUMNS

    @property
    def path(self) -> str:
        """Return the place in the words of the job file."""
        if self.row != WHOLE_ROW:
            key = "layer" if self.column == "material" else self.column
            return f"stacks[{self.stack}].elements[{self.row}].{key}"
        if self.column in STACK_COLUMNS:
            return f"stacks[{self.stack}].{self.column}"
        if self.column.startswith("material:"):
            name, constant = material_and_constant(self.column)
            return f"{join('materials', name)}.{constant}"
        return self.column


def job_cell(column: str) -> Cell:
    """Return the cell `column` of the whole job, such as ``title`` or ``sweep.frequency.stop``."""
    return Cell(WHOLE_JOB, WHOLE_ROW, column)


def material_and_constant(column: str) -> tuple[str, str]:
    """Return the material's name and the constant in a column.

    Examples
    --------
    >>> material_and_constant("material:skin.permittivity")
    ('skin', 'permittivity')
    >>> material_and_constant("material:oil 2.1.terms[0].strength")
    ('oil 2.1', 'terms[0].strength')
    """
    found = _IN_A_LIST.fullmatch(column)
    if found:
        return found["name"], found["constant"]
    name, _, constant = column.removeprefix("material:").rpartition(".")
    return name, constant


def material_cell(name: str, constant: str) -> Cell:
    """Return the cell for `constant` (``permittivity``, ``label``, ...) of the material called `name`."""
    return job_cell(f"material:{name}.{constant}")


@dataclass(frozen=True, slots=True)
class Draft:
    """A text typed that is not a value (yet): kept as typed and shown at its cell with what is wrong there."""

    cell: Cell
    text: str
    fault: Fault

    def at(self, cell: Cell) -> "Draft":
        """Return the draft at another cell, its fault with it."""
        return Draft(cell, self.text, replace(self.fault, path=cell.path))


@dataclass(frozen=True, slots=True, eq=False)
class Document:
    """A job and the drafts beside it.

    Two documents are equal when their records and drafts are: what follows from a record is not compared.

    Parameters
    ----------
    job
        The last job that resolves; curves are drawn from it.
    drafts
        At most one a cell. While there is any, the curves do not show everything that was typed: they are
        stale.
    """

    job: Job
    drafts: tuple[Draft, ...] = ()

    @property
    def record(self) -> JobRecord:
        """The job as it is written."""
        return self.job.record

    def draft(self, cell: Cell) -> Draft | None:
        """Return the draft at `cell`, or None."""
        return next((draft for draft in self.drafts if draft.cell == cell), None)

    def __eq__(self, other: object) -> bool:
        if not isinstance(other, Document):
            return NotImplemented
        return self is other or (self.record == other.record and self.drafts == other.drafts)

    def __hash__(self) -> int:
        return hash((self.record, self.drafts))


@dataclass(frozen=True, slots=True)
class Selection:
    """Which stack is looked at, and which of its elements are chosen (indices, ascending)."""

    stack: int = 0
    rows: tuple[int, ...] = ()

    def within(self, record: JobRecord) -> "Selection":
        """Return the nearest selection that exists in `record`.

        A row past the end becomes the last row, so that deleting the last element selects the one before it.
        """
        stack = min(max(self.stack, 0), len(record.stacks) - 1)
        last = len(record.stacks[stack].elements) - 1
        rows = {min(row, last) for row in self.rows if row >= 0 and last >= 0}
        return Selection(stack, tuple(sorted(rows)))
