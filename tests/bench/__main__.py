"""Print the figures: ``python -m tests.bench [solver | maps | start | window] ...``, all of them without a name."""

import importlib
import os
import sys

os.environ.setdefault("QT_QPA_PLATFORM", "offscreen")

SUBJECTS = ("solver", "maps", "materials", "start", "window")


def main(names: list[str]) -> int:
    """Print the report of each subject in `names`."""
    unknown = [name for name in names if name not in SUBJECTS]
    if unknown:
        print(f"unknown: {', '.join(unknown)}; choose from {', '.join(SUBJECTS)}", file=sys.stderr)
        return 2
    for name in names or SUBJECTS:
        for line in importlib.import_module(f"tests.bench.{name}").report():
            print(f"{name}: {line}", flush=True)
    return 0


if __name__ == "__main__":
    raise SystemExit(main(sys.argv[1:]))
