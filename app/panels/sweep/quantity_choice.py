"""The choice of the quantity shown: the usual ones in one menu, the rarer ones in menus of their group."""

from collections.abc import Callable, Sequence
from typing import Final

from PySide6.QtCore import QPoint, Qt
from PySide6.QtGui import QAction
from PySide6.QtWidgets import QMenu, QWidget

from app.look.theme import Theme
from app.panels.sweep.field import QuietChoice
from stackcore.quantities import GROUPS, QUANTITIES, Quantity, quantity_named

Offers = Callable[[], Sequence[tuple[str, str]]]
"""Names of quantities of single elements, each with the words for its element."""

ELEMENTS: Final = "Absorptance of an element"


def quantity_tip(quantity: Quantity) -> str:
    """Return the definition, the unit and the sign of a quantity, as every tooltip says them."""
    unit = f"In {quantity.unit}." if quantity.unit else "A plain number."
    return "\n".join(part for part in (quantity.definition, unit, quantity.sign) if part)


class QuantityChoice(QuietChoice):
    """All quantities of the table; those of the CSV stand first, the others in a menu for each group.

    Parameters
    ----------
    offers
        Gives the elements of the stack that is looked at, each with the name of its absorptance.
    """

    def __init__(self, theme: Theme, name: str, offers: Offers, parent: QWidget | None = None) -> None:
        super().__init__(theme, name, parent=parent)
        self._offers = offers
        self.menu: QMenu | None = None
        for key, quantity in QUANTITIES.items():
            self._add(key, quantity)

    def show_choice(self, data: object) -> None:
        """Show a quantity; one of an element has an item only while it is shown."""
        if self.findData(data) < 0:
            self._add(str(data), quantity_named(str(data)))
        super().show_choice(data)
        for place in range(self.count() - 1, len(QUANTITIES) - 1, -1):
            if self.itemData(place) != data:
                self.removeItem(place)

    def showPopup(self) -> None:
        """Open the menu below the word."""
        menu = self.menu = QMenu(self)
        menu.setToolTipsVisible(True)
        for group in GROUPS:
            members = [one for one in QUANTITIES.values() if one.group == group]
            usual = any(one.exported for one in members)
            inside = menu if usual else menu.addMenu(group)
            inside.setToolTipsVisible(True)
            for one in members:
                self._offer(inside, one.name, one.label, quantity_tip(one))
            if usual:
                menu.addSeparator()
        offers = self._offers()
        if offers:
            inside = menu.addMenu(ELEMENTS)
            for name, words in offers:
                self._offer(inside, name, words, quantity_tip(quantity_named(name)))
        menu.aboutToHide.connect(menu.deleteLater)
        menu.aboutToHide.connect(self.hidePopup)
        menu.popup(self.mapToGlobal(QPoint(0, self.height())))

    def _add(self, key: str, quantity: Quantity) -> None:
        self.addItem(quantity.label, key)
        self.setItemData(self.count() - 1, quantity_tip(quantity), Qt.ItemDataRole.ToolTipRole)

    def _offer(self, menu: QMenu, name: str, words: str, tip: str) -> None:
        action: QAction = menu.addAction(words)
        action.setCheckable(True)
        action.setChecked(self.currentData() == name)
        action.setToolTip(tip)
        action.setStatusTip(tip)
        action.triggered.connect(lambda _=False: self._choose(name))

    def _choose(self, name: str) -> None:
        self.show_choice(name)
        self.activated.emit(self.currentIndex())
