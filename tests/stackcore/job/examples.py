"""A job file to break: the tree of the stored example, and ways to change it at a path."""

import copy
import json
import re
from typing import Any, Final

from stackcore.errors import Fault, JobError
from stackcore.job import job_from_json
from tests.stackcore.formats.files import HAND_WRITTEN

TREE: Final[dict[str, Any]] = json.loads(HAND_WRITTEN.read_text(encoding="utf-8"))

MISSING: Final = object()
"""As a value: take the key out."""


def changed(*changes: tuple[str, object]) -> dict[str, Any]:
    """Return the example with each path set to a value, or taken out."""
    tree = copy.deepcopy(TREE)
    for path, value in changes:
        *parents, last = [int(part) if part.isdigit() else part for part in re.findall(r"\w+", path)]
        node: Any = tree
        for part in parents:
            node = node[part]
        if value is MISSING:
            del node[last]
        else:
            node[last] = value
    return tree


def faults_in(content: object) -> tuple[Fault, ...]:
    """Return the faults of a tree, a text or bytes; none when it can be read."""
    text = content if isinstance(content, str | bytes) else json.dumps(content)
    try:
        job_from_json(text)
    except JobError as error:
        return error.faults
    return ()
