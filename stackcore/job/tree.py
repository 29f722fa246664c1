"""JSON text -> a tree of dicts, lists, texts and numbers, or the one fault that keeps it from being one.

What JSON leaves open is closed here: doubled keys are remembered, numbers beyond a double become infinite (and are
refused where they stand), and neither a deep nor a huge file can exhaust the machine.
"""

import json
import math
from collections import Counter
from collections.abc import Iterable
from typing import Final

from stackcore.errors import Fault, JobError

LARGEST_FILE: Final = 16 * 2**20
"""Bytes."""

DEEPEST: Final = 16
"""Levels of brackets; a job needs 5."""

_LONGEST_INTEGER: Final = 310
"""Digits; one more is beyond the largest double."""


class JsonObject(dict[str, object]):
    """A JSON object that remembers which of its keys were given more than once."""

    repeated: tuple[str, ...] = ()


def read_tree(content: str | bytes) -> object:
    """Return the value a JSON text stands for.

    Parameters
    ----------
    content
        Text, or bytes in UTF-8; a byte order mark in front does not matter.

    Raises
    ------
    JobError
        With one fault: too large, not UTF-8, not JSON (with line and column), too deep.

    Examples
    --------
    >>> read_tree('{"title": "A", "title": "B"}').repeated
    ('title',)
    """
    if len(content) > LARGEST_FILE:
        raise _error(f"the file has {len(content)} bytes", f"at most {LARGEST_FILE} bytes (16 MiB)")
    text = _decoded(content) if isinstance(content, bytes) else content
    text = text.removeprefix("\ufeff")
    if not text.strip():
        raise _error("the file is empty", "a job file in JSON")
    try:
        tree: object = json.loads(text, object_pairs_hook=_object, parse_int=_integer)
    except json.JSONDecodeError as error:
        place = f"line {error.lineno}, column {error.colno}"
        raise JobError([Fault(place, f"this is not JSON: {error.msg}", "a job file in JSON")]) from None
    except RecursionError:
        raise _error("brackets are nested too deeply", f"at most {DEEPEST} levels") from None
    if _depth_exceeds(tree, DEEPEST):
        raise _error("brackets are nested too deeply", f"at most {DEEPEST} levels")
    return tree


def _error(message: str, allowed: str) -> JobError:
    return JobError([Fault("", message, allowed)])


def _decoded(content: bytes) -> str:
    if content.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise _error("the file is UTF-16", "text in UTF-8; save it again with that encoding")
    try:
        return content.decode("utf-8")
    except UnicodeDecodeError as error:
        line = content.count(b"\n", 0, error.start) + 1
        message = f"byte {error.start + 1} of the file (0x{content[error.start]:02x}) is not UTF-8"
        raise JobError([Fault(f"line {line}", message, "text in UTF-8")]) from None


def _object(pairs: list[tuple[str, object]]) -> JsonObject:
    built = JsonObject(pairs)
    if len(built) != len(pairs):
        counts = Counter(key for key, _ in pairs)
        built.repeated = tuple(key for key, count in counts.items() if count > 1)
    return built


def _integer(text: str) -> int | float:
    if len(text) > _LONGEST_INTEGER:
        return -math.inf if text.startswith("-") else math.inf
    return int(text)


def _depth_exceeds(tree: object, deepest: int) -> bool:
    """Return whether `tree` has more than `deepest` levels, without recursion."""
    level: list[object] = [tree]
    for _ in range(deepest + 1):
        level = [child for node in level for child in _children(node)]
        if not level:
            return False
    return True


def _children(node: object) -> Iterable[object]:
    if isinstance(node, dict):
        return node.values()
    return node if isinstance(node, list) else ()
