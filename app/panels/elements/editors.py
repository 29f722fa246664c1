"""What opens in a cell when it is typed into: a line that checks its quantity, a box that offers materials."""

from collections.abc import Sequence

from PySide6.QtCore import QEvent, QObject, Qt, Signal
from PySide6.QtGui import QKeyEvent, QPalette, QWheelEvent
from PySide6.QtWidgets import QComboBox, QCompleter, QLineEdit, QWidget

from app.look.theme import Theme
from app.panels.tables.delegate import fault_ground, is_enter
from stackcore.errors import UnitError
from stackcore.units import Dimension, parse_measure

OFFERED_AT_ONCE = 14
"""Rows of the list of materials shown without scrolling."""
WIDEST_LIST = 420
"""Of the list of materials, in pixels; longer offers are cut short."""
LIST_EXTRA = 32
"""Pixels beside the text in a list: its margins and the scroll bar."""

_LIST_KEYS = (Qt.Key.Key_Up, Qt.Key.Key_Down, Qt.Key.Key_PageUp, Qt.Key.Key_PageDown)


class QuantityEdit(QLineEdit):
    """A line for a quantity with unit; while its text has no value it shows so and says why.

    Parameters
    ----------
    dimension
        What is measured.
    default_unit
        Unit of a bare number.
    may_be_empty
        Whether no text at all is right, as for a part that a sheet does not have.
    """

    def __init__(
        self, theme: Theme, dimension: Dimension, default_unit: str | None, may_be_empty: bool, parent: QWidget
    ) -> None:
        super().__init__(parent)
        self._theme = theme
        self._dimension = dimension
        self._default_unit = default_unit
        self._may_be_empty = may_be_empty
        self.setFrame(False)
        self.setAlignment(Qt.AlignmentFlag.AlignRight)
        self.textEdited.connect(self._check)

    def fault(self) -> str:
        """Return why the text has no value, or an empty text."""
        text = self.text().strip()
        if not text and self._may_be_empty:
            return ""
        try:
            parse_measure(text, self._dimension, default_unit=self._default_unit)
        except UnitError as error:
            return str(error)
        return ""

    def _check(self) -> None:
        fault = self.fault()
        palette = QPalette()
        if fault:
            palette.setColor(QPalette.ColorRole.Base, fault_ground(self._theme))
        self.setPalette(palette)
        self.setToolTip(fault)


class MaterialBox(QComboBox):
    """A box to choose a material by its list or by typing a part of its name.

    `chosen` is emitted when one of the offers is taken from a list, or Enter is pressed in the list that opens
    while typing: the cell is then done. The wheel does nothing here, so that scrolling the table changes
    nothing.
    """

    chosen = Signal()
    entered = Signal()

    def __init__(self, offers: Sequence[str], parent: QWidget) -> None:
        super().__init__(parent)
        self.setEditable(True)
        self.setInsertPolicy(QComboBox.InsertPolicy.NoInsert)
        self.setFrame(False)
        self.setMaxVisibleItems(OFFERED_AT_ONCE)
        self.addItems(list(offers))
        self.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
        completer = QCompleter(self.model(), self)
        completer.setCompletionMode(QCompleter.CompletionMode.PopupCompletion)
        completer.setFilterMode(Qt.MatchFlag.MatchContains)
        completer.setCaseSensitivity(Qt.CaseSensitivity.CaseInsensitive)
        completer.setMaxVisibleItems(OFFERED_AT_ONCE)
        self.setCompleter(completer)
        self._typed = False
        self.editTextChanged.connect(self._note_typing)
        self.activated.connect(self.chosen)
        # The list that opens while typing gives Enter to the line below it, not to the cell: catch it first.
        popup = completer.popup()
        assert popup is not None
        self._matches = popup
        popup.installEventFilter(self)
        # As wide as the longest offer, however narrow the cell.
        widest = min(max((self.fontMetrics().horizontalAdvance(offer) for offer in offers), default=0), WIDEST_LIST)
        popup.setMinimumWidth(widest + LIST_EXTRA)
        self.view().setMinimumWidth(widest + LIST_EXTRA)

    @property
    def typed(self) -> bool:
        """Whether the text is no longer the one the box was opened with."""
        return self._typed

    def open_with(self, text: str) -> None:
        """Show `text` as what stands in the cell."""
        self.setCurrentIndex(self.findText(text))
        self.setEditText(text)
        line = self.lineEdit()
        assert line is not None
        line.selectAll()
        self._typed = False

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if watched is self._matches and is_enter(event):
            index = self._matches.currentIndex()
            if index.isValid():
                self.setEditText(str(index.data()))
            self._matches.hide()
            self.entered.emit()
            return True
        return super().eventFilter(watched, event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        # With the list shut, these keys would step through the offers unseen: they open it instead.
        if event.key() in _LIST_KEYS:
            self.showPopup()
            return
        super().keyPressEvent(event)

    def wheelEvent(self, event: QWheelEvent) -> None:
        event.ignore()

    def _note_typing(self) -> None:
        self._typed = True
