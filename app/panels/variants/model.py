"""The table of stacks as Qt sees it."""

from typing import Final

from PySide6.QtCore import QAbstractTableModel, QModelIndex, QObject, QPersistentModelIndex, Qt

from app.panels.tables.delegate import Ask
from app.series.texts import MINUS, exact_text
from app.series.variants import Comparison, Variant
from stackcore.job.mass import Sum
from stackcore.quantities import quantity_named
from stackcore.units import Dimension, format_value

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole

_NOWHERE: Final = QModelIndex()
_RIGHT: Final = Qt.AlignmentFlag.AlignRight | Qt.AlignmentFlag.AlignVCenter
_LEFT: Final = Qt.AlignmentFlag.AlignLeft | Qt.AlignmentFlag.AlignVCenter

NAME, WORST, DIFFERENCE, THICKNESS, MASS, COST, PLACE = range(7)
TITLES: Final = ("Stack", "Worst", "Δ", "Thickness", "Mass", "Cost", "At")
_TIPS: Final = {
    NAME: "Name of the stack; the one in hand is chosen.",
    THICKNESS: "Of all layers, repeats of groups counted.",
    MASS: "By area, from the densities of the materials; at least this much where some give none.",
    COST: "By area, from densities and the prices you gave, in their currency.",
    WORST: "The worst value of what the curves show, over the sweep, the polarizations and the conditions shown.",
    PLACE: "Where the worst value is.",
    DIFFERENCE: "The worst value less that of the stack in hand.",
}


class VariantsModel(QAbstractTableModel):
    """One row a stack. It shows a comparison and the stack in hand, and changes nothing."""

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._comparison = Comparison("transmittance", "fraction", ())
        self._in_hand = 0

    @property
    def comparison(self) -> Comparison:
        """What is shown."""
        return self._comparison

    def show_comparison(self, comparison: Comparison, in_hand: int) -> None:
        """Show another comparison; rows stay where the stacks are as many."""
        same = len(comparison.variants) == len(self._comparison.variants)
        if not same:
            self.beginResetModel()
        self._comparison, self._in_hand = comparison, in_hand
        if not same:
            self.endResetModel()
        elif comparison.variants:
            last = self.index(len(comparison.variants) - 1, self.columnCount() - 1)
            self.dataChanged.emit(self.index(0, 0), last)
        self.headerDataChanged.emit(Qt.Orientation.Horizontal, 0, self.columnCount() - 1)

    def rowCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._comparison.variants)

    def columnCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(_TIPS)

    def data(self, index: Index, role: int = Role.DisplayRole) -> object:
        if not self.checkIndex(index, self.CheckIndexOption.IndexIsValid):
            return None
        variant, column = self._comparison.variants[index.row()], index.column()
        match role:
            case Role.DisplayRole:
                return self._text(index.row(), variant, column)
            case Role.ToolTipRole:
                return _tip(variant, column)
            case Role.TextAlignmentRole:
                return _RIGHT if column in (THICKNESS, MASS, COST, WORST, DIFFERENCE) else _LEFT
            case Role.AccessibleTextRole:
                return (
                    f"{self._title(column)} of {variant.name}: {self._text(index.row(), variant, column) or 'none'}"
                )
            case Ask.ASIDE:
                return False
        return None

    def headerData(self, section: int, orientation: Qt.Orientation, role: int = Role.DisplayRole) -> object:
        if orientation != Qt.Orientation.Horizontal or section not in _TIPS:
            return None
        match role:
            case Role.DisplayRole:
                return TITLES[section]
            case Role.AccessibleTextRole:
                return self._title(section)
            case Role.ToolTipRole:
                return f"{self._title(section)}. {_TIPS[section]}"
            case Role.TextAlignmentRole:
                return _RIGHT if section in (THICKNESS, MASS, COST, WORST, DIFFERENCE) else _LEFT
        return None

    def _title(self, column: int) -> str:
        """Return the whole title; the header shows a short one."""
        if column == WORST:
            return f"Worst {quantity_named(self._comparison.quantity).label.lower()}"
        return "Place of the worst" if column == PLACE else "Difference" if column == DIFFERENCE else TITLES[column]

    def _text(self, row: int, variant: Variant, column: int) -> str:
        worst = variant.worst
        if column == DIFFERENCE:
            gap = self._comparison.difference(row, self._in_hand)
            if gap is None:
                return "in hand" if row == self._in_hand else ""
            return exact_text(float(f"{gap:.4g}"), self._comparison.unit).replace("-", MINUS)
        return {
            NAME: variant.name,
            WORST: worst.text if worst is not None else "",
            PLACE: worst.place if worst is not None else "",
            THICKNESS: format_value(float(f"{variant.thickness:.6g}"), Dimension.LENGTH),
            MASS: _sum_text(variant.mass, "kg/m²"),
            COST: _sum_text(variant.cost, "/m²"),
        }[column]


def _sum_text(found: Sum, unit: str) -> str:
    """Return a sum with its unit, marked where it is not whole, and nothing where nothing is known."""
    if found.unknown and found.value == 0:
        return ""
    more = "" if found.whole else "> "
    return f"{more}{found.value:.4g} {unit}".replace(" /", "/")


def _tip(variant: Variant, column: int) -> str:
    if column == NAME:
        return variant.name
    unknown = {MASS: variant.mass.unknown, COST: variant.cost.unknown}.get(column, ())
    if unknown:
        what = "density" if column == MASS else "density or price"
        return f"No {what} is given for {', '.join(unknown)}."
    return _TIPS[column]
