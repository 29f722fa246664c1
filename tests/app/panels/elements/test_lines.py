"""The lines of the table as values."""

from app.document import edits
from app.document.document import Cell
from app.document.session import Session
from app.panels.elements.columns import (
    ALL_COLUMNS,
    CAPACITANCE,
    CONDUCTIVITY,
    INDUCTANCE,
    LAYER_COLUMNS,
    NUMBER,
    REPEAT,
    RESISTANCE,
    THICKNESS,
    WHAT,
    columns_of,
)
from app.panels.elements.lines import cell_of, lines_of, with_unit
from stackcore.units import Dimension, parse_measure


def test_lines_read_from_front_to_back(session: Session) -> None:
    """The half-spaces stand first and last, elements between them with number, kind, material and thickness."""
    lines = lines_of(session.document, 0)

    assert [line.kind for line in lines] == ["front", "layer", "layer", "layer", "back"]
    assert [cell.text for cell in lines[2].cells[:4]] == ["2", "Layer", "Copper", "35 um"]
    assert [cell.text for cell in lines[0].cells[:4]] == ["", "Front", "air", "half-space"]
    assert lines[2].material_kind == "metal"


def test_cells_that_can_be_typed_into(session: Session) -> None:
    """Of a layer material and thickness, of a sheet its parts, of a half-space the material, and nothing else."""
    session.apply(edits.add_sheet(0, 0))
    can = [[cell.editable for cell in line.cells] for line in lines_of(session.document, 0)]

    assert can[0] == can[-1] == [False, False, True, *[False] * 6]
    assert can[1] == [*[False] * 4, True, True, True, False, False]
    assert can[2] == [False, False, True, True, *[False] * 5]


def test_a_film_has_thickness_conductivity_and_the_resistance_that_follows(session: Session) -> None:
    """Its cells can be typed into; its kind is said, and the columns it needs are there."""
    session.apply(edits.add_sheet(0, 0))
    session.apply(edits.type_into(Cell(0, 0, "thickness"), "10 nm"))
    film = lines_of(session.document, 0)[1]
    assert CONDUCTIVITY in columns_of(session.document, 0)
    assert [film.cell(column).text for column in (WHAT, THICKNESS, RESISTANCE, CONDUCTIVITY)] == [
        "Film",
        "10 nm",
        "377 Ω/sq",
        "265.252 kS/m",
    ]
    assert all(film.cell(column).editable for column in (THICKNESS, RESISTANCE, CONDUCTIVITY))
    assert film.place == "film 1"


def test_a_plain_resistance_offers_a_thickness_where_films_are_shown(session: Session) -> None:
    """Only there: elsewhere a sheet has none."""
    session.apply(edits.add_sheet(0, 0))
    for films in (False, True):
        line = lines_of(session.document, 0, films=films)[1]
        assert line.cell(THICKNESS).editable == films


def test_groups_and_what_is_left_out_are_said(session: Session) -> None:
    """A bracket joins the rows of a group, its first has the count; the kind says left out and locked."""
    session.apply(edits.group_rows(0, (0, 1), 8))
    session.apply(edits.set_enabled(0, (1,), on=False))
    session.apply(edits.set_locked(0, (2,), on=True))
    lines = lines_of(session.document, 0)
    assert REPEAT in columns_of(session.document, 0)
    assert [line.cell(NUMBER).text for line in lines[1:4]] == ["1 ┐ ×8", "2 ┘", "3"]
    assert [line.cell(WHAT).text for line in lines[1:4]] == ["Layer", "Layer, left out", "Layer, locked"]
    assert [line.cell(REPEAT).text for line in lines[1:4]] == ["8", "", ""]
    assert lines[1].cell(REPEAT).editable
    assert lines[2].left_out
    assert lines[2].place == "layer 2, left out, in a group repeated 8 times"


def test_columns_of_sheets_only_with_a_sheet(session: Session) -> None:
    """The resistance is there when the stack has a sheet, the rest when it is used, drafted or asked for."""
    assert columns_of(session.document, 0, rare=True) == LAYER_COLUMNS
    session.apply(edits.add_sheet(0, 0))
    assert columns_of(session.document, 0) == (*LAYER_COLUMNS, RESISTANCE)
    assert columns_of(session.document, 0, rare=True) == ALL_COLUMNS[:-1]
    session.apply(edits.type_into(Cell(0, 0, "capacitance"), "1 pF"))
    assert columns_of(session.document, 0) == (*LAYER_COLUMNS, RESISTANCE, CAPACITANCE)
    session.apply(edits.type_into(Cell(0, 0, "capacitance"), ""))
    session.apply(edits.type_into(Cell(0, 0, "inductance"), "much"))
    assert columns_of(session.document, 0) == (*LAYER_COLUMNS, RESISTANCE, INDUCTANCE)


def test_bare_number_shows_the_unit_it_means() -> None:
    """A thickness written without a unit, as a job file may, is shown in metres."""
    assert with_unit(parse_measure(0.001, Dimension.LENGTH), Dimension.LENGTH) == "0.001 m"
    assert with_unit(parse_measure("1e-3", Dimension.LENGTH), Dimension.LENGTH) == "1e-3 m"
    assert with_unit(parse_measure("1/8 in", Dimension.LENGTH), Dimension.LENGTH) == "1/8 in"
    assert with_unit(parse_measure('0.125"', Dimension.LENGTH), Dimension.LENGTH) == '0.125"'


def test_draft_is_shown_in_its_cell(session: Session) -> None:
    """A text without a value stands in its cell with the fault, and the cells beside it do not change."""
    before = lines_of(session.document, 0)
    session.apply(edits.type_into(Cell(0, 1, "thickness"), "thin"))
    after = lines_of(session.document, 0)

    cell = after[2].cells[3]
    assert (cell.text, cell.typed) == ("thin", "thin")
    assert cell.fault is not None
    assert [line for line in after if line not in before] == [after[2]]


def test_cells_lead_back_to_the_document(session: Session) -> None:
    """A place in the table is the cell of the document whose text it shows."""
    stack = session.record.stacks[0]

    assert cell_of(stack, 0, 0, THICKNESS) == Cell(0, -1, "front")
    assert cell_of(stack, 0, 4, THICKNESS) == Cell(0, -1, "back")
    assert cell_of(stack, 0, 2, THICKNESS) == Cell(0, 1, "thickness")
