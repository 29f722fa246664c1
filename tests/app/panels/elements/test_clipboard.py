"""Blocks of cells as spreadsheets copy them."""

import pytest
from hypothesis import given
from hypothesis import strategies as st

from app.panels.elements.clipboard import place, read_block, write_block, write_html
from app.panels.elements.columns import ALL_COLUMNS, LAYER_COLUMNS


def test_block_without_header() -> None:
    """Tabs part columns and line breaks rows; the empty line at the end is no row."""
    block = read_block("air\t1 mm\r\nskin\t0,9 mm\r\n\r\n")

    assert block.rows == (("air", "1 mm"), ("skin", "0,9 mm"))
    assert block.columns == ()


@pytest.mark.parametrize("title", ["Thickness (mm)", "Thickness [mm]", "Thickness, mm", "thickness (mm)"])
def test_unit_in_the_header(title: str) -> None:
    """A unit beside the title is given to the bare numbers below it, and to no others."""
    block = read_block(f"{title}\tMaterial\n0,5\tair\n10 mil\tair\nthin\tair\n1e-1\tair\n")

    assert block.columns == ("thickness", "material")
    assert [row[0] for row in block.rows] == ["0,5 mm", "10 mil", "thin", "1e-1 mm"]


def test_quotes_breaks_and_blanks() -> None:
    """Cells in quotes keep their line breaks; hard blanks around a cell go, and a dash alone is nothing."""
    block = read_block('"Skin ""A""\nfront"\t\u00a01 mm\u00a0\nair\t–\n')

    assert block.rows == (('Skin "A"\nfront', "1 mm"), ("air", ""))


def test_header_in_any_order_places_by_name() -> None:
    """With a header, texts go to the columns it names whatever the current cell."""
    placed = place(read_block("Thickness\tMaterial\n1 mm\tair\n"), "capacitance")

    assert placed == ({"thickness": "1 mm", "material": "air"},)


@pytest.mark.parametrize(
    ("text", "anchor", "columns"),
    [
        ("1 mm\n2 mm", "thickness", {"thickness"}),
        ("air\t1 mm", "material", {"material", "thickness"}),
        ("air\t1 mm", "number", {"material", "thickness"}),
        ("1\tLayer\tair\t1 mm", "number", {"number", "what", "material", "thickness"}),
        ("Layer\tair\t1 mm", "what", {"what", "material", "thickness"}),
        ("377\t20 pH", "resistance", {"resistance", "inductance"}),
    ],
)
def test_block_without_header_starts_at_the_current_cell(text: str, anchor: str, columns: set[str]) -> None:
    """A block fills from the current cell to the right; in front of the material only whole rows do."""
    assert all(set(row) == columns for row in place(read_block(text), anchor))


@given(
    rows=st.lists(
        st.lists(st.text(st.characters(exclude_categories=["Cs", "Cc", "Z"]), max_size=6), min_size=4, max_size=4),
        min_size=1,
        max_size=5,
    ).filter(lambda rows: any(rows[-1]) and "–" not in str(rows) and "—" not in str(rows) and "-" not in str(rows))
)
def test_what_is_copied_is_read_back(rows: list[list[str]]) -> None:
    """Copied rows come back cell by cell, also cells that a spreadsheet would take for a formula."""
    block = read_block(write_block(LAYER_COLUMNS, rows))

    assert block.columns == tuple(column.name for column in LAYER_COLUMNS)
    assert [list(row) for row in block.rows] == rows


def test_words_that_look_like_a_formula_stay_words() -> None:
    """A label beginning with = is marked as text for the spreadsheet; a negative number is left a number."""
    text = write_block(LAYER_COLUMNS, [["1", "Layer", "=2+2", "-1 mm"]])

    assert text.splitlines()[1] == "1\tLayer\t'=2+2\t-1 mm"


def test_html_has_no_markup_of_the_cells() -> None:
    """What stands in a cell cannot become markup of the document it is pasted into."""
    html = write_html(ALL_COLUMNS, [["1", "Layer", "<b>&", "", "", "", ""]])

    assert "<td>&lt;b&gt;&amp;</td>" in html
