"""The pages of the help panel, made from the same tables the program works with. No toolkit."""

from collections.abc import Callable, Iterable, Sequence
from dataclasses import dataclass
from html import escape
from typing import Final

from app.look.theme import Theme
from app.window.cautions import ALWAYS, STANDING, Caution
from stackcore.conventions import CONVENTIONS
from stackcore.quantities import GROUPS, QUANTITIES, ElementAbsorptance, Quantity

PAGES: Final = {
    "conventions": "Conventions and definitions",
    "keyboard": "Keyboard",
    "cautions": "Cautions and limits",
    "start": "First steps",
    "about": "About",
}
"""Page name -> heading, in the order of the panel."""

UNIT_WORDS: Final = {"dB": "decibels", "deg": "degrees", "s": "seconds", "ohm": "ohm"}

KeyGroup = tuple[str, Sequence[tuple[str, str]]]


@dataclass(frozen=True, slots=True)
class FirstStep:
    """What a new user does: a heading, words, and the names of acts whose keys are told."""

    heading: str
    words: str
    acts: tuple[str, ...] = ()


STEPS: Final = (
    FirstStep(
        "Begin with a wall",
        words=(
            "Open a sample from the menu File, insert a construction sized for your band and angle, or type the "
            "stack into the table: one row an element, from the side the wave comes from. Any unit is understood, "
            "also arithmetic: 2*0.25 mm + 5 mil. A block copied from a spreadsheet is pasted as it is."
        ),
        acts=("view.constructions", "edit.add_layer", "edit.paste"),
    ),
    FirstStep(
        "Say what it must be looked at for",
        words="The line above the curves holds quantity, polarizations, band and angles: click one to change it.",
    ),
    FirstStep(
        "Change it and watch",
        words="Drag a face in the drawing, or type a thickness: the curves follow. Everything can be undone.",
        acts=("edit.undo", "edit.redo"),
    ),
    FirstStep(
        "Read it",
        words=(
            "Markers give exact values, the ring marks the worst point of all. Keys in the plot: M sets a marker, "
            "W takes it to the worst point, E to the next extremum, V to a level."
        ),
        acts=("markers.add",),
    ),
    FirstStep(
        "Choose",
        words=(
            "Cuts and maps show what a thickness or a constant does, and the value at which the worst is best. "
            "Stacks of one job are compared as variants; conditions show rain, ice, heat or paint as an envelope."
        ),
        acts=("view.cuts", "view.map", "view.variants", "view.conditions"),
    ),
    FirstStep(
        "Hand it on",
        words=(
            "Tables in full precision, plots and drawings as vectors; the job file gives the same numbers on the "
            "command line. Read the cautions before anything is built or anybody is exposed."
        ),
        acts=("file.export_csv", "file.export_plot", "file.save"),
    ),
)
"""In turn."""


def first_steps_page(theme: Theme, keys: Callable[[str], tuple[str, str]]) -> str:
    """Return the first steps, each with the keys of its acts.

    Parameters
    ----------
    keys
        Gives words and keys of an act by its name.
    """
    parts = ["<p>A stack, its drawing and its curves are one thing here: change one and the others follow.</p>"]
    for number, step in enumerate(STEPS, 1):
        told = [f"{escape(act)}: {escape(pressed)}" for act, pressed in map(keys, step.acts) if pressed]
        line = f'<br><span style="color:{theme.muted}">{"; ".join(told)}</span>' if told else ""
        parts.append(f"<p class='term'>{number}. {escape(step.heading)}</p><p>{escape(step.words)}{line}</p>")
    return _page("start", parts)


def conventions_page(theme: Theme) -> str:
    """Return the conventions and the definition of every quantity, group by group."""
    parts = [f"<p>{escape(text)}</p>" for text in CONVENTIONS.values()]
    for group in GROUPS:
        parts.append(f"<p class='heading'>{escape(group)}</p>")
        members = [quantity for quantity in QUANTITIES.values() if quantity.group == group]
        of_one = ElementAbsorptance(0).quantity("one element")
        if of_one.group == group:
            members.append(of_one)
        parts += [_definition(theme, quantity) for quantity in members]
    return _page("conventions", parts)


def _definition(theme: Theme, quantity: Quantity) -> str:
    unit = f"In {UNIT_WORDS.get(quantity.unit, quantity.unit)}. " if quantity.unit else ""
    symbol = f" <i>{escape(quantity.symbol)}</i>" if quantity.symbol else ""
    lines = [escape(unit + quantity.sign)]
    if quantity.source:
        lines.append(f"Defined as in {escape(quantity.source)}")
    if quantity.exported:
        lines.append(f"In tables and files: <code>{quantity.name}</code>")
    name = quantity.name.partition(":")[0]
    return (
        f'<p class="term"><a name="{name}"></a>{escape(quantity.label)}{symbol}</p>'
        f"<p>{escape(quantity.definition)}<br>"
        f'<span style="color:{theme.muted}">{"<br>".join(lines)}</span></p>'
    )


def keyboard_page(theme: Theme, groups: Iterable[KeyGroup]) -> str:
    """Return the keys, group by group, each a line of key and what it does."""
    parts: list[str] = []
    for heading, lines in groups:
        parts.append(f"<p class='heading'>{escape(heading)}</p><table cellspacing='0' cellpadding='2'>")
        for keys, what in lines:
            parts.append(
                f"<tr><td width='120' style='color:{theme.muted}'>{escape(keys)}</td><td>{escape(what)}</td></tr>"
            )
        parts.append("</table>")
    return _page("keyboard", parts)


def cautions_page(theme: Theme, here: Iterable[Caution]) -> str:
    """Return what the results do not say: first the notes of the present job, then what always holds."""
    parts = [f"<p><b>{escape(STANDING)}</b></p>"]
    notes = [f"<p class='term'>{escape(caution.brief)}</p><p>{escape(caution.full)}</p>" for caution in here]
    if notes:
        parts += ["<p class='heading'>For what is shown now</p>", *notes]
    parts.append("<p class='heading'>Always</p>")
    parts += [f"<p class='term'>{escape(heading)}</p><p>{escape(text)}</p>" for heading, text in ALWAYS]
    return _page("cautions", parts)


def about_page(theme: Theme, version: str, parts: Iterable[tuple[str, str, str]]) -> str:
    """Return the version and the parts the program is made of (name, version, licence)."""
    rows = "".join(
        f"<tr><td style='padding-right:16px'>{escape(name)}</td>"
        f"<td style='padding-right:16px'>{escape(number)}</td>"
        f"<td style='color:{theme.muted}'>{escape(licence)}</td></tr>"
        for name, number, licence in parts
    )
    return _page(
        "about",
        [
            (
                f"<p><b>Slabwright {escape(version)}</b><br>"
                "A workbench for flat multilayer walls met by a plane wave.</p>"
            ),
            "<p class='heading'>Made with</p>",
            f"<table cellspacing='0' cellpadding='2'>{rows}</table>",
            (
                f"<p style='color:{theme.muted}'>Help &gt; Copy diagnostics puts versions and the last lines of "
                "the log on the clipboard, for a report. It holds no contents of your jobs.</p>"
            ),
        ],
    )


def _page(name: str, parts: Iterable[str]) -> str:
    return f"<p class='title'>{PAGES[name]}</p>" + "".join(parts)
