"""The arrangement: the wall across the top, the table and the curves below, panels beside when asked for."""

from collections.abc import Sequence
from dataclasses import dataclass
from typing import Final

from PySide6.QtCore import QByteArray, QSettings, QSize, Qt
from PySide6.QtGui import QColor, QPainter, QPaintEvent
from PySide6.QtWidgets import (
    QDockWidget,
    QHBoxLayout,
    QLabel,
    QMainWindow,
    QSplitter,
    QSplitterHandle,
    QTabBar,
    QToolButton,
    QVBoxLayout,
    QWidget,
)

from app.look.palette import heading_font
from app.look.theme import Theme
from app.window.beside import Beside

VERSION: Final = 4
"""Of the arrangement; raised when panels come or go, and an older one is then forgotten."""

FIRST_SIZE: Final = QSize(1280, 840)
WALL_SHARE: Final = 0.34
TABLE_SHARE: Final = 0.38
TABLE_WIDEST: Final = 640
"""The table has what it needs to be read; on a wide screen the curves take the rest."""
READINGS_SHARE: Final = 0.26
READINGS_TALLEST: Final = 190
BESIDE_SHARE: Final = 0.25
BESIDE_WIDEST: Final = 400
"""Share and width of a panel that is opened beside for the first time."""
UPPER_SHARE: Final = 0.34
"""Of the height for a panel, such as that of materials, below which another opens."""
TALL: Final = 900
"""Pixels of the window from which there is room for both, one below the other."""
HANDLE: Final = 9
"""Width of the gap between panels, which is where they are resized."""


class QuietHandle(QSplitterHandle):
    """A gap with a hairline; the accent shows when it can be dragged."""

    def paintEvent(self, event: QPaintEvent) -> None:
        """Draw the hairline in the middle of the gap."""
        splitter = self.splitter()
        assert isinstance(splitter, QuietSplitter)
        painter = QPainter(self)
        hot = self.underMouse()
        colour = QColor(splitter.theme.accent if hot else splitter.theme.line)
        thick = 2 if hot else 1
        if self.orientation() == Qt.Orientation.Horizontal:
            painter.fillRect((self.width() - thick) // 2, 0, thick, self.height(), colour)
        else:
            painter.fillRect(0, (self.height() - thick) // 2, self.width(), thick, colour)
        painter.end()


class QuietSplitter(QSplitter):
    """A splitter whose handles are quiet gaps and whose panels cannot be squeezed away."""

    def __init__(self, name: str, orientation: Qt.Orientation, theme: Theme) -> None:
        super().__init__(orientation)
        self.theme = theme
        self.setObjectName(name)
        self.setHandleWidth(HANDLE)
        self.setChildrenCollapsible(False)
        self.setOpaqueResize(True)

    def createHandle(self) -> QSplitterHandle:
        """Return a quiet handle."""
        handle = QuietHandle(self.orientation(), self)
        handle.setAttribute(Qt.WidgetAttribute.WA_Hover)
        return handle

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""
        self.theme = theme
        for place in range(self.count()):
            self.handle(place).update()


@dataclass(frozen=True, slots=True)
class Places:
    """The widgets to arrange."""

    strip: QWidget
    wall: QWidget
    elements: QWidget
    sweep: QWidget
    curves: QWidget
    readings: QWidget


class Arrangement:
    """Puts the panels into the window, remembers where they were, and puts them back.

    Parameters
    ----------
    window
        Whose central widget and docks are arranged.
    beside
        Panels opened beside: each becomes a dock on the right, closed at first.
    """

    def __init__(
        self,
        window: QMainWindow,
        places: Places,
        beside: Sequence[tuple[Beside, QWidget]],
        theme: Theme,
        settings: QSettings,
    ) -> None:
        self._window = window
        self._settings = settings
        across, upright = Qt.Orientation.Horizontal, Qt.Orientation.Vertical
        self._results = QuietSplitter("results", upright, theme)
        self._results.addWidget(_stacked(places.sweep, places.curves))
        self._results.addWidget(places.readings)
        self._lower = QuietSplitter("lower", across, theme)
        self._lower.addWidget(places.elements)
        self._lower.addWidget(self._results)
        self._whole = QuietSplitter("whole", upright, theme)
        self._whole.addWidget(places.wall)
        self._whole.addWidget(self._lower)
        centre = QWidget(window)
        column = QVBoxLayout(centre)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addWidget(places.strip)
        column.addWidget(self._whole, 1)
        window.setCentralWidget(centre)
        self._docks = {one: _dock(window, one.title, widget) for one, widget in beside}
        self._placed: set[Beside] = set()
        self._put_beside()

    @property
    def splitters(self) -> tuple[QuietSplitter, ...]:
        """The splitters, for tests and for the theme."""
        return self._whole, self._lower, self._results

    def dock(self, beside: Beside) -> QDockWidget:
        """Return the dock of a panel."""
        return self._docks[beside]

    def shown(self, beside: Beside) -> bool:
        """Whether a panel is shown."""
        return not self._docks[beside].isHidden()

    def toggle(self, beside: Beside) -> None:
        """Show a panel, or hide it."""
        if self.shown(beside):
            self._docks[beside].hide()
        else:
            self.open_beside(beside)

    def open_beside(self, beside: Beside) -> None:
        """Show a panel; the first time in a good width."""
        dock = self._docks[beside]
        dock.show()
        dock.raise_()
        if beside not in self._placed:
            width = min(round(self._window.width() * BESIDE_SHARE), BESIDE_WIDEST)
            self._window.resizeDocks([dock], [width], Qt.Orientation.Horizontal)
            if beside.below:
                self._place_below(dock, self._named(beside.below))
        self._placed.add(beside)
        # Qt makes the row of tabs when two panels share a place.
        for tabs in self._window.findChildren(QTabBar, options=Qt.FindChildOption.FindDirectChildrenOnly):
            tabs.setAccessibleName("Panels beside")

    def _named(self, name: str) -> QDockWidget:
        return next(dock for one, dock in self._docks.items() if one.name == name)

    def _place_below(self, dock: QDockWidget, upper: QDockWidget) -> None:
        """Put a panel below the one it belongs to; in a low window behind it, as a tab."""
        if self._window.height() < TALL:
            self._window.tabifyDockWidget(upper, dock)
            dock.raise_()
            return
        shares = (UPPER_SHARE, 1 - UPPER_SHARE)
        heights = [round(self._window.height() * share) for share in shares]
        self._window.resizeDocks([upper, dock], heights, Qt.Orientation.Vertical)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""
        for splitter in self.splitters:
            splitter.set_theme(theme)

    def reset(self) -> None:
        """Arrange everything as at the first run, in the size the window has."""
        self._put_beside()
        self._placed.clear()
        width, height = self._window.width(), self._window.height()
        wall = round(height * WALL_SHARE)
        table = min(round(width * TABLE_SHARE), TABLE_WIDEST)
        readings = min(round((height - wall) * READINGS_SHARE), READINGS_TALLEST)
        _divide(self._whole, (wall, height - wall), (1, 2))
        _divide(self._lower, (table, width - table), (1, 2))
        _divide(self._results, (height - wall - readings, readings), (1, 0))

    def _put_beside(self) -> None:
        """Put every panel of the side to the right, closed, in one place: those open together become tabs.

        One that belongs below another goes there, since what is chosen above is seen in it.
        """
        first, *others = self._docks.values()
        for dock in (first, *others):
            dock.setFloating(False)
            self._window.addDockWidget(Qt.DockWidgetArea.RightDockWidgetArea, dock)
        for beside, dock in self._docks.items():
            if beside.below:
                self._window.splitDockWidget(self._named(beside.below), dock, Qt.Orientation.Vertical)
            elif dock is not first:
                self._window.tabifyDockWidget(first, dock)
        for dock in (first, *others):
            dock.hide()

    def save(self) -> None:
        """Remember size, place and shares."""
        self._settings.setValue("layout/version", VERSION)
        self._settings.setValue("layout/geometry", self._window.saveGeometry())
        self._settings.setValue("layout/state", self._window.saveState(VERSION))
        for splitter in self.splitters:
            self._settings.setValue(f"layout/{splitter.objectName()}", splitter.saveState())

    def restore(self) -> None:
        """Arrange everything as it was left, or as at the first run when nothing (usable) is remembered."""
        self._window.resize(FIRST_SIZE)
        if self._settings.value("layout/version", 0, type=int) != VERSION or not self._restore_window():
            self.reset()
            return
        self._placed.update(self._docks)
        for splitter in self.splitters:
            splitter.restoreState(self._bytes(splitter.objectName()))

    def _restore_window(self) -> bool:
        self._window.restoreGeometry(self._bytes("geometry"))
        return self._window.restoreState(self._bytes("state"), VERSION)

    def _bytes(self, key: str) -> QByteArray:
        """Return a remembered value, or nothing when it is not what it should be."""
        value = self._settings.value(f"layout/{key}")
        return value if isinstance(value, QByteArray) else QByteArray()


def _stacked(*widgets: QWidget) -> QWidget:
    box = QWidget()
    column = QVBoxLayout(box)
    column.setContentsMargins(0, 0, 0, 0)
    column.setSpacing(0)
    for widget in widgets[:-1]:
        column.addWidget(widget)
    column.addWidget(widgets[-1], 1)
    return box


def _dock(window: QMainWindow, title: str, widget: QWidget) -> QDockWidget:
    dock = QDockWidget(title, window)
    dock.setObjectName(f"dock {title}")
    dock.setTitleBarWidget(_title_bar(dock, title))
    dock.setWidget(widget)
    return dock


def _title_bar(dock: QDockWidget, title: str) -> QWidget:
    """Return a heading with Close; it can still be dragged like any title."""
    bar = QWidget(dock)
    name = QLabel(title, bar)
    name.setFont(heading_font(name.font()))
    close = QToolButton(bar)
    close.setText("Close")
    close.setAutoRaise(True)
    close.setToolTip(f"Close the panel {title}; the menu opens it again.")
    close.clicked.connect(dock.close)
    row = QHBoxLayout(bar)
    row.setContentsMargins(8, 4, 4, 4)
    row.setSpacing(8)
    row.addWidget(name, 1)
    row.addWidget(close)
    return bar


def _divide(splitter: QSplitter, sizes: Sequence[int], stretch: Sequence[int]) -> None:
    splitter.setSizes(list(sizes))
    for place, factor in enumerate(stretch):
        splitter.setStretchFactor(place, factor)
