"""The main window: makes the parts, connects them, and takes them apart again."""

from dataclasses import replace
from functools import partial
from pathlib import Path
from typing import Final

from PySide6.QtCore import QSettings, Qt
from PySide6.QtGui import QCloseEvent, QDragEnterEvent, QDropEvent, QGuiApplication, QKeyEvent
from PySide6.QtWidgets import QApplication

from app.document.session import Change, Session
from app.document.view import POWERS, View, ViewChange
from app.look.palette import apply_theme, preferred_theme
from app.look.theme import Theme
from app.window import help_pages
from app.window.actions import Actions
from app.window.beside import BESIDE, HELP, MATERIAL_DATA
from app.window.cautions import Caution, cautions
from app.window.commands import Commands, HelpCommands, ViewCommands
from app.window.crash_net import CrashNet
from app.window.diagnostics import diagnostics, parts, version_of
from app.window.dialogs import Dialogs, QtDialogs
from app.window.dropping import dropped_files, open_dropped
from app.window.editing import ElementQuestions, StackCommands, StructureCommands
from app.window.exporting import ProgressLine, make_exporter
from app.window.files import Files
from app.window.first_view import first_view
from app.window.help_pages import KeyGroup
from app.window.help_panel import HelpPanel
from app.window.keys import key_groups
from app.window.layout import Arrangement
from app.window.marking import MarkerCommands
from app.window.material_files import MaterialFiles
from app.window.messages import Choice, Message, Messages, MessageStrip
from app.window.panels import Panels, focus_into, make_panels
from app.window.picture_files import PictureFiles
from app.window.recent import RecentFiles
from app.window.recompute import Recompute
from app.window.recovery import Leftover, Recovery
from app.window.samples import samples
from app.window.status import StatusLine
from app.window.table import action_table
from app.window.watching import DiskWatch
from app.window.windows import Alone, JobWindow, Others
from app.workers.live import Answer, LiveLane
from stackcore.errors import Fault

THEME_KEY: Final = "look/theme"
POWER_KEY: Final = "look/power"
UNSOLVED: Final = "This stack cannot be computed; the curves show the last one that could."


class MainWindow(JobWindow):
    """One job, drawn, tabled, computed.

    Parameters
    ----------
    session, view
        The job and what is looked at.
    settings
        Layout and preferences (see `app.look.settings`).
    state_folder
        For the log and for recovery files.
    dialogs
        Asks questions; without it the real dialogs.
    crash_net
        Tells of faults nobody caught; without it nobody does.
    others
        Opens other windows; without it this one is the only one.
    """

    def __init__(
        self,
        session: Session,
        view: View,
        settings: QSettings,
        state_folder: Path,
        *,
        dialogs: Dialogs | None = None,
        crash_net: CrashNet | None = None,
        others: Others | None = None,
    ) -> None:
        super().__init__()
        self._others: Others = others if others is not None else Alone()
        self._session, self._view, self._settings = session, view, settings
        self._net = crash_net
        self._closing = self._may_close = self._closed = False
        self._theme = self._chosen_theme()
        self.messages = Messages(self)
        self._strip = MessageStrip(self.messages, self._theme, self)
        self._status = StatusLine(self._theme, self)
        self._panels = make_panels(session, view, self._theme, self.messages.tell, self._make_help())
        self._arrangement = Arrangement(
            self,
            self._panels.places(self._strip),
            self._panels.beside,
            self._theme,
            settings,
        )
        self._recompute = Recompute(session, view, LiveLane(parent=self), self._panels.viewers, self)
        self._recent = RecentFiles(settings)
        self._dialogs: Dialogs = dialogs if dialogs is not None else QtDialogs(self)
        self._files = Files(session, self._dialogs, self.messages, self._recent, self._others.bring_forward)
        self._exporter = make_exporter(
            session, view, self._files.suggestion, self._dialogs, self.messages.tell, self
        )
        self._pictures = PictureFiles(self._files.suggestion, self._dialogs, self.messages.tell)
        self._material_files = MaterialFiles(
            lambda: self._recent.folder, self._dialogs, self.messages.tell, self._show_columns
        )
        self._recovery = Recovery(session, state_folder / "recovery", parent=self)
        self._disk = DiskWatch(session, self.messages, self)
        self._actions = self._make_actions()
        self._connect()
        self._begin()

    @property
    def path(self) -> Path | None:
        """The file of the job, or None."""
        return self._session.path

    @property
    def panels(self) -> Panels:
        """The panels, by name."""
        return self._panels

    @property
    def recompute(self) -> Recompute:
        """What keeps the results up to date."""
        return self._recompute

    @property
    def actions_table(self) -> Actions:
        """The actions, by key."""
        return self._actions

    @property
    def theme(self) -> Theme:
        """The look of now."""
        return self._theme

    @property
    def status(self) -> StatusLine:
        """The status line."""
        return self._status

    def open_path(self, path: Path) -> None:
        """Open a job file, after the question about unsaved changes."""
        self._files.open_path(path)

    def offer_leftovers(self) -> None:
        """Offer the unsaved work that sessions which ended unexpectedly have left."""
        for leftover in self._recovery.leftovers():
            choices = (
                Choice("Recover", partial(self._recover, leftover)),
                Choice("Discard", leftover.discard),
                Choice("Later", lambda: None),
            )
            self.messages.show(Message("note", leftover.sentence, choices))

    def set_theme_choice(self, choice: str) -> None:
        """Take ``auto``, ``light`` or ``dark``, and remember it."""
        self._settings.setValue(THEME_KEY, choice)
        self._take_theme()

    def show_help(self, page: str) -> None:
        """Show a page of the help panel, the definitions at the quantity that is shown."""
        self._arrangement.open_beside(HELP)
        quantity = self._view.state.quantity.partition(":")[0]  # those of single elements share a definition
        self._panels.help.show_page(page, quantity if page == "conventions" else "")
        focus_into(self._panels.help)

    def closeEvent(self, event: QCloseEvent) -> None:
        """Ask about unsaved changes, then end everything that runs."""
        if not self._may_close:
            self._closing = True
            self._files.leave(self._permit_closing)
            self._closing = False
        if self._may_close:
            self._shut_down()
            event.accept()
        else:
            event.ignore()

    def dragEnterEvent(self, event: QDragEnterEvent) -> None:
        """Welcome local files."""
        if dropped_files(event):
            event.acceptProposedAction()

    def dropEvent(self, event: QDropEvent) -> None:
        """Open the first job that was dropped, others in windows of their own, and show measured data."""
        if paths := dropped_files(event):
            event.acceptProposedAction()
            open_dropped(paths, self._files, self._material_files, self._others)

    def keyPressEvent(self, event: QKeyEvent) -> None:
        """Dismiss the message with Esc, when nothing else wanted the key."""
        if event.key() == Qt.Key.Key_Escape and self.messages.shown is not None:
            self.messages.dismiss()
        else:
            super().keyPressEvent(event)

    def _make_help(self) -> HelpPanel:
        return HelpPanel(
            {
                "conventions": help_pages.conventions_page,
                "keyboard": lambda theme: help_pages.keyboard_page(theme, self._key_groups()),
                "cautions": lambda theme: help_pages.cautions_page(theme, self._cautions()),
                "start": lambda theme: help_pages.first_steps_page(theme, self._actions.words_and_keys),
                "about": lambda theme: help_pages.about_page(theme, version_of("slabwright"), parts()),
            },
            self._theme,
        )

    def _key_groups(self) -> tuple[KeyGroup, ...]:
        return key_groups(self._actions.table, self._panels.curves.commands.table)

    def _make_actions(self) -> Actions:
        session, tell = self._session, self.messages.tell
        view = ViewCommands(
            theme=self._theme_choice,
            set_theme=self.set_theme_choice,
            shown=self._arrangement.shown,
            toggle=self._arrangement.toggle,
            reset_layout=self._arrangement.reset,
            next_panel=lambda: self._panels.focus(1),
            previous_panel=lambda: self._panels.focus(-1),
        )
        commands = Commands(
            session=session,
            files=self._files,
            exporter=self._exporter,
            import_material=self._material_files.pick,
            export_plot=self._export_plot,
            export_wall=lambda: self._pictures.export("wall", self._panels.wall.picture),
            recent=self._recent,
            samples=samples(),
            elements=self._panels.elements,
            selected=ElementQuestions(session),
            structure=StructureCommands(session, tell),
            stacks=StackCommands(session, tell),
            rename_stack=self._panels.rename_stack,
            markers=MarkerCommands(session, self._view, self._panels.curves.commands),
            view=view,
            help=HelpCommands(self.show_help, self._copy_diagnostics),
            others=self._others,
            close=self._close_window,
            quit=self._quit,
        )
        return Actions(action_table(commands), self, (self._panels.elements, self._panels.wall))

    def _connect(self) -> None:
        self._unsubscribe = (self._session.subscribe(self._heard), self._view.subscribe(self._looked))
        self.messages.noted.connect(self._status.note)
        self._recompute.told.connect(self._status.tell)
        self._recompute.answered.connect(self._answered)
        self._recompute.failed.connect(self._failed)
        self._recompute.busy.connect(self._panels.curves.set_busy)
        self._panels.curves.pointed.connect(self._status.point)
        self._panels.material_data.pointed.connect(self._status.point)
        self._panels.give_way_to(self._recompute, self._status.point)
        self._panels.open_with(self._arrangement.open_beside)
        self._panels.wall.edit_requested.connect(self._panels.edit_element)
        self._exporter.running.connect(self._actions.refresh)
        self._panels.elements.columns_asked.connect(self._actions.refresh)
        self._status.cautions.clicked.connect(lambda: self.show_help("cautions"))
        for beside in BESIDE:
            self._arrangement.dock(beside).visibilityChanged.connect(self._actions.refresh)
        QGuiApplication.styleHints().colorSchemeChanged.connect(self._take_theme)
        if self._net is not None:
            self._net.caught.connect(self._caught)

    def _begin(self) -> None:
        self.setObjectName("main-window")
        self.setAcceptDrops(True)
        self.setDockNestingEnabled(True)
        self._actions.fill(self.menuBar())
        self._panels.elements.offer(self._actions.chosen(("&Edit", "&Build-up"), self))
        self.setStatusBar(self._status)
        self._status.add_progress(ProgressLine(self._exporter, self))
        self._arrangement.restore()
        self._begin_view()
        self._show_title()
        self._recompute.ask(fresh=True)
        self._show_cautions()
        focus_into(self._panels.elements)

    def _heard(self, change: Change) -> None:
        if change.kind == "open":
            self._begin_view()
        self._show_title()
        self._show_cautions()
        self._actions.refresh()

    def _begin_view(self) -> None:
        """Look at the job as is best for it, and at fractions of power as was chosen last."""
        wanted = self._settings.value(POWER_KEY, POWERS[0], type=str)
        power = next((one for one in POWERS if one == wanted), POWERS[0])
        self._view.replace(replace(first_view(self._session.job), power=power))

    def _looked(self, change: ViewChange) -> None:
        if change.after.power != change.before.power:
            self._settings.setValue(POWER_KEY, change.after.power)
        self._show_cautions()
        self._actions.refresh()

    def _answered(self, _: Answer) -> None:
        self.messages.withdraw(UNSOLVED)
        self._show_cautions()
        self._actions.refresh()

    def _failed(self, faults: tuple[Fault, ...]) -> None:
        self.messages.show(Message("error", UNSOLVED, details=tuple(str(fault) for fault in faults)))

    def _caught(self, text: str) -> None:
        self.messages.show(Message("error", text, (Choice("Copy diagnostics", self._copy_diagnostics),)))

    def _show_title(self) -> None:
        self.setWindowTitle(f"{self._session.title}[*] – Slabwright")
        self.setWindowModified(self._session.modified)

    def _show_cautions(self) -> None:
        self._status.cautions.say(self._cautions())

    def _cautions(self) -> tuple[Caution, ...]:
        answer = self._recompute.answer
        response = answer.response if answer is not None else None
        return cautions(self._session.job, self._session.selection.stack, self._view.state, response)

    def _recover(self, leftover: Leftover) -> None:
        def bring_back() -> None:
            source = leftover.source
            if source is not None and source.exists():
                self._files.read(source)
            self._session.apply(leftover.edit())
            leftover.discard()

        self._files.leave(bring_back)

    def _theme_choice(self) -> str:
        return str(self._settings.value(THEME_KEY, "auto", type=str))

    def _chosen_theme(self) -> Theme:
        theme = preferred_theme(self._theme_choice())
        application = QApplication.instance()
        if isinstance(application, QApplication):
            apply_theme(application, theme)
        return theme

    def _take_theme(self) -> None:
        self._theme = self._chosen_theme()
        self._strip.set_theme(self._theme)
        self._status.set_theme(self._theme)
        self._arrangement.set_theme(self._theme)
        self._panels.set_theme(self._theme)
        self._actions.refresh()

    def _copy_diagnostics(self) -> None:
        log = self._net.tail() if self._net is not None else ""
        QGuiApplication.clipboard().setText(diagnostics(self._theme, log))
        self.messages.tell("Copied the diagnostics.")

    def _show_columns(self, file: str, text: str) -> None:
        self._arrangement.open_beside(MATERIAL_DATA)
        self._panels.material_data.editor.page.open_import(file, text)

    def _export_plot(self) -> None:
        self._pictures.export("plot", self._panels.plot_in_hand().picture)

    def _close_window(self) -> None:
        self.close()

    def _quit(self) -> None:
        if isinstance(self._others, Alone):
            self.close()
        else:
            self._others.quit()

    def _permit_closing(self) -> None:
        self._may_close = True
        if not self._closing:  # Qt does not close a window again that is being closed
            self.close()

    def _shut_down(self) -> None:
        if self._closed:
            return
        self._closed = True
        self._arrangement.save()
        self._settings.sync()
        QGuiApplication.styleHints().colorSchemeChanged.disconnect(self._take_theme)
        for unsubscribe in self._unsubscribe:
            unsubscribe()
        self._panels.close_lanes()
        self._recompute.close()
        self._exporter.close()
        self._files.close()
        self._disk.close()
        self._recovery.close()
