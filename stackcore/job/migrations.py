"""The door for files of older versions: one pure function a step.

A step takes the tree of a job file of version n and returns that of version n + 1. It changes nothing it was
given and does not look whether the values are right, which the codec does afterwards. To raise the version:
write the step, enter it in `STEPS`, raise `VERSION`, and keep a file of the old version under
``tests/stackcore/formats``.
"""

from collections.abc import Callable, Mapping
from typing import Final

from stackcore.errors import Fault, JobError
from stackcore.job.inspector import shown

VERSION: Final = 1
"""Version of the job file that is written."""

Step = Callable[[Mapping[str, object]], dict[str, object]]

STEPS: Final[Mapping[int, Step]] = {}
"""Version -> the step from it to the next. Version 1 is the first, so there is none yet."""


def migrate(
    tree: Mapping[str, object], *, version: int = VERSION, steps: Mapping[int, Step] = STEPS
) -> Mapping[str, object]:
    """Return `tree` as version `version` writes it.

    Parameters
    ----------
    tree
        A whole job file.
    version, steps
        Where to go and how; other values serve tests.

    Raises
    ------
    JobError
        When the tree has no version, one that never was, or one that is newer than `version`.

    Examples
    --------
    >>> migrate({"version": 1})
    {'version': 1}
    """
    if "version" not in tree:
        raise _error("is missing", f"the version of the file, {version}")
    given = tree["version"]
    # 1.0 is the number 1 in JSON, true is not.
    if isinstance(given, bool) or not isinstance(given, int | float) or given != given // 1:
        raise _error(f"{shown(given)} is not a version", f"a whole number from 1 to {version}")
    if given > version:
        message = f"the file has version {shown(given)}, newer than version {version} that this program reads"
        raise _error(message, f"version {version} or older; a newer slabwright reads this file")
    if given < min(steps, default=version):
        raise _error(f"there never was a version {shown(given)}", f"a whole number from 1 to {version}")
    for step in range(int(given), version):
        tree = {**steps[step](tree), "version": step + 1}
    return tree


def _error(message: str, allowed: str) -> JobError:
    return JobError([Fault("version", message, allowed)])
