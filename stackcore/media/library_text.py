"""An entry of the library as the text of a TOML file."""

import json
import re
from collections.abc import Mapping
from typing import Final

from stackcore.media.base import Provenance
from stackcore.media.models import MODELS, Value
from stackcore.units import Dimension, Measure
from stackcore.units.written import written_measure

_BARE: Final = re.compile(r"[A-Za-z0-9_-]+")


def entry_text(
    name: str,
    label: str,
    model: str,
    constants: Mapping[str, Value],
    valid_range: tuple[Measure, Measure] | None,
    provenance: Provenance,
    facts: Mapping[str, object] | None = None,
) -> str:
    """Return the table ``[[material]]`` of one entry, as `stackcore.media.library_file` reads it.

    `facts` are density, ply thickness and states as they are written.

    Examples
    --------
    >>> told = Provenance("panel test 12", "read", (("permittivity", 0.02),))
    >>> print(entry_text("skin", "Skin", "constant", {"permittivity": 4.2 + 0j}, None, told))
    [[material]]
    name = "skin"
    label = "Skin"
    model = "constant"
    permittivity = 4.2
    source = "panel test 12"
    certainty = "read"
    spread = {permittivity = 0.02}
    <BLANKLINE>
    """
    members: dict[str, object] = {"name": name, "label": label, "model": model}
    members |= MODELS[model].written(constants)
    if valid_range is not None:
        members["range"] = [_typed(end) for end in valid_range]
    members |= {"source": provenance.source, "certainty": provenance.certainty, "spread": dict(provenance.spread)}
    if provenance.note:
        members["note"] = provenance.note
    members |= facts or {}
    lines = [f"{_key(key)} = {toml_text(value)}" for key, value in members.items()]
    return "\n".join(["[[material]]", *lines, ""])


def _typed(end: Measure) -> str:
    written = written_measure(end, Dimension.FREQUENCY)
    return written if isinstance(written, str) else f"{written} Hz"


def toml_text(value: object) -> str:
    """Return a value as TOML writes it."""
    match value:
        case bool():
            return "true" if value else "false"
        case str():
            # What JSON escapes TOML takes, and TOML wants one letter more escaped.
            return json.dumps(value, ensure_ascii=False).replace("\x7f", "\\u007f")
        case int() | float():
            return repr(value)
        case Mapping():
            return f"{{{', '.join(f'{_key(str(key))} = {toml_text(one)}' for key, one in value.items())}}}"
        case list() | tuple():
            return f"[{', '.join(toml_text(one) for one in value)}]"
    raise TypeError(f"a {type(value).__name__} has no place in a library file")


def _key(key: str) -> str:
    return key if _BARE.fullmatch(key) else toml_text(key)
