"""Edits of the title, the notes and the sweep."""

from collections.abc import Iterable, Sequence
from dataclasses import replace

from app.document.document import Document, job_cell
from app.document.edit import Edit, with_record, without_draft
from app.document.history import Brief
from stackcore.errors import Fault, JobError, UnitError
from stackcore.job.records import AngleGrid, FrequencyGrid, Spacing, SweepRecord
from stackcore.units import Dimension, Measure, parse_measure

Given = Measure | str | float
"""A quantity as `Measure`, as text with its unit, or as a number in the SI unit."""


def set_title(title: str) -> Edit:
    """Return the edit that sets the title; typed in one go it is one step."""
    cell = job_cell("title")

    def change(document: Document) -> Document:
        record = replace(document.record, title=title)
        return with_record(document, record, without_draft(document.drafts, cell))

    return Edit(f"set title to {title}" if title else "clear title", change, merge_key=Brief("title"))


def set_notes(notes: str) -> Edit:
    """Return the edit that sets the notes; typed in one go they are one step."""
    cell = job_cell("notes")

    def change(document: Document) -> Document:
        record = replace(document.record, notes=notes)
        return with_record(document, record, without_draft(document.drafts, cell))

    return Edit("change notes", change, merge_key=Brief("notes"))


def set_frequency_grid(start: Given, stop: Given, points: int, spacing: Spacing = "linear") -> Edit:
    """Return the edit that sweeps evenly from `start` to `stop`; a bare number in a text is in GHz.

    Examples
    --------
    >>> set_frequency_grid("8 GHz", "12 GHz", 401).sentence
    'sweep 8 GHz to 12 GHz'
    """

    def change(document: Document) -> Document:
        first, last = _measures("sweep.frequency", Dimension.FREQUENCY, {".start": start, ".stop": stop})
        return _with_sweep(document, frequency=FrequencyGrid(first, last, points, spacing))

    return Edit(f"sweep {_text(start)} to {_text(stop)}", change)


def set_frequency_list(frequencies: Iterable[Given]) -> Edit:
    """Return the edit that sweeps the frequencies of a list; a bare number in a text is in GHz."""
    given = tuple(frequencies)

    def change(document: Document) -> Document:
        found = _measures("sweep.frequency", Dimension.FREQUENCY, _numbered(given))
        return _with_sweep(document, frequency=found)

    return Edit(f"sweep {_count(given, 'frequency', 'frequencies')}", change)


def set_angles(angles: Iterable[Given]) -> Edit:
    """Return the edit that sets the angles of incidence as a list; a bare number in a text is in degrees."""
    given = tuple(angles)

    def change(document: Document) -> Document:
        return _with_sweep(document, angle=_measures("sweep.angle", Dimension.ANGLE, _numbered(given)))

    words = ", ".join(map(_text, given)) if len(given) <= 4 else _count(given, "angle", "angles")
    return Edit(f"set angles to {words}", change)


def set_angle_grid(start: Given, stop: Given, points: int) -> Edit:
    """Return the edit that sweeps the angle of incidence evenly; a bare number in a text is in degrees."""

    def change(document: Document) -> Document:
        first, last = _measures("sweep.angle", Dimension.ANGLE, {".start": start, ".stop": stop})
        return _with_sweep(document, angle=AngleGrid(first, last, points))

    return Edit(f"set angles from {_text(start)} to {_text(stop)}", change)


def _with_sweep(
    document: Document,
    *,
    frequency: FrequencyGrid | tuple[Measure, ...] | None = None,
    angle: AngleGrid | tuple[Measure, ...] | None = None,
) -> Document:
    """Return the document with a new half of the sweep; drafts of that half are gone with the old one."""
    old = document.record.sweep
    sweep = SweepRecord(old.frequency if frequency is None else frequency, old.angle if angle is None else angle)
    half = "sweep.frequency" if frequency is not None else "sweep.angle"
    drafts = (draft for draft in document.drafts if not draft.cell.column.startswith(half))
    return with_record(document, replace(document.record, sweep=sweep), drafts)


def _measures(path: str, dimension: Dimension, given: dict[str, Given]) -> tuple[Measure, ...]:
    """Return the quantities in `given` (end of the path -> value); raises JobError with the fault of each."""
    found: list[Measure] = []
    faults: list[Fault] = []
    for place, value in given.items():
        try:
            found.append(
                value
                if isinstance(value, Measure)
                else parse_measure(
                    value, dimension, default_unit=dimension.usual_unit if isinstance(value, str) else None
                )
            )
        except UnitError as error:
            faults.append(Fault(path + place, error.message, error.allowed))
    if faults:
        raise JobError(faults)
    return tuple(found)


def _numbered(given: Sequence[Given]) -> dict[str, Given]:
    return {f"[{place}]": value for place, value in enumerate(given)}


def _text(given: Given) -> str:
    return given.text if isinstance(given, Measure) else str(given).strip()


def _count(given: Sequence[Given], one: str, many: str) -> str:
    return f"1 {one}" if len(given) == 1 else f"{len(given)} {many}"
