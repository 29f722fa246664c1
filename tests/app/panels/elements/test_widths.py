"""How numbers are stood below each other."""

from itertools import pairwise

import pytest
from PySide6.QtGui import QFontMetrics
from PySide6.QtWidgets import QApplication

from app.document import edits
from app.document.document import Cell
from app.document.session import Session
from app.look.palette import tabular_font
from app.panels.elements.columns import LAYER_COLUMNS, THICKNESS
from app.panels.elements.lines import lines_of
from app.panels.elements.widths import Measuring, split_quantity
from tests.app.panels.elements.conftest import Shown


@pytest.mark.parametrize(
    ("text", "parts"),
    [
        ("12.25 mm", ("12", ".25", "mm")),
        ("0,5 mm", ("0", ",5", "mm")),
        ("35 um", ("35", "", "um")),
        ("1.5e-3 m", ("1", ".5e-3", "m")),
        ("1e-3 m", ("1e-3", "", "m")),
        ("1/8 in", ("1/8", "", "in")),
        ('0.125"', ("0", ".125", '"')),
        ("1 mm + 20 um", ("1 mm + 20", "", "um")),
        ("(1 + 2) mm", ("(1 + 2)", "", "mm")),
        ("377 ohm/sq", ("377", "", "ohm/sq")),
    ],
)
def test_parts_of_a_quantity(text: str, parts: tuple[str, str, str]) -> None:
    """Whatever may be typed is parted at the decimal sign of its last number and before its unit."""
    assert split_quantity(text) == parts


def test_widths_hold_every_text(qapp: QApplication, session: Session) -> None:
    """A column has room for its title, its words, and its numbers stood by their decimal points."""
    widths = Measuring(qapp.font()).widths(LAYER_COLUMNS, lines_of(session.document, 0))
    metrics = QFontMetrics(tabular_font(qapp.font()))

    thickness = widths[LAYER_COLUMNS.index(THICKNESS)]
    assert thickness.unit == max(metrics.horizontalAdvance(f" {unit}") for unit in ("mm", "um", "in"))
    assert thickness.cell >= metrics.horizontalAdvance("half-space")
    assert thickness.cell >= metrics.horizontalAdvance("1/8") + thickness.fraction + thickness.unit


def test_a_text_without_end_does_not_widen_its_column(qapp: QApplication, session: Session) -> None:
    """Neither a text that is no value nor a long sum pushes the other columns out of the table."""
    metrics = QFontMetrics(tabular_font(qapp.font()))
    for text in (90 * "9" + " mm", "0.25 mm" + 11 * " + 0.25 mm"):
        session.apply(edits.type_into(Cell(0, 0, "thickness"), text))
        widths = Measuring(qapp.font()).widths(LAYER_COLUMNS, lines_of(session.document, 0))
        assert widths[LAYER_COLUMNS.index(THICKNESS)].cell < metrics.horizontalAdvance(30 * "0")


def test_points_stand_below_each_other(shown: Shown) -> None:
    """Two numbers of unlike length have their units begin at one place, and so their points."""
    model = shown.panel.table.elements_model()
    model.setData(model.index(1, 3), "0.25 mm")
    model.setData(model.index(2, 3), "125.5 mm")
    shown.session.select(type(shown.session.selection)(0, ()))
    shown.panel.table.clearFocus()
    table = shown.panel.table
    image = table.viewport().grab().toImage()

    def unit_starts(row: int) -> int:
        cell = table.visualRect(model.index(row, 3))
        ground = image.pixelColor(cell.left() + 2, cell.top() + 3)
        rows = range(cell.top() + 4, cell.bottom() - 3)
        inked = [
            x
            for x in range(cell.left() + 3, cell.right() - 3)
            if any(image.pixelColor(x, y) != ground for y in rows)
        ]
        gaps = [after for before, after in pairwise(inked) if after - before > 3]
        return gaps[-1]

    assert unit_starts(1) == unit_starts(2)
