"""The choice of the stack that is shown, and what can be done with stacks as a whole."""

from collections.abc import Callable
from typing import Final

from PySide6.QtCore import QEvent, QObject, QPointF, QSignalBlocker, QSize, Qt
from PySide6.QtGui import QKeyEvent, QPainter, QPaintEvent, QPalette, QPen, QWheelEvent
from PySide6.QtWidgets import (
    QComboBox,
    QHBoxLayout,
    QLabel,
    QLineEdit,
    QMenu,
    QSizePolicy,
    QStyle,
    QStyleOptionToolButton,
    QStylePainter,
    QToolButton,
    QWidget,
)

from app.document import edits
from app.document.document import Selection
from app.document.edit import Edit
from app.document.session import Session

_ARROW: Final = 12
"""Pixels for the arrow of a button with a menu."""


class StillBox(QComboBox):
    """A choice that the wheel does not change: rolling over it on the way elsewhere must do nothing."""

    def wheelEvent(self, event: QWheelEvent) -> None:
        event.ignore()


class MenuButton(QToolButton):
    """A quiet word that opens a menu, with an arrow beside it; Qt's own would lie on the word's last letter."""

    def sizeHint(self) -> QSize:
        return super().sizeHint() + QSize(_ARROW, 0)

    def paintEvent(self, event: QPaintEvent) -> None:
        option = QStyleOptionToolButton()
        self.initStyleOption(option)
        option.features &= ~QStyleOptionToolButton.ToolButtonFeature.HasMenu
        option.text = ""
        painter = QStylePainter(self)
        painter.drawComplexControl(QStyle.ComplexControl.CC_ToolButton, option)
        ink = option.palette.color(QPalette.ColorRole.ButtonText)
        painter.setPen(ink)
        word = self.rect().adjusted(0, 0, -_ARROW, 0)
        painter.drawText(word, Qt.AlignmentFlag.AlignCenter, self.text())
        painter.setRenderHint(QPainter.RenderHint.Antialiasing)
        painter.setPen(QPen(ink, 1.4))
        x, y = self.width() - _ARROW + 1.0, self.height() / 2 - 1
        painter.drawPolyline([QPointF(x - 3, y), QPointF(x, y + 3), QPointF(x + 3, y)])
        painter.end()


class StackBar(QWidget):
    """The chooser, shown when there are several stacks, and the line to rename one in its place.

    Parameters
    ----------
    session
        Whose stacks are shown; its selection names the one looked at.
    apply
        Makes an edit of the session, and says so when it is refused.
    """

    def __init__(self, session: Session, apply: Callable[[Edit], bool], parent: QWidget | None = None) -> None:
        super().__init__(parent)
        self._session = session
        self._apply = apply
        self._box = StillBox(self)
        self._box.setAccessibleName("Stack")
        self._box.setToolTip("The stack shown in the table, the drawing and the curves.")
        self._box.setSizePolicy(QSizePolicy.Policy.Expanding, QSizePolicy.Policy.Fixed)
        self._box.setMinimumContentsLength(6)
        self._box.setSizeAdjustPolicy(QComboBox.SizeAdjustPolicy.AdjustToMinimumContentsLengthWithIcon)
        self._box.activated.connect(lambda index: session.select(Selection(index), self))
        self._name = QLineEdit(self)
        self._name.setAccessibleName("New name of the stack")
        self._name.setToolTip("Enter renames the stack, Escape leaves its name.")
        self._name.hide()
        self._name.editingFinished.connect(self._finish_renaming)
        self._name.installEventFilter(self)
        label = QLabel("&Stack", self)
        label.setBuddy(self._box)
        row = QHBoxLayout(self)
        row.setContentsMargins(8, 0, 8, 0)
        row.setSpacing(8)
        for widget in (label, self._box, self._name):
            row.addWidget(widget)
        self.refresh()

    def menu_button(self, parent: QWidget) -> QToolButton:
        """Return a button whose menu adds, duplicates, renames and deletes stacks."""
        button = MenuButton(parent)
        button.setText("Stacks")
        button.setToolTip("Add, duplicate, rename or delete a stack.")
        button.setAutoRaise(True)
        button.setPopupMode(QToolButton.ToolButtonPopupMode.InstantPopup)
        menu = QMenu(button)
        menu.setToolTipsVisible(True)
        for text, tip, run in (
            ("Add stack", "Add an empty stack in air.", lambda: self._apply(edits.add_stack())),
            ("Duplicate stack", "Copy this stack, to compare a variant.", self._duplicate),
            ("Rename stack", "Give this stack another name.", self.rename),
            ("Delete stack", "Delete this stack; the last one stays.", self._delete),
        ):
            action = menu.addAction(text)
            action.setToolTip(tip)
            action.triggered.connect(lambda _checked=False, run=run: run())
        button.setMenu(menu)
        return button

    def refresh(self) -> None:
        """Show the stacks of now."""
        names = [stack.name for stack in self._session.record.stacks]
        with QSignalBlocker(self._box):
            if [self._box.itemText(place) for place in range(self._box.count())] != names:
                self._box.clear()
                self._box.addItems(names)
            self._box.setCurrentIndex(self._session.selection.stack)
        self._arrange()

    def rename(self) -> None:
        """Open the line for a new name in the place of the chooser."""
        stack = self._session.record.stacks[self._session.selection.stack]
        self._name.setText(stack.name)
        self._name.show()
        self._arrange()
        self._name.setFocus(Qt.FocusReason.OtherFocusReason)
        self._name.selectAll()

    def eventFilter(self, watched: QObject, event: QEvent) -> bool:
        if not isinstance(event, QKeyEvent) or event.type() != QEvent.Type.KeyPress:
            return super().eventFilter(watched, event)
        if watched is self._name and event.key() == Qt.Key.Key_Escape:
            self._close_line()
            return True
        return super().eventFilter(watched, event)

    def _finish_renaming(self) -> None:
        if self._name.isHidden():
            return
        index, name = self._session.selection.stack, self._name.text().strip()
        if name == self._session.record.stacks[index].name or self._apply(edits.rename_stack(index, name)):
            self._close_line()

    def _close_line(self) -> None:
        self._name.hide()
        self._arrange()

    def _arrange(self) -> None:
        renaming = not self._name.isHidden()
        self._box.setHidden(renaming)
        self.setVisible(renaming or self._box.count() > 1)

    def _duplicate(self) -> None:
        self._apply(edits.duplicate_stack(self._session.selection.stack))

    def _delete(self) -> None:
        self._apply(edits.delete_stack(self._session.selection.stack))
