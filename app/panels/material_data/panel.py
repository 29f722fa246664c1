"""The panel that shows what is chosen in the panel of materials: its constants to edit, its curves to see."""

from typing import Final

from PySide6.QtCore import Qt, Signal
from PySide6.QtGui import QShowEvent
from PySide6.QtWidgets import QSplitter, QWidget

from app.document.session import Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.material_curves.panel import MaterialCurves
from app.panels.material_data.editor import Editor, Tell
from app.panels.materials.picks import Pick, specimens_of
from app.panels.materials.pieces import column
from app.panels.sweep.field import QuietSwitch

EDITOR_SHARE: Final = 46
"""Per cent of the height for the constants at first."""
KEEP_TIP: Final = "Keep what is shown, and draw what is chosen next beside it, to compare."


class MaterialData(QWidget):
    """Constants above, curves below; they follow what is chosen and every edit.

    Parameters
    ----------
    session, view
        The job, and the markers.
    tell
        Says why something was refused.
    """

    pointed = Signal(str)
    """What the mouse points at, in words, for the status line; empty for nothing."""

    def __init__(
        self, session: Session, view: View, theme: Theme, tell: Tell, parent: QWidget | None = None
    ) -> None:
        super().__init__(parent)
        self._session = session
        self._picks: tuple[Pick, ...] = ()
        self._kept: tuple[Pick, ...] = ()
        self._shared = False
        self.editor = Editor(session, view, theme, tell, self)
        self.curves = MaterialCurves(session, view, theme, self)
        self.curves.pointed.connect(self.pointed)
        self.keep = QuietSwitch(theme, "Keep these", KEEP_TIP, self)
        self.keep.toggled.connect(self._keep)
        self.curves.add_control(self.keep)
        self.split = QSplitter(Qt.Orientation.Vertical, self)
        self.split.setChildrenCollapsible(False)
        self.split.addWidget(self.editor)
        self.split.addWidget(self.curves)
        self.split.setStretchFactor(0, EDITOR_SHARE)
        self.split.setStretchFactor(1, 100 - EDITOR_SHARE)
        column(self).addWidget(self.split)
        self.setFocusProxy(self.curves)
        self.destroyed.connect(session.subscribe(lambda _change: self._show()))
        self.set_theme(theme)

    def showEvent(self, event: QShowEvent) -> None:
        """Share the room at the first time; later it is as it was left."""
        super().showEvent(event)
        if not self._shared:
            self._shared = True
            self.split.setSizes([EDITOR_SHARE * self.height() // 100, (100 - EDITOR_SHARE) * self.height() // 100])

    def show_picks(self, picks: tuple[Pick, ...], current: Pick) -> None:
        """Draw what is chosen, and show the constants of the current one of it."""
        self._picks = picks
        self.editor.page.show_pick(current)
        self._show()

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of a theme."""
        self.editor.set_theme(theme)
        self.curves.set_theme(theme)
        self.keep.set_theme(theme)

    def _keep(self, on: bool) -> None:
        self._kept = self._picks if on else ()
        self._show()

    def _show(self) -> None:
        together = tuple(dict.fromkeys((*self._kept, *self._picks)))
        self.curves.show_specimens(specimens_of(self._session.job, together))
