"""The library: narrowed by words and values, looked at, and taken from."""

from collections.abc import Callable

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QKeyEvent, QShowEvent
from PySide6.QtWidgets import QListView, QWidget

from app.look.theme import Theme
from app.panels.materials.library import EntryDelegate, LibraryModel, source_words
from app.panels.materials.picks import Pick
from app.panels.materials.pieces import buttons, column, ink, words
from app.panels.materials.search import Bounds, SearchLine
from stackcore.media.library import Library, LibraryEntry

NOTHING_FOUND = (
    "No entry of the library fits. Search for fewer words, clear the bounds, or add a material of your own."
)


class EntryList(QListView):
    """The entries found; Enter takes the current one, Shift and Ctrl choose several to compare."""

    def __init__(self, take: Callable[[], None], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._take = take
        self.setFrameShape(self.Shape.NoFrame)
        self.setVerticalScrollMode(self.ScrollMode.ScrollPerPixel)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setSelectionMode(self.SelectionMode.ExtendedSelection)
        self.setUniformItemSizes(True)
        self.setAccessibleName("Library of materials")
        self.setAccessibleDescription("Enter uses the entry in this job; Shift and Ctrl choose several to compare.")

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self._take()
            return
        super().keyPressEvent(event)


class LibraryView(QWidget):
    """Search line, bounds, entries found, and the source of the current one in full.

    Parameters
    ----------
    frequency
        In Hz, at which values are given first; see `set_frequency`.
    use
        Takes the entry that is to be used in the job.
    """

    picked = Signal(object, object)
    """Entries chosen by a person to be looked at, a tuple of `Pick`, and the current one."""

    def __init__(
        self,
        library: Library,
        theme: Theme,
        frequency: float,
        use: Callable[[LibraryEntry], None],
        parent: QWidget | None = None,
    ) -> None:
        super().__init__(parent)
        self._use = use
        self._model = LibraryModel(library, frequency, self)
        self._delegate = EntryDelegate(theme, self)
        self.list = EntryList(self.use_current, self)
        self.list.setModel(self._model)
        self.list.setItemDelegate(self._delegate)
        self.list.doubleClicked.connect(lambda _index: self.use_current())
        self.list.selectionModel().selectionChanged.connect(lambda *_: self._chosen())
        self.search = SearchLine(self.list, self.use_current, self)
        self.search.textChanged.connect(lambda _text: self._find())
        self.bounds = Bounds(theme, self)
        self.bounds.changed.connect(self._find)
        self.count = words("", self)
        self.count.setAccessibleName("Entries found")
        self.about = words("", self)
        can = Qt.TextInteractionFlag
        self.about.setTextInteractionFlags(can.TextSelectableByMouse | can.TextSelectableByKeyboard)
        self._library, self._read = library, False
        self._arrange()
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._delegate.theme = theme
        self.list.viewport().update()
        self.bounds.set_theme(theme)
        for label in (self.about, self.count):
            ink(label, theme.muted)

    def set_frequency(self, frequency: float) -> None:
        """Give values at `frequency` in Hz from now on."""
        self._model.set_frequency(frequency)
        self._say()

    def set_used(self, keys: frozenset[str]) -> None:
        """Mark the entries that the job uses."""
        self._model.set_used(keys)

    def showEvent(self, event: QShowEvent) -> None:
        """Read the library when it is looked at for the first time."""
        super().showEvent(event)
        if not self._read:
            self.reload(self._library)

    def reload(self, library: Library) -> None:
        """Show another library, as after an entry was written."""
        self._library = library
        if self.isVisible() or self._read:
            self._read = True
            self._model.set_library(library)
            self.bounds.show_families(library)
            self._find()

    def use_current(self) -> None:
        """Use the current entry in the job."""
        index = self.list.currentIndex()
        if index.isValid():
            self._use(self._model.entry(index))

    def picks(self) -> tuple[Pick, ...]:
        """Return the entries that are chosen, in the order of the list."""
        rows = sorted(self.list.selectionModel().selectedIndexes(), key=lambda index: index.row())
        return tuple(Pick(entry=self._model.entry(index)) for index in rows)

    def _arrange(self) -> None:
        tip = "Add the entry to the materials of this job (Enter)."
        row = buttons(self, ("Use in this job", tip, self.use_current))
        row.setContentsMargins(8, 4, 4, 0)
        row.insertWidget(0, self.search, 1)
        self.bounds.setContentsMargins(4, 0, 4, 0)
        whole = column(self)
        whole.addLayout(row)
        whole.addWidget(self.bounds)
        whole.addWidget(self.count)
        whole.addWidget(self.list, 1)
        whole.addWidget(self.about)

    def _find(self) -> None:
        self._model.want(self.bounds.wanted(self.search.text()))
        if not self.list.currentIndex().isValid():
            self.list.setCurrentIndex(self._model.index(0))
        self._say()

    def _chosen(self) -> None:
        self._say()
        picks = self.picks()
        # Narrowing makes the first entry the current one, which nobody chose; in the list a person chooses.
        if picks and (self.list.hasFocus() or self.search.hasFocus()):
            index = self.list.currentIndex()
            current = Pick(entry=self._model.entry(index)) if index.isValid() else picks[0]
            self.picked.emit(picks, current if current in picks else picks[0])

    def _say(self) -> None:
        if not self._read:
            return
        found, whole = self._model.rowCount(), len(self._library.entries)
        self.count.setText("" if found == whole else f"{found} of {whole} entries")
        self.count.setVisible(bool(self.count.text()))
        index = self.list.currentIndex()
        self.about.setText(source_words(self._model.entry(index)) if index.isValid() else NOTHING_FOUND)
