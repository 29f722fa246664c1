"""The panel of variants: every stack of the job with what it costs in thickness, mass and worst value."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import QItemSelectionModel, QRect, Qt, Signal
from PySide6.QtGui import QGuiApplication, QHideEvent, QPainter, QShowEvent
from PySide6.QtWidgets import QHBoxLayout, QVBoxLayout, QWidget

from app.document import edits
from app.document.document import Selection
from app.document.edit import Edit
from app.document.session import Change, Session
from app.document.view import View, ViewChange
from app.look.theme import Theme
from app.panels.curves.drawing import fill_palette
from app.panels.materials.pieces import button
from app.panels.tables.delegate import Index, QuietDelegate
from app.panels.tables.table import QuietTable
from app.panels.variants.model import NAME, VariantsModel
from app.series.variants import Comparison, comparing
from app.workers.batch import BatchFailure, BatchLane, BatchStep
from stackcore.errors import Severity

Tell = Callable[[str, Severity], None]

AIR: Final = 20
LONGEST_NAME: Final = 150
"""Pixels of the name of a stack; a longer one is cut, and whole in its tip."""
_ACROSS: Final = Qt.Orientation.Horizontal


class VariantDelegate(QuietDelegate):
    """Draws every cell in the ink of text: what stands here is to be read, though not typed into."""

    def paint_content(self, painter: QPainter, room: QRect, index: Index) -> None:
        self.paint_words(painter, room, index, self.theme.text)


class VariantsPanel(QWidget):
    """The stacks of the job; choosing a row looks at its stack.

    Parameters
    ----------
    session, view
        The job, and what is shown of it.
    tell
        Says why something was refused or cannot be computed.
    """

    pointed = Signal(str)
    """What was done, in words, for the status line."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session, self._view, self._tell = session, view, tell
        self._asked: object = None
        self._following = False
        self.live_busy: Callable[[], bool] = lambda: False
        self._lane = BatchLane(lambda: self.live_busy(), self)
        self.model = VariantsModel(self)
        self.table = QuietTable(VariantDelegate(theme, self), theme, self)
        self.table.setModel(self.model)
        self.table.setSelectionMode(QuietTable.SelectionMode.SingleSelection)
        self.table.setAccessibleName("Stacks compared")
        row = QHBoxLayout()
        row.setContentsMargins(4, 4, 4, 0)
        for text, tip, run in (
            ("Duplicate", "Copy the stack in hand, to try a variant of it.", self.duplicate),
            ("Delete", "Delete the stack in hand; the last one stays.", self.delete),
            ("Copy table", "Put the table on the clipboard, for a spreadsheet.", self.copy_table),
        ):
            row.addWidget(button(self, text, tip, run))
        row.addStretch(1)
        whole = QVBoxLayout(self)
        whole.setContentsMargins(0, 0, 0, 0)
        whole.setSpacing(4)
        whole.addLayout(row)
        whole.addWidget(self.table, 1)
        self.setAutoFillBackground(True)
        self.setFocusProxy(self.table)
        self._lane.stepped.connect(self._take)
        self._lane.failed.connect(self._fail)
        self.table.selectionModel().currentRowChanged.connect(lambda now, _before: self._choose(now.row()))
        leave = (session.subscribe(self._edited), view.subscribe(self._looked))
        self.destroyed.connect(lambda: [end() for end in leave])
        self.set_theme(theme)

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        fill_palette(self, theme)
        self.table.set_theme(theme)

    @property
    def computing(self) -> bool:
        """Whether something is being computed."""
        return self._lane.busy

    def give_way(self) -> None:
        """Compute nothing for a moment: the curves are asked for."""
        self._lane.give_way()

    def close_lane(self) -> None:
        """End what is being computed, for good."""
        self._lane.close()

    def duplicate(self) -> None:
        """Put a copy of the stack in hand behind it and look at the copy."""
        self._apply(edits.duplicate_stack(self._session.selection.stack))

    def delete(self) -> None:
        """Delete the stack in hand; the last one stays."""
        self._apply(edits.delete_stack(self._session.selection.stack))

    def copy_table(self) -> None:
        """Put the table with its header on the clipboard."""
        columns = range(self.model.columnCount())
        whole = Qt.ItemDataRole.AccessibleTextRole
        lines = ["\t".join(str(self.model.headerData(column, _ACROSS, whole)) for column in columns)]
        for row in range(self.model.rowCount()):
            lines.append("\t".join(str(self.model.index(row, column).data()) for column in columns))
        QGuiApplication.clipboard().setText("\n".join(lines) + "\n")
        self.pointed.emit("Copied the table of stacks.")

    def showEvent(self, event: QShowEvent) -> None:
        """Begin to compute."""
        super().showEvent(event)
        self._ask()

    def hideEvent(self, event: QHideEvent) -> None:
        """Compute nothing that nobody sees."""
        self._lane.cancel()
        self._asked = None
        super().hideEvent(event)

    def _edited(self, change: Change) -> None:
        self._ask()
        self._mark()

    def _looked(self, change: ViewChange) -> None:
        self._ask()

    def _ask(self) -> None:
        if not self.isVisible():
            return
        state, job = self._view.state, self._session.job
        wanted = (job, state.quantity, state.power, state.polarizations, state.conditions)
        if wanted != self._asked:
            self._asked = wanted
            self._lane.ask(comparing(job, state))

    def _take(self, step: BatchStep) -> None:
        if isinstance(step.value, Comparison) and len(step.value.variants) == len(self._session.record.stacks):
            first = self.model.rowCount() == 0
            self.model.show_comparison(step.value, self._session.selection.stack)
            if first or all(one.worst is not None for one in step.value.variants):
                self._fit_columns()
            self._mark()

    def _fit_columns(self) -> None:
        """Give each column the room of its widest text, and a little air."""
        self.table.resizeColumnsToContents()
        for column in range(self.model.columnCount()):
            widest = LONGEST_NAME if column == NAME else 10_000
            self.table.setColumnWidth(column, min(self.table.columnWidth(column) + AIR, widest))

    def _fail(self, failure: BatchFailure) -> None:
        for fault in failure.faults[:1]:
            self._tell(f"The stacks cannot be compared: {fault}", "warning")

    def _mark(self) -> None:
        """Choose the row of the stack in hand."""
        row = self._session.selection.stack
        if row >= self.model.rowCount():
            return
        self._following = True
        try:
            self.model.show_comparison(self.model.comparison, row)
            flags = QItemSelectionModel.SelectionFlag
            self.table.selectionModel().setCurrentIndex(self.model.index(row, 0), flags.ClearAndSelect | flags.Rows)
        finally:
            self._following = False

    def _choose(self, row: int) -> None:
        if not self._following and 0 <= row < len(self._session.record.stacks):
            self._session.select(Selection(row), self)

    def _apply(self, edit: Edit) -> None:
        for fault in self._session.apply(edit, self):
            self._tell(str(fault), fault.severity)
