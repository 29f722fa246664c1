"""The readings under the curves: what the markers read, and the worst points."""

from collections.abc import Callable
from typing import TYPE_CHECKING

from PySide6.QtCore import QItemSelectionModel, QModelIndex, QPoint, Qt
from PySide6.QtGui import QColor, QGuiApplication, QPalette
from PySide6.QtWidgets import QLabel, QMenu, QVBoxLayout, QWidget

from app.document.session import Session
from app.document.view import View, ViewChange
from app.look.theme import Theme
from app.panels.readings.model import ReadingsModel
from app.panels.readings.table import ReadingsTable
from app.panels.sweep.quantity_choice import quantity_tip
from app.series.compared import curves_in_hand
from app.series.curves import takes_long
from app.series.markers import remove_marker
from app.series.readings import readings_of, table_text
from app.workers.scene import scene_at_markers, scene_of
from stackcore.errors import Severity
from stackcore.quantities import quantity_named

if TYPE_CHECKING:
    from app.workers.live import Answer

Tell = Callable[[str, Severity], None]

HINT = "No marker yet: press M in the plot, or hold Ctrl and click there. What it reads is listed here."


class ReadingsPanel(QWidget):
    """One row a marker and one for the worst points; one column a curve, named in its colour.

    Parameters
    ----------
    session
        Kept for what panels have in common; readings change nothing in it.
    view
        Markers and what is shown; a click makes a marker, an angle and a polarization the active ones.
    theme
        The look.
    tell
        Says what was copied.
    """

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._theme, self._tell = session, view, theme, tell
        self._answer: Answer | None = None
        self.model = ReadingsModel(self)
        self.table = ReadingsTable(self.model, theme)
        self.hint = QLabel(HINT)
        self.hint.setWordWrap(True)
        self.hint.setContentsMargins(8, 4, 8, 4)
        column = QVBoxLayout(self)
        column.setContentsMargins(0, 0, 0, 0)
        column.setSpacing(0)
        column.addWidget(self.table, 1)
        column.addWidget(self.hint)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.table)
        self.table.setAccessibleName("Readings")
        self._connect()
        self.set_theme(theme)
        self._show()

    def _connect(self) -> None:
        self.table.clicked.connect(self._choose)
        self.table.activated.connect(self._choose)
        self.table.marker_header.sectionClicked.connect(self._choose_row)
        self.table.curve_header.sectionClicked.connect(self._choose_column)
        self.table.copy_wanted.connect(self.copy)
        self.table.remove_wanted.connect(self._remove)
        self.table.setContextMenuPolicy(Qt.ContextMenuPolicy.CustomContextMenu)
        self.table.customContextMenuRequested.connect(self._open_menu)
        leave = self._view.subscribe(self._view_changed)
        self.destroyed.connect(lambda: leave())

    def show_answer(self, answer: "Answer") -> None:
        """Read an answer."""
        self._answer = answer
        self._show()

    def set_stale(self, stale: bool) -> None:
        """Say whether the numbers belong to an earlier job."""
        self.table.delegate.stale = stale
        self.table.viewport().update()
        self.table.setAccessibleDescription("Last good result." if stale else "")

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self._theme = theme
        self.table.set_theme(theme)
        for widget, ink in ((self, theme.text), (self.table, theme.text), (self.hint, theme.muted)):
            palette = widget.palette()
            for role in (QPalette.ColorRole.Window, QPalette.ColorRole.Base, QPalette.ColorRole.Button):
                palette.setColor(role, QColor(theme.base))
            palette.setColor(QPalette.ColorRole.WindowText, QColor(ink))
            widget.setPalette(palette)

    def table_text(self) -> str:
        """Return all readings as text with tabs between columns, every digit and the unit in each cell."""
        label = quantity_named(self._view.state.quantity).label
        return table_text(self.model.rows, self.model.curves, label)

    def copy(self) -> None:
        """Put the selected readings on the clipboard, one alone as it is, several as a table; without any all."""
        chosen = [index for index in self.table.selectedIndexes() if self.model.reading(index) is not None]
        if len(chosen) == 1:
            reading = self.model.reading(chosen[0])
            text = reading.exact if reading is not None else ""
        elif chosen:
            text = self._selected_text()
        else:
            text = self.table_text()
        QGuiApplication.clipboard().setText(text)
        self._tell("Readings copied." if len(chosen) != 1 else f"Copied {text}.", "note")

    def copy_all(self) -> None:
        """Put all readings on the clipboard."""
        QGuiApplication.clipboard().setText(self.table_text())
        self._tell("Readings copied.", "note")

    def _selected_text(self) -> str:
        chosen = self.table.selectedIndexes()
        rows = sorted({index.row() for index in chosen})
        columns = sorted({index.column() for index in chosen})
        whole = [line.split("\t") for line in self.table_text().splitlines()]
        kept = [whole[0], *(whole[row + 1] for row in rows)]
        return "".join("\t".join([line[0], *(line[c + 1] for c in columns)]) + "\n" for line in kept)

    def _view_changed(self, change: ViewChange) -> None:
        if self._answer is None or not takes_long(self._answer.response, change.after.quantity):
            self._show()

    def _show(self) -> None:
        state = self._view.state
        self.hint.setVisible(not state.markers)
        if self._answer is None:
            return
        scene = scene_of(self._session.record, self._answer)
        curves = curves_in_hand(scene, state)
        at_markers = scene_at_markers(self._session.record, self._answer)
        # The unit of a delay follows the sweep, so that a column has one unit.
        unit_from = self._answer.response.frequency
        exact = curves_in_hand(at_markers, state, unit_from=unit_from) if at_markers is not None else None
        rows = readings_of(curves, state, exact)
        self.table.marker_header.active = state.active_marker
        self.model.show_readings(rows, curves, quantity_tip(quantity_named(state.quantity)))
        self.table.marker_header.viewport().update()
        self.table.curve_header.resizeSections()

    def _choose(self, index: QModelIndex) -> None:
        self._choose_row(index.row())
        self._choose_column(index.column())

    def _choose_row(self, row: int) -> None:
        marker = self.model.rows[row].marker
        if marker is not None:
            self._view.set(self, active_marker=marker)

    def _choose_column(self, column: int) -> None:
        shown = len(self._view.state.polarizations)
        side = self.model.curves[column].polarization
        self._view.set(self, active_angle=column // shown, active_polarization=side)

    def _remove(self) -> None:
        index = self.table.currentIndex()
        marker = self.model.rows[index.row()].marker if index.isValid() else None
        if marker is None:
            return
        self._view.replace(remove_marker(self._view.state, marker), self)
        row = min(index.row(), self.model.rowCount() - 1)
        place = self.model.index(row, index.column())
        self.table.selectionModel().setCurrentIndex(place, QItemSelectionModel.SelectionFlag.ClearAndSelect)

    def _open_menu(self, at: QPoint) -> None:
        menu = self.menu = QMenu(self)
        menu.addAction("Copy\tCtrl+C", self.copy)
        menu.addAction("Copy all readings", self.copy_all)
        index = self.table.indexAt(at)
        if index.isValid() and self.model.rows[index.row()].marker is not None:
            menu.addSeparator()
            self.table.setCurrentIndex(index)
            menu.addAction("Remove marker\tDel", self._remove)
        menu.aboutToHide.connect(menu.deleteLater)
        menu.popup(self.table.viewport().mapToGlobal(at))
