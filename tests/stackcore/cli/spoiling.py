"""Ways to spoil a job file, each a function of a source of chance and the bytes of the file."""

import json
import random
import string
from collections.abc import Callable
from typing import Any, Final

Spoil = Callable[[random.Random, bytes], bytes]

TEXTS: Final = (
    "",
    " ",
    "nan",
    "1,500 mm",
    "-1 mm",
    "5 GHz",
    "5 MM",
    "1e999 m",
    "1e-400 m",
    "9" * 500,
    "(" * 90,
    "1 mm" + " + 1 mm" * 10,
    "2 ** 9 ** 9 mm",
    "metal",
    "metals/coper",
    "../../etc",
    "\ud800",
    "a\nb",
    "\x1b[31m",
    "=1+1",
    "log",
    "skni",
    "30 deg",
    "x" * 20_000,
)

NUMBERS: Final = (0, -1, 1, 5, 90, 1.5, 1e-300, 1e300, float("nan"), float("inf"), 10**400, 2**63, 1_000_001, -0.0)


def _value(chance: random.Random) -> object:
    """Return a value that seldom fits."""
    choices: tuple[Callable[[], object], ...] = (
        lambda: chance.choice(TEXTS),
        lambda: chance.choice(NUMBERS),
        lambda: chance.choice((None, True, False, [], {}, [[]], [1], [1, -1], [1, 2, 3], {"a": 1})),
        lambda: chance.uniform(-10, 10),
        lambda: f"{chance.uniform(-5, 100):.3g} {chance.choice(('mm', 'GHz', 'deg', 'ohm/sq', 'pF', 'S/m', 'xy'))}",
        lambda: "".join(chance.choices(string.printable, k=chance.randrange(12))),
    )
    return chance.choice(choices)()


def _places(node: Any) -> list[tuple[Any, Any]]:
    """Return every (container, key) of a tree."""
    own = list(node.items()) if isinstance(node, dict) else list(enumerate(node)) if isinstance(node, list) else []
    return [(node, key) for key, _ in own] + [place for _, child in own for place in _places(child)]


def _in_tree(change: Callable[[random.Random, Any, Any, Any], None]) -> Spoil:
    """Return a spoiler that applies `change` at a place of the tree; what is no JSON any more stays as it is."""

    def spoil(chance: random.Random, content: bytes) -> bytes:
        try:
            tree = json.loads(content)
            node, key = chance.choice(_places(tree))
        except (ValueError, IndexError, RecursionError):
            return content
        change(chance, tree, node, key)
        return json.dumps(tree, indent=chance.choice((None, 1))).encode()

    return spoil


def _replace(chance: random.Random, tree: Any, node: Any, key: Any) -> None:
    node[key] = _value(chance)


def _remove(chance: random.Random, tree: Any, node: Any, key: Any) -> None:
    del node[key]


def _rename(chance: random.Random, tree: Any, node: Any, key: Any) -> None:
    if isinstance(node, dict):
        cut = chance.randrange(len(key) + 1)
        node[key[:cut] + chance.choice(("", "x", " ", ".", "\n")) + key[cut + 1 :]] = node.pop(key)


def _swap(chance: random.Random, tree: Any, node: Any, key: Any) -> None:
    other, place = chance.choice(_places(tree))
    node[key] = json.loads(json.dumps(other[place]))


def _nest(chance: random.Random, tree: Any, node: Any, key: Any) -> None:
    for _ in range(chance.choice((1, 3, 20, 300))):
        node[key] = [node[key]] if chance.random() < 0.5 else {"a": node[key]}


def _multiply(chance: random.Random, tree: Any, node: Any, key: Any) -> None:
    if isinstance(node, list):
        node.extend([node[key]] * chance.choice((1, 10, 1000)))


def _truncate(chance: random.Random, content: bytes) -> bytes:
    return content[: chance.randrange(len(content) + 1)]


def _flip(chance: random.Random, content: bytes) -> bytes:
    changed = bytearray(content)
    for _ in range(chance.randrange(1, 5) if changed else 0):
        changed[chance.randrange(len(changed))] = chance.randrange(256)
    return bytes(changed)


def _insert(chance: random.Random, content: bytes) -> bytes:
    place = chance.randrange(len(content) + 1)
    return content[:place] + chance.randbytes(chance.randrange(1, 20)) + content[place:]


def _cut(chance: random.Random, content: bytes) -> bytes:
    start = chance.randrange(len(content) + 1)
    return content[:start] + content[start + chance.randrange(30) :]


def _double_line(chance: random.Random, content: bytes) -> bytes:
    """Double a line: in an object this doubles a key."""
    lines = content.split(b"\n")
    place = chance.randrange(len(lines))
    return b"\n".join([*lines[: place + 1], *lines[place:]])


def _bury(chance: random.Random, content: bytes) -> bytes:
    depth = chance.choice((10, 1000, 200_000))
    return b"[" * depth + content + b"]" * depth


def _replace_all(chance: random.Random, content: bytes) -> bytes:
    return chance.choice((b"", b"\x00" * 50, chance.randbytes(200), b"\xff\xfe{\x00}\x00", b"PK\x03\x04", b"null"))


SPOILS: Final[tuple[Spoil, ...]] = (
    *(_in_tree(_replace),) * 6,
    *(_in_tree(change) for change in (_remove, _remove, _rename, _rename, _swap, _swap, _nest, _multiply)),
    *(_truncate, _flip, _flip, _insert, _cut, _double_line, _bury, _replace_all),
)
"""Those that come more than once are drawn more often."""


def spoiled(seed: int, content: bytes) -> bytes:
    """Return `content` spoiled in one to three ways; the same for the same seed."""
    chance = random.Random(seed)
    for _ in range(chance.choice((1, 1, 1, 2, 3))):
        content = chance.choice(SPOILS)(chance, content)
    return content
