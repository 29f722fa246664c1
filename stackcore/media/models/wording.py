"""How a fault names a place, a value that was given, and what was likely meant; each on one line."""

import json
import re
from collections.abc import Collection, Iterable
from typing import Final

from stackcore.errors import nearest

_PLAIN_KEY: Final = re.compile(r"[\w-]+")
_LONGEST_SHOWN: Final = 60
_MOST_COMPARED: Final = 1000


def join(path: str, key: str | int) -> str:
    """Return the path of a member: ``stacks`` and 0 -> ``stacks[0]``, ``sweep`` and ``angle`` -> ``sweep.angle``.

    A key that is not one word is written as in JSON: ``materials["E glass"]``.
    """
    if isinstance(key, int):
        return f"{path}[{key}]"
    if not _PLAIN_KEY.fullmatch(key):
        return f"{path}[{json.dumps(shortened(key), ensure_ascii=True)}]"
    return f"{path}.{key}" if path else key


def shortened(text: str) -> str:
    """Return `text`, cut in the middle when it is long."""
    half = _LONGEST_SHOWN // 2
    return text if len(text) <= _LONGEST_SHOWN else f"{text[:half]}…{text[-half:]}"


def shown(value: object) -> str:
    """Return a value of a file on one line for a message; of lists and objects only what they are."""
    match value:
        case dict():
            return "an object {...}"
        case list():
            return f"a list of {len(value)}"
        case str():
            return repr(shortened(value))
        case bool() | None:
            return json.dumps(value)
        case int() | float():
            return shortened(_digits(value))
    return f"a {type(value).__name__}"


def _digits(value: int | float) -> str:
    try:
        return repr(value)
    except ValueError:  # Python refuses to write whole numbers of thousands of digits
        return "a number of thousands of digits"


def near(given: str, known: Collection[str]) -> str:
    """Return what `nearest` does, or nothing where the search would take long."""
    return nearest(given, known) if len(given) <= _LONGEST_SHOWN and len(known) <= _MOST_COMPARED else ""


def one_of(names: Iterable[str]) -> str:
    """Return ``one of a, b, c`` for an error, with the names in quotation marks."""
    listed = [repr(shortened(name)) for name in dict.fromkeys(names)]
    if len(listed) == 1:
        return listed[0]
    rest = f" and {len(listed) - 30} more" if len(listed) > 30 else ""
    return f"one of {', '.join(listed[:30])}{rest}"
