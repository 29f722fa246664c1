"""The sample jobs that come with the program, for the menu."""

import json
from dataclasses import dataclass
from pathlib import Path
from typing import Final

FOLDER: Final = Path(__file__).resolve().parent.parent / "samples"


@dataclass(frozen=True, slots=True)
class Sample:
    """A job file that comes with the program and the title it has."""

    path: Path
    title: str


def samples(folder: Path = FOLDER) -> tuple[Sample, ...]:
    """Return the sample jobs in the order of their file names."""
    return tuple(Sample(path, _title(path)) for path in sorted(folder.glob("*.slabjob")))


def _title(path: Path) -> str:
    title = json.loads(path.read_text(encoding="utf-8")).get("title", "")
    return str(title) or path.stem
