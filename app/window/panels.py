"""The panels of the main window, made and addressed together."""

from collections.abc import Callable
from dataclasses import dataclass, fields
from typing import Protocol

from PySide6.QtCore import Qt
from PySide6.QtWidgets import QApplication, QWidget

from app.document.session import Session
from app.document.view import View
from app.look.theme import Theme
from app.panels.conditions.panel import ConditionsPanel
from app.panels.constructions.panel import ConstructionsPanel
from app.panels.curves.panel import CurvesPanel
from app.panels.cuts.panel import CutsPanel
from app.panels.elements.panel import ElementsPanel
from app.panels.elements.stacks import StackBar
from app.panels.maps.panel import MapPanel
from app.panels.material_data.panel import MaterialData
from app.panels.materials.panel import MaterialsPanel
from app.panels.plane.panel import PlanePanel
from app.panels.readings.panel import ReadingsPanel
from app.panels.sweep.panel import SweepPanel
from app.panels.variants.panel import VariantsPanel
from app.panels.wall.panel import WallPanel
from app.window.beside import BESIDE, CONDITIONS, MATERIAL_DATA, Beside
from app.window.exporting import Tell
from app.window.help_panel import HelpPanel
from app.window.layout import Places
from app.window.notes_panel import NotesPanel
from app.window.recompute import Recompute, Viewer
from stackcore.job.records import LayerRecord
from stackcore.media.library import read_library


class Themed(Protocol):
    """What takes the colours of a look."""

    def set_theme(self, theme: Theme) -> None:
        """Take the colours of `theme`."""


Plot = CurvesPanel | MapPanel | CutsPanel | PlanePanel
"""What can be exported as a plot."""


@dataclass(frozen=True, slots=True, weakref_slot=True)
class Panels:
    """Every panel by its name."""

    wall: WallPanel
    elements: ElementsPanel
    sweep: SweepPanel
    curves: CurvesPanel
    readings: ReadingsPanel
    materials: MaterialsPanel
    material_data: MaterialData
    constructions: ConstructionsPanel
    map: MapPanel
    cuts: CutsPanel
    plane: PlanePanel
    variants: VariantsPanel
    conditions: ConditionsPanel
    notes: NotesPanel
    help: HelpPanel

    @property
    def viewers(self) -> tuple[Viewer, ...]:
        """Those that show results."""
        return self.wall, self.elements, self.curves, self.readings, self.plane

    @property
    def beside(self) -> tuple[tuple[Beside, QWidget], ...]:
        """Those that open beside the work."""
        return tuple((one, getattr(self, one.name)) for one in BESIDE)

    @property
    def in_order(self) -> tuple[QWidget, ...]:
        """All of them, in the order F6 goes through."""
        work = (self.wall, self.elements, self.sweep, self.curves, self.readings)
        return (*work, *(widget for _, widget in self.beside))

    def plot_in_hand(self) -> Plot:
        """Return the plot that has the focus, else the curves."""
        return next((plot for plot in self.plots if has_focus(plot)), self.curves)

    @property
    def plots(self) -> tuple[Plot, ...]:
        """Every panel that can be exported as a plot."""
        return self.curves, self.map, self.cuts, self.plane

    @property
    def slow(self) -> tuple[MapPanel | CutsPanel | VariantsPanel, ...]:
        """Those that compute what takes long, and give way to the curves."""
        return self.map, self.cuts, self.variants

    def give_way_to(self, recompute: Recompute, point: Callable[[str], None]) -> None:
        """Let the slow ones wait while the curves are computed, and say what is pointed at in them."""
        for panel in self.slow:
            panel.pointed.connect(point)
            panel.live_busy = recompute.lane_busy
            recompute.asked.connect(panel.give_way)
        self.plane.pointed.connect(point)

    def close_lanes(self) -> None:
        """End for good what the slow panels compute."""
        for panel in self.slow:
            panel.close_lane()

    def places(self, strip: QWidget) -> Places:
        """Return who goes where."""
        return Places(strip, self.wall, self.elements, self.sweep, self.curves, self.readings)

    def set_theme(self, theme: Theme) -> None:
        """Give every panel the colours of `theme`."""
        themed: tuple[Themed, ...] = tuple(getattr(self, one.name) for one in fields(self))
        for panel in themed:
            panel.set_theme(theme)

    def open_with(self, open_beside: Callable[[Beside], None]) -> None:
        """Let panels that lead to another one open it by `open_beside`."""
        self.materials.detail_wanted.connect(lambda: open_beside(MATERIAL_DATA))
        self.sweep.comparison.conditions_wanted.connect(lambda: open_beside(CONDITIONS))

    def rename_stack(self) -> None:
        """Open the line for a new name of the stack, in its place."""
        bar = self.elements.findChild(StackBar)
        if bar is not None:
            bar.rename()

    def edit_element(self, row: int) -> None:
        """Open the cell of an element's main value in the table: thickness, or resistance of a sheet."""
        table = self.elements.table
        is_layer = isinstance(table.elements_model().stack.elements[row], LayerRecord)
        table.go_to(row, "thickness" if is_layer else "resistance")
        table.setFocus(Qt.FocusReason.OtherFocusReason)
        table.edit(table.currentIndex())

    def focus(self, step: int) -> None:
        """Move the focus to the next visible panel (`step` 1) or the one before (-1)."""
        shown = [panel for panel in self.in_order if panel.isVisible()]
        here = next((place for place, panel in enumerate(shown) if has_focus(panel)), -1 if step > 0 else 0)
        for distance in range(1, len(shown) + 1):
            panel = shown[(here + step * distance) % len(shown)]
            focus_into(panel)
            if has_focus(panel):
                return


def make_panels(session: Session, view: View, theme: Theme, tell: Tell, help_panel: HelpPanel) -> Panels:
    """Return the panels, each with what it needs and nothing more."""
    materials = MaterialsPanel(session, view, theme, tell)
    material_data = MaterialData(session, view, theme, tell)
    materials.picked.connect(material_data.show_picks)
    material_data.editor.page.kept.connect(lambda: materials.library.reload(read_library()))
    material_data.editor.page.imported.connect(materials.show_material)
    material_data.show_picks(materials.picks, materials.current_pick)
    return Panels(
        wall=WallPanel(session, view, theme, tell),
        elements=ElementsPanel(session, theme, tell),
        sweep=SweepPanel(session, view, theme, tell),
        curves=CurvesPanel(session, view, theme, tell),
        readings=ReadingsPanel(session, view, theme, tell),
        materials=materials,
        material_data=material_data,
        constructions=ConstructionsPanel(session, theme, tell),
        map=MapPanel(session, view, theme, tell),
        cuts=CutsPanel(session, view, theme, tell),
        plane=PlanePanel(session, view, theme, tell),
        variants=VariantsPanel(session, view, theme, tell),
        conditions=ConditionsPanel(session, view, theme, tell),
        notes=NotesPanel(session, tell),
        help=help_panel,
    )


def has_focus(panel: QWidget) -> bool:
    """Whether the keyboard focus is in `panel`."""
    focus = QApplication.focusWidget()
    return focus is not None and (focus is panel or panel.isAncestorOf(focus))


def focus_into(panel: QWidget) -> None:
    """Give the focus to `panel`, or to the first thing in it that takes it."""
    reason = Qt.FocusReason.TabFocusReason
    if panel.focusProxy() is not None or panel.focusPolicy() != Qt.FocusPolicy.NoFocus:
        panel.setFocus(reason)
        return
    inside = (
        child
        for child in panel.findChildren(QWidget)
        if child.focusPolicy() & Qt.FocusPolicy.TabFocus and child.isVisible() and child.isEnabled()
    )
    first = next(inside, None)
    if first is not None:
        first.setFocus(reason)
