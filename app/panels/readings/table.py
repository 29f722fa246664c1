"""How the readings look: no boxes, names in the colours of their curves, numbers aligned at the point."""

from typing import Final

from PySide6.QtCore import (
    QEvent,
    QModelIndex,
    QPersistentModelIndex,
    QPointF,
    QRect,
    QRectF,
    QSize,
    Qt,
    Signal,
    SignalInstance,
)
from PySide6.QtGui import QColor, QFont, QFontMetricsF, QKeyEvent, QKeySequence, QPainter, QPen
from PySide6.QtWidgets import (
    QAbstractButton,
    QAbstractItemView,
    QHeaderView,
    QStyle,
    QStyledItemDelegate,
    QStyleOptionViewItem,
    QTableView,
    QWidget,
)

from app.look.theme import Theme, curve_colour, dashes
from app.panels.readings.model import CellText, ReadingsModel

Index = QModelIndex | QPersistentModelIndex

SIDE: Final = 8
_SAMPLE: Final = 22
_GAP: Final = 6


def row_height(metrics: QFontMetricsF, noted: bool) -> int:
    """Return the height of a row: one line, or two where a note stands below the number."""
    return round(metrics.height() * (2 if noted else 1)) + 8


class ReadingDelegate(QStyledItemDelegate):
    """Draws a number with its point where the points of its column are, its unit and a note lighter."""

    def __init__(self, model: ReadingsModel, theme: Theme, parent: QWidget) -> None:
        super().__init__(parent)
        self._model = model
        self.theme = theme
        self.stale = False
        self._known: dict[int, tuple[list[CellText], QFontMetricsF, tuple[float, float, float, float]]] = {}

    def sizeHint(self, option: QStyleOptionViewItem, index: Index) -> QSize:
        """Return the room of the widest parts of the column side by side, and of the note below them."""
        metrics = QFontMetricsF(option.font)
        *parts, note = self._widths(metrics, index.column())
        return QSize(round(max(sum(parts), note)) + 2 * SIDE, row_height(metrics, self._has_note(index)))

    def paint(self, painter: QPainter, option: QStyleOptionViewItem, index: Index) -> None:
        """Draw the cell."""
        rect: QRect = option.rect
        state: QStyle.StateFlag = option.state
        font: QFont = option.font
        painter.save()
        painter.setFont(font)
        if state & QStyle.StateFlag.State_Selected:
            painter.fillRect(rect, QColor(self.theme.selection))
        self._write(painter, QRectF(rect), index, QFontMetricsF(font))
        if state & QStyle.StateFlag.State_HasFocus:
            painter.setRenderHint(QPainter.RenderHint.Antialiasing)
            painter.setPen(QPen(QColor(self.theme.accent), 1.6))
            painter.drawRoundedRect(QRectF(rect).adjusted(1, 1, -1, -1), 4, 4)
        painter.restore()

    def _write(self, painter: QPainter, rect: QRectF, index: Index, metrics: QFontMetricsF) -> None:
        cell = self._model.cell_text(index)
        _, rest, unit, _ = self._widths(metrics, index.column())
        line = metrics.height()
        top = rect.top() + 4
        behind = rect.right() - SIDE - unit
        point = behind - rest
        ink = QColor(self.theme.muted if self.stale else self.theme.text)
        left, right = Qt.AlignmentFlag.AlignLeft, Qt.AlignmentFlag.AlignRight
        painter.setPen(ink)
        painter.drawText(QRectF(rect.left(), top, point - rect.left(), line), right, cell.whole)
        painter.drawText(QRectF(point, top, rest + 1, line), left, cell.rest)
        painter.setPen(QColor(self.theme.muted))
        painter.drawText(QRectF(behind, top, unit + 1, line), left, cell.unit)
        painter.drawText(QRectF(rect.left(), top + line, rect.width() - SIDE, line), right, cell.note)

    def _has_note(self, index: Index) -> bool:
        return self._model.rows[index.row()].kind == "worst"

    def _widths(self, metrics: QFontMetricsF, column: int) -> tuple[float, float, float, float]:
        """Return the widest whole part, rest, unit and note of a column, in pixels.

        Asked for every cell at every paint, so the last answer is kept for as long as the texts are the same.
        """
        cells = self._model.column_texts(column)
        known = self._known.get(column)
        if known is not None and known[0] is cells and known[1] == metrics:
            return known[2]
        widths = (
            max((metrics.horizontalAdvance(cell.whole) for cell in cells), default=0.0),
            max((metrics.horizontalAdvance(cell.rest) for cell in cells), default=0.0),
            max((metrics.horizontalAdvance(cell.unit) for cell in cells), default=0.0),
            max((metrics.horizontalAdvance(cell.note) for cell in cells), default=0.0),
        )
        self._known[column] = (cells, metrics, widths)
        return widths


class CurveHeader(QHeaderView):
    """Names the curves in their colours, each with a sample of its line."""

    def __init__(self, model: ReadingsModel, theme: Theme, parent: QWidget) -> None:
        super().__init__(Qt.Orientation.Horizontal, parent)
        self._model = model
        self.theme = theme
        self.setSectionsClickable(True)
        self.setHighlightSections(False)
        self.setMinimumSectionSize(48)

    def sectionSizeFromContents(self, section: int) -> QSize:
        """Return the room of sample and name."""
        metrics = QFontMetricsF(self.font())
        text = str(self._model.headerData(section, Qt.Orientation.Horizontal))
        width = SIDE + _SAMPLE + _GAP + round(metrics.horizontalAdvance(text)) + SIDE
        return QSize(width, round(metrics.height()) + 8)

    def paintSection(self, painter: QPainter, rect: QRect, section: int) -> None:
        """Draw sample and name, right aligned like the numbers."""
        if section >= len(self._model.curves):
            return
        curve = self._model.curves[section]
        colour = QColor(curve_colour(self.theme, curve.quantity, curve.angle_rank, curve.angle_count))
        painter.save()
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        metrics = QFontMetricsF(self.font())
        left = rect.right() - SIDE - metrics.horizontalAdvance(curve.label)
        pen = QPen(colour, 1.6)
        if dashes(curve.polarization):
            pen.setDashPattern([length / 1.6 for length in dashes(curve.polarization)])
        painter.setPen(pen)
        middle = rect.center().y() + 0.5
        painter.drawLine(QPointF(left - _GAP - _SAMPLE, middle), QPointF(left - _GAP, middle))
        painter.setPen(colour)
        painter.drawText(QRectF(left, rect.top(), 400, rect.height()), Qt.AlignmentFlag.AlignVCenter, curve.label)
        painter.setPen(QColor(self.theme.line))
        painter.drawLine(rect.bottomLeft(), rect.bottomRight())
        painter.restore()


class MarkerHeader(QHeaderView):
    """Names the rows; the active marker has its flag in the accent."""

    def __init__(self, model: ReadingsModel, theme: Theme, parent: QWidget) -> None:
        super().__init__(Qt.Orientation.Vertical, parent)
        self._model = model
        self.theme = theme
        self.active = 0
        self.setSectionsClickable(True)
        self.setHighlightSections(False)
        self.setSectionResizeMode(QHeaderView.ResizeMode.ResizeToContents)

    def sectionSizeFromContents(self, section: int) -> QSize:
        """Return the room of flag and name."""
        metrics = QFontMetricsF(self.font())
        text = str(self._model.headerData(section, Qt.Orientation.Vertical))
        noted = section < len(self._model.rows) and self._model.rows[section].kind == "worst"
        return QSize(round(metrics.horizontalAdvance(text)) + 3 * SIDE, row_height(metrics, noted))

    def paintSection(self, painter: QPainter, rect: QRect, section: int) -> None:
        """Draw the number of the marker on its flag, and its frequency."""
        if section >= len(self._model.rows):
            return
        row = self._model.rows[section]
        painter.save()
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        left = float(rect.left() + SIDE)
        line = QFontMetricsF(self.font()).height() + 8.0
        if row.marker is not None:
            active = row.marker == self.active
            number = str(row.marker + 1)
            width = max(QFontMetricsF(self.font()).horizontalAdvance(number) + 8.0, 18.0)
            flag = QRectF(left, rect.top() + 3.0, width, line - 6.0)
            painter.setPen(QPen(QColor(self.theme.accent if active else self.theme.edge), 1.0))
            painter.setBrush(QColor(self.theme.accent) if active else Qt.BrushStyle.NoBrush)
            painter.drawRoundedRect(flag, 4, 4)
            painter.setPen(QColor(self.theme.on_accent if active else self.theme.text))
            painter.drawText(flag, Qt.AlignmentFlag.AlignCenter, number)
            left = flag.right() + _GAP
        painter.setPen(QColor(self.theme.text))
        room = QRectF(left, rect.top(), rect.right() - left, line)
        painter.drawText(room, Qt.AlignmentFlag.AlignVCenter, row.label)
        painter.restore()


class ReadingsTable(QTableView):
    """A table without boxes; keys that mean something here are not taken for the window's."""

    copy_wanted = Signal()
    remove_wanted = Signal()

    def __init__(self, model: ReadingsModel, theme: Theme, parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self.setModel(model)
        self.curve_header = CurveHeader(model, theme, self)
        self.marker_header = MarkerHeader(model, theme, self)
        self.setHorizontalHeader(self.curve_header)
        self.setVerticalHeader(self.marker_header)
        self.delegate = ReadingDelegate(model, theme, self)
        self.setItemDelegate(self.delegate)
        self.setShowGrid(False)
        self.setFrameShape(QTableView.Shape.NoFrame)
        self.setCornerButtonEnabled(False)
        self.setTabKeyNavigation(False)
        self.setSelectionMode(QAbstractItemView.SelectionMode.ContiguousSelection)
        self.setHorizontalScrollMode(QAbstractItemView.ScrollMode.ScrollPerPixel)
        self.setEditTriggers(QAbstractItemView.EditTrigger.NoEditTriggers)
        self.corner = self.findChild(QAbstractButton)
        font = QFont(self.font())
        font.setFeature(QFont.Tag("tnum"), 1)
        self.setFont(font)
        self.curve_header.setSectionResizeMode(QHeaderView.ResizeMode.ResizeToContents)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        for part in (self.delegate, self.curve_header, self.marker_header):
            part.theme = theme
        self.curve_header.viewport().update()
        self.marker_header.viewport().update()
        self.viewport().update()
        # The style would draw a button in the corner between the headers.
        if self.corner is not None:
            plain = f"background: {theme.base}; border: 0; border-bottom: 1px solid {theme.line};"
            self.corner.setStyleSheet(f"QTableCornerButton::section {{ {plain} }}")

    def event(self, event: QEvent) -> bool:
        """Keep copy and delete from the shortcuts of the window."""
        if (
            event.type() == QEvent.Type.ShortcutOverride
            and isinstance(event, QKeyEvent)
            and self._own_key(event) is not None
        ):
            event.accept()
            return True
        return super().event(event)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Copy and delete; the rest is the table's."""
        wanted = self._own_key(event)
        if wanted is None:
            super().keyPressEvent(event)
            return
        wanted.emit()
        event.accept()

    def _own_key(self, event: QKeyEvent) -> SignalInstance | None:
        if event.matches(QKeySequence.StandardKey.Copy):
            return self.copy_wanted
        if event.key() in (Qt.Key.Key_Delete, Qt.Key.Key_Backspace):
            return self.remove_wanted
        return None
