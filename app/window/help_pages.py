"""The pages of the help panel, made from the same tables the program works with. No toolkit."""

from collections.abc import Iterable, Sequence
from html import escape
from typing import Final

from app.look.theme import Theme
from app.window.cautions import ALWAYS, STANDING, Caution
from stackcore.conventions import CONVENTIONS
from stackcore.quantities import QUANTITIES

PAGES: Final = {
    "conventions": "Conventions and definitions",
    "keyboard": "Keyboard",
    "cautions": "Cautions and limits",
    "about": "About",
}
"""Page name -> heading, in the order of the panel."""

UNIT_WORDS: Final = {"": "a fraction", "dB": "decibels", "deg": "degrees", "s": "seconds"}

KeyGroup = tuple[str, Sequence[tuple[str, str]]]


def conventions_page(theme: Theme) -> str:
    """Return the conventions and the definition of every quantity."""
    rows = [f"<p>{escape(text)}</p>" for text in CONVENTIONS.values()]
    quantities = []
    for quantity in QUANTITIES.values():
        unit = UNIT_WORDS.get(quantity.unit, quantity.unit)
        symbol = f" <i>{escape(quantity.symbol)}</i>" if quantity.symbol else ""
        quantities.append(
            f'<h3><a name="{quantity.name}"></a>{escape(quantity.label)}{symbol}</h3>'
            f"<p>{escape(quantity.definition)}<br>"
            f'<span style="color:{theme.muted}">In {unit}. {escape(quantity.sign)}<br>'
            f"In tables and files: <code>{quantity.name}</code></span></p>"
        )
    return _page("conventions", [*rows, "<h2>Quantities</h2>", *quantities])


def keyboard_page(theme: Theme, groups: Iterable[KeyGroup]) -> str:
    """Return the keys, group by group, each a line of key and what it does."""
    parts: list[str] = []
    for heading, lines in groups:
        parts.append(f"<h2>{escape(heading)}</h2><table cellspacing='0' cellpadding='2'>")
        for keys, what in lines:
            parts.append(
                f"<tr><td style='color:{theme.muted}; padding-right:16px'>{escape(keys)}</td>"
                f"<td>{escape(what)}</td></tr>"
            )
        parts.append("</table>")
    return _page("keyboard", parts)


def cautions_page(theme: Theme, here: Iterable[Caution]) -> str:
    """Return what the results do not say: first the notes of the present job, then what always holds."""
    parts = [f"<p><b>{escape(STANDING)}</b></p>"]
    notes = [f"<h3>{escape(caution.brief)}</h3><p>{escape(caution.full)}</p>" for caution in here]
    if notes:
        parts += ["<h2>For what is shown now</h2>", *notes]
    parts.append("<h2>Always</h2>")
    parts += [f"<h3>{escape(heading)}</h3><p>{escape(text)}</p>" for heading, text in ALWAYS]
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
            "<h2>Made with</h2>",
            f"<table cellspacing='0' cellpadding='2'>{rows}</table>",
            (
                f"<p style='color:{theme.muted}'>Help &gt; Copy diagnostics puts versions and the last lines of "
                "the log on the clipboard, for a report. It holds no contents of your jobs.</p>"
            ),
        ],
    )


def _page(name: str, parts: Iterable[str]) -> str:
    return f"<h1>{PAGES[name]}</h1>" + "".join(parts)
