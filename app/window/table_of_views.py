"""The rows of the table of actions that change what is looked at: the menus Markers, View and Help."""

from collections.abc import Sequence

from app.window.actions import Act
from app.window.beside import BESIDE, Beside
from app.window.commands import Commands


def markers_acts(c: Commands) -> Sequence[Act]:
    """Return the acts that add a marker and go from one to the next."""
    menu = "&Markers"
    markers = c.markers
    return (
        Act(
            "markers.add",
            menu,
            "&Add marker",
            markers.add,
            ("Ctrl+K",),
            "Add a marker in the widest gap between markers; arrow keys move it.",
        ),
        Act(
            "markers.next",
            menu,
            "&Next marker",
            markers.next,
            ("F7",),
            "Go to the next marker in frequency.",
            enabled=markers.any,
            group=1,
        ),
        Act(
            "markers.previous",
            menu,
            "&Previous marker",
            markers.previous,
            ("Shift+F7",),
            "Go to the marker before in frequency.",
            enabled=markers.any,
            group=1,
        ),
    )


def worst_acts(c: Commands) -> Sequence[Act]:
    """Return the acts that go to the worst point and remove a marker."""
    menu = "&Markers"
    markers = c.markers
    return (
        Act(
            "markers.worst",
            menu,
            "To the &worst point",
            markers.to_worst,
            ("F8",),
            "Put the marker at the worst point over all curves shown, and look at its angle.",
            group=1,
        ),
        Act(
            "markers.remove",
            menu,
            "&Remove marker",
            markers.remove,
            ("Ctrl+Shift+K",),
            "Remove the marker.",
            enabled=markers.any,
            group=2,
        ),
    )


def theme_acts(c: Commands) -> Sequence[Act]:
    """Return the choice of the theme."""
    menu = "&View"
    view = c.view

    def theme(choice: str, text: str, tip: str) -> Act:
        return Act(
            f"view.{choice}",
            menu,
            text,
            lambda: view.set_theme(choice),
            tip=tip,
            checked=lambda: view.theme() == choice,
            choice="theme",
        )

    return (
        theme("auto", "Theme of the &system", "Light or dark as the system is."),
        theme("light", "&Light theme", "Dark ink on warm grey."),
        theme("dark", "&Dark theme", "Light ink on blue grey."),
    )


def arrangement_acts(c: Commands) -> Sequence[Act]:
    """Return the acts that show, arrange and focus panels."""
    menu = "&View"
    view = c.view
    return (
        *(_panel_act(c, beside) for beside in BESIDE if beside.in_menu),
        Act(
            "view.rare_columns",
            menu,
            "&Inductance and capacitance",
            lambda: c.elements.show_rare_columns(not c.elements.rare_columns),
            tip="Show the columns in which a sheet gets an inductance or a capacitance, also where none is used.",
            checked=lambda: c.elements.rare_columns,
            group=1,
        ),
        Act(
            "view.next_panel",
            menu,
            "&Next panel",
            view.next_panel,
            ("F6",),
            "Move the keyboard focus to the next panel.",
            group=2,
        ),
        Act(
            "view.previous_panel",
            menu,
            "&Previous panel",
            view.previous_panel,
            ("Shift+F6",),
            "Move the keyboard focus to the panel before.",
            group=2,
        ),
        Act("view.reset", menu, "R&eset layout", view.reset_layout, tip="Arrange everything as at first.", group=3),
    )


def _panel_act(c: Commands, beside: Beside) -> Act:
    return Act(
        f"view.{beside.name}",
        "&View",
        beside.text,
        lambda: c.view.toggle(beside),
        (beside.shortcut,) if beside.shortcut else (),
        beside.tip,
        checked=lambda: c.view.shown(beside),
        group=1,
    )


def help_acts(c: Commands) -> Sequence[Act]:
    """Return the pages of help and the diagnostics."""
    menu = "&Help"

    def page(name: str, text: str, shortcuts: tuple[str, ...], tip: str, group: int = 0) -> Act:
        return Act(f"help.{name}", menu, text, lambda: c.help.show_page(name), shortcuts, tip, group=group)

    return (
        page("start", "&First steps", (), "From a wall to what is handed on, in six steps."),
        page("conventions", "&Conventions and definitions", ("F1",), "Signs, phases and every quantity defined."),
        page("keyboard", "&Keyboard", ("Ctrl+F1",), "Every key."),
        page("cautions", "C&autions and limits", (), "What the results do not say."),
        Act(
            "help.diagnostics",
            menu,
            "Copy &diagnostics",
            c.help.copy_diagnostics,
            tip="Put versions and the last lines of the log on the clipboard, for a report.",
            group=1,
        ),
        page("about", "A&bout Slabwright", (), "Version and licences.", group=1),
    )
