"""Dialogs that answer by script, and small jobs to work on."""

from collections.abc import Callable, Sequence
from dataclasses import dataclass, field
from pathlib import Path

from app.window.dialogs import FileKind, OverwriteAnswer, SaveAnswer
from stackcore.job import Job, job_from_json


@dataclass
class ScriptedDialogs:
    """Answers every question from what was put in; what has no answer left is cancelled."""

    save: list[SaveAnswer] = field(default_factory=list)
    overwrite: list[OverwriteAnswer] = field(default_factory=list)
    open_paths: list[Path] = field(default_factory=list)
    save_paths: list[Path] = field(default_factory=list)
    csv_paths: list[Path] = field(default_factory=list)
    source_paths: list[Path] = field(default_factory=list)
    picture_paths: list[Path] = field(default_factory=list)
    asked: list[str] = field(default_factory=list)

    def ask_save(self, name: str, then: Callable[[SaveAnswer], None]) -> None:
        """Answer with the next of `save`."""
        self.asked.append(f"save {name}")
        then(self.save.pop(0) if self.save else "cancel")

    def ask_overwrite(self, name: str, then: Callable[[OverwriteAnswer], None]) -> None:
        """Answer with the next of `overwrite`."""
        self.asked.append(f"overwrite {name}")
        then(self.overwrite.pop(0) if self.overwrite else "cancel")

    def pick_open(self, folder: Path, then: Callable[[Path], None]) -> None:
        """Pick the next of `open_paths`."""
        self.asked.append(f"open in {folder.name}")
        if self.open_paths:
            then(self.open_paths.pop(0))

    def pick_source(
        self, title: str, folder: Path, kinds: Sequence[FileKind], then: Callable[[Path], None]
    ) -> None:
        """Pick the next of `source_paths`."""
        self.asked.append(f"{title} in {folder.name}")
        if self.source_paths:
            then(self.source_paths.pop(0))

    def pick_save(self, suggestion: Path, then: Callable[[Path], None]) -> None:
        """Pick the next of `save_paths`."""
        self.asked.append(f"save as {suggestion.name}")
        if self.save_paths:
            then(self.save_paths.pop(0))

    def pick_target(
        self, title: str, suggestion: Path, kinds: Sequence[FileKind], then: Callable[[Path], None]
    ) -> None:
        """Pick the next of `csv_paths` or `picture_paths`, as the kinds are."""
        self.asked.append(f"{title} {suggestion.name}")
        paths = self.csv_paths if kinds[0].suffix == "csv" else self.picture_paths
        if paths:
            then(paths.pop(0))


JOB = """{
  "format": "slabwright-job",
  "version": 1,
  "title": "Harbour cover",
  "notes": "",
  "materials": {
    "skin": {"label": "Glass-fibre skin", "model": "constant", "permittivity": 4.2, "loss_tangent": 0.015},
    "core": {"model": "constant", "permittivity": 1.1, "loss_tangent": 0.002},
    "steel": {"model": "conductor", "conductivity": "6 MS/m", "permeability": 200}
  },
  "stacks": [
    {
      "name": "A",
      "front": "air",
      "back": "air",
      "elements": [
        {"layer": "skin", "thickness": "1.0 mm"},
        {"layer": "core", "thickness": "8 mm"},
        {"layer": "skin", "thickness": "1.0 mm"}
      ]
    },
    {"name": "B", "front": "air", "back": "metal", "elements": [{"layer": "skin", "thickness": "2 mm"}]},
    {"name": "C", "front": "air", "back": "air", "elements": [{"layer": "steel", "thickness": "1 mm"}]}
  ],
  "sweep": {
    "frequency": {"start": "8 GHz", "stop": "12 GHz", "points": 41, "spacing": "linear"},
    "angle": ["0 deg", "45 deg"]
  }
}
"""


def small_job() -> Job:
    """Return the job of `JOB`."""
    return Job(job_from_json(JOB))


def job_file(folder: Path, name: str = "cover.slabjob") -> Path:
    """Write `JOB` into `folder` and return its path."""
    path = folder / name
    path.write_text(JOB, encoding="utf-8")
    return path
