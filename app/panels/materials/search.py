"""The line of what is looked for in the library: words, family, bounds of ε′ and loss at the marker."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QLabel, QLineEdit, QListView, QWidget

from app.look.theme import Theme
from app.panels.materials.narrowing import BOUNDS, Bound, Wanted, read_bound
from app.panels.materials.pieces import ink
from app.panels.sweep.field import QuietChoice, QuietField
from app.panels.sweep.flow import FlowLayout
from stackcore.errors import Fault
from stackcore.media.library import Library

EVERY_FAMILY: Final = "Every family"


class SearchLine(QLineEdit):
    """The words searched for; Down goes on into the list, Enter takes its current entry."""

    def __init__(self, found: QListView, take: Callable[[], None], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._found = found
        self.setPlaceholderText("Search the library: copper, glass, foam")
        self.setClearButtonEnabled(True)
        self.setAccessibleName("Search the library")
        self.setToolTip("Words of the name, the family, the note or the source; every one of them must be there.")
        self.returnPressed.connect(take)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() == Qt.Key.Key_Down:
            self._found.setFocus(Qt.FocusReason.OtherFocusReason)
            return
        super().keyPressEvent(event)


class Bounds(QWidget):
    """Family and bounds; `changed` is sent when one of them is another.

    A text that is no number keeps its mark and its reason, and bounds nothing.
    """

    changed = Signal()

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.family = QuietChoice(theme, "Family", "Only materials of this family.", self)
        self.family.addItem(EVERY_FAMILY, "")
        self.fields = {
            name: QuietField(theme, f"{words} at the marker", tip, "0000", self)
            for name, (words, tip) in BOUNDS.items()
        }
        self._bounds: dict[Bound, float | None] = dict.fromkeys(BOUNDS)
        self._labels: list[QLabel] = []
        flow = FlowLayout(self, across=6, down=2)
        flow.addWidget(self.family)
        for name, field in self.fields.items():
            label = QLabel(BOUNDS[name][0], self)
            self._labels.append(label)
            flow.addWidget(label)
            flow.addWidget(field)
            field.committed.connect(lambda text, name=name: self._take(name, text))
        self.family.currentIndexChanged.connect(lambda _index: self.changed.emit())
        self.set_theme(theme)

    def wanted(self, words: str) -> Wanted:
        """Return what is looked for with `words`."""
        bounds = self._bounds
        return Wanted(
            words, self.family.currentData() or "", bounds["lowest"], bounds["highest"], bounds["lossiest"]
        )

    def show_families(self, library: Library) -> None:
        """Offer the families of a library; the one that was chosen stays so where it can."""
        chosen = self.family.currentData()
        self.family.blockSignals(True)
        self.family.clear()
        self.family.addItem(EVERY_FAMILY, "")
        for key in library.families():
            self.family.addItem(library.family(key).label, key)
        self.family.setCurrentIndex(max(self.family.findData(chosen), 0))
        self.family.blockSignals(False)

    def clear(self) -> None:
        """Bound nothing any more."""
        for name, field in self.fields.items():
            field.show_text("")
            self._bounds[name] = None
        self.family.setCurrentIndex(0)
        self.changed.emit()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.family.set_theme(theme)
        for field in self.fields.values():
            field.set_theme(theme)
        for label in self._labels:
            ink(label, theme.muted)

    def _take(self, name: Bound, text: str) -> None:
        found = read_bound(text)
        fault = found if isinstance(found, Fault) else None
        self.fields[name].show_text(text, fault)
        self._bounds[name] = None if isinstance(found, Fault) else found
        self.changed.emit()
