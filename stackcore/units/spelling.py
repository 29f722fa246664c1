"""How a unit may be spelled: signs that look alike, and letters in the wrong case."""

import difflib
from collections import defaultdict
from typing import Final

from stackcore.errors import UnitError
from stackcore.units.dimensions import UNITS, Dimension, Unit

_SPACES: Final = (
    "\t\u00a0\u1680\u2000\u2001\u2002\u2003\u2004\u2005\u2006\u2007\u2008\u2009\u200a\u202f\u205f\u3000"
)

_LOOK_ALIKE: Final = str.maketrans(
    {
        **dict.fromkeys(_SPACES, " "),
        "\u2060": "",  # word joiner
        "\ufeff": "",  # zero-width no-break space
        "\u2212": "-",  # minus sign
        "×": "*",
        "·": "*",
        "\u22c5": "*",  # dot operator
        "÷": "/",
        "\u2044": "/",  # fraction slash
        "\u2215": "/",  # division slash
        "\u00b5": "u",  # micro sign
        "\u03bc": "u",  # Greek mu
        "\u03a9": "ohm",  # Greek capital omega
        "\u2126": "ohm",  # ohm sign
        "□": "sq",
        "\u212b": "Å",  # angstrom sign
        "\u00ba": "°",  # masculine ordinal, typed for a degree
        "\u02da": "°",  # ring above
        "℃": "°C",
        "℉": "°F",
        "″": '"',
        "”": '"',
        "“": '"',
        "\u2032": "'",
    }
)


def plain(text: str) -> str:
    """Return `text` with one spelling for signs that look alike.

    Examples
    --------
    >>> plain("−30 μm"), plain("377 Ω/□"), plain("¼″")
    ('-30 um', '377 ohm/sq', '¼"')
    """
    return text.translate(_LOOK_ALIKE).replace("''", '"').strip()


def _by_folded_name() -> dict[str, tuple[str, ...]]:
    groups: dict[str, list[str]] = defaultdict(list)
    for name in UNITS:
        groups[name.casefold()].append(name)
    return {folded: tuple(names) for folded, names in groups.items()}


_FOLDED: Final = _by_folded_name()


def find_unit(name: str, dimension: Dimension) -> Unit:
    """Return the unit spelled `name` (already `plain`), of whatever dimension.

    The letters of a unit may be in the wrong case where one unit alone can be meant. A capital M is never milli, a
    small m may be meant as mega, and a single letter is taken as it stands.

    Parameters
    ----------
    name
        As typed; spaces around a slash do not count.
    dimension
        What is expected; suggestions come from it.

    Raises
    ------
    UnitError
        When there is no such unit, or more than one; the nearest one is named.
    """
    name = name.replace(" ", "")
    if name in UNITS:
        return UNITS[name]
    candidates = _FOLDED.get(name.casefold(), ()) if len(name) > 1 else ()
    candidates = tuple(c for c in candidates if not (UNITS[c].prefix == "m" and name[0] == "M"))
    if len({UNITS[candidate] for candidate in candidates}) > 1:
        both = " or ".join(dict.fromkeys(UNITS[candidate].symbol for candidate in candidates))
        raise UnitError(f"unit {name!r} could be {both}", "the letters as SI has them: M is mega, m is milli")
    if candidates:
        return UNITS[candidates[0]]
    raise UnitError(f"unknown unit {name!r}{_suggestion(name, dimension)}", dimension.allowed)


def _suggestion(name: str, dimension: Dimension) -> str:
    """Return ``, did you mean 'mm'?`` from the units of `dimension`, or an empty text."""
    own = {key.casefold(): unit.symbol for key, unit in UNITS.items() if unit.dimension is dimension}
    close = difflib.get_close_matches(name.casefold(), own, n=1, cutoff=0.5)
    return f", did you mean {own[close[0]]!r}?" if close else ""
