"""A layout that sets groups side by side and goes on below when the line is full, like words of a sentence."""

from PySide6.QtCore import QMargins, QRect, QSize, Qt
from PySide6.QtWidgets import QLayout, QLayoutItem, QWidget


class FlowLayout(QLayout):
    """Places its items from left to right, wrapping; hidden ones take no room.

    Parameters
    ----------
    across, down
        Pixels between items of a line and between lines.
    """

    def __init__(self, parent: QWidget | None = None, across: int = 16, down: int = 4) -> None:
        super().__init__(parent)
        self._items: list[QLayoutItem] = []
        self._across, self._down = across, down
        self.setContentsMargins(QMargins(0, 0, 0, 0))

    def addItem(self, item: QLayoutItem) -> None:
        """Add an item at the end."""
        self._items.append(item)

    def count(self) -> int:
        """Return the number of items."""
        return len(self._items)

    def itemAt(self, index: int) -> QLayoutItem | None:
        """Return an item, or None past the end."""
        return self._items[index] if 0 <= index < len(self._items) else None

    def takeAt(self, index: int) -> QLayoutItem | None:
        """Take an item out, or return None past the end."""
        return self._items.pop(index) if 0 <= index < len(self._items) else None

    def expandingDirections(self) -> Qt.Orientation:
        """Take no more room than needed."""
        return Qt.Orientation(0)

    def hasHeightForWidth(self) -> bool:
        """Tell Qt that a narrower line is a taller one."""
        return True

    def heightForWidth(self, width: int) -> int:
        """Return the height needed at a width."""
        return self._place(QRect(0, 0, width, 0), move=False)

    def setGeometry(self, rect: QRect) -> None:
        """Place the items."""
        super().setGeometry(rect)
        self._place(rect, move=True)

    def sizeHint(self) -> QSize:
        """Return the room of all items in one line."""
        shown = [item for item in self._items if not item.isEmpty()]
        width = sum(item.sizeHint().width() for item in shown) + self._across * max(len(shown) - 1, 0)
        height = max((item.sizeHint().height() for item in shown), default=0)
        return QSize(width, height)

    def minimumSize(self) -> QSize:
        """Return the room of the largest item."""
        size = QSize(0, 0)
        for item in self._items:
            if not item.isEmpty():
                size = size.expandedTo(item.minimumSize())
        return size

    def _place(self, rect: QRect, *, move: bool) -> int:
        y = rect.top()
        for line in self._lines(rect.width()):
            x, height = rect.left(), max(size.height() for _, size in line)
            for item, size in line:
                if move:
                    item.setGeometry(QRect(x, y + (height - size.height()) // 2, size.width(), size.height()))
                x += size.width() + self._across
            y += height + self._down
        return max(y - self._down - rect.top(), 0)

    def _lines(self, room: int) -> list[list[tuple[QLayoutItem, QSize]]]:
        """Return the items that are shown, line by line, each with its size."""
        lines: list[list[tuple[QLayoutItem, QSize]]] = []
        used = 0
        for item in self._items:
            if item.isEmpty():
                continue
            size = item.sizeHint()
            size.setWidth(min(size.width(), max(room, item.minimumSize().width())))
            if not lines or used + self._across + size.width() > room:
                lines.append([])
                used = -self._across
            lines[-1].append((item, size))
            used += self._across + size.width()
        return lines
