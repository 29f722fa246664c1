"""The table of actions: everything the menus offer, in their order."""

from collections.abc import Sequence

from app.window.actions import Act
from app.window.commands import Commands
from app.window.structure import structure_acts
from app.window.submenus import recent_entries, sample_entries
from app.window.table_of_views import arrangement_acts, help_acts, markers_acts, theme_acts, worst_acts


def action_table(c: Commands) -> tuple[Act, ...]:
    """Return every act, in the order of the menus."""
    parts = (
        *(_file, _save),
        *(_history, _clipboard, _new_elements, _elements, _order),
        structure_acts,
        *(_stack, _other_stacks),
        *(markers_acts, worst_acts),
        *(theme_acts, arrangement_acts),
        help_acts,
    )
    return tuple(act for part in parts for act in part(c))


def _file(c: Commands) -> Sequence[Act]:
    menu = "&File"
    return (
        Act("file.new", menu, "&New job", c.files.new, ("Ctrl+N",), "Begin an untitled job."),
        Act(
            "file.window",
            menu,
            "New win&dow",
            c.others.open_beside,
            ("Ctrl+Shift+N",),
            "Open another window, for a second job beside this one.",
        ),
        Act("file.open", menu, "&Open…", c.files.open, ("Ctrl+O",), "Open a job file."),
        Act(
            "file.sample",
            menu,
            "Open sa&mple",
            c.files.new,
            tip="Open a copy of a sample job.",
            entries=lambda: sample_entries(c),
        ),
        Act(
            "file.import_material",
            menu,
            "&Import measured material…",
            c.import_material,
            ("Ctrl+Shift+O",),
            "Read columns of measured data from a file, with a preview, as a new material of the job.",
        ),
        Act(
            "file.recent",
            menu,
            "Open &recent",
            c.files.new,
            tip="Open a job file used lately.",
            entries=lambda: recent_entries(c),
        ),
    )


def _save(c: Commands) -> Sequence[Act]:
    menu = "&File"
    return (
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
        Act(
            "file.export_wide",
            menu,
            "Export wide CS&V…",
            c.exporter.export_wide,
            tip="Write the quantity shown for a spreadsheet: a row a frequency, a column for each stack and curve.",
            enabled=c.exporter.idle,
            group=2,
        ),
        Act(
            "file.export_plot",
            menu,
            "Export &plot…",
            c.export_plot,
            ("Ctrl+Shift+E",),
            "Write the curves, or the plot that has the focus, as pixels, drawing or page.",
            group=2,
        ),
        Act(
            "file.export_wall",
            menu,
            "Export &wall drawing…",
            c.export_wall,
            tip="Write the wall drawing as pixels, drawing or page.",
            group=2,
        ),
        Act("file.close", menu, "&Close window", c.close, ("Ctrl+W",), "Close this window.", group=3),
        Act("file.quit", menu, "&Quit", c.quit, ("Ctrl+Q",), "Close every window.", group=3),
    )


def _history(c: Commands) -> Sequence[Act]:
    menu = "&Edit"
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
    )


def _clipboard(c: Commands) -> Sequence[Act]:
    menu = "&Edit"
    elements, selected = c.elements, c.selected
    return (
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
    )


def _new_elements(c: Commands) -> Sequence[Act]:
    menu = "&Edit"
    elements = c.elements
    return (
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
    )


def _elements(c: Commands) -> Sequence[Act]:
    menu = "&Edit"
    elements, selected = c.elements, c.selected
    return (
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
    )


def _order(c: Commands) -> Sequence[Act]:
    menu = "&Edit"
    elements, selected = c.elements, c.selected
    return (
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
    )


def _other_stacks(c: Commands) -> Sequence[Act]:
    menu = "&Stack"
    stacks = c.stacks
    return (
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
