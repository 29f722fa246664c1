"""What the health check says of the job's materials, as a list that Qt shows."""

from collections.abc import Sequence
from dataclasses import dataclass
from enum import IntEnum
from typing import Final

from PySide6.QtCore import QAbstractListModel, QModelIndex, QObject, QPersistentModelIndex, QRect, QSize, Qt
from PySide6.QtGui import QColor, QFont, QFontMetrics, QPainter, QPen
from PySide6.QtWidgets import QAbstractItemView, QStyle, QStyledItemDelegate, QStyleOptionViewItem

from app.look.theme import Theme
from app.panels.tables.delegate import PADDING
from stackcore.errors import Severity
from stackcore.media.health import Finding

Index = QModelIndex | QPersistentModelIndex
Role = Qt.ItemDataRole

_NOWHERE: Final = QModelIndex()
_GAP: Final = 6
_WRAP: Final = int(Qt.TextFlag.TextWordWrap | Qt.AlignmentFlag.AlignLeft)

SEVERITIES: Final[dict[Severity, str]] = {"error": "Wrong", "warning": "Doubtful", "note": "Good to know"}
"""How a severity reads."""


@dataclass(frozen=True, slots=True)
class Told:
    """One finding and the material of the job it is about."""

    name: str
    label: str
    finding: Finding

    @property
    def heading(self) -> str:
        """Severity, material and place in words."""
        place = f", {self.finding.place.replace('_', ' ')}" if self.finding.place else ""
        return f"{SEVERITIES[self.finding.severity]}: {self.label}{place}"

    @property
    def body(self) -> str:
        """Reason and hint as sentences."""
        return f"{_sentence(self.finding.reason)} {_sentence(self.finding.hint)}".strip()


class AskedOfFinding(IntEnum):
    """What the delegate asks of a finding beyond Qt's own roles."""

    TOLD = Role.UserRole + 1


class FindingsModel(QAbstractListModel):
    """Findings, the worst first."""

    def __init__(self, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self._told: tuple[Told, ...] = ()

    @property
    def told(self) -> tuple[Told, ...]:
        """What is listed."""
        return self._told

    def show_told(self, told: Sequence[Told]) -> None:
        """List these from now on, the worst first."""
        order = list(SEVERITIES)
        found = tuple(sorted(told, key=lambda one: order.index(one.finding.severity)))
        if found != self._told:
            self.beginResetModel()
            self._told = found
            self.endResetModel()

    def rowCount(self, parent: Index = _NOWHERE) -> int:
        return 0 if parent.isValid() else len(self._told)

    def data(self, index: Index, role: int = Role.DisplayRole) -> object:
        if not self.checkIndex(index, self.CheckIndexOption.IndexIsValid):
            return None
        told = self._told[index.row()]
        match role:
            case Role.DisplayRole:
                return told.heading
            case Role.AccessibleTextRole | Role.ToolTipRole:
                return f"{told.heading}.\n{told.body}"
            case AskedOfFinding.TOLD:
                return told
        return None


class FindingDelegate(QStyledItemDelegate):
    """Draws a finding as a heading in the ink of its severity and sentences that wrap."""

    def __init__(self, theme: Theme, parent: QObject | None = None) -> None:
        super().__init__(parent)
        self.theme = theme

    def sizeHint(self, option: QStyleOptionViewItem, index: Index) -> QSize:
        view = option.widget
        width = view.viewport().width() if isinstance(view, QAbstractItemView) else option.rect.width()
        told: Told = index.data(AskedOfFinding.TOLD)
        room = QRect(0, 0, max(width - 2 * PADDING, 60), 10000)
        heading = QFontMetrics(_stronger(option.font)).boundingRect(room, _WRAP, told.heading).height()
        body = option.fontMetrics.boundingRect(room, _WRAP, told.body).height()
        return QSize(120, heading + body + 2 * _GAP + 2)

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        theme = self.theme
        told: Told = index.data(AskedOfFinding.TOLD)
        painter.save()
        chosen = bool(option.state & QStyle.StateFlag.State_Selected)
        painter.fillRect(option.rect, QColor(theme.selection if chosen else theme.base))
        painter.setPen(QColor(theme.line))
        painter.drawLine(option.rect.bottomLeft(), option.rect.bottomRight())
        room = option.rect.adjusted(PADDING, _GAP, -PADDING, -_GAP)
        inks: dict[Severity, str] = {"error": theme.fault, "warning": theme.warning, "note": theme.text}
        painter.setFont(_stronger(option.font))
        painter.setPen(QColor(inks[told.finding.severity]))
        used = painter.boundingRect(room, _WRAP, told.heading)
        painter.drawText(room, _WRAP, told.heading)
        painter.setFont(option.font)
        painter.setPen(QColor(theme.text))
        painter.drawText(room.adjusted(0, used.height() + 2, 0, 0), _WRAP, told.body)
        if option.state & QStyle.StateFlag.State_HasFocus:
            painter.setPen(QPen(QColor(theme.accent), 2))
            painter.drawRect(option.rect.adjusted(1, 1, -1, -1))
        painter.restore()


def _stronger(font: QFont) -> QFont:
    strong = QFont(font)
    strong.setWeight(QFont.Weight.Medium)
    return strong


def _sentence(text: str) -> str:
    text = text[:1].upper() + text[1:]
    return text if not text or text.endswith((".", "?", "!")) else f"{text}."
