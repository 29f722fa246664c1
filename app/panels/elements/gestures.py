"""What typing, pasting and moving in the table mean as edits of the document. No toolkit."""

from collections.abc import Iterable, Mapping, Sequence
from typing import Final

from app.document import edits
from app.document.document import Cell, Document, Selection
from app.document.edit import Edit, refuse
from app.document.element_edits import NEW_SHEET
from app.document.sheet_cells import sheet_columns
from app.panels.elements.columns import (
    CONDUCTIVITY,
    LAYER_CELLS,
    MATERIAL,
    RESISTANCE,
    SHEET_COLUMNS,
    THICKNESS,
    WHAT,
    Column,
)
from app.panels.elements.lines import FILM, WORDS, Marks, marks_of
from app.panels.elements.names import MaterialNames
from stackcore.job.groups import group_of
from stackcore.job.records import JobRecord, LayerRecord, SheetRecord
from stackcore.units import Dimension, parse_measure

FILM_COLUMNS: Final = (THICKNESS, CONDUCTIVITY)
NEW_MATERIAL: Final = "air"
NEW_THICKNESS: Final = parse_measure("1 mm", Dimension.LENGTH)
"""What a new layer begins as."""


def typed_edit(names: MaterialNames, cell: Cell, text: str) -> Edit:
    """Return the edit for `text` typed or chosen in `cell`; a material may be given as it is shown or offered."""
    if cell.column in (MATERIAL.name, "front", "back"):
        text = names.given(text)
    return edits.type_into(cell, text)


def add_layer_edit(record: JobRecord, stack: int, row: int) -> Edit:
    """Return the edit that puts a new layer before `row`: of the material before it, `NEW_THICKNESS` thick."""
    before = [element for element in record.stacks[stack].elements[:row] if isinstance(element, LayerRecord)]
    return edits.add_layer(stack, row, before[-1].material if before else NEW_MATERIAL, NEW_THICKNESS)


def paste_edit(stack: int, row: int, pasted: Sequence[Mapping[str, str]], *, insert: bool) -> Edit:
    """Return the one edit that pastes rows of texts by column name.

    Parameters
    ----------
    row
        Index of the first element typed over, or before which new ones go.
    pasted
        As `app.panels.elements.clipboard.place` gives them.
    insert
        Whether every row is a new element; otherwise rows are typed over as long as there are any, and only the
        rest is new.

    Notes
    -----
    A text that is no value becomes a draft, as if it had been typed. A row that says it is of the other kind than
    the one it is typed over takes its place. The whole paste is refused when a row has texts for the other kind: a
    thickness pasted over a sheet must not vanish unseen.
    """
    rows = [texts for texts in pasted if not _is_half_space(texts)]

    def change(document: Document) -> Document:
        for offset, texts in enumerate(rows):
            place = row + offset
            elements = document.record.stacks[stack].elements
            present = None if insert or place >= len(elements) else elements[place]
            kind = _kind(texts, present)
            if present is not None and kind is not type(present):
                document = edits.delete(stack, (place,)).change(document)
            if kind is not type(present):
                document = _new_element(stack, place, kind).change(document)
            document = _type_row(document, stack, place, texts)
            document = _marked(document, stack, place, marks_of(texts))
        return _grouped(document, stack, row, [marks_of(texts) for texts in rows]) if insert else document

    selection = Selection(stack, tuple(range(row, row + len(rows))))
    return Edit(f"paste {_count(len(rows), 'row')}", change, selection)


def move_edit(stack: int, rows: Iterable[int], step: int, count: int) -> Edit | None:
    """Return the edit that moves `rows` of `count` elements one place up (-1) or down (+1), or None at the end."""
    rows = sorted(set(rows))
    if not rows:
        return None
    before = rows[0] - 1 if step < 0 else rows[-1] + 2
    return edits.move(stack, rows, before) if 0 <= before <= count else None


def _is_half_space(texts: Mapping[str, str]) -> bool:
    """Whether the row is one that copying the front or the back gave; it is not an element."""
    return texts.get(WHAT.name, "").casefold() in (WORDS["front"].casefold(), WORDS["back"].casefold())


def _kind(texts: Mapping[str, str], present: LayerRecord | SheetRecord | None) -> type[LayerRecord | SheetRecord]:
    """Return what a row is: by its word, else as the present element, else by which of its cells are filled."""
    word = texts.get(WHAT.name, "").partition(",")[0].strip().casefold()
    if word in (WORDS["layer"].casefold(), WORDS["sheet"].casefold(), FILM.casefold()):
        return LayerRecord if word == WORDS["layer"].casefold() else SheetRecord
    if present is not None:
        return type(present)
    of_sheet = any(texts.get(column.name) for column in SHEET_COLUMNS)
    of_layer = any(texts.get(column.name) for column in LAYER_CELLS)
    return SheetRecord if of_sheet and not of_layer else LayerRecord


def _new_element(stack: int, row: int, kind: type[LayerRecord | SheetRecord]) -> Edit:
    if kind is SheetRecord:
        return edits.add_sheet(stack, row, NEW_SHEET)
    return edits.add_layer(stack, row, NEW_MATERIAL, NEW_THICKNESS)


def _type_row(document: Document, stack: int, row: int, texts: Mapping[str, str]) -> Document:
    """Return the document with the texts of one pasted row typed into it, as far as the row has such cells."""
    element = document.record.stacks[stack].elements[row]
    is_layer = isinstance(element, LayerRecord)
    columns = LAYER_CELLS if is_layer else _sheet_order(texts)
    others = SHEET_COLUMNS if is_layer else _not_of_sheets(texts)
    if any(texts.get(other.name) for other in others):
        word, other_word = ("layer", "sheet") if is_layer else ("sheet", "layer")
        raise refuse(
            f"stacks[{stack}].elements[{row}]",
            f"what is pasted here belongs to a {other_word}, and element {row + 1} is a {word}",
            f"paste it elsewhere, or with a column {WHAT.title} that says {other_word}",
        )
    for column in columns:
        text = texts.get(column.name)
        if text is None or (not text and (is_layer or column in FILM_COLUMNS)):
            continue
        if not is_layer and column.name not in _offered(document, stack, row):
            continue  # an inductance of what has just become a film, or the conductivity of what is none
        names = MaterialNames(document.record)
        document = typed_edit(names, Cell(stack, row, column.name), text).change(document)
    return document


def _marked(document: Document, stack: int, row: int, marks: Marks) -> Document:
    """Return the document with a row left out and locked as it was where it was copied."""
    element = document.record.stacks[stack].elements[row]
    if marks.left_out is not None and element.enabled == marks.left_out:
        document = edits.set_enabled(stack, (row,), not marks.left_out).change(document)
    if marks.locked is not None and element.locked != marks.locked:
        document = edits.set_locked(stack, (row,), marks.locked).change(document)
    return document


def _grouped(document: Document, stack: int, row: int, marks: Sequence[Marks]) -> Document:
    """Return the document with the groups that were copied whole; a part of one is no group."""
    begun: tuple[int, int] | None = None
    for place, mark in enumerate(marks, start=row):
        if mark.repeat is not None:
            begun = (place, mark.repeat)
        elif not mark.inside:
            begun = None
        if begun is not None and mark.ends:
            first, repeat = begun
            if group_of(document.record.stacks[stack], first) is None:
                document = edits.group_rows(stack, range(first, place + 1), repeat).change(document)
            begun = None
    return document


def _sheet_order(texts: Mapping[str, str]) -> list[Column]:
    """Return the columns of a sheet, those with a text first: no moment may leave the sheet without any part.

    A thickness comes behind the resistance it makes a film of, and the film's conductivity last.
    """
    parts = [column for column in SHEET_COLUMNS if column not in FILM_COLUMNS]
    return [*sorted(parts, key=lambda column: not texts.get(column.name)), THICKNESS, CONDUCTIVITY]


def _not_of_sheets(texts: Mapping[str, str]) -> Sequence[Column]:
    """Return the columns that a row of a sheet must not fill; a film has a thickness, with what makes it a film."""
    film = texts.get(RESISTANCE.name) or texts.get(CONDUCTIVITY.name)
    return (MATERIAL,) if film else LAYER_CELLS


def _offered(document: Document, stack: int, row: int) -> tuple[str, ...]:
    element = document.record.stacks[stack].elements[row]
    return sheet_columns(element) if isinstance(element, SheetRecord) else ()


def _count(number: int, what: str) -> str:
    return f"{number} {what}" if number == 1 else f"{number} {what}s"
