"""The table of actions: everything the menus offer, in their order."""

from collections.abc import Sequence

from app.window.actions import Act, Entry
from app.window.commands import Commands
from app.window.samples import Sample


def action_table(c: Commands) -> tuple[Act, ...]:
    """Return every act, in the order of the menus."""
    return (*_file(c), *_edit(c), *_stack(c), *_markers(c), *_view(c), *_help(c))


def _file(c: Commands) -> Sequence[Act]:
    menu = "&File"
    return (
        Act("file.new", menu, "&New job", c.files.new, ("Ctrl+N",), "Begin an untitled job."),
        Act("file.open", menu, "&Open…", c.files.open, ("Ctrl+O",), "Open a job file."),
        Act(
            "file.sample",
            menu,
            "Open sa&mple",
            c.files.new,
            tip="Open a copy of a sample job.",
            entries=lambda: _sample_entries(c),
        ),
        Act(
            "file.recent",
            menu,
            "Open &recent",
            c.files.new,
            tip="Open a job file used lately.",
            entries=lambda: _recent_entries(c),
        ),
        Act("file.save", menu, "&Save", c.files.save, ("Ctrl+S",), "Save the job to its file.", group=1),
        Act(
            "file.save_as",
            menu,
            "Save &as…",
            c.files.save_as,
            ("Ctrl+Shift+S",),
            "Save the job to another file.",
            group=1,
        ),
        Act(
            "file.export_csv",
            menu,
            "&Export CSV…",
            c.exporter.export,
            ("Ctrl+E",),
            "Write every stack of the job over its sweep to a table, in full precision.",
            enabled=c.exporter.idle,
            group=2,
        ),
        Act("file.quit", menu, "&Quit", c.quit, ("Ctrl+Q",), "Close the window.", group=3),
    )


def _edit(c: Commands) -> Sequence[Act]:
    menu = "&Edit"
    elements, selected = c.elements, c.selected
    return (
        Act(
            "edit.undo",
            menu,
            "&Undo",
            c.session.undo,
            ("Ctrl+Z",),
            "Take back the last change.",
            enabled=lambda: bool(c.session.undo_sentence),
            words=lambda: f"&Undo {c.session.undo_sentence}".rstrip(),
        ),
        Act(
            "edit.redo",
            menu,
            "&Redo",
            c.session.redo,
            ("Ctrl+Y", "Ctrl+Shift+Z"),
            "Make the change taken back again.",
            enabled=lambda: bool(c.session.redo_sentence),
            words=lambda: f"&Redo {c.session.redo_sentence}".rstrip(),
        ),
        Act(
            "edit.copy",
            menu,
            "&Copy",
            elements.copy,
            ("Ctrl+C",),
            "Copy the selected rows, as a table that spreadsheets take.",
            place="elements",
            group=1,
        ),
        Act(
            "edit.cut",
            menu,
            "Cu&t",
            elements.cut,
            ("Ctrl+X",),
            "Copy the selected elements and delete them.",
            enabled=selected.any_selected,
            place="elements",
            group=1,
        ),
        Act(
            "edit.paste",
            menu,
            "&Paste",
            elements.paste,
            ("Ctrl+V",),
            "Paste elements, or a block of cells from a spreadsheet, as one step.",
            place="elements",
            group=1,
        ),
        Act(
            "edit.add_layer",
            menu,
            "Add &layer",
            elements.add_layer,
            ("Ctrl+L",),
            "Add a layer behind the selected element.",
            group=2,
        ),
        Act(
            "edit.add_sheet",
            menu,
            "Add &sheet",
            elements.add_sheet,
            ("Ctrl+Shift+L",),
            "Add a sheet without thickness behind the selected element.",
            group=2,
        ),
        Act(
            "edit.duplicate",
            menu,
            "&Duplicate",
            elements.duplicate,
            ("Ctrl+D",),
            "Duplicate the selected elements.",
            enabled=selected.any_selected,
            place="elements",
            group=2,
        ),
        Act(
            "edit.delete",
            menu,
            "D&elete",
            elements.delete,
            ("Del",),
            "Delete the selected elements.",
            enabled=selected.any_selected,
            place="elements",
            group=2,
        ),
        Act(
            "edit.up",
            menu,
            "Move towards the &front",
            elements.move_up,
            ("Alt+Up",),
            "Move the selected elements one place up in the table, towards the wave.",
            enabled=selected.can_rise,
            place="elements",
            group=3,
        ),
        Act(
            "edit.down",
            menu,
            "Move towards the &back",
            elements.move_down,
            ("Alt+Down",),
            "Move the selected elements one place down in the table, away from the wave.",
            enabled=selected.can_sink,
            place="elements",
            group=3,
        ),
    )


def _stack(c: Commands) -> Sequence[Act]:
    menu = "&Stack"
    stacks = c.stacks
    return (
        Act("stack.add", menu, "&Add stack", stacks.add, ("Ctrl+Shift+A",), "Add an empty stack to the job."),
        Act(
            "stack.duplicate",
            menu,
            "&Duplicate stack",
            stacks.duplicate,
            ("Ctrl+Shift+D",),
            "Copy this stack, to try a variant of it.",
        ),
        Act("stack.rename", menu, "&Rename stack", c.rename_stack, ("Ctrl+R",), "Give this stack another name."),
        Act(
            "stack.delete",
            menu,
            "D&elete stack",
            stacks.delete,
            tip="Delete this stack; the last one stays.",
            enabled=stacks.several,
        ),
        Act(
            "stack.next",
            menu,
            "&Next stack",
            stacks.next,
            ("Ctrl+PgDown",),
            "Look at the next stack.",
            enabled=stacks.several,
            group=1,
        ),
        Act(
            "stack.previous",
            menu,
            "&Previous stack",
            stacks.previous,
            ("Ctrl+PgUp",),
            "Look at the stack before.",
            enabled=stacks.several,
            group=1,
        ),
    )


def _markers(c: Commands) -> Sequence[Act]:
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


def _view(c: Commands) -> Sequence[Act]:
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
        Act(
            "view.materials",
            menu,
            "&Materials",
            view.toggle_materials,
            ("Ctrl+Shift+M",),
            "Show or hide the materials of the job and the library, beside the work.",
            checked=view.materials_shown,
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
        Act("view.reset", menu, "&Reset layout", view.reset_layout, tip="Arrange everything as at first.", group=3),
    )


def _help(c: Commands) -> Sequence[Act]:
    menu = "&Help"

    def page(name: str, text: str, shortcuts: tuple[str, ...], tip: str, group: int = 0) -> Act:
        return Act(f"help.{name}", menu, text, lambda: c.help.show_page(name), shortcuts, tip, group=group)

    return (
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


def _sample_entries(c: Commands) -> tuple[Entry, ...]:
    def entry(sample: Sample) -> Entry:
        return Entry(sample.title, lambda: c.files.open_sample(sample), tip=sample.path.name)

    return tuple(entry(sample) for sample in c.samples)


def _recent_entries(c: Commands) -> tuple[Entry, ...]:
    paths = c.recent.paths()

    def entry(number: int, name: str, index: int) -> Entry:
        path = paths[index]
        there = path.exists()
        tip = str(path) if there else f"{path} is not there"
        text = f"&{number % 10} {name}".replace("&10", "1&0")
        return Entry(text, lambda: c.files.open_path(path), there, tip)

    if not paths:
        return (Entry("No files yet", lambda: None, enabled=False),)
    return tuple(entry(index + 1, path.name, index) for index, path in enumerate(paths))
