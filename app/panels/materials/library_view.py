"""The lower half of the panel: the library, searched and taken from."""

from collections.abc import Callable

from PySide6.QtCore import Qt
from PySide6.QtGui import QKeyEvent
from PySide6.QtWidgets import QLineEdit, QListView, QWidget

from app.look.theme import Theme
from app.panels.materials.library import EntryDelegate, LibraryModel, source_words
from app.panels.materials.pieces import buttons, column, heading, ink, words
from stackcore.media.library import Library, LibraryEntry

NOTHING_FOUND = "No entry of the library holds all of these words. Search for less, or add a constant above."


class EntryList(QListView):
    """The entries found; Enter takes the current one."""

    def __init__(self, take: Callable[[], None], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._take = take
        self.setFrameShape(self.Shape.NoFrame)
        self.setVerticalScrollMode(self.ScrollMode.ScrollPerPixel)
        self.setHorizontalScrollBarPolicy(Qt.ScrollBarPolicy.ScrollBarAlwaysOff)
        self.setAccessibleName("Library of materials")
        self.setAccessibleDescription("Enter uses the entry in this job.")

    def keyPressEvent(self, event: QKeyEvent) -> None:
        if event.key() in (Qt.Key.Key_Return, Qt.Key.Key_Enter):
            self._take()
            return
        super().keyPressEvent(event)


class SearchLine(QLineEdit):
    """The words searched for; Down goes on into the list, Enter takes its current entry."""

    def __init__(self, found: EntryList, take: Callable[[], None], parent: QWidget | None = None) -> None:
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


class LibraryView(QWidget):
    """Search line, entries found, and the source of the current one in full.

    Parameters
    ----------
    use
        Takes the entry that is to be used in the job.
    """

    def __init__(
        self, library: Library, theme: Theme, use: Callable[[LibraryEntry], None], parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._use = use
        self._model = LibraryModel(library, self)
        self._delegate = EntryDelegate(theme, self)
        self.list = EntryList(self.use_current, self)
        self.list.setModel(self._model)
        self.list.setItemDelegate(self._delegate)
        self.list.doubleClicked.connect(lambda _index: self.use_current())
        self.list.selectionModel().currentChanged.connect(lambda *_indexes: self._show_source())
        self.search = SearchLine(self.list, self.use_current, self)
        self.search.textChanged.connect(self._find)
        self.about = words("", self)
        can = Qt.TextInteractionFlag
        self.about.setTextInteractionFlags(can.TextSelectableByMouse | can.TextSelectableByKeyboard)
        self._arrange()
        self._find("")
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._delegate.theme = theme
        self.list.viewport().update()
        ink(self.about, theme.muted)

    def use_current(self) -> None:
        """Use the current entry in the job."""
        index = self.list.currentIndex()
        if index.isValid():
            self._use(self._model.entry(index))

    def _arrange(self) -> None:
        tip = "Add the entry to the materials of this job (Enter)."
        row = buttons(self, ("Use in this job", tip, self.use_current))
        row.setContentsMargins(8, 0, 4, 0)
        row.insertWidget(0, self.search, 1)
        whole = column(self)
        whole.addWidget(heading("Library", self))
        whole.addLayout(row)
        whole.addWidget(self.list, 1)
        whole.addWidget(self.about)

    def _find(self, wanted: str) -> None:
        self._model.search(wanted)
        self.list.setCurrentIndex(self._model.index(0))
        self._show_source()

    def _show_source(self) -> None:
        index = self.list.currentIndex()
        self.about.setText(source_words(self._model.entry(index)) if index.isValid() else NOTHING_FOUND)
