"""The job files opened or saved lately, newest first, kept in the settings."""

from pathlib import Path
from typing import Final

from PySide6.QtCore import QSettings

MOST: Final = 10
KEY: Final = "files/recent"


class RecentFiles:
    """At most `MOST` files by their real paths, no file twice; a missing file stays in the list."""

    def __init__(self, settings: QSettings) -> None:
        self._settings = settings

    def paths(self) -> tuple[Path, ...]:
        """Return the files, newest first."""
        # One entry comes back as a text and none as None: INI files hold no lists of one.
        stored = self._settings.value(KEY, [])
        texts = [stored] if isinstance(stored, str) else stored if isinstance(stored, list) else []
        return tuple(Path(str(text)) for text in texts if text)[:MOST]

    def add(self, path: Path) -> None:
        """Put `path` first."""
        real = path.resolve()
        others = [other for other in self.paths() if other != real]
        self._settings.setValue(KEY, [str(each) for each in [real, *others][:MOST]])

    def clear(self) -> None:
        """Forget every file."""
        self._settings.remove(KEY)

    @property
    def folder(self) -> Path:
        """The folder to begin in when a file is asked for: that of the newest file that still exists."""
        existing = (path.parent for path in self.paths() if path.parent.is_dir())
        return next(existing, Path.home())
