"""The main window: makes the parts, connects them, and takes them apart again."""

from pathlib import Path
from typing import Final

from PySide6.QtCore import QEvent, QSettings, Qt
from PySide6.QtGui import QCloseEvent, QDragEnterEvent, QDropEvent, QGuiApplication, QKeyEvent
from PySide6.QtWidgets import QApplication, QMainWindow

from app.document.session import Change, Session
from app.document.view import View
from app.look.palette import apply_theme, preferred_theme
from app.look.theme import Theme
from app.window import help_pages
from app.window.actions import Actions
from app.window.cautions import Caution, cautions
from app.window.crash_net import CrashNet
from app.window.diagnostics import diagnostics, parts, version_of
from app.window.dialogs import Dialogs, QtDialogs
from app.window.editing import ElementCommands, StackCommands
from app.window.exporting import Exporter, ProgressLine, Steps
from app.window.files import Files
from app.window.first_view import first_view
from app.window.help_panel import HelpPanel
from app.window.keys import key_groups
from app.window.layout import Arrangement
from app.window.marking import MarkerCommands
from app.window.messages import Choice, Message, Messages, MessageStrip
from app.window.panels import Panels, focus_into, make_panels
from app.window.recent import RecentFiles
from app.window.recompute import Recompute
from app.window.recovery import Leftover, Recovery
from app.window.samples import samples
from app.window.status import StatusLine
from app.window.table import Commands, HelpCommands, ViewCommands, action_table
from app.workers.live import Answer, LiveLane
from stackcore.errors import Fault

MATERIALS: Final = "Materials"
HELP: Final = "Help"
THEME_KEY: Final = "look/theme"
UNSOLVED: Final = "This stack cannot be computed; the curves show the last one that could."


class MainWindow(QMainWindow):
    """One job, drawn, tabled, computed.

    Parameters
    ----------
    session, view
        The job and what is looked at.
    settings
        Layout and preferences (see `app.look.settings`).
    state_folder
        For the log and for recovery files.
    steps
        Writes the CSV table bit by bit (see `app.window.exporting`).
    dialogs
        Asks questions; without it the real dialogs.
    crash_net
        Tells of faults nobody caught; without it nobody does.
    """

    def __init__(
        self,
        session: Session,
        view: View,
        settings: QSettings,
        state_folder: Path,
        steps: Steps,
        *,
        dialogs: Dialogs | None = None,
        crash_net: CrashNet | None = None,
    ) -> None:
        super().__init__()
        self._session, self._view, self._settings = session, view, settings
        self._leaving = self._closed = False
        self._net = crash_net
        self._theme = self._apply_theme()
        self.messages = Messages(self)
        self._strip = MessageStrip(self.messages, self._theme, self)
        self._status = StatusLine(self._theme, self)
        self._panels = make_panels(session, view, self._theme, self.messages.tell, self._make_help())
        self._arrangement = self._arrange()
        self._recompute = Recompute(session, view, LiveLane(parent=self), self._panels.viewers, self)
        self._recent = RecentFiles(settings)
        self._dialogs: Dialogs = dialogs if dialogs is not None else QtDialogs(self)
        self._files = Files(session, self._dialogs, self.messages, self._recent)
        self._exporter = Exporter(
            lambda: session.job, self._files.suggestion, self._dialogs, self.messages.tell, steps, self
        )
        self._recovery = Recovery(session, state_folder / "recovery", parent=self)
        self._actions = self._make_actions()
        self._connect()
        self._begin()
