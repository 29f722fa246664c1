"""The library as a list to search: each entry with its values, where they hold, and how sure they are."""

from collections.abc import Sequence
from enum import IntEnum
from typing import Final

from PySide6.QtCore import QAbstractListModel, QModelIndex, QObject, QPersistentModelIndex, QRect, QSize, Qt
from PySide6.QtGui import QColor, QPainter, QPen
from PySide6.QtWidgets import QStyle, QStyledItemDelegate, QStyleOptionViewItem

from app.look.theme import Theme
from app.panels.materials.narrowing import Values, Wanted, narrowed
from app.panels.materials.words import glance, range_text, spread_text, values_text
from app.panels.tables.delegate import PADDING
from app.series.texts import frequency_text
from stackcore.media.library import Library, LibraryEntry
from stackcore.media.models import MODELS

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole

_NOWHERE: Final = QModelIndex()
LINES: Final = 3


class AskedOfEntry(IntEnum):
    """What the delegate asks of an entry beyond Qt's own roles."""

    VALUES = Role.UserRole + 1
    FACTS = Role.UserRole + 2
    SOURCE = Role.UserRole + 3


class LibraryModel(QAbstractListModel):
    """The entries of the library that fit what is wanted, in the order of the library's search.

    An entry is evaluated when its row is drawn, or when what is wanted is bounded by values.
    """

    def __init__(self, library: Library, frequency: float, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._library = library
        self._frequency = frequency
        self._wanted = Wanted()
        self._values = Values()
        self._used: frozenset[str] = frozenset()
        # Nothing is read before it is wanted: a file of the library costs time at the start of the program.
        self._entries: Sequence[LibraryEntry] = ()

    def set_library(self, library: Library) -> None:
        """Show the entries of another library from now on."""
        self.beginResetModel()
        self._library = library
        self._values = Values()
        self._entries = narrowed(library, self._wanted, self.permittivity)
        self.endResetModel()

    def want(self, wanted: Wanted) -> None:
        """Show the entries that fit from now on."""
        self._wanted = wanted
        self._find()

    def set_frequency(self, frequency: float) -> None:
        """Give values at `frequency` in Hz from now on."""
        if frequency == self._frequency:
            return
        self._frequency = frequency
        if self._wanted.by_values:
            self._find()
        self._tell_all()

    def set_used(self, keys: frozenset[str]) -> None:
        """Mark the entries that the job uses."""
        if keys != self._used:
            self._used = keys
            self._tell_all()

    def permittivity(self, entry: LibraryEntry) -> complex:
        """Return the relative permittivity of an entry at the frequency of the values."""
        return self._values.permittivity(entry, self._frequency)

    def _find(self) -> None:
        found = narrowed(self._library, self._wanted, self.permittivity)
        if tuple(found) == tuple(self._entries):
            return
        self.beginResetModel()
        self._entries = found
        self.endResetModel()

    def _tell_all(self) -> None:
        if self._entries:
            self.dataChanged.emit(self.index(0), self.index(len(self._entries) - 1))

    def entry(self, index: Index) -> LibraryEntry:
        """Return the entry at `index`."""
        return self._entries[index.row()]

    def rowCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._entries)

    def data(self, index: Index, role: int = Role.DisplayRole) -> object:
        if not self.checkIndex(index, self.CheckIndexOption.IndexIsValid):
            return None
        entry = self.entry(index)
        match role:
            case Role.DisplayRole:
                return entry.label
            case Role.ToolTipRole | Role.AccessibleDescriptionRole:
                return entry_words(entry)
            case Role.AccessibleTextRole:
                return f"{entry.label}: {self._glance(entry)}, {', '.join(self._facts(entry))}"
            case AskedOfEntry.VALUES:
                return self._glance(entry)
            case AskedOfEntry.FACTS:
                return " · ".join(self._facts(entry))
            case AskedOfEntry.SOURCE:
                return entry.provenance.source
        return None

    def _glance(self, entry: LibraryEntry) -> str:
        return glance(self.permittivity(entry), self._frequency)

    def _facts(self, entry: LibraryEntry) -> list[str]:
        # What matters most first: where there is little room, the line is cut short at its end.
        spread = spread_text(entry)
        known = entry.valid_range.lowest <= self._frequency <= entry.valid_range.highest
        facts = [
            _own_words(entry),
            "in this job" if entry.key in self._used else "",
            "" if known else f"a guess at {frequency_text(self._frequency)}",
            range_text(entry.valid_range),
            entry.provenance.certainty,
            f"spread {spread}" if spread else "",
            self._library.family(entry.family).label,
        ]
        return [fact for fact in facts if fact]


def _own_words(entry: LibraryEntry) -> str:
    if not entry.own:
        return ""
    return "your own, in place of the program's" if entry.shadows else "your own"


def entry_words(entry: LibraryEntry) -> str:
    """Return everything known about an entry as sentences: values, range, spread, certainty, source, note."""
    spread = spread_text(entry)
    sentences = [
        f"{entry.label}: {MODELS[entry.model].label}, {values_text(entry)}",
        _own_words(entry).capitalize(),
        f"Holds from {range_text(entry.valid_range)}",
        f"Typical spread in production, one standard deviation: {spread}" if spread else "",
        f"Certainty: {entry.provenance.certainty}",
        f"Source: {entry.provenance.source}",
        entry.provenance.note,
    ]
    return "\n".join(text if text.endswith(".") else f"{text}." for text in sentences if text)


def source_words(entry: LibraryEntry) -> str:
    """Return source and note of an entry in full, which the list cuts short."""
    sentences = (f"Source: {entry.provenance.source}", entry.provenance.note)
    return "\n".join(text if text.endswith(".") else f"{text}." for text in sentences if text)


class EntryDelegate(QStyledItemDelegate):
    """Draws an entry in three lines: its name and values, what is known of them, and the source."""

    def __init__(self, theme: Theme, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.theme = theme

    def sizeHint(self, option: QStyleOptionViewItem, index: Index) -> QSize:
        return QSize(120, LINES * option.fontMetrics.height() + 12)

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        theme, painter_font = self.theme, option.font
        painter.save()
        painter.setFont(painter_font)
        chosen = bool(option.state & QStyle.StateFlag.State_Selected)
        painter.fillRect(option.rect, QColor(theme.selection if chosen else theme.base))
        painter.setPen(QColor(theme.line))
        painter.drawLine(option.rect.bottomLeft(), option.rect.bottomRight())
        room = option.rect.adjusted(PADDING, 6, -PADDING, -6)
        height = painter.fontMetrics().height()
        rows = [QRect(room.left(), room.top() + row * height, room.width(), height) for row in range(LINES)]
        values = str(index.data(AskedOfEntry.VALUES))
        values_width = min(painter.fontMetrics().horizontalAdvance(values) + 4, room.width() * 2 // 3)
        _write(painter, rows[0].adjusted(0, 0, -values_width - PADDING, 0), str(index.data()), theme.text)
        at = rows[0].adjusted(rows[0].width() - values_width, 0, 0, 0)
        _write(painter, at, values, theme.text, Qt.AlignmentFlag.AlignRight)
        _write(painter, rows[1], str(index.data(AskedOfEntry.FACTS)), theme.muted)
        _write(painter, rows[2], str(index.data(AskedOfEntry.SOURCE)), theme.muted)
        if option.state & QStyle.StateFlag.State_HasFocus:
            painter.setPen(QPen(QColor(theme.accent), 2))
            painter.drawRect(option.rect.adjusted(1, 1, -1, -1))
        painter.restore()


def _write(
    painter: QPainter,
    room: QRect,
    text: str,
    ink: str,
    alignment: Qt.AlignmentFlag = Qt.AlignmentFlag.AlignLeft,
) -> None:
    painter.setPen(QColor(ink))
    elided = painter.fontMetrics().elidedText(text, Qt.TextElideMode.ElideRight, room.width())
    painter.drawText(room, alignment | Qt.AlignmentFlag.AlignVCenter, elided)
