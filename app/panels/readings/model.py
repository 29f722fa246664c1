"""The readings as a table model: one row a marker and one for the worst points, one column a curve."""

from dataclasses import dataclass
from typing import Final

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt

from app.series.curves import Curve
from app.series.readings import Reading, ReadingRow
from app.series.texts import frequency_text, unit_suffix

Index = QModelIndex | QPersistentModelIndex

_ROOT: Final = QModelIndex()


@dataclass(frozen=True, slots=True)
class CellText:
    """A value cut at its decimal point, so that a column can be aligned there.

    Parameters
    ----------
    whole, rest
        Digits before the point, and the point with what follows.
    unit
        With the space before it.
    note
        Words below the number, lighter: where a worst value is.
    """

    whole: str
    rest: str
    unit: str = ""
    note: str = ""


class ReadingsModel(QAbstractTableModel):
    """Holds rows and curves as they come; a change of values alone keeps selection and sizes."""

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._rows: tuple[ReadingRow, ...] = ()
        self._curves: tuple[Curve, ...] = ()
        self._tip = ""
        self._texts: list[list[CellText]] = []

    @property
    def rows(self) -> tuple[ReadingRow, ...]:
        """The rows."""
        return self._rows

    @property
    def curves(self) -> tuple[Curve, ...]:
        """The curves of the columns."""
        return self._curves

    def show_readings(self, rows: tuple[ReadingRow, ...], curves: tuple[Curve, ...], tip: str) -> None:
        """Hold these from now on; `tip` says what the numbers are."""
        same = (len(rows), len(curves)) == (len(self._rows), len(self._curves))
        if not same:
            self.beginResetModel()
        self._rows, self._curves, self._tip = rows, curves, tip
        self._texts = [[_cell_text(row, column) for row in rows] for column in range(len(curves))]
        if not same:
            self.endResetModel()
        elif rows and curves:
            self.dataChanged.emit(self.index(0, 0), self.index(len(rows) - 1, len(curves) - 1))
            self.headerDataChanged.emit(Qt.Orientation.Horizontal, 0, len(curves) - 1)
            self.headerDataChanged.emit(Qt.Orientation.Vertical, 0, len(rows) - 1)

    def reading(self, index: Index) -> Reading | None:
        """Return the reading of a cell, or None where there is none."""
        return self._rows[index.row()].cells[index.column()] if index.isValid() else None

    def cell_text(self, index: Index) -> CellText:
        """Return the text of a cell, cut at its decimal point."""
        return self._texts[index.column()][index.row()] if index.isValid() else CellText("", "")

    def column_texts(self, column: int) -> list[CellText]:
        """Return the texts of a column, cut at their decimal points."""
        return self._texts[column]

    def rowCount(self, parent: Index = _ROOT) -> int:
        """Return the number of rows."""
        return 0 if parent.isValid() else len(self._rows)

    def columnCount(self, parent: Index = _ROOT) -> int:
        """Return the number of curves."""
        return 0 if parent.isValid() else len(self._curves)

    def data(self, index: Index, role: int = Qt.ItemDataRole.DisplayRole) -> object:
        """Return the text of a cell, or what it means."""
        reading = self.reading(index)
        if reading is None:
            return None
        if role == Qt.ItemDataRole.DisplayRole:
            cell = self.cell_text(index)
            return f"{cell.whole}{cell.rest}{cell.unit} {cell.note}".strip()
        if role in (Qt.ItemDataRole.ToolTipRole, Qt.ItemDataRole.AccessibleDescriptionRole):
            curve = self._curves[index.column()]
            where = frequency_text(reading.frequency)
            return f"{curve.label} at {where}: {reading.text}\nExactly {reading.exact}\n{self._tip}"
        if role == Qt.ItemDataRole.TextAlignmentRole:
            return Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
        return None

    def headerData(
        self, section: int, orientation: Qt.Orientation, role: int = Qt.ItemDataRole.DisplayRole
    ) -> object:
        """Return the name of a curve or of a row."""
        if role not in (Qt.ItemDataRole.DisplayRole, Qt.ItemDataRole.ToolTipRole):
            return None
        if orientation == Qt.Orientation.Horizontal:
            label = self._curves[section].label if section < len(self._curves) else ""
            return label if role == Qt.ItemDataRole.DisplayRole else f"{label}\n{self._tip}"
        if section >= len(self._rows):
            return None
        row = self._rows[section]
        return row.label if row.marker is None else f"{row.marker + 1}   {row.label}"


def _cell_text(row: ReadingRow, column: int) -> CellText:
    reading = row.cells[column]
    if reading is None:
        return CellText("", "")
    whole, point, rest = reading.number.partition(".")
    under = f", {reading.condition}" if reading.condition else ""
    note = f"at {frequency_text(reading.frequency)}{under}" if row.kind == "worst" else ""
    return CellText(whole, point + rest, unit_suffix(reading.unit), note)
