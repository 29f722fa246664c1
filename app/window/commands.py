"""Everything the table of actions refers to, gathered."""

from collections.abc import Callable
from dataclasses import dataclass

from app.document.session import Session
from app.panels.elements.panel import ElementsPanel
from app.window.beside import Beside
from app.window.editing import ElementQuestions, StackCommands, StructureCommands
from app.window.exporting import Exporter
from app.window.files import Files
from app.window.marking import MarkerCommands
from app.window.recent import RecentFiles
from app.window.samples import Sample
from app.window.windows import Others

Do = Callable[[], None]


@dataclass(frozen=True, slots=True)
class ViewCommands:
    """What the menu View needs from the window; panels opened beside go by their row."""

    theme: Callable[[], str]
    set_theme: Callable[[str], None]
    shown: Callable[[Beside], bool]
    toggle: Callable[[Beside], None]
    reset_layout: Do
    next_panel: Do
    previous_panel: Do


@dataclass(frozen=True, slots=True)
class HelpCommands:
    """What the menu Help needs from the window."""

    show_page: Callable[[str], None]
    copy_diagnostics: Do


@dataclass(frozen=True, slots=True)
class Commands:
    """Everything the table refers to."""

    session: Session
    files: Files
    exporter: Exporter
    import_material: Do
    export_plot: Do
    export_wall: Do
    recent: RecentFiles
    samples: tuple[Sample, ...]
    elements: ElementsPanel
    selected: ElementQuestions
    structure: StructureCommands
    stacks: StackCommands
    rename_stack: Do
    markers: MarkerCommands
    view: ViewCommands
    help: HelpCommands
    others: Others
    close: Do
    quit: Do
