"""Files dropped on the window: jobs are opened, measured data are shown."""

from collections.abc import Sequence
from pathlib import Path

from PySide6.QtGui import QDropEvent

from app.window.files import Files
from app.window.material_files import MaterialFiles
from app.window.windows import Others


def dropped_files(event: QDropEvent) -> tuple[Path, ...]:
    """Return the local files of a drag or a drop."""
    return tuple(Path(url.toLocalFile()) for url in event.mimeData().urls() if url.isLocalFile())


def open_dropped(paths: Sequence[Path], files: Files, data: MaterialFiles, others: Others) -> None:
    """Open the first job here and every other one in a window of its own; show each file of measured data."""
    for path in paths:
        if data.takes(path):
            data.open(path)
    first, *rest = [path for path in paths if not data.takes(path)] or (None,)
    if first is not None:
        files.open_path(first)
    for path in rest:
        if path is not None:
            others.open_beside(path)
