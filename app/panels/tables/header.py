"""A header without buttons and frames: quiet words over the columns and one line under them."""

from typing import Final

from PySide6.QtCore import QRect, QSize, Qt
from PySide6.QtGui import QColor, QPainter
from PySide6.QtWidgets import QHeaderView, QWidget

from app.look.theme import Theme

PADDING: Final = 8


class QuietHeader(QHeaderView):
    """The header of a table in the colours of the theme; titles stand as their columns do, left or right."""

    def __init__(self, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(Qt.Orientation.Horizontal, parent)
        self._theme = theme
        self.setSectionsClickable(False)
        self.setHighlightSections(False)
        self.setMinimumSectionSize(32)
        self.setFixedHeight(self.fontMetrics().height() + 12)

    def set_theme(self, theme: Theme) -> None:
        """Draw in the colours of `theme` from now on."""
        self._theme = theme
        self.viewport().update()

    def paintSection(self, painter: QPainter, rect: QRect, logicalIndex: int) -> None:
        painter.save()
        painter.fillRect(rect, QColor(self._theme.base))
        painter.setPen(QColor(self._theme.edge))
        painter.drawLine(rect.bottomLeft(), rect.bottomRight())
        model = self.model()
        title = str(model.headerData(logicalIndex, self.orientation()) or "")
        alignment = model.headerData(logicalIndex, self.orientation(), Qt.ItemDataRole.TextAlignmentRole)
        painter.setPen(QColor(self._theme.muted))
        room = rect.adjusted(PADDING, 0, -PADDING, 0)
        elided = painter.fontMetrics().elidedText(title, Qt.TextElideMode.ElideRight, room.width())
        painter.drawText(room, alignment or Qt.AlignmentFlag.AlignCenter, elided)
        painter.restore()

    def sectionSizeFromContents(self, logicalIndex: int) -> QSize:
        title = str(self.model().headerData(logicalIndex, self.orientation()) or "")
        return QSize(self.fontMetrics().horizontalAdvance(title) + 2 * PADDING + 2, self.height())
